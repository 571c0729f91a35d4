//! Where things stand: grips apart, texts apart, everything of a fitted site in view.

use eframe::egui::{Pos2, Vec2, vec2};
use sheet::tokens::Ink;
use station::evaluate::Evaluator;
use station::plan::Plan;
use station::units::Units;

use super::{bent, end_fed, flat, vee, view};
use crate::views::yard::grip::Grip;
use crate::views::yard::layout::{Asking, GRIP_PX, Layout, Type};
use crate::views::yard::model::Model;

const SIZES: [Vec2; 4] = [vec2(640.0, 300.0), vec2(860.0, 420.0), vec2(1240.0, 560.0), vec2(1900.0, 700.0)];

/// As wide as the usual font, more or less.
fn measure(text: &str, size: Type) -> Vec2 {
    let em = if size == Type::Small { 11.5 } else { 13.5 };
    vec2(0.52 * em * text.chars().count() as f32, 1.2 * em)
}

fn plans() -> [(&'static str, Plan); 4] {
    [("flat", flat()), ("vee", vee()), ("bent", bent()), ("end-fed", end_fed())]
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
        for name in ["wire beginning", "wire end", "feedpoint", "entrance"] {
            assert!(names.iter().any(|n| n == name), "{what}: no {name}");
        }
    }
}
