//! Laws that every solution of the full model must keep, and limits that theory knows.

use std::f64::consts::{PI, TAU};

use num_complex::Complex64;
use physics::constants::{
    SPEED_OF_LIGHT_M_PER_S, VACUUM_IMPEDANCE_OHM, VACUUM_PERMEABILITY_H_PER_M, wave_number_rad_per_m,
};
use physics::wire::ports::{PortUse, attach};
use physics::wire::{
    Boundary, Conductor, Insulation, Material, Metal, PortPlace, Structure, Termination, WireModel,
    WireShape, mesh_error,
};
use proptest::prelude::*;

const COPPER: Material = Material {
    metal: Metal::Solid(Conductor { conductivity_s_per_m: 58e6, relative_permeability: 1.0 }),
    resistance_factor: 1.0,
    insulation: None,
};

fn wire(vertices_m: &[[f64; 3]], radius_m: f64) -> WireShape {
    WireShape { vertices_m: vertices_m.to_vec(), radius_m, material: Material::PERFECT }
}

fn port(wire: usize, arc_m: f64, gap_m: f64) -> PortPlace {
    PortPlace { wire, arc_m, gap_m }
}

fn impedance(structure: Structure, frequency_hz: f64) -> Complex64 {
    let model = WireModel::new(structure, frequency_hz).expect("a sound structure");
    model.solve(frequency_hz).expect("within the mesh").port_admittance_s[(0, 0)].inv()
}

/// Centre-fed straight wire in free space.
fn dipole(length_m: f64, radius_m: f64, gap_m: f64) -> Structure {
    Structure {
        wires: vec![wire(&[[0.0, 0.0, -0.5 * length_m], [0.0, 0.0, 0.5 * length_m]], radius_m)],
        ports: vec![port(0, 0.5 * length_m, gap_m)],
        boundary: Boundary::FreeSpace,
    }
}

#[test]
fn half_wave_has_the_impedance_of_its_thickness() {
    // Computed by this project's own solution of Hallén's equation with the exact kernel and a delta gap (not a
    // publication); good to 1 % of R and 1 Ω of X on wires this thin.
    for (radius, r_ohm, x_ohm) in [(1e-6, 76.91, 44.07), (1e-5, 78.09, 44.57), (1e-4, 80.39, 45.51)] {
        let wavelength_m = SPEED_OF_LIGHT_M_PER_S / 10e6;
        let radius_m = radius * wavelength_m;
        let z = impedance(dipole(0.5 * wavelength_m, radius_m, (2.0 * radius_m).max(1e-3)), 10e6);
        assert!((z.re / r_ohm - 1.0).abs() < 0.01 && (z.im - x_ohm).abs() < 1.0, "{radius} λ: {z}");
    }
}

#[test]
fn resonance_comes_earlier_on_thick_wires() {
    // Same source, whose scatter is below 0.15 % from l/d = 1000 on; l/d, length in wavelengths and resistance at the
    // first resonance.
    for (slenderness, length, r_ohm) in
        [(1000.0, 0.4810, 72.0), (10_000.0, 0.4864, 72.1), (100_000.0, 0.4894, 72.3)]
    {
        let length_m = 10.0;
        let radius_m = 0.5 * length_m / slenderness;
        let z = |part: f64| {
            impedance(
                dipole(length_m, radius_m, (2.0 * radius_m).max(1e-3)),
                part * SPEED_OF_LIGHT_M_PER_S / length_m,
            )
        };
        // One secant step over a nearly straight reactance.
        let (low, high) = (z(length - 0.002), z(length + 0.002));
        let found = length - 0.002 - 0.004 * low.im / (high.im - low.im);
        assert!((found / length - 1.0).abs() < 0.0015, "l/d {slenderness}: {found} λ");
        assert!((z(found).re / r_ohm - 1.0).abs() < 0.01, "l/d {slenderness}: {}", z(found));
    }
}

