//! Speed of the fields: a pattern on a 1° grid, the power through the sphere, a map of near fields.

use std::hint::black_box;

use criterion::{Criterion, criterion_group, criterion_main};
use num_complex::Complex64;
use physics::field::{
    Direction, FarFieldSource, NearFieldSource, radiated_power_w, smoothed, strongest_direction,
};
use physics::wire::{
    Boundary, Conductor, EndCurrents, Material, Metal, PortPlace, Structure, WireModel, WireShape,
};

const FREQUENCY_HZ: f64 = 28.5e6;
const BOUNDARY: Boundary = Boundary::Mirror;

fn solved() -> (WireModel, Vec<EndCurrents>) {
    let copper = Conductor { conductivity_s_per_m: 58e6, relative_permeability: 1.0 };
    let material = Material { metal: Metal::Solid(copper), resistance_factor: 1.0, insulation: None };
    let vertices_m = vec![[-17.32, 0.0, 4.0], [0.0, 0.0, 14.0], [17.32, 0.0, 4.0]];
    let structure = Structure {
        wires: vec![WireShape { vertices_m, radius_m: 1e-3, material }],
        ports: vec![PortPlace { wire: 0, arc_m: 20.0, gap_m: 0.02 }],
        boundary: BOUNDARY,
    };
    let model = WireModel::new(structure, 30e6).expect("a plain inverted V");
    let solution = model.solve(FREQUENCY_HZ).expect("within the mesh's range");
    let currents = model.end_currents(&solution.coefficients_a_per_v, &[Complex64::ONE]);
    (model, currents)
}

fn fields(criterion: &mut Criterion) {
    let (model, currents) = solved();
    let far = || FarFieldSource::new(model.segments(), &currents, BOUNDARY, FREQUENCY_HZ).expect("a mirror");
    criterion.bench_function("far-field source", |bencher| bencher.iter(|| black_box(far())));
    criterion.bench_function("pattern, upper half, 1° grid", |bencher| {
        bencher.iter(|| {
            let source = far();
            let directions = (0..=90).flat_map(|elevation| {
                (0..360).map(move |azimuth| Direction {
                    elevation_deg: f64::from(elevation),
                    azimuth_deg: f64::from(azimuth),
                })
            });
            directions.map(|direction| source.field(direction).intensity_w_per_sr()).sum::<f64>()
        });
    });
    let source = far();
    criterion.bench_function("power through the sphere", |bencher| {
        bencher.iter(|| radiated_power_w(black_box(&source)));
    });
    criterion.bench_function("strongest direction", |bencher| {
        bencher.iter(|| strongest_direction(black_box(&source)));
    });
    let finer = smoothed(model.segments(), &currents, BOUNDARY, FREQUENCY_HZ, 0.25);
    let near =
        NearFieldSource::new(&finer.segments, &finer.currents, BOUNDARY, FREQUENCY_HZ).expect("a mirror");
    criterion.bench_function("near field, map of 100 by 60 points", |bencher| {
        bencher.iter(|| {
            let points = (0..100)
                .flat_map(|x| (0..60).map(move |y| [0.4 * f64::from(x) - 20.0, 0.4 * f64::from(y), 2.0]));
            points.map(|point| near.field(point).e_v_per_m[0].re).sum::<f64>()
        });
    });
}

criterion_group!(benches, fields);
criterion_main!(benches);
