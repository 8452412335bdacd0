//! Why ligands stand in their order: for each two neighbors in it the rule that parts them, the sphere
//! where it does, and what was compared there.

use super::digraph::{NodeIx, NodeKind};
use super::engine::{Branch, Engine};
use super::rules::{Step, rule4b};
use super::{Rule, Stop};
use crate::molecule::{AtomIx, Molecule};
use crate::perceive::Ratio;

/// How two neighbors in the order of ligands were told apart.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Tie {
    /// The rule that parts them.
    pub rule: Rule,
    /// Distance from the focus at which it does; 1 for the ligands themselves.
    pub sphere: u32,
    /// What was compared there on the side of the higher ligand, from high to low.
    pub higher: Vec<Compared>,
    /// The same on the side of the lower one.
    pub lower: Vec<Compared>,
}

/// One member of a set that was compared.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Compared {
    /// The drawn atom it stands for; of a hydrogen in a label, the atom that bears it.
    pub atom: AtomIx,
    /// Whether it is a duplicate atom (of a multiple bond or a ring closure).
    pub is_duplicate: bool,
    /// What the rule sees in it: a symbol (Rules 1a, 1b), a mass (Rule 2), a descriptor or a dash (later
    /// rules).
    pub text: String,
}

const STEPS: [(Rule, Step); 7] = [
    (Rule::R1a, Step::R1a),
    (Rule::R1b, Step::R1b),
    (Rule::R2, Step::R2),
    (Rule::R3, Step::R3),
    (Rule::R4a, Step::R4a),
    (Rule::R4c, Step::R4c),
    (Rule::R5, Step::R5(true)),
];

/// How two ligands of one node were told apart; `None` if no rule before 6 does.
pub(super) fn tie(
    engine: &mut Engine<'_>,
    molecule: &Molecule,
    hub: NodeIx,
    higher: NodeIx,
    lower: NodeIx,
) -> Result<Option<Tie>, Stop> {
    let of = |node| Branch { node, from: hub };
    for (rule, step) in STEPS {
        if rule == Rule::R4c && rule4b::compare_branches(engine, of(higher), of(lower))?.is_ne() {
            let sets = [
                rule4b::sequence(engine, of(higher))?,
                rule4b::sequence(engine, of(lower))?,
            ];
            return Ok(Some(made(engine, molecule, hub, Rule::R4b, &sets)));
        }
        if let Some(sets) = engine.decisive_sets(of(higher), of(lower), step)? {
            let sets = sets.map(|nodes| nodes.to_vec());
            return Ok(Some(made(engine, molecule, hub, rule, &sets)));
        }
    }
    Ok(None)
}

fn made(
    engine: &Engine<'_>,
    molecule: &Molecule,
    hub: NodeIx,
    rule: Rule,
    sets: &[Vec<NodeIx>; 2],
) -> Tie {
    let show = |nodes: &[NodeIx]| {
        nodes
            .iter()
            .map(|n| compared(engine, molecule, rule, *n))
            .collect()
    };
    let base = engine.tree.node(hub).sphere;
    let sphere = sets
        .iter()
        .flatten()
        .map(|n| engine.tree.node(*n).sphere.abs_diff(base))
        .min()
        .unwrap_or(1);
    Tie {
        rule,
        sphere,
        higher: show(&sets[0]),
        lower: show(&sets[1]),
    }
}

fn compared(engine: &Engine<'_>, molecule: &Molecule, rule: Rule, ix: NodeIx) -> Compared {
    let node = engine.tree.node(ix);
    let is_duplicate = matches!(node.kind, NodeKind::RingDuplicate | NodeKind::BondDuplicate);
    let symbol = || match node.kind {
        NodeKind::Hydrogen => "H".to_owned(),
        NodeKind::Atom | NodeKind::RingDuplicate => molecule.element(node.atom).symbol().to_owned(),
        NodeKind::BondDuplicate => number_or_symbol(molecule, node.atom, engine.tree.number(ix)),
    };
    let text = match rule {
        Rule::R1a | Rule::R1b => symbol(),
        Rule::R2 => {
            if is_duplicate {
                format!("{} (no mass)", symbol())
            } else {
                format!("{} {:.3}", symbol(), engine.tree.mass(ix))
            }
        }
        Rule::R3 | Rule::R4a | Rule::R4b | Rule::R4c | Rule::R5 | Rule::R6 => node
            .descriptor
            .map_or_else(|| "\u{2013}".to_owned(), |d| d.to_string()),
    };
    Compared {
        atom: node.atom,
        is_duplicate,
        text,
    }
}

/// The symbol of a duplicate, or its mean atomic number in a delocalised ring.
fn number_or_symbol(molecule: &Molecule, atom: AtomIx, number: Ratio) -> String {
    let element = molecule.element(atom);
    if number == Ratio::whole(u32::from(element.number())) {
        element.symbol().to_owned()
    } else {
        format!("{:.1}", f64::from(number.over) / f64::from(number.under))
    }
}
