//! An atom in square brackets: isotope, symbol, chirality, hydrogens, charge and class, in this order.

use super::error::{Fault, SmilesError};
use super::lex::{AtomToken, Chirality, Shape};
use crate::element::Element;
use crate::stereo::Parity;

/// Largest mass number, charge and class that are read. OpenSMILES asks for 999, 15 and 9999 at least.
pub(super) const MOST_ISOTOPE: u32 = 999;
pub(super) const MOST_CHARGE: u32 = 127;
pub(super) const MOST_CLASS: u32 = 9999;
/// One digit stands after H.
pub(super) const MOST_HYDROGENS: u32 = 9;

/// The atom whose bracket begins at byte `start`, and the bytes that it takes.
pub(super) fn read(text: &str, start: usize) -> Result<(AtomToken, usize), SmilesError> {
    let rest = text.get(start + 1..).unwrap_or_default();
    // no bracket of an atom holds another one
    let end = rest
        .find([']', '['])
        .filter(|e| rest.as_bytes().get(*e) == Some(&b']'));
    let Some(end) = end else {
        return Err(SmilesError::new(start + 1, Fault::OpenBracket));
    };
    let mut inside = Inside {
        text: rest.get(..end).unwrap_or_default(),
        at: 0,
        column: start + 2,
    };
    let atom = inside.atom()?;
    Ok((atom, end + 2))
}

/// What stands between the brackets.
struct Inside<'a> {
    text: &'a str,
    at: usize,
    /// Column of its first character.
    column: usize,
}

impl<'a> Inside<'a> {
    fn rest(&self) -> &'a str {
        self.text.get(self.at..).unwrap_or_default()
    }

    fn take(&mut self, word: &str) -> bool {
        let found = self.rest().starts_with(word);
        if found {
            self.at += word.len();
        }
        found
    }

    fn error(&self, reason: Fault) -> SmilesError {
        SmilesError::new(self.column + self.at, reason)
    }

    /// Digits as a number up to `most`; `None` if there are none.
    fn number(&mut self, what: &'static str, most: u32) -> Result<Option<u32>, SmilesError> {
        let digits = self.rest().bytes().take_while(u8::is_ascii_digit).count();
        if digits == 0 {
            return Ok(None);
        }
        let value = self.rest().get(..digits).and_then(|d| d.parse().ok());
        match value {
            Some(n) if n <= most => {
                self.at += digits;
                Ok(Some(n))
            }
            _ => Err(self.error(Fault::OutOfRange { what, most })),
        }
    }

    fn atom(&mut self) -> Result<AtomToken, SmilesError> {
        let isotope = self.number("the mass number", MOST_ISOTOPE)?;
        let mut atom = self.symbol()?;
        // a mass number of 0 states none
        atom.isotope = isotope
            .and_then(|n| u16::try_from(n).ok())
            .filter(|n| *n > 0);
        atom.chirality = self.chirality()?;
        atom.hydrogens = Some(self.hydrogens()?);
        atom.charge = self.charge()?;
        if self.take(":") {
            match self.number("the class", MOST_CLASS)? {
                Some(n) => atom.class = u16::try_from(n).unwrap_or(u16::MAX),
                None => return Err(self.no_place()),
            }
        }
        if self.rest().is_empty() {
            Ok(atom)
        } else {
            Err(self.no_place())
        }
    }

    /// That the next character has no place here.
    fn no_place(&self) -> SmilesError {
        let sign = self.rest().chars().next();
        let text = sign.map_or_else(|| "]".to_owned(), String::from);
        self.error(Fault::InBracket(text))
    }

    fn symbol(&mut self) -> Result<AtomToken, SmilesError> {
        if self.take("*") {
            return Ok(AtomToken::new(Element::ANY, false));
        }
        let rest = self.rest();
        let letters = |n: usize| {
            let word = rest.get(..n);
            word.filter(|w| w.bytes().all(|b| b.is_ascii_alphabetic()))
        };
        for word in [letters(2), letters(1)].into_iter().flatten() {
            let found = Element::from_symbol(word).map(|e| (e, false));
            if let Some((element, aromatic)) = found.or_else(|| lower_case(word)) {
                self.at += word.len();
                return Ok(AtomToken::new(element, aromatic));
            }
        }
        let text: String = self.rest().chars().take(2).collect();
        let mut signs = text.chars();
        let capital: String = signs
            .next()
            .into_iter()
            .map(|c| c.to_ascii_uppercase())
            .chain(signs.map(|c| c.to_ascii_lowercase()))
            .collect();
        let perhaps = Element::from_symbol(&capital).map(|e| e.symbol().to_owned());
        Err(self.error(Fault::Symbol { text, perhaps }))
    }

    fn chirality(&mut self) -> Result<Option<Chirality>, SmilesError> {
        let start = self.at;
        if !self.take("@") {
            return Ok(None);
        }
        let other = |this: &Inside<'_>, reason| Err(SmilesError::new(this.column + start, reason));
        let is_double = self.take("@");
        if self.rest().starts_with('?') {
            return other(self, Fault::UnknownCentre);
        }
        if is_double {
            return Ok(Some(statement(Shape::Any, 2)));
        }
        let classes = [
            ("TH", 2, Ok(Shape::Tetrahedral)),
            ("AL", 2, Ok(Shape::Axis)),
            ("SP", 3, Err("square-planar")),
            ("TB", 20, Err("trigonal-bipyramidal")),
            ("OH", 30, Err("octahedral")),
        ];
        for (word, most, shape) in classes {
            if !self.take(word) {
                continue;
            }
            let number = self.number("the number of the arrangement", 99)?;
            return match (number, shape) {
                (Some(n), Ok(shape)) if (1..=most).contains(&n) => Ok(Some(statement(shape, n))),
                (Some(n), Err(shape)) if (1..=most).contains(&n) => {
                    other(self, Fault::ManyArrangements(shape))
                }
                _ => {
                    let text = self.text.get(start..self.at).unwrap_or_default();
                    other(self, Fault::ChiralClass(text.to_owned()))
                }
            };
        }
        Ok(Some(statement(Shape::Any, 1)))
    }

    fn hydrogens(&mut self) -> Result<u8, SmilesError> {
        if !self.take("H") {
            return Ok(0);
        }
        let number = self.number("the number of hydrogens", MOST_HYDROGENS)?;
        Ok(number.and_then(|n| u8::try_from(n).ok()).unwrap_or(1))
    }

    /// `+`, `++`, `+2` and the like; also more signs in a row.
    fn charge(&mut self) -> Result<i8, SmilesError> {
        let Some(sign @ (b'+' | b'-')) = self.rest().bytes().next() else {
            return Ok(0);
        };
        let run = self.rest().bytes().take_while(|b| *b == sign).count();
        self.at += 1;
        let most = MOST_CHARGE;
        let what = "the charge";
        let size = match self.number(what, most)? {
            Some(n) => n,
            None => {
                self.at += run - 1;
                u32::try_from(run).unwrap_or(u32::MAX)
            }
        };
        match i8::try_from(size) {
            Ok(n) if size <= most => Ok(if sign == b'+' { n } else { -n }),
            _ => Err(self.error(Fault::OutOfRange { what, most })),
        }
    }
}

