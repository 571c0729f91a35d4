//! Validation: is every value of a plan possible? The first one that is not gives one sentence with its field path,
//! the value, and what would be accepted.

mod parts;

use std::collections::HashSet;
use std::ops::RangeInclusive;

use thiserror::Error;

use crate::catalogue::{self, CatalogueError};
use crate::hang::{self, HangError};
use crate::plan::{
    Band, BandRange, ConductorChoice, Earth, Feed, LineChoice, Link, PathPoint, Plan, Point, Site, Wire,
};

/// A value that a plan cannot have.
#[derive(Clone, Debug, PartialEq, Error)]
pub enum PlanError {
    /// A number outside its range, or none at all.
    #[error("{field}: {value} is not possible; accepted: {low} to {high}{unit}", unit = spaced(unit))]
    OutOfRange {
        /// Path of the field, for instance `wires[0].cut_length_m`.
        field: String,
        /// The value with its unit, as text ("not a number" for NaN).
        value: String,
        /// Lowest accepted.
        low: f64,
        /// Highest accepted.
        high: f64,
        /// The unit; may be empty.
        unit: &'static str,
    },
    /// Two values that contradict each other.
    #[error("{field}: {value} is not possible; accepted: {accepted}")]
    Contradiction {
        /// Path of the field.
        field: String,
        /// The value, as text.
        value: String,
        /// What would be accepted, in words.
        accepted: String,
    },
    /// Too few or too many entries in a list.
    #[error("{field}: {count} entries; accepted: {least} to {most}")]
    Count {
        /// Path of the list.
        field: String,
        /// How many there are.
        count: usize,
        /// Fewest accepted.
        least: usize,
        /// Most accepted.
        most: usize,
    },
    /// Two entries that need different names.
    #[error("{field}: the name \"{name}\" stands twice; accepted: a name of its own for each")]
    NameTwice {
        /// Path of the second one.
        field: String,
        /// The name.
        name: String,
    },
    /// A text that is too long to print.
    #[error("{field}: {length} characters; accepted: up to {most}")]
    TooLong {
        /// Path of the text.
        field: String,
        /// Its length.
        length: usize,
        /// Most accepted.
        most: usize,
    },
    /// Not in the catalogue.
    #[error("{field}: {source}")]
    Catalogue {
        /// Path of the field.
        field: String,
        /// What the catalogue says.
        source: CatalogueError,
    },
    /// It cannot be hung.
    #[error(transparent)]
    Hang(#[from] HangError),
}

fn spaced(unit: &str) -> String {
    if unit.is_empty() { String::new() } else { format!(" {unit}") }
}

type Checked = Result<(), PlanError>;

/// Lowest and highest frequency that the program plans for, Hz.
pub const FREQUENCIES_HZ: RangeInclusive<f64> = 1.8e6..=54.0e6;
/// Most bands, wires, feeds and so on in one plan: far more than a site can hold, few enough to stay quick.
const MOST_BANDS: usize = 64;
const MOST_CHANNELS: usize = 200;
const MOST_WIRES: usize = 16;
const MOST_POINTS: usize = 32;
const MOST_LOADS: usize = 16;
const MOST_SUPPORTS: usize = 64;
const MOST_FEEDS: usize = 6;
pub(crate) const MOST_LINKS: usize = 12;
/// Where the feedpoint may be, as a share of the wire: both its sides keep some length.
pub const FEED_FRACTION: RangeInclusive<f64> = 0.005..=0.995;
const COORDINATE_M: RangeInclusive<f64> = -5_000.0..=5_000.0;
const HEIGHT_M: RangeInclusive<f64> = 0.0..=300.0;

/// Checks every value of a plan and that it can be hung.
///
/// # Errors
/// The first value that is not possible.
pub fn check(plan: &Plan) -> Checked {
    text("name", &plan.name, 80)?;
    text("purpose", &plan.purpose, 400)?;
    text("call_sign", &plan.call_sign, 40)?;
    text("edition", &plan.edition, 20)?;
    count("wires", plan.wires.len(), 1, MOST_WIRES)?;
    count("feeds", plan.feeds.len(), 1, MOST_FEEDS)?;
    count("bands", plan.bands.len(), 1, MOST_BANDS)?;
    check_site(&plan.site)?;
    for (index, wire) in plan.wires.iter().enumerate() {
        check_wire(&format!("wires[{index}]"), wire)?;
    }
    for (index, wire) in plan.wires.iter().enumerate() {
        parts::check_earthed(&format!("wires[{index}].earthed"), &wire.earthed, &plan.site.earth)?;
    }
    number("feedpoint.fraction", plan.feedpoint.fraction, FEED_FRACTION, "of the wire")?;
    number("feedpoint.gap_m", plan.feedpoint.gap_m, 0.001..=1.0, "m")?;
    count("loads", plan.loads.len(), 0, MOST_LOADS)?;
    for (index, load) in plan.loads.iter().enumerate() {
        parts::check_load(&format!("loads[{index}]"), load, plan.wires.len())?;
        parts::check_load_place(plan, index)?;
    }
    for (index, feed) in plan.feeds.iter().enumerate() {
        check_feed(&format!("feeds[{index}]"), feed)?;
    }
    for (index, band) in plan.bands.iter().enumerate() {
        check_band(&format!("bands[{index}]"), band)?;
    }
    number("transmitter.power_w", plan.transmitter.power_w, 0.001..=100_000.0, "W")?;
    number("transmitter.resistance_ohm", plan.transmitter.resistance_ohm, 5.0..=1_000.0, "Ω")?;
    number("transmitter.swr_limit", plan.transmitter.swr_limit, 1.05..=20.0, "")?;
    number("least_share_to_wire", plan.least_share_to_wire, 0.0..=0.99, "")?;
    hang::hang(plan)?;
    Ok(())
}

fn check_site(site: &Site) -> Checked {
    count("site.supports", site.supports.len(), 0, MOST_SUPPORTS)?;
    let mut names = HashSet::new();
    for (index, support) in site.supports.iter().enumerate() {
        let field = format!("site.supports[{index}]");
        text(&format!("{field}.name"), &support.name, 60)?;
        if !names.insert(support.name.as_str()) {
            return Err(PlanError::NameTwice { field: format!("{field}.name"), name: support.name.clone() });
        }
        point(&format!("{field}.foot"), support.foot)?;
        number(&format!("{field}.height_m"), support.height_m, 0.1..=300.0, "m")?;
    }
    match &site.earth {
        Earth::NoEarth | Earth::Mirror => {}
        Earth::Catalogue(id) => {
            catalogue::soil(id)
                .map_err(|source| PlanError::Catalogue { field: "site.earth".to_owned(), source })?;
        }
        Earth::Own(soil) => {
            number("site.earth.relative_permittivity", soil.relative_permittivity, 1.0..=100.0, "")?;
            number("site.earth.conductivity_s_per_m", soil.conductivity_s_per_m, 0.0..=10.0, "S/m")?;
        }
    }
    point("site.entrance", site.entrance)
}

fn check_wire(field: &str, wire: &Wire) -> Checked {
    text(&format!("{field}.name"), &wire.name, 60)?;
    count(&format!("{field}.path"), wire.path.len(), 2, MOST_POINTS)?;
    for (index, place) in wire.path.iter().enumerate() {
        match place {
            PathPoint::Free(at) => point(&format!("{field}.path[{index}]"), *at)?,
            PathPoint::OnSupport { height_m, .. } => {
                number(&format!("{field}.path[{index}].height_m"), *height_m, HEIGHT_M, "m")?;
            }
        }
    }
    number(&format!("{field}.start_m"), wire.start_m, -1_000.0..=1_000.0, "m")?;
    number(&format!("{field}.cut_length_m"), wire.cut_length_m, 0.05..=1_000.0, "m")?;
    match &wire.conductor {
        ConductorChoice::Own(data) => parts::check_conductor(&format!("{field}.conductor"), data),
        ConductorChoice::Catalogue(_) => catalogue::conductor(&wire.conductor)
            .map(|_| ())
            .map_err(|source| PlanError::Catalogue { field: format!("{field}.conductor"), source }),
    }
}

fn check_feed(field: &str, feed: &Feed) -> Checked {
    text(&format!("{field}.name"), &feed.name, 60)?;
    count(&format!("{field}.links"), feed.links.len(), 0, MOST_LINKS)?;
    let mut units = 0;
    for (index, link) in feed.links.iter().enumerate() {
        let at = format!("{field}.links[{index}]");
        match link {
            Link::Transformer(t) => {
                number(&format!("{at}.impedance_ratio"), t.impedance_ratio, 0.01..=100.0, "")?;
            }
            Link::Line(piece) => {
                number(&format!("{at}.length_m"), piece.length_m, 0.05..=2_000.0, "m")?;
                match &piece.line {
                    LineChoice::Own(data) => parts::check_line(&format!("{at}.line"), data)?,
                    LineChoice::Catalogue(_) => {
                        catalogue::line(&piece.line)
                            .map_err(|source| PlanError::Catalogue { field: format!("{at}.line"), source })?;
                    }
                }
            }
            Link::MatchingUnit(unit) => {
                units += 1;
                parts::check_unit(&at, unit)?;
            }
        }
    }
    if units > 1 {
        return Err(PlanError::Contradiction {
            field: format!("{field}.links"),
            value: format!("{units} matching units"),
            accepted: "at most one in a feed".to_owned(),
        });
    }
    Ok(())
}

fn check_band(field: &str, band: &Band) -> Checked {
    text(&format!("{field}.name"), &band.name, 60)?;
    match &band.range {
        BandRange::Span { low_hz, high_hz } => {
            number(&format!("{field}.range.low_hz"), *low_hz, FREQUENCIES_HZ, "Hz")?;
            number(&format!("{field}.range.high_hz"), *high_hz, FREQUENCIES_HZ, "Hz")?;
            if low_hz >= high_hz {
                return Err(PlanError::Contradiction {
                    field: format!("{field}.range"),
                    value: format!("low_hz {low_hz} with high_hz {high_hz}"),
                    accepted: "low_hz below high_hz".to_owned(),
                });
            }
        }
        BandRange::Channels { frequencies_hz } => {
            count(&format!("{field}.range.frequencies_hz"), frequencies_hz.len(), 1, MOST_CHANNELS)?;
            for (index, frequency_hz) in frequencies_hz.iter().enumerate() {
                number(
                    &format!("{field}.range.frequencies_hz[{index}]"),
                    *frequency_hz,
                    FREQUENCIES_HZ,
                    "Hz",
                )?;
            }
        }
    }
    Ok(())
}

fn point(field: &str, at: Point) -> Checked {
    number(&format!("{field}.x_m"), at.x_m, COORDINATE_M, "m")?;
    number(&format!("{field}.y_m"), at.y_m, COORDINATE_M, "m")?;
    number(&format!("{field}.z_m"), at.z_m, -50.0..=500.0, "m")
}

fn text(field: &str, value: &str, most: usize) -> Checked {
    let length = value.chars().count();
    if length <= most { Ok(()) } else { Err(PlanError::TooLong { field: field.to_owned(), length, most }) }
}

fn count(field: &str, count: usize, least: usize, most: usize) -> Checked {
    if (least..=most).contains(&count) {
        Ok(())
    } else {
        Err(PlanError::Count { field: field.to_owned(), count, least, most })
    }
}

/// NaN is in no range, so it is refused here too.
fn number(field: &str, value: f64, accepted: RangeInclusive<f64>, unit: &'static str) -> Checked {
    if accepted.contains(&value) {
        return Ok(());
    }
    let value = if value.is_nan() { "not a number".to_owned() } else { format!("{value}{}", spaced(unit)) };
    let (low, high) = (*accepted.start(), *accepted.end());
    Err(PlanError::OutOfRange { field: field.to_owned(), value, low, high, unit })
}
