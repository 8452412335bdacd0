//! The descriptor of one unit: its ligands ranked at a node of a digraph, and the sense of that order.
//!
//! The same routines serve the unit under study, whose focus is the root, and auxiliary descriptors,
//! whose focus is any node. A label is upper-case if reflection changes it; that is found by ranking
//! once more with Rule 5 reversed, which is what reflection does to the rules.

use super::auxiliary::{self, Foci};
use super::context::Context;
use super::digraph::{Digraph, NodeIx, NodeKind, Nodes, ROOT};
use super::engine::{Engine, Ranked};
use super::near;
use super::rules::Step;
use super::why::{self, Tie};
use super::{Limits, Ranking, Rule, Stop};
use crate::molecule::{AtomIx, Molecule};
use crate::stereo::{
    Descriptor, Focus, Kind, Ligand, Parity, Unit, UnitIx, Units, odd_permutation,
};
use smallvec::SmallVec;
use std::cell::Cell;

/// Which rules may be used.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
enum Reach {
    Constitution,
    /// All; true: Rule 5 as it is, false: reversed.
    All(bool),
}

/// The letter for a parity relative to ranks. `varies`: reflection changes the sense.
pub(super) fn letter(kind: Kind, parity: Parity, varies: bool) -> Descriptor {
    match (kind, parity, varies) {
        (Kind::Tetrahedral, Parity::Even, true) => Descriptor::R,
        (Kind::Tetrahedral, Parity::Odd, true) => Descriptor::S,
        (Kind::Tetrahedral, Parity::Even, false) => Descriptor::LowerR,
        (Kind::Tetrahedral, Parity::Odd, false) => Descriptor::LowerS,
        // reflection leaves a double bond alone, unless it exchanges ranks at one end
        (Kind::DoubleBond, Parity::Even, true) => Descriptor::Z,
        (Kind::DoubleBond, Parity::Odd, true) => Descriptor::E,
        (Kind::DoubleBond, Parity::Even, false) => Descriptor::LowerZ,
        (Kind::DoubleBond, Parity::Odd, false) => Descriptor::LowerE,
        // seen along an axis, from the higher ligand in front to the higher one behind: clockwise is P
        (Kind::CumulatedAxis | Kind::HinderedAxis | Kind::Helix, Parity::Even, true) => {
            Descriptor::M
        }
        (Kind::CumulatedAxis | Kind::HinderedAxis | Kind::Helix, Parity::Odd, true) => {
            Descriptor::P
        }
        (Kind::CumulatedAxis | Kind::HinderedAxis | Kind::Helix, Parity::Even, false) => {
            Descriptor::LowerM
        }
        (Kind::CumulatedAxis | Kind::HinderedAxis | Kind::Helix, Parity::Odd, false) => {
            Descriptor::LowerP
        }
    }
}

/// Ranking by Rules 1a, 1b and 2.
pub(super) fn rank_by_constitution(
    context: &Context,
    unit: &Unit,
    limits: Limits,
) -> Result<Option<Ranking>, Stop> {
    if unit.kind == Kind::Helix {
        // its hand is its descriptor: nothing is ranked
        return Ok(Some(Ranking {
            order: SmallVec::new(),
            rule: Rule::R1a,
            odd: false,
        }));
    }
    if let Some(ranking) = near::rank(context, unit) {
        return Ok(Some(ranking));
    }
    rank_by_digraph(context, unit, limits)
}

/// The same on the digraph, whose first two spheres are not looked at beforehand.
pub(super) fn rank_by_digraph(
    context: &Context,
    unit: &Unit,
    limits: Limits,
) -> Result<Option<Ranking>, Stop> {
    let mut sites = Sites::rooted(context, unit, limits);
    for engine in sites.engines() {
        engine.forgetful = true;
    }
    sites.rank(unit, Reach::Constitution)
}

