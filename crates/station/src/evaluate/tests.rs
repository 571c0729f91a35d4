use super::*;
use crate::plan::{Earth, LineChoice, LinePiece, Link};
use crate::report::VerdictKind;
use crate::sample;

fn report(plan: &Plan) -> Report {
    Evaluator::new().evaluate(plan, 7).unwrap()
}

#[test]
fn the_report_has_every_band_and_feed() {
    let plan = sample::plan();
    let report = report(&plan);
    assert_eq!(report.revision, 7);
    assert_eq!(report.bands.len(), 3);
    for band in &report.bands {
        assert_eq!(band.points.len(), 101);
        assert_eq!(band.feeds.len(), 2);
        assert!(band.points.iter().all(|p| p.feedpoint_ohm.re > 0.0));
    }
}

/// Watts are conserved: what the transmitter gives is what the links burn and what reaches the wire.
#[test]
fn watts_add_up() {
    let plan = sample::plan();
    for band in report(&plan).bands {
        for feed in band.points.iter().flat_map(|p| &p.feeds) {
            let burnt: f64 = feed.links.iter().map(|link| link.watts_lost).sum();
            let swr = feed.at_transmitter.swr;
            let given = if swr <= 2.0 { 100.0 } else { 100.0 * 4.0 * swr / (swr + 1.0).powi(2) };
            assert!(
                (burnt + feed.watts_to_wire - given).abs() < 1e-6,
                "{burnt} + {} ≠ {given}",
                feed.watts_to_wire
            );
            assert!(feed.links.iter().all(|link| link.watts_lost > -1e-9));
        }
    }
}

/// What is kept between evaluations changes no number.
#[test]
fn a_kept_stage_gives_the_same_numbers_as_a_new_one() {
    let mut plan = sample::plan();
    let mut evaluator = Evaluator::new();
    evaluator.evaluate(&plan, 1).unwrap();
    let changes: [fn(&mut Plan); 6] = [
        |p| p.wires[0].cut_length_m = 38.5,
        |p| p.feeds.swap(0, 1),
        |p| {
            p.feeds[0].links.insert(
                0,
                Link::Line(LinePiece { line: LineChoice::Catalogue("coax-rg-58".to_owned()), length_m: 3.0 }),
            );
        },
        |p| p.site.earth = Earth::Mirror,
        |p| p.transmitter.power_w = 400.0,
        |p| drop(p.bands.remove(1)),
    ];
    for change in changes {
        change(&mut plan);
        let kept = crate::report::json(&evaluator.evaluate(&plan, 1).unwrap());
        assert_eq!(kept, crate::report::json(&report_of(&plan)));
    }
}

fn report_of(plan: &Plan) -> Report {
    Evaluator::new().evaluate(plan, 1).unwrap()
}

/// The matching unit brings the transmitter's side to its resistance wherever it is used.
#[test]
fn a_set_unit_matches() {
    let report = report(&sample::plan());
    let used: Vec<_> = report
        .bands
        .iter()
        .flat_map(|b| &b.points)
        .flat_map(|p| &p.feeds)
        .filter(|f| f.setting.is_some())
        .collect();
    assert!(!used.is_empty());
    for feed in used {
        assert!((feed.at_transmitter.swr - 1.0).abs() < 1e-6 && feed.before_unit.swr > 2.0);
    }
}

#[test]
fn verdicts_follow_the_transmitter_limit_and_the_ratings() {
    let mut plan = sample::plan();
    let kinds = |plan: &Plan| -> Vec<VerdictKind> {
        let report = report_of(plan);
        report.bands.iter().flat_map(|b| b.feeds.iter().map(|f| f.verdict.kind)).collect()
    };
    // Coax alone on the full-wave band is out of range, the open line with its unit works there.
    assert_eq!(kinds(&plan)[2], VerdictKind::OutOfRange);
    assert_eq!(kinds(&plan)[3], VerdictKind::WithMatchingUnit);
    plan.transmitter.power_w = 50_000.0;
    assert_eq!(kinds(&plan)[3], VerdictKind::Overstressed);
    plan.transmitter.power_w = 100.0;
    plan.least_share_to_wire = 0.99;
    assert_eq!(kinds(&plan)[3], VerdictKind::TooLossy);
    plan.transmitter.swr_limit = 20.0;
    plan.least_share_to_wire = 0.1;
    assert_eq!(kinds(&plan)[0], VerdictKind::Direct);
}

#[test]
fn asked_frequencies_are_used_and_checked() {
    let plan = sample::plan();
    let report = Evaluator::new().evaluate_at(&plan, 1, &[14.15e6, 7.1e6]).unwrap();
    let frequencies: Vec<f64> = report.bands[0].points.iter().map(|p| p.frequency_hz).collect();
    assert_eq!(frequencies, vec![7.1e6, 14.15e6]);
    let sentence = Evaluator::new().evaluate_at(&plan, 1, &[0.2e6]).unwrap_err().to_string();
    assert!(sentence.contains("0.2 MHz") && sentence.contains("1.8 to 54 MHz"), "{sentence}");
}

/// JSON: no null, no NaN, every number finite.
#[test]
fn json_has_no_null() {
    let mut plan = sample::plan();
    plan.feeds[0].links.clear();
    let value: serde_json::Value = serde_json::from_str(&crate::report::json(&report(&plan))).unwrap();
    fn no_null(value: &serde_json::Value) {
        match value {
            serde_json::Value::Null => panic!("null"),
            serde_json::Value::Array(items) => items.iter().for_each(no_null),
            serde_json::Value::Object(fields) => fields.values().for_each(no_null),
            _ => {}
        }
    }
    no_null(&value);
    assert_eq!(value["bands"][0]["frequencies"].as_array().unwrap().len(), 101);
}
