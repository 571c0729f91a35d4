//! A part as a ray: what it adds to the normalised impedance or admittance grows along a straight line.

use std::f64::consts::TAU;

use num_complex::Complex64;

use super::{Part, PartRating, PartRole, Range, UnitProblem};
use crate::network::TwoPort;

/// What a part is.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Kind {
    /// This many equal coils in a row.
    Coil {
        count: u8,
    },
    Capacitor,
}

/// Where a part stands.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Place {
    Series,
    Across,
}

/// How far along its ray a value stands.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
enum Law {
    /// size = scale·value: a coil in series, a capacitor across.
    Growing,
    /// size = scale/value: a capacitor in series, a coil across.
    Falling,
}

/// Largest normalised size: a part of value zero where zero would be an open or a short.
const LARGEST: f64 = 1e9;

/// A part of the unit: it adds size·direction to the impedance (in series) or admittance (across), on the
/// target as reference.
#[derive(Clone, Copy, Debug)]
pub(super) struct Element {
    pub role: PartRole,
    pub kind: Kind,
    pub place: Place,
    /// 1/Q ± j.
    pub direction: Complex64,
    pub range: Range,
    pub rating: PartRating,
    law: Law,
    scale: f64,
    reference_ohm: f64,
}

impl Element {
    pub fn new(role: PartRole, kind: Kind, place: Place, part: &Part, problem: &UnitProblem) -> Self {
        let omega = TAU * problem.frequency_hz;
        let r = problem.target_ohm;
        let q = part.q.recip();
        // Z of a coil is ωL·(1/Q + j), Y of a capacitor ωC·(1/Q + j); the inverse of either is
        // (1/Q − j)/(size·(1 + 1/Q²)).
        let (per_value, count) = match kind {
            Kind::Coil { count } => (omega / r, f64::from(count)),
            Kind::Capacitor => (omega * r, 1.0),
        };
        let (law, scale, sign) = match (kind, place) {
            (Kind::Coil { .. }, Place::Series) | (Kind::Capacitor, Place::Across) => {
                (Law::Growing, per_value * count, 1.0)
            }
            _ => (Law::Falling, (per_value * count * (1.0 + q * q)).recip(), -1.0),
        };
        Self {
            role,
            kind,
            place,
            direction: Complex64::new(q, sign),
            range: part.range,
            rating: part.rating,
            law,
            scale,
            reference_ohm: r,
        }
    }

    pub fn size_of(&self, value: f64) -> f64 {
        match self.law {
            Law::Growing => self.scale * value,
            Law::Falling => (self.scale / value).min(LARGEST),
        }
    }

    pub fn value_of(&self, size: f64) -> f64 {
        match self.law {
            Law::Growing => size / self.scale,
            Law::Falling => self.scale / size,
        }
    }

    /// Smallest and largest size.
    pub fn limits(&self) -> [f64; 2] {
        let [a, b] = [self.range.lowest(), self.range.highest()].map(|value| self.size_of(value));
        [a.min(b), a.max(b)]
    }

    /// The smallest size there is that is not below this one.
    pub fn at_least(&self, size: f64) -> Option<f64> {
        let value = self.value_of(size);
        let value = match self.law {
            Law::Growing => self.range.at_least(value),
            Law::Falling => self.range.at_most(value),
        };
        value.map(|value| self.size_of(value))
    }

    /// The largest size there is that is not above this one.
    pub fn at_most(&self, size: f64) -> Option<f64> {
        let value = self.value_of(size);
        let value = match self.law {
            Law::Growing => self.range.at_most(value),
            Law::Falling => self.range.at_least(value),
        };
        value.map(|value| self.size_of(value))
    }

    /// The part at a size, as a two-port in ohms.
    pub fn two_port(&self, size: f64) -> TwoPort {
        match self.place {
            Place::Series => TwoPort::series(self.direction * (size * self.reference_ohm)),
            Place::Across => TwoPort::shunt(self.direction * (size / self.reference_ohm)),
        }
    }
}
