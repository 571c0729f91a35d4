//! Laws of two-ports: lines, stubs, transformers and arresters, whatever the figures.

use std::f64::consts::TAU;

use num_complex::Complex64;
use physics::constants::SPEED_OF_LIGHT_M_PER_S;
use physics::line::{LossLaw, NominalLine, Piece, State};
use physics::network::{
    BuiltInTuner, CoreLoss, IdealTransformer, Stub, StubEnd, SurgeArrester, Transformer, TunerReach, TwoPort,
};
use proptest::prelude::*;

fn relative(a: f64, b: f64) -> f64 {
    (a - b).abs() / a.abs().max(b.abs()).max(f64::MIN_POSITIVE)
}

/// How far two states are apart, on a scale of 50 Ω.
fn apart(a: State, b: State) -> f64 {
    let size = |s: State| s.voltage_v.norm() + 50.0 * s.current_a.norm();
    let difference = State { voltage_v: a.voltage_v - b.voltage_v, current_a: a.current_a - b.current_a };
    size(difference) / size(a).max(size(b))
}

fn line(z0_ohm: f64, k1: f64, k2: f64) -> NominalLine {
    let loss = LossLaw { k1_db_per_100m: k1, k2_db_per_100m: k2 };
    NominalLine { z0_ohm, velocity_factor: 0.7, loss }
}

prop_compose! {
    fn passive_load()(r in -2.0..4.5_f64, x in -5e3..5e3_f64) -> Complex64 {
        Complex64::new(10_f64.powf(r), x)
    }
}

prop_compose! {
    fn piece()(
        z0 in 25.0..650.0_f64, k1 in 0.0..6.0_f64, k2 in 0.0..0.1_f64,
        frequency_hz in 1.8e6..54e6_f64, length_m in 0.1..60.0_f64,
    ) -> Piece {
        let constants = line(z0, k1, k2).constants(frequency_hz).expect("the ranges are those of lines");
        Piece::checked(constants, length_m).expect("longer than nothing")
    }
}

prop_compose! {
    fn transformer()(
        impedance_ratio in 0.05..80.0_f64, magnetising in 0.5e-6..200e-6_f64, leakage in 0.0..0.5e-6_f64,
        winding in 0.0..50e-12_f64, copper in 0.0..1.0_f64, core in 500.0..20e3_f64, exponent in -0.5..1.0_f64,
        has_core: bool,
    ) -> Transformer {
        let core = CoreLoss { resistance_ohm: core, frequency_hz: 3.5e6, exponent };
        Transformer {
            impedance_ratio, magnetising_h: magnetising, leakage_h: leakage, winding_f: winding,
            copper_ohm: copper, core: has_core.then_some(core),
        }
    }
}

prop_compose! {
    /// Four links in a row.
    fn links()(
        near in piece(), stub in piece(), transformer in transformer(), far in piece(), shorted: bool,
        capacitance_f in 0.0..20e-12_f64, frequency_hz in 1.8e6..54e6_f64,
    ) -> Vec<TwoPort> {
        let end = if shorted { StubEnd::Shorted } else { StubEnd::Open };
        let arrester = SurgeArrester { capacitance_f, firing_v: 600.0 };
        vec![
            transformer.two_port(frequency_hz).expect("the figures are those of transformers"),
            TwoPort::line(&near),
            Stub { piece: stub, end }.shunt(),
            arrester.two_port(frequency_hz).expect("the figures are those of arresters"),
            TwoPort::line(&far),
        ]
    }
}

