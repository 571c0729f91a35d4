//! The cautions, in two columns.

use super::block::Block;
use super::flow::Section;
use crate::model::Caution;
use crate::text::Span;
use crate::tokens::{Ink, TextStyle, space};

pub(crate) fn section(cautions: &[Caution], width_mm: f64) -> Section {
    let column_mm = (width_mm - space::GUTTER) / 2.0;
    let blocks = cautions
        .chunks(2)
        .map(|pair| {
            let mut block = Block::default();
            for (index, caution) in pair.iter().enumerate() {
                let spans = [
                    Span::new(TextStyle::Strong, format!("{}.", caution.head)).ink(Ink::Caution),
                    Span::new(TextStyle::Body, &caution.text),
                ];
                let x_mm = index as f64 * (column_mm + space::GUTTER);
                let height_mm = block.spans(x_mm, 0.0, column_mm, &spans);
                block.height_mm = block.height_mm.max(height_mm + 1.0);
            }
            block
        })
        .collect();
    Section { title: "Cautions".to_owned(), aside: String::new(), columns: None, blocks }
}
