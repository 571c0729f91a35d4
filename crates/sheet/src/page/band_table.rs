//! The table of bands: one block per band, one row per feed in it.

use super::block::{Block, ending, label};
use super::density::Density;
use super::flow::Section;
use super::swr_curve;
use crate::fonts;
use crate::model::{BandEntry, FeedEntry, SheetModel};
use crate::scene::{Anchor, Frame};
use crate::text::{Span, clamp, style_for};
use crate::tokens::{Ink, Stroke, TextStyle, space};
use station::report::VerdictKind;

/// Width of the band's name and impedance, mm.
const BAND_MM: f64 = 30.0;
/// Width of the curve with its numbers, mm.
const CURVE_MM: f64 = 26.0;
/// Width of the feed's letter, mm.
const LETTER_MM: f64 = 5.0;
/// Width of a standing-wave ratio, mm.
const SWR_MM: f64 = 13.5;
/// Width of the watts, mm.
const WATTS_MM: f64 = 14.0;

pub(crate) fn section(model: &SheetModel, density: &Density, width_mm: f64) -> Section {
    Section {
        title: "Bands".to_owned(),
        aside: Block::aside(&format!(
            "frequencies in MHz; dotted: the limit, SWR {}; verdict at the worst frequency of the band",
            station::units::swr(model.swr_limit)
        )),
        columns: Some(heads(width_mm, model.feeds.len())),
        blocks: model.bands.iter().map(|band| block(band, model.swr_limit, density, width_mm)).collect(),
    }
}

/// Where the columns of the feeds' rows stand, mm.
struct Columns {
    letter: f64,
    words: f64,
    /// Right edges.
    swr: [f64; 3],
    setting: f64,
    loss: f64,
    watts: f64,
}

impl Columns {
    fn new(width_mm: f64) -> Self {
        let letter = BAND_MM + CURVE_MM + 3.0;
        let words = letter + LETTER_MM;
        let swr = [1.0, 2.0, 3.0].map(|column| words - 2.0 + column * SWR_MM);
        Self { letter, words, swr, setting: swr[2] + 4.0, loss: width_mm - WATTS_MM, watts: width_mm }
    }
}

fn heads(width_mm: f64, feeds: usize) -> Block {
    let columns = Columns::new(width_mm);
    let leading_mm = TextStyle::Note.leading_mm();
    let mut block = Block::empty(leading_mm * 2.0 + 0.6);
    let head = |text: &str| label(TextStyle::Note, text).ink(Ink::Faint);
    block.text(0.0, 0.0, head("band, and R ± jX"));
    block.text(0.0, leading_mm, head("at the feedpoint"));
    block.text(BAND_MM + swr_curve::NUMBERS_MM, 0.0, head("SWR without"));
    block.text(BAND_MM + swr_curve::NUMBERS_MM, leading_mm, head("unit"));
    swr_curve::key(&mut block, BAND_MM + swr_curve::NUMBERS_MM + 7.0, leading_mm, feeds);
    let heads = [
        (columns.swr[0], "SWR at", "wire"),
        (columns.swr[1], "without", "unit"),
        (columns.swr[2], "with", "unit"),
        (columns.loss, "", "loss"),
        (columns.watts, "to the", "wire"),
    ];
    for (x_mm, first, second) in heads {
        if !first.is_empty() {
            block.text(x_mm, 0.0, head(first).anchor(Anchor::End));
        }
        block.text(x_mm, leading_mm, head(second).anchor(Anchor::End));
    }
    block.text(columns.setting, 0.0, head("setting of the unit:"));
    block.text(columns.setting, leading_mm, head("coil, capacitor and its side"));
    block
}

fn block(band: &BandEntry, limit: f64, density: &Density, width_mm: f64) -> Block {
    let columns = Columns::new(width_mm);
    let mut block = Block::new(*density);
    block.rule(0.0, width_mm, 0.0, Stroke::Rule, Ink::Rule);
    let name_mm = BAND_MM - 1.5;
    let name_style = style_for(&[TextStyle::Key, TextStyle::Strong], &band.name, name_mm, 1);
    let mut left_mm = density.band_pad;
    for span in [
        Span::new(name_style, clamp(name_style, &band.name, name_mm, 3)),
        Span::new(TextStyle::Note, &band.range).ink(Ink::Faint),
        Span::new(TextStyle::Strong, &band.feedpoint),
        Span::new(TextStyle::Note, format!("at {}", band.at)).ink(Ink::Faint),
    ] {
        left_mm += block.paragraph(0.0, left_mm, name_mm, span);
    }
    let top_mm = density.band_pad + 0.6;
    let frame = Frame { left_mm: BAND_MM, top_mm, width_mm: CURVE_MM, height_mm: density.curve };
    swr_curve::draw(&mut block, frame, &band.curves, limit);
    let mut right_mm = density.band_pad;
    for (index, feed) in band.feeds.iter().enumerate() {
        right_mm += row(&mut block, feed, index, right_mm, &columns) + 0.3;
    }
    block.height_mm = left_mm.max(right_mm).max(frame.bottom_mm()) + density.band_pad;
    block
}

fn row(block: &mut Block, feed: &FeedEntry, index: usize, top_mm: f64, columns: &Columns) -> f64 {
    block.text(columns.letter, top_mm, label(TextStyle::Strong, &feed.letter).ink(Ink::feed(index)));
    let numbers = [
        (columns.swr[0], TextStyle::Body, &feed.swr_feedpoint),
        (columns.swr[1], TextStyle::Body, &feed.swr_before),
        (columns.swr[2], TextStyle::Body, &feed.swr_after),
        (columns.loss, TextStyle::Body, &feed.loss),
        (columns.watts, TextStyle::Strong, &feed.watts),
    ];
    for (x_mm, style, number) in numbers.into_iter().filter(|(_, _, number)| !number.is_empty()) {
        block.text(x_mm, top_mm, ending(style, number));
    }
    let loss_mm = fonts::width_mm(TextStyle::Body, &feed.loss);
    let setting_mm = columns.loss - loss_mm - space::CELL - columns.setting;
    let setting = Span::new(TextStyle::Strong, &feed.setting);
    let first_mm = block.paragraph(columns.setting, top_mm, setting_mm, setting);
    let second_mm = top_mm + first_mm.max(block.leading_mm(TextStyle::Body));
    let mut room_mm = columns.watts - columns.words;
    if !feed.losses.is_empty() {
        let losses = ending(TextStyle::Note, &feed.losses).ink(Ink::Faint);
        room_mm -= losses.width_mm() + space::CELL * 2.0;
        block.text(columns.watts, second_mm, losses);
    }
    let spans = [
        Span::new(TextStyle::Strong, feed.kind.words()).ink(verdict_ink(feed.kind)),
        Span::new(TextStyle::Body, &feed.reason),
    ];
    let sign = if feed.kind.works() { "✓" } else { "✗" };
    block.text(columns.letter, second_mm, label(TextStyle::Strong, sign).ink(verdict_ink(feed.kind)));
    let height_mm = block.spans(columns.words, second_mm, room_mm, &spans);
    second_mm - top_mm + height_mm
}

fn verdict_ink(kind: VerdictKind) -> Ink {
    match kind {
        VerdictKind::Direct => Ink::Works,
        VerdictKind::WithMatchingUnit => Ink::WorksWithUnit,
        VerdictKind::TooLossy => Ink::TooLossy,
        VerdictKind::Overstressed => Ink::Overstressed,
        VerdictKind::OutOfRange => Ink::OutOfRange,
    }
}
