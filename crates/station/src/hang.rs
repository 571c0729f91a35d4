//! `hang`: the only way from plan to wires. Supports and paths go in; polylines with conductor, feedpoint and ropes
//! come out. Views, solver and rigging all take its output.
//!
//! A wire lies on its path from `start_m` for `cut_length_m`. Path that it does not cover is rope; wire that does not
//! fit hangs straight down from the path's first or last point. No sag yet: spans are straight.

use thiserror::Error;

use crate::catalogue::{self, CatalogueError};
pub use crate::plan::WireEnd;
use crate::plan::{ConductorData, Earth, PathPoint, Plan, Point, Site, Wire};

/// The wires as they hang, the ropes that hold them, and the feedpoint.
#[derive(Clone, Debug, PartialEq)]
pub struct Hung {
    /// One entry per wire of the plan, in its order.
    pub wires: Vec<HungWire>,
    /// Ropes, where a path is longer than its wire.
    pub ropes: Vec<Rope>,
    /// Leads from earthed ends to the earth, wire by wire.
    pub leads: Vec<EarthLead>,
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

/// A lead from the end of a wire straight down to the earth.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct EarthLead {
    /// Index of the wire.
    pub wire: usize,
    /// Which end of it.
    pub end: WireEnd,
    /// Where it leaves the wire; the earth is straight below.
    pub top: Point,
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
        on_path(&self.vertices, arc_m.max(0.0))
    }
}

/// Why a plan cannot be hung.
#[derive(Clone, Debug, PartialEq, Error)]
pub enum HangError {
    /// A path names a support that is not there.
    #[error("wires[{wire}].path[{point}].support: there is no support named \"{name}\"; accepted: {known}")]
    UnknownSupport {
        /// Index of the wire.
        wire: usize,
        /// Index of the path point.
        point: usize,
        /// The name asked for.
        name: String,
        /// The names that exist.
        known: String,
    },
    /// The conductor is not in the catalogue.
    #[error("wires[{wire}].conductor: {source}")]
    UnknownConductor {
        /// Index of the wire.
        wire: usize,
        /// What the catalogue says.
        source: CatalogueError,
    },
    /// A path of no length.
    #[error(
        "wires[{wire}].path: it is {length_m:.2} m long; accepted: two or more points at least 0.02 m apart"
    )]
    NoPath {
        /// Index of the wire.
        wire: usize,
        /// Length of the path, m.
        length_m: f64,
    },
    /// The wire does not touch its path.
    #[error(
        "wires[{wire}].start_m: the wire would lie from {start_m:.2} m to {end_m:.2} m beside its path of {path_m:.2} m; accepted: \
         a beginning before the path's end and an end after its first point"
    )]
    BesidePath {
        /// Index of the wire.
        wire: usize,
        /// Where the wire begins on the path, m.
        start_m: f64,
        /// Where it ends, m.
        end_m: f64,
        /// Length of the path, m.
        path_m: f64,
    },
    /// A part of the wire would touch or enter the earth.
    #[error(
        "wires[{wire}]: its {part} would be {height_m:.2} m over the earth; accepted: at least {least_m} m (shorten the wire or \
         raise its ends)"
    )]
    TooLow {
        /// Index of the wire.
        wire: usize,
        /// Which part, in words.
        part: &'static str,
        /// Where it would be, m.
        height_m: f64,
        /// The least height that is accepted, m.
        least_m: f64,
    },
    /// The feedpoint names a wire that is not there.
    #[error("feedpoint.wire: there is no wire {wire}; accepted: 0 to {last}")]
    NoSuchWire {
        /// The index asked for.
        wire: usize,
        /// The highest index.
        last: usize,
    },
}

/// Lowest height of a wire for which the models hold, m.
pub const LEAST_HEIGHT_M: f64 = 0.05;

/// Hangs the wires of a plan.
///
/// # Errors
/// [`HangError`] where a path names what is not there, or a wire would not touch its path or would touch the earth.
pub fn hang(plan: &Plan) -> Result<Hung, HangError> {
    let mut wires = Vec::with_capacity(plan.wires.len());
    let mut ropes = Vec::new();
    for (index, wire) in plan.wires.iter().enumerate() {
        let path = resolve_path(&plan.site, index, wire)?;
        let hung = hang_wire(index, wire, &path)?;
        // Without an earth there is nothing to hang too low over.
        if !matches!(plan.site.earth, Earth::NoEarth) {
            check_height(index, &hung.vertices)?;
        }
        wires.push(hung);
        ropes.extend(ropes_of(index, wire, &path));
    }
    let leads = plan.wires.iter().zip(&wires).enumerate().flat_map(|(wire, (planned, hung))| {
        planned.earthed.iter().filter_map(move |connection| {
            let vertex = match connection.end {
                WireEnd::Beginning => hung.vertices.first(),
                WireEnd::End => hung.vertices.last(),
            };
            vertex.map(|vertex| EarthLead { wire, end: connection.end, top: vertex.at })
        })
    });
    let leads = leads.collect();
    let index = plan.feedpoint.wire;
    let Some(wire) = wires.get(index) else {
        return Err(HangError::NoSuchWire { wire: index, last: wires.len().saturating_sub(1) });
    };
    let arc_m = plan.feedpoint.fraction * plan.wires[index].cut_length_m;
    let feedpoint = Port { wire: index, arc_m, at: wire.point_at(arc_m) };
    Ok(Hung { wires, ropes, leads, feedpoint })
}

