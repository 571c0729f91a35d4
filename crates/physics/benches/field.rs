//! Speed of the fields: a pattern on a 1° grid, the powers to the sky and into the earth, a map of near fields.

use std::hint::black_box;

use criterion::{Criterion, criterion_group, criterion_main};
use num_complex::Complex64;
use physics::earth::{HalfSpace, Soil};
use physics::field::{
    FarFieldSource, NearFieldOverSoil, NearFieldSource, Region, earth_power_w, radiated_power_w, smoothed,
    strongest_direction,
};
use physics::wire::{
    Boundary, Conductor, EndCurrents, Material, Metal, PortPlace, Structure, WireModel, WireShape,
};

const FREQUENCY_HZ: f64 = 28.5e6;
const MIRROR: Boundary = Boundary::Mirror;
const SOIL: Boundary = Boundary::Soil(Soil { relative_permittivity: 13.0, conductivity_s_per_m: 5e-3 });

/// Forty metres from end to end through the middle.
fn solved(boundary: Boundary, vertices_m: Vec<[f64; 3]>, frequency_hz: f64) -> (WireModel, Vec<EndCurrents>) {
    let copper = Conductor { conductivity_s_per_m: 58e6, relative_permeability: 1.0 };
    let material = Material { metal: Metal::Solid(copper), resistance_factor: 1.0, insulation: None };
    let structure = Structure {
        wires: vec![WireShape { vertices_m, radius_m: 1e-3, material }],
        ports: vec![PortPlace { wire: 0, arc_m: 20.0, gap_m: 0.02 }],
        boundary,
    };
    let model = WireModel::new(structure, 30e6).expect("a plain wire");
    let solution = model.solve(frequency_hz).expect("within the mesh's range");
    let currents = model.end_currents(&solution.coefficients_a_per_v, &[Complex64::ONE]);
    (model, currents)
}

fn inverted_v() -> Vec<[f64; 3]> {
    vec![[-17.32, 0.0, 4.0], [0.0, 0.0, 14.0], [17.32, 0.0, 4.0]]
}

fn level(height_m: f64) -> Vec<[f64; 3]> {
    vec![[-20.0, 0.0, height_m], [20.0, 0.0, height_m]]
}

fn far_fields(criterion: &mut Criterion) {
    for (name, boundary) in [("mirror", MIRROR), ("soil", SOIL)] {
        let (model, currents) = solved(boundary, inverted_v(), FREQUENCY_HZ);
        let far = || FarFieldSource::new(model.segments(), &currents, boundary, FREQUENCY_HZ);
        let mut group = criterion.benchmark_group(name);
        group.bench_function("far-field source", |bencher| bencher.iter(|| black_box(far())));
        group.bench_function("pattern, upper half, 1° grid", |bencher| {
            bencher.iter(|| {
                let source = far();
                let rings = (0..=90).map(|elevation| source.ring(f64::from(elevation)));
                let around = |ring: physics::field::Ring| {
                    (0..360).map(|azimuth| ring.field(f64::from(azimuth)).intensity_w_per_sr()).sum::<f64>()
                };
                rings.map(around).sum::<f64>()
            });
        });
        let source = far();
        group.bench_function("power to the sky", |bencher| {
            bencher.iter(|| radiated_power_w(black_box(&source)));
        });
        group.bench_function("strongest direction", |bencher| {
            bencher.iter(|| strongest_direction(black_box(&source)));
        });
    }
}

fn earth(criterion: &mut Criterion) {
    let mut group = criterion.benchmark_group("power into the soil");
    for (band, frequency_hz) in [("80 m", 3.6e6), ("40 m", 7.1e6), ("10 m", FREQUENCY_HZ)] {
        let wavelength_m = 299.792_458e6 / frequency_hz;
        let mut job = |name: String, vertices_m| {
            // The currents' shape does not matter here: those of no earth serve.
            let (model, currents) = solved(Boundary::FreeSpace, vertices_m, frequency_hz);
            let source = FarFieldSource::new(model.segments(), &currents, SOIL, frequency_hz);
            group.bench_function(name, |bencher| bencher.iter(|| earth_power_w(black_box(&source))));
        };
        job(format!("{band}, inverted V, ends at 4 m"), inverted_v());
        for waves in [0.005, 0.05, 0.3, 1.0] {
            job(format!("{band}, level, {waves} λ"), level(waves * wavelength_m));
        }
    }
}

fn near_fields(criterion: &mut Criterion) {
    let (model, currents) = solved(MIRROR, inverted_v(), FREQUENCY_HZ);
    let finer = smoothed(model.segments(), &currents, MIRROR, FREQUENCY_HZ, 0.25);
    let near =
        NearFieldSource::new(&finer.segments, &finer.currents, MIRROR, FREQUENCY_HZ).expect("a mirror");
    criterion.bench_function("near field, map of 100 by 60 points", |bencher| {
        bencher.iter(|| {
            let points = (0..100)
                .flat_map(|x| (0..60).map(move |y| [0.4 * f64::from(x) - 20.0, 0.4 * f64::from(y), 2.0]));
            points.map(|point| near.field(point).e_v_per_m[0].re).sum::<f64>()
        });
    });
    near_fields_over_soil(criterion);
}

fn near_fields_over_soil(criterion: &mut Criterion) {
    let soil = Soil { relative_permittivity: 13.0, conductivity_s_per_m: 5e-3 };
    let (model, currents) = solved(SOIL, inverted_v(), FREQUENCY_HZ);
    let finer = smoothed(model.segments(), &currents, SOIL, FREQUENCY_HZ, 0.25);
    let region = Region { low_m: [-20.0, 0.0, 2.0], high_m: [20.0, 24.0, 2.0] };
    let reach = region.reach(&finer.segments);
    let earth = HalfSpace::for_wires(&soil, FREQUENCY_HZ, &reach).expect("a soil");
    let mut group = criterion.benchmark_group("near field above soil");
    group.bench_function("an earth for a region", |bencher| {
        bencher.iter(|| HalfSpace::for_wires(&soil, FREQUENCY_HZ, black_box(&reach)));
    });
    group.bench_function("a source", |bencher| {
        bencher.iter(|| black_box(NearFieldOverSoil::new(&finer.segments, &finer.currents, &earth)));
    });
    let near = NearFieldOverSoil::new(&finer.segments, &finer.currents, &earth);
    group.bench_function("a point", |bencher| bencher.iter(|| near.field(black_box([3.0, 7.0, 2.0]))));
    let wires = NearFieldSource::new(&finer.segments, &finer.currents, Boundary::FreeSpace, FREQUENCY_HZ)
        .expect("free space");
    group.bench_function("the wires' own part of it", |bencher| {
        bencher.iter(|| wires.field(black_box([3.0, 7.0, 2.0])));
    });
    group.finish();
}

criterion_group!(benches, far_fields, earth, near_fields);
criterion_main!(benches);
