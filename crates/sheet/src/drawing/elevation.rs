//! The site on the vertical plane through the ends of the fed wire's path: what a side view shows, in metres.

use station::hang::{Hung, HungWire, Vertex, WireEnd, resolve_path};
use station::plan::{PathPoint, Plan, Point, SupportKind};

use crate::model::{arm_mark, arms, load_mark};

/// A place in the side view, m.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Place {
    /// Along the plane, from the first path point of the fed wire.
    pub along_m: f64,
    /// Height over the earth.
    pub up_m: f64,
}

/// A vertical plane.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Plane {
    origin: Point,
    /// Horizontal direction of the plane, of length 1.
    direction: (f64, f64),
}

impl Plane {
    /// The plane through two points; east to the right where one stands over the other.
    #[must_use]
    pub fn through(first: Point, last: Point) -> Self {
        // Nearer than this, two points give no direction, m.
        const LEAST_M: f64 = 0.05;
        let (dx, dy) = (last.x_m - first.x_m, last.y_m - first.y_m);
        let length_m = dx.hypot(dy);
        let direction = if length_m > LEAST_M { (dx / length_m, dy / length_m) } else { (1.0, 0.0) };
        Self { origin: first, direction }
    }

    /// Where a point appears.
    #[must_use]
    pub fn place(&self, point: Point) -> Place {
        let (dx, dy) = (point.x_m - self.origin.x_m, point.y_m - self.origin.y_m);
        Place { along_m: dx * self.direction.0 + dy * self.direction.1, up_m: point.z_m }
    }

    /// How far a point lies behind the plane, m; below zero before it.
    #[must_use]
    pub fn behind_m(&self, point: Point) -> f64 {
        let (dx, dy) = (point.x_m - self.origin.x_m, point.y_m - self.origin.y_m);
        dy * self.direction.0 - dx * self.direction.1
    }
}

/// A support seen from the side.
#[derive(Clone, Debug, PartialEq)]
pub struct SupportSide {
    /// Its name.
    pub name: String,
    /// What it is.
    pub kind: SupportKind,
    /// Its foot.
    pub foot: Place,
    /// Its top, m over the earth.
    pub top_m: f64,
}

/// Where the fed wire's path is made fast.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Fastening {
    /// Where.
    pub at: Place,
    /// Height of what it stands on, m over the earth.
    pub foot_m: f64,
}

/// A piece of wire or rope.
#[derive(Clone, Debug, PartialEq)]
pub struct Piece {
    /// Its mark in the cut list.
    pub mark: String,
    /// Its corners.
    pub places: Vec<Place>,
    /// Length between each corner and the next, m; their true length, not the projected one.
    pub lengths_m: Vec<f64>,
}

impl Piece {
    /// Whole length, m.
    #[must_use]
    pub fn length_m(&self) -> f64 {
        self.lengths_m.iter().sum()
    }

    fn new(mark: String, points: &[Point], plane: &Plane) -> Self {
        Self {
            mark,
            places: points.iter().map(|&point| plane.place(point)).collect(),
            lengths_m: points.windows(2).map(|pair| pair[0].distance_m(pair[1])).collect(),
        }
    }
}

/// A load in a wire.
#[derive(Clone, Debug, PartialEq)]
pub struct LoadSide {
    /// Its mark in the cut list.
    pub mark: String,
    /// Where it sits.
    pub at: Place,
    /// A place a little further along its wire: the direction of its mark.
    pub toward: Place,
}

/// The site in side view.
#[derive(Clone, Debug, PartialEq)]
pub struct Elevation {
    /// Supports that hold a wire, from left to right.
    pub supports: Vec<SupportSide>,
    /// Where the fed wire's path is made fast, in its order.
    pub fastenings: Vec<Fastening>,
    /// Pieces of wire, W1, W2, …
    pub arms: Vec<Piece>,
    /// Ropes, R1, R2, …
    pub ropes: Vec<Piece>,
    /// Loads, L1, L2, …
    pub loads: Vec<LoadSide>,
    /// Ends of wires: insulators.
    pub ends: Vec<Place>,
    /// Where the wire is fed.
    pub feedpoint: Place,
    /// Where the feed line enters the station.
    pub entrance: Place,
    /// How far the entrance lies behind the plane, m; below zero before it.
    pub entrance_behind_m: f64,
}

impl Elevation {
    /// Projects a plan and its hung wires.
    #[must_use]
    pub fn new(plan: &Plan, hung: &Hung) -> Self {
        let fed = hung.feedpoint.wire;
        let path = fastened_path(plan, hung, fed);
        let origin = path.first().map_or(hung.feedpoint.at, |first| first.at);
        let last = path.last().map_or(origin, |last| last.at);
        let plane = Plane::through(origin, last);
        Self {
            supports: supports(plan, &plane),
            fastenings: fastenings(plan, fed, &path, &plane),
            arms: arm_pieces(plan, hung, &plane),
            ropes: hung
                .ropes
                .iter()
                .enumerate()
                .map(|(index, rope)| Piece::new(format!("R{}", index + 1), &rope.points, &plane))
                .collect(),
            loads: loads(plan, hung, &plane),
            ends: hung.wires.iter().flat_map(|wire| ends(wire, &plane)).collect(),
            feedpoint: plane.place(hung.feedpoint.at),
            entrance: plane.place(plan.site.entrance),
            entrance_behind_m: plane.behind_m(plan.site.entrance),
        }
    }

