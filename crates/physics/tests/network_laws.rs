//! Laws that every network must keep, whatever the figures.

use num_complex::Complex64;
use physics::line::{State, loss_db};
use physics::network::{
    IdealTransformer, LNetwork, LProblem, NetworkError, Parts, Sense, Setting, l_network,
};
use proptest::prelude::*;

fn relative(a: f64, b: f64) -> f64 {
    (a - b).abs() / a.abs().max(b.abs()).max(f64::MIN_POSITIVE)
}

/// Parts without limits.
fn endless(coil_q: f64, capacitor_q: f64) -> Parts {
    Parts { inductance_max_h: f64::INFINITY, capacitance_max_f: f64::INFINITY, coil_q, capacitor_q }
}

prop_compose! {
    fn passive_load()(r in -1.0..4.5_f64, x in -5e3..5e3_f64) -> Complex64 {
        Complex64::new(10_f64.powf(r), x)
    }
}

prop_compose! {
    fn problem()(
        load_ohm in passive_load(), frequency_hz in 1.8e6..54e6_f64, target_ohm in 10.0..300.0_f64,
        coil_q in 20.0..1000.0_f64, capacitor_q in 100.0..10_000.0_f64,
    ) -> LProblem {
        LProblem { frequency_hz, load_ohm, target_ohm, parts: endless(coil_q, capacitor_q) }
    }
}

/// The network of a match, carrying 1 A through the load.
fn passage(problem: &LProblem, setting: Setting) -> (State, physics::network::Passage) {
    let at_load = State::of_load(problem.load_ohm);
    (at_load, LNetwork::new(&problem.parts, setting, problem.frequency_hz).toward_source(at_load))
}

proptest! {
    #[test]
    fn the_setting_really_gives_the_target(problem in problem()) {
        let found = match l_network(&problem) {
            Err(NetworkError::NoSetting { .. }) => return Ok(()),
            other => other.unwrap(),
        };
        let (at_load, passage) = passage(&problem, found.setting);
        let seen = passage.at_source.impedance_ohm();
        prop_assert!((seen - problem.target_ohm).norm() < 1e-7 * problem.target_ohm, "{seen}");
        prop_assert!(relative(found.loss_db, loss_db(passage.at_source, at_load)) < 1e-7);
        // The stated stress is that of the network at 1 W.
        let scale = passage.at_source.power_w().sqrt().recip();
        let stress = found.stress(1.0);
        prop_assert!(relative(stress.coil_rms_a, passage.stress.coil_rms_a * scale) < 1e-7);
        prop_assert!(relative(stress.capacitor_peak_v, passage.stress.capacitor_peak_v * scale) < 1e-7);
        prop_assert!(relative(found.stress(400.0).coil_rms_a, 20.0 * stress.coil_rms_a) < 1e-12);
    }

    /// Power in = power out + heat in the coil's resistance and the capacitor's conductance.
    #[test]
    fn power_in_is_power_out_plus_heat(
        problem in problem(), l in 0.0..50e-6_f64, c in 0.0..2e-9_f64, across_load: bool,
    ) {
        let sense = if across_load { Sense::CapacitorAcrossLoad } else { Sense::CapacitorAcrossSource };
        let (at_load, passage) = passage(&problem, Setting { sense, inductance_h: l, capacitance_f: c });
        let omega = std::f64::consts::TAU * problem.frequency_hz;
        let coil = passage.stress.coil_rms_a.powi(2) * omega * l / problem.parts.coil_q;
        let capacitor = 0.5 * passage.stress.capacitor_peak_v.powi(2) * omega * c / problem.parts.capacitor_q;
        let expected = at_load.power_w() + coil + capacitor;
        prop_assert!(relative(passage.at_source.power_w(), expected) < 1e-9);
    }

    /// Parts without loss match any passive load and lose nothing.
    #[test]
    fn ideal_parts_match_everything(problem in problem()) {
        let problem = LProblem { parts: endless(f64::INFINITY, f64::INFINITY), ..problem };
        let found = l_network(&problem).unwrap();
        prop_assert!(found.loss_db.abs() < 1e-9);
        let seen = passage(&problem, found.setting).1.at_source.impedance_ohm();
        prop_assert!((seen - problem.target_ohm).norm() < 1e-6 * problem.target_ohm, "{seen}");
    }

    /// No setting of a fine grid around the whole range that comes close to the target loses clearly less.
    #[test]
    fn no_other_setting_loses_less(problem in problem()) {
        let Ok(found) = l_network(&problem) else { return Ok(()) };
        let omega = std::f64::consts::TAU * problem.frequency_hz;
        for sense in [Sense::CapacitorAcrossLoad, Sense::CapacitorAcrossSource] {
            for (x_step, b_step) in (0..60).flat_map(|x| (0..60).map(move |b| (x, b))) {
                let spread = |n: i32| 10_f64.powf(f64::from(n) / 10.0 - 3.0);
                let setting = Setting {
                    sense,
                    inductance_h: problem.target_ohm * spread(x_step) / omega,
                    capacitance_f: spread(b_step) / problem.target_ohm / omega,
                };
                let (at_load, passage) = passage(&problem, setting);
                if passage.at_source.swr(problem.target_ohm) < 1.05 {
                    let loss = loss_db(passage.at_source, at_load);
                    prop_assert!(loss > 0.8 * found.loss_db - 0.02, "{setting:?} {loss} {found:?}");
                }
            }
        }
    }

    #[test]
    fn a_transformer_keeps_the_power_and_walks_back(z in passive_load(), ratio in 0.01..100.0_f64) {
        let transformer = IdealTransformer { impedance_ratio: ratio };
        let at_load = State::of_load(z);
        let at_source = transformer.toward_source(at_load);
        prop_assert!(relative(at_source.power_w(), at_load.power_w()) < 1e-12);
        prop_assert!((at_source.impedance_ohm() * ratio - z).norm() < 1e-12 * z.norm());
        let back = transformer.toward_load(at_source);
        prop_assert!((back.voltage_v - at_load.voltage_v).norm() < 1e-12 * z.norm());
        prop_assert!((back.current_a - at_load.current_a).norm() < 1e-12);
    }
}

