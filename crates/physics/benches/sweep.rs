//! Speed of the sweep: a 40 m inverted V over 1.8 to 30 MHz at 1,000 frequencies and currents on 10 bands, against the
//! direct solution of each.

use std::hint::black_box;
use std::time::{Duration, Instant};

use criterion::{Criterion, criterion_group, criterion_main};
use physics::constants::SPEED_OF_LIGHT_M_PER_S;
use physics::sweep::{Fit, Sample, Sweep, SweepRange};
use physics::wire::{Boundary, Conductor, Material, Metal, PortPlace, Structure, WireModel, WireShape};

const LOWEST_HZ: f64 = 1.8e6;
const HIGHEST_HZ: f64 = 30e6;
const BANDS_HZ: [f64; 10] = [1.85e6, 3.65e6, 5.36e6, 7.1e6, 10.12e6, 14.2e6, 18.1e6, 21.2e6, 24.94e6, 28.5e6];

fn inverted_v() -> Structure {
    let copper = Conductor { conductivity_s_per_m: 58e6, relative_permeability: 1.0 };
    let material = Material { metal: Metal::Solid(copper), resistance_factor: 1.0, insulation: None };
    let vertices_m = vec![[-17.32, 0.0, 4.0], [0.0, 0.0, 14.0], [17.32, 0.0, 4.0]];
    Structure {
        wires: vec![WireShape { vertices_m, radius_m: 1e-3, material }],
        ports: vec![PortPlace { wire: 0, arc_m: 13.3, gap_m: 0.02 }],
        boundary: Boundary::FreeSpace,
    }
}

fn range() -> SweepRange {
    let half_waves = 2.0 * 40.0 * HIGHEST_HZ / SPEED_OF_LIGHT_M_PER_S;
    SweepRange { lowest_hz: LOWEST_HZ, highest_hz: HIGHEST_HZ, half_waves, tolerance: 1e-3 }
}

fn frequencies_hz() -> Vec<f64> {
    (0..1000).map(|index| LOWEST_HZ + (HIGHEST_HZ - LOWEST_HZ) * f64::from(index) / 999.0).collect()
}

fn solve(model: &WireModel, frequencies_hz: &[f64]) -> Vec<Sample> {
    let solution = |&frequency_hz: &f64| model.solve(frequency_hz).expect("within the mesh's range").into();
    frequencies_hz.iter().map(solution).collect()
}

fn adaptive(model: &WireModel) -> Fit {
    let mut sweep = Sweep::new(&range()).expect("a sound range");
    while !sweep.wanted_hz().is_empty() {
        sweep.give(solve(model, &sweep.wanted_hz())).expect("wanted samples");
    }
    sweep.into_fit()
}

fn everything(frequencies_hz: &[f64]) {
    let model = WireModel::new(inverted_v(), HIGHEST_HZ).expect("a plain inverted V");
    let fit = adaptive(&model);
    black_box(fit.admittances(frequencies_hz).expect("within the range"));
    for frequency_hz in BANDS_HZ {
        black_box(fit.sample(frequency_hz).expect("within the range"));
    }
}

/// Best of a few runs.
fn best(runs: u32, mut job: impl FnMut()) -> Duration {
    (0..runs)
        .map(|_| {
            let start = Instant::now();
            job();
            start.elapsed()
        })
        .min()
        .unwrap_or_default()
}

fn sweeps(criterion: &mut Criterion) {
    let model = WireModel::new(inverted_v(), HIGHEST_HZ).expect("a plain inverted V");
    let frequencies_hz = frequencies_hz();
    let fit = adaptive(&model);
    let samples = solve(&model, &Sweep::like(&range(), &fit.solutions()).expect("a sound range").wanted_hz());
    criterion.bench_function("edit: mesh, sweep, 1,000 admittances, 10 currents", |bencher| {
        bencher.iter(|| everything(&frequencies_hz));
    });
    criterion.bench_function("fit of one round of samples", |bencher| {
        bencher.iter(|| {
            let mut sweep = Sweep::like(&range(), &fit.solutions()).expect("a sound range");
            sweep.give(black_box(samples.clone())).expect("wanted samples");
            sweep
        });
    });
    criterion.bench_function("1,000 admittances from the fit", |bencher| {
        bencher.iter(|| black_box(fit.admittances(black_box(&frequencies_hz))));
    });
    let dense = best(3, || {
        black_box(solve(&model, &frequencies_hz));
    });
    let swept = best(20, || {
        black_box(adaptive(&model).admittances(&frequencies_hz).expect("within the range"));
    });
    println!(
        "{} unknowns, {:?} solutions, estimated error {:.1e}",
        model.unknowns(),
        fit.solutions(),
        fit.error()
    );
    println!(
        "dense sweep {dense:?}, adaptive sweep {swept:?}: {:.0} times",
        dense.as_secs_f64() / swept.as_secs_f64()
    );
}

criterion_group!(benches, sweeps);
criterion_main!(benches);
