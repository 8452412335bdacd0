//! An axis or helix that is drawn without its configuration.
//!
//! Only a mark says that rotation about a bond is hindered or that rings form a helix: without mark or
//! requirement they are no finding.

use super::super::case::Case;
use super::super::clause;
use super::super::words::unit;
use super::super::{Finding, Grade, Kind};
use super::finding;
use crate::stereo::{Configuration, Kind as UnitKind};

pub(super) fn find(case: &Case<'_>, out: &mut Vec<Finding>) {
    for (ix, u) in case.units().iter() {
        if matches!(u.kind, UnitKind::Tetrahedral | UnitKind::DoubleBond) {
            continue;
        }
        let must = case.wanted[ix.index()];
        let reading = case.reading.configuration(ix);
        let silent = !matches!(reading, Configuration::Defined(_));
        let open = reading == Configuration::Open && case.reading.doubt(ix).is_none();
        let (grade, text) = match must {
            Some(d) if silent => (
                Grade::Wrong,
                format!(
                    "{} is drawn without configuration and must carry {d}",
                    unit(u)
                ),
            ),
            None if open && u.kind == UnitKind::CumulatedAxis && case.is_capable(ix) => (
                Grade::Open,
                format!(
                    "{} is drawn without configuration: nothing is stated",
                    unit(u)
                ),
            ),
            _ => continue,
        };
        out.push(finding(
            Kind::UndefinedAxis,
            grade,
            &u.atoms(),
            &[],
            text,
            clause::AXIS,
        ));
    }
}
