//! A small curve of SWR over one band, with the transmitter's limit.

use super::block::Block;
use crate::model::{Curve, SWR_TOP};
use crate::scene::{Frame, Item, Spot};
use crate::tokens::{Ink, Stroke};

/// Draws the curves of one band into a frame.
pub(crate) fn draw(block: &mut Block, frame: Frame, curves: &[Curve], limit: f64) {
    block.items.push(Item::area(frame, Ink::Panel));
    let height = |swr: f64| frame.bottom_mm() - frame.height_mm * share(swr);
    let level = |swr: f64, stroke, ink| {
        Item::line(
            Spot::new(frame.left_mm, height(swr)),
            Spot::new(frame.right_mm(), height(swr)),
            stroke,
            ink,
        )
    };
    for swr in [2.0, 3.0, 5.0] {
        block.items.push(level(swr, Stroke::Hair, Ink::Rule));
    }
    if limit < SWR_TOP {
        block.items.push(level(limit, Stroke::Limit, Ink::Limit));
    }
    for (index, curve) in curves.iter().enumerate() {
        let spot = |(place, swr): (f64, f64)| Spot::new(frame.left_mm + place * frame.width_mm, height(swr));
        if curve.is_channels || curve.points.len() < 2 {
            for &point in &curve.points {
                block.items.push(Item::disc(spot(point), 0.6, Ink::feed(index), None));
            }
        } else {
            for part in below_top(&curve.points) {
                let points = part.into_iter().map(spot).collect();
                block.items.push(Item::Line { points, stroke: Stroke::feed(index), ink: Ink::feed(index) });
            }
        }
    }
}

/// Height of an SWR in the frame from 0 to 1: logarithmic from 1 to the top.
fn share(swr: f64) -> f64 {
    if swr.is_finite() { (swr.max(1.0).ln() / SWR_TOP.ln()).min(1.0) } else { 1.0 }
}

/// The parts of a curve that lie below the top, ending where they cross it.
fn below_top(points: &[(f64, f64)]) -> Vec<Vec<(f64, f64)>> {
    let mut parts: Vec<Vec<(f64, f64)>> = Vec::new();
    let mut part: Vec<(f64, f64)> = Vec::new();
    for (index, &point) in points.iter().enumerate() {
        let is_in = point.1 <= SWR_TOP;
        let before = index.checked_sub(1).map(|i| points[i]);
        if let Some(before) = before.filter(|before| (before.1 <= SWR_TOP) != is_in) {
            part.push(crossing(before, point));
        }
        if is_in {
            part.push(point);
        } else if !part.is_empty() {
            parts.push(std::mem::take(&mut part));
        }
    }
    parts.push(part);
    parts.retain(|part| part.len() > 1);
    parts
}

/// Where the straight line between two points crosses the top.
fn crossing(a: (f64, f64), b: (f64, f64)) -> (f64, f64) {
    let (from, to) = if a.1 <= SWR_TOP { (a, b) } else { (b, a) };
    let share = if to.1.is_finite() { (SWR_TOP - from.1) / (to.1 - from.1) } else { 0.0 };
    (from.0 + share * (to.0 - from.0), SWR_TOP)
}
