//! From hung wires to what the solver is given.

use num_complex::Complex64;
use physics::earth::Electrode;
use physics::wire::{
    Boundary, Conductor, Insulation, Load, Material, Metal, PortPlace, Structure, WireShape,
};

use super::trace::coordinates;
use crate::hang::Hung;
use crate::plan::{self, Circuit, ConductorData, LOAD_GAP_M, Plan};

/// Wires and ports: the feedpoint is port 0, the loads follow in the plan's order.
pub(super) fn structure(plan: &Plan, hung: &Hung, boundary: Boundary) -> Structure {
    let wires = hung.wires.iter().map(|wire| WireShape {
        vertices_m: wire.vertices.iter().map(|vertex| coordinates(vertex.at)).collect(),
        radius_m: 0.5 * wire.conductor.diameter_m,
        material: material(&wire.conductor),
    });
    let feed =
        PortPlace { wire: hung.feedpoint.wire, arc_m: hung.feedpoint.arc_m, gap_m: plan.feedpoint.gap_m };
    let loads = plan.loads.iter().map(|load| PortPlace {
        wire: load.wire,
        arc_m: load.fraction * hung.wires[load.wire].length_m(),
        gap_m: LOAD_GAP_M,
    });
    let leads = hung.leads.iter().map(|lead| {
        let top = coordinates(lead.top);
        WireShape {
            vertices_m: vec![top, [top[0], top[1], 0.0]],
            radius_m: 0.5 * hung.wires[lead.wire].conductor.diameter_m,
            material: material(&hung.wires[lead.wire].conductor),
        }
    });
    // Each electrode is a port at the foot of its lead.
    let electrodes = hung.leads.iter().enumerate().map(|(index, lead)| PortPlace {
        wire: hung.wires.len() + index,
        arc_m: lead.top.z_m,
        gap_m: LOAD_GAP_M,
    });
    Structure {
        wires: wires.chain(leads).collect(),
        ports: std::iter::once(feed).chain(loads).chain(electrodes).collect(),
        boundary,
    }
}

/// Above this conductivity (S/m) a metal is taken as perfect: no metal comes near it, comparison cases ask for it.
const PERFECT_S_PER_M: f64 = 1e12;

fn material(data: &ConductorData) -> Material {
    let outer = Conductor {
        conductivity_s_per_m: data.conductivity_s_per_m,
        relative_permeability: data.relative_permeability,
    };
    let metal = match data.core {
        _ if data.conductivity_s_per_m > PERFECT_S_PER_M => Metal::Perfect,
        None => Metal::Solid(outer),
        Some(core) => Metal::Clad {
            core: Conductor {
                conductivity_s_per_m: core.conductivity_s_per_m,
                relative_permeability: core.relative_permeability,
            },
            cladding: outer,
            thickness_m: 0.5 * (data.diameter_m - core.diameter_m),
        },
    };
    let insulation = data.insulation.map(|cover| Insulation {
        outer_radius_m: 0.5 * cover.outer_diameter_m,
        relative_permittivity: cover.relative_permittivity,
    });
    Material { metal, resistance_factor: data.stranding_factor, insulation }
}

/// The solver's loads, in the order of their ports: the plan's own, then the electrodes of its earth connections.
pub(super) fn loads(plan: &Plan, boundary: Boundary) -> Vec<Load> {
    let own = plan.loads.iter().map(|load| lumped(&load.circuit));
    let connections = plan.wires.iter().flat_map(|wire| &wire.earthed);
    own.chain(connections.map(|connection| earthing(&connection.electrode, boundary))).collect()
}

fn earthing(electrode: &plan::Electrode, boundary: Boundary) -> Load {
    let electrode = match *electrode {
        plan::Electrode::Stake { length_m, diameter_m } => {
            Electrode::Stake { length_m, radius_m: 0.5 * diameter_m }
        }
        plan::Electrode::Radials { count, length_m, diameter_m } => {
            Electrode::Radials { count, length_m, radius_m: 0.5 * diameter_m }
        }
        plan::Electrode::Stated { resistance_ohm, reactance_ohm } => {
            Electrode::Stated(Complex64::new(resistance_ohm, reactance_ohm))
        }
    };
    match boundary {
        Boundary::Soil(soil) => Load::Earth { electrode, soil },
        // A mirror opposes nothing.
        Boundary::Mirror | Boundary::FreeSpace => Load::Series(Vec::new()),
    }
}

fn lumped(circuit: &Circuit) -> Load {
    let lossless = |q: &Option<f64>| q.unwrap_or(f64::INFINITY);
    match circuit {
        Circuit::Resistor { resistance_ohm } => Load::Resistor { ohm: *resistance_ohm },
        Circuit::Coil { inductance_h, q } => Load::Coil { henry: *inductance_h, q: lossless(q) },
        Circuit::Capacitor { capacitance_f, q } => Load::Capacitor { farad: *capacitance_f, q: lossless(q) },
        Circuit::MeasuredTrap { resonance_hz, capacitance_f, q } => {
            Load::measured_trap(*resonance_hz, *capacitance_f, *q)
        }
        Circuit::Series(parts) => Load::Series(parts.iter().map(lumped).collect()),
        Circuit::Parallel(parts) => Load::Parallel(parts.iter().map(lumped).collect()),
    }
}
