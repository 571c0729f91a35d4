//! The watts stage: carries a frequency's feedpoint impedance through a chain to the transmitter, sets the matching unit
//! and says where the watts go.

use num_complex::Complex64;
use physics::line::State;
use physics::network::{IdealTransformer, LNetwork, LProblem, NetworkError, Stress, l_network};

use super::chain::{Chain, ChainLink};
use super::judge::overstress;
use crate::plan::Transmitter;
use crate::report::{FeedReport, LinkReport, ProfilePoint, Seen, Sense, Setting, VerdictKind};
use crate::validate;

/// Places along each line of a feed at which the profile is given.
const PROFILE_STEPS: u32 = 48;

/// One frequency on its way through one feed.
#[derive(Clone, Copy)]
pub(super) struct Passage<'a> {
    pub chain: &'a Chain,
    /// Index of the frequency in the chain's lines.
    pub index: usize,
    pub frequency_hz: f64,
    pub feedpoint_ohm: Complex64,
    pub transmitter: &'a Transmitter,
    pub least_share_to_wire: f64,
}

/// The states between the links, from the feedpoint to the transmitter, and the matching unit where it is used.
struct Carried {
    states: States,
    unit: Option<UnitInUse>,
    shortfall: Option<NetworkError>,
    before_unit: Seen,
}

/// One state more than there are links. On the stack: this is made for every feed at every frequency.
struct States {
    places: [State; validate::MOST_LINKS + 1],
    links: usize,
}

impl States {
    fn at_transmitter(&self) -> State {
        self.places[self.links]
    }
}

#[derive(Clone, Copy)]
struct UnitInUse {
    setting: Setting,
    /// At the scale of `Carried::states`.
    stress: Stress,
}

