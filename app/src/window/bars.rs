//! The bars: menus at the top, notice and status line at the bottom.

use super::sheet::Sheet;
use super::signs;
use super::theme::{self, CAPTION, Colors, GRID, TEXT, scripted};
use crate::command::{Command, MENUS, Shortcut};
use crate::session::Session;
use chem::molecule::charge_text;
use chem::pipeline::Verdict;
use egui::text::{LayoutJob, TextFormat};
use egui::{Align, Button, Layout, MenuBar, RichText, Ui};

/// The menus, and the file's name at the right.
pub(super) fn menus(ui: &mut Ui, session: &Session, out: &mut Vec<Command>) {
    MenuBar::new().ui(ui, |ui| {
        ui.spacing_mut().item_spacing.x = 2.0 * GRID;
        for (name, commands) in MENUS {
            ui.menu_button(name, |ui| {
                ui.set_width(288.0);
                for command in commands {
                    match command {
                        Some(command) => item(ui, session, command, out),
                        None => theme::hairline(ui, GRID),
                    }
                }
            });
        }
        ui.with_layout(Layout::right_to_left(Align::Center), |ui| {
            let colors = Colors::of(ui);
            ui.label(
                RichText::new(session.name())
                    .size(TEXT - 1.0)
                    .color(colors.muted),
            );
        });
    });
}

fn item(ui: &mut Ui, session: &Session, command: &Command, out: &mut Vec<Command>) {
    let colors = Colors::of(ui);
    let mut button = Button::new(command.words(session).into_owned());
    if let Some(shortcut) = command.shortcut() {
        let keys = RichText::new(keys(shortcut))
            .size(CAPTION + 1.0)
            .color(colors.muted);
        button = button.shortcut_text(keys);
    }
    let enabled = command.enabled(session);
    let response = ui
        .add_enabled(enabled, button)
        .on_hover_text(command.help());
    if response.clicked() {
        out.push(command.clone());
        ui.close();
    }
}

/// Keys in words, as they stand on the keyboard.
fn keys(shortcut: Shortcut) -> String {
    let mut words = String::new();
    if shortcut.ctrl {
        words.push_str("Ctrl+");
    }
    if shortcut.shift {
        words.push_str("Shift+");
    }
    let name = match shortcut.key {
        "Escape" => "Esc",
        "Plus" => "+",
        "Minus" => "\u{2212}",
        "PageDown" => "Page Down",
        "PageUp" => "Page Up",
        other => other,
    };
    words + name
}

/// Formula, mass, state of the file; scale at the right.
pub(super) fn status(ui: &mut Ui, session: &Session, sheet: &Sheet) {
    let colors = Colors::of(ui);
    ui.horizontal(|ui| {
        ui.spacing_mut().item_spacing.x = 3.0 * GRID;
        let small = |text: String| RichText::new(text).size(TEXT - 1.5).color(colors.muted);
        let m = session.drawing().molecule();
        if m.n_atoms() > 0 {
            ui.label(formula(session, &colors));
            ui.label(small(format!("{:.2} g/mol", m.molar_mass())));
        }
        let odd = m.atoms().filter(|a| !m.valence_is_usual(*a)).count();
        if odd > 0 {
            let text = match odd {
                1 => "1 atom with an unusual valence".to_owned(),
                n => format!("{n} atoms with an unusual valence"),
            };
            ui.label(small(text).color(colors.verdict(Verdict::Opposite)));
        }
        let state = match (session.is_dirty(), session.path()) {
            (true, _) => "changes not saved",
            (false, Some(_)) => "saved",
            (false, None) => "not saved yet",
        };
        ui.label(small(state.to_owned()));
        match session.log().len() {
            0 => {}
            1 => _ = ui.label(small("1 mend in the log".to_owned())),
            n => _ = ui.label(small(format!("{n} mends in the log"))),
        }
        ui.with_layout(Layout::right_to_left(Align::Center), |ui| {
            if let Some((_, percent)) = sheet.measures() {
                ui.label(small(format!("{percent:.0} % of print")));
            }
        });
    });
}

fn formula(session: &Session, colors: &Colors) -> LayoutJob {
    let m = session.drawing().molecule();
    let mut job = LayoutJob::default();
    for (symbol, n) in m.formula() {
        scripted(&mut job, symbol, n, TEXT - 1.0, colors.muted);
    }
    let mut format = TextFormat::simple(theme::upright(0.72 * (TEXT - 1.0)), colors.muted);
    format.valign = Align::TOP;
    job.append(&charge_text(m.charge()), 0.0, format);
    job
}

/// A notice with its sign; whether it was closed.
pub(super) fn notice(ui: &mut Ui, verdict: Verdict, text: &str) -> bool {
    let colors = Colors::of(ui);
    ui.horizontal(|ui| {
        signs::show(ui, verdict);
        let wide = (ui.available_width() - 96.0).max(120.0);
        let text = RichText::new(text)
            .size(TEXT)
            .color(colors.verdict(verdict));
        ui.vertical(|ui| {
            ui.set_width(wide);
            ui.add(egui::Label::new(text).wrap());
        });
        ui.button("Dismiss").clicked()
    })
    .inner
}

#[cfg(test)]
mod tests {
    use super::*;
    use egui::Key;

    #[test]
    fn every_shortcut_is_on_the_keyboard() {
        let commands = MENUS.iter().flat_map(|(_, menu)| menu.iter().flatten());
        let shortcuts: Vec<Shortcut> = commands.filter_map(Command::shortcut).collect();
        assert!(shortcuts.len() > 20);
        for shortcut in shortcuts {
            assert!(Key::from_name(shortcut.key).is_some(), "{shortcut:?}");
            assert!(keys(shortcut).is_ascii() || shortcut.key == "Minus");
        }
    }
}
