//! The list of findings, driven by role and label as a person would.
#![allow(
    clippy::unwrap_used,
    clippy::panic,
    reason = "helpers of tests fail the test that calls them"
)]

use chem::audit::{Grade, Kind};
use chem::drawing::Mark;
use chem::format::molfile;
use chem::molecule::{AtomIx, BondIx};
use egui::accesskit::{Role, Toggled};
use egui::{Key, Modifiers, Vec2, vec2};
use egui_kittest::Harness;
use egui_kittest::kittest::{NodeT, Queryable};
use wedgewright::session::files::Document;
use wedgewright::session::{Looking, Session};
use wedgewright::window::Window;

type Driven<'a> = Harness<'a, Window>;

/// What a colleague drew: marks that disagree at atom 6, a wedge wide at its centre, atom 4, and one that
/// says nothing, from atom 8 to atom 9.
const COLLEAGUE: &str = include_str!("../../examples/tern3-colleague.mol");
/// Two hashed wedges in rings, which drawn hydrogens would bear better.
const RINGS: &str = include_str!("../../examples/plover9-side-chain.mol");

const IDLE: &str = "Make the bond 8-9 plain: keeps the meaning";
const SET: &str = "Draw atom 6 as R: make the bond 6-7 plain: sets the meaning";

fn open<'a>(text: &str, line: &str, size: Vec2) -> Driven<'a> {
    let record = molfile::read(text, 1).unwrap();
    let session = Session::of(Document::of(record), None, line.to_owned());
    drive(session, size)
}

fn drive<'a>(session: Session, size: Vec2) -> Driven<'a> {
    let window = Window::new(session).with_typed_paths();
    let mut h = Harness::builder()
        .with_size(size)
        .build_ui_state(|ui, w: &mut Window| w.show(ui), window);
    h.run_steps(3);
    looked(&mut h);
    h
}

fn wide<'a>(text: &str) -> Driven<'a> {
    open(text, "", vec2(1280.0, 800.0))
}

/// Waits for the audit and for what else runs beside the window.
fn looked(h: &mut Driven<'_>) {
    for _ in 0..600 {
        h.run_steps(1);
        let session = h.state().session();
        if session.looking() != Looking::Looking && !session.is_searching() {
            h.run_steps(2);
            return;
        }
        std::thread::sleep(std::time::Duration::from_millis(10));
    }
    panic!("the audit does not end");
}

fn click(h: &mut Driven<'_>, words: &str) {
    h.get_by_role_and_label(Role::Button, words)
        .click_accesskit();
    h.run_steps(2);
    looked(h);
}

/// The row of a finding, whose words begin so.
fn choose(h: &mut Driven<'_>, begin: &str) {
    let is_it = |label: Option<String>| label.is_some_and(|l| l.starts_with(begin));
    h.get_by(|n| n.role() == Role::Button && is_it(n.label()))
        .click_accesskit();
    h.run_steps(3);
}

fn keys(h: &mut Driven<'_>, modifiers: Modifiers, key: Key) {
    h.key_press_modifiers(modifiers, key);
    h.run_steps(2);
    looked(h);
}

fn count(h: &Driven<'_>, grade: Grade) -> usize {
    h.state().session().n_findings(grade)
}

fn mark(h: &Driven<'_>, bond: usize) -> Mark {
    h.state().session().drawing().mark(BondIx::new(bond))
}

fn selected(h: &Driven<'_>) -> Vec<usize> {
    let atoms = h.state().session().selection().atoms.iter();
    atoms.map(|a| a.index() + 1).collect()
}

fn grades(session: &Session) -> Vec<Grade> {
    session.findings().iter().map(|f| f.grade).collect()
}

#[test]
fn a_fault_is_seen_mended_and_brought_back() {
    let mut h = wide(COLLEAGUE);
    let found = grades(h.state().session());
    assert!(found.is_sorted(), "the gravest first: {found:?}");
    assert!(count(&h, Grade::Wrong) >= 2 && count(&h, Grade::Unclear) == 1);
    choose(
        &mut h,
        "unclear: The solid wedge from atom 8 to atom 9 says nothing",
    );
    assert_eq!(selected(&h), [8]);
    assert_ne!(mark(&h, 7), Mark::Plain);
    click(&mut h, IDLE);
    assert_eq!(mark(&h, 7), Mark::Plain);
    assert_eq!(count(&h, Grade::Unclear), 0);
    let session = h.state().session();
    assert_eq!(session.undo_name(), Some("Make the bond 8-9 plain"));
    let [entry] = session.log() else {
        panic!("one mend in the log");
    };
    assert_eq!(
        (entry.reason.kind, entry.keeps_meaning),
        (Kind::IdleMark, true)
    );
    assert!(entry.reason.mends.is_empty());
    assert_eq!(entry.before[0].text(), "solid wedge 8-9");
    assert_eq!(entry.after.len(), 1);
    assert!(h.query_by_label("1 mend in the log").is_some());
    keys(&mut h, Modifiers::COMMAND, Key::Z);
    assert_ne!(mark(&h, 7), Mark::Plain);
    assert_eq!(count(&h, Grade::Unclear), 1);
    assert!(h.state().session().log().is_empty());
    assert!(h.query_by_label("1 mend in the log").is_none());
    keys(&mut h, Modifiers::COMMAND | Modifiers::SHIFT, Key::Z);
    assert_eq!(h.state().session().log().len(), 1);
}

