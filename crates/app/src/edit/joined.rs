//! What is joined stays joined: where a path point moves, the free points that stood there go with it, a closed wire
//! stays closed, and a fed wire that changes its length keeps its feedpoint between the wires that are joined to it there.

use station::hang::resolve_path;
use station::plan::{PathPoint, Plan, Point, Wire};
use station::validate::FEED_FRACTION;

use crate::command::Edit;

/// Points closer than this are joined, m: the solver's own limit.
pub const JOINT_M: f64 = 1e-3;
/// A joint this close to the feedpoint belongs to it, m.
pub const AT_FEED_M: f64 = 0.5;

/// Path points of all wires before an edit, and where the feedpoint was on its path.
pub struct Joints {
    places: Vec<Vec<Point>>,
    closed: Vec<bool>,
    feed_along_m: f64,
}

/// A path point that an edit has moved.
struct Move {
    wire: usize,
    point: usize,
    from: Point,
    to: Point,
}

impl Joints {
    /// Looks before an edit that can part wires; `None` before others.
    pub fn of(plan: &Plan, edit: &Edit) -> Option<Self> {
        let parts = matches!(
            edit,
            Edit::PathPoints { .. }
                | Edit::PathHeight { .. }
                | Edit::SupportFoot { .. }
                | Edit::SupportHeight { .. }
                | Edit::WireBeginning { .. }
                | Edit::CutLength { .. }
                | Edit::WireSpan { .. }
        );
        let fed = plan.wires.get(plan.feedpoint.wire).filter(|_| parts)?;
        let feed_along_m = fed.start_m + plan.feedpoint.fraction * fed.cut_length_m;
        let places = places(plan);
        let closed = plan.wires.iter().zip(&places).map(|(wire, path)| is_closed(wire, path)).collect();
        Some(Self { places, closed, feed_along_m })
    }

    /// Puts together again what the edit has parted.
    pub fn keep(&self, plan: &mut Plan, edit: &Edit) {
        let moves = self.moves(&places(plan));
        for (wire, planned) in plan.wires.iter_mut().enumerate() {
            for (point, place) in planned.path.iter_mut().enumerate() {
                let PathPoint::Free(at) = place else { continue };
                if moves.iter().any(|m| (m.wire, m.point) == (wire, point)) {
                    continue;
                }
                if let Some(joined) = moves.iter().find(|m| m.from.distance_m(*at) <= JOINT_M) {
                    *at = joined.to;
                }
            }
        }
        let now = places(plan);
        let cut = matches!(edit, Edit::WireBeginning { .. } | Edit::CutLength { .. } | Edit::WireSpan { .. });
        if cut {
            self.keep_feed(plan, &now);
        } else {
            for ((wire, path), _) in plan.wires.iter_mut().zip(&now).zip(&self.closed).filter(|each| *each.1)
            {
                wire.cut_length_m = length_m(path);
            }
        }
    }

    fn moves(&self, now: &[Vec<Point>]) -> Vec<Move> {
        let mut moves = Vec::new();
        for (wire, (before, after)) in self.places.iter().zip(now).enumerate() {
            // A path that has gained or lost a point joins nothing anew.
            if before.len() != after.len() {
                continue;
            }
            let pairs = before.iter().zip(after).enumerate();
            moves.extend(pairs.filter(|(_, (from, to))| from != to).map(|(point, (&from, &to))| Move {
                wire,
                point,
                from,
                to,
            }));
        }
        moves
    }

    /// Between wires that are joined on both sides of it, the feedpoint stays at its place on the path.
    fn keep_feed(&self, plan: &mut Plan, now: &[Vec<Point>]) {
        let fed = plan.feedpoint.wire;
        let Some(path) = plan.wires.get(fed).and_then(|wire| resolve_path(&plan.site, fed, wire).ok()) else {
            return;
        };
        let others =
            || now.iter().enumerate().filter(|(wire, _)| *wire != fed).flat_map(|(_, points)| points);
        let joint = |along: std::ops::Range<f64>| {
            path.iter().any(|corner| {
                along.contains(&(corner.arc_m - self.feed_along_m))
                    && others().any(|point| point.distance_m(corner.at) <= JOINT_M)
            })
        };
        if joint(-AT_FEED_M..0.0) && joint(0.0..AT_FEED_M) {
            let wire = &plan.wires[fed];
            let fraction = (self.feed_along_m - wire.start_m) / wire.cut_length_m;
            if FEED_FRACTION.contains(&fraction) {
                plan.feedpoint.fraction = fraction;
            }
        }
    }
}

/// Whether a wire covers a path that ends where it begins.
fn is_closed(wire: &Wire, path: &[Point]) -> bool {
    let (Some(first), Some(last)) = (path.first(), path.last()) else { return false };
    let over_m = (wire.cut_length_m - length_m(path)).abs();
    path.len() > 2 && first.distance_m(*last) <= JOINT_M && wire.start_m.abs() <= JOINT_M && over_m <= JOINT_M
}

fn length_m(path: &[Point]) -> f64 {
    path.windows(2).map(|pair| pair[0].distance_m(pair[1])).sum()
}

/// The path points of every wire; none where a path names a support that is not there.
fn places(plan: &Plan) -> Vec<Vec<Point>> {
    let path = |(index, wire)| resolve_path(&plan.site, index, wire).unwrap_or_default();
    plan.wires
        .iter()
        .enumerate()
        .map(|each| path(each).into_iter().map(|corner| corner.at).collect())
        .collect()
}
