//! From the pointer and the arrow keys to edits.

use eframe::egui::vec2;
use station::plan::{PathPoint, Point};
use station::units::Units;

use super::{bent, fan, flat, loaded, on, usual_view, vee};
use crate::command::Edit;
use crate::views::yard::ask::{Asked, Grid};
use crate::views::yard::grip::{Grip, Numbers};
use crate::views::yard::model::Model;

const BEGINNING: Grip = Grip::WireBeginning { wire: 0 };
const END: Grip = Grip::WireEnd { wire: 0 };

fn along(along_m: f64) -> Numbers {
    Numbers { along_m: Some(along_m), up_m: None }
}

fn up(up_m: f64) -> Numbers {
    Numbers { along_m: None, up_m: Some(up_m) }
}

fn one(asked: Asked) -> Edit {
    assert_eq!(asked.edits.len(), 1, "{asked:?}");
    asked.edits.into_iter().next().unwrap()
}

/// Where the pointer at a point brings a grip, on the grid.
fn pulled(model: &Model<'_>, grip: Grip, to: Point) -> Asked {
    let view = usual_view(model);
    let wish = model.aimed(&view, grip, view.at(to));
    model.ask(grip, model.snapped(grip, wish, Grid::coarse(Units::Metres, view.metres(8.0))))
}

fn cut(asked: Asked) -> f64 {
    match one(asked) {
        Edit::CutLength { cut_length_m, .. } | Edit::WireSpan { cut_length_m, .. } => cut_length_m,
        other => panic!("{other:?}"),
    }
}

fn near(a: f64, b: f64) -> bool {
    (a - b).abs() < 1e-6
}

#[test]
fn the_end_follows_the_pointer_along_the_path() {
    let plan = flat();
    let model = Model::of(&plan);
    // The path runs level at 10 m; the wire begins 5 m from the west mast. The pointer need not be on it.
    assert!(near(cut(pulled(&model, END, Point::new(28.02, 0.0, 10.6))), 23.0));
    assert!(near(cut(pulled(&model, END, Point::new(40.0, 0.0, 10.0))), 35.0));
}

#[test]
fn beyond_the_path_the_rest_hangs_down() {
    let plan = flat();
    let model = Model::of(&plan);
    let down = pulled(&model, END, Point::new(40.0, 0.0, 7.0));
    assert!(near(cut(down), 38.0), "3 m below the last point");
    let out = pulled(&model, END, Point::new(42.0, 0.0, 10.0));
    assert!(near(cut(out), 37.0), "2 m pulled out beyond it");
    let deep = pulled(&model, END, Point::new(40.0, 0.0, -4.0));
    assert!(deep.hint.clone().is_some_and(|hint| hint.contains("touch the earth")));
    assert!(cut(deep) < 45.0, "it stays clear of the earth");
}

#[test]
fn the_beginning_moves_and_the_end_stays() {
    let plan = flat();
    let model = Model::of(&plan);
    let edit = one(pulled(&model, BEGINNING, Point::new(2.0, 0.0, 10.0)));
    assert_eq!(edit, Edit::WireBeginning { wire: 0, start_m: 2.0 });
    let edit = one(pulled(&model, BEGINNING, Point::new(0.0, 0.0, 8.0)));
    let Edit::WireBeginning { start_m, .. } = edit else { panic!("{edit:?}") };
    assert!(near(start_m, -2.0), "2 m hang down at the west mast");
}

#[test]
fn both_ends_move_about_the_middle() {
    let plan = flat();
    let model = Model::of(&plan);
    let Edit::WireSpan { start_m, cut_length_m, .. } = one(model.ask_both_ends(0, 34.0)) else { panic!() };
    assert!(near(start_m, 3.0) && near(cut_length_m, 34.0));
}

#[test]
fn no_wire_is_shorter_than_it_can_be() {
    let plan = flat();
    let model = Model::of(&plan);
    for grip in [BEGINNING, END] {
        let asked = model.ask(grip, along(-7.0));
        assert!(asked.hint.is_some(), "{grip:?}");
    }
    assert!(cut(model.ask(END, along(-7.0))) > 0.1);
    assert_eq!(model.ask(END, along(f64::NAN)), Asked::default());
}