proptest! {
    /// What a row of links does is what they do one after the other; power in is the sum of losses and power out;
    /// |Γ| stays at most 1.
    #[test]
    fn a_row_is_its_links_and_its_watts_add_up(links in links(), z in passive_load()) {
        let at_load = State::of_load(z);
        let row = TwoPort::row(&links);
        let mut state = at_load;
        let mut heat_w = 0.0;
        for link in &links {
            let carried = link.carry(state);
            let scale = state.voltage_v.norm() * state.current_a.norm();
            prop_assert!(carried.heat_w() >= -1e-12 * scale.max(carried.at_source.power_w()), "{carried:?}");
            heat_w += carried.heat_w();
            state = carried.at_source;
        }
        let all = row.carry(at_load);
        prop_assert!(apart(all.at_source, state) < 1e-9);
        prop_assert!(relative(all.at_source.power_w(), at_load.power_w() + heat_w) < 1e-9);
        prop_assert!(all.loss_db() > -1e-9);
        prop_assert!(state.gamma(50.0).norm() <= 1.0);
        let at_100_w = all.at_power(100.0);
        prop_assert!(relative(at_100_w.at_source.power_w(), 100.0) < 1e-12);
        prop_assert!(relative(at_100_w.loss_db().max(1e-6), all.loss_db().max(1e-6)) < 1e-6);
    }

    /// Everything is reciprocal; exchanging the sides twice changes nothing; what a current into one side does to the
    /// open other side is the same from either side; walking back gives what was there.
    #[test]
    fn reversing_a_two_port(links in links(), z in passive_load()) {
        for port in links.iter().copied().chain([TwoPort::row(&links)]) {
            let size = (port.a * port.d).norm().max(1.0);
            prop_assert!((port.determinant() - 1.0).norm() < 1e-9 * size);
            prop_assert!(port.reversed().reversed() == port);
            prop_assert!((port.reversed().determinant() - 1.0).norm() < 1e-9 * size);
            // Z₂₁ = V_load/I_source at open load = 1/C, from either side
            let forward = port.toward_source(State::open()).current_a;
            let backward = port.reversed().toward_source(State::open()).current_a;
            prop_assert!((forward - backward).norm() <= 1e-12 * forward.norm());
            let at_load = State::of_load(z);
            let back = port.toward_load(port.toward_source(at_load));
            prop_assert!(apart(back, at_load) < 1e-8 * size);
        }
    }

    /// A row reversed is the reversed links in the opposite order.
    #[test]
    fn a_row_reversed_is_its_links_reversed_backward(links in links(), z in passive_load()) {
        let mut turned: Vec<TwoPort> = links.iter().map(TwoPort::reversed).collect();
        turned.reverse();
        let at_load = State::of_load(z);
        let one = TwoPort::row(&links).reversed().toward_source(at_load);
        let other = TwoPort::row(&turned).toward_source(at_load);
        prop_assert!(apart(one, other) < 1e-9);
    }

    #[test]
    fn a_line_is_the_same_as_a_piece_and_as_a_two_port(piece in piece(), z in passive_load()) {
        let at_load = State::of_load(z);
        prop_assert!(apart(TwoPort::line(&piece).toward_source(at_load), piece.toward_source(at_load)) < 1e-12);
        prop_assert!(relative(TwoPort::line(&piece).a.norm(), TwoPort::line(&piece).reversed().a.norm()) < 1e-12);
    }

    /// Without loss a stub's reactance returns after half a wave, an open quarter wave is a short and the other way
    /// round, and open and shorted stubs of one length multiply to Z₀².
    #[test]
    fn a_stub_has_the_period_of_half_a_wave(
        z0 in 25.0..650.0_f64, frequency_hz in 1.8e6..54e6_f64, share in 0.02..0.23_f64, waves in 1_u32..6,
    ) {
        let constants = line(z0, 0.0, 0.0).constants(frequency_hz).unwrap();
        let wavelength_m = 0.7 * SPEED_OF_LIGHT_M_PER_S / frequency_hz;
        let stub = |length, end| {
            let piece = Piece::checked(constants, length * wavelength_m).unwrap();
            Stub { piece, end }.input().impedance_ohm()
        };
        for end in [StubEnd::Open, StubEnd::Shorted] {
            let longer = stub(share + 0.5 * f64::from(waves), end);
            prop_assert!((stub(share, end) - longer).norm() < 1e-10 * stub(share, end).norm().max(z0));
        }
        let (open, shorted) = (stub(share, StubEnd::Open), stub(share, StubEnd::Shorted));
        // X = −Z₀·cot βl and Z₀·tan βl
        let tangent = (TAU * share).tan();
        prop_assert!((open - Complex64::new(0.0, -z0 / tangent)).norm() < 1e-10 * open.norm());
        prop_assert!((shorted - Complex64::new(0.0, z0 * tangent)).norm() < 1e-10 * shorted.norm());
        prop_assert!(stub(0.25, StubEnd::Open).norm() < 1e-12 * z0);
        prop_assert!(stub(0.25, StubEnd::Shorted).norm() > 1e12 * z0);
    }

    /// A shorted quarter wave across the line changes nothing, nor does an open half wave in series kill it.
    #[test]
    fn stubs_stand_across_or_in_series(piece in piece(), shorted: bool, z in passive_load()) {
        let end = if shorted { StubEnd::Shorted } else { StubEnd::Open };
        let stub = Stub { piece, end };
        let input = stub.input().impedance_ohm();
        let series = stub.series().toward_source(State::of_load(z)).impedance_ohm();
        prop_assert!((series - (z + input)).norm() <= 1e-12 * (z.norm() + input.norm()));
        let across = stub.shunt().toward_source(State::of_load(z));
        let expected = z.inv() + input.inv();
        prop_assert!((across.current_a / across.voltage_v - expected).norm() <= 1e-10 * expected.norm());
        // the volts along an open stub are at least those at its input
        prop_assert!(stub.peaks_at(100.0).voltage_v > 100.0 * (1.0 - 1e-3));
    }

    /// Power in = power out + core + copper.
    #[test]
    fn a_transformers_watts_add_up(
        transformer in transformer(), z in passive_load(), frequency_hz in 1.8e6..54e6_f64,
    ) {
        let at_load = State::of_load(z);
        let carried = transformer.two_port(frequency_hz).unwrap().carry(at_load);
        let stress = transformer.stress(at_load, frequency_hz).unwrap();
        let expected = at_load.power_w() + stress.core_w + stress.copper_w;
        prop_assert!(relative(carried.at_source.power_w(), expected) < 1e-9, "{carried:?} {stress:?}");
        prop_assert!(relative(stress.source_peak_v, carried.at_source.voltage_v.norm()) < 1e-12);
    }

    /// With everything ideal it is the ideal transformer.
    #[test]
    fn an_ideal_transformer_is_the_limit(ratio in 0.01..100.0_f64, z in passive_load(), frequency_hz in 1.8e6..54e6_f64) {
        let at_load = State::of_load(z);
        let ideal = IdealTransformer { impedance_ratio: ratio }.toward_source(at_load);
        let wound = Transformer::ideal(ratio).two_port(frequency_hz).unwrap().toward_source(at_load);
        prop_assert!(apart(ideal, wound) < 1e-12);
    }
}

