//! Far field over soil and the watts that soil takes: exact integrals, limits, and where the two must meet.

use std::f64::consts::{PI, TAU};

use num_complex::Complex64;
use physics::constants::{
    SPEED_OF_LIGHT_M_PER_S, VACUUM_IMPEDANCE_OHM, VACUUM_PERMITTIVITY_F_PER_M, wave_number_rad_per_m,
};
use physics::earth::dyad::coupling;
use physics::earth::{GroundKernels, Soil, exact_kernels, fresnel};
use physics::field::{Direction, FarFieldSource, earth_power_w, radiated_power_w, strongest_direction};
use physics::wire::{Boundary, Element, EndCurrents, Segment};

type Vec3 = [f64; 3];

/// One metre of wavelength.
const FREQUENCY_HZ: f64 = SPEED_OF_LIGHT_M_PER_S;

/// Complex permittivities at HF: average soil, poor and dry, good and wet, fresh water, the same without loss, sea at 28
/// and at 1.8 MHz, ice.
const SOILS: [(f64, f64); 8] = [
    (13.0, -12.7),
    (4.0, -2.0),
    (30.0, -150.0),
    (80.0, -1.9),
    (80.0, 0.0),
    (80.0, -3200.0),
    (80.0, -50_000.0),
    (3.2, -0.01),
];

fn soil((re, im): (f64, f64)) -> Boundary {
    let omega = TAU * FREQUENCY_HZ;
    Boundary::Soil(Soil {
        relative_permittivity: re,
        conductivity_s_per_m: -im * omega * VACUUM_PERMITTIVITY_F_PER_M,
    })
}

fn epsilon((re, im): (f64, f64)) -> Complex64 {
    Complex64::new(re, im)
}

/// A wire through corners, each arm a sinusoid that is the same at both ends of a corner.
#[derive(Clone, Debug)]
struct Wire {
    corners_m: Vec<Vec3>,
    currents_a: Vec<Complex64>,
}

impl Wire {
    fn segments(&self) -> Vec<Segment> {
        let segment = |pair: &[Vec3]| Segment { from_m: pair[0], to_m: pair[1], radius_m: 1e-4 };
        self.corners_m.windows(2).map(segment).collect()
    }

    fn far(&self, boundary: Boundary) -> FarFieldSource {
        let ends: Vec<EndCurrents> =
            self.currents_a.windows(2).map(|pair| EndCurrents { from_a: pair[0], to_a: pair[1] }).collect();
        FarFieldSource::new(&self.segments(), &ends, boundary, FREQUENCY_HZ)
    }

    /// A current element in the middle of nowhere: so short that its size is nothing.
    fn element(height_m: f64, direction: Vec3) -> Self {
        let end = |sign: f64| advance([0.0, 0.0, height_m], direction, 0.5 * sign * ELEMENT_M);
        Self { corners_m: vec![end(-1.0), end(1.0)], currents_a: vec![Complex64::ONE; 2] }
    }

    /// Two arms from the feed, I = sin k(l − s), each cut once where that keeps it shorter than half a wave.
    fn arms(feed_m: Vec3, first_m: Vec3, second_m: Vec3) -> Self {
        let k = wave_number_rad_per_m(FREQUENCY_HZ);
        let half = |end: Vec3| -> Vec3 { std::array::from_fn(|axis| 0.5 * (feed_m[axis] + end[axis])) };
        let long = |end: Vec3| length(std::array::from_fn(|axis| end[axis] - feed_m[axis]));
        let at = |length_m: f64| Complex64::from((k * length_m).sin());
        // Of arms of different length the current at the feed is the same.
        let (one, other) = (long(first_m), long(second_m));
        let scale = at(one) / at(other);
        Self {
            corners_m: vec![first_m, half(first_m), feed_m, half(second_m), second_m],
            currents_a: vec![
                Complex64::ZERO,
                at(0.5 * one),
                at(one),
                scale * at(0.5 * other),
                Complex64::ZERO,
            ],
        }
    }
}

const ELEMENT_M: f64 = 1e-5;

fn advance(a: Vec3, direction: Vec3, t: f64) -> Vec3 {
    std::array::from_fn(|axis| a[axis] + t * direction[axis])
}

fn length(a: Vec3) -> f64 {
    a.iter().map(|x| x * x).sum::<f64>().sqrt()
}

