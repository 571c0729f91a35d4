//! Special functions: thin covers over kept libraries, with what the antenna formulas need besides.

mod bessel;
mod integrals;

pub use bessel::bessel_j0_over_j1;
pub use integrals::{SineCosineIntegrals, cin, exponential_integral_of_wave, sine_cosine_integrals};