#[test]
fn the_feedpoint_snaps_at_the_centre_and_nowhere_far_from_it() {
    let plan = flat();
    let model = Model::of(&plan);
    assert_eq!(one(pulled(&model, Grip::Feedpoint, Point::new(20.2, 0.0, 10.0))), Edit::FeedFraction(0.5));
    assert_eq!(
        one(pulled(&model, Grip::Feedpoint, Point::new(14.9, 0.0, 9.0))),
        Edit::FeedFraction(1.0 / 3.0)
    );
    let Edit::FeedFraction(share) = one(pulled(&model, Grip::Feedpoint, Point::new(23.03, 0.0, 10.0))) else {
        panic!()
    };
    assert!(near(share, 18.0 / 30.0));
    let asked = pulled(&model, Grip::Feedpoint, Point::new(-9.0, 0.0, 10.0));
    assert!(asked.hint.is_none(), "the nearest place on the wire is its beginning");
    assert_eq!(one(asked), Edit::FeedFraction(0.005));
    assert!(model.ask(Grip::Feedpoint, along(99.0)).hint.is_some());
}

#[test]
fn fixings_stay_on_their_supports() {
    let plan = vee();
    let model = Model::of(&plan);
    let apex = Grip::PathPoint { wire: 0, point: 1 };
    assert_eq!(model.name(apex), "apex");
    let edit = one(pulled(&model, apex, Point::new(24.0, 0.0, 9.04)));
    let Edit::PathHeight { point: 1, height_m, .. } = edit else { panic!("{edit:?}") };
    assert!(near(height_m, 9.0));
    let asked = model.ask(apex, up(40.0));
    assert!(asked.hint.clone().is_some_and(|hint| hint.contains("raise its top")));
    assert_eq!(one(asked), Edit::PathHeight { wire: 0, point: 1, height_m: 13.0 });
}

#[test]
fn a_fixing_does_not_let_the_hanging_end_touch_the_earth() {
    let plan = bent();
    let model = Model::of(&plan);
    let asked = model.ask(Grip::PathPoint { wire: 0, point: 1 }, up(1.0));
    assert!(asked.hint.is_some());
    let Edit::PathHeight { height_m, .. } = one(asked) else { panic!() };
    assert!(height_m > 4.0, "4 m hang down there: {height_m}");
}

#[test]
fn supports_keep_their_distance_and_everything_else_stays() {
    let plan = flat();
    let model = Model::of(&plan);
    let east = Grip::SupportFoot { support: 1 };
    let edit = one(pulled(&model, east, Point::new(44.03, 0.0, 3.0)));
    assert_eq!(edit, Edit::SupportFoot { support: 1, foot: Point::new(44.0, 0.0, 0.0) });
    // The west mast is counted from the east mast: farther means to the left.
    let west = Grip::SupportFoot { support: 0 };
    assert!(near(model.numbers(west).along_m.unwrap(), 40.0));
    let Edit::SupportFoot { foot, .. } = one(model.ask(west, along(43.0))) else { panic!() };
    assert!(near(foot.x_m, -3.0) && near(foot.y_m, 0.0));
    let close = model.ask(west, along(-5.0));
    assert!(close.hint.is_some_and(|hint| hint.contains("east mast")));
}

#[test]
fn the_entrance_goes_anywhere_over_the_earth_and_keeps_its_distance_from_the_plane() {
    let plan = flat();
    let model = Model::of(&plan);
    let edit = one(pulled(&model, Grip::Entrance, Point::new(9.0, 0.0, 2.0)));
    let Edit::Entrance(at) = edit else { panic!("{edit:?}") };
    assert!(at.distance_m(Point::new(9.0, -5.0, 2.0)) < 1e-6);
    let asked = pulled(&model, Grip::Entrance, Point::new(9.0, 0.0, -2.0));
    assert!(asked.hint.is_some());
}

#[test]
fn pulling_a_spans_middle_bends_the_wire() {
    let plan = flat();
    let model = Model::of(&plan);
    let view = usual_view(&model);
    let bend = model.bend(Grip::NewPoint { wire: 0, span: 0 }).unwrap();
    let grid = Some(Grid::coarse(Units::Metres, 0.0));
    let Edit::PathPoints { path, .. } =
        one(model.ask_bend(&view, &bend, view.at(Point::new(15.0, 0.0, 6.0)), grid))
    else {
        panic!()
    };
    assert_eq!(path.len(), 3);
    assert!(matches!(path[1], PathPoint::Free(at) if at.distance_m(Point::new(15.0, 0.0, 6.0)) < 1e-6));
}

#[test]
fn a_free_point_is_made_fast_to_a_support_close_by() {
    let mut plan = flat();
    plan.site.supports.push(super::support("pole", 22.0, 14.0));
    let model = Model::of(&plan);
    let view = usual_view(&model);
    let bend = model.bend(Grip::NewPoint { wire: 0, span: 0 }).unwrap();
    let at = view.at(Point::new(22.0, 0.0, 13.0)) + vec2(4.0, 0.0);
    let asked = model.ask_bend(&view, &bend, at, Some(Grid::coarse(Units::Metres, 0.0)));
    assert_eq!(asked.hint.as_deref(), Some("made fast to pole"));
    let Edit::PathPoints { path, .. } = one(asked) else { panic!() };
    assert_eq!(path[1], on("pole", 13.0));
}

