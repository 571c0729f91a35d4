//! Each edit on the demo, and the stops of dragged numbers.

use station::plan::{
    Circuit, ConductorChoice, Earth, LineChoice, Link, Load, MatchingUnit, PathPoint, Plan, Point,
    SupportKind, Transformer, Transmitter, Wire,
};

use super::*;
use crate::start;

fn after(edit: Edit) -> Plan {
    let outcome = apply(&start::demo(), &edit).unwrap();
    assert_eq!(outcome.stop, None, "{edit:?}");
    outcome.plan
}

/// The stop and the plan of an edit that goes too far.
fn stopped(edit: Edit) -> (Plan, String) {
    let outcome = apply(&start::demo(), &edit).unwrap();
    validate::check(&outcome.plan).unwrap();
    (outcome.plan, outcome.stop.unwrap_or_else(|| panic!("{edit:?} went through")))
}

fn refused(edit: Edit) -> String {
    apply(&start::demo(), &edit).unwrap_err().to_string()
}

fn near(a: f64, b: f64) -> bool {
    (a - b).abs() < 1e-9
}

#[test]
fn the_wires_beginning_moves_and_its_end_stays() {
    let before = start::demo().wires[0].clone();
    let wire = after(Edit::WireBeginning { wire: 0, start_m: before.start_m + 1.5 }).wires[0].clone();
    assert!(near(wire.cut_length_m, before.cut_length_m - 1.5));
    assert!(near(wire.start_m + wire.cut_length_m, before.start_m + before.cut_length_m));
}

#[test]
fn the_wires_end_moves_and_its_beginning_stays() {
    let before = start::demo().wires[0].clone();
    let wire = after(Edit::CutLength { wire: 0, cut_length_m: 33.0 }).wires[0].clone();
    assert!(near(wire.cut_length_m, 33.0) && near(wire.start_m, before.start_m));
    let wire = after(Edit::WireSpan { wire: 0, start_m: 2.0, cut_length_m: 30.0 }).wires[0].clone();
    assert!(near(wire.cut_length_m, 30.0) && near(wire.start_m, 2.0));
}

#[test]
fn the_path_follows() {
    let plan = after(Edit::PathHeight { wire: 0, point: 1, height_m: 7.5 });
    assert!(matches!(plan.wires[0].path[1], PathPoint::OnSupport { height_m, .. } if near(height_m, 7.5)));
    let mut path = start::demo().wires[0].path.clone();
    path.insert(1, PathPoint::Free(Point::new(24.0, 0.0, 9.0)));
    assert_eq!(after(Edit::PathPoints { wire: 0, path: path.clone() }).wires[0].path, path);
    let conductor = ConductorChoice::Own(station::plan::ConductorData {
        name: "fence wire".to_owned(),
        diameter_m: 0.0016,
        conductivity_s_per_m: 6e6,
        stranding_factor: 1.0,
        relative_permeability: 1.0,
        core: None,
        insulation: None,
        source: String::new(),
    });
    assert_eq!(
        after(Edit::Conductor { wire: 0, conductor: conductor.clone() }).wires[0].conductor,
        conductor
    );
}

#[test]
fn the_site_follows() {
    let foot = Point::new(-2.0, 1.0, 0.0);
    assert_eq!(after(Edit::SupportFoot { support: 0, foot }).site.supports[0].foot, foot);
    assert!(near(after(Edit::SupportHeight { support: 0, height_m: 14.0 }).site.supports[0].height_m, 14.0));
    assert_eq!(after(Edit::Earth(Earth::Mirror)).site.earth, Earth::Mirror);
    let entrance = Point::new(20.0, -5.0, 1.0);
    assert_eq!(after(Edit::Entrance(entrance)).site.entrance, entrance);
    assert!(near(after(Edit::FeedFraction(0.33)).feedpoint.fraction, 0.33));
}

