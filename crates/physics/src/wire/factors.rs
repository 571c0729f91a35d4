//! Symmetric factors without pivoting, and what they solve.

use nalgebra::DMatrix;
use num_complex::Complex64;
use pulp::{Arch, Simd, WithSimd};

use super::lanes::{Lanes, PAD, padded};
use super::symmetric::{Symmetric, Vector};

/// A = M·D·Mᵀ with M unit upper triangular, eliminated from the last row up: then every step works on whole rows of the
/// lower triangle from their beginning.
pub(super) struct Factors {
    /// Left of the diagonal M's columns as rows, on it D.
    matrix: Symmetric,
}

impl Factors {
    /// `None` if a pivot is zero or not a number.
    pub fn of(mut matrix: Symmetric) -> Option<Self> {
        Arch::new().dispatch(Factor { matrix: &mut matrix }).then_some(Self { matrix })
    }

    pub fn solve(&self, drive: &DMatrix<f64>) -> DMatrix<Complex64> {
        let order = self.matrix.order();
        let mut solution = DMatrix::zeros(order, drive.ncols());
        for (mut column, b) in solution.column_iter_mut().zip(drive.column_iter()) {
            let mut x = Vector::zero(order);
            x.re[..order].copy_from_slice(b.as_slice());
            Arch::new().dispatch(Substitute { matrix: &self.matrix, x: &mut x });
            for (row, value) in column.iter_mut().enumerate() {
                *value = x.at(row);
            }
        }
        solution
    }
}

/// Rows that are eliminated together.
const PANEL: usize = 4;

struct Factor<'a> {
    matrix: &'a mut Symmetric,
}

impl WithSimd for Factor<'_> {
    type Output = bool;

    #[inline(always)]
    fn with_simd<S: Simd>(self, simd: S) -> bool {
        let matrix = self.matrix;
        let order = matrix.order();
        // Of every row below the panel: D·M at the panel's columns, re and im.
        let mut weights = vec![[0.0; 2 * PANEL]; order];
        let mut end = order;
        while end > 0 {
            let begin = end.saturating_sub(PANEL);
            for (row, weights) in weights.iter_mut().enumerate().skip(end) {
                *weights = weights_of(matrix, row, begin);
            }
            update(simd, matrix, [begin, end], &weights);
            for row in (begin..end).rev() {
                if !finish_row(simd, matrix, row, begin) {
                    return false;
                }
            }
            end = begin;
        }
        true
    }
}

/// D·M of a row at the columns of a panel. A short panel is the first one; what its missing columns get is not used.
#[inline(always)]
fn weights_of(matrix: &Symmetric, row: usize, begin: usize) -> [f64; 2 * PANEL] {
    let pivot = matrix.at(row, row);
    let [re, im] = matrix.row(row);
    let (re, im) = (&re[begin..begin + PANEL], &im[begin..begin + PANEL]);
    let mut weights = [0.0; 2 * PANEL];
    for index in 0..PANEL {
        weights[index] = pivot.re * re[index] - pivot.im * im[index];
        weights[PANEL + index] = pivot.re * im[index] + pivot.im * re[index];
    }
    weights
}

/// Takes all rows below the panel from its rows, one vector of columns at a time.
#[inline(always)]
fn update<S: Simd>(simd: S, matrix: &mut Symmetric, [begin, end]: [usize; 2], weights: &[[f64; 2 * PANEL]]) {
    let lanes = S::F64_LANES;
    let rows = end - begin;
    for column in (0..padded(end)).step_by(lanes) {
        let zero = Lanes::splat(simd, 0.0);
        let mut sum_re = [zero; PANEL];
        let mut sum_im = [zero; PANEL];
        for (row, weight) in weights.iter().enumerate().skip(end) {
            let at = matrix.index(row, column);
            let (re, _) = S::as_simd_f64s(&matrix.re[at..at + lanes]);
            let (im, _) = S::as_simd_f64s(&matrix.im[at..at + lanes]);
            let (re, im) = (Lanes::new(simd, re[0]), Lanes::new(simd, im[0]));
            for index in 0..PANEL {
                let weight_re = Lanes::splat(simd, weight[index]);
                let weight_im = Lanes::splat(simd, weight[PANEL + index]);
                sum_re[index] = im.times_from(weight_im, re.times_plus(weight_re, sum_re[index]));
                sum_im[index] = im.times_plus(weight_re, re.times_plus(weight_im, sum_im[index]));
            }
        }
        for index in 0..rows {
            let row = begin + index;
            if column >= padded(row + 1) {
                continue;
            }
            let at = matrix.index(row, column);
            let (re, _) = S::as_mut_simd_f64s(&mut matrix.re[at..at + lanes]);
            re[0] = (Lanes::new(simd, re[0]) - sum_re[index]).value;
            let (im, _) = S::as_mut_simd_f64s(&mut matrix.im[at..at + lanes]);
            im[0] = (Lanes::new(simd, im[0]) - sum_im[index]).value;
        }
    }
}

