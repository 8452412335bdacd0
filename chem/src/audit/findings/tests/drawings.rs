//! The small drawings of the table: stars of ligands, double bonds, rings.

use crate::drawing::Drawing;
use crate::drawing::tests::draw;

/// A carbon at the origin with ligands: symbol, direction in degrees, length, mark.
pub(super) fn star(ligands: &[(&'static str, f64, f64, char)]) -> Drawing {
    let mut atoms = vec![("C", 0.0, 0.0)];
    let mut bonds = Vec::new();
    for (i, (symbol, degrees, length, mark)) in ligands.iter().enumerate() {
        let (y, x) = degrees.to_radians().sin_cos();
        atoms.push((*symbol, x * length, y * length));
        bonds.push((0, i + 1, 1, *mark));
    }
    draw(&atoms, &bonds)
}

pub(super) fn three(directions: [f64; 3], marks: [char; 3]) -> Drawing {
    let of = |i: usize| (["N", "O", "C"][i], directions[i], 1.0, marks[i]);
    star(&[of(0), of(1), of(2)])
}

pub(super) fn four(directions: [f64; 4], marks: [char; 4]) -> Drawing {
    let of = |i: usize| (["N", "O", "C", "S"][i], directions[i], 1.0, marks[i]);
    star(&[of(0), of(1), of(2), of(3)])
}

pub(super) const STAR: [f64; 3] = [90.0, 210.0, 330.0];
pub(super) const CROSS: [f64; 4] = [90.0, 0.0, 180.0, 270.0];
pub(super) const PAIR: [f64; 4] = [120.0, 330.0, 210.0, 60.0];

/// But-2-ene skeleton with a nitrogen for the last atom, its bond at `degrees` from the line.
pub(super) fn ene(degrees: f64, bonds: [(usize, usize, u8, char); 3]) -> Drawing {
    let (y, x) = degrees.to_radians().sin_cos();
    let atoms = [
        ("C", -0.5, 0.87),
        ("C", 0.0, 0.0),
        ("C", 1.0, 0.0),
        ("N", 1.0 + x, y),
    ];
    draw(&atoms, &bonds)
}

pub(super) const ENE: [(usize, usize, u8, char); 3] =
    [(0, 1, 1, ' '), (1, 2, 2, ' '), (2, 3, 1, ' ')];

/// Bicyclo[2.2.1] as perimeter and bridge, with an amino group and marks from its bridgeheads.
pub(super) fn norbornane(first: char, second: char) -> Drawing {
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
pub(super) fn ring(
    corners: [(f64, f64); 6],
    out: &[(usize, &'static str, f64, f64)],
    ring: char,
) -> Drawing {
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

pub(super) const HEXAGON: [(f64, f64); 6] = [
    (0.0, 1.0),
    (0.87, 0.5),
    (0.87, -0.5),
    (0.0, -1.0),
    (-0.87, -0.5),
    (-0.87, 0.5),
];

/// Two neighbouring centres, the first with its mark on the bond between them.
pub(super) fn neighbors(first: char, own: char) -> Drawing {
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
pub(super) fn fused(x: f64, y: f64) -> Drawing {
    let mut atoms: Vec<_> = HEXAGON.iter().map(|(x, y)| ("C", *x, *y)).collect();
    atoms.extend([
        ("C", 1.82, 0.81),
        ("O", 2.41, 0.0),
        ("C", 1.82, -0.81),
        ("H", x, y),
    ]);
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

pub(super) const CHAIR: [(f64, f64); 6] = [
    (-1.6, -0.1),
    (-1.0, -0.7),
    (0.1, -0.45),
    (1.1, 0.1),
    (0.5, 0.7),
    (-0.6, 0.45),
];

pub(super) const HAWORTH: [(f64, f64); 6] = [
    (0.7, 0.75),
    (1.6, 0.0),
    (0.8, -0.75),
    (-0.8, -0.75),
    (-1.6, 0.0),
    (-0.8, 0.75),
];

/// A wedge whose narrow end is at the methyl group.
pub(super) fn wide_end() -> Drawing {
    let atoms = [
        ("C", 0.0, 0.0),
        ("N", 0.0, 1.0),
        ("O", -0.87, -0.5),
        ("C", 0.87, -0.5),
    ];
    draw(&atoms, &[(0, 1, 1, ' '), (0, 2, 1, ' '), (3, 0, 1, 'w')])
}

/// Penta-2,3-diene skeleton with a nitrogen, one bond marked or none.
pub(super) fn allene(mark: char) -> Drawing {
    let atoms = [
        ("C", -1.0, 0.0),
        ("C", 0.0, 0.0),
        ("C", 1.0, 0.0),
        ("C", -1.5, 0.87),
        ("H", -1.45, -0.78),
        ("N", 1.87, 0.5),
        ("H", 1.78, -0.45),
    ];
    let bonds = [
        (0, 1, 2, ' '),
        (1, 2, 2, ' '),
        (0, 3, 1, ' '),
        (0, 4, 1, ' '),
        (2, 5, 1, mark),
        (2, 6, 1, ' '),
    ];
    draw(&atoms, &bonds)
}

/// Both ligands of one end below the double bond.
pub(super) fn same_side() -> Drawing {
    let atoms = [
        ("C", 0.0, 0.0),
        ("C", 1.0, 0.0),
        ("O", -0.82, -0.57),
        ("C", -0.09, -1.0),
        ("N", 1.5, 0.87),
    ];
    draw(
        &atoms,
        &[
            (0, 1, 2, ' '),
            (0, 2, 1, ' '),
            (0, 3, 1, ' '),
            (1, 4, 1, ' '),
        ],
    )
}

pub(super) fn five_bonds() -> Drawing {
    let of = |i: f64| ("C", 72.0 * i, 1.0, ' ');
    star(&[of(0.0), of(1.0), of(2.0), of(3.0), of(4.0)])
}

/// A bare upright cross, carbon up and down.
pub(super) fn cross() -> Drawing {
    let atoms = [
        ("C", 0.0, 0.0),
        ("C", 0.0, 1.0),
        ("O", 1.0, 0.0),
        ("C", 0.0, -1.0),
        ("N", -1.0, 0.0),
        ("O", 0.87, 1.5),
    ];
    let bonds = [
        (0, 1, 1, ' '),
        (0, 2, 1, ' '),
        (0, 3, 1, ' '),
        (0, 4, 1, ' '),
        (1, 5, 1, ' '),
    ];
    draw(&atoms, &bonds)
}

/// A mark up, a bond of some length straight down, two more at `at` degrees and its mirror.
pub(super) fn fan(at: f64, length: f64) -> Drawing {
    star(&[
        ("N", 90.0, 1.0, 'w'),
        ("O", at, 1.0, ' '),
        ("C", 270.0, length, ' '),
        ("S", 180.0 - at, 1.0, ' '),
    ])
}
