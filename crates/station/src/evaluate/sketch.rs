//! The wire solution stage with the sketch model: feedpoint impedance at every frequency and one standing wave a band.

use num_complex::Complex64;
use physics::conductor::{InsulatedWire, Surroundings};
use physics::sinusoid::{
    self, BandTerms, FeedpointAnswer, Image, ImageDirection, Mirror, Sketch, SketchWire,
};

use super::EvaluateError;
use super::grid::Grid;
use super::wire::{BandSolution, Cut, WirePoint, WireSolution, places};
use crate::catalogue;
use crate::hang::{Hung, HungWire};
use crate::plan::{ConductorData, Earth};
use crate::report::{Mark, MarkKind, Shares, StandingWave, WireWave};

pub(super) fn solve(hung: &Hung, earth: &Earth, grids: &[Grid]) -> Result<WireSolution, EvaluateError> {
    let wire = hung.feedpoint.wire;
    let failed = |source| EvaluateError::Wire { wire, source };
    let sketch = Sketch::new(sketch_wire(hung, earth)?).map_err(failed)?;
    let bands = grids.iter().map(|grid| solve_band(hung, &sketch, grid).map_err(failed));
    Ok(WireSolution { bands: bands.collect::<Result<_, _>>()? })
}

fn solve_band(hung: &Hung, sketch: &Sketch, grid: &Grid) -> Result<BandSolution, sinusoid::SketchError> {
    let terms = BandTerms::new(sketch, grid.low_hz(), grid.high_hz())?;
    let answers: Vec<_> = grid.frequencies_hz.iter().map(|&f| sketch.answer(&terms.at(f))).collect();
    let wave = standing_wave(hung, sketch, &answers[grid.middle], grid.frequencies_hz[grid.middle]);
    let point = |answer: &FeedpointAnswer| WirePoint {
        impedance_ohm: answer.impedance_ohm,
        shares: Shares::without_earth(1.0 - answer.wire_efficiency),
    };
    Ok(BandSolution { points: answers.iter().map(point).collect(), wave })
}

fn sketch_wire(hung: &Hung, earth: &Earth) -> Result<SketchWire, EvaluateError> {
    let wire = &hung.wires[hung.feedpoint.wire];
    let data = &wire.conductor;
    Ok(SketchWire {
        arm_a_m: hung.feedpoint.arc_m,
        arm_b_m: wire.length_m() - hung.feedpoint.arc_m,
        radius_m: 0.5 * data.diameter_m,
        velocity_factor: velocity_factor(data, wire.length_m()),
        conductivity_s_per_m: data.conductivity_s_per_m,
        resistance_factor: data.stranding_factor,
        image: mirror(earth)?.map(|mirror| Image {
            height_m: mean_height_m(wire),
            direction: direction(wire),
            mirror,
        }),
    })
}

fn velocity_factor(data: &ConductorData, length_m: f64) -> f64 {
    data.insulation.map_or(1.0, |insulation| {
        InsulatedWire {
            metal_diameter_m: data.diameter_m,
            outer_diameter_m: insulation.outer_diameter_m,
            relative_permittivity: insulation.relative_permittivity,
        }
        .velocity_factor(Surroundings::Free { length_m })
    })
}

fn mirror(earth: &Earth) -> Result<Option<Mirror>, EvaluateError> {
    if matches!(earth, Earth::Mirror) {
        return Ok(Some(Mirror::Perfect));
    }
    let soil = catalogue::earth(earth).map_err(EvaluateError::Earth)?;
    Ok(soil.map(|soil| Mirror::Soil {
        relative_permittivity: soil.relative_permittivity,
        conductivity_s_per_m: soil.conductivity_s_per_m,
    }))
}

/// Height of the wire averaged over its length, m.
pub(super) fn mean_height_m(wire: &HungWire) -> f64 {
    let pairs = wire.vertices.windows(2);
    let area: f64 = pairs.map(|p| 0.5 * (p[0].at.z_m + p[1].at.z_m) * (p[1].arc_m - p[0].arc_m)).sum();
    area / wire.length_m()
}

/// A wire that rises more than it runs counts as upright.
fn direction(wire: &HungWire) -> ImageDirection {
    let pairs = wire.vertices.windows(2);
    let rise_m: f64 = pairs.map(|p| (p[1].at.z_m - p[0].at.z_m).abs()).sum();
    if rise_m > 0.5 * std::f64::consts::SQRT_2 * wire.length_m() {
        ImageDirection::Vertical
    } else {
        ImageDirection::Horizontal
    }
}

/// The wave on the fed wire; the sketch sees no current on the others.
fn standing_wave(hung: &Hung, sketch: &Sketch, answer: &FeedpointAnswer, frequency_hz: f64) -> StandingWave {
    let wires = hung.wires.iter().enumerate().map(|(index, wire)| {
        if index == hung.feedpoint.wire {
            fed_wave(sketch, answer, frequency_hz)
        } else {
            still(wire.length_m())
        }
    });
    StandingWave { frequency_hz, wires: wires.collect() }
}

fn fed_wave(sketch: &Sketch, answer: &FeedpointAnswer, frequency_hz: f64) -> WireWave {
    let length_m = sketch.length_m();
    let cut = Cut { arc_m: sketch.wire().arm_a_m, half_width_m: 1e-9 * length_m };
    let arc_m = places(length_m, frequency_hz, &[cut]);
    let points = sketch.standing_wave(answer, &arc_m);
    let marks = sketch.marks(answer).into_iter().map(|mark| Mark {
        arc_m: mark.arc_m,
        kind: match mark.kind {
            sinusoid::MarkKind::CurrentLoop => MarkKind::CurrentLoop,
            sinusoid::MarkKind::CurrentNode => MarkKind::CurrentNode,
        },
    });
    WireWave {
        current_a: points.iter().map(|point| point.current_a).collect(),
        potential_v: points.iter().map(|point| point.potential_v).collect(),
        marks: marks.collect(),
        arc_m,
    }
}

fn still(length_m: f64) -> WireWave {
    let zero = vec![Complex64::ZERO; 2];
    WireWave { arc_m: vec![0.0, length_m], current_a: zero.clone(), potential_v: zero, marks: Vec::new() }
}
