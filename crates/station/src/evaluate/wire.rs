//! What a wire model hands to the rest of the evaluator, whichever model it is.

use num_complex::Complex64;

use crate::report::{Mark, MarkKind, Shares, StandingWave};

/// The wire at all frequencies of all bands.
#[derive(Clone, Debug)]
pub(super) struct WireSolution {
    pub bands: Vec<BandSolution>,
}

/// The wire on one band.
#[derive(Clone, Debug)]
pub(super) struct BandSolution {
    /// One entry per frequency of the band's grid.
    pub points: Vec<WirePoint>,
    pub wave: StandingWave,
}

/// The feedpoint at one frequency.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) struct WirePoint {
    pub impedance_ohm: Complex64,
    pub shares: Shares,
}

/// Places along a wire at which the standing wave is given, for each half wave and at least.
const PLACES_PER_HALF_WAVE: f64 = 24.0;
const FEWEST_PLACES: usize = 48;

/// Even places along a wire, with one on either side of each cut, where the potential jumps.
pub(super) fn places(length_m: f64, frequency_hz: f64, cuts: &[Cut]) -> Vec<f64> {
    let half_wave_m = 0.5 * physics::constants::SPEED_OF_LIGHT_M_PER_S / frequency_hz;
    let count = ((PLACES_PER_HALF_WAVE * length_m / half_wave_m) as usize).max(FEWEST_PLACES);
    let mut arcs: Vec<f64> = (0..=count).map(|n| length_m * n as f64 / count as f64).collect();
    for cut in cuts {
        arcs.retain(|arc_m| (arc_m - cut.arc_m).abs() > cut.half_width_m);
        let at = arcs.partition_point(|&arc_m| arc_m < cut.arc_m);
        arcs.splice(at..at, [cut.arc_m - cut.half_width_m, cut.arc_m + cut.half_width_m]);
    }
    arcs
}

/// A place where a wire is cut for a feedpoint or a load.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) struct Cut {
    pub arc_m: f64,
    pub half_width_m: f64,
}

/// Loops and nodes of a current that has been computed at places: local maxima and minima of its amplitude, by parabola
/// through three neighbours. The open ends are nodes.
pub(super) fn marks(arc_m: &[f64], current_a: &[Complex64]) -> Vec<Mark> {
    let amplitude: Vec<f64> = current_a.iter().map(|i| i.norm()).collect();
    let largest = amplitude.iter().copied().fold(0.0, f64::max);
    let mut marks = Vec::new();
    let last = amplitude.len() - 1;
    for index in 0..=last {
        let here = amplitude[index];
        let before = if index > 0 { Some(amplitude[index - 1]) } else { None };
        let after = amplitude.get(index + 1).copied();
        let kind = match (before, after) {
            (Some(b), Some(a)) if here >= b && here > a => MarkKind::CurrentLoop,
            (Some(b), Some(a)) if here <= b && here < a => MarkKind::CurrentNode,
            (None, Some(a)) if here < 0.05 * largest && here < a => MarkKind::CurrentNode,
            (Some(b), None) if here < 0.05 * largest && here < b => MarkKind::CurrentNode,
            _ => continue,
        };
        let arc_m = if index == 0 || index == last { arc_m[index] } else { vertex(arc_m, &amplitude, index) };
        marks.push(Mark { arc_m, kind });
    }
    keep_distinct(marks, &amplitude, arc_m)
}

/// Top or bottom of the parabola through three neighbours.
fn vertex(x: &[f64], y: &[f64], at: usize) -> f64 {
    let (left, right) = (x[at] - x[at - 1], x[at + 1] - x[at]);
    let (down, up) = ((y[at] - y[at - 1]) / left, (y[at + 1] - y[at]) / right);
    let bend = up - down;
    if bend.abs() < f64::MIN_POSITIVE {
        return x[at];
    }
    // Slope zero on the line from `down` at the left middle to `up` at the right middle.
    let place = 0.5 * (x[at - 1] + x[at]) - down / bend * 0.5 * (left + right);
    place.clamp(x[at - 1], x[at + 1])
}

/// A dip and a rise that differ by less than this share of the largest current are one ripple, not two marks.
const RIPPLE: f64 = 0.02;

fn keep_distinct(marks: Vec<Mark>, amplitude: &[f64], arc_m: &[f64]) -> Vec<Mark> {
    let largest = amplitude.iter().copied().fold(0.0, f64::max);
    let value = |mark: &Mark| {
        let index = arc_m.partition_point(|&a| a < mark.arc_m).min(amplitude.len() - 1);
        amplitude[index]
    };
    let mut kept: Vec<Mark> = Vec::with_capacity(marks.len());
    for mark in marks {
        match kept.last() {
            Some(last) if last.kind != mark.kind && (value(last) - value(&mark)).abs() < RIPPLE * largest => {
                kept.pop();
            }
            Some(last) if last.kind == mark.kind => {
                let better = match mark.kind {
                    MarkKind::CurrentLoop => value(&mark) > value(last),
                    MarkKind::CurrentNode => value(&mark) < value(last),
                };
                if better {
                    kept.pop();
                    kept.push(mark);
                }
            }
            _ => kept.push(mark),
        }
    }
    kept
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn marks_of_a_sinusoid_are_where_it_turns() {
        // Three half waves on 30 m: loops at 5, 15, 25 m; nodes at both ends and at 10 and 20 m.
        let arc_m = places(30.0, 15e6, &[]);
        let current: Vec<Complex64> = arc_m
            .iter()
            .map(|s| Complex64::new((std::f64::consts::PI * s / 10.0).sin().abs(), 0.0))
            .collect();
        let found = marks(&arc_m, &current);
        let expected = [
            (0.0, MarkKind::CurrentNode),
            (5.0, MarkKind::CurrentLoop),
            (10.0, MarkKind::CurrentNode),
            (15.0, MarkKind::CurrentLoop),
            (20.0, MarkKind::CurrentNode),
            (25.0, MarkKind::CurrentLoop),
            (30.0, MarkKind::CurrentNode),
        ];
        assert_eq!(found.len(), expected.len(), "{found:?}");
        for (mark, (arc, kind)) in found.iter().zip(expected) {
            assert!(mark.kind == kind && (mark.arc_m - arc).abs() < 0.2, "{mark:?} for {arc} {kind:?}");
        }
    }

    #[test]
    fn places_stand_on_both_sides_of_a_cut() {
        let arcs = places(10.0, 7e6, &[Cut { arc_m: 5.0, half_width_m: 0.01 }]);
        assert!(arcs.windows(2).all(|pair| pair[0] < pair[1]));
        assert!(
            arcs.iter().any(|a| (a - 4.99).abs() < 1e-12) && arcs.iter().any(|a| (a - 5.01).abs() < 1e-12)
        );
        assert!(!arcs.iter().any(|a| (a - 5.0).abs() < 0.009));
    }
}
