use super::*;
use crate::plan::{
    Circuit, Earth, EarthConnection, Electrode, LineChoice, LinePiece, Link, Load, PathPoint, Point, WireEnd,
};
use crate::report::{Shares, VerdictKind};
use crate::sample;

fn farmland() -> Earth {
    Earth::Catalogue("farmland".to_owned())
}

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

/// The sample with a trap that is far narrower than the distance between two solutions.
fn with_trap() -> Plan {
    let mut plan = sample::plan();
    plan.loads = vec![Load {
        name: "7 MHz trap".to_owned(),
        wire: 0,
        fraction: 0.76,
        circuit: Circuit::MeasuredTrap { resonance_hz: 7.1e6, capacitance_f: 60e-12, q: 300.0 },
    }];
    plan
}

/// The trap is attached to the solved ports at each frequency, so it cannot slip between the sweep's solutions: the
/// swept answer is that of a direct solution at every frequency.
#[test]
fn a_sharp_trap_between_sweep_frequencies_is_found() {
    let plan = with_trap();
    let swept = report(&plan);
    let band = &swept.bands[1];
    let asked: Vec<f64> = band.points.iter().skip(2).step_by(14).map(|point| point.frequency_hz).collect();
    for chunk in asked.chunks(8) {
        let direct = Evaluator::new().evaluate_at(&plan, 1, chunk).unwrap();
        for point in &direct.bands[0].points {
            let off = |p: &&FrequencyReport| (p.frequency_hz - point.frequency_hz).abs();
            let near = band.points.iter().min_by(|a, b| off(a).total_cmp(&off(b))).unwrap();
            let difference = (near.feedpoint_ohm - point.feedpoint_ohm).norm() / point.feedpoint_ohm.norm();
            assert!(difference < 2e-3, "{} Hz: {difference}", point.frequency_hz);
        }
    }
    // And it is sharp: it changes the impedance by far more than the band's width does without it.
    let bare = report(&sample::plan());
    let change = (band.points[50].feedpoint_ohm - bare.bands[1].points[50].feedpoint_ohm).norm();
    assert!(change > 0.2 * bare.bands[1].points[50].feedpoint_ohm.norm(), "{change}");
}

/// A change of line, power or limits keeps the attached answer; a change of a load's circuit keeps the solved wires.
#[test]
fn lines_and_loads_never_solve_the_wires_again() {
    let mut plan = with_trap();
    let mut evaluator = Evaluator::new();
    evaluator.evaluate(&plan, 1).unwrap();
    let kept = |e: &Evaluator| {
        e.full.as_ref().map(|full| (Arc::as_ptr(&full.solution), full.solved.identity())).unwrap()
    };
    let before = kept(&evaluator);
    plan.feeds[0].links.clear();
    plan.transmitter.power_w = 20.0;
    evaluator.evaluate(&plan, 2).unwrap();
    assert_eq!(kept(&evaluator), before);
    plan.loads[0].circuit = Circuit::Resistor { resistance_ohm: 200.0 };
    evaluator.evaluate(&plan, 3).unwrap();
    assert_eq!(kept(&evaluator).1, before.1);
    plan.wires[0].cut_length_m -= 0.1;
    evaluator.evaluate(&plan, 4).unwrap();
    assert_ne!(kept(&evaluator).1, before.1);
}

/// The potential jumps across the feed gap by the feedpoint voltage on every band.
#[test]
fn the_potential_jumps_by_the_feed_voltage() {
    let mut plan = sample::plan();
    for earth in [Earth::NoEarth, Earth::Mirror, farmland()] {
        plan.site.earth = earth;
        for band in report(&plan).bands {
            let z = band.middle_point().feedpoint_ohm;
            let volts = (2.0 / z.inv().re).sqrt();
            let wave = &band.wave.wires[0];
            let before = wave.arc_m.iter().position(|arc| (arc - 19.99).abs() < 1e-9).unwrap();
            let jump = wave.potential_v[before + 1] - wave.potential_v[before];
            assert!((jump - volts).norm() < 0.01 * volts, "{}: {jump} for {volts}", band.name);
        }
    }
}

