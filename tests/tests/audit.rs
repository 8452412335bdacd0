//! Findings against a table of small drawings with sources; findings and mends as properties of all
//! worked examples.
#![allow(
    clippy::expect_used,
    clippy::panic,
    reason = "a check that cannot be set up has failed"
)]

use checks::change::{self, Dice};
use checks::labels::Labels;
use checks::{labels_of, no_misses, top, worked};
use chem::audit::{Finding, Grade, Kind, findings, mend};
use chem::drawing::{Drawing, End, Mark};
use chem::element::Element;
use chem::geom::{self, Point};
use chem::molecule::{Atom, AtomIx, Bond, Molecule, Order};
use chem::pipeline;
use chem::solve::require::Requirement;
use std::collections::BTreeMap;

struct Row {
    title: String,
    drawing: Drawing,
    must: Requirement,
    found: Vec<String>,
}

/// The rows of `tests/corpus/findings.tsv`.
fn rows() -> Vec<Row> {
    let path = top().join("tests/corpus/findings.tsv");
    let text = std::fs::read_to_string(path).expect("the table");
    let lines = text
        .lines()
        .filter(|l| !l.starts_with('#') && !l.is_empty());
    let all: Vec<Row> = lines.map(row).collect();
    assert!(all.len() >= 40, "only {} rows", all.len());
    all
}

fn row(line: &str) -> Row {
    let cells: Vec<&str> = line.split('\t').collect();
    let [title, atoms, bonds, must, found, source] = cells.as_slice() else {
        panic!("{line}: not six columns");
    };
    assert!(!source.is_empty(), "{title}: no source");
    let drawing = drawn(atoms, bonds);
    let must = match *must {
        "-" => Requirement::default(),
        text => pipeline::understand(text, &drawing).expect("a requirement"),
    };
    let mut found: Vec<String> = match *found {
        "none" => Vec::new(),
        list => list.split(';').map(str::to_owned).collect(),
    };
    found.sort();
    Row {
        title: (*title).to_owned(),
        drawing,
        must,
        found,
    }
}

fn drawn(atoms: &str, bonds: &str) -> Drawing {
    let mut list = Vec::new();
    let mut points = Vec::new();
    for atom in atoms.split(';') {
        let words: Vec<&str> = atom.split(' ').collect();
        let number = |i: usize| words[i].parse::<f64>().expect("a number");
        list.push(Atom::new(
            Element::from_symbol(words[0]).expect("an element"),
        ));
        points.push(Point::new(number(1), number(2)));
    }
    let mut joined = Vec::new();
    let mut marks = Vec::new();
    for bond in bonds.split(' ') {
        let at = bond.find(|c: char| !c.is_ascii_digit()).expect("a bond");
        let sign = &bond[at..=at];
        let end = |text: &str| AtomIx::new(text.parse::<usize>().expect("an atom") - 1);
        let order = if matches!(sign, "=" | "x") {
            Order::Double
        } else {
            Order::Single
        };
        joined.push(Bond {
            ends: [end(&bond[..at]), end(&bond[at + 1..])],
            order,
        });
        marks.push(match sign {
            "w" => Mark::Solid(End::First),
            "h" => Mark::Hashed(End::First),
            "~" => Mark::Wavy(End::First),
            "x" => Mark::Crossed,
            _ => Mark::Plain,
        });
    }
    let molecule = Molecule::new(list, joined).expect("a molecule");
    Drawing::new(molecule, points, marks).expect("a drawing")
}

/// `grade kind atoms`, atoms from 1 in the finding's order.
fn spelled(f: &Finding) -> String {
    let atoms: Vec<String> = f
        .atoms
        .iter()
        .map(|a| (a.index() + 1).to_string())
        .collect();
    format!("{} {} {}", f.grade.name(), f.kind.name(), atoms.join(" "))
}

/// Findings by grade, kind and atoms, whatever their order, under other atom numbers.
fn tally(
    drawing: &Drawing,
    must: &Requirement,
    number: impl Fn(usize) -> usize,
) -> BTreeMap<String, usize> {
    let mut counts = BTreeMap::new();
    for f in findings(drawing, must) {
        let mut atoms: Vec<usize> = f.atoms.iter().map(|a| number(a.index() + 1)).collect();
        atoms.sort_unstable();
        *counts
            .entry(format!("{} {} {atoms:?}", f.grade.name(), f.kind.name()))
            .or_insert(0) += 1;
    }
    counts
}

fn kinds(drawing: &Drawing) -> Vec<(Grade, Kind)> {
    let mut list: Vec<_> = findings(drawing, &Requirement::default())
        .iter()
        .map(|f| (f.grade, f.kind))
        .collect();
    list.sort();
    list
}

/// All drawings there are: the table's and the worked examples, these also with every mark reversed so that
/// there is something to find.
fn drawings() -> Vec<(String, Drawing)> {
    let mut all: Vec<_> = rows().into_iter().map(|r| (r.title, r.drawing)).collect();
    for w in worked() {
        let reversed = change::remarked(&w.drawing, |m| {
            m.narrow().map_or(m, |end| m.at(end.other()))
        });
        all.push((format!("{}, reversed", w.title), reversed));
        all.push((w.title, w.drawing));
    }
    all
}

