//! The plots of the band view.

use eframe::egui::{self, Rect, RichText, Role, Sense, TextStyle, UiBuilder, WidgetInfo};
use egui_plot::{
    AxisHints, GridInput, GridMark, HLine, LineStyle, MarkerShape, PlotPoint, PlotPoints, PlotUi, Points,
    VLine,
};
use sheet::tokens::{Ink, Pattern, Pen};
use station::units;

use super::curve::Patterned;
use super::layout::Plot;
use super::{BandState, Shown, model, sample};
use crate::explain::{self, Explain as _};
use crate::theme::color;
use sheet::swr_scale;

/// Thickness of the axes at the left, the same for all plots, so that they stand below each other.
const LEFT_AXIS: f32 = 42.0;
/// Least distance of labelled grid lines across and up, points of the screen.
const LEAST_POINTS: (f64, f64) = (56.0, 26.0);
/// What egui_plot takes as the least distance of any two grid lines, points.
const GRID_POINTS: f64 = 8.0;
/// Radius of the marks at the cursor and of channels.
const DOT: f32 = 3.0;

/// One curve on its way into a plot.
struct Curve<'a> {
    points: &'a [PlotPoint],
    ink: Ink,
    pattern: Pattern,
}

impl Plot {
    fn title(self) -> &'static str {
        match self {
            Self::Impedance => "R and X at the feedpoint, Ω",
            Self::AtFeedpoint => "SWR at the feedpoint",
            Self::Before => "SWR before the matching unit",
            Self::After => "SWR after the matching unit",
            Self::Volts => "volts along the line",
            Self::Amperes => "amperes along the line",
        }
    }

    fn sentence(self) -> &'static str {
        match self {
            Self::Impedance => {
                "Resistance and reactance of the wire at its feedpoint against frequency in MHz: where the reactance \
                 crosses zero the wire is resonant."
            }
            Self::AtFeedpoint => {
                "How the wire terminates each feed's line, on that line's nominal impedance: it says what the line \
                 must stand and lose."
            }
            Self::Before => {
                "What the transmitter sees through each feed with the matching unit left out; the dashed red line is \
                 its limit."
            }
            Self::After => "What the transmitter sees with the matching unit set for each frequency.",
            Self::Volts => {
                "Peak voltage between the conductors from the wire (left) to the transmitter, at the set power."
            }
            Self::Amperes => {
                "Peak current in each conductor from the wire (left) to the transmitter, at the set power."
            }
        }
    }

    fn is_along_line(self) -> bool {
        matches!(self, Self::Volts | Self::Amperes)
    }

    fn is_ratio(self) -> bool {
        matches!(self, Self::AtFeedpoint | Self::Before | Self::After)
    }

    fn curves<'a>(self, shown: &'a Shown<'a>) -> Vec<Curve<'a>> {
        let curves = shown.curves;
        if self == Self::Impedance {
            return vec![
                Curve { points: &curves.resistance, ink: Ink::Resistance, pattern: Pattern::Solid },
                Curve { points: &curves.reactance, ink: Ink::Reactance, pattern: Pattern::Dashed },
            ];
        }
        let of = |(feed, curves): (usize, &'a model::FeedCurves)| Curve {
            points: match self {
                Self::Before => &curves.before,
                Self::After => &curves.after,
                Self::Volts => &curves.volts,
                Self::Amperes => &curves.amperes,
                Self::AtFeedpoint | Self::Impedance => &curves.at_feedpoint,
            },
            ink: Ink::feed(feed),
            pattern: Pattern::feed(feed),
        };
        curves.feeds.iter().enumerate().map(of).collect()
    }

    fn ranges(self, shown: &Shown<'_>) -> ((f64, f64), (f64, f64)) {
        let curves = shown.curves;
        // Some air at the lower left, where the first labels of both axes meet.
        let along = (-0.06 * curves.longest, 1.02 * curves.longest);
        match self {
            Self::Impedance => (curves.mhz, curves.ohms),
            Self::AtFeedpoint | Self::Before | Self::After => (curves.mhz, (-0.03, 1.03)),
            Self::Volts => (along, (-0.05 * curves.tops.0, curves.tops.0)),
            Self::Amperes => (along, (-0.05 * curves.tops.1, curves.tops.1)),
        }
    }
}

