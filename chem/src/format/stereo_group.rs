//! Stereo groups: which of the drawn configurations are claimed, and in what way.
//!
//! Source: CTfile Formats (2016), stereo collections of V3000, as open readers quote it. V2000 has no
//! place for them.

use crate::drawing::Renumbering;
use crate::molecule::AtomIx;
use std::fmt;

/// What a stereo group claims of its places. The drawing shows one configuration of each; the three
/// kinds make three different claims of it.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum GroupKind {
    /// The substance has the configurations that are drawn, in space as on paper (`STEABS`).
    Absolute,
    /// The substance is a mixture: molecules as drawn and molecules in which all places of the group are
    /// inverted together, both present; in what ratio is not said (`STERACn`, a racemate if all places
    /// are in one such group). The number tells groups apart; each inverts by itself.
    And(u32),
    /// The substance is one kind of molecule: either as drawn or with all places of the group inverted
    /// together; which of the two is not known (`STERELn`, relative configuration). The number tells
    /// groups apart.
    Or(u32),
}

impl fmt::Display for GroupKind {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            GroupKind::Absolute => f.write_str("abs"),
            GroupKind::And(n) => write!(f, "&{n}"),
            GroupKind::Or(n) => write!(f, "or{n}"),
        }
    }
}

/// A stereo group of a record: kept and written back, acted on by nobody. Labels tell the isomer that
/// is drawn, whatever its groups claim.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct StereoGroup {
    /// What it claims.
    pub kind: GroupKind,
    /// The atoms at its places, in the order of the file, none twice. They may hold no configuration
    /// at all: that is for the reader of the group to see.
    pub atoms: Vec<AtomIx>,
}

/// Atoms and groups that a message names; it counts the others.
const SHOWN: usize = 12;

impl StereoGroup {
    /// Groups for a message.
    pub(super) fn list(groups: &[StereoGroup]) -> String {
        let shown: Vec<String> = groups.iter().take(SHOWN).map(ToString::to_string).collect();
        let more = match groups.len().checked_sub(SHOWN) {
            Some(more @ 1..) => format!(" and {more} more"),
            _ => String::new(),
        };
        shown.join(", ") + &more
    }

    /// The group after its drawing was changed; `None` if no atom of it is left.
    pub fn renumbered(&self, map: &Renumbering) -> Option<StereoGroup> {
        let atoms: Vec<AtomIx> = self.atoms.iter().filter_map(|a| map.atom(*a)).collect();
        (!atoms.is_empty()).then_some(StereoGroup {
            kind: self.kind,
            atoms,
        })
    }
}

/// `&1 (atoms 3, 7)`: the kind as chemists write it, atoms from 1.
impl fmt::Display for StereoGroup {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        let word = if self.atoms.len() == 1 {
            "atom"
        } else {
            "atoms"
        };
        write!(f, "{} ({word} ", self.kind)?;
        for (i, a) in self.atoms.iter().take(SHOWN).enumerate() {
            let comma = if i > 0 { ", " } else { "" };
            write!(f, "{comma}{}", a.index() + 1)?;
        }
        if let Some(more @ 1..) = self.atoms.len().checked_sub(SHOWN) {
            write!(f, " and {more} more")?;
        }
        f.write_str(")")
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::drawing::Edit;
    use crate::drawing::tests::draw;

    fn group(kind: GroupKind, atoms: &[usize]) -> StereoGroup {
        StereoGroup {
            kind,
            atoms: atoms.iter().map(|a| AtomIx::new(*a)).collect(),
        }
    }

    #[test]
    fn groups_follow_their_atoms() {
        let chain = draw(
            &[("C", 0.0, 0.0), ("C", 1.0, 0.5), ("O", 2.0, 0.0)],
            &[(0, 1, 1, ' '), (1, 2, 1, ' ')],
        );
        let (_, map) = chain.apply(&[Edit::RemoveAtom(AtomIx::new(1))]).unwrap();
        let kept = group(GroupKind::And(2), &[2, 1, 0]).renumbered(&map);
        assert_eq!(kept, Some(group(GroupKind::And(2), &[1, 0])));
        assert_eq!(group(GroupKind::Absolute, &[1]).renumbered(&map), None);
    }

    #[test]
    fn groups_are_named_as_chemists_write_them() {
        let text = |kind, atoms: &[usize]| group(kind, atoms).to_string();
        assert_eq!(text(GroupKind::Absolute, &[0]), "abs (atom 1)");
        assert_eq!(text(GroupKind::And(1), &[2, 6]), "&1 (atoms 3, 7)");
        let many: Vec<usize> = (0..15).collect();
        assert!(text(GroupKind::Or(3), &many).ends_with("12 and 3 more)"));
        let groups: Vec<StereoGroup> = (1..=14)
            .map(|n| group(GroupKind::And(n), &[n as usize]))
            .collect();
        assert!(StereoGroup::list(&groups).ends_with("&12 (atom 13) and 2 more"));
    }
}
