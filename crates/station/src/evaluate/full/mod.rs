//! The wire solution stage with the full model: every wire of the plan, fed and loaded where the plan says.

mod answers;
mod proof;
mod structure;
mod trace;

use num_complex::Complex64;
use physics::field::PotentialSource;
use physics::sweep::Sample;
use physics::wire::ports::{PortUse, attach};
use physics::wire::{Boundary, EndCurrents, Load, WireModel, port_power_w};
use rayon::prelude::*;

pub use self::proof::{Gains, Proof};

use self::answers::Answers;
use self::trace::Trace;
use super::EvaluateError;
use super::grid::Grid;
use super::wire::{BandSolution, Cut, WirePoint, WireSolution, marks, places};
use crate::catalogue;
use crate::hang::Hung;
use crate::plan::{Earth, Plan};
use crate::report::{StandingWave, WireWave};

/// A solved structure: kept as long as wires, earth and frequencies stay the same, whatever the loads do.
#[derive(Clone, Debug)]
pub(super) struct Solved {
    model: WireModel,
    answers: Answers,
    traces: Vec<Trace>,
}

/// The wires at one frequency with everything attached, for 1 W at the feedpoint.
struct Fed {
    frequency_hz: f64,
    currents: Vec<EndCurrents>,
    /// Watts of the one that metal and loads burn.
    burnt_w: f64,
}

/// Frequencies of a band at which the burnt share is computed; between them it is interpolated.
const EFFICIENCY_PLACES: usize = 9;
/// Places on a segment at which its mean potential is taken: beside a gap the charge varies most.
const PLACES_BESIDE_GAP: usize = 4;
const PLACES_ELSEWHERE: usize = 1;
/// Least distance between two places of known potential, as a share of the wire.
const FINEST_STEP: f64 = 0.008;

impl Solved {
    /// Solves the wires.
    pub fn new(plan: &Plan, hung: &Hung, boundary: Boundary, grids: &[Grid]) -> Result<Self, EvaluateError> {
        let mut frequencies_hz: Vec<f64> =
            grids.iter().flat_map(|grid| grid.frequencies_hz.clone()).collect();
        frequencies_hz.sort_by(f64::total_cmp);
        frequencies_hz.dedup();
        let highest_hz = frequencies_hz.last().copied().ok_or(EvaluateError::NoFrequency)?;
        let model = WireModel::new(structure::structure(plan, hung, boundary), highest_hz)?;
        let answers = Answers::new(&model, &frequencies_hz)?;
        let traces = hung.wires.iter().enumerate();
        let traces =
            traces.map(|(index, wire)| Trace::new(wire, index, model.segments(), model.wire_of_segment()));
        let traces = traces.collect();
        Ok(Self { model, answers, traces })
    }

    /// Tells one solution from another: where its mesh lies in memory.
    #[cfg(test)]
    pub fn identity(&self) -> *const physics::wire::Segment {
        self.model.segments().as_ptr()
    }

    /// Number of unknown currents.
    pub fn unknowns(&self) -> usize {
        self.model.unknowns()
    }

    /// Attaches the plan's loads and answers at every frequency.
    pub fn answer(&self, plan: &Plan, hung: &Hung, grids: &[Grid]) -> Result<WireSolution, EvaluateError> {
        let loads = structure::loads(plan);
        let bands = grids.par_iter().map(|grid| self.band(plan, hung, grid, &loads));
        Ok(WireSolution { bands: bands.collect::<Result<_, _>>()? })
    }

    fn band(
        &self,
        plan: &Plan,
        hung: &Hung,
        grid: &Grid,
        loads: &[Load],
    ) -> Result<BandSolution, EvaluateError> {
        let impedances = self.answers.feedpoint(&grid.frequencies_hz, loads)?;
        let efficiency = self.efficiency(grid, loads)?;
        let points = impedances
            .into_iter()
            .enumerate()
            .map(|(index, impedance_ohm)| WirePoint {
                impedance_ohm,
                wire_efficiency: between(&efficiency, index),
            })
            .collect();
        let fed = self.fed(&self.answers.sample(grid.frequencies_hz[grid.middle])?, loads)?;
        Ok(BandSolution { points, wave: self.wave(plan, hung, &fed) })
    }