/// Draws one plot with its title, and moves the cursor when it is pointed at.
pub(super) fn show(
    ui: &mut egui::Ui,
    shown: &Shown<'_>,
    plot: Plot,
    (title, place): (Rect, Rect),
    state: &mut BandState,
) {
    title_line(ui, shown, plot, title);
    let ground = shown.snapshot.ground;
    let small = TextStyle::Small.resolve(ui.style());
    let axis = |hints: AxisHints<'static>| {
        hints.tick_label_font(small.clone()).tick_label_color(color(Ink::Faint, ground))
    };
    let mut left = axis(AxisHints::new_y()).min_thickness(LEFT_AXIS).label_spacing(11.0..=16.0);
    left = if plot.is_ratio() {
        left.formatter(|mark, _| ratio_label(mark.value))
    } else {
        left.formatter(|mark, _| units::fixed(mark.value, decimals(mark.step_size)))
    };
    let suffix =
        if plot.is_along_line() { format!(" {}", shown.snapshot.units.symbol()) } else { String::new() };
    let bottom = axis(AxisHints::new_x())
        .label_spacing(30.0..=40.0)
        .formatter(move |mark, _| units::fixed(mark.value, decimals(mark.step_size)) + &suffix);
    let (x, y) = plot.ranges(shown);
    let mut canvas = egui_plot::Plot::new(("band plot", plot.title()))
        .width(place.width())
        .height(place.height())
        .custom_y_axes(vec![left])
        .custom_x_axes(vec![bottom])
        .grid_color(color(Ink::Rule, ground))
        .show_x(false)
        .show_y(false)
        .label_formatter(|_| None)
        .allow_drag(false)
        .allow_zoom(false)
        .allow_scroll(false)
        .allow_boxed_zoom(false)
        .allow_axis_zoom_drag(false)
        .allow_double_click_reset(false)
        .sense(Sense::hover())
        .cursor_color(egui::Color32::TRANSPARENT)
        .x_grid_spacer(|input| round_grid(&input, LEAST_POINTS.0));
    canvas = if plot.is_ratio() {
        canvas.y_grid_spacer(ratio_grid)
    } else {
        canvas.y_grid_spacer(|input| round_grid(&input, LEAST_POINTS.1))
    };
    let cursor = cursor(shown, plot, state);
    let drawn = ui
        .scope_builder(UiBuilder::new().max_rect(place), |ui| {
            canvas.show(ui, |plot_ui| {
                plot_ui.set_plot_bounds_x(x.0..=x.1);
                plot_ui.set_plot_bounds_y(y.0..=y.1);
                frame(plot_ui, shown, plot);
                let is_list = shown.is_list();
                for curve in plot.curves(shown) {
                    draw(plot_ui, shown, &curve, is_list && !plot.is_along_line());
                    mark(plot_ui, shown, &curve, cursor);
                }
                if let Some(x) = cursor {
                    let pen = egui::Stroke::new(Pen::Hairline.width(), color(Ink::Chosen, ground));
                    plot_ui.vline(VLine::new("cursor", x).stroke(pen).allow_hover(false));
                }
            })
        })
        .inner;
    drawn.response.widget_info(|| WidgetInfo::labeled(Role::Figure, true, plot.title()));
    if let Some(at) = drawn.response.hover_pos() {
        point(ui, shown, plot, drawn.transform.value_from_position(at).x, state);
    }
}

fn title_line(ui: &mut egui::Ui, shown: &Shown<'_>, plot: Plot, place: Rect) {
    let within = UiBuilder::new()
        .id_salt(("title", plot.title()))
        .max_rect(place)
        .layout(egui::Layout::left_to_right(egui::Align::Center));
    ui.scope_builder(within, |ui| {
        ui.spacing_mut().item_spacing.x = 6.0;
        let text = RichText::new(plot.title()).color(color(Ink::Text, shown.snapshot.ground));
        let label = egui::Label::new(text).truncate().sense(Sense::hover());
        let _ = ui.add(label).explain(plot.sentence());
        if plot.is_along_line() && ui.available_width() > 110.0 {
            let at = format!("at {}", units::megahertz(shown.band.middle_point().frequency_hz));
            let at = RichText::new(at).small().color(color(Ink::Faint, shown.snapshot.ground));
            let _ = ui
                .label(at)
                .explain("The middle of the band: the frequency that the lanes and feed paths show.");
        }
        if plot == Plot::Impedance && ui.available_width() > 90.0 {
            for (letter, ink, pattern) in
                [("R", Ink::Resistance, Pattern::Solid), ("X", Ink::Reactance, Pattern::Dashed)]
            {
                sample(ui, shown.snapshot, ink, pattern);
                ui.label(RichText::new(letter).small().color(color(ink, shown.snapshot.ground)));
            }
        }
    });
}

/// Where the cursor stands in a plot's own axis.
fn cursor(shown: &Shown<'_>, plot: Plot, state: &BandState) -> Option<f64> {
    if plot.is_along_line() {
        return state
            .along_m
            .map(|m| shown.snapshot.units.from_metres(m))
            .filter(|x| *x <= shown.curves.longest);
    }
    Some(shown.cursor_point(state).frequency_hz / 1e6)
}

