//! The matching unit's setting with the least loss against grids that know nothing of the search: for 200 random
//! impedances and every form, variable parts within 0.02 dB of a fine grid, banks exactly what trying every setting finds.

use std::f64::consts::TAU;

use num_complex::Complex64;
use physics::line::{State, loss_db};
use physics::network::{
    LForm, MatchingUnit, Part, PartRating, PartRole, Power, Range, Sense, UnitError, UnitMatch, UnitProblem,
};
use proptest::prelude::*;

const COIL_Q: f64 = 200.0;
const CAPACITOR_Q: f64 = 1000.0;

fn part(range: Range, q: f64) -> Part {
    Part { range, q, rating: PartRating::default() }
}

/// Every form, with parts of these ranges.
fn every_form(coil: Range, capacitor: Range) -> Vec<MatchingUnit> {
    let (coil, capacitor) = (part(coil, COIL_Q), part(capacitor, CAPACITOR_Q));
    let mut units: Vec<_> = LForm::ALL.map(|form| MatchingUnit::L { form, coil, capacitor }).into();
    for sense in [Sense::CapacitorAcrossLoad, Sense::CapacitorAcrossSource] {
        units.push(MatchingUnit::BalancedL { sense, each_coil: coil, capacitor });
    }
    units.push(MatchingUnit::HighPassT { source_capacitor: capacitor, coil, load_capacitor: capacitor });
    units
}

fn name(unit: &MatchingUnit) -> String {
    match unit {
        MatchingUnit::L { form, .. } => format!("{form:?}"),
        MatchingUnit::BalancedL { sense, .. } => format!("balanced, {sense:?}"),
        MatchingUnit::HighPassT { .. } => "high-pass T".to_owned(),
    }
}

/// What the parts do, written down once more: a coil in series with its resistance, a capacitor with its conductance.
fn walk(unit: &MatchingUnit, frequency_hz: f64, load_ohm: Complex64, values: [f64; 3]) -> (f64, f64) {
    let omega = TAU * frequency_hz;
    let coil = |l: f64| Complex64::new(omega * l / COIL_Q, omega * l);
    let capacitor = |c: f64| Complex64::new(omega * c / CAPACITOR_Q, omega * c);
    let at_load = State::of_load(load_ohm);
    let series = |s: State, z: Complex64| State { voltage_v: s.voltage_v + z * s.current_a, ..s };
    let across = |s: State, y: Complex64| State { current_a: s.current_a + y * s.voltage_v, ..s };
    let [l, c, c2] = values;
    let at_source = match unit {
        MatchingUnit::L { form, .. } => match form {
            LForm::SeriesCoilCapacitorAtLoad => series(across(at_load, capacitor(c)), coil(l)),
            LForm::SeriesCoilCapacitorAtSource => across(series(at_load, coil(l)), capacitor(c)),
            LForm::SeriesCapacitorCoilAtLoad => series(across(at_load, coil(l).inv()), capacitor(c).inv()),
            LForm::SeriesCapacitorCoilAtSource => across(series(at_load, capacitor(c).inv()), coil(l).inv()),
        },
        MatchingUnit::BalancedL { sense, .. } => match sense {
            Sense::CapacitorAcrossLoad => series(across(at_load, capacitor(c)), 2.0 * coil(l)),
            Sense::CapacitorAcrossSource => across(series(at_load, 2.0 * coil(l)), capacitor(c)),
        },
        MatchingUnit::HighPassT { .. } => {
            let before = series(at_load, capacitor(c2).inv());
            series(across(before, coil(l).inv()), capacitor(c).inv())
        }
    };
    (at_source.swr(50.0), loss_db(at_source, at_load))
}

/// Random figures that are the same in every run.
struct Random(u64);

impl Random {
    /// From 0 to 1 (the mixer of splitmix64).
    fn share(&mut self) -> f64 {
        self.0 = self.0.wrapping_add(0x9e37_79b9_7f4a_7c15);
        let mut z = self.0;
        z = (z ^ (z >> 30)).wrapping_mul(0xbf58_476d_1ce4_e5b9);
        z = (z ^ (z >> 27)).wrapping_mul(0x94d0_49bb_1331_11eb);
        ((z ^ (z >> 31)) >> 11) as f64 / (1_u64 << 53) as f64
    }

    fn between(&mut self, low: f64, high: f64) -> f64 {
        low + (high - low) * self.share()
    }

