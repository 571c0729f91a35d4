//! How the design tokens look in egui: colours, widget visuals, text sizes and fonts. The one place of this crate
//! that makes a colour.

use std::sync::Arc;

use eframe::egui::{
    self, Color32, CornerRadius, FontData, FontDefinitions, FontFamily, FontId, Margin, Shadow, Stroke,
    Style, TextStyle, Theme as EguiTheme, vec2,
};
use sheet::tokens::{Ground, Ink};

use crate::command::Theme;

/// A line one step above a hairline: outlines of what is chosen or has the focus.
const FOCUS_STROKE: f32 = 2.0;
/// Hairlines between areas and around boxes.
const HAIRLINE: f32 = 1.0;
/// Corners of controls and boxes.
const CORNER: CornerRadius = CornerRadius::same(4);
/// The share of an ink in a wash behind text.
const WASH: f32 = 0.14;

const REGULAR: &str = "sheet regular";
const BOLD: &str = "sheet bold";

/// The colour of an ink on a ground.
#[must_use]
#[expect(clippy::disallowed_methods)] // The one place.
pub fn color(ink: Ink, ground: Ground) -> Color32 {
    let [r, g, b] = ink.rgb(ground);
    Color32::from_rgb(r, g, b)
}

/// The colour of an ink with an opacity from 0 (nothing) to 1.
#[must_use]
pub fn color_with_opacity(ink: Ink, ground: Ground, opacity: f32) -> Color32 {
    color(ink, ground).gamma_multiply(opacity)
}

/// A quiet opaque mixture of an ink and the background, to lie behind text.
#[must_use]
pub fn wash(ink: Ink, ground: Ground) -> Color32 {
    color(Ink::Background, ground).lerp_to_gamma(color(ink, ground), WASH)
}

/// The thinnest line that separates.
#[must_use]
pub fn hairline(ink: Ink, ground: Ground) -> Stroke {
    Stroke::new(HAIRLINE, color(ink, ground))
}

/// The ground that a ui is drawn on now.
#[must_use]
pub fn ground_of(visuals: &egui::Visuals) -> Ground {
    if visuals.dark_mode { Ground::Dark } else { Ground::Light }
}

/// Hangs fonts, both styles and the wish for light or dark into a context.
pub fn install(ctx: &egui::Context) {
    ctx.set_fonts(fonts());
    ctx.set_style_of(EguiTheme::Light, style(Ground::Light));
    ctx.set_style_of(EguiTheme::Dark, style(Ground::Dark));
}

/// Tells egui which of the two styles is wanted.
pub fn choose(ctx: &egui::Context, theme: Theme) {
    let wanted = match theme {
        Theme::Desktop => egui::ThemePreference::System,
        Theme::Light => egui::ThemePreference::Light,
        Theme::Dark => egui::ThemePreference::Dark,
    };
    if ctx.options(|options| options.theme_preference) != wanted {
        ctx.set_theme(wanted);
    }
}

/// The sheet's two fonts, so that screen and paper read alike and every sign of the trade (Ω, λ, ±, →) is there.
fn fonts() -> FontDefinitions {
    let mut fonts = FontDefinitions::default();
    for (name, bytes) in [(REGULAR, sheet::fonts::REGULAR), (BOLD, sheet::fonts::BOLD)] {
        fonts.font_data.insert(name.to_owned(), Arc::new(FontData::from_static(bytes)));
    }
    fonts.families.entry(FontFamily::Proportional).or_default().insert(0, REGULAR.to_owned());
    fonts.families.insert(bold(), vec![BOLD.to_owned(), REGULAR.to_owned()]);
    if let Some(family) = fonts.families.get_mut(&FontFamily::Monospace) {
        family.push(REGULAR.to_owned());
    }
    fonts
}

/// The family of bold text.
#[must_use]
pub fn bold() -> FontFamily {
    FontFamily::Name("bold".into())
}

/// Spacing, text sizes and colours on one ground.
fn style(ground: Ground) -> Style {
    let theme = if ground == Ground::Dark { EguiTheme::Dark } else { EguiTheme::Light };
    let mut style = theme.default_style();
    style.text_styles = [
        (TextStyle::Heading, FontId::new(16.0, bold())),
        (TextStyle::Body, FontId::proportional(13.5)),
        (TextStyle::Button, FontId::proportional(13.5)),
        (TextStyle::Small, FontId::proportional(11.5)),
        (TextStyle::Monospace, FontId::monospace(12.5)),
    ]
    .into();
    let spacing = &mut style.spacing;
    spacing.item_spacing = vec2(8.0, 5.0);
    spacing.button_padding = vec2(8.0, 3.0);
    spacing.interact_size = vec2(36.0, 22.0);
    spacing.menu_margin = Margin::same(6);
    spacing.window_margin = Margin::same(14);
    spacing.tooltip_width = 360.0;
    style.animation_time = 0.08;
    style.interaction.tooltip_delay = 0.35;
    style.visuals = visuals(ground);
    style
}