#[test]
fn small_loop_has_the_inductance_and_resistance_of_theory() {
    // Square of side s:  L = 2µ0·s/π·(ln(s/a) − 0.774),  R = η0·(k²A)²/6π  (Grover; Kraus; from memory)
    let (side_m, radius_m, frequency_hz) = (1.0_f64, 2e-3_f64, 3e6);
    let square = [[0.0; 3], [side_m, 0.0, 0.0], [side_m, side_m, 0.0], [0.0, side_m, 0.0], [0.0; 3]];
    let structure = Structure {
        wires: vec![wire(&square, radius_m)],
        ports: vec![port(0, 0.5 * side_m, 0.02)],
        boundary: Boundary::FreeSpace,
    };
    let z = impedance(structure, frequency_hz);
    let inductance_h = 2.0 * VACUUM_PERMEABILITY_H_PER_M * side_m / PI * ((side_m / radius_m).ln() - 0.774);
    let k2a = wave_number_rad_per_m(frequency_hz).powi(2) * side_m * side_m;
    let r_ohm = VACUUM_IMPEDANCE_OHM * k2a * k2a / (6.0 * PI);
    // Both rise a little with frequency: 4 m of wire at 100 m of wavelength.
    assert!((z.im / (TAU * frequency_hz * inductance_h) - 1.0).abs() < 0.01, "{z}");
    assert!((z.re / r_ohm - 1.0).abs() < 0.03, "{z} for {r_ohm}");
}

/// A low wire over the mirror, fed in its middle: two open lines of this length.
fn low_line(insulation: Option<Insulation>) -> WireModel {
    let (half_m, height_m) = (10.0, 0.1);
    let material = Material { insulation, ..Material::PERFECT };
    let structure = Structure {
        wires: vec![WireShape {
            vertices_m: vec![[-half_m, 0.0, height_m], [half_m, 0.0, height_m]],
            radius_m: 1e-3,
            material,
        }],
        ports: vec![port(0, half_m, 0.02)],
        boundary: Boundary::Mirror,
    };
    WireModel::new(structure, 15e6).expect("a sound structure")
}

#[test]
fn low_wire_over_the_mirror_is_a_line() {
    // Z = 2·Z0·(−j)·cot kl with Z0 = η0/2π·ln(2h/a); the ends add about a height to l.
    let z0_ohm = VACUUM_IMPEDANCE_OHM / TAU * (200.0_f64).ln();
    let frequency_hz = 3e6;
    let z = low_line(None).solve(frequency_hz).unwrap().port_admittance_s[(0, 0)].inv();
    let electrical = wave_number_rad_per_m(frequency_hz) * (10.0 + 0.06);
    assert!((z.im / (-2.0 * z0_ohm / electrical.tan()) - 1.0).abs() < 0.01, "{z}");
}

#[test]
fn cover_slows_the_wave_and_lowers_the_characteristic_impedance() {
    // Quasi-static line: the cover raises the capacitance only, so v and Z0 both fall by
    // √(1 − (1 − 1/ε)·ln(b/a)/ln(2h/a)). A series inductance instead would raise Z0.
    let cover = Insulation { outer_radius_m: 2e-3, relative_permittivity: 2.3 };
    let slower = (1.0 - (1.0 - 1.0 / 2.3) * 2.0_f64.ln() / 200.0_f64.ln()).sqrt();
    let (bare, covered) = (low_line(None), low_line(Some(cover)));
    let reactance = |model: &WireModel, frequency_hz: f64| {
        model.solve(frequency_hz).unwrap().port_admittance_s[(0, 0)].inv().im
    };
    // Quarter-wave resonance of each half.
    let resonance_hz = |model: &WireModel| {
        let (mut low, mut high) = (6e6, 8e6);
        for _ in 0..40 {
            let middle = 0.5 * (low + high);
            if reactance(model, middle) < 0.0 { low = middle } else { high = middle }
        }
        low
    };
    let ratio = resonance_hz(&covered) / resonance_hz(&bare);
    assert!((ratio / slower - 1.0).abs() < 0.001, "{ratio} for {slower}");
    // At the same electrical length the reactance is that of the lower characteristic impedance.
    let frequency_hz = 4e6;
    let ratio = reactance(&covered, slower * frequency_hz) / reactance(&bare, frequency_hz);
    assert!((ratio / slower - 1.0).abs() < 0.003, "{ratio} for {slower}");
}

