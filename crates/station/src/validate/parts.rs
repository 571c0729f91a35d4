//! Validation of parts: conductors, lines, matching units, loads.

use super::{Checked, PlanError, count, number, text};
use crate::plan::{
    Circuit, ConductorData, Earth, EarthConnection, Electrode, LOAD_GAP_M, LineConstruction, LineData, Load,
    MatchingUnit, Plan,
};

pub(super) fn check_conductor(field: &str, data: &ConductorData) -> Checked {
    text(&format!("{field}.name"), &data.name, 80)?;
    number(&format!("{field}.diameter_m"), data.diameter_m, 1e-4..=0.05, "m")?;
    number(&format!("{field}.conductivity_s_per_m"), data.conductivity_s_per_m, 1e4..=1e15, "S/m")?;
    number(&format!("{field}.stranding_factor"), data.stranding_factor, 1.0..=10.0, "")?;
    number(&format!("{field}.relative_permeability"), data.relative_permeability, 0.9..=10_000.0, "")?;
    if let Some(core) = &data.core {
        let inner = format!("{field}.core.diameter_m");
        number(&inner, core.diameter_m, 1e-4..=0.05, "m")?;
        exceeds(&format!("{field}.diameter_m"), data.diameter_m, core.diameter_m, "the core's diameter")?;
        number(&format!("{field}.core.conductivity_s_per_m"), core.conductivity_s_per_m, 1e4..=1e15, "S/m")?;
        let permeability = core.relative_permeability;
        number(&format!("{field}.core.relative_permeability"), permeability, 0.9..=10_000.0, "")?;
    }
    if let Some(insulation) = &data.insulation {
        let outer = format!("{field}.insulation.outer_diameter_m");
        number(&outer, insulation.outer_diameter_m, 1e-4..=0.1, "m")?;
        exceeds(&outer, insulation.outer_diameter_m, data.diameter_m, "the metal's diameter")?;
        let permittivity = insulation.relative_permittivity;
        number(&format!("{field}.insulation.relative_permittivity"), permittivity, 1.0..=20.0, "")?;
    }
    Ok(())
}

pub(super) fn check_unit(field: &str, unit: &MatchingUnit) -> Checked {
    number(&format!("{field}.inductance_max_h"), unit.inductance_max_h, 1e-8..=1e-3, "H")?;
    number(&format!("{field}.capacitance_max_f"), unit.capacitance_max_f, 1e-12..=1e-6, "F")?;
    number(&format!("{field}.coil_q"), unit.coil_q, 5.0..=10_000.0, "")?;
    number(&format!("{field}.capacitor_q"), unit.capacitor_q, 5.0..=100_000.0, "")?;
    if let Some(rating) = unit.rating_peak_v {
        number(&format!("{field}.rating_peak_v"), rating, 10.0..=100_000.0, "V")?;
    }
    Ok(())
}

