//! The places: a row for each stereogenic unit, and beneath why the chosen one carries what it does.

use super::signs;
use super::theme::{self, CAPTION, Colors, GRID, TEXT, scripted};
use crate::command::Command;
use crate::figure::locant;
use crate::session::{Selection, Session};
use chem::cip::{Compared, Rule, Tie};
use chem::molecule::AtomIx;
use chem::pipeline::{self, Place, Verdict};
use chem::stereo::{Kind, Ligand};
use egui::text::LayoutJob;
use egui::{
    Align2, Color32, CornerRadius, Painter, Pos2, Rect, RichText, Role, ScrollArea, Sense, Stroke,
    StrokeKind, Ui, WidgetInfo, pos2, vec2,
};
use std::sync::Arc;

/// Height of a row.
const ROW: f32 = 32.0;
/// Left edges of the columns, from the left edge of the panel's content, for its width.
fn columns(width: f32) -> [f32; 4] {
    if width < 268.0 {
        [0.0, 44.0, 76.0, 118.0]
    } else {
        [0.0, 60.0, 104.0, 160.0]
    }
}

/// The place that is selected on the sheet, if it is one.
pub(super) fn chosen(session: &Session) -> Option<&Place> {
    let drawing = session.drawing();
    let selection = session.selection();
    let wanted = selection.carried(drawing);
    if wanted.is_empty() || wanted.len() > 2 {
        return None;
    }
    let whole = |place: &&Place| {
        place.atoms.len() == wanted.len() && place.atoms.iter().all(|a| wanted.contains(a))
    };
    session.report().places.iter().find(whole)
}

/// The end of the place that holds its `i`th ligand in the ranking, and the letter of that rank.
pub(super) fn rank(kind: Kind, i: usize) -> Option<(usize, &'static str)> {
    let letters = ["a", "b", "c", "d"];
    let (end, rank) = match kind {
        Kind::Tetrahedral => (0, i),
        Kind::DoubleBond | Kind::CumulatedAxis | Kind::HinderedAxis | Kind::Helix => (i / 2, i % 2),
    };
    Some((end, letters.get(rank)?))
}

/// The selection of a place: its centre, or its bond.
fn selection(session: &Session, place: &Place) -> Selection {
    match place.atoms.as_slice() {
        [a] => Selection::atom(*a),
        [a, b] => match session.drawing().molecule().bond_between(*a, *b) {
            Some(bond) => Selection::bond(bond),
            None => Selection {
                atoms: [*a, *b].into(),
                ..Selection::default()
            },
        },
        more => Selection {
            atoms: more.iter().copied().collect(),
            ..Selection::default()
        },
    }
}

/// Shows the places in the room that there is; they scroll. Without a list of findings beside them the
/// marks that say nothing are told here.
pub(super) fn show(ui: &mut Ui, session: &Session, with_faults: bool, out: &mut Vec<Command>) {
    ScrollArea::vertical().auto_shrink(false).show(ui, |ui| {
        ui.spacing_mut().item_spacing.y = 0.0;
        content(ui, session, out);
        if with_faults {
            faults(ui, session);
        }
    });
}

/// The places one beneath the other.
pub(super) fn content(ui: &mut Ui, session: &Session, out: &mut Vec<Command>) {
    heading(ui, "Places");
    ui.add_space(GRID);
    let places = &session.report().places;
    if places.is_empty() {
        let colors = Colors::of(ui);
        let text = if session.drawing().molecule().n_atoms() == 0 {
            "nothing is drawn yet"
        } else {
            "no stereogenic place in this drawing"
        };
        ui.label(RichText::new(text).color(colors.muted));
        return;
    }
    header(ui);
    let chosen = chosen(session);
    for place in places {
        row(ui, session, place, chosen.is_some_and(|c| c == place), out);
    }
    if let Some(place) = chosen {
        ui.add_space(2.0 * GRID);
        theme::hairline(ui, 1.0);
        ui.add_space(2.0 * GRID);
        why(ui, session, place);
    }
}

