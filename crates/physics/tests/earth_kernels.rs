//! The exact functions of the half-space against reference values, closed forms and limits.

use num_complex::Complex64;
use physics::earth::dyad::coupling;
use physics::earth::{GroundKernels, Soil, StaticWeights, exact_kernels};
use physics::wire::Element;
use proptest::prelude::*;
use serde_json::Value;

/// Numerical references of this project's own, not published values: solved independently, to twelve digits.
const REFERENCE: &str = include_str!("data/earth-kernels.json");

fn reference() -> Vec<(Complex64, [f64; 2], GroundKernels)> {
    let file: Value = serde_json::from_str(REFERENCE).expect("a JSON file");
    let number = |value: &Value| value.as_f64().expect("a number");
    let cases = file["kernels"].as_array().expect("a list");
    let read = |case: &Value| {
        let soil = Soil {
            relative_permittivity: number(&case["eps_r"]),
            conductivity_s_per_m: number(&case["sigma"]),
        };
        let epsilon = soil.complex_permittivity(1e6 * number(&case["f_mhz"])).expect("a soil");
        let complex = |name: &str| Complex64::new(number(&case[name][0]), number(&case[name][1]));
        let kernels = GroundKernels::from_values(["S_h", "S_f", "S_z", "S_w"].map(complex));
        (epsilon, [number(&case["k0_rho"]), number(&case["k0_zeta"])], kernels)
    };
    cases.iter().map(read).collect()
}

/// Largest of the four differences, over 1/R.
fn error(a: GroundKernels, b: GroundKernels, [rho, zeta]: [f64; 2]) -> f64 {
    (a - b).largest() * rho.hypot(zeta)
}

#[test]
fn exact_functions_equal_the_reference_values() {
    let mut worst = (0.0, String::new());
    let cases = reference();
    assert_eq!(cases.len(), 120);
    for (epsilon, place, expected) in cases {
        let got = exact_kernels(epsilon, place[0], place[1]);
        let error = error(got, expected, place);
        if error > worst.0 {
            worst = (error, format!("ε = {epsilon}, k0ρ, k0ζ = {place:?}: {got:?} for {expected:?}"));
        }
    }
    println!("worst difference times R: {:.1e} at {}", worst.0, worst.1);
    // Ten to twelve digits in the file, and a permittivity of vacuum that may differ in the tenth.
    assert!(worst.0 < 1e-9, "{worst:?}");
}

#[test]
fn no_earth_gives_nothing_back() {
    for place in [[0.0, 0.1], [0.4, 2.0], [30.0, 0.06], [94.0, 20.0]] {
        let got = exact_kernels(Complex64::ONE, place[0], place[1]);
        assert!(got.largest() * place[0].hypot(place[1]) < 1e-14, "{place:?}: {got:?}");
    }
}

#[test]
fn perfect_ground_gives_images() {
    // −e^(−jR)/R of a level current and of a charge, + of a rising current; what is missing falls like 1/√|ε|
    for place in [[0.0, 0.1], [0.4, 2.0], [3.0, 0.5], [9.0, 15.0]] {
        let distance = f64::hypot(place[0], place[1]);
        let wave = Complex64::cis(-distance) / distance;
        let image =
            GroundKernels { horizontal: -wave, charge: -wave, vertical: wave, cross: Complex64::ZERO };
        let missing = [1e8, 1e10].map(|loss| {
            let got = exact_kernels(Complex64::new(1.0, -loss), place[0], place[1]);
            error(got, image, place)
        });
        assert!(missing[0] < 6e-3 && missing[1] < 6e-4, "{place:?}: {missing:?}");
        assert!((missing[0] / missing[1] - 10.0).abs() < 1.0, "{place:?}: {missing:?}");
    }
}

#[test]
fn close_to_the_earth_images_in_static_fields_remain() {
    // What remains beside them grows like a logarithm at most, for S_w too.
    let epsilon = Complex64::new(13.0, -12.0);
    let weights = StaticWeights::new(epsilon);
    for angle in [0.0_f64, 0.5, 1.2, 1.55] {
        let remainder = [1e-2, 1e-4].map(|distance| {
            let (rho, zeta) = (distance * angle.sin(), distance * angle.cos());
            (exact_kernels(epsilon, rho, zeta) - weights.images(rho, zeta)).values()
        });
        for (near, nearer) in remainder[0].iter().zip(&remainder[1]) {
            println!("{angle} {near} {nearer}");
            assert!(near.norm() < 30.0 && nearer.norm() < 2.0 * near.norm() + 15.0, "{near} {nearer}");
        }
    }
}

