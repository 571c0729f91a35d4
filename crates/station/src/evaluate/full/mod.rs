//! The wire solution stage with the full model: every wire of the plan, fed and loaded where the plan says.

mod answers;
mod earths;
mod proof;
mod structure;
mod trace;

use std::sync::Arc;

use num_complex::Complex64;
use physics::constants::SPEED_OF_LIGHT_M_PER_S;
use physics::earth::Soil;
use physics::field::{FarFieldSource, PotentialSource, radiated_power_w};
use physics::sweep::Sample;
use physics::wire::ports::{PortUse, attach};
use physics::wire::{Boundary, EndCurrents, Load, Returned, WireModel, port_power_w};
use rayon::prelude::*;

pub(super) use self::earths::Earths;
pub use self::proof::{Gains, Proof};

use self::answers::Answers;
use self::trace::Trace;
use super::EvaluateError;
use super::grid::Grid;
use super::wire::{BandSolution, Cut, WirePoint, WireSolution, marks, places};
use crate::catalogue;
use crate::hang::Hung;
use crate::plan::{Earth, Plan};
use crate::report::{Shares, StandingWave, WireWave};

/// A solved structure: kept as long as wires, earth and frequencies stay the same, whatever the loads do.
#[derive(Clone, Debug)]
pub(super) struct Solved {
    model: WireModel,
    /// Over soil.
    earths: Option<Arc<Earths>>,
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

/// Frequencies of a band at which shares of the watts are computed, burnt and sky; between them they are interpolated.
const BURNT_PLACES: usize = 9;
const SKY_PLACES: usize = 3;
/// Lowest height over soil, in wavelengths, for which the earth's kernels are made.
const LOWEST_WAVELENGTHS: f64 = 0.0005;
/// Places on a segment at which its mean potential is taken: beside a gap the charge varies most.
const PLACES_BESIDE_GAP: usize = 4;
const PLACES_ELSEWHERE: usize = 1;
/// Least distance between two places of known potential, as a share of the wire.
const FINEST_STEP: f64 = 0.008;

impl Solved {
    /// Solves the wires.
    ///
    /// `kept` is an earth of an earlier solution.
    pub fn new(
        plan: &Plan,
        hung: &Hung,
        grids: &[Grid],
        kept: Option<&Arc<Earths>>,
    ) -> Result<Self, EvaluateError> {
        let boundary = boundary(&plan.site.earth)?;
        let mut frequencies_hz: Vec<f64> =
            grids.iter().flat_map(|grid| grid.frequencies_hz.clone()).collect();
        frequencies_hz.sort_by(f64::total_cmp);
        frequencies_hz.dedup();
        let highest_hz = frequencies_hz.last().copied().ok_or(EvaluateError::NoFrequency)?;
        let model = WireModel::new(structure::structure(plan, hung, boundary), highest_hz)?;
        let earths = match (boundary, model.reach()) {
            (Boundary::Soil(soil), Some(reach)) => {
                high_enough(hung, frequencies_hz[0])?;
                Some(Earths::fitting(kept, soil, &reach))
            }
            _ => None,
        };
        let answers = Answers::new(&model, earths.as_deref(), &frequencies_hz)?;
        let traces = hung.wires.iter().enumerate();
        let traces =
            traces.map(|(index, wire)| Trace::new(wire, index, model.segments(), model.wire_of_segment()));
        let traces = traces.collect();
        Ok(Self { model, earths, answers, traces })
    }

    /// Tells one solution from another: where its mesh lies in memory.
    #[cfg(test)]
    pub fn identity(&self) -> *const physics::wire::Segment {
        self.model.segments().as_ptr()
    }

    /// The earth that it hangs over.
    pub fn earths(&self) -> Option<&Arc<Earths>> {
        self.earths.as_ref()
    }

    /// Number of unknown currents.
    pub fn unknowns(&self) -> usize {
        self.model.unknowns()
    }

    /// Attaches the plan's loads and answers at every frequency.
    pub fn answer(&self, plan: &Plan, hung: &Hung, grids: &[Grid]) -> Result<WireSolution, EvaluateError> {
        let loads = self.loads(plan);
        let bands = grids.par_iter().map(|grid| self.band(plan, hung, grid, &loads));
        Ok(WireSolution { bands: bands.collect::<Result<_, _>>()? })
    }

    fn loads(&self, plan: &Plan) -> Vec<Load> {
        structure::loads(plan, self.model.structure().boundary)
    }

    fn band(
        &self,
        plan: &Plan,
        hung: &Hung,
        grid: &Grid,
        loads: &[Load],
    ) -> Result<BandSolution, EvaluateError> {
        let impedances = self.answers.feedpoint(&grid.frequencies_hz, loads)?;
        let burnt = at_places(grid, BURNT_PLACES, |frequency_hz| {
            Ok(self.fed(&self.answers.sample(frequency_hz)?, loads)?.burnt_w.clamp(0.0, 1.0))
        })?;
        let sky = match self.earths {
            // Without soil what is not burnt leaves.
            None => Vec::new(),
            Some(_) => at_places(grid, SKY_PLACES, |frequency_hz| {
                let fed = self.fed(&self.answers.sample(frequency_hz)?, loads)?;
                Ok(radiated_power_w(&self.far_field(&fed)).clamp(0.0, 1.0))
            })?,
        };
        let shares = |index: usize| {
            let burnt = between(&burnt, index);
            if sky.is_empty() {
                return Shares::without_earth(burnt);
            }
            let sky = between(&sky, index).min(1.0 - burnt);
            Shares { sky, earth: 1.0 - burnt - sky, burnt }
        };
        let points = impedances
            .into_iter()
            .enumerate()
            .map(|(index, impedance_ohm)| WirePoint { impedance_ohm, shares: shares(index) })
            .collect();
        let fed = self.fed(&self.answers.sample(grid.frequencies_hz[grid.middle])?, loads)?;
        Ok(BandSolution { points, wave: self.wave(plan, hung, &fed)? })
    }