    /// All places that must be on the drawing.
    pub fn places(&self) -> impl Iterator<Item = Place> + '_ {
        let feet = self
            .supports
            .iter()
            .flat_map(|support| [support.foot, Place { up_m: support.top_m, ..support.foot }]);
        let pieces = self.arms.iter().chain(&self.ropes).flat_map(|piece| piece.places.iter().copied());
        feet.chain(pieces).chain([self.feedpoint, self.entrance])
    }
}

/// The path of a wire; its hung corners where the path cannot be resolved.
fn fastened_path(plan: &Plan, hung: &Hung, wire: usize) -> Vec<Vertex> {
    let path = plan.wires.get(wire).and_then(|planned| resolve_path(&plan.site, wire, planned).ok());
    path.or_else(|| hung.wires.get(wire).map(|wire| wire.vertices.clone())).unwrap_or_default()
}

fn supports(plan: &Plan, plane: &Plane) -> Vec<SupportSide> {
    let is_used = |name: &str| {
        plan.wires.iter().flat_map(|wire| &wire.path).any(|point| match point {
            PathPoint::OnSupport { support, .. } => support == name,
            PathPoint::Free(_) => false,
        })
    };
    let mut out: Vec<SupportSide> = plan
        .site
        .supports
        .iter()
        .filter(|support| is_used(&support.name))
        .map(|support| SupportSide {
            name: support.name.clone(),
            kind: support.kind,
            foot: plane.place(support.foot),
            top_m: support.foot.z_m + support.height_m,
        })
        .collect();
    out.sort_by(|a, b| a.foot.along_m.total_cmp(&b.foot.along_m));
    out
}

fn fastenings(plan: &Plan, wire: usize, path: &[Vertex], plane: &Plane) -> Vec<Fastening> {
    let points = plan.wires.get(wire).map_or(&[][..], |wire| &wire.path);
    path.iter()
        .zip(points)
        .map(|(vertex, point)| {
            let foot_m = match point {
                PathPoint::OnSupport { height_m, .. } => vertex.at.z_m - height_m,
                PathPoint::Free(_) => 0.0,
            };
            Fastening { at: plane.place(vertex.at), foot_m }
        })
        .collect()
}

fn arm_pieces(plan: &Plan, hung: &Hung, plane: &Plane) -> Vec<Piece> {
    arms(plan)
        .into_iter()
        .enumerate()
        .filter_map(|(index, arm)| {
            let wire = hung.wires.get(arm.wire)?;
            let inner =
                wire.vertices.iter().filter(|v| v.arc_m > arm.from_m && v.arc_m < arm.to_m).map(|v| v.at);
            let mut points = vec![wire.point_at(arm.from_m)];
            points.extend(inner);
            points.push(wire.point_at(arm.to_m));
            Some(Piece::new(arm_mark(index), &points, plane))
        })
        .collect()
}

fn loads(plan: &Plan, hung: &Hung, plane: &Plane) -> Vec<LoadSide> {
    // Half of a load's length, about; its direction is that of the wire there.
    const STEP_M: f64 = 0.05;
    let side = |(index, load): (usize, &station::plan::Load)| {
        let wire = hung.wires.get(load.wire)?;
        let arc_m = load.fraction * wire.length_m();
        let [at, toward] = [arc_m, arc_m + STEP_M].map(|arc_m| plane.place(wire.point_at(arc_m)));
        Some(LoadSide { mark: load_mark(index), at, toward })
    };
    plan.loads.iter().enumerate().filter_map(side).collect()
}

fn ends(wire: &HungWire, plane: &Plane) -> [Place; 2] {
    [WireEnd::Beginning, WireEnd::End].map(|end| {
        plane.place(wire.point_at(match end {
            WireEnd::Beginning => 0.0,
            WireEnd::End => wire.length_m(),
        }))
    })
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_plane_keeps_lengths_along_it_and_says_what_lies_behind() {
        let plane = Plane::through(Point::new(1.0, 1.0, 9.0), Point::new(4.0, 5.0, 7.0));
        assert_eq!(plane.place(Point::new(4.0, 5.0, 7.0)), Place { along_m: 5.0, up_m: 7.0 });
        // Looking along the left-hand normal of the direction of the wire: (−4, 3)/5 lies behind it.
        assert!((plane.behind_m(Point::new(1.0 - 4.0, 1.0 + 3.0, 0.0)) - 5.0).abs() < 1e-12);
        let upright = Plane::through(Point::new(2.0, 3.0, 0.0), Point::new(2.0, 3.0, 18.0));
        assert_eq!(upright.place(Point::new(7.0, 3.0, 1.0)), Place { along_m: 5.0, up_m: 1.0 });
    }
}
