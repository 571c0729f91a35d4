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
    /// Length of a segment a longest segment away from the nearest end, in longest segments.
    pub slope: f64,
    /// Power of the distance that the length grows with.
    pub power: f64,
    /// Segments per wavelength, at least.
    pub per_wavelength: f64,
}

impl Fineness {
    /// The mesh of every answer.
    pub const WORKING: Self =
        Self { end_radii: 1.0, bend_radii: 4.0, per_gap: 4.0, slope: 0.45, power: 0.8, per_wavelength: 12.0 };

    /// The mesh that tells the error of the working one. A ring shorter than its radius adds nothing.
    pub const REFINED: Self =
        Self { end_radii: 0.7, bend_radii: 2.0, per_gap: 6.0, slope: 0.3, power: 0.8, per_wavelength: 20.0 };

    /// The law of growth for a longest segment.
    pub fn growth(&self, longest_m: f64) -> Growth {
        Growth { factor: self.slope * longest_m.powf(1.0 - self.power), power: self.power }
    }
}

/// Wanted length h = factor·e^power, e a distance.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) struct Growth {
    factor: f64,
    power: f64,
}

impl Growth {
    /// Distance at which a length is wanted.
    pub fn distance_of(&self, length_m: f64) -> f64 {
        (length_m / self.factor).powf(self.power.recip())
    }

    /// Distance at which a stretch begins whose first segment is to be `length_m` long.
    pub fn start_m(&self, length_m: f64) -> f64 {
        // ∫de/h = 1 from e₀ to e₀ + length; a few rounds of e₀ ← e₀·… suffice for a mesh.
        let mut start = self.distance_of(length_m);
        for _ in 0..30 {
            start *= self.count(start, start + length_m).clamp(0.5, 2.0);
        }
        start
    }

    /// ∫de/h.
    fn count(&self, from: f64, to: f64) -> f64 {
        let rest = 1.0 - self.power;
        (to.powf(rest) - from.powf(rest)) / (self.factor * rest)
    }

    /// Distance at which ∫de/h from `from` reaches `count`.
    fn place(&self, from: f64, count: f64) -> f64 {
        let rest = 1.0 - self.power;
        (from.powf(rest) + count * self.factor * rest).powf(rest.recip())
    }
}

/// Wanted segment lengths along one straight stretch.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) struct Wanted {
    /// Length of the stretch, m.
    pub length_m: f64,
    /// Distances from the nearest crowding of charge that its two ends count as, m.
    pub at_ends_m: [f64; 2],
    /// Wanted length far from both, m.
    pub longest_m: f64,
    /// Law of growth.
    pub growth: Growth,
}

impl Wanted {
    /// Nodes from 0 to 1 along the stretch, both included.
    pub fn nodes(&self) -> Vec<f64> {
        let parts = self.parts();
        let whole = parts.rise_count + parts.level_count + parts.fall_count;
        // Rounding must not add a segment to a stretch that holds a whole number of them.
        let segments = (whole - 1e-6).ceil().max(1.0);
        let mut nodes = vec![0.0];
        let mut index = 1.0;
        while index < segments {
            nodes.push(self.place_of(&parts, whole * index / segments) / self.length_m);
            index += 1.0;
        }
        nodes.push(1.0);
        nodes
    }

    /// Rising, level and falling part.
    fn parts(&self) -> Parts {
        let [from, to] = self.at_ends_m;
        let top = self.growth.distance_of(self.longest_m);
        let (mut rise, mut fall) = ((top - from).max(0.0), self.length_m - (top - to).max(0.0));
        if rise > fall {
            // They meet below the longest length.
            rise = (0.5 * (self.length_m + to - from)).clamp(0.0, self.length_m);
            fall = rise;
        }
        Parts {
            rise,
            fall,
            rise_count: self.growth.count(from, from + rise),
            level_count: (fall - rise) / self.longest_m,
            fall_count: self.growth.count(to, to + self.length_m - fall),
        }
    }

    /// Place at which ∫dx/h reaches a count.
    fn place_of(&self, parts: &Parts, count: f64) -> f64 {
        let [from, to] = self.at_ends_m;
        if count <= parts.rise_count {
            self.growth.place(from, count) - from
        } else if count <= parts.rise_count + parts.level_count {
            parts.rise + (count - parts.rise_count) * self.longest_m
        } else {
            let left = parts.rise_count + parts.level_count + parts.fall_count - count;
            self.length_m - (self.growth.place(to, left) - to)
        }
    }
}

/// Where a stretch's wanted length rises, stays and falls, and how many segments that makes.
struct Parts {
    rise: f64,
    fall: f64,
    rise_count: f64,
    level_count: f64,
    fall_count: f64,
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn neighbours_keep_to_the_growth() {
        let growth = Fineness::WORKING.growth(1.0);
        for (length_m, at_ends_m) in
            [(10.0, [1e-3, 2e-3]), (0.5, [1e-3, 0.4]), (3.0, [1.0, 1.0]), (1e-3, [1e-3, 1e-3])]
        {
            let nodes = Wanted { length_m, at_ends_m, longest_m: 1.0, growth }.nodes();
            let lengths_m: Vec<f64> = nodes.windows(2).map(|pair| length_m * (pair[1] - pair[0])).collect();
            assert!((lengths_m.iter().sum::<f64>() - length_m).abs() < 1e-12 * length_m);
            assert!(lengths_m.iter().all(|&h| h > 0.0 && h < 1.0 + 1e-9), "{lengths_m:?}");
            for pair in lengths_m.windows(2) {
                let ratio = (pair[1] / pair[0]).max(pair[0] / pair[1]);
                assert!(ratio < 3.0, "{ratio} in {lengths_m:?}");
            }
        }
    }
}
