//! Colors, type and spacing: all of them stand here and nowhere else.

use chem::audit::Grade;
use chem::ink::Tone;
use chem::pipeline::Verdict;
use egui::epaint::text::{FontInsert, FontPriority, InsertFontFamily};
use egui::text::{LayoutJob, TextFormat};
use egui::{
    Button, Color32, Context, CornerRadius, FontData, FontFamily, FontId, Margin, Response,
    RichText, Sense, Shadow, Stroke, TextStyle, Theme, Ui, Vec2, Visuals, vec2,
};

/// Colors of one appearance.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) struct Colors {
    pub(super) desk: Color32,
    pub(super) ink: Color32,
    pub(super) hairline: Color32,
    pub(super) muted: Color32,
    /// Selection, ghosts, actions.
    pub(super) accent: Color32,
    /// Text on the accent.
    pub(super) on_accent: Color32,
    /// Behind a chosen row.
    pub(super) chosen: Color32,
    /// Behind a field to type in.
    pub(super) field: Color32,
    agrees: Color32,
    opposite: Color32,
    open: Color32,
    contradiction: Color32,
}

/// The sheet: white in both appearances, since it is what prints.
pub(super) const PAPER: Color32 = Color32::WHITE;

pub(super) const LIGHT: Colors = Colors {
    desk: Color32::from_rgb(0xEF, 0xED, 0xE7),
    ink: Color32::from_rgb(0x1B, 0x1B, 0x1A),
    hairline: Color32::from_rgb(0xD9, 0xD5, 0xCB),
    muted: Color32::from_rgb(0x64, 0x60, 0x58),
    accent: Color32::from_rgb(0x0B, 0x5C, 0x7A),
    on_accent: Color32::WHITE,
    chosen: Color32::from_rgb(0xE0, 0xE6, 0xE8),
    field: Color32::from_rgb(0xF7, 0xF6, 0xF2),
    agrees: Color32::from_rgb(0x00, 0x73, 0x57),
    opposite: Color32::from_rgb(0xAD, 0x46, 0x06),
    open: Color32::from_rgb(0x7D, 0x60, 0x00),
    contradiction: Color32::from_rgb(0x9B, 0x3E, 0x7E),
};

pub(super) const DARK: Colors = Colors {
    desk: Color32::from_rgb(0x1E, 0x1F, 0x21),
    ink: Color32::from_rgb(0xEC, 0xEA, 0xE4),
    hairline: Color32::from_rgb(0x3A, 0x3B, 0x3E),
    muted: Color32::from_rgb(0xA8, 0xA4, 0x9A),
    accent: Color32::from_rgb(0x6F, 0xB7, 0xD1),
    on_accent: Color32::from_rgb(0x10, 0x1C, 0x22),
    chosen: Color32::from_rgb(0x29, 0x34, 0x3A),
    field: Color32::from_rgb(0x27, 0x28, 0x2B),
    agrees: Color32::from_rgb(0x46, 0xBF, 0x9B),
    opposite: Color32::from_rgb(0xF0, 0x93, 0x55),
    open: Color32::from_rgb(0xD8, 0xB3, 0x4C),
    contradiction: Color32::from_rgb(0xDA, 0x8C, 0xC3),
};

impl Colors {
    /// Those in use on the desk.
    pub(super) fn of(ui: &Ui) -> Colors {
        if ui.visuals().dark_mode { DARK } else { LIGHT }
    }

    pub(super) fn verdict(&self, verdict: Verdict) -> Color32 {
        match verdict {
            Verdict::Agrees => self.agrees,
            Verdict::Opposite => self.opposite,
            Verdict::Open => self.open,
            Verdict::Contradiction => self.contradiction,
            Verdict::NotAsked => self.muted,
        }
    }

    pub(super) fn grade(&self, grade: Grade) -> Color32 {
        match grade {
            Grade::Wrong => self.opposite,
            Grade::Unclear => self.contradiction,
            Grade::PoorStyle => self.muted,
            Grade::Open => self.open,
        }
    }

    pub(super) fn tone(&self, tone: Tone) -> Color32 {
        match tone {
            Tone::Ink => self.ink,
            Tone::Muted => self.muted,
            Tone::Agrees => self.agrees,
            Tone::Opposite => self.opposite,
            Tone::Open => self.open,
            Tone::Contradiction => self.contradiction,
        }
    }
}

/// The grid, in points.
pub(super) const GRID: f32 = 8.0;
/// Type sizes, in points.
pub(super) const CAPTION: f32 = 11.0;
pub(super) const TEXT: f32 = 14.0;
pub(super) const LINE: f32 = 27.0;

pub(super) fn upright(size: f32) -> FontId {
    FontId::new(size, FontFamily::Proportional)
}

pub(super) fn italic(size: f32) -> FontId {
    FontId::new(size, FontFamily::Name("italic".into()))
}

pub(super) fn bold(size: f32) -> FontId {
    FontId::new(size, FontFamily::Name("bold".into()))
}

/// Adds a symbol with its number as a true subscript, if there is more than one.
pub(super) fn scripted(job: &mut LayoutJob, symbol: &str, n: usize, size: f32, color: Color32) {
    job.append(symbol, 0.0, TextFormat::simple(upright(size), color));
    if n > 1 {
        let mut format = TextFormat::simple(upright(0.72 * size), color);
        format.valign = egui::Align::BOTTOM;
        job.append(&n.to_string(), 0.0, format);
    }
}