/// The points of a wire's path in space.
///
/// # Errors
/// [`HangError::UnknownSupport`] where a point names a support that is not there.
pub fn resolve_path(site: &Site, index: usize, wire: &Wire) -> Result<Vec<Vertex>, HangError> {
    let mut arc_m = 0.0;
    let mut path: Vec<Vertex> = Vec::with_capacity(wire.path.len());
    for (point, place) in wire.path.iter().enumerate() {
        let at = match place {
            PathPoint::Free(at) => *at,
            PathPoint::OnSupport { support, height_m } => {
                let Some(found) = site.supports.iter().find(|s| s.name == *support) else {
                    let known = site
                        .supports
                        .iter()
                        .map(|s| format!("\"{}\"", s.name))
                        .collect::<Vec<_>>()
                        .join(", ");
                    return Err(HangError::UnknownSupport {
                        wire: index,
                        point,
                        name: support.clone(),
                        known,
                    });
                };
                Point { z_m: found.foot.z_m + height_m, ..found.foot }
            }
        };
        if let Some(last) = path.last() {
            arc_m += last.at.distance_m(at);
        }
        path.push(Vertex { at, arc_m });
    }
    if arc_m < 0.02 {
        return Err(HangError::NoPath { wire: index, length_m: arc_m });
    }
    Ok(path)
}

fn hang_wire(index: usize, wire: &Wire, path: &[Vertex]) -> Result<HungWire, HangError> {
    let conductor = catalogue::conductor(&wire.conductor)
        .map_err(|source| HangError::UnknownConductor { wire: index, source })?
        .clone();
    let (first, last) = (path[0], path[path.len() - 1]);
    let (start_m, end_m, path_m) = (wire.start_m, wire.start_m + wire.cut_length_m, last.arc_m);
    if start_m >= path_m || end_m <= 0.0 {
        return Err(HangError::BesidePath { wire: index, start_m, end_m, path_m });
    }
    let mut vertices = Vec::with_capacity(path.len() + 2);
    let mut push = |at: Point, along_m: f64| {
        let arc_m = along_m - start_m;
        // Two corners closer than a tenth of a millimetre are one: a zero-length piece helps nobody.
        if vertices.last().is_none_or(|v: &Vertex| arc_m - v.arc_m > 1e-4) {
            vertices.push(Vertex { at, arc_m });
        }
    };
    if start_m < 0.0 {
        push(below(first.at, -start_m), start_m);
    } else {
        push(on_path(path, start_m), start_m);
    }
    for corner in path.iter().filter(|v| v.arc_m >= start_m && v.arc_m <= end_m) {
        push(corner.at, corner.arc_m);
    }
    if end_m > path_m {
        push(below(last.at, end_m - path_m), end_m);
    } else {
        push(on_path(path, end_m), end_m);
    }
    Ok(HungWire { vertices, conductor })
}

/// Every corner must clear the earth: between corners the wire is straight.
fn check_height(index: usize, vertices: &[Vertex]) -> Result<(), HangError> {
    for (number, vertex) in vertices.iter().enumerate() {
        if vertex.at.z_m < LEAST_HEIGHT_M {
            let part = match number {
                0 => "beginning",
                n if n + 1 == vertices.len() => "end",
                _ => "corner",
            };
            return Err(HangError::TooLow {
                wire: index,
                part,
                height_m: vertex.at.z_m,
                least_m: LEAST_HEIGHT_M,
            });
        }
    }
    Ok(())
}

/// The point straight below, where a hanging end is.
fn below(at: Point, length_m: f64) -> Point {
    Point { z_m: at.z_m - length_m, ..at }
}

/// The point of a path at a distance from its first point.
fn on_path(path: &[Vertex], along_m: f64) -> Point {
    for pair in path.windows(2) {
        if along_m <= pair[1].arc_m {
            let span_m = pair[1].arc_m - pair[0].arc_m;
            let share = if span_m > 0.0 { (along_m - pair[0].arc_m) / span_m } else { 0.0 };
            return pair[0].at.toward(pair[1].at, share);
        }
    }
    path[path.len() - 1].at
}

/// Rope covers what the wire leaves of the path at either end.
fn ropes_of(index: usize, wire: &Wire, path: &[Vertex]) -> Vec<Rope> {
    let (start_m, end_m) = (wire.start_m, wire.start_m + wire.cut_length_m);
    let path_m = path[path.len() - 1].arc_m;
    let mut ropes = Vec::new();
    if start_m > 1e-4 {
        let mut points: Vec<Point> = path.iter().filter(|v| v.arc_m < start_m).map(|v| v.at).collect();
        points.push(on_path(path, start_m));
        ropes.push(Rope { wire: index, end: WireEnd::Beginning, points, length_m: start_m });
    }
    if path_m - end_m > 1e-4 {
        let mut points: Vec<Point> = path.iter().rev().filter(|v| v.arc_m > end_m).map(|v| v.at).collect();
        points.push(on_path(path, end_m));
        ropes.push(Rope { wire: index, end: WireEnd::End, points, length_m: path_m - end_m });
    }
    ropes
}

#[cfg(test)]
mod tests;
