//! Symmetric complex matrices and their solution without pivoting.

use nalgebra::DMatrix;
use num_complex::Complex64;
use pulp::{Arch, Simd, WithSimd};

use super::lanes::{Lanes, padded};

/// A symmetric complex matrix: rows of the lower triangle, real and imaginary parts apart, padded to whole vectors.
///
/// What lies right of the diagonal is not used, and not kept at zero.
#[derive(Clone, Debug, Default, PartialEq)]
pub(super) struct Symmetric {
    order: usize,
    stride: usize,
    pub re: Vec<f64>,
    pub im: Vec<f64>,
}

impl Symmetric {
    pub fn zero(order: usize) -> Self {
        let stride = padded(order);
        Self { order, stride, re: vec![0.0; order * stride], im: vec![0.0; order * stride] }
    }

    pub fn order(&self) -> usize {
        self.order
    }

    /// Place of an entry; `column` ≤ `row`.
    #[inline(always)]
    pub fn index(&self, row: usize, column: usize) -> usize {
        row * self.stride + column
    }

    pub fn at(&self, row: usize, column: usize) -> Complex64 {
        let index = self.index(row.max(column), row.min(column));
        Complex64::new(self.re[index], self.im[index])
    }

    /// Adds to the entry of a row and a column, in either order.
    pub fn add(&mut self, row: usize, column: usize, value: Complex64) {
        let index = self.index(row.max(column), row.min(column));
        self.re[index] += value.re;
        self.im[index] += value.im;
    }

    /// Solution of `self`·X = B for real B, and the largest |B − self·X| over the largest |B|.
    ///
    /// Factors without pivoting; where that leaves too much of B, by LU with pivoting. `None` for a singular matrix.
    pub fn solve(&self, drive: &DMatrix<f64>) -> Option<(DMatrix<Complex64>, f64)> {
        let solution = Factors::of(self.clone()).map(|factors| factors.solve(drive));
        if let Some(solution) = solution {
            let residual = self.residual(&solution, drive);
            if residual < LARGEST_RESIDUAL {
                return Some((solution, residual));
            }
        }
        let full = DMatrix::from_fn(self.order, self.order, |row, column| self.at(row, column));
        let solution = full.lu().solve(&drive.map(Complex64::from))?;
        let residual = self.residual(&solution, drive);
        Some((solution, residual))
    }

    fn residual(&self, solution: &DMatrix<Complex64>, drive: &DMatrix<f64>) -> f64 {
        let mut largest = 0.0_f64;
        for (x, b) in solution.column_iter().zip(drive.column_iter()) {
            let mut vector = Vector::zero(self.order);
            let mut product = Vector::zero(self.order);
            for (row, (x, b)) in x.iter().zip(b.iter()).enumerate() {
                (vector.re[row], vector.im[row]) = (x.re, x.im);
                product.re[row] = -b;
            }
            Arch::new().dispatch(Multiply { matrix: self, vector: &vector, product: &mut product });
            let rows = product.re.iter().zip(&product.im).take(self.order);
            // A NaN must not pass as small.
            largest = rows.map(|(re, im)| re.hypot(*im)).fold(largest, |a, b| if b <= a { a } else { b });
        }
        largest / drive.amax().max(f64::MIN_POSITIVE)
    }
}

/// Largest part of the right-hand side that may be left without pivoting.
const LARGEST_RESIDUAL: f64 = 1e-8;

/// A complex vector, padded.
struct Vector {
    re: Vec<f64>,
    im: Vec<f64>,
}

impl Vector {
    fn zero(order: usize) -> Self {
        Self { re: vec![0.0; padded(order)], im: vec![0.0; padded(order)] }
    }

    fn at(&self, index: usize) -> Complex64 {
        Complex64::new(self.re[index], self.im[index])
    }

    fn set(&mut self, index: usize, value: Complex64) {
        self.re[index] = value.re;
        self.im[index] = value.im;
    }
}

/// Adds matrix·vector to the product.
struct Multiply<'a> {
    matrix: &'a Symmetric,
    vector: &'a Vector,
    product: &'a mut Vector,
}

