//! The matrix against closed forms: one imposed sinusoid per wire.

use nalgebra::DMatrix;
use num_complex::Complex64;

use super::coupling::{Coupling, Sources};
use super::fill::tests::end_couplings_of_all;
use super::fill::{BEGINNING, END, Terms};
use super::mesh::{Arm, Mesh};
use super::moments::{Axis, skew};
use super::skeleton::End;
use super::structure::{Boundary, PortPlace, Structure, WireShape};
use super::{Material, Segment, WireModel};
use crate::constants::{SPEED_OF_LIGHT_M_PER_S, VACUUM_IMPEDANCE_OHM, wave_number_rad_per_m};
use crate::sinusoid::{CentreFedWire, ParallelWires, mutual_impedance, self_impedance};

const FREQUENCY_HZ: f64 = 10e6;

/// Parallel wires along y, half length, x, y of the centre, z.
fn model(wires: &[(f64, [f64; 3])], radius_m: f64, boundary: Boundary) -> WireModel {
    let shapes = wires.iter().map(|&(half_m, [x, y, z])| WireShape {
        // The sinusoid's crest is a node of the mesh, so that the imposed current is exact.
        vertices_m: vec![[x, y - half_m, z], [x, y, z], [x, y + half_m, z]],
        radius_m,
        material: Material::PERFECT,
    });
    let ports =
        wires.iter().enumerate().map(|(wire, &(half_m, _))| PortPlace { wire, arc_m: half_m, gap_m: 0.01 });
    let structure = Structure { wires: shapes.collect(), ports: ports.collect(), boundary };
    WireModel::new(structure, FREQUENCY_HZ).unwrap()
}

/// Σ xᵤ·Z·yᵥ for I = sin k(l − |s|) on wire `a` and on wire `b`, with the loop current 1 A.
fn impedance(model: &WireModel, wires: &[(f64, [f64; 3])], a: usize, b: usize) -> Complex64 {
    let k = wave_number_rad_per_m(FREQUENCY_HZ);
    let own = vec![[Complex64::ZERO; 2]; model.segments().len()];
    let (mesh, shares, couplings) = (&model.mesh, &model.shares, &model.couplings[..]);
    let terms = Terms { mesh, shares, couplings, own: &own, k };
    let matrix = terms.matrix();
    let current = |wire: usize| -> Vec<f64> {
        let (half_m, [_, y, _]) = wires[wire];
        let at = |unknown: &super::mesh::Unknown| {
            let arm = unknown.arms[0].unwrap();
            let segment: &Segment = &model.mesh.segments[arm.segment];
            let here = model.mesh.wire_of[arm.segment] == wire;
            if here { (k * (half_m - (segment.to_m[1] - y).abs())).sin() } else { 0.0 }
        };
        model.mesh.unknowns.iter().map(at).collect()
    };
    let (x, y) = (current(a), current(b));
    let mut sum = Complex64::ZERO;
    for (row, x) in x.iter().enumerate() {
        for (column, y) in y.iter().enumerate() {
            sum += x * y * matrix.at(row, column);
        }
    }
    sum * Complex64::new(0.0, k * VACUUM_IMPEDANCE_OHM / (4.0 * std::f64::consts::PI))
}

fn wavelengths(number: f64) -> f64 {
    number * SPEED_OF_LIGHT_M_PER_S / FREQUENCY_HZ
}

#[test]
fn one_sinusoid_has_the_self_impedance_of_theory() {
    for half in [0.05, 0.25, 0.4, 0.5, 1.25] {
        let half_m = wavelengths(half);
        let radius_m = wavelengths(1e-6);
        let wires = [(half_m, [0.0; 3])];
        let got = impedance(&model(&wires, radius_m, Boundary::FreeSpace), &wires, 0, 0);
        let wire = CentreFedWire { half_length_m: half_m, radius_m };
        let expected = self_impedance(&wire, FREQUENCY_HZ);
        // What is left is quadrature, and surface against axis.
        assert!((got - expected).norm() < 2e-4 * expected.norm(), "{half} λ: {got} for {expected}");
    }
}

#[test]
fn half_wave_over_the_mirror_is_self_minus_mutual() {
    let half_m = wavelengths(0.25);
    let radius_m = wavelengths(1e-6);
    for height in [0.05, 0.1, 0.25, 0.5] {
        let height_m = wavelengths(height);
        let wires = [(half_m, [0.0, 0.0, height_m])];
        let got = impedance(&model(&wires, radius_m, Boundary::Mirror), &wires, 0, 0);
        let pair = ParallelWires {
            half_length_1_m: half_m,
            half_length_2_m: half_m,
            spacing_m: 2.0 * height_m,
            offset_m: 0.0,
        };
        let expected = self_impedance(&CentreFedWire { half_length_m: half_m, radius_m }, FREQUENCY_HZ)
            - mutual_impedance(&pair, FREQUENCY_HZ);
        assert!((got - expected).norm() < 2e-4 * expected.norm(), "{height} λ: {got} for {expected}");
    }
}

