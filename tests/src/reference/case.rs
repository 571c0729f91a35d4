//! The layout of the case files, and the plan that a case makes.

use std::f64::consts::TAU;

use serde::Deserialize;
use station::plan::{
    Band, BandRange, Circuit, ConductorChoice, ConductorData, Core, Earth, Feed, Feedpoint, Load, PathPoint,
    Plan, Point, Site, Soil, Transmitter, Wire,
};

/// A file of cases.
#[derive(Debug, Deserialize)]
pub struct Cases {
    /// In the file's order.
    pub cases: Vec<Case>,
}

/// One case.
#[derive(Debug, Deserialize)]
pub struct Case {
    /// For instance "S01".
    pub id: String,
    /// What it is.
    pub description: String,
    /// Hz.
    pub frequency_hz: f64,
    /// Polylines.
    pub wires: Vec<CaseWire>,
    /// Where it is fed.
    pub feed: CaseFeed,
    /// Lumped loads.
    pub loads: Vec<CaseLoad>,
    /// What lies below.
    pub earth: CaseEarth,
    /// What the independent method found.
    pub reference: Reference,
}

/// A polyline of wire.
#[derive(Debug, Deserialize)]
pub struct CaseWire {
    vertices_m: Vec<[f64; 3]>,
    radius_m: f64,
    conductor: CaseConductor,
}

#[derive(Debug, Deserialize)]
#[serde(tag = "type", rename_all = "lowercase")]
#[allow(non_snake_case)] // The file's own names.
enum CaseConductor {
    Pec,
    Solid {
        sigma_S_per_m: f64,
        mu_r: f64,
    },
    Clad {
        core_sigma_S_per_m: f64,
        core_mu_r: f64,
        clad_sigma_S_per_m: f64,
        clad_mu_r: f64,
        clad_thickness_m: f64,
    },
}

/// Where a case is fed.
#[derive(Debug, Deserialize)]
pub struct CaseFeed {
    wire: usize,
    arc_fraction: f64,
    gap_m: f64,
}

/// A lumped series impedance at the case's frequency.
#[derive(Debug, Deserialize)]
#[allow(non_snake_case)] // The file's own names.
pub struct CaseLoad {
    wire: usize,
    arc_fraction: f64,
    R_ohm: f64,
    X_ohm: f64,
}

/// What lies below.
#[derive(Debug, Deserialize)]
#[serde(tag = "kind", rename_all = "lowercase")]
pub enum CaseEarth {
    /// Free space.
    None,
    /// Perfect ground.
    Mirror,
    /// A homogeneous half-space.
    Soil {
        /// Relative permittivity.
        relative_permittivity: f64,
        /// S/m.
        conductivity_s_per_m: f64,
    },
}

/// What the independent method found.
#[derive(Debug, Deserialize)]
pub struct Reference {
    /// Ω.
    pub r_ohm: f64,
    /// Ω.
    pub x_ohm: f64,
    /// Watts to the sky over watts at the feed.
    pub efficiency: f64,
    /// The same without an earth, Ω; of cases over soil.
    pub free_space_r_ohm: Option<f64>,
    /// Ω.
    pub free_space_x_ohm: Option<f64>,
    /// dBi; not of all cases.
    pub peak_gain_dbi: Option<f64>,
    /// Gains in directions.
    pub gain_samples_dbi: Vec<Gain>,
}

/// Gain in a direction.
#[derive(Debug, Deserialize)]
pub struct Gain {
    /// From the horizontal, degrees.
    pub elevation_deg: f64,
    /// From +x, degrees.
    pub azimuth_deg: f64,
    /// dBi.
    pub gain_dbi: f64,
}

/// Stands for a perfect conductor.
const PERFECT_S_PER_M: f64 = 1e14;

