//! What open units could change: which of them could carry a descriptor, and which letters of others rest
//! on their being open.
//!
//! Units that Rules 1a, 1b and 2 rank can carry one, and their letters are firm. Where these rules leave a
//! tie, other units may break it (Rules 3 to 6): then the open units are given configurations, all
//! combinations of them where they are few and many different ones where they are not.

use super::{Missing, Ranker, Stop, UnitLabel, unit};
use crate::molecule::AtomIx;
use crate::stereo::{Configuration, Ligand, Parity, Unit, UnitIx};

/// With so many open units or fewer, every combination is tried.
const FEW: usize = 4;
/// Combinations tried where there are more: a unit that needs two others to differ is missed with a
/// chance of one in 2^16.
const ROUNDS: u64 = 16;
/// Comparisons that all combinations together may take.
const MOST_WORK: u64 = 200_000;

/// What open units could change.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Outlook {
    /// For each unit without a configuration whether it could carry a descriptor while the units that have
    /// one keep theirs; false for the others. The error tells that it would take too much work to say.
    pub could_carry: Vec<Result<bool, Stop>>,
    /// For each unit whether its letter is provisional: it is another one, or none, under some
    /// configuration of the open units (or it would take too much work to exclude that).
    pub is_provisional: Vec<bool>,
}

/// Whether an open unit could carry a descriptor, by itself.
enum Prospect {
    Sure,
    /// It depends on other units.
    Dependent,
    None,
    Stopped(Stop),
}

/// Units that a combination of configurations is tried for.
struct Trial<'l> {
    open: Vec<UnitIx>,
    dependent: Vec<UnitIx>,
    /// Labels that the open units could change, with what they are now.
    lettered: Vec<(UnitIx, &'l UnitLabel)>,
}

