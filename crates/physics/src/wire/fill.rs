//! The matrix of the moment method at one frequency.
//!
//! Everything here is over jkη/4π, the factor that all couplings share.

use num_complex::Complex64;
use pulp::{Arch, Simd, WithSimd};

use super::coupling::{Coupling, FIELDS, GAUSS};
use super::lanes::{Lanes, PAD, padded};
use super::mesh::{Mesh, Run};
use super::shapes::Shapes;
use super::shares::Shares;
use super::symmetric::Symmetric;

/// What a matrix is made of.
pub(super) struct Terms<'a> {
    pub mesh: &'a Mesh,
    pub shares: &'a Shares,
    pub couplings: &'a [Coupling],
    /// What a segment's end currents do to themselves and to each other, by metal and cover.
    pub own: &'a [[Complex64; 2]],
    /// Wave number, rad/m.
    pub k: f64,
}

impl Terms<'_> {
    /// Their sum.
    pub fn matrix(&self) -> Symmetric {
        let mut matrix = Symmetric::zero(self.mesh.unknowns.len());
        let columns = Columns::new(self.mesh, self.k);
        Arch::new().dispatch(Fill { terms: self, columns: &columns, matrix: &mut matrix });
        matrix
    }
}

/// Shapes of all segments as sources, halved, in blocks of [`PAD`] segments: even, odd and even slope.
struct Columns {
    shapes: Vec<Shapes>,
    table: Vec<f64>,
}

impl Columns {
    fn new(mesh: &Mesh, k: f64) -> Self {
        let shapes: Vec<Shapes> =
            mesh.segments.iter().map(|segment| Shapes::new(k, segment.length_m())).collect();
        let mut table = vec![0.0; 3 * padded(shapes.len())];
        for (column, shape) in shapes.iter().enumerate() {
            let at = 3 * PAD * (column / PAD) + column % PAD;
            table[at] = 0.5 * shape.even;
            table[at + PAD] = 0.5 * shape.odd;
            table[at + 2 * PAD] = 0.5 * shape.even_slope;
        }
        Self { shapes, table }
    }
}

/// Couplings of the two end currents of one segment with those of all before it and its own.
pub(super) struct Blocks {
    /// Real parts, then imaginary parts, of beginning–beginning, beginning–end, end–beginning, end–end; the row's end
    /// first.
    parts: [Vec<f64>; 8],
}

/// Which end, as an index.
pub(super) const BEGINNING: usize = 0;
pub(super) const END: usize = 1;

impl Blocks {
    fn zero(segments: usize) -> Self {
        Self { parts: std::array::from_fn(|_| vec![0.0; padded(segments)]) }
    }

    pub fn at(&self, row_end: usize, column_end: usize, column: usize) -> Complex64 {
        let part = 2 * row_end + column_end;
        Complex64::new(self.parts[part][column], self.parts[4 + part][column])
    }

    /// Adds beginning–beginning, beginning–end, end–beginning, end–end.
    pub fn add(&mut self, column: usize, couplings: [Complex64; 4]) {
        for (part, value) in couplings.into_iter().enumerate() {
            self.parts[part][column] += value.re;
            self.parts[4 + part][column] += value.im;
        }
    }
}

struct Fill<'a> {
    terms: &'a Terms<'a>,
    columns: &'a Columns,
    matrix: &'a mut Symmetric,
}

impl WithSimd for Fill<'_> {
    type Output = ();

    #[inline(always)]
    fn with_simd<S: Simd>(self, simd: S) {
        let Terms { mesh, shares, .. } = self.terms;
        let segments = mesh.segments.len();
        let mut sums = vec![0.0; SUMS * padded(segments)];
        let mut blocks = Blocks::zero(segments);
        for row in 0..segments {
            fill_row(simd, self.terms, self.columns, row, (&mut sums, &mut blocks));
            for run in &mesh.runs {
                add_run(self.matrix, shares, row, run, &blocks);
            }
            shares.add_joints(self.matrix, mesh, row, &blocks);
        }
    }
}

/// Fills in the couplings of a row's segment with all up to it; the sums are scratch.
#[inline(always)]
fn fill_row<S: Simd>(
    simd: S,
    terms: &Terms,
    columns: &Columns,
    row: usize,
    (sums, blocks): (&mut [f64], &mut Blocks),
) {
    let Terms { mesh, couplings, own, k, .. } = terms;
    for part in &mut blocks.parts {
        part[..padded(row + 1)].fill(0.0);
    }
    for coupling in *couplings {
        let sums = &mut sums[..SUMS * padded(row + 1)];
        wave_sums(simd, coupling.table(row), *k, sums);
        for near in coupling.near(row) {
            add_sums(sums, near.column, near.sums);
        }
        if coupling.sign > 0.0 {
            add_sums(sums, row, kink(*k, mesh.segments[row].length_m()));
        }
        let scale = RowScale::new(simd, &columns.shapes[row], coupling.sign);
        add_blocks(simd, &scale, [sums, &columns.table, coupling.table(row)], blocks);
    }
    let [same, cross] = own[row];
    blocks.add(row, [same, cross, cross, same]);
}