impl Case {
    /// The plan that this case makes: free points, one channel, no feed line.
    #[must_use]
    pub fn plan(&self) -> Plan {
        Plan {
            name: self.id.clone(),
            purpose: self.description.clone(),
            call_sign: String::new(),
            edition: String::new(),
            site: Site { supports: Vec::new(), earth: self.earth(), entrance: Point::new(0.0, 0.0, 1.0) },
            wires: self.wires.iter().enumerate().map(|(index, wire)| wire.wire(index)).collect(),
            feedpoint: Feedpoint {
                wire: self.feed.wire,
                fraction: self.feed.arc_fraction,
                gap_m: self.feed.gap_m,
            },
            loads: self.loads.iter().map(|load| load.load(self.frequency_hz)).collect(),
            feeds: vec![Feed { name: "direct".to_owned(), links: Vec::new() }],
            bands: vec![Band {
                name: "case".to_owned(),
                range: BandRange::Channels { frequencies_hz: vec![self.frequency_hz] },
            }],
            transmitter: Transmitter { power_w: 1.0, resistance_ohm: 50.0, swr_limit: 2.0 },
            least_share_to_wire: 0.5,
        }
    }

    fn earth(&self) -> Earth {
        match self.earth {
            CaseEarth::None => Earth::NoEarth,
            CaseEarth::Mirror => Earth::Mirror,
            CaseEarth::Soil { relative_permittivity, conductivity_s_per_m } => {
                Earth::Own(Soil { relative_permittivity, conductivity_s_per_m })
            }
        }
    }
}

impl CaseWire {
    fn wire(&self, index: usize) -> Wire {
        let points: Vec<Point> = self.vertices_m.iter().map(|&[x, y, z]| Point::new(x, y, z)).collect();
        Wire {
            name: format!("wire {}", index + 1),
            start_m: 0.0,
            cut_length_m: points.windows(2).map(|pair| pair[0].distance_m(pair[1])).sum(),
            path: points.into_iter().map(PathPoint::Free).collect(),
            conductor: ConductorChoice::Own(self.conductor.data(2.0 * self.radius_m)),
            earthed: Vec::new(),
        }
    }
}

impl CaseConductor {
    fn data(&self, diameter_m: f64) -> ConductorData {
        let (conductivity_s_per_m, relative_permeability, core) = match *self {
            Self::Pec => (PERFECT_S_PER_M, 1.0, None),
            Self::Solid { sigma_S_per_m, mu_r } => (sigma_S_per_m, mu_r, None),
            Self::Clad { core_sigma_S_per_m, core_mu_r, clad_sigma_S_per_m, clad_mu_r, clad_thickness_m } => {
                let core = Core {
                    diameter_m: diameter_m - 2.0 * clad_thickness_m,
                    conductivity_s_per_m: core_sigma_S_per_m,
                    relative_permeability: core_mu_r,
                };
                (clad_sigma_S_per_m, clad_mu_r, Some(core))
            }
        };
        ConductorData {
            name: "case".to_owned(),
            diameter_m,
            conductivity_s_per_m,
            stranding_factor: 1.0,
            relative_permeability,
            core,
            insulation: None,
            source: "reference case".to_owned(),
        }
    }
}

impl CaseLoad {
    /// Resistance in series with the coil or capacitor that has this reactance at the frequency.
    fn load(&self, frequency_hz: f64) -> Load {
        let omega = TAU * frequency_hz;
        let mut parts = vec![Circuit::Resistor { resistance_ohm: self.R_ohm }];
        if self.X_ohm > 0.0 {
            parts.push(Circuit::Coil { inductance_h: self.X_ohm / omega, q: None });
        } else if self.X_ohm < 0.0 {
            parts.push(Circuit::Capacitor { capacitance_f: -1.0 / (omega * self.X_ohm), q: None });
        }
        Load {
            name: "load".to_owned(),
            wire: self.wire,
            fraction: self.arc_fraction,
            circuit: Circuit::Series(parts),
        }
    }
}