    /// From a full-wave end to a short wire, on any band.
    fn problem(&mut self) -> UnitProblem {
        let resistance = 10_f64.powf(self.between(0.3, 3.7));
        let reactance = 10_f64.powf(self.between(0.0, 3.5)) * if self.share() < 0.5 { -1.0 } else { 1.0 };
        UnitProblem {
            frequency_hz: 10_f64.powf(self.between(1.8e6_f64.log10(), 30e6_f64.log10())),
            load_ohm: Complex64::new(resistance, reactance),
            target_ohm: 50.0,
            largest_swr: [1.1, 1.5, 2.0][(self.share() * 3.0) as usize],
        }
    }
}

/// Values of a range, evenly in the logarithm.
fn spread(low: f64, high: f64, count: u32) -> Vec<f64> {
    (0..count).map(|n| low * (high / low).powf(f64::from(n) / f64::from(count - 1))).collect()
}

/// The least loss on a grid, made finer twice around its best point; none where no point is within the ratio.
fn finest(
    unit: &MatchingUnit,
    problem: &UnitProblem,
    limits: [[f64; 2]; 3],
    counts: [u32; 3],
) -> Option<f64> {
    let mut around = limits;
    let mut best = None;
    for _ in 0..3 {
        let grids: Vec<Vec<f64>> = (0..3).map(|n| spread(around[n][0], around[n][1], counts[n])).collect();
        let mut found: Option<(f64, [usize; 3])> = None;
        for (i, &l) in grids[0].iter().enumerate() {
            for (j, &c) in grids[1].iter().enumerate() {
                for (k, &c2) in grids[2].iter().enumerate() {
                    let (swr, loss) = walk(unit, problem.frequency_hz, problem.load_ohm, [l, c, c2]);
                    if swr <= problem.largest_swr && found.is_none_or(|(least, _)| loss < least) {
                        found = Some((loss, [i, j, k]));
                    }
                }
            }
        }
        let (loss, place) = found?;
        if best.is_none_or(|least| loss < least) {
            best = Some(loss);
        }
        for n in 0..3 {
            let last = grids[n].len() - 1;
            around[n] = [grids[n][place[n].saturating_sub(2)], grids[n][(place[n] + 2).min(last)]];
        }
    }
    best
}

fn values(unit: &MatchingUnit, found: &UnitMatch) -> [f64; 3] {
    let value = |role| found.value(role).unwrap_or(f64::NAN);
    match unit {
        MatchingUnit::L { .. } => [value(PartRole::Coil), value(PartRole::Capacitor), 0.0],
        MatchingUnit::BalancedL { .. } => [value(PartRole::EachCoil), value(PartRole::Capacitor), 0.0],
        MatchingUnit::HighPassT { .. } => {
            [value(PartRole::Coil), value(PartRole::SourceCapacitor), value(PartRole::LoadCapacitor)]
        }
    }
}

/// The stated ratio and loss are those of the stated setting, which is within the ranges.
fn assert_true(unit: &MatchingUnit, problem: &UnitProblem, found: &UnitMatch, limits: [[f64; 2]; 3]) {
    let values = values(unit, found);
    let (swr, loss) = walk(unit, problem.frequency_hz, problem.load_ohm, values);
    assert!((swr - found.swr).abs() < 1e-6 * swr, "{unit:?} {problem:?}: {swr} {found:?}");
    assert!((loss - found.loss_db).abs() < 1e-9 * loss.max(1.0), "{unit:?} {problem:?}: {loss} {found:?}");
    for ([low, high], value) in limits.into_iter().zip(values) {
        let inside = (low * (1.0 - 1e-9)..=high * (1.0 + 1e-9)).contains(&value);
        assert!(inside || value == 0.0, "{unit:?} {problem:?}: {value} is not within {low} and {high}");
    }
}

/// Least of coil and capacitor in the grid tests: a roller coil and a vane capacitor never reach zero.
const COIL_H: [f64; 2] = [0.05e-6, 30e-6];
const CAPACITOR_F: [f64; 2] = [10e-12, 1500e-12];