fn heading(ui: &mut Ui, text: &str) {
    let colors = Colors::of(ui);
    ui.label(
        RichText::new(text)
            .font(theme::bold(TEXT))
            .color(colors.muted),
    );
}

fn header(ui: &mut Ui) {
    let colors = Colors::of(ui);
    let (rect, _) = ui.allocate_exact_size(vec2(ui.available_width(), 20.0), Sense::hover());
    for (x, text) in columns(rect.width())
        .iter()
        .zip(["locant", "must", "carries", "verdict"])
    {
        ui.painter().text(
            pos2(rect.min.x + x, rect.center().y),
            Align2::LEFT_CENTER,
            text,
            theme::upright(CAPTION),
            colors.muted,
        );
    }
    theme::hairline(ui, 1.0);
}

fn letter(d: Option<chem::stereo::Descriptor>) -> String {
    d.map_or_else(|| "·".to_owned(), |d| d.to_string())
}

/// What a screen reader says of a row.
fn spoken(place: &Place) -> String {
    let asked = place
        .must
        .map_or_else(|| "nothing asked".to_owned(), |d| format!("must carry {d}"));
    let carried = place
        .carries
        .map_or_else(|| "carries nothing".to_owned(), |d| format!("carries {d}"));
    format!(
        "Place {}: {asked}, {carried}, {}",
        locant(place),
        place.verdict.name()
    )
}

fn row(ui: &mut Ui, session: &Session, place: &Place, chosen: bool, out: &mut Vec<Command>) {
    let colors = Colors::of(ui);
    let size = vec2(ui.available_width(), ROW);
    let (rect, response) = ui.allocate_exact_size(size, Sense::click());
    response.widget_info(|| WidgetInfo::selected(Role::Button, true, chosen, spoken(place)));
    let response = response.on_hover_text(tip(place));
    if response.clicked() {
        out.push(Command::Select(selection(session, place)));
    }
    let painter = ui.painter();
    let wide = rect.expand2(vec2(GRID, 0.0));
    if chosen || response.hovered() {
        let fill = if chosen {
            colors.chosen
        } else {
            colors.chosen.gamma_multiply(0.5)
        };
        painter.rect_filled(wide, CornerRadius::same(4), fill);
    }
    if response.has_focus() {
        let line = Stroke::new(1.0, colors.accent);
        painter.rect_stroke(wide, CornerRadius::same(4), line, StrokeKind::Inside);
    }
    cells(painter, rect, place, &colors);
}

fn cells(painter: &Painter, rect: Rect, place: &Place, colors: &Colors) {
    let y = rect.center().y;
    let [x0, x1, x2, x3] = columns(rect.width()).map(|x| rect.min.x + x);
    let color = colors.verdict(place.verdict);
    let number = place_number(place);
    let write = |at: Pos2, text: String, font, color| {
        painter.text(at, Align2::LEFT_CENTER, text, font, color);
    };
    write(pos2(x0, y), number, theme::upright(TEXT + 1.0), colors.ink);
    let asked = if place.must.is_some() {
        colors.ink
    } else {
        colors.muted
    };
    write(
        pos2(x1, y),
        letter(place.must),
        theme::italic(TEXT + 1.0),
        asked,
    );
    let carried = match place.verdict {
        Verdict::Agrees => colors.ink,
        _ => color,
    };
    write(
        pos2(x2, y),
        letter(place.carries),
        theme::italic(TEXT + 1.0),
        carried,
    );
    signs::paint(painter, pos2(x3 + 6.0, y), 6.0, place.verdict, colors);
    let words = place.verdict.name().to_owned();
    write(pos2(x3 + 22.0, y), words, theme::upright(TEXT - 0.5), color);
}

