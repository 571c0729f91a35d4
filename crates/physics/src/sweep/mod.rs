//! From few solutions to all frequencies: rational interpolation of the N-port and of the whole current.
//!
//! Wires answer every drive with the same natural frequencies, so admittances and currents are rational functions with
//! one common denominator, real in jω. [`Sweep`] names the frequencies at which it wants solutions, fits what it gets,
//! measures its own error, and asks again until that is small; the caller solves, in parallel if it likes. [`Fit`] then
//! answers at any frequency of the range.
//!
//! * The fit is a barycentric rational interpolant whose weights make the rest of the samples fit best, all ports and
//!   all currents together (vector-valued AAA: Nakatsukasa, Sète & Trefethen, "The AAA algorithm for rational
//!   approximation", SIAM J. Sci. Comput. 40, 2018; Loewner least squares: Antoulas & Anderson 1986; both from memory).
//! * Because the currents alone give hundreds of equations per frequency, two frequencies beside the interpolated ones
//!   are enough to fix the weights. That takes about half the solutions that the admittance alone would need.
//! * Y(−f) = Y*(f) is built in: each sample counts at its negative frequency too.
//! * The error estimate is the disagreement of two such interpolants that leave out different samples, looked for
//!   between the samples and wherever a pole comes near to the axis. A spurious pole (a Froissart doublet) is in one of
//!   them only, so it shows as disagreement and the next solution is asked for at its place, which removes it.

mod bary;
mod check;
mod error;
mod fit;
mod place;
mod range;
mod sample;
mod section;
mod state;
mod weights;

pub use error::SweepError;
pub use fit::{Admittances, Fit};
pub use range::SweepRange;
pub use sample::Sample;
pub use state::Sweep;