/// Ranking by all rules, and whether reflection changes the sense. `is_hopeless` tells of ligands that the
/// constitution leaves tied whether no other unit can part them, which spares growing the digraph.
pub(super) fn rank_by_all(
    context: &Context,
    units: &Units,
    ix: UnitIx,
    foci: &Foci,
    limits: Limits,
    is_hopeless: impl Fn(&[Ligand]) -> bool,
    work: &Cell<u64>,
) -> Result<Option<(Ranking, bool)>, Stop> {
    let unit = units.get(ix);
    let mut sites = Sites::rooted(context, unit, limits);
    let filled = sites.tied_ligands(unit).and_then(|tied| {
        if tied.iter().any(|group| is_hopeless(group)) {
            return Ok(false);
        }
        for engine in sites.engines() {
            auxiliary::fill(engine, units, ix, foci)?;
        }
        Ok(true)
    });
    let found = match filled {
        Ok(true) => sites.rank_both_ways(unit),
        Ok(false) => Ok(None),
        Err(stop) => Err(stop),
    };
    for engine in sites.engines() {
        work.set(work.get() + engine.work() + engine.tree.len() as u64);
    }
    found
}

/// Ligands of a unit that Rules 1a, 1b and 2 leave tied, group by group.
pub(super) fn tied_ligands(
    context: &Context,
    unit: &Unit,
    limits: Limits,
) -> Result<Vec<Vec<Ligand>>, Stop> {
    Sites::rooted(context, unit, limits).tied_ligands(unit)
}

/// Descriptor of a unit at a node of a digraph that is about another unit; `far` is the node of the
/// second end of a pair.
pub(super) fn auxiliary_descriptor(
    engine: &mut Engine<'_>,
    unit: &Unit,
    parity: Parity,
    near: NodeIx,
    far: NodeIx,
) -> Result<Option<Descriptor>, Stop> {
    let mut sites = match unit.focus {
        Focus::Center(_) => Sites::Center(Where::Borrowed(engine), near),
        Focus::Pair(_) => Sites::Inner(engine, near, far),
    };
    let found = sites.rank_both_ways(unit)?;
    Ok(found.map(|(ranking, varies)| letter(unit.kind, parity.flipped_if(ranking.odd), varies)))
}

/// For each two neighbors in the order of a unit's ligands, how they were told apart; `None` where one is
/// a lone pair, stands alone at its end of a pair, or only Rule 6 parts them.
pub(super) fn ties(
    context: &Context,
    molecule: &Molecule,
    units: &Units,
    ix: UnitIx,
    ranking: &Ranking,
    foci: Option<&Foci>,
    limits: Limits,
) -> Result<Vec<Option<Tie>>, Stop> {
    let unit = units.get(ix);
    let mut sites = Sites::rooted(context, unit, limits);
    if let Some(foci) = foci {
        for engine in sites.engines() {
            auxiliary::fill(engine, units, ix, foci)?;
        }
    }
    let toward = unit.toward_each_other();
    let is_pair = matches!(unit.focus, Focus::Pair(_));
    let mut ties = Vec::new();
    for (k, engine) in sites.engines().into_iter().enumerate() {
        let partner = is_pair.then_some(toward[k]);
        let nodes = ligand_nodes(engine, ROOT, partner)?;
        let here = if is_pair {
            ranking.order.get(2 * k..2 * k + 2)
        } else {
            ranking.order.get(..)
        };
        for two in here.unwrap_or_default().windows(2) {
            let node =
                |wanted: Ligand| nodes.iter().copied().find(|n| ligand(engine, *n) == wanted);
            let (higher, lower) = (node(two[0]), node(two[1]));
            ties.push(match (higher, lower) {
                (Some(a), Some(b)) => why::tie(engine, molecule, ROOT, a, b)?,
                _ => None,
            });
        }
    }
    Ok(ties)
}

enum Where<'e, 'a> {
    Owned(Box<Engine<'a>>),
    Borrowed(&'e mut Engine<'a>),
}

impl<'a> Where<'_, 'a> {
    fn engine(&mut self) -> &mut Engine<'a> {
        match self {
            Where::Owned(engine) => engine,
            Where::Borrowed(engine) => engine,
        }
    }
}