    /// Share of the watts that metal and loads leave, at a few indices of the grid.
    fn efficiency(&self, grid: &Grid, loads: &[Load]) -> Result<Vec<(usize, f64)>, EvaluateError> {
        let last = grid.frequencies_hz.len() - 1;
        let places = last.min(EFFICIENCY_PLACES - 1);
        (0..=places)
            .map(|place| {
                let index = (place * last).checked_div(places).unwrap_or(0);
                let fed = self.fed(&self.answers.sample(grid.frequencies_hz[index])?, loads)?;
                Ok((index, (1.0 - fed.burnt_w).clamp(0.0, 1.0)))
            })
            .collect()
    }

    fn fed(&self, sample: &Sample, loads: &[Load]) -> Result<Fed, EvaluateError> {
        let frequency_hz = sample.frequency_hz;
        let loaded = attach(&sample.admittance_s, &uses(loads, frequency_hz), frequency_hz)?;
        let admittance_s = loaded.admittance_s[(0, 0)];
        // ½·|V|²·Re Y = 1 W
        let volt = (2.0 / admittance_s.re).sqrt();
        let voltages: Vec<Complex64> =
            loaded.voltage_ratio.column(0).iter().map(|ratio| ratio * volt).collect();
        let currents = self.model.end_currents(&sample.currents_a_per_v, &voltages);
        let in_metal_w: f64 = self.model.wire_loss_w(&currents, frequency_hz).iter().sum();
        let in_loads_w: f64 = (1..voltages.len())
            .map(|port| {
                let into: Complex64 =
                    sample.admittance_s.row(port).iter().zip(&voltages).map(|(y, v)| y * v).sum();
                // Power that leaves the wires through a port is the load's.
                -port_power_w(voltages[port], into)
            })
            .sum();
        Ok(Fed { frequency_hz, currents, burnt_w: in_metal_w + in_loads_w })
    }

    /// Potential along a wire; indicative.
    ///
    /// At a single place it ripples with the mesh; its mean over a segment does not, for that is what the solver's
    /// equations hold. So the means stand at the segments' middles, and straight lines between them; none crosses a gap.
    /// The two places at a gap carry the potential continued to its middle as along metal: there it jumps by the voltage.
    fn potentials(&self, index: usize, arc_m: &[f64], cuts: &[Cut], fed: &Fed) -> Vec<Complex64> {
        let (segments, boundary) = (self.model.segments(), self.model.structure().boundary);
        let source = PotentialSource::new(segments, &fed.currents, boundary, fed.frequency_hz);
        let in_gap = self.model.port_of_segment();
        // The mesh is far finer at ends and gaps than a picture needs.
        let apart_m = arc_m.last().copied().unwrap_or(0.0) * FINEST_STEP;
        let mut last_m = f64::NEG_INFINITY;
        let mut means = Vec::with_capacity(arc_m.len());
        for (segment, middle_m) in self.traces[index].middles() {
            let half_m = 0.51 * segments[segment].length_m();
            let beside_gap = cuts.iter().any(|cut| (middle_m - cut.arc_m).abs() < cut.half_width_m + half_m);
            if in_gap[segment].is_some() || (middle_m - last_m < apart_m && !beside_gap) {
                continue;
            }
            let places = if beside_gap { PLACES_BESIDE_GAP } else { PLACES_ELSEWHERE };
            let mean_v = source.mean_potential_v(&segments[segment], places);
            let across = cuts.iter().find(|cut| (middle_m - cut.arc_m).abs() < cut.half_width_m + half_m);
            let across = across.map(|cut| {
                let induced_v_per_m = self.traces[index].induced_v_per_m(middle_m, segments, &source);
                let edge_m = cut.arc_m + cut.half_width_m.copysign(middle_m - cut.arc_m);
                (edge_m, mean_v + induced_v_per_m * (middle_m - cut.arc_m))
            });
            means.push((middle_m, mean_v));
            means.extend(across);
            last_m = middle_m;
        }
        means.sort_by(|a, b| a.0.total_cmp(&b.0));
        arc_m.iter().map(|&arc| between_cuts(&means, cuts, arc)).collect()
    }

