//! Facts of the trade: common practice.

use checks::{Table, data};
use num_complex::Complex64;
use physics::constants::SPEED_OF_LIGHT_M_PER_S;
use physics::line::{gamma_of_impedance, swr_of_gamma};
use physics::sinusoid::{HarmonicWire, MarkKind, Sketch, SketchWire, WavePoint};
use serde::Deserialize;

use crate::common::{bare, thin};

const FEET_PER_METRE: f64 = 1.0 / 0.3048;

fn swr(z_ohm: Complex64, reference_ohm: f64) -> f64 {
    swr_of_gamma(gamma_of_impedance(z_ohm, reference_ohm).norm())
}

#[derive(Deserialize)]
struct Trade {
    diameter_mm: f64,
    half_wave: Table<[f64; 3]>,
    third_resonance: ThirdResonance,
    second_harmonic: SecondHarmonic,
    half_wave_on_line: HalfWaveOnLine,
}

#[derive(Deserialize)]
struct ThirdResonance {
    source: String,
    above_three_times: [f64; 2],
    usable_swr: [[f64; 2]; 2],
}

#[derive(Deserialize)]
struct SecondHarmonic {
    source: String,
    least_resistance_ohm: f64,
    very_poor_swr: f64,
    line_ohm: f64,
    line_swr: [f64; 2],
}

#[derive(Deserialize)]
struct HalfWaveOnLine {
    source: String,
    line_ohm: f64,
    swr: [f64; 2],
}

impl Trade {
    fn harmonic(&self, harmonic: u32) -> HarmonicWire {
        HarmonicWire { harmonic, radius_m: 0.5e-3 * self.diameter_mm, velocity_factor: 1.0 }
    }

    /// A half wave for the given frequency, fed at a share of its length.
    fn half_wave(&self, frequency_hz: f64, share: f64) -> Sketch {
        let length_m = self.harmonic(1).resonant_length_m(frequency_hz).expect("thin wires resonate");
        let wire = bare(share * length_m, (1.0 - share) * length_m);
        Sketch::new(SketchWire { radius_m: 0.5e-3 * self.diameter_mm, ..wire }).expect("a usual wire")
    }
}

fn within(what: &str, value: f64, [low, high]: [f64; 2], source: &str) {
    assert!(low <= value && value <= high, "{what}: {value} is not {low} to {high} ({source})");
}

/// Bands on which half waves are commonly hung, Hz.
const FUNDAMENTALS_HZ: [f64; 4] = [1.85e6, 3.6e6, 7.1e6, 14.2e6];

#[test]
fn a_half_wave_has_its_usual_length() {
    let trade: Trade = data("wire/trade.toml");
    for &[mhz, metres, feet] in &trade.half_wave.rows {
        let got_m = trade.harmonic(1).resonant_length_m(mhz * 1e6).unwrap();
        trade.half_wave.assert_relative(&format!("{mhz} MHz, m"), got_m, metres);
        trade.half_wave.assert_relative(&format!("{mhz} MHz, ft"), got_m * FEET_PER_METRE, feet);
        let estimate_m = trade.harmonic(1).resonant_length_estimate_m(mhz * 1e6);
        trade.half_wave.assert_relative(&format!("{mhz} MHz, estimate"), estimate_m, metres);
    }
}

#[test]
fn near_three_times_its_frequency_a_half_wave_is_usable_on_coax_again() {
    let trade: Trade = data("wire/trade.toml");
    let ThirdResonance { source, above_three_times, usable_swr } = &trade.third_resonance;
    for first_hz in FUNDAMENTALS_HZ {
        let wire = trade.half_wave(first_hz, 0.5);
        let third_hz = trade.harmonic(3).resonant_frequency_hz(wire.length_m()).unwrap();
        within(
            "third resonance over three times the first",
            third_hz / (3.0 * first_hz),
            *above_three_times,
            source,
        );
        let z_ohm = wire.at(third_hz).unwrap().impedance_ohm;
        for &[reference_ohm, usable_swr] in usable_swr {
            let swr = swr(z_ohm, reference_ohm);
            assert!(swr < usable_swr, "{z_ohm}: {swr} on {reference_ohm} Ω ({source})");
        }
    }
}

#[test]
fn at_twice_its_frequency_a_half_wave_is_hopeless_on_coax_and_at_home_on_open_line() {
    let trade: Trade = data("wire/trade.toml");
    let SecondHarmonic { source, least_resistance_ohm, very_poor_swr, line_ohm, line_swr } =
        &trade.second_harmonic;
    for first_hz in FUNDAMENTALS_HZ {
        let z_ohm = trade.half_wave(first_hz, 0.5).at(2.0 * first_hz).unwrap().impedance_ohm;
        assert!(z_ohm.re > *least_resistance_ohm, "{z_ohm} ({source})");
        for reference_ohm in [50.0, 75.0] {
            let swr = swr(z_ohm, reference_ohm);
            assert!(swr > *very_poor_swr, "{z_ohm}: {swr} on {reference_ohm} Ω ({source})");
        }
        within("SWR on open line", swr(z_ohm, *line_ohm), *line_swr, source);
    }
}