#[test]
fn mirror_is_an_explicit_image() {
    for vertices_m in
        [vec![[0.0, 0.0, 2.0], [0.0, 8.0, 5.0]], vec![[0.0, 0.0, 1.0], [0.0, 0.0, 9.0], [6.0, 0.0, 9.0]]]
    {
        let below: Vec<[f64; 3]> = vertices_m.iter().map(|&[x, y, z]| [x, y, -z]).collect();
        let (radius_m, frequency_hz) = (1e-3, 14e6);
        let over = Structure {
            wires: vec![wire(&vertices_m, radius_m)],
            ports: vec![port(0, 3.0, 0.02)],
            boundary: Boundary::Mirror,
        };
        let both = Structure {
            wires: vec![wire(&vertices_m, radius_m), wire(&below, radius_m)],
            ports: vec![port(0, 3.0, 0.02), port(1, 3.0, 0.02)],
            boundary: Boundary::FreeSpace,
        };
        let model = WireModel::new(over, frequency_hz).unwrap();
        let y = model.solve(frequency_hz).unwrap().port_admittance_s[(0, 0)];
        let model = WireModel::new(both, frequency_hz).unwrap();
        let y_both = model.solve(frequency_hz).unwrap().port_admittance_s;
        // The image carries the opposite current. Twice the wire has a slightly coarser mesh.
        let expected = y_both[(0, 0)] - y_both[(0, 1)];
        assert!((y - expected).norm() < 1e-3 * expected.norm(), "{y} for {expected}");
        assert!((y_both[(0, 1)] - y_both[(1, 0)]).norm() < 1e-9 * expected.norm());
    }
}

#[test]
fn monopole_on_the_mirror_is_half_a_dipole() {
    let (height_m, radius_m, frequency_hz) = (5.0, 2e-3, 14e6);
    let monopole = Structure {
        wires: vec![wire(&[[0.0; 3], [0.0, 0.0, height_m]], radius_m)],
        ports: vec![port(0, 0.0, 0.01)],
        boundary: Boundary::Mirror,
    };
    let z = impedance(monopole, frequency_hz);
    let whole = impedance(dipole(2.0 * height_m, radius_m, 0.02), frequency_hz);
    assert!((2.0 * z - whole).norm() < 1e-3 * whole.norm(), "{z} for half of {whole}");
}

/// A fan: three arms of different length on one side of the feed, one on the other.
fn fan() -> Structure {
    let radius_m = 1e-3;
    let arm = |to_m: [f64; 3]| WireShape { material: COPPER, ..wire(&[[0.1, 0.0, 10.0], to_m], radius_m) };
    let feed = WireShape { material: COPPER, ..wire(&[[-7.0, 0.0, 10.0], [0.1, 0.0, 10.0]], radius_m) };
    Structure {
        wires: vec![feed, arm([5.0, 0.0, 8.0]), arm([7.0, 1.0, 10.0]), arm([4.0, -3.0, 6.0])],
        ports: vec![port(0, 7.0, 0.02), port(2, 3.0, 0.02)],
        boundary: Boundary::FreeSpace,
    }
}

#[test]
fn currents_of_a_fork_add_to_nothing() {
    let model = WireModel::new(fan(), 15e6).unwrap();
    let solution = model.solve(14e6).unwrap();
    let currents = model.end_currents(&solution.coefficients_a_per_v, &[Complex64::ONE, Complex64::ZERO]);
    let mut into = Complex64::ZERO;
    let mut largest = 0.0_f64;
    let at_fork =
        |point_m: [f64; 3]| (point_m[0] - 0.1).abs() + point_m[1].abs() + (point_m[2] - 10.0).abs() < 1e-9;
    for (segment, ends) in model.segments().iter().zip(&currents) {
        if at_fork(segment.to_m) {
            into += ends.to_a;
            largest = largest.max(ends.to_a.norm());
        }
        if at_fork(segment.from_m) {
            into -= ends.from_a;
        }
    }
    assert!(largest > 1e-4 && into.norm() < 1e-12 * largest, "{into} of {largest}");
    // Open ends carry nothing.
    let far =
        model.segments().iter().zip(&currents).find(|(segment, _)| (segment.to_m[0] - 7.0).abs() < 1e-9);
    assert!(far.unwrap().1.to_a.norm() < 1e-15);
}

