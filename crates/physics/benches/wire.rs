//! Speed of the full solver and its sweep, and ratios to baselines of the same run: absolute times drift with the
//! machine and what else it does.

use std::collections::HashMap;
use std::hint::black_box;
use std::time::Instant;

use criterion::Criterion;
use nalgebra::DMatrix;
use num_complex::Complex64;
use physics::constants::SPEED_OF_LIGHT_M_PER_S;
use physics::earth::{HalfSpace, Soil};
use physics::sweep::{Fit, Sample, Sweep, SweepRange};
use physics::wire::{Boundary, Conductor, Material, Metal, PortPlace, Structure, WireModel, WireShape};

const LOWEST_HZ: f64 = 1.8e6;
const HIGHEST_HZ: f64 = 30e6;
/// Length of the inverted V, m.
const LENGTH_M: f64 = 40.0;
/// Middles of ten bands of the spectrum from 1.8 to 30 MHz, Hz.
const BANDS_HZ: [f64; 10] = [1.9e6, 3.65e6, 5.36e6, 7.1e6, 10.12e6, 14.2e6, 18.1e6, 21.2e6, 24.9e6, 28.5e6];

/// Inverted V of 40 m, apex angle 120°, fed in the middle.
fn inverted_v(boundary: Boundary) -> Structure {
    let copper = Conductor { conductivity_s_per_m: 58e6, relative_permeability: 1.0 };
    let material = Material { metal: Metal::Solid(copper), resistance_factor: 1.0, insulation: None };
    let half_m = 0.5 * LENGTH_M;
    let (span_m, low_m) = (half_m * 60_f64.to_radians().sin(), 14.0 - half_m * 60_f64.to_radians().cos());
    let vertices_m = vec![[-span_m, 0.0, low_m], [0.0, 0.0, 14.0], [span_m, 0.0, low_m]];
    Structure {
        wires: vec![WireShape { vertices_m, radius_m: 1e-3, material }],
        ports: vec![PortPlace { wire: 0, arc_m: half_m, gap_m: 0.02 }],
        boundary,
    }
}

/// The inverted V with a mesh of 81 unknowns.
fn model_of_81(boundary: Boundary) -> WireModel {
    let mut highest_hz = HIGHEST_HZ;
    loop {
        let model = WireModel::new(inverted_v(boundary), highest_hz).expect("a plain inverted V");
        if model.unknowns() <= 81 {
            return model;
        }
        highest_hz *= 0.995;
    }
}

/// The baseline of one solution: a plain LU of a full complex matrix of this order.
fn plain_lu(order: usize) -> impl Fn() -> Option<DMatrix<Complex64>> {
    let entry = move |row: usize, column: usize| {
        let x = f64::from(u32::try_from(7 * row.min(column) + 13 * row.max(column)).expect("small"));
        Complex64::new(x.sin() + if row == column { 20.0 } else { 0.0 }, x.cos())
    };
    let matrix = DMatrix::from_fn(order, order, entry);
    let drive = DMatrix::from_element(order, 1, Complex64::ONE);
    move || matrix.clone().lu().solve(&drive)
}

fn sweep(model: &WireModel) -> Fit {
    let half_waves = 2.0 * LENGTH_M * HIGHEST_HZ / SPEED_OF_LIGHT_M_PER_S;
    let range = SweepRange { lowest_hz: LOWEST_HZ, highest_hz: HIGHEST_HZ, half_waves, tolerance: 1e-3 };
    let mut sweep = Sweep::new(&range).expect("a sound range");
    while !sweep.wanted_hz().is_empty() {
        let solve = |frequency_hz| Sample::from(model.solve(frequency_hz).expect("within the mesh"));
        let samples: Vec<Sample> = sweep.wanted_hz().into_iter().map(solve).collect();
        sweep.give(samples).expect("what it wanted");
    }
    sweep.into_fit()
}

fn thousand_hz() -> Vec<f64> {
    let step_hz = (HIGHEST_HZ - LOWEST_HZ) / 999.0;
    (0..1000_u32).map(|index| (LOWEST_HZ + step_hz * f64::from(index)).min(HIGHEST_HZ)).collect()
}

