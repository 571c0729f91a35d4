//! Segments and unknowns.

use super::error::WireError;
use super::grading::{Fineness, Wanted};
use super::segment::Segment;
use super::skeleton::{End, Skeleton, StretchEnd};
use super::structure::{Structure, WireShape};
use crate::constants::SPEED_OF_LIGHT_M_PER_S;

use super::vector::{Vec3, distance, dot, lerp, sub};

/// Segments of all wires and the unknown currents between them.
#[derive(Clone, Debug, Default)]
pub(super) struct Mesh {
    pub segments: Vec<Segment>,
    /// Wire that each segment belongs to.
    pub wire_of: Vec<usize>,
    /// Port whose gap each segment lies in.
    pub port_of: Vec<Option<usize>>,
    /// Straight line that each segment lies on: segments with the same number are collinear.
    pub line_of: Vec<usize>,
    /// Unknowns of the runs first, then those of joints.
    pub unknowns: Vec<Unknown>,
    /// Segments that follow one another without a fork.
    pub runs: Vec<Run>,
}

/// Unknowns `first_unknown + i` between segments `first_segment + i` and `first_segment + i + 1`.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) struct Run {
    pub first_segment: usize,
    pub first_unknown: usize,
    pub unknowns: usize,
}

/// A current that flows out of one segment into another, one ampere where they meet and none at their far ends.
///
/// A wire's end on the mirror has an unknown with one arm: the image is the other.
#[derive(Clone, Copy, Debug)]
pub(super) struct Unknown {
    pub arms: [Option<Arm>; 2],
}

/// An unknown's share in the current at one end of a segment.
#[derive(Clone, Copy, Debug)]
pub(super) struct Arm {
    pub segment: usize,
    pub end: End,
    /// +1 or −1: current at this end, from → to, per ampere of the unknown.
    pub sign: f64,
}

/// Bends below this get no extra grading (degrees).
const SMOOTH_BEND_DEG: f64 = 15.0;
/// Most unknowns: the dense solution of more takes seconds.
const MOST_UNKNOWNS: usize = 3000;

impl Mesh {
    pub fn new(
        structure: &Structure,
        skeleton: &Skeleton,
        fineness: &Fineness,
        highest_hz: f64,
    ) -> Result<Self, WireError> {
        let wavelength_m = SPEED_OF_LIGHT_M_PER_S / highest_hz;
        let length_m: f64 = skeleton.stretches.iter().map(|stretch| stretch.length_m).sum();
        let fineness = &fineness.of_length(length_m / wavelength_m);
        let longest_m = wavelength_m / fineness.per_wavelength;
        let crowded = |joint: usize| shortest_at_joint(structure, skeleton, fineness, joint) < longest_m;
        let skeleton = &skeleton.cut_beside(crowded, longest_m);
        let wanted = wanted_lengths(structure, skeleton, fineness, longest_m);
        let mut mesh = Self::default();
        let mut end_segments = Vec::with_capacity(skeleton.stretches.len());
        for (index, (stretch, wanted)) in skeleton.stretches.iter().zip(&wanted).enumerate() {
            let [from_m, to_m] = stretch.joints.map(|joint| skeleton.joints[joint].position_m);
            let first = mesh.segments.len();
            for pair in wanted.nodes().windows(2) {
                mesh.segments.push(Segment {
                    from_m: lerp(from_m, to_m, pair[0]),
                    to_m: lerp(from_m, to_m, pair[1]),
                    radius_m: structure.wires[stretch.wire].radius_m,
                });
                mesh.wire_of.push(stretch.wire);
                mesh.port_of.push(stretch.port);
                mesh.line_of.push(index);
            }
            let last = mesh.segments.len() - 1;
            mesh.chain(first, last, skeleton.goes_on(index));
            end_segments.push([first, last]);
        }
        mesh.join(skeleton, &end_segments);
        mesh.merge_lines(skeleton);
        if mesh.unknowns.len() > MOST_UNKNOWNS {
            let unknowns = mesh.unknowns.len();
            return Err(WireError::TooLarge { unknowns, most: MOST_UNKNOWNS, frequency_hz: highest_hz });
        }
        Ok(mesh)
    }

    /// Adds the unknowns of a stretch, and of its joint to the one before if that goes straight on.
    fn chain(&mut self, first: usize, last: usize, goes_on: bool) {
        let from = if goes_on { first - 1 } else { first };
        match self.runs.last_mut() {
            Some(run) if goes_on => run.unknowns += last - from,
            _ => self.runs.push(Run {
                first_segment: first,
                first_unknown: self.unknowns.len(),
                unknowns: last - from,
            }),
        }
        for segment in from..last {
            self.unknowns
                .push(Unknown { arms: [arm(segment, End::To, 1.0), arm(segment + 1, End::From, 1.0)] });
        }
    }

    /// Unknowns of the joints: Kirchhoff's law holds because each takes from one arm what it gives to another.
    fn join(&mut self, skeleton: &Skeleton, end_segments: &[[usize; 2]]) {
        for joint in &skeleton.joints {
            if joint.stretches.iter().any(|at| at.end == End::From && skeleton.goes_on(at.stretch)) {
                continue;
            }
            let ends: Vec<(usize, End)> = joint
                .stretches
                .iter()
                .map(|at| (end_segments[at.stretch][usize::from(at.end == End::To)], at.end))
                .collect();
            // Current from → to is current into the joint at a segment's end, out of it at a segment's beginning.
            let into =
                |&(segment, end): &(usize, End)| arm(segment, end, if end == End::To { 1.0 } else { -1.0 });
            let out_of =
                |&(segment, end): &(usize, End)| arm(segment, end, if end == End::To { -1.0 } else { 1.0 });
            if joint.grounded {
                self.unknowns.extend(ends.iter().map(|end| Unknown { arms: [into(end), None] }));
            } else if let Some((first, others)) = ends.split_first() {
                self.unknowns.extend(others.iter().map(|end| Unknown { arms: [into(first), out_of(end)] }));
            }
        }
    }

