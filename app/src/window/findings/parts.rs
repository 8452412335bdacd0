//! Parts of the list of findings: a count, a row, a mend.

use crate::window::signs;
use crate::window::theme::{self, CAPTION, Colors, GRID, TEXT};
use chem::audit::{Finding, Grade, Mend};
use egui::text::{LayoutJob, TextFormat};
use egui::{
    CornerRadius, Galley, Response, Role, Sense, Stroke, StrokeKind, Ui, WidgetInfo, pos2, vec2,
};
use std::sync::Arc;

/// Where the words of a row begin: the sign stands before them.
const INDENT: f32 = 26.0;
/// Space inside a row at its right.
const PAD: f32 = 6.0;
const RADIUS: CornerRadius = CornerRadius::same(4);

/// A count that shows or hides its grade; whether it was pressed.
pub(super) fn chip(ui: &mut Ui, grade: Grade, n: usize, shown: bool) -> bool {
    let colors = Colors::of(ui);
    let words = format!("{n} {}", grade.name());
    let mut format = TextFormat::simple(
        theme::upright(TEXT - 1.5),
        if shown { colors.ink } else { colors.muted },
    );
    if !shown {
        format.strikethrough = Stroke::new(1.0, colors.muted);
    }
    let galley = ui.fonts_mut(|f| f.layout_job(LayoutJob::single_section(words.clone(), format)));
    let size = vec2(galley.size().x + 30.0, 26.0);
    let (rect, response) = ui.allocate_exact_size(size, Sense::click());
    response.widget_info(|| WidgetInfo::selected(Role::CheckBox, true, shown, &words));
    let tip = if shown {
        "shown: press to hide these"
    } else {
        "hidden: press to show these"
    };
    let response = response.on_hover_text(tip);
    let lit = response.hovered() || response.has_focus();
    let edge = if lit { colors.accent } else { colors.hairline };
    let painter = ui.painter();
    painter.rect_stroke(rect, RADIUS, Stroke::new(1.0, edge), StrokeKind::Inside);
    let at = pos2(rect.min.x + 13.0, rect.center().y);
    signs::grade(painter, at, 5.0, grade, &colors);
    let y = rect.center().y - galley.size().y / 2.0;
    painter.galley(pos2(rect.min.x + 23.0, y), galley, colors.ink);
    response.clicked()
}

/// The words with the first letter large.
fn sentence(words: &str) -> String {
    let mut letters = words.chars();
    match letters.next() {
        Some(first) => first.to_uppercase().chain(letters).collect(),
        None => String::new(),
    }
}

fn wrapped(ui: &Ui, words: String, size: f32, color: egui::Color32, width: f32) -> Arc<Galley> {
    let mut job = LayoutJob::simple(words, theme::upright(size), color, width.max(48.0));
    job.wrap.break_anywhere = false;
    ui.fonts_mut(|f| f.layout_job(job))
}

/// A finding: its sign, its sentence, and in small its grade and what it rests on.
pub(super) fn row(ui: &mut Ui, finding: &Finding, chosen: bool) -> Response {
    let colors = Colors::of(ui);
    let width = ui.available_width() - INDENT - PAD;
    let said = sentence(&finding.text);
    let words = wrapped(ui, said.clone(), TEXT - 0.5, colors.ink, width);
    let (grade, clause) = (finding.grade.name(), finding.clause);
    let small = format!("{grade} · {}, {}", clause.name, clause.source.words());
    let small = wrapped(ui, small, CAPTION, colors.muted, width);
    let height = words.size().y + small.size().y + 2.0 + 1.5 * GRID;
    let size = vec2(ui.available_width(), height);
    let (rect, response) = ui.allocate_exact_size(size, Sense::click());
    let spoken = format!(
        "{grade}: {said}. {}, {}",
        clause.name,
        clause.source.words()
    );
    response.widget_info(|| WidgetInfo::selected(Role::Button, true, chosen, &spoken));
    let tip = format!("that this is {grade}: {}", clause.grade.words());
    let response = response.on_hover_text(tip);
    if chosen || response.hovered() {
        let strength = if chosen { 1.0 } else { 0.5 };
        let fill = colors.chosen.gamma_multiply(strength);
        ui.painter().rect_filled(rect, RADIUS, fill);
    }
    if response.has_focus() {
        let line = Stroke::new(1.0, colors.accent);
        ui.painter()
            .rect_stroke(rect, RADIUS, line, StrokeKind::Inside);
    }
    let top = rect.min.y + 0.75 * GRID;
    let at = pos2(rect.min.x + 13.0, top + 0.65 * TEXT);
    signs::grade(ui.painter(), at, 6.0, finding.grade, &colors);
    let x = rect.min.x + INDENT;
    let beneath = top + words.size().y + 2.0;
    ui.painter().galley(pos2(x, top), words, colors.ink);
    ui.painter().galley(pos2(x, beneath), small, colors.muted);
    response
}

/// Whether a mend keeps or sets the meaning.
fn meaning(mend: &Mend) -> &'static str {
    match (mend.keeps_meaning, mend.meets_requirement) {
        (true, _) => "keeps the meaning",
        (false, true) => "sets the meaning, as the line asks",
        (false, false) => "sets the meaning",
    }
}

/// A mend to take: what it does, and whether it keeps or sets the meaning.
pub(super) fn choice(ui: &mut Ui, mend: &Mend) -> Response {
    let colors = Colors::of(ui);
    let pad = vec2(10.0, 5.0);
    let width = ui.available_width() - INDENT - 2.0 * pad.x;
    let said = sentence(&mend.text);
    let words = wrapped(ui, said.clone(), TEXT - 0.5, colors.accent, width);
    let tone = if mend.keeps_meaning {
        colors.verdict(chem::pipeline::Verdict::Agrees)
    } else {
        colors.verdict(chem::pipeline::Verdict::Open)
    };
    let small = wrapped(ui, meaning(mend).to_owned(), CAPTION, tone, width);
    let height = words.size().y + small.size().y + 1.0 + 2.0 * pad.y;
    let size = vec2(ui.available_width(), height);
    let (rect, response) = ui.allocate_exact_size(size, Sense::click());
    let spoken = format!("{said}: {}", meaning(mend));
    response.widget_info(|| WidgetInfo::labeled(Role::Button, true, &spoken));
    let mut frame = rect;
    frame.min.x += INDENT;
    let lit = response.hovered() || response.has_focus();
    let (fill, edge) = if lit {
        (colors.chosen, colors.accent)
    } else {
        (colors.field, colors.hairline)
    };
    let painter = ui.painter();
    let line = Stroke::new(1.0, edge);
    painter.rect(frame, RADIUS, fill, line, StrokeKind::Inside);
    let beneath = frame.min + pad + vec2(0.0, words.size().y + 1.0);
    painter.galley(frame.min + pad, words, colors.accent);
    painter.galley(beneath, small, tone);
    response
}

/// A sentence beneath a row.
pub(super) fn indented(ui: &mut Ui, words: &str) {
    let colors = Colors::of(ui);
    let width = ui.available_width() - INDENT;
    let words_laid = wrapped(ui, words.to_owned(), TEXT - 1.0, colors.muted, width);
    let size = vec2(ui.available_width(), words_laid.size().y);
    let (rect, response) = ui.allocate_exact_size(size, Sense::hover());
    response.widget_info(|| WidgetInfo::labeled(Role::Label, true, words));
    let at = pos2(rect.min.x + INDENT, rect.min.y);
    ui.painter().galley(at, words_laid, colors.muted);
}
