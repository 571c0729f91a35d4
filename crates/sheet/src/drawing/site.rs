//! Paints what stands on the site: earth, supports, wires, ropes, the way of the feed line.

use station::plan::SupportKind;

use super::elevation::{Elevation, LoadSide, Place, SupportSide};
use super::scale::Sight;
use crate::scene::{Frame, Item, Spot};
use crate::tokens::{Ink, Stroke};

/// Depth of the band of earth, mm.
pub(super) const EARTH_MM: f64 = 2.6;
/// Distance of the hatching's strokes, mm.
const HATCH_MM: f64 = 2.4;
/// Half of a support's width on paper, mm; supports are drawn as signs, only their height is to scale.
const HALF_SUPPORT_MM: f64 = 3.2;
/// Half of the side of the entrance's box, mm.
const HALF_ENTRANCE_MM: f64 = 1.4;
/// Most height of a tree's crown and of a roof, mm.
const MOST_CROWN_MM: f64 = 15.0;
const MOST_ROOF_MM: f64 = 4.5;
/// Half of the length and of the width of a load's mark, mm.
const HALF_LOAD_MM: (f64, f64) = (2.0, 1.1);
/// Radius of an insulator, mm.
const INSULATOR_MM: f64 = 0.9;
/// Radius of the feedpoint's mark, mm.
const FEEDPOINT_MM: f64 = 1.26;

/// The earth's surface through the feet of the supports, from edge to edge.
pub(super) fn surface(elevation: &Elevation, sight: &Sight, left_mm: f64, right_mm: f64) -> Vec<Spot> {
    let feet: Vec<Spot> = elevation.supports.iter().map(|support| sight.spot(support.foot)).collect();
    let level = sight.spot(Place { along_m: 0.0, up_m: 0.0 }).y_mm;
    let first = feet.first().map_or(level, |spot| spot.y_mm);
    let last = feet.last().map_or(level, |spot| spot.y_mm);
    let mut out = vec![Spot::new(left_mm, first)];
    out.extend(feet);
    out.push(Spot::new(right_mm, last));
    out
}

/// Labels keep off the hatching if they keep off its surface and this: no text is as low as what lies between.
pub(super) fn foot_of_earth(surface: &[Spot]) -> Vec<Spot> {
    surface.iter().map(|spot| Spot::new(spot.x_mm, spot.y_mm + 0.75 * EARTH_MM)).collect()
}

/// The earth below its surface.
pub(super) fn earth(surface: &[Spot], items: &mut Vec<Item>) {
    let lowered = surface.iter().rev().map(|spot| Spot::new(spot.x_mm, spot.y_mm + EARTH_MM));
    let points = surface.iter().copied().chain(lowered).collect();
    items.push(Item::Area { points, fill: Ink::Earth, outline: None });
    for pair in surface.windows(2) {
        let width_mm = pair[1].x_mm - pair[0].x_mm;
        let count = (width_mm / HATCH_MM).floor().max(0.0) as usize;
        for index in 0..count {
            let share = (index as f64 + 0.5) * HATCH_MM / width_mm;
            let top = Spot::new(
                pair[0].x_mm + share * width_mm,
                pair[0].y_mm + share * (pair[1].y_mm - pair[0].y_mm),
            );
            let foot = Spot::new(top.x_mm - EARTH_MM * 0.7, top.y_mm + EARTH_MM);
            items.push(Item::line(top, foot, Stroke::Hair, Ink::Faint));
        }
    }
    items.push(Item::Line { points: surface.to_vec(), stroke: Stroke::Earth, ink: Ink::Text });
}

/// A support, as a sign of its kind.
pub(super) fn support(support: &SupportSide, sight: &Sight, items: &mut Vec<Item>) {
    let foot = sight.spot(support.foot);
    let top = sight.spot(Place { up_m: support.top_m, ..support.foot });
    let at = |x: f64, y: f64| Spot::new(foot.x_mm + x * HALF_SUPPORT_MM, y);
    match support.kind {
        SupportKind::Mast => {
            items.push(Item::line(foot, top, Stroke::Support, Ink::Support));
            let base = vec![at(-0.6, foot.y_mm), at(0.6, foot.y_mm), at(0.0, foot.y_mm - 1.8)];
            items.push(Item::Area { points: base, fill: Ink::Support, outline: None });
        }
        SupportKind::Tree => {
            let outline = Some((Stroke::Rule, Ink::Support));
            let points = outline_of(support, sight);
            items.push(Item::Area { points, fill: Ink::Panel, outline });
            items.push(Item::line(foot, top, Stroke::Support, Ink::Support));
        }
        SupportKind::Building => {
            let outline = Some((Stroke::Frame, Ink::Support));
            items.push(Item::Area { points: outline_of(support, sight), fill: Ink::Panel, outline });
        }
    }
}

/// The outline of a support's sign: a tree's crown, a building's front; nothing for a mast.
fn outline_of(support: &SupportSide, sight: &Sight) -> Vec<Spot> {
    let foot = sight.spot(support.foot);
    let top = sight.spot(Place { up_m: support.top_m, ..support.foot });
    let at = |x: f64, y: f64| Spot::new(foot.x_mm + x * HALF_SUPPORT_MM, y);
    match support.kind {
        SupportKind::Mast => Vec::new(),
        SupportKind::Tree => {
            crown_outline(foot.x_mm, top.y_mm, top.y_mm + (0.62 * (foot.y_mm - top.y_mm)).min(MOST_CROWN_MM))
        }
        SupportKind::Building => {
            let eaves = top.y_mm + (0.35 * (foot.y_mm - top.y_mm)).min(MOST_ROOF_MM);
            vec![at(-1.8, foot.y_mm), at(-1.8, eaves), at(0.0, top.y_mm), at(1.8, eaves), at(1.8, foot.y_mm)]
        }
    }
}

