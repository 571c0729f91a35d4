//! The full solver against the reference cases without earth and over the mirror.

use num_complex::Complex64;
use physics::wire::{Boundary, Conductor, Material, Metal, PortPlace, Structure, WireModel, WireShape};
use serde_json::Value;

fn number(value: &Value) -> f64 {
    value.as_f64().unwrap()
}

fn conductor(sigma: &Value, mu: &Value) -> Conductor {
    Conductor { conductivity_s_per_m: number(sigma), relative_permeability: number(mu) }
}

fn structure(case: &Value) -> Structure {
    let wires: Vec<WireShape> = case["wires"]
        .as_array()
        .unwrap()
        .iter()
        .map(|wire| {
            let c = &wire["conductor"];
            let metal = match c["type"].as_str().unwrap() {
                "pec" => Metal::Perfect,
                "solid" => Metal::Solid(conductor(&c["sigma_S_per_m"], &c["mu_r"])),
                _ => Metal::Clad {
                    core: conductor(&c["core_sigma_S_per_m"], &c["core_mu_r"]),
                    cladding: conductor(&c["clad_sigma_S_per_m"], &c["clad_mu_r"]),
                    thickness_m: number(&c["clad_thickness_m"]),
                },
            };
            WireShape {
                vertices_m: wire["vertices_m"]
                    .as_array()
                    .unwrap()
                    .iter()
                    .map(|v| std::array::from_fn(|axis| number(&v[axis])))
                    .collect(),
                radius_m: number(&wire["radius_m"]),
                material: Material { metal, resistance_factor: 1.0, insulation: None },
            }
        })
        .collect();
    let length = |wire: usize| -> f64 {
        wires[wire]
            .vertices_m
            .windows(2)
            .map(|p| (0..3).map(|i| (p[1][i] - p[0][i]).powi(2)).sum::<f64>().sqrt())
            .sum()
    };
    let mut ports = vec![];
    let mut add = |place: &Value, gap_m: f64| {
        let wire = usize::try_from(place["wire"].as_u64().unwrap()).unwrap();
        ports.push(PortPlace { wire, arc_m: number(&place["arc_fraction"]) * length(wire), gap_m });
    };
    add(&case["feed"], number(&case["feed"]["gap_m"]));
    for load in case["loads"].as_array().unwrap() {
        add(load, 0.02);
    }
    let boundary = match case["earth"]["kind"].as_str().unwrap() {
        "mirror" => Boundary::Mirror,
        _ => Boundary::FreeSpace,
    };
    Structure { wires, ports, boundary }
}

fn feed_admittance(y: &nalgebra::DMatrix<Complex64>, loads: &[Value]) -> Complex64 {
    // (1 + Y·Z)·… with one load at most
    match loads {
        [] => y[(0, 0)],
        [load] => {
            let z = Complex64::new(number(&load["R_ohm"]), number(&load["X_ohm"]));
            y[(0, 0)] - y[(0, 1)] * y[(1, 0)] * z / (1.0 + z * y[(1, 1)])
        }
        _ => panic!("more loads than expected"),
    }
}

#[test]
fn reference_cases_stay_inside_their_bars() {
    let text = std::fs::read_to_string(
        std::env::var("CASES").unwrap_or("../../tests/data/reference/freespace.json".into()),
    )
    .unwrap();
    let file: Value = serde_json::from_str(&text).unwrap();
    for case in file["cases"].as_array().unwrap() {
        let id = case["id"].as_str().unwrap();
        let f = number(&case["frequency_hz"]);
        let model = WireModel::new(structure(case), f).unwrap();
        let solution = model.solve(f).unwrap();
        let y = feed_admittance(&solution.port_admittance_s, case["loads"].as_array().unwrap());
        let reference =
            Complex64::new(number(&case["reference"]["r_ohm"]), number(&case["reference"]["x_ohm"]));
        let y_ref = reference.inv();
        let d = y - y_ref;
        let c_most = std::f64::consts::TAU * f * 0.25e-12;
        let c = d.im.clamp(-c_most, c_most);
        let core = (d - Complex64::new(0.0, c)).norm() / y_ref.norm();
        let z = y.inv();
        println!(
            "{id} n={:3} core {:7.4}% dG {:7.4}% raw {:7.4}% C {:7.4} pF  Z {:.3} for {:.3}",
            model.unknowns(),
            100.0 * core,
            100.0 * (y.re / y_ref.re - 1.0),
            100.0 * d.norm() / y_ref.norm(),
            c / (std::f64::consts::TAU * f) * 1e12,
            z,
            reference
        );
    }
}
