//! From a hand's wish to an edit of the plan: what is aimed at, what the grid makes of it, and what is possible.

use station::plan::{PathPoint, Point};
use station::units::Units;
use station::validate::FEED_FRACTION;

use crate::command::Edit;

use super::grip::{Grip, Numbers};
use super::model::{Model, OnPath};
use super::side_view::Flat;

/// Shortest wire, m.
const SHORTEST_WIRE_M: f64 = 0.5;
/// A wire keeps this much of its path, m.
const HOLD_M: f64 = 0.2;
/// Lowest fixing on a support, m.
const LOWEST_FIXING_M: f64 = 0.2;
/// Heights of supports, m.
const SUPPORT_HEIGHT_M: std::ops::RangeInclusive<f64> = 1.0..=120.0;
/// Closest that the supports of a wire's two ends come, m.
const CLOSEST_SUPPORTS_M: f64 = 1.0;
/// Where the feedpoint likes to be, as shares of the wire, with their names.
const FEED_PLACES: [(f64, &str); 7] = [
    (*FEED_FRACTION.start(), "fed at its beginning"),
    (0.25, "one quarter"),
    (1.0 / 3.0, "one third"),
    (0.5, "centre"),
    (2.0 / 3.0, "two thirds"),
    (0.75, "three quarters"),
    (*FEED_FRACTION.end(), "fed at its end"),
];

/// Edits, and a hint where the wish could not be followed.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Asked {
    /// In an order in which each step is a sound plan.
    pub edits: Vec<Edit>,
    /// Why the thing goes no further.
    pub hint: Option<String>,
}

impl Asked {
    fn one(edit: Edit) -> Self {
        Self { edits: vec![edit], hint: None }
    }

    fn hinted(mut self, hint: Option<String>) -> Self {
        self.hint = hint;
        self
    }
}

/// The grid that numbers snap to.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Grid {
    /// Distance between its lines, m.
    pub step_m: f64,
    /// How close the feedpoint comes to a place it likes before it snaps there, m.
    pub catch_m: f64,
}

impl Grid {
    /// 0.1 m or 0.5 ft.
    pub fn coarse(units: Units, catch_m: f64) -> Self {
        let step = match units {
            Units::Metres => 0.1,
            Units::Feet => 0.5,
        };
        Self { step_m: units.to_metres(step), catch_m }
    }

    /// A tenth of the coarse grid.
    pub fn fine(units: Units) -> Self {
        Self { step_m: Self::coarse(units, 0.0).step_m * 0.1, catch_m: 0.0 }
    }

    /// The nearest line of the grid.
    pub fn round(self, value_m: f64) -> f64 {
        // A plan file shows 11.1, not 11.100000000000001: what is left of the product below a micrometre goes.
        ((value_m / self.step_m).round() * self.step_m * 1e6).round() / 1e6
    }
}

/// The name of the place that a share of the wire is, if it has one.
pub fn feed_place(fraction: f64) -> Option<&'static str> {
    FEED_PLACES.iter().find(|(share, _)| (share - fraction).abs() < 1e-6).map(|(_, name)| *name)
}

/// Keeps a value in a range, with a hint on either side.
fn held(value: f64, low: (f64, &str), high: (f64, &str)) -> (f64, Option<String>) {
    if value < low.0 {
        (low.0, Some(low.1.to_owned()))
    } else if value > high.0 {
        (high.0.max(low.0), Some(high.1.to_owned()))
    } else {
        (value, None)
    }
}