#[test]
fn variable_parts_do_as_well_as_a_fine_grid() {
    let coil = Range::Variable { low: COIL_H[0], high: COIL_H[1] };
    let capacitor = Range::Variable { low: CAPACITOR_F[0], high: CAPACITOR_F[1] };
    for unit in every_form(coil, capacitor) {
        let is_t = matches!(unit, MatchingUnit::HighPassT { .. });
        let limits = [COIL_H, CAPACITOR_F, if is_t { CAPACITOR_F } else { [1.0, 1.0] }];
        let counts = if is_t { [60, 40, 24] } else { [220, 160, 1] };
        let mut random = Random(7);
        let (mut worst, mut best, mut matched, mut missed) = (f64::NEG_INFINITY, f64::INFINITY, 0, 0);
        for _ in 0..200 {
            let problem = random.problem();
            let grid = finest(&unit, &problem, limits, counts);
            match unit.least_loss(&problem) {
                Ok(found) => {
                    matched += 1;
                    assert_true(&unit, &problem, &found, limits);
                    assert!(found.swr <= problem.largest_swr, "{problem:?} {found:?}");
                    if let Some(grid) = grid {
                        worst = worst.max(found.loss_db - grid);
                        best = best.min(found.loss_db - grid);
                        assert!(found.loss_db < grid + 0.02, "{unit:?} {problem:?}: {grid} {found:?}");
                    } else {
                        missed += 1;
                    }
                }
                Err(UnitError::OutOfReach { nearest, .. }) => {
                    assert!(grid.is_none(), "{unit:?} {problem:?}: {grid:?} dB on the grid, {nearest:?}");
                    assert_true(&unit, &problem, &nearest, limits);
                    assert!(nearest.swr > problem.largest_swr);
                }
                Err(error) => panic!("{error}"),
            }
        }
        println!(
            "{}: {matched} of 200 matched, {missed} of them missed by the grid, loss against the grid {best:+.4} to {worst:+.5} dB",
            name(&unit),
        );
        assert!(matched > 20, "{unit:?}: {matched}");
    }
}

#[test]
fn banks_do_exactly_as_well_as_every_setting_tried() {
    let coil = Range::Steps { first: 0.0, step: 0.25e-6, count: 64 };
    let capacitor = Range::Steps { first: 12e-12, step: 25e-12, count: 48 };
    let steps = |range: &Range| -> Vec<f64> {
        let Range::Steps { first, step, count } = *range else { unreachable!() };
        (0..count).map(|n| first + step * f64::from(n)).collect()
    };
    for unit in every_form(coil, capacitor) {
        let second: Vec<f64> =
            if matches!(unit, MatchingUnit::HighPassT { .. }) { steps(&capacitor) } else { vec![0.0] };
        let mut random = Random(11);
        let mut matched = 0;
        for _ in 0..200 {
            let problem = random.problem();
            let (mut least, mut nearest) = (f64::INFINITY, f64::INFINITY);
            for &l in &steps(&coil) {
                for &c in &steps(&capacitor) {
                    for &c2 in &second {
                        let (swr, loss) = walk(&unit, problem.frequency_hz, problem.load_ohm, [l, c, c2]);
                        if swr <= problem.largest_swr {
                            least = least.min(loss);
                        }
                        nearest = nearest.min(swr);
                    }
                }
            }
            match unit.least_loss(&problem) {
                Ok(found) => {
                    matched += 1;
                    assert!((found.loss_db - least).abs() < 1e-9, "{unit:?} {problem:?}: {least} {found:?}");
                }
                Err(UnitError::OutOfReach { nearest: found, .. }) => {
                    assert!(least.is_infinite(), "{unit:?} {problem:?}: {least} {found:?}");
                    let off = found.swr / nearest - 1.0;
                    assert!(off.abs() < 1e-6, "{unit:?} {problem:?}: {nearest} {found:?}");
                }
                Err(error) => panic!("{error}"),
            }
        }
        println!("{}: {matched} of 200 matched", name(&unit));
        assert!(matched > 10, "{unit:?}: {matched}");
    }
}

