//! What is drawn, before anyone draws it: lines, areas and text in millimetres, y down, colours and widths by token.
//! The PDF writer, the SVG writer and the window's preview paint the same scene.

use crate::fonts;
use crate::tokens::{Ink, Stroke, TextStyle};

/// A place on the sheet, mm from its left and top edge.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Spot {
    /// To the right.
    pub x_mm: f64,
    /// Down.
    pub y_mm: f64,
}

impl Spot {
    /// A spot from its coordinates in millimetres.
    #[must_use]
    pub fn new(x_mm: f64, y_mm: f64) -> Self {
        Self { x_mm, y_mm }
    }
}

/// An upright rectangle, mm.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Frame {
    /// Left edge.
    pub left_mm: f64,
    /// Top edge.
    pub top_mm: f64,
    /// Width.
    pub width_mm: f64,
    /// Height.
    pub height_mm: f64,
}

impl Frame {
    /// Right edge, mm.
    #[must_use]
    pub fn right_mm(self) -> f64 {
        self.left_mm + self.width_mm
    }

    /// Bottom edge, mm.
    #[must_use]
    pub fn bottom_mm(self) -> f64 {
        self.top_mm + self.height_mm
    }

    /// Its corners, clockwise from the top left.
    #[must_use]
    pub fn corners(self) -> [Spot; 4] {
        [
            Spot::new(self.left_mm, self.top_mm),
            Spot::new(self.right_mm(), self.top_mm),
            Spot::new(self.right_mm(), self.bottom_mm()),
            Spot::new(self.left_mm, self.bottom_mm()),
        ]
    }
}

/// One page, or one drawing.
#[derive(Clone, Debug, PartialEq)]
pub struct Scene {
    /// Width, mm.
    pub width_mm: f64,
    /// Height, mm.
    pub height_mm: f64,
    /// What is on it; later items lie on top.
    pub items: Vec<Item>,
}

/// Something drawn.
#[derive(Clone, Debug, PartialEq)]
pub enum Item {
    /// A line through two or more spots.
    Line {
        /// Its corners.
        points: Vec<Spot>,
        /// Width and dashes.
        stroke: Stroke,
        /// Colour.
        ink: Ink,
    },
    /// A closed area.
    Area {
        /// Its corners.
        points: Vec<Spot>,
        /// Colour of the area.
        fill: Ink,
        /// Its outline, if any.
        outline: Option<(Stroke, Ink)>,
    },
    /// A line of text.
    Text(Text),
}

/// Which part of a text stands at its spot.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
#[allow(missing_docs)] // The words say it.
pub enum Anchor {
    Start,
    Middle,
    End,
}

/// A line of text on its base line.
#[derive(Clone, Debug, PartialEq)]
pub struct Text {
    /// Where the anchor stands on the base line.
    pub at: Spot,
    /// One line, without control characters.
    pub text: String,
    /// Size and weight.
    pub style: TextStyle,
    /// What stands at the spot.
    pub anchor: Anchor,
    /// Colour.
    pub ink: Ink,
    /// Turned clockwise about the spot, degrees.
    pub turn_deg: f64,
}

impl Text {
    /// Left-aligned upright text in the main ink.
    #[must_use]
    pub fn new(x_mm: f64, baseline_mm: f64, style: TextStyle, text: impl Into<String>) -> Self {
        Self {
            at: Spot::new(x_mm, baseline_mm),
            text: text.into(),
            style,
            anchor: Anchor::Start,
            ink: Ink::Text,
            turn_deg: 0.0,
        }
    }

    /// The same in another ink.
    #[must_use]
    pub fn ink(self, ink: Ink) -> Self {
        Self { ink, ..self }
    }

    /// The same with another anchor.
    #[must_use]
    pub fn anchor(self, anchor: Anchor) -> Self {
        Self { anchor, ..self }
    }

    /// The same turned about its spot.
    #[must_use]
    pub fn turned(self, turn_deg: f64) -> Self {
        Self { turn_deg, ..self }
    }

    /// Width, mm.
    #[must_use]
    pub fn width_mm(&self) -> f64 {
        fonts::width_mm(self.style, &self.text)
    }

    /// How far the text's beginning lies before its spot, mm.
    #[must_use]
    pub fn lead_mm(&self) -> f64 {
        match self.anchor {
            Anchor::Start => 0.0,
            Anchor::Middle => self.width_mm() / 2.0,
            Anchor::End => self.width_mm(),
        }
    }

