//! The band at the top: what the drawing must carry, what it carries, and the verdict.

use super::signs;
use super::theme::{self, CAPTION, Colors, GRID, LINE, TEXT};
use crate::command::Command;
use crate::figure;
use crate::session::{Session, Tally};
use chem::pipeline::{Place, Verdict};
use chem::solve::require::RequirementError;
use egui::text::{LayoutJob, TextFormat};
use egui::{
    Align, Color32, Frame, Id, Key, Layout, Response, RichText, Stroke, TextBuffer, TextEdit, Ui,
    vec2,
};

/// The line and its caret.
#[derive(Debug, Default)]
pub(super) struct Band {
    text: String,
    had_focus: bool,
    focus_next: bool,
}

/// Descriptors italic, all else upright; `bad` is the byte range to underline.
fn set(
    text: &str,
    size: f32,
    color: Color32,
    bad: Option<(std::ops::Range<usize>, Color32)>,
) -> LayoutJob {
    let mut job = LayoutJob::default();
    for (at, letter) in text.char_indices() {
        let font = if is_descriptor(text, at, letter) {
            theme::italic(size)
        } else {
            theme::upright(size)
        };
        let mut format = TextFormat::simple(font, color);
        if let Some((range, color)) = &bad
            && range.contains(&at)
        {
            format.color = *color;
            format.underline = Stroke::new(2.0, *color);
        }
        job.append(letter.encode_utf8(&mut [0; 4]), 0.0, format);
    }
    job
}

/// A letter that stands alone and is one of the descriptors.
fn is_descriptor(text: &str, at: usize, letter: char) -> bool {
    let before = text[..at].chars().next_back();
    let after = text[at + letter.len_utf8()..].chars().next();
    let alone = |c: Option<char>| !c.is_some_and(char::is_alphabetic);
    chem::stereo::Descriptor::from_letter(letter).is_some() && alone(before) && alone(after)
}

/// Bytes of the token at a column counted in characters from 1; the whole line for column 0.
fn bad_token(text: &str, error: &RequirementError) -> std::ops::Range<usize> {
    let Some(skip) = error.column.checked_sub(1) else {
        return 0..text.len();
    };
    let start = text
        .char_indices()
        .nth(skip)
        .map_or(text.len(), |(at, _)| at);
    let stops = |c: char| ",;()[] ".contains(c);
    let mut letters = text[start..].char_indices();
    let first = letters.next().map_or(0, |(_, c)| c.len_utf8());
    let end = letters
        .find(|(_, c)| stops(*c))
        .map_or(text.len(), |(at, _)| start + at);
    // at the end of the line there is nothing to underline but what stands last
    if start >= text.len() {
        let last = text.chars().next_back().map_or(0, char::len_utf8);
        return text.len() - last..text.len();
    }
    start..end.max(start + first)
}

/// Whether what is wrong is only the last token of a line that is still being typed.
fn is_unfinished(session: &Session, error: &RequirementError) -> bool {
    let line = session.line();
    session.is_typing() && bad_token(line, error).end >= line.trim_end().len()
}

impl Band {
    /// Puts the caret in the line.
    pub(super) fn focus(&mut self) {
        self.focus_next = true;
    }

    /// Shows the band.
    pub(super) fn show(&mut self, ui: &mut Ui, session: &Session, out: &mut Vec<Command>) {
        ui.spacing_mut().item_spacing = vec2(4.0 * GRID, 0.0);
        ui.horizontal_top(|ui| {
            let wide = (ui.available_width() * 0.36).clamp(220.0, 520.0);
            ui.allocate_ui_with_layout(vec2(wide, 76.0), Layout::top_down(Align::Min), |ui| {
                ui.set_width(wide);
                self.must(ui, session, out);
            });
            ui.vertical(|ui| {
                // the verdict and its button must stay in sight
                let kept = if session.can_carry() { 352.0 } else { 200.0 };
                ui.set_max_width((ui.available_width() - kept).max(120.0));
                carries(ui, session);
            });
            ui.vertical(|ui| {
                ui.add_space(18.0);
                ui.horizontal(|ui| {
                    ui.spacing_mut().item_spacing.x = 2.0 * GRID;
                    verdict(ui, session);
                    make(ui, session, out);
                });
            });
        });
        says(ui, session);
    }

