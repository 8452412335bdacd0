//! Tries a change before it is offered.

use super::super::case::{Case, Graph, with_case};
use super::super::{Finding, Grade, findings};
use crate::drawing::Edit;
use crate::stereo::{Configuration, UnitIx};
use crate::wedge;

/// A finding of a case that is to be mended.
pub(super) struct Check<'c, 'a> {
    pub(super) case: &'c Case<'a>,
    pub(super) before: &'c [Finding],
    pub(super) finding: &'c Finding,
}

impl Check<'_, '_> {
    /// Whether a change makes every unit read as it must, takes the finding away and brings none that is as
    /// grave in its place.
    pub(super) fn holds(&self, edits: &[Edit], wanted: &[Configuration]) -> bool {
        let case = self.case;
        let Ok((after, _)) = case.drawing.apply(edits) else {
            return false;
        };
        let grown = edits.iter().any(|e| matches!(e, Edit::AddAtom(..)));
        let graph = grown.then(|| Graph::of(after.molecule()));
        let units = graph.as_ref().map_or(case.units(), |g| &g.units);
        if units.len() != case.units().len() {
            return false;
        }
        let same_foci = units
            .iter()
            .zip(case.units().iter())
            .all(|((_, u), (_, v))| u.focus == v.focus);
        let reading = wedge::read(&after, units);
        if !same_foci || !self.read_as(reading.configurations(), wanted) {
            return false;
        }
        let unchanged = self.read_as(case.reading.configurations(), wanted);
        let known = unchanged.then_some(case.labels.as_slice());
        let found = match &graph {
            Some(graph) => with_case(&after, case.requirement, graph, known, findings::all),
            None => findings::all(&Case::new(
                &after,
                case.requirement,
                case.graph,
                case.ranker,
                known,
            )),
        };
        self.is_better(&found)
    }

    fn read_as(&self, read: &[Configuration], wanted: &[Configuration]) -> bool {
        (0..wanted.len()).all(|i| {
            // what marks say where nothing can be said does not matter
            read[i] == wanted[i] || !self.case.is_readable(UnitIx::new(i))
        })
    }

    fn is_better(&self, after: &[Finding]) -> bool {
        let place = |f: &Finding| (f.kind, f.atoms.clone());
        // of two marks that are idle at one atom, one may stay for the next mend
        let here = |list: &[Finding]| {
            let same = |f: &&Finding| place(f) == place(self.finding);
            list.iter().filter(same).count()
        };
        let before = self.before;
        let gone = here(after) < here(before);
        let no_graver = after
            .iter()
            .all(|f| f.grade >= self.finding.grade || before.iter().any(|b| place(b) == place(f)));
        let (now, then) = (count(after), count(before));
        let fewer = if self.finding.grade == Grade::Open {
            now <= then
        } else {
            now < then
        };
        gone && no_graver && fewer
    }
}

/// Numbers of wrong, unclear and poorly drawn places.
fn count(findings: &[Finding]) -> [usize; 3] {
    let mut counts = [0; 3];
    for f in findings {
        match f.grade {
            Grade::Wrong => counts[0] += 1,
            Grade::Unclear => counts[1] += 1,
            Grade::PoorStyle => counts[2] += 1,
            Grade::Open => {}
        }
    }
    counts
}