impl Passage<'_> {
    pub fn report(&self) -> FeedReport {
        let carried = self.carry();
        let at_transmitter = self.seen_by_transmitter(&carried.states);
        let within = at_transmitter.swr <= self.transmitter.swr_limit;
        let given_w =
            self.transmitter.power_w * if within { 1.0 } else { accepted_share(at_transmitter.swr) };
        let scale = scale_to(&carried.states, given_w);
        let links: Vec<LinkReport> =
            (0..self.chain.links.len()).map(|link| self.link_report(&carried, link, scale)).collect();
        let watts_to_wire = carried.states.places[0].power_w() * scale * scale;
        FeedReport {
            at_feedpoint: self.at_feedpoint(),
            before_unit: carried.before_unit,
            at_transmitter,
            setting: carried.unit.map(|unit| unit.setting),
            loss_db: links.iter().map(|link| link.loss_db).sum(),
            kind: self.kind(&links, within, carried.unit.is_some(), watts_to_wire),
            links,
            watts_to_wire,
            shortfall: carried.shortfall,
        }
    }

    /// Peak voltage and current along the lines at the set power, from the feedpoint to the transmitter.
    pub fn profile(&self) -> Vec<ProfilePoint> {
        let carried = self.carry();
        let seen = self.seen_by_transmitter(&carried.states);
        let within = seen.swr <= self.transmitter.swr_limit;
        let given_w = self.transmitter.power_w * if within { 1.0 } else { accepted_share(seen.swr) };
        let scale = scale_to(&carried.states, given_w);
        let mut profile = Vec::new();
        let mut from_wire_m = 0.0;
        for (link, at_load) in self.chain.links.iter().zip(&carried.states.places) {
            let ChainLink::Line { pieces, .. } = link else { continue };
            let piece = &pieces[self.index];
            for step in 0..=PROFILE_STEPS {
                let along_m = piece.length_m() * f64::from(step) / f64::from(PROFILE_STEPS);
                let state = piece.constants().toward_source(*at_load, along_m).scaled(scale);
                profile.push(ProfilePoint {
                    from_wire_m: from_wire_m + along_m,
                    peak_v: state.voltage_v.norm(),
                    peak_a: state.current_a.norm(),
                });
            }
            from_wire_m += piece.length_m();
        }
        profile
    }

    fn carry(&self) -> Carried {
        let links = &self.chain.links;
        let mut places = [State::of_load(self.feedpoint_ohm); validate::MOST_LINKS + 1];
        for (index, link) in links.iter().enumerate() {
            places[index + 1] = self.past(link, places[index]);
        }
        let states = States { places, links: links.len() };
        let before_unit = self.seen_by_transmitter(&states);
        let mut carried = Carried { states, unit: None, shortfall: None, before_unit };
        if before_unit.swr > self.transmitter.swr_limit {
            self.set_unit(&mut carried);
        }
        carried
    }

    /// Sets the matching unit, if there is one and its range allows, and carries the rest of the chain anew.
    fn set_unit(&self, carried: &mut Carried) {
        let Some((at, parts)) = self.chain.unit() else { return };
        let problem = LProblem {
            frequency_hz: self.frequency_hz,
            load_ohm: carried.states.places[at].impedance_ohm(),
            target_ohm: self.chain.wanted_ohm(at + 1, self.transmitter.resistance_ohm),
            parts,
        };
        match l_network(&problem) {
            Ok(found) => {
                let passage = LNetwork::new(&parts, found.setting, self.frequency_hz)
                    .toward_source(carried.states.places[at]);
                carried.states.places[at + 1] = passage.at_source;
                carried.unit = Some(UnitInUse { setting: setting(found.setting), stress: passage.stress });
                for link in at + 1..self.chain.links.len() {
                    carried.states.places[link + 1] =
                        self.past(&self.chain.links[link], carried.states.places[link]);
                }
            }
            Err(error) => carried.shortfall = Some(error),
        }
    }

    /// The state on a link's other side; a matching unit lets everything through unchanged.
    fn past(&self, link: &ChainLink, at_load: State) -> State {
        match link {
            ChainLink::Transformer { impedance_ratio } => {
                IdealTransformer { impedance_ratio: *impedance_ratio }.toward_source(at_load)
            }
            ChainLink::Line { pieces, .. } => pieces[self.index].toward_source(at_load),
            ChainLink::Unit { .. } => at_load,
        }
    }

    fn at_feedpoint(&self) -> Seen {
        // A transformer at the feedpoint belongs to it: what counts is how the line after it is terminated.
        let reference_ohm = self.chain.wanted_ohm(0, self.transmitter.resistance_ohm);
        seen(State::of_load(self.feedpoint_ohm), reference_ohm)
    }

    fn seen_by_transmitter(&self, states: &States) -> Seen {
        seen(states.at_transmitter(), self.transmitter.resistance_ohm)
    }

    fn link_report(&self, carried: &Carried, link: usize, scale: f64) -> LinkReport {
        let (at_load, at_source) = (carried.states.places[link], carried.states.places[link + 1]);
        let (peak_v, peak_a) = match &self.chain.links[link] {
            ChainLink::Line { pieces, .. } => {
                let peaks = pieces[self.index].peaks_between(at_load, at_source);
                (peaks.voltage_v, peaks.current_a)
            }
            ChainLink::Unit { .. } => match carried.unit {
                Some(unit) => {
                    (unit.stress.capacitor_peak_v, unit.stress.coil_rms_a * std::f64::consts::SQRT_2)
                }
                None => larger_side(at_load, at_source),
            },
            ChainLink::Transformer { .. } => larger_side(at_load, at_source),
        };
        let reference_ohm = match &self.chain.links[link] {
            ChainLink::Line { nominal_ohm, .. } => *nominal_ohm,
            _ => self.chain.wanted_ohm(link + 1, self.transmitter.resistance_ohm),
        };
        LinkReport {
            loss_db: physics::line::loss_db(at_source, at_load),
            watts_lost: (at_source.power_w() - at_load.power_w()) * scale * scale,
            peak_v: peak_v * scale,
            rms_a: peak_a * scale * std::f64::consts::FRAC_1_SQRT_2,
            toward_transmitter: seen(at_source, reference_ohm),
        }
    }

    fn kind(&self, links: &[LinkReport], within: bool, unit_in_use: bool, watts_to_wire: f64) -> VerdictKind {
        if !within {
            VerdictKind::OutOfRange
        } else if overstress(links, self.chain).is_some() {
            VerdictKind::Overstressed
        } else if watts_to_wire < self.least_share_to_wire * self.transmitter.power_w {
            VerdictKind::TooLossy
        } else if unit_in_use {
            VerdictKind::WithMatchingUnit
        } else {
            VerdictKind::Direct
        }
    }
}

/// Share of its power that a generator gives into this standing-wave ratio on its own resistance.
fn accepted_share(swr: f64) -> f64 {
    // 1 − |Γ|² = 4·S/(S + 1)²
    if swr.is_finite() { 4.0 * swr / ((swr + 1.0) * (swr + 1.0)) } else { 0.0 }
}

/// Factor on all voltages and currents that makes the transmitter give `given_w`.
fn scale_to(states: &States, given_w: f64) -> f64 {
    let power_w = states.at_transmitter().power_w();
    if power_w > 0.0 { (given_w / power_w).sqrt() } else { 0.0 }
}

fn seen(state: State, reference_ohm: f64) -> Seen {
    Seen { z_ohm: state.impedance_ohm(), reference_ohm, swr: state.swr(reference_ohm) }
}

fn larger_side(a: State, b: State) -> (f64, f64) {
    (a.voltage_v.norm().max(b.voltage_v.norm()), a.current_a.norm().max(b.current_a.norm()))
}

fn setting(found: physics::network::Setting) -> Setting {
    let sense = match found.sense {
        physics::network::Sense::CapacitorAcrossLoad => Sense::CapacitorAtWire,
        physics::network::Sense::CapacitorAcrossSource => Sense::CapacitorAtTransmitter,
    };
    Setting { sense, inductance_h: found.inductance_h, capacitance_f: found.capacitance_f }
}
