//! The current between the nodes of a mesh, with a continuous charge.
//!
//! A solution's currents at the nodes are far better than the sinusoids between them: those meet with kinks, and the
//! charge, which is the slope, jumps by a few percent. At a distance the jumps cancel; closer than a segment's length
//! they do not. Here each sinusoid bows by as much as makes the slopes of neighbours equal: a spline whose pieces obey
//! I'' + k²I = g with g'' + k²g = 0 (for k = 0 the cubic spline), because what a wire's current lacks of a sinusoid
//! follows the current itself.

use num_complex::Complex64;

use super::space::{Vec3, advance, length, sub};
use crate::constants::wave_number_rad_per_m;
use crate::wire::{Boundary, EndCurrents, Segment};

/// Finer segments with their currents.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct SmoothCurrents {
    /// In the order of the segments that they are parts of.
    pub segments: Vec<Segment>,
    /// At their ends, A peak.
    pub currents: Vec<EndCurrents>,
}

/// A solution's currents on segments no longer than `longest_m`, with a charge that goes smoothly along each wire.
///
/// Currents at the nodes stay as they are. What is left of the charge's steps fades from the wire with
/// e^(−2π·distance/length), so that `longest_m` (> 0) should be the least distance at which the field is wanted; far fields,
/// powers and potentials (as means over segments) want the solution as it is. Of the near fields of this project's
/// reference cases the worst error, beside a grounded line, falls from 2.7 % to 0.1 %.
#[must_use]
pub fn smoothed(
    segments: &[Segment],
    currents: &[EndCurrents],
    boundary: Boundary,
    frequency_hz: f64,
    longest_m: f64,
) -> SmoothCurrents {
    let pieces = bowed(segments, currents, boundary, wave_number_rad_per_m(frequency_hz));
    let mut finer = SmoothCurrents::default();
    for (segment, piece) in segments.iter().zip(pieces) {
        let direction = segment.direction();
        let count = (piece.length_m / longest_m).ceil().max(1.0);
        let place_m = |index: u32| piece.length_m * f64::from(index) / count;
        let point_m = |index: u32| advance(segment.from_m, direction, place_m(index));
        for index in 0..count as u32 {
            let [from_m, to_m] = [index, index + 1].map(point_m);
            finer.segments.push(Segment { from_m, to_m, radius_m: segment.radius_m });
            let [from_a, to_a] = [index, index + 1].map(|index| piece.current_a(place_m(index)));
            finer.currents.push(EndCurrents { from_a, to_a });
        }
    }
    finer
}

/// A sinusoid of current on a segment, bowed.
#[derive(Clone, Copy, Debug)]
struct Bowed {
    k: f64,
    length_m: f64,
    ends_a: [Complex64; 2],
    /// g = I'' + k²I at both ends, A/m².
    bow_a_per_m2: [Complex64; 2],
}

/// Distance below which an end and a beginning are one point, m.
const JOINED_M: f64 = 1e-9;

/// Jump of the current, as a share of it, above which something branches off.
const BRANCH: f64 = 1e-9;

impl Bowed {
    /// Current at a distance from the beginning, A.
    fn current_a(&self, along_m: f64) -> Complex64 {
        // I = [I₁·sin k(L − s) + I₂·sin ks + g₁·r(L − s) + g₂·r(s)]/sin kL
        // r'' + k²r = sin ks,  r(0) = r(L) = 0:  r(s) = [L·cot kL·sin ks − s·cos ks]/2k
        let Self { k, length_m, ends_a, bow_a_per_m2, .. } = *self;
        let (sine, cosine) = (k * length_m).sin_cos();
        let from_each_end = |distance_m: f64| {
            let (s, c) = (k * distance_m).sin_cos();
            (s / sine, (length_m * cosine / sine * s - distance_m * c) / (2.0 * k * sine))
        };
        let (one, other) = (from_each_end(length_m - along_m), from_each_end(along_m));
        ends_a[0] * one.0 + ends_a[1] * other.0 + bow_a_per_m2[0] * one.1 + bow_a_per_m2[1] * other.1
    }

