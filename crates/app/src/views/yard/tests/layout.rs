//! Where things stand: grips apart, texts apart, everything of a fitted site in view.

use eframe::egui::{Pos2, Vec2, vec2};
use sheet::tokens::Ink;
use station::evaluate::Evaluator;
use station::plan::Plan;
use station::units::Units;

use super::{
    bent, closed, ell, end_fed, end_fed_low, end_fed_with_bends, fan, flat, loaded, vee, vertical, view,
};
use crate::views::yard::grip::Grip;
use crate::views::yard::layout::{Asking, GRIP_PX, Layout, Type};
use crate::views::yard::model::Model;
use crate::views::yard::wave::crossing;
use sheet::model::LoadKind;

const SIZES: [Vec2; 4] = [vec2(640.0, 300.0), vec2(860.0, 420.0), vec2(1240.0, 560.0), vec2(1900.0, 700.0)];

/// As wide as the usual font, more or less.
fn measure(text: &str, size: Type) -> Vec2 {
    let em = if size == Type::Small { 11.5 } else { 13.5 };
    vec2(0.52 * em * text.chars().count() as f32, 1.2 * em)
}

fn plans() -> [(&'static str, Plan); 11] {
    [
        ("flat", flat()),
        ("vee", vee()),
        ("bent", bent()),
        ("end-fed", end_fed()),
        ("end-fed with bends", end_fed_with_bends()),
        ("end-fed close to the earth", end_fed_low()),
        ("fan", fan()),
        ("ell", ell()),
        ("closed", closed()),
        ("vertical", vertical()),
        ("loaded", loaded()),
    ]
}

/// Does something with the layout of each plan in each size on each band.
fn each(check: impl Fn(&str, &Layout<'_>)) {
    for (name, plan) in plans() {
        let report = Evaluator::new().evaluate(&plan, 1).unwrap();
        let model = Model::of(&plan);
        for size in SIZES {
            for band in &report.bands {
                let asking = Asking {
                    band: Some(band),
                    feed: (0, "open line"),
                    units: Units::Metres,
                    buttons: vec2(200.0, 24.0),
                };
                let layout = Layout::of(&model, view(&model, size), &asking, &measure);
                check(&format!("{name}, {}, {size:?}", band.name), &layout);
            }
        }
    }
}

#[test]
fn texts_never_overlap() {
    each(|what, layout| {
        for (n, a) in layout.texts.iter().enumerate() {
            assert!(layout.view.frame.contains_rect(a.rect), "{what}: {a:?} is cut");
            assert!(!a.rect.intersects(layout.buttons), "{what}: {a:?} under the buttons");
            assert!(!a.rect.intersects(layout.soil), "{what}: {a:?} under the soil's pick list");
            for b in &layout.texts[n + 1..] {
                assert!(!a.rect.intersects(b.rect), "{what}: {a:?} over {b:?}");
            }
        }
    });
}

#[test]
fn loops_and_nodes_are_told_in_amperes_and_volts() {
    each(|what, layout| {
        let with = |ink: Ink, unit: &str| {
            layout.texts.iter().filter(|t| t.ink == ink && t.text.ends_with(unit)).count()
        };
        assert!(!layout.marks.is_empty(), "{what}");
        assert!(with(Ink::Current, "A") > 0, "{what}: no amperes in {:?}", layout.texts);
        assert!(with(Ink::Voltage, "V") > 0, "{what}: no volts in {:?}", layout.texts);
    });
}

#[test]
fn grips_stand_apart_and_in_view() {
    each(|what, layout| {
        let handles: Vec<_> = layout.handles.iter().filter(|h| !h.grip.is_new_point()).collect();
        for (n, a) in handles.iter().enumerate() {
            assert!(layout.view.frame.contains(a.at), "{what}: {} is out of view", a.name);
            assert!(!layout.soil.contains(a.at), "{what}: {} is under the soil's pick list", a.name);
            for b in &handles[n + 1..] {
                assert!(a.at.distance(b.at) > 1.5 * GRIP_PX, "{what}: {} on {}", a.name, b.name);
            }
        }
    });
}

#[test]
fn the_wires_ends_stand_at_the_wire_and_the_others_give_way() {
    // The wire covers its whole path: its ends, the fixings and the masts' tops share their places.
    let mut plan = flat();
    (plan.wires[0].start_m, plan.wires[0].cut_length_m) = (0.0, 40.0);
    plan.site.supports[0].height_m = 10.0;
    let model = Model::of(&plan);
    let asking = Asking { band: None, feed: (0, ""), units: Units::Feet, buttons: vec2(200.0, 24.0) };
    let layout = Layout::of(&model, view(&model, SIZES[1]), &asking, &measure);
    let at = |grip: Grip| -> (Pos2, Pos2) {
        let handle = layout.handles.iter().find(|h| h.grip == grip).unwrap();
        (handle.at, handle.anchor)
    };
    let (end, anchor) = at(Grip::WireBeginning { wire: 0 });
    assert_eq!(end, anchor);
    let (fixing, anchor) = at(Grip::PathPoint { wire: 0, point: 0 });
    assert!(fixing.x < anchor.x - GRIP_PX, "the fixing gives way outward");
    let (top, anchor) = at(Grip::SupportTop { support: 0 });
    assert!(top.y < anchor.y - GRIP_PX, "the top gives way upward");
}

#[test]
fn every_grip_has_a_name_of_its_own() {
    for (what, plan) in plans() {
        let model = Model::of(&plan);
        let mut names: Vec<String> = model.grips().into_iter().map(|grip| model.name(grip)).collect();
        let count = names.len();
        names.sort();
        names.dedup();
        assert_eq!(names.len(), count, "{what}: {names:?}");
        let ends: &[&str] = match what {
            "fan" => &["main wire beginning", "arm 1 end", "arm 2 end"],
            "ell" => &["main wire beginning", "drop end"],
            "closed" => &["apex"],
            _ => &["wire beginning", "wire end"],
        };
        for name in ends.iter().chain(&["feedpoint", "entrance"]) {
            assert!(names.iter().any(|n| n == *name), "{what}: no {name}");
        }
    }
}

#[test]
fn envelopes_meet_at_a_bend_and_go_on_without_a_loop() {
    // Two pieces farther apart than this belong to different legs that may well cross on the screen.
    const NEAR: usize = 60;
    let loop_in = |edge: &[Pos2]| {
        let pieces: Vec<[Pos2; 2]> = edge.windows(2).map(|p| [p[0], p[1]]).filter(|[a, b]| a != b).collect();
        (0..pieces.len()).find_map(|n| {
            let later = pieces.iter().skip(n + 2).take(NEAR);
            later.filter_map(|b| crossing(pieces[n], *b)).find(|at| at.distance(pieces[n][1]) > 0.01)
        })
    };
    each(|what, layout| {
        for (wire, wave) in &layout.waves {
            for ribbon in [wave.voltage_envelope(), wave.current_envelope()] {
                let found = loop_in(&ribbon.upper).or(loop_in(&ribbon.lower));
                assert!(found.is_none(), "{what}, wire {wire}: a loop at {found:?}");
            }
        }
    });
}

#[test]
fn every_wire_carries_its_wave_and_every_load_stands_on_its_wire() {
    each(|what, layout| {
        assert_eq!(layout.waves.len(), layout.wires.len(), "{what}");
        for (wire, wave) in &layout.waves {
            let ribbon = wave.current_envelope();
            assert!(ribbon.upper.len() > 8, "{what}: wire {wire}");
        }
    });
    let plan = loaded();
    let model = Model::of(&plan);
    let asking = Asking { band: None, feed: (0, ""), units: Units::Metres, buttons: vec2(200.0, 24.0) };
    let layout = Layout::of(&model, view(&model, SIZES[1]), &asking, &measure);
    let kinds: Vec<LoadKind> = layout.loads.iter().map(|load| load.kind).collect();
    assert_eq!(kinds, [LoadKind::Coil, LoadKind::Trap, LoadKind::Capacitor, LoadKind::Resistor]);
    for (n, load) in layout.loads.iter().enumerate() {
        let handle = layout.handles.iter().find(|h| h.grip == Grip::Load { load: n }).unwrap();
        assert_eq!(handle.anchor, load.at);
        let line = &layout.wires[0];
        assert!((load.at.y - line[0].y).abs() < 0.5 && load.at.x > line[0].x && load.at.x < line[1].x);
    }
}

#[test]
fn a_short_stub_does_not_shrink_all_other_whiskers() {
    // 0.4 m of 80 m: one hundredth of a wavelength on 40 m.
    let plan = end_fed();
    let report = Evaluator::new().evaluate(&plan, 1).unwrap();
    let model = Model::of(&plan);
    let band = &report.bands[0];
    let asking = Asking { band: Some(band), feed: (0, ""), units: Units::Metres, buttons: vec2(200.0, 24.0) };
    let layout = Layout::of(&model, view(&model, SIZES[3]), &asking, &measure);
    let (_, wave) = &layout.waves[0];
    let envelope = wave.voltage_envelope();
    let reach = |n: usize| 0.5 * envelope.upper[n].distance(envelope.lower[n]);
    let begins = model.hung_wire(0).unwrap().length_m() * 0.1;
    let far = (0..envelope.upper.len())
        .filter(|&n| n as f64 * 80.0 / envelope.upper.len() as f64 > begins)
        .map(reach)
        .fold(0.0_f32, f32::max);
    let longest = (0..envelope.upper.len()).map(reach).fold(0.0_f32, f32::max);
    assert!(far > 0.6 * longest, "the rest reaches {far} px, the longest {longest} px");
}
