//! A double bond that is drawn without its configuration.

use super::super::case::Case;
use super::super::clause;
use super::super::words::unit;
use super::super::{Finding, Grade, Kind};
use super::finding;
use crate::stereo::{Configuration, Kind as UnitKind};

pub(super) fn find(case: &Case<'_>, out: &mut Vec<Finding>) {
    for (ix, u) in case.units().iter() {
        if u.kind != UnitKind::DoubleBond {
            continue;
        }
        let must = case.wanted[ix.index()];
        let reading = case.reading.configuration(ix);
        let open = reading == Configuration::Open && case.reading.doubt(ix).is_none();
        let silent = !matches!(reading, Configuration::Defined(_));
        let (grade, text) = match must {
            Some(d) if silent => (
                Grade::Wrong,
                format!(
                    "{} is drawn without configuration and must carry {d}",
                    unit(u)
                ),
            ),
            None if open && case.is_capable(ix) => (
                Grade::Open,
                format!(
                    "{} is drawn without configuration: E or Z is not stated",
                    unit(u)
                ),
            ),
            _ => continue,
        };
        out.push(finding(
            Kind::UndefinedDoubleBond,
            grade,
            &u.atoms(),
            &[],
            text,
            clause::DOUBLE,
        ));
    }
}
