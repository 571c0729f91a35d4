//! The high-pass T against computed values. Figures and their source stand in `data/line/t_network.toml`.

use checks::data;
use physics::network::{MatchingUnit, Part, PartRating, PartRole, Range, UnitProblem};
use serde::Deserialize;

#[derive(Deserialize)]
struct TNetwork {
    source: String,
    relative_tolerance: f64,
    tolerance_db: f64,
    frequency_mhz: f64,
    coil_q: f64,
    rows: Vec<[f64; 5]>,
}

fn part(low: f64, high: f64, q: f64) -> Part {
    Part { range: Range::Variable { low, high }, q, rating: PartRating::default() }
}

#[test]
fn a_high_pass_t_is_set_as_computed() {
    let TNetwork { source, relative_tolerance, tolerance_db, frequency_mhz, coil_q, rows } =
        data("line/t_network.toml");
    let mut losses = Vec::new();
    for [load_ohm, load_pf, coil_uh, source_pf, loss_db] in rows {
        let unit = MatchingUnit::HighPassT {
            source_capacitor: part(5e-12, 2000e-12, f64::INFINITY),
            coil: part(0.1e-6, 50e-6, coil_q),
            load_capacitor: part(load_pf * 1e-12, load_pf * 1e-12, f64::INFINITY),
        };
        let problem = UnitProblem {
            frequency_hz: frequency_mhz * 1e6,
            load_ohm: load_ohm.into(),
            target_ohm: 50.0,
            largest_swr: 1.0001,
        };
        let found = unit.least_loss(&problem).expect("the parts are large enough");
        let what = format!("{load_ohm} Ω with {load_pf} pF");
        let off = |role, expected: f64| found.value(role).expect("a T has it") / expected - 1.0;
        // the source's capacitor is given to 0.1 pF
        let rounding = 0.06 / source_pf;
        assert!(
            off(PartRole::Coil, coil_uh * 1e-6).abs() < relative_tolerance,
            "{what}: {found:?} ({source})"
        );
        let capacitor = off(PartRole::SourceCapacitor, source_pf * 1e-12).abs();
        assert!(capacitor < relative_tolerance + rounding, "{what}: {capacitor} {found:?} ({source})");
        assert!((found.loss_db - loss_db).abs() < tolerance_db, "{what}: {found:?} ({source})");
        losses.push((load_ohm, found.loss_db));
    }
    // the rule of the trade: the largest capacitor on the load's side loses least
    for pair in losses.windows(2).filter(|pair| (pair[0].0 - pair[1].0).abs() < 1e-9) {
        assert!(pair[1].1 < pair[0].1);
    }
}
