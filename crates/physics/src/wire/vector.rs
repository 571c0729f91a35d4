//! Points and directions in space.

/// x, y, z.
pub(super) type Vec3 = [f64; 3];

pub(super) fn sub(a: Vec3, b: Vec3) -> Vec3 {
    std::array::from_fn(|axis| a[axis] - b[axis])
}

pub(super) fn dot(a: Vec3, b: Vec3) -> f64 {
    a[0] * b[0] + a[1] * b[1] + a[2] * b[2]
}

pub(super) fn distance(a: Vec3, b: Vec3) -> f64 {
    let d = sub(a, b);
    dot(d, d).sqrt()
}

/// Point `along` times the way from `a` to `b`.
pub(super) fn lerp(a: Vec3, b: Vec3, along: f64) -> Vec3 {
    std::array::from_fn(|axis| a[axis] + along * (b[axis] - a[axis]))
}

/// Part of the way along a straight stretch, 0 to 1, that is nearest to a point.
pub(super) fn along([from, to]: [Vec3; 2], point: Vec3) -> f64 {
    let span = sub(to, from);
    (dot(sub(point, from), span) / dot(span, span)).clamp(0.0, 1.0)
}

/// `a` + `t`·`direction`.
pub(super) fn advance(a: Vec3, direction: Vec3, t: f64) -> Vec3 {
    std::array::from_fn(|axis| a[axis] + t * direction[axis])
}

/// Mirrored in the plane z = 0.
pub(super) fn mirrored(a: Vec3) -> Vec3 {
    [a[0], a[1], -a[2]]
}

/// Nearest points of two straight stretches, as parts 0 to 1 of each, and their distance.
pub(super) fn nearest(a: [Vec3; 2], b: [Vec3; 2]) -> ([f64; 2], f64) {
    let (da, db, offset) = (sub(a[1], a[0]), sub(b[1], b[0]), sub(a[0], b[0]));
    let (aa, bb, ab) = (dot(da, da), dot(db, db), dot(da, db));
    let (ao, bo) = (dot(da, offset), dot(db, offset));
    let determinant = aa * bb - ab * ab;
    // Minimum of |offset + s·da − t·db|²: inside if the lines are not parallel, else with one end fixed.
    let fixed_s = |s: f64| [s, ((ab * s + bo) / bb).clamp(0.0, 1.0)];
    let fixed_t = |t: f64| [((ab * t - ao) / aa).clamp(0.0, 1.0), t];
    let gap = |[s, t]: [f64; 2]| distance(advance(a[0], da, s), advance(b[0], db, t));
    let inside = (determinant > 1e-12 * aa * bb)
        .then(|| [(ab * bo - bb * ao) / determinant, (aa * bo - ab * ao) / determinant])
        .filter(|parts| parts.iter().all(|part| (0.0..=1.0).contains(part)));
    let candidates = inside.into_iter().chain([fixed_s(0.0), fixed_s(1.0), fixed_t(0.0), fixed_t(1.0)]);
    candidates
        .map(|parts| (parts, gap(parts)))
        .fold(([0.0; 2], f64::INFINITY), |best, next| if next.1 < best.1 { next } else { best })
}
