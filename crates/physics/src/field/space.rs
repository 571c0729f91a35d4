//! Vectors.

use num_complex::Complex64;

/// x, y, z.
pub(super) type Vec3 = [f64; 3];

pub(super) fn sub(a: Vec3, b: Vec3) -> Vec3 {
    std::array::from_fn(|axis| a[axis] - b[axis])
}

pub(super) fn dot(a: Vec3, b: Vec3) -> f64 {
    a[0] * b[0] + a[1] * b[1] + a[2] * b[2]
}

pub(super) fn cross(a: Vec3, b: Vec3) -> Vec3 {
    [a[1] * b[2] - a[2] * b[1], a[2] * b[0] - a[0] * b[2], a[0] * b[1] - a[1] * b[0]]
}

pub(super) fn length(a: Vec3) -> f64 {
    dot(a, a).sqrt()
}

pub(super) fn advance(a: Vec3, direction: Vec3, t: f64) -> Vec3 {
    std::array::from_fn(|axis| a[axis] + t * direction[axis])
}

/// Mirrored in the plane z = 0.
pub(super) fn mirrored([x, y, z]: Vec3) -> Vec3 {
    [x, y, -z]
}

/// Adds a complex multiple of a direction.
pub(super) fn add(sum: &mut [Complex64; 3], amount: Complex64, direction: Vec3) {
    for (sum, component) in sum.iter_mut().zip(direction) {
        *sum += amount * component;
    }
}
