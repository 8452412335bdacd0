//! A descriptor required where there is nothing to carry it.

use super::super::case::Case;
use super::super::clause;
use super::super::words::{n, unit};
use super::super::{Finding, Grade, Kind};
use super::finding;
use crate::cip::Missing;

pub(super) fn find(case: &Case<'_>, out: &mut Vec<Finding>) {
    for (atom, wanted) in &case.requirement.wanted {
        let here = case
            .units()
            .iter()
            .find(|(_, u)| u.atoms().contains(atom) && u.kind.can_carry(*wanted));
        let text = match here {
            None => format!(
                "atom {} must carry {wanted}, but is no place that can carry it",
                n(*atom)
            ),
            Some((ix, u)) => match case.labels[ix.index()].descriptor {
                Err(Missing::Alike) => format!(
                    "{} must carry {wanted}, but two of its ligands are alike by every rule",
                    unit(u)
                ),
                Err(missing @ Missing::Stopped(_)) => {
                    format!("{} must carry {wanted}; {missing}", unit(u))
                }
                Ok(_) | Err(Missing::Undefined) => continue,
            },
        };
        out.push(finding(
            Kind::NotStereogenic,
            Grade::Wrong,
            &[*atom],
            &[],
            text,
            clause::REQUIREMENT,
        ));
    }
}
