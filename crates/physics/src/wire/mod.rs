//! The full solver: any thin wires, joined anywhere, fed anywhere.
//!
//! The current on every [`Segment`] of the mesh is a sinusoid of the free-space wave number, given by its
//! [`EndCurrents`].

mod check;
mod coupling;
mod error;
mod factors;
mod fill;
mod grading;
mod lanes;
#[cfg(test)]
mod laws;
mod load;
mod material;
mod mesh;
mod moments;
pub mod ports;
mod power;
mod reflection;
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
pub use power::{port_power_w, segment_loss_w};
pub use reflection::{Element, Kernel, Reflection};
pub use segment::{EndCurrents, Segment};
pub use solution::{Solution, WireModel, mesh_error};
pub use structure::{Boundary, PortPlace, Structure, WireShape};