/// Gauss-Legendre points and weights on 0…1, five points (Abramowitz & Stegun, table 25.4, from memory).
const RULE: [(f64, f64); 5] = [
    (0.046_910_077_030_668, 0.118_463_442_528_095),
    (0.230_765_344_947_158, 0.239_314_335_249_683),
    (0.5, 0.284_444_444_444_444),
    (0.769_234_655_052_842, 0.239_314_335_249_683),
    (0.953_089_922_969_332, 0.118_463_442_528_095),
];

/// On pieces.
fn integral(pieces: &[f64], integrand: impl Fn(f64) -> f64) -> f64 {
    let piece = |pair: &[f64]| {
        let width = pair[1] - pair[0];
        RULE.iter().map(|(share, weight)| weight * width * integrand(pair[0] + share * width)).sum::<f64>()
    };
    pieces.windows(2).map(piece).sum()
}

/// Power of a current element over a half-space over its power alone: Sommerfeld's integrals,
///
/// upright: 1 + 3/2·Re ∫ j·Γ_v·q³/u0·e^(−2u0·kh) dq
/// level: 1 + 3/4·Re ∫ j·(Γ_h + u0²·Γ_v)·q/u0·e^(−2u0·kh) dq
///
/// (after Sommerfeld, 1909, and Sommerfeld & Renner, 1942; from memory, and checked by the perfect ground's closed
/// forms below). Only sky and earth together are that power; nothing here knows of either.
fn power_ratio(epsilon: Complex64, k_height: f64, upright: bool) -> f64 {
    let of_wave = |q: f64, u0: Complex64| {
        let u1 = (q * q - epsilon).sqrt();
        let level = (u0 - u1) / (u0 + u1);
        let rising = (epsilon * u0 - u1) / (epsilon * u0 + u1);
        let wave = Complex64::i() * (-2.0 * k_height * u0).exp();
        if upright { 1.5 * q * q * rising * wave } else { 0.75 * (level + u0 * u0 * rising) * wave }
    };
    // q dq/u0: u0 = j·s below the horizon (dq·q = −u0·du0), u0 = t beyond
    let graded = |end: f64, first: f64| {
        let mut pieces = vec![0.0];
        let mut at = first;
        while at < end {
            pieces.push(at);
            at = (1.08 * at).min(at + 0.1);
        }
        pieces.push(end);
        pieces
    };
    let steep = integral(&graded(1.0, 1e-5), |s| {
        (of_wave((1.0 - s * s).sqrt(), Complex64::new(0.0, s)) * Complex64::new(0.0, -1.0)).re
    });
    // Around the branch point of a soil without loss the pieces stand closer.
    let edge = (epsilon - 1.0).sqrt().re;
    let mut pieces = graded(25.0 / k_height, 1e-5);
    for step in 1..100 {
        let near = edge * 0.8_f64.powi(step);
        pieces.extend([edge - near, edge + near]);
    }
    pieces.push(edge);
    pieces.retain(|&piece| piece <= 25.0 / k_height);
    pieces.sort_by(f64::total_cmp);
    let flat = integral(&pieces, |t| of_wave((1.0 + t * t).sqrt(), Complex64::from(t)).re);
    1.0 + steep + flat
}

/// ηk²·(I·l)²/12π
fn element_power_w() -> f64 {
    let k = wave_number_rad_per_m(FREQUENCY_HZ);
    VACUUM_IMPEDANCE_OHM * (k * ELEMENT_M).powi(2) / (12.0 * PI)
}

/// Image in a perfect ground: 1 − 3/2·(sin x/x + cos x/x² − sin x/x³) level, 1 + 3·(sin x/x³ − cos x/x²) upright, x = 2kh
/// (any textbook, from memory).
#[test]
fn sommerfelds_integrals_over_a_perfect_ground() {
    for k_height in [0.3, 1.0, 4.0] {
        let x: f64 = 2.0 * k_height;
        let (sine, cosine) = x.sin_cos();
        let level = 1.0 - 1.5 * (sine / x + cosine / (x * x) - sine / x.powi(3));
        let upright = 1.0 + 3.0 * (sine / x.powi(3) - cosine / (x * x));
        let perfect = Complex64::new(1.0, -1e14);
        assert!((power_ratio(perfect, k_height, false) - level).abs() < 1e-5, "{k_height}");
        assert!((power_ratio(perfect, k_height, true) - upright).abs() < 1e-5, "{k_height}");
    }
}

