//! What the geometry of a mesh gives once, for all frequencies: distances and static moments of all pairs of segments.
//!
//! The vector and scalar potentials of every segment are tested on every other. Each segment has two Gauss points;
//! their distances serve the part of the kernel that depends on frequency. Pairs that are near against their length get
//! the static part as exact moments instead, as a correction to what the Gauss points give.

use super::lanes::{PAD, padded};
use super::moments::{Axis, Moments, collinear, skew};
use super::segment::Segment;
use super::vector::{Vec3, advance, distance, dot, mirrored, nearest, sub};

/// Gauss points of two per segment, at ξ = ±1/√3.
pub(super) const GAUSS: f64 = 0.577_350_269_189_625_8;

/// Segments nearer than this, in lengths of the longer one, get exact static moments.
const NEAR: f64 = 1.5;

/// Pairs of segments, lower triangle with the diagonal, row by row.
#[derive(Clone, Debug)]
pub(super) struct Coupling {
    rows: Vec<Row>,
    /// Of every row, in blocks of [`PAD`] pairs, [`FIELDS`] fields after one another: distances of Gauss points in m
    /// (− to −, − to +, + to −, + to +, first sign that of the row's segment), 1/R, and the cosine between the currents.
    table: Vec<f64>,
    /// Static corrections, by row.
    near: Vec<Near>,
    /// −1 for images of current and charge in the mirror.
    pub sign: f64,
}

/// Fields of a pair.
pub(super) const FIELDS: usize = 9;

/// One row's part in the tables.
#[derive(Clone, Copy, Debug)]
struct Row {
    table: [usize; 2],
    near: [usize; 2],
}

/// Static correction of a near pair, in sums over pairs of Gauss points, 1/m.
#[derive(Clone, Copy, Debug)]
pub(super) struct Near {
    pub column: usize,
    /// Of Σ 1/R, Σ ±1/R with the row's sign, with the column's, with both.
    pub sums: [f64; 4],
}

/// What acts on the segments.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Sources {
    /// The segments themselves.
    Themselves,
    /// Their images in the plane z = 0.
    Images,
}

impl Coupling {
    /// Pairs of the segments with themselves or their images; `line_of` as in the mesh.
    pub fn new(segments: &[Segment], line_of: &[usize], sources: Sources) -> Self {
        let axes: Vec<Axis> = segments.iter().map(Axis::of).collect();
        let source_axes: Vec<Axis> = match sources {
            Sources::Themselves => axes.clone(),
            Sources::Images => axes.iter().map(Axis::image).collect(),
        };
        let length = (0..axes.len()).map(|row| FIELDS * padded(row + 1)).sum();
        let mut coupling = Self {
            rows: Vec::with_capacity(axes.len()),
            table: vec![0.0; length],
            near: Vec::new(),
            sign: if sources == Sources::Images { -1.0 } else { 1.0 },
        };
        let mut begin = 0;
        for (row, p) in axes.iter().enumerate() {
            let first_near = coupling.near.len();
            for (column, q) in source_axes[..=row].iter().enumerate() {
                let relation = match sources {
                    Sources::Themselves if line_of[row] == line_of[column] => Relation::OneLine,
                    Sources::Images if p.is_vertical_over(q) => Relation::OneLine,
                    _ => Relation::between(p, q),
                };
                coupling.set(p, q, &relation, (begin, column));
            }
            let end = begin + FIELDS * padded(row + 1);
            coupling.rows.push(Row { table: [begin, end], near: [first_near, coupling.near.len()] });
            begin = end;
        }
        coupling
    }

    /// Blocks of fields of a row.
    pub fn table(&self, row: usize) -> &[f64] {
        let [begin, end] = self.rows[row].table;
        &self.table[begin..end]
    }

    /// Static corrections of a row.
    pub fn near(&self, row: usize) -> &[Near] {
        let [begin, end] = self.rows[row].near;
        &self.near[begin..end]
    }

    /// Fills in the pair of a row that begins at `begin` with a column.
    fn set(&mut self, p: &Axis, q: &Axis, relation: &Relation, (begin, column): (usize, usize)) {
        let c2 = relation.softening2(p, q);
        let [p_points, q_points] = [p, q].map(|axis| [axis.end(-GAUSS), axis.end(GAUSS)]);
        let distances = [(0, 0), (0, 1), (1, 0), (1, 1)].map(|(a, b)| {
            let d = sub(p_points[a], q_points[b]);
            (dot(d, d) + c2).sqrt()
        });
        let at = begin + FIELDS * PAD * (column / PAD) + column % PAD;
        for (index, distance_m) in distances.into_iter().enumerate() {
            self.table[at + PAD * index] = distance_m;
            self.table[at + PAD * (4 + index)] = distance_m.recip();
        }
        self.table[at + PAD * 8] = dot(p.direction, q.direction);
        let moments = match relation {
            _ if !p.is_near(q) => return,
            Relation::OneLine => collinear(p, q),
            _ if p.length_m <= q.length_m => skew(p, q, c2.sqrt()),
            _ => skew(q, p, c2.sqrt()).exchanged(),
        };
        self.near.push(Near { column, sums: moments.correction(p, q, distances) });
    }
}

