//! A drawing as the findings see it: its units, what it says of each, what is asked of each.

use crate::cip::{Limits, Missing, Ranker, UnitLabel};
use crate::drawing::{Drawing, Mark};
use crate::element::Element;
use crate::molecule::{AtomIx, BondIx, Molecule, Order};
use crate::perceive::{Rings, Symmetry};
use crate::solve::require::Requirement;
use crate::solve::search::{Goal, search};
use crate::stereo::{Configuration, Descriptor, Focus, Kind, Ligand, Unit, UnitIx, Units};
use crate::wedge::{self, Doubt, Pattern, Projection, Reading};
use std::cell::OnceCell;

/// Rings and units of a molecule.
#[derive(Debug)]
pub(super) struct Graph {
    pub(super) rings: Rings,
    pub(super) units: Units,
}

impl Graph {
    pub(super) fn of(molecule: &Molecule) -> Graph {
        let rings = Rings::find(molecule);
        let units = Units::find(molecule, &rings);
        Graph { rings, units }
    }
}

/// A wedge with its ends.
#[derive(Clone, Copy, Debug)]
pub(super) struct Wedge {
    pub(super) bond: BondIx,
    pub(super) mark: Mark,
    pub(super) narrow: AtomIx,
    pub(super) wide: AtomIx,
    pub(super) order: Order,
}

/// One drawing with everything that findings ask of it.
pub(super) struct Case<'a> {
    pub(super) drawing: &'a Drawing,
    pub(super) requirement: &'a Requirement,
    pub(super) graph: &'a Graph,
    pub(super) ranker: &'a Ranker<'a>,
    pub(super) reading: Reading,
    pub(super) labels: Vec<UnitLabel>,
    /// What is asked of each unit.
    pub(super) wanted: Vec<Option<Descriptor>>,
    pub(super) projections: Vec<(AtomIx, Projection)>,
    center_at: Vec<Option<UnitIx>>,
    solved: OnceCell<Option<Vec<Configuration>>>,
    symmetry: OnceCell<Symmetry>,
}