/// `3`, or `5=6` of a double bond.
fn place_number(place: &Place) -> String {
    let numbers: Vec<String> = place
        .atoms
        .iter()
        .map(|a| (a.index() + 1).to_string())
        .collect();
    let dash = match place.kind {
        Kind::HinderedAxis | Kind::Helix => "-",
        Kind::Tetrahedral | Kind::DoubleBond | Kind::CumulatedAxis => "=",
    };
    numbers.join(dash)
}

fn tip(place: &Place) -> String {
    let what = match place.kind {
        Kind::Tetrahedral => "stereogenic centre",
        Kind::DoubleBond => "stereogenic double bond",
        Kind::CumulatedAxis => "axis of cumulated double bonds",
        Kind::HinderedAxis => "hindered axis",
        Kind::Helix => "helix",
    };
    let sense = place.sense.name();
    format!("{what}, drawn: {sense}")
}

fn why(ui: &mut Ui, session: &Session, place: &Place) {
    let colors = Colors::of(ui);
    ui.horizontal(|ui| {
        ui.spacing_mut().item_spacing.x = 0.0;
        let number = place_number(place);
        match place.carries {
            Some(d) => {
                heading(ui, &format!("Why {number} carries "));
                let color = match place.verdict {
                    Verdict::NotAsked => colors.ink,
                    other => colors.verdict(other),
                };
                let letter = RichText::new(d.to_string()).font(theme::italic(TEXT + 1.0));
                ui.label(letter.color(color));
            }
            None => heading(ui, &format!("Why {number} carries nothing")),
        }
    });
    ui.add_space(GRID);
    let ties = ties(ui, session, place);
    for (i, ligand) in place.ranking.iter().enumerate() {
        let Some((end, letter)) = rank(place.kind, i) else {
            break;
        };
        if place.kind != Kind::Tetrahedral && letter == "a" {
            ui.add_space(GRID / 2.0);
            let number = place.atoms.get(end).map_or(0, |a| a.index() + 1);
            let text = format!("at {number}");
            ui.label(RichText::new(text).small().color(colors.muted));
        }
        ligand_row(ui, session, letter, *ligand, &colors);
        let slot = if place.kind == Kind::Tetrahedral {
            i
        } else {
            i / 2
        };
        let parts_next = place.kind == Kind::Tetrahedral || i % 2 == 0;
        if let (true, Some(Some(tie))) = (parts_next, ties.get(slot)) {
            tie_row(ui, tie, &colors);
        }
    }
    if let (true, Some(rule)) = (ties.iter().all(Option::is_none), place.rule) {
        ui.add_space(GRID / 2.0);
        let text = format!(
            "The last tie broke by Rule {}: {}",
            rule.name(),
            meaning(rule)
        );
        ui.add(egui::Label::new(RichText::new(text).size(TEXT - 1.0).color(colors.muted)).wrap());
    }
    if !place.note.is_empty() {
        ui.add_space(GRID / 2.0);
        ui.add(egui::Label::new(RichText::new(&place.note).size(TEXT - 0.5)).wrap());
    }
}

/// How the ligands of a place were told apart; kept until the drawing or the place changes.
fn ties(ui: &Ui, session: &Session, place: &Place) -> Arc<Vec<Option<Tie>>> {
    type Kept = Option<(u64, Vec<AtomIx>, Arc<Vec<Option<Tie>>>)>;
    let id = egui::Id::unique("why of the chosen place");
    let kept: Kept = ui.data(|d| d.get_temp(id)).flatten();
    if let Some((revision, atoms, ties)) = kept
        && revision == session.revision()
        && atoms == place.atoms
    {
        return ties;
    }
    let ties = Arc::new(pipeline::why(session.drawing(), place));
    let kept: Kept = Some((session.revision(), place.atoms.clone(), Arc::clone(&ties)));
    ui.data_mut(|d| d.insert_temp(id, kept));
    ties
}