#[test]
fn a_mend_that_sets_the_meaning_says_so() {
    let mut h = wide(COLLEAGUE);
    assert!(h.query_by_label(SET).is_none(), "only under the chosen row");
    choose(&mut h, "wrong: The marks at atom 6 disagree");
    click(&mut h, SET);
    let entry = &h.state().session().log()[0];
    assert!(!entry.keeps_meaning && entry.reason.kind == Kind::Contradiction);
    let report = h.state().session().report();
    let six = [AtomIx::new(5)];
    let place = report.places.iter().find(|p| p.atoms == six).unwrap();
    assert_eq!(place.carries.unwrap().to_string(), "R");
}

#[test]
fn the_line_makes_wrong_what_it_is_not_and_its_mend_serves_it() {
    let mut h = open(COLLEAGUE, "(6S)", vec2(1280.0, 800.0));
    choose(&mut h, "wrong: The marks at atom 6 disagree");
    let serves = |label: Option<String>| {
        label.is_some_and(|l| l.ends_with("sets the meaning, as the line asks"))
    };
    h.get_by(|n| n.role() == Role::Button && serves(n.label()))
        .click_accesskit();
    h.run_steps(2);
    looked(&mut h);
    assert!(h.state().session().report().all_agree());
}

#[test]
fn all_that_keeps_the_meaning_is_one_step() {
    let mut h = wide(RINGS);
    let before = h.state().session().drawing().molecule().n_atoms();
    let carried = h.state().session().report().labels_line();
    let n = count(&h, Grade::PoorStyle);
    assert_eq!(n, 2);
    click(&mut h, "Mend all that keeps the meaning");
    let session = h.state().session();
    assert_eq!(session.undo_name(), Some("Mend all that keeps the meaning"));
    assert_eq!(session.log().len(), 2);
    assert_eq!(session.drawing().molecule().n_atoms(), before + 2);
    assert_eq!(session.report().labels_line(), carried);
    assert!(session.findings().is_empty());
    assert!(h.query_by_label("2 mends in the log").is_some());
    assert!(
        h.query_by_label("Nothing that a reader could take wrongly was found")
            .is_some()
    );
    assert!(
        h.query_by_label("Mend all that keeps the meaning")
            .is_none()
    );
    keys(&mut h, Modifiers::COMMAND, Key::Z);
    assert_eq!(count(&h, Grade::PoorStyle), 2);
    keys(&mut h, Modifiers::COMMAND | Modifiers::SHIFT, Key::M);
    assert_eq!(
        h.state().session().log().len(),
        2,
        "by its shortcut as well"
    );
}

#[test]
fn a_count_shows_and_hides_its_grade() {
    let mut h = wide(COLLEAGUE);
    let begins = |h: &Driven<'_>, words: &str| {
        let words = words.to_owned();
        let is_it = move |label: Option<String>| label.is_some_and(|l| l.starts_with(&words));
        h.query_all_by(|n| n.role() == Role::Button && is_it(n.label()))
            .next()
            .is_some()
    };
    assert!(begins(&h, "unclear: "));
    let chip = h.get_by_role_and_label(Role::CheckBox, "1 unclear");
    assert_eq!(chip.accesskit_node().toggled(), Some(Toggled::True));
    chip.click_accesskit();
    h.run_steps(2);
    assert!(!begins(&h, "unclear: ") && begins(&h, "wrong: "));
    for (grade, name) in [(Grade::Wrong, "wrong"), (Grade::Open, "open")] {
        let words = format!("{} {name}", count(&h, grade));
        h.get_by_role_and_label(Role::CheckBox, &words)
            .click_accesskit();
        h.run_steps(2);
    }
    assert!(
        h.query_by_label("The findings are hidden: press a count above to show them")
            .is_some()
    );
    // a hidden finding is not stepped to
    keys(&mut h, Modifiers::COMMAND, Key::PageDown);
    assert_eq!(h.state().session().chosen_finding(), None);
    h.get_by_role_and_label(Role::CheckBox, "1 unclear")
        .click_accesskit();
    h.run_steps(2);
    keys(&mut h, Modifiers::COMMAND, Key::PageDown);
    assert_eq!(selected(&h), [8]);
}

