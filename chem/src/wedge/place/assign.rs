//! The least-cost assignment of centres to bonds: exact, by augmenting along cheapest paths.

use super::option::{Choice, Site};

/// What an option uses up: a bond, or the centre's own free hand (nobody else wants that).
fn resource(site: usize, choice: Choice, n_bonds: usize) -> usize {
    match choice {
        Choice::Bond { bond, .. } => bond.index(),
        Choice::Hydrogen => n_bonds + site,
    }
}

/// The option chosen for each site so that no bond serves two, at least total cost; ties go to the
/// option that comes first.
///
/// # Errors
/// The index of a site for which no bond is left.
pub(super) fn assign(sites: &[Site], n_bonds: usize) -> Result<Vec<usize>, usize> {
    let mut holder: Vec<Option<usize>> = vec![None; n_bonds + sites.len()];
    let mut chosen: Vec<Option<usize>> = vec![None; sites.len()];
    for site in 0..sites.len() {
        augment(sites, n_bonds, &mut holder, &mut chosen, site)?;
    }
    chosen
        .into_iter()
        .enumerate()
        .map(|(i, c)| c.ok_or(i))
        .collect()
}

/// A step of a path: `site` takes `option`, which frees or uses a resource.
#[derive(Clone, Copy)]
struct Reached {
    cost: i64,
    by: usize,
    option: usize,
}

/// Finds the cheapest chain "new site takes a bond, its holder moves to another, ..." that ends at a
/// free bond (Bellman-Ford: moving away from a bond gives its cost back), and carries it out.
fn augment(
    sites: &[Site],
    n_bonds: usize,
    holder: &mut [Option<usize>],
    chosen: &mut [Option<usize>],
    start: usize,
) -> Result<(), usize> {
    let mut reached: Vec<Option<Reached>> = vec![None; holder.len()];
    let mut cost_at_site: Vec<Option<i64>> = vec![None; sites.len()];
    cost_at_site[start] = Some(0);
    // no cheapest path has more steps than there are sites
    for _ in 0..=sites.len() {
        let mut changed = false;
        for (i, site) in sites.iter().enumerate() {
            let Some(so_far) = cost_at_site[i] else {
                continue;
            };
            for (o, option) in site.options.iter().enumerate() {
                if chosen[i] == Some(o) {
                    continue;
                }
                let r = resource(i, option.choice, n_bonds);
                let cost = so_far + option.cost;
                if reached[r].is_some_and(|known| known.cost <= cost) {
                    continue;
                }
                reached[r] = Some(Reached {
                    cost,
                    by: i,
                    option: o,
                });
                changed = true;
                if let Some(other) = holder[r]
                    && other != i
                {
                    let given_back = chosen[other].map_or(0, |c| sites[other].options[c].cost);
                    let moved = cost - given_back;
                    if cost_at_site[other].is_none_or(|known| moved < known) {
                        cost_at_site[other] = Some(moved);
                    }
                }
            }
        }
        if !changed {
            break;
        }
    }
    let end = (0..holder.len())
        .filter(|r| holder[*r].is_none())
        .filter_map(|r| reached[r].map(|at| (at.cost, r)))
        .min()
        .map(|(_, r)| r)
        .ok_or(start)?;
    let mut r = end;
    // walks the chain back; it is no longer than the number of sites
    for _ in 0..=sites.len() {
        let Some(step) = reached[r] else {
            return Err(start);
        };
        let before =
            chosen[step.by].map(|c| resource(step.by, sites[step.by].options[c].choice, n_bonds));
        holder[r] = Some(step.by);
        chosen[step.by] = Some(step.option);
        if step.by == start {
            return Ok(());
        }
        match before {
            Some(previous) => r = previous,
            None => return Err(start),
        }
    }
    Err(start)
}

#[cfg(test)]
mod tests {
    use super::super::option::Candidate;
    use super::*;
    use crate::molecule::{AtomIx, BondIx};
    use crate::stereo::{Ligand, Parity};

    fn site(options: &[(Option<usize>, i64)]) -> Site {
        Site {
            center: AtomIx::new(0),
            parity: Parity::Even,
            ligands: [Ligand::Hydrogen; 4],
            options: options
                .iter()
                .map(|(bond, cost)| Candidate {
                    choice: match bond {
                        Some(b) => Choice::Bond {
                            bond: BondIx::new(*b),
                            lift: true,
                            second: None,
                        },
                        None => Choice::Hydrogen,
                    },
                    cost: *cost,
                })
                .collect(),
        }
    }

    fn total(sites: &[Site], chosen: &[usize]) -> i64 {
        sites
            .iter()
            .zip(chosen)
            .map(|(s, c)| s.options[*c].cost)
            .sum()
    }

    /// Tries every combination.
    fn brute(sites: &[Site], n_bonds: usize) -> Option<i64> {
        fn go(sites: &[Site], n_bonds: usize, i: usize, used: &mut Vec<usize>) -> Option<i64> {
            if i == sites.len() {
                return Some(0);
            }
            let mut best = None;
            for option in &sites[i].options {
                let r = resource(i, option.choice, n_bonds);
                if used.contains(&r) {
                    continue;
                }
                used.push(r);
                if let Some(rest) = go(sites, n_bonds, i + 1, used) {
                    let cost = rest + option.cost;
                    best = Some(best.map_or(cost, |b: i64| b.min(cost)));
                }
                used.pop();
            }
            best
        }
        go(sites, n_bonds, 0, &mut Vec::new())
    }

    #[test]
    fn the_minimum_is_exact() {
        // a small linear congruential sequence: the same cases every time
        let mut seed = 12345u64;
        let mut next = |n: u64| {
            seed = seed.wrapping_mul(6_364_136_223_846_793_005).wrapping_add(1);
            (seed >> 33) % n
        };
        let mut solved = 0;
        for _ in 0..500 {
            let sites: Vec<Site> = (0..2 + next(4))
                .map(|_| {
                    let options: Vec<_> = (0..1 + next(3))
                        .map(|_| {
                            let bond = (next(5) > 0).then(|| next(5) as usize);
                            (bond, next(50) as i64 - 10)
                        })
                        .collect();
                    site(&options)
                })
                .collect();
            match (assign(&sites, 5), brute(&sites, 5)) {
                (Ok(chosen), Some(best)) => {
                    assert_eq!(total(&sites, &chosen), best);
                    solved += 1;
                }
                (Err(_), None) => {}
                (found, best) => panic!("{found:?} against {best:?}"),
            }
        }
        assert!(solved > 100);
    }
}