/// An edit's whole way: mesh, sweep, impedance at 1,000 frequencies, currents on ten bands.
fn edit(boundary: Boundary, frequencies_hz: &[f64]) -> (Vec<Complex64>, usize) {
    let model = WireModel::new(inverted_v(boundary), HIGHEST_HZ).expect("a plain inverted V");
    let fit = sweep(&model);
    let table = fit.admittances(frequencies_hz).expect("within the range");
    let impedances = table.entry_s(0, 0).iter().map(Complex64::inv).collect();
    let currents = BANDS_HZ
        .iter()
        .map(|&frequency_hz| {
            let sample = fit.sample(frequency_hz).expect("within the range");
            model.end_currents(&sample.currents_a_per_v, &[Complex64::ONE]).len()
        })
        .sum();
    (impedances, currents)
}

/// Average soil.
const SOIL: Soil = Soil { relative_permittivity: 13.0, conductivity_s_per_m: 0.005 };

/// Earths made ready, by the bits of the frequency.
type Earths = HashMap<u64, HalfSpace>;

/// The sweep over soil; earths that are missing are made.
fn sweep_over(model: &WireModel, soil: &Soil, earths: &mut Earths) -> Fit {
    let half_waves = 2.0 * LENGTH_M * HIGHEST_HZ / SPEED_OF_LIGHT_M_PER_S;
    let range = SweepRange { lowest_hz: LOWEST_HZ, highest_hz: HIGHEST_HZ, half_waves, tolerance: 1e-3 };
    let reach = model.reach().expect("over soil");
    let mut sweep = Sweep::new(&range).expect("a sound range");
    while !sweep.wanted_hz().is_empty() {
        let solve = |frequency_hz: f64| {
            let earth = earths
                .entry(frequency_hz.to_bits())
                .or_insert_with(|| HalfSpace::for_wires(soil, frequency_hz, &reach).expect("a soil"));
            Sample::from(model.solve_over(frequency_hz, earth).expect("within the mesh"))
        };
        let samples: Vec<Sample> = sweep.wanted_hz().into_iter().map(solve).collect();
        sweep.give(samples).expect("what it wanted");
    }
    sweep.into_fit()
}

/// An edit's whole way over soil, with the earths kept or made anew.
fn edit_over(soil: &Soil, earths: &mut Earths, frequencies_hz: &[f64]) -> (Vec<Complex64>, usize) {
    let model = WireModel::new(inverted_v(Boundary::Soil(*soil)), HIGHEST_HZ).expect("a plain inverted V");
    let fit = sweep_over(&model, soil, earths);
    let table = fit.admittances(frequencies_hz).expect("within the range");
    let impedances = table.entry_s(0, 0).iter().map(Complex64::inv).collect();
    let currents = BANDS_HZ
        .iter()
        .map(|&frequency_hz| {
            let sample = fit.sample(frequency_hz).expect("within the range");
            model.end_currents(&sample.currents_a_per_v, &[Complex64::ONE]).len()
        })
        .sum();
    (impedances, currents)
}

fn measure_over_soil(criterion: &mut Criterion) {
    let frequencies_hz = thousand_hz();
    let model = model_of_81(Boundary::Soil(SOIL));
    let highest_hz = model.highest_hz();
    let earth = HalfSpace::for_wires(&SOIL, highest_hz, &model.reach().expect("over soil")).expect("a soil");
    criterion.bench_function("one solution, soil kept, 81 unknowns", |bencher| {
        bencher.iter(|| black_box(model.solve_over(black_box(highest_hz), &earth)));
    });
    let mut kept = Earths::new();
    criterion.bench_function("edit to 1,000 frequencies and ten bands, soil kept", |bencher| {
        bencher.iter(|| black_box(edit_over(&SOIL, &mut kept, black_box(&frequencies_hz))));
    });
    criterion.bench_function("change of soil to 1,000 frequencies and ten bands", |bencher| {
        bencher.iter(|| black_box(edit_over(&SOIL, &mut Earths::new(), black_box(&frequencies_hz))));
    });
}

