//! The projection of the site on a vertical plane, to scale, and the way back from the screen.

use eframe::egui::{Pos2, Rect, Vec2, pos2};
use station::plan::Point;

/// Closest and farthest that the view goes.
const PX_PER_M: std::ops::RangeInclusive<f64> = 0.5..=400.0;

/// The vertical plane that is looked at. East stays on the right hand (north, if the plane runs north), so that
/// reversing a path does not turn the picture round.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Plane {
    east: f64,
    north: f64,
}

impl Plane {
    /// The plane through two points; a vertical wire is looked at from the south.
    pub fn through(from: Point, to: Point) -> Self {
        let (dx, dy) = (to.x_m - from.x_m, to.y_m - from.y_m);
        let length = dx.hypot(dy);
        if length < 1e-6 {
            return Self { east: 1.0, north: 0.0 };
        }
        let sign = if dx < -1e-9 || (dx.abs() <= 1e-9 && dy < 0.0) { -1.0 } else { 1.0 };
        Self { east: sign * dx / length, north: sign * dy / length }
    }

    /// Where a point lies in the plane.
    pub fn flat(self, point: Point) -> Flat {
        Flat { along_m: point.x_m * self.east + point.y_m * self.north, up_m: point.z_m }
    }

    /// A point moved within the plane to another place; its distance from the plane stays.
    pub fn moved(self, point: Point, to: Flat) -> Point {
        let by_m = to.along_m - self.flat(point).along_m;
        Point::new(point.x_m + by_m * self.east, point.y_m + by_m * self.north, to.up_m)
    }
}

/// A place in the plane, m.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Flat {
    /// To the right.
    pub along_m: f64,
    /// Over the earth.
    pub up_m: f64,
}

/// What stands in the middle of the frame, and how large.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Camera {
    /// The middle of the frame.
    pub middle: Flat,
    /// The scale, the same in both directions.
    pub px_per_m: f64,
}

/// The part of the plane that is worth seeing.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Bounds {
    /// Lower left corner.
    pub low: Flat,
    /// Upper right corner.
    pub high: Flat,
}

impl Bounds {
    /// The smallest bounds around some places and the earth below them; `None` without any.
    pub fn around(places: impl IntoIterator<Item = Flat>) -> Option<Self> {
        let mut bounds: Option<Self> = None;
        for place in places {
            let b = bounds.get_or_insert(Self { low: Flat { up_m: 0.0, ..place }, high: place });
            b.low.along_m = b.low.along_m.min(place.along_m);
            b.low.up_m = b.low.up_m.min(place.up_m);
            b.high.along_m = b.high.along_m.max(place.along_m);
            b.high.up_m = b.high.up_m.max(place.up_m);
        }
        bounds
    }
}

impl Camera {
    /// Shows the bounds as large as they fit into a part of the frame, standing on its lower edge.
    pub fn fit(bounds: Bounds, into: Rect, frame: Rect) -> Self {
        let width_m = (bounds.high.along_m - bounds.low.along_m).max(1.0);
        let height_m = (bounds.high.up_m - bounds.low.up_m).max(1.0);
        let px_per_m = (f64::from(into.width().max(20.0)) / width_m)
            .min(f64::from(into.height().max(20.0)) / height_m)
            .clamp(*PX_PER_M.start(), *PX_PER_M.end());
        let left_over_m = (f64::from(into.height()) / px_per_m - height_m).max(0.0);
        // A low, wide site stands a little above the lower edge instead of leaving all the sky on top.
        let lift_m = left_over_m * 0.25;
        let low_m = bounds.low.up_m - lift_m;
        let offset = frame.center() - pos2(into.center().x, into.bottom());
        Self {
            middle: Flat {
                along_m: 0.5 * (bounds.low.along_m + bounds.high.along_m) + f64::from(offset.x) / px_per_m,
                up_m: low_m - f64::from(offset.y) / px_per_m,
            },
            px_per_m,
        }
    }

    /// Larger or smaller; what is under the pointer stays there.
    pub fn zoomed(self, factor: f64, about: Pos2, frame: Rect) -> Self {
        let px_per_m = (self.px_per_m * factor).clamp(*PX_PER_M.start(), *PX_PER_M.end());
        let offset = about - frame.center();
        let shift = 1.0 / self.px_per_m - 1.0 / px_per_m;
        Self {
            middle: Flat {
                along_m: self.middle.along_m + f64::from(offset.x) * shift,
                up_m: self.middle.up_m - f64::from(offset.y) * shift,
            },
            px_per_m,
        }
    }

