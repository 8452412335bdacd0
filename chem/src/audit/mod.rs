//! What a reader could take wrongly in a drawing, and how to mend it.
//!
//! A [`Finding`] names its place, says in a sentence what is the matter there, and carries the clause that
//! it rests on together with where that clause is known from: a grade from memory is never passed off as
//! the wording of a standard. One table, [`Kind::ALL`], lists the kinds in their order; each has a file
//! in `findings/`.
//!
//! Source of the rules: IUPAC 2006 recommendations on graphical representation of stereochemical
//! configuration, as far as they can be read (see [`Clause`]); InChI technical manual, stereochemical layer.

mod case;
mod clause;
mod findings;
mod mend;
mod words;

pub use clause::{Clause, Source};
pub use mend::{Mended, Step, Trait, mend};

use crate::drawing::{Drawing, Edit};
use crate::format::Record;
use crate::molecule::{AtomIx, BondIx};
use crate::solve::require::Requirement;
use case::{Graph, with_case};

/// How grave a finding is; graver ones are less.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum Grade {
    /// Says something false, or contradicts the requirement or itself.
    Wrong,
    /// Readers may differ.
    Unclear,
    /// One meaning, drawn against the recommendations.
    PoorStyle,
    /// Left undefined or stated to be unknown: nothing is wrong, but it must be seen.
    Open,
}

impl Grade {
    /// Name in files and on screen.
    pub fn name(self) -> &'static str {
        match self {
            Grade::Wrong => "wrong",
            Grade::Unclear => "unclear",
            Grade::PoorStyle => "poor style",
            Grade::Open => "open",
        }
    }
}

/// Kinds of finding.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum Kind {
    /// Carries another descriptor than required.
    Opposite,
    /// Required where there is nothing to carry.
    NotStereogenic,
    /// Marks that disagree.
    Contradiction,
    /// A wedge whose wide end is at the centre.
    WideEnd,
    /// A shape that no molecule can have.
    ImpossibleGeometry,
    /// An atom with more or fewer bonds than it can have.
    Valence,
    /// Looks like a perspective, Fischer or Haworth drawing.
    Projection,
    /// Atoms on each other, or bonds in one direction.
    Overlap,
    /// The mark of a half plane whose meaning is not what it looks like.
    Reentrant,
    /// Bonds in line where angles should show the centre.
    StraightAngle,
    /// A ligand in line with its double bond.
    StraightDoubleBond,
    /// Both ligands of one end of a double bond on the same side.
    SameSide,
    /// A crossed double bond.
    CrossedDoubleBond,
    /// A double bond without configuration.
    UndefinedDoubleBond,
    /// A wavy bond.
    EitherMark,
    /// A centre without configuration.
    UndefinedCentre,
    /// An axis or helix without configuration.
    UndefinedAxis,
    /// A mark from which no reader learns anything.
    IdleMark,
    /// A wedge from one centre to another.
    BetweenCentres,
    /// More marks than the pattern needs.
    SurplusMarks,
    /// A mark in a ring though a bond outside is free.
    RingBond,
    /// All plain bonds on one side.
    OneSided,
    /// A bond at a centre drawn too short.
    ShortBond,
    /// A drawn hydrogen inside a ring or on another bond.
    CrowdedHydrogen,
    /// One mark where two read better.
    SingleMark,
}

impl Kind {
    /// All kinds, in the order in which they are looked for and told.
    pub const ALL: [Kind; 25] = [
        Kind::Opposite,
        Kind::NotStereogenic,
        Kind::Contradiction,
        Kind::WideEnd,
        Kind::ImpossibleGeometry,
        Kind::Valence,
        Kind::Projection,
        Kind::Overlap,
        Kind::Reentrant,
        Kind::StraightAngle,
        Kind::StraightDoubleBond,
        Kind::SameSide,
        Kind::CrossedDoubleBond,
        Kind::UndefinedDoubleBond,
        Kind::EitherMark,
        Kind::UndefinedCentre,
        Kind::UndefinedAxis,
        Kind::IdleMark,
        Kind::BetweenCentres,
        Kind::SurplusMarks,
        Kind::RingBond,
        Kind::OneSided,
        Kind::ShortBond,
        Kind::CrowdedHydrogen,
        Kind::SingleMark,
    ];