/// A thin line across, in the middle of a strip of this height.
pub(super) fn hairline(ui: &mut Ui, height: f32) {
    let size = vec2(ui.available_width(), height);
    let (rect, _) = ui.allocate_exact_size(size, Sense::hover());
    let line = Stroke::new(1.0, Colors::of(ui).hairline);
    ui.painter().hline(rect.x_range(), rect.center().y, line);
}

/// A button for what is most likely wanted, in the accent.
pub(super) fn filled(ui: &mut Ui, words: &str, width: f32) -> Response {
    let colors = Colors::of(ui);
    let button = Button::new(RichText::new(words).color(colors.on_accent))
        .fill(colors.accent)
        .stroke(Stroke::NONE)
        .min_size(vec2(width, 32.0));
    ui.add(button)
}

/// Installs the faces and the look. The faces are there from the next frame on.
pub(super) fn dress(ctx: &Context) {
    for (name, bytes, family) in [
        ("Noto Sans", notosans::REGULAR_TTF, FontFamily::Proportional),
        (
            "Noto Sans Italic",
            notosans::ITALIC_TTF,
            FontFamily::Name("italic".into()),
        ),
        (
            "Noto Sans Bold",
            notosans::BOLD_TTF,
            FontFamily::Name("bold".into()),
        ),
    ] {
        ctx.add_font(FontInsert::new(
            name,
            FontData::from_static(bytes),
            vec![InsertFontFamily {
                family,
                priority: FontPriority::Highest,
            }],
        ));
    }
    ctx.options_mut(|o| {
        o.zoom_with_keyboard = false;
        o.fallback_theme = Theme::Light;
    });
    for (theme, colors) in [(Theme::Light, LIGHT), (Theme::Dark, DARK)] {
        ctx.style_mut_of(theme, |style| {
            style.text_styles = [
                (TextStyle::Heading, bold(TEXT)),
                (TextStyle::Body, upright(TEXT)),
                (TextStyle::Button, upright(TEXT)),
                (TextStyle::Small, upright(CAPTION)),
                (
                    TextStyle::Monospace,
                    FontId::new(TEXT, FontFamily::Monospace),
                ),
            ]
            .into();
            style.animation_time = 0.1;
            style.interaction.selectable_labels = false;
            let spacing = &mut style.spacing;
            spacing.item_spacing = Vec2::splat(GRID);
            spacing.button_padding = vec2(12.0, 4.0);
            spacing.interact_size = vec2(32.0, 28.0);
            spacing.menu_margin = Margin::same(6);
            spacing.menu_width = 240.0;
            spacing.window_margin = Margin::same(24);
            style.visuals = visuals(theme == Theme::Dark, &colors);
        });
    }
}

fn visuals(dark: bool, c: &Colors) -> Visuals {
    let mut v = if dark {
        Visuals::dark()
    } else {
        Visuals::light()
    };
    let radius = CornerRadius::same(4);
    let hairline = Stroke::new(1.0, c.hairline);
    v.panel_fill = c.desk;
    v.window_fill = c.field;
    v.window_stroke = hairline;
    v.window_corner_radius = radius;
    v.menu_corner_radius = radius;
    v.window_shadow = Shadow::NONE;
    v.popup_shadow = Shadow::NONE;
    v.extreme_bg_color = c.field;
    v.faint_bg_color = c.field;
    v.override_text_color = None;
    v.weak_text_color = Some(c.muted);
    v.selection.bg_fill = c.accent.gamma_multiply(0.28);
    v.selection.stroke = Stroke::new(1.0, c.accent);
    v.hyperlink_color = c.accent;
    v.error_fg_color = c.opposite;
    v.warn_fg_color = c.open;
    v.text_cursor.stroke = Stroke::new(2.0, c.accent);
    let w = &mut v.widgets;
    for (state, fill, edge) in [
        (&mut w.noninteractive, Color32::TRANSPARENT, hairline),
        (&mut w.inactive, Color32::TRANSPARENT, hairline),
        (&mut w.hovered, c.chosen, Stroke::new(1.0, c.accent)),
        (&mut w.active, c.chosen, Stroke::new(1.5, c.accent)),
        (&mut w.open, c.chosen, hairline),
    ] {
        state.bg_fill = fill;
        state.weak_bg_fill = fill;
        state.bg_stroke = edge;
        state.fg_stroke = Stroke::new(1.0, c.ink);
        state.corner_radius = radius;
        state.expansion = 0.0;
    }
    v
}

#[cfg(test)]
mod tests {
    use super::*;

    fn luminance(c: Color32) -> f64 {
        let part = |x: u8| {
            let x = f64::from(x) / 255.0;
            if x <= 0.04045 {
                x / 12.92
            } else {
                ((x + 0.055) / 1.055).powf(2.4)
            }
        };
        0.2126 * part(c.r()) + 0.7152 * part(c.g()) + 0.0722 * part(c.b())
    }

    fn contrast(a: Color32, b: Color32) -> f64 {
        let (a, b) = (luminance(a), luminance(b));
        (a.max(b) + 0.05) / (a.min(b) + 0.05)
    }

    #[test]
    fn every_text_color_can_be_read_on_its_ground() {
        for c in [LIGHT, DARK] {
            let texts = [
                c.ink,
                c.muted,
                c.accent,
                c.agrees,
                c.opposite,
                c.open,
                c.contradiction,
            ];
            for text in texts {
                for ground in [c.desk, c.field, c.chosen] {
                    assert!(contrast(text, ground) >= 4.5, "{text:?} on {ground:?}");
                }
            }
            assert!(contrast(c.on_accent, c.accent) >= 4.5);
        }
        for text in [LIGHT.muted, LIGHT.agrees, LIGHT.opposite, LIGHT.open] {
            assert!(contrast(text, PAPER) >= 4.5);
        }
    }
}
