//! Signs put together: atoms, bonds, and the neighbours of each atom in the order of writing.
//!
//! A stack holds the open branches, so that the depth of nesting costs no recursion.

use super::error::{Fault, SmilesError};
use super::lex::{AtomToken, Lexer, Symbol, Token};
use smallvec::SmallVec;
use std::collections::BTreeMap;

/// What a line says, before any chemistry.
#[derive(Debug, Default)]
pub(super) struct Parsed {
    pub(super) atoms: Vec<WrittenAtom>,
    pub(super) bonds: Vec<WrittenBond>,
    /// Whether a ring number stands after a branch, which the grammar does not allow.
    pub(super) late_ring: Option<usize>,
}

/// An atom and what stands around it.
#[derive(Debug)]
pub(super) struct WrittenAtom {
    pub(super) token: AtomToken,
    pub(super) column: usize,
    /// Neighbours in the order that `@` counts: the atom before, ring bonds by their numbers, branches,
    /// the atom after.
    pub(super) neighbors: SmallVec<[usize; 4]>,
    /// Whether the first of them stands before the atom: hydrogen and lone pair come right after it.
    pub(super) has_previous: bool,
}

/// A bond.
#[derive(Clone, Copy, Debug)]
pub(super) struct WrittenBond {
    /// In the order of writing; of a ring bond, the atom that opens it first.
    pub(super) ends: [usize; 2],
    /// As seen from the first end; `None` where nothing is written.
    pub(super) symbol: Option<Symbol>,
    /// Column of its sign; of its second atom or ring number if it has none.
    pub(super) column: usize,
}

/// A ring number that waits for its second half.
struct OpenRing {
    atom: usize,
    symbol: Option<Symbol>,
    column: usize,
    /// Its place among the atom's neighbours.
    place: usize,
}

/// What stood last.
#[derive(Clone, Copy, PartialEq, Eq)]
enum Last {
    Start,
    Atom,
    Bond,
    Open,
    Close,
    Dot,
}

struct Parser {
    parsed: Parsed,
    /// The atom that the next bond starts from.
    current: Option<usize>,
    /// A bond sign that waits for its atom.
    bond: Option<(Symbol, usize)>,
    /// Atoms at which branches began, and the columns of their brackets.
    branches: Vec<(usize, usize)>,
    rings: BTreeMap<u32, OpenRing>,
    last: Last,
    /// What stood before the bond sign that waits.
    before_bond: Last,
    last_column: usize,
}

/// Puts the signs of a line without blanks together.
pub(super) fn parse(text: &str) -> Result<Parsed, SmilesError> {
    let mut parser = Parser {
        parsed: Parsed::default(),
        current: None,
        bond: None,
        branches: Vec::new(),
        rings: BTreeMap::new(),
        last: Last::Start,
        before_bond: Last::Start,
        last_column: 1,
    };
    for (column, token) in Lexer::new(text) {
        parser.take(token?, column)?;
        parser.last_column = column;
    }
    parser.finish()
}

impl Parser {
    fn take(&mut self, token: Token, column: usize) -> Result<(), SmilesError> {
        let error = |reason| Err(SmilesError::new(column, reason));
        match token {
            Token::Atom(token) => self.atom(token, column),
            Token::Ring(number) => return self.ring(number, column),
            Token::Bond(symbol) => {
                if self.bond.is_some() {
                    return error(Fault::TwoBonds);
                }
                if self.current.is_none() {
                    return error(Fault::LooseBond);
                }
                self.bond = Some((symbol, column));
                self.before_bond = self.last;
                self.last = Last::Bond;
            }
            Token::Open => {
                let Some(atom) = self.current else {
                    return error(Fault::LooseBranch);
                };
                match self.last {
                    Last::Open => return error(Fault::EmptyBranch),
                    Last::Bond => return error(Fault::LooseBond),
                    Last::Start | Last::Dot | Last::Atom | Last::Close => {}
                }
                self.branches.push((atom, column));
                self.last = Last::Open;
            }
            Token::Close => {
                match self.last {
                    Last::Open => return error(Fault::EmptyBranch),
                    Last::Bond => return error(Fault::LooseBond),
                    Last::Dot => return error(Fault::LooseDot),
                    Last::Start | Last::Atom | Last::Close => {}
                }
                let Some((atom, _)) = self.branches.pop() else {
                    return error(Fault::Unopened);
                };
                self.current = Some(atom);
                self.last = Last::Close;
            }
            Token::Dot => {
                match self.last {
                    Last::Start | Last::Dot => return error(Fault::LooseDot),
                    Last::Bond => return error(Fault::LooseBond),
                    Last::Atom | Last::Open | Last::Close => {}
                }
                self.current = None;
                self.last = Last::Dot;
            }
        }
        Ok(())
    }

