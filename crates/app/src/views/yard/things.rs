//! Drawings of single things: supports, grips, marks, the legend.

use eframe::egui::{Align2, FontId, Painter, Pos2, Rect, Shape, Stroke, Vec2, pos2, vec2};
use sheet::tokens::{Ink, Pen};
use station::plan::SupportKind;

use super::grip::Grip;
use super::layout::{Handle, SupportShape};
use super::paint::Look;

/// Half the width of a lozenge and the radius of a node's circle, px.
const MARK_PX: f32 = 5.5;

/// A mast, a tree or a building, by its silhouette.
pub fn support(painter: &Painter, shape: &SupportShape, look: &Look<'_>) {
    match shape.kind {
        SupportKind::Mast => mast(painter, shape, look),
        SupportKind::Tree => tree(painter, shape, look),
        SupportKind::Building => building(painter, shape, look),
    }
}

fn mast(painter: &Painter, shape: &SupportShape, look: &Look<'_>) {
    let (foot, top) = (shape.foot, shape.top);
    let base = 3.0;
    let pole = vec![
        foot - vec2(base * 0.6, 0.0),
        foot + vec2(base * 0.6, 0.0),
        top + vec2(0.9, 0.0),
        top - vec2(0.9, 0.0),
    ];
    painter.add(Shape::convex_polygon(pole, look.ink(Ink::Support), Stroke::NONE));
    let block = Rect::from_center_size(foot, vec2(4.0 * base, 3.0));
    painter.rect_filled(block, 1.0, look.ink(Ink::Support));
}

fn tree(painter: &Painter, shape: &SupportShape, look: &Look<'_>) {
    let height = shape.height_px();
    let (foot, top) = (shape.foot, shape.top);
    let trunk = (0.018 * height).clamp(1.2, 5.0);
    let fork = foot.lerp(top, 0.5);
    let stem = vec![
        foot - vec2(1.3 * trunk, 0.0),
        foot + vec2(1.3 * trunk, 0.0),
        fork + vec2(0.4 * trunk, 0.0),
        fork - vec2(0.4 * trunk, 0.0),
    ];
    painter.add(Shape::convex_polygon(crown(foot, top), look.mix(Ink::Support, 0.2), Stroke::NONE));
    painter.add(Shape::convex_polygon(stem, look.mix(Ink::Support, 0.7), Stroke::NONE));
    let rim = Stroke::new(Pen::Fine.width(), look.mix(Ink::Support, 0.5));
    painter.add(Shape::closed_line(crown(foot, top), rim));
}

/// An egg with its tip at the support's top.
fn crown(foot: Pos2, top: Pos2) -> Vec<Pos2> {
    const STEPS: u8 = 40;
    let height = foot.y - top.y;
    let (low, wide) = (foot.y - 0.2 * height, (0.2 * height).min(80.0));
    (0..STEPS)
        .map(|n| {
            let angle = std::f32::consts::TAU * f32::from(n) / f32::from(STEPS);
            let up = 0.5 - 0.5 * angle.cos();
            // Fuller below than above.
            let half = wide * angle.sin() * (1.0 - 0.35 * up);
            pos2(foot.x + half, low + up * (top.y - low))
        })
        .collect()
}

fn building(painter: &Painter, shape: &SupportShape, look: &Look<'_>) {
    let height = shape.height_px();
    let (foot, top) = (shape.foot, shape.top);
    let half = (0.55 * height).clamp(8.0, 120.0);
    let eaves = foot.y - 0.72 * height;
    let outline = vec![
        pos2(foot.x - half, foot.y),
        pos2(foot.x - half, eaves),
        top,
        pos2(foot.x + half, eaves),
        pos2(foot.x + half, foot.y),
    ];
    let stroke = Stroke::new(Pen::Fine.width(), look.mix(Ink::Support, 0.7));
    painter.add(Shape::convex_polygon(outline, look.mix(Ink::Support, 0.2), stroke));
    painter.hline(
        foot.x - half..=foot.x + half,
        eaves,
        Stroke::new(Pen::Hairline.width(), look.mix(Ink::Support, 0.45)),
    );
    let door = Rect::from_min_max(
        pos2(foot.x + 0.42 * half, foot.y - (0.3 * height).min(0.7 * (foot.y - eaves))),
        pos2(foot.x + 0.68 * half, foot.y),
    );
    painter.rect_filled(door, 0.0, look.mix(Ink::Support, 0.42));
}

