//! What the solver is given: wires in space, their metal, and where they are fed.

use super::material::Material;
use crate::earth::Soil;

/// Wires, ports and what lies below them.
#[derive(Clone, Debug, PartialEq)]
pub struct Structure {
    /// The wires. Vertices of any wires within 1 mm of each other are joined: currents there obey Kirchhoff's law.
    pub wires: Vec<WireShape>,
    /// Places where something is connected: feedpoint, loads, chokes.
    pub ports: Vec<PortPlace>,
    /// What lies below.
    pub boundary: Boundary,
}

/// One wire: a polyline of round wire.
#[derive(Clone, Debug, PartialEq)]
pub struct WireShape {
    /// Vertices of the axis, m; two or more.
    pub vertices_m: Vec<[f64; 3]>,
    /// Radius of the metal, m, > 0.
    pub radius_m: f64,
    /// Metal and insulation.
    pub material: Material,
}

/// A port: a gap in a wire with a uniform field along the wire.
///
/// One volt at the port is a field of 1/gap_m along gap_m of wire, following it through a bend, and drives current
/// from the wire's first vertex toward its last. Where a gap would reach beyond a joined end of its wire it is moved
/// to lie within it.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct PortPlace {
    /// Index of the wire.
    pub wire: usize,
    /// Middle of the gap, m of arc from the wire's first vertex.
    pub arc_m: f64,
    /// Width of the gap, m of arc, > 0. It acts as a small capacitance across the port.
    pub gap_m: f64,
}

/// What lies below the wires.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Boundary {
    /// Nothing: free space.
    FreeSpace,
    /// A perfectly conducting plane at z = 0. A wire that ends on it is connected to it.
    Mirror,
    /// Soil below z = 0, exact for wires above it. A wire that ends on it is connected to it as to a mirror: what the
    /// earth under its end opposes to the current is for a load at that end to say.
    Soil(Soil),
}

impl Boundary {
    /// Whether a wire that ends on z = 0 is connected to what lies below.
    pub(crate) fn connects(self) -> bool {
        self != Self::FreeSpace
    }
}
