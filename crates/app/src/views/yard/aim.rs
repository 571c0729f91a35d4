//! From the pointer to numbers: the nearest place on a path, on a wire, or in the plane.

use eframe::egui::{Pos2, Vec2};
use station::plan::{PathPoint, Point};

use crate::command::Edit;

use super::ask::{Asked, Grid};
use super::grip::{Grip, Numbers};
use super::model::{Model, OnPath};
use super::side_view::{Flat, SideView};

/// A free point this close to a support is made fast to it, px.
const CATCH_PX: f32 = 10.0;
/// A free point this close to the straight line between its neighbours is let go, px.
const STRAIGHT_PX: f32 = 5.0;

/// A free path point in the hand: the path as it was when the hand took it, with the point in it.
#[derive(Clone, Debug, PartialEq)]
pub struct Bend {
    /// Index of the wire.
    pub wire: usize,
    /// Index of the point in `path`.
    pub point: usize,
    /// The path.
    pub path: Vec<PathPoint>,
}

impl Model<'_> {
    /// The numbers that would bring a grip under a position of the screen, as nearly as it can go.
    pub fn aimed(&self, view: &SideView, grip: Grip, at: Pos2) -> Numbers {
        let now = self.numbers(grip);
        match grip {
            Grip::WireBeginning { wire } => {
                let place_m = self.on_path(wire).map(|on| on.end_m() - place_on_path(view, on, at, false));
                Numbers { along_m: place_m, up_m: None }
            }
            Grip::WireEnd { wire } => {
                let place_m =
                    self.on_path(wire).map(|on| place_on_path(view, on, at, true) - on.wire.start_m);
                Numbers { along_m: place_m, up_m: None }
            }
            Grip::Feedpoint | Grip::Load { .. } => {
                let place = self.wire_of(grip).and_then(|wire| place_on_wire(self, view, wire, at));
                Numbers { along_m: place.map(|(arc_m, _)| arc_m), up_m: None }
            }
            _ => {
                let Some(place) = self.place(grip) else { return now };
                let flat = view.flat(at);
                let moved = self.plane.moved(place, flat);
                // Heights on supports count from the foot, all others from the earth.
                let foot_m = place.z_m - now.up_m.unwrap_or(place.z_m);
                Numbers {
                    along_m: now.along_m.map(|_| self.distance_m(grip, moved)),
                    up_m: now.up_m.map(|_| flat.up_m - foot_m),
                }
            }
        }
    }

    /// Takes a free point, or the middle of a span, in the hand.
    pub fn bend(&self, grip: Grip) -> Option<Bend> {
        let place = self.place(grip)?;
        match grip {
            Grip::NewPoint { wire, span } => {
                let mut path = self.plan.wires.get(wire)?.path.clone();
                path.insert(span + 1, PathPoint::Free(place));
                Some(Bend { wire, point: span + 1, path })
            }
            Grip::PathPoint { wire, point }
                if matches!(self.path_point(wire, point), Some(PathPoint::Free(_))) =>
            {
                Some(Bend { wire, point, path: self.plan.wires.get(wire)?.path.clone() })
            }
            _ => None,
        }
    }

    /// Puts a free point where the pointer is, or makes it fast to a support close by.
    pub fn ask_bend(&self, view: &SideView, bend: &Bend, at: Pos2, grid: Option<Grid>) -> Asked {
        let Some(PathPoint::Free(before)) = bend.path.get(bend.point) else { return Asked::default() };
        let up_m = |foot_m: f64| {
            let up_m = view.flat(at).up_m - foot_m;
            grid.map_or(up_m, |grid| grid.round(up_m)).max(LOWEST_M)
        };
        let mut path = bend.path.clone();
        let near = self.plan.site.supports.iter().find(|s| {
            let (foot, top) = (view.at(s.foot), view.at(Point { z_m: s.foot.z_m + s.height_m, ..s.foot }));
            (foot.x - at.x).abs() < CATCH_PX && at.y > top.y - CATCH_PX && at.y < foot.y
        });
        let mut hint = None;
        path[bend.point] = if let Some(support) = near {
            hint = Some(format!("made fast to {}", support.name));
            let height_m = up_m(support.foot.z_m).min(support.height_m);
            PathPoint::OnSupport { support: support.name.clone(), height_m }
        } else {
            let along_m = view.flat(at).along_m - self.zero_along_m();
            let along_m = grid.map_or(along_m, |grid| grid.round(along_m)) + self.zero_along_m();
            PathPoint::Free(self.plane.moved(*before, Flat { along_m, up_m: up_m(0.0) }))
        };
        if self.is_straight(view, bend.wire, bend.point) {
            hint = Some("let go here and the span is straight again".to_owned());
        }
        Asked { edits: vec![Edit::PathPoints { wire: bend.wire, path }], hint }
    }

    /// What to do when the hand lets a free point go: a point in line with its neighbours is taken away.
    pub fn ask_let_go(&self, view: &SideView, bend: &Bend) -> Option<Edit> {
        let straight = self.is_straight(view, bend.wire, bend.point);
        straight.then(|| self.ask_removal(Grip::PathPoint { wire: bend.wire, point: bend.point })).flatten()
    }

    /// Whether a free point lies in line with its neighbours, as far as the eye can see.
    fn is_straight(&self, view: &SideView, wire: usize, point: usize) -> bool {
        let at = |index: usize| self.paths.get(wire).and_then(|path| path.get(index)).map(|v| view.at(v.at));
        let free = matches!(self.path_point(wire, point), Some(PathPoint::Free(_)));
        let neighbours = (point.checked_sub(1).and_then(at), at(point), at(point + 1));
        match neighbours {
            (Some(before), Some(here), Some(after)) if free => nearest(here, before, after).1 < STRAIGHT_PX,
            _ => false,
        }
    }
}

