//! Finds configurations whose labels are those asked for.
//!
//! A unit that is ranked by constitution has its configuration straight from the letter. Units whose
//! rank depends on others are tried together: first each is turned over as long as that mends its own
//! letter, then every combination of a small group.

use crate::cip::{Missing, Ranker, Stop, UnitLabel};
use crate::stereo::{Configuration, Descriptor, Parity, UnitIx};

/// A unit and the letter it must carry.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Goal {
    /// The unit.
    pub unit: UnitIx,
    /// The letter.
    pub descriptor: Descriptor,
}

/// Why no configuration carries the letters.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum SearchError {
    /// The unit has two ligands that no rule tells apart.
    Alike(UnitIx),
    /// The unit carries letters, but never this one; one of those that it can carry.
    OtherLetter(UnitIx, Descriptor),
    /// Each of these can carry its letter, but not all together.
    Conflict(Vec<UnitIx>),
    /// Ranking this unit was stopped.
    Stopped(UnitIx, Stop),
    /// More units depend on each other than can be tried.
    TooMany(Vec<UnitIx>),
}

/// The largest group of units of which every combination is tried.
const LARGEST_GROUP: usize = 10;

/// Configurations that carry all goals; other units keep theirs from `start`.
///
/// # Errors
/// See [`SearchError`].
pub fn search(
    ranker: &Ranker<'_>,
    start: &[Configuration],
    goals: &[Goal],
) -> Result<Vec<Configuration>, SearchError> {
    let mut configurations = start.to_vec();
    let mut dependent = Vec::new();
    for goal in goals {
        match ranker.by_constitution(goal.unit) {
            Err(stop) => return Err(SearchError::Stopped(goal.unit, stop)),
            Ok(Some(_)) => set_alone(ranker, &mut configurations, *goal)?,
            Ok(None) => dependent.push(*goal),
        }
    }
    if dependent.is_empty() {
        return Ok(configurations);
    }
    for goal in &dependent {
        let slot = &mut configurations[goal.unit.index()];
        if !matches!(slot, Configuration::Defined(_)) {
            *slot = Configuration::Defined(Parity::Even);
        }
    }
    if turn_over(ranker, &mut configurations, &dependent) {
        return Ok(configurations);
    }
    try_all(ranker, configurations, &dependent)
}

fn letter(labels: &[Option<UnitLabel>], unit: UnitIx) -> Result<Descriptor, Missing> {
    labels[unit.index()]
        .as_ref()
        .map_or(Err(Missing::Undefined), |label| label.descriptor)
}

fn set_alone(
    ranker: &Ranker<'_>,
    configurations: &mut [Configuration],
    goal: Goal,
) -> Result<(), SearchError> {
    let mut carried = None;
    for parity in [Parity::Even, Parity::Odd] {
        carried = ranker.letter_by_constitution(goal.unit, parity);
        if carried == Some(goal.descriptor) {
            configurations[goal.unit.index()] = Configuration::Defined(parity);
            return Ok(());
        }
    }
    Err(match carried {
        Some(d) => SearchError::OtherLetter(goal.unit, d),
        None => SearchError::Alike(goal.unit),
    })
}

fn flip(configurations: &mut [Configuration], unit: UnitIx) {
    let slot = &mut configurations[unit.index()];
    if let Configuration::Defined(parity) = slot {
        *slot = Configuration::Defined(parity.flipped());
    }
}

/// Turns over each unit that carries the opposite letter, round after round; whether all carry theirs.
fn turn_over(ranker: &Ranker<'_>, configurations: &mut [Configuration], goals: &[Goal]) -> bool {
    for _ in 0..goals.len() + 4 {
        let mut wrong = Vec::new();
        let labels = ranker.label_defined(configurations);
        for goal in goals {
            match letter(&labels, goal.unit) {
                Ok(d) if d == goal.descriptor => {}
                Ok(d) if d == goal.descriptor.opposite() => wrong.push(goal.unit),
                _ => return false,
            }
        }
        if wrong.is_empty() {
            return true;
        }
        for unit in wrong {
            flip(configurations, unit);
        }
    }
    false
}