#[test]
fn two_sinusoids_have_the_mutual_impedance_of_theory() {
    let radius_m = wavelengths(1e-6);
    for (half_1, half_2) in [(0.25, 0.25), (0.2, 0.6)] {
        for (spacing, offset) in
            [(0.002, 0.0), (0.02, 0.1), (0.1, 0.0), (0.5, 0.0), (0.3, 0.45), (1.0, 2.0), (0.01, 0.55)]
        {
            let [half_1_m, half_2_m, spacing_m, offset_m] =
                [half_1, half_2, spacing, offset].map(wavelengths);
            let wires = [(half_1_m, [0.0; 3]), (half_2_m, [spacing_m, offset_m, 0.0])];
            let got = impedance(&model(&wires, radius_m, Boundary::FreeSpace), &wires, 0, 1);
            let pair =
                ParallelWires { half_length_1_m: half_1_m, half_length_2_m: half_2_m, spacing_m, offset_m };
            let expected = mutual_impedance(&pair, FREQUENCY_HZ);
            // Against the size of a self impedance: far apart the mutual one nearly vanishes.
            let error = (got - expected).norm() / (expected.norm() + 1.0);
            assert!(
                error < 2e-4,
                "{half_1} and {half_2} λ, {spacing} λ apart, {offset} λ on: {got} for {expected}"
            );
        }
    }
}

/// The matrix with nothing taken from symmetry: below the diagonal every pair of segments with the later one as the test,
/// above it with the roles exchanged, by turning round the order of the segments; of near pairs, the other segment is
/// then the one whose integral is a quadrature.
fn both_triangles(model: &WireModel, frequency_hz: f64) -> DMatrix<Complex64> {
    let k = wave_number_rad_per_m(frequency_hz);
    let count = model.segments().len();
    let mut turned = Mesh { segments: model.mesh.segments.clone(), ..Mesh::default() };
    turned.segments.reverse();
    let line_of: Vec<usize> = model.mesh.line_of.iter().rev().copied().collect();
    let all = [Sources::Themselves, Sources::Images];
    let sources = &all[..model.couplings.len()];
    let longer_outside = |p: &Axis, q: &Axis, c_m: f64| {
        if p.length_m > q.length_m { skew(p, q, c_m) } else { skew(q, p, c_m).exchanged() }
    };
    let turned_couplings: Vec<Coupling> = sources
        .iter()
        .map(|&sources| Coupling::with(&turned.segments, &line_of, sources, longer_outside))
        .collect();
    let own = vec![[Complex64::ZERO; 2]; count];
    let terms = |mesh, couplings| Terms { mesh, shares: &model.shares, couplings, own: &own, k };
    let later_tests = end_couplings_of_all(&terms(&model.mesh, &model.couplings[..]));
    let earlier_tests = end_couplings_of_all(&terms(&turned, &turned_couplings[..]));
    let coupling = |test: &Arm, source: &Arm| {
        let [test_end, source_end] =
            [test, source].map(|arm| if arm.end == End::From { BEGINNING } else { END });
        let (a, b) = (test.segment, source.segment);
        let pair = if a >= b { later_tests[a][b] } else { earlier_tests[count - 1 - a][count - 1 - b] };
        pair[2 * test_end + source_end] * (test.sign * source.sign)
    };
    let unknowns = &model.mesh.unknowns;
    DMatrix::from_fn(unknowns.len(), unknowns.len(), |row, column| {
        let arms = |unknown: usize| unknowns[unknown].arms.iter().flatten();
        arms(row).map(|test| arms(column).map(|source| coupling(test, source)).sum::<Complex64>()).sum()
    })
}

/// A fork, a bend and a wire beside it, with two ports.
fn forked(boundary: Boundary) -> WireModel {
    let wire = |vertices_m: &[[f64; 3]], radius_m: f64| WireShape {
        vertices_m: vertices_m.to_vec(),
        radius_m,
        material: Material::PERFECT,
    };
    let wires = vec![
        wire(&[[-7.0, 0.0, 4.0], [0.0, 0.0, 9.0], [6.0, 1.0, 6.0]], 1e-3),
        wire(&[[0.0, 0.0, 9.0], [1.0, 5.0, 3.0]], 2e-3),
        wire(&[[-5.0, 0.3, 4.5], [5.0, 0.4, 8.0]], 0.7e-3),
    ];
    let ports = [(0, 5.0), (2, 4.0)].map(|(wire, arc_m)| PortPlace { wire, arc_m, gap_m: 0.02 });
    WireModel::new(Structure { wires, ports: ports.to_vec(), boundary }, 15e6).unwrap()
}

#[test]
fn matrix_is_symmetric_when_both_triangles_are_computed() {
    for boundary in [Boundary::FreeSpace, Boundary::Mirror] {
        let matrix = both_triangles(&forked(boundary), 14e6);
        let mut worst = 0.0_f64;
        for row in 0..matrix.nrows() {
            for column in 0..row {
                let [below, above] = [matrix[(row, column)], matrix[(column, row)]];
                // Against the geometric mean of the pair's own impedances.
                let size = (matrix[(row, row)] * matrix[(column, column)]).norm().sqrt();
                worst = worst.max((below - above).norm() / size);
            }
        }
        // Tolerance of the quadrature of near pairs.
        assert!(worst > 0.0 && worst < 1e-6, "{boundary:?}: {worst}");
    }
}

#[test]
fn ports_are_reciprocal_without_symmetrising() {
    for boundary in [Boundary::FreeSpace, Boundary::Mirror] {
        let model = forked(boundary);
        let drive = model.drive(wave_number_rad_per_m(14e6)).map(Complex64::from);
        let admittance = drive.tr_mul(&both_triangles(&model, 14e6).lu().solve(&drive).unwrap());
        let (one, other) = (admittance[(0, 1)], admittance[(1, 0)]);
        assert!(one != other && (one - other).norm() < 1e-6 * one.norm(), "{one} and {other}");
        // It is the matrix of the solver but for the metal, which is perfect here.
        let solved = model.solve(14e6).unwrap().port_admittance_s;
        let own = admittance[(0, 0)] / admittance[(0, 1)] * solved[(0, 1)] / solved[(0, 0)];
        assert!((own - 1.0).norm() < 1e-6, "{own}");
    }
}
