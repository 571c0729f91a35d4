//! What a structure must keep to before it is meshed.

use std::ops::RangeInclusive;

use super::error::WireError;
use super::material::{Conductor, Metal};
use super::skeleton::JOINT_TOLERANCE_M;
use super::structure::{PortPlace, Structure, WireShape};
use super::vector::{Vec3, distance, dot, lerp, nearest, sub};
use crate::constants::SPEED_OF_LIGHT_M_PER_S;

/// Shortest stretch between two vertices, m: joined vertices are up to 1 mm apart.
const SHORTEST_STRETCH_M: f64 = 2.0 * JOINT_TOLERANCE_M;
/// Largest radius, in lengths of a stretch: a segment is no shorter than the radius.
const THICKEST_OF_STRETCH: f64 = 0.25;
/// Largest radius in wavelengths: the current's change round the wire is left out.
const THICKEST_WAVELENGTHS: f64 = 0.005;
/// Least angle between stretches of a joint; below it they lie in each other far from the joint.
const LEAST_ANGLE_DEG: f64 = 3.0;
/// Least height over the mirror, in radii.
const LOWEST_RADII: f64 = 2.0;
/// Lowest frequency, Hz.
pub(super) const LOWEST_HZ: f64 = 1e5;
/// Highest frequency, Hz.
const HIGHEST_HZ: f64 = 1e8;

/// Refuses what the solver cannot take.
pub(super) fn check(structure: &Structure, highest_hz: f64) -> Result<(), WireError> {
    let (wires, ports) = (structure.wires.len(), structure.ports.len());
    if wires == 0 || ports == 0 {
        return Err(WireError::NothingToFeed { wires, ports });
    }
    in_range("highest frequency in Hz", highest_hz, LOWEST_HZ..=HIGHEST_HZ, "0.1 to 100 MHz")?;
    for (index, wire) in structure.wires.iter().enumerate() {
        check_figures(index, wire)?;
        check_stretches(index, wire, highest_hz)?;
    }
    for (port, place) in structure.ports.iter().enumerate() {
        check_port(port, place, wires)?;
    }
    let sides = Side::all(structure);
    for (index, side) in sides.iter().enumerate() {
        for other in &sides[..index] {
            check_pair(other, side)?;
        }
        if structure.boundary.connects() {
            check_height(side)?;
        }
    }
    Ok(())
}

fn in_range(
    quantity: &'static str,
    value: f64,
    range: RangeInclusive<f64>,
    accepted: &'static str,
) -> Result<(), WireError> {
    if range.contains(&value) { Ok(()) } else { Err(WireError::OutOfRange { quantity, value, accepted }) }
}

fn check_figures(index: usize, wire: &WireShape) -> Result<(), WireError> {
    let vertices = wire.vertices_m.len();
    if vertices < 2 {
        return Err(WireError::TooFewVertices { wire: index, vertices });
    }
    for &coordinate in wire.vertices_m.iter().flatten() {
        in_range("coordinate of a vertex in m", coordinate, -1e5..=1e5, "-100 to 100 km")?;
    }
    in_range("radius in m", wire.radius_m, 1e-6..=1.0, "0.000 001 to 1 m")?;
    in_range("resistance factor", wire.material.resistance_factor, 0.1..=100.0, "0.1 to 100")?;
    let conductor = |metal: &Conductor| {
        in_range("conductivity in S/m", metal.conductivity_s_per_m, 1e3..=1e9, "1e3 to 1e9 S/m")?;
        in_range("relative permeability", metal.relative_permeability, 0.1..=1e5, "0.1 to 1e5")
    };
    match &wire.material.metal {
        Metal::Perfect => {}
        Metal::Solid(metal) => conductor(metal)?,
        Metal::Clad { core, cladding, thickness_m } => {
            conductor(core)?;
            conductor(cladding)?;
            let share = thickness_m / wire.radius_m;
            in_range("cladding in radii of the wire", share, 1e-6..=0.999, "0.000 001 to 0.999")?;
        }
    }
    if let Some(cover) = &wire.material.insulation {
        in_range("permittivity of the insulation", cover.relative_permittivity, 1.0..=20.0, "1 to 20")?;
        let share = cover.outer_radius_m / wire.radius_m;
        in_range("radius over the insulation in radii of the metal", share, 1.0..=20.0, "1 to 20")?;
    }
    Ok(())
}