#[test]
fn magnetising_inductance_limits_the_low_bands_and_leakage_the_high_ones() {
    let (magnetising_h, leakage_h) = (5e-6, 0.15e-6);
    let swr = |transformer: Transformer, frequency_hz: f64| {
        transformer.two_port(frequency_hz).unwrap().toward_source(State::of_load(2450.0.into())).swr(50.0)
    };
    // by hand: jX across 50 Ω has |Γ| = 1/|1 + 2j·X/50|, jX in series with 50 Ω |X/50|/|2 + j·X/50|
    let of_gamma = |gamma: f64| (1.0 + gamma) / (1.0 - gamma);
    let across = |f: f64| of_gamma((1.0 + (2.0 * TAU * f * magnetising_h / 50.0).powi(2)).sqrt().recip());
    let in_series = |f: f64| {
        let x = TAU * f * leakage_h / 50.0;
        of_gamma(x / (4.0 + x * x).sqrt())
    };
    let only_magnetising = Transformer { magnetising_h, ..Transformer::ideal(49.0) };
    let only_leakage = Transformer { leakage_h, ..Transformer::ideal(49.0) };
    for f in [1.8e6, 5e6, 30e6] {
        assert!(relative(swr(only_magnetising, f), across(f)) < 1e-9);
        assert!(relative(swr(only_leakage, f), in_series(f)) < 1e-9);
    }
    let both = Transformer { leakage_h, ..only_magnetising };
    assert!(swr(both, 5e6) < swr(both, 1.8e6) && swr(both, 5e6) < swr(both, 30e6));
}

