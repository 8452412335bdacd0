//! The window, driven by role and label as a person would.
#![allow(
    clippy::unwrap_used,
    clippy::panic,
    reason = "helpers of tests fail the test that calls them"
)]

use chem::drawing::{End, Mark};
use chem::molecule::{AtomIx, BondIx, Order};
use egui::accesskit::Role;
use egui::{Key, Modifiers, Pos2, vec2};
use egui_kittest::Harness;
use egui_kittest::kittest::Queryable;
use wedgewright::session::Session;
use wedgewright::window::Window;

type Driven<'a> = Harness<'a, Window>;

fn drive<'a>(window: Window) -> Driven<'a> {
    let mut h = Harness::builder()
        .with_size(vec2(1280.0, 800.0))
        .build_ui_state(|ui, w: &mut Window| w.show(ui), window.with_typed_paths());
    h.run_steps(3);
    h
}

fn empty<'a>() -> Driven<'a> {
    drive(Window::new(Session::empty()))
}

fn sheet(h: &Driven<'_>) -> Pos2 {
    h.get_by_role_and_label(Role::Canvas, "Sheet")
        .rect()
        .center()
}

fn drag(h: &mut Driven<'_>, from: Pos2, to: Pos2) {
    h.hover_at(from);
    h.run_steps(1);
    h.drag_at(from);
    h.run_steps(1);
    h.hover_at(from + 0.5 * (to - from));
    h.run_steps(1);
    h.hover_at(to);
    h.run_steps(1);
    h.drop_at(to);
    h.run_steps(2);
}

fn click(h: &mut Driven<'_>, at: Pos2) {
    h.hover_at(at);
    h.run_steps(1);
    h.drag_at(at);
    h.drop_at(at);
    // a second press within the time of a double click would be one
    h.run_steps(5);
}

fn at(h: &Driven<'_>, atom: usize) -> Pos2 {
    h.state().screen_of(AtomIx::new(atom)).unwrap()
}

fn between(h: &Driven<'_>, a: usize, b: usize) -> Pos2 {
    at(h, a) + 0.5 * (at(h, b) - at(h, a))
}

fn press(h: &mut Driven<'_>, key: Key) {
    h.key_press(key);
    h.run_steps(2);
}

fn type_on_sheet(h: &mut Driven<'_>, text: &str) {
    h.event(egui::Event::Text(text.to_owned()));
    h.run_steps(3);
}

fn type_line(h: &mut Driven<'_>, text: &str) {
    let line = h.get_by_label("must carry");
    line.focus();
    h.run_steps(1);
    for letter in text.chars() {
        h.get_by_label("must carry").type_text(&letter.to_string());
        h.run_steps(2);
    }
    settled(h);
}

/// Waits for the search, which runs beside the window.
fn settled(h: &mut Driven<'_>) {
    for _ in 0..600 {
        h.run_steps(1);
        if !h.state().session().is_searching() {
            return;
        }
        std::thread::sleep(std::time::Duration::from_millis(10));
    }
    panic!("the search does not end");
}

/// Presses the keys of a command that asks for a path, and types one.
fn type_path(h: &mut Driven<'_>, modifiers: Modifiers, key: Key, path: &std::path::Path) {
    h.key_press_modifiers(modifiers, key);
    h.run_steps(3);
    h.get_by_label("file path").focus();
    h.run_steps(1);
    h.key_press_modifiers(Modifiers::COMMAND, Key::A);
    h.run_steps(1);
    let text = path.to_string_lossy().into_owned();
    h.get_by_label("file path").type_text(&text);
    h.run_steps(1);
    press(h, Key::Enter);
    h.run_steps(2);
}

/// Alanine, drawn with the pen: atom 2 is the centre.
fn alanine<'a>() -> Driven<'a> {
    let mut h = empty();
    let c = sheet(&h);
    drag(&mut h, c, c + vec2(60.0, 34.0));
    let from = at(&h, 1);
    drag(&mut h, from, from + vec2(60.0, -34.0));
    let from = at(&h, 1);
    drag(&mut h, from, from + vec2(0.0, 70.0));
    let from = at(&h, 2);
    drag(&mut h, from, from + vec2(0.0, -70.0));
    let from = at(&h, 2);
    drag(&mut h, from, from + vec2(60.0, 34.0));
    assert_eq!(h.state().session().drawing().molecule().n_bonds(), 5);
    let from = at(&h, 2);
    let to = at(&h, 4);
    drag(&mut h, from, to);
    for (atom, element) in [(0, "N"), (4, "O"), (5, "O")] {
        let place = at(&h, atom);
        click(&mut h, place);
        type_on_sheet(&mut h, element);
        press(&mut h, Key::Enter);
    }
    press(&mut h, Key::Escape);
    h
}