    /// Slope of the current at a distance from the beginning, A/m.
    fn slope_a_per_m(&self, along_m: f64) -> Complex64 {
        // r'(s) = [(kL·cot kL − 1)·cos ks + ks·sin ks]/2k
        let Self { k, length_m, ends_a, bow_a_per_m2, .. } = *self;
        let x = k * length_m;
        let (sine, cosine) = x.sin_cos();
        let from_each_end = |distance_m: f64| {
            let (s, c) = (k * distance_m).sin_cos();
            (k * c / sine, ((x * cosine / sine - 1.0) * c + k * distance_m * s) / (2.0 * k * sine))
        };
        let (one, other) = (from_each_end(length_m - along_m), from_each_end(along_m));
        ends_a[1] * other.0 - ends_a[0] * one.0 + bow_a_per_m2[1] * other.1 - bow_a_per_m2[0] * one.1
    }
}

/// Bows the sinusoids of all segments.
///
/// Consecutive segments are taken together as long as the same current goes on; at the ends of such a chain, where a
/// mesh is fine, the sinusoid is left as it is. A chain that stands on a mirror goes on evenly below it.
fn bowed(segments: &[Segment], currents: &[EndCurrents], boundary: Boundary, k: f64) -> Vec<Bowed> {
    let count = segments.len().min(currents.len());
    let mut bowed = Vec::with_capacity(count);
    let mut first = 0;
    for next in 1..=count {
        let goes_on = next < count && continues([&segments[next - 1], &segments[next]], currents, next);
        if !goes_on {
            bowed.extend(chain(&segments[first..next], &currents[first..next], boundary, k));
            first = next;
        }
    }
    bowed
}

fn continues([before, after]: [&Segment; 2], currents: &[EndCurrents], next: usize) -> bool {
    let (arriving, leaving) = (currents[next - 1].to_a, currents[next].from_a);
    length(sub(after.from_m, before.to_m)) < JOINED_M
        && (arriving - leaving).norm() <= BRANCH * (arriving.norm() + leaving.norm())
}

/// Bows one chain: the slopes on both sides of each inner node are equal.
fn chain(segments: &[Segment], currents: &[EndCurrents], boundary: Boundary, k: f64) -> Vec<Bowed> {
    let mut pieces: Vec<Bowed> = segments
        .iter()
        .zip(currents)
        .map(|(segment, ends)| Bowed {
            k,
            length_m: segment.length_m(),
            ends_a: [ends.from_a, ends.to_a],
            bow_a_per_m2: [Complex64::ZERO; 2],
        })
        .collect();
    let on_mirror = |end_m: Vec3| boundary == Boundary::Mirror && end_m[2].abs() < JOINED_M;
    let last = segments.len() - 1;
    let mut equations = Equations::new(segments.len() + 1);
    for (index, piece) in pieces.iter().enumerate() {
        let [own, other] = piece.stiffness_m();
        equations.diagonal[index] += own;
        equations.diagonal[index + 1] += own;
        equations.beside[index] = other;
        equations.right[index] += piece.slope_a_per_m(0.0);
        equations.right[index + 1] -= piece.slope_a_per_m(piece.length_m);
    }
    if !on_mirror(segments[0].from_m) {
        equations.fix(0);
    }
    if !on_mirror(segments[last].to_m) {
        equations.fix(last + 1);
    }
    let bow = equations.solve();
    for (piece, pair) in pieces.iter_mut().zip(bow.windows(2)) {
        piece.bow_a_per_m2 = [pair[0], pair[1]];
    }
    pieces
}

impl Bowed {
    /// How much the slope at the beginning falls per bow at the beginning and at the end, m.
    fn stiffness_m(&self) -> [f64; 2] {
        // r'(L)/sin x = (x/sin x − cos x)/(2k·sin x),   −r'(0)/sin x = (1 − x·cot x)/(2k·sin x),   x = kL;
        // L/3 and L/6 for short ones
        let (sine, cosine) = (self.k * self.length_m).sin_cos();
        let x = self.k * self.length_m;
        let scale = 2.0 * self.k * sine;
        [(x / sine - cosine) / scale, (1.0 - x * cosine / sine) / scale]
    }
}

/// Symmetric equations with three diagonals, diagonally dominant.
struct Equations {
    diagonal: Vec<f64>,
    beside: Vec<f64>,
    right: Vec<Complex64>,
}

impl Equations {
    fn new(count: usize) -> Self {
        Self { diagonal: vec![0.0; count], beside: vec![0.0; count], right: vec![Complex64::ZERO; count] }
    }

