//! A piece of a page that is not broken: items relative to its top left corner.

use super::density::Density;
use crate::fonts;
use crate::scene::{Anchor, Frame, Item, Spot, Text};
use crate::text::{Span, wrap};
use crate::tokens::{Ink, Stroke, TextStyle};

/// A piece of a page.
#[derive(Clone, Debug, PartialEq)]
pub(crate) struct Block {
    pub height_mm: f64,
    pub items: Vec<Item>,
    density: Density,
}

impl Default for Block {
    fn default() -> Self {
        Self::new(Density::ROOMY)
    }
}

impl Block {
    /// An empty block.
    pub fn new(density: Density) -> Self {
        Self { height_mm: 0.0, items: Vec::new(), density }
    }

    /// An empty block of a height.
    pub fn empty(height_mm: f64) -> Self {
        Self { height_mm, ..Self::default() }
    }

    /// Distance between base lines, mm.
    pub fn leading_mm(&self, style: TextStyle) -> f64 {
        self.density.leading_mm(style)
    }

    /// From the top of a line of text to its base line, mm.
    pub fn baseline_mm(&self, style: TextStyle) -> f64 {
        baseline_in_mm(style, self.leading_mm(style))
    }

    /// Words beside a section's title, to the left of the origin.
    pub fn aside(words: &str) -> Self {
        let mut block = Self::empty(TextStyle::Note.leading_mm());
        block.text(0.0, 0.0, ending(TextStyle::Note, words).ink(Ink::Faint));
        block
    }

    /// Adds the items of another block, moved.
    pub fn add(&mut self, other: Self, right_mm: f64, down_mm: f64) {
        self.items.extend(other.items.into_iter().map(|item| item.moved(right_mm, down_mm)));
    }

    /// Adds a line of text whose letters hang from `top_mm`.
    pub fn text(&mut self, x_mm: f64, top_mm: f64, text: Text) {
        let baseline_mm = top_mm + self.baseline_mm(text.style);
        self.items.push(Item::Text(Text { at: Spot::new(x_mm, baseline_mm), ..text }));
    }

    /// Adds wrapped text; returns its height.
    pub fn spans(&mut self, x_mm: f64, top_mm: f64, width_mm: f64, spans: &[Span]) -> f64 {
        let lines = wrap(spans, width_mm);
        let leading_mm = spans.iter().map(|span| self.leading_mm(span.style)).fold(0.0, f64::max);
        let largest = spans.iter().map(|span| span.style).max_by(|a, b| a.size_pt().total_cmp(&b.size_pt()));
        let drop_mm = largest.map_or(0.0, |style| self.baseline_mm(style));
        let count = lines.len();
        for (index, line) in lines.into_iter().enumerate() {
            let y_mm = top_mm + index as f64 * leading_mm + drop_mm;
            for placed in line {
                let span = placed.span;
                let text = Text::new(x_mm + placed.x_mm, y_mm, span.style, span.text).ink(span.ink);
                self.items.push(Item::Text(text));
            }
        }
        count as f64 * leading_mm
    }

    /// Adds wrapped text in one style; returns its height.
    pub fn paragraph(&mut self, x_mm: f64, top_mm: f64, width_mm: f64, span: Span) -> f64 {
        if span.text.trim().is_empty() { 0.0 } else { self.spans(x_mm, top_mm, width_mm, &[span]) }
    }

    /// Adds a horizontal line.
    pub fn rule(&mut self, left_mm: f64, right_mm: f64, y_mm: f64, stroke: Stroke, ink: Ink) {
        self.items.push(Item::line(Spot::new(left_mm, y_mm), Spot::new(right_mm, y_mm), stroke, ink));
    }

    /// Puts a coloured ground under what is there already.
    pub fn ground(&mut self, frame: Frame, ink: Ink) {
        self.items.insert(0, Item::area(frame, ink));
    }
}

/// From the top of a line of text to its base line, mm.
pub(crate) fn baseline_mm(style: TextStyle) -> f64 {
    baseline_in_mm(style, style.leading_mm())
}

fn baseline_in_mm(style: TextStyle, leading_mm: f64) -> f64 {
    let slack_mm = leading_mm - style.size_mm();
    fonts::ASCENT * style.size_mm() + slack_mm / 2.0
}

/// A text without a place yet, for [`Block::text`].
pub(crate) fn label(style: TextStyle, text: impl Into<String>) -> Text {
    Text::new(0.0, 0.0, style, text)
}

/// The same, ending at its place.
pub(crate) fn ending(style: TextStyle, text: impl Into<String>) -> Text {
    label(style, text).anchor(Anchor::End)
}
