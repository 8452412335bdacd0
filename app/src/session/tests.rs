//! A session as the window drives it.

use super::*;
use chem::format::{Record, molfile};
use chem::geom::Point;
use chem::molecule::AtomIx;
use chem::pipeline::Verdict;

/// Alanine with nothing marked; atom 2 is the centre.
const ALANINE: &str = "alanine


  6  5  0  0  0  0            999 V2000
   -1.2000    0.7000    0.0000 N   0  0
    0.0000    0.0000    0.0000 C   0  0
    0.0000   -1.4000    0.0000 C   0  0
    1.2000    0.7000    0.0000 C   0  0
    2.4000    0.0000    0.0000 O   0  0
    1.2000    2.1000    0.0000 O   0  0
  1  2  1  0
  2  3  1  0
  2  4  1  0
  4  5  1  0
  4  6  2  0
M  END
";

fn alanine(line: &str) -> Session {
    let record: Record = molfile::read(ALANINE, 1).unwrap();
    Session::of(Document::of(record), None, line.to_owned())
}

fn work(session: &mut Session) {
    while let Some(work) = session.take_work() {
        session.answer(work.run());
    }
}

fn shift(session: &Session, atom: usize) -> Edit {
    let a = AtomIx::new(atom);
    let p = session.drawing().point(a);
    Edit::Move(a, Point::new(p.x + 0.1, p.y))
}

#[test]
fn steps_have_names_and_can_be_taken_back() {
    let mut s = alanine("");
    assert!(!s.is_dirty() && s.undo_name().is_none());
    let before = s.drawing().clone();
    let edit = shift(&s, 0);
    s.step("Move", &[edit]).unwrap();
    assert_eq!((s.undo_name(), s.is_dirty()), (Some("Move"), true));
    s.undo();
    assert!(Arc::ptr_eq(s.drawing(), &before) && !s.is_dirty());
    assert_eq!(s.redo_name(), Some("Move"));
    s.redo();
    assert!(s.is_dirty());
    s.undo();
    let edit = shift(&s, 1);
    s.step("Move another", &[edit]).unwrap();
    assert_eq!(s.redo_name(), None);
}

#[test]
fn a_faulty_step_changes_nothing() {
    let mut s = alanine("");
    let before = s.revision();
    assert!(
        s.step("Remove", &[Edit::RemoveAtom(AtomIx::new(77))])
            .is_err()
    );
    assert_eq!(s.revision(), before);
}

#[test]
fn locants_follow_their_atoms() {
    let mut s = alanine("(2S)");
    s.step("Delete", &[Edit::RemoveAtom(AtomIx::new(0))])
        .unwrap();
    assert_eq!(s.line(), "(1S)");
    s.undo();
    assert_eq!(s.line(), "(2S)");
    s.step("Delete", &[Edit::RemoveAtom(AtomIx::new(2))])
        .unwrap();
    assert_eq!(s.line(), "(2S)");
    s.step("Delete", &[Edit::RemoveAtom(AtomIx::new(1))])
        .unwrap();
    assert_eq!(s.line(), "");
}

#[test]
fn a_typed_line_is_one_step_and_its_marks_come_with_it() {
    let mut s = alanine("");
    for text in ["(", "(2", "(2S", "(2S)"] {
        s.ask(text);
        work(&mut s);
    }
    s.settle();
    assert_eq!(s.undo_name(), Some("Carry (2S)"));
    assert_eq!(s.requirement().map(|r| r.wanted.len()), Ok(1));
    assert_eq!(s.tally().verdict(), Verdict::Agrees);
    assert_eq!(s.report().descriptor_line(), "(2S)");
    s.undo();
    assert_eq!((s.line(), s.undo_name()), ("", None));
    assert!(
        s.drawing()
            .marks()
            .iter()
            .all(|m| *m == chem::drawing::Mark::Plain)
    );
    s.redo();
    assert_eq!(s.report().descriptor_line(), "(2S)");
}

#[test]
fn a_refused_line_says_why_and_changes_nothing() {
    let mut s = alanine("");
    let before = s.drawing().clone();
    s.ask("(2S,3R)");
    work(&mut s);
    s.settle();
    let why = match (s.refusal(), s.requirement()) {
        (Some(refusal), _) => refusal.text.clone(),
        (None, Err(error)) => error.text.clone(),
        (None, Ok(_)) => String::new(),
    };
    assert!(!why.is_empty());
    assert!(Arc::ptr_eq(s.drawing(), &before));
}

#[test]
fn a_line_that_is_not_understood_keeps_the_marks_while_it_is_typed_and_loses_them_after() {
    let mut s = alanine("");
    let before = s.drawing().clone();
    s.ask("(2S)");
    work(&mut s);
    assert!(!Arc::ptr_eq(s.drawing(), &before));
    let shown = s.drawing().clone();
    s.ask("(2S,?");
    work(&mut s);
    assert!(s.requirement().is_err());
    assert!(Arc::ptr_eq(s.drawing(), &shown));
    s.settle();
    assert!(Arc::ptr_eq(s.drawing(), &before));
}