fn statement(shape: Shape, number: u32) -> Chirality {
    Chirality {
        shape,
        parity: Parity::from_even(number == 2),
    }
}

/// An aromatic symbol: those of OpenSMILES, and tellurium and silicon (common practice, no source).
fn lower_case(word: &str) -> Option<(Element, bool)> {
    let element = match word {
        "b" => Element::B,
        "c" => Element::C,
        "n" => Element::N,
        "o" => Element::O,
        "p" => Element::P,
        "s" => Element::S,
        "se" => Element::SE,
        "as" => Element::AS,
        "te" => Element::TE,
        "si" => Element::SI,
        _ => return None,
    };
    Some((element, true))
}

#[cfg(test)]
mod tests {
    use super::*;

    fn good(text: &str) -> AtomToken {
        let (atom, length) = read(text, 0).unwrap_or_else(|e| panic!("{text}: {e}"));
        assert_eq!(length, text.len(), "{text}");
        atom
    }

    fn bad(text: &str) -> (usize, Fault) {
        let error = read(text, 0)
            .err()
            .unwrap_or_else(|| panic!("{text} was read"));
        (error.column, error.reason)
    }

    #[test]
    fn parts_stand_in_their_order() {
        let atom = good("[13C@@H2-3:0042]");
        assert_eq!(atom.element, Element::C);
        assert_eq!((atom.isotope, atom.hydrogens), (Some(13), Some(2)));
        assert_eq!((atom.charge, atom.class), (-3, 42));
        assert_eq!(atom.chirality, Some(statement(Shape::Any, 2)));
        assert_eq!(good("[Sc]").element.symbol(), "Sc");
        assert_eq!(good("[sH+]").element, Element::S);
        assert_eq!(good("[se]").element, Element::SE);
        assert_eq!((good("[Cu++]").charge, good("[Cu+2]").charge), (2, 2));
        assert_eq!((good("[O--]").charge, good("[Ti+15]").charge), (-2, 15));
        assert_eq!(good("[*:1]").class, 1);
        assert_eq!(good("[0CH4]").isotope, None);
        assert_eq!(good("[H]").hydrogens, Some(0));
        assert_eq!(good("[C@TH2H]").hydrogens, Some(1));
        assert_eq!(good("[C@AL1]").chirality, Some(statement(Shape::Axis, 1)));
    }

    #[test]
    fn faults_of_brackets() {
        assert_eq!(bad("[C"), (1, Fault::OpenBracket));
        assert_eq!(bad("[C[N]]"), (1, Fault::OpenBracket));
        assert_eq!(bad("[C@?H]"), (3, Fault::UnknownCentre));
        assert_eq!(bad("[C@@?H]"), (3, Fault::UnknownCentre));
        assert_eq!(
            bad("[Pt@SP1]"),
            (4, Fault::ManyArrangements("square-planar"))
        );
        assert_eq!(
            bad("[As@TB20]").1,
            Fault::ManyArrangements("trigonal-bipyramidal")
        );
        assert_eq!(bad("[Co@OH30]").1, Fault::ManyArrangements("octahedral"));
        assert_eq!(bad("[Co@OH31]").1, Fault::ChiralClass("@OH31".to_owned()));
        assert_eq!(bad("[C@TH3]").1, Fault::ChiralClass("@TH3".to_owned()));
        assert_eq!(bad("[C@TH]").1, Fault::ChiralClass("@TH".to_owned()));
        assert_eq!(bad("[1000C]").0, 2);
        assert_eq!(bad("[C+H]"), (4, Fault::InBracket("H".to_owned())));
        assert_eq!(bad("[CH10]").0, 4);
        assert_eq!(bad("[C:]"), (4, Fault::InBracket("]".to_owned())));
        assert_eq!(bad("[C:10000]").0, 4);
        assert_eq!(bad("[CL]"), (3, Fault::InBracket("L".to_owned())));
        assert_eq!(bad("[]").0, 2);
        assert_eq!(bad("[é]").0, 2);
        assert_eq!(bad("[li]").1.remedy(), "Write Li if that is meant.");
        assert!(matches!(bad("[99999999999C]").1, Fault::OutOfRange { .. }));
    }
}