/// Sums of a pair: Σ e^(−jkR)/R plain, with the row's sign, with the column's, with both; real parts, then imaginary.
const SUMS: usize = 8;

#[inline(always)]
fn add_sums(sums: &mut [f64], column: usize, terms: [f64; 4]) {
    let at = SUMS * PAD * (column / PAD) + column % PAD;
    for (index, term) in terms.into_iter().enumerate() {
        sums[at + PAD * index] += term;
    }
}

/// What two points miss of −k²R/2, the kernel's term with a kink, on a segment's own.
fn kink(k: f64, length_m: f64) -> [f64; 4] {
    // Exact ∫∫R and ∫∫3ξξ′R over L²/4, minus the sums of the Gauss points: L·(4/3 − 2/√3) and L·(2/√3 − 4/5)
    let scale = -0.5 * k * k * length_m;
    [scale * (4.0 / 3.0 - 2.0 * GAUSS), 0.0, 0.0, scale * (2.0 * GAUSS - 0.8)]
}

/// Fills in the sums of a row.
#[inline(always)]
fn wave_sums<S: Simd>(simd: S, table: &[f64], k: f64, sums: &mut [f64]) {
    let per = PAD / S::F64_LANES;
    let (table, _) = S::as_simd_f64s(table);
    let (sums, _) = S::as_mut_simd_f64s(sums);
    let turns_per_m = Lanes::splat(simd, k / std::f64::consts::TAU);
    for (fields, sums) in table.chunks_exact(FIELDS * per).zip(sums.chunks_exact_mut(SUMS * per)) {
        for part in 0..per {
            let mut waves = [[turns_per_m; 4]; 2];
            for index in 0..4 {
                let turns = Lanes::new(simd, fields[index * per + part]) * turns_per_m;
                let inverse = Lanes::new(simd, fields[(4 + index) * per + part]);
                let [cos, minus_sin] = turns.wave();
                waves[0][index] = cos * inverse;
                waves[1][index] = minus_sin * inverse;
            }
            for (complex_part, [mm, mp, pm, pp]) in waves.into_iter().enumerate() {
                let (m_plus, m_minus) = (mm + mp, mp - mm);
                let (p_plus, p_minus) = (pm + pp, pp - pm);
                let at = 4 * complex_part;
                sums[at * per + part] = (m_plus + p_plus).value;
                sums[(at + 1) * per + part] = (p_plus - m_plus).value;
                sums[(at + 2) * per + part] = (m_minus + p_minus).value;
                sums[(at + 3) * per + part] = (p_minus - m_minus).value;
            }
        }
    }
}

/// Shapes of the row's segment, halved, with the coupling's sign.
struct RowScale<S: Simd> {
    even: Lanes<S>,
    odd: Lanes<S>,
    even_slope: Lanes<S>,
    odd_slope: Lanes<S>,
    /// The same for all segments.
    column_odd_slope: Lanes<S>,
}

impl<S: Simd> RowScale<S> {
    #[inline(always)]
    fn new(simd: S, shapes: &Shapes, sign: f64) -> Self {
        let half = 0.5 * sign;
        Self {
            even: Lanes::splat(simd, half * shapes.even),
            odd: Lanes::splat(simd, half * shapes.odd),
            even_slope: Lanes::splat(simd, half * shapes.even_slope),
            odd_slope: Lanes::splat(simd, half * shapes.odd_slope),
            column_odd_slope: Lanes::splat(simd, 0.5 * shapes.odd_slope),
        }
    }
}

/// Adds a row's couplings between end currents: vector potential minus scalar potential.
#[inline(always)]
fn add_blocks<S: Simd>(simd: S, row: &RowScale<S>, [sums, columns, table]: [&[f64]; 3], blocks: &mut Blocks) {
    let per = PAD / S::F64_LANES;
    let (sums, _) = S::as_simd_f64s(sums);
    let (columns, _) = S::as_simd_f64s(columns);
    let (table, _) = S::as_simd_f64s(table);
    let count = table.len() / FIELDS;
    let parts = blocks.parts.each_mut().map(|part| &mut S::as_mut_simd_f64s(part).0[..count]);
    let pairs = sums
        .chunks_exact(SUMS * per)
        .zip(columns.chunks_exact(3 * per))
        .zip(table.chunks_exact(FIELDS * per));
    for (chunk, ((sums, columns), fields)) in pairs.enumerate() {
        for part in 0..per {
            let cosine = Lanes::new(simd, fields[8 * per + part]);
            let column = ColumnScale {
                even: cosine * Lanes::new(simd, columns[part]),
                odd: cosine * Lanes::new(simd, columns[per + part]),
                even_slope: Lanes::new(simd, columns[2 * per + part]),
            };
            let place = chunk * per + part;
            for complex_part in 0..2 {
                let at = 4 * complex_part;
                let sums = [
                    Lanes::new(simd, sums[at * per + part]),
                    Lanes::new(simd, sums[(at + 1) * per + part]),
                    Lanes::new(simd, sums[(at + 2) * per + part]),
                    Lanes::new(simd, sums[(at + 3) * per + part]),
                ];
                let ends = end_couplings(row, &column, sums);
                for index in 0..4 {
                    let target = &mut parts[at + index][place];
                    *target = (Lanes::new(simd, *target) + ends[index]).value;
                }
            }
        }
    }
}