#[test]
fn supports_come_and_go_and_are_renamed_with_their_wires() {
    let mut third = start::demo().site.supports[0].clone();
    third.name = "lone pine".to_owned();
    third.kind = SupportKind::Tree;
    let plan = after(Edit::AddSupport(third.clone()));
    assert_eq!(plan.site.supports[2], third);
    let back = apply(&plan, &Edit::RemoveSupport { support: 2 }).unwrap().plan;
    assert_eq!(back, start::demo());
    assert!(refused(Edit::RemoveSupport { support: 0 }).contains("hangs on west mast"));

    let plan = after(Edit::RenameSupport { support: 0, name: "lee mast".to_owned() });
    assert_eq!(plan.site.supports[0].name, "lee mast");
    assert!(matches!(&plan.wires[0].path[0], PathPoint::OnSupport { support, .. } if support == "lee mast"));
    let plan = after(Edit::SupportKind { support: 1, kind: SupportKind::Tree });
    assert_eq!(plan.site.supports[1].kind, SupportKind::Tree);
    // A name that stands already would make one support of two.
    assert!(refused(Edit::RenameSupport { support: 0, name: "east mast".to_owned() }).contains("east mast"));
}

#[test]
fn the_feeds_follow() {
    let plan = after(Edit::LinkLength { feed: 1, link: 0, length_m: 21.0 });
    assert!(matches!(&plan.feeds[1].links[0], Link::Line(piece) if near(piece.length_m, 21.0)));
    let Link::Line(open) = start::demo().feeds[0].links[0].clone() else {
        panic!("the demo's first feed is open line")
    };
    let plan = after(Edit::LineKind { feed: 1, link: 0, line: open.line.clone() });
    assert!(matches!(&plan.feeds[1].links[0], Link::Line(piece) if piece.line == open.line));
    let four = Link::Transformer(Transformer { impedance_ratio: 4.0 });
    let plan = after(Edit::InsertLink { feed: 1, link: 0, new: four.clone() });
    assert_eq!((plan.feeds[1].links.len(), &plan.feeds[1].links[0]), (2, &four));
    assert_eq!(after(Edit::SetLink { feed: 0, link: 1, with: four.clone() }).feeds[0].links[1], four);
    assert_eq!(after(Edit::RemoveLink { feed: 0, link: 1 }).feeds[0].links.len(), 1);
}

#[test]
fn feeds_come_and_go() {
    let demo = start::demo();
    let plan = after(Edit::CopyFeed { feed: 0 });
    assert_eq!(plan.feeds.len(), 3);
    assert_eq!(plan.feeds[1].links, demo.feeds[0].links);
    assert_eq!(plan.feeds[1].name, format!("{} 2", demo.feeds[0].name));
    assert_eq!(after(Edit::RemoveFeed { feed: 0 }).feeds[0], demo.feeds[1]);
    let mut third = demo.feeds[1].clone();
    third.name = "spare".to_owned();
    assert_eq!(after(Edit::AddFeed(third.clone())).feeds[2], third);
    let plan = after(Edit::RenameFeed { feed: 1, name: "thin coax".to_owned() });
    assert_eq!(plan.feeds[1].name, "thin coax");

    let mut one = demo;
    one.feeds.truncate(1);
    let refusal = apply(&one, &Edit::RemoveFeed { feed: 0 }).unwrap_err();
    assert_eq!(refusal.to_string(), "a plan needs at least one feed");
}

#[test]
fn words_and_lists_follow() {
    assert_eq!(after(Edit::Name("Dune hut".to_owned())).name, "Dune hut");
    assert_eq!(after(Edit::Purpose("Practice".to_owned())).purpose, "Practice");
    assert_eq!(after(Edit::CallSign("Q0X".to_owned())).call_sign, "Q0X");
    assert_eq!(after(Edit::Edition("B".to_owned())).edition, "B");
    assert!(near(after(Edit::LeastShare(0.3)).least_share_to_wire, 0.3));
    let transmitter = Transmitter { power_w: 25.0, ..start::demo().transmitter };
    assert_eq!(after(Edit::Transmitter(transmitter.clone())).transmitter, transmitter);
    let bands = start::demo().bands[..2].to_vec();
    assert_eq!(after(Edit::Bands(bands.clone())).bands, bands);
    assert_eq!(after(Edit::Whole(Box::new(start::new_station()))), start::new_station());
}

