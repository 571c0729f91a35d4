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

use super::half_space::HalfSpace;
use super::spectrum::GroundKernels;
use crate::wire::{Element, Kernel, Reflection};

/// What the earth adds to e^(−jk0R)/R between two elements above it.
///
/// `kernels` belong to their horizontal distance and the sum of their heights; the result has the kernels' unit (1/m
/// for the solver: S times k0).
#[must_use]
pub fn coupling(test: &Element, source: &Element, kernels: &GroundKernels) -> Kernel {
    let (t, s) = (test.direction, source.direction);
    let apart = [0, 1].map(|axis| test.position_m[axis] - source.position_m[axis]);
    let square = apart[0] * apart[0] + apart[1] * apart[1];
    // Straight above each other S_w is nothing, and no direction is needed.
    let inverse = if square > 0.0 { square.sqrt().recip() } else { 0.0 };
    let along = |direction: [f64; 3]| (direction[0] * apart[0] + direction[1] * apart[1]) * inverse;
    let level = t[0] * s[0] + t[1] * s[1];
    // t·K·s, with K_zx = d·S_w and K_xz = −d·S_w
    let current = level * kernels.horizontal
        + t[2] * s[2] * kernels.vertical
        + (t[2] * along(s) - along(t) * s[2]) * kernels.cross;
    Kernel { current, charge: kernels.charge }
}

/// All that the earth gives back.
impl Reflection for HalfSpace {
    fn kernels(&self, test: &Element, sources: &[Element], kernels: &mut [Kernel]) {
        in_chunks(test, sources, kernels, |rho_m, zeta_m, out| self.kernels(rho_m, zeta_m, out));
    }
}

/// An earth without its images in static fields, for a solver that adds those itself.
#[derive(Clone, Copy)]
pub struct WithoutImages<'a>(pub &'a HalfSpace);

impl Reflection for WithoutImages<'_> {
    fn kernels(&self, test: &Element, sources: &[Element], kernels: &mut [Kernel]) {
        in_chunks(test, sources, kernels, |rho_m, zeta_m, out| self.0.remainders(rho_m, zeta_m, out));
    }
}

/// Elements at a time.
const CHUNK: usize = 64;

#[inline(always)]
fn in_chunks(
    test: &Element,
    sources: &[Element],
    kernels: &mut [Kernel],
    fill: impl Fn(&[f64], &[f64], &mut [GroundKernels]),
) {
    let (mut rho_m, mut zeta_m) = ([0.0; CHUNK], [0.0; CHUNK]);
    let mut ground = [GroundKernels::default(); CHUNK];
    let [x, y, z] = test.position_m;
    for (sources, kernels) in sources.chunks(CHUNK).zip(kernels.chunks_mut(CHUNK)) {
        let count = sources.len();
        for (source, (rho, zeta)) in sources.iter().zip(rho_m.iter_mut().zip(&mut zeta_m)) {
            let [u, v, w] = source.position_m;
            (*rho, *zeta) = (((x - u) * (x - u) + (y - v) * (y - v)).sqrt(), z + w);
        }
        fill(&rho_m[..count], &zeta_m[..count], &mut ground[..count]);
        for ((source, kernel), ground) in sources.iter().zip(kernels).zip(&ground) {
            *kernel = coupling(test, source, ground);
        }
    }
}