/// Scales a row by its pivot and takes it from the panel's rows above it.
#[inline(always)]
fn finish_row<S: Simd>(simd: S, matrix: &mut Symmetric, row: usize, begin: usize) -> bool {
    let pivot = matrix.at(row, row);
    let inverse = pivot.inv();
    if !(inverse.re.is_finite() && inverse.im.is_finite()) {
        return false;
    }
    let low = matrix.index(begin, 0);
    let starts: [usize; PANEL] = [0, 1, 2, 3].map(|index| matrix.index((begin + index).min(row), 0) - low);
    let at = matrix.index(row, 0);
    let [(above_re, above_im), (re, im)] = matrix.split(row);
    let length = padded(row + 1);
    let (re, im) = (&mut re[..length], &mut im[..length]);
    scale(simd, [&mut *re, &mut *im], inverse);
    (re[row], im[row]) = (pivot.re, pivot.im);
    let (above_re, above_im) = (&mut above_re[low..at], &mut above_im[low..at]);
    for target in begin..row {
        let factor = pivot * Complex64::new(re[target], im[target]);
        let (first, length) = (starts[target - begin], padded(target + 1));
        let target = [&mut above_re[first..first + length], &mut above_im[first..first + length]];
        subtract(simd, target, [&re[..length], &im[..length]], factor);
    }
    true
}

/// row ← row·factor
#[inline(always)]
fn scale<S: Simd>(simd: S, [re, im]: [&mut [f64]; 2], factor: Complex64) {
    let (re, _) = S::as_mut_simd_f64s(re);
    let (im, _) = S::as_mut_simd_f64s(im);
    let (factor_re, factor_im) = (Lanes::splat(simd, factor.re), Lanes::splat(simd, factor.im));
    for (re, im) in re.iter_mut().zip(im) {
        let (x, y) = (Lanes::new(simd, *re), Lanes::new(simd, *im));
        *re = y.times_from(factor_im, x * factor_re).value;
        *im = y.times_plus(factor_re, x * factor_im).value;
    }
}

/// row ← row − source·factor
#[inline(always)]
fn subtract<S: Simd>(
    simd: S,
    [re, im]: [&mut [f64]; 2],
    [source_re, source_im]: [&[f64]; 2],
    factor: Complex64,
) {
    let (re, _) = S::as_mut_simd_f64s(re);
    let (im, _) = S::as_mut_simd_f64s(im);
    let (source_re, _) = S::as_simd_f64s(source_re);
    let (source_im, _) = S::as_simd_f64s(source_im);
    let (factor_re, factor_im) = (Lanes::splat(simd, factor.re), Lanes::splat(simd, factor.im));
    for (((re, im), s), t) in re.iter_mut().zip(im).zip(source_re).zip(source_im) {
        let (s, t) = (Lanes::new(simd, *s), Lanes::new(simd, *t));
        *re = t.times_plus(factor_im, s.times_from(factor_re, Lanes::new(simd, *re))).value;
        *im = t.times_from(factor_re, s.times_from(factor_im, Lanes::new(simd, *im))).value;
    }
}

/// Σ rowⱼ·xⱼ over the first `length` entries.
#[inline(always)]
fn product<S: Simd>(simd: S, [re, im]: [&[f64]; 2], x: &Vector, length: usize) -> Complex64 {
    let whole = length - length % S::F64_LANES;
    let (re_lanes, _) = S::as_simd_f64s(&re[..whole]);
    let (im_lanes, _) = S::as_simd_f64s(&im[..whole]);
    let (x_re, _) = S::as_simd_f64s(&x.re[..whole]);
    let (x_im, _) = S::as_simd_f64s(&x.im[..whole]);
    let zero = Lanes::splat(simd, 0.0);
    let (mut sum_re, mut sum_im) = (zero, zero);
    for (((re, im), x_re), x_im) in re_lanes.iter().zip(im_lanes).zip(x_re).zip(x_im) {
        let (re, im) = (Lanes::new(simd, *re), Lanes::new(simd, *im));
        let (x_re, x_im) = (Lanes::new(simd, *x_re), Lanes::new(simd, *x_im));
        sum_re = im.times_from(x_im, re.times_plus(x_re, sum_re));
        sum_im = im.times_plus(x_re, re.times_plus(x_im, sum_im));
    }
    let mut sum = Complex64::new(sum_re.sum(), sum_im.sum());
    for column in whole..length {
        sum += Complex64::new(re[column], im[column]) * x.at(column);
    }
    sum
}

/// Replaces b by x: M·y = b from the last row up, y/D, Mᵀ·x = y from the first row down.
struct Substitute<'a> {
    matrix: &'a Symmetric,
    x: &'a mut Vector,
}

