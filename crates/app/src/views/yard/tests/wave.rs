//! Ribbon, whiskers and grain, on a wave that is known in closed form.

use num_complex::Complex64;
use station::report::{Mark, MarkKind, WireWave};

use super::{bent, flat, usual_view};
use crate::views::yard::model::Model;
use crate::views::yard::wave::{Phase, Size, Wave};

const SIZE: Size = Size { ribbon_px: 20.0, whisker_px: 50.0, watts: 4.0 };

/// A half wave: the current is a half sine in phase, the voltage a cosine a quarter cycle later, plus at the beginning.
fn half_wave(length_m: f64) -> WireWave {
    let arc_m: Vec<f64> = (0..=100).map(|n| length_m * f64::from(n) / 100.0).collect();
    let angle = |m: f64| std::f64::consts::PI * m / length_m;
    WireWave {
        current_a: arc_m.iter().map(|&m| Complex64::new(0.2 * angle(m).sin(), 0.0)).collect(),
        potential_v: arc_m.iter().map(|&m| Complex64::new(0.0, 80.0 * angle(m).cos())).collect(),
        marks: vec![Mark { arc_m: 0.5 * length_m, kind: MarkKind::CurrentLoop }],
        arc_m,
    }
}

#[test]
fn the_read_out_is_peak_at_the_watts_that_arrive() {
    let plan = flat();
    let model = Model::of(&plan);
    let source = half_wave(30.0);
    let wave = Wave::along(&usual_view(&model), model.hung_wire(0).unwrap(), &source, SIZE).unwrap();
    // 4 W: twice the values for 1 W.
    let middle = wave.read(15.0);
    assert!((middle.current_a - 0.4).abs() < 1e-6 && middle.voltage_v < 1e-3);
    let (beginning, end) = wave.at_ends();
    assert!((beginning.voltage_v - 160.0).abs() < 1e-4 && (end.voltage_v - 160.0).abs() < 1e-4);
    let between = wave.read(7.5);
    assert!((between.current_a - 0.4 * 0.5_f64.sqrt()).abs() < 1e-4);
}

#[test]
fn at_the_feed_gap_the_volts_of_one_side_are_read() {
    let plan = flat();
    let model = Model::of(&plan);
    // The potential jumps from +50 to −30 V between two samples at 15 m.
    let source = WireWave {
        arc_m: vec![0.0, 14.99, 15.01, 30.0],
        current_a: vec![Complex64::ZERO; 4],
        potential_v: [10.0, 50.0, -30.0, -10.0].map(|v| Complex64::new(v, 0.0)).to_vec(),
        marks: vec![],
    };
    let size = Size { watts: 1.0, ..SIZE };
    let wave = Wave::along(&usual_view(&model), model.hung_wire(0).unwrap(), &source, size).unwrap();
    assert!((wave.read(15.0).voltage_v - 50.0).abs() < 1e-3);
}

#[test]
fn the_ribbon_breathes_and_stays_in_its_envelope() {
    let plan = flat();
    let model = Model::of(&plan);
    let source = half_wave(30.0);
    let wave = Wave::along(&usual_view(&model), model.hung_wire(0).unwrap(), &source, SIZE).unwrap();
    let thickest = |phase_deg: f64| {
        let ribbon = wave.ribbon(Phase::degrees(phase_deg));
        ribbon.upper.iter().zip(&ribbon.lower).map(|(a, b)| a.distance(*b)).fold(0.0_f32, f32::max)
    };
    assert!((thickest(0.0) - 40.0).abs() < 0.1);
    assert!((thickest(60.0) - 20.0).abs() < 0.1);
    assert!(thickest(90.0) < 0.1);
    assert!((thickest(180.0) - 40.0).abs() < 0.1);
    let envelope = wave.current_envelope();
    for (n, (a, b)) in envelope.upper.iter().zip(&envelope.lower).enumerate() {
        let ribbon = wave.ribbon(Phase::degrees(33.0));
        assert!(ribbon.upper[n].distance(ribbon.lower[n]) <= a.distance(*b) + 1e-3);
    }
}

