//! Auxiliary descriptors: what other units are called as seen inside one digraph.
//!
//! Every occurrence of a unit is a node of its own and may get another letter than the next. They are
//! made sphere by sphere from the outside inwards, each with the letters of the farther spheres only.

use super::digraph::{NodeIx, NodeKind};
use super::engine::Engine;
use super::{Stop, unit};
use crate::molecule::AtomIx;
use crate::stereo::{Configuration, Focus, Parity, UnitIx, Units};
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
            if *ix == under_study {
                continue;
            }
            let far = match units.get(*ix).focus {
                Focus::Center(_) => Some(near),
                Focus::Pair(ends) => {
                    let other = if ends[0] == atom { ends[1] } else { ends[0] };
                    let mut children = engine.tree.children(near)?;
                    children.find(|c| {
                        let child = engine.tree.node(*c);
                        child.kind == NodeKind::Atom && child.atom == other
                    })
                }
            };
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
