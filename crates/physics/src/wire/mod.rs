//! The full solver: any thin wires, joined anywhere, fed anywhere.
//!
//! A [`Structure`] made ready is a [`WireModel`]; it gives a [`Solution`] per frequency: the admittances between the
//! ports and the currents. Loads are attached to the ports afterwards ([`ports::attach`]), so a load that changes solves
//! nothing again.
//!
//! # Method
//!
//! The current on every [`Segment`] of the mesh is a sinusoid of the free-space wave number, given by its
//! [`EndCurrents`]; expansion and testing functions are the same pairs of sinusoids across a node (piecewise-sinusoidal
//! Galerkin: Schelkunoff & Friis, "Antennas: Theory and Practice", 1952; Richmond, 1974; from memory). At a joint of n
//! arms there are n − 1 of them, so Kirchhoff's law holds by construction. The matrix is that of the mixed potentials:
//! Z = jωµ0/4π·∫∫ I·I′·G + 1/(jωε0·4π)·∫∫ (dI/ds)(dI′/ds′)·G, symmetric block by block and without fields that are
//! singular at corners.
//!
//! The kernel G = e^(−jkR)/R is split: its static part 1/R between near segments is integrated once for each mesh, on a
//! straight line exactly for currents on the surface of the tubes; the remainder and everything far goes through two
//! Gauss points per segment at every frequency.
//!
//! # Range and accuracy
//!
//! Wires thin against the wavelength (radius at most 0.005 λ) and against the distance between wires (no proximity
//! effect); current only along the wire. Against reference cases of another method: 0.02 % of |Z| in the mean, 0.1 % at
//! worst. [`WireModel::refined`] and [`mesh_error`] tell the error of the mesh at hand.

mod check;
mod coupling;
mod error;
mod factors;
mod fill;
mod grading;
pub(crate) mod lanes;
#[cfg(test)]
mod laws;
mod load;
mod material;
mod mesh;
mod moments;
mod panels;
mod point_source;
pub mod ports;
mod power;
mod reflection;
mod returned;
mod segment;
mod shapes;
mod shares;
mod skeleton;
mod solution;
mod structure;
mod symmetric;
mod tube;
mod vector;

pub use error::WireError;
pub use load::{Load, Termination};
pub use material::{Conductor, Insulation, Material, Metal};
pub(crate) use point_source::{PointSource, point_sources};
pub use power::{port_power_w, segment_loss_w};
pub use reflection::{Element, Kernel, Reflection};
pub use returned::Returned;
pub use segment::{EndCurrents, Segment};
pub use solution::{Solution, WireModel, mesh_error};
pub use structure::{Boundary, PortPlace, Structure, WireShape};
