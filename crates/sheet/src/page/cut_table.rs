//! The cut list.

use super::block::{Block, ending, label};
use super::density::Density;
use super::flow::Section;
use crate::fonts;
use crate::model::{CutList, CutRow};
use crate::scene::{Frame, Item};
use crate::text::{Span, clamp};
use crate::tokens::{Ink, Stroke, TextStyle, space};

/// Around the box to tick, mm.
const TICK_GAP_MM: f64 = 0.8;
/// Over and under the text of a row, mm.
const PAD_MM: f64 = 0.8;

/// Where the columns stand, mm, from the measured width of what is in them.
struct Columns {
    part: f64,
    part_width: f64,
    /// Right edges of plan, ends, extra and cut.
    numbers: [f64; 4],
    tick: f64,
    built: f64,
    width: f64,
    density: Density,
}

impl Columns {
    fn new(list: &CutList, density: &Density, width_mm: f64) -> Self {
        let gap = density.cut_gap;
        let widest = |style: TextStyle, text: fn(&CutRow) -> &String| {
            list.rows.iter().map(|row| fonts::width_mm(style, text(row))).fold(0.0, f64::max)
        };
        let mark = widest(TextStyle::Strong, |row| &row.mark) + 2.5;
        let widths = [
            widest(TextStyle::Body, |row| &row.plan),
            widest(TextStyle::Body, |row| &row.ends),
            widest(TextStyle::Body, |row| &row.extra),
            widest(TextStyle::Key, |row| &row.cut),
        ]
        .map(|width| width.max(8.0) + gap);
        let built = width_mm - density.built;
        let tick = built - (density.cut_row - 2.0 * TICK_GAP_MM) - 2.0;
        let cut = tick - gap;
        let extra = cut - widths[3];
        let ends = extra - widths[2];
        let plan = ends - widths[1];
        let part_width = plan - widths[0] - mark;
        Self {
            part: mark,
            part_width,
            numbers: [plan, ends, extra, cut],
            tick,
            built,
            width: width_mm,
            density: *density,
        }
    }
}

pub(crate) fn section(list: &CutList, density: &Density, width_mm: f64) -> Section {
    let columns = Columns::new(list, density, width_mm);
    let mut blocks: Vec<Block> = list.rows.iter().map(|row| block(row, &columns)).collect();
    let sum = "plan + ends + extra = cut";
    let aside =
        if list.conductor.is_empty() { sum.to_owned() } else { format!("wire: {}; {sum}", list.conductor) };
    let mut note = Block::new(*density);
    let words = Span::new(TextStyle::Note, &list.note).ink(Ink::Faint);
    note.height_mm = space::CELL + note.paragraph(0.0, space::CELL, width_mm, words);
    blocks.push(note);
    Section {
        title: "Cut list".to_owned(),
        aside: Block::aside(&aside),
        columns: Some(heads(&columns)),
        blocks,
    }
}

fn heads(columns: &Columns) -> Block {
    let mut block = Block::empty(TextStyle::Note.leading_mm() + 0.4);
    block.text(columns.part, 0.0, label(TextStyle::Note, "part").ink(Ink::Faint));
    for (x_mm, head) in columns.numbers.into_iter().zip(["plan", "ends", "extra", "cut"]) {
        block.text(x_mm, 0.0, ending(TextStyle::Note, head).ink(Ink::Faint));
    }
    block.text(columns.tick, 0.0, label(TextStyle::Note, "cut").ink(Ink::Faint));
    block.text(columns.built, 0.0, label(TextStyle::Note, "as built").ink(Ink::Faint));
    block.rule(0.0, columns.width, block.height_mm, Stroke::Rule, Ink::Rule);
    block
}

fn block(row: &CutRow, columns: &Columns) -> Block {
    let density = &columns.density;
    let mut block = Block::new(*density);
    // Where there is nothing to cut, words take the room of the numbers.
    let is_cut = !row.cut.is_empty();
    let part_width = if is_cut { columns.part_width } else { columns.tick - density.cut_gap - columns.part };
    let spans = [(TextStyle::Strong, &row.part, Ink::Text), (TextStyle::Body, &row.detail, Ink::Faint)]
        .map(|(style, words, ink)| Span::new(style, clamp(style, words, part_width, 2)).ink(ink));
    // The first line stands in the middle of a row of one line.
    let top_mm = (density.cut_row - block.leading_mm(TextStyle::Body)) / 2.0;
    let text_mm = block.spans(columns.part, top_mm, part_width, &spans);
    block.height_mm = (text_mm + top_mm + PAD_MM).max(density.cut_row);
    block.text(0.0, top_mm, label(TextStyle::Strong, &row.mark));
    let [plan, ends, extra, cut] = columns.numbers;
    for (x_mm, number) in [(plan, &row.plan), (ends, &row.ends), (extra, &row.extra)] {
        if !number.is_empty() {
            block.text(x_mm, top_mm, ending(TextStyle::Body, number));
        }
    }
    if is_cut {
        let key_mm = (density.cut_row - block.leading_mm(TextStyle::Key)) / 2.0;
        block.text(cut, key_mm, ending(TextStyle::Key, &row.cut));
    }
    let box_mm = TICK_GAP_MM;
    let side_mm = density.cut_row - 2.0 * box_mm;
    let tick = Frame { left_mm: columns.tick, top_mm: box_mm, width_mm: side_mm, height_mm: side_mm };
    let built = Frame {
        left_mm: columns.built,
        top_mm: box_mm / 2.0,
        width_mm: columns.width - columns.built,
        height_mm: block.height_mm - box_mm,
    };
    block.items.push(Item::writing_box(tick));
    block.items.push(Item::writing_box(built));
    block.rule(0.0, columns.built - 1.0, block.height_mm, Stroke::Hair, Ink::Rule);
    block
}
