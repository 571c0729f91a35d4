//! A small curve of SWR over one band, with the transmitter's limit.

use super::block::{Block, ending};
use crate::model::Curve;
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
            // Feeds beside each other, not on each other; and not over the edge.
            let shift_mm = (index as f64 - (curves.len() as f64 - 1.0) / 2.0) * 2.2 * DOT_MM;
            for &point in &curve.points {
                let at = spot(point);
                let x_mm = (at.x_mm + shift_mm).clamp(plot.left_mm + DOT_MM, plot.right_mm() - DOT_MM);
                let ink = Ink::feed(index);
                let fill = if index == 0 { ink } else { Ink::Background };
                block.items.push(Item::disc(
                    Spot::new(x_mm, at.y_mm),
                    DOT_MM,
                    fill,
                    Some((Stroke::Frame, ink)),
                ));
            }
        } else {
            let points = curve.points.iter().map(|&point| spot(point)).collect();
            block.items.push(Item::Line { points, stroke: Stroke::feed(index), ink: Ink::feed(index) });
        }
    }
}