    fn must(&mut self, ui: &mut Ui, session: &Session, out: &mut Vec<Command>) {
        let colors = Colors::of(ui);
        let caption = caption(ui, "must carry");
        if !self.had_focus {
            self.text = session.line().to_owned();
        }
        let error = session.requirement().err().cloned();
        let wrong = match &error {
            Some(error) if is_unfinished(session, error) => colors.muted,
            _ => colors.verdict(Verdict::Opposite),
        };
        let mut layouter = |ui: &Ui, buffer: &dyn TextBuffer, _wrap: f32| {
            let text = buffer.as_str();
            let bad = error.as_ref().map(|e| (bad_token(text, e), wrong));
            let job = set(text, LINE, colors.ink, bad);
            ui.fonts_mut(|f| f.layout_job(job))
        };
        let hint = RichText::new("descriptors, such as (1R,2S)").font(theme::upright(TEXT + 3.0));
        let id = Id::unique("must carry");
        let response = TextEdit::singleline(&mut self.text)
            .id(id)
            .hint_text(hint.color(colors.muted))
            .font(theme::upright(LINE))
            .align(egui::Align2::LEFT_CENTER)
            .min_size(vec2(0.0, 40.0))
            .frame(Frame::NONE)
            .margin(egui::Margin::ZERO)
            .desired_width(f32::INFINITY)
            .char_limit(2000)
            .layouter(&mut layouter)
            .show(ui)
            .response
            .response
            .labelled_by(caption.id);
        self.underline(ui, &response, &colors);
        if std::mem::take(&mut self.focus_next) {
            response.request_focus();
        }
        if response.changed() {
            out.push(Command::Ask(self.text.clone()));
        }
        if response.lost_focus() {
            out.push(Command::Settle);
            let entered = ui.input(|i| i.key_pressed(Key::Enter));
            if entered && !response.changed() && session.can_carry() && !session.is_searching() {
                out.push(Command::MakeItCarry);
            }
        }
        self.had_focus = response.has_focus();
    }

    fn underline(&self, ui: &Ui, response: &Response, colors: &Colors) {
        let line = if response.has_focus() {
            Stroke::new(1.5, colors.accent)
        } else {
            Stroke::new(1.0, colors.hairline)
        };
        let rect = response.rect;
        ui.painter().hline(rect.x_range(), rect.max.y + 1.0, line);
    }

    /// Another document or another step: the line is shown as the session has it.
    pub(super) fn forget(&mut self) {
        self.had_focus = false;
    }
}

fn caption(ui: &mut Ui, text: &str) -> Response {
    let colors = Colors::of(ui);
    ui.label(RichText::new(text).size(CAPTION).color(colors.muted))
}

/// The descriptor line of the drawing, each descriptor in the color of its verdict.
fn carries(ui: &mut Ui, session: &Session) {
    let colors = Colors::of(ui);
    caption(ui, "carries");
    let line = session.report().descriptor_line();
    let job = if line.is_empty() {
        LayoutJob::simple_singleline("nothing yet".to_owned(), theme::upright(LINE), colors.muted)
    } else {
        carried_job(&session.report().places, &colors)
    };
    let spoken = if line.is_empty() {
        "nothing".to_owned()
    } else {
        line
    };
    let response = ui.add(egui::Label::new(job).truncate());
    response.widget_info(|| {
        egui::WidgetInfo::labeled(egui::Role::Label, true, format!("carries {spoken}"))
    });
}

fn carried_job(places: &[Place], colors: &Colors) -> LayoutJob {
    let mut job = LayoutJob::default();
    let plain = TextFormat::simple(theme::upright(LINE), colors.ink);
    let mut lead = "(";
    for place in places {
        let Some(carried) = place.carries else {
            continue;
        };
        job.append(lead, 0.0, plain.clone());
        let color = match place.verdict {
            Verdict::Agrees | Verdict::NotAsked => colors.ink,
            other => colors.verdict(other),
        };
        let locant = figure::locant(place);
        job.append(
            &locant,
            0.0,
            TextFormat::simple(theme::upright(LINE), color),
        );
        let letter = carried.letter().to_string();
        job.append(&letter, 0.0, TextFormat::simple(theme::italic(LINE), color));
        lead = ",";
    }
    job.append(")", 0.0, plain);
    job
}

