//! Signs of the notation: atoms of the organic subset, bonds, ring numbers, brackets of branches.

use super::bracket;
use super::error::{Fault, SmilesError};
use crate::element::Element;
use crate::stereo::Parity;

/// One sign.
#[derive(Clone, Debug, PartialEq, Eq)]
pub(super) enum Token {
    Atom(AtomToken),
    Bond(Symbol),
    Ring(u32),
    Open,
    Close,
    Dot,
}

/// An atom as it is written.
#[derive(Clone, Debug, PartialEq, Eq)]
pub(super) struct AtomToken {
    pub(super) element: Element,
    /// Written in lower case.
    pub(super) aromatic: bool,
    pub(super) isotope: Option<u16>,
    /// Hydrogens of a bracket; `None` outside of brackets, where the valence says how many.
    pub(super) hydrogens: Option<u8>,
    pub(super) charge: i8,
    pub(super) class: u16,
    pub(super) chirality: Option<Chirality>,
}

impl AtomToken {
    pub(super) fn new(element: Element, aromatic: bool) -> AtomToken {
        AtomToken {
            element,
            aromatic,
            isotope: None,
            hydrogens: None,
            charge: 0,
            class: 0,
            chirality: None,
        }
    }
}

/// What `@` says: seen from the first neighbour, the others follow anticlockwise (`Odd`) or clockwise
/// (`Even`).
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) struct Chirality {
    pub(super) shape: Shape,
    pub(super) parity: Parity,
}

/// What kind of place an `@` names.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Shape {
    /// Whatever the atom is.
    Any,
    /// `@TH`.
    Tetrahedral,
    /// `@AL`: the middle of an axis.
    Axis,
}

/// A bond as it is written.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Symbol {
    Single,
    Double,
    Triple,
    Aromatic,
    /// `/`: the atom after it lies above the atom before it.
    Up,
    /// `\`.
    Down,
}

impl Symbol {
    /// The same bond, seen from its other end.
    pub(super) fn reversed(self) -> Symbol {
        match self {
            Symbol::Up => Symbol::Down,
            Symbol::Down => Symbol::Up,
            Symbol::Single | Symbol::Double | Symbol::Triple | Symbol::Aromatic => self,
        }
    }
}

/// Walks over the signs of a line without blanks.
#[derive(Clone, Debug)]
pub(super) struct Lexer<'a> {
    text: &'a str,
    at: usize,
}

