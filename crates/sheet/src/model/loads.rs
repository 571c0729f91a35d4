//! What the loads are, and where they sit.

use station::plan::{Circuit, Plan};
use station::units::{Units, farads, henries, megahertz, short};

use super::cut_list::CutRow;
use super::pieces::{Arm, Cut, arm_mark, load_mark};
use crate::fonts::printable;

/// A row of the cut list for each load: nothing to cut, but something to put between two pieces.
pub(super) fn rows(plan: &Plan, arms: &[Arm], units: Units) -> Vec<CutRow> {
    let row = |(index, load): (usize, &station::plan::Load)| {
        let wire = plan.wires.get(load.wire)?;
        let away = units.tape(load.fraction * wire.cut_length_m);
        let before = arms.iter().position(|arm| arm.to == Cut::Load(index)).map(arm_mark);
        let after = arms.iter().position(|arm| arm.from == Cut::Load(index)).map(arm_mark);
        let between = match (before, after) {
            (Some(before), Some(after)) => format!(", between {before} and {after}"),
            (Some(only), None) | (None, Some(only)) => format!(", at {only}"),
            (None, None) => String::new(),
        };
        let values = values(&load.circuit);
        // A name often says it already: "7 MHz trap".
        let kind = Some(kind(&load.circuit)).filter(|kind| !load.name.to_lowercase().contains(kind));
        let what = kind.map_or_else(|| values.clone(), |kind| format!("{kind} {values}"));
        let detail = format!("{what}; {away} along {}{between}", wire.name);
        Some(CutRow {
            mark: load_mark(index),
            part: printable(&load.name),
            detail: printable(&detail),
            plan: String::new(),
            ends: String::new(),
            extra: String::new(),
            cut: String::new(),
        })
    };
    plan.loads.iter().enumerate().filter_map(row).collect()
}

/// The word for a circuit; empty where its parts say it one by one.
fn kind(circuit: &Circuit) -> &'static str {
    match circuit {
        Circuit::Resistor { .. } => "resistor",
        Circuit::Coil { .. } => "coil",
        Circuit::Capacitor { .. } => "capacitor",
        Circuit::MeasuredTrap { .. } => "trap",
        Circuit::Parallel(parts) => match parts.as_slice() {
            [Circuit::Coil { .. }, Circuit::Capacitor { .. }]
            | [Circuit::Capacitor { .. }, Circuit::Coil { .. }] => "trap",
            _ => "",
        },
        Circuit::Series(_) => "",
    }
}

/// The values of a circuit: "12.0 µH, Q 200".
fn values(circuit: &Circuit) -> String {
    let quality = |q: &Option<f64>| q.map_or_else(String::new, |q| format!(", Q {}", short(q)));
    let each = |parts: &[Circuit], between: &str| {
        let one = |part: &Circuit| match part {
            Circuit::Series(_) | Circuit::Parallel(_) => format!("({})", values(part)),
            Circuit::MeasuredTrap { .. } => format!("trap {}", values(part)),
            _ => values(part),
        };
        parts.iter().map(one).collect::<Vec<_>>().join(between)
    };
    match circuit {
        Circuit::Resistor { resistance_ohm } => format!("{} Ω", short(*resistance_ohm)),
        Circuit::Coil { inductance_h, q } => format!("{}{}", henries(*inductance_h), quality(q)),
        Circuit::Capacitor { capacitance_f, q } => format!("{}{}", farads(*capacitance_f), quality(q)),
        Circuit::MeasuredTrap { resonance_hz, capacitance_f, q } => {
            format!("{}, {}, Q {}", megahertz(*resonance_hz), farads(*capacitance_f), short(*q))
        }
        Circuit::Series(parts) => each(parts, " in series with "),
        Circuit::Parallel(parts) => each(parts, " beside "),
    }
}