#[test]
fn shorted_port_is_no_port_and_open_port_cuts() {
    let frequency_hz = 14.2e6;
    let model = WireModel::new(fan(), 15e6).unwrap();
    let y = model.solve(frequency_hz).unwrap().port_admittance_s;
    let with = |termination| {
        attach(&y, &[PortUse::Fed, PortUse::Closed(termination)], frequency_hz).unwrap().admittance_s[(0, 0)]
            .inv()
    };
    let alone = Structure { ports: fan().ports[..1].to_vec(), ..fan() };
    let z = impedance(alone, frequency_hz);
    let shorted = with(Termination::SHORT);
    assert!((shorted - z).norm() < 2e-3 * z.norm(), "{shorted} for {z}");
    let opened = with(Termination::Open);
    assert!((opened - z).norm() > 0.05 * z.norm(), "{opened} against {z}");
}

#[test]
fn refined_mesh_changes_little() {
    // A short wire close beside a long one: the charge of the long one follows the other's ends.
    let mut beside = dipole(20.0, 1e-3, 0.02);
    beside.wires.push(wire(&[[0.05, 0.0, -7.0], [0.05, 0.0, 7.0]], 1e-3));
    for structure in [dipole(20.0, 1e-3, 0.02), fan(), beside] {
        let model = WireModel::new(structure, 15e6).unwrap();
        let refined = model.refined().unwrap();
        assert!(refined.unknowns() > model.unknowns() + 10);
        for frequency_hz in [3e6, 7.1e6, 10e6, 14.2e6] {
            let error =
                mesh_error(&model.solve(frequency_hz).unwrap(), &refined.solve(frequency_hz).unwrap());
            assert!(error > 1e-6 && error < 5e-3, "{frequency_hz} Hz: {error}");
        }
    }
}

/// A bent wire with two ports and a second wire beside it.
fn bent() -> impl Strategy<Value = Structure> {
    let coordinate = || -4.0..4.0_f64;
    (
        [coordinate(), coordinate(), coordinate()],
        [coordinate(), coordinate(), coordinate()],
        0.2e-3..4e-3_f64,
        0.2..0.8_f64,
    )
        .prop_map(|(bend, end, radius_m, part)| {
            let first = [
                [-9.0, 0.0, 20.0],
                [bend[0], bend[1], 20.0 + bend[2]],
                [9.0 + end[0], end[1], 20.0 + end[2]],
            ];
            let second = [[-6.0, 9.0, 21.0], [6.0, 9.0 + 0.5 * end[0], 19.0]];
            let length =
                |a: [f64; 3], b: [f64; 3]| (0..3).map(|axis| (b[axis] - a[axis]).powi(2)).sum::<f64>().sqrt();
            let whole = length(first[0], first[1]) + length(first[1], first[2]);
            Structure {
                wires: vec![
                    WireShape { material: COPPER, ..wire(&first, radius_m) },
                    WireShape { material: COPPER, ..wire(&second, 1e-3) },
                ],
                ports: vec![port(0, part * whole, 0.02), port(1, 4.0, 0.02)],
                boundary: Boundary::FreeSpace,
            }
        })
}

fn admittance(structure: Structure, frequency_hz: f64) -> nalgebra::DMatrix<Complex64> {
    let model = WireModel::new(structure, 15e6).expect("a sound structure");
    model.solve(frequency_hz).expect("within the mesh").port_admittance_s
}

fn distance(a: &nalgebra::DMatrix<Complex64>, b: &nalgebra::DMatrix<Complex64>) -> f64 {
    (a - b).map(Complex64::norm).max() / b.map(Complex64::norm).max()
}

