//! Labels by atom number, as the corpus writes them: `3R 7E 8E`.

use chem::drawing::Drawing;
use chem::stereo::Descriptor;
use std::collections::BTreeMap;
use std::fmt;

/// Descriptors by atom number from 1; a double bond stands at both its ends.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct Labels(pub BTreeMap<usize, Descriptor>);

impl Labels {
    /// Labels from a line.
    ///
    /// # Panics
    /// If a word is no label or an atom occurs twice.
    pub fn parse(line: &str) -> Labels {
        let mut labels = BTreeMap::new();
        for word in line.split_whitespace() {
            let letter = word.chars().last().and_then(Descriptor::from_letter);
            let number = word.get(..word.len() - 1).and_then(|n| n.parse().ok());
            let (Some(descriptor), Some(number)) = (letter, number) else {
                panic!("{word} in `{line}` is no label");
            };
            assert!(
                labels.insert(number, descriptor).is_none(),
                "atom {number} occurs twice in `{line}`"
            );
        }
        Labels(labels)
    }

    /// Those of the mirror image.
    #[must_use]
    pub fn mirrored(&self) -> Labels {
        Labels(self.0.iter().map(|(n, d)| (*n, d.mirrored())).collect())
    }

    /// The same labels under other atom numbers: atom `n` becomes `new[n - 1]`, both from 1.
    #[must_use]
    pub fn renumbered(&self, new: &[usize]) -> Labels {
        Labels(self.0.iter().map(|(n, d)| (new[n - 1], *d)).collect())
    }

    /// Double bonds as pairs of atom numbers with their descriptor, in the order of the lower one.
    pub fn double_bonds(&self, drawing: &Drawing) -> Vec<([usize; 2], Descriptor)> {
        let m = drawing.molecule();
        let mut bonds: Vec<_> = m
            .bonds()
            .filter(|b| m.bond(*b).order.pairs() == 2)
            .filter_map(|b| {
                let mut ends = m.bond(b).ends.map(|a| a.index() + 1);
                ends.sort_unstable();
                let (low, high) = (self.0.get(&ends[0])?, self.0.get(&ends[1])?);
                (low == high && is_geometry(*low)).then_some((ends, *low))
            })
            .collect();
        bonds.sort_unstable();
        bonds
    }

    /// As a requirement in the style of a name, `(3R,7E)`: a double bond by its lower atom.
    pub fn as_name(&self, drawing: &Drawing) -> String {
        let upper: Vec<usize> = self
            .double_bonds(drawing)
            .iter()
            .map(|(ends, _)| ends[1])
            .collect();
        let words: Vec<String> = self
            .0
            .iter()
            .filter(|(n, d)| !(is_geometry(**d) && upper.contains(n)))
            .map(|(n, d)| format!("{n}{d}"))
            .collect();
        format!("({})", words.join(","))
    }
}

/// Whether a descriptor is one of double bonds.
pub fn is_geometry(descriptor: Descriptor) -> bool {
    matches!(
        descriptor,
        Descriptor::E | Descriptor::Z | Descriptor::LowerE | Descriptor::LowerZ
    )
}

impl fmt::Display for Labels {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        let words: Vec<String> = self.0.iter().map(|(n, d)| format!("{n}{d}")).collect();
        f.write_str(&words.join(" "))
    }
}