/// Colours of panels and widgets.
fn visuals(ground: Ground) -> egui::Visuals {
    let ink = |ink| color(ink, ground);
    let mut visuals = if ground == Ground::Dark { egui::Visuals::dark() } else { egui::Visuals::light() };
    visuals.panel_fill = ink(Ink::Background);
    visuals.window_fill = ink(Ink::Background);
    visuals.faint_bg_color = ink(Ink::Panel);
    visuals.extreme_bg_color = ink(Ink::Background);
    visuals.code_bg_color = ink(Ink::Panel);
    visuals.weak_text_color = Some(ink(Ink::Faint));
    visuals.hyperlink_color = ink(Ink::Chosen);
    visuals.warn_fg_color = ink(Ink::Caution);
    visuals.error_fg_color = ink(Ink::OutOfRange);
    visuals.window_stroke = Stroke::new(HAIRLINE, ink(Ink::Rule));
    visuals.window_corner_radius = CornerRadius::same(6);
    visuals.menu_corner_radius = CORNER;
    visuals.window_highlight_topmost = false;
    let shade = ink(if ground == Ground::Dark { Ink::Background } else { Ink::Text });
    let shadow = |blur| Shadow { offset: [0, 4], blur, spread: 0, color: shade.gamma_multiply(0.22) };
    visuals.window_shadow = shadow(24);
    visuals.popup_shadow = shadow(12);
    visuals.selection.bg_fill = color(Ink::Background, ground)
        .lerp_to_gamma(ink(Ink::Chosen), if visuals.dark_mode { 0.38 } else { 0.24 });
    visuals.selection.stroke = Stroke::new(1.5, ink(Ink::Chosen));
    visuals.text_cursor.stroke = Stroke::new(FOCUS_STROKE, ink(Ink::Chosen));

    let widgets = &mut visuals.widgets;
    for (state, fill, edge, width) in [
        (&mut widgets.noninteractive, Ink::Panel, Ink::Rule, HAIRLINE),
        (&mut widgets.inactive, Ink::Raised, Ink::Raised, HAIRLINE),
        (&mut widgets.hovered, Ink::Raised, Ink::Faint, HAIRLINE),
        // egui draws what is pressed and what has the keyboard alike: this is the visible focus.
        (&mut widgets.active, Ink::Raised, Ink::Chosen, FOCUS_STROKE),
        (&mut widgets.open, Ink::Raised, Ink::Rule, HAIRLINE),
    ] {
        state.bg_fill = ink(fill);
        state.weak_bg_fill = ink(fill);
        state.bg_stroke = Stroke::new(width, ink(edge));
        state.fg_stroke = Stroke::new(HAIRLINE, ink(Ink::Text));
        state.corner_radius = CORNER;
        state.expansion = 0.0;
    }
    visuals
}

#[cfg(test)]
mod tests {
    use super::*;

    /// Relative luminance and contrast as in WCAG 2 (from memory).
    fn contrast(a: Color32, b: Color32) -> f32 {
        let luminance = |c: Color32| {
            let [r, g, b, _] = egui::Rgba::from(c).to_array();
            0.2126 * r + 0.7152 * g + 0.0722 * b
        };
        let (a, b) = (luminance(a) + 0.05, luminance(b) + 0.05);
        a.max(b) / a.min(b)
    }

    /// Inks that words are written in, and what lies behind them.
    const WRITTEN: [Ink; 15] = [
        Ink::Text,
        Ink::Faint,
        Ink::Chosen,
        Ink::Current,
        Ink::Voltage,
        Ink::FeedA,
        Ink::FeedB,
        Ink::FeedC,
        Ink::Reactance,
        Ink::Limit,
        Ink::Works,
        Ink::WorksWithUnit,
        Ink::TooLossy,
        Ink::Overstressed,
        Ink::OutOfRange,
    ];

    #[test]
    fn words_can_be_read_on_every_ground() {
        // 4.5 is WCAG's bar for body text (from memory).
        for ground in [Ground::Light, Ground::Dark] {
            for ink in WRITTEN {
                let ratio = contrast(color(ink, ground), color(Ink::Background, ground));
                assert!(ratio >= 4.5, "{ink:?} on {ground:?}: {ratio:.2}");
            }
            for ink in
                [Ink::Text, Ink::Faint, Ink::Works, Ink::WorksWithUnit, Ink::OutOfRange, Ink::Overstressed]
            {
                let ratio = contrast(color(ink, ground), color(Ink::Panel, ground));
                assert!(ratio >= 4.5, "{ink:?} on panels, {ground:?}: {ratio:.2}");
            }
        }
    }
}
