//! A centre that is drawn without its configuration.

use super::super::case::Case;
use super::super::clause;
use super::super::words::n;
use super::super::{Finding, Grade, Kind};
use super::finding;
use super::impossible_geometry::bicycles;
use crate::element::Element;
use crate::molecule::AtomIx;
use crate::stereo::{Configuration, Focus, Ligand};

pub(super) fn find(case: &Case<'_>, out: &mut Vec<Finding>) {
    let mut bound = None;
    for (ix, u) in case.units().iter() {
        let Focus::Center(a) = u.focus else { continue };
        let must = case.wanted[ix.index()];
        let reading = case.reading.configuration(ix);
        let silent = !matches!(reading, Configuration::Defined(_));
        let open = reading == Configuration::Open && case.reading.doubt(ix).is_none();
        // a nitrogen that its cage holds is not open, merely unmarked
        let cage =
            case.molecule().element(a) == Element::N && u.ligands.contains(&Ligand::LonePair);
        if let (Some(d), true) = (must, silent) {
            let text = format!(
                "atom {} is drawn without configuration and must carry {d}",
                n(a)
            );
            out.push(tell(Grade::Wrong, a, text));
        } else if open && must.is_none() && case.is_capable(ix) && !cage {
            let partners = bound.get_or_insert_with(|| bound_to_defined(case));
            let partner = partners.iter().find(|(open, _)| *open == a);
            out.push(match partner {
                Some((_, other)) => {
                    let text = format!(
                        "atom {} has no mark, though the ring binds it to atom {}, which has one: a reader who does not see that takes it for undefined",
                        n(a),
                        n(*other)
                    );
                    let mut found = tell(Grade::Unclear, a, text);
                    found.clause = clause::BRIDGE;
                    found
                }
                None => {
                    let text = format!("atom {} is drawn without configuration: nothing is stated", n(a));
                    tell(Grade::Open, a, text)
                }
            });
        }
    }
}

fn tell(grade: Grade, a: AtomIx, text: String) -> Finding {
    finding(Kind::UndefinedCentre, grade, &[a], &[], text, clause::PLAIN)
}

/// Bridgeheads without configuration, each with its defined partner.
fn bound_to_defined(case: &Case<'_>) -> Vec<(AtomIx, AtomIx)> {
    let defined = |a: AtomIx| {
        case.center(a)
            .is_some_and(|ix| matches!(case.reading.configuration(ix), Configuration::Defined(_)))
    };
    bicycles(case)
        .into_iter()
        .filter_map(|(a, b, _)| match (defined(a), defined(b)) {
            (true, false) => Some((b, a)),
            (false, true) => Some((a, b)),
            _ => None,
        })
        .collect()
}
