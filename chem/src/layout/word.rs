//! What may be typed for a graft.

use super::GraftError;
use crate::element::Element;
use crate::molecule::Order;

/// A graft, understood.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Word {
    /// An element, with a charge if one is typed behind it (`N`, `Cl`, `O-`).
    Element(Element, Option<i8>),
    /// A charge (`+`, `2+`, `1-`, `0`).
    Charge(i8),
    /// A bond of this order (`-`, `=`, `#`).
    Bond(Order),
    /// A ring of this size, with alternating double bonds or without (`5`, `6=`).
    Ring {
        /// Atoms in the ring.
        size: usize,
        /// Whether double bonds alternate.
        alternating: bool,
    },
}

/// Smallest and largest ring that can be typed.
pub(super) const RINGS: std::ops::RangeInclusive<usize> = 3..=8;

/// Reads what was typed; blanks round it are left out.
///
/// # Errors
/// What is wrong and what can be typed instead.
pub fn read(text: &str) -> Result<Word, GraftError> {
    let text = text.trim();
    match text {
        "" => return Err(GraftError::Nothing),
        "-" => return Ok(Word::Bond(Order::Single)),
        "=" => return Ok(Word::Bond(Order::Double)),
        "#" => return Ok(Word::Bond(Order::Triple)),
        "+" => return Ok(Word::Charge(1)),
        "0" => return Ok(Word::Charge(0)),
        _ => {}
    }
    if text.starts_with(|c: char| c.is_ascii_digit()) {
        return number(text);
    }
    let letters = text
        .find(|c: char| !c.is_ascii_alphabetic())
        .unwrap_or(text.len());
    let (symbol, rest) = text.split_at(letters);
    if letters == 0 {
        return Err(no_element(text));
    }
    let charge = match rest {
        "" => None,
        rest => Some(charge(rest).ok_or_else(|| GraftError::NoCharge(rest.to_owned()))?),
    };
    match Element::from_symbol(symbol) {
        Some(element) => Ok(Word::Element(element, charge)),
        None => Err(no_element(symbol)),
    }
}

fn number(text: &str) -> Result<Word, GraftError> {
    if let Some(charge) = charge(text) {
        return Ok(Word::Charge(charge));
    }
    let (size, alternating) = match text.strip_suffix('=') {
        Some(size) => (size, true),
        None => (text, false),
    };
    match size.parse::<usize>() {
        Ok(size) if RINGS.contains(&size) => Ok(Word::Ring { size, alternating }),
        Ok(size) => Err(GraftError::RingSize(size)),
        Err(_) => Err(GraftError::NoNumber(text.to_owned())),
    }
}

/// `+`, `-`, `2+`, `2-`; one sign or a figure and a sign.
fn charge(text: &str) -> Option<i8> {
    let (figure, sign) = match (text.strip_suffix('+'), text.strip_suffix('-')) {
        (Some(figure), _) => (figure, 1),
        (None, Some(figure)) => (figure, -1),
        (None, None) => return None,
    };
    let size = match figure {
        "" => 1,
        figure => figure.parse::<i8>().ok().filter(|n| (1..=9).contains(n))?,
    };
    Some(sign * size)
}

fn no_element(symbol: &str) -> GraftError {
    let mut letters = symbol.chars();
    let proper: String = letters
        .next()
        .into_iter()
        .flat_map(char::to_uppercase)
        .chain(letters.flat_map(char::to_lowercase))
        .collect();
    GraftError::NoElement {
        written: symbol.to_owned(),
        perhaps: Element::from_symbol(&proper).map(Element::symbol),
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn words_are_read() {
        let ring = |size, alternating| Word::Ring { size, alternating };
        for (text, word) in [
            ("N", Word::Element(Element::N, None)),
            (" Cl ", Word::Element(Element::CL, None)),
            ("N+", Word::Element(Element::N, Some(1))),
            ("O-", Word::Element(Element::O, Some(-1))),
            ("S2-", Word::Element(Element::S, Some(-2))),
            ("-", Word::Bond(Order::Single)),
            ("=", Word::Bond(Order::Double)),
            ("#", Word::Bond(Order::Triple)),
            ("+", Word::Charge(1)),
            ("2+", Word::Charge(2)),
            ("1-", Word::Charge(-1)),
            ("0", Word::Charge(0)),
            ("3", ring(3, false)),
            ("8", ring(8, false)),
            ("6=", ring(6, true)),
        ] {
            assert_eq!(read(text), Ok(word), "{text}");
        }
    }

    #[test]
    fn faults_say_what_to_do() {
        for (text, part) in [
            ("cl", "Cl is one"),
            ("Qq", "no element"),
            ("9", "3 to 8"),
            ("2", "3 to 8"),
            ("6x", "ring size"),
            ("N*", "no charge"),
            ("é", "no element"),
            ("", "a ring size"),
            ("99999999999999999999999", "ring size"),
        ] {
            let error = read(text).unwrap_err().to_string();
            assert!(error.contains(part), "{text}: {error}");
        }
    }
}