impl Model<'_> {
    /// Puts numbers on the grid.
    pub fn snapped(&self, grip: Grip, wish: Numbers, grid: Grid) -> Numbers {
        if grip == Grip::Feedpoint {
            let cut_m = self.plan.wires.get(self.plan.feedpoint.wire).map_or(0.0, |w| w.cut_length_m);
            let near = |along_m: f64| {
                FEED_PLACES
                    .iter()
                    .map(|(share, _)| share * cut_m)
                    .filter(|place_m| (place_m - along_m).abs() < grid.catch_m)
                    .min_by(|a, b| (a - along_m).abs().total_cmp(&(b - along_m).abs()))
            };
            let along_m = wish.along_m.map(|m| near(m).unwrap_or_else(|| grid.round(m)));
            return Numbers { along_m, up_m: None };
        }
        Numbers { along_m: wish.along_m.map(|m| grid.round(m)), up_m: wish.up_m.map(|m| grid.round(m)) }
    }

    /// The edits that give a grip its new numbers, as far as possible.
    pub fn ask(&self, grip: Grip, wish: Numbers) -> Asked {
        let finite = |m: &f64| m.is_finite();
        let (along_m, up_m) = (wish.along_m.filter(finite), wish.up_m.filter(finite));
        let asked = match (grip, along_m, up_m) {
            (Grip::WireBeginning { wire }, Some(cut_m), _) => self.ask_beginning(wire, cut_m),
            (Grip::WireEnd { wire }, Some(cut_m), _) => self.ask_end(wire, cut_m),
            (Grip::Feedpoint, Some(from_beginning_m), _) => self.ask_feedpoint(from_beginning_m),
            (Grip::Load { load }, Some(from_beginning_m), _) => self.ask_load(load, from_beginning_m),
            (Grip::PathPoint { wire, point }, along_m, Some(height_m)) => {
                self.ask_path_point(wire, point, along_m, height_m)
            }
            (Grip::SupportFoot { support }, Some(along_m), _) => self.ask_foot(support, along_m),
            (Grip::SupportTop { support }, _, Some(height_m)) => self.ask_top(support, height_m),
            (Grip::Entrance, Some(along_m), Some(up_m)) => {
                let (up_m, hint) = held(up_m, (0.0, "the earth is here"), (f64::INFINITY, ""));
                let at = self.point_from(grip, self.plan.site.entrance, along_m, up_m);
                Some(Asked::one(Edit::Entrance(at)).hinted(hint))
            }
            (Grip::NewPoint { wire, span }, Some(along_m), Some(up_m)) => {
                self.ask_new_point(wire, span, along_m, up_m)
            }
            _ => None,
        };
        asked.unwrap_or_default()
    }

    /// Both ends at once: the middle of the wire stays where it is on the path.
    pub fn ask_both_ends(&self, wire: usize, cut_m: f64) -> Asked {
        let Some(on) = self.on_path(wire).filter(|_| cut_m.is_finite()) else { return Asked::default() };
        let middle_m = on.wire.start_m + 0.5 * on.wire.cut_length_m;
        let (first_m, last_m) = on.room_m();
        let most_m = 2.0 * (middle_m + first_m).min(on.path_m() + last_m - middle_m);
        let (cut_length_m, hint) = held(cut_m, (SHORTEST_WIRE_M, SHORT), (most_m, TOUCHES));
        let start_m = middle_m - 0.5 * cut_length_m;
        Asked::one(Edit::WireSpan { wire, start_m, cut_length_m }).hinted(hint)
    }

    fn ask_end(&self, wire: usize, cut_m: f64) -> Option<Asked> {
        let on = self.on_path(wire)?;
        let least_m = SHORTEST_WIRE_M.max(HOLD_M - on.wire.start_m);
        let most_m = on.path_m() + on.room_m().1 - on.wire.start_m;
        let (cut_length_m, hint) = held(cut_m, (least_m, SHORT), (most_m, TOUCHES));
        Some(Asked::one(Edit::CutLength { wire, cut_length_m }).hinted(hint))
    }

    fn ask_beginning(&self, wire: usize, cut_m: f64) -> Option<Asked> {
        let on = self.on_path(wire)?;
        let least_m = SHORTEST_WIRE_M.max(on.end_m() - on.path_m() + HOLD_M);
        let most_m = on.end_m() + on.room_m().0;
        let (cut_length_m, hint) = held(cut_m, (least_m, SHORT), (most_m, TOUCHES));
        let start_m = on.end_m() - cut_length_m;
        Some(Asked::one(Edit::WireBeginning { wire, start_m }).hinted(hint))
    }

    fn ask_feedpoint(&self, from_beginning_m: f64) -> Option<Asked> {
        let cut_m = self.plan.wires.get(self.plan.feedpoint.wire)?.cut_length_m;
        let share = from_beginning_m / cut_m;
        let (low, high) = (*FEED_FRACTION.start(), *FEED_FRACTION.end());
        let (share, hint) = held(share, (low, "the wire begins here"), (high, "the wire ends here"));
        // The places it likes are exact shares, not what is left of them after a division.
        let exact = FEED_PLACES.iter().find(|(place, _)| (place - share).abs() < 1e-9);
        Some(Asked::one(Edit::FeedFraction(exact.map_or(share, |(place, _)| *place))).hinted(hint))
    }

    fn ask_load(&self, load: usize, from_beginning_m: f64) -> Option<Asked> {
        let cut_m = self.plan.wires.get(self.load(load)?.wire)?.cut_length_m;
        let (low, high) = (*FEED_FRACTION.start(), *FEED_FRACTION.end());
        let share = from_beginning_m / cut_m;
        let (fraction, hint) = held(share, (low, "the wire begins here"), (high, "the wire ends here"));
        Some(Asked::one(Edit::LoadFraction { load, fraction }).hinted(hint))
    }

    /// A point with a new place: the height is over the earth, the distance from the grip's datum.
    fn point_from(&self, grip: Grip, point: Point, along_m: f64, up_m: f64) -> Point {
        let datum = self.datum(self.moves_first(grip));
        self.plane.moved(point, Flat { along_m: datum.along_m + datum.side * along_m, up_m })
    }

    fn ask_path_point(
        &self,
        wire: usize,
        point: usize,
        along_m: Option<f64>,
        height_m: f64,
    ) -> Option<Asked> {
        let on = self.on_path(wire)?;
        // What hangs from the path's ends must clear the earth.
        let hangs_m = match point {
            0 => (-on.wire.start_m).max(0.0),
            p if p + 1 == on.path.len() => (on.end_m() - on.path_m()).max(0.0),
            _ => 0.0,
        };
        let low = (LOWEST_FIXING_M + hangs_m, if hangs_m > 0.0 { TOUCHES } else { "the earth is here" });
        match on.wire.path.get(point)? {
            PathPoint::OnSupport { support, .. } => {
                let found = self.plan.site.supports.iter().find(|s| s.name == *support)?;
                let top_hint = format!("{support} ends here: raise its top first");
                let (height_m, hint) = held(height_m, low, (found.height_m, &top_hint));
                Some(Asked::one(Edit::PathHeight { wire, point, height_m }).hinted(hint))
            }
            PathPoint::Free(at) => {
                let (up_m, hint) = held(height_m, low, (f64::INFINITY, ""));
                let grip = Grip::PathPoint { wire, point };
                let along_m = along_m.unwrap_or_else(|| self.distance_m(grip, *at));
                let mut path = on.wire.path.clone();
                path[point] = PathPoint::Free(self.point_from(grip, *at, along_m, up_m));
                Some(Asked::one(Edit::PathPoints { wire, path }).hinted(hint))
            }
        }
    }

    fn ask_new_point(&self, wire: usize, span: usize, along_m: f64, up_m: f64) -> Option<Asked> {
        let grip = Grip::NewPoint { wire, span };
        let middle = self.place(grip)?;
        let (up_m, hint) = held(up_m, (LOWEST_FIXING_M, "the earth is here"), (f64::INFINITY, ""));
        let mut path = self.plan.wires.get(wire)?.path.clone();
        path.insert(span + 1, PathPoint::Free(self.point_from(grip, middle, along_m, up_m)));
        Some(Asked::one(Edit::PathPoints { wire, path }).hinted(hint))
    }

    fn ask_foot(&self, support: usize, along_m: f64) -> Option<Asked> {
        let grip = Grip::SupportFoot { support };
        let (first, last) = self.carries_ends(support);
        // The supports at the two ends keep their order and their distance; the others go anywhere.
        let datum = self.datum(first);
        let now_m = self.distance_m(grip, self.place(grip)?);
        let low_m = if first != last && now_m > 0.0 { CLOSEST_SUPPORTS_M } else { f64::NEG_INFINITY };
        let too_close = format!("too close to {}", datum.name);
        let (along_m, hint) = held(along_m, (low_m, &too_close), (f64::INFINITY, ""));
        let foot = self.plan.site.supports.get(support)?.foot;
        let foot = self.point_from(grip, foot, along_m, foot.z_m);
        Some(Asked::one(Edit::SupportFoot { support, foot }).hinted(hint))
    }

    fn ask_top(&self, support: usize, height_m: f64) -> Option<Asked> {
        self.plan.site.supports.get(support)?;
        let low = (*SUPPORT_HEIGHT_M.start(), "no lower");
        let (height_m, hint) = held(height_m, low, (*SUPPORT_HEIGHT_M.end(), "no higher"));
        Some(Asked::one(Edit::SupportHeight { support, height_m }).hinted(hint))
    }

    /// The path without one of its inner points, or the plan without a load; `None` for all else.
    pub fn ask_removal(&self, grip: Grip) -> Option<Edit> {
        if let Grip::Load { load } = grip {
            return Some(Edit::RemoveLoad { load });
        }
        let Grip::PathPoint { wire, point } = grip else { return None };
        let mut path = self.plan.wires.get(wire)?.path.clone();
        if point == 0 || point + 1 >= path.len() {
            return None;
        }
        path.remove(point);
        Some(Edit::PathPoints { wire, path })
    }

    /// Numbers after a press of an arrow key: a step to the right and up on the screen, on the grid.
    pub fn nudged(&self, grip: Grip, right: f64, up: f64, grid: Grid) -> Numbers {
        let now = self.numbers(grip);
        let step = |value: Option<f64>, by: f64| value.map(|m| grid.round(m + by * grid.step_m));
        match grip {
            Grip::WireBeginning { wire } | Grip::WireEnd { wire } => {
                let at_end = matches!(grip, Grip::WireEnd { .. });
                let outward = self.on_path(wire).map_or(0.0, |on| self.outward(on, at_end, right, up));
                Numbers { along_m: step(now.along_m, outward), up_m: None }
            }
            Grip::Feedpoint | Grip::Load { .. } => {
                let forward = self.forward_at(grip, right, up);
                Numbers { along_m: step(now.along_m, forward), up_m: None }
            }
            _ => {
                let side = self.datum(self.moves_first(grip)).side;
                let along_m = if right.abs() > 0.0 { step(now.along_m, right * side) } else { now.along_m };
                Numbers { along_m, up_m: if up.abs() > 0.0 { step(now.up_m, up) } else { now.up_m } }
            }
        }
    }

    /// 1 where an arrow makes the wire longer at one of its ends, −1 where it makes it shorter.
    fn outward(&self, on: OnPath<'_>, at_end: bool, right: f64, up: f64) -> f64 {
        let (place_m, sense) = if at_end { (on.end_m(), 1.0) } else { (on.wire.start_m, -1.0) };
        let over_m = if at_end { place_m - on.path_m() } else { -place_m };
        if over_m > 1e-6 && up.abs() > 0.0 {
            return -up.signum();
        }
        if over_m > -1e-6 && up < 0.0 {
            return 1.0;
        }
        let (from, to) = on.piece(place_m);
        sense * self.sense_of(from.at, to.at, right, up)
    }

    /// 1 where an arrow points along the wire at the feedpoint or a load, −1 where it points against it.
    fn forward_at(&self, grip: Grip, right: f64, up: f64) -> f64 {
        let pair = self.wire_of(grip).and_then(|wire| {
            let arc_m = self.numbers(grip).along_m?;
            self.hung_wire(wire)?.vertices.windows(2).find(|pair| arc_m <= pair[1].arc_m)
        });
        pair.map_or(0.0, |pair| self.sense_of(pair[0].at, pair[1].at, right, up))
    }

    /// Whether an arrow points along a piece (1), against it (−1) or across it (0).
    fn sense_of(&self, from: Point, to: Point, right: f64, up: f64) -> f64 {
        let (from, to) = (self.plane.flat(from), self.plane.flat(to));
        let (dx, dz) = (to.along_m - from.along_m, to.up_m - from.up_m);
        let dot = (dx * right + dz * up) / dx.hypot(dz).max(1e-9);
        if dot.abs() < 0.2 { 0.0 } else { dot.signum() }
    }
}

const SHORT: &str = "the wire must keep some length on its path";
const TOUCHES: &str = "the hanging end would touch the earth";