    /// Name in files.
    pub fn name(self) -> &'static str {
        match self {
            Kind::Opposite => "opposite",
            Kind::NotStereogenic => "not-stereogenic",
            Kind::Contradiction => "contradiction",
            Kind::WideEnd => "wide-end",
            Kind::ImpossibleGeometry => "impossible-geometry",
            Kind::Valence => "valence",
            Kind::Projection => "projection",
            Kind::Overlap => "overlap",
            Kind::Reentrant => "reentrant",
            Kind::StraightAngle => "straight-angle",
            Kind::StraightDoubleBond => "straight-double-bond",
            Kind::SameSide => "same-side",
            Kind::CrossedDoubleBond => "crossed-double-bond",
            Kind::UndefinedDoubleBond => "undefined-double-bond",
            Kind::EitherMark => "either-mark",
            Kind::UndefinedCentre => "undefined-centre",
            Kind::UndefinedAxis => "undefined-axis",
            Kind::IdleMark => "idle-mark",
            Kind::BetweenCentres => "between-centres",
            Kind::SurplusMarks => "surplus-marks",
            Kind::RingBond => "ring-bond",
            Kind::OneSided => "one-sided",
            Kind::ShortBond => "short-bond",
            Kind::CrowdedHydrogen => "crowded-hydrogen",
            Kind::SingleMark => "single-mark",
        }
    }
}

/// Something that a reader could take wrongly.
#[derive(Clone, Debug, PartialEq)]
pub struct Finding {
    /// What kind.
    pub kind: Kind,
    /// How grave.
    pub grade: Grade,
    /// The places concerned, the one that the finding is about first: centres, or both ends of a double
    /// bond or axis.
    pub atoms: Vec<AtomIx>,
    /// The bonds concerned.
    pub bonds: Vec<BondIx>,
    /// What is the matter, in a sentence that names the atoms by their numbers from 1.
    pub text: String,
    /// What it rests on.
    pub clause: Clause,
    /// What can be done, the best first. Each was tried: the finding is gone after it and no graver one
    /// has come.
    pub mends: Vec<Mend>,
}

impl Finding {
    /// Whether two findings are the same one, before and after a change of the drawing.
    pub fn is_same(&self, other: &Finding) -> bool {
        self.kind == other.kind && self.atoms == other.atoms && self.bonds == other.bonds
    }
}

/// One way to mend a finding.
#[derive(Clone, Debug, PartialEq)]
pub struct Mend {
    /// Whether the drawing means the same afterwards. If not, it needs a requirement or a person's yes.
    pub keeps_meaning: bool,
    /// Whether it does what the requirement asks of the place.
    pub meets_requirement: bool,
    /// What it does, in a few words.
    pub text: String,
    /// The change.
    pub edits: Vec<Edit>,
}

/// Everything in a drawing that a reader could take wrongly, the gravest first; with the ways to mend it.
///
/// A requirement (an empty one asks nothing) makes wrong what does not carry it.
pub fn audit(drawing: &Drawing, requirement: &Requirement) -> Vec<Finding> {
    let graph = Graph::of(drawing.molecule());
    with_case(drawing, requirement, &graph, None, |case| {
        let mut found = findings::all(case);
        for i in 0..found.len() {
            found[i].mends = mend::proposals(case, &found, i);
        }
        found
    })
}

/// Everything in a record, as [`audit`], and the marks that reading it left out because they stand where
/// none can mean anything.
pub fn audit_record(record: &Record, requirement: &Requirement) -> Vec<Finding> {
    let mut found = audit(&record.drawing, requirement);
    found.extend(findings::left_out(record));
    found.sort_by_key(|f| f.grade);
    found
}

/// As [`audit`], without the ways to mend, which take the most time.
pub fn findings(drawing: &Drawing, requirement: &Requirement) -> Vec<Finding> {
    findings::all_of(drawing, requirement)
}
