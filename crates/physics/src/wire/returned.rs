//! The potentials that a boundary gives back along the wires.

use std::f64::consts::TAU;

use num_complex::Complex64;

use super::panels::Panels;
use super::reflection::{Kernel, Reflection};
use super::segment::{EndCurrents, Segment};
use super::shapes::Shapes;
use super::solution::WireModel;
use crate::constants::{VACUUM_PERMEABILITY_H_PER_M, VACUUM_PERMITTIVITY_F_PER_M, wave_number_rad_per_m};

/// What a boundary adds to the potentials on the wires, beside those of the wires' own charges and currents in free space
/// ([`crate::field::PotentialSource`]).
#[derive(Clone, Debug)]
pub struct Returned<'a> {
    panels: &'a Panels,
    /// Scalar potential at the nodes, V peak.
    potential_v: Vec<Complex64>,
    /// jωA along the wire at the nodes, V/m peak.
    induced_v_per_m: Vec<Complex64>,
}

impl WireModel {
    /// What a boundary gives back of currents at the ends of segments (A peak); `None` for wires that were not made to hang
    /// over one.
    #[must_use]
    pub fn returned(
        &self,
        currents: &[EndCurrents],
        frequency_hz: f64,
        reflection: &dyn Reflection,
    ) -> Option<Returned<'_>> {
        let panels = self.panels()?;
        let k = wave_number_rad_per_m(frequency_hz);
        let at_nodes = at_nodes(panels, self.segments(), currents, k);
        // q = −I'/jω;  Φ = ∫ q·K/4πε₀,  jωA = jωµ₀/4π·∫ I·K
        let charge =
            Complex64::new(0.0, k / (TAU * frequency_hz)) / (2.0 * TAU * VACUUM_PERMITTIVITY_F_PER_M);
        let induced = Complex64::new(0.0, 0.5 * frequency_hz * VACUUM_PERMEABILITY_H_PER_M);
        let mut kernels = vec![Kernel::default(); panels.nodes.len()];
        let mut returned = Returned {
            panels,
            potential_v: Vec::with_capacity(kernels.len()),
            induced_v_per_m: Vec::with_capacity(kernels.len()),
        };
        for test in &panels.nodes {
            reflection.kernels(test, &panels.nodes, &mut kernels);
            let [mut potential, mut along] = [Complex64::ZERO; 2];
            for (kernel, [current, slope]) in kernels.iter().zip(&at_nodes) {
                potential += kernel.charge * slope;
                along += kernel.current * current;
            }
            returned.potential_v.push(charge * potential);
            returned.induced_v_per_m.push(induced * along);
        }
        Some(returned)
    }
}

/// ∫ I·L ds and ∫ k⁻¹·I'·L ds of each node, A·m.
pub(super) fn at_nodes(
    panels: &Panels,
    segments: &[Segment],
    currents: &[EndCurrents],
    k: f64,
) -> Vec<[Complex64; 2]> {
    let mut at_nodes = vec![[Complex64::ZERO; 2]; panels.nodes.len()];
    for (index, (segment, ends)) in segments.iter().zip(currents).enumerate() {
        let shapes = Shapes::new(k, segment.length_m());
        for span in panels.spans(index) {
            let weights = span.weights(&shapes);
            for node in 0..span.nodes {
                let [current, slope] = &mut at_nodes[span.first_node + node];
                *current += ends.from_a * weights.current_m[0][node] + ends.to_a * weights.current_m[1][node];
                *slope += ends.from_a * weights.slope_m[0][node] + ends.to_a * weights.slope_m[1][node];
            }
        }
    }
    at_nodes
}

impl Returned<'_> {
    /// Mean of the scalar potential over a segment, V peak; segments as [`WireModel::segments`].
    #[must_use]
    pub fn mean_potential_v(&self, segment: usize) -> Complex64 {
        self.mean(segment, &self.potential_v)
    }

    /// Mean of jωA over a segment, from its beginning to its end, V/m peak.
    #[must_use]
    pub fn mean_induced_v_per_m(&self, segment: usize) -> Complex64 {
        self.mean(segment, &self.induced_v_per_m)
    }

    fn mean(&self, segment: usize, at_nodes: &[Complex64]) -> Complex64 {
        let spans = self.panels.spans(segment).iter();
        spans.flat_map(|span| span.shares().map(|(node, share)| share * at_nodes[node])).sum()
    }
}
