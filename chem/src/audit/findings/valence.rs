//! An atom with a number of bonds that its element does not have.

use super::super::case::Case;
use super::super::clause;
use super::super::words::n;
use super::super::{Finding, Grade, Kind};
use super::finding;

pub(super) fn find(case: &Case<'_>, out: &mut Vec<Finding>) {
    let molecule = case.molecule();
    for a in molecule.atoms() {
        if molecule.valence_is_usual(a) {
            continue;
        }
        let pairs = molecule.bond_pairs(a) + molecule.hydrogens(a);
        let atom = molecule.atom(a);
        let charge = crate::molecule::charge_text(i32::from(atom.charge));
        let text = format!(
            "atom {} ({}{charge}) has {pairs} bonds with its hydrogens, which is not a usual number for it",
            n(a),
            atom.element.symbol()
        );
        out.push(finding(
            Kind::Valence,
            Grade::Wrong,
            &[a],
            &[],
            text,
            clause::VALENCE,
        ));
    }
}