    /// Makes an unknown zero.
    fn fix(&mut self, index: usize) {
        self.diagonal[index] = 1.0;
        self.right[index] = Complex64::ZERO;
        self.beside[index] = 0.0;
        if let Some(before) = index.checked_sub(1) {
            self.beside[before] = 0.0;
        }
    }

    fn solve(mut self) -> Vec<Complex64> {
        let count = self.diagonal.len();
        for index in 1..count {
            let factor = self.beside[index - 1] / self.diagonal[index - 1];
            self.diagonal[index] -= factor * self.beside[index - 1];
            let above = self.right[index - 1];
            self.right[index] -= factor * above;
        }
        let mut below = Complex64::ZERO;
        for index in (0..count).rev() {
            below = (self.right[index] - self.beside[index] * below) / self.diagonal[index];
            self.right[index] = below;
        }
        self.right
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    const K: f64 = 1.0;

    /// A chain up the z axis through uneven nodes, with a given current.
    fn chain(nodes_m: &[f64], current_a: impl Fn(f64) -> f64) -> (Vec<Segment>, Vec<EndCurrents>) {
        let pair = |pair: &[f64]| {
            let [from_m, to_m] = [pair[0], pair[1]].map(|z| [0.0, 0.0, z]);
            let [from_a, to_a] = [pair[0], pair[1]].map(|z| Complex64::from(current_a(z)));
            (Segment { from_m, to_m, radius_m: 1e-4 }, EndCurrents { from_a, to_a })
        };
        nodes_m.windows(2).map(pair).unzip()
    }

    fn worst(
        pieces: &[Bowed],
        nodes_m: &[f64],
        truth: impl Fn(f64) -> f64,
        of: fn(&Bowed, f64) -> Complex64,
    ) -> f64 {
        let of_piece = |(piece, &start_m): (&Bowed, &f64)| {
            let parts = [0.0, 0.3, 0.8, 1.0].map(|part| part * piece.length_m);
            parts.map(|along_m| (of(piece, along_m) - truth(start_m + along_m)).norm())
        };
        pieces.iter().zip(nodes_m).flat_map(of_piece).fold(0.0, f64::max)
    }

    /// I = sin z − ½z·cos z has g = sin z, none at both ends of half a wave: the spline's own kind, found exactly.
    #[test]
    fn currents_that_bow_with_themselves_are_found_between_the_nodes() {
        let nodes_m = [0.0, 0.01, 0.04, 0.3, 0.9, 1.4, 2.0, 2.6, 3.0, std::f64::consts::PI];
        let current = |z: f64| z.sin() - 0.5 * z * z.cos();
        let slope = |z: f64| z.cos() - 0.5 * (z.cos() - z * z.sin());
        let (segments, currents) = chain(&nodes_m, current);
        let pieces = bowed(&segments, &currents, Boundary::FreeSpace, K);
        assert!(worst(&pieces, &nodes_m, current, Bowed::current_a) < 1e-10);
        assert!(worst(&pieces, &nodes_m, slope, Bowed::slope_a_per_m) < 1e-9);
    }

    /// I = cos z + ½z·sin z goes on evenly below a mirror: g = cos z, none a quarter wave up.
    #[test]
    fn a_chain_on_a_mirror_has_no_charge_at_its_foot() {
        let nodes_m = [0.0, 0.5, 1.0, 1.5, std::f64::consts::FRAC_PI_2];
        let current = |z: f64| z.cos() + 0.5 * z * z.sin();
        let (segments, currents) = chain(&nodes_m, current);
        let pieces = bowed(&segments, &currents, Boundary::Mirror, K);
        assert!(worst(&pieces, &nodes_m, current, Bowed::current_a) < 1e-10);
        assert!(pieces[0].slope_a_per_m(0.0).norm() < 1e-10);
    }

    /// Where something branches off, the charge may jump.
    #[test]
    fn a_branch_ends_the_chain() {
        let (segments, mut currents) = chain(&[0.0, 0.5, 1.0, 1.5, 2.0], f64::sin);
        for ends in &mut currents[2..] {
            (ends.from_a, ends.to_a) = (0.5 * ends.from_a, 0.5 * ends.to_a);
        }
        let pieces = bowed(&segments, &currents, Boundary::FreeSpace, K);
        // Two pure sinusoids stay as they are.
        assert!(pieces.iter().all(|piece| piece.bow_a_per_m2.iter().all(|bow| bow.norm() < 1e-12)));
    }
}
