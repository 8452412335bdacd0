//! The Cahn-Ingold-Prelog rules: descriptors from constitution and configurations.
//!
//! A [`Ranker`] is made once for a molecule and its units; it ranks by constitution (Rules 1a, 1b, 2) on
//! demand and remembers that, so that a search can label thousands of configurations of one molecule.
//! Labels are a pure function of (molecule, units, configurations, limits) and do not depend on the
//! order of atoms. Work is counted: past its bound a unit is "not decided" and the others keep theirs.
//!
//! Source: IUPAC 2013 recommendations, P-91 and P-92, with the corrections of Hanson et al., J. Chem.
//! Inf. Model. 2018, 58, 1755; checked against the drawings of the public CIP Validation Suite.

mod auxiliary;
mod candidates;
mod context;
mod digraph;
mod engine;
mod near;
mod rules;
#[cfg(test)]
mod tests;
mod unit;
mod why;

pub use candidates::Outlook;
pub use why::{Compared, Tie};

use crate::molecule::Molecule;
use crate::perceive::Rings;
use crate::stereo::{Configuration, Descriptor, Ligand, Parity, UnitIx, Units};
use auxiliary::Foci;
use context::Context;
use smallvec::SmallVec;
use std::cell::{Cell, OnceCell};
use std::fmt;

/// A sequence rule.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Rule {
    /// Higher atomic number first.
    R1a,
    /// A duplicate of an atom nearer the root first.
    R1b,
    /// Higher mass first.
    R2,
    /// Z before E before none.
    R3,
    /// Units that reflection changes before those that it does not, before none.
    R4a,
    /// Like pairs before unlike.
    R4b,
    /// r before s.
    R4c,
    /// R before S.
    R5,
    /// The chosen reference first.
    R6,
}

impl Rule {
    /// Its name: `1a`.
    pub fn name(self) -> &'static str {
        match self {
            Rule::R1a => "1a",
            Rule::R1b => "1b",
            Rule::R2 => "2",
            Rule::R3 => "3",
            Rule::R4a => "4a",
            Rule::R4b => "4b",
            Rule::R4c => "4c",
            Rule::R5 => "5",
            Rule::R6 => "6",
        }
    }

    /// Whether the rule looks at the graph alone, so that no other unit matters.
    pub fn is_constitutional(self) -> bool {
        self <= Rule::R2
    }
}

/// How much work one unit may take.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Limits {
    /// Nodes of a digraph.
    pub nodes: usize,
    /// Comparisons of nodes.
    pub comparisons: u64,
}

impl Default for Limits {
    /// 100,000 nodes, the bound of the open reference implementations, and 4,000,000 comparisons: well
    /// under a second.
    fn default() -> Limits {
        Limits {
            nodes: 100_000,
            comparisons: 4_000_000,
        }
    }
}

/// Why a ranking was not finished.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Stop {
    /// The bound was reached, at this many nodes.
    Nodes(usize),
    /// The rank of a placeholder, or of what hangs on a bond without a stated order, would be needed.
    Placeholder,
    /// Too many combinations of open units would have to be tried.
    Combinations,
}

/// Why a unit has no descriptor.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Missing {
    /// Two ligands are alike: no rule tells them apart.
    Alike,
    /// Its configuration is not defined.
    Undefined,
    /// Not decided.
    Stopped(Stop),
}

impl fmt::Display for Missing {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Missing::Alike => write!(f, "no rule tells its ligands apart"),
            Missing::Undefined => write!(f, "no configuration is drawn"),
            Missing::Stopped(Stop::Nodes(n)) => write!(f, "not decided: {n} nodes"),
            Missing::Stopped(Stop::Combinations) => write!(
                f,
                "not decided: too many combinations of open places would have to be tried"
            ),
            Missing::Stopped(Stop::Placeholder) => {
                write!(
                    f,
                    "not decided: it depends on a placeholder or on a bond whose order is not stated"
                )
            }
        }
    }
}

/// A unit's ligands in order.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Ranking {
    /// From highest to lowest; of a double bond, the two of its first end, then the two of its second.
    pub order: SmallVec<[Ligand; 4]>,
    /// The latest rule that was needed.
    pub rule: Rule,
    /// Whether `order` is an odd permutation of the unit's reference order. For a double bond: whether
    /// exactly one end has its second ligand on top.
    odd: bool,
}

