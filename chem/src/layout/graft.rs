//! From a graft to edits: elements, charges, bonds and rings put on a drawing.
//!
//! A new atom that falls on one that is there becomes that one, so that rings can be fused round a
//! corner.

use super::grow::grown;
use super::word::Word;
use super::{GraftError, ring};
use crate::drawing::{Drawing, Edit};
use crate::element::Element;
use crate::geom::Point;
use crate::molecule::{Atom, AtomIx, BondIx, Order, charge_text};

/// Edits of a graft and what is to be selected when they are made.
#[derive(Clone, Debug, PartialEq)]
pub struct Graft {
    /// Name of the step.
    pub name: String,
    /// The edits.
    pub edits: Vec<Edit>,
    /// The atom to go on from.
    pub then: Option<AtomIx>,
    /// What it does, in a few words.
    pub says: String,
}

/// What a word does to some atoms and bonds; with nothing drawn, what it starts with.
///
/// # Errors
/// Why it cannot be done here, and what can.
pub fn graft(
    drawing: &Drawing,
    atoms: &[AtomIx],
    bonds: &[BondIx],
    word: Word,
) -> Result<Graft, GraftError> {
    let mut graft = match word {
        Word::Element(element, charge) => set_element(drawing, atoms, bonds, element, charge),
        Word::Charge(charge) => set_charge(drawing, atoms, charge),
        Word::Bond(order) => bond(drawing, atoms, bonds, order),
        Word::Ring { size, alternating } => ring::graft(drawing, (atoms, bonds), size, alternating),
    }?;
    if let Some(symbol) = overfilled(drawing, &graft.edits) {
        graft.says = format!("{}; {symbol} has no such valence", graft.says);
    }
    Ok(graft)
}

/// The symbol of the first atom that gets a valence which its element does not have.
fn overfilled(drawing: &Drawing, edits: &[Edit]) -> Option<&'static str> {
    let (after, _) = drawing.apply(edits).ok()?;
    let (before, after) = (drawing.molecule(), after.molecule());
    after
        .atoms()
        .find(|a| {
            let was_so = a.index() < before.n_atoms() && !before.valence_is_usual(*a);
            !after.valence_is_usual(*a) && !was_so
        })
        .map(|a| after.element(a).symbol())
}

fn set_element(
    drawing: &Drawing,
    atoms: &[AtomIx],
    bonds: &[BondIx],
    element: Element,
    charge: Option<i8>,
) -> Result<Graft, GraftError> {
    let mut atom = Atom::new(element);
    atom.charge = charge.unwrap_or(0);
    let symbol = element.symbol();
    if atoms.is_empty() && bonds.is_empty() && drawing.molecule().n_atoms() == 0 {
        return Ok(Graft {
            name: format!("Start with {symbol}"),
            edits: vec![Edit::AddAtom(atom, Point::ORIGIN)],
            then: Some(AtomIx::new(0)),
            says: format!("one atom of {symbol}"),
        });
    }
    if atoms.is_empty() {
        return Err(GraftError::WantsAtom("an element"));
    }
    let edits = atoms
        .iter()
        .map(|a| Edit::SetAtom(*a, atom.clone()))
        .collect();
    Ok(Graft {
        name: format!("Make it {symbol}"),
        edits,
        then: only(atoms),
        says: match atoms.len() {
            1 => format!("{symbol} at this atom"),
            n => format!("{symbol} at {n} atoms"),
        },
    })
}

fn set_charge(drawing: &Drawing, atoms: &[AtomIx], charge: i8) -> Result<Graft, GraftError> {
    if atoms.is_empty() {
        return Err(GraftError::WantsAtom("a charge"));
    }
    let edits = atoms
        .iter()
        .map(|a| {
            let mut atom = drawing.molecule().atom(*a).clone();
            atom.charge = charge;
            Edit::SetAtom(*a, atom)
        })
        .collect();
    let says = match charge {
        0 => "no charge".to_owned(),
        n => format!("charge {}", charge_text(i32::from(n))),
    };
    Ok(Graft {
        name: "Set the charge".to_owned(),
        edits,
        then: only(atoms),
        says,
    })
}

fn order_name(order: Order) -> &'static str {
    match order {
        Order::Single => "single bond",
        Order::Double => "double bond",
        Order::Triple => "triple bond",
        Order::Special(_) => "special bond",
    }
}

fn bond(
    drawing: &Drawing,
    atoms: &[AtomIx],
    bonds: &[BondIx],
    order: Order,
) -> Result<Graft, GraftError> {
    let word = order_name(order);
    if !bonds.is_empty() {
        return Ok(Graft {
            name: format!("Make it a {word}"),
            edits: bonds.iter().map(|b| Edit::SetOrder(*b, order)).collect(),
            then: None,
            says: word.to_owned(),
        });
    }
    let m = drawing.molecule();
    match atoms {
        [a, b] => Ok(Graft {
            name: format!("Join by a {word}"),
            edits: match m.bond_between(*a, *b) {
                Some(bond) => vec![Edit::SetOrder(bond, order)],
                None => vec![Edit::AddBond([*a, *b], order)],
            },
            then: None,
            says: format!("{word} between the two"),
        }),
        [a] => {
            let next = AtomIx::new(m.n_atoms());
            Ok(Graft {
                name: format!("Grow a {word}"),
                edits: vec![
                    Edit::AddAtom(Atom::new(Element::C), grown(drawing, *a, order)),
                    Edit::AddBond([*a, next], order),
                ],
                then: Some(next),
                says: match order {
                    Order::Single => "grows a single bond; 1- is a charge".to_owned(),
                    _ => format!("grows a {word}"),
                },
            })
        }
        [] => Err(GraftError::WantsAtomOrBond),
        _ => Err(GraftError::ManyAtoms),
    }
}

