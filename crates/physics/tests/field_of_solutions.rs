//! Fields of solved wires: energy balance, the voltage at the gap, and near fields against reference cases.

use num_complex::Complex64;
use physics::constants::{COPPER_CONDUCTIVITY_S_PER_M, VACUUM_PERMEABILITY_H_PER_M, wave_number_rad_per_m};
use physics::earth::{HalfSpace, Soil};
use physics::field::{
    FarFieldSource, NearField, NearFieldOverSoil, NearFieldSource, PotentialSource, Region, radiated_power_w,
    smoothed, surface_field_v_per_m,
};
use physics::wire::{
    Boundary, Conductor, EndCurrents, Material, Metal, PortPlace, Structure, WireModel, WireShape,
};
use proptest::prelude::*;
use serde_json::Value;

/// A structure solved for 1 W at its first port, the others shorted.
struct Solved {
    model: WireModel,
    frequency_hz: f64,
    volt: f64,
    currents: Vec<EndCurrents>,
}

fn solve(structure: Structure, frequency_hz: f64) -> Solved {
    let ports = structure.ports.len();
    let model = WireModel::new(structure, frequency_hz).expect("a sound structure");
    let solution = model.solve(frequency_hz).expect("within the mesh");
    // ½·|V|²·Re Y = 1 W
    let volt = (2.0 / solution.port_admittance_s[(0, 0)].re).sqrt();
    let mut volts = vec![Complex64::ZERO; ports];
    volts[0] = volt.into();
    let currents = model.end_currents(&solution.coefficients_a_per_v, &volts);
    Solved { model, frequency_hz, volt, currents }
}

fn copper(vertices_m: Vec<[f64; 3]>, radius_m: f64) -> WireShape {
    let metal = Metal::Solid(Conductor {
        conductivity_s_per_m: COPPER_CONDUCTIVITY_S_PER_M,
        relative_permeability: 1.0,
    });
    WireShape { vertices_m, radius_m, material: Material { metal, resistance_factor: 1.0, insulation: None } }
}

fn number(value: &Value) -> f64 {
    value.as_f64().expect("the layout of the case file")
}

fn vector(value: &Value) -> [f64; 3] {
    std::array::from_fn(|axis| number(&value[axis]))
}

fn complex_vector(value: &Value) -> [Complex64; 3] {
    std::array::from_fn(|axis| Complex64::new(number(&value[axis][0]), number(&value[axis][1])))
}

/// The structure of a case.
fn structure(case: &Value) -> Structure {
    let earth = &case["earth"];
    let boundary = match earth["kind"].as_str().expect("the layout of the case file") {
        "none" => Boundary::FreeSpace,
        "mirror" => Boundary::Mirror,
        _ => Boundary::Soil(Soil {
            relative_permittivity: number(&earth["relative_permittivity"]),
            conductivity_s_per_m: number(&earth["conductivity_s_per_m"]),
        }),
    };
    let wires: Vec<WireShape> = case["wires"]
        .as_array()
        .expect("the layout of the case file")
        .iter()
        .map(|wire| {
            copper(
                wire["vertices_m"]
                    .as_array()
                    .expect("the layout of the case file")
                    .iter()
                    .map(vector)
                    .collect(),
                number(&wire["radius_m"]),
            )
        })
        .collect();
    assert!(case["loads"].as_array().expect("the layout of the case file").is_empty());
    let feed = &case["feed"];
    let wire = usize::try_from(feed["wire"].as_u64().expect("the layout of the case file"))
        .expect("the layout of the case file");
    let length_m: f64 = wires[wire].vertices_m.windows(2).map(|pair| distance(pair[0], pair[1])).sum();
    let arc_m = number(&feed["arc_fraction"]) * length_m;
    let ports = vec![PortPlace { wire, arc_m, gap_m: number(&feed["gap_m"]) }];
    Structure { wires, ports, boundary }
}

fn distance(a: [f64; 3], b: [f64; 3]) -> f64 {
    (0..3).map(|axis| (a[axis] - b[axis]).powi(2)).sum::<f64>().sqrt()
}

fn norm(vector: &[Complex64; 3]) -> f64 {
    vector.iter().map(Complex64::norm_sqr).sum::<f64>().sqrt()
}

