//! The static kernel of two thin tubes on one axis, and its integrals in closed form.
//!
//! Charge and current of a round wire sit on its surface. The potential of a ring of radius a₁ at a ring of radius a₂
//! on the same axis, z away, is the mean over the angle φ of 1/√(z² + b²) with b² = a₁² + a₂² − 2a₁a₂·cos φ: the exact
//! kernel. Integrals over z are taken first, in closed form for each b, and the mean over φ afterwards.

use std::f64::consts::PI;

/// Radii of two tubes on one axis.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) struct Tubes {
    pub radius_1_m: f64,
    pub radius_2_m: f64,
}

/// Repeated antiderivatives of the kernel: `order[n]` is the n-th, each the derivative of the next.
///
/// Odd ones vanish at z = 0; the constants of the even ones are fixed by continuing the closed forms, and drop out of
/// every integral over two stretches.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub(super) struct Antiderivatives {
    pub first: f64,
    pub second: f64,
    pub third: f64,
    pub fourth: f64,
}

impl Tubes {
    /// Antiderivatives of the kernel at z.
    pub fn antiderivatives(&self, z_m: f64) -> Antiderivatives {
        let z = z_m.abs();
        let mean = if z > SERIES_FROM_RADII * self.radius_1_m.max(self.radius_2_m) {
            self.far(z)
        } else {
            self.near(z)
        };
        // The kernel is even in z, so first and third are odd.
        let sign = 1.0_f64.copysign(z_m);
        Antiderivatives { first: sign * mean.first, third: sign * mean.third, ..mean }
    }

    /// Mean over φ by the midpoint rule, with the logarithm of b apart.
    ///
    /// What is left is periodic and analytic in the strip |Im φ| < 2·asinh(√(z² + (a₁ − a₂)²)/2√(a₁a₂)) = w, so n points
    /// on half a turn leave e^(−2nw).
    fn near(&self, z: f64) -> Antiderivatives {
        let (a1, a2) = (self.radius_1_m, self.radius_2_m);
        if z < CONTACT_RADII * a1 && a1.total_cmp(&a2).is_eq() {
            // b = 2a·sin(φ/2):  A₂ = −b,  A₄ = b³/9  with the means  b = 4a/π,  b³ = 32a³/3π
            let (second, fourth) = (-4.0 * a1 / PI, 32.0 * a1 * a1 * a1 / (27.0 * PI));
            return Antiderivatives { second, fourth, ..Antiderivatives::default() };
        }
        let strip = 2.0 * (0.5 * z.hypot(a1 - a2) / (a1 * a2).sqrt()).asinh();
        let points = (MIDPOINT_DIGITS / strip).ceil().clamp(4.0, MOST_POINTS);
        let mut sum = Antiderivatives::default();
        let mut index = 0.5;
        while index < points {
            // b² = (a₁ − a₂)² + 4a₁a₂·sin²(φ/2), without cancellation for small φ
            let half = (0.5 * PI * index / points).sin();
            let b2 = (a1 - a2) * (a1 - a2) + 4.0 * a1 * a2 * half * half;
            let r = (z * z + b2).sqrt();
            sum.add(&Antiderivatives::of_ring(z, b2, (z + r).ln()));
            index += 1.0;
        }
        let mut mean = sum.scaled(points.recip());
        // A₁ holds ln(z + r) − ln b; the terms with ln b follow from its own mean and that of b²·ln b.
        let [log_b, b2_log_b] = self.logarithms();
        mean.first -= log_b;
        mean.second -= z * log_b;
        mean.third -= 0.5 * z * z * log_b - 0.25 * b2_log_b;
        mean.fourth -= z * (z * z / 6.0 * log_b - 0.25 * b2_log_b);
        mean
    }

    /// Means over φ of ln b (Jensen's formula) and of b²·ln b.
    fn logarithms(&self) -> [f64; 2] {
        let (large, small) = (self.radius_1_m.max(self.radius_2_m), self.radius_1_m.min(self.radius_2_m));
        let log_b = large.ln();
        [log_b, (large * large + small * small) * log_b + small * small]
    }

