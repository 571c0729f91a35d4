//! Laws that every line and every conversion must keep, whatever the figures.

use num_complex::Complex64;
use physics::line::{
    AttenuationPoint, Coaxial, LineConstants, LossLaw, NominalLine, Piece, State, TwoWire,
    additional_loss_db, gamma_of_impedance, gamma_size_of_swr, impedance_of_gamma, loss_db, swr_of_gamma,
};
use proptest::prelude::*;

/// Difference relative to the larger size.
fn relative(a: f64, b: f64) -> f64 {
    (a - b).abs() / a.abs().max(b.abs()).max(f64::MIN_POSITIVE)
}

prop_compose! {
    /// Any passive load, from a milliohm to a hundred kilohms.
    fn passive_load()(r in -3.0..5.0_f64, x in -1e4..1e4_f64) -> Complex64 {
        Complex64::new(10_f64.powf(r), x)
    }
}

prop_compose! {
    fn nominal_line()(
        z0_ohm in 25.0..800.0_f64,
        velocity_factor in 0.5..1.0_f64,
        k1_db_per_100m in 0.0..8.0_f64,
        k2_db_per_100m in 0.0..0.2_f64,
    ) -> NominalLine {
        NominalLine { z0_ohm, velocity_factor, loss: LossLaw { k1_db_per_100m, k2_db_per_100m } }
    }
}

prop_compose! {
    fn two_wire()(
        d in 0.5e-3..5e-3_f64,
        ratio in 1.5..300.0_f64,
        conductivity_s_per_m in 1e6..6e7_f64,
        velocity_factor in 0.8..1.0_f64,
        loss_tangent in 0.0..1e-3_f64,
    ) -> TwoWire {
        TwoWire { wire_diameter_m: d, spacing_m: d * ratio, conductivity_s_per_m, velocity_factor, loss_tangent }
    }
}

prop_compose! {
    /// A piece of any line, up to 100 m long, at any frequency from 1.8 to 54 MHz.
    fn piece()(
        line in nominal_line(), wires in two_wire(), from_geometry: bool,
        frequency_hz in 1.8e6..54e6_f64, length_m in 0.0..100.0_f64,
    ) -> Piece {
        let constants = if from_geometry { wires.constants(frequency_hz) } else { line.constants(frequency_hz) };
        Piece::new(constants.expect("the ranges above are those of lines"), length_m)
    }
}

