//! What the full solver refuses: one clear sentence each.

use physics::wire::{Boundary, Material, Metal, PortPlace, Structure, WireError, WireModel, WireShape};

fn wire(vertices_m: &[[f64; 3]], radius_m: f64) -> WireShape {
    WireShape { vertices_m: vertices_m.to_vec(), radius_m, material: Material::PERFECT }
}

fn structure(wires: Vec<WireShape>) -> Structure {
    Structure {
        wires,
        ports: vec![PortPlace { wire: 0, arc_m: 4.0, gap_m: 0.02 }],
        boundary: Boundary::FreeSpace,
    }
}

fn straight() -> Structure {
    structure(vec![wire(&[[0.0, 0.0, 10.0], [10.0, 0.0, 10.0]], 1e-3)])
}

fn refusal(structure: Structure) -> WireError {
    WireModel::new(structure, 14e6).expect_err("must be refused")
}

fn says(structure: Structure, words: &str) {
    let sentence = refusal(structure).to_string();
    assert!(sentence.contains(words), "{sentence}");
}

#[test]
fn plain_wire_is_taken() {
    assert!(WireModel::new(straight(), 14e6).is_ok());
}

#[test]
fn wires_that_cross_or_touch_without_a_joint() {
    let across = wire(&[[5.0, -3.0, 10.0], [5.0, 3.0, 10.0]], 1e-3);
    says(
        structure(vec![straight().wires[0].clone(), across]),
        "wires 1 and 2 cross or touch without being joined",
    );
    let ends_on = wire(&[[5.0, 0.0, 10.0005], [5.0, 3.0, 10.0]], 1e-3);
    assert!(matches!(
        refusal(structure(vec![straight().wires[0].clone(), ends_on])),
        WireError::TouchWithoutJoint { wires: [0, 1], .. }
    ));
    // A wire that crosses itself.
    let knot = wire(&[[0.0, 0.0, 0.0], [10.0, 0.0, 0.0], [10.0, 5.0, 0.0], [5.0, -5.0, 0.0]], 1e-3);
    assert!(matches!(refusal(structure(vec![knot])), WireError::TouchWithoutJoint { wires: [0, 0], .. }));
    // Joined there, it is taken.
    let joined = wire(&[[5.0, 0.0, 10.0], [5.0, 3.0, 10.0]], 1e-3);
    let with_vertex = wire(&[[0.0, 0.0, 10.0], [5.0, 0.0, 10.0], [10.0, 0.0, 10.0]], 1e-3);
    assert!(WireModel::new(structure(vec![with_vertex, joined]), 14e6).is_ok());
}

#[test]
fn wire_folded_back_on_itself() {
    let folded = wire(&[[0.0; 3], [10.0, 0.0, 0.0], [0.0, 0.0, 0.2]], 1e-3);
    assert!(matches!(refusal(structure(vec![folded])), WireError::FoldedBack { wires: [0, 0], .. }));
}

#[test]
fn stretch_of_zero_length() {
    says(
        structure(vec![wire(&[[0.0; 3], [5.0, 0.0, 0.0], [5.0, 0.0, 0.0], [9.0, 0.0, 0.0]], 1e-3)]),
        "wire 1 has zero length from vertex 2",
    );
    assert!(matches!(refusal(structure(vec![wire(&[[0.0; 3]], 1e-3)])), WireError::TooFewVertices { .. }));
}

#[test]
fn wire_through_the_mirror() {
    let over = |vertices_m: &[[f64; 3]]| Structure {
        boundary: Boundary::Mirror,
        ..structure(vec![wire(vertices_m, 1e-3)])
    };
    says(over(&[[0.0, 0.0, 5.0], [10.0, 0.0, -1.0]]), "wire 1 goes into the earth");
    assert!(matches!(
        refusal(over(&[[0.0, 0.0, 5.0], [0.0, 0.0, 0.0], [8.0, 0.0, 0.0]])),
        WireError::ThroughMirror { .. }
    ));
    // An end on the mirror is connected to it.
    assert!(WireModel::new(over(&[[0.0, 0.0, 0.0], [0.0, 0.0, 8.0]]), 14e6).is_ok());
}

#[test]
fn radius_too_thick() {
    says(
        structure(vec![wire(&[[0.0; 3], [9.0, 0.0, 0.0], [9.0, 0.1, 0.0]], 0.04)]),
        "wire 1 is too thick for its stretch from vertex 2",
    );
    says(structure(vec![wire(&[[0.0; 3], [90.0, 0.0, 0.0]], 0.3)]), "wire 1 is too thick for 14000000 Hz");
}

#[test]
fn feed_on_an_open_end() {
    for arc_m in [0.0, 0.005, 9.995, 10.0, 12.0] {
        let mut structure = straight();
        structure.ports[0].arc_m = arc_m;
        says(structure, "port 1 is on an open end of wire 1");
    }
}

#[test]
fn nothing_to_feed() {
    says(Structure { ports: vec![], ..straight() }, "nothing to feed");
    says(Structure { wires: vec![], ..straight() }, "nothing to feed");
    let mut structure = straight();
    structure.ports[0].wire = 3;
    says(structure, "port 1 names wire 4, but there are 1");
}

#[test]
fn ports_on_top_of_each_other() {
    let mut structure = straight();
    structure.ports.push(PortPlace { wire: 0, arc_m: 4.01, gap_m: 0.02 });
    says(structure, "ports 1 and 2 overlap");
}

#[test]
fn figures_that_are_none() {
    for value in [f64::NAN, f64::INFINITY, -1.0, 0.0] {
        let mut structure = straight();
        structure.wires[0].radius_m = value;
        assert!(matches!(refusal(structure), WireError::OutOfRange { .. }), "radius {value}");
        let mut structure = straight();
        structure.ports[0].gap_m = value;
        assert!(matches!(refusal(structure), WireError::OutOfRange { .. }), "gap {value}");
    }
    let mut structure = straight();
    structure.wires[0].vertices_m[1][2] = f64::NAN;
    assert!(matches!(refusal(structure), WireError::OutOfRange { .. }));
    let mut structure = straight();
    structure.ports[0].arc_m = f64::NAN;
    assert!(matches!(refusal(structure), WireError::OutOfRange { .. }));
    let metal = physics::wire::Conductor { conductivity_s_per_m: 0.0, relative_permeability: 1.0 };
    let mut structure = straight();
    structure.wires[0].material.metal = Metal::Solid(metal);
    assert!(matches!(refusal(structure), WireError::OutOfRange { .. }));
}

#[test]
fn frequency_above_the_mesh() {
    let model = WireModel::new(straight(), 14e6).unwrap();
    assert!(matches!(model.solve(15e6), Err(WireError::FrequencyOutOfRange { .. })));
    assert!(matches!(model.solve(f64::NAN), Err(WireError::FrequencyOutOfRange { .. })));
    assert!(model.solve(14e6).is_ok());
    assert!(WireModel::new(straight(), f64::NAN).is_err());
}