fn mark(h: &Driven<'_>, bond: usize) -> Mark {
    h.state().session().drawing().mark(BondIx::new(bond))
}

fn marks(h: &Driven<'_>) -> usize {
    let drawing = h.state().session().drawing();
    drawing
        .marks()
        .iter()
        .filter(|m| **m != Mark::Plain)
        .count()
}

#[test]
fn a_skeleton_is_drawn_and_grafted_by_hand() {
    let h = alanine();
    let m = h.state().session().drawing().molecule().clone();
    let parts = m.formula();
    assert_eq!(parts, [("C", 3), ("H", 7), ("N", 1), ("O", 2)]);
    assert_eq!(m.bond(BondIx::new(3)).order, Order::Double);
    h.get_by_label("C3H7NO2");
}

#[test]
fn the_pen_closes_a_ring_and_snaps() {
    let mut h = empty();
    let c = sheet(&h);
    drag(&mut h, c, c + vec2(70.0, 5.0));
    for i in 1..5_usize {
        let from = at(&h, i);
        let angle = std::f32::consts::FRAC_PI_3 * i as f32 + 0.05;
        drag(&mut h, from, from + 60.0 * vec2(angle.cos(), -angle.sin()));
    }
    let (from, to) = (at(&h, 5), at(&h, 0));
    drag(&mut h, from, to);
    let m = h.state().session().drawing().molecule();
    assert_eq!((m.n_atoms(), m.n_bonds()), (6, 6));
}

#[test]
fn a_line_sets_the_marks_and_undo_takes_them_back() {
    let mut h = alanine();
    type_line(&mut h, "(2S)");
    assert!(marks(&h) > 0);
    h.get_by_label("carries (2S)");
    h.get_by_label("agrees");
    h.get_by_label("Place 2: must carry S, carries S, agrees");
    press(&mut h, Key::Enter);
    assert_eq!(h.state().session().undo_name(), Some("Carry (2S)"));
    h.key_press_modifiers(Modifiers::COMMAND, Key::Z);
    h.run_steps(2);
    assert_eq!(marks(&h), 0);
    assert_eq!(h.state().session().line(), "");
    // all in one frame, released again at its end
    let redo = Modifiers::COMMAND | Modifiers::SHIFT;
    for pressed in [true, false] {
        h.event(egui::Event::Key {
            key: Key::Z,
            physical_key: None,
            pressed,
            repeat: false,
            modifiers: redo,
        });
    }
    h.run_steps(2);
    h.get_by_label("carries (2S)");
}

#[test]
fn a_refused_line_says_why_and_changes_nothing() {
    let mut h = alanine();
    let before = h.state().session().drawing().clone();
    type_line(&mut h, "(2S,3R)");
    let session = h.state().session();
    let why = match (session.requirement(), session.refusal()) {
        (Err(error), _) => error.text.clone(),
        (_, Some(refusal)) => refusal.text.clone(),
        _ => panic!("3R was taken"),
    };
    h.get_by_label(&why);
    press(&mut h, Key::Enter);
    let after = h.state().session().drawing();
    assert_eq!(before.marks(), after.marks());
    assert_eq!(before.points(), after.points());
}

#[test]
fn arrows_raise_lower_and_swap() {
    let mut h = alanine();
    let place = between(&h, 1, 3);
    click(&mut h, place);
    press(&mut h, Key::ArrowUp);
    assert_eq!(mark(&h, 2), Mark::Solid(End::First));
    press(&mut h, Key::ArrowLeft);
    assert_eq!(mark(&h, 2), Mark::Solid(End::Second));
    press(&mut h, Key::ArrowRight);
    press(&mut h, Key::ArrowDown);
    assert_eq!(mark(&h, 2), Mark::Hashed(End::First));
    press(&mut h, Key::ArrowDown);
    assert_eq!(mark(&h, 2), Mark::Plain);
}

#[test]
fn delete_removes_and_a_place_selects() {
    let mut h = alanine();
    let place = h.get_by_label_contains("Place 2: nothing asked");
    place.click();
    h.run_steps(3);
    let chosen = h.state().session().selection().only_atom();
    assert_eq!(chosen, Some(AtomIx::new(1)));
    let place = at(&h, 3);
    click(&mut h, place);
    press(&mut h, Key::Delete);
    assert_eq!(h.state().session().drawing().molecule().n_atoms(), 5);
    assert_eq!(h.state().session().undo_name(), Some("Delete"));
}