#[test]
fn a_drag_stops_where_the_plan_is_still_sound() {
    let before = start::demo().wires[0].cut_length_m;
    let (plan, sentence) = stopped(Edit::CutLength { wire: 0, cut_length_m: 5_000.0 });
    assert!(plan.wires[0].cut_length_m > before, "it goes as far as it can");
    assert!(!sentence.is_empty());
    let (plan, _) = stopped(Edit::CutLength { wire: 0, cut_length_m: -3.0 });
    assert!(plan.wires[0].cut_length_m > 0.0 && plan.wires[0].cut_length_m < before);
    let (plan, _) = stopped(Edit::FeedFraction(1.7));
    assert!(plan.feedpoint.fraction > 0.5);
    let (plan, _) = stopped(Edit::LinkLength { feed: 0, link: 0, length_m: -4.0 });
    assert!(matches!(&plan.feeds[0].links[0], Link::Line(piece) if piece.length_m >= 0.0));
}

#[test]
fn what_is_not_a_number_is_refused() {
    for value in [f64::NAN, f64::INFINITY, f64::NEG_INFINITY] {
        let sentence = refused(Edit::CutLength { wire: 0, cut_length_m: value });
        assert!(sentence.contains("cut_length_m") && sentence.contains("accepted"), "{sentence}");
    }
}

#[test]
fn impossible_edits_are_refused_with_a_sentence() {
    assert_eq!(refused(Edit::CutLength { wire: 3, cut_length_m: 5.0 }), "the plan has no wire number 4");
    assert_eq!(refused(Edit::RemoveLink { feed: 0, link: 9 }), "the plan has no link number 10");
    let unit = Link::MatchingUnit(MatchingUnit {
        inductance_max_h: -1.0,
        capacitance_max_f: 1e-9,
        coil_q: 200.0,
        capacitor_q: 1000.0,
        rating_peak_v: None,
    });
    let sentence = refused(Edit::SetLink { feed: 0, link: 1, with: unit });
    assert!(sentence.contains("inductance_max_h") && sentence.contains("accepted"), "{sentence}");
    let line = LineChoice::Catalogue("moonbeam".to_owned());
    assert!(refused(Edit::LineKind { feed: 0, link: 0, line }).contains("moonbeam"));
    let sentence = refused(Edit::LinkLength { feed: 0, link: 1, length_m: 3.0 });
    assert_eq!(sentence, "link 2 of this feed is not a piece of line");
    assert!(!refused(Edit::Bands(Vec::new())).is_empty());
}

#[test]
fn what_is_at_a_supports_top_follows_it_and_nothing_is_left_above() {
    let demo = start::demo();
    let height_of = |plan: &Plan, point: usize| match &plan.wires[0].path[point] {
        PathPoint::OnSupport { height_m, .. } => *height_m,
        PathPoint::Free(at) => at.z_m,
    };
    let PathPoint::OnSupport { support: name, .. } = &demo.wires[0].path[0] else { panic!("on a support") };
    let support = demo.site.supports.iter().position(|s| s.name == *name).unwrap();
    let top_m = demo.site.supports[support].height_m;
    // Lower than its top, the wire stays while the support grows, and comes down with it.
    let higher = after(Edit::SupportHeight { support, height_m: top_m + 2.0 });
    assert!(near(height_of(&higher, 0), height_of(&demo, 0)));
    let lower_m = height_of(&demo, 0) - 1.0;
    let lower = after(Edit::SupportHeight { support, height_m: lower_m });
    assert!(near(height_of(&lower, 0), lower_m));
    // Now it is at the top, and goes up with it.
    let again = apply(&lower, &Edit::SupportHeight { support, height_m: lower_m + 0.5 }).unwrap().plan;
    assert!(near(height_of(&again, 0), lower_m + 0.5));
}