    fn wave(&self, plan: &Plan, hung: &Hung, fed: &Fed) -> StandingWave {
        let wires = hung.wires.iter().enumerate().map(|(index, wire)| {
            let cuts = cuts(plan, hung, index);
            let arc_m = places(wire.length_m(), fed.frequency_hz, &cuts);
            let segments = self.model.segments();
            let current_a: Vec<Complex64> = arc_m
                .iter()
                .map(|&arc| self.traces[index].current_a(arc, segments, &fed.currents, fed.frequency_hz))
                .collect();
            let potential_v = self.potentials(index, &arc_m, &cuts, fed);
            let marks = marks(&arc_m, &current_a);
            WireWave { arc_m, current_a, potential_v, marks }
        });
        StandingWave { frequency_hz: fed.frequency_hz, wires: wires.collect() }
    }
}

/// Straight lines through the known places on one side of every cut; beyond the outermost the nearest counts.
fn between_cuts(known: &[(f64, Complex64)], cuts: &[Cut], arc_m: f64) -> Complex64 {
    let same_side = |at: f64| cuts.iter().all(|cut| (at < cut.arc_m) == (arc_m < cut.arc_m));
    let next = known.partition_point(|&(at, _)| at < arc_m);
    let right = known.get(next).filter(|(at, _)| same_side(*at));
    let left = next.checked_sub(1).and_then(|before| known.get(before)).filter(|(at, _)| same_side(*at));
    match (left, right) {
        (Some(&(x0, v0)), Some(&(x1, v1))) => v0 + (v1 - v0) * ((arc_m - x0) / (x1 - x0)),
        (Some(&(_, value)), None) | (None, Some(&(_, value))) => value,
        (None, None) => Complex64::ZERO,
    }
}

/// What the plan's earth is to the solver.
pub(super) fn boundary(earth: &Earth) -> Result<Boundary, EvaluateError> {
    if matches!(earth, Earth::Mirror) {
        return Ok(Boundary::Mirror);
    }
    let soil = catalogue::earth(earth).map_err(EvaluateError::Earth)?;
    Ok(soil.map_or(Boundary::FreeSpace, |soil| Boundary::Soil {
        relative_permittivity: soil.relative_permittivity,
        conductivity_s_per_m: soil.conductivity_s_per_m,
    }))
}

/// The feedpoint is fed, every other port closed with its load.
fn uses(loads: &[Load], frequency_hz: f64) -> Vec<PortUse> {
    let closed = loads.iter().map(|load| PortUse::Closed(load.termination(frequency_hz)));
    std::iter::once(PortUse::Fed).chain(closed).collect()
}

/// Where a wire is cut: the feedpoint and the loads on it.
fn cuts(plan: &Plan, hung: &Hung, wire: usize) -> Vec<Cut> {
    let mut cuts = Vec::new();
    if hung.feedpoint.wire == wire {
        cuts.push(Cut { arc_m: hung.feedpoint.arc_m, half_width_m: 0.5 * plan.feedpoint.gap_m });
    }
    let length_m = hung.wires[wire].length_m();
    let loads = plan.loads.iter().filter(|load| load.wire == wire);
    cuts.extend(loads.map(|load| Cut { arc_m: load.fraction * length_m, half_width_m: 0.01 }));
    cuts
}

/// Linear interpolation over the indices of a grid.
fn between(known: &[(usize, f64)], index: usize) -> f64 {
    let next = known.partition_point(|&(at, _)| at < index);
    match (next.checked_sub(1).map(|before| known[before]), known.get(next)) {
        (_, Some(&(at, value))) if at == index => value,
        (Some((left, low)), Some(&(right, high))) => {
            low + (high - low) * (index - left) as f64 / (right - left) as f64
        }
        (Some((_, value)), None) | (None, Some(&(_, value))) => value,
        (None, None) => 1.0,
    }
}
