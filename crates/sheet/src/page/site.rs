//! The site drawing as a section, with its scale bar.

use station::hang::Hung;
use station::plan::Plan;
use station::units::Units;

use super::block::Block;
use super::flow::Section;
use crate::drawing::{Ratio, SideView, Size, side_view};
use crate::fonts;
use crate::scene::{Frame, Item};
use crate::text::Span;
use crate::tokens::{Ink, Stroke, TextStyle};

/// Least height of the section, mm: below it the labels crowd.
pub(crate) const LEAST_HEIGHT_MM: f64 = 52.0;
/// Height that is worth moving something to the next page, mm.
pub(crate) const READABLE_HEIGHT_MM: f64 = 58.0;
/// Height where there is room to choose, mm.
pub(crate) const WANTED_HEIGHT_MM: f64 = 80.0;
/// Most height of the section, mm: above it the page looks empty.
pub(crate) const MOST_HEIGHT_MM: f64 = 100.0;
/// Length of the scale bar that is aimed at, mm.
const BAR_MM: f64 = 45.0;

/// The bar that shows the scale, with its length, to the left of the origin.
fn scale_bar(ratio: Ratio, units: Units) -> Block {
    const HEIGHT_MM: f64 = 1.4;
    let bar_m = ratio.bar_m(BAR_MM);
    let length_mm = ratio.paper_mm(bar_m);
    let words = format!("{}    {} printed at full size", bar_words(bar_m, units), ratio.words());
    let mut block = Block::aside(&words);
    let left_mm = -fonts::width_mm(TextStyle::Note, &words) - 2.0 - length_mm;
    for part in 0..4 {
        let frame = Frame {
            left_mm: left_mm + length_mm * f64::from(part) / 4.0,
            top_mm: (TextStyle::Note.leading_mm() - HEIGHT_MM) / 2.0,
            width_mm: length_mm / 4.0,
            height_mm: HEIGHT_MM,
        };
        let fill = if part % 2 == 0 { Ink::Text } else { Ink::Background };
        let outline = Some((Stroke::Hair, Ink::Text));
        block.items.push(Item::Area { points: frame.corners().to_vec(), fill, outline });
    }
    block
}

/// A bar's length: a round number.
fn bar_words(bar_m: f64, units: Units) -> String {
    let length = units.from_metres(bar_m);
    let decimals = if length >= 1.0 { 0 } else { 2 };
    format!("{} {}", station::units::fixed(length, decimals), units.symbol())
}

/// What found no room in the drawing.
fn unplaced(view: &SideView, size: Size) -> Block {
    let mut note = Block::default();
    if !view.unplaced.is_empty() {
        let words = format!("No room in the drawing for: {}.", view.unplaced.join("; "));
        note.height_mm = note.paragraph(0.0, 0.0, size.width_mm, Span::new(TextStyle::Note, words));
    }
    note
}

/// The drawing as a section of the sheet.
pub(crate) fn section(plan: &Plan, hung: &Hung, units: Units, size: Size) -> Section {
    let size = Size { height_mm: size.height_mm - Section::TITLE_MM, ..size };
    let mut view = side_view(plan, hung, units, size);
    let mut note = unplaced(&view, size);
    if view.scene.height_mm + note.height_mm > size.height_mm {
        // A lower drawing leaves room to say it below.
        let height_mm = size.height_mm - note.height_mm.max(2.0 * TextStyle::Note.leading_mm());
        view = side_view(plan, hung, units, Size { height_mm, ..size });
        note = unplaced(&view, size);
    }
    let mut block = Block::empty(view.scene.height_mm);
    block.items = view.scene.items;
    let y_mm = block.height_mm;
    block.height_mm += note.height_mm;
    block.add(note, 0.0, y_mm);
    Section {
        title: "Site, from the side".to_owned(),
        aside: scale_bar(view.ratio, units),
        columns: None,
        blocks: vec![block],
    }
}
