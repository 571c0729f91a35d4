//! Pure computation for HF wires, feed lines and matching.
//!
//! The bottom of the house: no files, no threads, no clock, no screen, and nothing of the other
//! crates. Every function is a formula of the field with its source beside it.
//!
//! # Conventions
//!
//! * Time dependence exp(+jωt): an inductance has a positive reactance, an outgoing wave is
//!   exp(−jkr)/r.
//! * Phasors are **peak** values; power is ½·Re(V·I*).
//! * SI units throughout (metres, hertz, ohms, siemens per metre); names carry the unit.
//! * z points up and the earth is the plane z = 0.

pub mod conductor;
pub mod constants;
pub mod earth;
pub mod field;
pub mod insulator;
pub mod line;
pub mod network;
pub mod sinusoid;
pub mod special;
pub mod sweep;
pub mod wire;