#[test]
fn what_makes_no_part_is_refused_in_words() {
    let words = |transformer: Transformer| transformer.two_port(7e6).unwrap_err().to_string();
    for ratio in [0.0, -4.0, f64::NAN] {
        let text = words(Transformer::ideal(ratio));
        assert_eq!(
            text,
            format!("the transformer's impedance ratio is {ratio}; it must be greater than zero")
        );
    }
    let text = words(Transformer { magnetising_h: 0.0, ..Transformer::ideal(4.0) });
    assert_eq!(text, "the transformer's magnetising inductance in henrys is 0; it must be greater than zero");
    let text = words(Transformer { leakage_h: -1.0, ..Transformer::ideal(4.0) });
    assert_eq!(text, "the transformer's leakage inductance in henrys is -1; it must be zero or more");
    let core = CoreLoss { resistance_ohm: -5.0, frequency_hz: 1e6, exponent: 0.0 };
    let text = words(Transformer { core: Some(core), ..Transformer::ideal(4.0) });
    assert_eq!(text, "the core's parallel resistance in ohms is -5; it must be greater than zero");
    assert!(Transformer::ideal(4.0).two_port(0.0).is_err());

    let arrester = SurgeArrester { capacitance_f: 1e-12, firing_v: 0.0 };
    let text = arrester.two_port(7e6).unwrap_err().to_string();
    assert_eq!(text, "the arrester's firing voltage in volts is 0; it must be greater than zero");

    let constants = line(50.0, 1.0, 0.0).constants(7e6).unwrap();
    for (length_m, text) in [(0.0, "0"), (-3.0, "-3")] {
        let error = Piece::checked(constants, length_m).unwrap_err().to_string();
        assert_eq!(error, format!("the line's length in metres is {text}; it must be greater than zero"));
    }
    let gain = line(50.0, -1.0, 0.0).constants(7e6).unwrap_err().to_string();
    assert_eq!(gain, "the line's k1 in dB per 100 m is -1; it must be zero or more");
    let tuner = BuiltInTuner { reference_ohm: 50.0, largest_swr: 0.5 };
    assert_eq!(
        tuner.check().unwrap_err().to_string(),
        "the tuner's largest SWR is 0.5; it must be 1 or more"
    );
}

#[test]
fn an_arrester_fires_at_its_voltage_and_a_tuner_ends_at_its_ratio() {
    let arrester = SurgeArrester { capacitance_f: 1.5e-12, firing_v: 600.0 };
    // 1500 W into 50 Ω: 387 V peak; into 450 Ω: 1162 V
    let state = |r: f64| State::of_load(r.into()).scaled((2.0 * 1500.0 / r).sqrt());
    assert!((arrester.share_of_firing(state(50.0)) - 387.3 / 600.0).abs() < 1e-3);
    assert!(arrester.share_of_firing(state(450.0)) > 1.0);
    let tuner = BuiltInTuner { reference_ohm: 50.0, largest_swr: 3.0 };
    tuner.check().unwrap();
    assert!(matches!(tuner.reach(state(149.9)), TunerReach::Within { swr } if (swr - 2.998).abs() < 1e-9));
    assert!(matches!(tuner.reach(state(150.1)), TunerReach::Beyond { .. }));
    assert!(matches!(tuner.reach(State::open()), TunerReach::Beyond { swr, .. } if swr.is_infinite()));
}