/// Fields at points near a solved structure.
fn near_fields(solved: &Solved, points_m: &[[f64; 3]]) -> Vec<NearField> {
    let Solved { model, frequency_hz, currents, .. } = solved;
    let boundary = model.structure().boundary;
    let finer = smoothed(model.segments(), currents, boundary, *frequency_hz, 0.25);
    let Boundary::Soil(soil) = boundary else {
        let source = NearFieldSource::new(&finer.segments, &finer.currents, boundary, *frequency_hz);
        let source = source.expect("not over soil");
        return points_m.iter().map(|at_m| source.field(*at_m)).collect();
    };
    let corner = |pick: fn(f64, f64) -> f64, from: f64| {
        points_m
            .iter()
            .fold([from; 3], |corner, at_m| std::array::from_fn(|axis| pick(corner[axis], at_m[axis])))
    };
    let region =
        Region { low_m: corner(f64::min, f64::INFINITY), high_m: corner(f64::max, f64::NEG_INFINITY) };
    let earth = HalfSpace::for_wires(&soil, *frequency_hz, &region.reach(&finer.segments)).expect("an earth");
    let source = NearFieldOverSoil::new(&finer.segments, &finer.currents, &earth);
    points_m.iter().map(|at_m| source.field(*at_m)).collect()
}

/// Numerical reference cases of this project's own (another method, see the file): complex E and H within 1.5 % at
/// every point.
#[test]
fn near_fields_are_those_of_the_reference() {
    let text = include_str!("../../../tests/data/reference/near-field.json");
    let file: Value = serde_json::from_str(text).unwrap();
    let mut points = 0;
    for case in file["cases"].as_array().unwrap() {
        let solved = solve(structure(case), number(&case["frequency_hz"]));
        let references = case["reference"]["points"].as_array().unwrap();
        let places_m: Vec<[f64; 3]> = references.iter().map(|point| vector(&point["xyz_m"])).collect();
        let (mut worst_e, mut worst_h) = (0.0_f64, 0.0_f64);
        for (point, found) in references.iter().zip(near_fields(&solved, &places_m)) {
            let apart = |found: [Complex64; 3], reference: [Complex64; 3]| {
                norm(&std::array::from_fn(|axis| found[axis] - reference[axis])) / norm(&reference)
            };
            let (e, h) = (
                apart(found.e_v_per_m, complex_vector(&point["E_V_per_m"])),
                apart(found.h_a_per_m, complex_vector(&point["H_A_per_m"])),
            );
            worst_e = worst_e.max(e);
            worst_h = worst_h.max(h);
            points += 1;
        }
        println!("{} E {:.3} %, H {:.3} %", case["id"], 100.0 * worst_e, 100.0 * worst_h);
        assert!(worst_e < 0.015 && worst_h < 0.015, "{}", case["id"]);
    }
    assert!(points > 100);
}