/// The mark of a current loop.
pub fn lozenge(painter: &Painter, at: Pos2, look: &Look<'_>) {
    let points = [vec2(0.0, -MARK_PX), vec2(MARK_PX, 0.0), vec2(0.0, MARK_PX), vec2(-MARK_PX, 0.0)];
    let outline = points.map(|p| at + 1.25 * p).to_vec();
    let rim = Stroke::new(Pen::Curve.width(), look.ink(Ink::Background));
    painter.add(Shape::convex_polygon(outline, look.ink(Ink::Current), rim));
}

/// The mark of a current node.
pub fn circle(painter: &Painter, at: Pos2, look: &Look<'_>) {
    painter.circle(
        at,
        MARK_PX,
        look.ink(Ink::Background),
        Stroke::new(Pen::Curve.width(), look.ink(Ink::Text)),
    );
}

/// The thing that one takes hold of.
pub fn grip(painter: &Painter, handle: &Handle, look: &Look<'_>) {
    let at = handle.at;
    let fill = look.ink(Ink::Background);
    let pen = |ink| Stroke::new(Pen::Curve.width(), look.ink(ink));
    match handle.grip {
        Grip::WireBeginning { .. } | Grip::WireEnd { .. } => {
            painter.circle(at, 4.5, fill, pen(Ink::Wire));
            painter.circle_filled(at, 1.5, look.ink(Ink::Wire));
        }
        Grip::Feedpoint => {
            let square = Rect::from_center_size(at, Vec2::splat(10.0));
            painter.rect(square, 2.0, fill, pen(Ink::feed(look.feed)), eframe::egui::StrokeKind::Middle);
            painter.vline(at.x, at.y - 5.0..=at.y + 5.0, pen(Ink::feed(look.feed)));
        }
        Grip::PathPoint { .. } => {
            painter.circle(at, 3.5, fill, pen(Ink::Rope));
        }
        Grip::NewPoint { .. } => {
            let stroke = pen(Ink::Faint);
            painter.circle_filled(at, 7.0, fill);
            painter.hline(at.x - 4.0..=at.x + 4.0, at.y, stroke);
            painter.vline(at.x, at.y - 4.0..=at.y + 4.0, stroke);
        }
        Grip::SupportFoot { .. } => {
            let bar = Rect::from_center_size(at + vec2(0.0, 3.0), vec2(18.0, 5.0));
            painter.rect(bar, 2.0, fill, pen(Ink::Support), eframe::egui::StrokeKind::Middle);
        }
        Grip::SupportTop { .. } => {
            let cap = vec![at + vec2(-5.0, 2.5), at + vec2(0.0, -4.5), at + vec2(5.0, 2.5)];
            painter.add(Shape::convex_polygon(cap, fill, pen(Ink::Support)));
        }
        // The load itself stands on the wire; a grip beside it is a small ring.
        Grip::Load { .. } => {
            if handle.at != handle.anchor {
                painter.circle(at, 3.5, fill, pen(Ink::Wire));
            }
        }
        Grip::Entrance => {
            let stroke = pen(Ink::Text);
            painter.rect(
                Rect::from_center_size(at, Vec2::splat(9.0)),
                1.0,
                fill,
                stroke,
                eframe::egui::StrokeKind::Middle,
            );
            painter.circle_filled(at, 1.8, look.ink(Ink::Text));
        }
    }
}

/// What the marks mean, in one line.
pub fn legend(painter: &Painter, rect: Rect, font: FontId, look: &Look<'_>) {
    let ink = look.ink(Ink::Faint);
    let mut x = rect.left();
    let y = rect.center().y;
    let words = |x: f32, words: &str| {
        painter.text(pos2(x, y), Align2::LEFT_CENTER, words, font.clone(), ink).right() + 16.0
    };
    lozenge(painter, pos2(x + 6.0, y), look);
    x = words(x + 17.0, "current loop");
    circle(painter, pos2(x + 6.0, y), look);
    x = words(x + 17.0, "current node");
    let band = Rect::from_center_size(pos2(x + 10.0, y), vec2(20.0, 7.0));
    painter.rect_filled(band, 1.0, look.mix(Ink::Current, 0.78));
    x = words(x + 25.0, "current");
    let whisker = Stroke::new(Pen::Fine.width(), look.ink(Ink::Voltage));
    for n in 0..4_u8 {
        let foot = x + 2.0 + 5.0 * f32::from(n);
        let tip = if n < 2 { y - 6.0 } else { y + 6.0 };
        painter.line_segment([pos2(foot, y), pos2(foot, tip)], whisker);
    }
    words(x + 24.0, "voltage: up plus, down minus");
}