/// Lowest free point, m.
const LOWEST_M: f64 = 0.2;

/// The share along a piece of the screen that is nearest to a position, and its distance.
pub fn nearest(at: Pos2, from: Pos2, to: Pos2) -> (f32, f32) {
    let share = share_along(at, from, to).clamp(0.0, 1.0);
    (share, from.lerp(to, share).distance(at))
}

/// How far along a piece a position lies, 0 at its beginning and 1 at its end; beyond for positions beyond.
fn share_along(at: Pos2, from: Pos2, to: Pos2) -> f32 {
    let piece: Vec2 = to - from;
    let square = piece.length_sq();
    if square > 0.0 { (at - from).dot(piece) / square } else { 0.0 }
}

/// The place on a path that is nearest to a position, m from its first point. Below a path's end, or pulled out
/// beyond it, the place is on what hangs down there.
fn place_on_path(view: &SideView, on: OnPath<'_>, at: Pos2, at_end: bool) -> f64 {
    let mut best = (f32::INFINITY, 0.0);
    for pair in on.path.windows(2) {
        let (share, distance) = nearest(at, view.at(pair[0].at), view.at(pair[1].at));
        if distance < best.0 {
            best = (distance, pair[0].arc_m + f64::from(share) * (pair[1].arc_m - pair[0].arc_m));
        }
    }
    let count = on.path.len();
    let (inner, outer) =
        if at_end { (on.path[count - 2], on.path[count - 1]) } else { (on.path[1], on.path[0]) };
    let corner = view.at(outer.at);
    let beyond = share_along(at, view.at(inner.at), corner) - 1.0;
    let piece_m = (outer.arc_m - inner.arc_m).abs();
    let drop_m = view.metres((at.y - corner.y).max(0.0));
    let hanging_m = if beyond > 0.0 {
        // Pulled out beyond the support: what is pulled over hangs down.
        drop_m.max(f64::from(beyond) * piece_m)
    } else if at.y > corner.y && (at.x - corner.x).abs() < best.0 {
        drop_m
    } else {
        return best.1;
    };
    if at_end { on.path_m() + hanging_m } else { -hanging_m }
}

/// The place on a wire that is nearest to a position: metres from the wire's beginning, and the distance in px.
pub fn place_on_wire(model: &Model<'_>, view: &SideView, wire: usize, at: Pos2) -> Option<(f64, f32)> {
    let hung = model.hung_wire(wire)?;
    let places = hung.vertices.windows(2).map(|pair| {
        let (share, distance) = nearest(at, view.at(pair[0].at), view.at(pair[1].at));
        (pair[0].arc_m + f64::from(share) * (pair[1].arc_m - pair[0].arc_m), distance)
    });
    places.min_by(|a, b| a.1.total_cmp(&b.1))
}