/// Tries every combination, those near the start first.
fn try_all(
    ranker: &Ranker<'_>,
    start: Vec<Configuration>,
    goals: &[Goal],
) -> Result<Vec<Configuration>, SearchError> {
    let all = || goals.iter().map(|g| g.unit).collect::<Vec<_>>();
    if goals.len() > LARGEST_GROUP {
        return Err(SearchError::TooMany(all()));
    }
    let mut order: Vec<u32> = (0..1u32 << goals.len()).collect();
    order.sort_by_key(|flips| flips.count_ones());
    let mut seen: Vec<Vec<Descriptor>> = vec![Vec::new(); goals.len()];
    for flips in order {
        let mut configurations = start.clone();
        for (i, goal) in goals.iter().enumerate() {
            if flips & (1 << i) != 0 {
                flip(&mut configurations, goal.unit);
            }
        }
        let mut good = true;
        let labels = ranker.label_defined(&configurations);
        for (goal, seen) in goals.iter().zip(&mut seen) {
            match letter(&labels, goal.unit) {
                Ok(d) => {
                    good &= d == goal.descriptor;
                    if !seen.contains(&d) {
                        seen.push(d);
                    }
                }
                Err(Missing::Stopped(stop)) => return Err(SearchError::Stopped(goal.unit, stop)),
                Err(_) => good = false,
            }
        }
        if good {
            return Ok(configurations);
        }
    }
    for (goal, seen) in goals.iter().zip(&seen) {
        match seen.first() {
            None => return Err(SearchError::Alike(goal.unit)),
            Some(d) if !seen.contains(&goal.descriptor) => {
                return Err(SearchError::OtherLetter(goal.unit, *d));
            }
            Some(_) => {}
        }
    }
    Err(SearchError::Conflict(all()))
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::cip::Limits;
    use crate::molecule::Molecule;
    use crate::molecule::tests::build;
    use crate::perceive::Rings;
    use crate::stereo::Units;

    fn with_search(
        molecule: &Molecule,
        goals: &[(usize, char)],
    ) -> Result<Vec<Option<Descriptor>>, SearchError> {
        let rings = Rings::find(molecule);
        let units = Units::find(molecule, &rings);
        let ranker = Ranker::new(molecule, &rings, &units, Limits::default());
        let goals: Vec<Goal> = goals
            .iter()
            .map(|(atom, letter)| Goal {
                unit: units
                    .center_at(crate::molecule::AtomIx::new(*atom))
                    .unwrap(),
                descriptor: Descriptor::from_letter(*letter).unwrap(),
            })
            .collect();
        let start = vec![Configuration::Open; units.len()];
        let found = search(&ranker, &start, &goals)?;
        Ok(goals
            .iter()
            .map(|g| letter(&ranker.label_defined(&found), g.unit).ok())
            .collect())
    }

    /// Pentane-2,3,4-triol: 2 and 4 rank by constitution, 3 by their letters.
    fn triol() -> Molecule {
        build(
            &["C", "C", "C", "C", "C", "O", "O", "O"],
            &[
                (0, 1, 1),
                (1, 2, 1),
                (2, 3, 1),
                (3, 4, 1),
                (1, 5, 1),
                (2, 6, 1),
                (3, 7, 1),
            ],
        )
    }

    // IUPAC 2013 recommendations, P-93.1.1: a pseudoasymmetric center between an R and an S center
    #[test]
    fn pseudoasymmetric_centers_follow_their_neighbors() {
        for middle in ['r', 's'] {
            let carried = with_search(&triol(), &[(1, 'R'), (2, middle), (3, 'S')]).unwrap();
            assert_eq!(carried[1].map(Descriptor::letter), Some(middle));
        }
    }

    #[test]
    fn the_middle_of_equal_centers_carries_nothing() {
        assert!(matches!(
            with_search(&triol(), &[(1, 'R'), (2, 'r'), (3, 'R')]),
            Err(SearchError::Alike(_))
        ));
        assert!(matches!(
            with_search(&triol(), &[(1, 'R'), (2, 'R'), (3, 'S')]),
            Err(SearchError::OtherLetter(
                _,
                Descriptor::LowerR | Descriptor::LowerS
            ))
        ));
    }

    // 4-methylcyclohexan-1-ol: r,r and s,s exist, r,s does not
    #[test]
    fn letters_of_a_ring_go_together() {
        let ring = build(
            &["C", "C", "C", "C", "C", "C", "O", "C"],
            &[
                (0, 1, 1),
                (1, 2, 1),
                (2, 3, 1),
                (3, 4, 1),
                (4, 5, 1),
                (5, 0, 1),
                (0, 6, 1),
                (3, 7, 1),
            ],
        );
        for both in ['r', 's'] {
            let carried = with_search(&ring, &[(0, both), (3, both)]).unwrap();
            assert!(
                carried
                    .iter()
                    .all(|d| d.map(Descriptor::letter) == Some(both))
            );
        }
        assert!(matches!(
            with_search(&ring, &[(0, 'r'), (3, 's')]),
            Err(SearchError::Conflict(units)) if units.len() == 2
        ));
    }
}
