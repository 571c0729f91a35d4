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
        let values = load_values(&load.circuit);
        // A name often says it already: "7 MHz trap".
        let kind = Some(LoadKind::of(&load.circuit))
            // Several parts are named one by one.
            .filter(|&kind| kind != LoadKind::Mixed)
            .map(LoadKind::words)
            .filter(|kind| !load.name.to_lowercase().contains(kind));
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

/// What a load is.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
#[allow(missing_docs)] // The words say it.
pub enum LoadKind {
    Coil,
    Capacitor,
    Trap,
    Resistor,
    Mixed,
}

impl LoadKind {
    /// The kind of a circuit: a coil beside a capacitor is a trap.
    #[must_use]
    pub fn of(circuit: &Circuit) -> Self {
        match circuit {
            Circuit::Resistor { .. } => Self::Resistor,
            Circuit::Coil { .. } => Self::Coil,
            Circuit::Capacitor { .. } => Self::Capacitor,
            Circuit::MeasuredTrap { .. } => Self::Trap,
            Circuit::Parallel(parts) => match parts.as_slice() {
                [Circuit::Coil { .. }, Circuit::Capacitor { .. }]
                | [Circuit::Capacitor { .. }, Circuit::Coil { .. }] => Self::Trap,
                [part] => Self::of(part),
                _ => Self::Mixed,
            },
            Circuit::Series(parts) => match parts.as_slice() {
                [part] => Self::of(part),
                _ => Self::Mixed,
            },
        }
    }

    /// Its name.
    #[must_use]
    pub fn words(self) -> &'static str {
        match self {
            Self::Coil => "coil",
            Self::Capacitor => "capacitor",
            Self::Trap => "trap",
            Self::Resistor => "resistor",
            Self::Mixed => "several parts",
        }
    }
}

/// The values of a circuit: "12.0 µH, Q 200".
#[must_use]
pub fn load_values(circuit: &Circuit) -> String {
    let quality = |q: &Option<f64>| q.map_or_else(String::new, |q| format!(", Q {}", short(q)));
    let each = |parts: &[Circuit], between: &str| {
        let one = |part: &Circuit| match part {
            Circuit::Series(_) | Circuit::Parallel(_) => format!("({})", load_values(part)),
            Circuit::MeasuredTrap { .. } => format!("trap {}", load_values(part)),
            _ => load_values(part),
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

#[cfg(test)]
mod tests {
    use super::*;

    fn coil() -> Circuit {
        Circuit::Coil { inductance_h: 8.5e-6, q: Some(200.0) }
    }

    fn capacitor() -> Circuit {
        Circuit::Capacitor { capacitance_f: 60e-12, q: None }
    }

    #[test]
    fn a_coil_beside_a_capacitor_is_a_trap_and_one_after_the_other_is_not() {
        assert_eq!(LoadKind::of(&Circuit::Parallel(vec![coil(), capacitor()])), LoadKind::Trap);
        assert_eq!(LoadKind::of(&Circuit::Parallel(vec![capacitor(), coil()])), LoadKind::Trap);
        assert_eq!(LoadKind::of(&Circuit::Series(vec![coil(), capacitor()])), LoadKind::Mixed);
        assert_eq!(LoadKind::of(&Circuit::Series(vec![coil()])), LoadKind::Coil);
    }

    #[test]
    fn values_stand_in_the_units_of_the_trade() {
        assert_eq!(load_values(&coil()), format!("{}, Q 200", henries(8.5e-6)));
        let trap = Circuit::MeasuredTrap { resonance_hz: 7.05e6, capacitance_f: 60e-12, q: 150.0 };
        assert!(
            load_values(&trap).starts_with("7.05") && load_values(&trap).ends_with("60.0 pF, Q 150"),
            "{}",
            load_values(&trap)
        );
        assert!(load_values(&Circuit::Parallel(vec![coil(), capacitor()])).contains(" beside "));
    }
}
