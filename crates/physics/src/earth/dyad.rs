//! From the four functions to the coupling of two pieces of wire.
//!
//! How the signs come about, with all lengths in 1/k0, `jk` for ∂/∂x of one plane wave along x and common factors left
//! out. A horizontal dipole's reflected wave is Gh·e^(−u0ζ)/u0 in A_x and jk·W·e^(−u0ζ) in A_z; by Lorenz' condition the
//! potential of its charges is Gh − u0²W = Ge + W, and E_x is reflected with Ge as it must be:
//! Gh − λ²(Ge + W) = (1 − λ²)Ge. A vertical dipole's is −Ge in A_z with Ge as the potential of its charges. Formulation C
//! gives its charges Ge + W too and makes the same field of it: −∇∂z′ of the W added to the potential is taken from A,
//! which leaves A_z = −Ge + u0²W = Gh − 2Ge − W and A_x = −jk·u0·W. With u0·W·jk ↔ ∂/∂x ∫ W·J0·e^(−u0ζ)·λ dλ =
//! (x − x′)/ρ·S_w:
//!
//! ```text
//! K_zx = (x − x′)/ρ·S_w,   K_xz = −(x − x′)/ρ·S_w
//! ```
//!
//! which is the same with both ends exchanged: the matrix is symmetric.

use super::spectrum::GroundKernels;
use crate::wire::{Element, Kernel};

/// What the earth adds to e^(−jk0R)/R between two elements above it.
///
/// `kernels` belong to their horizontal distance and the sum of their heights; the result has the kernels' unit (1/m
/// for the solver: S times k0).
#[must_use]
pub fn coupling(test: &Element, source: &Element, kernels: &GroundKernels) -> Kernel {
    let (t, s) = (test.direction, source.direction);
    let apart: [f64; 2] = std::array::from_fn(|axis| test.position_m[axis] - source.position_m[axis]);
    let rho = apart[0].hypot(apart[1]);
    // Straight above each other S_w is nothing, and no direction is needed.
    let unit = if rho > 0.0 { apart.map(|part| part / rho) } else { [0.0; 2] };
    let (along_t, along_s) = (t[0] * unit[0] + t[1] * unit[1], s[0] * unit[0] + s[1] * unit[1]);
    let level = t[0] * s[0] + t[1] * s[1];
    // t·K·s, with K_zx = d·S_w and K_xz = −d·S_w
    let current = level * kernels.horizontal
        + t[2] * s[2] * kernels.vertical
        + (t[2] * along_s - along_t * s[2]) * kernels.cross;
    Kernel { current, charge: kernels.charge }
}
