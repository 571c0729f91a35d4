//! What the feed paths say: each feed as a chain from the transmitter to the wire, with the watts that are left.

use station::catalogue;
use station::plan::{Feed, LineChoice, Link};
use station::report::{FeedReport, LinkReport, VerdictKind};
use station::units::{self, Units};

use crate::snapshot::Snapshot;
use crate::views::lanes::model::Lane;
use crate::views::marks;

/// One feed from the transmitter (first) to the wire (last).
#[derive(Clone, Debug, PartialEq)]
pub struct Column<'a> {
    /// Index of the feed.
    pub feed: usize,
    /// Its name.
    pub name: &'a str,
    /// What the feed needs on the chosen band.
    pub verdict: Option<VerdictKind>,
    /// The verdict in words, or how much of the band is covered where a part of it is.
    pub verdict_words: String,
    /// Whether it can be worked in the middle of the band, where the watts are told.
    pub works_in_middle: bool,
    /// What the transmitter is set to give, W: as wide as the path can be.
    pub power_w: f64,
    /// What it does give into this feed, W: less where its SWR limit is exceeded.
    pub given_w: f64,
    /// The links, the one at the transmitter first.
    pub blocks: Vec<Block>,
    /// What comes out at the wire; `None` until it is known.
    pub wire: Option<WireEnd>,
}

/// The watts at the end of a feed.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct WireEnd {
    /// Watts that reach the wire.
    pub watts: f64,
    /// Of these, watts that leave toward the sky.
    pub sky_w: f64,
    /// Watts that the soil below takes.
    pub earth_w: f64,
    /// Watts that metal and loads turn into heat.
    pub heat_w: f64,
}

/// One link.
#[derive(Clone, Debug, PartialEq)]
pub struct Block {
    /// Index of the link in the plan's feed (0 is at the wire).
    pub link: usize,
    /// What it is called.
    pub name: String,
    /// Length, ratio or how it is set.
    pub detail: String,
    /// What it does; `None` until it is known.
    pub figures: Option<Figures>,
}

/// What a link does at the frequency that stands for the band.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Figures {
    /// Watts that go in on the transmitter's side.
    pub watts_in: f64,
    /// Watts that come out on the wire's side.
    pub watts_out: f64,
    /// The report's own figures.
    pub link: LinkReport,
}

/// The feeds of the plan with the figures of the chosen band, where the report knows them.
#[must_use]
pub fn columns<'a>(snapshot: &Snapshot<'a>) -> Vec<Column<'a>> {
    let feeds = snapshot.plan.feeds.iter().enumerate();
    feeds.map(|(index, feed)| column(snapshot, index, feed)).collect()
}

fn column<'a>(snapshot: &Snapshot<'a>, index: usize, feed: &'a Feed) -> Column<'a> {
    let band = snapshot.report.and_then(|report| report.bands.get(snapshot.band));
    // A report of an older plan may know fewer links: then there are no figures for this feed.
    let found: Option<&FeedReport> =
        band.and_then(|b| b.middle_point().feeds.get(index)).filter(|f| f.links.len() == feed.links.len());
    let power_w = snapshot.plan.transmitter.power_w;
    let given_w =
        found.map_or(power_w, |f| f.watts_to_wire + f.links.iter().map(|l| l.watts_lost).sum::<f64>());
    let mut left_w = given_w;
    let blocks = (0..feed.links.len()).rev().map(|link| {
        let figures = found.map(|f| {
            let watts_in = left_w;
            left_w -= f.links[link].watts_lost;
            Figures { watts_in, watts_out: left_w, link: f.links[link] }
        });
        Block {
            link,
            name: link_name(&feed.links[link]),
            detail: detail(&feed.links[link], found, snapshot.units),
            figures,
        }
    });
    let blocks = blocks.collect();
    let wire = found.zip(band).map(|(f, b)| {
        let shares = b.middle_point().shares;
        let watts = f.watts_to_wire;
        WireEnd {
            watts,
            sky_w: watts * shares.sky,
            earth_w: watts * shares.earth,
            heat_w: watts * shares.burnt,
        }
    });
    let verdict = found.and(band).and_then(|b| b.feeds.get(index)).map(|f| &f.verdict);
    let verdict_words = band.zip(verdict).map_or_else(String::new, |(b, v)| {
        let lane = Lane::of(snapshot, snapshot.band, b);
        if v.kind.works() || v.covered_hz.is_empty() {
            v.kind.words().to_owned()
        } else {
            lane.covered(index)
        }
    });
    let works_in_middle = found.is_some_and(|f| f.kind != VerdictKind::OutOfRange);
    let verdict = verdict.map(|v| v.kind);
    Column {
        feed: index,
        name: &feed.name,
        verdict,
        verdict_words,
        works_in_middle,
        power_w,
        given_w,
        blocks,
        wire,
    }
}

