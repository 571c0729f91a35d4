//! Fields of known currents: near, far, and the power that leaves.

mod far;
mod potential;
mod quadrature;
mod sphere;

pub use far::{Direction, FarField, FarFieldSource};
pub use potential::{PotentialSource, SurfacePoint};
pub use sphere::radiated_power_w;
