//! Loads in words and marks: what kind each is, its values as text, and its small mark on the wire.

use eframe::egui::{Color32, Painter, Pos2, Shape, Stroke, Vec2, vec2};
use sheet::tokens::Pen;
use station::plan::Circuit;
use station::units::{farads, henries, megahertz, short};

/// What a load is, by its mark.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
#[allow(missing_docs)] // The words say it.
pub(super) enum Kind {
    Coil,
    Capacitor,
    Trap,
    Resistor,
    Mixed,
}

impl Kind {
    /// The kind of a circuit: a coil beside a capacitor is a trap.
    pub fn of(circuit: &Circuit) -> Self {
        match circuit {
            Circuit::Resistor { .. } => Self::Resistor,
            Circuit::Coil { .. } => Self::Coil,
            Circuit::Capacitor { .. } => Self::Capacitor,
            Circuit::MeasuredTrap { .. } => Self::Trap,
            Circuit::Parallel(parts) => match parts.as_slice() {
                [Circuit::Coil { .. }, Circuit::Capacitor { .. }]
                | [Circuit::Capacitor { .. }, Circuit::Coil { .. }] => Self::Trap,
                [part] => Self::of(part),
                _ => Self::Mixed,
            },
            Circuit::Series(parts) => match parts.as_slice() {
                [part] => Self::of(part),
                _ => Self::Mixed,
            },
        }
    }

    /// Its name.
    pub fn words(self) -> &'static str {
        match self {
            Self::Coil => "coil",
            Self::Capacitor => "capacitor",
            Self::Trap => "trap",
            Self::Resistor => "resistor",
            Self::Mixed => "several parts",
        }
    }
}

/// The values of a circuit: "12 µH, Q 200", "7.050 MHz, 60.0 pF, Q 150".
pub(super) fn values(circuit: &Circuit) -> String {
    let quality = |q: &Option<f64>| q.map_or_else(String::new, |q| format!(", Q {}", short(q)));
    let each = |parts: &[Circuit], between: &str| parts.iter().map(values).collect::<Vec<_>>().join(between);
    match circuit {
        Circuit::Resistor { resistance_ohm } => format!("{} Ω", short(*resistance_ohm)),
        Circuit::Coil { inductance_h, q } => format!("{}{}", henries(*inductance_h), quality(q)),
        Circuit::Capacitor { capacitance_f, q } => format!("{}{}", farads(*capacitance_f), quality(q)),
        Circuit::MeasuredTrap { resonance_hz, capacitance_f, q } => {
            format!("{}, {}, Q {}", megahertz(*resonance_hz), farads(*capacitance_f), short(*q))
        }
        Circuit::Series(parts) => each(parts, " and then "),
        Circuit::Parallel(parts) => each(parts, " beside "),
    }
}

/// Half the length of a mark along the wire and across it, px.
const HALF: Vec2 = vec2(9.0, 5.5);

/// Draws a load on its wire; `along` is the wire's direction on the screen.
pub(super) fn mark(painter: &Painter, at: Pos2, along: Vec2, kind: Kind, ink: Color32, fill: Color32) {
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
        Kind::Coil => {
            painter.add(hull(HALF.x, fill));
            painter.extend([-6.0, -2.0, 2.0, 6.0].map(turn));
        }
        // Two plates with nothing between.
        Kind::Capacitor => {
            let gap = [(-2.5, -HALF.y), (2.5, -HALF.y), (2.5, HALF.y), (-2.5, HALF.y)];
            let gap = gap.map(|(x, y)| place(x, 1.2 * y)).to_vec();
            painter.add(Shape::convex_polygon(gap, fill, Stroke::NONE));
            for x in [-3.0, 3.0] {
                painter.line_segment([place(x, -1.3 * HALF.y), place(x, 1.3 * HALF.y)], bold);
            }
        }
        // Turns on one half, a plate's dark block on the other.
        Kind::Trap => {
            painter.add(hull(HALF.x, fill));
            painter.extend([-6.5, -3.0].map(turn));
            let corners = [(1.0, -HALF.y), (HALF.x, -HALF.y), (HALF.x, HALF.y), (1.0, HALF.y)];
            let block = corners.map(|(x, y)| place(x, y)).to_vec();
            painter.add(Shape::convex_polygon(block, ink, rim));
        }
        // A block, dark all over.
        Kind::Resistor => {
            painter.add(hull(HALF.x - 1.0, ink));
        }
        // An empty box, crossed by a bar.
        Kind::Mixed => {
            painter.add(hull(HALF.x, fill));
            painter.add(bar(0.0, rim));
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn coil() -> Circuit {
        Circuit::Coil { inductance_h: 8.5e-6, q: Some(200.0) }
    }

    fn capacitor() -> Circuit {
        Circuit::Capacitor { capacitance_f: 60e-12, q: None }
    }

    #[test]
    fn a_coil_beside_a_capacitor_is_a_trap_and_one_after_the_other_is_not() {
        assert_eq!(Kind::of(&Circuit::Parallel(vec![coil(), capacitor()])), Kind::Trap);
        assert_eq!(Kind::of(&Circuit::Parallel(vec![capacitor(), coil()])), Kind::Trap);
        assert_eq!(Kind::of(&Circuit::Series(vec![coil(), capacitor()])), Kind::Mixed);
        assert_eq!(Kind::of(&Circuit::Series(vec![coil()])), Kind::Coil);
    }

    #[test]
    fn values_stand_in_the_units_of_the_trade() {
        assert_eq!(values(&coil()), format!("{}, Q 200", henries(8.5e-6)));
        let trap = Circuit::MeasuredTrap { resonance_hz: 7.05e6, capacitance_f: 60e-12, q: 150.0 };
        assert!(
            values(&trap).starts_with("7.05") && values(&trap).ends_with("60.0 pF, Q 150"),
            "{}",
            values(&trap)
        );
        assert!(values(&Circuit::Parallel(vec![coil(), capacitor()])).contains(" beside "));
    }
}
