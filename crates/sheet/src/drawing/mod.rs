//! The site in side view, to scale, with the dimensions that a crew needs.

mod dimensions;
mod elevation;
mod labels;
mod scale;
mod site;

pub use elevation::{Elevation, Fastening, LoadSide, Piece, Place, Plane, SupportSide};
pub use scale::{Ratio, Sight};

use station::hang::Hung;
use station::plan::{Link, Plan};
use station::units::Units;

use crate::model::link_mark;
use crate::scene::{Frame, Scene, Spot};
use dimensions::Dimension;
use labels::Labels;

/// Room beside the outermost supports for heights and signs, mm.
const SIDE_MM: f64 = 13.0;
/// Room over the highest support, mm.
const OVER_MM: f64 = 6.0;
/// The same where more than two pieces of wire crowd: their dimension lines and numbers stand above.
const OVER_MANY_MM: f64 = 9.6;

/// How large the drawing may be.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Size {
    /// Width, mm.
    pub width_mm: f64,
    /// Most height, mm.
    pub height_mm: f64,
}

/// A side view, drawn.
#[derive(Clone, Debug, PartialEq)]
pub struct SideView {
    /// The drawing; not higher than asked for.
    pub scene: Scene,
    /// Its scale.
    pub ratio: Ratio,
    /// Labels that found no room.
    pub unplaced: Vec<String>,
}

/// Draws the side view of a plan.
#[must_use]
pub fn side_view(plan: &Plan, hung: &Hung, units: Units, size: Size) -> SideView {
    let elevation = Elevation::new(plan, hung);
    let (low, high) = bounds(&elevation);
    let width_mm = size.width_mm - 2.0 * SIDE_MM;
    let under_mm = site::EARTH_MM + dimensions::names_mm(&elevation) + dimensions::SPANS_MM;
    let over_mm = if elevation.arms.len() > 2 { OVER_MANY_MM } else { OVER_MM };
    let height_mm = (size.height_mm - over_mm - under_mm).max(10.0);
    let least = ((high.along_m - low.along_m) / width_mm).max((high.up_m - low.up_m) / height_mm) * 1000.0;
    let ratio = Ratio::round(least, units);
    let drawn_mm = ratio.paper_mm(high.up_m - low.up_m);
    let left_mm = (size.width_mm - ratio.paper_mm(high.along_m - low.along_m)) / 2.0;
    let earth_mm = over_mm + drawn_mm;
    let sight = Sight { ratio, site: low, at_mm: Spot::new(left_mm, earth_mm) };
    let scene = Scene::new(size.width_mm, earth_mm + under_mm);
    let (scene, unplaced) = paint(plan, &elevation, &sight, units, scene);
    SideView { scene, ratio, unplaced }
}

fn paint(
    plan: &Plan,
    elevation: &Elevation,
    sight: &Sight,
    units: Units,
    mut scene: Scene,
) -> (Scene, Vec<String>) {
    let frame = Frame { left_mm: 0.0, top_mm: 0.0, width_mm: scene.width_mm, height_mm: scene.height_mm };
    let mut labels = Labels::new(frame);
    let items = &mut scene.items;
    let surface = site::surface(elevation, sight, frame.left_mm, frame.right_mm());
    site::earth(&surface, items);
    labels.avoid_earth(&surface);
    labels.avoid(&site::foot_of_earth(&surface));
    for support in &elevation.supports {
        site::support(support, sight, items);
        let top = Place { up_m: support.top_m, ..support.foot };
        labels.avoid(&[sight.spot(support.foot), sight.spot(top)]);
    }
    site::wires(elevation, sight, items);
    for piece in elevation.arms.iter().chain(&elevation.ropes) {
        let spots: Vec<Spot> = piece.places.iter().map(|&place| sight.spot(place)).collect();
        labels.avoid(&spots);
    }
    for load in &elevation.loads {
        let corners = site::load_outline(load, sight);
        labels.avoid(&[corners[0], corners[2]]);
        labels.avoid(&[corners[1], corners[3]]);
        labels.avoid(&[corners[0], corners[1], corners[2], corners[3], corners[0]]);
        items.push(site::load(corners));
    }
    labels.avoid(&[sight.spot(elevation.feedpoint), sight.spot(elevation.entrance)]);
    for sign in site::outlines(elevation, sight) {
        labels.avoid(&sign);
    }
    let below_mm = surface.iter().map(|spot| spot.y_mm).fold(0.0, f64::max) + site::EARTH_MM;
    let spans_mm = below_mm + dimensions::names_mm(elevation);
    // All lines before any text: no line may cross a text that was put before it.
    let spans = dimensions::spans(elevation, sight, units, spans_mm);
    let heights = dimensions::heights(elevation, sight, units, (&mut labels, items));
    let arms = dimensions::arms(elevation, sight, units);
    for dimension in spans.iter().chain(&heights).chain(&arms) {
        dimension.draw(&mut labels, items);
    }
    dimensions::support_names(elevation, sight, frame, below_mm, &mut labels);
    let mut tied: Vec<&Dimension> =
        spans.iter().chain(&heights).filter(|it| it.number_along(&mut labels).is_none()).collect();
    dimensions::entrance(elevation, sight, units, (frame, below_mm), &mut labels);
    dimensions::loads(elevation, sight, &mut labels);
    tied.extend(arms.iter().filter(|it| it.number_along(&mut labels).is_none()));
    // Labels with one place only, before those with many.
    dimensions::feedpoint(elevation, sight, units, &mut labels);
    for dimension in tied {
        dimension.number_near(&mut labels);
    }
    dimensions::bent_arms(elevation, sight, units, &mut labels);
    dimensions::names(elevation, sight, units, &line_labels(plan, units), &mut labels);
    let (texts, unplaced) = labels.finish();
    items.extend(texts);
    (scene, unplaced)
}

/// Lowest left and highest right place; the earth belongs to it.
fn bounds(elevation: &Elevation) -> (Place, Place) {
    let start = Place { along_m: elevation.feedpoint.along_m, up_m: 0.0 };
    elevation.places().fold((start, start), |(low, high), place| {
        (
            Place { along_m: low.along_m.min(place.along_m), up_m: low.up_m.min(place.up_m) },
            Place { along_m: high.along_m.max(place.along_m), up_m: high.up_m.max(place.up_m) },
        )
    })
}

/// "A2 28.00 m" for each piece of line.
fn line_labels(plan: &Plan, units: Units) -> Vec<String> {
    let mut out = Vec::new();
    for (feed_index, feed) in plan.feeds.iter().enumerate() {
        for (from_wire, link) in feed.links.iter().enumerate() {
            if let Link::Line(piece) = link {
                let mark = link_mark(feed_index, feed.links.len(), from_wire);
                out.push(format!("{mark} {}", units.tape(piece.length_m)));
            }
        }
    }
    out
}