proptest! {
    #[test]
    fn a_passive_load_reflects_at_most_all(z in passive_load(), reference_ohm in 1.0..1000.0_f64) {
        prop_assert!(gamma_of_impedance(z, reference_ohm).norm() <= 1.0);
        prop_assert!(State::of_load(z).gamma(reference_ohm).norm() <= 1.0);
        prop_assert!(State::of_load(z).swr(reference_ohm) >= 1.0);
    }

    #[test]
    fn a_passive_load_stays_passive_through_any_line(
        z in passive_load(), piece in piece(), reference_ohm in 1.0..1000.0_f64,
    ) {
        let at_source = piece.toward_source(State::of_load(z));
        prop_assert!(at_source.power_w() > 0.0);
        prop_assert!(at_source.gamma(reference_ohm).norm() <= 1.0);
    }

    #[test]
    fn conversions_invert(z in passive_load(), reference_ohm in 1.0..1000.0_f64, swr in 1.0..1e4_f64) {
        let gamma = gamma_of_impedance(z, reference_ohm);
        let back = impedance_of_gamma(gamma, reference_ohm);
        // Γ near ±1 holds Z only to the last bits of 1 − Γ and 1 + Γ.
        let conditioning = (1.0 - gamma).norm_sqr().min((1.0 + gamma).norm_sqr());
        prop_assert!((back - z).norm() / z.norm() <= 1e-14 / conditioning + 1e-13);
        prop_assert!(relative(swr_of_gamma(gamma_size_of_swr(swr)), swr) < 1e-15 * (swr + 10.0));
    }

    /// What goes in comes out or turns into heat along the line: the heat is integrated from the series
    /// resistance and the shunt conductance, by Simpson's rule between states of their own.
    #[test]
    fn power_in_is_power_out_plus_heat(z in passive_load(), piece in piece()) {
        let LineConstants { z0_ohm, gamma_per_m } = piece.constants();
        let resistance = (gamma_per_m * z0_ohm).re;
        let conductance = (gamma_per_m / z0_ohm).re;
        let at_load = State::of_load(z);
        let at_source = piece.toward_source(at_load);
        let heat_per_m = |state: State| {
            0.5 * (resistance * state.current_a.norm_sqr() + conductance * state.voltage_v.norm_sqr())
        };
        let steps = 2 * (200.0 + gamma_per_m.norm() * piece.length_m() * 60.0).ceil() as u32;
        let h = piece.length_m() / f64::from(steps);
        let sum: f64 = (0..=steps)
            .map(|n| {
                let weight = if n == 0 || n == steps { 1.0 } else if n % 2 == 1 { 4.0 } else { 2.0 };
                let state = Piece::new(piece.constants(), h * f64::from(n)).toward_source(at_load);
                weight * heat_per_m(state)
            })
            .sum();
        let heat = sum * h / 3.0;
        let out = at_load.power_w();
        prop_assert!(relative(at_source.power_w(), out + heat) < 1e-9, "{} {}", at_source.power_w(), out + heat);
        prop_assert!(relative(loss_db(at_source, at_load), 10.0 * ((out + heat) / out).log10()) < 1e-6);
    }

    #[test]
    fn a_line_can_be_walked_back_and_cut_anywhere(z in passive_load(), piece in piece(), share in 0.0..1.0_f64) {
        let at_load = State::of_load(z);
        let at_source = piece.toward_source(at_load);
        // Walking back through a loss of e^{αl} loses that many digits.
        let growth = (2.0 * piece.constants().gamma_per_m.re * piece.length_m()).exp();
        let size = piece.constants().z0_ohm.norm();
        let distance = |a: State, b: State| {
            let d = (a.voltage_v - b.voltage_v).norm() + size * (a.current_a - b.current_a).norm();
            d / (b.voltage_v.norm() + size * b.current_a.norm())
        };
        prop_assert!(distance(piece.toward_load(at_source), at_load) < 1e-13 * growth);
        let near = Piece::new(piece.constants(), share * piece.length_m());
        let far = Piece::new(piece.constants(), piece.length_m() - near.length_m());
        prop_assert!(distance(far.toward_source(near.toward_source(at_load)), at_source) < 1e-11);
    }

    /// A line is reciprocal and symmetric: open- and short-circuit impedances multiply to Z₀².
    #[test]
    fn open_and_short_ends_are_exact(piece in piece()) {
        let short = State { voltage_v: Complex64::ZERO, current_a: Complex64::ONE };
        let open = piece.toward_source(State::open());
        let short = piece.toward_source(short);
        let z0 = piece.constants().z0_ohm;
        // V_o·V_s/(I_o·I_s) = Z₀², without dividing by what may be zero
        let left = open.voltage_v * short.voltage_v;
        let right = open.current_a * short.current_a * z0 * z0;
        prop_assert!((left - right).norm() <= 1e-12 * (left.norm() + right.norm()));
        // and the determinant of the two-port is 1
        let determinant = open.voltage_v * short.current_a - open.current_a * short.voltage_v;
        let size = (open.voltage_v * short.current_a).norm();
        prop_assert!((determinant - 1.0).norm() < 1e-13 * size.max(1.0));
    }

    #[test]
    fn a_nominal_line_loses_exactly_what_its_sheet_says(line in nominal_line(), frequency_hz in 1e6..60e6_f64) {
        let constants = line.constants(frequency_hz).unwrap();
        let published = line.loss.db_per_m(frequency_hz);
        prop_assert!((constants.matched_loss_db_per_m() - published).abs() <= 1e-9 * published.max(1e-6));
        // The conductors make Z₀ capacitive, the dielectric the other way, and never lossless by magic.
        prop_assert!(constants.z0_ohm.re > 0.0);
    }

    /// The peaks are those that a fine walk along the line finds, and never more than the line has.
    #[test]
    fn peaks_are_those_of_a_fine_walk(z in passive_load(), piece in piece()) {
        let at_load = State::of_load(z);
        let peaks = piece.peaks(at_load);
        let steps = 400 + (piece.constants().gamma_per_m.im * piece.length_m() * 400.0) as u32;
        let (mut volts, mut amperes) = (0.0_f64, 0.0_f64);
        for n in 0..=steps {
            let x = piece.length_m() * f64::from(n) / f64::from(steps);
            let state = Piece::new(piece.constants(), x).toward_source(at_load);
            volts = volts.max(state.voltage_v.norm());
            amperes = amperes.max(state.current_a.norm());
        }
        // the documented bound, and what the walk itself may miss
        let LineConstants { gamma_per_m, .. } = piece.constants();
        let bound = 0.1 * (gamma_per_m.re / gamma_per_m.im).powi(2) + 2e-6;
        prop_assert!(relative(peaks.voltage_v, volts) < bound, "{} {volts} V", peaks.voltage_v);
        prop_assert!(relative(peaks.current_a, amperes) < bound, "{} {amperes} A", peaks.current_a);
    }

    /// On a real Z₀ the additional loss of the books is the line equations' own.
    #[test]
    fn the_books_additional_loss_is_the_exact_one_for_real_z0(
        z0 in 25.0..800.0_f64, alpha in 1e-5..0.02_f64, beta in 0.05..2.0_f64, length_m in 1.0..60.0_f64,
        swr in 1.0..1000.0_f64, angle in 0.0..std::f64::consts::TAU,
    ) {
        let line = LineConstants { z0_ohm: z0.into(), gamma_per_m: Complex64::new(alpha, beta) };
        let gamma = Complex64::from_polar(gamma_size_of_swr(swr), angle);
        let at_load = State::of_load(impedance_of_gamma(gamma, z0));
        let matched = line.matched_loss_db_per_m() * length_m;
        let exact = loss_db(line.toward_source(at_load, length_m), at_load);
        let books = matched + additional_loss_db(matched, swr);
        prop_assert!((exact - books).abs() < 1e-12 * swr * swr + 1e-9, "{exact} {books}");
    }

    #[test]
    fn a_fit_finds_the_law_it_was_made_from(k1 in 0.01..10.0_f64, k2 in 0.0..0.5_f64) {
        let law = LossLaw { k1_db_per_100m: k1, k2_db_per_100m: k2 };
        let points: Vec<AttenuationPoint> = [1e6, 10e6, 50e6, 100e6]
            .map(|frequency_hz| AttenuationPoint {
                frequency_hz,
                attenuation_db_per_100m: 100.0 * law.db_per_m(frequency_hz),
            })
            .to_vec();
        let fitted = LossLaw::fit(&points).unwrap();
        prop_assert!(relative(fitted.k1_db_per_100m, k1) < 1e-9);
        prop_assert!((fitted.k2_db_per_100m - k2).abs() < 1e-9 * (k1 + k2));
    }
}

