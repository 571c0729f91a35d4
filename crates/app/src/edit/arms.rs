//! A fan: two more wires from the feedpoint, one on either side.

use station::hang::{Vertex, hang, resolve_path};
use station::plan::{PathPoint, Plan, Point, Wire};

use super::Refusal;
use super::joined::{AT_FEED_M, JOINT_M};

/// The joints stand this far from the feedpoint, m: a spreader of 10 cm.
const JOINT_AWAY_M: f64 = 0.05;
/// Least length of the fed wire on either side, m.
const LEAST_SIDE_M: f64 = 0.3;
/// The arms slant down from the fed wire by this much per metre: far enough not to lie in it.
const SLANT: f64 = 0.3;
/// Lowest end of an arm, m: well above what people reach.
const LOWEST_END_M: f64 = 3.0;

/// Adds two wires of this length, joined to the fed wire on either side of the feedpoint.
pub fn add(plan: &mut Plan, length_m: f64) -> Result<(), Refusal> {
    let fed = plan.feedpoint.wire;
    let no_room = || Refusal::NoRoomForArms { least_m: LEAST_SIDE_M };
    let hung = hang(plan).map_err(station::validate::PlanError::from)?;
    let wire = plan.wires.get(fed).ok_or(Refusal::Missing { what: "wire", number: fed + 1 })?;
    let path = resolve_path(&plan.site, fed, wire).map_err(station::validate::PlanError::from)?;
    let feed_m = hung.feedpoint.arc_m;
    let path_m = path.last().map_or(0.0, |corner| corner.arc_m);
    let feed_along_m = wire.start_m + feed_m;
    let on_path = feed_along_m > LEAST_SIDE_M && feed_along_m < path_m - LEAST_SIDE_M;
    if !on_path || feed_m < LEAST_SIDE_M || wire.cut_length_m - feed_m < LEAST_SIDE_M {
        return Err(no_room());
    }
    let mut fed_path = wire.path.clone();
    let mut ends = Vec::with_capacity(2);
    for sense in [-1.0, 1.0] {
        let joint = joint_near(&path, feed_along_m, sense);
        let at = joint.unwrap_or_else(|| hung.wires[fed].point_at(feed_m + sense * JOINT_AWAY_M));
        if joint.is_none() {
            // The fed wire's own path counts the same arcs with the new point in it: the point lies on it.
            let along_m = feed_along_m + sense * JOINT_AWAY_M;
            let before = path.iter().filter(|corner| corner.arc_m < along_m).count();
            let shift = fed_path.len() - path.len();
            fed_path.insert(before + shift, PathPoint::Free(at));
        }
        let outer = hung.wires[fed].point_at(feed_m + sense * 0.5 * length_m);
        let others = plan.wires.iter().flat_map(|wire| wire.path.first());
        let there = others.filter(|point| matches!(point, PathPoint::Free(p) if p.distance_m(at) <= JOINT_M));
        let end = slanted((at, outer), length_m, 1 + there.count()).ok_or_else(no_room)?;
        ends.push((at, end));
    }
    let conductor = wire.conductor.clone();
    plan.wires[fed].path = fed_path;
    for (at, end) in ends {
        let name = free_name(plan);
        let path = vec![PathPoint::Free(at), PathPoint::Free(end)];
        let arm = Wire {
            name,
            path,
            start_m: 0.0,
            cut_length_m: length_m,
            conductor: conductor.clone(),
            earthed: Vec::new(),
        };
        plan.wires.push(arm);
    }
    Ok(())
}

/// A corner of the fed wire close to the feedpoint on one side: another pair of arms is joined there already.
fn joint_near(path: &[Vertex], feed_along_m: f64, sense: f64) -> Option<Point> {
    let away_m = |corner: &Vertex| sense * (corner.arc_m - feed_along_m);
    let near = path.iter().filter(|corner| (0.5 * JOINT_AWAY_M..AT_FEED_M).contains(&away_m(corner)));
    near.min_by(|a, b| away_m(a).total_cmp(&away_m(b))).map(|corner| corner.at)
}

/// Where an arm ends that leaves a joint toward `outer` below the fed wire, each pair steeper than the one before. Where
/// that would come too low, it goes level and to the side.
fn slanted((from, outer): (Point, Point), length_m: f64, pair: usize) -> Option<Point> {
    let along_m = from.distance_m(outer);
    if along_m < JOINT_M {
        return None;
    }
    let below = Point { z_m: outer.z_m - pair as f64 * SLANT * along_m, ..outer };
    let at = |toward: Point| from.toward(toward, length_m / from.distance_m(toward));
    let end = at(below);
    if end.z_m >= LOWEST_END_M {
        return Some(end);
    }
    let (dx, dy) = (outer.x_m - from.x_m, outer.y_m - from.y_m);
    let turn = pair as f64 / 3.0;
    let aside = Point::new(from.x_m + dx - turn * dy, from.y_m + dy + turn * dx, from.z_m);
    (from.distance_m(aside) > JOINT_M).then(|| at(aside))
}

/// "arm 1", "arm 2", …
fn free_name(plan: &Plan) -> String {
    let taken = |name: &String| plan.wires.iter().any(|wire| wire.name == *name);
    (1_usize..).map(|number| format!("arm {number}")).find(|name| !taken(name)).unwrap_or_default()
}
