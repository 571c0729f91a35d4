//! The full solver: any thin wires, joined anywhere, fed anywhere.
//!
//! The current on every [`Segment`] of the mesh is a sinusoid of the free-space wave number, given by its
//! [`EndCurrents`].

mod segment;

pub use segment::{EndCurrents, Segment};