pub(super) fn check_line(field: &str, data: &LineData) -> Checked {
    text(&format!("{field}.name"), &data.name, 80)?;
    if let Some(rating) = data.rating_peak_v {
        number(&format!("{field}.rating_peak_v"), rating, 10.0..=1e6, "V")?;
    }
    if let Some(rating) = data.rating_average {
        number(&format!("{field}.rating_average.watts"), rating.watts, 0.1..=1e6, "W")?;
        number(&format!("{field}.rating_average.frequency_hz"), rating.frequency_hz, 1e5..=1e9, "Hz")?;
    }
    if let Some(wet) = data.wet {
        number(&format!("{field}.wet.capacitance_factor"), wet.capacitance_factor, 1.0..=5.0, "")?;
        number(&format!("{field}.wet.added_loss_tangent"), wet.added_loss_tangent, 0.0..=1.0, "")?;
    }
    let at = |name: &str| format!("{field}.construction.{name}");
    match data.construction {
        LineConstruction::Published { z0_ohm, velocity_factor, loss } => {
            number(&at("z0_ohm"), z0_ohm, 5.0..=2_000.0, "Ω")?;
            number(&at("velocity_factor"), velocity_factor, 0.1..=1.0, "")?;
            number(&at("loss.k1_db_per_100m"), loss.k1_db_per_100m, 0.0..=100.0, "dB")?;
            number(&at("loss.k2_db_per_100m"), loss.k2_db_per_100m, 0.0..=20.0, "dB")
        }
        LineConstruction::TwoWire {
            wire_diameter_m,
            spacing_m,
            conductivity_s_per_m,
            velocity_factor,
            loss_tangent,
        } => {
            number(&at("wire_diameter_m"), wire_diameter_m, 1e-4..=0.05, "m")?;
            number(&at("spacing_m"), spacing_m, 1e-4..=2.0, "m")?;
            exceeds(&at("spacing_m"), spacing_m, 1.05 * wire_diameter_m, "1.05 times the wires' diameter")?;
            number(&at("conductivity_s_per_m"), conductivity_s_per_m, 1e5..=1e8, "S/m")?;
            number(&at("velocity_factor"), velocity_factor, 0.1..=1.0, "")?;
            number(&at("loss_tangent"), loss_tangent, 0.0..=0.1, "")
        }
        LineConstruction::Coaxial {
            inner_diameter_m,
            outer_diameter_m,
            conductivity_s_per_m,
            relative_permittivity,
            loss_tangent,
        } => {
            number(&at("inner_diameter_m"), inner_diameter_m, 1e-4..=0.2, "m")?;
            number(&at("outer_diameter_m"), outer_diameter_m, 1e-4..=0.5, "m")?;
            exceeds(
                &at("outer_diameter_m"),
                outer_diameter_m,
                1.05 * inner_diameter_m,
                "1.05 times the inner one",
            )?;
            number(&at("conductivity_s_per_m"), conductivity_s_per_m, 1e5..=1e8, "S/m")?;
            number(&at("relative_permittivity"), relative_permittivity, 1.0..=20.0, "")?;
            number(&at("loss_tangent"), loss_tangent, 0.0..=0.1, "")
        }
    }
}

fn exceeds(field: &str, value_m: f64, limit_m: f64, what: &str) -> Checked {
    if value_m > limit_m {
        return Ok(());
    }
    Err(PlanError::Contradiction {
        field: field.to_owned(),
        value: format!("{value_m} m"),
        accepted: format!("more than {limit_m:.4} m, {what}"),
    })
}

/// Connections to the earth: one for each end at most, and an earth to connect to.
pub(super) fn check_earthed(field: &str, earthed: &[EarthConnection], earth: &Earth) -> Checked {
    let refused = |value: String, accepted: &str| {
        Err(PlanError::Contradiction { field: field.to_owned(), value, accepted: accepted.to_owned() })
    };
    if !earthed.is_empty() && matches!(earth, Earth::NoEarth) {
        return refused(
            "a connection to the earth, of which there is none".to_owned(),
            "none without an earth",
        );
    }
    for (index, connection) in earthed.iter().enumerate() {
        if earthed[..index].iter().any(|other| other.end == connection.end) {
            return refused(format!("two connections at one end ({:?})", connection.end), "one for each end");
        }
        let field = format!("{field}[{index}].electrode");
        match connection.electrode {
            Electrode::Stake { length_m, diameter_m } => {
                number(&format!("{field}.length_m"), length_m, 0.1..=20.0, "m")?;
                number(&format!("{field}.diameter_m"), diameter_m, 0.001..=0.2, "m")?;
            }
            Electrode::Radials { count, length_m, diameter_m } => {
                number(&format!("{field}.count"), f64::from(count), 1.0..=64.0, "")?;
                number(&format!("{field}.length_m"), length_m, 0.5..=100.0, "m")?;
                number(&format!("{field}.diameter_m"), diameter_m, 0.000_1..=0.02, "m")?;
            }
            Electrode::Stated { resistance_ohm, reactance_ohm } => {
                number(&format!("{field}.resistance_ohm"), resistance_ohm, 0.0..=10_000.0, "Ω")?;
                number(&format!("{field}.reactance_ohm"), reactance_ohm, -10_000.0..=10_000.0, "Ω")?;
            }
        }
    }
    Ok(())
}

