//! The feed schedules, two beside each other.

use super::block::{Block, ending, label};
use super::flow::Section;
use crate::model::{FeedSchedule, Identity, Step, Stress};
use crate::scene::{Anchor, Frame};
use crate::text::Span;
use crate::tokens::{Ink, Stroke, TextStyle, space};

/// Width of the mark, mm.
const MARK_MM: f64 = 9.0;
/// Width of each of the two columns with stresses, mm.
const STRESS_MM: f64 = 23.0;

pub(crate) fn section(feeds: &[FeedSchedule], identity: &Identity, width_mm: f64) -> Section {
    let column_mm = (width_mm - space::GUTTER) / 2.0;
    let blocks = feeds
        .chunks(2)
        .enumerate()
        .map(|(row, pair)| {
            let mut block = Block::default();
            for (index, feed) in pair.iter().enumerate() {
                let schedule = schedule(feed, 2 * row + index, column_mm);
                block.height_mm = block.height_mm.max(schedule.height_mm);
                block.add(schedule, index as f64 * (column_mm + space::GUTTER), 0.0);
            }
            block
        })
        .collect();
    Section {
        title: "Feed schedule".to_owned(),
        aside: format!(
            "from the transmitter to the wire; highest stress of all bands, {}",
            identity.transmitter
        ),
        columns: None,
        blocks,
    }
}

fn schedule(feed: &FeedSchedule, index: usize, width_mm: f64) -> Block {
    let mut block = Block::default();
    let ink = Ink::feed(index);
    let mut y_mm = TextStyle::Key.leading_mm().max(6.0);
    let tag = Frame { left_mm: 0.0, top_mm: 0.0, width_mm: 7.0, height_mm: y_mm };
    block.text(3.5, 0.6, label(TextStyle::Key, &feed.letter).ink(Ink::Background).anchor(Anchor::Middle));
    block.ground(tag, ink);
    let name = crate::text::fit(TextStyle::Key, &feed.name, width_mm - MARK_MM - 2.0 * STRESS_MM);
    block.text(MARK_MM, 0.6, label(TextStyle::Key, name));
    block.text(width_mm - STRESS_MM, 1.6, ending(TextStyle::Note, "volts peak").ink(Ink::Faint));
    block.text(width_mm, 1.6, ending(TextStyle::Note, "amps RMS").ink(Ink::Faint));
    for step in &feed.steps {
        block.rule(0.0, width_mm, y_mm, Stroke::Hair, Ink::Rule);
        y_mm += row(&mut block, step, y_mm + 0.6, width_mm) + 1.2;
    }
    block.rule(0.0, width_mm, y_mm, Stroke::Rule, ink);
    block.height_mm = y_mm + 1.5;
    block
}

fn row(block: &mut Block, step: &Step, top_mm: f64, width_mm: f64) -> f64 {
    block.text(0.0, top_mm, label(TextStyle::Strong, &step.mark));
    let text_mm = width_mm - MARK_MM - 2.0 * STRESS_MM;
    let mut left_mm = block.paragraph(MARK_MM, top_mm, text_mm, Span::new(TextStyle::Strong, &step.what));
    left_mm += block.paragraph(MARK_MM, top_mm + left_mm, text_mm, Span::new(TextStyle::Body, &step.detail));
    let volts_mm = stress(block, &step.volts, width_mm - STRESS_MM, top_mm);
    let amperes_mm = stress(block, &step.amperes, width_mm, top_mm);
    left_mm.max(volts_mm).max(amperes_mm)
}

/// The value, where it occurs, the rating: right-aligned under each other.
fn stress(block: &mut Block, stress: &Stress, right_mm: f64, top_mm: f64) -> f64 {
    let ink = if stress.exceeds { Ink::Overstressed } else { Ink::Text };
    block.text(right_mm, top_mm, ending(TextStyle::Strong, &stress.value).ink(ink));
    let mut y_mm = TextStyle::Strong.leading_mm();
    let rating = stress
        .rating
        .as_ref()
        .map(|rating| if stress.exceeds { format!("over {rating}") } else { format!("of {rating}") });
    for line in [rating.unwrap_or_default(), stress.at.clone()].into_iter().filter(|line| !line.is_empty()) {
        block.text(right_mm, top_mm + y_mm, ending(TextStyle::Note, line).ink(Ink::Faint));
        y_mm += TextStyle::Note.leading_mm();
    }
    y_mm
}
