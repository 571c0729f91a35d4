//! From polylines to joints and the straight stretches between them, ports included.

use super::error::WireError;
use super::structure::Structure;
use super::vector::{Vec3, along, distance, lerp};

/// Vertices of different wires that are this near are joined, m.
pub(super) const JOINT_TOLERANCE_M: f64 = 1e-3;

/// A point where stretches begin or end.
#[derive(Clone, Debug)]
pub(super) struct Joint {
    pub position_m: Vec3,
    /// On the mirror: current flows on into the image.
    pub grounded: bool,
    /// Stretches that meet here.
    pub stretches: Vec<StretchEnd>,
}

/// One end of a stretch.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) struct StretchEnd {
    pub stretch: usize,
    pub end: End,
}

/// Beginning or end of a stretch or segment.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum End {
    From,
    To,
}

/// Straight stretch of one wire between two joints.
#[derive(Clone, Copy, Debug)]
pub(super) struct Stretch {
    pub wire: usize,
    pub joints: [usize; 2],
    pub length_m: f64,
    /// Port whose gap it is part of.
    pub port: Option<usize>,
}

/// Joints and stretches.
#[derive(Clone, Debug, Default)]
pub(super) struct Skeleton {
    pub joints: Vec<Joint>,
    pub stretches: Vec<Stretch>,
}

impl Skeleton {
    /// Joins the wires and cuts them at the edges of the ports' gaps.
    pub fn new(structure: &Structure) -> Result<Self, WireError> {
        let mut skeleton = Self::default();
        let mut lengths_m = Vec::with_capacity(structure.wires.len());
        for wire in &structure.wires {
            for &vertex_m in &wire.vertices_m {
                skeleton.joint_at(vertex_m);
            }
            lengths_m.push(wire.vertices_m.windows(2).map(|pair| distance(pair[0], pair[1])).sum::<f64>());
        }
        let gaps = Gap::place(structure, &lengths_m, &skeleton.vertex_degrees(structure))?;
        for (index, wire) in structure.wires.iter().enumerate() {
            let on_wire: Vec<&Gap> = gaps.iter().filter(|gap| gap.wire == index).collect();
            let mut arc_m = 0.0;
            for pair in wire.vertices_m.windows(2) {
                let side = Side { wire: index, from_m: pair[0], to_m: pair[1], arc_m };
                skeleton.cut(&side, &on_wire);
                arc_m += distance(pair[0], pair[1]);
            }
        }
        if structure.boundary.connects() {
            for joint in &mut skeleton.joints {
                joint.grounded = joint.position_m[2].abs() <= JOINT_TOLERANCE_M;
            }
        }
        Ok(skeleton)
    }

    /// Number of stretches of polyline that meet at each vertex's joint.
    fn vertex_degrees(&mut self, structure: &Structure) -> Vec<[Degree; 2]> {
        let mut degrees = vec![0_usize; self.joints.len()];
        for wire in &structure.wires {
            for pair in wire.vertices_m.windows(2) {
                for &vertex_m in pair {
                    degrees[self.joint_at(vertex_m)] += 1;
                }
            }
        }
        let mut end = |vertex_m: Option<&Vec3>| {
            let Some(&vertex_m) = vertex_m else { return Degree::Open };
            let grounded = structure.boundary.connects() && vertex_m[2].abs() <= JOINT_TOLERANCE_M;
            if grounded || degrees[self.joint_at(vertex_m)] > 1 { Degree::Joined } else { Degree::Open }
        };
        let ends = |vertices_m: &Vec<Vec3>| [end(vertices_m.first()), end(vertices_m.last())];
        structure.wires.iter().map(|wire| &wire.vertices_m).map(ends).collect()
    }

    /// Index of the joint at a point, made if there is none.
    fn joint_at(&mut self, position_m: Vec3) -> usize {
        let near = |joint: &Joint| distance(joint.position_m, position_m) <= JOINT_TOLERANCE_M;
        self.joints.iter().position(near).unwrap_or_else(|| self.new_joint(position_m))
    }

    fn new_joint(&mut self, position_m: Vec3) -> usize {
        self.joints.push(Joint { position_m, grounded: false, stretches: Vec::new() });
        self.joints.len() - 1
    }

    /// Cuts one side of a polyline at the edges of gaps.
    fn cut(&mut self, side: &Side, gaps: &[&Gap]) {
        let length_m = distance(side.from_m, side.to_m);
        let end_m = side.arc_m + length_m;
        let mut edges_m: Vec<f64> = gaps
            .iter()
            .flat_map(|gap| gap.edges_m)
            .filter(|&edge_m| edge_m > side.arc_m + EDGE_SNAP_M && edge_m < end_m - EDGE_SNAP_M)
            .collect();
        edges_m.sort_by(f64::total_cmp);
        edges_m.dedup_by(|a, b| (*a - *b).abs() <= EDGE_SNAP_M);
        edges_m.push(end_m);
        let last = edges_m.len() - 1;
        let mut from = (self.joint_at(side.from_m), side.arc_m);
        for (index, edge_m) in edges_m.into_iter().enumerate() {
            let joint = if index == last {
                self.joint_at(side.to_m)
            } else {
                self.new_joint(lerp(side.from_m, side.to_m, (edge_m - side.arc_m) / length_m))
            };
            let middle_m = 0.5 * (from.1 + edge_m);
            let inside = |gap: &&&Gap| gap.edges_m[0] < middle_m && middle_m < gap.edges_m[1];
            let port = gaps.iter().find(inside).map(|gap| gap.port);
            let of = Stretch { wire: side.wire, joints: [0; 2], length_m: 0.0, port };
            self.push(&of, [from.0, joint]);
            from = (joint, edge_m);
        }
    }
}