/// The verdict in words.
pub(super) fn words(tally: &Tally) -> String {
    let mut words = Vec::new();
    if tally.contradiction > 0 {
        words.push(count(
            tally.contradiction,
            "contradiction",
            "contradictions",
        ));
    }
    if tally.opposite > 0 {
        words.push(format!("{} opposite", tally.opposite));
    }
    if tally.open > 0 {
        words.push(format!("{} open", tally.open));
    }
    if words.is_empty() {
        return if tally.agrees > 0 {
            "agrees".to_owned()
        } else {
            "nothing asked".to_owned()
        };
    }
    words.join(" · ")
}

fn count(n: usize, one: &str, many: &str) -> String {
    format!("{n} {}", if n == 1 { one } else { many })
}

fn verdict(ui: &mut Ui, session: &Session) {
    let colors = Colors::of(ui);
    let tally = session.tally();
    let understood = session.requirement().is_ok();
    let verdict = if understood {
        tally.verdict()
    } else {
        Verdict::NotAsked
    };
    ui.horizontal(|ui| {
        ui.spacing_mut().item_spacing.x = GRID;
        ui.set_min_height(36.0);
        signs::show(ui, verdict);
        let text = if session.is_searching() {
            "seeking marks …".to_owned()
        } else if !understood {
            "the line does not count: see below".to_owned()
        } else {
            words(&tally)
        };
        ui.label(
            RichText::new(text)
                .size(TEXT + 1.0)
                .color(colors.verdict(verdict)),
        );
    });
}

fn make(ui: &mut Ui, session: &Session, out: &mut Vec<Command>) {
    if !session.can_carry() || session.is_searching() || session.refusal().is_some() {
        return;
    }
    let command = Command::MakeItCarry;
    let button = theme::filled(ui, &command.words(session), 136.0);
    if button.on_hover_text(command.help()).clicked() {
        out.push(command);
    }
}

/// What is wrong with the line, or why nothing can carry it, beneath.
fn says(ui: &mut Ui, session: &Session) {
    let colors = Colors::of(ui);
    let said = match (session.requirement(), session.refusal()) {
        (Err(error), _) if is_unfinished(session, error) => {
            Some((Verdict::NotAsked, error.text.clone()))
        }
        (Err(error), _) => Some((Verdict::Opposite, error.text.clone())),
        (Ok(_), Some(refusal)) => Some((Verdict::Contradiction, refusal.text.clone())),
        (Ok(_), None) => None,
    };
    ui.add_space(2.0);
    ui.horizontal(|ui| {
        ui.spacing_mut().item_spacing.x = GRID;
        // the room is kept, so that nothing moves while a line is typed
        ui.set_min_height(28.0);
        let Some((verdict, text)) = said else {
            return;
        };
        signs::show(ui, verdict);
        let text = RichText::new(text)
            .size(TEXT)
            .color(colors.verdict(verdict));
        ui.add(egui::Label::new(text).wrap());
    });
}

#[cfg(test)]
mod tests {
    use super::*;

    fn error(column: usize) -> RequirementError {
        RequirementError {
            code: "E-TEST",
            column,
            text: String::new(),
        }
    }

    #[test]
    fn the_bad_token_is_found_by_its_column() {
        let text = "(1R,2X,3S)";
        assert_eq!(&text[bad_token(text, &error(5))], "2X");
        assert_eq!(&text[bad_token(text, &error(4))], ",2X");
        assert_eq!(&text[bad_token(text, &error(0))], text);
        assert_eq!(&text[bad_token(text, &error(99))], ")");
        assert_eq!(bad_token("", &error(1)), 0..0);
        let wide = "(α1R)";
        assert_eq!(&wide[bad_token(wide, &error(2))], "α1R");
    }

    #[test]
    fn lone_letters_are_descriptors() {
        let text = "rac-(1R,2s,E)";
        let italic: String = text
            .char_indices()
            .filter(|(at, c)| is_descriptor(text, *at, *c))
            .map(|(_, c)| c)
            .collect();
        assert_eq!(italic, "RsE");
    }
}
