//! The findings: what a reader could take wrongly, the gravest first; under the chosen one its mends.

mod parts;

use super::places;
use super::theme::{self, CAPTION, Colors, GRID, TEXT};
use crate::command::Command;
use crate::session::{Looking, Offer, Session};
use chem::audit::{Finding, Grade};
use egui::{Panel, Rect, RichText, ScrollArea, Ui};
use parts::{chip, choice, row};

/// Grades in the order of gravity.
const GRADES: [Grade; 4] = [Grade::Wrong, Grade::Unclear, Grade::PoorStyle, Grade::Open];
/// Below this height places and findings scroll together.
const TALL: f32 = 420.0;
/// Seconds of looking before it is said: a short look would only flicker.
const PATIENCE: f32 = 0.4;

/// Shows the right column: places above, findings beneath. Gives the mend that the pointer or the focus
/// is on.
pub(super) fn column(
    ui: &mut Ui,
    session: &Session,
    with_places: bool,
    out: &mut Vec<Command>,
) -> Option<Offer> {
    let room = ui.available_height();
    if !with_places || room < TALL {
        let both = |ui: &mut Ui| {
            ui.spacing_mut().item_spacing.y = 0.0;
            if with_places {
                places::content(ui, session, out);
                ui.add_space(2.0 * GRID);
                theme::hairline(ui, 1.0);
                ui.add_space(2.0 * GRID);
            }
            heading(ui, session, out);
            let offer = list(ui, session, out);
            all(ui, session, out);
            offer
        };
        let scroll = ScrollArea::vertical().auto_shrink(false);
        return scroll.show(ui, both).inner;
    }
    // of a fixed height, so that no row moves away under the pointer when it is chosen
    let share = if session.findings().is_empty() {
        96.0
    } else {
        0.6 * room
    };
    let beneath = Panel::bottom("findings")
        .frame(egui::Frame::NONE)
        .resizable(false)
        .show_separator_line(false)
        .exact_size(share)
        .show(ui, |ui| {
            ui.spacing_mut().item_spacing.y = 0.0;
            theme::hairline(ui, 1.0);
            ui.add_space(2.0 * GRID);
            heading(ui, session, out);
            let foot = foot_height(session);
            let high = (ui.available_height() - foot).max(0.0);
            let scroll = ScrollArea::vertical().auto_shrink(false).max_height(high);
            let offer = scroll.show(ui, |ui| list(ui, session, out)).inner;
            all(ui, session, out);
            offer
        });
    places::show(ui, session, false, out);
    beneath.inner
}

/// The word, whether a look is under way, and a count for each grade, which shows or hides it.
fn heading(ui: &mut Ui, session: &Session, out: &mut Vec<Command>) {
    let colors = Colors::of(ui);
    ui.horizontal(|ui| {
        let words = RichText::new("Findings").font(theme::bold(TEXT));
        ui.label(words.color(colors.muted));
        let looking = session.looking() == Looking::Looking;
        let id = egui::Id::unique("looking for findings");
        let waited = ui.ctx().animate_bool_with_time(id, looking, PATIENCE);
        if looking && waited > 0.95 {
            ui.label(RichText::new("looking …").small().color(colors.muted));
        }
    });
    ui.add_space(GRID / 2.0);
    ui.horizontal_wrapped(|ui| {
        ui.spacing_mut().item_spacing = egui::vec2(GRID / 2.0, GRID / 2.0);
        for grade in GRADES {
            let n = session.n_findings(grade);
            if n > 0 && chip(ui, grade, n, session.shows(grade)) {
                out.push(Command::ToggleGrade(grade));
            }
        }
    });
    ui.add_space(GRID);
}

