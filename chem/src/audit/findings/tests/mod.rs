//! One small drawing for each kind of finding, and drawings of which nothing must be said.

mod drawings;

use super::super::{Finding, Grade, Kind, findings};
use crate::drawing::{Drawing, Edit, End, Mark};
use crate::molecule::{AtomIx, BondIx};
use crate::solve::require::Requirement;
use crate::stereo::Descriptor;
use Grade::{Open, PoorStyle, Unclear, Wrong};
use drawings::*;

fn asked(atom: usize, d: Descriptor) -> Requirement {
    Requirement {
        text: String::new(),
        wanted: vec![(AtomIx::new(atom), d)],
    }
}

/// Drawing, what is asked, and what must be found: kind, grade, atoms from 1.
type Row = (Drawing, Requirement, Kind, Grade, &'static [usize]);

fn row(drawing: Drawing, kind: Kind, grade: Grade, atoms: &'static [usize]) -> Row {
    (drawing, Requirement::default(), kind, grade, atoms)
}

const CROSSED: [(usize, usize, u8, char); 3] = [(0, 1, 1, ' '), (1, 2, 2, 'x'), (2, 3, 1, ' ')];
const WAVY: [(usize, usize, u8, char); 3] = [(0, 1, 1, ' '), (1, 2, 2, ' '), (2, 3, 1, '~')];

/// What a requirement makes wrong.
fn asked_rows() -> Vec<Row> {
    let plain = || three(STAR, [' '; 3]);
    let solid = three(STAR, ['w', ' ', ' ']);
    let (r, s, e) = (Descriptor::R, Descriptor::S, Descriptor::E);
    vec![
        (solid, asked(0, s), Kind::Opposite, Wrong, &[1]),
        (plain(), asked(0, r), Kind::UndefinedCentre, Wrong, &[1]),
        (plain(), asked(1, r), Kind::NotStereogenic, Wrong, &[2]),
        (
            ene(-60.0, CROSSED),
            asked(1, e),
            Kind::CrossedDoubleBond,
            Wrong,
            &[2, 3],
        ),
        (
            ene(-60.0, WAVY),
            asked(1, e),
            Kind::UndefinedDoubleBond,
            Wrong,
            &[2, 3],
        ),
        (
            ene(-60.0, WAVY),
            asked(1, e),
            Kind::EitherMark,
            Wrong,
            &[2, 3],
        ),
        (
            allene(' '),
            asked(0, Descriptor::M),
            Kind::UndefinedAxis,
            Wrong,
            &[1, 3],
        ),
    ]
}

/// What is wrong or unclear in itself.
fn grave_rows() -> Vec<Row> {
    let mark = |marks| three(STAR, marks);
    let squeezed = |marks| three([90.0, 35.0, 145.0], marks);
    let haworth = ring(HAWORTH, &[(1, "N", 1.6, -1.0), (3, "C", -0.8, 0.05)], ' ');
    let chair = ring(CHAIR, &[(2, "N", 0.1, -1.45)], ' ');
    let close = four([90.0, 92.0, 210.0, 330.0], ['w', ' ', ' ', ' ']);
    vec![
        row(mark(['w', 'h', ' ']), Kind::Contradiction, Wrong, &[1]),
        row(mark(['~', 'h', ' ']), Kind::Contradiction, Wrong, &[1]),
        row(
            four(PAIR, ['w', ' ', ' ', 'w']),
            Kind::Contradiction,
            Wrong,
            &[1],
        ),
        row(wide_end(), Kind::WideEnd, Wrong, &[1, 4]),
        row(
            norbornane('w', 'h'),
            Kind::ImpossibleGeometry,
            Wrong,
            &[1, 4],
        ),
        row(five_bonds(), Kind::Valence, Wrong, &[1]),
        row(norbornane(' ', 'w'), Kind::UndefinedCentre, Unclear, &[1]),
        row(cross(), Kind::Projection, Unclear, &[1]),
        row(haworth, Kind::Projection, Unclear, &[2]),
        row(chair, Kind::Projection, Unclear, &[3]),
        row(close, Kind::Overlap, Unclear, &[1]),
        row(squeezed(['w', ' ', ' ']), Kind::Reentrant, Unclear, &[1]),
        row(squeezed(['w', 'w', 'w']), Kind::Reentrant, Unclear, &[1]),
        row(
            three([90.0, 0.0, 180.0], ['w', ' ', ' ']),
            Kind::StraightAngle,
            Unclear,
            &[1],
        ),
        row(ene(0.0, ENE), Kind::StraightDoubleBond, Unclear, &[2, 3]),
        row(same_side(), Kind::SameSide, Unclear, &[1, 2]),
        row(neighbors('~', 'w'), Kind::EitherMark, Unclear, &[1, 4]),
        row(neighbors('h', ' '), Kind::BetweenCentres, Unclear, &[1, 4]),
        row(
            four(PAIR, ['w', 'w', 'w', ' ']),
            Kind::SurplusMarks,
            Unclear,
            &[1],
        ),
        row(
            star(&[("C", 90.0, 1.0, 'w'), ("O", 210.0, 1.0, ' ')]),
            Kind::IdleMark,
            Unclear,
            &[1],
        ),
    ]
}

/// What is poor style, and what is left open.
fn light_rows() -> Vec<Row> {
    let umbrella = four([90.0, 30.0, 150.0, 270.0], ['w', ' ', ' ', ' ']);
    vec![
        row(
            four(CROSS, ['w', ' ', ' ', ' ']),
            Kind::StraightAngle,
            PoorStyle,
            &[1],
        ),
        row(ene(15.0, ENE), Kind::StraightDoubleBond, PoorStyle, &[2, 3]),
        row(
            ene(-60.0, CROSSED),
            Kind::CrossedDoubleBond,
            PoorStyle,
            &[2, 3],
        ),
        row(allene('w'), Kind::SingleMark, PoorStyle, &[1, 3]),
        row(neighbors('h', 'w'), Kind::BetweenCentres, PoorStyle, &[1]),
        row(
            three(STAR, ['w', 'w', ' ']),
            Kind::SurplusMarks,
            PoorStyle,
            &[1],
        ),
        row(
            ring(HEXAGON, &[(1, "N", 1.73, 1.0)], 'w'),
            Kind::RingBond,
            PoorStyle,
            &[2],
        ),
        row(fan(310.0, 1.0), Kind::OneSided, PoorStyle, &[1]),
        row(fan(340.0, 0.3), Kind::ShortBond, PoorStyle, &[1]),
        row(fused(0.5, 0.1), Kind::CrowdedHydrogen, PoorStyle, &[2]),
        row(umbrella, Kind::SingleMark, PoorStyle, &[1]),
        row(three(STAR, [' '; 3]), Kind::UndefinedCentre, Open, &[1]),
        row(ene(-60.0, WAVY), Kind::EitherMark, Open, &[2, 3]),
        row(allene(' '), Kind::UndefinedAxis, Open, &[1, 3]),
    ]
}

fn table() -> Vec<Row> {
    [asked_rows(), grave_rows(), light_rows()].concat()
}

fn numbers(f: &Finding) -> Vec<usize> {
    f.atoms.iter().map(|a| a.index() + 1).collect()
}

#[test]
fn every_kind_is_found() {
    let mut tried = Vec::new();
    for (i, (drawing, requirement, kind, grade, atoms)) in table().into_iter().enumerate() {
        let found = findings(&drawing, &requirement);
        let seen: Vec<_> = found
            .iter()
            .map(|f| (f.kind, f.grade, numbers(f)))
            .collect();
        assert!(
            seen.contains(&(kind, grade, atoms.to_vec())),
            "row {i}: no {} {} at {atoms:?} in {seen:?}",
            grade.name(),
            kind.name()
        );
        tried.push(kind);
    }
    for kind in Kind::ALL {
        assert!(tried.contains(&kind), "no row for {}", kind.name());
    }
}

#[test]
fn sentences_name_their_atoms() {
    for (drawing, requirement, ..) in table() {
        for f in findings(&drawing, &requirement) {
            let first = numbers(&f)[0].to_string();
            assert!(f.text.contains(&first), "{}", f.text);
            assert!(!f.text.ends_with('.') && !f.clause.name.is_empty());
        }
    }
}

// the preferred patterns: one mark on three bonds all round, solid and hashed side by side on four, marks
// of bridgeheads on the bridge, hydrogen of a fusion atom outside
#[test]
fn of_good_drawings_nothing_is_said() {
    let good = [
        three(STAR, ['w', ' ', ' ']),
        three(STAR, [' ', 'h', ' ']),
        four(PAIR, ['w', ' ', ' ', 'h']),
        norbornane('w', 'w'),
        neighbors(' ', 'w')
            .apply(&[Edit::Mark(BondIx::new(0), Mark::Solid(End::First))])
            .unwrap()
            .0,
        ene(-60.0, ENE),
    ];
    for (i, drawing) in good.iter().enumerate() {
        let found = findings(drawing, &Requirement::default());
        let loud: Vec<_> = found.iter().filter(|f| f.grade != Grade::Open).collect();
        assert!(loud.is_empty(), "drawing {i}: {loud:?}");
    }
}

#[test]
fn names_are_unlike_and_in_kebab_case() {
    let names: Vec<&str> = Kind::ALL.iter().map(|k| k.name()).collect();
    for (i, name) in names.iter().enumerate() {
        assert!(name.chars().all(|c| c.is_ascii_lowercase() || c == '-'));
        assert!(!names[..i].contains(name), "{name} stands twice");
    }
}
