//! Cases of an independent method (a mixed-potential Galerkin code with polynomial currents and exact tubular kernel, over
//! soil with exact Sommerfeld functions; numerical references of this project's own, not published values), through the
//! window's own path, inside the bars given with the cases (data/reference/README.md).

use checks::reference::{Answer, Case, Cases, answer};
use num_complex::Complex64;

fn cases(file: &str) -> Vec<Case> {
    let path = format!("{}/data/reference/{file}", env!("CARGO_MANIFEST_DIR"));
    let text = std::fs::read_to_string(path).expect("the cases are part of the repository");
    serde_json::from_str::<Cases>(&text).expect("the cases are in their layout").cases
}

/// How far an answer is from its reference.
struct Off {
    /// |Y − Y_ref − jωC|/|Y_ref| with the best C within ±0.25 pF.
    core: f64,
    conductance: f64,
    /// Of all directions above −20 dBi and the peak, dB.
    gain_db: f64,
    efficiency: f64,
    balance: f64,
    /// |(Z − Z_free) − (Z_ref − Z_ref,free)|/|Z_ref|
    change: Option<f64>,
}

impl Off {
    fn of(case: &Case, answer: &Answer) -> Self {
        let (z, z_ref) = (
            Complex64::new(answer.r_ohm, answer.x_ohm),
            Complex64::new(case.reference.r_ohm, case.reference.x_ohm),
        );
        let (y, y_ref) = (z.inv(), z_ref.inv());
        let most_s = std::f64::consts::TAU * case.frequency_hz * 0.25e-12;
        let off = y - y_ref;
        let without_gap = Complex64::new(off.re, off.im - off.im.clamp(-most_s, most_s));
        assert_eq!(answer.gain_samples_dbi.len(), case.reference.gain_samples_dbi.len(), "{}", case.id);
        let gains = case.reference.gain_samples_dbi.iter().zip(&answer.gain_samples_dbi);
        let gain_db = gains
            .filter(|(reference, _)| reference.gain_dbi > -20.0)
            .map(|(reference, dbi)| (dbi - reference.gain_dbi).abs())
            .chain(case.reference.peak_gain_dbi.map(|peak| (answer.peak_gain_dbi - peak).abs()))
            .fold(0.0, f64::max);
        let free = |r: Option<f64>, x: Option<f64>| r.zip(x).map(|(r, x)| Complex64::new(r, x));
        let free_ref = free(case.reference.free_space_r_ohm, case.reference.free_space_x_ohm);
        let free = free(answer.free_space_r_ohm, answer.free_space_x_ohm);
        Self {
            core: without_gap.norm() / y_ref.norm(),
            conductance: (y.re / y_ref.re - 1.0).abs(),
            gain_db,
            efficiency: (answer.radiation_efficiency - case.reference.efficiency).abs(),
            balance: (answer.energy_balance - 1.0).abs(),
            change: free
                .zip(free_ref)
                .map(|(free, free_ref)| ((z - free) - (z_ref - free_ref)).norm() / z_ref.norm()),
        }
    }

    fn line(&self, case: &Case, answer: &Answer) -> String {
        format!(
            "{}: core {:.3} %, dG {:.3} %, change {:.3} %, gain {:.4} dB, efficiency {:.5}, balance {:.3} %, mesh {:.3} %, {} unknowns",
            case.id,
            100.0 * self.core,
            100.0 * self.conductance,
            100.0 * self.change.unwrap_or(0.0),
            self.gain_db,
            self.efficiency,
            100.0 * self.balance,
            100.0 * answer.mesh_error,
            answer.unknowns
        )
    }
}

/// Answers every case and names those outside.
fn check(file: &str, inside: impl Fn(&Case, &Off) -> bool) {
    let cases = cases(file);
    assert!(cases.len() > 20, "{} cases", cases.len());
    let mut outside = Vec::new();
    for case in cases {
        let answer = answer(&case).unwrap_or_else(|error| panic!("{error}"));
        let off = Off::of(&case, &answer);
        let line = off.line(&case, &answer);
        println!("{line}");
        if !inside(&case, &off) {
            outside.push(line);
        }
    }
    assert!(outside.is_empty(), "outside the bars:\n{}", outside.join("\n"));
}

#[test]
fn every_case_without_soil_is_inside_its_bars() {
    check("freespace.json", |case, off| {
        let loaded = case.id.starts_with('P');
        // A coil has its own local capacitance.
        let coil = ["P02", "P03"].contains(&case.id.as_str());
        off.core <= if coil { 0.015 } else { 0.005 }
            && off.conductance <= if loaded { 0.03 } else { 0.005 }
            && off.gain_db <= 0.05
            && off.efficiency <= 0.002
            && off.balance <= 0.003
    });
}

#[test]
fn every_case_over_soil_is_inside_its_bars() {
    check("earth.json", |case, off| {
        // At a full wave the change is the difference of two large numbers.
        let full_wave = case.reference.r_ohm > 2000.0;
        let change = if case.id == "g26" { 0.02 } else { 0.007 };
        off.core <= 0.007
            && off.conductance <= 0.007
            && (full_wave || off.change.is_some_and(|off| off <= change))
            && off.gain_db <= 0.1
            && off.efficiency <= 0.005
            && off.balance <= 0.01
    });
}