fn list(ui: &mut Ui, session: &Session, out: &mut Vec<Command>) -> Option<Offer> {
    if let Some(text) = instead(session) {
        let text = RichText::new(text).color(Colors::of(ui).muted);
        ui.add(egui::Label::new(text).wrap());
        return None;
    }
    let chosen = session.chosen_finding();
    let is_new = is_new(ui, session, chosen);
    let mut offer = None;
    for (i, finding) in session.shown_findings() {
        let is_chosen = chosen == Some(i);
        let response = row(ui, finding, is_chosen);
        if response.clicked() {
            out.push(if is_chosen {
                Command::Deselect
            } else {
                Command::ChooseFinding(i)
            });
        }
        if is_chosen {
            let (rect, over) = mends(ui, session, i, finding, out);
            offer = over;
            if is_new {
                ui.scroll_to_rect(response.rect.union(rect), None);
            }
        }
    }
    offer
}

/// What is said where no finding is shown.
fn instead(session: &Session) -> Option<&'static str> {
    let looking = session.looking();
    if looking == Looking::Failed {
        return Some("The drawing could not be looked through; any change of it starts afresh");
    }
    if session.shown_findings().next().is_some() {
        return None;
    }
    Some(if session.drawing().molecule().n_atoms() == 0 {
        "nothing is drawn yet"
    } else if !session.findings().is_empty() {
        "The findings are hidden: press a count above to show them"
    } else if looking == Looking::Looking {
        ""
    } else {
        "Nothing that a reader could take wrongly was found"
    })
}

/// Whether the chosen finding was not the chosen one in the frame before.
fn is_new(ui: &Ui, session: &Session, chosen: Option<usize>) -> bool {
    let id = egui::Id::unique("chosen finding");
    let now = chosen.map(|i| (session.revision(), i));
    let before: Option<(u64, usize)> = ui.data(|d| d.get_temp(id)).flatten();
    ui.data_mut(|d| d.insert_temp(id, now));
    now.is_some() && now != before
}

/// The mends of the chosen finding; where they stand, and the one that the pointer or the focus is on.
fn mends(
    ui: &mut Ui,
    session: &Session,
    finding: usize,
    of: &Finding,
    out: &mut Vec<Command>,
) -> (Rect, Option<Offer>) {
    let mut offer = None;
    let rect = ui
        .vertical(|ui| {
            ui.spacing_mut().item_spacing.y = GRID / 2.0;
            ui.add_space(GRID / 2.0);
            for (mend, one) in of.mends.iter().enumerate() {
                let this = Offer {
                    revision: session.revision(),
                    finding,
                    mend,
                };
                let response = choice(ui, one);
                if response.clicked() {
                    out.push(Command::Mend(this));
                }
                // the pointer goes before the focus, which may rest elsewhere
                if response.hovered() || (offer.is_none() && response.has_focus()) {
                    offer = Some(this);
                }
            }
            if of.mends.is_empty() {
                parts::indented(ui, "No mend is known: it takes a person to draw this anew");
            }
            ui.add_space(GRID / 2.0);
        })
        .response
        .rect;
    (rect, offer)
}

/// Height of what stands beneath the list.
fn foot_height(session: &Session) -> f32 {
    if session.can_mend_all() || session.is_mending() {
        32.0 + 1.5 * GRID
    } else if session.mended_in_vain() {
        48.0
    } else {
        0.0
    }
}

/// The button that mends all, where there is something that it could mend.
fn all(ui: &mut Ui, session: &Session, out: &mut Vec<Command>) {
    let colors = Colors::of(ui);
    if session.mended_in_vain() {
        ui.add_space(GRID);
        let text =
            "Nothing can be mended together without a change of meaning: take the mends one by one";
        let text = RichText::new(text).size(CAPTION + 1.0).color(colors.muted);
        ui.add(egui::Label::new(text).wrap());
    } else if session.is_mending() {
        ui.add_space(1.5 * GRID);
        ui.label(RichText::new("mending …").color(colors.muted));
    } else if session.can_mend_all() {
        ui.add_space(1.5 * GRID);
        let command = Command::MendAll;
        let words = RichText::new(command.words(session)).color(colors.accent);
        let button = egui::Button::new(words)
            .stroke(egui::Stroke::new(1.0, colors.accent))
            .min_size(egui::vec2(ui.available_width(), 32.0));
        let response = ui.vertical_centered(|ui| ui.add(button)).inner;
        if response.on_hover_text(command.help()).clicked() {
            out.push(command);
        }
    }
}
