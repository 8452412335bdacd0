//! What findings rest on, and where each clause is known from.

/// Where a clause, or a grade, is known from.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Source {
    /// The abstract or principal recommendations of the document itself.
    Read,
    /// The section's content as people quote it who had it open.
    Quoted,
    /// The InChI technical manual, read.
    Manual,
    /// Memory: the text could not be read.
    Memory,
    /// Follows from another rule.
    Inferred,
    /// The requirement, or the drawing itself.
    Given,
}

impl Source {
    /// In words.
    pub fn words(self) -> &'static str {
        match self {
            Source::Read => "read in the document",
            Source::Quoted => "as quoted by its readers",
            Source::Manual => "read in the InChI technical manual",
            Source::Memory => "from memory",
            Source::Inferred => "inferred from other rules",
            Source::Given => "follows from what was given",
        }
    }
}

/// A clause with its provenance.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Clause {
    /// Its number or name.
    pub name: &'static str,
    /// Where the rule is known from.
    pub source: Source,
    /// Where the grade is known from.
    pub grade: Source,
}

const fn clause(name: &'static str, source: Source, grade: Source) -> Clause {
    Clause {
        name,
        source,
        grade,
    }
}

use Source::{Given, Inferred, Manual, Memory, Quoted, Read};

/// The requirement itself.
pub(super) const REQUIREMENT: Clause = clause("requirement", Given, Given);
/// Narrow end at the centre.
pub(super) const NARROW_END: Clause = clause("IUPAC 2006, abstract", Read, Inferred);
/// No stereobond between centres.
pub(super) const BETWEEN: Clause = clause("ST-0.5", Quoted, Read);
/// Wavy bonds.
pub(super) const WAVY: Clause = clause("ST-0.4", Quoted, Inferred);
/// An either-bond cancels the wedges of its atom.
pub(super) const WAVY_AND_WEDGE: Clause = clause("CTfile guide, stereo bonds", Quoted, Quoted);
/// Plain bonds state nothing.
pub(super) const PLAIN: Clause = clause("ST-1", Memory, Memory);
/// A mark at an atom that is no centre.
pub(super) const IDLE: Clause = clause("ST-1", Memory, Memory);
/// Marks on two or three drawn bonds.
pub(super) const TOO_FEW_BONDS: Clause = clause("ST-1", Inferred, Quoted);
/// Solid and hashed for four drawn bonds.
pub(super) const FOUR: Clause = clause("ST-1.2", Quoted, Memory);
/// Patterns of marks on four drawn bonds.
pub(super) const FOUR_MARKS: Clause = clause("InChI manual, table 9", Manual, Manual);
/// Patterns of marks on three drawn bonds.
pub(super) const THREE_MARKS: Clause = clause("InChI manual, table 10", Manual, Manual);
/// Unlike marks on three bonds.
pub(super) const THREE_UNLIKE: Clause = clause("ST-1.2.10", Quoted, Quoted);
/// Several like marks on three bonds.
pub(super) const THREE_LIKE: Clause = clause("ST-1.2", Quoted, Quoted);
/// The stem of a T.
pub(super) const STEM: Clause = clause("ST-1.2.12", Quoted, Quoted);
/// An upright cross with one mark.
pub(super) const CROSS: Clause = clause("ST-1.2", Quoted, Quoted);
/// A mark squeezed between plain bonds.
pub(super) const SQUEEZED: Clause = clause("ST-1.2", Memory, Memory);
/// Drawn hydrogens in the widest gap.
pub(super) const HYDROGEN: Clause = clause("ST-1.1.4", Quoted, Quoted);
/// Outside rings before ring bonds.
pub(super) const RING: Clause = clause("ST-1.1", Quoted, Quoted);
/// Bonds in one direction.
pub(super) const OVERLAP: Clause = clause("InChI manual, tables 8 to 10", Manual, Inferred);
/// Overlaps anywhere.
pub(super) const CROWDED: Clause = clause("GR-4.3", Quoted, Inferred);
/// Bond lengths.
pub(super) const LENGTH: Clause = clause("GR-1.1", Quoted, Inferred);
/// Double bonds left open.
pub(super) const DOUBLE: Clause = clause("ST-4.4", Quoted, Quoted);
/// Geometry of double bonds near the line.
pub(super) const NEAR_LINE: Clause = clause("InChI manual, double bonds", Manual, Inferred);
/// Ligands of a double bond on one side.
pub(super) const ONE_SIDE: Clause = clause("InChI manual, double bonds", Manual, Inferred);
/// Marks at allenes.
pub(super) const AXIS: Clause = clause("InChI manual, allenes", Manual, Inferred);
/// Class-specific styles.
pub(super) const STYLES: Clause = clause("IUPAC 2006, principal recommendations", Read, Read);
/// Haworth drawings.
pub(super) const HAWORTH: Clause = clause("ST-1.9", Quoted, Read);
/// Bridgeheads hold each other.
pub(super) const BRIDGE: Clause = clause("bridged rings", Inferred, Inferred);
/// Usual valences.
pub(super) const VALENCE: Clause = clause("usual valences", Memory, Inferred);