fn only(atoms: &[AtomIx]) -> Option<AtomIx> {
    match atoms {
        [only] => Some(*only),
        _ => None,
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::layout::read;
    use std::f64::consts::PI;

    /// Atoms and bonds that are grafted upon.
    type On = (Vec<AtomIx>, Vec<BondIx>);

    fn graft(drawing: &Drawing, on: &On, text: &str) -> Result<Drawing, String> {
        let word = read(text).map_err(|e| e.to_string())?;
        let graft = super::graft(drawing, &on.0, &on.1, word).map_err(|e| e.to_string())?;
        Ok(drawing.apply(&graft.edits).unwrap().0)
    }

    fn on_atom(i: usize) -> On {
        (vec![AtomIx::new(i)], Vec::new())
    }

    fn on_bond(bond: BondIx) -> On {
        (Vec::new(), vec![bond])
    }

    fn formula(d: &Drawing) -> String {
        let parts = d.molecule().formula();
        parts.iter().map(|(s, n)| format!("{s}{n}")).collect()
    }

    fn start(text: &str) -> Drawing {
        graft(&Drawing::empty(), &On::default(), text).unwrap()
    }

    fn even(d: &Drawing) {
        let m = d.molecule();
        for b in m.bonds() {
            let [p, q] = m.bond(b).ends.map(|a| d.point(a));
            assert!((p.distance(q) - d.bond_length()).abs() < 1e-6);
        }
        for a in m.atoms() {
            for b in m.atoms().filter(|b| *b > a) {
                assert!(d.point(a).distance(d.point(b)) > 0.5 * d.bond_length());
            }
        }
    }

    #[test]
    fn rings_of_every_size_start_a_drawing() {
        for size in 3..=8 {
            let d = start(&size.to_string());
            assert_eq!(formula(&d), format!("C{size}H{}", 2 * size));
            even(&d);
        }
        assert_eq!(formula(&start("6=")), "C6H6");
        assert_eq!(formula(&start("5=")), "C5H6");
    }

    #[test]
    fn rings_fuse_to_a_bond() {
        for (first, second, result) in [
            ("6", "6", "C10H18"),
            ("6=", "6=", "C10H8"),
            ("6", "6=", "C10H12"),
            ("6=", "5", "C9H10"),
        ] {
            let d = start(first);
            for bond in d.molecule().bonds() {
                let both = graft(&d, &on_bond(bond), second).unwrap();
                assert_eq!(formula(&both), result, "{first} {second}");
                even(&both);
            }
        }
    }

    #[test]
    fn rings_take_the_atom_in_or_hang_on_it() {
        let ethane = graft(&start("C"), &on_atom(0), "-").unwrap();
        let ring = graft(&ethane, &on_atom(1), "6").unwrap();
        assert_eq!(formula(&ring), "C7H14");
        let spiro = graft(&ring, &on_atom(3), "5").unwrap();
        assert_eq!(formula(&spiro), "C11H20");
        let arene = graft(&ring, &on_atom(3), "6=").unwrap();
        assert_eq!(formula(&arene), "C13H18");
        for d in [&ring, &spiro, &arene] {
            even(d);
        }
        let full = graft(&spiro, &on_atom(3), "5").unwrap_err();
        assert!(full.contains("atom 4"), "{full}");
    }

    #[test]
    fn chains_grow_in_a_zigzag_by_typing_alone() {
        let mut d = start("C");
        for i in 0..5 {
            d = graft(&d, &on_atom(i), "-").unwrap();
        }
        assert_eq!(formula(&d), "C6H14");
        even(&d);
        let span = d.point(AtomIx::new(0)).distance(d.point(AtomIx::new(4)));
        assert!((span - 4.0 * (PI / 3.0).sin()).abs() < 1e-6);
        let alkyne = graft(&d, &on_atom(5), "#").unwrap();
        assert_eq!(formula(&alkyne), "C7H12");
    }

    #[test]
    fn elements_and_charges() {
        let d = graft(&start("6="), &on_atom(0), "N").unwrap();
        assert_eq!(formula(&d), "C5H5N1");
        let d = graft(&d, &on_atom(0), "+").unwrap();
        assert_eq!(d.molecule().charge(), 1);
        let bond = on_bond(BondIx::new(0));
        assert!(graft(&d, &bond, "N").unwrap_err().contains("atom"));
        assert!(graft(&d, &bond, "+").unwrap_err().contains("atom"));
        let single = graft(&start("6="), &bond, "-").unwrap();
        assert_eq!(formula(&single), "C6H8");
    }
}