impl Ranker<'_> {
    /// What the open units could change; `labels` are those of the units that have a configuration. Hindered
    /// axes and helices count as open only once a mark speaks of them. Whether open units could carry a
    /// descriptor is found out for those `asked` for.
    pub fn outlook(
        &self,
        configurations: &[Configuration],
        labels: &[Option<UnitLabel>],
        asked: impl Fn(UnitIx) -> bool,
    ) -> Outlook {
        let mut outlook = Outlook {
            could_carry: vec![Ok(false); configurations.len()],
            is_provisional: vec![false; configurations.len()],
        };
        let mut trial = Trial {
            open: Vec::new(),
            dependent: Vec::new(),
            lettered: Vec::new(),
        };
        let mut others = Vec::new();
        for (ix, unit) in self.units.iter() {
            let i = ix.index();
            match configurations[i] {
                Configuration::Defined(_) => {
                    let label = labels[i].as_ref().filter(|l| l.rests_on_others());
                    trial.lettered.extend(label.map(|l| (ix, l)));
                    continue;
                }
                Configuration::Open if unit.kind.needs_mark() => continue,
                Configuration::Open | Configuration::Either if !asked(ix) => {
                    others.push(ix);
                    continue;
                }
                Configuration::Open | Configuration::Either => {}
            }
            match self.prospect(ix) {
                Prospect::Sure => {
                    outlook.could_carry[i] = Ok(true);
                    trial.open.push(ix);
                }
                Prospect::Dependent => {
                    trial.dependent.push(ix);
                    trial.open.push(ix);
                }
                Prospect::None => {}
                Prospect::Stopped(stop) => outlook.could_carry[i] = Err(stop),
            }
        }
        let concerns_any = !(trial.dependent.is_empty() && trial.lettered.is_empty());
        if !concerns_any {
            return outlook;
        }
        let counts =
            |ix: &UnitIx| matches!(self.prospect(*ix), Prospect::Sure | Prospect::Dependent);
        trial.open.extend(others.into_iter().filter(counts));
        trial.open.sort_unstable();
        if !trial.open.is_empty() {
            self.try_combinations(configurations, &trial, &mut outlook);
        }
        outlook
    }

    fn prospect(&self, ix: UnitIx) -> Prospect {
        match self.by_constitution(ix) {
            Ok(Some(_)) => Prospect::Sure,
            Ok(None) if self.may_be_parted(ix) => Prospect::Dependent,
            Ok(None) => Prospect::None,
            Err(stop) => Prospect::Stopped(stop),
        }
    }

    fn try_combinations(
        &self,
        configurations: &[Configuration],
        trial: &Trial<'_>,
        outlook: &mut Outlook,
    ) {
        let few = trial.open.len() <= FEW;
        let rounds = if few { 1 << trial.open.len() } else { ROUNDS };
        let end = self.work.get() + MOST_WORK;
        for round in 0..rounds {
            let mut tried = configurations.to_vec();
            for (k, ix) in trial.open.iter().enumerate() {
                let even = if few {
                    round & (1 << k) == 0
                } else {
                    scattered(round, k)
                };
                tried[ix.index()] = Configuration::Defined(Parity::from_even(even));
            }
            let left = end.saturating_sub(self.work.get());
            // too much work: only whole rounds count, or the order of atoms would have a say
            let Some(labels) = self.label_within(&tried, left) else {
                outlook.give_up(trial);
                return;
            };
            outlook.learn(trial, &labels);
            if outlook.is_settled(trial) {
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

impl Outlook {
    fn learn(&mut self, trial: &Trial<'_>, labels: &[Option<UnitLabel>]) {
        for ix in &trial.dependent {
            let found = &mut self.could_carry[ix.index()];
            match labels[ix.index()].as_ref().map(|l| l.descriptor) {
                Some(Ok(_)) => *found = Ok(true),
                Some(Err(Missing::Stopped(stop))) if *found == Ok(false) => *found = Err(stop),
                Some(Err(_)) | None => {}
            }
        }
        for (ix, now) in &trial.lettered {
            let then = labels[ix.index()].as_ref().map(|l| l.descriptor);
            self.is_provisional[ix.index()] |= then != Some(now.descriptor);
        }
    }

    fn is_settled(&self, trial: &Trial<'_>) -> bool {
        let undecided = |ix: &UnitIx| self.could_carry[ix.index()] == Ok(false);
        !trial.dependent.iter().any(undecided)
            && trial
                .lettered
                .iter()
                .all(|(ix, _)| self.is_provisional[ix.index()])
    }

    fn give_up(&mut self, trial: &Trial<'_>) {
        for ix in &trial.dependent {
            let found = &mut self.could_carry[ix.index()];
            if *found == Ok(false) {
                *found = Err(Stop::Combinations);
            }
        }
        for (ix, _) in &trial.lettered {
            self.is_provisional[ix.index()] = true;
        }
    }
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

#[cfg(test)]
mod tests {
    use super::*;
    use crate::cip::Limits;
    use crate::molecule::Molecule;
    use crate::molecule::tests::build;
    use crate::perceive::Rings;
    use crate::stereo::Units;

    /// Labels of the centres at these atoms, where those listed have a configuration.
    fn labels(molecule: &Molecule, set: &[(usize, Parity)], at: &[usize]) -> Vec<UnitLabel> {
        let rings = Rings::find(molecule);
        let units = Units::find(molecule, &rings);
        let ranker = Ranker::new(molecule, &rings, &units, Limits::default());
        let center = |atom: usize| units.center_at(AtomIx::new(atom)).unwrap();
        let mut configurations = vec![Configuration::Open; units.len()];
        for (atom, parity) in set {
            configurations[center(*atom).index()] = Configuration::Defined(*parity);
        }
        let all = ranker.label_all(&configurations);
        at.iter().map(|a| all[center(*a).index()].clone()).collect()
    }

    fn chain(n: usize, hydroxyls: &[usize]) -> Molecule {
        let mut symbols = vec!["C"; n];
        let mut bonds: Vec<_> = (1..n).map(|i| (i - 1, i, 1)).collect();
        for at in hydroxyls {
            bonds.push((*at, symbols.len(), 1));
            symbols.push("O");
        }
        build(&symbols, &bonds)
    }

    fn ring(substituted: &[usize]) -> Molecule {
        let mut bonds: Vec<_> = (0..6).map(|i| (i, (i + 1) % 6, 1)).collect();
        bonds.extend(
            substituted
                .iter()
                .enumerate()
                .map(|(k, at)| (*at, 6 + k, 1)),
        );
        build(&vec!["C"; 6 + substituted.len()], &bonds)
    }

    // pentane-2,3,4-triol: with 4 open, nothing firm can be said of 3
    #[test]
    fn a_letter_that_rests_on_an_open_center_is_provisional() {
        let triol = chain(5, &[1, 2, 3]);
        let two = [(1, Parity::Even), (2, Parity::Even)];
        let found = labels(&triol, &two, &[1, 2, 3]);
        assert!(found[0].descriptor.is_ok() && !found[0].is_provisional);
        assert!(found[1].descriptor.is_ok() && found[1].is_provisional);
        assert_eq!(found[2].descriptor, Err(Missing::Undefined));
        let three = [two[0], two[1], (3, Parity::Odd)];
        assert!(
            labels(&triol, &three, &[1, 2, 3])
                .iter()
                .all(|l| !l.is_provisional)
        );
    }

    #[test]
    fn places_that_other_places_may_part_are_open() {
        // 1,4-dimethylcyclohexane: each centre needs the other
        for label in labels(&ring(&[0, 3]), &[], &[0, 3]) {
            assert_eq!(label.descriptor, Err(Missing::Undefined));
        }
        // methylcyclohexane and propan-2-ol: nothing could ever part their ligands
        assert_eq!(
            labels(&ring(&[0]), &[], &[0])[0].descriptor,
            Err(Missing::Alike)
        );
        assert_eq!(
            labels(&chain(3, &[1]), &[], &[1])[0].descriptor,
            Err(Missing::Alike)
        );
        // pentane-2,3,4-triol with both outer centres R, or both S: alike; R and S: open
        let triol = chain(5, &[1, 2, 3]);
        let outer = |b| [(1, Parity::Even), (3, b)];
        let verdicts =
            [Parity::Even, Parity::Odd].map(|b| labels(&triol, &outer(b), &[2])[0].descriptor);
        assert!(verdicts.contains(&Err(Missing::Alike)));
        assert!(verdicts.contains(&Err(Missing::Undefined)));
    }

    // more open places than are tried in every combination
    #[test]
    fn many_open_places() {
        let inositol = ring(&[0, 1, 2, 3, 4, 5]);
        for label in labels(&inositol, &[], &[0, 1, 2, 3, 4, 5]) {
            assert_eq!(label.descriptor, Err(Missing::Undefined));
        }
        let decaol = chain(17, &[1, 2, 3, 4, 5, 6, 7, 8, 9, 10, 11, 12, 13, 14, 15]);
        for label in labels(&decaol, &[], &[1, 7, 8, 15]) {
            assert_eq!(label.descriptor, Err(Missing::Undefined));
        }
    }
}
