//! Transmission lines: constants from published figures or from geometry, voltage and current
//! anywhere on a lossy line, power and loss.
//!
//! # Conventions
//!
//! * Phasors are peak values; the current flows toward the load.
//! * Distances are counted from the load toward the source.
//! * Γ is the voltage reflection coefficient on a **real** reference, so a passive load has |Γ| ≤ 1.
//!   A line with loss has a complex Z₀; power is always ½·Re(V·I*), never taken from Γ.
//!
//! The line equations are those of any text on transmission lines (from memory).

mod condition;
mod constants;
mod fit;
mod geometry;
mod piece;
mod reflection;
mod state;

pub use condition::{AverageRating, SpacerEffect, Spacers, Wetness};
pub use constants::{LineConstants, LineError, NominalLine};
pub use fit::{AttenuationPoint, FitError, LossLaw};
pub use geometry::{Coaxial, TwoWire};
pub use piece::{Peaks, Piece};
pub use reflection::{
    additional_loss_db, gamma_of_impedance, gamma_size_of_swr, impedance_of_gamma, swr_of_gamma,
};
pub use state::{State, loss_db};