impl Moments {
    /// Exact sums minus those of the Gauss points.
    ///
    /// A density linear along the segment has the values ξ = ±1/√3 at the points, each with weight L/2, so that
    /// Σ L/2·L'/2·(±1)ⁱ·(±1)ʲ·P = 3^((i+j)/2)·Mᵢⱼ.
    fn correction(&self, p: &Axis, q: &Axis, distances: [f64; 4]) -> [f64; 4] {
        let weight = 4.0 / (p.length_m * q.length_m);
        let root3 = 3_f64.sqrt();
        let [mm, mp, pm, pp] = distances.map(f64::recip);
        [
            weight * self.m00 - (mm + mp + pm + pp),
            weight * root3 * self.m10 - (pm + pp - mm - mp),
            weight * root3 * self.m01 - (mp + pp - mm - pm),
            weight * 3.0 * self.m11 - (mm + pp - mp - pm),
        ]
    }
}

/// How two segments lie to each other.
enum Relation {
    /// On one straight line.
    OneLine,
    /// Meeting at an angle.
    Touching,
    /// Apart.
    Apart,
}

impl Relation {
    fn between(p: &Axis, q: &Axis) -> Self {
        let touching = [-1.0, 1.0].iter().any(|&a| {
            [-1.0, 1.0].iter().any(|&b| distance(p.end(a), q.end(b)) < TOUCHING_RADII * p.radius_m)
        });
        if touching { Self::Touching } else { Self::Apart }
    }

    /// c² of the kernel 1/√(R² + c²) that stands for the mean over both surfaces.
    fn softening2(&self, p: &Axis, q: &Axis) -> f64 {
        match self {
            // Mean of b² over both tubes.
            Self::OneLine => p.radius_m * p.radius_m + q.radius_m * q.radius_m,
            // The value that two collinear segments that meet have in the mean: b = 4a/π.
            Self::Touching => {
                let mean = 0.5 * (p.radius_m * p.radius_m + q.radius_m * q.radius_m);
                16.0 / (std::f64::consts::PI * std::f64::consts::PI) * mean
            }
            // Mean of 1/R over a circle of radius a across an axis at the angle θ to R: to second order
            // 1/R − a²·(3cos²θ − 1)/4R³. Broadside it would add; there wires are far apart and it is left out.
            Self::Apart => {
                let d = sub(q.middle_m, p.middle_m);
                let share = |axis: &Axis| {
                    let along = dot(d, axis.direction);
                    0.5 * (3.0 * along * along / dot(d, d) - 1.0).max(0.0) * axis.radius_m * axis.radius_m
                };
                share(p) + share(q)
            }
        }
    }
}

/// Ends of segments this near, in radii, are one point.
const TOUCHING_RADII: f64 = 1e-3;

impl Axis {
    pub fn of(segment: &Segment) -> Self {
        let direction = segment.direction();
        let length_m = segment.length_m();
        let middle_m = advance(segment.from_m, direction, 0.5 * length_m);
        Self { middle_m, direction, length_m, radius_m: segment.radius_m }
    }

    fn image(&self) -> Self {
        Self { middle_m: mirrored(self.middle_m), direction: mirrored(self.direction), ..*self }
    }

    fn ends(&self) -> [Vec3; 2] {
        [self.end(-1.0), self.end(1.0)]
    }

    fn is_near(&self, other: &Self) -> bool {
        let reach_m = NEAR * self.length_m.max(other.length_m);
        let half_lengths_m = 0.5 * (self.length_m + other.length_m);
        distance(self.middle_m, other.middle_m) < reach_m + half_lengths_m
            && nearest(self.ends(), other.ends()).1 < reach_m
    }

    /// Both on one vertical line.
    fn is_vertical_over(&self, other: &Self) -> bool {
        let vertical = |axis: &Self| axis.direction[2].abs() > 1.0 - 1e-12;
        let d = sub(self.middle_m, other.middle_m);
        vertical(self) && vertical(other) && d[0].hypot(d[1]) < TOUCHING_RADII * self.radius_m
    }
}