    fn far_field(&self, fed: &Fed) -> FarFieldSource {
        let boundary = self.model.structure().boundary;
        FarFieldSource::new(self.model.segments(), &fed.currents, boundary, fed.frequency_hz)
    }

    /// What the soil adds to the potentials on the wires.
    fn returned(&self, fed: &Fed) -> Result<Option<Returned<'_>>, EvaluateError> {
        let Some(earths) = &self.earths else { return Ok(None) };
        Ok(self.model.returned(&fed.currents, fed.frequency_hz, &*earths.at(fed.frequency_hz)?))
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
        // What an electrode takes heats the earth.
        let loads_end = 1 + loads.iter().take_while(|load| !matches!(load, Load::Earth { .. })).count();
        let in_loads_w: f64 = (1..loads_end)
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
    fn potentials(&self, index: usize, arc_m: &[f64], cuts: &[Cut], sources: &Potentials) -> Vec<Complex64> {
        let segments = self.model.segments();
        let Potentials { own, returned } = sources;
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
            let returned_v = returned.as_ref().map_or(Complex64::ZERO, |r| r.mean_potential_v(segment));
            let mean_v = own.mean_potential_v(&segments[segment], places) + returned_v;
            let across = cuts.iter().find(|cut| (middle_m - cut.arc_m).abs() < cut.half_width_m + half_m);
            let across = across.map(|cut| {
                let induced_v_per_m = self.traces[index].induced_v_per_m(middle_m, segments, sources);
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

    fn wave(&self, plan: &Plan, hung: &Hung, fed: &Fed) -> Result<StandingWave, EvaluateError> {
        let boundary = self.model.structure().boundary;
        let own = PotentialSource::new(self.model.segments(), &fed.currents, boundary, fed.frequency_hz);
        let sources = Potentials { own, returned: self.returned(fed)? };
        let wires = hung.wires.iter().enumerate().map(|(index, wire)| {
            let cuts = cuts(plan, hung, index);
            let arc_m = places(wire.length_m(), fed.frequency_hz, &cuts);
            let segments = self.model.segments();
            let current_a: Vec<Complex64> = arc_m
                .iter()
                .map(|&arc| self.traces[index].current_a(arc, segments, &fed.currents, fed.frequency_hz))
                .collect();
            let potential_v = self.potentials(index, &arc_m, &cuts, &sources);
            let marks = marks(&arc_m, &current_a);
            WireWave { arc_m, current_a, potential_v, marks }
        });
        Ok(StandingWave { frequency_hz: fed.frequency_hz, wires: wires.collect() })
    }
}

/// Potentials along the wires: of their own charges, and what soil gives back.
struct Potentials<'a> {
    own: PotentialSource<'a>,
    returned: Option<Returned<'a>>,
}

/// A value at a few frequencies of a grid, with their indices.
fn at_places(
    grid: &Grid,
    most: usize,
    value: impl Fn(f64) -> Result<f64, EvaluateError>,
) -> Result<Vec<(usize, f64)>, EvaluateError> {
    let last = grid.frequencies_hz.len() - 1;
    let places = last.min(most - 1);
    (0..=places)
        .map(|place| {
            let index = (place * last).checked_div(places).unwrap_or(0);
            Ok((index, value(grid.frequencies_hz[index])?))
        })
        .collect()
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
fn boundary(earth: &Earth) -> Result<Boundary, EvaluateError> {
    if matches!(earth, Earth::Mirror) {
        return Ok(Boundary::Mirror);
    }
    let soil = catalogue::earth(earth).map_err(EvaluateError::Earth)?;
    Ok(soil.map_or(Boundary::FreeSpace, |soil| {
        Boundary::Soil(Soil {
            relative_permittivity: soil.relative_permittivity,
            conductivity_s_per_m: soil.conductivity_s_per_m,
        })
    }))
}

/// Refuses wires that hang lower over soil than its kernels are made for.
fn high_enough(hung: &Hung, lowest_hz: f64) -> Result<(), EvaluateError> {
    let least_m = LOWEST_WAVELENGTHS * SPEED_OF_LIGHT_M_PER_S / lowest_hz;
    for (wire, hung) in hung.wires.iter().enumerate() {
        let height_m = hung.vertices.iter().map(|vertex| vertex.at.z_m).fold(f64::INFINITY, f64::min);
        if height_m < least_m {
            return Err(EvaluateError::TooLow { wire, height_m, least_m, megahertz: lowest_hz / 1e6 });
        }
    }
    Ok(())
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
