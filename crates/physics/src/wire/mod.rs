//! The full solver: any thin wires, joined anywhere, fed anywhere.
//!
//! The current on every [`Segment`] of the mesh is a sinusoid of the free-space wave number, given by its
//! [`EndCurrents`].

mod coupling;
mod error;
mod fill;
mod grading;
mod material;
mod mesh;
mod moments;
mod segment;
mod shapes;
mod skeleton;
mod solution;
mod structure;
mod tube;
mod vector;

pub use error::WireError;
pub use material::{Conductor, Insulation, Material, Metal};
pub use segment::{EndCurrents, Segment};
pub use solution::{Solution, WireModel};
pub use structure::{Boundary, PortPlace, Structure, WireShape};
