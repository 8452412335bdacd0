//! Auxiliary descriptors: what other units are called as seen inside one digraph.
//!
//! Every occurrence of a unit is a node of its own and may get another letter than the next. They are
//! made sphere by sphere from the outside inwards, each with the letters of the farther spheres only.

use super::digraph::{NodeIx, NodeKind};
use super::engine::Engine;
use super::{Stop, unit};
use crate::molecule::AtomIx;
use crate::stereo::{Configuration, Focus, Kind, Parity, Unit, UnitIx, Units};
use smallvec::SmallVec;
use std::collections::BTreeMap;

/// Units of defined configuration, by the atoms of their focus.
#[derive(Clone, Debug, Default)]
pub(super) struct Foci {
    at: BTreeMap<AtomIx, Vec<(UnitIx, Parity)>>,
}

impl Foci {
    pub(super) fn of(units: &Units, configurations: &[Configuration]) -> Foci {
        let mut foci = Foci::default();
        for (ix, unit) in units.iter() {
            if let Configuration::Defined(parity) = configurations[ix.index()] {
                for atom in unit.atoms() {
                    foci.at.entry(atom).or_default().push((ix, parity));
                }
            }
        }
        foci
    }

    fn other_than(&self, unit: UnitIx) -> bool {
        self.at.values().flatten().any(|(ix, _)| *ix != unit)
    }
}

struct Occurrence {
    sphere: u32,
    near: NodeIx,
    far: NodeIx,
    unit: UnitIx,
    parity: Parity,
}

/// Gives every occurrence of another unit in the digraph its descriptor.
pub(super) fn fill(
    engine: &mut Engine<'_>,
    units: &Units,
    under_study: UnitIx,
    foci: &Foci,
) -> Result<(), Stop> {
    if !foci.other_than(under_study) {
        return Ok(());
    }
    engine.tree.grow_all()?;
    let mut found = occurrences(engine, units, under_study, foci)?;
    found.sort_by_key(|o| std::cmp::Reverse(o.sphere));
    for sphere in found.chunk_by(|a, b| a.sphere == b.sphere) {
        let mut letters = Vec::with_capacity(sphere.len());
        for o in sphere {
            let unit = units.get(o.unit);
            letters.push(unit::auxiliary_descriptor(
                engine, unit, o.parity, o.near, o.far,
            )?);
        }
        for (o, letter) in sphere.iter().zip(letters) {
            engine.tree.set_descriptor(o.near, letter);
        }
        engine.descriptors_changed();
    }
    Ok(())
}

fn occurrences(
    engine: &mut Engine<'_>,
    units: &Units,
    under_study: UnitIx,
    foci: &Foci,
) -> Result<Vec<Occurrence>, Stop> {
    let mut found = Vec::new();
    let n_nodes = NodeIx::try_from(engine.tree.len()).unwrap_or(NodeIx::MAX);
    for near in 0..n_nodes {
        let node = engine.tree.node(near);
        if node.kind != NodeKind::Atom {
            continue;
        }
        let (atom, sphere) = (node.atom, node.sphere);
        for (ix, parity) in foci.at.get(&atom).into_iter().flatten() {
            // a helix has no ligands to rank and no place in the digraph
            if *ix == under_study || units.get(*ix).kind == Kind::Helix {
                continue;
            }
            let far = far_end(engine, units.get(*ix), near)?;
            // a pair counts at its nearer end, whose partner lies farther out
            if let Some(far) = far {
                found.push(Occurrence {
                    sphere,
                    near,
                    far,
                    unit: *ix,
                    parity: *parity,
                });
            }
        }
    }
    Ok(found)
}

/// The node of a unit's far end whose near end is `near`: down the chain between them; a centre is its
/// own. `None` if the chain does not go on downwards, so that this occurrence is the far end itself.
fn far_end(engine: &mut Engine<'_>, unit: &Unit, near: NodeIx) -> Result<Option<NodeIx>, Stop> {
    let Focus::Pair(ends) = unit.focus else {
        return Ok(Some(near));
    };
    let forward = engine.tree.node(near).atom == ends[0];
    let mut way: SmallVec<[AtomIx; 4]> = unit.inner.iter().copied().collect();
    if forward {
        way.push(ends[1]);
    } else {
        way.reverse();
        way.push(ends[0]);
    }
    let mut at = near;
    for atom in way {
        let children = engine.tree.children(at)?;
        let next = children.into_iter().find(|c| {
            let child = engine.tree.node(*c);
            child.kind == NodeKind::Atom && child.atom == atom
        });
        match next {
            Some(node) => at = node,
            None => return Ok(None),
        }
    }
    Ok(Some(at))
}
