//! `hang`: the only way from plan to wires. Supports and paths go in; polylines with conductor, feedpoint and ropes
//! come out. Views, solver and rigging all take its output.

use crate::plan::{ConductorData, Point};

/// The wires as they hang, the ropes that hold them, and the feedpoint.
#[derive(Clone, Debug, PartialEq)]
pub struct Hung {
    /// One entry per wire of the plan, in its order.
    pub wires: Vec<HungWire>,
    /// Ropes, where a path is longer than its wire.
    pub ropes: Vec<Rope>,
    /// Where the wire is fed.
    pub feedpoint: Port,
}

/// One wire as a polyline.
#[derive(Clone, Debug, PartialEq)]
pub struct HungWire {
    /// Corners from the wire's beginning to its end; at least two.
    pub vertices: Vec<Vertex>,
    /// The conductor's figures.
    pub conductor: ConductorData,
}

/// A corner of a hung wire.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Vertex {
    /// Where it is.
    pub at: Point,
    /// Distance from the wire's beginning along the wire, m.
    pub arc_m: f64,
}

/// A rope between a path point and a wire's end.
#[derive(Clone, Debug, PartialEq)]
pub struct Rope {
    /// Index of the wire it holds.
    pub wire: usize,
    /// Which end of the wire.
    pub end: WireEnd,
    /// From the support (first) to the wire's end (last), over the path's points between.
    pub points: Vec<Point>,
    /// Length without knots, m.
    pub length_m: f64,
}

/// An end of a wire.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
#[allow(missing_docs)] // The words say it.
pub enum WireEnd {
    Beginning,
    End,
}

/// A place where a generator or a load can be attached.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Port {
    /// Index of the wire.
    pub wire: usize,
    /// Distance from the wire's beginning, m.
    pub arc_m: f64,
    /// Where it is.
    pub at: Point,
}

impl HungWire {
    /// Length along the wire, m.
    #[must_use]
    pub fn length_m(&self) -> f64 {
        self.vertices.last().map_or(0.0, |v| v.arc_m)
    }

    /// The point at a distance from the wire's beginning; the nearest end beyond the ends.
    #[must_use]
    pub fn point_at(&self, arc_m: f64) -> Point {
        for pair in self.vertices.windows(2) {
            if arc_m <= pair[1].arc_m {
                let span_m = pair[1].arc_m - pair[0].arc_m;
                let share = if span_m > 0.0 { (arc_m - pair[0].arc_m) / span_m } else { 0.0 };
                return pair[0].at.toward(pair[1].at, share.clamp(0.0, 1.0));
            }
        }
        self.vertices[self.vertices.len() - 1].at
    }
}
