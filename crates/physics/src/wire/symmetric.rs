//! Symmetric complex matrices.

use nalgebra::DMatrix;
use num_complex::Complex64;

use super::factors::Factors;
use super::lanes::padded;

/// A symmetric complex matrix: rows of the lower triangle, each padded to whole vectors, real and imaginary parts apart.
///
/// What lies right of the diagonal in a row's last vector is not used, and not kept at zero.
#[derive(Clone, Debug, Default, PartialEq)]
pub(super) struct Symmetric {
    /// Where each row begins; one more for the end.
    rows: Vec<usize>,
    pub re: Vec<f64>,
    pub im: Vec<f64>,
}

impl Symmetric {
    pub fn zero(order: usize) -> Self {
        let mut rows = Vec::with_capacity(order + 1);
        let mut end = 0;
        for row in 0..order {
            rows.push(end);
            end += padded(row + 1);
        }
        rows.push(end);
        Self { rows, re: vec![0.0; end], im: vec![0.0; end] }
    }

    pub fn order(&self) -> usize {
        self.rows.len() - 1
    }

    /// Place of an entry; `column` ≤ `row`.
    #[inline(always)]
    pub fn index(&self, row: usize, column: usize) -> usize {
        self.rows[row] + column
    }

    #[inline(always)]
    pub fn at(&self, row: usize, column: usize) -> Complex64 {
        let index = self.index(row.max(column), row.min(column));
        Complex64::new(self.re[index], self.im[index])
    }

    /// Adds to the entry of a row and a column, in either order.
    #[inline(always)]
    pub fn add(&mut self, row: usize, column: usize, value: Complex64) {
        let index = self.index(row.max(column), row.min(column));
        self.re[index] += value.re;
        self.im[index] += value.im;
    }

    /// A whole row, real and imaginary part.
    #[inline(always)]
    pub fn row(&self, row: usize) -> [&[f64]; 2] {
        let (begin, end) = (self.rows[row], self.rows[row + 1]);
        [&self.re[begin..end], &self.im[begin..end]]
    }

    /// Rows above `row` are out of reach; it and the next begin the parts returned.
    #[inline(always)]
    pub fn split(&mut self, row: usize) -> [(&mut [f64], &mut [f64]); 2] {
        let at = self.rows[row];
        let (above_re, re) = self.re.split_at_mut(at);
        let (above_im, im) = self.im.split_at_mut(at);
        [(above_re, above_im), (re, im)]
    }

    /// Solution of `self`·X = B for real B, and the largest |B − self·X| over the largest |B|.
    ///
    /// Factors without pivoting; where that leaves too much of B, by LU with pivoting. `None` for a singular matrix.
    pub fn solve(&self, drive: &DMatrix<f64>) -> Option<(DMatrix<Complex64>, f64)> {
        if let Some(factors) = Factors::of(self.clone()) {
            let solution = factors.solve(drive);
            let residual = self.residual(&solution, drive);
            if residual < LARGEST_RESIDUAL {
                return Some((solution, residual));
            }
        }
        let full = DMatrix::from_fn(self.order(), self.order(), |row, column| self.at(row, column));
        let solution = full.lu().solve(&drive.map(Complex64::from))?;
        let residual = self.residual(&solution, drive);
        Some((solution, residual))
    }

    fn residual(&self, solution: &DMatrix<Complex64>, drive: &DMatrix<f64>) -> f64 {
        let mut largest = 0.0_f64;
        for (x, b) in solution.column_iter().zip(drive.column_iter()) {
            let mut x_parts = Vector::zero(self.order());
            let mut left = Vector::zero(self.order());
            for (row, (x, b)) in x.iter().zip(b.iter()).enumerate() {
                x_parts.set(row, *x);
                left.set(row, Complex64::from(-b));
            }
            left.add_product(self, &x_parts);
            for row in 0..self.order() {
                let size2 = left.at(row).norm_sqr();
                // A NaN must not pass as small.
                largest = if size2 <= largest { largest } else { size2 };
            }
        }
        largest.sqrt() / drive.amax().max(f64::MIN_POSITIVE)
    }
}

/// Largest part of the right-hand side that may be left without pivoting.
const LARGEST_RESIDUAL: f64 = 1e-8;

/// A complex vector, real and imaginary part apart, padded.
pub(super) struct Vector {
    pub re: Vec<f64>,
    pub im: Vec<f64>,
}

impl Vector {
    pub fn zero(order: usize) -> Self {
        Self { re: vec![0.0; padded(order)], im: vec![0.0; padded(order)] }
    }

    #[inline(always)]
    pub fn at(&self, index: usize) -> Complex64 {
        Complex64::new(self.re[index], self.im[index])
    }

    #[inline(always)]
    pub fn set(&mut self, index: usize, value: Complex64) {
        self.re[index] = value.re;
        self.im[index] = value.im;
    }
}