    /// Mean over φ of the expansion in powers of b/z.
    fn far(&self, z: f64) -> Antiderivatives {
        // Means over φ of b², b⁴, b⁶
        let (a1, a2) = (self.radius_1_m, self.radius_2_m);
        let sum = a1 * a1 + a2 * a2;
        let cross = a1 * a1 * a2 * a2;
        let b2 = sum;
        let b4 = sum * sum + 2.0 * cross;
        let b6 = sum * (sum * sum + 6.0 * cross);
        let [log_b, b2_log_b] = self.logarithms();
        let z2 = z * z;
        // asinh(z/b) = ln 2z − ln b + b²/4z² − 3b⁴/32z⁴ + 5b⁶/96z⁶
        // r = z·(1 + b²/2z² − b⁴/8z⁴ + b⁶/16z⁶)
        let log = (2.0 * z).ln();
        let (q2, q4, q6) = (b2 / z2, b4 / (z2 * z2), b6 / (z2 * z2 * z2));
        let asinh = log - log_b + 0.25 * q2 - 3.0 / 32.0 * q4 + 5.0 / 96.0 * q6;
        let r = z * (1.0 + 0.5 * q2 - 0.125 * q4 + q6 / 16.0);
        // b²·asinh, b²·r and r³, to the same order
        let b2_asinh = b2 * log - b2_log_b + z2 * (0.25 * q4 - 3.0 / 32.0 * q6);
        let b2_r = z * z2 * (q2 + 0.5 * q4 - 0.125 * q6);
        let r3 = z * z2 * (1.0 + 1.5 * q2 + 0.375 * q4 - q6 / 16.0);
        Antiderivatives {
            first: asinh,
            second: z * asinh - r,
            third: 0.5 * z2 * asinh - 0.25 * b2_asinh - 0.75 * z * r,
            fourth: z * (z2 * asinh / 6.0 - 0.25 * b2_asinh) - 11.0 / 36.0 * r3 + 5.0 / 12.0 * b2_r,
        }
    }
}

/// From here on, in radii, the series in b/z leaves less than 1e-8.
const SERIES_FROM_RADII: f64 = 12.0;
/// ln of the midpoint rule's error.
const MIDPOINT_DIGITS: f64 = 10.0;
/// Rings nearer than this, in radii, are one: neighbours meet within rounding.
const CONTACT_RADII: f64 = 1e-6;
/// Bounds the work for points closer than a hundredth of a radius, which a mesh does not have.
const MOST_POINTS: f64 = 512.0;

impl Antiderivatives {
    /// Antiderivatives of 1/√(z² + b²) for z ≥ 0, given the first.
    fn of_ring(z: f64, b2: f64, first: f64) -> Self {
        // A₁ = asinh(z/b),   A₂ = z·A₁ − r,   A₃ = (z²/2 − b²/4)·A₁ − ¾·z·r,
        // A₄ = (z³/6 − b²z/4)·A₁ − 11/36·r³ + 5/12·b²·r
        let r2 = z * z + b2;
        let r = r2.sqrt();
        Self {
            first,
            second: z * first - r,
            third: (0.5 * z * z - 0.25 * b2) * first - 0.75 * z * r,
            fourth: z * (z * z / 6.0 - 0.25 * b2) * first - 11.0 / 36.0 * r2 * r + 5.0 / 12.0 * b2 * r,
        }
    }

    fn add(&mut self, other: &Self) {
        self.first += other.first;
        self.second += other.second;
        self.third += other.third;
        self.fourth += other.fourth;
    }

    fn scaled(self, factor: f64) -> Self {
        Self {
            first: factor * self.first,
            second: factor * self.second,
            third: factor * self.third,
            fourth: factor * self.fourth,
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    /// Mean over φ by brute force, with the points crowded where b is small.
    fn brute(tubes: &Tubes, z: f64) -> Antiderivatives {
        let points = 20_000_u32;
        let mut sum = Antiderivatives::default();
        for index in 0..points {
            // φ = π·t³
            let t = (f64::from(index) + 0.5) / f64::from(points);
            let (a1, a2) = (tubes.radius_1_m, tubes.radius_2_m);
            let half = (0.5 * PI * t * t * t).sin();
            let b2 = (a1 - a2) * (a1 - a2) + 4.0 * a1 * a2 * half * half;
            let ring = Antiderivatives::of_ring(z, b2, (z / b2.sqrt()).asinh());
            sum.add(&ring.scaled(3.0 * t * t / f64::from(points)));
        }
        sum
    }

    #[test]
    fn means_agree_with_brute_force() {
        for tubes in [Tubes { radius_1_m: 1.0, radius_2_m: 1.0 }, Tubes { radius_1_m: 0.4, radius_2_m: 1.0 }]
        {
            for z in [0.0, 0.7, 2.0, 11.9, 12.1, 100.0] {
                let (got, expected) = (tubes.antiderivatives(z), brute(&tubes, z));
                let near =
                    |a: f64, b: f64, scale: f64| assert!((a - b).abs() < 1e-7 * scale, "{z}: {a} for {b}");
                near(got.first, expected.first, 1.0);
                near(got.second, expected.second, 1.0 + z);
                near(got.third, expected.third, 1.0 + z * z);
                near(got.fourth, expected.fourth, 1.0 + z * z * z);
            }
        }
    }

    #[test]
    fn each_is_the_derivative_of_the_next() {
        let tubes = Tubes { radius_1_m: 1.0, radius_2_m: 1.0 };
        for z in [-3.0, 0.5, 5.0, 30.0] {
            let step = 1e-3;
            let (below, at, above) =
                (tubes.antiderivatives(z - step), tubes.antiderivatives(z), tubes.antiderivatives(z + step));
            let slope = |below: f64, above: f64| (above - below) / (2.0 * step);
            assert!((slope(below.second, above.second) - at.first).abs() < 1e-5);
            assert!((slope(below.third, above.third) - at.second).abs() < 1e-5);
            assert!((slope(below.fourth, above.fourth) - at.third).abs() < 1e-4);
        }
    }
}