    /// The corners of the box that its letters keep within, from the top left of the unturned text, clockwise.
    #[must_use]
    pub fn corners(&self) -> [Spot; 4] {
        let (sin, cos) = self.turn_deg.to_radians().sin_cos();
        let (left, right) = (-self.lead_mm(), self.width_mm() - self.lead_mm());
        let (top, bottom) = (-fonts::ASCENT * self.style.size_mm(), fonts::DESCENT * self.style.size_mm());
        [(left, top), (right, top), (right, bottom), (left, bottom)]
            .map(|(x, y)| Spot::new(self.at.x_mm + x * cos - y * sin, self.at.y_mm + x * sin + y * cos))
    }
}

impl Item {
    /// A straight line.
    #[must_use]
    pub fn line(from: Spot, to: Spot, stroke: Stroke, ink: Ink) -> Self {
        Self::Line { points: vec![from, to], stroke, ink }
    }

    /// A filled rectangle.
    #[must_use]
    pub fn area(frame: Frame, fill: Ink) -> Self {
        Self::Area { points: frame.corners().to_vec(), fill, outline: None }
    }

    /// An empty box to write in.
    #[must_use]
    pub fn writing_box(frame: Frame) -> Self {
        let outline = Some((Stroke::Rule, Ink::Faint));
        Self::Area { points: frame.corners().to_vec(), fill: Ink::Background, outline }
    }

    /// A filled disc.
    #[must_use]
    pub fn disc(centre: Spot, radius_mm: f64, fill: Ink, outline: Option<(Stroke, Ink)>) -> Self {
        // 24 corners: on paper the chord errs by less than a hundredth of the radius.
        let points = (0..24)
            .map(|i| {
                let (sin, cos) = (f64::from(i) * std::f64::consts::TAU / 24.0).sin_cos();
                Spot::new(centre.x_mm + radius_mm * cos, centre.y_mm + radius_mm * sin)
            })
            .collect();
        Self::Area { points, fill, outline }
    }

    /// The same, moved.
    #[must_use]
    pub fn moved(self, right_mm: f64, down_mm: f64) -> Self {
        let shift = |p: Spot| Spot::new(p.x_mm + right_mm, p.y_mm + down_mm);
        match self {
            Self::Line { points, stroke, ink } => {
                Self::Line { points: points.into_iter().map(shift).collect(), stroke, ink }
            }
            Self::Area { points, fill, outline } => {
                Self::Area { points: points.into_iter().map(shift).collect(), fill, outline }
            }
            Self::Text(text) => Self::Text(Text { at: shift(text.at), ..text }),
        }
    }
}

impl Scene {
    /// An empty scene.
    #[must_use]
    pub fn new(width_mm: f64, height_mm: f64) -> Self {
        Self { width_mm, height_mm, items: Vec::new() }
    }

    /// Its texts.
    pub fn texts(&self) -> impl Iterator<Item = &Text> {
        self.items.iter().filter_map(|item| match item {
            Item::Text(text) => Some(text),
            _ => None,
        })
    }
}

/// Whether two quadrangles share more than their edges (separating axis theorem).
#[must_use]
pub fn overlap(a: &[Spot; 4], b: &[Spot; 4]) -> bool {
    // Nearer than this is touching, mm.
    const TOUCH_MM: f64 = 1e-6;
    // Most lie apart in x or y, which costs no root.
    let upright = [(1.0, 0.0), (0.0, 1.0)];
    !upright.into_iter().chain(axes(a)).chain(axes(b)).any(|(x, y)| {
        let (a_low, a_high) = shadow(a, x, y);
        let (b_low, b_high) = shadow(b, x, y);
        a_high <= b_low + TOUCH_MM || b_high <= a_low + TOUCH_MM
    })
}

/// Normals of the first two edges of a quadrangle with right angles.
fn axes(corners: &[Spot; 4]) -> impl Iterator<Item = (f64, f64)> {
    let edge = |from: Spot, to: Spot| {
        let (x, y) = (to.x_mm - from.x_mm, to.y_mm - from.y_mm);
        let length = x.hypot(y).max(f64::MIN_POSITIVE);
        (-y / length, x / length)
    };
    [edge(corners[0], corners[1]), edge(corners[1], corners[2])].into_iter()
}

fn shadow(corners: &[Spot; 4], x: f64, y: f64) -> (f64, f64) {
    corners.iter().fold((f64::INFINITY, f64::NEG_INFINITY), |(low, high), p| {
        let along = p.x_mm * x + p.y_mm * y;
        (low.min(along), high.max(along))
    })
}