/// Where a unit's ligands are ranked.
enum Sites<'e, 'a> {
    /// At one node.
    Center(Where<'e, 'a>, NodeIx),
    /// At the roots of two digraphs, one for each end.
    Ends(Box<[Engine<'a>; 2]>),
    /// At two joined nodes of one digraph.
    Inner(&'e mut Engine<'a>, NodeIx, NodeIx),
}

impl<'e, 'a> Sites<'e, 'a> {
    fn rooted(context: &'a Context, unit: &Unit, limits: Limits) -> Sites<'e, 'a> {
        let engine = |root| {
            Engine::new(
                Digraph::new(context, root, limits.nodes),
                limits.comparisons,
            )
        };
        match unit.focus {
            Focus::Center(atom) => Sites::Center(Where::Owned(Box::new(engine(atom))), ROOT),
            Focus::Pair([a, b]) => Sites::Ends(Box::new([engine(a), engine(b)])),
        }
    }

    fn engines(&mut self) -> SmallVec<[&mut Engine<'a>; 2]> {
        match self {
            Sites::Center(place, _) => SmallVec::from_iter([place.engine()]),
            Sites::Ends(engines) => engines.iter_mut().collect(),
            Sites::Inner(engine, ..) => SmallVec::from_iter([&mut **engine]),
        }
    }

    /// Ligands at the roots that the constitution leaves tied.
    fn tied_ligands(&mut self, unit: &Unit) -> Result<Vec<Vec<Ligand>>, Stop> {
        let toward = unit.toward_each_other();
        let is_pair = matches!(unit.focus, Focus::Pair(_));
        let mut tied = Vec::new();
        for (k, engine) in self.engines().into_iter().enumerate() {
            let nodes = ligand_nodes(engine, ROOT, is_pair.then_some(toward[k]))?;
            let (ranked, _) = rank_nodes(engine, ROOT, nodes, Reach::Constitution)?;
            let groups = ranked.groups().filter(|g| g.len() > 1);
            tied.extend(groups.map(|g| g.iter().map(|n| ligand(engine, *n)).collect::<Vec<_>>()));
        }
        Ok(tied)
    }

    fn rank_both_ways(&mut self, unit: &Unit) -> Result<Option<(Ranking, bool)>, Stop> {
        let Some(ranking) = self.rank(unit, Reach::All(true))? else {
            return Ok(None);
        };
        if ranking.rule < Rule::R5 {
            return Ok(Some((ranking, true)));
        }
        let Some(reversed) = self.rank(unit, Reach::All(false))? else {
            return Ok(None);
        };
        let varies = ranking.odd == reversed.odd;
        // a sense by Rule 6 that reflection leaves alone is the in/out of a cage: no label
        if !varies && ranking.rule == Rule::R6 {
            return Ok(None);
        }
        Ok(Some((ranking, varies)))
    }

    fn rank(&mut self, unit: &Unit, reach: Reach) -> Result<Option<Ranking>, Stop> {
        let Focus::Pair(ends) = unit.focus else {
            let Sites::Center(place, hub) = self else {
                return Ok(None);
            };
            return rank_center(place.engine(), *hub, &unit.ligands, reach);
        };
        let Some(mut hubs) = self.hubs(ends) else {
            return Ok(None);
        };
        let toward = unit.toward_each_other();
        let mut found = [None, None];
        for (k, found) in found.iter_mut().enumerate() {
            let ligands = &unit.ligands[2 * k..2 * k + 2];
            let (engine, hub) = hubs.at(k);
            *found = rank_end(engine, hub, toward[k], ligands, reach)?;
        }
        if let [Some(first), Some(second)] = &found {
            return Ok(Some(joined(first, second)));
        }
        let axial = matches!(unit.kind, Kind::CumulatedAxis | Kind::HinderedAxis);
        let both_tied = found.iter().all(Option::is_none);
        if axial && both_tied && reach != Reach::Constitution {
            return rank_axis_by_reference(&mut hubs, unit, reach);
        }
        Ok(None)
    }

    /// The nodes of a pair's ends, each with its digraph.
    fn hubs(&mut self, ends: [AtomIx; 2]) -> Option<Hubs<'_, 'a>> {
        match self {
            Sites::Ends(engines) => Some(Hubs::Apart(engines)),
            Sites::Inner(engine, near, far) => {
                let near_is_first = engine.tree.node(*near).atom == ends[0];
                let nodes = if near_is_first {
                    [*near, *far]
                } else {
                    [*far, *near]
                };
                Some(Hubs::Together(engine, nodes))
            }
            Sites::Center(..) => None,
        }
    }
}

/// Where the two ends of a pair are ranked.
enum Hubs<'s, 'a> {
    Apart(&'s mut [Engine<'a>; 2]),
    Together(&'s mut Engine<'a>, [NodeIx; 2]),
}

impl<'a> Hubs<'_, 'a> {
    fn at(&mut self, k: usize) -> (&mut Engine<'a>, NodeIx) {
        match self {
            Hubs::Apart(engines) => (&mut engines[k], ROOT),
            Hubs::Together(engine, nodes) => (engine, nodes[k]),
        }
    }
}

