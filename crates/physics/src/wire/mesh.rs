//! Segments and unknowns.

use super::error::WireError;
use super::grading::{Fineness, Wanted};
use super::segment::Segment;
use super::skeleton::{End, Skeleton};
use super::structure::{Structure, WireShape};
use super::vector::{Vec3, distance, dot, lerp, sub};

/// Segments of all wires and the unknown currents between them.
#[derive(Clone, Debug)]
pub(super) struct Mesh {
    pub segments: Vec<Segment>,
    /// Wire that each segment belongs to.
    pub wire_of: Vec<usize>,
    /// Port whose gap each segment lies in.
    pub port_of: Vec<Option<usize>>,
    /// Straight line that each segment lies on: segments with the same number are collinear.
    pub line_of: Vec<usize>,
    pub unknowns: Vec<Unknown>,
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
        let wanted = wanted_lengths(structure, skeleton, fineness, highest_hz);
        let mut mesh = Self {
            segments: Vec::new(),
            wire_of: Vec::new(),
            port_of: Vec::new(),
            line_of: Vec::new(),
            unknowns: Vec::new(),
        };
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
            for segment in first..last {
                mesh.unknowns
                    .push(Unknown { arms: [arm(segment, End::To, 1.0), arm(segment + 1, End::From, 1.0)] });
            }
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

    /// Unknowns of the joints: Kirchhoff's law holds because each takes from one arm what it gives to another.
    fn join(&mut self, skeleton: &Skeleton, end_segments: &[[usize; 2]]) {
        for joint in &skeleton.joints {
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
    /// Unit vector from a joint along a stretch.
    pub fn outward(&self, at: super::skeleton::StretchEnd) -> Vec3 {
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
fn wanted_lengths(
    structure: &Structure,
    skeleton: &Skeleton,
    fineness: &Fineness,
    highest_hz: f64,
) -> Vec<Wanted> {
    let longest_m = crate::constants::SPEED_OF_LIGHT_M_PER_S / highest_hz / fineness.per_wavelength;
    let growth = fineness.growth(longest_m);
    let farthest_m = growth.distance_of(longest_m);
    let mut at_joints_m: Vec<f64> = (0..skeleton.joints.len())
        .map(|joint| {
            let shortest_m = shortest_at_joint(structure, skeleton, fineness, joint);
            if shortest_m < longest_m { growth.start_m(shortest_m).min(farthest_m) } else { farthest_m }
        })
        .collect();
    // A short length is felt through smooth vertices and joints; each round carries it one stretch further.
    let mut changed = true;
    while changed {
        changed = false;
        for stretch in &skeleton.stretches {
            let [from, to] = stretch.joints;
            for (near, far) in [(from, to), (to, from)] {
                let felt_m = at_joints_m[near] + stretch.length_m;
                if felt_m < at_joints_m[far] * (1.0 - 1e-9) {
                    at_joints_m[far] = felt_m;
                    changed = true;
                }
            }
        }
    }
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
    let ends = &skeleton.joints[joint].stretches;
    let wire =
        |index: usize| -> &WireShape { &structure.wires[skeleton.stretches[ends[index].stretch].wire] };
    let largest_m = (0..ends.len()).map(|index| finest_radius_m(wire(index))).fold(0.0, f64::max);
    let mut shortest_m = f64::INFINITY;
    let own = match ends.len() {
        1 if skeleton.joints[joint].grounded => f64::INFINITY,
        1 => fineness.end_radii * largest_m,
        2 => {
            let cosine = -dot(skeleton.outward(ends[0]), skeleton.outward(ends[1]));
            let smooth = cosine >= SMOOTH_BEND_DEG.to_radians().cos();
            let same = wire(0).radius_m.total_cmp(&wire(1).radius_m).is_eq();
            if smooth && same { f64::INFINITY } else { fineness.bend_radii * largest_m }
        }
        _ => fineness.bend_radii * largest_m,
    };
    shortest_m = shortest_m.min(own);
    let ports = || ends.iter().map(|at| skeleton.stretches[at.stretch].port);
    for port in ports().flatten() {
        if ports().any(|other| other != Some(port)) || skeleton.joints[joint].grounded {
            let gap_m = structure.ports[port].gap_m;
            shortest_m = shortest_m.min((gap_m / fineness.per_gap).max(fineness.end_radii * largest_m));
        }
    }
    shortest_m
}

/// Radius that the shortest segment is measured in.
///
/// The cover's effect on the charge is taken as local. It is, over lengths above the cover's own thickness; on shorter
/// segments the matrix would take away more than there is.
fn finest_radius_m(wire: &WireShape) -> f64 {
    match &wire.material.insulation {
        Some(cover) => wire.radius_m.max(COVER_RADII * cover.outer_radius_m),
        None => wire.radius_m,
    }
}

/// Shortest segment of an insulated wire, in radii over the cover.
const COVER_RADII: f64 = 3.0;
