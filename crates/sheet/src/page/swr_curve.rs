//! A small curve of SWR over one band, with the transmitter's limit.

use super::block::{Block, ending, label};
use crate::model::{Curve, feed_letter};
use crate::scene::{Frame, Item, Spot};
use crate::swr_scale;
use crate::tokens::{Ink, Stroke, TextStyle};

/// Ratios with a line across the curve.
const GRID: [f64; 4] = [2.0, 3.0, 10.0, 100.0];
/// Ratios whose lines are numbered; the others would stand too close.
const NUMBERED: [(f64, &str); 2] = [(2.0, "2"), (10.0, "10")];
/// Width of the numbers, mm.
pub(crate) const NUMBERS_MM: f64 = 4.5;
/// Radius of a channel's dot, mm.
const DOT_MM: f64 = 0.7;

/// A channel's dot: filled for the first feed, open for the others.
fn dot(at: Spot, feed: usize) -> Item {
    let ink = Ink::feed(feed);
    let fill = if feed == 0 { ink } else { Ink::Background };
    Item::disc(at, DOT_MM, fill, Some((Stroke::Frame, ink)))
}

/// What the lines are: the letter of each of the first three feeds with a piece of its line.
pub(crate) fn key(block: &mut Block, left_mm: f64, top_mm: f64, feeds: usize) {
    const SAMPLE_MM: f64 = 3.6;
    let mut x_mm = left_mm;
    for feed in 0..feeds.min(3) {
        let letter = label(TextStyle::Note, feed_letter(feed)).ink(Ink::feed(feed));
        let width_mm = letter.width_mm();
        block.text(x_mm, top_mm, letter);
        x_mm += width_mm + 0.5;
        let y_mm = top_mm + TextStyle::Note.leading_mm() / 2.0;
        let line = [Spot::new(x_mm, y_mm), Spot::new(x_mm + SAMPLE_MM, y_mm)];
        block.items.push(Item::line(line[0], line[1], Stroke::feed(feed), Ink::feed(feed)));
        x_mm += SAMPLE_MM + 0.8;
    }
}

/// Draws the curves of one band into a frame, with the scale's numbers on its left.
pub(crate) fn draw(block: &mut Block, frame: Frame, curves: &[Curve], limit: f64) {
    let plot = Frame { left_mm: frame.left_mm + NUMBERS_MM, width_mm: frame.width_mm - NUMBERS_MM, ..frame };
    block.items.push(Item::area(plot, Ink::Panel));
    let height = |swr: f64| plot.bottom_mm() - plot.height_mm * swr_scale::height(swr);
    let level = |swr: f64, stroke, ink| {
        Item::line(Spot::new(plot.left_mm, height(swr)), Spot::new(plot.right_mm(), height(swr)), stroke, ink)
    };
    block.items.extend(GRID.map(|swr| level(swr, Stroke::Hair, Ink::Rule)));
    block.items.push(level(limit, Stroke::Limit, Ink::Limit));
    for (swr, words) in NUMBERED {
        let top_mm = height(swr) - TextStyle::Note.leading_mm() / 2.0;
        block.text(plot.left_mm - 0.8, top_mm, ending(TextStyle::Note, words).ink(Ink::Faint));
    }
    for (index, curve) in curves.iter().enumerate() {
        let spot = |(place, swr): (f64, f64)| Spot::new(plot.left_mm + place * plot.width_mm, height(swr));
        if curve.is_channels || curve.points.len() < 2 {
            // Feeds stand beside each other, not on each other; and the outermost channels off the edge.
            let shift_mm = |index: f64| (index - (curves.len() as f64 - 1.0) / 2.0) * 2.4 * DOT_MM;
            let inset_mm = 2.0 * DOT_MM - shift_mm(0.0);
            let room_mm = (plot.width_mm - 2.0 * inset_mm).max(0.0);
            for &(place, swr) in &curve.points {
                let x_mm = plot.left_mm + inset_mm + place * room_mm + shift_mm(index as f64);
                block.items.push(dot(Spot::new(x_mm, height(swr)), index));
            }
        } else {
            let points = curve.points.iter().map(|&point| spot(point)).collect();
            block.items.push(Item::Line { points, stroke: Stroke::feed(index), ink: Ink::feed(index) });
        }
    }
}