/// The rule and the sphere that part a ligand from the next, and what was compared there.
fn tie_row(ui: &mut Ui, tie: &Tie, colors: &Colors) {
    let set = |members: &[Compared]| {
        let words: Vec<String> = members
            .iter()
            .map(|m| {
                if m.is_duplicate {
                    format!("({})", m.text)
                } else {
                    m.text.clone()
                }
            })
            .collect();
        match words.as_slice() {
            [only] => only.clone(),
            _ => format!("{{{}}}", words.join(",")),
        }
    };
    let text = format!(
        "sphere {}, Rule {}: {} over {}",
        tie.sphere,
        tie.rule.name(),
        set(&tie.higher),
        set(&tie.lower)
    );
    ui.horizontal(|ui| {
        ui.spacing_mut().item_spacing.x = 0.0;
        ui.add_space(26.0);
        let label = RichText::new(text).size(TEXT - 2.0).color(colors.muted);
        ui.add(egui::Label::new(label).wrap())
            .on_hover_text(format!(
                "Rule {}: {}. Duplicate atoms stand in parentheses",
                tie.rule.name(),
                meaning(tie.rule)
            ));
    });
}

/// Wedges that say nothing and marks that contradict each other, a sentence each.
fn faults(ui: &mut Ui, session: &Session) {
    let colors = Colors::of(ui);
    for idle in &session.report().idle {
        ui.add_space(GRID);
        let text = RichText::new(&idle.text)
            .size(TEXT - 0.5)
            .color(colors.verdict(Verdict::Opposite));
        ui.add(egui::Label::new(text).wrap());
    }
}

fn ligand_row(ui: &mut Ui, session: &Session, name: &str, ligand: Ligand, colors: &Colors) {
    ui.horizontal(|ui| {
        ui.spacing_mut().item_spacing.x = 0.0;
        ui.set_min_height(26.0);
        let (rect, _) = ui.allocate_exact_size(vec2(26.0, 22.0), Sense::hover());
        ui.painter().text(
            rect.left_center(),
            Align2::LEFT_CENTER,
            name,
            theme::italic(TEXT + 1.0),
            colors.accent,
        );
        let (text, number) = describe(session, ligand, colors.ink);
        ui.label(text);
        if !number.is_empty() {
            ui.add_space(GRID);
            ui.label(
                RichText::new(number)
                    .size(CAPTION + 1.0)
                    .color(colors.muted),
            );
        }
    });
}

/// A ligand in words, and its atom's number.
fn describe(session: &Session, ligand: Ligand, color: Color32) -> (LayoutJob, String) {
    let m = session.drawing().molecule();
    let mut job = LayoutJob::default();
    let number = match ligand {
        Ligand::Hydrogen => {
            scripted(&mut job, "H", 1, TEXT, color);
            "not drawn".to_owned()
        }
        Ligand::LonePair => {
            scripted(&mut job, "lone pair", 1, TEXT, color);
            String::new()
        }
        Ligand::Atom(a) if a.index() >= m.n_atoms() => String::new(),
        Ligand::Atom(a) => {
            scripted(&mut job, m.element(a).symbol(), 1, TEXT, color);
            match m.hydrogens(a) {
                0 => {}
                n => scripted(&mut job, "H", usize::from(n), TEXT, color),
            }
            format!("atom {}", a.index() + 1)
        }
    };
    (job, number)
}

/// What a rule prefers.
fn meaning(rule: Rule) -> &'static str {
    match rule {
        Rule::R1a => "the higher atomic number goes first",
        Rule::R1b => "the duplicate of an atom nearer the root goes first",
        Rule::R2 => "the higher mass goes first",
        Rule::R3 => "Z goes before E",
        Rule::R4a => "chiral units go before pseudoasymmetric ones",
        Rule::R4b => "like pairs of descriptors go before unlike ones",
        Rule::R4c => "r goes before s",
        Rule::R5 => "R goes before S",
        Rule::R6 => "the chosen reference goes first",
    }
}
