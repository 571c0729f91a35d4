//! What the geometry of a mesh gives once, for all frequencies: distances and static moments of all pairs of segments.
//!
//! The vector and scalar potentials of every segment are tested on every other. Each segment has two Gauss points;
//! their distances serve the part of the kernel that depends on frequency. Pairs that are near against their length get
//! the static part as exact moments instead, as a correction to what the Gauss points give.

use pulp::{Arch, Simd, WithSimd};

use super::lanes::{Lanes, PAD, padded};
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
        Self::with(segments, line_of, sources, |p, q, c_m| {
            if p.length_m <= q.length_m { skew(p, q, c_m) } else { skew(q, p, c_m).exchanged() }
        })
    }

    /// The same with the moments of two segments at an angle or side by side as told, for the kernel 1/√(R² + c²).
    pub fn with(
        segments: &[Segment],
        line_of: &[usize],
        sources: Sources,
        moments: impl Fn(&Axis, &Axis, f64) -> Moments,
    ) -> Self {
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
        let columns = source_columns(&source_axes);
        let mut begin = 0;
        for (row, p) in axes.iter().enumerate() {
            let end = begin + FIELDS * padded(row + 1);
            let table = &mut coupling.table[begin..end];
            Arch::new().dispatch(Distances { p, columns: &columns, table });
            let first_near = coupling.near.len();
            for (column, q) in source_axes[..=row].iter().enumerate() {
                if !p.is_near(q) {
                    continue;
                }
                let one_line = match sources {
                    Sources::Themselves => line_of[row] == line_of[column],
                    Sources::Images => p.is_vertical_over(q),
                };
                let at = FIELDS * PAD * (column / PAD) + column % PAD;
                let distances = std::array::from_fn(|index| table[at + PAD * index]);
                let moments = if one_line { collinear(p, q) } else { moments(p, q, softening_m(p, q)) };
                coupling.near.push(Near { column, sums: moments.correction(p, q, distances) });
            }
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
}

/// c of the kernel 1/√(R² + c²) that stands for the mean over the surfaces of two segments not in one line.
fn softening_m(p: &Axis, q: &Axis) -> f64 {
    if p.touches(q) {
        // The value that two collinear segments that meet have in the mean: b = 4a/π.
        return 4.0 / std::f64::consts::PI
            * (0.5 * (p.radius_m * p.radius_m + q.radius_m * q.radius_m)).sqrt();
    }
    let d = sub(q.middle_m, p.middle_m);
    let share = |axis: &Axis| {
        let along = dot(d, axis.direction);
        (1.5 * along * along / dot(d, d) - 0.5).max(0.0) * axis.radius_m * axis.radius_m
    };
    (share(p) + share(q)).sqrt()
}

/// Fields of a source: middle, direction, square of the radius, half the distance of its Gauss points.
const SOURCE_FIELDS: usize = 8;

/// Sources in blocks of [`PAD`], fields after one another; the last block filled up with its first source.
fn source_columns(axes: &[Axis]) -> Vec<f64> {
    let mut columns = vec![0.0; SOURCE_FIELDS * padded(axes.len())];
    for column in 0..padded(axes.len()) {
        let axis = axes.get(column).unwrap_or(&axes[0]);
        let [x, y, z] = axis.middle_m;
        let [tx, ty, tz] = axis.direction;
        let reach_m = 0.5 * GAUSS * axis.length_m;
        let at = SOURCE_FIELDS * PAD * (column / PAD) + column % PAD;
        for (index, value) in
            [x, y, z, tx, ty, tz, axis.radius_m * axis.radius_m, reach_m].into_iter().enumerate()
        {
            columns[at + PAD * index] = value;
        }
    }
    columns
}

/// Fills in a row: distances of Gauss points with the kernel √(R² + c²) that stands for the mean over both surfaces.
///
/// The mean of 1/R over a circle of radius a across an axis at the angle θ to R is, to second order,
/// 1/R − a²·(3cos²θ − 1)/4R³, so c² gathers a²·(3cos²θ − 1)/2 from both. Broadside it would be negative; there wires
/// are far apart and it is left out.
struct Distances<'a> {
    p: &'a Axis,
    columns: &'a [f64],
    table: &'a mut [f64],
}

impl WithSimd for Distances<'_> {
    type Output = ();

    #[inline(always)]
    fn with_simd<S: Simd>(self, simd: S) {
        let per = PAD / S::F64_LANES;
        let (columns, _) = S::as_simd_f64s(self.columns);
        let (table, _) = S::as_mut_simd_f64s(self.table);
        let own = OwnLanes::new(simd, self.p);
        for (source, fields) in
            columns.chunks_exact(SOURCE_FIELDS * per).zip(table.chunks_exact_mut(FIELDS * per))
        {
            for part in 0..per {
                let mut lanes = [own.zero; SOURCE_FIELDS];
                for (index, lane) in lanes.iter_mut().enumerate() {
                    *lane = Lanes::new(simd, source[index * per + part]);
                }
                let (distances, cosine) = own.distances(lanes);
                for (index, distance) in distances.into_iter().enumerate() {
                    fields[index * per + part] = distance.value;
                    fields[(4 + index) * per + part] = (own.one / distance).value;
                }
                fields[8 * per + part] = cosine.value;
            }
        }
    }
}

