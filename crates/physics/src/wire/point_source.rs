//! Wires seen from where a boundary's reflection arrives: a few point sources.

use std::f64::consts::TAU;

use num_complex::Complex64;

use super::panels::Panels;
use super::reflection::Element;
use super::returned::at_nodes;
use super::segment::{EndCurrents, Segment};
use crate::constants::{SPEED_OF_LIGHT_M_PER_S, wave_number_rad_per_m};

/// A piece of wire as a point.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(crate) struct PointSource {
    /// Its place and the direction of its current.
    pub element: Element,
    /// Moment of the current, ∫ I ds, A·m peak.
    pub current_a_m: Complex64,
    /// Charge, C peak.
    pub charge_c: Complex64,
}

/// Height below which an end stands on the boundary, m.
const FOOT_M: f64 = 1e-6;

/// Wires as few sources of what a boundary gives back, for currents at the ends of segments (A peak).
///
/// Potentials that vary no faster along the wires than with the distance from an image, [`super::Reflection`]'s, are the
/// same of these as of the wires. Where a wire stands on the boundary the charge that its current brings there is a source
/// of its own: the one from which a current enters the earth at a point.
pub(crate) fn point_sources(
    segments: &[Segment],
    currents: &[EndCurrents],
    frequency_hz: f64,
) -> Vec<PointSource> {
    let panels = Panels::new(segments, SPEED_OF_LIGHT_M_PER_S / frequency_hz);
    let k = wave_number_rad_per_m(frequency_hz);
    // q = −I'/jω
    let per_ampere = Complex64::new(0.0, (TAU * frequency_hz).recip());
    let at_nodes = at_nodes(&panels, segments, currents, k);
    let along = panels.nodes.iter().zip(at_nodes).map(|(element, [current_a_m, slope])| PointSource {
        element: *element,
        current_a_m,
        charge_c: per_ampere * k * slope,
    });
    let feet = segments.iter().zip(currents).flat_map(|(segment, ends)| {
        let ends = [(segment.from_m, ends.from_a), (segment.to_m, -ends.to_a)];
        ends.map(|(position_m, leaving_a)| PointSource {
            element: Element { position_m, direction: segment.direction() },
            current_a_m: Complex64::ZERO,
            charge_c: per_ampere * leaving_a,
        })
    });
    let feet = feet.filter(|foot| foot.element.position_m[2] < FOOT_M && foot.charge_c != Complex64::ZERO);
    along.chain(feet).collect()
}
