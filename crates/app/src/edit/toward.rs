//! Half-way edits: how far a dragged number may go.

use station::plan::{Link, PathPoint, Plan, Point};

use crate::command::Edit;

/// The edit a share of the way from the plan's present value to the wanted one; `None` where there is no way between.
pub fn toward(plan: &Plan, edit: &Edit, share: f64) -> Option<Edit> {
    let number = |from: f64, to: f64| from + share * (to - from);
    let point = |from: Point, to: Point| from.toward(to, share);
    Some(match *edit {
        Edit::WireBeginning { wire, start_m } => {
            Edit::WireBeginning { wire, start_m: number(plan.wires.get(wire)?.start_m, start_m) }
        }
        Edit::CutLength { wire, cut_length_m } => {
            Edit::CutLength { wire, cut_length_m: number(plan.wires.get(wire)?.cut_length_m, cut_length_m) }
        }
        Edit::WireSpan { wire, start_m, cut_length_m } => {
            let now = plan.wires.get(wire)?;
            let (start_m, cut_length_m) =
                (number(now.start_m, start_m), number(now.cut_length_m, cut_length_m));
            Edit::WireSpan { wire, start_m, cut_length_m }
        }
        Edit::PathHeight { wire, point, height_m } => {
            let now_m = match plan.wires.get(wire)?.path.get(point)? {
                PathPoint::OnSupport { height_m, .. } => *height_m,
                PathPoint::Free(at) => at.z_m,
            };
            Edit::PathHeight { wire, point, height_m: number(now_m, height_m) }
        }
        Edit::PathPoints { wire, ref path } => {
            let now = &plan.wires.get(wire)?.path;
            if now.len() != path.len() {
                return None;
            }
            let path =
                now.iter().zip(path).map(|(from, to)| between(from, to, share)).collect::<Option<_>>()?;
            Edit::PathPoints { wire, path }
        }
        Edit::FeedFraction(fraction) => Edit::FeedFraction(number(plan.feedpoint.fraction, fraction)),
        Edit::LoadFraction { load, fraction } => {
            Edit::LoadFraction { load, fraction: number(plan.loads.get(load)?.fraction, fraction) }
        }
        Edit::LeastShare(share_to_wire) => Edit::LeastShare(number(plan.least_share_to_wire, share_to_wire)),
        Edit::SupportFoot { support, foot } => {
            Edit::SupportFoot { support, foot: point(plan.site.supports.get(support)?.foot, foot) }
        }
        Edit::SupportHeight { support, height_m } => Edit::SupportHeight {
            support,
            height_m: number(plan.site.supports.get(support)?.height_m, height_m),
        },
        Edit::Entrance(entrance) => Edit::Entrance(point(plan.site.entrance, entrance)),
        Edit::LinkLength { feed, link, length_m } => match plan.feeds.get(feed)?.links.get(link)? {
            Link::Line(piece) => Edit::LinkLength { feed, link, length_m: number(piece.length_m, length_m) },
            Link::Transformer(_) | Link::MatchingUnit(_) => return None,
        },
        _ => return None,
    })
}

/// A path point on the way to another one; `None` when it changes its support.
fn between(from: &PathPoint, to: &PathPoint, share: f64) -> Option<PathPoint> {
    match (from, to) {
        (PathPoint::Free(from), PathPoint::Free(to)) => Some(PathPoint::Free(from.toward(*to, share))),
        (
            PathPoint::OnSupport { support: old, height_m: from_m },
            PathPoint::OnSupport { support, height_m: to_m },
        ) if old == support => Some(PathPoint::OnSupport {
            support: support.clone(),
            height_m: from_m + share * (to_m - from_m),
        }),
        _ => None,
    }
}
