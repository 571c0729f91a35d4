//! The cut list.

use super::block::{Block, ending, label};
use super::flow::Section;
use crate::model::{CutList, CutRow};
use crate::scene::{Frame, Item};
use crate::text::Span;
use crate::tokens::{Ink, Stroke, TextStyle, space};

/// Widths of the columns, mm; the part takes what is left.
struct Columns {
    mark: f64,
    number: f64,
    cut: f64,
    tick: f64,
    written: f64,
}

const COLUMNS: Columns = Columns { mark: 9.0, number: 19.0, cut: 25.0, tick: 7.0, written: 20.0 };

impl Columns {
    fn part_mm(&self, width_mm: f64) -> f64 {
        width_mm - self.mark - 3.0 * self.number - self.cut - self.tick - self.written - space::GUTTER
    }

    /// Right edges of plan, ends, extra and cut; left edge of the tick box.
    fn edges_mm(&self, width_mm: f64) -> [f64; 5] {
        let plan = self.mark + self.part_mm(width_mm) + self.number;
        let cut = plan + 2.0 * self.number + self.cut;
        [plan, plan + self.number, plan + 2.0 * self.number, cut, cut + space::GUTTER]
    }
}

pub(crate) fn section(list: &CutList, width_mm: f64) -> Section {
    let mut blocks: Vec<Block> = list.rows.iter().map(|row| block(row, width_mm)).collect();
    let mut note = Block::default();
    note.height_mm =
        1.0 + note.paragraph(0.0, 1.0, width_mm, Span::new(TextStyle::Note, &list.note).ink(Ink::Faint));
    blocks.push(note);
    Section {
        title: "Cut list".to_owned(),
        aside: "plan + ends + extra = cut".to_owned(),
        columns: Some(heads(width_mm)),
        blocks,
    }
}

fn heads(width_mm: f64) -> Block {
    let mut block = Block::empty(TextStyle::Note.leading_mm() + 0.6);
    let [plan, ends, extra, cut, tick] = COLUMNS.edges_mm(width_mm);
    block.text(COLUMNS.mark, 0.0, label(TextStyle::Note, "part").ink(Ink::Faint));
    for (x_mm, head) in [(plan, "plan"), (ends, "ends"), (extra, "extra"), (cut, "cut")] {
        block.text(x_mm, 0.0, ending(TextStyle::Note, head).ink(Ink::Faint));
    }
    block.text(tick, 0.0, label(TextStyle::Note, "done, as built").ink(Ink::Faint));
    block
}

fn block(row: &CutRow, width_mm: f64) -> Block {
    const PAD_MM: f64 = 0.7;
    let mut block = Block::default();
    let part_mm = COLUMNS.part_mm(width_mm);
    let spans =
        [Span::new(TextStyle::Strong, &row.part), Span::new(TextStyle::Body, &row.detail).ink(Ink::Faint)];
    let height_mm = block.spans(COLUMNS.mark, PAD_MM, part_mm, &spans);
    block.height_mm = height_mm.max(6.0) + 2.0 * PAD_MM;
    let [plan, ends, extra, cut, tick] = COLUMNS.edges_mm(width_mm);
    block.text(0.0, PAD_MM, label(TextStyle::Strong, &row.mark));
    for (x_mm, number) in [(plan, &row.plan), (ends, &row.ends), (extra, &row.extra)] {
        if !number.is_empty() {
            block.text(x_mm, PAD_MM, ending(TextStyle::Body, number));
        }
    }
    block.text(cut, PAD_MM - 0.5, ending(TextStyle::Key, &row.cut));
    let side_mm = 4.5;
    let tick_box = Frame { left_mm: tick, top_mm: PAD_MM + 0.4, width_mm: side_mm, height_mm: side_mm };
    let written = Frame {
        left_mm: tick + COLUMNS.tick,
        top_mm: PAD_MM,
        width_mm: width_mm - tick - COLUMNS.tick,
        height_mm: block.height_mm - 2.0 * PAD_MM,
    };
    block.items.push(Item::writing_box(tick_box));
    block.items.push(Item::writing_box(written));
    block.rule(0.0, width_mm, block.height_mm, Stroke::Hair, Ink::Rule);
    block
}
