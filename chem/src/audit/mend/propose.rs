//! The mends of one finding, by its kind.

use super::super::case::Case;
use super::super::findings::free_spots;
use super::super::words::{self, n};
use super::super::{Finding, Grade, Kind, Mend};
use super::centre::{self, REACHES};
use super::check::Check;
use super::double;
use crate::drawing::{Edit, Mark};
use crate::molecule::{AtomIx, BondIx};
use crate::stereo::{Configuration, Focus, Kind as UnitKind, Parity, UnitIx};
use crate::wedge;

/// Candidates that are tried for one mend; each costs a reading of the drawing.
const MOST_TRIES: usize = 48;

/// The mends of finding `i`, each tried.
pub(in super::super) fn proposals(case: &Case<'_>, all: &[Finding], i: usize) -> Vec<Mend> {
    if !case.is_flat() {
        return Vec::new();
    }
    let check = Check {
        case,
        before: all,
        finding: &all[i],
    };
    let proposer = Proposer { case, check };
    match all[i].kind {
        Kind::Valence | Kind::NotStereogenic | Kind::ImpossibleGeometry => Vec::new(),
        Kind::IdleMark => proposer.without_mark(),
        Kind::CrossedDoubleBond if all[i].grade == Grade::PoorStyle => proposer.wavy_for_crossed(),
        Kind::EitherMark if all[i].grade == Grade::Unclear => proposer.wavy_elsewhere(),
        Kind::StraightDoubleBond if all[i].grade == Grade::PoorStyle => proposer.swing(),
        Kind::CrowdedHydrogen => proposer.hydrogen_elsewhere(),
        Kind::SingleMark if all[i].bonds.len() == 2 => proposer.second_mark(),
        Kind::BetweenCentres
        | Kind::SurplusMarks
        | Kind::RingBond
        | Kind::OneSided
        | Kind::ShortBond
        | Kind::Reentrant
        | Kind::StraightAngle
        | Kind::SingleMark => proposer.redraw_or_set(),
        _ => proposer.set(),
    }
}

struct Proposer<'c, 'a> {
    case: &'c Case<'a>,
    check: Check<'c, 'a>,
}

impl Proposer<'_, '_> {
    fn finding(&self) -> &Finding {
        self.check.finding
    }

    /// The unit that the finding is about.
    fn unit(&self) -> Option<UnitIx> {
        let atoms = &self.finding().atoms;
        let first = *atoms.first()?;
        let pair = |u: &crate::stereo::Unit| match u.focus {
            Focus::Pair(ends) => atoms.len() >= 2 && ends.iter().all(|e| atoms[..2].contains(e)),
            Focus::Center(_) => false,
        };
        self.case
            .units()
            .iter()
            .find(|(_, u)| pair(u))
            .map(|(ix, _)| ix)
            .or_else(|| self.case.center(first))
    }

    fn unchanged(&self) -> Vec<Configuration> {
        self.case.reading.configurations().to_vec()
    }

    /// The first candidate that holds.
    fn first(&self, ways: Vec<Vec<Edit>>, wanted: &[Configuration]) -> Option<Vec<Edit>> {
        let mut tried: Vec<Vec<Edit>> = Vec::new();
        for edits in ways {
            if edits.is_empty() || tried.contains(&edits) {
                continue;
            }
            if tried.len() >= MOST_TRIES {
                return None;
            }
            if self.check.holds(&edits, wanted) {
                return Some(edits);
            }
            tried.push(edits);
        }
        None
    }

    fn keeping(&self, ways: Vec<Vec<Edit>>) -> Vec<Mend> {
        let edits = self.first(ways, &self.unchanged());
        edits
            .map(|e| self.mend(true, false, "", e))
            .into_iter()
            .collect()
    }

    fn mend(&self, keeps: bool, meets: bool, purpose: &str, edits: Vec<Edit>) -> Mend {
        Mend {
            keeps_meaning: keeps,
            meets_requirement: meets,
            text: format!("{purpose}{}", describe(self.case, &edits)),
            edits,
        }
    }

