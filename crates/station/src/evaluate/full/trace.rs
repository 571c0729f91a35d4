//! From the mesh back to the wire: which segments lie where along a hung wire, and the current at any place.

use num_complex::Complex64;
use physics::field::SurfacePoint;
use physics::wire::{EndCurrents, Segment};

use super::Potentials;
use crate::hang::HungWire;
use crate::plan::Point;

/// The segments of one wire in order of their place on it.
#[derive(Clone, Debug)]
pub(super) struct Trace {
    pieces: Vec<Piece>,
}

#[derive(Clone, Copy, Debug)]
struct Piece {
    segment: usize,
    start_arc_m: f64,
    length_m: f64,
    /// The segment points toward the wire's beginning.
    reversed: bool,
}

impl Trace {
    /// Sorts the segments that belong to wire `index`.
    pub fn new(wire: &HungWire, index: usize, segments: &[Segment], wire_of_segment: &[usize]) -> Self {
        let own = segments.iter().enumerate().filter(|(segment, _)| wire_of_segment[*segment] == index);
        let mut pieces: Vec<Piece> = own
            .map(|(number, segment)| {
                let edge = nearest_edge(wire, middle(segment));
                let (from, to) = (arc_on(wire, edge, segment.from_m), arc_on(wire, edge, segment.to_m));
                Piece {
                    segment: number,
                    start_arc_m: from.min(to),
                    length_m: segment.length_m(),
                    reversed: to < from,
                }
            })
            .collect();
        pieces.sort_by(|a, b| a.start_arc_m.total_cmp(&b.start_arc_m));
        Self { pieces }
    }

    /// Segments in order of their place, with the places of their middles, m from the wire's beginning.
    pub fn middles(&self) -> impl Iterator<Item = (usize, f64)> + '_ {
        self.pieces.iter().map(|piece| (piece.segment, piece.start_arc_m + 0.5 * piece.length_m))
    }

    /// The segment at a place of the wire, m from its beginning, and how far along that segment.
    pub fn at(&self, arc_m: f64) -> (usize, f64) {
        let next = self.pieces.partition_point(|piece| piece.start_arc_m <= arc_m);
        let piece = &self.pieces[next.saturating_sub(1)];
        let along_m = (arc_m - piece.start_arc_m).clamp(0.0, piece.length_m);
        (piece.segment, if piece.reversed { piece.length_m - along_m } else { along_m })
    }

    /// Current toward the wire's end at a place, A peak.
    pub fn current_a(
        &self,
        arc_m: f64,
        segments: &[Segment],
        currents: &[EndCurrents],
        frequency_hz: f64,
    ) -> Complex64 {
        let (segment, along_m) = self.at(arc_m);
        self.sign(arc_m) * currents[segment].current_a(&segments[segment], frequency_hz, along_m)
    }

    /// jωA toward the wire's end at a place, V/m peak.
    pub fn induced_v_per_m(&self, arc_m: f64, segments: &[Segment], sources: &Potentials) -> Complex64 {
        let (index, along_m) = self.at(arc_m);
        let (segment, direction) = (&segments[index], segments[index].direction());
        let axis_m = std::array::from_fn(|axis| segment.from_m[axis] + along_m * direction[axis]);
        let at = SurfacePoint { axis_m, radius_m: segment.radius_m };
        let own = sources.own.induced_v_per_m(at, direction);
        let returned = sources.returned.as_ref().map(|returned| returned.mean_induced_v_per_m(index));
        self.sign(arc_m) * (own + returned.unwrap_or_default())
    }

    /// −1 where the segment at a place points toward the wire's beginning.
    fn sign(&self, arc_m: f64) -> f64 {
        let next = self.pieces.partition_point(|piece| piece.start_arc_m <= arc_m);
        if self.pieces[next.saturating_sub(1)].reversed { -1.0 } else { 1.0 }
    }
}

fn middle(segment: &Segment) -> [f64; 3] {
    std::array::from_fn(|axis| 0.5 * (segment.from_m[axis] + segment.to_m[axis]))
}

/// The straight part of the wire that a point lies on.
fn nearest_edge(wire: &HungWire, point: [f64; 3]) -> usize {
    let distance = |edge: usize| {
        let (from, to) = (coordinates(wire.vertices[edge].at), coordinates(wire.vertices[edge + 1].at));
        let share = share_along(from, to, point).clamp(0.0, 1.0);
        (0..3)
            .map(|axis| from[axis] + share * (to[axis] - from[axis]) - point[axis])
            .map(|d| d * d)
            .sum::<f64>()
    };
    (0..wire.vertices.len() - 1).min_by(|&a, &b| distance(a).total_cmp(&distance(b))).unwrap_or(0)
}

fn arc_on(wire: &HungWire, edge: usize, point: [f64; 3]) -> f64 {
    let (from, to) = (&wire.vertices[edge], &wire.vertices[edge + 1]);
    let share = share_along(coordinates(from.at), coordinates(to.at), point);
    from.arc_m + share * (to.arc_m - from.arc_m)
}

fn share_along(from: [f64; 3], to: [f64; 3], point: [f64; 3]) -> f64 {
    let along: f64 = (0..3).map(|axis| (point[axis] - from[axis]) * (to[axis] - from[axis])).sum();
    let length2: f64 = (0..3).map(|axis| (to[axis] - from[axis]).powi(2)).sum();
    along / length2
}

pub(super) fn coordinates(point: Point) -> [f64; 3] {
    [point.x_m, point.y_m, point.z_m]
}
