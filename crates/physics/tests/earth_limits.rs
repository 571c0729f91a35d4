//! The solver over soil where theory knows the answer, and laws that it must keep.

use nalgebra::DMatrix;
use num_complex::Complex64;
use physics::constants::wave_number_rad_per_m;
use physics::earth::Soil;
use physics::field::{FarFieldSource, earth_power_w, radiated_power_w};
use physics::wire::{
    Boundary, Conductor, Material, Metal, PortPlace, Structure, WireError, WireModel, WireShape,
};
use proptest::prelude::*;

const COPPER: Material = Material {
    metal: Metal::Solid(Conductor { conductivity_s_per_m: 58e6, relative_permeability: 1.0 }),
    resistance_factor: 1.0,
    insulation: None,
};

fn soil(relative_permittivity: f64, conductivity_s_per_m: f64) -> Boundary {
    Boundary::Soil(Soil { relative_permittivity, conductivity_s_per_m })
}

/// Wires whose lowest point is at a height: level, sloping, bent and upright.
fn shapes(low_m: f64) -> [Vec<[f64; 3]>; 4] {
    [
        vec![[-10.0, 0.0, low_m], [10.0, 0.0, low_m]],
        vec![[0.0, 0.0, low_m], [9.0, 4.0, low_m + 15.0]],
        vec![[-8.0, 0.0, low_m], [0.0, 0.0, low_m + 6.0], [8.0, 2.0, low_m + 1.0]],
        vec![[0.0, 0.0, low_m], [0.0, 0.0, low_m + 18.0]],
    ]
}

fn structure(vertices_m: &[[f64; 3]], boundary: Boundary) -> Structure {
    let wire = WireShape { vertices_m: vertices_m.to_vec(), radius_m: 1e-3, material: COPPER };
    Structure { wires: vec![wire], ports: vec![PortPlace { wire: 0, arc_m: 8.0, gap_m: 0.02 }], boundary }
}

fn admittance(vertices_m: &[[f64; 3]], boundary: Boundary, frequency_hz: f64) -> Complex64 {
    let model = WireModel::new(structure(vertices_m, boundary), frequency_hz).expect("a sound structure");
    model.solve(frequency_hz).expect("within the mesh").port_admittance_s[(0, 0)]
}

fn apart(a: Complex64, b: Complex64) -> f64 {
    (a - b).norm() / b.norm()
}

#[test]
fn nothing_below_is_no_earth() {
    for vertices_m in shapes(2.0) {
        let [over, free] =
            [soil(1.0, 0.0), Boundary::FreeSpace].map(|below| admittance(&vertices_m, below, 14e6));
        assert!(apart(over, free) < 1e-6, "{vertices_m:?}: {over} for {free}");
    }
}

#[test]
fn a_perfect_conductor_below_is_the_mirror() {
    // The most that a soil may conduct: |ε| is 1.3e5 at 14 MHz, and what is left falls like its root.
    for vertices_m in shapes(4.0) {
        let mirror = admittance(&vertices_m, Boundary::Mirror, 14e6);
        let [less, most] = [1.0, 100.0].map(|s| apart(admittance(&vertices_m, soil(1.0, s), 14e6), mirror));
        assert!(most < 5e-3 && most < 0.2 * less, "{vertices_m:?}: {less} and {most}");
    }
}

