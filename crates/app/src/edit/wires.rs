//! Wires and loads that come and go.

use station::plan::Plan;

use super::Refusal;
use super::set::get;
use crate::command::Edit;

/// Wires come, go and are renamed.
pub fn wires(plan: &mut Plan, edit: &Edit) -> Result<(), Refusal> {
    match edit {
        Edit::AddWire(wire) => plan.wires.push(wire.clone()),
        Edit::RenameWire { wire, name } => get(&mut plan.wires, *wire, "wire")?.name.clone_from(name),
        Edit::Earthing { wire, earthed } => get(&mut plan.wires, *wire, "wire")?.earthed.clone_from(earthed),
        Edit::RemoveWire { wire } => {
            let gone = *wire;
            let name = get(&mut plan.wires, gone, "wire")?.name.clone();
            if plan.feedpoint.wire == gone {
                return Err(Refusal::Fed { wire: name });
            }
            plan.wires.remove(gone);
            plan.loads.retain(|load| load.wire != gone);
            // What counts wires counts one less beyond the one that went.
            let places = plan.loads.iter_mut().map(|load| &mut load.wire).chain([&mut plan.feedpoint.wire]);
            for place in places {
                *place -= usize::from(*place > gone);
            }
        }
        _ => {}
    }
    Ok(())
}

/// Loads come, go, slide and change.
pub fn loads(plan: &mut Plan, edit: &Edit) -> Result<(), Refusal> {
    match edit {
        Edit::AddLoad(load) => plan.loads.push(load.clone()),
        Edit::RemoveLoad { load } => {
            get(&mut plan.loads, *load, "load")?;
            plan.loads.remove(*load);
        }
        Edit::SetLoad { load, with } => get(&mut plan.loads, *load, "load")?.clone_from(with),
        Edit::LoadFraction { load, fraction } => get(&mut plan.loads, *load, "load")?.fraction = *fraction,
        _ => {}
    }
    Ok(())
}
