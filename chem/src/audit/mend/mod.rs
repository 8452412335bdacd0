//! Ways to mend findings, and the driver that applies them.
//!
//! A mend changes marks first, then draws a hydrogen, then moves single ligands. It is offered only after it
//! was tried: the units read as they must, its finding is gone, and the drawing as a whole has fewer
//! faults than before, the graver ones counted first. So mends compose, and a chain of them ends.

mod centre;
mod check;
mod double;
mod ligand;
mod log;
mod propose;

#[cfg(test)]
mod tests;

pub use log::{Mended, Step, Trait};
pub(super) use propose::proposals;

use super::case::{Graph, with_case};
use super::{Finding, Grade, Kind, Mend, findings};
use crate::cip::UnitLabel;
use crate::drawing::{Drawing, Edit};
use crate::molecule::{AtomIx, BondIx};
use crate::pipeline;
use crate::solve::require::Requirement;

/// Applies mends one after the other, looking afresh after each.
///
/// Without a requirement: everything that keeps the meaning, poor style as well. With one: what stands
/// between the drawing and the requirement, and what is wrong or unclear; style is left alone.
pub fn mend(drawing: &Drawing, requirement: &Requirement) -> Mended {
    let mut work = Work {
        drawing: drawing.clone(),
        graph: Graph::of(drawing.molecule()),
        labels: None,
        given_up: Vec::new(),
        steps: Vec::new(),
    };
    // every step lowers the count of faults; this only guards against a mistake of ours
    let bound = 8 * (drawing.molecule().n_bonds() + 8);
    for _ in 0..bound {
        if !work.step(requirement) {
            break;
        }
    }
    if !requirement.wanted.is_empty() {
        work.carry(requirement);
    }
    Mended {
        left: findings::all_of(&work.drawing, requirement),
        drawing: work.drawing,
        steps: work.steps,
    }
}

/// What a finding is known by from one drawing to the next.
type Place = (Kind, Vec<AtomIx>, Vec<BondIx>);

/// A drawing on its way.
struct Work {
    drawing: Drawing,
    graph: Graph,
    /// Labels, while they are those of the drawing.
    labels: Option<Vec<UnitLabel>>,
    given_up: Vec<Place>,
    steps: Vec<Step>,
}

impl Work {
    /// Applies the first mend that can be applied; whether there was one.
    fn step(&mut self, requirement: &Requirement) -> bool {
        let known = self.labels.as_deref();
        let given_up = &mut self.given_up;
        let found = with_case(&self.drawing, requirement, &self.graph, known, |case| {
            let all = findings::all(case);
            for i in 0..all.len() {
                let place = (all[i].kind, all[i].atoms.clone(), all[i].bonds.clone());
                if !is_due(&all[i], requirement) || given_up.contains(&place) {
                    continue;
                }
                let mends = proposals(case, &all, i);
                match mends
                    .into_iter()
                    .find(|m| m.keeps_meaning || m.meets_requirement)
                {
                    Some(mend) => return Some((all[i].clone(), mend, case.labels.clone())),
                    None => given_up.push(place),
                }
            }
            None
        });
        let Some((finding, mend, labels)) = found else {
            return false;
        };
        let Ok((after, _)) = self.drawing.apply(&mend.edits) else {
            return false;
        };
        self.steps
            .push(Step::new(&self.drawing, &after, finding, &mend));
        self.labels = mend.keeps_meaning.then_some(labels);
        self.take(after, &mend.edits);
        true
    }

    fn take(&mut self, after: Drawing, edits: &[Edit]) {
        if edits.iter().any(|e| matches!(e, Edit::AddAtom(..))) {
            self.graph = Graph::of(after.molecule());
        }
        self.drawing = after;
    }

    /// What single mends could not reach, drawn anew as a whole.
    fn carry(&mut self, requirement: &Requirement) {
        if pipeline::report(&self.drawing, requirement).all_agree() {
            return;
        }
        let Ok(solution) = pipeline::carry(&self.drawing, requirement) else {
            return;
        };
        let Some(finding) = findings::all_of(&self.drawing, requirement)
            .into_iter()
            .find(|f| f.grade == Grade::Wrong)
        else {
            return;
        };
        let mend = Mend {
            keeps_meaning: false,
            meets_requirement: true,
            text: "draw anew what the requirement names".to_owned(),
            edits: solution.edits().to_vec(),
        };
        let after = solution.drawing().clone();
        self.steps
            .push(Step::new(&self.drawing, &after, finding, &mend));
        self.labels = None;
        self.take(after, &mend.edits);
    }
}

fn is_due(finding: &Finding, requirement: &Requirement) -> bool {
    match finding.grade {
        Grade::Wrong | Grade::Unclear => true,
        Grade::PoorStyle => requirement.wanted.is_empty(),
        Grade::Open => false,
    }
}