impl WithSimd for Substitute<'_> {
    type Output = ();

    #[inline(always)]
    fn with_simd<S: Simd>(self, simd: S) {
        let Self { matrix, x } = self;
        for row in (0..matrix.order()).rev() {
            let y = x.at(row);
            let [re, im] = matrix.row(row);
            // The row's last vector reaches the diagonal and beyond: its own entry is set afterwards.
            let length = re.len();
            let beyond: [f64; 2 * PAD] = std::array::from_fn(|index| {
                let (part, place) = (index / PAD, length - PAD + index % PAD);
                if part == 0 { x.re[place] } else { x.im[place] }
            });
            subtract(simd, [&mut x.re[..length], &mut x.im[..length]], [re, im], y);
            for place in row + 1..length {
                x.re[place] = beyond[place + PAD - length];
                x.im[place] = beyond[PAD + place + PAD - length];
            }
            x.set(row, y / matrix.at(row, row));
        }
        for row in 0..matrix.order() {
            let sum = product(simd, matrix.row(row), x, row);
            x.set(row, x.at(row) - sum);
        }
    }
}

impl Vector {
    /// `self` ← `self` + matrix·x
    pub fn add_product(&mut self, matrix: &Symmetric, x: &Self) {
        Arch::new().dispatch(AddProduct { sum: self, matrix, x });
    }
}

struct AddProduct<'a> {
    sum: &'a mut Vector,
    matrix: &'a Symmetric,
    x: &'a Vector,
}

impl WithSimd for AddProduct<'_> {
    type Output = ();

    #[inline(always)]
    fn with_simd<S: Simd>(self, simd: S) {
        let Self { sum, matrix, x } = self;
        for row in 0..matrix.order() {
            // The row's left part gives its own product, and as a column to those above; the places of the rows from
            // this one on are set again.
            let [re, im] = matrix.row(row);
            let own = sum.at(row) + product(simd, [re, im], x, row) + matrix.at(row, row) * x.at(row);
            let whole = row - row % S::F64_LANES;
            let left = [&mut sum.re[..whole], &mut sum.im[..whole]];
            subtract(simd, left, [&re[..whole], &im[..whole]], -x.at(row));
            for column in whole..row {
                sum.set(column, sum.at(column) + Complex64::new(re[column], im[column]) * x.at(row));
            }
            sum.set(row, own);
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    /// Symmetric, complex, nothing like diagonal.
    fn matrix(order: usize) -> Symmetric {
        let mut matrix = Symmetric::zero(order);
        for row in 0..order {
            for column in 0..=row {
                let x = f64::from(u32::try_from(7 * column + 13 * row * row).unwrap());
                let own = if row == column { 0.5 } else { 0.0 };
                matrix.add(row, column, Complex64::new(x.sin() + own, (1.3 * x).cos()));
            }
        }
        // Garbage right of the diagonal must not matter.
        for row in 0..order {
            for index in matrix.index(row, row) + 1..matrix.index(row, 0) + padded(row + 1) {
                matrix.re[index] = 1e3;
                matrix.im[index] = -1e3;
            }
        }
        matrix
    }

    #[test]
    fn factors_agree_with_pivoting() {
        for order in [1, 2, 3, 4, 5, 7, 8, 31, 81] {
            let matrix = matrix(order);
            let drive = DMatrix::from_fn(order, 2, |row, column| if row == column { 1.0 } else { 0.25 });
            let full = DMatrix::from_fn(order, order, |row, column| matrix.at(row, column));
            let expected = full.lu().solve(&drive.map(Complex64::from)).unwrap();
            let got = Factors::of(matrix.clone()).unwrap().solve(&drive);
            let error = (&got - &expected).map(Complex64::norm).max() / expected.map(Complex64::norm).max();
            assert!(error < 1e-9, "order {order}: {error}");
            let (solution, residual) = matrix.solve(&drive).unwrap();
            assert!(residual < 1e-8, "order {order}: {residual}");
            let left =
                (full_product(&matrix, &solution) - drive.map(Complex64::from)).map(Complex64::norm).max();
            assert!((left - residual).abs() < 1e-12, "{left} {residual}");
        }
    }

    fn full_product(matrix: &Symmetric, x: &DMatrix<Complex64>) -> DMatrix<Complex64> {
        let order = matrix.order();
        DMatrix::from_fn(order, order, |row, column| matrix.at(row, column)) * x
    }

    #[test]
    fn zero_pivot_falls_back_on_pivoting() {
        // [0 1; 1 0] has no factors without pivoting.
        let mut matrix = Symmetric::zero(2);
        matrix.add(1, 0, Complex64::ONE);
        assert!(Factors::of(matrix.clone()).is_none());
        let (solution, residual) = matrix.solve(&DMatrix::from_column_slice(2, 1, &[2.0, 3.0])).unwrap();
        assert!(residual < 1e-12);
        assert!((solution[(0, 0)] - 3.0).norm() < 1e-12 && (solution[(1, 0)] - 2.0).norm() < 1e-12);
        // A matrix of zeros has no solution.
        assert!(Symmetric::zero(2).solve(&DMatrix::from_element(2, 1, 1.0)).is_none());
    }
}
