//! Straight pieces of wire and the sinusoids of current on them.

use num_complex::Complex64;

use crate::constants::wave_number_rad_per_m;

/// A straight piece of round wire, from one node of the mesh to the next.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Segment {
    /// Beginning of the axis, m.
    pub from_m: [f64; 3],
    /// End of the axis, m.
    pub to_m: [f64; 3],
    /// Radius of the metal, m, > 0.
    pub radius_m: f64,
}

impl Segment {
    /// Length of the axis, m.
    #[must_use]
    pub fn length_m(&self) -> f64 {
        let [x, y, z] = self.span_m();
        (x * x + y * y + z * z).sqrt()
    }

    /// Unit vector from beginning to end.
    #[must_use]
    pub fn direction(&self) -> [f64; 3] {
        let length_m = self.length_m();
        self.span_m().map(|component_m| component_m / length_m)
    }

    fn span_m(&self) -> [f64; 3] {
        std::array::from_fn(|axis| self.to_m[axis] - self.from_m[axis])
    }
}

/// Currents at the two ends of a segment, A, peak phasors, positive from its beginning to its end.
///
/// Between the ends the current is the sinusoid of the free-space wave number k that has these values there.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct EndCurrents {
    /// Current at the segment's beginning, A.
    pub from_a: Complex64,
    /// Current at the segment's end, A.
    pub to_a: Complex64,
}

impl EndCurrents {
    /// Current `along_m` metres from the segment's beginning, A.
    #[must_use]
    pub fn current_a(&self, segment: &Segment, frequency_hz: f64, along_m: f64) -> Complex64 {
        // I(s) = [I₁·sin k(L − s) + I₂·sin ks]/sin kL
        let k = wave_number_rad_per_m(frequency_hz);
        let length_m = segment.length_m();
        let (from, to) = ((k * (length_m - along_m)).sin(), (k * along_m).sin());
        (self.from_a * from + self.to_a * to) / (k * length_m).sin()
    }

    /// Charge per metre `along_m` metres from the segment's beginning, C/m.
    #[must_use]
    pub fn charge_c_per_m(&self, segment: &Segment, frequency_hz: f64, along_m: f64) -> Complex64 {
        // q = −I'/(jω),   I'(s) = k·[I₂·cos ks − I₁·cos k(L − s)]/sin kL
        let k = wave_number_rad_per_m(frequency_hz);
        let length_m = segment.length_m();
        let (from, to) = ((k * (length_m - along_m)).cos(), (k * along_m).cos());
        let slope = k * (self.to_a * to - self.from_a * from) / (k * length_m).sin();
        Complex64::i() * slope / (std::f64::consts::TAU * frequency_hz)
    }
}
