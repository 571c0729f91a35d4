//! Fields of known currents: near, far, and the power that leaves.
//!
//! Everything follows from the currents at the ends of segments ([`crate::wire::EndCurrents`]); the sinusoid between
//! them has closed fields, so nothing near a wire is numerical quadrature. (What soil gives back is: of a few sources, none nearer than an image.)
//!
//! * [`NearFieldSource`]: E and H at any point; [`smoothed`] currents for points close to a wire; [`NearFieldOverSoil`]: the
//!   same over soil.
//! * [`FarFieldSource`]: far field in any direction, thousands of them at once, over soil too.
//! * [`radiated_power_w`]: the power toward the sky by integration over the sphere, which is found without asking the
//!   feedpoint; [`earth_power_w`]: the power into the earth, likewise; [`strongest_direction`]: where most of it goes.
//! * [`PotentialSource`], [`surface_field_v_per_m`]: what stands on the wire's surface.

mod evanescent;
mod far;
mod ground;
mod into_earth;
mod kronrod;
mod near;
mod over_soil;
mod peak;
mod polarisation;
mod potential;
pub(crate) mod quadrature;
mod run;
mod smooth;
mod source;
mod space;
mod sphere;
mod surface;

pub use far::{Direction, FarField};
pub use into_earth::earth_power_w;
pub use near::{NearField, NearFieldSource};
pub use over_soil::{NearFieldOverSoil, Region};
pub use peak::strongest_direction;
pub use polarisation::{Polarisation, Sense};
pub use potential::{PotentialSource, SurfacePoint};
pub use smooth::{SmoothCurrents, smoothed};
pub use source::{FarFieldSource, Ring};
pub use sphere::radiated_power_w;
pub use surface::surface_field_v_per_m;