    /// Stretches that go straight on through a joint lie on one line.
    fn merge_lines(&mut self, skeleton: &Skeleton) {
        let mut line: Vec<usize> = (0..skeleton.stretches.len()).collect();
        for joint in &skeleton.joints {
            for (index, a) in joint.stretches.iter().enumerate() {
                for b in &joint.stretches[..index] {
                    let (out_a, out_b) = (skeleton.outward(*a), skeleton.outward(*b));
                    if dot(out_a, out_b) < -1.0 + 1e-12 {
                        let (keep, gone) = (line[a.stretch], line[b.stretch]);
                        line.iter_mut().filter(|line| **line == gone).for_each(|line| *line = keep);
                    }
                }
            }
        }
        for line_of in &mut self.line_of {
            *line_of = line[*line_of];
        }
    }
}

impl Skeleton {
    /// Whether a stretch is the plain continuation of the one before it.
    fn goes_on(&self, stretch: usize) -> bool {
        let joint = &self.joints[self.stretches[stretch].joints[0]];
        let both = stretch > 0 && joint.stretches.len() == 2 && !joint.grounded;
        both && joint.stretches.contains(&StretchEnd { stretch: stretch - 1, end: End::To })
    }

    /// Unit vector from a joint along a stretch.
    pub fn outward(&self, at: StretchEnd) -> Vec3 {
        let stretch = &self.stretches[at.stretch];
        let [from_m, to_m] = stretch.joints.map(|joint| self.joints[joint].position_m);
        let along = if at.end == End::From { sub(to_m, from_m) } else { sub(from_m, to_m) };
        let length_m = distance(from_m, to_m);
        along.map(|component| component / length_m)
    }
}

fn arm(segment: usize, end: End, sign: f64) -> Option<Arm> {
    Some(Arm { segment, end, sign })
}

/// Wanted segment lengths of every stretch.
///
/// A place counts by its distance from the nearest crowding of charge, on its own wire or on another beside it.
fn wanted_lengths(
    structure: &Structure,
    skeleton: &Skeleton,
    fineness: &Fineness,
    longest_m: f64,
) -> Vec<Wanted> {
    let growth = fineness.growth(longest_m);
    let starts_m: Vec<(Vec3, f64)> = (0..skeleton.joints.len())
        .map(|joint| {
            (skeleton.joints[joint].position_m, shortest_at_joint(structure, skeleton, fineness, joint))
        })
        .filter(|(_, shortest_m)| *shortest_m < longest_m)
        .map(|(position_m, shortest_m)| (position_m, growth.start_m(shortest_m)))
        .collect();
    let farthest_m = growth.distance_of(longest_m);
    let felt_m = |at_m: Vec3| {
        starts_m.iter().map(|&(from_m, start_m)| start_m + distance(from_m, at_m)).fold(farthest_m, f64::min)
    };
    let at_joints_m: Vec<f64> = skeleton.joints.iter().map(|joint| felt_m(joint.position_m)).collect();
    skeleton
        .stretches
        .iter()
        .map(|stretch| Wanted {
            length_m: stretch.length_m,
            at_ends_m: stretch.joints.map(|joint| at_joints_m[joint]),
            longest_m,
            growth,
        })
        .collect()
}

/// Shortest segment at a joint for its own sake; infinite where the wire just goes on.
fn shortest_at_joint(structure: &Structure, skeleton: &Skeleton, fineness: &Fineness, joint: usize) -> f64 {
    let at = &skeleton.joints[joint];
    let wires = || at.stretches.iter().map(|end| &structure.wires[skeleton.stretches[end.stretch].wire]);
    let largest_m = wires().map(|wire| wire.radius_m).fold(0.0, f64::max);
    let own = match at.stretches[..] {
        [_] if at.grounded => f64::INFINITY,
        [_] => fineness.end_radii * largest_m,
        [a, b] => {
            let cosine = -dot(skeleton.outward(a), skeleton.outward(b));
            let smooth = cosine >= SMOOTH_BEND_DEG.to_radians().cos();
            let same = wires().all(|wire| wire.radius_m.total_cmp(&largest_m).is_eq());
            if smooth && same { f64::INFINITY } else { fineness.bend_radii * largest_m }
        }
        _ => fineness.bend_radii * largest_m,
    };
    let ports = || at.stretches.iter().map(|end| skeleton.stretches[end.stretch].port);
    let is_edge = |port: &usize| at.grounded || ports().any(|other| other != Some(*port));
    let gap_m = ports()
        .flatten()
        .filter(is_edge)
        .map(|port| structure.ports[port].gap_m / fineness.per_gap)
        .fold(f64::INFINITY, f64::min);
    own.min(gap_m.max(fineness.end_radii * largest_m)).max(wires().map(thinnest_local_m).fold(0.0, f64::max))
}

/// Shortest segment for which the cover's effect on the charge is local, as it is taken to be: not much shorter than
/// the cover is thick. On shorter ones the matrix would take away more than there is.
fn thinnest_local_m(wire: &WireShape) -> f64 {
    wire.material.insulation.map_or(0.0, |cover| COVER_RADII * cover.outer_radius_m)
}

/// Shortest segment of an insulated wire, in radii over the cover.
const COVER_RADII: f64 = 3.0;
