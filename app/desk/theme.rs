//! The look of the window: fonts and colours, light and dark. Only this file names a colour.

use crate::workspace::Theme;

/// Installs fonts and both themes.
pub fn install(_ctx: &egui::Context) {}

/// Wears a theme from the next frame on; does nothing when it is worn already.
pub fn wear(ctx: &egui::Context, theme: Theme) {
    let wanted = match theme {
        Theme::Light => egui::Theme::Light,
        Theme::Dark => egui::Theme::Dark,
    };
    if ctx.theme() != wanted {
        ctx.set_theme(wanted);
    }
}
