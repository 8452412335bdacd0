//! How an atom is spelt: which letters stand on the line, below and above it.

use crate::element::Element;
use crate::molecule::{AtomIx, Molecule, Order, Radical, charge_text};

/// Where letters stand.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Level {
    /// On the line.
    Base,
    /// A subscript.
    Sub,
    /// A superscript.
    Super,
}

/// Letters of one level.
#[derive(Clone, Debug, PartialEq, Eq)]
pub(super) struct Piece {
    pub(super) text: String,
    pub(super) level: Level,
}

impl Piece {
    pub(super) fn new(text: impl Into<String>, level: Level) -> Piece {
        Piece {
            text: text.into(),
            level,
        }
    }
}

/// What a label says, before its parts are placed.
#[derive(Clone, Debug, PartialEq, Eq)]
pub(super) struct Spelling {
    /// Mass number, upper left of the symbol; empty for none.
    pub(super) isotope: String,
    /// The symbol, or a group in units that can be read from either end.
    pub(super) core: Core,
    /// Hydrogens beside the symbol.
    pub(super) hydrogens: u8,
    /// Charge and unpaired electrons, upper right of the symbol; empty for none.
    pub(super) charge: String,
}

/// The body of a label.
#[derive(Clone, Debug, PartialEq, Eq)]
pub(super) enum Core {
    /// An element's symbol: bonds meet its middle.
    Symbol(&'static str),
    /// A group that can be written from either end (`OMe`, `MeO`): bonds meet its first unit.
    Group(Vec<Vec<Piece>>),
    /// Any other text, left as it is.
    Text(Vec<Piece>),
}

/// Abbreviations that are units of a group, beside the symbols of the elements.
const GROUPS: [&str; 36] = [
    "Me", "Et", "Pr", "Bu", "Ph", "Bn", "Bz", "Ac", "Ts", "Ms", "Tf", "Tr", "Boc", "Cbz", "Fmoc",
    "Alloc", "Troc", "Teoc", "Piv", "TMS", "TES", "TBS", "TIPS", "TBDPS", "MOM", "MEM", "SEM",
    "PMB", "PMP", "THP", "Ar", "Cy", "Mes", "Tol", "Bpin", "Ns",
];

/// The spelling of an atom; `None` for a carbon that is a bare vertex.
pub(super) fn spell(molecule: &Molecule, ix: AtomIx, straight: bool) -> Option<Spelling> {
    let atom = molecule.atom(ix);
    if atom.alias.is_none() && atom.element == Element::C && is_bare(molecule, ix) && !straight {
        return None;
    }
    let (core, hydrogens) = match atom.alias.as_deref().map(str::trim) {
        Some(alias) if !alias.is_empty() => (read_alias(alias), 0),
        _ => (
            Core::Symbol(match (atom.element, atom.isotope) {
                (Element::H, Some(2)) => "D",
                (Element::H, Some(3)) => "T",
                (element, _) => element.symbol(),
            }),
            molecule.hydrogens(ix),
        ),
    };
    let own_letter = matches!(core, Core::Symbol("D" | "T"));
    Some(Spelling {
        isotope: match atom.isotope {
            Some(mass) if !own_letter => mass.to_string(),
            _ => String::new(),
        },
        core,
        hydrogens,
        charge: charge(atom.charge, atom.radical),
    })
}

/// Whether a carbon says all by the bonds that meet in it (GR-1.4): hydrogens to four, nothing stated.
fn is_bare(molecule: &Molecule, ix: AtomIx) -> bool {
    let atom = molecule.atom(ix);
    let full = molecule
        .bond_pairs(ix)
        .saturating_add(molecule.hydrogens(ix))
        == 4;
    molecule.degree(ix) > 0
        && full
        && atom.charge == 0
        && atom.isotope.is_none()
        && atom.radical == Radical::None
}

/// Whether a carbon's two bonds are of one order, so that it would not show in a straight line.
pub(super) fn could_vanish(molecule: &Molecule, ix: AtomIx) -> bool {
    match molecule.neighbors(ix) {
        [a, b] => a.order == b.order && a.order != Order::Triple,
        _ => false,
    }
}

/// `+`, `2−`, with a dot for each unpaired electron before it; a colon for a pair.
fn charge(charge: i8, radical: Radical) -> String {
    let dots = match radical {
        Radical::None => "",
        Radical::Singlet => ":",
        Radical::Doublet => "•",
        Radical::Triplet => "••",
    };
    format!("{dots}{}", charge_text(i32::from(charge)))
}

fn read_alias(alias: &str) -> Core {
    if let Some(units) = units(alias)
        && units.len() > 1
    {
        return Core::Group(units);
    }
    // R1, X2: the number tells which, not how many
    let letters = alias.trim_end_matches(|c: char| c.is_ascii_digit() || c == '\'');
    let index = &alias[letters.len()..];
    if !index.is_empty() && matches!(letters, "R" | "X" | "Y" | "Z" | "Ar") {
        return Core::Text(vec![
            Piece::new(letters, Level::Base),
            Piece::new(index, Level::Super),
        ]);
    }
    match units(alias) {
        Some(units) => Core::Text(units.concat()),
        None => Core::Text(vec![Piece::new(alias, Level::Base)]),
    }
}

/// A text as symbols and abbreviations with their numbers; `None` if it holds anything else.
fn units(text: &str) -> Option<Vec<Vec<Piece>>> {
    let mut rest = text;
    let mut out = Vec::new();
    while !rest.is_empty() {
        let name = longest_unit(rest)?;
        rest = &rest[name.len()..];
        let digits = rest.len() - rest.trim_start_matches(|c: char| c.is_ascii_digit()).len();
        let mut unit = vec![Piece::new(name, Level::Base)];
        if digits > 0 {
            unit.push(Piece::new(&rest[..digits], Level::Sub));
            rest = &rest[digits..];
        }
        out.push(unit);
    }
    (!out.is_empty()).then_some(out)
}

/// The longest symbol or abbreviation that a text begins with, so that no small letter is left over.
fn longest_unit(text: &str) -> Option<&str> {
    let ends = text.char_indices().skip(1).map(|(i, _)| i).take(5);
    let mut candidates: Vec<&str> = ends.map(|i| &text[..i]).collect();
    if text.chars().count() <= 5 {
        candidates.push(text);
    }
    candidates.into_iter().rev().find(|name| {
        let known = GROUPS.contains(name) || Element::from_symbol(name).is_some();
        known && !text[name.len()..].starts_with(|c: char| c.is_lowercase())
    })
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::molecule::tests::build;
    use crate::molecule::{Atom, Bond};

    fn letters(core: &Core) -> String {
        let pieces: Vec<&Piece> = match core {
            Core::Symbol(s) => return (*s).to_owned(),
            Core::Group(units) => units.iter().rev().flatten().collect(),
            Core::Text(pieces) => pieces.iter().collect(),
        };
        pieces.iter().map(|p| p.text.as_str()).collect()
    }

    #[test]
    fn groups_are_read_from_either_end_and_other_text_is_left() {
        let reversed = |s| letters(&read_alias(s));
        assert_eq!(reversed("OMe"), "MeO");
        assert_eq!(reversed("CO2Me"), "MeO2C");
        assert_eq!(reversed("NHBoc"), "BocHN");
        assert_eq!(reversed("OTBS"), "TBSO");
        assert_eq!(reversed("CF3"), "F3C");
        assert_eq!(reversed("tBu"), "tBu");
        assert_eq!(reversed("R1"), "R1");
        assert_eq!(reversed("Boc"), "Boc");
        assert_eq!(reversed("ΩX"), "ΩX");
    }

    #[test]
    fn numbers_of_a_group_are_subscripts_and_those_of_a_variable_superscripts() {
        let level = |s, i: usize| match read_alias(s) {
            Core::Group(units) => units.concat()[i].level,
            Core::Text(pieces) => pieces[i].level,
            Core::Symbol(_) => Level::Base,
        };
        assert_eq!(level("CF3", 2), Level::Sub);
        assert_eq!(level("R1", 1), Level::Super);
        assert_eq!(level("N3", 1), Level::Sub);
    }

    #[test]
    fn a_carbon_is_written_only_where_the_bonds_do_not_say_all() {
        let m = build(&["C", "C", "C"], &[(0, 1, 1)]);
        assert_eq!(spell(&m, AtomIx::new(0), false), None);
        assert!(spell(&m, AtomIx::new(0), true).is_some());
        let methane = spell(&m, AtomIx::new(2), false).unwrap();
        assert_eq!((methane.hydrogens, methane.charge.as_str()), (4, ""));
        let mut cation = Atom::new(Element::C);
        cation.charge = 1;
        cation.radical = Radical::Doublet;
        cation.isotope = Some(13);
        let bond = Bond {
            ends: [AtomIx::new(0), AtomIx::new(1)],
            order: Order::Single,
        };
        let m = Molecule::new(vec![cation, Atom::new(Element::C)], vec![bond]).unwrap();
        let s = spell(&m, AtomIx::new(0), false).unwrap();
        assert_eq!((s.isotope.as_str(), s.charge.as_str()), ("13", "•+"));
    }
}
