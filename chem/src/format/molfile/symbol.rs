//! What stands in the symbol column: elements, isotopes of hydrogen, placeholders.

use crate::element::Element;

/// A symbol of the atom block, understood.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Symbol {
    /// An element as it is written.
    Element(Element),
    /// An element in capitals (`CL`).
    Capitals(Element),
    /// `D` or `T`: hydrogen of this mass number.
    Hydrogen(u16),
    /// A placeholder: any atom, a rest, a list.
    Placeholder,
}

/// Understands a symbol; `Err` with a symbol that may be meant.
pub(super) fn understand(symbol: &str) -> Result<Symbol, Option<&'static str>> {
    if let Some(element) = Element::from_symbol(symbol) {
        return Ok(Symbol::Element(element));
    }
    match symbol {
        "D" => return Ok(Symbol::Hydrogen(2)),
        "T" => return Ok(Symbol::Hydrogen(3)),
        _ if is_placeholder(symbol) => return Ok(Symbol::Placeholder),
        _ => {}
    }
    let [first, second] = symbol.as_bytes() else {
        return Err(alike(symbol));
    };
    let lowered = [first.to_ascii_uppercase(), second.to_ascii_lowercase()];
    let element = std::str::from_utf8(&lowered)
        .ok()
        .and_then(Element::from_symbol);
    match element {
        Some(element) if first.is_ascii_uppercase() && !is_formula(*first, *second) => {
            Ok(Symbol::Capitals(element))
        }
        other => Err(other.map(Element::symbol)),
    }
}

/// Whether a symbol stands for an atom that is not stated; the names are those of the format
/// (any, hetero, halogen, list, lone pair, rest, polymer, modified).
pub(super) fn is_placeholder(symbol: &str) -> bool {
    match symbol {
        "*" | "A" | "Q" | "X" | "L" | "LP" | "R" | "R#" | "Pol" | "Mod" => true,
        // R12, and as people number their rests: R1A, R2'
        _ => symbol
            .strip_prefix('R')
            .is_some_and(|rest| rest.starts_with(|c: char| c.is_ascii_digit() && c != '0')),
    }
}

/// The number of a rest: 7 for `R7`.
pub(super) fn rest_number(symbol: &str) -> Option<u16> {
    let digits = symbol.strip_prefix('R')?;
    if digits.starts_with('0') || !digits.bytes().all(|b| b.is_ascii_digit()) {
        return None;
    }
    digits.parse().ok().filter(|n| *n <= 999)
}

/// Two capitals that are rather two atoms than one element: `NH`, `CN`, `NO`. `SI` is silicon.
fn is_formula(first: u8, second: u8) -> bool {
    let common = |b: u8| b"HBCNOFPSI".contains(&b);
    common(first) && common(second) && [first, second] != *b"SI"
}

fn alike(symbol: &str) -> Option<&'static str> {
    let upper = symbol.to_ascii_uppercase();
    Element::from_symbol(&upper).map(Element::symbol)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn symbols_of_real_files() {
        assert_eq!(understand("Cl"), Ok(Symbol::Element(Element::CL)));
        assert_eq!(understand("CL"), Ok(Symbol::Capitals(Element::CL)));
        assert_eq!(understand("SI"), Ok(Symbol::Capitals(Element::SI)));
        assert_eq!(understand("D"), Ok(Symbol::Hydrogen(2)));
        for text in ["R#", "R", "R1", "R12", "R1A", "*", "A", "Q", "X", "L", "LP"] {
            assert_eq!(understand(text), Ok(Symbol::Placeholder), "{text}");
        }
        assert_eq!(understand("cl"), Err(Some("Cl")));
        assert_eq!(understand("c"), Err(Some("C")));
        // never nihonium, nobelium, copernicium
        assert_eq!(understand("NH"), Err(Some("Nh")));
        assert_eq!(understand("NO"), Err(Some("No")));
        for text in ["Me", "Ph", "Xx", "R0", "Boc", "é", ""] {
            assert_eq!(understand(text), Err(None), "{text}");
        }
    }
}
