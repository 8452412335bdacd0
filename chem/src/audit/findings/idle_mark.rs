//! A mark from which no reader learns anything.
//!
//! A wedge in a ring may hold others in their geometry though its own atom carries nothing; it is let be.

use super::super::case::{Case, Wedge};
use super::super::clause;
use super::super::words::{mark, n};
use super::super::{Finding, Grade, Kind};
use super::finding;
use crate::format::Record;
use crate::molecule::{AtomIx, Order};
use crate::stereo::{Focus, Ligand, Unit};

pub(super) fn find(case: &Case<'_>, out: &mut Vec<Finding>) {
    for w in case.wedges() {
        let speaks = w.order == Order::Single && case.speaks(w.narrow, w.wide);
        let is_wide_end =
            w.order == Order::Single && case.is_stereocenter(w.wide) && !case.has_own_mark(w.wide);
        if speaks || is_wide_end {
            continue;
        }
        let few = case.molecule().degree(w.narrow) < 3;
        let clause = if few && w.order == Order::Single {
            clause::TOO_FEW_BONDS
        } else {
            clause::IDLE
        };
        out.push(finding(
            Kind::IdleMark,
            Grade::Unclear,
            &[w.narrow],
            &[w.bond],
            format!(
                "the {} from atom {} to atom {} says nothing: {}",
                mark(w.mark),
                n(w.narrow),
                n(w.wide),
                reason(case, w)
            ),
            clause,
        ));
    }
    wavy(case, out);
}

/// Marks that stood in a record on multiple bonds and were left out when it was read.
pub(in super::super) fn left_out(record: &Record) -> Vec<Finding> {
    let molecule = record.drawing.molecule();
    let mut found = Vec::new();
    for notice in &record.notices {
        let ("mark-on-multiple-bond", [a, b]) = (notice.code, notice.atoms.as_slice()) else {
            continue;
        };
        let Some(bond) = molecule.bond_between(*a, *b) else {
            continue;
        };
        let text = format!(
            "the file has a mark on the multiple bond from atom {} to atom {}, where none can mean anything: it was left out",
            n(*a),
            n(*b)
        );
        found.push(finding(
            Kind::IdleMark,
            Grade::Unclear,
            &[*a],
            &[bond],
            text,
            clause::IDLE,
        ));
    }
    found
}

fn reason(case: &Case<'_>, w: Wedge) -> String {
    let a = n(w.narrow);
    if w.order != Order::Single {
        "the bond is not single".to_owned()
    } else if case.center(w.narrow).is_some() {
        format!("two ligands of atom {a} are alike")
    } else if case.is_stereocenter(w.wide) {
        format!(
            "it is narrow at atom {a}, which is no centre, and its wide end at atom {} counts for nothing",
            n(w.wide)
        )
    } else if case.molecule().degree(w.narrow) < 3 && case.molecule().hydrogens(w.narrow) > 1 {
        format!(
            "atom {a} has {} hydrogens",
            case.molecule().hydrogens(w.narrow)
        )
    } else {
        format!("atom {a} is no centre")
    }
}

/// Wavy bonds at which nothing can be unknown.
fn wavy(case: &Case<'_>, out: &mut Vec<Finding>) {
    for w in case.wavy() {
        let units = case.units();
        let mut here = units
            .iter()
            .filter(|(_, u)| u.atoms().contains(&w.narrow) || u.atoms().contains(&w.wide));
        if here.any(|(_, u)| can_be_unknown(case, u)) {
            continue;
        }
        let text = format!(
            "the wavy bond from atom {} to atom {} says nothing: there is no configuration at either atom that could be unknown",
            n(w.narrow),
            n(w.wide)
        );
        out.push(finding(
            Kind::IdleMark,
            Grade::PoorStyle,
            &[w.narrow],
            &[w.bond],
            text,
            clause::WAVY,
        ));
    }
}

/// Whether a unit may have a configuration. Outside rings two ligands of one class are alike, unless
/// some unit with a configuration tells them apart.
fn can_be_unknown(case: &Case<'_>, unit: &Unit) -> bool {
    let in_ring = |a: AtomIx| case.rings().has_atom(case.molecule(), a);
    if unit.atoms().into_iter().any(in_ring) {
        return true;
    }
    let class = |l: &Ligand| l.atom().map(|a| case.symmetry().class(a));
    let pairs: &[(usize, usize)] = match unit.focus {
        Focus::Center(_) => &[(0, 1), (0, 2), (0, 3), (1, 2), (1, 3), (2, 3)],
        Focus::Pair(_) => &[(0, 1), (2, 3)],
    };
    let alike = pairs.iter().any(|(i, j)| {
        let (a, b) = (class(&unit.ligands[*i]), class(&unit.ligands[*j]));
        a.is_some() && a == b
    });
    let others = case
        .units()
        .iter()
        .any(|(ix, u)| u != unit && case.is_capable(ix));
    !alike || others
}