/// Sky and earth, each found on its own, make the watts that the reflected field takes from the current.
#[test]
fn sky_and_earth_of_an_element_are_sommerfelds_power() {
    let k = wave_number_rad_per_m(FREQUENCY_HZ);
    let mut worst = 0.0_f64;
    for figures in SOILS {
        for height_m in [0.005, 0.02, 0.1, 0.3, 1.0] {
            for (upright, direction) in [(false, [0.6, 0.8, 0.0]), (true, [0.0, 0.0, 1.0])] {
                let source = Wire::element(height_m, direction).far(soil(figures));
                let sky = radiated_power_w(&source) / element_power_w();
                let earth = earth_power_w(&source).unwrap() / element_power_w();
                let expected = power_ratio(epsilon(figures), k * height_m, upright);
                let off = ((sky + earth) / expected - 1.0).abs();
                worst = worst.max(off);
                assert!(off < 2e-5, "{figures:?} {height_m} {upright}: {sky} + {earth} for {expected}");
            }
        }
    }
    println!("worst: {worst:e}");
}

/// Wires high and low, level, sloping, bent and upright, with whatever currents.
fn wires() -> Vec<(&'static str, Wire)> {
    vec![
        ("level half wave", Wire::arms([0.0, 0.0, 0.08], [-0.15, -0.2, 0.08], [0.15, 0.2, 0.08])),
        ("inverted V", Wire::arms([0.3, 0.1, 0.2], [-0.2, 0.1, 0.05], [0.8, 0.1, 0.05])),
        ("sloping, off centre", Wire::arms([0.0, 0.0, 0.15], [0.1, 0.0, 0.06], [-0.5, 0.3, 0.4])),
        ("upright", Wire::arms([0.0, 0.0, 0.3], [0.0, 0.0, 0.05], [0.0, 0.0, 0.55])),
        ("corner in the level", Wire::arms([0.0, 0.0, 0.3], [0.4, 0.0, 0.3], [0.0, 0.4, 0.35])),
    ]
}

/// Watts that reflection adds to those of the wire alone, by the exact kernels of [`physics::earth`]:
/// ½·Re jkη/4π·∫∫ (I·I'*·K_A − dI/ds·dI'*/ds'·K_q/k²), of which the sky and the earth know nothing.
fn reflected_power_w(wire: &Wire, epsilon: Complex64) -> f64 {
    let k = wave_number_rad_per_m(FREQUENCY_HZ);
    let mut points: Vec<(Element, Complex64, Complex64)> = Vec::new();
    for (segment, currents_a) in wire.segments().iter().zip(wire.currents_a.windows(2)) {
        let (long, direction) = (segment.length_m(), segment.direction());
        let (sine, [from, to]) = ((k * long).sin(), [currents_a[0], currents_a[1]]);
        for (share, weight) in RULE {
            let (near, far) = (k * share * long, k * (1.0 - share) * long);
            let current = (from * far.sin() + to * near.sin()) / sine;
            // Over k
            let slope = (to * near.cos() - from * far.cos()) / sine;
            let position_m = advance(segment.from_m, direction, share * long);
            points.push((Element { position_m, direction }, weight * long * current, weight * long * slope));
        }
    }
    let mut sum = Complex64::ZERO;
    for (index, (test, test_a, test_slope)) in points.iter().enumerate() {
        for (source, source_a, source_slope) in &points[..=index] {
            let [x, y, _] = advance(test.position_m, source.position_m, -1.0);
            let heights_m = test.position_m[2] + source.position_m[2];
            let ground = exact_kernels(epsilon, k * x.hypot(y), k * heights_m);
            let kernel = coupling(test, source, &GroundKernels::from_values(ground.values().map(|s| k * s)));
            let work =
                test_a.conj() * source_a * kernel.current - test_slope.conj() * source_slope * kernel.charge;
            // Real currents: both orders are the same.
            sum += if std::ptr::eq(test, source) { work } else { 2.0 * work };
        }
    }
    0.5 * (Complex64::new(0.0, k * VACUUM_IMPEDANCE_OHM / (4.0 * PI)) * sum).re
}

#[test]
fn sky_and_earth_of_wires_are_the_exact_kernels_power() {
    for (name, wire) in wires() {
        let alone = radiated_power_w(&wire.far(Boundary::FreeSpace));
        for figures in [SOILS[0], SOILS[1], SOILS[3], SOILS[5]] {
            let source = wire.far(soil(figures));
            let (sky, earth) = (radiated_power_w(&source), earth_power_w(&source).unwrap());
            let expected = alone + reflected_power_w(&wire, epsilon(figures));
            let off = (sky + earth) / expected - 1.0;
            println!(
                "{name}, {figures:?}: sky {:.4}, earth {:.4}, off {off:e}",
                sky / expected,
                earth / expected
            );
            assert!(off.abs() < 1e-4, "{name} {figures:?}: {sky} + {earth} for {expected}");
        }
    }
}

