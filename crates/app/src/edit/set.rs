//! What each edit does, without asking whether the plan is sound afterwards.

use station::plan::{Link, PathPoint, Plan};

use super::{Refusal, arms, joined, wires};
use crate::command::Edit;

/// Changes the plan; what was joined before is joined afterwards.
pub fn set(plan: &mut Plan, edit: &Edit) -> Result<(), Refusal> {
    let before = joined::Joints::of(plan, edit);
    change(plan, edit)?;
    if let Some(before) = before {
        before.keep(plan, edit);
    }
    Ok(())
}

fn change(plan: &mut Plan, edit: &Edit) -> Result<(), Refusal> {
    match edit {
        Edit::WireBeginning { .. }
        | Edit::CutLength { .. }
        | Edit::WireSpan { .. }
        | Edit::PathHeight { .. }
        | Edit::PathPoints { .. }
        | Edit::Conductor { .. } => wire(plan, edit),
        Edit::AddWire(_) | Edit::RemoveWire { .. } | Edit::RenameWire { .. } | Edit::Earthing { .. } => {
            wires::wires(plan, edit)
        }
        Edit::AddArms { length_m } => arms::add(plan, *length_m),
        Edit::AddLoad(_) | Edit::RemoveLoad { .. } | Edit::SetLoad { .. } | Edit::LoadFraction { .. } => {
            wires::loads(plan, edit)
        }
        Edit::SupportFoot { .. }
        | Edit::SupportHeight { .. }
        | Edit::SupportKind { .. }
        | Edit::AddSupport(_)
        | Edit::RemoveSupport { .. }
        | Edit::RenameSupport { .. } => support(plan, edit),
        Edit::LinkLength { .. }
        | Edit::LineKind { .. }
        | Edit::SetLink { .. }
        | Edit::InsertLink { .. }
        | Edit::RemoveLink { .. } => link(plan, edit),
        Edit::AddFeed(_) | Edit::CopyFeed { .. } | Edit::RemoveFeed { .. } | Edit::RenameFeed { .. } => {
            feed(plan, edit)
        }
        _ => {
            simple(plan, edit);
            Ok(())
        }
    }
}

/// Values that stand once in a plan.
fn simple(plan: &mut Plan, edit: &Edit) {
    match edit {
        Edit::FeedFraction(fraction) => plan.feedpoint.fraction = *fraction,
        Edit::Earth(earth) => plan.site.earth = earth.clone(),
        Edit::Entrance(point) => plan.site.entrance = *point,
        Edit::Transmitter(transmitter) => plan.transmitter = transmitter.clone(),
        Edit::Bands(bands) => plan.bands.clone_from(bands),
        Edit::Name(name) => plan.name.clone_from(name),
        Edit::Purpose(purpose) => plan.purpose.clone_from(purpose),
        Edit::CallSign(call_sign) => plan.call_sign.clone_from(call_sign),
        Edit::Edition(edition) => plan.edition.clone_from(edition),
        Edit::LeastShare(share) => plan.least_share_to_wire = *share,
        Edit::Whole(whole) => plan.clone_from(whole),
        _ => {}
    }
}

fn wire(plan: &mut Plan, edit: &Edit) -> Result<(), Refusal> {
    match edit {
        Edit::WireBeginning { wire, start_m } => {
            let wire = get(&mut plan.wires, *wire, "wire")?;
            wire.cut_length_m += wire.start_m - start_m;
            wire.start_m = *start_m;
        }
        Edit::CutLength { wire, cut_length_m } => {
            get(&mut plan.wires, *wire, "wire")?.cut_length_m = *cut_length_m;
        }
        Edit::WireSpan { wire, start_m, cut_length_m } => {
            let wire = get(&mut plan.wires, *wire, "wire")?;
            (wire.start_m, wire.cut_length_m) = (*start_m, *cut_length_m);
        }
        Edit::PathHeight { wire, point, height_m } => {
            let wire = get(&mut plan.wires, *wire, "wire")?;
            match get(&mut wire.path, *point, "path point")? {
                PathPoint::OnSupport { height_m: height, .. } => *height = *height_m,
                PathPoint::Free(point) => point.z_m = *height_m,
            }
        }
        Edit::PathPoints { wire, path } => get(&mut plan.wires, *wire, "wire")?.path.clone_from(path),
        Edit::Conductor { wire, conductor } => {
            get(&mut plan.wires, *wire, "wire")?.conductor.clone_from(conductor);
        }
        _ => {}
    }
    Ok(())
}

