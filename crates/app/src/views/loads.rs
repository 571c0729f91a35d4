//! The small mark of a load on its wire.

use eframe::egui::{Color32, Painter, Pos2, Shape, Stroke, Vec2, vec2};
use sheet::model::LoadKind;
use sheet::tokens::Pen;

/// Half the length of a mark along the wire and across it, px.
const HALF: Vec2 = vec2(9.0, 5.5);

/// Draws a load on its wire; `along` is the wire's direction on the screen.
pub(super) fn mark(painter: &Painter, at: Pos2, along: Vec2, kind: LoadKind, ink: Color32, fill: Color32) {
    let across = vec2(-along.y, along.x);
    let place = |x: f32, y: f32| at + along * x + across * y;
    let rim = Stroke::new(Pen::Curve.width(), ink);
    let bold = Stroke::new(Pen::Bold.width(), ink);
    let hull = |half: f32, fill: Color32| {
        let corners = [(-half, -HALF.y), (half, -HALF.y), (half, HALF.y), (-half, HALF.y)];
        Shape::convex_polygon(corners.map(|(x, y)| place(x, y)).to_vec(), fill, rim)
    };
    let bar = |x: f32, stroke: Stroke| Shape::line_segment([place(x, -HALF.y), place(x, HALF.y)], stroke);
    // The slanting turns of a coil over a stretch of the mark.
    let turn = |x: f32| Shape::line_segment([place(x - 1.5, HALF.y), place(x + 1.5, -HALF.y)], rim);
    match kind {
        // A barrel with its turns.
        LoadKind::Coil => {
            painter.add(hull(HALF.x, fill));
            painter.extend([-6.0, -2.0, 2.0, 6.0].map(turn));
        }
        // Two plates with nothing between.
        LoadKind::Capacitor => {
            let gap = [(-2.5, -HALF.y), (2.5, -HALF.y), (2.5, HALF.y), (-2.5, HALF.y)];
            let gap = gap.map(|(x, y)| place(x, 1.2 * y)).to_vec();
            painter.add(Shape::convex_polygon(gap, fill, Stroke::NONE));
            for x in [-3.0, 3.0] {
                painter.line_segment([place(x, -1.3 * HALF.y), place(x, 1.3 * HALF.y)], bold);
            }
        }
        // Turns on one half, a plate's dark block on the other.
        LoadKind::Trap => {
            painter.add(hull(HALF.x, fill));
            painter.extend([-6.5, -3.0].map(turn));
            let corners = [(1.0, -HALF.y), (HALF.x, -HALF.y), (HALF.x, HALF.y), (1.0, HALF.y)];
            let block = corners.map(|(x, y)| place(x, y)).to_vec();
            painter.add(Shape::convex_polygon(block, ink, rim));
        }
        // A block, dark all over.
        LoadKind::Resistor => {
            painter.add(hull(HALF.x - 1.0, ink));
        }
        // An empty box, crossed by a bar.
        LoadKind::Mixed => {
            painter.add(hull(HALF.x, fill));
            painter.add(bar(0.0, rim));
        }
    }
}