/// Makes a case and gives it to `then`. Labels that are known from a drawing that means the same are not
/// worked out again.
pub(super) fn with_case<T>(
    drawing: &Drawing,
    requirement: &Requirement,
    graph: &Graph,
    known: Option<&[UnitLabel]>,
    then: impl FnOnce(&Case<'_>) -> T,
) -> T {
    let limits = Limits::default();
    let ranker = Ranker::new(drawing.molecule(), &graph.rings, &graph.units, limits);
    then(&Case::new(drawing, requirement, graph, &ranker, known))
}

impl<'a> Case<'a> {
    pub(super) fn new(
        drawing: &'a Drawing,
        requirement: &'a Requirement,
        graph: &'a Graph,
        ranker: &'a Ranker<'a>,
        known: Option<&[UnitLabel]>,
    ) -> Case<'a> {
        let units = &graph.units;
        let reading = wedge::read(drawing, units);
        let labels = match known {
            Some(labels) if labels.len() == units.len() => labels.to_vec(),
            _ => ranker.label_all(reading.configurations()),
        };
        let mut center_at = vec![None; drawing.molecule().n_atoms()];
        for (ix, unit) in units.iter() {
            if let Focus::Center(a) = unit.focus {
                center_at[a.index()] = Some(ix);
            }
        }
        Case {
            wanted: wanted(units, requirement),
            projections: wedge::projections(drawing, units, &graph.rings),
            drawing,
            requirement,
            graph,
            ranker,
            reading,
            labels,
            center_at,
            solved: OnceCell::new(),
            symmetry: OnceCell::new(),
        }
    }

    /// Configurations of all units that carry the requirement, if there are such.
    pub(super) fn solved(&self) -> Option<&[Configuration]> {
        let solve = || {
            let goals: Vec<Goal> = self
                .units()
                .iter()
                .filter_map(|(unit, _)| {
                    let descriptor = self.wanted[unit.index()]?;
                    Some(Goal { unit, descriptor })
                })
                .collect();
            search(self.ranker, self.reading.configurations(), &goals).ok()
        };
        self.solved.get_or_init(solve).as_deref()
    }

    pub(super) fn molecule(&self) -> &'a Molecule {
        self.drawing.molecule()
    }

    pub(super) fn units(&self) -> &'a Units {
        &self.graph.units
    }

    pub(super) fn rings(&self) -> &'a Rings {
        &self.graph.rings
    }

    /// The centre at an atom.
    pub(super) fn center(&self, atom: AtomIx) -> Option<UnitIx> {
        self.center_at[atom.index()]
    }

    /// Whether the drawing is a flat one; a model with depth is not judged as a picture.
    pub(super) fn is_flat(&self) -> bool {
        self.drawing.depths().is_none()
    }

    /// Whether a unit carries a descriptor or could by its constitution.
    pub(super) fn is_capable(&self, ix: UnitIx) -> bool {
        let label = &self.labels[ix.index()];
        match label.descriptor {
            Ok(_) => true,
            Err(Missing::Undefined) => label.ranking.is_some(),
            Err(Missing::Alike | Missing::Stopped(_)) => false,
        }
    }

    /// Whether an atom is a centre that carries a descriptor or could.
    pub(super) fn is_stereocenter(&self, atom: AtomIx) -> bool {
        self.center(atom).is_some_and(|ix| self.is_capable(ix))
    }

    /// Whether marks at a unit can mean something: its ligands differ, or it stands in a ring where it may
    /// hold another marked place in its geometry.
    pub(super) fn is_readable(&self, ix: UnitIx) -> bool {
        if self.labels[ix.index()].descriptor != Err(Missing::Alike) {
            return true;
        }
        match self.units().get(ix).focus {
            Focus::Center(a) => self.holds_others(a),
            Focus::Pair(ends) => ends
                .iter()
                .any(|a| self.rings().has_atom(self.molecule(), *a)),
        }
    }

    /// Whether a ring atom whose ligands are alike may hold others in their geometry: the alike ones are
    /// its ring bonds, and something else is marked in the same system of rings.
    fn holds_others(&self, center: AtomIx) -> bool {
        let molecule = self.molecule();
        let outside: Vec<u32> = molecule
            .neighbors(center)
            .iter()
            .filter(|n| !self.rings().has_bond(n.bond))
            .map(|n| self.symmetry().class(n.atom))
            .collect();
        if matches!(outside.as_slice(), [a, b] if a == b) {
            return false;
        }
        let mut system = vec![center];
        let mut seen = vec![false; molecule.n_atoms()];
        seen[center.index()] = true;
        let mut next = 0;
        while let Some(atom) = system.get(next).copied() {
            next += 1;
            for n in molecule.neighbors(atom) {
                if self.rings().has_bond(n.bond) && !seen[n.atom.index()] {
                    seen[n.atom.index()] = true;
                    system.push(n.atom);
                }
            }
        }
        system.iter().skip(1).any(|a| self.has_own_mark(*a))
    }

    /// Which atoms are alike by the graph alone.
    pub(super) fn symmetry(&self) -> &Symmetry {
        self.symmetry
            .get_or_init(|| Symmetry::find(self.molecule()))
    }

    /// Whether anything is narrow at an atom.
    pub(super) fn has_own_mark(&self, atom: AtomIx) -> bool {
        let neighbors = self.molecule().neighbors(atom);
        neighbors
            .iter()
            .any(|n| self.drawing.mark_from(atom, n.bond) != Mark::Plain)
    }

    /// All solid and hashed wedges.
    pub(super) fn wedges(&self) -> impl Iterator<Item = Wedge> + '_ {
        self.marked(|mark| matches!(mark, Mark::Solid(_) | Mark::Hashed(_)))
    }

    /// All wavy bonds.
    pub(super) fn wavy(&self) -> impl Iterator<Item = Wedge> + '_ {
        self.marked(|mark| matches!(mark, Mark::Wavy(_)))
    }

    fn marked<'s>(
        &'s self,
        is_wanted: impl Fn(Mark) -> bool + 's,
    ) -> impl Iterator<Item = Wedge> + 's {
        self.molecule().bonds().filter_map(move |bond| {
            let mark = self.drawing.mark(bond);
            let end = mark.narrow().filter(|_| is_wanted(mark))?;
            let b = self.molecule().bond(bond);
            Some(Wedge {
                bond,
                mark,
                narrow: b.ends[end.index()],
                wide: b.ends[end.other().index()],
                order: b.order,
            })
        })
    }

    /// Whether some unit can be read from a mark on a single bond, narrow at one atom and wide at another.
    pub(super) fn speaks(&self, narrow: AtomIx, wide: AtomIx) -> bool {
        if self.center(narrow).is_some_and(|ix| self.is_readable(ix)) {
            return true;
        }
        self.units().iter().any(|(_, unit)| match unit.kind {
            Kind::Tetrahedral | Kind::DoubleBond => false,
            Kind::CumulatedAxis | Kind::HinderedAxis => {
                unit.atoms().contains(&narrow) && unit.ligands.contains(&Ligand::Atom(wide))
            }
            Kind::Helix => {
                unit.toward_each_other().contains(&narrow) && unit.atoms().contains(&wide)
            }
        })
    }

    /// Whether an atom is an end of a double bond that can be E or Z.
    pub(super) fn is_double_end(&self, atom: AtomIx) -> bool {
        self.units()
            .iter()
            .any(|(_, u)| u.kind == Kind::DoubleBond && u.atoms().contains(&atom))
    }

    /// The centres that read as defined, with their patterns, in a flat drawing.
    pub(super) fn defined_centers(&self) -> impl Iterator<Item = (UnitIx, &Unit, AtomIx, Pattern)> {
        let is_flat = self.is_flat();
        self.units().iter().filter_map(move |(ix, unit)| {
            let Focus::Center(a) = unit.focus else {
                return None;
            };
            let defined = matches!(self.reading.configuration(ix), Configuration::Defined(_));
            if !is_flat || !defined || !self.is_readable(ix) {
                return None;
            }
            Some((ix, unit, a, Pattern::of(self.drawing, a).ok()?))
        })
    }

    /// Units that cannot be read for one of these reasons.
    pub(super) fn doubtful(
        &self,
        is_wanted: impl Fn(Doubt) -> bool,
    ) -> impl Iterator<Item = (UnitIx, &Unit)> {
        self.units()
            .iter()
            .filter(move |(ix, _)| self.reading.doubt(*ix).is_some_and(&is_wanted))
    }

    /// Whether a mark could stand on a bond at `center`: single, to no stereocentre, and not another
    /// unit's.
    pub(super) fn is_free(&self, center: AtomIx, bond: BondIx) -> bool {
        let b = self.molecule().bond(bond);
        let mark = self.drawing.mark(bond);
        let own = mark == Mark::Plain || self.drawing.mark_from(center, bond) != Mark::Plain;
        b.order == Order::Single && own && !self.is_stereocenter(b.other(center))
    }

    /// Whether an atom is a hydrogen drawn as a letter.
    pub(super) fn is_drawn_hydrogen(&self, atom: AtomIx) -> bool {
        self.molecule().element(atom) == Element::H && self.molecule().degree(atom) == 1
    }
}

/// What is asked of each unit: by the number of its centre or of either end, if its kind can carry it.
fn wanted(units: &Units, requirement: &Requirement) -> Vec<Option<Descriptor>> {
    let of = |unit: &Unit| {
        let atoms = unit.atoms();
        requirement
            .wanted
            .iter()
            .find(|(a, d)| atoms.contains(a) && unit.kind.can_carry(*d))
            .map(|(_, d)| *d)
    };
    units.iter().map(|(_, unit)| of(unit)).collect()
}