fn trap(name: &str, fraction: f64) -> Load {
    let circuit = Circuit::MeasuredTrap { resonance_hz: 7.05e6, capacitance_f: 60e-12, q: 150.0 };
    Load { name: name.to_owned(), wire: 0, fraction, circuit }
}

#[test]
fn loads_come_slide_change_and_go() {
    let plan = after(Edit::AddLoad(trap("west trap", 0.2)));
    assert_eq!(plan.loads, [trap("west trap", 0.2)]);
    let slid = apply(&plan, &Edit::LoadFraction { load: 0, fraction: 0.3 }).unwrap().plan;
    assert!(near(slid.loads[0].fraction, 0.3));
    let coil = Load { circuit: Circuit::Coil { inductance_h: 12e-6, q: Some(200.0) }, ..trap("coil", 0.3) };
    let changed = apply(&slid, &Edit::SetLoad { load: 0, with: coil.clone() }).unwrap().plan;
    assert_eq!(changed.loads, [coil]);
    assert_eq!(apply(&changed, &Edit::RemoveLoad { load: 0 }).unwrap().plan, start::demo());
}

#[test]
fn a_load_slides_to_the_end_of_its_wire_and_never_into_the_feedpoint() {
    let plan = after(Edit::AddLoad(trap("west trap", 0.2)));
    let end = apply(&plan, &Edit::LoadFraction { load: 0, fraction: 1.4 }).unwrap();
    assert!(end.stop.is_some() && end.plan.loads[0].fraction > 0.9 && end.plan.loads[0].fraction < 1.0);
    let feed = apply(&plan, &Edit::LoadFraction { load: 0, fraction: 0.5 }).unwrap();
    assert!(feed.stop.is_some_and(|sentence| sentence.contains("the feedpoint")));
    let away_m = (0.5 - feed.plan.loads[0].fraction) * plan.wires[0].cut_length_m;
    assert!((0.02..0.03).contains(&away_m), "{away_m} m");
    let on_it = apply(&plan, &Edit::AddLoad(trap("twin", 0.2))).unwrap_err().to_string();
    assert!(on_it.contains("west trap") && on_it.contains("accepted"), "{on_it}");
    assert!(refused(Edit::AddLoad(Load { wire: 4, ..trap("lost", 0.2) })).contains("loads[0].wire"));
    let nothing = Circuit::Coil { inductance_h: -1e-6, q: None };
    let sentence =
        apply(&plan, &Edit::SetLoad { load: 0, with: Load { circuit: nothing, ..trap("coil", 0.2) } });
    assert!(sentence.unwrap_err().to_string().contains("inductance_h"));
    assert_eq!(refused(Edit::RemoveLoad { load: 0 }), "the plan has no load number 1");
}

/// A wire between two free points that touches nothing.
fn spare() -> Wire {
    let path = [Point::new(0.0, 20.0, 8.0), Point::new(12.0, 20.0, 8.0)].map(PathPoint::Free).to_vec();
    let conductor = ConductorChoice::Catalogue("copper-2mm".to_owned());
    Wire { name: "spare".to_owned(), path, start_m: 0.0, cut_length_m: 12.0, conductor, earthed: Vec::new() }
}

#[test]
fn wires_come_and_go_with_their_loads() {
    let plan = after(Edit::AddWire(spare()));
    assert_eq!(plan.wires[1], spare());
    let mut plan = apply(&plan, &Edit::AddWire(Wire { name: "last".to_owned(), ..spare() })).unwrap().plan;
    plan.loads = vec![Load { wire: 1, ..trap("goes", 0.4) }, Load { wire: 2, ..trap("stays", 0.4) }];
    let less = apply(&plan, &Edit::RemoveWire { wire: 1 }).unwrap().plan;
    assert_eq!(less.wires.len(), 2);
    assert_eq!(less.loads, [Load { wire: 1, ..trap("stays", 0.4) }], "it stays on its wire");
    let sentence = apply(&plan, &Edit::RemoveWire { wire: 0 }).unwrap_err().to_string();
    assert!(sentence.contains("is the one that is fed"), "{sentence}");
    plan.feedpoint.wire = 2;
    assert_eq!(apply(&plan, &Edit::RemoveWire { wire: 0 }).unwrap().plan.feedpoint.wire, 1);
    let named = apply(&plan, &Edit::RenameWire { wire: 1, name: "low wire".to_owned() }).unwrap().plan;
    assert_eq!(named.wires[1].name, "low wire");
}

