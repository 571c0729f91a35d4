//! What the Yard knows of a plan: its plane, its paths, its wires as they hang, and where distances count from.

use station::hang::{HangError, Hung, HungWire, Vertex, hang, resolve_path};
use station::plan::{PathPoint, Plan, Point, Wire};

use super::grip::Grip;
use super::side_view::{Bounds, Plane};

/// A plan made ready to be drawn.
pub struct Model<'a> {
    /// The plan.
    pub plan: &'a Plan,
    /// The plane through the ends of the first wire's path.
    pub plane: Plane,
    /// Each wire's path in space; empty where it names a support that is not there.
    pub paths: Vec<Vec<Vertex>>,
    /// The wires and ropes, or why they cannot hang.
    pub hung: Result<Hung, HangError>,
}

/// What a horizontal number counts from.
#[derive(Clone, Debug, PartialEq)]
pub struct Datum {
    /// Its place in the plane, m.
    pub along_m: f64,
    /// 1 where distances grow to the right, −1 to the left.
    pub side: f64,
    /// Its name; empty for the ruler's zero.
    pub name: String,
}

impl<'a> Model<'a> {
    /// Resolves paths and hangs the wires.
    pub fn of(plan: &'a Plan) -> Self {
        let paths: Vec<Vec<Vertex>> = plan
            .wires
            .iter()
            .enumerate()
            .map(|(index, wire)| resolve_path(&plan.site, index, wire).unwrap_or_default())
            .collect();
        let ends = paths.first().and_then(|path| Some((path.first()?.at, path.last()?.at)));
        let origin = Point::new(0.0, 0.0, 0.0);
        let (from, to) = ends.unwrap_or((origin, origin));
        Self { plan, plane: Plane::through(from, to), paths, hung: hang(plan) }
    }

    /// A wire as it hangs.
    pub fn hung_wire(&self, wire: usize) -> Option<&HungWire> {
        self.hung.as_ref().ok()?.wires.get(wire)
    }

    /// The wire that the feedpoint or a load is on.
    pub fn wire_of(&self, grip: Grip) -> Option<usize> {
        match grip {
            Grip::Feedpoint => Some(self.plan.feedpoint.wire),
            Grip::Load { load } => self.load(load).map(|load| load.wire),
            _ => None,
        }
    }

    /// Whether a wire's beginning and its end are joined to another wire, or to each other.
    pub fn joined_ends(&self, wire: usize) -> [bool; 2] {
        let Ok(hung) = &self.hung else { return [false; 2] };
        let Some(vertices) = hung.wires.get(wire).map(|wire| &wire.vertices) else { return [false; 2] };
        let last = vertices.len() - 1;
        [0, last].map(|end| {
            let at = vertices[end].at;
            let others = hung.wires.iter().enumerate().flat_map(|(index, other)| {
                other.vertices.iter().enumerate().map(move |(number, vertex)| (index, number, vertex.at))
            });
            others
                .filter(|(index, number, _)| (*index, *number) != (wire, end))
                .any(|(_, _, v)| is_joint(v, at))
        })
    }

    /// Whether a path point is joined to one that comes before it, with which it moves.
    pub fn follows(&self, wire: usize, point: usize) -> bool {
        let Some(at) = self.paths.get(wire).and_then(|path| path.get(point)).map(|v| v.at) else {
            return false;
        };
        let free = matches!(self.path_point(wire, point), Some(PathPoint::Free(_)));
        let before = self.paths.iter().take(wire + 1).enumerate().flat_map(|(index, path)| {
            let count = if index == wire { point } else { path.len() };
            path.iter().take(count)
        });
        free && before.into_iter().any(|v| is_joint(v.at, at))
    }

    /// Everything that should be in view.
    pub fn bounds(&self) -> Option<Bounds> {
        let site = &self.plan.site;
        let supports = site.supports.iter().flat_map(|s| {
            let top = Point { z_m: s.foot.z_m + s.height_m, ..s.foot };
            [s.foot, top]
        });
        let paths = self.paths.iter().flatten().map(|v| v.at);
        let places = supports.chain(paths).chain([site.entrance]).map(|p| self.plane.flat(p));
        Bounds::around(places)
    }

