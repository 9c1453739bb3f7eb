//! The look of the window: fonts, sizes and every colour, in a light and a dark version.
//! No other file of the desk names a colour. What is drawn where is not decided here.

use crate::export::fonts;
use crate::workspace;
use egui::{
    Color32, Context, CornerRadius, FontData, FontDefinitions, FontFamily, FontId, Margin, RichText, Shadow,
    Stroke, Style, TextStyle, Theme, Ui, Visuals, style::WidgetVisuals, vec2,
};
use std::sync::Arc;

/// Side of the finest text, in points.
pub const SMALL_POINTS: f32 = 11.0;
/// Side of ordinary text, in points.
pub const BODY_POINTS: f32 = 13.0;
/// Side of a panel's heading, in points.
pub const HEADING_POINTS: f32 = 15.0;
/// Side of the strip's headline figure, in points.
pub const HEADLINE_POINTS: f32 = 20.0;

/// Room for a scroll bar beside what it scrolls.
pub const SCROLL_POINTS: f32 = 10.0;

/// Colours by what they stand for. Losses are vermilion, gains blue, everything neutral slate; the three
/// differ in lightness too, so that they part under every common kind of colour blindness.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Palette {
    /// Behind all panels.
    pub window: Color32,
    /// Of a panel.
    pub panel: Color32,
    /// Of a field or a plot's inside.
    pub field: Color32,
    /// Under the pointer.
    pub hover: Color32,
    /// Of a chosen row.
    pub chosen: Color32,
    /// Hairlines round and between things.
    pub hairline: Color32,
    /// Grid of a chart.
    pub grid: Color32,
    /// Text.
    pub ink: Color32,
    /// Text that explains other text.
    pub soft_ink: Color32,
    /// The reading line, and what can be pressed.
    pub accent: Color32,
    /// Losses, drawdowns, faults.
    pub loss: Color32,
    /// Gains.
    pub gain: Color32,
    /// What is neither: bands, distributions.
    pub neutral: Color32,
    /// A correlation of +1.
    pub together: Color32,
    /// A correlation of -1.
    pub apart: Color32,
}

/// On paper-like ground.
const LIGHT: Palette = Palette {
    window: Color32::from_rgb(0xEF, 0xF0, 0xEE),
    panel: Color32::from_rgb(0xFF, 0xFF, 0xFF),
    field: Color32::from_rgb(0xF7, 0xF8, 0xF7),
    hover: Color32::from_rgb(0xEE, 0xEC, 0xF6),
    chosen: Color32::from_rgb(0xE4, 0xDF, 0xF4),
    hairline: Color32::from_rgb(0xD8, 0xDB, 0xDE),
    grid: Color32::from_rgb(0xE9, 0xEB, 0xED),
    ink: Color32::from_rgb(0x1C, 0x22, 0x2B),
    soft_ink: Color32::from_rgb(0x5A, 0x65, 0x73),
    accent: Color32::from_rgb(0x55, 0x3C, 0x9A),
    loss: Color32::from_rgb(0xC2, 0x4E, 0x00),
    gain: Color32::from_rgb(0x00, 0x6A, 0xA8),
    neutral: Color32::from_rgb(0x4F, 0x6B, 0x82),
    together: Color32::from_rgb(0x7B, 0x5F, 0xB8),
    apart: Color32::from_rgb(0x2F, 0x8F, 0x77),
};

/// On dark ground.
const DARK: Palette = Palette {
    window: Color32::from_rgb(0x12, 0x15, 0x1A),
    panel: Color32::from_rgb(0x1B, 0x1F, 0x27),
    field: Color32::from_rgb(0x16, 0x1A, 0x20),
    hover: Color32::from_rgb(0x2A, 0x29, 0x3A),
    chosen: Color32::from_rgb(0x37, 0x32, 0x52),
    hairline: Color32::from_rgb(0x34, 0x3B, 0x46),
    grid: Color32::from_rgb(0x27, 0x2D, 0x36),
    ink: Color32::from_rgb(0xE7, 0xEA, 0xEF),
    soft_ink: Color32::from_rgb(0x9C, 0xA7, 0xB5),
    accent: Color32::from_rgb(0xB9, 0xA7, 0xF2),
    loss: Color32::from_rgb(0xF0, 0x8C, 0x4A),
    gain: Color32::from_rgb(0x5C, 0xB3, 0xE8),
    neutral: Color32::from_rgb(0x8C, 0xA8, 0xBF),
    together: Color32::from_rgb(0x93, 0x7B, 0xD6),
    apart: Color32::from_rgb(0x3F, 0xA5, 0x8A),
};

