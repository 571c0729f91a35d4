//! Where everything of the Yard stands on the screen. Nothing here paints: text is measured through [`Measure`].

use eframe::egui::{Pos2, Rect, Vec2, pos2, vec2};
use sheet::tokens::Ink;
use station::plan::{Load, Point, SupportKind};
use station::report::BandReport;
use station::units::Units;

use sheet::model::LoadKind;

use super::grip::Grip;
use super::ground;
use super::model::Model;
use super::rulers::{self, Tick};
use super::side_view::SideView;
use super::wave::{Peaks, Size, Wave, WaveMark};

/// Width of the height ruler and height of the distance ruler, px.
pub const GUTTER: Vec2 = vec2(44.0, 24.0);
/// Reach of a grip around its middle, px.
pub const GRIP_PX: f32 = 11.0;
/// How far off the wire the sign of a loop or node stands, where it gives way, px.
const SIGN_PX: f32 = 15.0;
/// Closest that two grips stand, px.
const GRIP_GAP_PX: f32 = 20.0;
/// Space between the plot's edge and what stands at it, px.
pub const EDGE_PX: f32 = 10.0;

/// A side of the feedpoint shorter than this is a stub, wavelengths.
const STUB_WAVELENGTHS: f64 = 0.03;
/// Exact.
const SPEED_OF_LIGHT_M_PER_S: f64 = 299_792_458.0;

/// Two sizes of text.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
#[allow(missing_docs)] // The words say it.
pub enum Type {
    Small,
    Body,
}

/// Measures a line of text.
pub type Measure<'m> = dyn Fn(&str, Type) -> Vec2 + 'm;

/// A line of text at its place.
#[derive(Clone, Debug, PartialEq)]
pub struct Text {
    /// Where.
    pub rect: Rect,
    /// What it says.
    pub text: String,
    /// In which ink.
    pub ink: Ink,
    /// How large.
    pub size: Type,
}

/// A support on the screen.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct SupportShape {
    /// What it is.
    pub kind: SupportKind,
    /// Where it stands.
    pub foot: Pos2,
    /// Where it ends.
    pub top: Pos2,
}

/// A load on the screen.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct LoadShape {
    /// What it is.
    pub kind: LoadKind,
    /// Where on the wire.
    pub at: Pos2,
    /// The wire's direction there.
    pub along: Vec2,
}

/// A grip on the screen.
#[derive(Clone, Debug, PartialEq)]
pub struct Handle {
    /// What it takes hold of.
    pub grip: Grip,
    /// Its name.
    pub name: String,
    /// Where the thing is.
    pub anchor: Pos2,
    /// Where one takes hold: beside the thing, if another grip is closer to it.
    pub at: Pos2,
}

/// What is asked of a layout.
#[derive(Clone, Copy)]
pub struct Asking<'a> {
    /// The chosen band, once there is a report.
    pub band: Option<&'a BandReport>,
    /// Index and name of the chosen feed.
    pub feed: (usize, &'a str),
    /// Metres or feet.
    pub units: Units,
    /// Size of the box of buttons in the upper right corner.
    pub buttons: Vec2,
}

/// The Yard on the screen.
pub struct Layout<'a> {
    /// Projection; its frame is the plot between the rulers.
    pub view: SideView,
    /// Ticks of the height ruler.
    pub heights: Vec<Tick>,
    /// Ticks of the distance ruler.
    pub distances: Vec<Tick>,
    /// Supports in the plan's order.
    pub supports: Vec<SupportShape>,
    /// Ropes.
    pub ropes: Vec<Vec<Pos2>>,
    /// Leads from earthed ends to the earth.
    pub leads: Vec<[Pos2; 2]>,
    /// Wires.
    pub wires: Vec<Vec<Pos2>>,
    /// Loads in the plan's order.
    pub loads: Vec<LoadShape>,
    /// From the feedpoint to the entrance.
    pub feed_line: Vec<Pos2>,
    /// Standing waves, by wire.
    pub waves: Vec<(usize, Wave<'a>)>,
    /// Loops and nodes of all waves.
    pub marks: Vec<WaveMark>,
    /// Grips in the order of the Tab key.
    pub handles: Vec<Handle>,
    /// All text but the rulers'.
    pub texts: Vec<Text>,
    /// The legend's line, where there is room for it.
    pub legend: Option<Rect>,
    /// Where the buttons go.
    pub buttons: Rect,
    /// Where the soil is chosen.
    pub soil: Rect,
}

