//! Breaking text into lines by measured width.

use crate::fonts;
use crate::tokens::{Ink, TextStyle};

/// A stretch of text in one style.
#[derive(Clone, Debug, PartialEq)]
pub struct Span {
    /// The words.
    pub text: String,
    /// Size and weight.
    pub style: TextStyle,
    /// Colour.
    pub ink: Ink,
}

impl Span {
    /// A span in the main ink.
    #[must_use]
    pub fn new(style: TextStyle, text: impl Into<String>) -> Self {
        Self { text: text.into(), style, ink: Ink::Text }
    }

    /// The same in another ink.
    #[must_use]
    pub fn ink(self, ink: Ink) -> Self {
        Self { ink, ..self }
    }
}

/// A span placed on a line.
#[derive(Clone, Debug, PartialEq)]
pub struct Placed {
    /// Distance from the line's beginning, mm.
    pub x_mm: f64,
    /// What stands there.
    pub span: Span,
}

/// Breaks spans into lines no wider than `width_mm`. Lines break at spaces (not at no-break spaces); a word wider
/// than a line is broken between letters.
#[must_use]
pub fn wrap(spans: &[Span], width_mm: f64) -> Vec<Vec<Placed>> {
    let mut lines = vec![Vec::<Placed>::new()];
    let mut pen_mm = 0.0;
    for span in spans {
        let text = tie(&span.text);
        let space_mm = fonts::width_mm(span.style, " ");
        for word in text.split(' ').filter(|word| !word.is_empty()) {
            for piece in pieces(span.style, word, width_mm) {
                let piece_mm = fonts::width_mm(span.style, &piece);
                let is_first = lines.last().is_none_or(Vec::is_empty);
                let gap_mm = if is_first { 0.0 } else { space_mm };
                if !is_first && pen_mm + gap_mm + piece_mm > width_mm {
                    lines.push(Vec::new());
                    pen_mm = 0.0;
                } else {
                    pen_mm += gap_mm;
                }
                if let Some(line) = lines.last_mut() {
                    append(line, pen_mm, span, &piece);
                }
                pen_mm += piece_mm;
            }
        }
    }
    lines
}

/// The first of some styles in which a text takes no more than so many lines; the last one where none does.
#[must_use]
pub fn style_for(styles: &[TextStyle], text: &str, width_mm: f64, lines: usize) -> TextStyle {
    let fits = |style: &&TextStyle| wrap(&[Span::new(**style, text)], width_mm).len() <= lines;
    styles.iter().find(fits).or(styles.last()).copied().unwrap_or(TextStyle::Body)
}

/// The beginning of a text that fits on so many lines, with an ellipsis where something is missing.
#[must_use]
pub fn clamp(style: TextStyle, text: &str, width_mm: f64, lines: usize) -> String {
    let fits = |text: &str| wrap(&[Span::new(style, text)], width_mm).len() <= lines;
    if fits(text) {
        return text.to_owned();
    }
    let ends: Vec<usize> = text.char_indices().map(|(at, _)| at).collect();
    let shortened = |count: usize| format!("{}…", text[..ends[count]].trim_end());
    let kept = ends.partition_point(|&end| fits(&format!("{}…", text[..end].trim_end())));
    shortened(kept.saturating_sub(1))
}

/// The text with a no-break space between a number and its unit.
fn tie(text: &str) -> String {
    const UNITS: [&str; 17] =
        ["m", "mm", "ft", "in", "W", "kW", "V", "kV", "A", "mA", "Ω", "µH", "pF", "nF", "dB", "MHz", "kHz"];
    let mut out = String::with_capacity(text.len());
    let mut words = text.split(' ').peekable();
    while let Some(word) = words.next() {
        out.push_str(word);
        let Some(next) = words.peek() else { break };
        let unit = next.trim_end_matches([',', '.', ';', ':', ')', '%']);
        let is_number = word.ends_with(|c: char| c.is_ascii_digit() || c == '½');
        let is_inches = word == "ft" && next.starts_with(|c: char| c.is_ascii_digit() || c == '½');
        let is_tied = is_inches || is_number && (UNITS.contains(&unit) || *next == "%");
        out.push(if is_tied { '\u{a0}' } else { ' ' });
    }
    out
}