#[test]
fn a_point_back_in_line_is_let_go() {
    let mut plan = flat();
    plan.wires[0].path.insert(1, PathPoint::Free(Point::new(20.0, 0.0, 10.1)));
    let model = Model::of(&plan);
    let view = usual_view(&model);
    let bend = model.bend(Grip::PathPoint { wire: 0, point: 1 }).unwrap();
    let Some(Edit::PathPoints { path, .. }) = model.ask_let_go(&view, &bend) else { panic!("it is in line") };
    assert_eq!(path.len(), 2);
    plan.wires[0].path[1] = PathPoint::Free(Point::new(20.0, 0.0, 12.0));
    let model = Model::of(&plan);
    assert_eq!(model.ask_let_go(&view, &bend), None);
    assert_eq!(model.ask_removal(Grip::PathPoint { wire: 0, point: 0 }), None, "ends of a path stay");
}

#[test]
fn arrows_move_what_they_point_at() {
    let plan = flat();
    let model = Model::of(&plan);
    let grid = Grid::coarse(Units::Metres, 0.0);
    let cut_m = |grip, right, up| model.nudged(grip, right, up, grid).along_m.unwrap();
    assert!(near(cut_m(END, 1.0, 0.0), 30.1) && near(cut_m(END, -1.0, 0.0), 29.9));
    assert!(near(cut_m(BEGINNING, 1.0, 0.0), 29.9) && near(cut_m(BEGINNING, -1.0, 0.0), 30.1));
    assert!(near(cut_m(END, 0.0, 1.0), 30.0), "up is across a level wire");
    assert!(near(cut_m(Grip::Feedpoint, -1.0, 0.0), 14.9));
    let fine = model.nudged(END, 1.0, 0.0, Grid::fine(Units::Metres)).along_m.unwrap();
    assert!(near(fine, 30.01));
    let top = model.nudged(Grip::SupportTop { support: 0 }, 0.0, 1.0, grid);
    assert!(near(top.up_m.unwrap(), 11.1));
    let west = model.nudged(Grip::SupportFoot { support: 0 }, 1.0, 0.0, grid);
    assert!(near(west.along_m.unwrap(), 39.9), "to the right is nearer to the east mast");

    let plan = bent();
    let model = Model::of(&plan);
    let cut_m = |grip, right, up| model.nudged(grip, right, up, grid).along_m.unwrap();
    assert!(near(cut_m(END, 0.0, -1.0), 47.1) && near(cut_m(END, 0.0, 1.0), 46.9));
    assert!(near(cut_m(BEGINNING, 0.0, -1.0), 47.1) && near(cut_m(BEGINNING, 0.0, 1.0), 46.9));
}

#[test]
fn feet_snap_to_half_a_foot() {
    let plan = flat();
    let model = Model::of(&plan);
    let snapped = model.snapped(END, along(30.0), Grid::coarse(Units::Feet, 0.0)).along_m.unwrap();
    let feet = Units::Feet.from_metres(snapped);
    assert!(near(feet, 98.5), "{feet}");
}

#[test]
fn a_load_slides_along_its_wire_on_the_grid() {
    let plan = loaded();
    let model = Model::of(&plan);
    let trap = Grip::Load { load: 1 };
    assert_eq!(model.name(trap), "load 14 MHz trap");
    let edit = one(pulled(&model, trap, Point::new(16.02, 0.0, 12.0)));
    let Edit::LoadFraction { load: 1, fraction } = edit else { panic!("{edit:?}") };
    assert!(near(fraction, 11.0 / 30.0));
    let asked = model.ask(trap, along(99.0));
    assert!(asked.hint.is_some());
    let nudged = model.nudged(trap, 1.0, 0.0, Grid::coarse(Units::Metres, 0.0));
    assert!(near(nudged.along_m.unwrap(), 9.1));
    assert_eq!(model.ask_removal(trap), Some(Edit::RemoveLoad { load: 1 }));
}

#[test]
fn of_joined_points_one_is_taken_hold_of() {
    let plan = fan();
    let model = Model::of(&plan);
    let grips = model.grips();
    for arm in [1, 2] {
        assert!(!grips.contains(&Grip::PathPoint { wire: arm, point: 0 }), "it follows the main wire");
        assert!(!grips.contains(&Grip::WireBeginning { wire: arm }));
        assert!(grips.contains(&Grip::WireEnd { wire: arm }));
    }
    assert!(grips.contains(&Grip::PathPoint { wire: 0, point: 1 }));
}
