//! A curve of a plot in the line pattern of its feed, the same as in the lanes.

use std::ops::RangeInclusive;

use eframe::egui::{Color32, Shape, Stroke, Ui};
use egui_plot::{PlotBounds, PlotGeometry, PlotItem, PlotItemBase, PlotPoint, PlotTransform};
use sheet::tokens::Pattern;

use crate::views::marks;

/// A curve over borrowed points.
pub(super) struct Patterned<'a> {
    base: PlotItemBase,
    points: &'a [PlotPoint],
    pattern: Pattern,
    stroke: Stroke,
}

impl<'a> Patterned<'a> {
    /// A curve that does not answer to the pointer: the read-out does.
    pub fn new(points: &'a [PlotPoint], pattern: Pattern, stroke: Stroke) -> Self {
        Self { base: PlotItemBase::new("curve".to_owned()), points, pattern, stroke }
    }
}

impl PlotItem for Patterned<'_> {
    fn shapes(&self, _ui: &Ui, transform: &PlotTransform, shapes: &mut Vec<Shape>) {
        let points = self.points.iter().map(|point| transform.position_from_point(point)).collect();
        marks::patterned(points, self.pattern, self.stroke, shapes);
    }

    fn initialize(&mut self, _x_range: RangeInclusive<f64>) {}

    fn color(&self) -> Color32 {
        self.stroke.color
    }

    fn allow_hover(&self) -> bool {
        false
    }

    fn geometry(&self) -> PlotGeometry<'_> {
        PlotGeometry::Points(self.points)
    }

    fn bounds(&self) -> PlotBounds {
        let mut bounds = PlotBounds::NOTHING;
        self.points.iter().for_each(|point| bounds.extend_with(point));
        bounds
    }

    fn base(&self) -> &PlotItemBase {
        &self.base
    }

    fn base_mut(&mut self) -> &mut PlotItemBase {
        &mut self.base
    }
}