    fn atom(&mut self, token: AtomToken, column: usize) {
        let new = self.parsed.atoms.len();
        let mut neighbors = SmallVec::new();
        let pending = self.bond.take();
        if let Some(previous) = self.current {
            neighbors.push(previous);
            self.parsed.atoms[previous].neighbors.push(new);
            self.parsed.bonds.push(WrittenBond {
                ends: [previous, new],
                symbol: pending.map(|(s, _)| s),
                column: pending.map_or(column, |(_, c)| c),
            });
        }
        self.parsed.atoms.push(WrittenAtom {
            token,
            column,
            has_previous: !neighbors.is_empty(),
            neighbors,
        });
        self.current = Some(new);
        self.last = Last::Atom;
    }

    fn ring(&mut self, number: u32, column: usize) -> Result<(), SmilesError> {
        let error = |reason| Err(SmilesError::new(column, reason));
        let before = match self.last {
            Last::Bond => self.before_bond,
            other => other,
        };
        let Some(atom) = self.current.filter(|_| before != Last::Open) else {
            return error(Fault::LooseRing);
        };
        if before == Last::Close && self.parsed.late_ring.is_none() {
            self.parsed.late_ring = Some(column);
        }
        let pending = self.bond.take();
        let symbol = pending.map(|(s, _)| s);
        let column = pending.map_or(column, |(_, c)| c);
        // a second number after a branch is as late as the first
        self.last = if before == Last::Close {
            Last::Close
        } else {
            Last::Atom
        };
        let Some(open) = self.rings.remove(&number) else {
            let neighbors = &mut self.parsed.atoms[atom].neighbors;
            let place = neighbors.len();
            neighbors.push(usize::MAX);
            let open = OpenRing {
                atom,
                symbol,
                column,
                place,
            };
            self.rings.insert(number, open);
            return Ok(());
        };
        if open.atom == atom {
            return error(Fault::Loop);
        }
        if self.parsed.atoms[atom].neighbors.contains(&open.atom) {
            return error(Fault::Twice);
        }
        let own = symbol.map(Symbol::reversed);
        if open.symbol.is_some_and(|s| own.is_some_and(|o| o != s)) {
            return Err(SmilesError::new(column, Fault::RingBonds(number)));
        }
        self.parsed.atoms[open.atom].neighbors[open.place] = atom;
        self.parsed.atoms[atom].neighbors.push(open.atom);
        self.parsed.bonds.push(WrittenBond {
            ends: [open.atom, atom],
            symbol: open.symbol.or(own),
            column: if open.symbol.is_some() {
                open.column
            } else {
                column
            },
        });
        Ok(())
    }