/// The plot between the rulers.
pub fn plot(frame: Rect) -> Rect {
    Rect::from_min_max(
        pos2(frame.left() + GUTTER.x, frame.top()),
        pos2(frame.right(), frame.bottom() - GUTTER.y),
    )
}

/// The part of the plot that a fitted site fills: the rest is for headings, the wave and names below the earth.
pub fn stage(plot: Rect) -> Rect {
    let top = 52.0 + wave_size(plot, 0.0).whisker_px;
    let side = (0.07 * plot.width()).clamp(40.0, 110.0);
    Rect::from_min_max(
        pos2(plot.left() + side, plot.top() + top),
        pos2(plot.right() - side, ground::place(plot).top() - 27.0),
    )
}

/// The wave grows a little with the plot.
fn wave_size(plot: Rect, watts: f64) -> Size {
    let whisker_px = (0.12 * plot.height()).clamp(24.0, 58.0);
    Size { ribbon_px: 0.42 * whisker_px, whisker_px, watts }
}

impl<'a> Layout<'a> {
    /// Lays everything out.
    pub fn of(model: &Model<'_>, view: SideView, asking: &Asking<'a>, measure: &Measure<'_>) -> Self {
        let site = &model.plan.site;
        let supports = site
            .supports
            .iter()
            .map(|s| SupportShape {
                kind: s.kind,
                foot: view.at(s.foot),
                top: view.at(Point { z_m: s.foot.z_m + s.height_m, ..s.foot }),
            })
            .collect();
        let hung = model.hung.as_ref().ok();
        let line = |points: &mut dyn Iterator<Item = Point>| points.map(|p| view.at(p)).collect::<Vec<_>>();
        let ropes = hung.map_or_else(Vec::new, |hung| {
            hung.ropes.iter().map(|rope| line(&mut rope.points.iter().copied())).collect()
        });
        let wires = hung.map_or_else(Vec::new, |hung| {
            hung.wires.iter().map(|wire| line(&mut wire.vertices.iter().map(|v| v.at))).collect()
        });
        let leads = hung.map_or_else(Vec::new, |hung| {
            hung.leads
                .iter()
                .map(|lead| [lead.top, Point { z_m: 0.0, ..lead.top }].map(|at| view.at(at)))
                .collect()
        });
        let feed_line =
            hung.map_or_else(Vec::new, |h| slack_line(view.at(h.feedpoint.at), view.at(site.entrance)));
        let plot = view.frame;
        let corner = plot.right_top() + vec2(-EDGE_PX - asking.buttons.x, EDGE_PX);
        let mut layout = Self {
            heights: rulers::heights(&view, asking.units),
            distances: rulers::distances(&view, asking.units, model.zero_along_m()),
            supports,
            ropes,
            leads,
            wires,
            loads: load_shapes(model, &view),
            feed_line,
            waves: Vec::new(),
            marks: Vec::new(),
            handles: Vec::new(),
            texts: Vec::new(),
            legend: None,
            buttons: Rect::from_min_size(corner, asking.buttons),
            soil: ground::place(plot),
            view,
        };
        layout.lay_waves(model, asking);
        layout.lay_handles(model);
        layout.lay_signs();
        layout.lay_texts(model, asking, measure);
        layout
    }

