//! The feeds stage: what each link of a feed is at each frequency. It depends on the feed and the frequencies only, so
//! a change of wire, power or limit keeps it, and a change of one feed keeps the others.

use physics::line::{Coaxial, LineConstants, LineError, NominalLine, Piece, TwoWire};
use physics::network::Parts;

use super::EvaluateError;
use crate::catalogue;
use crate::plan::{Feed, LineConstruction, LineData, Link, MatchingUnit};

/// One feed, resolved at every frequency of the grid.
#[derive(Clone, Debug)]
pub(super) struct Chain {
    /// From the feedpoint to the transmitter.
    pub links: Vec<ChainLink>,
    /// Names for screens and sheets, in the same order.
    pub names: Vec<String>,
}

/// One link at every frequency.
#[derive(Clone, Debug)]
pub(super) enum ChainLink {
    Transformer { impedance_ratio: f64 },
    Line { pieces: Vec<Piece>, nominal_ohm: f64, rating_peak_v: Option<f64> },
    Unit { parts: Parts, rating_peak_v: Option<f64> },
}

impl Chain {
    pub fn new(index: usize, feed: &Feed, frequencies_hz: &[f64]) -> Result<Self, EvaluateError> {
        let mut links = Vec::with_capacity(feed.links.len());
        let mut names = Vec::with_capacity(feed.links.len());
        for (number, link) in feed.links.iter().enumerate() {
            let (resolved, name) =
                match link {
                    Link::Transformer(t) => (
                        ChainLink::Transformer { impedance_ratio: t.impedance_ratio },
                        format!("transformer {}:1", crate::units::short(t.impedance_ratio)),
                    ),
                    Link::Line(piece) => {
                        let data = catalogue::line(&piece.line).map_err(|source| {
                            EvaluateError::Catalogue { feed: index, link: number, source }
                        })?;
                        let line = resolve_line(data, piece.length_m, frequencies_hz)
                            .map_err(|source| EvaluateError::Line { feed: index, link: number, source })?;
                        (line, data.name.clone())
                    }
                    Link::MatchingUnit(unit) => (
                        ChainLink::Unit { parts: parts(unit), rating_peak_v: unit.rating_peak_v },
                        "matching unit".to_owned(),
                    ),
                };
            links.push(resolved);
            names.push(name);
        }
        Ok(Self { links, names })
    }

    /// The resistance that the links from `first` on want to see at their wire's side, Ω: the nominal impedance of the
    /// next line, transformed by what stands before it, or the transmitter's resistance.
    pub fn wanted_ohm(&self, first: usize, transmitter_ohm: f64) -> f64 {
        let mut ratio = 1.0;
        for link in &self.links[first..] {
            match link {
                ChainLink::Transformer { impedance_ratio } => ratio *= impedance_ratio,
                ChainLink::Line { nominal_ohm, .. } => return ratio * nominal_ohm,
                ChainLink::Unit { .. } => return ratio * transmitter_ohm,
            }
        }
        ratio * transmitter_ohm
    }

    /// Index of the matching unit.
    pub fn unit(&self) -> Option<(usize, Parts)> {
        self.links.iter().enumerate().find_map(|(index, link)| match link {
            ChainLink::Unit { parts, .. } => Some((index, *parts)),
            _ => None,
        })
    }
}

fn parts(unit: &MatchingUnit) -> Parts {
    Parts {
        inductance_max_h: unit.inductance_max_h,
        capacitance_max_f: unit.capacitance_max_f,
        coil_q: unit.coil_q,
        capacitor_q: unit.capacitor_q,
    }
}

fn resolve_line(data: &LineData, length_m: f64, frequencies_hz: &[f64]) -> Result<ChainLink, LineError> {
    let line = Constants::of(data);
    let pieces = frequencies_hz
        .iter()
        .map(|&frequency_hz| Ok(Piece::new(line.at(frequency_hz)?, length_m)))
        .collect::<Result<Vec<_>, LineError>>()?;
    Ok(ChainLink::Line { pieces, nominal_ohm: line.nominal_ohm()?, rating_peak_v: data.rating_peak_v })
}

/// The physics behind a line's figures.
enum Constants {
    Nominal(NominalLine),
    TwoWire(TwoWire),
    Coaxial(Coaxial),
}

impl Constants {
    fn of(data: &LineData) -> Self {
        match data.construction {
            LineConstruction::Published { z0_ohm, velocity_factor, loss } => Self::Nominal(NominalLine {
                z0_ohm,
                velocity_factor,
                loss: physics::line::LossLaw {
                    k1_db_per_100m: loss.k1_db_per_100m,
                    k2_db_per_100m: loss.k2_db_per_100m,
                },
            }),
            LineConstruction::TwoWire {
                wire_diameter_m,
                spacing_m,
                conductivity_s_per_m,
                velocity_factor,
                loss_tangent,
            } => Self::TwoWire(TwoWire {
                wire_diameter_m,
                spacing_m,
                conductivity_s_per_m,
                velocity_factor,
                loss_tangent,
            }),
            LineConstruction::Coaxial {
                inner_diameter_m,
                outer_diameter_m,
                conductivity_s_per_m,
                relative_permittivity,
                loss_tangent,
            } => Self::Coaxial(Coaxial {
                inner_diameter_m,
                outer_diameter_m,
                conductivity_s_per_m,
                relative_permittivity,
                loss_tangent,
            }),
        }
    }

    fn at(&self, frequency_hz: f64) -> Result<LineConstants, LineError> {
        match self {
            Self::Nominal(line) => line.constants(frequency_hz),
            Self::TwoWire(line) => line.constants(frequency_hz),
            Self::Coaxial(line) => line.constants(frequency_hz),
        }
    }

    fn nominal_ohm(&self) -> Result<f64, LineError> {
        match self {
            Self::Nominal(line) => Ok(line.z0_ohm),
            Self::TwoWire(line) => line.lossless_z0_ohm(),
            Self::Coaxial(line) => line.lossless_z0_ohm(),
        }
    }
}
