//! The tables of an earth against the integrals themselves.

use physics::constants::SPEED_OF_LIGHT_M_PER_S;
use physics::earth::{GroundKernels, HalfSpace, Reach, Soil, exact_kernels};

/// From desert to sea, low-loss water and ice among them.
const SOILS: [(f64, f64); 16] = [
    (3.0, 1e-4),
    (3.0, 1e-5),
    (3.0, 1e-3),
    (5.0, 1e-3),
    (4.0, 1e-2),
    (10.0, 2e-3),
    (13.0, 2e-3),
    (13.0, 5e-3),
    (14.0, 1e-2),
    (20.0, 0.03),
    (30.0, 0.01),
    (80.0, 1e-3),
    (80.0, 3e-3),
    (80.0, 0.03),
    (80.0, 1.0),
    (81.0, 5.0),
];

/// Of the places; any other must do too.
const SEED: u64 = 7;

struct Random(u64);

impl Random {
    /// 0 to 1.
    fn next(&mut self) -> f64 {
        self.0 = self.0.wrapping_mul(6_364_136_223_846_793_005).wrapping_add(1_442_695_040_888_963_407);
        (self.0 >> 11) as f64 / (1_u64 << 53) as f64
    }
}

struct Worst {
    error: f64,
    place: String,
}

/// Compares an earth with the integrals at random places of its reach; lengths in wavelengths.
fn compare(
    soil: &Soil,
    frequency_hz: f64,
    [rho_max, zeta_min, zeta_max]: [f64; 3],
    random: &mut Random,
) -> Worst {
    const PLACES: usize = 30;
    let wavelength_m = SPEED_OF_LIGHT_M_PER_S / frequency_hz;
    let reach = Reach {
        rho_max_m: rho_max * wavelength_m,
        zeta_min_m: zeta_min * wavelength_m,
        zeta_max_m: zeta_max * wavelength_m,
    };
    let earth = HalfSpace::new(soil, frequency_hz, &reach).expect("within the range");
    let k0 = earth.wave_number_rad_per_m();
    let place = |_| {
        let zeta = zeta_min * (zeta_max / zeta_min).powf(random.next());
        // Even over distance, or over its logarithm
        let (even, part) = (random.next() < 0.5, random.next());
        let rho = if even { rho_max * part } else { rho_max * 0.0002_f64.powf(part) };
        (rho * wavelength_m, zeta * wavelength_m)
    };
    let (rho_m, zeta_m): (Vec<f64>, Vec<f64>) = (0..PLACES).map(place).unzip();
    let mut kernels = vec![GroundKernels::default(); PLACES];
    let mut remainders = kernels.clone();
    earth.kernels(&rho_m, &zeta_m, &mut kernels);
    earth.remainders(&rho_m, &zeta_m, &mut remainders);
    let mut worst = Worst { error: 0.0, place: String::new() };
    for index in 0..PLACES {
        let (rho, zeta) = (k0 * rho_m[index], k0 * zeta_m[index]);
        let exact = exact_kernels(earth.permittivity(), rho, zeta);
        let images = earth.static_weights().images(rho, zeta);
        let difference = (kernels[index] - exact * k0).largest();
        let of_remainder = (remainders[index] - (exact - images) * k0).largest();
        let error = difference.max(of_remainder) * rho_m[index].hypot(zeta_m[index]);
        if error > worst.error {
            let (rho, zeta) = (rho_m[index] / wavelength_m, zeta_m[index] / wavelength_m);
            let place = format!("{soil:?}, {:.2} MHz, ρ {rho:.3} λ, ζ {zeta:.3} λ", frequency_hz / 1e6);
            worst = Worst { error, place };
        }
    }
    worst
}

#[test]
fn tables_equal_the_integrals_everywhere() {
    let mut random = Random(SEED);
    let mut worst = Worst { error: 0.0, place: String::new() };
    for (relative_permittivity, conductivity_s_per_m) in SOILS {
        let soil = Soil { relative_permittivity, conductivity_s_per_m };
        for step in 0..4 {
            let frequency_hz = 1.8e6 * 30_f64.powf((f64::from(step) + random.next()) / 4.0);
            // Heights 0.005 to 2 λ at each end, up to 15 λ; far and high; and some smaller reach, a single height among them
            let least = 0.01 * 200_f64.powf(random.next());
            let greatest = if step == 3 { least } else { least * (4.0 / least).powf(random.next()) };
            let some = [0.1 * 150_f64.powf(random.next()), least, greatest];
            for reach in [[15.0, 0.01, 4.0], [28.0, 1.0, 18.0], some] {
                let here = compare(&soil, frequency_hz, reach, &mut random);
                if here.error > worst.error {
                    worst = here;
                }
            }
        }
    }
    println!("worst error times R: {:.1e}, {}", worst.error, worst.place);
    assert!(worst.error < 1e-3, "{:.1e}, {}", worst.error, worst.place);
}

#[test]
fn outside_the_reach_it_is_slow_but_right() {
    let soil = Soil { relative_permittivity: 13.0, conductivity_s_per_m: 0.005 };
    let reach = Reach { rho_max_m: 20.0, zeta_min_m: 10.0, zeta_max_m: 12.0 };
    let earth = HalfSpace::new(&soil, 14e6, &reach).unwrap();
    let (rho_m, zeta_m) = ([200.0, 5.0, 5.0, 0.0], [11.0, 1.0, 60.0, 11.0]);
    let mut kernels = [GroundKernels::default(); 4];
    earth.kernels(&rho_m, &zeta_m, &mut kernels);
    let k0 = earth.wave_number_rad_per_m();
    for (index, got) in kernels.iter().enumerate() {
        let exact = exact_kernels(earth.permittivity(), k0 * rho_m[index], k0 * zeta_m[index]) * k0;
        assert!((*got - exact).largest() * rho_m[index].hypot(zeta_m[index]) < 1e-4, "{index}: {got:?}");
    }
}

#[test]
fn refuses_what_it_cannot_serve() {
    let soil = Soil { relative_permittivity: 13.0, conductivity_s_per_m: 0.005 };
    let refusal = |rho_max_m, zeta_min_m, zeta_max_m| {
        let reach = Reach { rho_max_m, zeta_min_m, zeta_max_m };
        HalfSpace::new(&soil, 14e6, &reach).map(|_| ()).map_err(|error| error.to_string())
    };
    assert_eq!(refusal(20.0, 10.0, 12.0), Ok(()));
    for (got, name) in [
        (refusal(-1.0, 10.0, 12.0), "rho_max"),
        (refusal(f64::NAN, 10.0, 12.0), "rho_max"),
        (refusal(1e4, 10.0, 12.0), "rho_max"),
        (refusal(20.0, 0.0, 12.0), "zeta_min"),
        (refusal(20.0, 10.0, 9.0), "zeta_max"),
        (refusal(20.0, 10.0, f64::INFINITY), "zeta_max"),
    ] {
        assert!(got.as_ref().is_err_and(|message| message.starts_with(name)), "{name}: {got:?}");
    }
}