fn check_stretches(index: usize, wire: &WireShape, highest_hz: f64) -> Result<(), WireError> {
    let radius_m = wire.radius_m;
    for (vertex, pair) in wire.vertices_m.windows(2).enumerate() {
        let length_m = distance(pair[0], pair[1]);
        if length_m < SHORTEST_STRETCH_M {
            let shortest_m = SHORTEST_STRETCH_M;
            return Err(WireError::ZeroLength { wire: index, vertex, length_m, shortest_m });
        }
        let largest_m = THICKEST_OF_STRETCH * length_m;
        if radius_m > largest_m {
            return Err(WireError::TooThickForStretch { wire: index, vertex, radius_m, length_m, largest_m });
        }
    }
    let largest_m = THICKEST_WAVELENGTHS * SPEED_OF_LIGHT_M_PER_S / highest_hz;
    if radius_m > largest_m {
        let frequency_hz = highest_hz;
        return Err(WireError::TooThickForWavelength { wire: index, radius_m, largest_m, frequency_hz });
    }
    Ok(())
}

fn check_port(port: usize, place: &PortPlace, wires: usize) -> Result<(), WireError> {
    if place.wire >= wires {
        return Err(WireError::NoSuchWire { port, wire: place.wire, wires });
    }
    in_range("arc of a port in m", place.arc_m, -1.0..=1e6, "a place on the wire")?;
    in_range("gap of a port in m", place.gap_m, 1e-4..=1.0, "0.1 mm to 1 m")
}

/// One side of a polyline.
struct Side {
    wire: usize,
    ends_m: [Vec3; 2],
    radius_m: f64,
}

impl Side {
    fn all(structure: &Structure) -> Vec<Self> {
        let sides_of = |(wire, shape): (usize, &WireShape)| {
            let radius_m = shape.radius_m;
            shape
                .vertices_m
                .windows(2)
                .map(|pair| Self { wire, ends_m: [pair[0], pair[1]], radius_m })
                .collect::<Vec<_>>()
        };
        structure.wires.iter().enumerate().flat_map(sides_of).collect()
    }

    /// Unit vector from one of the ends along the side.
    fn outward(&self, end: usize) -> Vec3 {
        let along = sub(self.ends_m[1 - end], self.ends_m[end]);
        let length_m = dot(along, along).sqrt();
        along.map(|component| component / length_m)
    }
}

fn check_pair(a: &Side, b: &Side) -> Result<(), WireError> {
    let wires = [a.wire, b.wire];
    let mut joined = false;
    for (a_end, &a_m) in a.ends_m.iter().enumerate() {
        for (b_end, &b_m) in b.ends_m.iter().enumerate() {
            if distance(a_m, b_m) <= JOINT_TOLERANCE_M {
                joined = true;
                let angle_deg = dot(a.outward(a_end), b.outward(b_end)).clamp(-1.0, 1.0).acos().to_degrees();
                if angle_deg < LEAST_ANGLE_DEG {
                    return Err(WireError::FoldedBack { wires, angle_deg });
                }
            }
        }
    }
    let (parts, distance_m) = nearest(a.ends_m, b.ends_m);
    if !joined && distance_m < a.radius_m + b.radius_m {
        let at_m = lerp(a.ends_m[0], a.ends_m[1], parts[0]);
        return Err(WireError::TouchWithoutJoint { wires, distance_m, at_m });
    }
    Ok(())
}

fn check_height(side: &Side) -> Result<(), WireError> {
    let lowest_m = LOWEST_RADII * side.radius_m;
    let heights_m = side.ends_m.map(|end_m| end_m[2]);
    for (end, &height_m) in heights_m.iter().enumerate() {
        let grounded = height_m.abs() <= JOINT_TOLERANCE_M;
        let rises = side.outward(end)[2] >= LEAST_ANGLE_DEG.to_radians().sin();
        if height_m < lowest_m && !(grounded && rises) {
            return Err(WireError::ThroughMirror { wire: side.wire, height_m, lowest_m });
        }
    }
    Ok(())
}