#[test]
fn a_drag_on_the_selection_moves_it_in_one_step() {
    let mut h = alanine();
    let (from, other) = (at(&h, 3), at(&h, 0));
    click(&mut h, from);
    let steps = h.state().session().undo_name().map(str::to_owned);
    assert_ne!(steps.as_deref(), Some("Move"));
    drag(&mut h, from, from + vec2(-50.0, 40.0));
    assert!(at(&h, 3).distance(from + vec2(-50.0, 40.0)) < 1.0);
    assert!(at(&h, 0).distance(other) < 0.01);
    assert_eq!(h.state().session().undo_name(), Some("Move"));
    h.key_press_modifiers(Modifiers::COMMAND, Key::Z);
    h.run_steps(2);
    assert!(at(&h, 3).distance(from) < 0.01);
    assert_ne!(h.state().session().undo_name(), Some("Move"));
}

#[test]
fn an_area_selects_and_a_lone_methyl_goes_with_its_bond() {
    let mut h = alanine();
    let (from, to) = (
        at(&h, 2) + vec2(-25.0, -100.0),
        at(&h, 5) + vec2(25.0, 30.0),
    );
    h.event(egui::Event::ModifiersChanged(Modifiers::SHIFT));
    drag(&mut h, from, to);
    h.event(egui::Event::ModifiersChanged(Modifiers::NONE));
    let selected: Vec<usize> = h
        .state()
        .session()
        .selection()
        .atoms
        .iter()
        .map(|a| a.index())
        .collect();
    assert_eq!(selected, [2, 4, 5]);
    let place = between(&h, 1, 3);
    click(&mut h, place);
    press(&mut h, Key::Delete);
    assert_eq!(h.state().session().drawing().molecule().n_atoms(), 5);
}

#[test]
fn page_keys_walk_through_atoms_and_bonds() {
    let mut h = alanine();
    press(&mut h, Key::PageUp);
    let atom = h.state().session().selection().only_atom();
    assert_eq!(atom, Some(AtomIx::new(5)));
    h.key_press_modifiers(Modifiers::SHIFT, Key::PageDown);
    h.run_steps(2);
    let bond = h.state().session().selection().only_bond();
    assert_eq!(bond, Some(BondIx::new(0)));
}

#[test]
fn a_figure_is_written_by_its_ending() {
    let folder = std::env::temp_dir().join(format!("wedgewright-figure-{}", std::process::id()));
    std::fs::create_dir_all(&folder).unwrap();
    let mut h = drive(Window::demo());
    for (name, start) in [("a.svg", "<"), ("a.pdf", "%PDF"), ("a.png", "\u{fffd}PNG")] {
        let path = folder.join(name);
        type_path(&mut h, Modifiers::COMMAND | Modifiers::SHIFT, Key::F, &path);
        let bytes = std::fs::read(&path).unwrap();
        assert!(String::from_utf8_lossy(&bytes).starts_with(start), "{name}");
    }
    let path = folder.join("a.gif");
    type_path(&mut h, Modifiers::COMMAND | Modifiers::SHIFT, Key::F, &path);
    h.get_by_label_contains(".svg, .pdf or .png");
    assert!(!path.exists());
    std::fs::remove_dir_all(&folder).unwrap();
}

#[test]
fn a_figure_takes_the_style_and_descriptors_of_the_menu() {
    let folder = std::env::temp_dir().join(format!("wedgewright-style-{}", std::process::id()));
    std::fs::create_dir_all(&folder).unwrap();
    let mut h = drive(Window::demo());
    for item in ["Figure style: journal", "Figure: without descriptors"] {
        h.get_by_label("File").click();
        h.run_steps(4);
        h.get_by_label_contains(item).click();
        h.run_steps(4);
    }
    let path = folder.join("a.svg");
    type_path(&mut h, Modifiers::COMMAND | Modifiers::SHIFT, Key::F, &path);
    h.get_by_label_contains("saved, style patent");
    let choice = h.state().session().figure();
    assert_eq!((choice.style.name, choice.descriptors), ("patent", true));
    let styled = std::fs::read(&path).unwrap();
    let other = folder.join("b.svg");
    let mut plain = drive(Window::demo());
    type_path(
        &mut plain,
        Modifiers::COMMAND | Modifiers::SHIFT,
        Key::F,
        &other,
    );
    assert_ne!(styled, std::fs::read(&other).unwrap());
    std::fs::remove_dir_all(&folder).unwrap();
}