/// A bank of 256 is thinned at first; trying every setting says what that may cost.
#[test]
fn large_banks_come_within_a_fiftieth_of_a_decibel_of_every_setting_tried() {
    let coil = Range::Steps { first: 0.05e-6, step: 0.12e-6, count: 256 };
    let capacitor = Range::Steps { first: 10e-12, step: 6e-12, count: 256 };
    for unit in every_form(coil, capacitor).into_iter().take(6) {
        let mut random = Random(3);
        let (mut worst, mut matched) = (0.0_f64, 0);
        for _ in 0..60 {
            let problem = random.problem();
            let mut least = f64::INFINITY;
            for (l, c) in (0..256).flat_map(|l| (0..256).map(move |c| (l, c))) {
                let values = [0.05e-6 + 0.12e-6 * f64::from(l), 10e-12 + 6e-12 * f64::from(c), 0.0];
                let (swr, loss) = walk(&unit, problem.frequency_hz, problem.load_ohm, values);
                if swr <= problem.largest_swr {
                    least = least.min(loss);
                }
            }
            match unit.least_loss(&problem) {
                Ok(found) => {
                    matched += 1;
                    worst = worst.max(found.loss_db - least);
                    assert!(found.loss_db < least + 0.02, "{unit:?} {problem:?}: {least} {found:?}");
                }
                Err(UnitError::OutOfReach { .. }) => {
                    assert!(least.is_infinite(), "{unit:?} {problem:?}: {least}");
                }
                Err(error) => panic!("{error}"),
            }
        }
        println!("{}, banks of 256: {matched} of 60 matched, at most {worst:.5} dB above", name(&unit));
        assert!(matched > 5, "{unit:?}: {matched}");
    }
}

prop_compose! {
    fn any_problem()(
        r in 0.0..3.7_f64, x in -3e3..3e3_f64, frequency_hz in 1.8e6..54e6_f64,
        target_ohm in 10.0..300.0_f64, swr in 1.05..3.0_f64,
    ) -> UnitProblem {
        UnitProblem { frequency_hz, load_ohm: Complex64::new(10_f64.powf(r), x), target_ohm, largest_swr: swr }
    }
}

proptest! {
    /// Power in = power out + the heat of each part, and each part's heat is what its volts and amperes make.
    #[test]
    fn watts_of_the_parts_add_up(problem in any_problem(), form in 0_usize..7) {
        let coil = Range::Variable { low: 0.0, high: 30e-6 };
        let capacitor = Range::Variable { low: 5e-12, high: 1500e-12 };
        let unit = every_form(coil, capacitor)[form];
        let found = match unit.least_loss(&problem) {
            Ok(found) => found,
            Err(UnitError::OutOfReach { nearest, .. }) => *nearest,
            Err(error) => panic!("{error}"),
        };
        let heat: f64 = found.parts.iter().map(|part| part.heat_share).sum();
        prop_assert!((found.efficiency + heat - 1.0).abs() < 1e-9, "{found:?}");
        let omega = TAU * problem.frequency_hz;
        for part in &found.parts {
            let heat = match part.role {
                PartRole::Coil => part.rms_a_at_1_w.powi(2) * omega * part.value / COIL_Q,
                PartRole::EachCoil => 2.0 * part.rms_a_at_1_w.powi(2) * omega * part.value / COIL_Q,
                _ => 0.5 * part.peak_v_at_1_w.powi(2) * omega * part.value / CAPACITOR_Q,
            };
            prop_assert!((heat - part.heat_share).abs() < 1e-9, "{heat} {part:?}");
        }
        prop_assert!((found.two_port.determinant() - 1.0).norm() < 1e-9);
        let power = Power { peak_envelope_w: 400.0, average_w: 100.0 };
        let part = found.parts[0];
        prop_assert!((part.peak_v(power) - 20.0 * part.peak_v_at_1_w).abs() < 1e-9 * part.peak_v(power) + 1e-12);
        prop_assert!((part.rms_a(power) - 10.0 * part.rms_a_at_1_w).abs() < 1e-9 * part.rms_a(power) + 1e-12);
    }

    /// A looser bar never costs more.
    #[test]
    fn a_looser_bar_never_costs_more(problem in any_problem(), form in 0_usize..7, looser in 1.1..2.0_f64) {
        let coil = Range::Variable { low: 0.05e-6, high: 30e-6 };
        let capacitor = Range::Variable { low: 10e-12, high: 1500e-12 };
        let unit = every_form(coil, capacitor)[form];
        if let Ok(tight) = unit.least_loss(&problem) {
            let loose = unit.least_loss(&UnitProblem { largest_swr: problem.largest_swr * looser, ..problem });
            let loose = loose.expect("what is within a tight bar is within a loose one");
            prop_assert!(loose.loss_db <= tight.loss_db + 0.005, "{loose:?} {tight:?}");
        }
    }
}

