//! The pieces that the wires are cut into, at the feedpoint and at the loads.

use station::hang::{Hung, WireEnd};
use station::plan::{PathPoint, Plan, Point};
use station::units::Units;

/// A shorter piece than this is no piece: the feedpoint sits at the wire's end, m.
const LEAST_M: f64 = 1e-6;
/// Wires whose corners lie nearer to each other than this are joined there, m.
const JOINT_M: f64 = 1e-3;

/// What a piece of wire ends at.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Cut {
    /// The wire's beginning or end.
    Wire(WireEnd),
    /// The feedpoint's insulator.
    Feedpoint,
    /// The load with this index.
    Load(usize),
}

/// A piece of wire between two cuts, or a whole wire.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Arm {
    /// Index of the wire.
    pub wire: usize,
    /// Where it begins along the wire, m.
    pub from_m: f64,
    /// Where it ends along the wire, m.
    pub to_m: f64,
    /// What it begins at.
    pub from: Cut,
    /// What it ends at.
    pub to: Cut,
}

impl Arm {
    /// Length, m.
    #[must_use]
    pub fn length_m(self) -> f64 {
        self.to_m - self.from_m
    }
}

/// All pieces of wire, in the order of their marks W1, W2, …
#[must_use]
pub fn arms(plan: &Plan) -> Vec<Arm> {
    let mut out = Vec::new();
    for (index, wire) in plan.wires.iter().enumerate() {
        let end_m = wire.cut_length_m;
        let mut cuts = vec![(0.0, Cut::Wire(WireEnd::Beginning))];
        if index == plan.feedpoint.wire {
            cuts.push((plan.feedpoint.fraction * end_m, Cut::Feedpoint));
        }
        let loads = plan.loads.iter().enumerate().filter(|(_, load)| load.wire == index);
        cuts.extend(loads.map(|(load, placed)| (placed.fraction * end_m, Cut::Load(load))));
        cuts.sort_by(|a, b| a.0.total_cmp(&b.0));
        cuts.push((end_m, Cut::Wire(WireEnd::End)));
        let pieces = cuts.windows(2).map(|pair| {
            let [(from_m, from), (to_m, to)] = [pair[0], pair[1]];
            Arm { wire: index, from_m, to_m, from, to }
        });
        out.extend(pieces.filter(|arm| arm.length_m() > LEAST_M));
    }
    out
}

/// The mark of a piece of wire: W1, W2, …
#[must_use]
pub fn arm_mark(index: usize) -> String {
    format!("W{}", index + 1)
}

/// The mark of a load: L1, L2, …
#[must_use]
pub fn load_mark(index: usize) -> String {
    format!("L{}", index + 1)
}

/// What a path is made fast to at an end.
pub(super) fn place(point: &PathPoint, end: WireEnd) -> String {
    match (point, end) {
        (PathPoint::OnSupport { support, .. }, _) => support.clone(),
        (PathPoint::Free(_), WireEnd::Beginning) => "the beginning of its path".to_owned(),
        (PathPoint::Free(_), WireEnd::End) => "the end of its path".to_owned(),
    }
}

/// From where to where a piece goes. Heights that the drawing does not measure are said here: those of the wires that
/// are not fed.
pub(super) fn route(plan: &Plan, hung: &Hung, all: &[Arm], arm: Arm, units: Units) -> String {
    let name = |cut: Cut| match cut {
        Cut::Wire(end) => end_name(plan, hung, all, (arm.wire, end), units),
        Cut::Feedpoint => "feedpoint".to_owned(),
        Cut::Load(index) => load_mark(index),
    };
    match (arm.from, arm.to) {
        (Cut::Feedpoint, Cut::Wire(_)) => format!("to {}", name(arm.to)),
        (Cut::Wire(_), Cut::Feedpoint) => format!("to {}", name(arm.from)),
        _ => format!("{} to {}", name(arm.from), name(arm.to)),
    }
}

fn end_name(plan: &Plan, hung: &Hung, all: &[Arm], (wire, end): (usize, WireEnd), units: Units) -> String {
    let path = &plan.wires[wire].path;
    let corner = match end {
        WireEnd::Beginning => hung.wires[wire].vertices.first(),
        WireEnd::End => hung.wires[wire].vertices.last(),
    };
    if let Some(mark) = corner.and_then(|corner| joined_piece(hung, all, wire, corner.at)) {
        return format!("its joint with {mark}");
    }
    let point = match end {
        WireEnd::Beginning => path.first(),
        WireEnd::End => path.last(),
    };
    let Some(point) = point else { return String::new() };
    let height_m = match point {
        PathPoint::OnSupport { height_m, .. } => *height_m,
        PathPoint::Free(at) => at.z_m,
    };
    if wire == plan.feedpoint.wire {
        return place(point, end);
    }
    format!("{}, {} up", place(point, end), units.tape(height_m))
}

/// The mark of the first piece of another wire that has a corner at this point.
fn joined_piece(hung: &Hung, all: &[Arm], wire: usize, at: Point) -> Option<String> {
    let touches = |arm: &Arm| {
        arm.wire != wire
            && hung.wires[arm.wire]
                .vertices
                .iter()
                .filter(|corner| (arm.from_m..=arm.to_m).contains(&corner.arc_m))
                .any(|corner| corner.at.distance_m(at) < JOINT_M)
    };
    all.iter().position(touches).map(arm_mark)
}
