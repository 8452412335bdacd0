//! Ways to draw a centre: marks alone, a drawn hydrogen, a ligand moved. Which kind of mark says what is not
//! worked out here: both are tried and read.

use super::super::case::Case;
use super::super::findings::is_crowded;
use super::ligand;
use crate::drawing::{Edit, Mark};
use crate::element::Element;
use crate::geom;
use crate::molecule::{Atom, AtomIx, BondIx, Order};
use crate::stereo::{Focus, Ligand, Parity, UnitIx};
use crate::wedge::{self, Pattern, Target};

/// How far a change goes.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Reach {
    Marks,
    Hydrogen,
    Move,
}

pub(super) const REACHES: [Reach; 3] = [Reach::Marks, Reach::Hydrogen, Reach::Move];

/// Changes after which a centre may read as `parity`, the least first.
pub(super) fn ways(case: &Case<'_>, ix: UnitIx, parity: Parity, reach: Reach) -> Vec<Vec<Edit>> {
    let Focus::Center(center) = case.units().get(ix).focus else {
        return Vec::new();
    };
    match reach {
        Reach::Marks => marks(case, ix, center, parity),
        Reach::Hydrogen => hydrogens(case, ix, center, parity),
        Reach::Move => moves(case, ix, center, parity),
    }
}

/// The bonds of a centre with the marks that are narrow there.
fn own(case: &Case<'_>, center: AtomIx) -> Vec<(BondIx, Mark)> {
    case.molecule()
        .neighbors(center)
        .iter()
        .map(|n| (n.bond, case.drawing.mark_from(center, n.bond)))
        .filter(|(_, mark)| *mark != Mark::Plain)
        .collect()
}

/// Gives a centre exactly these marks.
fn with_marks(case: &Case<'_>, center: AtomIx, marks: &[(BondIx, Mark)]) -> Vec<Edit> {
    let mut edits: Vec<Edit> = own(case, center)
        .into_iter()
        .filter(|(b, _)| marks.iter().all(|(m, _)| m != b))
        .map(|(b, _)| Edit::Mark(b, Mark::Plain))
        .collect();
    edits.extend(
        marks
            .iter()
            .filter(|(b, mark)| case.drawing.mark(*b) != *mark)
            .map(|(b, mark)| Edit::Mark(*b, *mark)),
    );
    edits
}

fn flipped(mark: Mark) -> Mark {
    match mark {
        Mark::Solid(end) => Mark::Hashed(end),
        Mark::Hashed(end) => Mark::Solid(end),
        Mark::Plain | Mark::Wavy(_) | Mark::Crossed => mark,
    }
}

fn is_wedge(mark: Mark) -> bool {
    matches!(mark, Mark::Solid(_) | Mark::Hashed(_))
}

/// Marks alone: the centre's own exchanged or thinned out; a wedge that is wide here turned round; a second
/// one added; what placing would choose; any one bond.
fn marks(case: &Case<'_>, ix: UnitIx, center: AtomIx, parity: Parity) -> Vec<Vec<Edit>> {
    let own: Vec<(BondIx, Mark)> = own(case, center)
        .into_iter()
        .filter(|(_, m)| is_wedge(*m))
        .collect();
    let single = |b: &BondIx| case.molecule().bond(*b).order == Order::Single;
    let own: Vec<(BondIx, Mark)> = own.into_iter().filter(|(b, _)| single(b)).collect();
    let mut ways = Vec::new();
    if !own.is_empty() {
        ways.push(own.clone());
        ways.push(own.iter().map(|(b, m)| (*b, flipped(*m))).collect());
    }
    for n in case.molecule().neighbors(center) {
        let mark = case.drawing.mark(n.bond);
        let wide_here = is_wedge(mark) && case.drawing.mark_from(center, n.bond) == Mark::Plain;
        let keeps_other = case.center(n.atom).is_some_and(|ix| case.is_readable(ix));
        if wide_here && !keeps_other && n.order == Order::Single {
            let turned = mark.at(case.drawing.end_at(n.bond, center));
            ways.push(vec![(n.bond, turned)]);
            ways.push(vec![(n.bond, flipped(turned))]);
        }
    }
    if own.len() > 1 {
        for (b, m) in &own {
            ways.push(vec![(*b, *m)]);
        }
        for (b, m) in &own {
            ways.push(vec![(*b, flipped(*m))]);
        }
    }
    let mut list: Vec<Vec<Edit>> = ways.iter().map(|w| with_marks(case, center, w)).collect();
    list.extend(placed(case, ix, parity).filter(|edits| !adds(edits)));
    let free: Vec<BondIx> = case
        .molecule()
        .neighbors(center)
        .iter()
        .map(|n| n.bond)
        .filter(|b| case.is_free(center, *b))
        .collect();
    let mut more = Vec::new();
    for (b, m) in own.iter().take(1) {
        for second in free.iter().filter(|f| *f != b) {
            let end = case.drawing.end_at(*second, center);
            more.push(vec![(*b, *m), (*second, flipped(*m).at(end))]);
        }
    }
    for b in &free {
        let end = case.drawing.end_at(*b, center);
        more.push(vec![(*b, Mark::Solid(end))]);
        more.push(vec![(*b, Mark::Hashed(end))]);
    }
    list.extend(more.iter().map(|w| with_marks(case, center, w)));
    list
}

