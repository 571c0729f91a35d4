//! Boxes for what the crew measures and signs.

use super::block::{Block, label};
use super::flow::Section;
use crate::model::SheetModel;
use crate::scene::{Anchor, Frame, Item};
use crate::text::fit;
use crate::tokens::{Ink, TextStyle, space};

/// Bands in one row of boxes.
const BANDS_A_ROW: usize = 12;
/// Height of a box to write in, mm.
const BOX_MM: f64 = 7.5;
/// Width of the row's name, mm.
const NAME_MM: f64 = 20.0;

/// Who built, measured and took over.
pub(crate) fn signatures(width_mm: f64) -> Section {
    let roles = ["Built", "Measured", "Checked", "Taken over"];
    let mut block = Block::empty(12.0);
    let column_mm = (width_mm - 3.0 * space::GUTTER) / 4.0;
    for (index, role) in roles.into_iter().enumerate() {
        let left_mm = index as f64 * (column_mm + space::GUTTER);
        let frame = Frame { left_mm, top_mm: 0.0, width_mm: column_mm, height_mm: 12.0 };
        block.items.push(Item::writing_box(frame));
        let text = label(TextStyle::Note, format!("{role}: name, date")).ink(Ink::Faint);
        block.text(left_mm + space::CELL, 0.3, text);
    }
    Section { title: "Signed".to_owned(), aside: String::new(), columns: None, blocks: vec![block] }
}

/// Measured values.
pub(crate) fn sections(model: &SheetModel, width_mm: f64) -> Vec<Section> {
    let blocks = model.bands.chunks(BANDS_A_ROW).map(|bands| {
        let mut block = Block::default();
        let column_mm = (width_mm - NAME_MM) / BANDS_A_ROW as f64;
        let head_mm = TextStyle::Note.leading_mm() + 0.4;
        for (index, band) in bands.iter().enumerate() {
            let middle_mm = NAME_MM + (index as f64 + 0.5) * column_mm;
            let name = fit(TextStyle::Note, &band.name, column_mm - 1.0);
            block.text(middle_mm, 0.0, label(TextStyle::Note, name).anchor(Anchor::Middle));
        }
        let mut y_mm = head_mm;
        for feed in &model.feeds {
            let name = label(TextStyle::Strong, format!("SWR {}", feed.letter));
            block.text(0.0, y_mm + 1.8, name);
            for index in 0..bands.len() {
                let left_mm = NAME_MM + index as f64 * column_mm;
                let frame = Frame { left_mm, top_mm: y_mm, width_mm: column_mm, height_mm: BOX_MM };
                block.items.push(Item::writing_box(frame));
            }
            y_mm += BOX_MM;
        }
        block.height_mm = y_mm + 1.0;
        block
    });
    vec![Section {
        title: "Measured".to_owned(),
        aside: "SWR at the transmitter without the matching unit; instrument, weather, wet or dry soil:"
            .to_owned(),
        columns: None,
        blocks: blocks.collect(),
    }]
}
