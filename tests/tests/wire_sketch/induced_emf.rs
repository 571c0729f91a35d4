//! Radiation resistance, mutual impedance, the image in perfect ground.

use checks::{Table, data};
use num_complex::Complex64;
use physics::constants::SPEED_OF_LIGHT_M_PER_S;
use physics::sinusoid::{
    CentreFedWire, Image, ImageDirection, Mirror, ParallelWires, Sketch, SketchWire, mutual_impedance,
};
use serde::Deserialize;

use crate::common::{METRE_WAVE_HZ, VANISHING, bare, thin};

fn half_waves(spacing_m: f64, offset_m: f64) -> Complex64 {
    let pair = ParallelWires { half_length_1_m: 0.25, half_length_2_m: 0.25, spacing_m, offset_m };
    mutual_impedance(&pair, METRE_WAVE_HZ)
}

#[derive(Deserialize)]
struct RadiationResistance {
    #[serde(flatten)]
    at_loop: Table<[f64; 2]>,
    feedpoint: Table<[f64; 2]>,
    handbook: Table<[f64; 2]>,
    thin_limit: Table<[f64; 3]>,
}

#[test]
fn radiation_resistance_of_any_length() {
    let data: RadiationResistance = data("wire/radiation_resistance.toml");
    for table in [&data.at_loop, &data.handbook] {
        for &[length, r_ohm] in &table.rows {
            table.assert_relative(&format!("{length} λ"), thin(length).re, r_ohm);
        }
    }
    for &[length, r_ohm] in &data.feedpoint.rows {
        let wire = CentreFedWire { half_length_m: 0.5 * length, radius_m: VANISHING };
        let fed = wire.referred_to_feedpoint(thin(length), METRE_WAVE_HZ).unwrap();
        data.feedpoint.assert_relative(&format!("{length} λ at the feedpoint"), fed.re, r_ohm);
    }
    for &[length, r_ohm, x_ohm] in &data.thin_limit.rows {
        data.thin_limit.assert_ohm(&format!("{length} λ"), thin(length), r_ohm, x_ohm);
    }
}

#[test]
fn induced_emf_has_no_answer_for_a_feedpoint_on_a_node() {
    let wire = CentreFedWire { half_length_m: 0.5, radius_m: VANISHING };
    assert_eq!(wire.referred_to_feedpoint(thin(1.0), METRE_WAVE_HZ), None);
}

#[derive(Deserialize)]
struct Mutual {
    parallel: Table<[f64; 3]>,
    handbook: Table<[f64; 3]>,
    collinear: Table<[f64; 3]>,
    collinear_handbook: Table<[f64; 3]>,
}

#[test]
fn mutual_impedance_of_half_waves() {
    let Mutual { parallel, handbook, collinear, collinear_handbook } = data("wire/mutual.toml");
    for table in [&parallel, &handbook] {
        for &[spacing, r_ohm, x_ohm] in &table.rows {
            table.assert_ohm(&format!("{spacing} λ apart"), half_waves(spacing, 0.0), r_ohm, x_ohm);
        }
    }
    for table in [&collinear, &collinear_handbook] {
        for &[offset, r_ohm, x_ohm] in &table.rows {
            let z_ohm = half_waves(VANISHING, offset);
            table.assert_ohm(&format!("in line, {offset} λ between centres"), z_ohm, r_ohm, x_ohm);
        }
    }
}

#[derive(Deserialize)]
struct OverMirror {
    horizontal: Table<[f64; 3]>,
    vertical: Table<[f64; 3]>,
    sketch: Figures,
}

#[derive(Deserialize)]
struct Figures {
    relative_tolerance: f64,
}

#[test]
fn half_wave_over_perfect_ground() {
    let OverMirror { horizontal, vertical, sketch } = data("wire/over_mirror.toml");
    let alone = thin(0.5);
    // The longest wave of the sketch's range makes the thinnest wire of it.
    let frequency_hz = 0.1e6;
    let wavelength_m = SPEED_OF_LIGHT_M_PER_S / frequency_hz;
    let sketched = |height: f64, direction: ImageDirection| {
        let image = Image { height_m: height * wavelength_m, direction, mirror: Mirror::Perfect };
        let arm_m = 0.25 * wavelength_m;
        let wire = SketchWire {
            radius_m: 1e-6,
            conductivity_s_per_m: f64::INFINITY,
            image: Some(image),
            ..bare(arm_m, arm_m)
        };
        Sketch::new(wire).unwrap().at(frequency_hz).unwrap().impedance_ohm
    };
    let close = |what: &str, got: Complex64, r_ohm: f64, x_ohm: f64| {
        let expected = Complex64::new(r_ohm, x_ohm);
        assert!(
            (got - expected).norm() < sketch.relative_tolerance * expected.norm(),
            "{what}: {got}, {expected}"
        );
    };
    for &[height, r_ohm, x_ohm] in &horizontal.rows {
        let what = format!("horizontal at {height} λ");
        horizontal.assert_ohm(&what, alone - half_waves(2.0 * height, 0.0), r_ohm, x_ohm);
        close(&what, sketched(height, ImageDirection::Horizontal), r_ohm, x_ohm);
    }
    for &[height, r_ohm, x_ohm] in &vertical.rows {
        let what = format!("vertical at {height} λ");
        vertical.assert_ohm(&what, alone + half_waves(VANISHING, 2.0 * height), r_ohm, x_ohm);
        close(&what, sketched(height, ImageDirection::Vertical), r_ohm, x_ohm);
    }
}