#[test]
fn the_table_is_found_and_nothing_else() {
    let mut misses = Vec::new();
    let all = rows();
    for r in &all {
        let mut found: Vec<String> = findings(&r.drawing, &r.must).iter().map(spelled).collect();
        found.sort();
        if found != r.found {
            misses.push(format!("{}: found {found:?}, not {:?}", r.title, r.found));
        }
    }
    no_misses(&misses, all.len());
}

#[test]
fn findings_do_not_depend_on_the_order_of_atoms() {
    let mut misses = Vec::new();
    let all = drawings();
    for (title, drawing) in &all {
        for seed in 1..=3 {
            let (other, numbers) = change::reordered(drawing, &mut Dice::new(seed));
            let none = Requirement::default();
            let before = tally(drawing, &none, |n| numbers[n - 1]);
            let after = tally(&other, &none, |n| n);
            if before != after {
                misses.push(format!("{title}: {before:?} became {after:?}"));
            }
        }
    }
    no_misses(&misses, all.len());
}

#[test]
fn findings_do_not_depend_on_place_size_and_turn() {
    let mut misses = Vec::new();
    let all = drawings();
    for (title, drawing) in &all {
        let mut dice = Dice::new(7);
        for _ in 0..3 {
            let angle = std::f64::consts::TAU * dice.unit();
            let scale = 10f64.powf(2.0 * dice.unit() - 1.0);
            let other = change::moved(drawing, |p| {
                let turned = geom::rotate(p, Point::ORIGIN, angle);
                (turned.to_vec2() * scale).to_point() + geom::Vec2::new(3.0, -8.0)
            });
            let none = Requirement::default();
            let (before, after) = (tally(drawing, &none, |n| n), tally(&other, &none, |n| n));
            if before != after {
                misses.push(format!("{title}: {before:?} became {after:?}"));
            }
        }
    }
    no_misses(&misses, all.len());
}

#[test]
fn a_mirror_image_has_the_same_kinds() {
    let mut misses = Vec::new();
    let all = drawings();
    for (title, drawing) in &all {
        for other in [change::mirrored(drawing), change::swapped(drawing)] {
            if kinds(&other) != kinds(drawing) {
                misses.push(format!(
                    "{title}: {:?} became {:?}",
                    kinds(drawing),
                    kinds(&other)
                ));
            }
        }
    }
    no_misses(&misses, all.len());
}

fn graver_than(after: &[Finding], before: &[Finding]) -> bool {
    let count = |list: &[Finding], grade| list.iter().filter(|f| f.grade == grade).count();
    let row = |list| [Grade::Wrong, Grade::Unclear, Grade::PoorStyle].map(|g| count(list, g));
    row(after) > row(before)
}

#[test]
fn mends_that_keep_the_meaning_keep_it_and_end() {
    let mut misses = Vec::new();
    let none = Requirement::default();
    let all = drawings();
    for (title, drawing) in &all {
        let mended = mend(drawing, &none);
        let (before, after) = (labels_of(drawing), labels_of(&mended.drawing));
        if before != after {
            misses.push(format!("{title}: {before} became {after}"));
        }
        if graver_than(&mended.left, &findings(drawing, &none)) {
            misses.push(format!("{title}: more is wrong than before"));
        }
        let again = mend(&mended.drawing, &none);
        if !again.steps.is_empty() {
            misses.push(format!(
                "{title}: a second run finds {} more",
                again.steps.len()
            ));
        }
    }
    no_misses(&misses, all.len());
}

/// Damages of a drawing that leave its atoms where they are.
fn damages(drawing: &Drawing) -> Vec<(&'static str, Drawing)> {
    let reversed = |m: Mark| m.narrow().map_or(m, |end| m.at(end.other()));
    let wavy = |m: Mark| m.narrow().map_or(m, Mark::Wavy);
    vec![
        ("swapped", change::swapped(drawing)),
        ("reversed", change::remarked(drawing, reversed)),
        ("wavy", change::remarked(drawing, wavy)),
        ("bare", change::bare(drawing)),
    ]
}

#[test]
fn damaged_drawings_are_mended_to_their_requirement() {
    let mut misses = Vec::new();
    let mut tried = 0;
    for w in worked() {
        let line = w.labels.as_name(&w.drawing);
        for (damage, drawing) in damages(&w.drawing) {
            let Ok(must) = pipeline::understand(&line, &drawing) else {
                misses.push(format!("{}: {line} is not understood", w.title));
                continue;
            };
            tried += 1;
            // what placing cannot draw, mending cannot either
            if pipeline::carry(&drawing, &must).is_err() {
                continue;
            }
            let mended = mend(&drawing, &must);
            let carried: Labels = labels_of(&mended.drawing);
            if carried != w.labels {
                misses.push(format!(
                    "{}, {damage}: {carried}, not {}",
                    w.title, w.labels
                ));
            }
        }
    }
    no_misses(&misses, tried);
}