impl WithSimd for Multiply<'_> {
    type Output = ();

    #[inline(always)]
    fn with_simd<S: Simd>(self, simd: S) {
        let Self { matrix, vector, product } = self;
        for row in 0..matrix.order {
            let (begin, end) = (matrix.index(row, 0), matrix.index(row, row));
            // The row's left part gives its own product, and as a column to those above.
            let (left_re, left_im) = (&matrix.re[begin..end], &matrix.im[begin..end]);
            let x = vector.at(row);
            let mut own = product.at(row) + matrix.at(row, row) * x;
            for column in 0..row {
                let (re, im) = (left_re[column], left_im[column]);
                product.re[column] += re * x.re - im * x.im;
                product.im[column] += re * x.im + im * x.re;
                let other = vector.at(column);
                own += Complex64::new(re * other.re - im * other.im, re * other.im + im * other.re);
            }
            product.set(row, own);
        }
        let _ = simd;
    }
}

/// A = M·D·Mᵀ with M unit upper triangular, eliminated from the last row up: then every step works on whole rows of the
/// lower triangle from their beginning.
struct Factors {
    /// Below the diagonal M's columns as rows, on it D.
    matrix: Symmetric,
}

impl Factors {
    /// `None` if a pivot is zero or not a number.
    fn of(mut matrix: Symmetric) -> Option<Self> {
        Arch::new().dispatch(Factor { matrix: &mut matrix }).then_some(Self { matrix })
    }

    fn solve(&self, drive: &DMatrix<f64>) -> DMatrix<Complex64> {
        let order = self.matrix.order;
        let mut solution = DMatrix::zeros(order, drive.ncols());
        for (column, b) in drive.column_iter().enumerate() {
            let mut x = Vector::zero(order);
            x.re[..order].copy_from_slice(b.as_slice());
            Arch::new().dispatch(Substitute { matrix: &self.matrix, x: &mut x });
            for row in 0..order {
                solution[(row, column)] = x.at(row);
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
        let mut end = matrix.order;
        while end > 0 {
            let begin = end.saturating_sub(PANEL);
            // Within the panel: scale the last row, take it from those above it.
            for row in (begin..end).rev() {
                let pivot = matrix.at(row, row);
                let inverse = pivot.inv();
                if !(inverse.re.is_finite() && inverse.im.is_finite()) {
                    return false;
                }
                let (above, from_row) = matrix.split(row);
                let own = [&mut from_row.0[..padded(row)], &mut from_row.1[..padded(row)]];
                scale(simd, own, inverse);
                for target in begin..row {
                    let factor = pivot * Complex64::new(from_row.0[target], from_row.1[target]);
                    let (low, high) = (above.index(target, 0), above.index(target, padded(target + 1)));
                    let sources = [[&from_row.0[..], &from_row.1[..]]];
                    subtract(simd, [&mut above.re[low..high], &mut above.im[low..high]], &sources, &[factor]);
                }
                from_row.0[row] = pivot.re;
                from_row.1[row] = pivot.im;
            }
            matrix.eliminate(simd, begin, end);
            end = begin;
        }
        true
    }
}

/// Rows above a row, to be changed.
struct Above<'a> {
    stride: usize,
    re: &'a mut [f64],
    im: &'a mut [f64],
}

impl Above<'_> {
    fn index(&self, row: usize, column: usize) -> usize {
        row * self.stride + column
    }
}

impl Symmetric {
    /// Rows above `row`, and the rows from it on.
    #[inline(always)]
    fn split(&mut self, row: usize) -> (Above<'_>, (&mut [f64], &mut [f64])) {
        let at = row * self.stride;
        let (above_re, re) = self.re.split_at_mut(at);
        let (above_im, im) = self.im.split_at_mut(at);
        (Above { stride: self.stride, re: above_re, im: above_im }, (re, im))
    }

