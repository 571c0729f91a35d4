//! A scene as SVG: one file per page, in millimetres.
//!
//! Text stays text. Its width is stated, so that a viewer without the font sets it into the same room.

use std::fmt::Write as _;

use crate::scene::{Item, Scene, Spot, Text};
use crate::tokens::{Ground, Ink, Stroke, Weight};

/// Writes one page.
#[must_use]
pub fn write(scene: &Scene) -> String {
    let (width, height) = (number(scene.width_mm), number(scene.height_mm));
    let mut out = format!(
        "<svg xmlns=\"http://www.w3.org/2000/svg\" width=\"{width}mm\" height=\"{height}mm\" \
         viewBox=\"0 0 {width} {height}\" stroke-linejoin=\"round\" \
         font-family=\"'DejaVu Sans Condensed','DejaVu Sans',sans-serif\" font-stretch=\"condensed\">\n\
         <rect width=\"{width}\" height=\"{height}\" fill=\"{}\"/>\n",
        color(Ink::Background)
    );
    for item in &scene.items {
        let line = match item {
            Item::Line { points, stroke, ink } => {
                format!("<path d=\"{}\" fill=\"none\"{}/>", path(points, false), line_style(*stroke, *ink))
            }
            Item::Area { points, fill, outline } => format!(
                "<path d=\"{}\" fill=\"{}\"{}/>",
                path(points, true),
                color(*fill),
                outline.map_or_else(String::new, |(stroke, ink)| line_style(stroke, ink))
            ),
            Item::Text(text) => text_element(text),
        };
        out.push_str(&line);
        out.push('\n');
    }
    out.push_str("</svg>\n");
    out
}

fn text_element(text: &Text) -> String {
    let width_mm = text.width_mm();
    let (x, y) = (number(text.at.x_mm - text.lead_mm()), number(text.at.y_mm));
    let turn = if text.turn_deg == 0.0 {
        String::new()
    } else {
        let at = (number(text.at.x_mm), number(text.at.y_mm));
        format!(" transform=\"rotate({} {} {})\"", number(text.turn_deg), at.0, at.1)
    };
    let weight = if text.style.weight() == Weight::Bold { " font-weight=\"bold\"" } else { "" };
    format!(
        "<text x=\"{x}\" y=\"{y}\" font-size=\"{}\"{weight} fill=\"{}\" textLength=\"{}\" \
         lengthAdjust=\"spacingAndGlyphs\"{turn}>{}</text>",
        number(text.style.size_mm()),
        color(text.ink),
        number(width_mm),
        escaped(&text.text)
    )
}

fn line_style(stroke: Stroke, ink: Ink) -> String {
    let mut out = format!(" stroke=\"{}\" stroke-width=\"{}\"", color(ink), number(stroke.width_mm()));
    let dash = stroke.dash_mm();
    if dash.is_empty() {
        out.push_str(" stroke-linecap=\"round\"");
    } else {
        let lengths: Vec<String> = dash.iter().map(|&mm| number(mm)).collect();
        // Writing to a string cannot fail.
        let _ = write!(out, " stroke-dasharray=\"{}\"", lengths.join(" "));
    }
    out
}

fn path(points: &[Spot], is_closed: bool) -> String {
    let mut out = String::new();
    for (index, spot) in points.iter().enumerate() {
        let letter = if index == 0 { 'M' } else { 'L' };
        let _ = write!(out, "{letter}{} {}", number(spot.x_mm), number(spot.y_mm));
    }
    if is_closed {
        out.push('Z');
    }
    out
}

fn color(ink: Ink) -> String {
    let [red, green, blue] = ink.rgb(Ground::Paper);
    format!("#{red:02x}{green:02x}{blue:02x}")
}

/// Millimetres or degrees to a micrometre, without zeros at the end.
fn number(value: f64) -> String {
    let text = format!("{value:.3}");
    let text = text.trim_end_matches('0').trim_end_matches('.');
    if text == "-0" { "0".to_owned() } else { text.to_owned() }
}

fn escaped(text: &str) -> String {
    let mut out = String::with_capacity(text.len());
    for c in text.chars() {
        match c {
            '&' => out.push_str("&amp;"),
            '<' => out.push_str("&lt;"),
            '>' => out.push_str("&gt;"),
            _ => out.push(c),
        }
    }
    out
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::scene::Anchor;
    use crate::tokens::TextStyle;

    #[test]
    fn text_is_escaped_and_stands_where_its_anchor_says() {
        let mut scene = Scene::new(210.0, 297.0);
        let text = Text::new(50.0, 20.0, TextStyle::Body, "<A & B>").anchor(Anchor::End);
        let begins_mm = 50.0 - text.width_mm();
        scene.items.push(Item::Text(text));
        let svg = write(&scene);
        assert!(svg.contains(">&lt;A &amp; B&gt;</text>"), "{svg}");
        assert!(svg.contains(&format!("x=\"{}\"", number(begins_mm))), "{svg}");
    }

    #[test]
    fn numbers_are_short() {
        assert_eq!(number(-0.0001), "0");
        assert_eq!(number(12.340), "12.34");
        assert_eq!(number(210.0), "210");
    }
}
