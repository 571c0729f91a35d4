//! The site drawing as a section, with its scale bar.

use station::hang::Hung;
use station::plan::Plan;
use station::units::Units;

use super::block::{Block, label};
use super::flow::Section;
use crate::drawing::{Ratio, Size, side_view};
use crate::scene::{Frame, Item};
use crate::text::Span;
use crate::tokens::{Ink, Stroke, TextStyle, space};

/// Least height of the section, mm: below it the labels crowd.
pub(crate) const LEAST_HEIGHT_MM: f64 = 62.0;
/// Most height of the section, mm: above it the page looks empty.
pub(crate) const MOST_HEIGHT_MM: f64 = 100.0;
/// Length of the scale bar that is aimed at, mm.
const BAR_MM: f64 = 45.0;

/// The bar that shows the scale, with its length.
fn scale_bar(ratio: Ratio, units: Units) -> Block {
    const HEIGHT_MM: f64 = 1.4;
    let bar_m = ratio.bar_m(BAR_MM);
    let length_mm = ratio.paper_mm(bar_m);
    let mut block = Block::empty(TextStyle::Note.leading_mm());
    for part in 0..4 {
        let frame = Frame {
            left_mm: length_mm * f64::from(part) / 4.0,
            top_mm: 1.0,
            width_mm: length_mm / 4.0,
            height_mm: HEIGHT_MM,
        };
        let fill = if part % 2 == 0 { Ink::Text } else { Ink::Background };
        let outline = Some((Stroke::Hair, Ink::Text));
        block.items.push(Item::Area { points: frame.corners().to_vec(), fill, outline });
    }
    let words = format!("{}   {} at full size", units.tape(bar_m), ratio.words());
    block.text(length_mm + 2.0, 0.0, label(TextStyle::Note, words));
    block
}

/// The drawing as a section of the sheet.
pub(crate) fn section(plan: &Plan, hung: &Hung, units: Units, size: Size) -> Section {
    let bar_mm = TextStyle::Note.leading_mm() + 1.0;
    let size = Size { height_mm: size.height_mm - Section::TITLE_MM - space::SECTION - bar_mm, ..size };
    let view = side_view(plan, hung, units, size);
    let mut block = Block::empty(view.scene.height_mm);
    block.items = view.scene.items;
    let bar = scale_bar(view.ratio, units);
    let height_mm = bar.height_mm;
    block.add(bar, 0.0, block.height_mm);
    block.height_mm += height_mm + 1.0;
    if !view.unplaced.is_empty() {
        let words = format!("No room in the drawing for: {}.", view.unplaced.join("; "));
        let y_mm = block.height_mm;
        block.height_mm += block.paragraph(0.0, y_mm, size.width_mm, Span::new(TextStyle::Note, words)) + 0.5;
    }
    Section {
        title: "Site, from the side".to_owned(),
        aside: "lengths without knots and trimming; see the cut list".to_owned(),
        columns: None,
        blocks: vec![block],
    }
}