/// Adds a word to a line, to the last span if it looks the same.
fn append(line: &mut Vec<Placed>, x_mm: f64, span: &Span, word: &str) {
    match line.last_mut() {
        Some(last) if last.span.style == span.style && last.span.ink == span.ink => {
            last.span.text.push(' ');
            last.span.text.push_str(word);
        }
        _ => line.push(Placed { x_mm, span: Span { text: word.to_owned(), ..*span } }),
    }
}

/// A word, cut where it is wider than a line.
fn pieces(style: TextStyle, word: &str, width_mm: f64) -> Vec<String> {
    let mut out = vec![String::new()];
    let mut pen_mm = 0.0;
    for c in word.chars() {
        let letter_mm = fonts::width_mm(style, c.encode_utf8(&mut [0; 4]));
        if pen_mm + letter_mm > width_mm && pen_mm > 0.0 {
            out.push(String::new());
            pen_mm = 0.0;
        }
        if let Some(piece) = out.last_mut() {
            piece.push(c);
        }
        pen_mm += letter_mm;
    }
    out
}

/// The beginning of a text that fits, with an ellipsis where something is missing.
#[must_use]
pub fn fit(style: TextStyle, text: &str, width_mm: f64) -> String {
    if fonts::width_mm(style, text) <= width_mm {
        return text.to_owned();
    }
    let mut kept = String::new();
    for c in text.chars() {
        let longer = format!("{kept}{c}…");
        if fonts::width_mm(style, &longer) > width_mm {
            break;
        }
        kept.push(c);
    }
    format!("{}…", kept.trim_end())
}

#[cfg(test)]
mod tests {
    use super::*;

    fn lines_of(text: &str, width_mm: f64) -> Vec<String> {
        wrap(&[Span::new(TextStyle::Body, text)], width_mm)
            .into_iter()
            .map(|line| line.into_iter().map(|placed| placed.span.text).collect::<Vec<_>>().join(" "))
            .collect()
    }

    #[test]
    fn no_line_is_wider_than_asked_and_no_word_is_lost() {
        let text = "Keep them out of reach of people and Donaudampfschifffahrtsgesellschaften; 12\u{a0}346 Ω";
        for width_mm in [12.0, 20.0, 35.0, 200.0] {
            let lines = lines_of(text, width_mm);
            for line in &lines {
                assert!(fonts::width_mm(TextStyle::Body, line) <= width_mm, "{line} at {width_mm}");
            }
            let without_spaces = |s: &str| s.replace([' ', '\u{a0}'], "");
            assert_eq!(without_spaces(&lines.concat()), without_spaces(text));
        }
        assert_eq!(lines_of(text, 200.0).len(), 1);
    }

    #[test]
    fn numbers_stay_with_their_units() {
        assert_eq!(
            tie("66 ft 9½ in a 2 % m at 1.09 kV peak, 3 m."),
            "66\u{a0}ft\u{a0}9½\u{a0}in a 2\u{a0}% m at 1.09\u{a0}kV peak, 3\u{a0}m."
        );
    }

    #[test]
    fn a_fitted_text_shows_that_it_was_cut() {
        assert_eq!(fit(TextStyle::Body, "north mast", 100.0), "north mast");
        let cut = fit(TextStyle::Body, "the very long name of the north mast", 25.0);
        assert!(cut.ends_with('…') && fonts::width_mm(TextStyle::Body, &cut) <= 25.0, "{cut}");
        let cut = clamp(TextStyle::Body, "the very long name of the north mast beside the harbour", 25.0, 2);
        assert!(cut.ends_with('…') && lines_of(&cut, 25.0).len() == 2, "{cut}");
        assert_eq!(
            style_for(&[TextStyle::Title, TextStyle::Key], "Saltmarsh relief post", 50.0, 1),
            TextStyle::Key
        );
    }
}