impl Palette {
    /// The one in use.
    pub fn of(ui: &Ui) -> &'static Self {
        if ui.visuals().dark_mode { &DARK } else { &LIGHT }
    }

    /// Ground of a correlation's cell: from the panel's colour at 0 to `together` at 1 and `apart` at -1.
    pub fn correlation(&self, value: f64) -> Color32 {
        let end = if value < 0.0 { self.apart } else { self.together };
        self.panel.lerp_to_gamma(end, (value.abs().min(1.0) * 0.85) as f32)
    }

    /// Text on the ground of a correlation's cell.
    pub fn on_correlation(&self, value: f64) -> Color32 {
        let ground = self.correlation(value).intensity();
        let apart = |ink: &Color32| (ink.intensity() - ground).abs();
        if apart(&self.panel) > apart(&self.ink) { self.panel } else { self.ink }
    }

    /// A gain or a loss of that sign; text colour at 0.
    pub fn change(&self, change_money: f64) -> Color32 {
        match change_money {
            up if up > 0.0 => self.gain,
            down if down < 0.0 => self.loss,
            _ => self.ink,
        }
    }
}

/// Sets fonts, sizes and both versions of the look; needed once.
pub fn install(ctx: &Context) {
    ctx.set_fonts(shipped_fonts());
    ctx.set_style_of(Theme::Light, style(Style { visuals: Visuals::light(), ..Style::default() }, &LIGHT));
    ctx.set_style_of(Theme::Dark, style(Style { visuals: Visuals::dark(), ..Style::default() }, &DARK));
}

/// Wears a theme from the next frame on; does nothing when it is worn already.
pub fn wear(ctx: &Context, theme: workspace::Theme) {
    let wanted = match theme {
        workspace::Theme::Light => Theme::Light,
        workspace::Theme::Dark => Theme::Dark,
    };
    if ctx.theme() != wanted {
        ctx.set_theme(wanted);
    }
}

/// Text in the heavier cut.
pub fn strong(text: impl Into<String>) -> RichText {
    RichText::new(text).family(heavy())
}

/// A panel's heading.
pub fn heading(text: impl Into<String>) -> RichText {
    strong(text).size(HEADING_POINTS)
}

/// A section's title over a hairline.
pub fn section_ui(ui: &mut Ui, title: &str) {
    ui.add_space(6.0);
    ui.separator();
    ui.label(strong(title));
}

/// Text that explains other text: smaller and softer.
pub fn soft(ui: &Ui, text: impl Into<String>) -> RichText {
    RichText::new(text).size(SMALL_POINTS).color(Palette::of(ui).soft_ink)
}

/// Makes fields drawn in `ui` stand as plain text until they are pointed at.
pub fn quiet_fields(ui: &mut Ui) {
    let resting = &mut ui.visuals_mut().widgets.inactive;
    resting.weak_bg_fill = Color32::TRANSPARENT;
    resting.bg_stroke = Stroke::NONE;
    ui.spacing_mut().button_padding.x = 3.0;
}

/// The heavier cut of the shipped font.
pub fn heavy() -> FontFamily {
    FontFamily::Name("heavy".into())
}