    /// A centre that reads: the same configuration, drawn better. One that does not: set.
    fn redraw_or_set(&self) -> Vec<Mend> {
        let Some(ix) = self.unit() else {
            return Vec::new();
        };
        let Configuration::Defined(parity) = self.case.reading.configuration(ix) else {
            return self.set();
        };
        let wanted = self.unchanged();
        REACHES
            .iter()
            .find_map(|reach| self.first(centre::ways(self.case, ix, parity, *reach), &wanted))
            .map(|edits| self.mend(true, false, "", edits))
            .into_iter()
            .collect()
    }

    /// Sets the unit: as the requirement asks, or each of its two ways for a person to choose.
    fn set(&self) -> Vec<Mend> {
        let Some(ix) = self.unit() else {
            return Vec::new();
        };
        if self.case.wanted[ix.index()].is_some() {
            let Some(Configuration::Defined(parity)) =
                self.case.solved().map(|all| all[ix.index()])
            else {
                return Vec::new();
            };
            return self.set_to(ix, parity, true).into_iter().collect();
        }
        [Parity::Even, Parity::Odd]
            .into_iter()
            .filter_map(|parity| self.set_to(ix, parity, false))
            .collect()
    }

    fn set_to(&self, ix: UnitIx, parity: Parity, meets: bool) -> Option<Mend> {
        let mut wanted = self.unchanged();
        wanted[ix.index()] = Configuration::Defined(parity);
        let unit = self.case.units().get(ix);
        let edits = match unit.kind {
            UnitKind::Tetrahedral => REACHES
                .iter()
                .find_map(|reach| self.first(centre::ways(self.case, ix, parity, *reach), &wanted)),
            UnitKind::DoubleBond => self.first(double::turned(self.case, ix, parity), &wanted),
            UnitKind::CumulatedAxis | UnitKind::HinderedAxis | UnitKind::Helix => {
                let case = self.case;
                let edits =
                    wedge::place_axis(case.drawing, case.units(), case.rings(), unit, parity);
                self.first(edits.into_iter().collect(), &wanted)
            }
        }?;
        let letter = match self.case.wanted[ix.index()] {
            Some(d) if meets => Some(d),
            _ => self.case.ranker.letter_by_constitution(ix, parity),
        };
        let purpose = match letter {
            Some(d) => format!("draw {} as {d}: ", words::unit(unit)),
            None => format!("define {}: ", words::unit(unit)),
        };
        Some(self.mend(false, meets, &purpose, edits))
    }

    /// Takes an idle mark away. On a multiple bond of a centre some programs read it: that needs a yes.
    fn without_mark(&self) -> Vec<Mend> {
        let Some(bond) = self.finding().bonds.first().copied() else {
            return Vec::new();
        };
        let b = self.case.molecule().bond(bond);
        let multiple = b.order.pairs() > 1 && b.ends.iter().any(|a| self.case.is_stereocenter(*a));
        let edits = vec![Edit::Mark(bond, Mark::Plain)];
        if multiple {
            let holds = self.check.holds(&edits, &self.unchanged());
            return holds
                .then(|| self.mend(false, false, "", edits))
                .into_iter()
                .collect();
        }
        self.keeping(vec![edits])
    }

    fn wavy_for_crossed(&self) -> Vec<Mend> {
        let Some(bond) = self.finding().bonds.first().copied() else {
            return Vec::new();
        };
        let unit = self
            .unit()
            .filter(|ix| self.case.units().get(*ix).kind == UnitKind::DoubleBond);
        self.keeping(double::wavy_for_crossed(self.case, bond, unit))
    }

    fn swing(&self) -> Vec<Mend> {
        let unit = self.unit();
        self.keeping(
            unit.map(|ix| double::swung(self.case, ix))
                .unwrap_or_default(),
        )
    }

    fn second_mark(&self) -> Vec<Mend> {
        let case = self.case;
        let [first, second] = [self.finding().bonds[0], self.finding().bonds[1]];
        let mark = case.drawing.mark(first);
        let Some(end) = mark.narrow() else {
            return Vec::new();
        };
        let narrow = case.molecule().bond(first).ends[end.index()];
        let end = case.drawing.end_at(second, narrow);
        let other = match mark {
            Mark::Solid(_) => Mark::Hashed(end),
            _ => Mark::Solid(end),
        };
        let mends = self.keeping(vec![vec![Edit::Mark(second, other)]]);
        if mends.is_empty() {
            return self.redraw_or_set();
        }
        mends
    }