/// The box that stands for the entrance.
fn entrance_frame(elevation: &Elevation, sight: &Sight) -> Frame {
    square(sight.spot(elevation.entrance), HALF_ENTRANCE_MM)
}

/// An upright square about a spot.
fn square(at: Spot, half_mm: f64) -> Frame {
    Frame {
        left_mm: at.x_mm - half_mm,
        top_mm: at.y_mm - half_mm,
        width_mm: 2.0 * half_mm,
        height_mm: 2.0 * half_mm,
    }
}

/// Closed lines that labels keep off.
pub(super) fn outlines(elevation: &Elevation, sight: &Sight) -> Vec<Vec<Spot>> {
    let closed = |mut points: Vec<Spot>| {
        points.extend(points.first().copied());
        points
    };
    let mut out: Vec<Vec<Spot>> =
        elevation.supports.iter().map(|support| closed(outline_of(support, sight))).collect();
    out.push(closed(entrance_frame(elevation, sight).corners().to_vec()));
    let ring = |(place, radius_mm)| closed(square(sight.spot(place), radius_mm).corners().to_vec());
    out.extend(elevation.ends.iter().map(|&end| (end, INSULATOR_MM)).map(ring));
    out.push(ring((elevation.feedpoint, FEEDPOINT_MM)));
    out
}

/// The outline of a tree's crown: a circle of lobes, stretched between top and crown's foot.
fn crown_outline(x_mm: f64, top_mm: f64, foot_mm: f64) -> Vec<Spot> {
    const CORNERS: usize = 72;
    let (middle_mm, half_mm) = ((top_mm + foot_mm) / 2.0, (foot_mm - top_mm) / 2.0);
    (0..CORNERS)
        .map(|corner| {
            let angle = corner as f64 / CORNERS as f64 * std::f64::consts::TAU;
            let lobe = 0.88 + 0.12 * (4.5 * angle).sin().abs();
            let (sin, cos) = angle.sin_cos();
            Spot::new(x_mm + 1.7 * HALF_SUPPORT_MM * lobe * sin, middle_mm - half_mm * lobe * cos)
        })
        .collect()
}

/// Wires, ropes, insulators, the feedpoint and the way of the feed line.
pub(super) fn wires(elevation: &Elevation, sight: &Sight, items: &mut Vec<Item>) {
    let feedpoint = sight.spot(elevation.feedpoint);
    let entrance = sight.spot(elevation.entrance);
    let line = [-0.5, 0.5].map(|off_mm| {
        let shift = |spot: Spot| Spot::new(spot.x_mm + off_mm, spot.y_mm);
        Item::line(shift(feedpoint), shift(entrance), Stroke::Rule, Ink::Text)
    });
    items.extend(line);
    items.push(Item::area(entrance_frame(elevation, sight), Ink::Text));
    for rope in &elevation.ropes {
        let points = rope.places.iter().map(|&place| sight.spot(place)).collect();
        items.push(Item::Line { points, stroke: Stroke::Rope, ink: Ink::Rope });
    }
    for arm in &elevation.arms {
        let points = arm.places.iter().map(|&place| sight.spot(place)).collect();
        items.push(Item::Line { points, stroke: Stroke::Wire, ink: Ink::Wire });
    }
    let outline = Some((Stroke::Frame, Ink::Wire));
    for &end in &elevation.ends {
        items.push(Item::disc(sight.spot(end), INSULATOR_MM, Ink::Background, outline));
    }
    items.push(Item::disc(feedpoint, FEEDPOINT_MM, Ink::Background, outline));
    items.push(Item::disc(feedpoint, INSULATOR_MM * 0.5, Ink::Wire, None));
}

/// The corners of a load's mark: a box along its wire.
pub(super) fn load_outline(load: &LoadSide, sight: &Sight) -> [Spot; 4] {
    let (at, toward) = (sight.spot(load.at), sight.spot(load.toward));
    let (dx, dy) = (toward.x_mm - at.x_mm, toward.y_mm - at.y_mm);
    let length_mm = dx.hypot(dy);
    // A wire that runs straight at the eye has no direction here.
    let (x, y) = if length_mm > 1e-9 { (dx / length_mm, dy / length_mm) } else { (1.0, 0.0) };
    let corner = |along: f64, across: f64| {
        let (along, across) = (along * HALF_LOAD_MM.0, across * HALF_LOAD_MM.1);
        Spot::new(at.x_mm + along * x - across * y, at.y_mm + along * y + across * x)
    };
    [corner(-1.0, -1.0), corner(1.0, -1.0), corner(1.0, 1.0), corner(-1.0, 1.0)]
}

/// The mark of a load.
pub(super) fn load(corners: [Spot; 4]) -> Item {
    let outline = Some((Stroke::Frame, Ink::Wire));
    Item::Area { points: corners.to_vec(), fill: Ink::Background, outline }
}
