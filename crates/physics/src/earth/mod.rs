//! A homogeneous lossy earth below z = 0, for wires above it.
//!
//! Mixed potentials in formulation C of Michalski & Zheng (IEEE Trans. AP-38, 1990; from memory, derived anew in
//! [`dyad`]): one scalar potential for charges of currents in any direction. Four functions of the horizontal distance
//! ρ and of the sum ζ = z + z′ of both heights say everything. With all lengths in 1/k0:
//!
//! ```text
//! u0 = √(λ² − 1),  u1 = √(λ² − ε),  ε = εr − jσ/(ωε0)
//! Gh = (u0 − u1)/(u0 + u1),  Ge = (u1 − ε·u0)/(u1 + ε·u0),  W = (Gh − Ge)/λ²
//! S_h = ∫ Gh·J0(λρ)·e^(−u0ζ)·λ/u0 dλ                   S_f = ∫ (Ge + W)·J0(λρ)·e^(−u0ζ)·λ/u0 dλ
//! S_z = ∫ (Gh − 2Ge − W)·J0(λρ)·e^(−u0ζ)·λ/u0 dλ        S_w = −∫ W·J1(λρ)·e^(−u0ζ)·λ² dλ
//! ```
//!
//! They stand beside e^(−jR)/R of the source itself: −1 times it (S_h, S_f) or +1 times it (S_z) over a perfect ground.

pub mod dyad;
mod electrode;
mod error;
mod exact;
mod fresnel;
mod half_space;
mod lateral;
mod lattice;
mod soil;
mod spectrum;
mod table;

pub use dyad::WithoutImages;
pub use electrode::Electrode;
pub use error::EarthError;
pub use exact::exact_kernels;
pub use fresnel::{Fresnel, fresnel};
pub use half_space::{HalfSpace, Reach};
pub use soil::Soil;
pub use spectrum::{GroundKernels, StaticWeights};