    /// Takes the scaled rows of a panel from all rows above it.
    #[inline(always)]
    fn eliminate<S: Simd>(&mut self, simd: S, begin: usize, end: usize) {
        let stride = self.stride;
        let (above, (re, im)) = self.split(begin);
        let rows = end - begin;
        let pivot =
            |row: usize| Complex64::new(re[row * stride + begin + row], im[row * stride + begin + row]);
        let factor = |row: usize, target: usize| {
            pivot(row) * Complex64::new(re[row * stride + target], im[row * stride + target])
        };
        for target in 0..begin {
            let (low, high) = (above.index(target, 0), above.index(target, padded(target + 1)));
            let own = [&mut above.re[low..high], &mut above.im[low..high]];
            let source = |row: usize| [&re[row * stride..], &im[row * stride..]];
            if rows == PANEL {
                let sources: [_; PANEL] = std::array::from_fn(source);
                subtract(simd, own, &sources, &std::array::from_fn::<_, PANEL, _>(|row| factor(row, target)));
            } else {
                let [own_re, own_im] = own;
                for row in 0..rows {
                    subtract(simd, [&mut *own_re, &mut *own_im], &[source(row)], &[factor(row, target)]);
                }
            }
        }
    }
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

/// row ← row − Σ sourceₙ·factorₙ; sources are at least as long as the row.
#[inline(always)]
fn subtract<S: Simd, const N: usize>(
    simd: S,
    [re, im]: [&mut [f64]; 2],
    sources: &[[&[f64]; 2]; N],
    factors: &[Complex64; N],
) {
    let length = re.len();
    let (re, _) = S::as_mut_simd_f64s(re);
    let (im, _) = S::as_mut_simd_f64s(&mut im[..length]);
    let count = re.len();
    let im = &mut im[..count];
    let mut lines = [(&[] as &[S::f64s], &[] as &[S::f64s]); N];
    let mut scales = [(Lanes::splat(simd, 0.0), Lanes::splat(simd, 0.0)); N];
    for n in 0..N {
        let [source_re, source_im] = sources[n];
        let (source_re, _) = S::as_simd_f64s(&source_re[..length]);
        let (source_im, _) = S::as_simd_f64s(&source_im[..length]);
        lines[n] = (&source_re[..count], &source_im[..count]);
        scales[n] = (Lanes::splat(simd, factors[n].re), Lanes::splat(simd, factors[n].im));
    }
    for index in 0..count {
        let (mut x, mut y) = (Lanes::new(simd, re[index]), Lanes::new(simd, im[index]));
        for n in 0..N {
            let (s, t) = (Lanes::new(simd, lines[n].0[index]), Lanes::new(simd, lines[n].1[index]));
            let (factor_re, factor_im) = scales[n];
            x = t.times_plus(factor_im, s.times_from(factor_re, x));
            y = t.times_from(factor_re, s.times_from(factor_im, y));
        }
        re[index] = x.value;
        im[index] = y.value;
    }
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
        for row in (0..matrix.order).rev() {
            let y = x.at(row);
            let (low, high) = (matrix.index(row, 0), matrix.index(row, row));
            let (re, im) = (&matrix.re[low..high], &matrix.im[low..high]);
            let (x_re, x_im) = (&mut x.re[..row], &mut x.im[..row]);
            for column in 0..row {
                x_re[column] -= re[column] * y.re - im[column] * y.im;
                x_im[column] -= re[column] * y.im + im[column] * y.re;
            }
            x.set(row, y / matrix.at(row, row));
        }
        for row in 0..matrix.order {
            // Whole vectors, and the rest one by one: what lies right of the diagonal is not zero.
            let whole = row - row % S::F64_LANES;
            let low = matrix.index(row, 0);
            let (re, _) = S::as_simd_f64s(&matrix.re[low..low + whole]);
            let (im, _) = S::as_simd_f64s(&matrix.im[low..low + whole]);
            let (x_re, _) = S::as_simd_f64s(&x.re[..whole]);
            let (x_im, _) = S::as_simd_f64s(&x.im[..whole]);
            let zero = Lanes::splat(simd, 0.0);
            let (mut sum_re, mut sum_im) = (zero, zero);
            for (((re, im), x_re), x_im) in re.iter().zip(im).zip(x_re).zip(x_im) {
                let (re, im) = (Lanes::new(simd, *re), Lanes::new(simd, *im));
                let (x_re, x_im) = (Lanes::new(simd, *x_re), Lanes::new(simd, *x_im));
                sum_re = im.times_from(x_im, re.times_plus(x_re, sum_re));
                sum_im = im.times_plus(x_re, re.times_plus(x_im, sum_im));
            }
            let mut sum = Complex64::new(sum_re.sum(), sum_im.sum());
            for column in whole..row {
                sum += matrix.at(row, column) * x.at(column);
            }
            x.set(row, x.at(row) - sum);
        }
    }
}
