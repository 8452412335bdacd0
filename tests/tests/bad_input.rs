//! Drawings that say something odd, impossible or nothing: labelled where the rules speak, otherwise with a
//! reason for each place, and what is odd is noticed.
//!
//! Most cases are one centre with three drawn ligands spread about it, the upper one on a solid wedge.
//! With N up, CH3 left and O right it is S: oxygen, nitrogen, carbon go round anticlockwise in front of the
//! hydrogen. What a chemist would expect is common practice, no source, unless a rule is named.

use checks::no_misses;
use chem::format::{ReadError, Record, molfile};
use chem::pipeline::{self, Report};
use chem::solve::require::Requirement;

/// What should come of a drawing.
enum Outcome {
    /// These labels, and these words in what is said about it.
    Reads(&'static str, &'static [&'static str]),
    /// Not read, with these words.
    Refused(&'static [&'static str]),
    /// What the program says now, where it falls short, and what would be better; both pass.
    Short(&'static str, &'static [&'static str], Better),
}

/// What would be right where the program falls short.
enum Better {
    /// These words too.
    Words(&'static str),
    /// Another reason than these words, which are not true.
    Without(&'static str),
}

use Outcome::{Reads, Refused, Short};

/// Name; atoms `symbol x y valence`, bonds `first second type stereo`, both parted by semicolons; lines of
/// properties; outcome.
type Case = (
    &'static str,
    &'static str,
    &'static str,
    &'static [&'static str],
    Outcome,
);

const STAR: &str = "1 2 1 1; 1 3 1; 1 4 1";
const PLAIN: &str = "C 0 0; N 0 1.5; C -1.3 -0.75; O 1.3 -0.75";
const IDLE: &str = "atom 1 is not stereogenic";
const PLACEHOLDER: &str = "it depends on a placeholder or on a bond whose order is not stated";
const BEYOND: &str = "is outside this program";
const ALIKE: &str = "two ligands of atom 1 are alike";
const OVERLAP: &str = "an atom lies on the centre";

#[rustfmt::skip]
fn valences() -> Vec<Case> {
    vec![
        ("nothing odd", PLAIN, STAR, &[], Reads("1S", &[])),
        ("carbon with five bonds", "C 0 0; N 0 1.5; C -1.3 -0.75; O 1.3 -0.75; S -0.5 -1.4; F 0.5 -1.4",
            "1 2 1 1; 1 3 1; 1 4 1; 1 5 1; 1 6 1", &[], Reads("", &[IDLE, "unusual valence: 5"])),
        ("carbon with four ligands and a double bond", "C 0 0; N 0 1.5; C -1.3 -0.75; O 1.3 -0.75; S 0 -1.5",
            "1 2 1 1; 1 3 1; 1 4 1; 1 5 2", &[], Reads("", &[IDLE, "unusual valence: 5"])),
        ("neutral nitrogen with four bonds", "N 0 0; C 0 1.5; O -1.3 -0.75; S 1.3 -0.75; F 0 -1.5",
            "1 2 1 1; 1 3 1; 1 4 1; 1 5 1", &[], Reads("", &[IDLE, "unusual valence: 4"])),
        // the rules rank by atomic number whatever the valence: hydrogen with carbon beyond > hydrogen
        ("hydrogen with two bonds", "C 0 0; N 0 1.5; C -1.3 -0.75; H 1.3 -0.75; C 2.6 0",
            "1 2 1 1; 1 3 1; 1 4 1; 4 5 1", &[], Reads("1S", &["atom 4 (H) has an unusual valence: 2"])),
        ("neutral oxygen with three bonds", "C 0 0; O 0 1.5; C -1.3 -0.75; N 1.3 -0.75; C 1.3 2.2; C -1.3 2.2",
            "1 2 1 1; 1 3 1; 1 4 1; 2 5 1; 2 6 1", &[], Reads("1R", &["unusual valence: 3"])),
        ("chlorine with two bonds", "C 0 0; Cl 0 1.5; C -1.3 -0.75; O 1.3 -0.75; C 1.3 2.2",
            "1 2 1 1; 1 3 1; 1 4 1; 2 5 1", &[], Reads("1R", &["unusual valence: 2"])),
        ("carbon stated to have six valences", "C 0 0 6; N 0 1.5; C -1.3 -0.75; O 1.3 -0.75", STAR, &[],
            Reads("", &[IDLE, "unusual valence: 6"])),
        ("carbon stated to have no hydrogen", "C 0 0 3; N 0 1.5; C -1.3 -0.75; O 1.3 -0.75", STAR, &[],
            Reads("", &[IDLE, "unusual valence: 3"])),
        // flat, so nothing to label
        ("cation", PLAIN, STAR, &["M  CHG  1   1   1"], Reads("", &[IDLE])),
        ("radical", PLAIN, STAR, &["M  RAD  1   1   2"], Reads("", &[IDLE])),
        ("wedge at a CH2 group", "C 0 0; N 0 1.5; C -1.3 -0.75", "1 2 1 1; 1 3 1", &[], Reads("", &[IDLE])),
    ]
}

#[rustfmt::skip]
fn parts_and_metals() -> Vec<Case> {
    vec![
        ("two molecules", "C 0 0; N 0 1.5; C -1.3 -0.75; O 1.3 -0.75; C 6 0; N 6 1.5; C 4.7 -0.75; O 7.3 -0.75",
            "1 2 1 1; 1 3 1; 1 4 1; 5 6 1 6; 5 7 1; 5 8 1", &[], Reads("1S 5R", &[])),
        ("a salt", "C 0 0; N 0 1.5; C -1.3 -0.75; O 1.3 -0.75; Na 4 0", STAR,
            &["M  CHG  2   4  -1   5   1"], Reads("1S", &[])),
        // mercury ranks above all others; lithium below carbon: N, C, Li, H
        ("carbon on mercury", "C 0 0; N 0 1.5; C -1.3 -0.75; Hg 1.3 -0.75; Cl 2.6 0",
            "1 2 1 1; 1 3 1; 1 4 1; 4 5 1", &[], Reads("1S", &[])),
        ("carbon on lithium", "C 0 0; N 0 1.5; C -1.3 -0.75; Li 1.3 -0.75", STAR, &[], Reads("1S", &[])),
        ("tin", "Sn 0 0; N 0 1.5; C -1.3 -0.75; O 1.3 -0.75; Cl 0 -1.5",
            "1 2 1 1; 1 3 1; 1 4 1; 1 5 1", &[], Reads("1S", &[])),
        // square or tetrahedral: the drawing does not say
        ("platinum", "Pt 0 0; N 0 1.5; C -1.3 -0.75; O 1.3 -0.75; Cl 0 -1.5",
            "1 2 1 1; 1 3 1; 1 4 1; 1 5 1", &[],
            Reads("", &[BEYOND])),
        ("titanium", "Ti 0 0; N 0 1.5; C -1.3 -0.75; O 1.3 -0.75; Cl 0 -1.5",
            "1 2 1 1; 1 3 1; 1 4 1; 1 5 1", &[],
            Reads("", &[BEYOND])),
    ]
}

#[rustfmt::skip]
fn placeholders() -> Vec<Case> {
    vec![
        ("a rest beside known ligands", "C 0 0; R# 0 1.5; C -1.3 -0.75; O 1.3 -0.75", STAR,
            &["M  RGP  1   2   1"], Reads("", &[PLACEHOLDER, "atom 2 (R1) stands for something not stated"])),
        ("two rests", "C 0 0; R# 0 1.5; R# -1.3 -0.75; O 1.3 -0.75", STAR,
            &["M  RGP  2   2   1   3   2"], Reads("", &[PLACEHOLDER, "atom 3 (R2)"])),
        ("a list of atoms", "C 0 0; L 0 1.5; C -1.3 -0.75; O 1.3 -0.75", STAR,
            &["M  ALS   2  2 F N   O   "], Reads("", &[PLACEHOLDER])),
        ("any atom beyond what decides", "C 0 0; N 0 1.5; C -1.3 -0.75; O 1.3 -0.75; A 2.6 0",
            "1 2 1 1; 1 3 1; 1 4 1; 4 5 1", &[], Reads("1S", &["atom 5 (A)"])),
        ("any atom where it decides", "C 0 0; N 0 1.5; C -1.3 -0.75; C 1.3 -0.75; A 2.6 0; O -2.6 0",
            "1 2 1 1; 1 3 1; 1 4 1; 4 5 1; 3 6 1", &[], Reads("", &[PLACEHOLDER])),
        ("a placeholder as centre", "Q 0 0; N 0 1.5; C -1.3 -0.75; O 1.3 -0.75", STAR, &[],
            Reads("", &[BEYOND, "atom 1 (Q)"])),
        ("two methyl groups beside a rest", "C 0 0; R# 0 1.5; C -1.3 -0.75; C 1.3 -0.75", STAR,
            &["M  RGP  1   2   1"], Short("", &[PLACEHOLDER], Better::Without(PLACEHOLDER))),
        ("no element", "C 0 0; Xx 0 1.5; C -1.3 -0.75; O 1.3 -0.75", STAR, &[],
            Refused(&["line 6, columns 32-33", "'Xx' is no symbol of an element"])),
    ]
}

#[rustfmt::skip]
fn isotopes() -> Vec<Case> {
    const METHYLS: &str = "C 0 0; O 0 1.5; C -1.3 -0.75; C 1.3 -0.75";
    vec![
        ("mass number 13", METHYLS, STAR, &["M  ISO  1   3  13"], Reads("1S", &[])),
        // 12.000 is less than the natural 12.011
        ("mass number 12", METHYLS, STAR, &["M  ISO  1   3  12"], Reads("1R", &[])),
        ("mass number 99", METHYLS, STAR, &["M  ISO  1   3  99"], Reads("1S", &["mass number 99, far from the usual one"])),
        ("mass number 999", METHYLS, STAR, &["M  ISO  1   3 999"], Reads("1S", &["mass number 999"])),
        // fewer nucleons than protons
        ("mass number 5", METHYLS, STAR, &["M  ISO  1   3   5"],
            Short("1R", &[], Better::Words("mass number 5"))),
        ("mass number 0 states none", METHYLS, STAR, &["M  ISO  1   3   0"], Reads("", &["two ligands of atom 1 are alike"])),
        ("mass number below 0", METHYLS, STAR, &["M  ISO  1   3  -3"], Refused(&["line 12", "a mass number is -3"])),
        ("impossible, but decided before", PLAIN, STAR, &["M  ISO  1   2  99"], Reads("1S", &["mass number 99"])),
    ]
}

#[rustfmt::skip]
fn special_bonds() -> Vec<Case> {
    const ALCOHOL: &str = "C 0 0; N 0 1.5; C -1.3 -0.75; C 1.3 -0.75; O -2.6 0; O 2.6 0; H 3.9 -0.75; O 5.2 0";
    const BONDED: [&str; 3] = [
        "1 2 1 1; 1 3 1; 1 4 1; 3 5 1; 4 6 1; 6 7 1; 7 8 0",
        "1 2 1 1; 1 3 1; 1 4 1; 3 5 1; 4 6 1; 6 7 1; 7 8 8",
        "1 2 1 1; 1 3 1; 1 4 1; 3 5 1; 4 6 1; 6 7 1; 7 8 10",
    ];
    const FIVE: &str = "C 0 0; N 0 1.5; C -1.3 -0.75; O 1.3 -0.75; O 0 -1.5";
    vec![
        ("bond of no order", PLAIN, "1 2 0 1; 1 3 1; 1 4 1", &[], Reads("", &[IDLE, "a bond whose order is not stated"])),
        ("query bond 5", PLAIN, "1 2 5 1; 1 3 1; 1 4 1", &[], Reads("", &[IDLE, "a query bond"])),
        ("query bond 6", PLAIN, "1 2 6; 1 3 1 1; 1 4 1", &[], Reads("", &[IDLE, "a query bond"])),
        ("query bond 7", PLAIN, "1 2 7; 1 3 1 1; 1 4 1", &[], Reads("", &[IDLE, "a query bond"])),
        ("query bond 8", PLAIN, "1 2 8; 1 3 1 1; 1 4 1", &[], Reads("", &[IDLE, "a query bond"])),
        ("bond of type 11", PLAIN, "1 2 11; 1 3 1 1; 1 4 1", &[], Refused(&["line 9, columns 7-9", "the type of the bond is 11"])),
        ("dative bond beyond", "C 0 0; N 0 1.5; C -1.3 -0.75; O 1.3 -0.75; B 0 3", "1 2 1 1; 1 3 1; 1 4 1; 2 5 9", &[],
            Reads("1S", &["a dative bond"])),
        // a phosphane is a centre by its lone pair, and still is when that binds a borane
        ("centre that gives its lone pair", "P 0 0; B 0 1.5; C -1.3 -0.75; O 1.3 -0.75; N 0 -1.5",
            "1 2 9 1; 1 3 1; 1 4 1; 1 5 1", &[], Reads("1S", &["a dative bond"])),
        // a hydrogen bond is no bond to a ligand (IUPAC definition of the hydrogen bond, from memory)
        ("hydrogen bond to a centre", FIVE, "1 2 1 1; 1 3 1; 1 4 1; 1 5 10", &[],
            Reads("1S", &["a hydrogen bond"])),
        ("hydrogen bond of one of two like arms", ALCOHOL, BONDED[2], &[],
            Reads("", &[ALIKE, "a hydrogen bond"])),
        ("bond of no order at one of two like arms", ALCOHOL, BONDED[0], &[],
            Reads("", &[PLACEHOLDER, "a bond whose order is not stated"])),
        ("query bond at one of two like arms", ALCOHOL, BONDED[1], &[],
            Reads("", &[PLACEHOLDER, "a query bond"])),
    ]
}

#[rustfmt::skip]
fn places() -> Vec<Case> {
    const CHAIN: &str = "1 2 1; 2 3 2; 3 4 1";
    const ALLENE: &str = "2 1 1 1; 2 3 2; 3 4 2; 4 5 1";
    vec![
        ("ligand on the centre", "C 0 0; N 0 0; C -1.3 -0.75; O 1.3 -0.75", STAR, &[], Reads("", &[OVERLAP, "atoms 1 and 2 stand on one spot"])),
        ("two ligands on one spot", "C 0 0; N 0 1.5; C -1.3 -0.75; O 0 1.5", STAR, &[], Reads("", &[OVERLAP, "atoms 2 and 4 stand on one spot"])),
        ("all atoms at the origin", "C 0 0; N 0 0; C 0 0; O 0 0", STAR, &[], Reads("", &[OVERLAP, "all atoms stand at 0, 0"])),
        ("all atoms on another spot", "C 3 3; N 3 3; C 3 3; O 3 3", STAR, &[], Reads("", &[OVERLAP, "atoms 3 and 4 stand on one spot"])),
        ("marks that contradict", PLAIN, "1 2 1 1; 1 3 1 6; 1 4 1", &[], Reads("", &["the marks at this centre contradict each other"])),
        ("double bond without length", "C -1 1; C 0 0; C 0 0; C 1 1", CHAIN, &[], Reads("", &[OVERLAP, "atoms 2 and 3 stand on one spot"])),
        ("double bond, all on one spot", "C 0 0; C 0 0; C 0 0; C 0 0", CHAIN, &[], Reads("", &[OVERLAP, "all atoms stand at 0, 0"])),
        ("ligand on the end of a double bond", "C 0 0; C 0 0; C 1.5 0; C 2.2 1.3", CHAIN, &[], Reads("", &[OVERLAP])),
        ("ligand in line with a double bond", "C -1.5 0; C 0 0; C 1.5 0; C 2.2 1.3", CHAIN, &[], Reads("", &["in line with the double bond"])),
        ("axis without length", "C -1 1; C 0 0; C 0 0; C 0 0; C 1 1", ALLENE, &[], Reads("", &[OVERLAP])),
        ("axis in line with its far ligand", "C -1.3 0.7; C 0 0; C 1.3 0; C 2.6 0; C 3.9 0", ALLENE, &[], Reads("", &["in line with the double bond"])),
        ("no number", "C nan 0; N 0 1.5; C -1.3 -0.75; O 1.3 -0.75", STAR, &[], Refused(&["line 5", "the x of the atom is no number"])),
        ("no atoms", "", "", &[], Reads("", &[])),
        ("one atom", "C 0 0", "", &[], Reads("", &[])),
        ("bond to itself", PLAIN, "1 1 1 1; 1 3 1; 1 4 1", &[], Refused(&["line 9, columns 1-6", "joins atom 1 with itself"])),
        ("bond twice", PLAIN, "1 2 1 1; 2 1 1; 1 4 1", &[], Refused(&["line 10, columns 1-6", "joined already by the bond of line 9"])),
        ("bond to no atom", PLAIN, "1 2 1 1; 1 9 1; 1 4 1", &[], Refused(&["line 10, columns 4-6", "atom 9 is named"])),
    ]
}

fn cases() -> Vec<Case> {
    [
        valences(),
        parts_and_metals(),
        placeholders(),
        isotopes(),
        special_bonds(),
        places(),
    ]
    .into_iter()
    .flatten()
    .collect()
}

fn rows(text: &str) -> Vec<Vec<&str>> {
    text.split(';')
        .map(|row| row.split_whitespace().collect::<Vec<_>>())
        .filter(|row| !row.is_empty())
        .collect()
}

/// The molfile of a case.
fn written(case: &Case) -> String {
    let (atoms, bonds) = (rows(case.1), rows(case.2));
    let mut lines = vec![String::new(); 3];
    lines.push(format!(
        "{:3}{:3}  0  0  0  0  0  0  0  0999 V2000",
        atoms.len(),
        bonds.len()
    ));
    lines.extend(atoms.iter().map(|row| {
        let number = |text: &str| text.parse().map_or(text.into(), |x: f64| format!("{x:.4}"));
        let (x, y) = (number(row[1]), number(row[2]));
        let valence = row.get(3).unwrap_or(&"0");
        format!(
            "{x:>10}{y:>10}    0.0000 {:<3} 0  0  0  0  0{valence:>3}  0  0  0  0  0  0",
            row[0]
        )
    }));
    lines.extend(bonds.iter().map(|row| {
        let stereo = row.get(3).unwrap_or(&"0");
        format!("{:>3}{:>3}{:>3}{stereo:>3}", row[0], row[1], row[2])
    }));
    lines.extend(case.3.iter().map(|line| (*line).to_owned()));
    lines.push("M  END\n".to_owned());
    lines.join("\n")
}

fn read(case: &Case) -> Result<(Record, Report), ReadError> {
    let record = molfile::read(&written(case), 1)?;
    let report = pipeline::report(&record.drawing, &Requirement::default());
    Ok((record, report))
}

/// Everything that is said about a drawing.
fn said(record: &Record, report: &Report) -> String {
    let places = report.places.iter().map(|p| p.note.clone());
    let idle = report.idle.iter().map(|i| i.text.clone());
    let notices = record.notices.iter().map(|n| n.text.clone());
    places
        .chain(idle)
        .chain(notices)
        .collect::<Vec<_>>()
        .join("; ")
}

/// What is wrong with what came of a case, if anything.
fn fault(case: &Case) -> Option<String> {
    let has = |text: &str, words: &[&str]| words.iter().all(|w| text.contains(w));
    match (read(case), &case.4) {
        (Err(why), Refused(words)) => {
            (!has(&why.to_string(), words)).then(|| format!("refused: {why}"))
        }
        (Err(why), _) => Some(format!("refused: {why}")),
        (Ok((_, report)), Refused(_)) => Some(format!("read as `{}`", report.labels_line())),
        (Ok((record, report)), Reads(labels, words) | Short(labels, words, _)) => {
            let (found, text) = (report.labels_line(), said(&record, &report));
            let better = match &case.4 {
                Short(_, _, Better::Words(words)) => text.contains(words),
                Short(_, _, Better::Without(words)) => !text.contains(words),
                _ => false,
            };
            let as_told = found == *labels && has(&text, words);
            (!as_told && !better).then(|| format!("`{found}`, {text}"))
        }
    }
}

#[test]
fn odd_drawings_are_labelled_or_explained() {
    let all = cases();
    let misses: Vec<String> = all
        .iter()
        .filter_map(|case| fault(case).map(|f| format!("{}: {f}", case.0)))
        .collect();
    no_misses(&misses, all.len());
}

#[test]
fn every_place_and_every_wedge_without_a_letter_has_a_reason() {
    let mut misses = Vec::new();
    let mut tried = 0;
    for case in cases() {
        let Ok((record, report)) = read(&case) else {
            continue;
        };
        tried += 1;
        let silent = |p: &pipeline::Place| p.carries.is_none() && p.note.is_empty();
        if report.places.iter().any(silent) {
            misses.push(format!("{}: a place without letter and reason", case.0));
        }
        for bond in record.drawing.molecule().bonds() {
            let Some(end) = record.drawing.mark(bond).narrow() else {
                continue;
            };
            let narrow = record.drawing.molecule().bond(bond).ends[end.index()];
            let spoken = report.places.iter().any(|p| p.atoms.contains(&narrow))
                || report.idle.iter().any(|i| i.bond == bond);
            if !spoken {
                misses.push(format!("{}: nothing is said of a wedge", case.0));
            }
        }
    }
    no_misses(&misses, tried);
}
