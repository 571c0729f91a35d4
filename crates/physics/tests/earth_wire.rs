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

/// A case's structure over what is told to lie below.
fn structure(case: &Value, boundary: Boundary) -> Structure {
    let wires: Vec<WireShape> = case["wires"]
        .as_array()
        .expect(LAYOUT)
        .iter()
        .map(|wire| WireShape {
            vertices_m: wire["vertices_m"]
                .as_array()
                .expect(LAYOUT)
                .iter()
                .map(|vertex| std::array::from_fn(|axis| number(&vertex[axis])))
                .collect(),
            radius_m: number(&wire["radius_m"]),
            material: Material::PERFECT,
        })
        .collect();
    let pairs = wires[0].vertices_m.windows(2);
    let length_m: f64 =
        pairs.map(|p| (0..3).map(|axis| (p[1][axis] - p[0][axis]).powi(2)).sum::<f64>().sqrt()).sum();
    let feed = &case["feed"];
    let ports = vec![PortPlace {
        wire: 0,
        arc_m: number(&feed["arc_fraction"]) * length_m,
        gap_m: number(&feed["gap_m"]),
    }];
    Structure { wires, ports, boundary }
}

/// Source: reference cases of this project's own by an independent method with exact Sommerfeld functions; numerical
/// references, not published values. Level, sloping, bent and upright wires over soils from dry to sea.
#[test]
fn tables_and_integrals_give_the_same_wires_and_both_the_reference() {
    let path = concat!(env!("CARGO_MANIFEST_DIR"), "/../../tests/data/reference/earth.json");
    let file: Value = serde_json::from_str(&std::fs::read_to_string(path).unwrap()).unwrap();
    // Those whose integrals take a moment only.
    for id in ["g04", "g12", "g20", "g24", "g30", "g34", "g40", "g44", "g46", "g48"] {
        let case =
            file["cases"].as_array().expect(LAYOUT).iter().find(|case| case["id"] == id).expect(LAYOUT);
        let frequency_hz = number(&case["frequency_hz"]);
        let soil = Soil {
            relative_permittivity: number(&case["earth"]["relative_permittivity"]),
            conductivity_s_per_m: number(&case["earth"]["conductivity_s_per_m"]),
        };
        let epsilon = soil.complex_permittivity(frequency_hz).unwrap();
        let exact = Exact { epsilon, k: wave_number_rad_per_m(frequency_hz) };
        let model = WireModel::new(structure(case, Boundary::Soil(soil)), frequency_hz).unwrap();
        let by_integrals = model.solve_over(frequency_hz, &exact).unwrap().port_admittance_s[(0, 0)];
        let by_tables = model.solve(frequency_hz).unwrap().port_admittance_s[(0, 0)];
        let apart = (by_tables - by_integrals).norm() / by_integrals.norm();
        let y_ref =
            Complex64::new(number(&case["reference"]["r_ohm"]), number(&case["reference"]["x_ohm"])).inv();
        // The capacitance of the feed gap, up to 0.25 pF, is taken out.
        let off = by_integrals - y_ref;
        let most_s = TAU * frequency_hz * 0.25e-12;
        let core = Complex64::new(off.re, off.im - off.im.clamp(-most_s, most_s)).norm() / y_ref.norm();
        println!(
            "{id}: tables {apart:.1e} from the integrals, these {:.3} % from the reference",
            100.0 * core
        );
        assert!(apart < 2e-4, "{id}: {by_tables} for {by_integrals}");
        assert!(core < 2e-3, "{id}: {by_integrals} for {y_ref}");
    }
}