#[test]
fn keys_pressed_twice_within_a_frame_count_twice() {
    let mut h = alanine();
    let before = h.state().session().undo_name().map(str::to_owned);
    assert!(before.is_some());
    let n = h.state().session().drawing().molecule().n_atoms();
    for _ in 0..2 {
        for pressed in [true, false] {
            h.event(egui::Event::Key {
                key: Key::Z,
                physical_key: None,
                pressed,
                repeat: false,
                modifiers: Modifiers::COMMAND,
            });
        }
    }
    h.run_steps(2);
    h.key_press_modifiers(Modifiers::COMMAND | Modifiers::SHIFT, Key::Z);
    h.run_steps(2);
    let once = h.state().session().drawing().molecule().n_atoms();
    h.key_press_modifiers(Modifiers::COMMAND | Modifiers::SHIFT, Key::Z);
    h.run_steps(2);
    // two steps were taken back, so two can be made again
    assert_eq!(h.state().session().undo_name().map(str::to_owned), before);
    assert_eq!(h.state().session().drawing().molecule().n_atoms(), n);
    assert!(h.state().session().redo_name().is_none() && once <= n);
}

#[test]
fn a_file_that_is_there_is_replaced_only_when_asked_twice() {
    let folder = std::env::temp_dir().join(format!("wedgewright-twice-{}", std::process::id()));
    std::fs::create_dir_all(&folder).unwrap();
    let path = folder.join("there.mol");
    std::fs::write(&path, "mine").unwrap();
    let mut h = alanine();
    type_path(&mut h, Modifiers::COMMAND, Key::S, &path);
    h.get_by_label_contains("is there already");
    assert_eq!(std::fs::read_to_string(&path).unwrap(), "mine");
    h.get_by_label("Replace").click();
    h.run_steps(3);
    assert_ne!(std::fs::read_to_string(&path).unwrap(), "mine");
    std::fs::remove_dir_all(&folder).unwrap();
}

#[test]
fn the_keyboard_alone_draws() {
    let mut h = empty();
    for word in ["C", "-", "-", "N"] {
        type_on_sheet(&mut h, word);
        press(&mut h, Key::Enter);
    }
    let formula = h.state().session().drawing().molecule().formula();
    assert_eq!(formula, [("C", 2), ("H", 7), ("N", 1)]);
}

#[test]
fn a_graft_that_cannot_be_says_why_in_place() {
    let mut h = alanine();
    let place = at(&h, 3);
    click(&mut h, place);
    type_on_sheet(&mut h, "Qq");
    h.get_by_label("Qq is no element");
    let before = h.state().session().revision();
    press(&mut h, Key::Enter);
    h.get_by_label("Qq is no element");
    press(&mut h, Key::Escape);
    assert_eq!(h.state().session().revision(), before);
    assert!(h.query_by_label("Qq is no element").is_none());
}

#[test]
fn what_is_saved_by_a_typed_path_opens_again() {
    let folder = std::env::temp_dir().join(format!("wedgewright-window-{}", std::process::id()));
    std::fs::create_dir_all(&folder).unwrap();
    let path = folder.join("kept.mol");
    let mut h = alanine();
    type_line(&mut h, "(2R)");
    type_path(&mut h, Modifiers::COMMAND, Key::S, &path);
    assert_eq!(h.state().session().path(), Some(path.as_path()));
    let again = drive(Window::new(Session::open(&path).unwrap()));
    again.get_by_label("carries (2R)");
    assert!(!again.state().session().is_dirty());
    std::fs::remove_dir_all(&folder).unwrap();
}

#[test]
fn unsaved_work_is_asked_about() {
    let mut h = alanine();
    h.key_press_modifiers(Modifiers::COMMAND, Key::N);
    h.run_steps(3);
    h.get_by_label("Cancel").click();
    h.run_steps(3);
    assert!(h.state().session().is_dirty());
    h.key_press_modifiers(Modifiers::COMMAND, Key::N);
    h.run_steps(3);
    h.get_by_label("Leave without saving").click();
    h.run_steps(3);
    assert_eq!(h.state().session().drawing().molecule().n_atoms(), 0);
}

