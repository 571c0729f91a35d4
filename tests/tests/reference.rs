//! Free-space and mirror cases of an independent method (a mixed-potential Galerkin code with polynomial currents and
//! exact tubular kernel; numerical references of this project's own, not published values), through the window's own
//! path. Bars as given with the cases: |Y − Y_ref − jωC|/|Y_ref| with the best C within ±0.25 pF taken out, 0.5 % (cases
//! with a coil 1.5 %); conductance 0.5 % (loaded cases 3 %); efficiency 0.002; gain 0.05 dB above −20 dBi.

use checks::reference::{Answer, Case, Cases, answer};
use num_complex::Complex64;

fn cases() -> Vec<Case> {
    let path = concat!(env!("CARGO_MANIFEST_DIR"), "/data/reference/freespace.json");
    let text = std::fs::read_to_string(path).expect("the cases are part of the repository");
    serde_json::from_str::<Cases>(&text).expect("the cases are in their layout").cases
}

/// |Y − Y_ref − jωC|/|Y_ref| with the best C within ±0.25 pF.
fn core(case: &Case, answer: &Answer) -> f64 {
    let y = Complex64::new(answer.r_ohm, answer.x_ohm).inv();
    let reference = Complex64::new(case.reference.r_ohm, case.reference.x_ohm).inv();
    let most_s = std::f64::consts::TAU * case.frequency_hz * 0.25e-12;
    let off = y - reference;
    Complex64::new(off.re, off.im - off.im.clamp(-most_s, most_s)).norm() / reference.norm()
}

fn conductance_off(case: &Case, answer: &Answer) -> f64 {
    let y = Complex64::new(answer.r_ohm, answer.x_ohm).inv();
    let reference = Complex64::new(case.reference.r_ohm, case.reference.x_ohm).inv();
    (y.re / reference.re - 1.0).abs()
}

#[test]
fn every_case_is_inside_its_bars() {
    let mut outside = Vec::new();
    for case in cases() {
        let answer = answer(&case).unwrap_or_else(|error| panic!("{error}"));
        let loaded = case.id.starts_with('P');
        let coil = ["P02", "P03"].contains(&case.id.as_str());
        let (core, conductance) = (core(&case, &answer), conductance_off(&case, &answer));
        let samples = answer.gain_samples_dbi.as_deref().unwrap_or_default();
        let gain = case
            .reference
            .gain_samples_dbi
            .iter()
            .zip(samples)
            .filter(|(reference, _)| reference.gain_dbi > -20.0)
            .map(|(reference, dbi)| (dbi - reference.gain_dbi).abs())
            .chain(answer.peak_gain_dbi.map(|dbi| (dbi - case.reference.peak_gain_dbi).abs()))
            .fold(0.0, f64::max);
        let efficiency = answer
            .radiation_efficiency
            .map_or(f64::INFINITY, |share| (share - case.reference.efficiency).abs());
        let balance = answer.energy_balance.map_or(f64::INFINITY, |sum| (sum - 1.0).abs());
        let line = format!(
            "{}: core {:.3} %, dG {:.3} %, gain {gain:.4} dB, efficiency {efficiency:.5}, balance {:.3} %, mesh {:.3} %, {} unknowns",
            case.id,
            100.0 * core,
            100.0 * conductance,
            100.0 * balance,
            100.0 * answer.mesh_error,
            answer.unknowns
        );
        println!("{line}");
        let inside = core <= if coil { 0.015 } else { 0.005 }
            && conductance <= if loaded { 0.03 } else { 0.005 }
            && samples.len() == case.reference.gain_samples_dbi.len()
            && gain <= 0.05
            && efficiency <= 0.002
            && balance <= 0.003;
        if !inside {
            outside.push(line);
        }
    }
    assert!(outside.is_empty(), "outside the bars:\n{}", outside.join("\n"));
}