fn some_l() -> MatchingUnit {
    MatchingUnit::L {
        form: LForm::SeriesCoilCapacitorAtLoad,
        coil: part(Range::Variable { low: 0.0, high: 30e-6 }, COIL_Q),
        capacitor: part(Range::Variable { low: 0.0, high: 1500e-12 }, CAPACITOR_Q),
    }
}

fn some_problem() -> UnitProblem {
    UnitProblem {
        frequency_hz: 7.1e6,
        load_ohm: Complex64::new(800.0, 300.0),
        target_ohm: 50.0,
        largest_swr: 1.5,
    }
}

#[test]
fn what_makes_no_unit_is_refused_in_words() {
    let MatchingUnit::L { form, coil, capacitor } = some_l() else { unreachable!() };
    let refused = |unit: MatchingUnit, problem: UnitProblem, words: &str| {
        let error = unit.least_loss(&problem).unwrap_err();
        assert!(matches!(error, UnitError::Part(_)));
        assert_eq!(error.to_string(), words);
    };
    let problem = some_problem();
    let with = |coil: Part, capacitor: Part| MatchingUnit::L { form, coil, capacitor };
    let empty = Range::Variable { low: 5e-6, high: 1e-6 };
    refused(
        with(Part { range: empty, ..coil }, capacitor),
        problem,
        "the coil's largest inductance in henrys is 0.000001; it must be greater than zero and at least the smallest",
    );
    refused(
        with(Part { q: -3.0, ..coil }, capacitor),
        problem,
        "the coil's Q is -3; it must be greater than zero",
    );
    let no_steps = Range::Steps { first: 1e-12, step: 1e-12, count: 0 };
    refused(
        with(coil, Part { range: no_steps, ..capacitor }),
        problem,
        "the number of the capacitor's steps is 0; it must be from 1 to 4096, and more than 1 where the first is zero",
    );
    let negative = Range::Variable { low: -1e-12, high: 1e-12 };
    refused(
        with(coil, Part { range: negative, ..capacitor }),
        problem,
        "the capacitor's smallest capacitance in farads is -0.000000000001; it must be zero or more",
    );
    refused(
        some_l(),
        UnitProblem { load_ohm: Complex64::new(0.0, 3.0), ..problem },
        "the load's resistance in ohms is 0; it must be greater than zero",
    );
    refused(
        some_l(),
        UnitProblem { largest_swr: 1.0, ..problem },
        "the wanted SWR is 1; it must be greater than 1",
    );
}

#[test]
fn ranges_that_exclude_everything_say_what_is_reached() {
    let MatchingUnit::L { form, coil, .. } = some_l() else { unreachable!() };
    let small = part(Range::Variable { low: 0.0, high: 5e-12 }, CAPACITOR_Q);
    let unit = MatchingUnit::L { form, coil, capacitor: small };
    let problem = UnitProblem { load_ohm: Complex64::new(800.0, 0.0), ..some_problem() };
    let error = unit.least_loss(&problem).unwrap_err();
    let text = error.to_string();
    assert!(text.starts_with("the unit brings 800.0000 +0.0000j Ω to an SWR of 1"), "{text}");
    let UnitError::OutOfReach { nearest, wanted_swr, .. } = error else { panic!("{text}") };
    assert!(nearest.swr > 10.0 && nearest.swr < 16.0 && (wanted_swr - 1.5).abs() < 1e-12);
}

#[test]
fn ratings_are_held_against_peak_volts_and_average_amperes() {
    let MatchingUnit::L { form, mut coil, mut capacitor } = some_l() else { unreachable!() };
    coil.rating.rms_a = Some(4.0);
    capacitor.rating.peak_v = Some(500.0);
    let found = MatchingUnit::L { form, coil, capacitor }.least_loss(&some_problem()).unwrap();
    let power = Power { peak_envelope_w: 400.0, average_w: 80.0 };
    for part in &found.parts {
        let share = part.share_of_rating(power).unwrap();
        let expected = match part.role {
            PartRole::Coil => part.rms_a(power) / 4.0,
            _ => part.peak_v(power) / 500.0,
        };
        assert!((share - expected).abs() < 1e-12);
    }
    // the capacitor stands across the load: its volts follow from the energy alone
    let volts = found.parts[0].peak_v(power);
    let g = Complex64::new(800.0, 300.0).inv().re;
    assert!((volts - (2.0 * 400.0 * found.efficiency / g).sqrt()).abs() < 1e-6 * volts);
}
