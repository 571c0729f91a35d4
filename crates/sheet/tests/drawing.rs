//! The side view of any site that can be hung: to scale, inside its frame, its labels apart.

#![allow(clippy::unwrap_used)] // A panic is the failure.

mod support;

use proptest::prelude::*;
use sheet::drawing::{Elevation, SideView, Size, side_view};
use sheet::scene::{Item, Spot, overlap};
use sheet::tokens::{Ink, Stroke};
use station::hang::hang;
use station::plan::{PathPoint, Plan, Point, Support, SupportKind};
use station::units::Units;

const SIZE: Size = Size { width_mm: 186.0, height_mm: 75.0 };

/// A random place and height of a support.
fn support_strategy() -> impl Strategy<Value = (f64, f64, f64, SupportKind)> {
    let kind = prop_oneof![Just(SupportKind::Mast), Just(SupportKind::Tree), Just(SupportKind::Building)];
    (-80.0..80.0, -30.0..30.0, 4.0..30.0, kind)
}

/// Wires over two to five supports, longer or shorter than their path, with the entrance anywhere near.
fn plan_strategy() -> impl Strategy<Value = Plan> {
    let supports = prop::collection::vec(support_strategy(), 2..=5);
    let entrance = (-90.0..90.0, -40.0..40.0, 0.0..6.0);
    (supports, entrance, -3.0..10.0, 4.0..150.0, 0.01..0.99).prop_map(
        |(supports, (x_m, y_m, z_m), start_m, cut_length_m, fraction)| {
            let mut plan = support::relief_post();
            plan.site.entrance = Point::new(x_m, y_m, z_m);
            plan.site.supports = supports
                .iter()
                .enumerate()
                .map(|(index, &(x_m, y_m, height_m, kind))| {
                    let mut support = plan.site.supports[0].clone();
                    support.name = format!("support {index}");
                    support.kind = kind;
                    support.foot = Point::new(x_m, y_m, 0.0);
                    support.height_m = height_m;
                    support
                })
                .collect();
            let fasten = |support: &Support| PathPoint::OnSupport {
                support: support.name.clone(),
                height_m: support.height_m - 0.5,
            };
            plan.wires[0].path = plan.site.supports.iter().map(fasten).collect();
            plan.wires[0].start_m = start_m;
            plan.wires[0].cut_length_m = cut_length_m;
            plan.feedpoint.fraction = fraction;
            plan.loads = support::traps_and_arms().loads;
            plan
        },
    )
}

fn drawn(plan: &Plan, units: Units) -> Option<SideView> {
    hang(plan).ok().map(|hung| side_view(plan, &hung, units, SIZE))
}

proptest! {
    #[test]
    fn labels_stay_apart_off_the_lines_and_inside(plan in plan_strategy(), in_feet in any::<bool>()) {
        let units = if in_feet { Units::Feet } else { Units::Metres };
        let view = drawn(&plan, units);
        prop_assume!(view.is_some());
        let scene = view.unwrap().scene;
        prop_assert!(scene.height_mm <= SIZE.height_mm + 1e-9);
        let boxes: Vec<[Spot; 4]> = scene.texts().map(sheet::scene::Text::corners).collect();
        for (index, a) in boxes.iter().enumerate() {
            prop_assert!(!boxes[index + 1..].iter().any(|b| overlap(a, b)));
        }
        let strokes: Vec<[Spot; 4]> = scene.items.iter().flat_map(support::strokes).collect();
        for text in scene.texts() {
            let corners = text.corners();
            prop_assert!(!strokes.iter().any(|stroke| overlap(&corners, stroke)), "\"{}\" is crossed", text.text);
        }
        let lines = scene.items.iter().flat_map(|item| match item {
            Item::Line { points, .. } | Item::Area { points, .. } => points.as_slice(),
            Item::Text(_) => &[],
        });
        for spot in boxes.iter().flatten().chain(lines) {
            // Hatching may lean out by its own width.
            prop_assert!((-2.0..=scene.width_mm + 2.0).contains(&spot.x_mm), "{spot:?}");
            prop_assert!((-0.1..=scene.height_mm + 0.1).contains(&spot.y_mm), "{spot:?}");
        }
    }

    #[test]
    fn the_drawing_is_to_scale(plan in plan_strategy()) {
        let view = drawn(&plan, Units::Metres);
        prop_assume!(view.is_some());
        let (view, hung) = (view.unwrap(), hang(&plan).unwrap());
        let elevation = Elevation::new(&plan, &hung);
        // Each piece of wire is drawn as one line: its projected length times the scale.
        for arm in &elevation.arms {
            let site_m: f64 = arm
                .places
                .windows(2)
                .map(|pair| (pair[1].along_m - pair[0].along_m).hypot(pair[1].up_m - pair[0].up_m))
                .sum();
            let drawn = view.scene.items.iter().any(|item| match item {
                Item::Line { points, stroke: Stroke::Wire, .. } => {
                    let paper_mm: f64 = points
                        .windows(2)
                        .map(|pair| (pair[1].x_mm - pair[0].x_mm).hypot(pair[1].y_mm - pair[0].y_mm))
                        .sum();
                    (paper_mm - site_m * 1000.0 / view.ratio.site_per_paper).abs() < 1e-6
                }
                _ => false,
            });
            prop_assert!(drawn, "{} of {site_m} m is not drawn to 1 : {}", arm.mark, view.ratio.site_per_paper);
        }
    }
}

