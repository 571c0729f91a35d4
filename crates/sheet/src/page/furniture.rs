//! Heads and feet of pages.

use qrcode::{Color, EcLevel, QrCode};

use super::block::{Block, baseline_mm, ending, label};
use super::density::Density;
use crate::model::Identity;
use crate::scene::{Frame, Item};
use crate::text::{Span, fit, style_for};
use crate::tokens::{Ink, Stroke, TextStyle, space};

/// Height of the foot, mm.
pub(crate) const FOOT_MM: f64 = 5.0;
/// Width of the column with date and checksum, mm.
const FACTS_MM: f64 = 46.0;
/// Width of the names in it, mm.
const FACT_NAME_MM: f64 = 17.0;

/// The head of the first page: name, purpose, date, check, code.
pub(crate) fn front_head(identity: &Identity, density: &Density, width_mm: f64) -> Block {
    let mut block = Block::default();
    let left_mm = width_mm - density.code - space::GUTTER - FACTS_MM - space::GUTTER;
    let title = style_for(&[TextStyle::Title, TextStyle::Section], &identity.name, left_mm, 1);
    let mut y_mm = block.paragraph(0.0, 0.0, left_mm, Span::new(title, &identity.name));
    let kind = if identity.call_sign.trim().is_empty() {
        "Station plan sheet".to_owned()
    } else {
        format!("Station plan sheet of {}", identity.call_sign)
    };
    y_mm += 0.5;
    y_mm += block.paragraph(0.0, y_mm, left_mm, Span::new(TextStyle::Strong, kind));
    y_mm +=
        block.paragraph(0.0, y_mm, left_mm, Span::new(TextStyle::Body, &identity.purpose).ink(Ink::Faint));

    let facts_mm = left_mm + space::GUTTER;
    let facts = [("Revision", &identity.revision), ("Date", &identity.date), ("Plan check", &identity.check)];
    let mut fact_mm = 0.0;
    for (name, value) in facts {
        let lower_mm = baseline_mm(TextStyle::Key) - baseline_mm(TextStyle::Note);
        block.text(facts_mm, fact_mm + lower_mm, label(TextStyle::Note, name).ink(Ink::Faint));
        let value_mm = facts_mm + FACT_NAME_MM;
        let room_mm = FACTS_MM - FACT_NAME_MM;
        let style = style_for(&[TextStyle::Key, TextStyle::Strong, TextStyle::Note], value, room_mm, 1);
        let lower_mm = baseline_mm(TextStyle::Key) - baseline_mm(style);
        block.text(value_mm, fact_mm + lower_mm, label(style, fit(style, value, room_mm)));
        fact_mm += TextStyle::Key.leading_mm() + 1.2;
        block.rule(facts_mm, facts_mm + FACTS_MM, fact_mm - 0.6, Stroke::Hair, Ink::Rule);
    }
    block.add(code(&identity.code, density.code), width_mm - density.code, 0.0);
    block.height_mm = y_mm.max(fact_mm).max(density.code) + density.section;
    block
}

/// The head of the other pages.
pub(crate) fn running_head(identity: &Identity, width_mm: f64) -> Block {
    let mut block = Block::empty(TextStyle::Section.leading_mm() + space::SECTION);
    let facts = format!("revision {}   {}   plan check {}", identity.revision, identity.date, identity.check);
    let facts = ending(TextStyle::Body, facts);
    let name = fit(TextStyle::Section, &identity.name, width_mm - facts.width_mm() - space::GUTTER);
    block.text(0.0, 0.0, label(TextStyle::Section, name));
    block.text(width_mm, 0.5, facts);
    block
}

/// The foot: model and page number.
pub(crate) fn foot(identity: &Identity, width_mm: f64, page: usize, pages: usize) -> Block {
    let mut block = Block::empty(FOOT_MM);
    block.rule(0.0, width_mm, 0.8, Stroke::Rule, Ink::Rule);
    let page = ending(TextStyle::Note, format!("page {page} of {pages}"));
    let model = format!("Wirewright {} · figures: {}", env!("CARGO_PKG_VERSION"), identity.model);
    let model = fit(TextStyle::Note, &model, width_mm - page.width_mm() - space::GUTTER);
    block.text(0.0, 1.4, label(TextStyle::Note, model).ink(Ink::Faint));
    block.text(width_mm, 1.4, page);
    block
}

/// A QR code (ISO/IEC 18004) as areas, one for each run of dark modules.
fn code(content: &str, side_mm: f64) -> Block {
    let mut block = Block::empty(side_mm);
    let Ok(code) = QrCode::with_error_correction_level(content, EcLevel::M) else {
        // Too long a name for any code: the sheet stands without one.
        return block;
    };
    let side = code.width();
    let module_mm = side_mm / side as f64;
    for (row, modules) in code.to_colors().chunks(side).enumerate() {
        let mut from = 0;
        while from < side {
            let run = modules[from..].iter().take_while(|&&color| color == modules[from]).count();
            if modules[from] == Color::Dark {
                let frame = Frame {
                    left_mm: from as f64 * module_mm,
                    top_mm: row as f64 * module_mm,
                    width_mm: run as f64 * module_mm,
                    height_mm: module_mm,
                };
                block.items.push(Item::area(frame, Ink::Text));
            }
            from += run;
        }
    }
    block
}
