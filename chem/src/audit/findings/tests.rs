//! One small drawing for each kind of finding, and drawings of which nothing must be said.

use super::super::{Finding, Grade, Kind, findings};
use crate::drawing::Drawing;
use crate::drawing::tests::draw;
use crate::molecule::AtomIx;
use crate::solve::require::Requirement;
use crate::stereo::Descriptor;

/// A carbon at the origin with ligands: symbol, direction in degrees, length, mark.
fn star(ligands: &[(&'static str, f64, f64, char)]) -> Drawing {
    let mut atoms = vec![("C", 0.0, 0.0)];
    let mut bonds = Vec::new();
    for (i, (symbol, degrees, length, mark)) in ligands.iter().enumerate() {
        let (y, x) = degrees.to_radians().sin_cos();
        atoms.push((*symbol, x * length, y * length));
        bonds.push((0, i + 1, 1, *mark));
    }
    draw(&atoms, &bonds)
}

fn three(directions: [f64; 3], marks: [char; 3]) -> Drawing {
    let of = |i: usize| (["N", "O", "C"][i], directions[i], 1.0, marks[i]);
    star(&[of(0), of(1), of(2)])
}

fn four(directions: [f64; 4], marks: [char; 4]) -> Drawing {
    let of = |i: usize| (["N", "O", "C", "S"][i], directions[i], 1.0, marks[i]);
    star(&[of(0), of(1), of(2), of(3)])
}

const STAR: [f64; 3] = [90.0, 210.0, 330.0];
const CROSS: [f64; 4] = [90.0, 0.0, 180.0, 270.0];
const PAIR: [f64; 4] = [120.0, 330.0, 210.0, 60.0];

/// But-2-ene skeleton with a nitrogen for the last atom, its bond at `degrees` from the line.
fn ene(degrees: f64, bonds: [(usize, usize, u8, char); 3]) -> Drawing {
    let (y, x) = degrees.to_radians().sin_cos();
    let atoms = [
        ("C", -0.5, 0.87),
        ("C", 0.0, 0.0),
        ("C", 1.0, 0.0),
        ("N", 1.0 + x, y),
    ];
    draw(&atoms, &bonds)
}

const ENE: [(usize, usize, u8, char); 3] = [(0, 1, 1, ' '), (1, 2, 2, ' '), (2, 3, 1, ' ')];

/// Bicyclo[2.2.1] as perimeter and bridge, with an amino group and marks from its bridgeheads.
fn norbornane(first: char, second: char) -> Drawing {
    let atoms = [
        ("C", 0.0, 1.3),
        ("C", 1.13, 0.65),
        ("C", 1.13, -0.65),
        ("C", 0.0, -1.3),
        ("C", -1.13, -0.65),
        ("C", -1.13, 0.65),
        ("C", 0.0, 0.1),
        ("N", 1.99, -1.15),
    ];
    let mut bonds: Vec<_> = (0..6).map(|i| (i, (i + 1) % 6, 1, ' ')).collect();
    bonds.extend([(0, 6, 1, first), (3, 6, 1, second), (2, 7, 1, 'w')]);
    draw(&atoms, &bonds)
}

/// Ring of six with an oxygen and an outside ligand at its second atom; corners as given.
fn ring(corners: [(f64, f64); 6], out: &[(usize, &'static str, f64, f64)], ring: char) -> Drawing {
    let mut atoms: Vec<_> = corners.iter().map(|(x, y)| ("C", *x, *y)).collect();
    atoms[0].0 = "O";
    let mut bonds: Vec<_> = (0..6).map(|i| (i, (i + 1) % 6, 1, ' ')).collect();
    bonds[1].3 = ring;
    for (at, symbol, x, y) in out {
        bonds.push((*at, atoms.len(), 1, ' '));
        atoms.push((symbol, *x, *y));
    }
    draw(&atoms, &bonds)
}

const HEXAGON: [(f64, f64); 6] = [
    (0.0, 1.0),
    (0.87, 0.5),
    (0.87, -0.5),
    (0.0, -1.0),
    (-0.87, -0.5),
    (-0.87, 0.5),
];

/// Two neighbouring centres, the first with its mark on the bond between them.
fn neighbors(first: char, own: char) -> Drawing {
    draw(
        &[
            ("C", 0.0, 0.0),
            ("N", 0.0, 1.0),
            ("C", -0.87, -0.5),
            ("C", 0.87, -0.5),
            ("O", 0.87, -1.5),
            ("C", 1.73, 0.0),
        ],
        &[
            (0, 1, 1, ' '),
            (0, 2, 1, ' '),
            (0, 3, 1, first),
            (3, 4, 1, own),
            (3, 5, 1, ' '),
        ],
    )
}

/// Two fused rings of five and six with a drawn hydrogen at the first fusion atom.
fn fused(x: f64, y: f64) -> Drawing {
    let mut atoms: Vec<_> = HEXAGON.iter().map(|(x, y)| ("C", *x, *y)).collect();
    atoms.extend([("C", 1.82, 0.81), ("O", 2.41, 0.0), ("C", 1.82, -0.81), ("H", x, y)]);
    let mut bonds: Vec<_> = (0..6).map(|i| (i, (i + 1) % 6, 1, ' ')).collect();
    bonds.extend([
        (1, 6, 1, ' '),
        (6, 7, 1, ' '),
        (7, 8, 1, ' '),
        (8, 2, 1, ' '),
        (0, 10, 1, ' '),
        (1, 9, 1, 'w'),
    ]);
    atoms.push(("N", 0.0, 2.0));
    draw(&atoms, &bonds)
}

fn asked(atom: usize, d: Descriptor) -> Requirement {
    Requirement {
        text: String::new(),
        wanted: vec![(AtomIx::new(atom), d)],
    }
}

type Row = (Drawing, Requirement, Kind, Grade, &'static [usize]);

/// Drawing, what is asked, and what must be found: kind, grade, atoms from 1. The rules are those of the
/// clause that each finding carries.
fn table() -> Vec<Row> {
    use Grade::{Open, PoorStyle, Unclear, Wrong};
    let none = Requirement::default;
    let mark = |marks| three(STAR, marks);
    let plain = [' '; 4];
    let chair = [
        (-1.6, -0.1),
        (-1.0, -0.7),
        (0.1, -0.45),
        (1.1, 0.1),
        (0.5, 0.7),
        (-0.6, 0.45),
    ];
    let haworth = [
        (0.7, 0.75),
        (1.6, 0.0),
        (0.8, -0.75),
        (-0.8, -0.75),
        (-1.6, 0.0),
        (-0.8, 0.75),
    ];
    let near_edge = draw(
        &[("C", 0.0, 0.0), ("N", 0.0, 1.0), ("O", -0.87, -0.5), ("C", 0.87, -0.5)],
        &[(0, 1, 1, ' '), (0, 2, 1, ' '), (3, 0, 1, 'w')],
    );
    let crossed = [(0, 1, 1, ' '), (1, 2, 2, 'x'), (2, 3, 1, ' ')];
    let wavy = [(0, 1, 1, ' '), (1, 2, 2, ' '), (2, 3, 1, '~')];
    let allene = |second: char| {
        draw(
            &[
                ("C", -1.0, 0.0),
                ("C", 0.0, 0.0),
                ("C", 1.0, 0.0),
                ("C", -1.5, 0.87),
                ("H", -1.45, -0.78),
                ("N", 1.87, 0.5),
                ("H", 1.78, -0.45),
            ],
            &[
                (0, 1, 2, ' '),
                (1, 2, 2, ' '),
                (0, 3, 1, ' '),
                (0, 4, 1, ' '),
                (2, 5, 1, second),
                (2, 6, 1, ' '),
            ],
        )
    };
    let same_side = draw(
        &[
            ("C", 0.0, 0.0),
            ("C", 1.0, 0.0),
            ("O", -0.82, -0.57),
            ("C", -0.09, -1.0),
            ("N", 1.5, 0.87),
        ],
        &[(0, 1, 2, ' '), (0, 2, 1, ' '), (0, 3, 1, ' '), (1, 4, 1, ' ')],
    );
    let five_bonds = star(&[
        ("C", 0.0, 1.0, ' '),
        ("C", 72.0, 1.0, ' '),
        ("C", 144.0, 1.0, ' '),
        ("C", 216.0, 1.0, ' '),
        ("C", 288.0, 1.0, ' '),
    ]);
    let sulfide = |at: f64, length: f64| {
        star(&[
            ("N", 90.0, 1.0, 'w'),
            ("O", at, 1.0, ' '),
            ("C", 270.0, length, ' '),
            ("S", 180.0 - at, 1.0, ' '),
        ])
    };
    vec![
        (mark(['w', ' ', ' ']), asked(0, Descriptor::R), Kind::Opposite, Wrong, &[1]),
        (mark([' '; 3]), asked(0, Descriptor::R), Kind::UndefinedCentre, Wrong, &[1]),
        (mark([' '; 3]), asked(1, Descriptor::R), Kind::NotStereogenic, Wrong, &[2]),
        (mark([' '; 3]), none(), Kind::UndefinedCentre, Open, &[1]),
        (norbornane(' ', 'w'), none(), Kind::UndefinedCentre, Unclear, &[1]),
        (mark(['w', 'h', ' ']), none(), Kind::Contradiction, Wrong, &[1]),
        (mark(['~', 'h', ' ']), none(), Kind::Contradiction, Wrong, &[1]),
        (four(PAIR, ['w', ' ', ' ', 'w']), none(), Kind::Contradiction, Wrong, &[1]),
        (near_edge, none(), Kind::WideEnd, Wrong, &[1, 4]),
        (norbornane('w', 'h'), none(), Kind::ImpossibleGeometry, Wrong, &[1, 4]),
        (five_bonds, none(), Kind::Valence, Wrong, &[1]),
        (
            star(&[
                ("C", 90.0, 1.0, ' '),
                ("O", 0.0, 1.0, ' '),
                ("C", 270.0, 1.0, ' '),
                ("N", 180.0, 1.0, ' '),
            ])
            .apply(&[crate::drawing::Edit::AddAtom(
                crate::molecule::Atom::new(crate::element::Element::O),
                crate::geom::Point::new(0.87, 1.5),
            ), crate::drawing::Edit::AddBond(
                [AtomIx::new(1), AtomIx::new(5)],
                crate::molecule::Order::Single,
            )])
            .unwrap()
            .0,
            none(),
            Kind::Projection,
            Unclear,
            &[1],
        ),
        (
            ring(haworth, &[(1, "N", 1.6, -1.0), (3, "C", -0.8, 0.05)], ' '),
            none(),
            Kind::Projection,
            Unclear,
            &[2],
        ),
        (
            ring(chair, &[(2, "N", 0.1, -1.45)], ' '),
            none(),
            Kind::Projection,
            Unclear,
            &[3],
        ),
        (four([90.0, 92.0, 210.0, 330.0], ['w', ' ', ' ', ' ']), none(), Kind::Overlap, Unclear, &[1]),
        (three([90.0, 35.0, 145.0], ['w', ' ', ' ']), none(), Kind::Reentrant, Unclear, &[1]),
        (three([90.0, 35.0, 145.0], ['w', 'w', 'w']), none(), Kind::Reentrant, Unclear, &[1]),
        (three([90.0, 0.0, 180.0], ['w', ' ', ' ']), none(), Kind::StraightAngle, Unclear, &[1]),
        (four(CROSS, ['w', ' ', ' ', ' ']), none(), Kind::StraightAngle, PoorStyle, &[1]),
        (ene(0.0, ENE), none(), Kind::StraightDoubleBond, Unclear, &[2, 3]),
        (ene(15.0, ENE), none(), Kind::StraightDoubleBond, PoorStyle, &[2, 3]),
        (same_side, none(), Kind::SameSide, Unclear, &[1, 2]),
        (ene(-60.0, crossed), none(), Kind::CrossedDoubleBond, PoorStyle, &[2, 3]),
        (ene(-60.0, crossed), asked(1, Descriptor::E), Kind::CrossedDoubleBond, Wrong, &[2, 3]),
        (ene(-60.0, wavy), none(), Kind::EitherMark, Open, &[2, 3]),
        (ene(-60.0, wavy), asked(1, Descriptor::E), Kind::UndefinedDoubleBond, Wrong, &[2, 3]),
        (neighbors('~', 'w'), none(), Kind::EitherMark, Unclear, &[1, 4]),
        (allene(' '), none(), Kind::UndefinedAxis, Open, &[1, 3]),
        (allene('w'), none(), Kind::SingleMark, PoorStyle, &[1, 3]),
        (star(&[("C", 90.0, 1.0, 'w'), ("O", 210.0, 1.0, ' ')]), none(), Kind::IdleMark, Unclear, &[1]),
        (neighbors('h', 'w'), none(), Kind::BetweenCentres, PoorStyle, &[1]),
        (neighbors('h', ' '), none(), Kind::BetweenCentres, Unclear, &[1, 4]),
        (mark(['w', 'w', ' ']), none(), Kind::SurplusMarks, PoorStyle, &[1]),
        (four(PAIR, ['w', 'w', 'w', ' ']), none(), Kind::SurplusMarks, Unclear, &[1]),
        (ring(HEXAGON, &[(1, "N", 1.73, 1.0)], 'w'), none(), Kind::RingBond, PoorStyle, &[2]),
        (sulfide(310.0, 1.0), none(), Kind::OneSided, PoorStyle, &[1]),
        (sulfide(340.0, 0.3), none(), Kind::ShortBond, PoorStyle, &[1]),
        (fused(0.5, 0.1), none(), Kind::CrowdedHydrogen, PoorStyle, &[2]),
        (four([90.0, 30.0, 150.0, 270.0], ['w', ' ', ' ', ' ']), none(), Kind::SingleMark, PoorStyle, &[1]),
        (four(CROSS, plain), asked(0, Descriptor::S), Kind::UndefinedCentre, Wrong, &[1]),
    ]
}

fn numbers(f: &Finding) -> Vec<usize> {
    f.atoms.iter().map(|a| a.index() + 1).collect()
}

#[test]
fn every_kind_is_found() {
    let mut tried = Vec::new();
    for (i, (drawing, requirement, kind, grade, atoms)) in table().into_iter().enumerate() {
        let found = findings(&drawing, &requirement);
        let seen: Vec<_> = found.iter().map(|f| (f.kind, f.grade, numbers(f))).collect();
        assert!(
            seen.contains(&(kind, grade, atoms.to_vec())),
            "row {i}: no {} {} at {atoms:?} in {seen:?}",
            grade.name(),
            kind.name()
        );
        tried.push(kind);
    }
    for kind in Kind::ALL {
        assert!(
            tried.contains(&kind) || kind == Kind::UndefinedDoubleBond,
            "no row for {}",
            kind.name()
        );
    }
}

#[test]
fn sentences_name_their_atoms() {
    for (drawing, requirement, kind, _, atoms) in table() {
        for f in findings(&drawing, &requirement).iter().filter(|f| f.kind == kind) {
            assert!(f.text.contains(&atoms[0].to_string()), "{}", f.text);
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
            .apply(&[crate::drawing::Edit::Mark(
                crate::molecule::BondIx::new(0),
                crate::drawing::Mark::Solid(crate::drawing::End::First),
            )])
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