    fn finish(self) -> Result<Parsed, SmilesError> {
        let error = |column, reason| Err(SmilesError::new(column, reason));
        if let Some((_, column)) = self.bond {
            return error(column, Fault::LooseBond);
        }
        if let Some((_, column)) = self.branches.last() {
            let reason = if self.last == Last::Open {
                Fault::EmptyBranch
            } else {
                Fault::OpenBranch
            };
            return error(*column, reason);
        }
        if self.last == Last::Dot {
            return error(self.last_column, Fault::LooseDot);
        }
        let open = self.rings.iter().min_by_key(|(_, ring)| ring.column);
        if let Some((number, ring)) = open {
            return error(ring.column, Fault::OpenRing(*number));
        }
        if self.parsed.atoms.is_empty() {
            return error(1, Fault::Empty);
        }
        Ok(self.parsed)
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn fault(text: &str) -> (usize, Fault) {
        let error = parse(text)
            .err()
            .unwrap_or_else(|| panic!("{text} was read"));
        (error.column, error.reason)
    }

    #[test]
    fn neighbours_stand_in_the_order_of_writing() {
        let parsed = parse("N[C@@]12(F)CO2.S1").unwrap();
        // nitrogen, the partner of 1, the oxygen of 2, fluorine, carbon
        assert_eq!(parsed.atoms[1].neighbors.as_slice(), [0, 5, 4, 2, 3]);
        assert!(parsed.atoms[1].has_previous && !parsed.atoms[5].has_previous);
        assert_eq!(parsed.atoms[4].neighbors.as_slice(), [3, 1]);
    }

    #[test]
    fn signs_of_ring_bonds_may_stand_on_either_side() {
        for text in ["C=1CCC1", "C1CCC=1", "C=1CCC=1"] {
            let parsed = parse(text).unwrap();
            assert_eq!(parsed.bonds[3].symbol, Some(Symbol::Double), "{text}");
        }
        assert_eq!(fault("C=1CCC#1"), (7, Fault::RingBonds(1)));
        // seen from the first atom
        for text in ["C/1CC1", "C1CC\\1", "C/1CC\\1"] {
            assert_eq!(
                parse(text).unwrap().bonds[2].symbol,
                Some(Symbol::Up),
                "{text}"
            );
        }
        assert_eq!(fault("C/1CC/1"), (6, Fault::RingBonds(1)));
    }

    #[test]
    fn ring_numbers_are_used_again() {
        for text in ["C1CC1C1CC1", "C0CC0", "C%01CC1", "C%12CC%12", "C(C)1CC1"] {
            let parsed = parse(text).unwrap();
            assert!(parsed.bonds.len() >= parsed.atoms.len(), "{text}");
        }
        assert_eq!(parse("C(C)1CC1").unwrap().late_ring, Some(5));
    }

    #[test]
    fn grammar() {
        use Fault as F;
        for (text, column, reason) in [
            ("", 1, F::Empty),
            ("C=", 2, F::LooseBond),
            ("=C", 1, F::LooseBond),
            ("C=.C", 3, F::LooseBond),
            ("C.=C", 3, F::LooseBond),
            ("C=(C)C", 3, F::LooseBond),
            ("C(C=)C", 5, F::LooseBond),
            ("C==C", 3, F::TwoBonds),
            ("C..C", 3, F::LooseDot),
            (".C", 1, F::LooseDot),
            ("C.", 2, F::LooseDot),
            ("(C)C", 1, F::LooseBranch),
            ("C.(C)", 3, F::LooseBranch),
            ("C()C", 3, F::EmptyBranch),
            ("C((C))C", 3, F::EmptyBranch),
            ("C(", 2, F::EmptyBranch),
            ("C(C", 2, F::OpenBranch),
            ("CC)C", 3, F::Unopened),
            ("1CC1", 1, F::LooseRing),
            ("C(1CC1)", 3, F::LooseRing),
            ("C(=1CC1)", 4, F::LooseRing),
            ("C.1CC1", 3, F::LooseRing),
            ("C1CC2CC2", 2, F::OpenRing(1)),
            ("C11", 3, F::Loop),
            ("C1C1", 4, F::Twice),
            ("C12CCCCC12", 10, F::Twice),
        ] {
            assert_eq!(fault(text), (column, reason), "{text}");
        }
    }
}