/// Turns a point about an axis through the origin.
fn turned(point_m: [f64; 3], axis: [f64; 3], angle: f64) -> [f64; 3] {
    // Rodrigues: v·cos + (a × v)·sin + a·(a·v)·(1 − cos)
    let size = axis.iter().map(|x| x * x).sum::<f64>().sqrt();
    let a = axis.map(|x| x / size);
    let dot: f64 = (0..3).map(|index| a[index] * point_m[index]).sum();
    let cross = [
        a[1] * point_m[2] - a[2] * point_m[1],
        a[2] * point_m[0] - a[0] * point_m[2],
        a[0] * point_m[1] - a[1] * point_m[0],
    ];
    std::array::from_fn(|index| {
        point_m[index] * angle.cos() + cross[index] * angle.sin() + a[index] * dot * (1.0 - angle.cos())
    })
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(24))]

    #[test]
    fn rotation_changes_nothing(
        structure in bent(), axis in [0.1..1.0_f64, -1.0..1.0_f64, -1.0..1.0_f64], angle in 0.0..6.0_f64,
    ) {
        let y = admittance(structure.clone(), 14e6);
        let mut other = structure;
        for wire in &mut other.wires {
            for vertex_m in &mut wire.vertices_m {
                *vertex_m = turned(*vertex_m, axis, angle);
            }
        }
        prop_assert!(distance(&admittance(other, 14e6), &y) < 1e-6);
    }

    #[test]
    fn order_of_wires_and_vertices_changes_nothing(structure in bent()) {
        let y = admittance(structure.clone(), 14e6);
        let mut other = structure;
        other.wires.reverse();
        for port in &mut other.ports {
            port.wire = 1 - port.wire;
        }
        prop_assert!(distance(&admittance(other.clone(), 14e6), &y) < 1e-6);
        // A wire told from its other end: the port's voltage changes sign.
        let shape = &mut other.wires[1];
        shape.vertices_m.reverse();
        let length: f64 = shape.vertices_m.windows(2).map(|pair| {
            (0..3).map(|axis| (pair[1][axis] - pair[0][axis]).powi(2)).sum::<f64>().sqrt()
        }).sum();
        other.ports[0].arc_m = length - other.ports[0].arc_m;
        let mut turned = admittance(other, 14e6);
        turned[(0, 1)] = -turned[(0, 1)];
        turned[(1, 0)] = -turned[(1, 0)];
        prop_assert!(distance(&turned, &y) < 1e-6);
    }

    #[test]
    fn perfect_conductors_scale_with_wavelength(structure in bent(), scale in 0.5..2.0_f64) {
        let perfect = |mut structure: Structure, scale: f64| {
            for wire in &mut structure.wires {
                wire.material = Material::PERFECT;
                wire.radius_m *= scale;
                for coordinate in wire.vertices_m.iter_mut().flatten() {
                    *coordinate *= scale;
                }
            }
            for port in &mut structure.ports {
                port.arc_m *= scale;
                port.gap_m *= scale;
            }
            let model = WireModel::new(structure, 15e6 / scale).unwrap();
            (model.unknowns(), model.solve(14e6 / scale).unwrap().port_admittance_s)
        };
        let ((unknowns, y), (others, other)) = (perfect(structure.clone(), 1.0), perfect(structure, scale));
        prop_assert_eq!(unknowns, others);
        prop_assert!(distance(&other, &y) < 1e-6, "{}", distance(&other, &y));
    }

    #[test]
    fn no_port_gives_power(structure in bent(), frequency_hz in 2e6..15e6_f64, phase in 0.0..6.0_f64, part in 0.0..1.0_f64) {
        let model = WireModel::new(structure, 15e6).unwrap();
        let solution = model.solve(frequency_hz).unwrap();
        let y = &solution.port_admittance_s;
        prop_assert!((y[(0, 1)] - y[(1, 0)]).norm() < 1e-9 * y[(0, 0)].norm());
        let volts = [Complex64::from(part), Complex64::from_polar(1.0 - part, phase)];
        let accepted_w: f64 = solution.port_powers_w(&volts).iter().sum();
        let currents = model.end_currents(&solution.coefficients_a_per_v, &volts);
        let lost_w: f64 = model.wire_loss_w(&currents, frequency_hz).iter().sum();
        prop_assert!(lost_w > 0.0 && accepted_w > lost_w, "{} of {}", lost_w, accepted_w);
    }
}

/// Two parallel wires joined at both ends, fed in the middle of one of the short sides.
fn narrow_loop(length_m: f64, spacing_m: f64, radius_m: f64) -> Structure {
    let corners =
        [[0.0, 0.0, 0.0], [0.0, spacing_m, 0.0], [length_m, spacing_m, 0.0], [length_m, 0.0, 0.0], [0.0; 3]];
    Structure {
        wires: vec![wire(&corners, radius_m)],
        ports: vec![port(0, 0.5 * spacing_m, 0.02)],
        boundary: Boundary::FreeSpace,
    }
}