/// Whether an arm begins at a corner of the fed wire.
fn is_joined(plan: &Plan, arm: usize) -> bool {
    let hung = station::hang::hang(plan).unwrap();
    let begins = hung.wires[arm].vertices[0].at;
    hung.wires[0].vertices.iter().any(|corner| corner.at.distance_m(begins) < 1e-3)
}

#[test]
fn a_fan_is_joined_at_the_feedpoint_and_stays_joined() {
    let fan = after(Edit::AddArms { length_m: 5.0 });
    assert_eq!(fan.wires.len(), 3);
    let length_m = |plan: &Plan, wire: usize| station::hang::hang(plan).unwrap().wires[wire].length_m();
    assert!(near(length_m(&fan, 0), start::demo().wires[0].cut_length_m));
    assert!((length_m(&fan, 1) - 5.0).abs() < 1e-9 && is_joined(&fan, 1) && is_joined(&fan, 2));
    let second = apply(&fan, &Edit::AddArms { length_m: 3.0 }).unwrap().plan;
    assert_eq!(second.wires[0].path.len(), fan.wires[0].path.len(), "it takes the joints that are there");
    assert!((1..5).all(|arm| is_joined(&second, arm)));

    // A longer wire keeps its feedpoint between the joints.
    let feed = |plan: &Plan| station::hang::hang(plan).unwrap().feedpoint.at;
    let longer = apply(&fan, &Edit::CutLength { wire: 0, cut_length_m: 41.0 }).unwrap().plan;
    assert!(feed(&longer).distance_m(feed(&fan)) < 1e-6 && is_joined(&longer, 1));

    // A joint that is pulled takes the arm along.
    let mut path = fan.wires[0].path.clone();
    let PathPoint::Free(at) = &mut path[1] else { panic!("{path:?}") };
    at.z_m += 0.4;
    let pulled = apply(&fan, &Edit::PathPoints { wire: 0, path }).unwrap().plan;
    assert!(is_joined(&pulled, 1) && is_joined(&pulled, 2));
    assert_ne!(pulled.wires[1].path, fan.wires[1].path);
}

#[test]
fn a_closed_wire_stays_closed() {
    let corners = [(0.0, 6.0), (10.0, 6.0), (5.0, 14.0), (0.0, 6.0)];
    let mut plan = start::demo();
    let path: Vec<PathPoint> =
        corners.iter().map(|&(x, z)| PathPoint::Free(Point::new(x, 30.0, z))).collect();
    let around_m = 10.0 + 2.0 * 5.0_f64.hypot(8.0);
    plan.wires[0] = Wire { path: path.clone(), cut_length_m: around_m, ..spare() };
    let mut pulled = path;
    pulled[0] = PathPoint::Free(Point::new(-2.0, 30.0, 5.0));
    let plan = apply(&plan, &Edit::PathPoints { wire: 0, path: pulled }).unwrap().plan;
    assert_eq!(plan.wires[0].path[0], plan.wires[0].path[3]);
    let hung = station::hang::hang(&plan).unwrap();
    let (first, last) = (hung.wires[0].vertices[0], hung.wires[0].vertices.last().unwrap());
    assert!(first.at.distance_m(last.at) < 1e-9 && hung.ropes.is_empty());
}

#[test]
fn a_wire_fed_at_its_end_has_no_room_for_a_fan() {
    let mut plan = start::demo();
    plan.feedpoint.fraction = 0.005;
    let sentence = apply(&plan, &Edit::AddArms { length_m: 5.0 }).unwrap_err().to_string();
    assert!(sentence.contains("no room"), "{sentence}");
}
