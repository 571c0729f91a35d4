//! The cautions, in two columns.

use super::block::Block;
use super::density::Density;
use super::flow::Section;
use crate::model::Caution;
use crate::text::Span;
use crate::tokens::{Ink, TextStyle, space};

/// Between two cautions, mm.
const GAP_MM: f64 = 0.9;

/// All cautions in one block.
pub(crate) fn section(cautions: &[Caution], density: &Density, width_mm: f64) -> Section {
    under_title(vec![columns(cautions.iter().collect(), density, width_mm)])
}

/// Those of every station in a block of their own: where room is short, the plan's own follow on the next page.
pub(crate) fn divided(cautions: &[Caution], density: &Density, width_mm: f64) -> Section {
    let (general, own): (Vec<&Caution>, Vec<&Caution>) =
        cautions.iter().partition(|caution| caution.is_general);
    let groups = [general, own].into_iter().filter(|group| !group.is_empty());
    under_title(groups.map(|group| columns(group, density, width_mm)).collect())
}

fn under_title(blocks: Vec<Block>) -> Section {
    Section { title: "Cautions".to_owned(), aside: Block::default(), columns: None, blocks }
}

/// Down the left column, then down the right one, as even as can be.
fn columns(cautions: Vec<&Caution>, density: &Density, width_mm: f64) -> Block {
    let column_mm = (width_mm - space::GUTTER) / 2.0;
    let blocks: Vec<Block> = cautions.into_iter().map(|caution| block(caution, density, column_mm)).collect();
    let height_mm = |blocks: &[Block]| blocks.iter().map(|block| block.height_mm).sum::<f64>();
    let longer_mm = |split: usize| height_mm(&blocks[..split]).max(height_mm(&blocks[split..]));
    let split = (0..=blocks.len()).min_by(|&a, &b| longer_mm(a).total_cmp(&longer_mm(b))).unwrap_or(0);
    let mut out = Block::empty(longer_mm(split));
    let mut y_mm = 0.0;
    for (index, block) in blocks.into_iter().enumerate() {
        if index == split {
            y_mm = 0.0;
        }
        let x_mm = if index < split { 0.0 } else { column_mm + space::GUTTER };
        let taken_mm = block.height_mm;
        out.add(block, x_mm, y_mm);
        y_mm += taken_mm;
    }
    out
}

fn block(caution: &Caution, density: &Density, width_mm: f64) -> Block {
    let mut block = Block::new(*density);
    let spans = [
        Span::new(TextStyle::Strong, format!("{}.", caution.head)).ink(Ink::Caution),
        Span::new(TextStyle::Body, &caution.text),
    ];
    block.height_mm = block.spans(0.0, 0.0, width_mm, &spans) + GAP_MM;
    block
}
