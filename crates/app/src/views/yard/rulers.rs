//! Rulers in metres or feet with steps that are easy to count.

use station::units::{Units, fixed};

use super::side_view::{Flat, SideView};

/// Least distance between two numbers of a ruler, px.
const NUMBER_GAP_PX: f64 = 52.0;
/// Least distance between two ticks, px.
const TICK_GAP_PX: f64 = 7.0;

/// One mark of a ruler.
#[derive(Clone, Debug, PartialEq)]
pub struct Tick {
    /// Screen x of a horizontal ruler, y of a vertical one.
    pub at: f32,
    /// Its number; `None` for the small ticks between.
    pub number: Option<String>,
}

/// The smallest of 1, 2, 5 × 10ⁿ whose multiples stand at least so many pixels apart.
pub fn nice_step(px_per_unit: f64, least_px: f64) -> f64 {
    let least = least_px / px_per_unit;
    let decade = 10_f64.powf(least.log10().floor());
    let factor =
        [1.0, 2.0, 5.0, 10.0].into_iter().find(|f| f * decade >= least * (1.0 - 1e-9)).unwrap_or(10.0);
    factor * decade
}

/// The step of the small ticks: a tenth, a fifth or a half of the numbers' step, whichever first has room.
fn small_step(step: f64, px_per_unit: f64) -> f64 {
    [10.0, 5.0, 2.0].into_iter().map(|n| step / n).find(|s| s * px_per_unit >= TICK_GAP_PX).unwrap_or(step)
}

/// The ticks between two values of a ruler, both in its unit.
fn ticks(low: f64, high: f64, px_per_unit: f64, at: impl Fn(f64) -> f32) -> Vec<Tick> {
    let step = nice_step(px_per_unit, NUMBER_GAP_PX);
    let small = small_step(step, px_per_unit);
    let per_number = (step / small).round() as i64;
    let decimals = usize::from(step < 0.999) + usize::from(step < 0.0999);
    let (first, last) = ((low / small).ceil() as i64, (high / small).floor() as i64);
    (first..=last)
        .map(|n| {
            let value = n as f64 * small;
            let number = (n.rem_euclid(per_number) == 0).then(|| fixed(value, decimals));
            Tick { at: at(value), number }
        })
        .collect()
}

/// Heights over the earth, along the left edge.
pub fn heights(view: &SideView, units: Units) -> Vec<Tick> {
    let low = view.flat(view.frame.left_bottom()).up_m.max(0.0);
    let high = view.flat(view.frame.left_top()).up_m;
    ticks(
        units.from_metres(low),
        units.from_metres(high),
        view.camera.px_per_m * units.to_metres(1.0),
        |value| view.at_flat(Flat { along_m: 0.0, up_m: units.to_metres(value) }).y,
    )
}

/// Distances from a zero, along the lower edge.
pub fn distances(view: &SideView, units: Units, zero_along_m: f64) -> Vec<Tick> {
    let low = view.flat(view.frame.left_bottom()).along_m - zero_along_m;
    let high = view.flat(view.frame.right_bottom()).along_m - zero_along_m;
    ticks(
        units.from_metres(low),
        units.from_metres(high),
        view.camera.px_per_m * units.to_metres(1.0),
        |value| view.at_flat(Flat { along_m: zero_along_m + units.to_metres(value), up_m: 0.0 }).x,
    )
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::views::yard::side_view::{Camera, Plane};
    use eframe::egui::{Rect, pos2, vec2};
    use station::plan::Point;

    #[test]
    fn steps_are_one_two_five() {
        assert!((nice_step(52.0, 52.0) - 1.0).abs() < 1e-9);
        assert!((nice_step(20.0, 52.0) - 5.0).abs() < 1e-9);
        assert!((nice_step(30.0, 52.0) - 2.0).abs() < 1e-9);
        assert!((nice_step(300.0, 52.0) - 0.2).abs() < 1e-9);
        assert!((nice_step(1.0, 52.0) - 100.0).abs() < 1e-9);
    }

    #[test]
    fn numbers_never_crowd_and_zero_is_marked() {
        for px_per_m in [0.7, 3.3, 8.0, 19.0, 60.0, 350.0] {
            for units in [Units::Metres, Units::Feet] {
                let view = SideView {
                    plane: Plane::through(Point::new(0.0, 0.0, 0.0), Point::new(1.0, 0.0, 0.0)),
                    camera: Camera { middle: Flat { along_m: 3.0, up_m: 2.0 }, px_per_m },
                    frame: Rect::from_min_size(pos2(0.0, 0.0), vec2(900.0, 400.0)),
                };
                let ticks = distances(&view, units, 2.5);
                let numbers: Vec<&Tick> = ticks.iter().filter(|t| t.number.is_some()).collect();
                assert!(numbers.len() >= 4, "{px_per_m} px/m: only {} numbers", numbers.len());
                for pair in numbers.windows(2) {
                    assert!(pair[1].at - pair[0].at > 51.9, "{px_per_m} px/m: numbers too close");
                }
                let zero = view.at_flat(Flat { along_m: 2.5, up_m: 0.0 }).x;
                assert!(
                    numbers.iter().any(|t| t.number.as_deref() == Some("0") && (t.at - zero).abs() < 0.1
                        || t.number.as_deref() == Some("0.0") && (t.at - zero).abs() < 0.1)
                );
            }
        }
    }
}