/// Watts to the sky, by integration over the sphere, and watts burnt add up to what the feedpoint takes.
#[test]
fn energy_is_in_balance_with_and_without_loads() {
    let mut plan = with_trap();
    for earth in [Earth::NoEarth, Earth::Mirror, farmland()] {
        plan.site.earth = earth;
        let mut evaluator = Evaluator::new();
        let report = evaluator.evaluate(&plan, 1).unwrap();
        for band in report.bands {
            let proof = evaluator.prove(&plan, band.middle_point().frequency_hz).unwrap().unwrap();
            let balance = proof.energy_balance().unwrap();
            assert!((balance - 1.0).abs() < 3e-3, "{}: {balance}", band.name);
            assert!(proof.mesh_error < 5e-3, "{}: {}", band.name, proof.mesh_error);
        }
    }
}

/// The sketch is a sketch of the full answer: the same picture, not the same figures.
#[test]
fn the_sketch_looks_like_the_full_answer() {
    let plan = sample::plan();
    let full = report(&plan);
    let sketch = Evaluator::new().sketch(&plan, 7).unwrap();
    assert!(matches!(full.model, Model::Full { .. }) && sketch.model == Model::Sketch);
    for (full, sketch) in full.bands.iter().zip(&sketch.bands) {
        let (a, b) = (full.middle_point().feedpoint_ohm, sketch.middle_point().feedpoint_ohm);
        assert!((a - b).norm() < 0.5 * a.norm(), "{}: {a} and {b}", full.name);
        assert_eq!(full.wave.wires[0].marks.len(), sketch.wave.wires[0].marks.len(), "{}", full.name);
    }
}

/// A low wire whose end goes down to an earth stake: the current goes on into the lead, the electrode's watts heat the
/// earth, and a better electrode gives more sky.
#[test]
fn an_earthed_end_carries_current_into_the_earth() {
    let earthed = |electrode: Option<Electrode>| {
        let mut plan = sample::plan();
        let connection = electrode.map(|electrode| EarthConnection { end: WireEnd::End, electrode });
        plan.wires[0].earthed = connection.into_iter().collect();
        report(&plan)
    };
    let stated = |resistance_ohm| Some(Electrode::Stated { resistance_ohm, reactance_ohm: 0.0 });
    let end_a = |report: &Report| report.bands[0].wave.wires[0].current_a.last().unwrap().norm();
    let [open, poor, good] = [None, stated(300.0), stated(10.0)].map(earthed);
    assert!(end_a(&good) > 5.0 * end_a(&open), "{} against {}", end_a(&good), end_a(&open));
    let shares = |report: &Report| report.bands[0].middle_point().shares;
    for report in [&open, &poor, &good] {
        let Shares { sky, earth, burnt } = shares(report);
        assert!((sky + earth + burnt - 1.0).abs() < 1e-9 && sky > 0.0 && earth > 0.0 && burnt < 0.1);
    }
    assert!(shares(&good).sky > shares(&poor).sky, "{:?} {:?}", shares(&good), shares(&poor));
    assert!(good.findings.iter().any(|finding| finding.text.contains("approximately")));
    let stake = earthed(Some(Electrode::Stake { length_m: 1.5, diameter_m: 0.016 }));
    assert!(stake.bands[0].middle_point().feedpoint_ohm.is_finite());
}

#[test]
fn without_an_earth_nothing_is_earthed() {
    let mut plan = sample::plan();
    plan.site.earth = Earth::NoEarth;
    plan.wires[0].earthed = vec![EarthConnection {
        end: WireEnd::End,
        electrode: Electrode::Stake { length_m: 1.5, diameter_m: 0.016 },
    }];
    let refusal = Evaluator::new().evaluate(&plan, 1).unwrap_err().to_string();
    assert!(refusal.contains("wires[0].earthed") && refusal.contains("accepted"), "{refusal}");
}

/// Lower than the earth's kernels are made for: said in words, no number.
#[test]
fn a_wire_too_near_the_soil_is_refused_in_words() {
    let mut plan = sample::plan();
    plan.wires[0].path =
        vec![PathPoint::Free(Point::new(-20.0, 0.0, 0.06)), PathPoint::Free(Point::new(20.0, 0.0, 0.06))];
    plan.wires[0].start_m = 0.0;
    let refusal = Evaluator::new().evaluate_at(&plan, 1, &[1.85e6]).map(|_| ()).unwrap_err().to_string();
    assert!(
        refusal.contains("wires[0]") && refusal.contains("0.06 m") && refusal.contains("at least"),
        "{refusal}"
    );
}