    fn lay_waves(&mut self, model: &Model<'_>, asking: &Asking<'a>) {
        let Some(band) = asking.band else { return };
        let watts = watts_to_wire(band, asking.feed.0);
        let size = wave_size(self.view.frame, watts);
        for (index, source) in band.wave.wires.iter().enumerate() {
            let Some(wire) = model.hung_wire(index) else { continue };
            let Some(wave) = Wave::along(&self.view, wire, source, size) else { continue };
            let joined = model.joined_ends(index);
            let marks = wave.marks(&self.view, wire).into_iter();
            self.marks.extend(marks.filter(|mark| !at_joint(mark.reading.arc_m, wire.length_m(), joined)));
            self.waves.push((index, wave));
        }
        let stub = short_stub(model, band);
        let peaks = self.waves.iter().fold(Peaks::default(), |peaks, (wire, wave)| {
            let stub = stub.filter(|(of, _)| of == wire).map(|(_, arcs)| arcs);
            peaks.or(wave.peaks_without(stub))
        });
        let waves = std::mem::take(&mut self.waves);
        self.waves = waves.into_iter().map(|(wire, wave)| (wire, wave.measured_by(peaks))).collect();
    }

    /// At the feedpoint and at loads the sign of a loop or node stands off the wire, so that both can be seen.
    fn lay_signs(&mut self) {
        let feedpoint = self.handles.iter().find(|h| h.grip == Grip::Feedpoint).map(|h| h.at);
        let things: Vec<Pos2> = feedpoint.into_iter().chain(self.loads.iter().map(|load| load.at)).collect();
        for mark in &mut self.marks {
            if things.iter().all(|thing| thing.distance(mark.at) > SIGN_PX) {
                continue;
            }
            let free = |at: &Pos2| {
                self.handles.iter().all(|h| h.grip.is_new_point() || h.at.distance(*at) > GRIP_PX)
            };
            let tries = [SIGN_PX, -SIGN_PX, 2.5 * SIGN_PX].map(|px| mark.at + mark.off * px);
            mark.sign = tries.into_iter().find(free).unwrap_or(tries[0]);
        }
    }

    /// Where a grip stands beside the others: at its thing, else off it the usual way, else where the plot has room.
    fn free_place(&self, anchor: Pos2, away: Vec2, taken: &[Pos2]) -> Pos2 {
        const FARTHEST: u8 = 5;
        let is_free = |at: Pos2| taken.iter().all(|t| t.distance(at) > GRIP_GAP_PX - 0.5);
        if is_free(anchor) {
            return anchor;
        }
        // What the hand has moved out of the plot has no place in it.
        let room = self.view.frame.shrink(0.5 * GRIP_PX);
        let in_room = |at: Pos2| !room.contains(anchor) || (room.contains(at) && !self.soil.contains(at));
        let ways = [away, away.rot90(), -away.rot90(), -away];
        let places = ways
            .into_iter()
            .flat_map(|way| (1..=FARTHEST).map(move |step| anchor + way * GRIP_GAP_PX * f32::from(step)));
        let mut free = places.filter(|at| is_free(*at) && in_room(*at));
        free.next().unwrap_or(anchor + away * GRIP_GAP_PX * f32::from(FARTHEST))
    }

    fn lay_handles(&mut self, model: &Model<'_>) {
        let grips = model.grips();
        // Those that are taken hold of most stand at their things; the others give way.
        let mut order: Vec<usize> = (0..grips.len()).collect();
        order.sort_by_key(|&n| rank(grips[n]));
        let mut places: Vec<Option<(Pos2, Pos2)>> = vec![None; grips.len()];
        let mut taken: Vec<Pos2> = Vec::with_capacity(grips.len());
        for n in order {
            let Some(place) = model.place(grips[n]) else { continue };
            let anchor = self.view.at(place);
            let at = self.free_place(anchor, way_out(model, &self.view, grips[n]), &taken);
            taken.push(at);
            places[n] = Some((anchor, at));
        }
        let handle = |(grip, place): (Grip, Option<(Pos2, Pos2)>)| {
            place.map(|(anchor, at)| Handle { grip, name: model.name(grip), anchor, at })
        };
        self.handles = grips.into_iter().zip(places).filter_map(handle).collect();
    }
}

/// Whether a place of a wire is a joint at one of its ends: the wave goes on there, whatever one wire alone shows.
fn at_joint(arc_m: f64, length_m: f64, [begins, ends]: [bool; 2]) -> bool {
    const NEAR_M: f64 = 1e-3;
    (begins && arc_m < NEAR_M) || (ends && arc_m > length_m - NEAR_M)
}