/// Shapes of the column's segment, halved; those of the current times the cosine between the segments.
struct ColumnScale<S: Simd> {
    even: Lanes<S>,
    odd: Lanes<S>,
    even_slope: Lanes<S>,
}

/// Beginning–beginning, beginning–end, end–beginning, end–end from the sums.
#[inline(always)]
fn end_couplings<S: Simd>(
    row: &RowScale<S>,
    column: &ColumnScale<S>,
    [ee, oe, eo, oo]: [Lanes<S>; 4],
) -> [Lanes<S>; 4] {
    // Of the mean of the end currents (even) and of half their difference (odd)
    let even_even = (row.even_slope * oo).times_from(column.even_slope, (row.even * ee) * column.even);
    let even_odd = (row.even_slope * oe).times_from(row.column_odd_slope, (row.even * eo) * column.odd);
    let odd_even = (row.odd_slope * eo).times_from(column.even_slope, (row.odd * oe) * column.even);
    let odd_odd = (row.odd_slope * ee).times_from(row.column_odd_slope, (row.odd * oo) * column.odd);
    let (from_even, to_even) = (even_even - odd_even, even_even + odd_even);
    let (from_odd, to_odd) = (even_odd - odd_odd, even_odd + odd_odd);
    [from_even - from_odd, from_even + from_odd, to_even - to_odd, to_even + to_odd]
}

/// Adds a segment's couplings to the unknowns of a run, for the unknowns that the segment itself has in runs.
///
/// An unknown between two segments has the end of the first and the beginning of the second. Couplings with segments
/// after this one come with their rows.
#[inline(always)]
fn add_run(matrix: &mut Symmetric, shares: &Shares, row: usize, run: &Run, blocks: &Blocks) {
    let Some(before) = row.checked_sub(run.first_segment) else { return };
    // Unknowns with both segments up to this one, and whether one begins with it.
    let whole = before.min(run.unknowns);
    let begins = before < run.unknowns;
    for row_end in [BEGINNING, END] {
        let Some(unknown) = shares.in_run(row, row_end) else { continue };
        let low = matrix.index(unknown, run.first_unknown);
        for (offset, target) in [(0, &mut matrix.re), (4, &mut matrix.im)] {
            let part = offset + 2 * row_end;
            let begin = run.first_segment;
            let at_beginning = &blocks.parts[part + BEGINNING][begin + 1..=begin + whole];
            let at_end = &blocks.parts[part + END][begin..begin + whole];
            let target = &mut target[low..low + whole];
            for ((target, a), b) in target.iter_mut().zip(at_end).zip(at_beginning) {
                *target += a + b;
            }
        }
        if begins && row_end == END {
            matrix.add(unknown, run.first_unknown + whole, blocks.at(END, END, row));
        }
        if row_end == BEGINNING && whole > 0 && unknown == run.first_unknown + whole - 1 {
            // The unknown's own two arms act on each other both ways.
            matrix.add(unknown, unknown, blocks.at(BEGINNING, END, row - 1));
        }
    }
}

#[cfg(test)]
pub(super) mod tests {
    use super::*;

    /// Couplings of every segment's ends with those of all up to it: `[row][column]` gives beginning–beginning,
    /// beginning–end, end–beginning, end–end.
    pub fn end_couplings_of_all(terms: &Terms) -> Vec<Vec<[Complex64; 4]>> {
        Arch::new().dispatch(AllRows { terms, columns: &Columns::new(terms.mesh, terms.k) })
    }

    struct AllRows<'a> {
        terms: &'a Terms<'a>,
        columns: &'a Columns,
    }

    impl WithSimd for AllRows<'_> {
        type Output = Vec<Vec<[Complex64; 4]>>;

        #[inline(always)]
        fn with_simd<S: Simd>(self, simd: S) -> Self::Output {
            let segments = self.terms.mesh.segments.len();
            let mut sums = vec![0.0; SUMS * padded(segments)];
            let mut blocks = Blocks::zero(segments);
            let mut row = |row: usize| {
                fill_row(simd, self.terms, self.columns, row, (&mut sums, &mut blocks));
                let at = |column| {
                    [(BEGINNING, BEGINNING), (BEGINNING, END), (END, BEGINNING), (END, END)]
                        .map(|(row_end, column_end)| blocks.at(row_end, column_end, column))
                };
                (0..=row).map(at).collect()
            };
            (0..segments).map(&mut row).collect()
        }
    }
}