fn adds(edits: &[Edit]) -> bool {
    edits.iter().any(|e| matches!(e, Edit::AddAtom(..)))
}

/// What placing would choose.
fn placed(case: &Case<'_>, ix: UnitIx, parity: Parity) -> std::option::IntoIter<Vec<Edit>> {
    let target = [Target { unit: ix, parity }];
    wedge::place(case.drawing, case.units(), case.rings(), &target)
        .ok()
        .into_iter()
}

/// A hydrogen drawn to bear the mark, in the widest gap that has room for it.
fn hydrogens(case: &Case<'_>, ix: UnitIx, center: AtomIx, parity: Parity) -> Vec<Vec<Edit>> {
    let mut list: Vec<Vec<Edit>> = placed(case, ix, parity).filter(|e| adds(e)).collect();
    if case.units().get(ix).ligands[3] != Ligand::Hydrogen || !case.is_flat() {
        return list;
    }
    let drawing = case.drawing;
    let directions: Vec<_> = case
        .molecule()
        .neighbors(center)
        .iter()
        .filter_map(|n| drawing.direction(center, n.atom))
        .collect();
    let mut gaps = geom::gaps(&directions);
    gaps.sort_by(|a, b| b.1.total_cmp(&a.1));
    for (middle, wide) in gaps {
        let length = 0.75 * drawing.bond_length();
        let spot = drawing.point(center) + geom::unit(middle) * length;
        let near = |a: AtomIx| drawing.point(a).distance(spot) < 0.4 * drawing.bond_length();
        let taken = case.molecule().atoms().any(|a| a != center && near(a));
        if wide < 0.5 || taken || is_crowded(case, center, spot) {
            continue;
        }
        let h = AtomIx::new(case.molecule().n_atoms());
        let bond = BondIx::new(case.molecule().n_bonds());
        for mark in [
            Mark::Solid(crate::drawing::End::First),
            Mark::Hashed(crate::drawing::End::First),
        ] {
            let mut edits = with_marks(case, center, &[]);
            edits.push(Edit::AddAtom(Atom::new(Element::H), spot));
            edits.push(Edit::AddBond([center, h], Order::Single));
            edits.push(Edit::Mark(bond, mark));
            list.push(edits);
        }
    }
    list
}

/// One ligand moved, and the marks that then say the same.
fn moves(case: &Case<'_>, ix: UnitIx, center: AtomIx, parity: Parity) -> Vec<Vec<Edit>> {
    let mut list = Vec::new();
    for moved in ligand::moves(case, center) {
        let own = own(case, center);
        list.push(moved.clone());
        let mut exchanged = moved.clone();
        exchanged.extend(
            own.iter()
                .filter(|(_, m)| is_wedge(*m))
                .map(|(b, m)| Edit::Mark(*b, flipped(*m))),
        );
        list.push(exchanged);
        let Ok((drawing, _)) = case.drawing.apply(&moved) else {
            continue;
        };
        // a place that cannot be marked where it stands now may be placed after the move
        if Pattern::of(&drawing, center).is_err() {
            continue;
        }
        let target = [Target { unit: ix, parity }];
        if let Ok(edits) = wedge::place(&drawing, case.units(), case.rings(), &target)
            && !adds(&edits)
        {
            let mut both = moved.clone();
            both.extend(edits);
            list.push(both);
        }
    }
    list
}
