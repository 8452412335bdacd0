//! How the places stand, counted.

use chem::pipeline::{Report, Verdict};

/// How many places stand how.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub struct Tally {
    /// Places that carry what they must.
    pub agrees: usize,
    /// Places that carry something else.
    pub opposite: usize,
    /// Places that must carry something and carry nothing.
    pub open: usize,
    /// Places whose marks contradict each other.
    pub contradiction: usize,
    /// Places of which nothing is asked.
    pub not_asked: usize,
}

impl Tally {
    /// Counts the places of a report.
    pub fn of(report: &Report) -> Tally {
        let mut tally = Tally::default();
        for place in &report.places {
            match place.verdict {
                Verdict::Agrees => tally.agrees += 1,
                Verdict::Opposite => tally.opposite += 1,
                Verdict::Open if place.must.is_some() => tally.open += 1,
                Verdict::Contradiction => tally.contradiction += 1,
                Verdict::Open | Verdict::NotAsked => tally.not_asked += 1,
            }
        }
        tally
    }

    /// The verdict to show for the whole line.
    pub fn verdict(&self) -> Verdict {
        if self.contradiction > 0 {
            Verdict::Contradiction
        } else if self.opposite > 0 {
            Verdict::Opposite
        } else if self.open > 0 {
            Verdict::Open
        } else if self.agrees > 0 {
            Verdict::Agrees
        } else {
            Verdict::NotAsked
        }
    }
}
