//! Wires seen from where a boundary's reflection arrives: a few point sources.

use std::f64::consts::TAU;

use num_complex::Complex64;

use super::reflection::Element;
use super::returned::at_nodes;
use super::segment::EndCurrents;
use super::solution::WireModel;
use crate::constants::wave_number_rad_per_m;

/// A piece of wire as a point.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct PointSource {
    /// Its place and the direction of its current.
    pub element: Element,
    /// Moment of the current, ∫ I ds, A·m peak.
    pub current_a_m: Complex64,
    /// Charge, C peak.
    pub charge_c: Complex64,
}

/// Height below which an end stands on the boundary, m.
const FOOT_M: f64 = 1e-6;

impl WireModel {
    /// The wires as few sources of what a boundary gives back; `None` for wires that were not made to hang over soil.
    ///
    /// For `currents` at the ends of segments (A peak). Potentials that vary no faster along the wires than with the distance
    /// from an image, [`super::Reflection`]'s, are the same of these as of the wires. Where a wire stands on the soil the
    /// charge that its current brings there per period is a source of its own: the one from which a current enters the
    /// soil at a point.
    #[must_use]
    pub fn point_sources(&self, currents: &[EndCurrents], frequency_hz: f64) -> Option<Vec<PointSource>> {
        let panels = self.panels()?;
        let k = wave_number_rad_per_m(frequency_hz);
        // q = −I'/jω
        let per_ampere = Complex64::new(0.0, (TAU * frequency_hz).recip());
        let at_nodes = at_nodes(panels, self.segments(), currents, k);
        let along = panels.nodes.iter().zip(at_nodes).map(|(element, [current_a_m, slope])| PointSource {
            element: *element,
            current_a_m,
            charge_c: per_ampere * k * slope,
        });
        let feet = self.segments().iter().zip(currents).flat_map(|(segment, ends)| {
            let ends = [(segment.from_m, ends.from_a), (segment.to_m, -ends.to_a)];
            ends.map(|(position_m, leaving_a)| PointSource {
                element: Element { position_m, direction: segment.direction() },
                current_a_m: Complex64::ZERO,
                charge_c: per_ampere * leaving_a,
            })
        });
        let feet =
            feet.filter(|foot| foot.element.position_m[2] < FOOT_M && foot.charge_c != Complex64::ZERO);
        Some(along.chain(feet).collect())
    }
}
