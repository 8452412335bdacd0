//! The chemical elements: symbols, weights, isotopes and the valences that imply hydrogens.

mod isotopes;
mod table;

use isotopes::ISOTOPES;
use table::ELEMENTS;

/// An element by its atomic number; 0 stands for an atom whose element is not stated (`*`, `R`, `A` ...).
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub struct Element(u8);

macro_rules! named {
    ($($name:ident = $number:literal),* $(,)?) => {
        $(#[doc = concat!("Atomic number ", stringify!($number), ".")]
        pub const $name: Element = Element($number);)*
    };
}

impl Element {
    named! {
        ANY = 0, H = 1, B = 5, C = 6, N = 7, O = 8, F = 9, SI = 14, P = 15, S = 16, CL = 17, GE = 32,
        AS = 33, SE = 34, BR = 35, SN = 50, SB = 51, TE = 52, I = 53,
    }

    /// The element with this atomic number, 1 to 118.
    pub fn from_number(number: u8) -> Option<Element> {
        (1..=118).contains(&number).then_some(Element(number))
    }

    /// The element with exactly this symbol (`Cl`, not `CL`).
    pub fn from_symbol(symbol: &str) -> Option<Element> {
        // most atoms are one of these: no need to walk the table
        match symbol {
            "C" => return Some(Element::C),
            "N" => return Some(Element::N),
            "O" => return Some(Element::O),
            "H" => return Some(Element::H),
            _ => {}
        }
        let index = ELEMENTS.iter().position(|(s, _)| *s == symbol)?;
        u8::try_from(index + 1).ok().map(Element)
    }

    /// Atomic number; 0 for an atom whose element is not stated.
    pub fn number(self) -> u8 {
        self.0
    }

    /// Symbol; `*` for an atom whose element is not stated.
    pub fn symbol(self) -> &'static str {
        match self.0 {
            0 => "*",
            n => ELEMENTS[usize::from(n) - 1].0,
        }
    }

    /// Standard atomic weight, g/mol; 0 for an atom whose element is not stated.
    pub fn weight(self) -> f64 {
        match self.0 {
            0 => 0.0,
            n => ELEMENTS[usize::from(n) - 1].1,
        }
    }

    /// Exact mass of one isotope in u; an isotope that the table lacks has its mass number for mass.
    pub fn isotope_mass(self, mass_number: u16) -> f64 {
        ISOTOPES
            .binary_search_by_key(&(self.0, mass_number), |(z, a, _)| (*z, *a))
            .map_or(f64::from(mass_number), |i| ISOTOPES[i].2)
    }

    /// Mass number of the element as the molfile's mass difference counts from it: its weight, rounded.
    pub fn usual_mass_number(self) -> u16 {
        // weights lie below 300
        self.weight().round() as u16
    }

    /// Valences at which this element needs no further hydrogen, ascending; empty where the element
    /// implies none (metals, noble gases).
    ///
    /// A charged atom takes the valences of the neutral atom with as many electrons (N+ those of C,
    /// B- those of C, O- those of F). Common practice, no source: readers of molfiles agree on these
    /// for the organic elements and differ on the rest.
    pub fn valences(self, charge: i8) -> &'static [u8] {
        if self == Element::H {
            return if charge == 0 { &[1] } else { &[] };
        }
        let (row_start, row_end) = match self.0 {
            5..=9 => (5, 10),
            13..=17 => (13, 18),
            31..=35 => (31, 36),
            49..=53 => (49, 54),
            81..=85 => (81, 86),
            _ => return &[],
        };
        let alike = i16::from(self.0) - i16::from(charge);
        if alike < row_start || alike > row_end {
            return &[];
        }
        match alike - row_start {
            0 => &[3],
            1 if row_start >= 49 => &[2, 4],
            1 => &[4],
            2 if row_start == 5 => &[3],
            2 => &[3, 5],
            3 if row_start == 5 => &[2],
            3 => &[2, 4, 6],
            4 if row_start == 5 => &[1],
            4 => &[1, 3, 5, 7],
            _ => &[0],
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn symbols_go_both_ways() {
        for n in 1..=118 {
            let element = Element::from_number(n).unwrap();
            assert_eq!(Element::from_symbol(element.symbol()), Some(element));
        }
        assert_eq!(Element::from_symbol("CL"), None);
        assert_eq!(Element::from_number(0), None);
        assert_eq!(Element::from_number(119), None);
    }

    #[test]
    fn isotopes_are_sorted_and_near_their_number() {
        assert!(
            ISOTOPES
                .windows(2)
                .all(|w| (w[0].0, w[0].1) < (w[1].0, w[1].1))
        );
        assert!(
            ISOTOPES
                .iter()
                .all(|(_, a, m)| (m - f64::from(*a)).abs() < 0.2)
        );
    }

    // digest of CIP Rule 2: natural H outranks 1H, natural C outranks 12C, natural O outranks 16O
    #[test]
    fn natural_mixtures_outrank_the_lightest_isotope() {
        for (element, a) in [(Element::H, 1), (Element::C, 12), (Element::O, 16)] {
            assert!(element.weight() > element.isotope_mass(a));
        }
        assert!(Element::H.weight() < Element::H.isotope_mass(2));
    }

    #[test]
    fn charged_atoms_borrow_valences() {
        assert_eq!(Element::N.valences(1), Element::C.valences(0));
        assert_eq!(Element::O.valences(-1), &[1]);
        assert_eq!(Element::S.valences(1), &[3, 5]);
        assert_eq!(Element::from_symbol("Na").unwrap().valences(1), &[0u8; 0]);
    }
}
