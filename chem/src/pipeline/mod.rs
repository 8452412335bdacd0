//! The product in a few calls, shared by window and command line: understand what is asked, report what
//! is carried, and carry it.

mod carry;
mod notation;
mod report;

pub use carry::carry;
pub use notation::{explain_of, labels_of, report_of};
pub use report::{Carried, carried, explain, report, why};

use crate::cip::Rule;
use crate::drawing::{Drawing, Edit};
use crate::molecule::{AtomIx, BondIx};
use crate::perceive::Rings;
use crate::solve::require::{Requirement, RequirementError};
use crate::stereo::{Descriptor, Kind, Ligand, Units};

/// How a place of the drawing stands to what it must carry. Told apart by shape and colour on screen.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Verdict {
    /// Carries what it must.
    Agrees,
    /// Carries another descriptor than it must.
    Opposite,
    /// Nothing is drawn, or it is drawn as unknown.
    Open,
    /// The marks contradict each other or cannot be read.
    Contradiction,
    /// Nothing is asked of it.
    NotAsked,
}

impl Verdict {
    /// Name in files and on screen.
    pub fn name(self) -> &'static str {
        match self {
            Verdict::Agrees => "agrees",
            Verdict::Opposite => "opposite",
            Verdict::Open => "open",
            Verdict::Contradiction => "contradiction",
            Verdict::NotAsked => "not asked",
        }
    }
}

/// What the drawing says at a place, before any letter.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Sense {
    /// One configuration is drawn.
    Defined,
    /// Nothing is drawn.
    Open,
    /// Drawn as unknown or mixed.
    Either,
    /// Marks that cannot be read or that contradict each other.
    Contradiction,
}

impl Sense {
    /// Name in files.
    pub fn name(self) -> &'static str {
        match self {
            Sense::Defined => "defined",
            Sense::Open => "open",
            Sense::Either => "either",
            Sense::Contradiction => "contradiction",
        }
    }
}

/// One stereogenic place of a drawing, as a row of a table.
#[derive(Clone, Debug, PartialEq)]
pub struct Place {
    /// What kind of unit.
    pub kind: Kind,
    /// The centre, or both ends.
    pub atoms: Vec<AtomIx>,
    /// What it must carry.
    pub must: Option<Descriptor>,
    /// What it carries.
    pub carries: Option<Descriptor>,
    /// Whether the letter rests on places that are open, and may change once they are drawn.
    pub is_provisional: bool,
    /// What is drawn.
    pub sense: Sense,
    /// How the two compare.
    pub verdict: Verdict,
    /// The rule that decided the last tie between ligands.
    pub rule: Option<Rule>,
    /// Ligands from highest to lowest; empty where they could not be ranked. Of a double bond, the two
    /// of the first end, then the two of the second.
    pub ranking: Vec<Ligand>,
    /// Why nothing is carried or what to know of the place, in a short sentence; empty if nothing.
    pub note: String,
}

/// What a drawing carries and how that stands to a requirement.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Report {
    /// Places that carry, could carry or must carry a descriptor, by lowest atom.
    pub places: Vec<Place>,
    /// Wedges that say nothing to a careful reader.
    pub idle: Vec<Idle>,
}

/// A wedge that says nothing: at its narrow end no configuration can be read from it.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Idle {
    /// Its bond.
    pub bond: BondIx,
    /// The atom at its narrow end.
    pub atom: AtomIx,
    /// What it does, in a sentence.
    pub text: String,
}

impl Report {
    /// Labels by atom number from 1, both ends of a double bond: `3R 7E 8E`; empty if there is none.
    pub fn labels_line(&self) -> String {
        let labels = self.places.iter().filter_map(|p| p.carries.map(|d| (p, d)));
        report::spell(
            labels
                .flat_map(|(p, d)| p.atoms.iter().map(move |a| (*a, d)))
                .collect(),
        )
    }

    /// What is carried, as a requirement line: `(3R,7E)`, a double bond by its lower atom; empty if nothing.
    pub fn descriptor_line(&self) -> String {
        let words: Vec<String> = self
            .places
            .iter()
            .filter_map(|p| Some((p.atoms.iter().min()?.index() + 1, p.carries?)))
            .map(|(n, d)| format!("{n}{d}"))
            .collect();
        if words.is_empty() {
            String::new()
        } else {
            format!("({})", words.join(","))
        }
    }

    /// Whether everything that is asked is carried; places of which nothing is asked do not count.
    pub fn all_agree(&self) -> bool {
        self.places
            .iter()
            .all(|p| p.must.is_none() || p.verdict == Verdict::Agrees)
    }

    /// Faults that a reader of the labels alone would not see, a sentence each: marks that contradict each
    /// other and wedges that say nothing.
    pub fn faults(&self) -> Vec<String> {
        let contradictions = self
            .places
            .iter()
            .filter(|p| p.sense == Sense::Contradiction)
            .map(|p| report::about(&p.atoms, &p.note));
        let idle = self.idle.iter().map(|i| i.text.clone());
        contradictions.chain(idle).collect()
    }

    /// What to know of letters that are carried: those that rest on open places, a sentence each.
    pub fn notes(&self) -> Vec<String> {
        let provisional = self.places.iter().filter(|p| p.is_provisional);
        provisional
            .map(|p| report::about(&p.atoms, &p.note))
            .collect()
    }
}

/// A drawing that carries its requirement. Only [`carry`] makes one, and only after it has read its
/// own drawing afresh.
#[derive(Clone, Debug)]
pub struct Solution {
    drawing: Drawing,
    edits: Vec<Edit>,
    report: Report,
}

impl Solution {
    /// The drawing.
    pub fn drawing(&self) -> &Drawing {
        &self.drawing
    }

    /// What was changed, as edits of the drawing before.
    pub fn edits(&self) -> &[Edit] {
        &self.edits
    }

    /// The drawing read afresh.
    pub fn report(&self) -> &Report {
        &self.report
    }
}

/// Rings and units of a drawing.
fn perceived(drawing: &Drawing) -> (Rings, Units) {
    let rings = Rings::find(drawing.molecule());
    let units = Units::find(drawing.molecule(), &rings);
    (rings, units)
}

/// A typed requirement, understood for this drawing.
///
/// # Errors
/// What is wrong with the line, with the column it is at, or which part does not fit the drawing.
pub fn understand(text: &str, drawing: &Drawing) -> Result<Requirement, RequirementError> {
    crate::solve::require::understand(text, drawing)
}
