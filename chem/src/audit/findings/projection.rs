//! A centre without marks in a drawing that follows another convention: what its plain bonds mean there
//! is not read.

use super::super::case::Case;
use super::super::clause;
use super::super::words::n;
use super::super::{Finding, Grade, Kind};
use super::finding;
use crate::stereo::Configuration;
use crate::wedge::{Doubt, Projection};

pub(super) fn find(case: &Case<'_>, out: &mut Vec<Finding>) {
    for (a, projection) in &case.projections {
        let Some(ix) = case.center(*a).filter(|ix| case.is_readable(*ix)) else {
            continue;
        };
        let in_perspective = case.reading.doubt(ix) == Some(Doubt::Perspective);
        let open = case.reading.configuration(ix) == Configuration::Open
            && case.reading.doubt(ix).is_none();
        if !(in_perspective || open && is_a_place(case, *a)) {
            continue;
        }
        let clause = match projection {
            Projection::Haworth => clause::HAWORTH,
            Projection::Fischer | Projection::Chair | Projection::Sawhorse => clause::STYLES,
        };
        let text = format!(
            "atom {} stands in what looks like {}: its bonds mean something there that wedges would have to say, and nothing is read from them",
            n(*a),
            projection.name()
        );
        out.push(finding(
            Kind::Projection,
            Grade::Unclear,
            &[*a],
            &[],
            text,
            clause,
        ));
    }
}

/// Whether the centre could carry something, or stands in a ring whose other centres could.
fn is_a_place(case: &Case<'_>, a: crate::molecule::AtomIx) -> bool {
    case.is_stereocenter(a) || case.rings().has_atom(case.molecule(), a)
}