    /// A wavy bond between two places moved to a bond that only one of them has; one that starts nowhere
    /// made plain, or made to say what it seems to say.
    fn wavy_elsewhere(&self) -> Vec<Mend> {
        let case = self.case;
        let Some(bond) = self.finding().bonds.first().copied() else {
            return Vec::new();
        };
        let mark = case.drawing.mark(bond);
        let Some(end) = mark.narrow() else {
            return Vec::new();
        };
        let narrow = case.molecule().bond(bond).ends[end.index()];
        let ways = case
            .molecule()
            .neighbors(narrow)
            .iter()
            .filter(|m| case.is_free(narrow, m.bond) && !case.is_double_end(m.atom))
            .map(|m| {
                let wavy = Mark::Wavy(case.drawing.end_at(m.bond, narrow));
                vec![Edit::Mark(bond, Mark::Plain), Edit::Mark(m.bond, wavy)]
            })
            .collect();
        let mut mends = self.keeping(ways);
        if mends.is_empty() {
            let plain = vec![Edit::Mark(bond, Mark::Plain)];
            mends.extend(self.if_held(plain));
            let turned = vec![Edit::Mark(bond, mark.at(end.other()))];
            mends.extend(self.if_held(turned));
        }
        mends
    }

    /// A change that keeps what is defined but not what is unknown: for a person to choose.
    fn if_held(&self, edits: Vec<Edit>) -> Option<Mend> {
        let (after, _) = self.case.drawing.apply(&edits).ok()?;
        let wanted = wedge::read(&after, self.case.units())
            .configurations()
            .to_vec();
        let holds = self.check.holds(&edits, &wanted);
        holds.then(|| self.mend(false, false, "", edits))
    }

    /// The drawn hydrogen put into a freer gap; its mark follows.
    fn hydrogen_elsewhere(&self) -> Vec<Mend> {
        let case = self.case;
        let (Some(center), Some(bond)) = (
            self.finding().atoms.first().copied(),
            self.finding().bonds.first().copied(),
        ) else {
            return Vec::new();
        };
        let hydrogen = case.molecule().bond(bond).other(center);
        let ways = free_spots(case, center, hydrogen)
            .into_iter()
            .flat_map(|spot| {
                let moved = Edit::Move(hydrogen, spot);
                let other = Edit::Mark(bond, exchanged(case.drawing.mark(bond)));
                [vec![moved.clone()], vec![moved, other]]
            })
            .collect();
        self.keeping(ways)
    }
}

fn exchanged(mark: Mark) -> Mark {
    match mark {
        Mark::Solid(end) => Mark::Hashed(end),
        Mark::Hashed(end) => Mark::Solid(end),
        Mark::Plain | Mark::Wavy(_) | Mark::Crossed => mark,
    }
}

/// A change in words: `make the bond 3-7 a solid wedge; move atom 8 with its branch`.
fn describe(case: &Case<'_>, edits: &[Edit]) -> String {
    let mut words = Vec::new();
    let moved: Vec<AtomIx> = edits
        .iter()
        .filter_map(|e| match e {
            Edit::Move(a, _) => Some(*a),
            _ => None,
        })
        .collect();
    let known = |b: BondIx| b.index() < case.molecule().n_bonds();
    for edit in edits {
        match edit {
            Edit::Mark(b, mark) if known(*b) => {
                let [p, q] = case.molecule().bond(*b).ends;
                let (from, to) = match mark.narrow() {
                    Some(end) if end.index() == 1 => (q, p),
                    _ => (p, q),
                };
                words.push(match mark {
                    Mark::Plain => format!("make the bond {}-{} plain", n(from), n(to)),
                    _ => format!(
                        "make the bond from atom {} to atom {} a {}",
                        n(from),
                        n(to),
                        words::mark(*mark)
                    ),
                });
            }
            Edit::AddBond(ends, _) => {
                words.push(format!(
                    "draw the hydrogen of atom {} with the mark",
                    n(ends[0])
                ));
            }
            _ => {}
        }
    }
    match moved.as_slice() {
        [] => {}
        [only] => words.push(format!("move atom {}", n(*only))),
        [first, rest @ ..] => words.push(format!(
            "move atom {} with {} more of its branch",
            n(*first),
            rest.len()
        )),
    }
    words.join("; ")
}