/// Inverted V, fed anywhere, on any frequency.
fn bent(spread_m: f64, drop_m: f64, feed: f64, boundary: Boundary) -> Structure {
    let vertices_m = vec![[-spread_m, 0.0, 12.0 - drop_m], [0.0, 0.0, 12.0], [spread_m, 0.0, 12.0 - drop_m]];
    let wires = vec![copper(vertices_m, 1e-3)];
    let length_m: f64 = wires[0].vertices_m.windows(2).map(|pair| distance(pair[0], pair[1])).sum();
    Structure { wires, ports: vec![PortPlace { wire: 0, arc_m: feed * length_m, gap_m: 0.02 }], boundary }
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(40))]

    /// What goes in at the feedpoint leaves toward the sky or heats the wire.
    #[test]
    fn energy_balances(
        spread_m in 3.0..20.0_f64, drop_m in 0.0..8.0_f64, feed in 0.15..0.85_f64,
        frequency_hz in 3e6..30e6_f64, mirror: bool,
    ) {
        let boundary = if mirror { Boundary::Mirror } else { Boundary::FreeSpace };
        let solved = solve(bent(spread_m, drop_m, feed, boundary), frequency_hz);
        let source = FarFieldSource::new(solved.model.segments(), &solved.currents, boundary, frequency_hz);
        let sky_w = radiated_power_w(&source);
        let heat_w: f64 = solved.model.wire_loss_w(&solved.currents, frequency_hz).iter().sum();
        prop_assert!((sky_w + heat_w - 1.0).abs() < 3e-3, "{sky_w} W to the sky, {heat_w} W of heat");
    }

    /// The potential, as mean over the segments beside the gap, jumps by the voltage and what the wire in between induces:
    /// E = −∇Φ − jωA is −V/gap in the gap and next to nothing beside it.
    #[test]
    fn potential_jumps_by_the_voltage(
        spread_m in 3.0..20.0_f64, feed in 0.15..0.85_f64, frequency_hz in 3e6..30e6_f64,
    ) {
        // Straight and in free space, so that the vector potential is one plain integral.
        let mut structure = bent(spread_m, 0.0, feed, Boundary::FreeSpace);
        structure.wires[0].vertices_m.remove(1);
        let (wire, gap_m) = (structure.wires[0].clone(), structure.ports[0].gap_m);
        let solved = solve(structure, frequency_hz);
        let segments = solved.model.segments();
        let in_gap = |&segment: &usize| solved.model.port_of_segment()[segment] == Some(0);
        let first = (0..segments.len()).find(in_gap).unwrap();
        let beyond = first + (first..segments.len()).take_while(in_gap).count();
        let (before, after) = (&segments[first - 1], &segments[beyond]);
        let source = PotentialSource::new(segments, &solved.currents, Boundary::FreeSpace, frequency_hz);
        let jump_v = source.mean_potential_v(after, 20) - source.mean_potential_v(before, 20);
        let middle_m = std::array::from_fn(|axis| 0.5 * (segments[first].from_m[axis] + after.from_m[axis]));
        let apart_m = gap_m + 0.5 * (before.length_m() + after.length_m());
        let induced_v = induced_v_per_m(&solved, middle_m, wire.radius_m) * apart_m;
        let expected_v = solved.volt - induced_v;
        prop_assert!((jump_v - expected_v).norm() < 0.01 * solved.volt, "{jump_v} for {expected_v}");
    }
}

/// jωA along a straight wire at its surface, V/m, by brute force.
fn induced_v_per_m(solved: &Solved, at_m: [f64; 3], radius_m: f64) -> Complex64 {
    let (k, steps) = (wave_number_rad_per_m(solved.frequency_hz), 400);
    let mut sum = Complex64::ZERO;
    for (segment, ends) in solved.model.segments().iter().zip(&solved.currents) {
        let step_m = segment.length_m() / f64::from(steps);
        for step in 0..steps {
            let along_m = (f64::from(step) + 0.5) * step_m;
            let place_m: [f64; 3] =
                std::array::from_fn(|axis| segment.from_m[axis] + along_m * segment.direction()[axis]);
            let r = distance(place_m, at_m).hypot(radius_m);
            sum +=
                ends.current_a(segment, solved.frequency_hz, along_m) * Complex64::cis(-k * r) / r * step_m;
        }
    }
    // jωµ₀/4π
    Complex64::new(0.0, 0.5 * solved.frequency_hz * VACUUM_PERMEABILITY_H_PER_M) * sum
}

/// Close to the surface the radial near field is that of the charge.
#[test]
fn surface_field_follows_from_the_charge() {
    let solved = solve(bent(10.0, 0.0, 0.5, Boundary::FreeSpace), 7.05e6);
    let segments = solved.model.segments();
    let source =
        NearFieldSource::new(segments, &solved.currents, Boundary::FreeSpace, solved.frequency_hz).unwrap();
    let index = segments.len() / 5;
    let segment = &segments[index];
    let middle_m = 0.5 * segment.length_m();
    let charge = solved.currents[index].charge_c_per_m(segment, solved.frequency_hz, middle_m);
    let expected = surface_field_v_per_m(charge, segment.radius_m);
    let place: [f64; 3] = std::array::from_fn(|axis| 0.5 * (segment.from_m[axis] + segment.to_m[axis]));
    let e = source.field([place[0], place[1], place[2] + segment.radius_m]).e_v_per_m[2];
    assert!((e - expected).norm() < 2e-3 * expected.norm(), "{e} for {expected}");
}
