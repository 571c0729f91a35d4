//! Boxes for what the crew measures and signs.

use super::block::{Block, label};
use super::density::Density;
use super::flow::Section;
use crate::fonts;
use crate::model::{BandEntry, SheetModel};
use crate::scene::{Anchor, Frame, Item};
use crate::text::fit;
use crate::tokens::{Ink, Stroke, TextStyle, space};

/// Bands in one row of boxes.
const BANDS_A_ROW: usize = 12;
/// Fewer bands than this do not make the boxes wider.
const LEAST_A_ROW: usize = 6;
/// Width of the row's name, mm.
const NAME_MM: f64 = 16.0;
/// Who signs, and the box's share of the width.
const SIGNED: [(&str, f64); 4] = [
    ("Built: name, date", 0.21),
    ("Measured: name, date, instrument, wet or dry", 0.37),
    ("Checked: name, date", 0.21),
    ("Taken over: name, date", 0.21),
];

/// Who built, measured, checked and took over.
pub(crate) fn signatures(density: &Density, width_mm: f64) -> Block {
    let mut block = Block::empty(density.signed);
    let room_mm = width_mm - space::CELL * 2.0 * (SIGNED.len() - 1) as f64;
    let mut left_mm = 0.0;
    for (words, share) in SIGNED {
        let frame = Frame { left_mm, top_mm: 0.0, width_mm: share * room_mm, height_mm: density.signed };
        block.items.push(Item::writing_box(frame));
        let words = fit(TextStyle::Note, words, frame.width_mm - 2.0 * space::CELL);
        block.text(left_mm + space::CELL, 0.4, label(TextStyle::Note, words).ink(Ink::Faint));
        left_mm += frame.width_mm + 2.0 * space::CELL;
    }
    block
}

/// What is left of the page as a box for notes; nothing where a line of writing has no room.
pub(crate) fn notes(width_mm: f64, room_mm: f64) -> Option<Block> {
    const LEAST_MM: f64 = 14.0;
    const LINE_MM: f64 = 8.0;
    let height_mm = room_mm - space::CELL;
    (height_mm >= LEAST_MM).then(|| {
        let mut block = Block::empty(height_mm);
        block.items.push(Item::writing_box(Frame { left_mm: 0.0, top_mm: 0.0, width_mm, height_mm }));
        block.text(space::CELL, 0.4, label(TextStyle::Note, "Notes").ink(Ink::Faint));
        let lines = ((height_mm - 1.0) / LINE_MM).floor() as usize;
        for line in 1..=lines {
            let y_mm = line as f64 * LINE_MM;
            block.rule(2.0 * space::CELL, width_mm - 2.0 * space::CELL, y_mm, Stroke::Hair, Ink::Rule);
        }
        block
    })
}

/// A box for each band and feed.
pub(crate) fn measured(model: &SheetModel, density: &Density, width_mm: f64) -> Section {
    Section {
        title: "Measured".to_owned(),
        aside: Block::aside("SWR at the transmitter without the matching unit, in the middle of the band"),
        columns: None,
        blocks: model
            .bands
            .chunks(BANDS_A_ROW)
            .map(|bands| boxes(bands, model, density.measured, width_mm))
            .collect(),
    }
}

fn boxes(bands: &[BandEntry], model: &SheetModel, box_mm: f64, width_mm: f64) -> Block {
    let mut block = Block::default();
    let columns = model.bands.len().clamp(LEAST_A_ROW, BANDS_A_ROW);
    let column_mm = (width_mm - NAME_MM) / columns as f64;
    let left_mm = |index: usize| NAME_MM + index as f64 * column_mm;
    for (index, band) in bands.iter().enumerate() {
        let is_short = fonts::width_mm(TextStyle::Note, &band.name) <= column_mm - space::CELL;
        let name = if is_short { &band.name } else { &band.at };
        let middle_mm = left_mm(index) + column_mm / 2.0;
        block.text(middle_mm, 0.0, label(TextStyle::Note, name).anchor(Anchor::Middle));
    }
    let mut y_mm = TextStyle::Note.leading_mm() + 0.4;
    for feed in &model.feeds {
        let drop_mm = (box_mm - TextStyle::Strong.leading_mm()) / 2.0;
        block.text(0.0, y_mm + drop_mm, label(TextStyle::Strong, format!("SWR {}", feed.letter)));
        for index in 0..bands.len() {
            let frame =
                Frame { left_mm: left_mm(index), top_mm: y_mm, width_mm: column_mm, height_mm: box_mm };
            block.items.push(Item::writing_box(frame));
        }
        y_mm += box_mm;
    }
    block.height_mm = y_mm + space::CELL;
    block
}