/// Rule 6 for an axis that is tied at both ends: a ligand of the first end in turn is the reference in
/// the digraphs of both; every choice must order both ends and give one sense.
fn rank_axis_by_reference(
    hubs: &mut Hubs<'_, '_>,
    unit: &Unit,
    reach: Reach,
) -> Result<Option<Ranking>, Stop> {
    let toward = unit.toward_each_other();
    let mut agreed: Option<Ranking> = None;
    for reference in &unit.ligands[..2] {
        let Some(reference) = reference.atom() else {
            return Ok(None);
        };
        let mut found: SmallVec<[Ranking; 2]> = SmallVec::new();
        for (k, partner) in toward.iter().enumerate() {
            let (engine, hub) = hubs.at(k);
            engine.set_reference(Some(reference));
            let nodes = ligand_nodes(engine, hub, Some(*partner))?;
            let (ranked, _) = rank_nodes(engine, hub, nodes, reach)?;
            let refined = engine.refine_by(ranked, hub, Step::R6)?;
            if !refined.is_complete() {
                return Ok(None);
            }
            let ligands = &unit.ligands[2 * k..2 * k + 2];
            found.push(end_ranking(engine, &refined, ligands, Rule::R6));
        }
        let ranking = joined(&found[0], &found[1]);
        match &agreed {
            Some(earlier) if earlier.odd != ranking.odd => return Ok(None),
            Some(_) => {}
            None => agreed = Some(ranking),
        }
    }
    Ok(agreed)
}

/// The ranking of a pair from those of its ends.
fn joined(first: &Ranking, second: &Ranking) -> Ranking {
    let mut order = first.order.clone();
    order.extend(second.order.iter().copied());
    Ranking {
        order,
        rule: first.rule.max(second.rule),
        odd: first.odd != second.odd,
    }
}

/// Ranks the ligands of a centre at a node.
fn rank_center(
    engine: &mut Engine<'_>,
    hub: NodeIx,
    ligands: &[Ligand; 4],
    reach: Reach,
) -> Result<Option<Ranking>, Stop> {
    let nodes = ligand_nodes(engine, hub, None)?;
    let (ranked, rule) = rank_nodes(engine, hub, nodes, reach)?;
    let complete = |engine: &Engine<'_>, ranked: &Ranked, rule: Rule| {
        let mut order: SmallVec<[Ligand; 4]> =
            ranked.nodes().iter().map(|n| ligand(engine, *n)).collect();
        if ligands[3] == Ligand::LonePair {
            order.push(Ligand::LonePair);
        }
        let odd = odd_permutation(&order, ligands);
        Ranking { order, rule, odd }
    };
    if ranked.is_complete() {
        return Ok(Some(complete(engine, &ranked, rule)));
    }
    if reach == Reach::Constitution {
        return Ok(None);
    }
    // Rule 6: each ligand of the highest tied group in turn as reference; all must agree
    let tied: Nodes = match ranked.groups().find(|g| g.len() > 1) {
        Some(group) => group.into(),
        None => return Ok(None),
    };
    let mut agreed: Option<Ranking> = None;
    for reference in tied {
        if engine.tree.node(reference).kind == NodeKind::Hydrogen {
            return Ok(None);
        }
        engine.set_reference(Some(engine.tree.node(reference).atom));
        let refined = engine.refine_by(ranked.clone(), hub, Step::R6)?;
        if !refined.is_complete() {
            return Ok(None);
        }
        let found = complete(engine, &refined, Rule::R6);
        match &agreed {
            Some(earlier) if earlier.odd != found.odd => return Ok(None),
            Some(_) => {}
            None => agreed = Some(found),
        }
    }
    Ok(agreed)
}