#[test]
fn what_the_crew_measures_is_on_the_drawing_of_the_fixtures() {
    for station in support::stations() {
        let hung = hang(&station.plan).unwrap();
        let view = side_view(&station.plan, &hung, Units::Metres, SIZE);
        let said: Vec<&str> = view
            .scene
            .texts()
            .map(|text| text.text.as_str())
            .chain(view.unplaced.iter().map(String::as_str))
            .collect();
        let elevation = Elevation::new(&station.plan, &hung);
        for piece in elevation.arms.iter().chain(&elevation.ropes) {
            let words = format!("{} {}", piece.mark, Units::Metres.tape(piece.length_m()));
            assert!(
                said.iter().any(|text| text.starts_with(&words)),
                "{}: no \"{words}\" in {said:?}",
                station.name
            );
        }
        for load in &elevation.loads {
            assert!(said.contains(&load.mark.as_str()), "{}: no {} in {said:?}", station.name, load.mark);
        }
        for fastening in &elevation.fastenings {
            let height = Units::Metres.tape(fastening.at.up_m - fastening.foot_m);
            assert!(said.contains(&height.as_str()), "{}: no height {height} in {said:?}", station.name);
        }
    }
}

/// The line that ties a label to its place stays in the air where the air has room.
#[test]
fn no_leader_runs_through_the_earth() {
    for station in support::stations() {
        let hung = hang(&station.plan).unwrap();
        let elevation = Elevation::new(&station.plan, &hung);
        // An entrance far below the feet is reached through the earth only.
        if elevation.entrance.up_m < 0.0 {
            continue;
        }
        for units in [Units::Metres, Units::Feet] {
            let scene = drawn(&station.plan, units).unwrap().scene;
            let earth = scene.items.iter().find_map(|item| match item {
                Item::Area { points, fill: Ink::Earth, .. } => Some(points.clone()),
                _ => None,
            });
            let surface = earth.unwrap();
            let surface = &surface[..surface.len() / 2];
            let level_mm = |x_mm: f64| {
                let pair = surface.windows(2).find(|pair| x_mm <= pair[1].x_mm).unwrap();
                let share = (x_mm - pair[0].x_mm) / (pair[1].x_mm - pair[0].x_mm);
                pair[0].y_mm + share * (pair[1].y_mm - pair[0].y_mm)
            };
            for item in &scene.items {
                let Item::Line { points, stroke: Stroke::Hair, ink: Ink::Faint } = item else { continue };
                let depth_mm = |spot: Spot| spot.y_mm - level_mm(spot.x_mm);
                let (from, to) = (depth_mm(points[0]), depth_mm(points[1]));
                let dips = from.min(to) < -0.5 && from.max(to) > 0.5;
                assert!(!dips, "{}, {units:?}: a line through the earth, {points:?}", station.name);
            }
        }
    }
}