#[test]
fn a_file_that_cannot_be_opened_is_told() {
    let mut h = empty();
    h.key_press_modifiers(Modifiers::COMMAND, Key::O);
    h.run_steps(3);
    h.get_by_label("file path").type_text("no such file.mol");
    h.run_steps(1);
    press(&mut h, Key::Enter);
    h.get_by_label_contains("no such file.mol: there is no such file");
}

#[test]
fn the_first_drawing_is_workable_at_once() {
    let mut h = drive(Window::demo());
    assert!(h.state().session().requirement().is_ok());
    h.get_by_label("Make it carry").click();
    h.run_steps(2);
    settled(&mut h);
    assert_eq!(
        h.state().session().report().descriptor_line(),
        h.state().session().line()
    );
    assert!(h.query_by_label("Make it carry").is_none());
}

/// The harness fails on any sign that the faces lack, so showing everything is the test.
#[test]
fn every_sign_has_a_glyph_and_every_menu_opens() {
    let mut h = drive(Window::demo());
    for menu in ["File", "Edit", "Stereo", "View"] {
        h.get_by_label(menu).click();
        h.run_steps(4);
        press(&mut h, Key::Escape);
        h.run_steps(3);
    }
    let places = h.state().session().report().places.clone();
    for place in places {
        let locant = place.atoms.iter().min().unwrap().index() + 1;
        h.get_by_label_contains(&format!("Place {locant}:")).click();
        h.run_steps(3);
    }
}

/// A small generator with a fixed start, so that a failure comes again.
struct Chance(u64);

impl Chance {
    fn below(&mut self, n: usize) -> usize {
        self.0 = self
            .0
            .wrapping_mul(6_364_136_223_846_793_005)
            .wrapping_add(1_442_695_040_888_963_407);
        (self.0 >> 33) as usize % n
    }

    fn place(&mut self) -> Pos2 {
        Pos2::new(
            30.0 + self.below(900) as f32,
            150.0 + self.below(580) as f32,
        )
    }
}

/// Whatever is done in whatever order, the window stays up and its history leads back.
#[test]
fn wild_use_does_no_harm() {
    const WORDS: [&str; 12] = [
        "N", "O-", "=", "#", "-", "6", "6=", "3", "5=", "2+", "Qq", "é",
    ];
    const LINES: [&str; 8] = ["(1R", ",2S", "E", ")", "rac-", "8Z", "(((", "é*"];
    const KEYS: [Key; 10] = [
        Key::Enter,
        Key::Escape,
        Key::Delete,
        Key::ArrowUp,
        Key::ArrowDown,
        Key::ArrowLeft,
        Key::PageDown,
        Key::PageUp,
        Key::Tab,
        Key::Backspace,
    ];
    const COMMANDS: [Key; 8] = [
        Key::Z,
        Key::Y,
        Key::A,
        Key::L,
        Key::Enter,
        Key::Num0,
        Key::Plus,
        Key::D,
    ];
    let mut h = drive(Window::demo());
    let mut chance = Chance(2026);
    for _ in 0..250 {
        match chance.below(7) {
            0 | 1 => {
                let n = h.state().session().drawing().molecule().n_atoms();
                let from = match n {
                    0 => chance.place(),
                    n => at(&h, chance.below(n)),
                };
                let to = from + 0.2 * (chance.place() - from);
                drag(&mut h, from, to);
            }
            2 => {
                let place = chance.place();
                drag(&mut h, place, place + vec2(40.0, 25.0));
            }
            3 => type_on_sheet(&mut h, WORDS[chance.below(WORDS.len())]),
            4 => press(&mut h, KEYS[chance.below(KEYS.len())]),
            5 => {
                h.key_press_modifiers(Modifiers::COMMAND, COMMANDS[chance.below(COMMANDS.len())]);
                h.run_steps(2);
            }
            _ => {
                h.get_by_label("must carry").focus();
                h.run_steps(1);
                type_on_sheet(&mut h, LINES[chance.below(LINES.len())]);
            }
        }
    }
    settled(&mut h);
    let window = h.state();
    let drawing = window.session().drawing();
    assert_eq!(drawing.points().len(), drawing.molecule().n_atoms());
    let mut steps = 0;
    while h.state().session().undo_name().is_some() {
        h.key_press_modifiers(Modifiers::COMMAND, Key::Z);
        h.run_steps(1);
        press(&mut h, Key::Escape);
        steps += 1;
        assert!(steps < 1000, "undo does not end");
    }
    assert_eq!(h.state().session().line(), "(1R,2R,4R,8E)");
    assert_eq!(h.state().session().drawing().molecule().n_atoms(), 13);
}
