//! Resonance of wires of finite thickness.

use checks::data;
use physics::sinusoid::{HarmonicWire, Sketch, SketchWire};
use serde::Deserialize;

use crate::common::{METRE_WAVE_HZ, bare};

#[derive(Deserialize)]
struct Resonance {
    half_wave: ResonanceTable,
    thick: ResonanceTable,
    full_wave: ResonanceTable,
}

#[derive(Deserialize)]
struct ResonanceTable {
    source: String,
    length_tolerance: f64,
    resistance_tolerance: f64,
    rows: Vec<[f64; 3]>,
}

#[test]
fn resonance_of_wires_of_finite_thickness() {
    let Resonance { half_wave, thick, full_wave } = data("wire/resonance.toml");
    for (harmonic, table) in [(1, &half_wave), (1, &thick), (2, &full_wave)] {
        let ResonanceTable { source, length_tolerance, resistance_tolerance, rows } = table;
        for &[slenderness, length, r_ohm] in rows {
            let radius = 0.5 * length / slenderness;
            let wire = HarmonicWire { harmonic, radius_m: radius, velocity_factor: 1.0 };
            let got_length = wire.resonant_length_m(METRE_WAVE_HZ).unwrap();
            assert!(
                (got_length / length - 1.0).abs() < *length_tolerance,
                "{got_length} for {length} ({source})"
            );
            // The sketch itself works up to 100 MHz.
            let scale = METRE_WAVE_HZ / 10e6;
            let arm_m = 0.5 * got_length * scale;
            let fed = SketchWire {
                radius_m: radius * scale,
                conductivity_s_per_m: f64::INFINITY,
                ..bare(arm_m, arm_m)
            };
            let got = Sketch::new(fed).unwrap().at(10e6).unwrap().impedance_ohm;
            assert!(got.im.abs() < 1e-6 * got.re, "{got} is no resonance");
            assert!((got.re / r_ohm - 1.0).abs() < *resistance_tolerance, "{got} for {r_ohm} ({source})");
        }
    }
}
