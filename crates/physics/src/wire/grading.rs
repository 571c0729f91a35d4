//! Lengths of segments: short where charge crowds, long elsewhere.
//!
//! The wanted length h grows with the distance e from the nearest end, bend, joint or gap: in proportion where it is
//! short, so that neighbours differ by a fixed ratio, and more slowly farther away, where a segment's error weighs more.
//! A stretch is divided so that every segment holds the same part of ∫de/h.

/// How fine a mesh is.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) struct Fineness {
    /// Shortest segment at open ends, in radii of the wire.
    pub end_radii: f64,
    /// Shortest segment at bends and joints, in radii of the wire.
    pub bend_radii: f64,
    /// Segments in a port's gap.
    pub per_gap: f64,
    /// Rate at which lengths grow with distance where they are short.
    pub steepest: f64,
    /// Length of a segment a longest segment away from the nearest end, in longest segments.
    pub slope: f64,
    /// Power of the distance that the length grows with farther away.
    pub power: f64,
    /// Segments per wavelength, at least.
    pub per_wavelength: f64,
}

impl Fineness {
    /// The mesh of every answer.
    ///
    /// Against reference cases without earth (README.md beside the data): 0.02 % of |Z| in the mean, 0.1 % at worst. A
    /// tube's charge rises like the root of the distance from its open end, hence the short first segment.
    pub const WORKING: Self = Self {
        end_radii: 0.3,
        bend_radii: 8.0,
        per_gap: 3.0,
        steepest: 1.5,
        slope: 0.5,
        power: 0.75,
        per_wavelength: 12.0,
    };

    /// The mesh that tells the error of the working one: about a quarter of its error.
    pub const REFINED: Self = Self {
        end_radii: 0.15,
        bend_radii: 4.0,
        per_gap: 6.0,
        steepest: 1.0,
        slope: 0.3,
        power: 0.7,
        per_wavelength: 20.0,
    };

    /// The same for wires of a total length, in wavelengths: where there are few segments anyway they can be shorter,
    /// and where the wires are long an error at one place weighs less.
    pub fn of_length(&self, wavelengths: f64) -> Self {
        Self {
            slope: self.slope * (1.0 - 0.24 / wavelengths).max(0.6),
            per_wavelength: self.per_wavelength * (1.0 + 0.5 / wavelengths).min(2.0),
            ..*self
        }
    }

    /// The law of growth for a longest segment.
    pub fn growth(&self, longest_m: f64) -> Growth {
        let rest = 1.0 - self.power;
        let factor = self.slope * longest_m.powf(rest);
        // γe = factor·e^power
        let turn_m = (factor / self.steepest).powf(rest.recip());
        Growth { steepest: self.steepest, turn_m, rest }
    }
}

/// Wanted length h at a distance e: h = γe up to the turn, where h = γ·turn·(e/turn)^(1 − rest) takes over.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) struct Growth {
    steepest: f64,
    turn_m: f64,
    rest: f64,
}

impl Growth {
    /// Distance at which a length is wanted.
    pub fn distance_of(&self, length_m: f64) -> f64 {
        let share = length_m / (self.steepest * self.turn_m);
        self.turn_m * if share < 1.0 { share } else { share.powf((1.0 - self.rest).recip()) }
    }

    /// Distance at which a stretch begins whose first segment is to be `length_m` long.
    pub fn start_m(&self, length_m: f64) -> f64 {
        // ∫de/h = 1 from e₀ to e₀ + length
        length_m / self.steepest.exp_m1()
    }

    /// ∫de/h from the turn to e.
    fn count(&self, e: f64) -> f64 {
        let share = e / self.turn_m;
        if share < 1.0 {
            share.ln() / self.steepest
        } else {
            (share.powf(self.rest) - 1.0) / (self.steepest * self.rest)
        }
    }

    /// Distance at which ∫de/h from the turn reaches `count`.
    fn place(&self, count: f64) -> f64 {
        let grown = self.steepest * count;
        self.turn_m
            * if grown < 0.0 { grown.exp() } else { (1.0 + self.rest * grown).powf(self.rest.recip()) }
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
            rise_count: self.growth.count(from + rise) - self.growth.count(from),
            level_count: (fall - rise) / self.longest_m,
            fall_count: self.growth.count(to + self.length_m - fall) - self.growth.count(to),
        }
    }

    /// Place at which ∫dx/h reaches a count.
    fn place_of(&self, parts: &Parts, count: f64) -> f64 {
        let [from, to] = self.at_ends_m;
        if count <= parts.rise_count {
            self.growth.place(self.growth.count(from) + count) - from
        } else if count <= parts.rise_count + parts.level_count {
            parts.rise + (count - parts.rise_count) * self.longest_m
        } else {
            let left = parts.rise_count + parts.level_count + parts.fall_count - count;
            self.length_m - (self.growth.place(self.growth.count(to) + left) - to)
        }
    }
}

/// Where a stretch's wanted length rises, stays and falls, and how many segments that makes.
struct Parts {
    rise: f64,
    rise_count: f64,
    level_count: f64,
    fall_count: f64,
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn stretches_are_filled_and_neighbours_keep_to_the_growth() {
        for fineness in [Fineness::WORKING, Fineness::REFINED] {
            let growth = fineness.growth(1.0);
            let most = fineness.steepest.exp() * 1.0001;
            for (length_m, at_ends_m) in
                [(10.0, [1e-4, 2e-3]), (0.5, [1e-3, 0.4]), (3.0, [1.0, 1.0]), (1e-3, [1e-3, 1e-3])]
            {
                let nodes = Wanted { length_m, at_ends_m, longest_m: 1.0, growth }.nodes();
                let lengths_m: Vec<f64> =
                    nodes.windows(2).map(|pair| length_m * (pair[1] - pair[0])).collect();
                assert!((lengths_m.iter().sum::<f64>() - length_m).abs() < 1e-12 * length_m);
                assert!(lengths_m.iter().all(|&h| h > 0.0 && h < 1.0 + 1e-9), "{lengths_m:?}");
                for pair in lengths_m.windows(2) {
                    let ratio = (pair[1] / pair[0]).max(pair[0] / pair[1]);
                    assert!(ratio < most, "{ratio} in {lengths_m:?}");
                }
            }
        }
    }

    #[test]
    fn first_segment_has_the_length_asked_for() {
        let growth = Fineness::WORKING.growth(1.0);
        for shortest_m in [1e-4, 1e-3] {
            let start_m = growth.start_m(shortest_m);
            let nodes =
                Wanted { length_m: 100.0, at_ends_m: [start_m, 10.0], longest_m: 1.0, growth }.nodes();
            let first_m = 100.0 * (nodes[1] - nodes[0]);
            assert!(
                first_m < 1.0001 * shortest_m && first_m > 0.9 * shortest_m,
                "{first_m} for {shortest_m}"
            );
        }
    }
}