fn support(plan: &mut Plan, edit: &Edit) -> Result<(), Refusal> {
    match edit {
        Edit::SupportFoot { support, foot } => {
            get(&mut plan.site.supports, *support, "support")?.foot = *foot;
        }
        Edit::SupportHeight { support, height_m } => {
            let support = get(&mut plan.site.supports, *support, "support")?;
            let before_m = std::mem::replace(&mut support.height_m, *height_m);
            let name = support.name.clone();
            follow_top(plan, &name, before_m, *height_m);
        }
        Edit::SupportKind { support, kind } => {
            get(&mut plan.site.supports, *support, "support")?.kind = *kind;
        }
        Edit::AddSupport(support) => plan.site.supports.push(support.clone()),
        Edit::RemoveSupport { support } => {
            let name = get(&mut plan.site.supports, *support, "support")?.name.clone();
            if let Some(wire) =
                plan.wires.iter().find(|wire| wire.path.iter().any(|point| is_on(point, &name)))
            {
                return Err(Refusal::Carries { support: name, wire: wire.name.clone() });
            }
            plan.site.supports.remove(*support);
        }
        Edit::RenameSupport { support, name } => {
            let support = get(&mut plan.site.supports, *support, "support")?;
            let old = std::mem::replace(&mut support.name, name.clone());
            for point in plan.wires.iter_mut().flat_map(|wire| &mut wire.path) {
                if let PathPoint::OnSupport { support, .. } = point
                    && *support == old
                {
                    support.clone_from(name);
                }
            }
        }
        _ => {}
    }
    Ok(())
}

/// A fixing this close to a support's top is at its top, m.
const AT_TOP_M: f64 = 0.05;

/// What is made fast at a support's top goes up and down with it, and nothing is left above it.
fn follow_top(plan: &mut Plan, support: &str, before_m: f64, after_m: f64) {
    for place in plan.wires.iter_mut().flat_map(|wire| &mut wire.path) {
        let PathPoint::OnSupport { support: on, height_m } = place else { continue };
        if on == support && (*height_m > before_m - AT_TOP_M || *height_m > after_m) {
            *height_m = after_m;
        }
    }
}

/// Whether a path point is made fast to the support of this name.
fn is_on(point: &PathPoint, name: &str) -> bool {
    matches!(point, PathPoint::OnSupport { support, .. } if support == name)
}

fn link(plan: &mut Plan, edit: &Edit) -> Result<(), Refusal> {
    match edit {
        Edit::LinkLength { feed, link, length_m } => match link_of(plan, *feed, *link)? {
            Link::Line(piece) => piece.length_m = *length_m,
            Link::Transformer(_) | Link::MatchingUnit(_) => {
                return Err(Refusal::NotALine { number: link + 1 });
            }
        },
        Edit::LineKind { feed, link, line } => match link_of(plan, *feed, *link)? {
            Link::Line(piece) => piece.line.clone_from(line),
            Link::Transformer(_) | Link::MatchingUnit(_) => {
                return Err(Refusal::NotALine { number: link + 1 });
            }
        },
        Edit::SetLink { feed, link, with } => link_of(plan, *feed, *link)?.clone_from(with),
        Edit::InsertLink { feed, link, new } => {
            let links = &mut get(&mut plan.feeds, *feed, "feed")?.links;
            if *link > links.len() {
                return Err(Refusal::Missing { what: "link", number: link + 1 });
            }
            links.insert(*link, new.clone());
        }
        Edit::RemoveLink { feed, link } => {
            link_of(plan, *feed, *link)?;
            plan.feeds[*feed].links.remove(*link);
        }
        _ => {}
    }
    Ok(())
}

fn feed(plan: &mut Plan, edit: &Edit) -> Result<(), Refusal> {
    match edit {
        Edit::AddFeed(feed) => plan.feeds.push(feed.clone()),
        Edit::CopyFeed { feed } => {
            let mut copy = get(&mut plan.feeds, *feed, "feed")?.clone();
            copy.name = free_name(plan, &copy.name);
            plan.feeds.insert(feed + 1, copy);
        }
        Edit::RemoveFeed { feed } => {
            get(&mut plan.feeds, *feed, "feed")?;
            if plan.feeds.len() == 1 {
                return Err(Refusal::LastFeed);
            }
            plan.feeds.remove(*feed);
        }
        Edit::RenameFeed { feed, name } => get(&mut plan.feeds, *feed, "feed")?.name.clone_from(name),
        _ => {}
    }
    Ok(())
}

/// "open line" becomes "open line 2", that becomes "open line 3".
fn free_name(plan: &Plan, name: &str) -> String {
    let stem = match name.rsplit_once(' ') {
        Some((stem, number)) if number.parse::<u32>().is_ok() => stem,
        _ => name,
    };
    let mut number = 2_u32;
    loop {
        let candidate = format!("{stem} {number}");
        if plan.feeds.iter().all(|feed| feed.name != candidate) {
            return candidate;
        }
        number += 1;
    }
}

fn link_of(plan: &mut Plan, feed: usize, link: usize) -> Result<&mut Link, Refusal> {
    get(&mut get(&mut plan.feeds, feed, "feed")?.links, link, "link")
}

pub(super) fn get<'a, T>(list: &'a mut [T], index: usize, what: &'static str) -> Result<&'a mut T, Refusal> {
    list.get_mut(index).ok_or(Refusal::Missing { what, number: index + 1 })
}