/// Ranks the one or two ligands of one end of a pair; `partner` is the neighbor on the way to the other.
/// Double bonds know no Rule 6.
fn rank_end(
    engine: &mut Engine<'_>,
    hub: NodeIx,
    partner: AtomIx,
    ligands: &[Ligand],
    reach: Reach,
) -> Result<Option<Ranking>, Stop> {
    let nodes = ligand_nodes(engine, hub, Some(partner))?;
    let (ranked, rule) = rank_nodes(engine, hub, nodes, reach)?;
    Ok(ranked
        .is_complete()
        .then(|| end_ranking(engine, &ranked, ligands, rule)))
}

fn end_ranking(engine: &Engine<'_>, ranked: &Ranked, ligands: &[Ligand], rule: Rule) -> Ranking {
    let mut order: SmallVec<[Ligand; 4]> =
        ranked.nodes().iter().map(|n| ligand(engine, *n)).collect();
    if order.len() < 2 {
        order.push(ligands[1]);
    }
    let odd = order.first() != ligands.first();
    Ranking { order, rule, odd }
}

/// Nodes that stand for real ligands of a node: all neighbours but duplicates for further electron
/// pairs; without the partner atom of a pair.
fn ligand_nodes(
    engine: &mut Engine<'_>,
    hub: NodeIx,
    partner: Option<AtomIx>,
) -> Result<Nodes, Stop> {
    let nodes = engine.tree.away_from(hub, hub)?;
    Ok(nodes
        .into_iter()
        .filter(|n| {
            let node = engine.tree.node(*n);
            let is_partner = node.kind != NodeKind::Hydrogen && Some(node.atom) == partner;
            node.kind != NodeKind::BondDuplicate && !is_partner
        })
        .collect())
}

fn ligand(engine: &Engine<'_>, ix: NodeIx) -> Ligand {
    let node = engine.tree.node(ix);
    match node.kind {
        NodeKind::Hydrogen => Ligand::Hydrogen,
        NodeKind::Atom | NodeKind::RingDuplicate | NodeKind::BondDuplicate => {
            Ligand::Atom(node.atom)
        }
    }
}

/// Orders nodes by one rule after the other until no ties are left; also the latest rule that split any.
fn rank_nodes(
    engine: &mut Engine<'_>,
    hub: NodeIx,
    nodes: Nodes,
    reach: Reach,
) -> Result<(Ranked, Rule), Stop> {
    let mut ranked = Engine::unranked(nodes);
    let mut latest = Rule::R1a;
    let rules: &[(Rule, Step)] = &[
        (Rule::R1a, Step::R1a),
        (Rule::R1b, Step::R1b),
        (Rule::R2, Step::R2),
        (Rule::R3, Step::R3),
        (Rule::R4a, Step::R4a),
        // Rule 4b has no step of its own
        (Rule::R4b, Step::R4a),
        (Rule::R4c, Step::R4c),
        (Rule::R5, Step::R5(reach != Reach::All(false))),
    ];
    for (rule, step) in rules {
        if ranked.is_complete() || (reach == Reach::Constitution && !rule.is_constitutional()) {
            break;
        }
        let before = ranked.groups().count();
        ranked = if *rule == Rule::R4b {
            engine.refine_by_4b(ranked, hub)?
        } else {
            engine.refine_by(ranked, hub, *step)?
        };
        if ranked.groups().count() > before {
            latest = *rule;
        }
    }
    Ok((ranked, latest))
}
