//! Skin effect and insulation.

use checks::{Table, data};
use physics::conductor::{InsulatedWire, RoundWire, Surroundings, skin_depth_m, surface_resistance_ohm};
use physics::constants::{COPPER_CONDUCTIVITY_S_PER_M, SPEED_OF_LIGHT_M_PER_S};
use physics::sinusoid::{Sketch, SketchWire};
use serde::Deserialize;

use crate::common::bare;

#[derive(Deserialize)]
struct Skin {
    depth: Table<[f64; 3]>,
    depth_handbook: Table<[f64; 2]>,
    round_wire: SkinOfWire,
    gauges: Gauges,
    half_wave: LossyHalfWave,
}

#[derive(Deserialize)]
struct SkinOfWire {
    #[serde(flatten)]
    resistance: Table<[f64; 2]>,
    diameter_mm: f64,
    dc_ohm_per_m: f64,
    inductance_at_10_mhz_nh_per_m: f64,
    thin_skin_at_10_mhz_ohm_per_m: f64,
}

#[derive(Deserialize)]
struct Gauges {
    #[serde(flatten)]
    resistance: Table<[f64; 6]>,
    frequencies_mhz: [f64; 5],
}

#[derive(Deserialize)]
struct LossyHalfWave {
    source: String,
    diameter_mm: f64,
    frequency_mhz: f64,
    efficiency: f64,
    tolerance: f64,
}

fn copper(diameter_mm: f64) -> RoundWire {
    RoundWire { radius_m: 0.5e-3 * diameter_mm, conductivity_s_per_m: COPPER_CONDUCTIVITY_S_PER_M }
}

#[test]
fn skin_effect() {
    let Skin { depth, depth_handbook, round_wire, gauges, .. } = data("wire/skin.toml");
    for &[mhz, depth_um, rs_ohm] in &depth.rows {
        let hz = mhz * 1e6;
        let depth_m = skin_depth_m(hz, COPPER_CONDUCTIVITY_S_PER_M);
        depth.assert_relative(&format!("depth at {mhz} MHz"), depth_m * 1e6, depth_um);
        let got_ohm = surface_resistance_ohm(hz, COPPER_CONDUCTIVITY_S_PER_M);
        depth.assert_relative(&format!("Rs at {mhz} MHz"), got_ohm, rs_ohm);
    }
    for &[mhz, depth_um] in &depth_handbook.rows {
        let depth_m = skin_depth_m(mhz * 1e6, COPPER_CONDUCTIVITY_S_PER_M);
        depth_handbook.assert_relative(&format!("depth at {mhz} MHz"), depth_m * 1e6, depth_um);
    }
    let SkinOfWire { resistance, diameter_mm, .. } = &round_wire;
    let wire = copper(*diameter_mm);
    for &[mhz, ohm_per_m] in &resistance.rows {
        let got = wire.internal_impedance_ohm_per_m(mhz * 1e6);
        resistance.assert_relative(&format!("{diameter_mm} mm at {mhz} MHz"), got.re, ohm_per_m);
    }
    resistance.assert_relative("direct current", wire.dc_resistance_ohm_per_m(), round_wire.dc_ohm_per_m);
    let inductance_nh_per_m =
        wire.internal_impedance_ohm_per_m(10e6).im / (std::f64::consts::TAU * 10e6) * 1e9;
    // Printed to four digits.
    assert!((inductance_nh_per_m - round_wire.inductance_at_10_mhz_nh_per_m).abs() < 6e-4);
    let flat_ohm_per_m =
        surface_resistance_ohm(10e6, COPPER_CONDUCTIVITY_S_PER_M) / (std::f64::consts::TAU * wire.radius_m);
    resistance.assert_relative("flat skin", flat_ohm_per_m, round_wire.thin_skin_at_10_mhz_ohm_per_m);
    for &[diameter_mm, ref ohm_per_m @ ..] in &gauges.resistance.rows {
        for (mhz, expected) in gauges.frequencies_mhz.iter().zip(ohm_per_m) {
            let got = copper(diameter_mm).internal_impedance_ohm_per_m(mhz * 1e6).re;
            gauges.resistance.assert_absolute(&format!("{diameter_mm} mm at {mhz} MHz"), got, *expected);
        }
    }
}

#[test]
fn copper_takes_its_share_of_a_half_wave() {
    let LossyHalfWave { source, diameter_mm, frequency_mhz, efficiency, tolerance } =
        data::<Skin>("wire/skin.toml").half_wave;
    let arm_m = 0.25 * SPEED_OF_LIGHT_M_PER_S / (frequency_mhz * 1e6);
    let wire = SketchWire { radius_m: 0.5e-3 * diameter_mm, ..bare(arm_m, arm_m) };
    let got = Sketch::new(wire).unwrap().at(frequency_mhz * 1e6).unwrap().wire_efficiency;
    assert!((got - efficiency).abs() < tolerance, "{got} for {efficiency} ({source})");
}

#[derive(Deserialize)]
struct Insulation {
    worked_example: Table<[f64; 5]>,
    over_earth: Table<[f64; 5]>,
    free: Table<[f64; 5]>,
}

#[test]
fn velocity_factor_of_insulated_wire() {
    let Insulation { worked_example, over_earth, free } = data("wire/insulation.toml");
    let check = |table: &Table<[f64; 5]>, surroundings: fn(f64) -> Surroundings| {
        for &[metal_mm, outer_mm, relative_permittivity, metres, expected] in &table.rows {
            let wire = InsulatedWire {
                metal_diameter_m: metal_mm * 1e-3,
                outer_diameter_m: outer_mm * 1e-3,
                relative_permittivity,
            };
            let got = wire.velocity_factor(surroundings(metres));
            table.assert_absolute(&format!("{metal_mm} mm in {outer_mm} mm"), got, expected);
        }
    };
    check(&worked_example, |height_m| Surroundings::OverEarth { height_m });
    check(&over_earth, |height_m| Surroundings::OverEarth { height_m });
    check(&free, |length_m| Surroundings::Free { length_m });
}
