//! What stands behind a hyphen: another group of items, or the name, which is not used.

use super::reader::{Around, Reader, Taken, closing};
use super::report::{LineError, Note};
use super::words;

impl Reader<'_> {
    /// What follows a hyphen: another group, or the name.
    pub(super) fn behind_hyphen(&mut self) -> Result<(), LineError> {
        let (start, bare) = (self.pos, self.bare);
        let (items, notes) = (self.found.items.len(), self.found.notes.len());
        let close = self.partner_of(start);
        let outcome = if close.is_some() {
            self.bracketed()
        } else {
            self.unbracketed()
        };
        let new = self.found.items.get(items..).unwrap_or(&[]);
        let firm = new.first().is_some_and(Taken::is_firm);
        let name = match (&outcome, close) {
            (Ok(()), Some(_)) => false,
            (Err(_), Some(close)) => !firm && words::is_name_like(self.slice(start, close)),
            (Ok(()), None) => {
                let rest = self.past_blanks(self.pos);
                let last = self.at(rest).is_none()
                    || (self.at(rest) == Some('-')
                        && self.at(self.past_blanks(rest + 1)).is_none());
                let loose = new.last().is_some_and(Taken::is_loose);
                let leads = items == 0 && !loose;
                !(last || leads || new.iter().all(Taken::is_firm))
            }
            (Err(error), None) => {
                let slash = matches!(error.code, "E-SLASH" | "E-RS-SLASH" | "E-LIMIT");
                let telling = matches!(error.code, "E-AMBIG" | "E-ORDER" | "E-UNSUPPORTED");
                !(firm || slash || (telling && items == 0))
            }
        };
        if !name {
            return outcome;
        }
        self.found.items.truncate(items);
        self.found.notes.truncate(notes);
        (self.pos, self.bare) = (start, bare);
        self.name()
    }

    /// The name: not used, but looked through for what it holds.
    fn name(&mut self) -> Result<(), LineError> {
        let name = self.slice(self.pos, self.end);
        let starts = name
            .first()
            .is_some_and(|c| c.is_alphanumeric() || closing(*c).is_some());
        if !starts {
            return Err(self.error(
                "E-UNKNOWN",
                self.pos,
                "neither a descriptor nor a name starts here: delete the signs",
            ));
        }
        if let Some(last) = self.bare.and(self.found.items.last()) {
            if last.locant.is_none() && !name.iter().any(|c| c.is_alphabetic()) {
                return Err(self.order(last));
            }
            if last.is_loose() {
                return Err(self.error(
                    "E-AMBIG",
                    last.start,
                    format!(
                        "'{0}-' may be a descriptor or belong to the name: put descriptors into parentheses, as ({0})-",
                        last.value
                    ),
                ));
            }
        }
        let mut before = None;
        let dl = name.iter().enumerate().any(|(index, c)| {
            let starts = before
                .replace(*c)
                .is_none_or(|b: char| !b.is_alphanumeric());
            let rest = name.get(index + 1..).unwrap_or(&[]);
            starts
                && matches!(c, 'D' | 'L')
                && (rest.starts_with(&['-']) || rest.starts_with(&['L', '-']))
        });
        let inner = self.inner();
        self.found.notes.push(Note::NameTail);
        self.found.notes.extend(dl.then_some(Note::Dl));
        self.found
            .notes
            .extend((!inner.is_empty()).then_some(Note::Inner(inner)));
        self.pos = self.end;
        Ok(())
    }

    /// The groups of descriptors inside the name.
    fn inner(&self) -> Vec<String> {
        let mut groups = Vec::new();
        let mut index = self.pos;
        while index < self.end {
            if let Some(close) = self.partner_of(index) {
                let mut sub = Reader::new(self.text, self.partner, index + 1, close);
                if sub.list(Around::Brackets).is_ok() {
                    groups.push(self.slice(index, close + 1).iter().collect());
                    index = close;
                }
            }
            index += 1;
        }
        groups
    }

    /// The error of a line in which nothing was read: a name alone is said to be one.
    pub(super) fn plain_name(&self, error: LineError) -> LineError {
        let unread = matches!(
            error.code,
            "E-UNKNOWN" | "E-NO-DESC" | "E-LOCANT" | "E-EMPTY"
        );
        let line = self.slice(0, self.end);
        // a line that starts with a slip of the keys is no name
        let word: String = line
            .split(|c| !c.is_alphabetic())
            .find(|w| w.len() > 2)
            .unwrap_or(&[])
            .iter()
            .collect();
        let is_name = words::is_name_like(line) && words::nearest(&word).is_none();
        if unread && is_name && self.found.items.is_empty() {
            return LineError::whole(
                "E-NO-STEREO",
                "this is a name with no descriptors in front: put them there, as (2R)-butan-2-ol",
            );
        }
        error
    }
}