/// Circuits inside circuits, at most; nobody builds deeper, and a file could ask for a million.
const DEEPEST: usize = 4;
const MOST_PARTS: usize = 8;

pub(super) fn check_load(field: &str, load: &Load, wires: usize) -> Checked {
    text(&format!("{field}.name"), &load.name, 60)?;
    number(&format!("{field}.fraction"), load.fraction, 0.005..=0.995, "of the wire")?;
    if load.wire >= wires {
        return Err(PlanError::Contradiction {
            field: format!("{field}.wire"),
            value: format!("wire {}", load.wire),
            accepted: format!("0 to {}", wires.saturating_sub(1)),
        });
    }
    check_circuit(&format!("{field}.circuit"), &load.circuit, 0)
}

/// A load bridges a gap of its own: neither the feedpoint's nor that of a load before it in the list.
pub(super) fn check_load_place(plan: &Plan, index: usize) -> Checked {
    let load = &plan.loads[index];
    let arc_m = |wire: usize, fraction: f64| plan.wires.get(wire).map_or(0.0, |w| fraction * w.cut_length_m);
    let at_m = arc_m(load.wire, load.fraction);
    let feed = plan.feedpoint;
    let others = plan.loads[..index].iter().map(|other| {
        (other.wire, arc_m(other.wire, other.fraction), LOAD_GAP_M, format!("load \"{}\"", other.name))
    });
    let mut taken =
        others.chain([(feed.wire, arc_m(feed.wire, feed.fraction), feed.gap_m, "the feedpoint".to_owned())]);
    let in_it = taken.find(|(wire, other_m, gap_m, _)| {
        *wire == load.wire && (at_m - other_m).abs() < 0.5 * (LOAD_GAP_M + gap_m)
    });
    match in_it {
        None => Ok(()),
        Some((_, other_m, gap_m, what)) => Err(PlanError::Contradiction {
            field: format!("loads[{index}].fraction"),
            value: format!("{:.1} cm from {what}", 100.0 * (at_m - other_m).abs()),
            accepted: format!("{:.1} cm or more from it", 50.0 * (LOAD_GAP_M + gap_m)),
        }),
    }
}

fn check_circuit(field: &str, circuit: &Circuit, depth: usize) -> Checked {
    let quality =
        |q: &Option<f64>| q.map_or(Ok(()), |q| number(&format!("{field}.q"), q, 1.0..=100_000.0, ""));
    match circuit {
        Circuit::Resistor { resistance_ohm } => {
            number(&format!("{field}.resistance_ohm"), *resistance_ohm, 0.0..=1e6, "Ω")
        }
        Circuit::Coil { inductance_h, q } => {
            number(&format!("{field}.inductance_h"), *inductance_h, 1e-9..=1e-2, "H")?;
            quality(q)
        }
        Circuit::Capacitor { capacitance_f, q } => {
            number(&format!("{field}.capacitance_f"), *capacitance_f, 1e-14..=1e-6, "F")?;
            quality(q)
        }
        Circuit::MeasuredTrap { resonance_hz, capacitance_f, q } => {
            number(&format!("{field}.resonance_hz"), *resonance_hz, 0.5e6..=100e6, "Hz")?;
            number(&format!("{field}.capacitance_f"), *capacitance_f, 1e-13..=1e-8, "F")?;
            quality(&Some(*q))
        }
        Circuit::Series(parts) | Circuit::Parallel(parts) => {
            count(field, parts.len(), 1, MOST_PARTS)?;
            if depth == DEEPEST {
                return Err(PlanError::Contradiction {
                    field: field.to_owned(),
                    value: format!("a circuit {} levels deep", depth + 1),
                    accepted: format!("up to {DEEPEST} levels"),
                });
            }
            parts
                .iter()
                .enumerate()
                .try_for_each(|(index, part)| check_circuit(&format!("{field}[{index}]"), part, depth + 1))
        }
    }
}