#[test]
fn many_wavelengths_up_there_is_no_earth() {
    // A level half wave: what comes back is the wave that the soil reflects straight up, −Γ times what a mirror gives back,
    // and falls with the height.
    let (frequency_hz, half_m) = (50e6, 1.45);
    let epsilon = Soil { relative_permittivity: 13.0, conductivity_s_per_m: 0.005 };
    let index = epsilon.complex_permittivity(frequency_hz).unwrap().sqrt();
    let reflection = (1.0 - index) / (1.0 + index);
    let impedance = |height_m: f64, boundary| {
        let wire = WireShape {
            vertices_m: vec![[-half_m, 0.0, height_m], [half_m, 0.0, height_m]],
            radius_m: 1e-3,
            material: COPPER,
        };
        let ports = vec![PortPlace { wire: 0, arc_m: half_m, gap_m: 0.02 }];
        let model = WireModel::new(Structure { wires: vec![wire], ports, boundary }, frequency_hz).unwrap();
        model.solve(frequency_hz).unwrap().port_admittance_s[(0, 0)].inv()
    };
    let mut last = f64::INFINITY;
    for height_m in [12.0, 24.0, 48.0] {
        let free = impedance(height_m, Boundary::FreeSpace);
        let change = impedance(height_m, soil(13.0, 0.005)) - free;
        let expected = -reflection * (impedance(height_m, Boundary::Mirror) - free);
        // The next term of the series is smaller by the order of 1/2kh.
        let next = 4.0 / (2.0 * wave_number_rad_per_m(frequency_hz) * height_m);
        let off = (change - expected).norm() / expected.norm();
        assert!(off < next, "{height_m} m: {change} for {expected}, {off} of {next}");
        let share = change.norm() / free.norm();
        assert!(share < 0.6 * last, "{height_m} m: {share}");
        last = share;
    }
    assert!(last < 0.01, "{last}");
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(24))]

    /// Two wires over soil: what one port does to the other it suffers from it, and every watt is accounted for.
    #[test]
    fn ports_are_reciprocal_and_watts_add_up(
        low_m in 0.3..12.0_f64, rise_m in 0.0..8.0_f64, permittivity in 3.0..81.0_f64, exponent in -4.0..0.7_f64,
        frequency_hz in 3e6..30e6_f64,
    ) {
        let boundary = soil(permittivity, 10_f64.powf(exponent));
        let wire = |vertices_m: &[[f64; 3]]| WireShape {
            vertices_m: vertices_m.to_vec(), radius_m: 1e-3, material: COPPER,
        };
        let structure = Structure {
            wires: vec![
                wire(&[[-9.0, 0.0, low_m], [0.0, 0.0, low_m + rise_m], [9.0, 1.0, low_m]]),
                wire(&[[-4.0, 6.0, low_m + 1.0], [5.0, 9.0, low_m + 0.5 * rise_m]]),
            ],
            ports: vec![
                PortPlace { wire: 0, arc_m: 5.0, gap_m: 0.02 },
                PortPlace { wire: 1, arc_m: 4.0, gap_m: 0.02 },
            ],
            boundary,
        };
        let model = WireModel::new(structure, frequency_hz).expect("a sound structure");
        let solution = model.solve(frequency_hz).expect("within the mesh");
        let y: &DMatrix<Complex64> = &solution.port_admittance_s;
        prop_assert!((y[(0, 1)] - y[(1, 0)]).norm() < 1e-8 * y[(0, 0)].norm());
        let volts = [Complex64::ONE, Complex64::new(0.3, -0.4)];
        let given_w: f64 = solution.port_powers_w(&volts).iter().sum();
        let currents = model.end_currents(&solution.coefficients_a_per_v, &volts);
        let burnt_w: f64 = model.wire_loss_w(&currents, frequency_hz).iter().sum();
        let source = FarFieldSource::new(model.segments(), &currents, boundary, frequency_hz);
        let earth_w = earth_power_w(&source).expect("the wires hang free");
        let sum = (radiated_power_w(&source) + earth_w + burnt_w) / given_w;
        prop_assert!((sum - 1.0).abs() < 0.01, "{sum}");
    }
}

#[test]
fn a_wire_in_the_soil_is_refused_in_words() {
    let buried = structure(&[[-10.0, 0.0, -0.5], [10.0, 0.0, 3.0]], soil(13.0, 0.005));
    let refusal = WireModel::new(buried, 14e6).unwrap_err();
    assert!(matches!(refusal, WireError::ThroughMirror { .. }), "{refusal}");
    println!("{refusal}");
    let odd = structure(&[[-10.0, 0.0, 3.0], [10.0, 0.0, 3.0]], soil(0.3, 0.005));
    let refusal = WireModel::new(odd, 14e6).unwrap().solve(14e6).unwrap_err().to_string();
    assert!(refusal.contains("relative permittivity is 0.3") && refusal.contains("1 to 100"), "{refusal}");
}