/// The pointer is over a plot: the cursor of all plots goes there, and the status line says what stands there.
fn point(ui: &egui::Ui, shown: &Shown<'_>, plot: Plot, x: f64, state: &mut BandState) {
    if plot.is_along_line() {
        let along_m = shown.snapshot.units.to_metres(x.clamp(0.0, shown.curves.longest));
        if state.along_m != Some(along_m) {
            state.along_m = Some(along_m);
            ui.request_repaint();
        }
        return;
    }
    let index = model::nearest(shown.band, 1e6 * x);
    let point = &shown.band.points[index];
    explain::say(ui.ctx(), &model::sentence(point, &shown.report.feed_names));
    if state.cursor_hz != Some(point.frequency_hz) {
        state.cursor_hz = Some(point.frequency_hz);
        // Plots that were drawn before this one follow in the next frame.
        ui.request_repaint();
    }
}

/// Band edges, the transmitter's limit, the line of zero reactance.
fn frame(plot_ui: &mut PlotUi<'_>, shown: &Shown<'_>, plot: Plot) {
    let ground = shown.snapshot.ground;
    let pen = |ink| egui::Stroke::new(Pen::Hairline.width(), color(ink, ground));
    if !plot.is_along_line() {
        for edge_hz in [shown.band.low_hz, shown.band.high_hz] {
            let edge = VLine::new("band edge", edge_hz / 1e6).stroke(pen(Ink::Faint)).allow_hover(false);
            plot_ui.vline(edge);
        }
    }
    if matches!(plot, Plot::Before | Plot::After) {
        let limit = swr_scale::height(shown.snapshot.plan.transmitter.swr_limit);
        let line = HLine::new("transmitter's limit", limit)
            .stroke(egui::Stroke::new(Pen::Fine.width(), color(Ink::Limit, ground)))
            .style(LineStyle::Dashed { length: 4.0 })
            .allow_hover(false);
        plot_ui.hline(line);
    }
    if plot == Plot::Impedance {
        plot_ui.hline(HLine::new("zero", 0.0).stroke(pen(Ink::Faint)).allow_hover(false));
    }
}

fn draw<'a>(plot_ui: &mut PlotUi<'a>, shown: &Shown<'_>, curve: &Curve<'a>, is_list: bool) {
    let ink = color(curve.ink, shown.snapshot.ground);
    if is_list || curve.points.len() < 2 {
        let dots =
            Points::new("channels", curve.points).shape(shape(curve.pattern)).radius(DOT + 1.0).color(ink);
        plot_ui.points(dots.allow_hover(false));
        return;
    }
    let stroke = egui::Stroke::new(Pen::Curve.width(), ink);
    plot_ui.add(Patterned::new(curve.points, curve.pattern, stroke));
}

/// A dot where the cursor crosses a curve.
fn mark<'a>(plot_ui: &mut PlotUi<'a>, shown: &Shown<'_>, curve: &Curve<'a>, cursor: Option<f64>) {
    let Some(x) = cursor else {
        return;
    };
    let Some(at) = model::crossing(curve.points, x) else {
        return;
    };
    let dot =
        Points::new("at the cursor", PlotPoints::Owned(vec![at])).shape(shape(curve.pattern)).radius(DOT);
    plot_ui.points(dot.color(color(curve.ink, shown.snapshot.ground)).allow_hover(false));
}

fn shape(pattern: Pattern) -> MarkerShape {
    match pattern {
        Pattern::Solid => MarkerShape::Circle,
        Pattern::Dashed => MarkerShape::Square,
        Pattern::Dotted => MarkerShape::Diamond,
    }
}

/// Grid lines at ratios that people read; a label hides where the one below is too close.
fn ratio_grid(_: GridInput) -> Vec<GridMark> {
    let mut before = -swr_scale::height(1.5);
    let ratios = swr_scale::GRID.into_iter().chain([f64::INFINITY]);
    let mark = |ratio: f64| {
        let value = swr_scale::height(ratio);
        let step_size = value - before;
        before = value;
        GridMark { value, step_size }
    };
    ratios.map(mark).collect()
}

/// Grid lines at 1, 2 or 5 times a power of ten, far enough apart for their labels.
fn round_grid(input: &GridInput, least_points: f64) -> Vec<GridMark> {
    let least = input.base_step_size / GRID_POINTS * least_points;
    if !least.is_finite() || least <= 0.0 {
        return Vec::new();
    }
    let power = 10f64.powf(least.log10().floor());
    let step_size =
        [1.0, 2.0, 5.0].into_iter().map(|m| m * power).find(|s| *s >= least).unwrap_or(10.0 * power);
    let (first, last) =
        ((input.bounds.0 / step_size).ceil() as i64, (input.bounds.1 / step_size).floor() as i64);
    (first..=last).map(|index| GridMark { value: index as f64 * step_size, step_size }).collect()
}

fn ratio_label(height: f64) -> String {
    let ratio = swr_scale::ratio(height);
    match ratio {
        r if r > 1e4 => "∞".to_owned(),
        r if (r - 1.5).abs() < 0.01 => "1.5".to_owned(),
        r => units::fixed(r, 0),
    }
}

/// Decimals that tell neighbouring grid lines apart.
fn decimals(step: f64) -> usize {
    (-step.log10()).ceil().clamp(0.0, 4.0) as usize
}
