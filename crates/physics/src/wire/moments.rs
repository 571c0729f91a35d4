//! Static moments of two segments: ∫∫ ξⁱ·ξ'ʲ/R ds ds' for i, j = 0, 1, with ξ from −1 to 1 along each segment.
//!
//! What near segments do to each other does not depend on frequency, apart from a smooth remainder. These moments are
//! that static part, for segments too near for the Gauss points that all others share.

use super::tube::Tubes;
use super::vector::{Vec3, advance, distance, dot, sub};

/// Moments of 1/R over two segments, m.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub(super) struct Moments {
    /// ∫∫ 1/R
    pub m00: f64,
    /// ∫∫ ξ/R
    pub m10: f64,
    /// ∫∫ ξ'/R
    pub m01: f64,
    /// ∫∫ ξξ'/R
    pub m11: f64,
}

impl Moments {
    /// The same with the segments' roles exchanged.
    pub fn exchanged(self) -> Self {
        Self { m10: self.m01, m01: self.m10, ..self }
    }
}

/// The axis of a segment.
#[derive(Clone, Copy, Debug)]
pub(super) struct Axis {
    pub middle_m: Vec3,
    /// Unit vector.
    pub direction: Vec3,
    pub length_m: f64,
    pub radius_m: f64,
}

impl Axis {
    pub fn end(&self, xi: f64) -> Vec3 {
        advance(self.middle_m, self.direction, 0.5 * xi * self.length_m)
    }
}

/// Moments of segments on one line: exact for tubes, in closed form.
pub(super) fn collinear(p: &Axis, q: &Axis) -> Moments {
    let tubes = Tubes { radius_1_m: p.radius_m, radius_2_m: q.radius_m };
    // Places along p's direction, from p's middle; q may run the other way.
    let [hp, hq] = [0.5 * p.length_m, 0.5 * q.length_m];
    let centre = dot(sub(q.middle_m, p.middle_m), p.direction);
    let mut moments = Moments::default();
    for (s, s_sign) in [(hp, 1.0), (-hp, -1.0)] {
        for (t, t_sign) in [(hq, 1.0), (-hq, -1.0)] {
            let sign = s_sign * t_sign;
            let a = tubes.antiderivatives(s - t - centre);
            // With A₁′ = kernel, A₂′ = A₁ …, by parts in s and t:
            // ∫∫ K = −A₂,   ∫∫ s·K = −(s·A₂ − A₃),   ∫∫ t·K = −(t·A₂ + A₃),   ∫∫ st·K = −(st·A₂ + (s − t)·A₃ − A₄)
            moments.m00 -= sign * a.second;
            moments.m10 -= sign * (s * a.second - a.third);
            moments.m01 -= sign * (t * a.second + a.third);
            moments.m11 -= sign * (s * t * a.second + (s - t) * a.third - a.fourth);
        }
    }
    let along = dot(p.direction, q.direction).signum();
    Moments {
        m00: moments.m00,
        m10: moments.m10 / hp,
        m01: along * moments.m01 / hq,
        m11: along * moments.m11 / (hp * hq),
    }
}

/// Moments of any two segments with the kernel 1/√(R² + c²): q in closed form, p by quadrature.
pub(super) fn skew(p: &Axis, q: &Axis, c_m: f64) -> Moments {
    let mut moments = Moments::default();
    outer(p, q, c_m, (-1.0, 1.0), &mut moments);
    moments
}

/// Adds the part of p between two places to the moments, halving it until it is short against its distance from q.
fn outer(p: &Axis, q: &Axis, c_m: f64, (from, to): (f64, f64), moments: &mut Moments) {
    let (middle, half) = (0.5 * (from + to), 0.5 * (to - from));
    let length_m = half * p.length_m;
    if length_m > c_m && length_m > SHORT * (distance_to(q, p.end(middle)) - 0.5 * length_m).hypot(c_m) {
        outer(p, q, c_m, (from, middle), moments);
        outer(p, q, c_m, (middle, to), moments);
        return;
    }
    for (node, weight) in GAUSS_4 {
        let xi = middle + half * node;
        let [zeroth, first] = potential(q, p.end(xi), c_m);
        let weight_m = weight * half * 0.5 * p.length_m;
        moments.m00 += weight_m * zeroth;
        moments.m10 += weight_m * xi * zeroth;
        moments.m01 += weight_m * first;
        moments.m11 += weight_m * xi * first;
    }
}

/// Part of a segment that four Gauss points may cover, in distances from the other segment.
const SHORT: f64 = 1.0;

/// Nodes and weights of the Gauss–Legendre rule of four points.
const GAUSS_4: [(f64, f64); 4] = [
    (-0.861_136_311_594_052_6, 0.347_854_845_137_453_85),
    (-0.339_981_043_584_856_26, 0.652_145_154_862_546_1),
    (0.339_981_043_584_856_26, 0.652_145_154_862_546_1),
    (0.861_136_311_594_052_6, 0.347_854_845_137_453_85),
];

