//! Ranking by the first two spheres alone, straight from the table of bonds.
//!
//! Rule 1a compares the ligands themselves and then the sets of what they bear; two units of three are
//! decided there, and for those no digraph is grown. What ties, and what meets a placeholder, is left to
//! the digraph.

use super::context::{Code, Context};
use super::{Ranking, Rule};
use crate::molecule::AtomIx;
use crate::stereo::{Focus, Ligand, Unit, odd_permutation};
use smallvec::SmallVec;
use std::cmp::Ordering;

/// The ranking of a unit whose ligands Rule 1a parts in the first two spheres; `None` if it does not.
pub(super) fn rank(context: &Context, unit: &Unit) -> Option<Ranking> {
    match unit.focus {
        Focus::Center(center) => {
            let order = order(context, center, &unit.ligands)?;
            let odd = odd_permutation(&order, &unit.ligands);
            Some(Ranking {
                order,
                rule: Rule::R1a,
                odd,
            })
        }
        Focus::Pair(ends) => {
            let mut both: SmallVec<[Ligand; 4]> = SmallVec::new();
            let mut odd = false;
            for (end, ligands) in ends.iter().zip(unit.ligands.chunks_exact(2)) {
                let ordered = order(context, *end, ligands)?;
                odd ^= ordered.first() != ligands.first();
                both.extend(ordered);
            }
            Some(Ranking {
                order: both,
                rule: Rule::R1a,
                odd,
            })
        }
    }
}

/// Ligands of one focus from high to low; `None` if two of them tie.
fn order(context: &Context, focus: AtomIx, ligands: &[Ligand]) -> Option<SmallVec<[Ligand; 4]>> {
    let mut ordered: SmallVec<[(Option<Code>, Ligand); 4]> = SmallVec::new();
    for ligand in ligands {
        let number = match ligand {
            Ligand::Atom(a) if context.atom(*a).wildcard => return None,
            Ligand::Atom(a) => Some(context.atom(*a).number),
            Ligand::Hydrogen => Some(context.hydrogen.0),
            // below every atom
            Ligand::LonePair => None,
        };
        ordered.push((number, *ligand));
    }
    // insertion sort: a tie ends it
    for i in 1..ordered.len() {
        let mut at = i;
        while at > 0 {
            match compare(context, focus, ordered[at], ordered[at - 1])? {
                Ordering::Greater => ordered.swap(at, at - 1),
                Ordering::Less => break,
                Ordering::Equal => return None,
            }
            at -= 1;
        }
    }
    Some(ordered.into_iter().map(|(_, ligand)| ligand).collect())
}

fn compare(
    context: &Context,
    focus: AtomIx,
    a: (Option<Code>, Ligand),
    b: (Option<Code>, Ligand),
) -> Option<Ordering> {
    let order = a.0.cmp(&b.0);
    if order.is_ne() {
        return Some(order);
    }
    let a = borne(context, focus, a.1)?;
    let b = borne(context, focus, b.1)?;
    Some(a.cmp(&b))
}

/// Atomic numbers of the set that a ligand bears, from high to low; `None` if a placeholder is in it.
fn borne(context: &Context, focus: AtomIx, ligand: Ligand) -> Option<SmallVec<[Code; 8]>> {
    let mut set = SmallVec::new();
    let Some(atom) = ligand.atom() else {
        return Some(set);
    };
    let of = context.atom(atom);
    for bond in context.bonds(atom) {
        let to = context.atom(bond.to);
        if to.wildcard || bond.is_vague {
            return None;
        }
        if bond.to != focus {
            set.push(to.number);
        }
        let duplicate = of.duplicate.unwrap_or(to.number);
        set.extend(std::iter::repeat_n(duplicate, bond.duplicates.into()));
    }
    if of.adds_duplicate {
        set.push(of.duplicate.unwrap_or(of.number));
    }
    set.extend(std::iter::repeat_n(context.hydrogen.0, of.hydrogens.into()));
    set.sort_unstable_by(|x, y| y.cmp(x));
    Some(set)
}

#[cfg(test)]
mod tests {
    use super::super::{Limits, unit};
    use super::*;
    use crate::molecule::tests::build;
    use crate::perceive::Rings;
    use crate::stereo::Units;
    use proptest::prelude::*;

    proptest! {
        // what two spheres decide, the digraph decides alike
        #[test]
        fn the_digraph_agrees(
            symbols in prop::collection::vec(prop::sample::select(vec!["C", "C", "C", "N", "O", "S", "Cl"]), 5..14),
            joins in prop::collection::vec((0usize..14, 0usize..14, 1u8..3), 4..18),
        ) {
            let n = symbols.len();
            let mut bonds: Vec<(usize, usize, u8)> = (1..n).map(|i| (i, (i * 7 + 3) % i, 1)).collect();
            for (a, b, pairs) in joins {
                let (a, b) = (a % n, b % n);
                let known = bonds.iter().any(|(x, y, _)| (*x, *y) == (a, b) || (*x, *y) == (b, a));
                if a != b && !known {
                    bonds.push((a, b, pairs));
                }
            }
            let m = build(&symbols, &bonds);
            let rings = Rings::find(&m);
            let context = Context::new(&m, &rings);
            let units = Units::find(&m, &rings);
            for (_, u) in units.iter() {
                if let Some(near) = rank(&context, u) {
                    let far = unit::rank_by_digraph(&context, u, Limits::default());
                    prop_assert_eq!(Ok(Some(near)), far);
                }
            }
        }
    }
}
