//! Lengths of segments: short where charge crowds, long elsewhere.
//!
//! The wanted length grows in proportion to the distance from the nearest end, bend, joint or gap, so that neighbours
//! differ by a fixed ratio: h(x) = h₀ + ln(growth)·x. A stretch is divided so that every segment holds the same part
//! of ∫dx/h.

/// How fine a mesh is.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) struct Fineness {
    /// Shortest segment at open ends, in radii of the wire.
    pub end_radii: f64,
    /// Shortest segment at bends and joints, in radii of the wire.
    pub bend_radii: f64,
    /// Segments in a port's gap.
    pub per_gap: f64,
    /// Ratio of the lengths of neighbours, at most.
    pub growth: f64,
    /// Segments per wavelength, at least.
    pub per_wavelength: f64,
}

impl Fineness {
    /// The mesh of every answer.
    pub const WORKING: Self =
        Self { end_radii: 2.0, bend_radii: 2.0, per_gap: 4.0, growth: 2.5, per_wavelength: 12.0 };

    /// Rate at which the wanted length grows with distance.
    pub fn slope(&self) -> f64 {
        self.growth.ln()
    }

    /// h₀ that makes the first segment `shortest_m` long.
    pub fn start_m(&self, shortest_m: f64) -> f64 {
        // ∫dx/(h₀ + αx) = 1 over the first segment: its length is h₀·(growth − 1)/α
        shortest_m * self.slope() / (self.growth - 1.0)
    }
}

/// Wanted segment lengths along one straight stretch.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) struct Wanted {
    /// Length of the stretch, m.
    pub length_m: f64,
    /// Wanted lengths at its two ends, m.
    pub at_ends_m: [f64; 2],
    /// Wanted length far from both, m.
    pub longest_m: f64,
    /// Growth of the wanted length with distance.
    pub slope: f64,
}

impl Wanted {
    /// Nodes from 0 to 1 along the stretch, both included.
    pub fn nodes(&self) -> Vec<f64> {
        let whole = self.count_to(self.length_m);
        // Rounding must not add a segment to a stretch that holds a whole number of them.
        let segments = (whole - 1e-6).ceil().max(1.0);
        let mut nodes = vec![0.0];
        let mut index = 1.0;
        while index < segments {
            nodes.push(self.place_of(whole * index / segments) / self.length_m);
            index += 1.0;
        }
        nodes.push(1.0);
        nodes
    }

    /// Ends of the rising, level and falling parts: 0 ≤ rise ≤ fall ≤ length.
    fn zones(&self) -> (f64, f64) {
        let [from, to] = self.at_ends_m.map(|h| h.min(self.longest_m));
        let rise = (self.longest_m - from) / self.slope;
        let fall = self.length_m - (self.longest_m - to) / self.slope;
        if rise <= fall {
            return (rise.min(self.length_m), fall.max(0.0));
        }
        // The two slopes cross below the longest length.
        let cross = (0.5 * (self.length_m + (to - from) / self.slope)).clamp(0.0, self.length_m);
        (cross, cross)
    }

    /// ∫dx/h from 0 to x.
    fn count_to(&self, x: f64) -> f64 {
        let (rise, fall) = self.zones();
        let [from, _] = self.at_ends_m;
        let top = self.top(rise);
        let risen = (1.0 + self.slope * x.min(rise) / from).ln() / self.slope;
        let level = (x.min(fall) - rise).max(0.0) / top;
        let fallen = -(1.0 - self.slope * (x - fall).max(0.0) / top).ln() / self.slope;
        risen + level + fallen
    }

    /// x with ∫dx/h = count.
    fn place_of(&self, count: f64) -> f64 {
        let (rise, fall) = self.zones();
        let [from, _] = self.at_ends_m;
        let top = self.top(rise);
        let (to_rise, to_fall) = (self.count_to(rise), self.count_to(fall));
        if count <= to_rise {
            from * (self.slope * count).exp_m1() / self.slope
        } else if count <= to_fall {
            rise + (count - to_rise) * top
        } else {
            fall - top * (-self.slope * (count - to_fall)).exp_m1() / self.slope
        }
    }

    fn top(&self, rise: f64) -> f64 {
        self.at_ends_m[0] + self.slope * rise
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn neighbours_keep_to_the_growth() {
        let growth = 2.5_f64;
        for (length_m, at_ends_m) in [(10.0, [1e-3, 2e-3]), (0.5, [1e-3, 0.4]), (3.0, [1.0, 1.0]), (1e-3, [1e-3, 1e-3])]
        {
            let wanted = Wanted { length_m, at_ends_m, longest_m: 1.0, slope: growth.ln() };
            let nodes = wanted.nodes();
            let lengths_m: Vec<f64> = nodes.windows(2).map(|pair| length_m * (pair[1] - pair[0])).collect();
            assert!((lengths_m.iter().sum::<f64>() - length_m).abs() < 1e-12 * length_m);
            assert!(lengths_m.iter().all(|&h| h > 0.0 && h < 1.0 + 1e-9));
            for pair in lengths_m.windows(2) {
                let ratio = (pair[1] / pair[0]).max(pair[0] / pair[1]);
                assert!(ratio < 1.0001 * growth, "{ratio} in {lengths_m:?}");
            }
        }
    }
}