#[test]
fn an_open_bracket_counts_while_it_is_typed_and_is_closed_after() {
    let mut s = alanine("");
    s.ask("(2R");
    work(&mut s);
    assert_eq!(s.report().descriptor_line(), "(2R)");
    assert_eq!(s.line(), "(2R");
    s.ask("(2R,");
    assert!(s.requirement().is_err());
    assert_eq!(s.tally().agrees, 1);
    s.ask("(2R");
    work(&mut s);
    s.settle();
    assert_eq!((s.line(), s.undo_name()), ("(2R)", Some("Carry (2R)")));
    assert_eq!(s.report().descriptor_line(), "(2R)");
}

#[test]
fn typing_that_ends_where_it_began_is_no_step() {
    let mut s = alanine("");
    s.ask("?");
    s.ask("");
    s.settle();
    assert_eq!(s.undo_name(), None);
    assert!(!s.is_dirty());
}

#[test]
fn an_answer_that_comes_too_late_is_dropped() {
    let mut s = alanine("");
    s.ask("(2S)");
    let late = s.take_work().unwrap().run();
    let edit = shift(&s, 0);
    s.step("Move", &[edit]).unwrap();
    let before = s.drawing().clone();
    s.answer(late);
    assert!(Arc::ptr_eq(s.drawing(), &before));
    assert!(s.can_carry());
    s.make_it_carry();
    work(&mut s);
    assert_eq!(s.undo_name(), Some("Carry (2S)"));
    assert_eq!(s.tally().verdict(), Verdict::Agrees);
}

#[test]
fn what_is_saved_is_read_again() {
    let folder = tempfile::tempdir().unwrap();
    let path = folder.path().join("a.mol");
    let mut s = alanine("");
    s.ask("(2R)");
    work(&mut s);
    s.save(&path).unwrap();
    assert!(!s.is_dirty());
    let again = Session::open(&path).unwrap();
    assert_eq!(again.report().descriptor_line(), "(2R)");
    assert_eq!(again.name(), "a.mol");
    let nowhere = folder.path().join("no/such/place.mol");
    let error = s.save(&nowhere).unwrap_err().to_string();
    assert!(error.contains("written"), "{error}");
    assert_eq!(s.path(), Some(path.as_path()));
    let error = Session::open(folder.path()).unwrap_err().to_string();
    assert!(error.contains("a folder"), "{error}");
}

#[test]
fn a_file_of_many_records_is_not_overwritten_by_one() {
    let folder = tempfile::tempdir().unwrap();
    let path = folder.path().join("two.sdf");
    let two = format!("{ALANINE}$$$$\n{ALANINE}$$$$\n");
    std::fs::write(&path, two).unwrap();
    let s = Session::open(&path).unwrap();
    assert_eq!(s.path(), None);
    assert!(s.notice().contains("2 records"));
}

/// Two centres in groups of their own; the atoms before them are one too many.
const GROUPED: &str = "\
butane rest

  test
  0  0  0     0  0            999 V3000
M  V30 BEGIN CTAB
M  V30 COUNTS 6 5 0 0 0
M  V30 BEGIN ATOM
M  V30 1 C 0 0 0 0
M  V30 2 C 1.3 0.75 0 0
M  V30 3 C 2.6 0 0 0
M  V30 4 C 3.9 0.75 0 0
M  V30 5 N 1.3 2.25 0 0
M  V30 6 O 2.6 -1.5 0 0
M  V30 END ATOM
M  V30 BEGIN BOND
M  V30 1 1 1 2
M  V30 2 1 2 3
M  V30 3 1 3 4
M  V30 4 1 2 5 CFG=1
M  V30 5 1 3 6 CFG=1
M  V30 END BOND
M  V30 BEGIN COLLECTION
M  V30 MDLV30/STERAC1 ATOMS=(1 3)
M  V30 MDLV30/STEREL2 ATOMS=(1 2)
M  V30 END COLLECTION
M  V30 END CTAB
M  END
";

#[test]
fn stereo_groups_follow_their_atoms_and_come_back_with_undo() {
    let record = molfile::read(GROUPED, 1).unwrap();
    let mut s = Session::of(Document::of(record), None, String::new());
    assert!(s.notice().contains("&1 (atom 3), or2 (atom 2)"));
    let folder = tempfile::tempdir().unwrap();
    let path = folder.path().join("groups.mol");
    let saved = |s: &mut Session| {
        s.save(&path).unwrap();
        let text = std::fs::read_to_string(&path).unwrap();
        let tags = text.lines().filter(|l| l.contains("MDLV30"));
        tags.map(str::to_owned).collect::<Vec<_>>()
    };
    let before = [
        "M  V30 MDLV30/STERAC1 ATOMS=(1 3)",
        "M  V30 MDLV30/STEREL2 ATOMS=(1 2)",
    ];
    assert_eq!(saved(&mut s), before);
    let remove = |atom| Edit::RemoveAtom(AtomIx::new(atom));
    s.step("Delete", &[remove(0)]).unwrap();
    let moved = [
        "M  V30 MDLV30/STERAC1 ATOMS=(1 2)",
        "M  V30 MDLV30/STEREL2 ATOMS=(1 1)",
    ];
    assert_eq!(saved(&mut s), moved);
    // a group goes with its last atom, and comes back with it
    s.step("Delete", &[remove(0)]).unwrap();
    assert_eq!(saved(&mut s), ["M  V30 MDLV30/STERAC1 ATOMS=(1 1)"]);
    s.undo();
    assert_eq!(saved(&mut s), moved);
    s.undo();
    assert_eq!(saved(&mut s), before);
}