/// No earth: what a wire alone sends upward and downward.
#[test]
fn soil_like_nothing_takes_what_goes_down() {
    for (name, wire) in wires() {
        let alone = radiated_power_w(&wire.far(Boundary::FreeSpace));
        let source = wire.far(soil((1.0, 0.0)));
        let (sky, earth) = (radiated_power_w(&source), earth_power_w(&source).unwrap());
        let down = downward(&wire, |_, field| field.intensity_w_per_sr());
        assert!((earth / down - 1.0).abs() < 1e-6, "{name}: {earth} for {down}");
        assert!((sky / (alone - down) - 1.0).abs() < 1e-5, "{name}: {sky} for {}", alone - down);
    }
}

/// Integral of something of a wire's field alone over the lower half of the sphere.
fn downward(wire: &Wire, of: impl Fn(f64, physics::field::FarField) -> f64) -> f64 {
    let source = wire.far(Boundary::FreeSpace);
    let mut pieces = vec![0.0];
    pieces.extend((0..12).rev().map(|step| 0.5_f64.powi(step)));
    integral(&pieces, |sine| {
        let elevation_deg = -sine.asin().to_degrees();
        let ring = source.ring(elevation_deg);
        let around = 60;
        let of = |step: i32| of(sine, ring.field(360.0 * f64::from(step) / f64::from(around)));
        (0..around).map(of).sum::<f64>() * TAU / f64::from(around)
    })
}

/// High up only the waves that travel reach the soil, each with its share 1 − |Γ|².
#[test]
fn from_high_up_soil_takes_fresnels_share_of_what_goes_down() {
    for figures in [SOILS[0], SOILS[1], SOILS[3], SOILS[5]] {
        let high = Wire::arms([0.0, 0.0, 400.0], [-0.3, -0.2, 400.1], [0.15, 0.2, 400.0]);
        let share = downward(&high, |sine, field| {
            let back = fresnel(epsilon(figures), sine);
            let enters = |field: Complex64, back: Complex64| field.norm_sqr() * (1.0 - back.norm_sqr());
            (enters(field.phi_v, back.level) + enters(field.theta_v, back.rising))
                / (2.0 * VACUUM_IMPEDANCE_OHM)
        });
        let earth = earth_power_w(&high.far(soil(figures))).unwrap();
        // Of the grazing waves some still tunnel through the height: shares of (1/kh)² or so.
        println!("{figures:?} {:e}", earth / share - 1.0);
        assert!((earth / share - 1.0).abs() < 1e-4, "{figures:?}: {earth} for {share}");
    }
}

#[test]
fn perfect_soil_is_a_mirror() {
    for (name, wire) in wires() {
        let (perfect, mirror) = (wire.far(soil((1.0, -1e14))), wire.far(Boundary::Mirror));
        let sky = radiated_power_w(&mirror);
        let earth = earth_power_w(&perfect).unwrap();
        assert!(earth < 1e-5 * sky, "{name}: {earth} of {sky}");
        // Like the surface's resistance it goes down with the root of ε, upright wires with a logarithm.
        let lossier = earth_power_w(&wire.far(soil((1.0, -1e10)))).unwrap();
        assert!((50.0..101.0).contains(&(lossier / earth)), "{name}: {lossier} and {earth}");
        assert_eq!(earth_power_w(&mirror), Some(0.0));
        let off = (radiated_power_w(&perfect) + earth) / sky - 1.0;
        assert!(off.abs() < 5e-6, "{name}: {off:e}");
        for elevation_deg in [1.0, 10.0, 40.0, 90.0, -5.0] {
            for azimuth_deg in [0.0, 50.0, 200.0] {
                let direction = Direction { elevation_deg, azimuth_deg };
                let (a, b) = (perfect.field(direction), mirror.field(direction));
                let off = (a.theta_v - b.theta_v).norm() + (a.phi_v - b.phi_v).norm();
                assert!(off < 1e-3 * sky.sqrt(), "{name} {direction:?}: {a:?} for {b:?}");
            }
        }
        let ((at, peak), (mirror_at, mirror_peak)) =
            (strongest_direction(&perfect), strongest_direction(&mirror));
        assert!((peak / mirror_peak - 1.0).abs() < 1e-3, "{name}: {at:?} for {mirror_at:?}");
    }
}