impl<'a> Lexer<'a> {
    pub(super) fn new(text: &'a str) -> Lexer<'a> {
        Lexer { text, at: 0 }
    }

    fn byte(&self, ahead: usize) -> Option<u8> {
        self.text.as_bytes().get(self.at + ahead).copied()
    }

    /// The next sign and its column. All signs are ASCII, so that bytes before a fault are columns.
    fn token(&mut self, first: u8) -> Result<Token, SmilesError> {
        let column = self.at + 1;
        let (token, length) = match first {
            b'[' => {
                let (atom, length) = bracket::read(self.text, self.at)?;
                (Token::Atom(atom), length)
            }
            b'(' => (Token::Open, 1),
            b')' => (Token::Close, 1),
            b'.' => (Token::Dot, 1),
            b'-' => (Token::Bond(Symbol::Single), 1),
            b'=' => (Token::Bond(Symbol::Double), 1),
            b'#' => (Token::Bond(Symbol::Triple), 1),
            b':' => (Token::Bond(Symbol::Aromatic), 1),
            b'/' => (Token::Bond(Symbol::Up), 1),
            b'\\' => (Token::Bond(Symbol::Down), 1),
            b'$' => return Err(SmilesError::new(column, Fault::Quadruple)),
            b'0'..=b'9' => (Token::Ring(u32::from(first - b'0')), 1),
            b'%' => self.ring_number(column)?,
            _ => self.organic(first, column)?,
        };
        self.at += length;
        Ok(token)
    }

    /// `%nn`; also `%(n)` with up to five digits, which programs write past 99 open rings (common
    /// practice, no source).
    fn ring_number(&self, column: usize) -> Result<(Token, usize), SmilesError> {
        let rest = self.text.get(self.at + 1..).unwrap_or_default();
        let bracketed = rest.strip_prefix('(').and_then(|r| r.split_once(')'));
        let (digits, length) = match bracketed {
            Some((digits, _)) if digits.len() <= 5 => (digits, digits.len() + 3),
            _ => (rest.get(..2).unwrap_or_default(), 3),
        };
        let plain = !digits.is_empty() && digits.bytes().all(|b| b.is_ascii_digit());
        match digits.parse() {
            Ok(number) if plain => Ok((Token::Ring(number), length)),
            _ => Err(SmilesError::new(column, Fault::RingNumber)),
        }
    }

    /// An atom without brackets.
    fn organic(&self, first: u8, column: usize) -> Result<(Token, usize), SmilesError> {
        let second = self.byte(1);
        let (element, aromatic, length) = match (first, second) {
            (b'C', Some(b'l')) => (Element::CL, false, 2),
            (b'B', Some(b'r')) => (Element::BR, false, 2),
            (b'B', _) => (Element::B, false, 1),
            (b'C', _) => (Element::C, false, 1),
            (b'N', _) => (Element::N, false, 1),
            (b'O', _) => (Element::O, false, 1),
            (b'P', _) => (Element::P, false, 1),
            (b'S', _) => (Element::S, false, 1),
            (b'F', _) => (Element::F, false, 1),
            (b'I', _) => (Element::I, false, 1),
            (b'b', _) => (Element::B, true, 1),
            (b'c', _) => (Element::C, true, 1),
            (b'n', _) => (Element::N, true, 1),
            (b'o', _) => (Element::O, true, 1),
            (b'p', _) => (Element::P, true, 1),
            (b's', _) => (Element::S, true, 1),
            (b'*', _) => (Element::ANY, false, 1),
            _ => return Err(SmilesError::new(column, self.no_sign(first))),
        };
        Ok((Token::Atom(AtomToken::new(element, aromatic)), length))
    }

    /// What to say of a character that begins no sign.
    fn no_sign(&self, first: u8) -> Fault {
        let sign = self.text.get(self.at..).and_then(|t| t.chars().next());
        if !first.is_ascii_alphabetic() {
            return Fault::Sign(sign.unwrap_or('\u{fffd}'));
        }
        let pair = |start: usize| self.text.get(start..start + 2);
        // `Si`: the fault is seen at the `i`
        let before = self.at.checked_sub(1).and_then(pair);
        let around = [before, pair(self.at), self.text.get(self.at..=self.at)];
        let symbols = around.into_iter().flatten();
        let perhaps = symbols
            .filter(|s| s.is_ascii())
            .find_map(|s| Element::from_symbol(s).map(|_| format!("[{s}]")));
        let text = sign.map(String::from).unwrap_or_default();
        Fault::Symbol { text, perhaps }
    }
}

impl Iterator for Lexer<'_> {
    type Item = (usize, Result<Token, SmilesError>);

    fn next(&mut self) -> Option<Self::Item> {
        let first = self.byte(0)?;
        Some((self.at + 1, self.token(first)))
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn fault(text: &str) -> (usize, Fault) {
        Lexer::new(text)
            .find_map(|(_, t)| t.err())
            .map(|e| (e.column, e.reason))
            .unwrap()
    }

    #[test]
    fn signs_are_told_apart() {
        let tokens: Vec<Token> = Lexer::new("ClBc=%12%(345)3")
            .map(|(_, t)| t.unwrap())
            .collect();
        let atom = |e, a| Token::Atom(AtomToken::new(e, a));
        assert_eq!(
            tokens,
            [
                atom(Element::CL, false),
                atom(Element::B, false),
                atom(Element::C, true),
                Token::Bond(Symbol::Double),
                Token::Ring(12),
                Token::Ring(345),
                Token::Ring(3),
            ]
        );
    }

    #[test]
    fn faults_have_their_column_and_a_guess() {
        let (column, reason) = fault("CSi");
        assert_eq!(column, 3);
        assert_eq!(reason.remedy(), "Write [Si] if that is meant.");
        assert_eq!(fault("CNa").1.remedy(), "Write [Na] if that is meant.");
        assert_eq!(fault("CH3").1.remedy(), "Write [H] if that is meant.");
        assert_eq!(fault("C$C"), (2, Fault::Quadruple));
        assert_eq!(fault("C%1C"), (2, Fault::RingNumber));
        assert_eq!(fault("C%é"), (2, Fault::RingNumber));
        assert_eq!(fault("C\u{2013}C"), (2, Fault::Sign('\u{2013}')));
        assert_eq!(fault("C~C"), (2, Fault::Sign('~')));
    }
}