#[test]
fn whiskers_stand_up_for_plus_whichever_way_the_wire_runs() {
    for turned in [false, true] {
        let mut plan = flat();
        if turned {
            plan.wires[0].path.reverse();
        }
        let model = Model::of(&plan);
        let view = usual_view(&model);
        let source = half_wave(30.0);
        let wave = Wave::along(&view, model.hung_wire(0).unwrap(), &source, SIZE).unwrap();
        // Re(j·80·exp(j·270°)) = +80 at the beginning, −80 at the end.
        let whiskers = wave.whiskers(Phase::degrees(270.0));
        let begins = view.at(model.hung_wire(0).unwrap().vertices[0].at);
        let nearest =
            whiskers.iter().min_by(|a, b| a[0].distance(begins).total_cmp(&b[0].distance(begins))).unwrap();
        assert!(nearest[1].y < nearest[0].y - 40.0, "plus is up: {nearest:?}");
        let farthest =
            whiskers.iter().max_by(|a, b| a[0].distance(begins).total_cmp(&b[0].distance(begins))).unwrap();
        assert!(farthest[1].y > farthest[0].y + 40.0, "minus is down: {farthest:?}");
        let still = wave.whiskers(Phase::degrees(0.0));
        assert!(still.is_empty(), "no voltage while the current is at its peak");
    }
}

#[test]
fn grain_points_and_flows_with_the_current() {
    let plan = flat();
    let model = Model::of(&plan);
    let source = half_wave(30.0);
    let wave = Wave::along(&usual_view(&model), model.hung_wire(0).unwrap(), &source, SIZE).unwrap();
    let tip_is_right = |phase_deg: f64| {
        let grain = wave.grain(Phase::degrees(phase_deg));
        assert!(grain.len() > 10);
        grain.iter().all(|[wing, tip, _]| tip.x > wing.x)
    };
    assert!(tip_is_right(0.0), "toward the wire's end");
    assert!(!tip_is_right(180.0), "and back");
    // Between −60° and +60° the current flows to the right all the time: each grain has moved that way.
    let (early, late) = (wave.grain(Phase::degrees(-30.0)), wave.grain(Phase::degrees(30.0)));
    let middle = |grain: &[[eframe::egui::Pos2; 3]]| grain[grain.len() / 2][1].x;
    assert!(middle(&late) > middle(&early) + 1.0);
    // At rest in between there is none.
    assert!(wave.grain(Phase::degrees(90.0)).is_empty());
}

#[test]
fn in_a_bend_nothing_of_one_leg_lies_over_the_other() {
    let plan = bent();
    let model = Model::of(&plan);
    let view = usual_view(&model);
    let wire = model.hung_wire(0).unwrap();
    let source = half_wave(47.0);
    let wave = Wave::along(&view, wire, &source, SIZE).unwrap();
    let corner = view.at(wire.vertices[1].at);
    let mut inside = 0;
    for line in wave.whiskers(Phase::degrees(90.0)).iter().chain(&wave.whiskers(Phase::degrees(270.0))) {
        let [foot, tip] = *line;
        // East of the hanging end and below the path lies the inner angle of 90°; its bisector runs at 45°.
        let on_hanging_end = (foot.x - corner.x).abs() < 1.0 && foot.y > corner.y + 8.0;
        if on_hanging_end && tip.x > foot.x {
            inside += 1;
            assert!(tip.x - corner.x <= foot.y - corner.y + 1.0, "{line:?} crosses the bisector");
        }
        let on_path = foot.x > corner.x + 8.0 && foot.x < corner.x + 60.0 && (foot.y - corner.y).abs() < 1.0;
        if on_path && tip.y > foot.y {
            inside += 1;
            assert!(tip.y - corner.y <= foot.x - corner.x + 1.0, "{line:?} crosses the bisector");
        }
    }
    assert!(inside > 0, "some whiskers fit inside");
}

#[test]
fn nothing_is_drawn_of_a_wave_without_samples() {
    let plan = flat();
    let model = Model::of(&plan);
    let source = WireWave { arc_m: vec![], current_a: vec![], potential_v: vec![], marks: vec![] };
    assert!(Wave::along(&usual_view(&model), model.hung_wire(0).unwrap(), &source, SIZE).is_none());
}
