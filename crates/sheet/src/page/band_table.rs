//! The table of bands: one block per band, one row per feed in it.

use super::block::{Block, ending, label};
use super::flow::Section;
use super::swr_curve;
use crate::model::{BandEntry, FeedEntry, SheetModel};
use crate::scene::{Anchor, Frame};
use crate::text::Span;
use crate::tokens::{Ink, Stroke, TextStyle, space};
use station::report::VerdictKind;

/// Width of the band's name and impedance, mm.
const BAND_MM: f64 = 36.0;
/// Width of the curve, mm.
const CURVE_MM: f64 = 27.0;
/// Height of the curve, mm.
const CURVE_HEIGHT_MM: f64 = 13.5;
/// Width of the feed's letter, mm.
const LETTER_MM: f64 = 5.0;
/// Width of a number, mm.
const NUMBER_MM: f64 = 13.0;

pub(crate) fn section(model: &SheetModel, width_mm: f64) -> Section {
    Section {
        title: "Bands".to_owned(),
        aside: "figures at the frequency stated; verdict at the worst frequency of the band".to_owned(),
        columns: Some(heads(width_mm)),
        blocks: model.bands.iter().map(|band| block(band, model.swr_limit, width_mm)).collect(),
    }
}

/// Where the rows of the feeds begin, mm.
fn feeds_left_mm() -> f64 {
    BAND_MM + CURVE_MM + 3.0
}

/// Right edges of the three SWR columns, the loss and the watts.
fn edges_mm(width_mm: f64) -> [f64; 5] {
    let from_mm = feeds_left_mm() + LETTER_MM;
    [
        from_mm + NUMBER_MM,
        from_mm + 2.0 * NUMBER_MM,
        from_mm + 3.0 * NUMBER_MM,
        width_mm - NUMBER_MM - 2.0,
        width_mm,
    ]
}

fn heads(width_mm: f64) -> Block {
    let leading_mm = TextStyle::Note.leading_mm();
    let mut block = Block::empty(leading_mm * 2.0 + 1.0);
    let head = |text: &str| label(TextStyle::Note, text).ink(Ink::Faint);
    let [at_feedpoint, before, after, loss, watts] = edges_mm(width_mm);
    block.text(0.0, 0.0, head("band, R ± jX"));
    block.text(0.0, leading_mm, head("at the feedpoint"));
    block.text(BAND_MM, 0.0, head("SWR without unit"));
    block.text(BAND_MM, leading_mm, head("1 to 10, limit dotted"));
    for (x_mm, first, second) in [
        (at_feedpoint, "SWR at", "wire"),
        (before, "before", "unit"),
        (after, "after", "unit"),
        (loss, "", "loss"),
        (watts, "to the", "wire"),
    ] {
        if !first.is_empty() {
            block.text(x_mm, 0.0, head(first).anchor(Anchor::End));
        }
        block.text(x_mm, leading_mm, head(second).anchor(Anchor::End));
    }
    block.text(after + 4.0, leading_mm, head("unit: coil, capacitor"));
    block
}

fn block(band: &BandEntry, limit: f64, width_mm: f64) -> Block {
    const PAD_MM: f64 = 0.7;
    let mut block = Block::default();
    block.rule(0.0, width_mm, 0.0, Stroke::Rule, Ink::Rule);
    let name_mm = BAND_MM - 2.0;
    let mut left_mm = PAD_MM;
    left_mm += block.paragraph(0.0, left_mm, name_mm, Span::new(TextStyle::Key, &band.name));
    left_mm +=
        block.paragraph(0.0, left_mm, name_mm, Span::new(TextStyle::Note, &band.range).ink(Ink::Faint));
    left_mm += block.paragraph(0.0, left_mm, name_mm, Span::new(TextStyle::Strong, &band.feedpoint));
    left_mm += block.paragraph(
        0.0,
        left_mm,
        name_mm,
        Span::new(TextStyle::Note, format!("at {}", band.at)).ink(Ink::Faint),
    );
    let frame = Frame { left_mm: BAND_MM, top_mm: PAD_MM, width_mm: CURVE_MM, height_mm: CURVE_HEIGHT_MM };
    swr_curve::draw(&mut block, frame, &band.curves, limit);
    let mut right_mm = PAD_MM;
    for (index, feed) in band.feeds.iter().enumerate() {
        right_mm += row(&mut block, feed, index, right_mm, width_mm) + 0.5;
    }
    block.height_mm = left_mm.max(right_mm).max(frame.bottom_mm()) + PAD_MM;
    block
}

fn row(block: &mut Block, feed: &FeedEntry, index: usize, top_mm: f64, width_mm: f64) -> f64 {
    let left_mm = feeds_left_mm();
    let edges = edges_mm(width_mm);
    block.text(left_mm, top_mm, label(TextStyle::Strong, &feed.letter).ink(Ink::feed(index)));
    let numbers = [&feed.swr_feedpoint, &feed.swr_before, &feed.swr_after, &feed.loss, &feed.watts];
    for (position, (x_mm, number)) in edges.into_iter().zip(numbers).enumerate() {
        let style = if position == 1 || position == 4 { TextStyle::Strong } else { TextStyle::Body };
        block.text(x_mm, top_mm, ending(style, number));
    }
    if !feed.setting.is_empty() {
        block.text(edges[2] + 4.0, top_mm, label(TextStyle::Body, &feed.setting));
    }
    let second_mm = top_mm + TextStyle::Body.leading_mm();
    let losses = ending(TextStyle::Note, &feed.losses).ink(Ink::Faint);
    let reason_mm = width_mm - left_mm - LETTER_MM - losses.width_mm() - space::GUTTER;
    let spans = [
        Span::new(TextStyle::Strong, feed.kind.words()).ink(verdict_ink(feed.kind)),
        Span::new(TextStyle::Body, &feed.reason),
    ];
    let height_mm = block.spans(left_mm + LETTER_MM, second_mm, reason_mm, &spans);
    block.text(width_mm, second_mm, losses);
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