fn print_soil_ratios() {
    let frequencies_hz = thousand_hz();
    let free_us = shortest_us(50, || edit(Boundary::FreeSpace, &frequencies_hz));
    let mut kept = Earths::new();
    let (again, _) = edit_over(&SOIL, &mut kept, &frequencies_hz);
    let kept = std::cell::RefCell::new(kept);
    let edit_us = shortest_us(50, || edit_over(&SOIL, &mut kept.borrow_mut(), &frequencies_hz));
    let anew_us = shortest_us(20, || edit_over(&SOIL, &mut Earths::new(), &frequencies_hz));
    println!(
        "soil: edit to 1,000 frequencies and ten bands {edit_us:.0} µs, {:.2} of free space; everything of the earth made anew {anew_us:.0} µs, {:.1} of it",
        edit_us / free_us,
        anew_us / free_us
    );
    // How far the fit is from direct solutions over soil: the bar is 1e-3.
    let model = WireModel::new(inverted_v(Boundary::Soil(SOIL)), HIGHEST_HZ).expect("a plain inverted V");
    let worst = (0..frequencies_hz.len()).step_by(37).map(|index| {
        let direct = model.solve(frequencies_hz[index]).expect("within the mesh").port_admittance_s[(0, 0)];
        (again[index].inv() - direct).norm() / direct.norm()
    });
    println!("soil: error of the fit {:.1e}", worst.fold(0.0, f64::max));
}

/// Shortest time of several runs, µs: what the work takes when nothing else disturbs it.
fn shortest_us<T>(runs: usize, work: impl Fn() -> T) -> f64 {
    let time = |_| {
        let start = Instant::now();
        black_box(work());
        start.elapsed().as_secs_f64() * 1e6
    };
    (0..runs).map(time).fold(f64::INFINITY, f64::min)
}

fn measure(criterion: &mut Criterion) {
    let frequencies_hz = thousand_hz();
    let lu = plain_lu(81);
    criterion.bench_function("plain LU, 81 unknowns", |bencher| bencher.iter(|| black_box(lu())));
    for (name, boundary) in [("free space", Boundary::FreeSpace), ("mirror", Boundary::Mirror)] {
        let model = model_of_81(boundary);
        let highest_hz = model.highest_hz();
        criterion.bench_function(
            &format!("one solution, {name}, {} unknowns", model.unknowns()),
            |bencher| {
                bencher.iter(|| black_box(model.solve(black_box(highest_hz))));
            },
        );
        criterion.bench_function(&format!("mesh, {name}"), |bencher| {
            bencher.iter(|| black_box(WireModel::new(black_box(inverted_v(boundary)), HIGHEST_HZ)));
        });
        criterion.bench_function(&format!("edit to 1,000 frequencies and ten bands, {name}"), |bencher| {
            bencher.iter(|| black_box(edit(boundary, black_box(&frequencies_hz))));
        });
    }
}

fn print_ratios() {
    let frequencies_hz = thousand_hz();
    let lu_us = shortest_us(300, plain_lu(81));
    println!("\nratios (shortest of several runs)");
    println!("plain LU, 81 unknowns: {lu_us:.0} µs");
    for (name, boundary) in [("free space", Boundary::FreeSpace), ("mirror", Boundary::Mirror)] {
        let model = model_of_81(boundary);
        let solve_us = shortest_us(500, || model.solve(model.highest_hz()));
        println!(
            "{name}: one solution of 81 unknowns {solve_us:.0} µs, {:.2} of the LU alone",
            solve_us / lu_us
        );
        let model = WireModel::new(inverted_v(boundary), HIGHEST_HZ).expect("a plain inverted V");
        let solve_us = shortest_us(500, || model.solve(HIGHEST_HZ));
        let edit_us = shortest_us(100, || edit(boundary, &frequencies_hz));
        println!(
            "{name}: edit to 1,000 frequencies and ten bands {edit_us:.0} µs, {:.1} solutions of {} unknowns",
            edit_us / solve_us,
            model.unknowns()
        );
        let dense =
            || frequencies_hz.iter().map(|&frequency_hz| model.solve(frequency_hz)).collect::<Vec<_>>();
        let dense_us = shortest_us(3, dense);
        let sweep_us = shortest_us(100, || sweep(&model).admittances(&frequencies_hz).map(drop));
        println!(
            "{name}: adaptive sweep of {} solutions {sweep_us:.0} µs, {:.0} times as fast as 1,000 solutions",
            sweep(&model).solutions().iter().sum::<usize>(),
            dense_us / sweep_us
        );
    }
}

fn main() {
    let mut criterion = Criterion::default().configure_from_args();
    measure(&mut criterion);
    measure_over_soil(&mut criterion);
    criterion.final_summary();
    print_ratios();
    print_soil_ratios();
}