/// What was found for one unit.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct UnitLabel {
    /// The descriptor, or why there is none.
    pub descriptor: Result<Descriptor, Missing>,
    /// The ligands in order, where they could be ranked.
    pub ranking: Option<Ranking>,
    /// Whether the descriptor rests on units that are open: it would be another one, or none, under some
    /// configuration of theirs. Only [`Ranker::label_all`] looks.
    pub is_provisional: bool,
}

impl UnitLabel {
    /// Whether there is a letter and it rests on other units (Rules 3 to 6).
    pub fn rests_on_others(&self) -> bool {
        let late = |ranking: &Ranking| !ranking.rule.is_constitutional();
        self.descriptor.is_ok() && self.ranking.as_ref().is_some_and(late)
    }
}

/// Ranks and labels the units of one molecule.
#[derive(Debug)]
pub struct Ranker<'a> {
    units: &'a Units,
    context: Context,
    limits: Limits,
    outside_rings: Vec<bool>,
    /// Atoms that hold the ligands of a unit.
    is_focus: Vec<bool>,
    /// Comparisons that later rules took so far.
    work: Cell<u64>,
    by_constitution: Vec<OnceCell<Result<Option<Ranking>, Stop>>>,
}

impl<'a> Ranker<'a> {
    /// Prepares a molecule; nothing is ranked yet.
    pub fn new(molecule: &Molecule, rings: &Rings, units: &'a Units, limits: Limits) -> Ranker<'a> {
        let mut is_focus = vec![false; molecule.n_atoms()];
        for (_, unit) in units.iter() {
            for atom in unit.atoms() {
                is_focus[atom.index()] = true;
            }
        }
        Ranker {
            units,
            is_focus,
            work: Cell::new(0),
            context: Context::new(molecule, rings),
            limits,
            outside_rings: units
                .iter()
                .map(|(_, u)| u.atoms().iter().all(|a| !rings.has_atom(molecule, *a)))
                .collect(),
            by_constitution: vec![OnceCell::new(); units.len()],
        }
    }

    /// The ranking of a unit by Rules 1a, 1b and 2; `None` if they leave ties.
    ///
    /// # Errors
    /// If the bound is reached or a placeholder's rank is needed.
    pub fn by_constitution(&self, unit: UnitIx) -> Result<Option<&Ranking>, Stop> {
        self.by_constitution[unit.index()]
            .get_or_init(|| {
                unit::rank_by_constitution(&self.context, self.units.get(unit), self.limits)
            })
            .as_ref()
            .map(Option::as_ref)
            .map_err(|stop| *stop)
    }

    /// The letter of a unit that Rules 1a, 1b and 2 rank; `None` if they leave ties or were stopped.
    pub fn letter_by_constitution(&self, unit: UnitIx, parity: Parity) -> Option<Descriptor> {
        let ranking = self.by_constitution(unit).ok().flatten()?;
        let kind = self.units.get(unit).kind;
        Some(unit::letter(kind, parity.flipped_if(ranking.odd), true))
    }

    /// Why a unit's ligands stand in their order: one entry for each two neighbors in it (of a pair, one for
    /// each end); `None` where one of the two is a lone pair, stands alone, or only Rule 6 parts them.
    ///
    /// # Errors
    /// If the bound is reached.
    pub fn why(
        &self,
        molecule: &Molecule,
        configurations: &[Configuration],
        unit: UnitIx,
        ranking: &Ranking,
    ) -> Result<Vec<Option<Tie>>, Stop> {
        let foci =
            (!ranking.rule.is_constitutional()).then(|| Foci::of(self.units, configurations));
        let foci = foci.as_ref();
        unit::ties(
            &self.context,
            molecule,
            self.units,
            unit,
            ranking,
            foci,
            self.limits,
        )
    }

    /// The labels of all units in a molecule whose units have these configurations. A unit without one is
    /// [`Missing::Undefined`] if it could carry a descriptor, else [`Missing::Alike`].
    pub fn label_all(&self, configurations: &[Configuration]) -> Vec<UnitLabel> {
        self.label_asked(configurations, |_| true)
    }

    /// The same, but open units that are not `asked` for are taken as undefined and not ranked.
    pub fn label_asked(
        &self,
        configurations: &[Configuration],
        asked: impl Fn(UnitIx) -> bool,
    ) -> Vec<UnitLabel> {
        let defined = self.label_defined(configurations);
        let outlook = self.outlook(configurations, &defined, &asked);
        defined
            .into_iter()
            .enumerate()
            .map(|(i, label)| match label {
                Some(label) => UnitLabel {
                    is_provisional: outlook.is_provisional[i],
                    ..label
                },
                None if asked(UnitIx::new(i)) => {
                    self.undefined(UnitIx::new(i), outlook.could_carry[i])
                }
                None => UnitLabel {
                    descriptor: Err(Missing::Undefined),
                    ranking: None,
                    is_provisional: false,
                },
            })
            .collect()
    }

    /// The labels of the units whose configuration is defined; `None` for the others, which are not ranked.
    ///
    /// A unit outside rings whose ligands prove to be alike is not stereogenic: its marks then count for no
    /// other unit either, or two branches that are the same in space could get different letters. (In a
    /// ring such a place still holds others in their geometry.)
    pub fn label_defined(&self, configurations: &[Configuration]) -> Vec<Option<UnitLabel>> {
        self.label_within(configurations, u64::MAX)
            .unwrap_or_default()
    }

    /// The same, unless the units that depend on others take more than so many comparisons in all: then
    /// `None`. Which unit comes first has no say in that.
    fn label_within(
        &self,
        configurations: &[Configuration],
        most_work: u64,
    ) -> Option<Vec<Option<UnitLabel>>> {
        let end = self.work.get().saturating_add(most_work);
        let mut counted = configurations.to_vec();
        loop {
            let labels = self.label_once(configurations, &counted, end)?;
            let mut changed = false;
            for (i, label) in labels.iter().enumerate() {
                let alike = label
                    .as_ref()
                    .is_some_and(|l| l.descriptor == Err(Missing::Alike));
                if alike && self.outside_rings[i] && counted[i] != Configuration::Open {
                    counted[i] = Configuration::Open;
                    changed = true;
                }
            }
            // each round takes a unit out, so this ends
            if !changed || !self.any_dependent(&counted) {
                return Some(labels);
            }
        }
    }

    /// Whether a defined unit's rank depends on other units.
    fn any_dependent(&self, configurations: &[Configuration]) -> bool {
        configurations.iter().enumerate().any(|(i, c)| {
            matches!(c, Configuration::Defined(_))
                && matches!(self.by_constitution(UnitIx::new(i)), Ok(None))
        })
    }

    fn label_once(
        &self,
        configurations: &[Configuration],
        counted: &[Configuration],
        most_work: u64,
    ) -> Option<Vec<Option<UnitLabel>>> {
        let foci = OnceCell::new();
        configurations
            .iter()
            .enumerate()
            .map(|(i, configuration)| match configuration {
                Configuration::Defined(parity) => {
                    let foci = || foci.get_or_init(|| Foci::of(self.units, counted));
                    let label = self.label(UnitIx::new(i), *parity, foci);
                    (self.work.get() <= most_work).then_some(Some(label))
                }
                Configuration::Open | Configuration::Either => Some(None),
            })
            .collect()
    }

    fn undefined(&self, unit: UnitIx, could: Result<bool, Stop>) -> UnitLabel {
        let (missing, ranking) = match (self.by_constitution(unit), could) {
            (Err(stop), _) | (Ok(None), Err(stop)) => (Missing::Stopped(stop), None),
            (Ok(Some(ranking)), _) => (Missing::Undefined, Some(ranking.clone())),
            (Ok(None), Ok(true)) => (Missing::Undefined, None),
            (Ok(None), Ok(false)) => (Missing::Alike, None),
        };
        UnitLabel {
            descriptor: Err(missing),
            ranking,
            is_provisional: false,
        }
    }

    fn label<'f>(
        &self,
        unit: UnitIx,
        parity: Parity,
        foci: impl FnOnce() -> &'f Foci,
    ) -> UnitLabel {
        let kind = self.units.get(unit).kind;
        let found = match self.by_constitution(unit) {
            Ok(Some(ranking)) => Ok(Some((ranking.clone(), true))),
            Ok(None) => unit::rank_by_all(
                &self.context,
                self.units,
                unit,
                foci(),
                self.limits,
                |tied| self.is_hopeless(unit, tied),
                &self.work,
            ),
            Err(stop) => Err(stop),
        };
        match found {
            Ok(Some((ranking, varies))) => UnitLabel {
                descriptor: Ok(unit::letter(kind, parity.flipped_if(ranking.odd), varies)),
                ranking: Some(ranking),
                is_provisional: false,
            },
            Ok(None) => UnitLabel {
                descriptor: Err(Missing::Alike),
                ranking: None,
                is_provisional: false,
            },
            Err(stop) => UnitLabel {
                descriptor: Err(Missing::Stopped(stop)),
                ranking: None,
                is_provisional: false,
            },
        }
    }
}