    /// Where the ruler's zero is: below the first path point.
    pub fn zero_along_m(&self) -> f64 {
        let first = self.paths.first().and_then(|path| path.first());
        first.map_or(0.0, |v| self.plane.flat(v.at).along_m)
    }

    /// What a point's horizontal place counts from: the first path point, or the last one where moving the point
    /// moves the first.
    pub fn datum(&self, moves_first: bool) -> Datum {
        let zero = Datum { along_m: self.zero_along_m(), side: 1.0, name: String::new() };
        let (Some(path), Some(wire)) = (self.paths.first(), self.plan.wires.first()) else { return zero };
        let (Some(first), Some(last), Some(last_point)) = (path.first(), path.last(), wire.path.last())
        else {
            return zero;
        };
        if !moves_first {
            let name = wire.path.first().map(name_of).unwrap_or_default();
            return Datum { name, ..zero };
        }
        let along_m = self.plane.flat(last.at).along_m;
        let side = if self.plane.flat(first.at).along_m <= along_m { -1.0 } else { 1.0 };
        Datum { along_m, side, name: name_of(last_point) }
    }

    /// Whether a support carries the first point of the first wire's path, and whether it carries its last.
    pub fn carries_ends(&self, support: usize) -> (bool, bool) {
        let name = self.plan.site.supports.get(support).map(|s| s.name.as_str());
        let on = |point: Option<&PathPoint>| matches!((point, name), (Some(PathPoint::OnSupport { support, .. }), Some(name)) if support == name);
        let path = self.plan.wires.first().map(|w| w.path.as_slice()).unwrap_or_default();
        (on(path.first()), on(path.last()))
    }

    /// A wire with its path and the path's length.
    pub fn on_path(&self, wire: usize) -> Option<OnPath<'_>> {
        let path = self.paths.get(wire).filter(|path| path.len() > 1)?;
        Some(OnPath { wire: self.plan.wires.get(wire)?, path })
    }
}

/// Points this close are one to the solver, m.
const JOINT_M: f64 = 1e-3;

fn is_joint(a: Point, b: Point) -> bool {
    a.distance_m(b) <= JOINT_M
}

/// The support's name, or nothing for a free point.
fn name_of(point: &PathPoint) -> String {
    match point {
        PathPoint::OnSupport { support, .. } => support.clone(),
        PathPoint::Free(_) => String::new(),
    }
}

/// A wire on its path. Places are metres from the path's first point; below zero and beyond the path's length the
/// wire hangs down.
#[derive(Clone, Copy)]
pub struct OnPath<'a> {
    /// The wire.
    pub wire: &'a Wire,
    /// Its path, two or more points.
    pub path: &'a [Vertex],
}

/// Room kept between a hanging end and the earth, m.
const HANGING_CLEARANCE_M: f64 = 0.1;

impl OnPath<'_> {
    /// Length of the path, m.
    pub fn path_m(&self) -> f64 {
        self.path[self.path.len() - 1].arc_m
    }

    /// Where the wire ends.
    pub fn end_m(&self) -> f64 {
        self.wire.start_m + self.wire.cut_length_m
    }

    /// How much wire may hang down from the first and from the last point, m.
    pub fn room_m(&self) -> (f64, f64) {
        let room = |v: &Vertex| (v.at.z_m - HANGING_CLEARANCE_M).max(0.0);
        (room(&self.path[0]), room(&self.path[self.path.len() - 1]))
    }

    /// The corners between which a place lies; the outer pieces beyond the ends.
    pub fn piece(&self, along_m: f64) -> (Vertex, Vertex) {
        let pair = self.path.windows(2).find(|pair| along_m <= pair[1].arc_m);
        let last = &self.path[self.path.len() - 2..];
        let pair = pair.unwrap_or(last);
        (pair[0], pair[1])
    }
}