#[test]
fn a_load_that_matches_already_needs_nothing() {
    for target_ohm in [50.0, 75.3, 12.7, 600.1] {
        for (coil_q, capacitor_q) in [(200.0, 1000.0), (f64::INFINITY, f64::INFINITY)] {
            let parts = endless(coil_q, capacitor_q);
            let problem = LProblem { frequency_hz: 7.1e6, load_ohm: target_ohm.into(), target_ohm, parts };
            let found = l_network(&problem).unwrap();
            assert!(found.loss_db.abs() < 1e-12, "{found:?}");
            assert!(found.setting.inductance_h < 1e-15 && found.setting.capacitance_f < 1e-18, "{found:?}");
        }
    }
}

#[test]
fn parts_that_are_too_small_say_what_would_be_needed() {
    let mut problem = LProblem {
        frequency_hz: 1.85e6,
        load_ohm: Complex64::new(12.0, -900.0),
        target_ohm: 50.0,
        parts: Parts {
            inductance_max_h: 28e-6,
            capacitance_max_f: 3000e-12,
            coil_q: 200.0,
            capacitor_q: 1000.0,
        },
    };
    let error = l_network(&problem).unwrap_err();
    let NetworkError::CoilTooSmall { needed_h, largest_h } = error else { panic!("{error:?}") };
    assert!(needed_h > largest_h);
    assert!(error.to_string().starts_with("the coil would need "), "{error}");
    // With what it asks for, it matches.
    problem.parts.inductance_max_h = needed_h * (1.0 + 1e-12);
    let found = l_network(&problem).unwrap();
    assert!(relative(found.setting.inductance_h, needed_h) < 1e-9);

    problem.parts.capacitance_max_f = 100e-12;
    assert!(matches!(l_network(&problem).unwrap_err(), NetworkError::CapacitorTooSmall { .. }));
    problem.parts.inductance_max_h = 1e-6;
    assert!(matches!(l_network(&problem).unwrap_err(), NetworkError::BothTooSmall { .. }));

    problem.load_ohm = Complex64::new(-1.0, 0.0);
    let text = l_network(&problem).unwrap_err().to_string();
    assert_eq!(text, "the load's resistance in ohms is -1; it must be greater than zero");
}
