//! The feed schedules, two beside each other.

use super::block::{Block, ending, label};
use super::density::Density;
use super::flow::Section;
use crate::fonts;
use crate::model::{FeedSchedule, SheetModel, Step, Stress};
use crate::scene::{Anchor, Frame};
use crate::text::{Span, clamp, fit};
use crate::tokens::{Ink, Stroke, TextStyle, space};

/// Width of the mark, mm.
const MARK_MM: f64 = 8.0;
/// Width of the volts with their rating, mm.
const VOLTS_MM: f64 = 30.5;
/// Width of the amperes, mm.
const AMPERES_MM: f64 = 17.5;

pub(crate) fn section(model: &SheetModel, density: &Density, width_mm: f64) -> Section {
    let column_mm = (width_mm - space::GUTTER) / 2.0;
    let blocks = model
        .feeds
        .chunks(2)
        .enumerate()
        .map(|(row, pair)| {
            let mut block = Block::default();
            for (index, feed) in pair.iter().enumerate() {
                let schedule = schedule(feed, 2 * row + index, density, column_mm);
                block.height_mm = block.height_mm.max(schedule.height_mm);
                block.add(schedule, index as f64 * (column_mm + space::GUTTER), 0.0);
            }
            block
        })
        .collect();
    Section {
        title: "Feed schedule".to_owned(),
        aside: Block::aside(&format!(
            "from the transmitter ({}) to the wire; highest stress of all bands",
            model.identity.transmitter
        )),
        columns: None,
        blocks,
    }
}

fn schedule(feed: &FeedSchedule, index: usize, density: &Density, width_mm: f64) -> Block {
    let mut block = Block::new(*density);
    let ink = Ink::feed(index);
    let tag_mm = fonts::width_mm(TextStyle::Key, &feed.letter) + 4.0;
    let tag = Frame { left_mm: 0.0, top_mm: 0.0, width_mm: tag_mm, height_mm: density.feed_name };
    let name_mm = (density.feed_name - block.leading_mm(TextStyle::Key)) / 2.0;
    let letter = label(TextStyle::Key, &feed.letter).ink(Ink::Background).anchor(Anchor::Middle);
    block.text(tag_mm / 2.0, name_mm, letter);
    block.ground(tag, ink);
    let left_mm = MARK_MM.max(tag_mm + 2.0);
    let name = fit(TextStyle::Key, &feed.name, width_mm - left_mm - 18.0 - AMPERES_MM);
    block.text(left_mm, name_mm, label(TextStyle::Key, name));
    let head_mm = name_mm + block.baseline_mm(TextStyle::Key) - block.baseline_mm(TextStyle::Note);
    block.text(width_mm - AMPERES_MM, head_mm, ending(TextStyle::Note, "volts peak").ink(Ink::Faint));
    block.text(width_mm, head_mm, ending(TextStyle::Note, "amps RMS").ink(Ink::Faint));
    let mut y_mm = density.feed_name;
    for step in &feed.steps {
        block.rule(0.0, width_mm, y_mm, Stroke::Hair, Ink::Rule);
        y_mm += row(&mut block, step, y_mm + 0.5, width_mm) + 1.0;
    }
    block.rule(0.0, width_mm, y_mm, Stroke::Frame, ink);
    block.height_mm = y_mm + 1.0;
    block
}

fn row(block: &mut Block, step: &Step, top_mm: f64, width_mm: f64) -> f64 {
    block.text(0.0, top_mm, label(TextStyle::Strong, &step.mark));
    let text_mm = width_mm - MARK_MM - VOLTS_MM - AMPERES_MM;
    let spans = [
        Span::new(TextStyle::Strong, clamp(TextStyle::Strong, &step.what, text_mm, 3)),
        Span::new(TextStyle::Body, &step.detail),
    ];
    let left_mm = block.spans(MARK_MM, top_mm, text_mm, &spans);
    let volts_mm = stress(block, &step.volts, width_mm - AMPERES_MM, top_mm);
    let amperes_mm = stress(block, &step.amperes, width_mm, top_mm);
    left_mm.max(volts_mm).max(amperes_mm)
}

/// The value against its rating, and under them where it occurs: right-aligned.
fn stress(block: &mut Block, stress: &Stress, right_mm: f64, top_mm: f64) -> f64 {
    let ink = if stress.exceeds { Ink::Overstressed } else { Ink::Text };
    let mut x_mm = right_mm;
    if let Some(rating) = &stress.rating {
        let words = if stress.exceeds { format!("over {rating}") } else { format!("of {rating}") };
        let rating = ending(TextStyle::Body, words).ink(ink);
        x_mm -= rating.width_mm() + fonts::width_mm(TextStyle::Body, " ");
        block.text(right_mm, top_mm, rating);
    }
    block.text(x_mm, top_mm, ending(TextStyle::Strong, &stress.value).ink(ink));
    let second_mm = block.leading_mm(TextStyle::Strong);
    if stress.at.is_empty() {
        return second_mm;
    }
    block.text(right_mm, top_mm + second_mm, ending(TextStyle::Note, &stress.at).ink(Ink::Faint));
    second_mm + block.leading_mm(TextStyle::Note)
}