/// The row's segment in all lanes.
struct OwnLanes<S: Simd> {
    middle: [Lanes<S>; 3],
    direction: [Lanes<S>; 3],
    radius2: Lanes<S>,
    reach: Lanes<S>,
    zero: Lanes<S>,
    one: Lanes<S>,
    tiny: Lanes<S>,
    three_halves: Lanes<S>,
    minus_half: Lanes<S>,
}

impl<S: Simd> OwnLanes<S> {
    #[inline(always)]
    fn new(simd: S, p: &Axis) -> Self {
        let ([x, y, z], [tx, ty, tz]) = (p.middle_m, p.direction);
        Self {
            middle: [Lanes::splat(simd, x), Lanes::splat(simd, y), Lanes::splat(simd, z)],
            direction: [Lanes::splat(simd, tx), Lanes::splat(simd, ty), Lanes::splat(simd, tz)],
            radius2: Lanes::splat(simd, p.radius_m * p.radius_m),
            reach: Lanes::splat(simd, 0.5 * GAUSS * p.length_m),
            zero: Lanes::splat(simd, 0.0),
            one: Lanes::splat(simd, 1.0),
            tiny: Lanes::splat(simd, TINY_RADII2 * p.radius_m * p.radius_m),
            three_halves: Lanes::splat(simd, 1.5),
            minus_half: Lanes::splat(simd, -0.5),
        }
    }

    /// Distances − to −, − to +, + to −, + to +, and the cosine between the directions.
    #[inline(always)]
    fn distances(
        &self,
        [x, y, z, tx, ty, tz, radius2, reach]: [Lanes<S>; SOURCE_FIELDS],
    ) -> ([Lanes<S>; 4], Lanes<S>) {
        let d = [x - self.middle[0], y - self.middle[1], z - self.middle[2]];
        let t = [tx, ty, tz];
        let d2 = dot_lanes(d, d);
        let (u_own, u) = (dot_lanes(d, self.direction), dot_lanes(d, t));
        let cosine = dot_lanes(t, self.direction);
        // A segment's own middle is in line with itself: the tiny number makes cos²θ one there.
        let inverse2 = self.one / (d2 + self.tiny);
        let own_share = self.share((u_own * u_own + self.tiny) * inverse2) * self.radius2;
        let c2 = self.share((u * u + self.tiny) * inverse2).times_plus(radius2, own_share);
        // |d ± r·t ∓ r′·t′|² = d² + r² + r′² + 2(±r′·d·t′ ∓ r·d·t) ∓ 2rr′·t·t′
        let base = self.reach.times_plus(self.reach, reach.times_plus(reach, d2 + c2));
        let (a, b) = (u_own * self.reach, u * reach);
        let (a, b) = (a + a, b + b);
        let cross = self.reach * reach * cosine;
        let cross = cross + cross;
        let (same, opposite) = (base - cross, base + cross);
        let (unlike, like) = (a - b, a + b);
        let mm = (same + unlike).sqrt();
        let mp = (opposite + like).sqrt();
        let pm = (opposite - like).sqrt();
        let pp = (same - unlike).sqrt();
        ([mm, mp, pm, pp], cosine)
    }

    /// max(0, (3cos²θ − 1)/2)
    #[inline(always)]
    fn share(&self, cosine2: Lanes<S>) -> Lanes<S> {
        cosine2.times_plus(self.three_halves, self.minus_half).max(self.zero)
    }
}

#[inline(always)]
fn dot_lanes<S: Simd>(a: [Lanes<S>; 3], b: [Lanes<S>; 3]) -> Lanes<S> {
    a[0].times_plus(b[0], a[1].times_plus(b[1], a[2] * b[2]))
}

/// What is added to squares of distances that may be zero, in squares of the radius.
const TINY_RADII2: f64 = 1e-12;

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
        let farthest_m = reach_m + 0.5 * (self.length_m + other.length_m);
        let d = sub(self.middle_m, other.middle_m);
        dot(d, d) < farthest_m * farthest_m && nearest(self.ends(), other.ends()).1 < reach_m
    }

    /// Both end at one point.
    fn touches(&self, other: &Self) -> bool {
        let near = |a: Vec3, b: Vec3| distance(a, b) < TOUCHING_RADII * self.radius_m;
        self.ends().iter().any(|&a| other.ends().iter().any(|&b| near(a, b)))
    }

    /// Both on one vertical line.
    fn is_vertical_over(&self, other: &Self) -> bool {
        let vertical = |axis: &Self| axis.direction[2].abs() > 1.0 - 1e-12;
        let d = sub(self.middle_m, other.middle_m);
        vertical(self) && vertical(other) && d[0].hypot(d[1]) < TOUCHING_RADII * self.radius_m
    }
}