/// What a link is called on screen.
#[must_use]
pub fn link_name(link: &Link) -> String {
    match link {
        Link::Transformer(_) => "transformer".to_owned(),
        Link::MatchingUnit(_) => "matching unit".to_owned(),
        Link::Line(piece) => line_name(&piece.line),
    }
}

/// What a line is called on screen.
#[must_use]
pub fn line_name(line: &LineChoice) -> String {
    match line {
        LineChoice::Catalogue(id) => {
            catalogue::line_entry(id).map_or_else(|_| id.clone(), |e| e.data.name.clone())
        }
        LineChoice::Own(data) => data.name.clone(),
    }
}

fn detail(link: &Link, found: Option<&FeedReport>, units: Units) -> String {
    match link {
        Link::Transformer(transformer) => format!("{} : 1", units::short(transformer.impedance_ratio)),
        Link::Line(piece) => units.length(piece.length_m),
        Link::MatchingUnit(_) => match found.map(|f| (f.setting, f.shortfall)) {
            None => String::new(),
            Some((Some(_), _)) => "set".to_owned(),
            Some((None, Some(_))) => "no setting".to_owned(),
            Some((None, None)) => "bypassed".to_owned(),
        },
    }
}

impl Column<'_> {
    /// "feed A coax".
    #[must_use]
    pub fn title(&self) -> String {
        format!("feed {} {}", marks::letter(self.feed), self.name)
    }

    /// The feed in words, for screen readers and hover.
    #[must_use]
    pub fn sentence(&self) -> String {
        let Some((wire, verdict)) = self.wire.zip(self.verdict) else {
            return "being worked out".to_owned();
        };
        format!(
            "{}{}; in the middle of the band {} of {} reach the wire: {} leave for the sky, {} heat the earth, {} the wire itself",
            verdict.words(),
            if self.verdict_words == verdict.words() {
                String::new()
            } else {
                format!(", {} work", self.verdict_words)
            },
            units::watts(wire.watts),
            units::watts(self.power_w),
            units::watts(wire.sky_w),
            units::watts(wire.earth_w),
            units::watts(wire.heat_w)
        )
    }

    /// "100 W", or "62 of 100 W" where the transmitter holds back.
    #[must_use]
    pub fn given(&self) -> String {
        let set = units::watts(self.power_w);
        if self.given_w > 0.995 * self.power_w {
            return set;
        }
        format!("{} of {set}", units::watts(self.given_w).trim_end_matches(" W"))
    }

    /// Share of the transmitter's watts, 0 to 1.
    #[must_use]
    pub fn share(&self, watts: f64) -> f32 {
        if self.power_w > 0.0 { (watts / self.power_w).clamp(0.0, 1.0) as f32 } else { 0.0 }
    }
}

impl Block {
    /// The first words of the name: "Open wire" of "Open wire, 2 mm copper, 150 mm apart".
    #[must_use]
    pub fn short_name(&self) -> &str {
        self.name.split(',').next().unwrap_or(&self.name)
    }

    /// The link in words, for screen readers and hover.
    #[must_use]
    pub fn sentence(&self) -> String {
        let start = if self.detail.is_empty() {
            self.name.clone()
        } else {
            format!("{}, {}", self.name, self.detail)
        };
        let Some(figures) = self.figures else {
            return start;
        };
        let link = figures.link;
        format!(
            "{start}: loss {}, {} turned into heat; SWR {} on {} Ω; up to {} peak and {} RMS",
            units::decibels(link.loss_db),
            units::watts(link.watts_lost),
            units::swr(link.toward_transmitter.swr),
            units::short(link.toward_transmitter.reference_ohm),
            units::volts(link.peak_v),
            units::amperes(link.rms_a)
        )
    }
}