impl Skeleton {
    /// Cuts the stretches where a joint of another wire, crowded with charge, is nearest: there the charge changes over
    /// the distance between the wires. Joints farther than `reach_m` do not matter.
    pub fn cut_beside(&self, crowded: impl Fn(usize) -> bool, reach_m: f64) -> Self {
        let crowds_m: Vec<(usize, Vec3)> = (0..self.joints.len())
            .filter(|&joint| crowded(joint))
            .map(|joint| (joint, self.joints[joint].position_m))
            .collect();
        let mut cut =
            Self { joints: self.joints.clone(), stretches: Vec::with_capacity(self.stretches.len()) };
        for joint in &mut cut.joints {
            joint.stretches.clear();
        }
        for stretch in &self.stretches {
            let mut from = stretch.joints[0];
            for place_m in self.places_beside(stretch, &crowds_m, reach_m) {
                let to = cut.new_joint(place_m);
                cut.push(stretch, [from, to]);
                from = to;
            }
            cut.push(stretch, [from, stretch.joints[1]]);
        }
        cut
    }

    /// Places on a stretch beside crowded joints, in order, none much nearer to another or an end than to its joint.
    fn places_beside(&self, stretch: &Stretch, crowds_m: &[(usize, Vec3)], reach_m: f64) -> Vec<Vec3> {
        if stretch.port.is_some() {
            return Vec::new();
        }
        let [from_m, to_m] = stretch.joints.map(|joint| self.joints[joint].position_m);
        let mut places: Vec<(f64, f64)> = crowds_m
            .iter()
            .filter(|(joint, _)| !stretch.joints.contains(joint))
            .map(|&(_, at_m)| {
                let part = along([from_m, to_m], at_m);
                (part * stretch.length_m, distance(at_m, lerp(from_m, to_m, part)))
            })
            .filter(|&(arc_m, away_m)| away_m < reach_m && arc_m.min(stretch.length_m - arc_m) > away_m)
            .collect();
        places.sort_by(|a, b| a.0.total_cmp(&b.0));
        places.dedup_by(|next, kept| next.0 - kept.0 < next.1.max(kept.1));
        places.iter().map(|&(arc_m, _)| lerp(from_m, to_m, arc_m / stretch.length_m)).collect()
    }

    /// Adds a part of a stretch.
    fn push(&mut self, of: &Stretch, joints: [usize; 2]) {
        let stretch = self.stretches.len();
        self.joints[joints[0]].stretches.push(StretchEnd { stretch, end: End::From });
        self.joints[joints[1]].stretches.push(StretchEnd { stretch, end: End::To });
        let length_m = distance(self.joints[joints[0]].position_m, self.joints[joints[1]].position_m);
        self.stretches.push(Stretch { joints, length_m, ..*of });
    }
}

/// Edges of gaps nearer than this to a vertex are moved onto it, m.
const EDGE_SNAP_M: f64 = 1e-5;

/// One side of a polyline.
struct Side {
    wire: usize,
    from_m: Vec3,
    to_m: Vec3,
    arc_m: f64,
}

/// What the end of a wire is.
#[derive(Clone, Copy, PartialEq, Eq)]
enum Degree {
    Open,
    Joined,
}

/// A port's gap, in metres of arc of its wire.
struct Gap {
    port: usize,
    wire: usize,
    edges_m: [f64; 2],
}

impl Gap {
    fn place(structure: &Structure, lengths_m: &[f64], ends: &[[Degree; 2]]) -> Result<Vec<Self>, WireError> {
        let mut gaps: Vec<Self> = Vec::with_capacity(structure.ports.len());
        for (port, place) in structure.ports.iter().enumerate() {
            let length_m = lengths_m[place.wire];
            let open_end = WireError::PortOnOpenEnd {
                port,
                wire: place.wire,
                arc_m: place.arc_m,
                length_m,
                gap_m: place.gap_m,
            };
            let half_m = 0.5 * place.gap_m;
            if place.gap_m > length_m || place.arc_m < -EDGE_SNAP_M || place.arc_m > length_m + EDGE_SNAP_M {
                return Err(open_end);
            }
            let mut centre_m = place.arc_m;
            let beyond = [half_m - place.arc_m, place.arc_m + half_m - length_m];
            for (index, sign) in [(0, 1.0), (1, -1.0)] {
                let open = ends[place.wire][index] == Degree::Open;
                if open && beyond[index] > -2.0 * structure.wires[place.wire].radius_m {
                    return Err(open_end);
                }
                if beyond[index] > EDGE_SNAP_M {
                    centre_m += sign * beyond[index];
                }
            }
            let gap = Self { port, wire: place.wire, edges_m: [centre_m - half_m, centre_m + half_m] };
            for other in gaps.iter().filter(|other| other.wire == gap.wire) {
                let apart_m = (gap.edges_m[0] - other.edges_m[1]).max(other.edges_m[0] - gap.edges_m[1]);
                if apart_m < -EDGE_SNAP_M {
                    return Err(WireError::PortsOverlap { ports: [other.port, port] });
                }
            }
            gaps.push(gap);
        }
        Ok(gaps)
    }
}
