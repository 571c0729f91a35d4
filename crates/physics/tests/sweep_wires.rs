//! The sweep of the full solver against its direct solution at every frequency.

use nalgebra::DMatrix;
use num_complex::Complex64;
use physics::constants::{COPPER_CONDUCTIVITY_S_PER_M, SPEED_OF_LIGHT_M_PER_S};
use physics::sweep::{Sample, Sweep, SweepRange};
use physics::wire::{
    Boundary, Conductor, Material, Metal, PortPlace, Solution, Structure, WireModel, WireShape,
};

fn copper(vertices_m: &[[f64; 3]]) -> WireShape {
    let metal = Metal::Solid(Conductor {
        conductivity_s_per_m: COPPER_CONDUCTIVITY_S_PER_M,
        relative_permeability: 1.0,
    });
    let material = Material { metal, resistance_factor: 1.0, insulation: None };
    WireShape { vertices_m: vertices_m.to_vec(), radius_m: 1e-3, material }
}

fn port(wire: usize, arc_m: f64) -> PortPlace {
    PortPlace { wire, arc_m, gap_m: 0.02 }
}

/// Inverted V of 40 m.
const INVERTED_V: [[f64; 3]; 3] = [[-17.55, 0.0, 2.41], [0.0, 0.0, 12.0], [17.55, 0.0, 2.41]];

fn length_m(structure: &Structure) -> f64 {
    let of = |wire: &WireShape| -> f64 {
        let sides = wire.vertices_m.windows(2);
        sides.map(|side| (0..3).map(|i| (side[1][i] - side[0][i]).powi(2)).sum::<f64>().sqrt()).sum()
    };
    structure.wires.iter().map(of).sum()
}

fn largest(matrix: &DMatrix<Complex64>) -> f64 {
    matrix.iter().map(|value| value.norm()).fold(0.0, f64::max)
}

/// Sweeps to `tolerance`; then compares with the direct solution at `count` frequencies: (solutions, estimate, worst
/// error of any admittance, worst error of any current against the largest of its drive).
fn compare(structure: Structure, highest_hz: f64, tolerance: f64, count: usize) -> (usize, f64, f64, f64) {
    let half_waves = 2.0 * length_m(&structure) * highest_hz / SPEED_OF_LIGHT_M_PER_S;
    let model = WireModel::new(structure, highest_hz).expect("a sound structure");
    let range = SweepRange { lowest_hz: 1.8e6, highest_hz, half_waves, tolerance };
    let mut sweep = Sweep::new(&range).expect("a sound range");
    while !sweep.wanted_hz().is_empty() {
        let samples: Vec<Sample> =
            sweep.wanted_hz().into_iter().map(|f| model.solve(f).expect("within the mesh").into()).collect();
        sweep.give(samples).expect("wanted samples");
    }
    let fit = sweep.into_fit();
    let step_hz = (highest_hz - range.lowest_hz) / (count as f64 - 1.0);
    let frequencies_hz: Vec<f64> =
        (0..count).map(|index| (range.lowest_hz + step_hz * index as f64).min(highest_hz)).collect();
    let table = fit.admittances(&frequencies_hz).expect("within the range");
    let (mut worst_y, mut worst_i) = (0.0_f64, 0.0_f64);
    for (index, &frequency_hz) in frequencies_hz.iter().enumerate() {
        let Solution { port_admittance_s, coefficients_a_per_v, .. } =
            model.solve(frequency_hz).expect("within the mesh");
        let apart = table.matrix_s(index) - &port_admittance_s;
        for row in 0..apart.nrows() {
            for column in 0..apart.ncols() {
                let own = |port: usize| port_admittance_s[(port, port)].norm();
                worst_y = worst_y.max(apart[(row, column)].norm() / (own(row) * own(column)).sqrt());
            }
        }
        let apart =
            fit.sample(frequency_hz).expect("within the range").currents_a_per_v - &coefficients_a_per_v;
        worst_i = worst_i.max(largest(&apart) / largest(&coefficients_a_per_v));
    }
    (fit.solutions().iter().sum(), fit.error(), worst_y, worst_i)
}

#[test]
fn sweeps_equal_direct_solutions() {
    let v = || vec![copper(&INVERTED_V)];
    let level = |from: f64, to: f64, y: f64, z: f64| copper(&[[from, y, z], [to, y, z]]);
    let cases = [
        ("inverted V, centre", v(), vec![port(0, 20.0)], Boundary::FreeSpace, 30e6, 1e-3, 1000, 20),
        ("inverted V, a third", v(), vec![port(0, 13.3)], Boundary::FreeSpace, 30e6, 1e-3, 1000, 20),
        ("the same, 1e-5", v(), vec![port(0, 13.3)], Boundary::FreeSpace, 30e6, 1e-5, 300, 26),
        ("over the mirror, to 54 MHz", v(), vec![port(0, 13.3)], Boundary::Mirror, 54e6, 1e-3, 300, 42),
        (
            "two ports, 10 m up",
            vec![level(0.0, 40.0, 0.0, 10.0)],
            vec![port(0, 13.3), port(0, 30.0)],
            Boundary::Mirror,
            30e6,
            1e-3,
            300,
            26,
        ),
        (
            "two wires 10 cm apart",
            vec![level(-10.0, 10.0, 0.0, 10.0), level(-9.0, 9.0, 0.1, 10.0)],
            vec![port(0, 8.0)],
            Boundary::FreeSpace,
            30e6,
            1e-3,
            1000,
            22,
        ),
        (
            "four metres",
            vec![level(0.0, 4.0, 0.0, 10.0)],
            vec![port(0, 2.0)],
            Boundary::FreeSpace,
            30e6,
            1e-3,
            300,
            9,
        ),
    ];
    for (name, wires, ports, boundary, highest_hz, tolerance, count, most) in cases {
        let structure = Structure { wires, ports, boundary };
        let (solutions, estimate, worst_y, worst_i) = compare(structure, highest_hz, tolerance, count);
        println!("{name}: {solutions} solutions, estimate {estimate:.1e}, Y {worst_y:.1e}, I {worst_i:.1e}");
        assert!(estimate <= tolerance, "{name}");
        assert!(worst_y <= tolerance && worst_i <= tolerance, "{name}: Y {worst_y:e}, I {worst_i:e}");
        // Needing many more than expected would be a sign of roughness in the solver.
        assert!(solutions <= most, "{name}: {solutions} solutions");
    }
}