#[test]
fn figures_that_make_no_line_are_refused_in_words() {
    let line = NominalLine {
        z0_ohm: 50.0,
        velocity_factor: 1.2,
        loss: LossLaw { k1_db_per_100m: 1.0, k2_db_per_100m: 0.0 },
    };
    let text = line.constants(7.1e6).unwrap_err().to_string();
    assert_eq!(text, "the line's velocity factor is 1.2; it must be greater than 0 and at most 1");
    assert!(NominalLine { velocity_factor: 0.66, ..line }.constants(f64::NAN).is_err());
    let wires = TwoWire {
        wire_diameter_m: 2e-3,
        spacing_m: 2e-3,
        conductivity_s_per_m: 58e6,
        velocity_factor: 1.0,
        loss_tangent: 0.0,
    };
    assert!(wires.constants(7.1e6).unwrap_err().to_string().contains("must not touch"));
    let coax = Coaxial {
        inner_diameter_m: 4e-3,
        outer_diameter_m: 3e-3,
        conductivity_s_per_m: 58e6,
        relative_permittivity: 2.25,
        loss_tangent: 0.0,
    };
    assert!(coax.constants(7.1e6).unwrap_err().to_string().contains("thinner"));
    assert!(Coaxial { relative_permittivity: 0.5, ..coax }.constants(7.1e6).is_err());
    let point = AttenuationPoint { frequency_hz: 10e6, attenuation_db_per_100m: 4.0 };
    assert!(LossLaw::fit(&[point, point]).is_err());
    assert!(LossLaw::fit(&[point, AttenuationPoint { frequency_hz: -1.0, ..point }]).is_err());
}

#[test]
fn conductor_loss_makes_z0_capacitive_and_dielectric_loss_inductive() {
    let line = |k1_db_per_100m, k2_db_per_100m| {
        let loss = LossLaw { k1_db_per_100m, k2_db_per_100m };
        NominalLine { z0_ohm: 50.0, velocity_factor: 0.66, loss }.constants(3.6e6).unwrap().z0_ohm
    };
    assert!(line(2.0, 0.0).im < 0.0);
    assert!(line(0.0, 2.0).im > 0.0);
    assert!((line(0.0, 0.0) - 50.0).norm() < 1e-12);
}