/// Fields over soil from scratch: each element of the wire and its wave by way of the ground.
#[test]
fn far_field_is_the_sum_of_direct_and_reflected_waves() {
    let k = wave_number_rad_per_m(FREQUENCY_HZ);
    let wire = Wire::arms([0.3, 0.1, 0.2], [-0.2, 0.1, 0.05], [0.8, 0.3, 0.15]);
    for figures in [SOILS[0], SOILS[5]] {
        let source = wire.far(soil(figures));
        for (elevation_deg, azimuth_deg) in [(0.5, 10.0), (8.0, 100.0), (35.0, 220.0), (70.0, 300.0)] {
            let field = source.field(Direction { elevation_deg, azimuth_deg });
            let (up, round) = (f64::to_radians(elevation_deg), f64::to_radians(azimuth_deg));
            let back = fresnel(epsilon(figures), up.sin());
            let [mut rising, mut level] = [Complex64::ZERO; 2];
            for (segment, currents_a) in wire.segments().iter().zip(wire.currents_a.windows(2)) {
                let (long, [x, y, z]) = (segment.length_m(), segment.direction());
                for piece in 0..8 {
                    for (share, weight) in RULE {
                        let along = (f64::from(piece) + share) / 8.0;
                        let (near, far) = (k * along * long, k * (1.0 - along) * long);
                        let current =
                            (currents_a[0] * far.sin() + currents_a[1] * near.sin()) / (k * long).sin();
                        let at = advance(segment.from_m, segment.direction(), along * long);
                        let out = round.cos() * at[0] + round.sin() * at[1];
                        let wave = |z: f64| Complex64::cis(k * (up.cos() * out + up.sin() * z));
                        let moment = current * weight * long / 8.0;
                        let (outward, sideways) =
                            (round.cos() * x + round.sin() * y, round.cos() * y - round.sin() * x);
                        let (direct, image) = (moment * wave(at[2]), moment * wave(-at[2]));
                        level += sideways * (direct + back.level * image);
                        // Upward field of the element, and of its image: level currents turned round, upright ones not
                        rising += (z * up.cos() - outward * up.sin()) * direct;
                        rising += back.rising * (z * up.cos() + outward * up.sin()) * image;
                    }
                }
            }
            let scale = Complex64::new(0.0, -k * VACUUM_IMPEDANCE_OHM / (4.0 * PI));
            let off = (field.phi_v - scale * level).norm() + (-field.theta_v - scale * rising).norm();
            let whole = (scale * level).norm() + (scale * rising).norm();
            assert!(off < 1e-5 * whole, "{figures:?} {elevation_deg} {azimuth_deg}: {off} of {whole}");
        }
    }
}

/// The rule over elevation against the peak's own search and ten thousand rings, where the lobe is steepest: an upright
/// wire over sea, whose field falls to nothing in a fraction of a degree.
#[test]
fn power_to_the_sky_is_that_of_very_many_rings() {
    for figures in SOILS {
        for (name, wire) in wires() {
            let source = wire.far(soil(figures));
            let pieces: Vec<f64> = (0..=600).map(|step| f64::from(step) / 600.0).map(|x| x * x).collect();
            let many = integral(&pieces, |sine| {
                let ring = source.ring(sine.asin().to_degrees());
                let at = |step: i32| ring.field(360.0 * f64::from(step) / 48.0).intensity_w_per_sr();
                (0..48).map(at).sum::<f64>() * TAU / 48.0
            });
            let sky = radiated_power_w(&source);
            println!("{name} {figures:?} {:e}", sky / many - 1.0);
            assert!((sky / many - 1.0).abs() < 1e-5, "{name} {figures:?}: {sky} for {many}");
        }
    }
}

/// Too near, or in the soil: no number.
#[test]
fn wires_on_or_in_the_soil_get_no_number() {
    for height_m in [2e-4, 0.0, -0.1] {
        let wire = Wire::element(height_m, [1.0, 0.0, 0.0]);
        assert_eq!(earth_power_w(&wire.far(soil(SOILS[0]))), None, "{height_m}");
    }
    assert!(earth_power_w(&Wire::element(6e-4, [1.0, 0.0, 0.0]).far(soil(SOILS[0]))).is_some());
}