    /// The content moved on screen.
    pub fn panned(self, by: Vec2) -> Self {
        Self {
            middle: Flat {
                along_m: self.middle.along_m - f64::from(by.x) / self.px_per_m,
                up_m: self.middle.up_m + f64::from(by.y) / self.px_per_m,
            },
            ..self
        }
    }
}

/// Plane, camera and frame together: from points to the screen and back.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct SideView {
    /// What is looked at.
    pub plane: Plane,
    /// From where.
    pub camera: Camera,
    /// Where it is drawn.
    pub frame: Rect,
}

impl SideView {
    /// A point on the screen.
    pub fn at(&self, point: Point) -> Pos2 {
        self.at_flat(self.plane.flat(point))
    }

    /// A place of the plane on the screen.
    pub fn at_flat(&self, place: Flat) -> Pos2 {
        let middle = self.frame.center();
        pos2(
            middle.x + ((place.along_m - self.camera.middle.along_m) * self.camera.px_per_m) as f32,
            middle.y - ((place.up_m - self.camera.middle.up_m) * self.camera.px_per_m) as f32,
        )
    }

    /// The place of the plane under a position of the screen.
    pub fn flat(&self, position: Pos2) -> Flat {
        let offset = position - self.frame.center();
        Flat {
            along_m: self.camera.middle.along_m + f64::from(offset.x) / self.camera.px_per_m,
            up_m: self.camera.middle.up_m - f64::from(offset.y) / self.camera.px_per_m,
        }
    }

    /// Metres on screen for so many pixels.
    pub fn metres(&self, px: f32) -> f64 {
        f64::from(px) / self.camera.px_per_m
    }

    /// The screen height of the earth.
    pub fn earth_y(&self) -> f32 {
        self.at_flat(Flat { along_m: 0.0, up_m: 0.0 }).y
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use eframe::egui::vec2;

    fn view() -> SideView {
        SideView {
            plane: Plane::through(Point::new(3.0, 1.0, 9.0), Point::new(-27.0, 41.0, 11.0)),
            camera: Camera { middle: Flat { along_m: 4.0, up_m: 6.0 }, px_per_m: 17.0 },
            frame: Rect::from_min_size(pos2(40.0, 20.0), vec2(800.0, 400.0)),
        }
    }

    #[test]
    fn screen_and_site_are_inverse() {
        let view = view();
        for point in [Point::new(0.0, 0.0, 0.0), Point::new(12.5, -7.25, 10.0), Point::new(-80.0, 3.0, 0.4)] {
            let back = view.plane.moved(point, view.flat(view.at(point)));
            assert!(back.distance_m(point) < 1e-4, "{point:?} came back as {back:?}");
        }
    }

    #[test]
    fn the_plane_shows_true_lengths_of_what_lies_in_it() {
        let view = view();
        let (a, b) = (Point::new(3.0, 1.0, 9.0), Point::new(-27.0, 41.0, 11.0));
        let px = f64::from(view.at(a).distance(view.at(b)));
        assert!((px / view.camera.px_per_m - a.distance_m(b)).abs() < 1e-3);
    }

    #[test]
    fn reversing_a_path_does_not_turn_the_picture() {
        let (a, b) = (Point::new(0.0, 0.0, 9.0), Point::new(30.0, 10.0, 9.0));
        assert_eq!(Plane::through(a, b), Plane::through(b, a));
        assert!(Plane::through(a, b).flat(b).along_m > Plane::through(a, b).flat(a).along_m);
    }

    #[test]
    fn zooming_keeps_what_is_under_the_pointer() {
        let view = view();
        let pointer = pos2(200.0, 300.0);
        let before = view.flat(pointer);
        let after = SideView { camera: view.camera.zoomed(1.7, pointer, view.frame), ..view }.flat(pointer);
        assert!((before.along_m - after.along_m).abs() < 1e-6 && (before.up_m - after.up_m).abs() < 1e-6);
    }

    #[test]
    fn a_fitted_site_is_inside() {
        let bounds =
            Bounds { low: Flat { along_m: -4.0, up_m: 0.0 }, high: Flat { along_m: 50.0, up_m: 12.0 } };
        let frame = Rect::from_min_size(pos2(0.0, 0.0), vec2(640.0, 300.0));
        let into = Rect::from_min_max(pos2(70.0, 60.0), pos2(600.0, 250.0));
        let view = SideView { plane: view().plane, camera: Camera::fit(bounds, into, frame), frame };
        let grown = into.expand(0.01);
        assert!(grown.contains(view.at_flat(bounds.low)) && grown.contains(view.at_flat(bounds.high)));
    }
}