/// ∫ 1/R and ∫ ξ/R over a segment.
fn potential(q: &Axis, from_m: Vec3, c_m: f64) -> [f64; 2] {
    let to_middle = sub(q.middle_m, from_m);
    let u = dot(to_middle, q.direction);
    // h² = distance² of the point from the line, + c²
    let h2 = (dot(to_middle, to_middle) - u * u).max(0.0) + c_m * c_m;
    let half = 0.5 * q.length_m;
    let (near, far) = (u - half, u + half);
    let (r_near, r_far) = ((near * near + h2).sqrt(), (far * far + h2).sqrt());
    // asinh(u₂/h) − asinh(u₁/h) = ln[(u₂ + r₂)/(u₁ + r₁)]; for a segment behind the point the mirrored form keeps
    // its digits.
    let zeroth = if u >= 0.0 {
        ((far + r_far) / (near + r_near)).ln()
    } else {
        ((r_near - near) / (r_far - far)).ln()
    };
    let first = (r_far - r_near - u * zeroth) / half;
    [zeroth, first]
}

/// Distance of a point from a segment.
pub(super) fn distance_to(q: &Axis, point_m: Vec3) -> f64 {
    let half = 0.5 * q.length_m;
    let along = dot(sub(point_m, q.middle_m), q.direction).clamp(-half, half);
    distance(point_m, advance(q.middle_m, q.direction, along))
}

#[cfg(test)]
mod tests {
    use super::*;

    fn axis(middle_m: Vec3, direction: Vec3, length_m: f64) -> Axis {
        let size = dot(direction, direction).sqrt();
        Axis { middle_m, direction: direction.map(|x| x / size), length_m, radius_m: 1e-3 }
    }

    fn near(a: &Moments, b: &Moments, tolerance: f64) {
        let apart = [a.m00 - b.m00, a.m10 - b.m10, a.m01 - b.m01, a.m11 - b.m11];
        assert!(apart.iter().all(|x| x.abs() < tolerance * b.m00), "{a:?}\n{b:?}");
    }

    /// What makes the matrix symmetric when both triangles are computed: whichever segment is taken in closed form, the
    /// moments agree to the quadrature's own tolerance.
    #[test]
    fn either_segment_may_be_the_source() {
        let p = axis([0.0; 3], [1.0, 0.0, 0.0], 0.6);
        let cases = [
            // Meeting at an angle, one much shorter.
            axis([0.3 + 0.05, 0.05, 0.0], [1.0, 1.0, 0.0], 0.02_f64.sqrt()),
            axis([0.3, 0.35, 0.0], [0.0, 1.0, 0.0], 0.7),
            axis([0.3 + 1e-3, 1e-3, 0.0], [1.0, 1.0, 0.0], 8e-6_f64.sqrt()),
            // Side by side, crossing, askew.
            axis([0.1, 0.02, 0.0], [1.0, 0.0, 0.0], 0.5),
            axis([0.1, 0.0, 0.03], [0.2, 1.0, 0.1], 0.9),
            axis([0.9, 0.2, 0.4], [-1.0, 1.0, 1.0], 0.8),
        ];
        for q in &cases {
            near(&skew(&p, q, 1.3e-3), &skew(q, &p, 1.3e-3).exchanged(), 1e-6);
        }
        let q = axis([0.35, 0.0, 0.0], [-1.0, 0.0, 0.0], 0.1);
        near(&collinear(&p, &q), &collinear(&q, &p).exchanged(), 1e-12);
    }

    #[test]
    fn tubes_far_apart_are_softened_filaments() {
        // Mean of b² over both tubes: 2a².
        let p = axis([0.0; 3], [0.0, 0.0, 1.0], 0.1);
        for (middle_m, direction) in [(0.2, 1.0), (0.2, -1.0), (-0.4, 1.0)] {
            let q = axis([0.0, 0.0, middle_m], [0.0, 0.0, direction], 0.2);
            near(&collinear(&p, &q), &skew(&p, &q, 2_f64.sqrt() * 1e-3), 1e-6);
        }
    }

    #[test]
    fn a_tube_s_own_moment_is_that_of_theory() {
        // 2L·[ln(2L/a) − 1] + 8a/π − …: the first terms of the series for a thin tube
        let p = axis([0.0; 3], [0.0, 0.0, 1.0], 1.0);
        let own = collinear(&p, &p);
        let expected = 2.0 * (2000_f64.ln() - 1.0) + 8e-3 / std::f64::consts::PI;
        assert!((own.m00 / expected - 1.0).abs() < 1e-6, "{} for {expected}", own.m00);
        assert!(own.m10.abs() < 1e-12 && own.m01.abs() < 1e-12);
    }
}
