//! The strongest direction.

use super::far::Direction;
use super::source::FarFieldSource;

/// The direction in which most power per solid angle leaves, and that intensity, W/sr.
///
/// Searched on a grid finer than the lobes, then climbed to 0.01°; the intensity is right to 1e-6. Of several equal
/// lobes one is found, the first by elevation from the zenith down, then by azimuth.
#[must_use]
pub fn strongest_direction(source: &FarFieldSource) -> (Direction, f64) {
    let intensity = |direction: Direction| source.field(direction).intensity_w_per_sr();
    // The narrowest lobe of a source of electrical radius kR is about π/kR wide.
    let step_deg = 180.0 / (4.0 * source.electrical_size() + 36.0).ceil();
    let lowest_deg = source.ground().lowest_deg();
    let zenith = Direction { elevation_deg: 90.0, azimuth_deg: 0.0 };
    let mut best = (zenith, intensity(zenith));
    let mut elevation_deg = 90.0 - step_deg;
    while elevation_deg > lowest_deg - 0.5 * step_deg {
        let ring = source.ring(elevation_deg.max(lowest_deg));
        let around = (360.0 * elevation_deg.to_radians().cos() / step_deg).ceil().max(1.0);
        for index in 0..around as u32 {
            let azimuth_deg = 360.0 * f64::from(index) / around;
            let direction = Direction { elevation_deg: elevation_deg.max(lowest_deg), azimuth_deg };
            let here = ring.field(azimuth_deg).intensity_w_per_sr();
            // Equal lobes differ by rounding; a later one must be better by more than that.
            if here > best.1 * (1.0 + 1e-9) {
                best = (direction, here);
            }
        }
        elevation_deg -= step_deg;
    }
    climb(&intensity, best, step_deg, lowest_deg)
}

/// The climb ends at this step, degrees.
const FINEST_DEG: f64 = 0.01;

/// Climbs from a point of the grid in ever smaller steps.
fn climb(
    intensity: &impl Fn(Direction) -> f64,
    (mut at, mut best): (Direction, f64),
    step_deg: f64,
    lowest_deg: f64,
) -> (Direction, f64) {
    let mut step_deg = 0.5 * step_deg;
    while step_deg > FINEST_DEG {
        // A degree of azimuth is shorter toward the zenith.
        let round_deg = step_deg / at.elevation_deg.to_radians().cos().max(0.01);
        let steps = [(step_deg, 0.0), (-step_deg, 0.0), (0.0, round_deg), (0.0, -round_deg)];
        let better = steps.into_iter().find_map(|(up_deg, round_deg)| {
            let elevation_deg = (at.elevation_deg + up_deg).clamp(lowest_deg, 90.0);
            let next = Direction { elevation_deg, azimuth_deg: at.azimuth_deg + round_deg };
            let here = intensity(next);
            (here > best).then_some((next, here))
        });
        match better {
            Some(next) => (at, best) = next,
            None => step_deg *= 0.5,
        }
    }
    at.azimuth_deg = at.azimuth_deg.rem_euclid(360.0);
    (at, best)
}
