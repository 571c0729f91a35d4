//! Speed of the full solver: making a mesh ready, one solution, and the same by a plain LU.

use std::hint::black_box;

use criterion::{Criterion, criterion_group, criterion_main};
use nalgebra::DMatrix;
use num_complex::Complex64;
use physics::wire::{Boundary, Conductor, Material, Metal, PortPlace, Structure, WireModel, WireShape};

/// Inverted V of 40 m, apex angle 120°, fed in the middle.
fn inverted_v(boundary: Boundary) -> Structure {
    let copper = Conductor { conductivity_s_per_m: 58e6, relative_permeability: 1.0 };
    let material = Material { metal: Metal::Solid(copper), resistance_factor: 1.0, insulation: None };
    let (span_m, drop_m) = (20.0 * 60_f64.to_radians().sin(), 20.0 * 60_f64.to_radians().cos());
    let vertices_m = vec![[-span_m, 0.0, 14.0 - drop_m], [0.0, 0.0, 14.0], [span_m, 0.0, 14.0 - drop_m]];
    Structure {
        wires: vec![WireShape { vertices_m, radius_m: 1e-3, material }],
        ports: vec![PortPlace { wire: 0, arc_m: 20.0, gap_m: 0.02 }],
        boundary,
    }
}

/// Highest frequency whose mesh has 81 unknowns.
fn model_of_81(boundary: Boundary) -> WireModel {
    let mut highest_hz = 30e6;
    loop {
        let model = WireModel::new(inverted_v(boundary), highest_hz).expect("a plain inverted V");
        if model.unknowns() <= 81 {
            return model;
        }
        highest_hz *= 0.995;
    }
}

fn solves(criterion: &mut Criterion) {
    for (name, boundary) in [("free space", Boundary::FreeSpace), ("mirror", Boundary::Mirror)] {
        let model = model_of_81(boundary);
        let frequency_hz = model.highest_hz();
        let unknowns = model.unknowns();
        criterion.bench_function(&format!("one solve, {name}, {unknowns} unknowns"), |bencher| {
            bencher.iter(|| black_box(model.solve(black_box(frequency_hz))));
        });
        let structure = model.structure().clone();
        criterion.bench_function(&format!("mesh, {name}, {unknowns} unknowns"), |bencher| {
            bencher.iter(|| black_box(WireModel::new(black_box(structure.clone()), frequency_hz)));
        });
    }
}

/// The baseline: a plain LU of a full complex matrix of the same order.
fn plain_lu(criterion: &mut Criterion) {
    let n = 81_u32;
    let entry = |row: usize, column: usize| {
        let (low, high) = (row.min(column), row.max(column));
        let x = f64::from(u32::try_from(7 * low + 13 * high).expect("small"));
        Complex64::new(x.sin(), x.cos()) + if row == column { Complex64::from(20.0) } else { Complex64::ZERO }
    };
    let order = n as usize;
    let matrix = DMatrix::from_fn(order, order, entry);
    let drive = DMatrix::from_element(order, 1, Complex64::ONE);
    criterion.bench_function("plain LU, 81 unknowns", |bencher| {
        bencher.iter(|| black_box(matrix.clone().lu().solve(black_box(&drive))));
    });
}

criterion_group!(benches, solves, plain_lu);
criterion_main!(benches);
