//! What the solver is given: wires in space, their metal, and where they are fed.

use num_complex::Complex64;

use super::material::Material;
use crate::sinusoid::Mirror;

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
    /// Soil below z = 0, roughly: the mirror's images, weighted with the reflection coefficient of a wave from straight
    /// above. Of a horizontal half wave over average soil, Z is off by 1 % at 0.3 λ height, by a tenth at 0.1 λ; upright
    /// and low wires are rougher.
    Soil {
        /// Relative permittivity, ≥ 1.
        relative_permittivity: f64,
        /// Conductivity, S/m, ≥ 0.
        conductivity_s_per_m: f64,
    },
}

impl Boundary {
    /// Whether something below reflects.
    pub(crate) fn has_images(self) -> bool {
        self != Self::FreeSpace
    }

    /// What is given back of an image's part: 1 by the mirror.
    pub(crate) fn reflected(self, frequency_hz: f64) -> Complex64 {
        match self {
            Self::FreeSpace | Self::Mirror => Complex64::ONE,
            Self::Soil { relative_permittivity, conductivity_s_per_m } => {
                -Mirror::Soil { relative_permittivity, conductivity_s_per_m }.reflection(frequency_hz)
            }
        }
    }
}
