//! The site: supports, earth, and where the feed line enters the station.

use serde::{Deserialize, Serialize};

/// A point in space, metres; z up, earth at z = 0.
#[derive(Clone, Copy, Debug, PartialEq, Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct Point {
    /// To the east unless the site says otherwise.
    pub x_m: f64,
    /// To the north unless the site says otherwise.
    pub y_m: f64,
    /// Height over the earth.
    pub z_m: f64,
}

impl Point {
    /// A point from its coordinates in metres.
    #[must_use]
    pub fn new(x_m: f64, y_m: f64, z_m: f64) -> Self {
        Self { x_m, y_m, z_m }
    }

    /// Straight distance to another point, m.
    #[must_use]
    pub fn distance_m(self, other: Self) -> f64 {
        let (dx, dy, dz) = (other.x_m - self.x_m, other.y_m - self.y_m, other.z_m - self.z_m);
        (dx * dx + dy * dy + dz * dz).sqrt()
    }

    /// The point a share of the way to another one: 0 here, 1 there.
    #[must_use]
    pub fn toward(self, other: Self, share: f64) -> Self {
        Self {
            x_m: self.x_m + share * (other.x_m - self.x_m),
            y_m: self.y_m + share * (other.y_m - self.y_m),
            z_m: self.z_m + share * (other.z_m - self.z_m),
        }
    }
}

/// Everything that stands on the ground.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct Site {
    /// Masts, trees and buildings that can hold a wire.
    pub supports: Vec<Support>,
    /// What the wire hangs over.
    pub earth: Earth,
    /// Where the feed line enters the station.
    pub entrance: Point,
}

/// Something that can hold a wire up.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct Support {
    /// Wires refer to it by this name, so each name stands once.
    pub name: String,
    /// What it is.
    pub kind: SupportKind,
    /// Its foot, m.
    pub foot: Point,
    /// Its height above the foot, m.
    pub height_m: f64,
}

/// What a support is.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Serialize, Deserialize)]
#[allow(missing_docs)] // The words say it.
pub enum SupportKind {
    Mast,
    Tree,
    Building,
}

/// What lies under the wire.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
pub enum Earth {
    /// No earth at all: free space, for comparison.
    NoEarth,
    /// Perfect ground, for comparison.
    Mirror,
    /// A soil of the catalogue, by its id.
    Catalogue(String),
    /// The user's own figures.
    Own(Soil),
}

/// A homogeneous lossy half-space.
#[derive(Clone, Copy, Debug, PartialEq, Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct Soil {
    /// Permittivity relative to vacuum.
    pub relative_permittivity: f64,
    /// Conductivity, S/m.
    pub conductivity_s_per_m: f64,
}
