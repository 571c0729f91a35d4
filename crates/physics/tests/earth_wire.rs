//! The full solver over soil against the reference cases.

use std::f64::consts::TAU;

use num_complex::Complex64;
use physics::constants::wave_number_rad_per_m;
use physics::earth::dyad::coupling;
use physics::earth::{Soil, exact_kernels};
use physics::wire::{
    Boundary, Element, Kernel, Material, PortPlace, Reflection, Structure, WireModel, WireShape,
};
use serde_json::Value;

/// Why a field of the case file must be there.
const LAYOUT: &str = "the layout that the file's conventions explain";

fn number(value: &Value) -> f64 {
    value.as_f64().expect(LAYOUT)
}

/// The earth by its exact integrals.
struct Exact {
    epsilon: Complex64,
    k: f64,
}

impl Reflection for Exact {
    fn kernels(&self, test: &Element, sources: &[Element], kernels: &mut [Kernel]) {
        for (source, kernel) in sources.iter().zip(kernels) {
            let rho =
                (test.position_m[0] - source.position_m[0]).hypot(test.position_m[1] - source.position_m[1]);
            let zeta = test.position_m[2] + source.position_m[2];
            let ground = exact_kernels(self.epsilon, self.k * rho, self.k * zeta) * self.k;
            *kernel = coupling(test, source, &ground);
        }
    }
}

#[test]
fn reference_cases_with_exact_kernels() {
    let path = concat!(env!("CARGO_MANIFEST_DIR"), "/../../tests/data/reference/earth.json");
    let file: Value = serde_json::from_str(&std::fs::read_to_string(path).unwrap()).unwrap();
    for case in file["cases"].as_array().unwrap() {
        let begin = std::time::Instant::now();
        let id = case["id"].as_str().unwrap();
        let frequency_hz = number(&case["frequency_hz"]);
        let wires: Vec<WireShape> = case["wires"]
            .as_array()
            .unwrap()
            .iter()
            .map(|wire| WireShape {
                vertices_m: wire["vertices_m"]
                    .as_array()
                    .unwrap()
                    .iter()
                    .map(|v| std::array::from_fn(|axis| number(&v[axis])))
                    .collect(),
                radius_m: number(&wire["radius_m"]),
                material: Material::PERFECT,
            })
            .collect();
        let length: f64 = wires[0]
            .vertices_m
            .windows(2)
            .map(|p| (0..3).map(|i| (p[1][i] - p[0][i]).powi(2)).sum::<f64>().sqrt())
            .sum();
        let ports = vec![PortPlace {
            wire: 0,
            arc_m: number(&case["feed"]["arc_fraction"]) * length,
            gap_m: number(&case["feed"]["gap_m"]),
        }];
        let soil = Soil {
            relative_permittivity: number(&case["earth"]["relative_permittivity"]),
            conductivity_s_per_m: number(&case["earth"]["conductivity_s_per_m"]),
        };
        let structure = |boundary| Structure { wires: wires.clone(), ports: ports.clone(), boundary };
        let below = Boundary::Soil(soil);
        let exact = Exact {
            epsilon: soil.complex_permittivity(frequency_hz).unwrap(),
            k: wave_number_rad_per_m(frequency_hz),
        };
        let model = WireModel::new(structure(below), frequency_hz).unwrap();
        let y_exact = model.solve_over(frequency_hz, &exact).unwrap().port_admittance_s[(0, 0)];
        let y = model.solve(frequency_hz).unwrap().port_admittance_s[(0, 0)];
        let fast = (y - y_exact).norm() / y_exact.norm();
        let z_free = WireModel::new(structure(Boundary::FreeSpace), frequency_hz)
            .unwrap()
            .solve(frequency_hz)
            .unwrap()
            .port_admittance_s[(0, 0)]
            .inv();
        let reference = &case["reference"];
        let z_ref = Complex64::new(number(&reference["r_ohm"]), number(&reference["x_ohm"]));
        let free_ref =
            Complex64::new(number(&reference["free_space_r_ohm"]), number(&reference["free_space_x_ohm"]));
        let y_ref = z_ref.inv();
        let farad = ((y - y_ref).im / (TAU * frequency_hz)).clamp(-0.25e-12, 0.25e-12);
        let core = (y - y_ref - Complex64::new(0.0, TAU * frequency_hz * farad)).norm() / y_ref.norm();
        let change = ((y.inv() - z_free) - (z_ref - free_ref)).norm() / z_ref.norm();
        println!(
            "{id}: core {:.3} %, dG {:.3} %, change {:.3} %, {:.2} of {:.2}, {} unknowns, {:.1} s",
            100.0 * core,
            100.0 * (y.re / y_ref.re - 1.0),
            100.0 * change,
            y.inv(),
            z_ref,
            model.unknowns(),
            begin.elapsed().as_secs_f64()
        );
    }
}