/// Change of a short straight dipole's impedance by the earth, over its resistance in free space; lengths in 1/k0.
fn impedance_change(epsilon: Complex64, centre: [f64; 3], direction: [f64; 3], length: f64) -> Complex64 {
    let at = |along: f64| Element {
        position_m: std::array::from_fn(|axis| centre[axis] + along * direction[axis]),
        direction,
    };
    let kernel = |a: f64, b: f64| {
        let (test, source) = (at(a), at(b));
        let rho =
            f64::hypot(test.position_m[0] - source.position_m[0], test.position_m[1] - source.position_m[1]);
        let zeta = test.position_m[2] + source.position_m[2];
        coupling(&test, &source, &exact_kernels(epsilon, rho, zeta))
    };
    // Uniform current l, charges ±1/j at its ends: Z/(jη/4π) = l²·K_A − [K_Φ(++) + K_Φ(−−) − K_Φ(+−) − K_Φ(−+)]
    let half = 0.5 * length;
    let charges = kernel(half, half).charge + kernel(-half, -half).charge
        - kernel(half, -half).charge
        - kernel(-half, half).charge;
    // Free space: R = η/4π·(2/3)·l²
    Complex64::I * (length * length * kernel(0.0, 0.0).current - charges) / (length * length / 1.5)
}

#[test]
fn short_dipoles_have_the_resistance_of_the_reference() {
    let file: Value = serde_json::from_str(REFERENCE).unwrap();
    let number = |value: &Value| value.as_f64().unwrap();
    for case in file["hertzian_dipole"].as_array().unwrap() {
        let soil = Soil {
            relative_permittivity: number(&case["eps_r"]),
            conductivity_s_per_m: number(&case["sigma"]),
        };
        let epsilon = soil.complex_permittivity(1e6 * number(&case["f_mhz"])).unwrap();
        let centre = [0.0, 0.0, number(&case["k0_height"])];
        let slope = std::f64::consts::FRAC_1_SQRT_2;
        let vertical = number(&case["r_ratio_vertical"]);
        let horizontal = number(&case["r_ratio_horizontal"]);
        // A sloping dipole is the mean of both: the cross terms of a dipole with itself cancel.
        for (direction, expected) in [
            ([0.0, 0.0, 1.0], vertical),
            ([0.6, 0.8, 0.0], horizontal),
            ([slope, 0.0, slope], 0.5 * (vertical + horizontal)),
        ] {
            // Errors of a finite length go like its square: extrapolated to none.
            let [long, short] = [0.04, 0.02].map(|part| {
                let length = part * centre[2];
                1.0 + impedance_change(epsilon, centre, direction, length).re
            });
            let got = (4.0 * short - long) / 3.0;
            assert!((got - expected).abs() < 2e-6 * expected, "{direction:?} {case}: {got} for {expected}");
        }
    }
}

proptest! {
    #![proptest_config(ProptestConfig { cases: 64, ..ProptestConfig::default() })]

    #[test]
    fn coupling_is_reciprocal(
        first in prop::array::uniform3(0.1..3.0_f64),
        second in prop::array::uniform3(0.1..3.0_f64),
        directions in prop::array::uniform2(prop::array::uniform3(-1.0..1.0_f64)),
    ) {
        let place = [f64::hypot(first[0] - second[0], first[1] - second[1]), first[2] + second[2]];
        let kernels = exact_kernels(Complex64::new(13.0, -12.0), place[0], place[1]);
        let test = Element { position_m: first, direction: directions[0] };
        let source = Element { position_m: second, direction: directions[1] };
        let (there, back) = (coupling(&test, &source, &kernels), coupling(&source, &test, &kernels));
        prop_assert!((there.current - back.current).norm() <= 1e-14 * kernels.largest());
        prop_assert_eq!(there.charge, back.charge);
    }
}