/// The short side of a wire that is fed close to its open end: its wire and arcs, m. Its few whiskers stand far above
/// all others, which would be too short to read beside them.
fn short_stub(model: &Model<'_>, band: &BandReport) -> Option<(usize, (f64, f64))> {
    let feedpoint = model.hung.as_ref().ok()?.feedpoint;
    let length_m = model.hung_wire(feedpoint.wire)?.length_m();
    let stub_m = STUB_WAVELENGTHS * SPEED_OF_LIGHT_M_PER_S / band.wave.frequency_hz;
    let [begins, ends] = model.joined_ends(feedpoint.wire);
    let half_gap_m = 0.5 * model.plan.feedpoint.gap_m + 1e-6;
    if feedpoint.arc_m < stub_m && !begins {
        Some((feedpoint.wire, (0.0, feedpoint.arc_m + half_gap_m)))
    } else if length_m - feedpoint.arc_m < stub_m && !ends {
        Some((feedpoint.wire, (feedpoint.arc_m - half_gap_m, f64::INFINITY)))
    } else {
        None
    }
}

/// The loads on their wires; a wire that is seen from its end has them upright.
fn load_shapes(model: &Model<'_>, view: &SideView) -> Vec<LoadShape> {
    let shape = |load: &Load| {
        let wire = model.hung_wire(load.wire)?;
        let arc_m = load.fraction * wire.length_m();
        let pair = wire.vertices.windows(2).find(|pair| arc_m <= pair[1].arc_m)?;
        let along = (view.at(pair[1].at) - view.at(pair[0].at)).normalized();
        let along = if along == Vec2::ZERO { vec2(1.0, 0.0) } else { along };
        Some(LoadShape { kind: LoadKind::of(&load.circuit), at: view.at(wire.point_at(arc_m)), along })
    };
    model.plan.loads.iter().filter_map(shape).collect()
}

/// Who stands at its thing and who gives way.
fn rank(grip: Grip) -> u8 {
    match grip {
        Grip::WireBeginning { .. } | Grip::WireEnd { .. } => 0,
        Grip::Feedpoint | Grip::Load { .. } => 1,
        Grip::PathPoint { .. } => 2,
        Grip::Entrance => 3,
        Grip::SupportFoot { .. } => 4,
        Grip::SupportTop { .. } => 5,
        Grip::NewPoint { .. } => 6,
    }
}

/// The direction in which a grip gives way: fixings at the ends of a path outward, the feedpoint down, others up.
fn way_out(model: &Model<'_>, view: &SideView, grip: Grip) -> Vec2 {
    let up = vec2(0.0, -1.0);
    match grip {
        Grip::PathPoint { wire, point } => {
            let path = model.paths.get(wire).map(Vec::as_slice).unwrap_or_default();
            let (Some(first), Some(last)) = (path.first(), path.last()) else { return up };
            let outward = (view.at(last.at).x - view.at(first.at).x).signum();
            match point {
                0 => vec2(-outward, 0.0),
                p if p + 1 == path.len() => vec2(outward, 0.0),
                _ => up,
            }
        }
        Grip::Feedpoint | Grip::Load { .. } | Grip::Entrance | Grip::SupportFoot { .. } => -up,
        _ => up,
    }
}

/// A line that hangs down from the feedpoint and comes in level at the entrance.
fn slack_line(from: Pos2, to: Pos2) -> Vec<Pos2> {
    const STEPS: u16 = 24;
    let (down, level) =
        (pos2(from.x, from.y + 0.7 * (to.y - from.y)), pos2(from.x + 0.45 * (to.x - from.x), to.y));
    (0..=STEPS)
        .map(|n| {
            let t = f32::from(n) / f32::from(STEPS);
            let (a, b, c) = (from.lerp(down, t), down.lerp(level, t), level.lerp(to, t));
            a.lerp(b, t).lerp(b.lerp(c, t), t)
        })
        .collect()
}

/// Watts that reach the wire through a feed at the band's middle.
pub fn watts_to_wire(band: &BandReport, feed: usize) -> f64 {
    band.middle_point().feeds.get(feed).map_or(0.0, |f| f.watts_to_wire)
}