#[test]
fn waves_on_a_shorted_pair_of_wires_are_as_fast_as_light() {
    // The pair is a quarter wave long, with what its far end adds, where its susceptance vanishes: the side with the
    // feed, in series with it, does not matter there.
    for spacing_m in [0.05, 0.1, 0.2] {
        let quarter_wave_m = |length_m: f64| {
            let highest_hz = 0.25 * SPEED_OF_LIGHT_M_PER_S / length_m;
            let model = WireModel::new(narrow_loop(length_m, spacing_m, 1e-3), highest_hz).unwrap();
            let (mut low_hz, mut high_hz) = (0.9 * highest_hz, highest_hz);
            for _ in 0..40 {
                let middle_hz = 0.5 * (low_hz + high_hz);
                let y = model.solve(middle_hz).unwrap().port_admittance_s[(0, 0)];
                if y.im < 0.0 { low_hz = middle_hz } else { high_hz = middle_hz }
            }
            0.25 * SPEED_OF_LIGHT_M_PER_S / low_hz
        };
        let [four_m, six_m] = [4.0, 6.0].map(quarter_wave_m);
        assert!((six_m - four_m - 2.0).abs() < 0.002, "{spacing_m} m apart: {four_m} m and {six_m} m");
        assert!(four_m > 4.0 && four_m < 4.0 + spacing_m, "{spacing_m} m apart: {four_m} m");
    }
}

#[test]
fn shorted_pair_of_wires_has_the_impedance_of_theory() {
    // Far below resonance  L/l = µ0/π·acosh(D/2a)
    let (radius_m, frequency_hz) = (1e-3, 1e6);
    for spacing_m in [0.05, 0.1, 0.2] {
        let reactance_ohm =
            |length_m: f64| impedance(narrow_loop(length_m, spacing_m, radius_m), frequency_hz).im;
        let per_metre = (reactance_ohm(3.0) - reactance_ohm(1.0)) / (2.0 * TAU * frequency_hz);
        let expected = VACUUM_PERMEABILITY_H_PER_M / PI * (0.5_f64 * spacing_m / radius_m).acosh();
        assert!(
            (per_metre / expected - 1.0).abs() < 0.004,
            "{spacing_m} m apart: {per_metre} for {expected} H/m"
        );
    }
}

#[test]
fn folded_half_wave_steps_up_four_times() {
    // Two equal wires: the impedance of the antenna mode is four times that of one wire of the pair's mean radius
    // √(aD), and the line mode is open at a half wave (common practice).
    let (length_m, spacing_m, radius_m) = (10.0, 0.05, 1e-3);
    let frequency_hz = 14.4e6;
    let corners = [
        [0.0, 0.0, 0.0],
        [0.5 * length_m, 0.0, 0.0],
        [0.5 * length_m, spacing_m, 0.0],
        [-0.5 * length_m, spacing_m, 0.0],
        [-0.5 * length_m, 0.0, 0.0],
        [0.0, 0.0, 0.0],
    ];
    let folded = Structure {
        wires: vec![wire(&corners, radius_m)],
        ports: vec![port(0, 0.0, 0.02)],
        boundary: Boundary::FreeSpace,
    };
    let plain = dipole(length_m, (radius_m * spacing_m).sqrt(), 0.02);
    let (folded, plain) = (impedance(folded, frequency_hz), impedance(plain, frequency_hz));
    // The line mode: two shorted quarter waves in series across the feed.
    let line_ohm = VACUUM_IMPEDANCE_OHM / PI * (0.5 * spacing_m / radius_m).acosh();
    let stub =
        Complex64::new(0.0, 2.0 * line_ohm * (wave_number_rad_per_m(frequency_hz) * 0.5 * length_m).tan());
    let expected = ((4.0 * plain).inv() + stub.inv()).inv();
    assert!((folded - expected).norm() < 0.04 * expected.norm(), "{folded} for {expected}");
}
