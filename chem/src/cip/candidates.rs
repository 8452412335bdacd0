//! Which units without a configuration could carry a descriptor, given those that have one.
//!
//! Units that Rules 1a, 1b and 2 rank can. Where these leave a tie, other units may break it (Rules 3 to
//! 6): then the open units are given configurations, all combinations of them where they are few and many
//! different ones where they are not, until the unit gets a letter or none is left to try.

use super::{Missing, Ranker, Stop, unit};
use crate::molecule::AtomIx;
use crate::stereo::{Configuration, Kind, Ligand, Parity, Unit, UnitIx};

/// With so many open units or fewer, every combination is tried.
const FEW: usize = 6;
/// Combinations tried where there are more: a unit that needs two others to differ is missed with a
/// chance of one in 2^24.
const ROUNDS: u64 = 24;
/// Comparisons that all combinations together may take.
const MOST_WORK: u64 = 1_000_000;

impl Ranker<'_> {
    /// For each unit whether it carries a descriptor or, being open, could carry one while the units that
    /// have a configuration keep it. Hindered axes and helices count only once a mark speaks of them.
    ///
    /// The error tells that too much work would be needed to say.
    pub fn could_carry(&self, configurations: &[Configuration]) -> Vec<Result<bool, Stop>> {
        let mut could: Vec<Result<bool, Stop>> = vec![Ok(false); configurations.len()];
        let mut dependent = Vec::new();
        let mut open = Vec::new();
        for (ix, unit) in self.units.iter() {
            let i = ix.index();
            match configurations[i] {
                Configuration::Defined(_) => continue,
                Configuration::Open if needs_mark(unit) => continue,
                Configuration::Open | Configuration::Either => {}
            }
            match self.by_constitution(ix) {
                Ok(Some(_)) => {
                    could[i] = Ok(true);
                    open.push(ix);
                }
                Ok(None) if self.may_be_parted(ix) => {
                    dependent.push(ix);
                    open.push(ix);
                }
                Ok(None) => {}
                Err(stop) => could[i] = Err(stop),
            }
        }
        if !dependent.is_empty() {
            self.try_combinations(configurations, &open, &dependent, &mut could);
        }
        could
    }

    fn try_combinations(
        &self,
        configurations: &[Configuration],
        open: &[UnitIx],
        dependent: &[UnitIx],
        could: &mut [Result<bool, Stop>],
    ) {
        let few = open.len() <= FEW;
        let rounds = if few { 1 << open.len() } else { ROUNDS };
        let end = self.work.get() + MOST_WORK;
        for round in 0..rounds {
            let mut tried = configurations.to_vec();
            for (k, ix) in open.iter().enumerate() {
                let even = if few {
                    round & (1 << k) == 0
                } else {
                    scattered(round, k)
                };
                tried[ix.index()] = Configuration::Defined(Parity::from_even(even));
            }
            let left = end.saturating_sub(self.work.get());
            let labels = self.label_within(&tried, left);
            for ix in dependent {
                let found = &mut could[ix.index()];
                let label = labels.as_ref().and_then(|l| l[ix.index()].as_ref());
                match label.map(|l| l.descriptor) {
                    Some(Ok(_)) => *found = Ok(true),
                    Some(Err(Missing::Stopped(stop))) if *found == Ok(false) => *found = Err(stop),
                    Some(Err(_)) => {}
                    // too much work: whole rounds only count, or the order of atoms would have a say
                    None if *found == Ok(false) => *found = Err(Stop::Combinations),
                    None => {}
                }
            }
            if dependent.iter().all(|ix| could[ix.index()] != Ok(false)) {
                return;
            }
        }
    }

    /// Whether other units could break the ties of a unit.
    fn may_be_parted(&self, ix: UnitIx) -> bool {
        match unit::tied_ligands(&self.context, self.units.get(ix), self.limits) {
            Ok(groups) => !groups.iter().any(|group| self.is_hopeless(ix, group)),
            Err(_) => true,
        }
    }

    /// Whether nothing can part some of these ligands, which are alike by constitution: two of them each
    /// hang on the unit alone and hold no unit.
    pub(super) fn is_hopeless(&self, ix: UnitIx, tied: &[Ligand]) -> bool {
        let unit = self.units.get(ix);
        let is_inert = |ligand: &&Ligand| match ligand.atom() {
            Some(atom) => self.hangs_inert(unit, atom),
            None => true,
        };
        tied.iter().filter(is_inert).nth(1).is_some()
    }

    /// Whether what hangs on a unit by this ligand holds no other unit and leads back to no other ligand.
    fn hangs_inert(&self, unit: &Unit, ligand: AtomIx) -> bool {
        let focus = unit.atoms();
        let mut seen = vec![false; self.context.len()];
        for a in focus.iter().chain(&unit.inner) {
            seen[a.index()] = true;
        }
        seen[ligand.index()] = true;
        let mut stack = vec![ligand];
        while let Some(atom) = stack.pop() {
            if self.is_focus[atom.index()] {
                return false;
            }
            for bond in self.context.bonds(atom) {
                let to = bond.to;
                if atom != ligand && focus.contains(&to) {
                    return false;
                }
                if !seen[to.index()] {
                    seen[to.index()] = true;
                    stack.push(to);
                }
            }
        }
        true
    }
}

/// Whether only a mark can tell that a unit is there at all.
fn needs_mark(unit: &Unit) -> bool {
    matches!(unit.kind, Kind::HinderedAxis | Kind::Helix)
}

/// Bit `k` of combination `round`, without pattern.
fn scattered(round: u64, k: usize) -> bool {
    // the finaliser of a common 64-bit mixer (splitmix64)
    let mut x = (round << 32) ^ (k as u64 + 1);
    x = x.wrapping_mul(0x9E37_79B9_7F4A_7C15);
    x = (x ^ (x >> 30)).wrapping_mul(0xBF58_476D_1CE4_E5B9);
    x = (x ^ (x >> 27)).wrapping_mul(0x94D0_49BB_1331_11EB);
    (x ^ (x >> 31)) & 1 == 0
}