/// The shipped font in both cuts, for everything; its digits all have one width.
fn shipped_fonts() -> FontDefinitions {
    let mut shipped = FontDefinitions::empty();
    for (name, bytes, families) in [
        ("regular", fonts::REGULAR, [FontFamily::Proportional, FontFamily::Monospace].as_slice()),
        ("heavy", fonts::SEMIBOLD, &[heavy()]),
    ] {
        shipped.font_data.insert(name.to_owned(), Arc::new(FontData::from_static(bytes)));
        for family in families {
            shipped.families.insert(family.clone(), vec![name.to_owned()]);
        }
    }
    shipped
}

/// Sizes and distances are the same in both versions.
fn style(mut style: Style, palette: &Palette) -> Style {
    style.text_styles = [
        (TextStyle::Small, FontId::new(SMALL_POINTS, FontFamily::Proportional)),
        (TextStyle::Body, FontId::new(BODY_POINTS, FontFamily::Proportional)),
        (TextStyle::Monospace, FontId::new(BODY_POINTS, FontFamily::Monospace)),
        (TextStyle::Button, FontId::new(BODY_POINTS, FontFamily::Proportional)),
        (TextStyle::Heading, FontId::new(HEADING_POINTS, heavy())),
    ]
    .into();
    style.drag_value_text_style = TextStyle::Body;
    style.spacing.item_spacing = vec2(8.0, 4.0);
    style.spacing.button_padding = vec2(8.0, 3.0);
    style.spacing.interact_size = vec2(24.0, 22.0);
    style.spacing.menu_margin = Margin::same(8);
    style.spacing.tooltip_width = 320.0;
    // Labels that can be selected swallow the clicks meant for the row they stand in.
    style.interaction.selectable_labels = false;
    style.interaction.tooltip_delay = 0.4;
    style.animation_time = 0.06;
    style.explanation_tooltips = false;
    style.visuals = visuals(style.visuals, palette);
    style
}

fn visuals(mut visuals: Visuals, palette: &Palette) -> Visuals {
    visuals.override_text_color = None;
    visuals.weak_text_color = Some(palette.soft_ink);
    visuals.hyperlink_color = palette.accent;
    visuals.faint_bg_color = palette.field;
    visuals.extreme_bg_color = palette.field;
    visuals.text_edit_bg_color = Some(palette.field);
    visuals.code_bg_color = palette.field;
    visuals.warn_fg_color = palette.loss;
    visuals.error_fg_color = palette.loss;
    visuals.window_fill = palette.panel;
    visuals.panel_fill = palette.window;
    visuals.window_stroke = Stroke::new(1.0, palette.hairline);
    visuals.window_corner_radius = CornerRadius::same(8);
    visuals.menu_corner_radius = CornerRadius::same(6);
    visuals.window_shadow = Shadow { offset: [0, 6], blur: 24, spread: 0, color: shade(visuals.dark_mode) };
    visuals.popup_shadow = Shadow { offset: [0, 3], blur: 10, spread: 0, color: shade(visuals.dark_mode) };
    visuals.selection.bg_fill = palette.chosen;
    visuals.selection.stroke = Stroke::new(1.0, palette.accent);
    visuals.text_cursor.stroke = Stroke::new(1.5, palette.accent);
    visuals.text_cursor.blink = false;
    visuals.widgets.noninteractive = widget(palette.panel, palette.hairline, palette.ink);
    visuals.widgets.inactive = widget(palette.field, palette.hairline, palette.ink);
    visuals.widgets.hovered = widget(palette.hover, palette.accent, palette.ink);
    visuals.widgets.active = widget(palette.chosen, palette.accent, palette.ink);
    visuals.widgets.open = widget(palette.hover, palette.accent, palette.ink);
    visuals
}

fn widget(fill: Color32, edge: Color32, ink: Color32) -> WidgetVisuals {
    WidgetVisuals {
        bg_fill: fill,
        weak_bg_fill: fill,
        bg_stroke: Stroke::new(1.0, edge),
        corner_radius: CornerRadius::same(5),
        fg_stroke: Stroke::new(1.0, ink),
        expansion: 0.0,
    }
}

fn shade(dark_mode: bool) -> Color32 {
    Color32::from_black_alpha(if dark_mode { 110 } else { 30 })
}