#[test]
fn a_half_wave_is_about_six_to_one_on_open_line() {
    let trade: Trade = data("wire/trade.toml");
    let HalfWaveOnLine { source, line_ohm, swr: usual } = &trade.half_wave_on_line;
    within("thin half wave", swr(Complex64::new(thin(0.5).re, 0.0), *line_ohm), *usual, source);
    for first_hz in FUNDAMENTALS_HZ {
        let z_ohm = trade.half_wave(first_hz, 0.5).at(first_hz).unwrap().impedance_ohm;
        within("half wave", swr(z_ohm, *line_ohm), *usual, source);
    }
}

/// Source: common practice.
#[test]
fn a_harmonic_has_as_many_current_loops_as_its_number() {
    let trade: Trade = data("wire/trade.toml");
    for first_hz in FUNDAMENTALS_HZ {
        // A fifth is off centre and off the nodes of the harmonics looked at.
        for share in [0.5, 0.2] {
            let wire = trade.half_wave(first_hz, share);
            for number in 1..=4_u32 {
                let marks = wire.marks(&wire.at(first_hz * f64::from(number)).unwrap());
                let loops = marks.iter().filter(|mark| mark.kind == MarkKind::CurrentLoop).count();
                assert_eq!(loops, number as usize, "{first_hz} Hz × {number}, fed at {share}: {marks:?}");
                assert_eq!(marks.len(), 2 * loops + 1, "a node beside every loop: {marks:?}");
            }
        }
    }
}

/// Source: common practice.
#[test]
fn the_centre_is_a_loop_at_odd_harmonics_and_a_node_at_even_ones() {
    let trade: Trade = data("wire/trade.toml");
    for first_hz in FUNDAMENTALS_HZ {
        let wire = trade.half_wave(first_hz, 0.5);
        for number in 1..=8_u32 {
            if first_hz * f64::from(number) > 100e6 {
                continue;
            }
            let marks = wire.marks(&wire.at(first_hz * f64::from(number)).unwrap());
            let centre = marks[marks.len() / 2];
            assert!((centre.arc_m - 0.5 * wire.length_m()).abs() < 1e-6, "{marks:?}");
            let expected = if number % 2 == 1 { MarkKind::CurrentLoop } else { MarkKind::CurrentNode };
            assert_eq!(centre.kind, expected, "{first_hz} Hz × {number}");
        }
    }
}

/// Source: common practice. Looked for in the wave itself, not in the marks.
#[test]
fn voltage_loops_sit_on_current_nodes() {
    let trade: Trade = data("wire/trade.toml");
    for number in [1, 2, 3, 4] {
        let wire = trade.half_wave(7.1e6, 0.5);
        let answer = wire.at(7.1e6 * f64::from(number)).unwrap();
        let length_m = wire.length_m();
        let steps = 4000;
        let arcs_m: Vec<f64> =
            (0..=steps).map(|step| length_m * f64::from(step) / f64::from(steps)).collect();
        let wave = wire.standing_wave(&answer, &arcs_m);
        let quarter_m = 0.25 * SPEED_OF_LIGHT_M_PER_S / answer.frequency_hz;
        for mark in wire.marks(&answer) {
            // The largest and smallest size of each quantity within half a quarter wave of the mark.
            let near = || wave.iter().filter(|point| (point.arc_m - mark.arc_m).abs() < 0.5 * quarter_m);
            let volts = |point: &&WavePoint| point.potential_v.norm();
            let amps = |point: &&WavePoint| point.current_a.norm();
            let (crest, trough) = match mark.kind {
                MarkKind::CurrentNode => (
                    near().max_by(|a, b| volts(a).total_cmp(&volts(b))),
                    near().min_by(|a, b| amps(a).total_cmp(&amps(b))),
                ),
                MarkKind::CurrentLoop => (
                    near().max_by(|a, b| amps(a).total_cmp(&amps(b))),
                    near().min_by(|a, b| volts(a).total_cmp(&volts(b))),
                ),
            };
            for point in [crest, trough] {
                let off_m = (point.unwrap().arc_m - mark.arc_m).abs();
                assert!(off_m < 0.05 * quarter_m, "harmonic {number}: {mark:?} is {off_m} m from {point:?}");
            }
        }
    }
}