#[test]
fn findings_are_stepped_through_round_and_round() {
    let mut h = wide(COLLEAGUE);
    let n = h.state().session().findings().len();
    for i in (0..n).chain([0]) {
        keys(&mut h, Modifiers::COMMAND, Key::PageDown);
        assert_eq!(h.state().session().chosen_finding(), Some(i));
    }
    keys(&mut h, Modifiers::COMMAND, Key::PageUp);
    assert_eq!(h.state().session().chosen_finding(), Some(n - 1));
    h.key_press(Key::Escape);
    h.run_steps(2);
    assert_eq!(h.state().session().chosen_finding(), None);
}

#[test]
fn what_a_mend_would_leave_is_shown_and_nothing_is_changed() {
    let mut h = wide(COLLEAGUE);
    choose(&mut h, "unclear: ");
    // the row is scrolled to
    h.run_steps(30);
    assert!(!h.state().shows_mend());
    let revision = h.state().session().revision();
    let at = h.get_by_role_and_label(Role::Button, IDLE).rect().center();
    h.hover_at(at);
    h.run_steps(2);
    assert!(h.state().shows_mend());
    h.hover_at(egui::pos2(300.0, 400.0));
    h.run_steps(2);
    assert!(!h.state().shows_mend());
    h.get_by_role_and_label(Role::Button, IDLE).focus();
    h.run_steps(2);
    assert!(h.state().shows_mend(), "by the keyboard as well");
    assert_eq!(h.state().session().revision(), revision);
    h.key_press(Key::Enter);
    h.run_steps(2);
    looked(&mut h);
    assert_eq!(mark(&h, 7), Mark::Plain);
    assert!(!h.state().shows_mend());
}

#[test]
fn a_small_window_scrolls_to_what_is_chosen() {
    let mut h = open(COLLEAGUE, "", vec2(400.0, 300.0));
    keys(&mut h, Modifiers::COMMAND, Key::PageDown);
    h.run_steps(30);
    let begin = |label: Option<String>| label.is_some_and(|l| l.starts_with("wrong: "));
    let row = h.get_all_by_role(Role::Button).find(|n| {
        begin(n.accesskit_node().label()) && n.accesskit_node().toggled() == Some(Toggled::True)
    });
    let rect = row.unwrap().rect();
    assert!(rect.min.y >= 0.0 && rect.min.y < 300.0, "{rect:?}");
    assert!(rect.max.x <= 400.0, "{rect:?}");
}

#[test]
fn a_stale_offer_is_not_taken() {
    let record = molfile::read(COLLEAGUE, 1).unwrap();
    let mut s = Session::of(Document::of(record), None, String::new());
    let look = s.take_look().unwrap();
    assert!(s.take_look().is_none(), "once for each revision");
    s.seen(look.run());
    let finding = s
        .findings()
        .iter()
        .position(|f| f.kind == Kind::IdleMark)
        .unwrap();
    let offer = wedgewright::session::Offer {
        revision: s.revision(),
        finding,
        mend: 0,
    };
    assert!(s.after_mend(offer).is_some());
    let edit = chem::drawing::Edit::Mark(BondIx::new(0), Mark::Plain);
    s.step("Another step", &[edit]).unwrap();
    assert!(s.after_mend(offer).is_none());
    s.mend(offer).unwrap();
    assert!(s.log().is_empty() && s.undo_name() == Some("Another step"));
    assert_eq!(s.looking(), Looking::Looking);
    // after undo the findings are there at once
    s.undo();
    assert_eq!(s.looking(), Looking::Known);
    s.mend(offer).unwrap();
    assert_eq!(s.log().len(), 1);
}

#[test]
fn an_audit_that_broke_off_is_told() {
    let record = molfile::read(COLLEAGUE, 1).unwrap();
    let mut s = Session::of(Document::of(record), None, String::new());
    s.looked_in_vain();
    assert_eq!(s.looking(), Looking::Looking, "nothing was given yet");
    let late = s.take_look().unwrap();
    s.looked_in_vain();
    assert_eq!(s.looking(), Looking::Failed);
    s.seen(late.run());
    assert_eq!(s.looking(), Looking::Known);
}
