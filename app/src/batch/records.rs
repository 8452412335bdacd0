//! The records of a file worked on by several threads, given back in their order.

use super::Failure;
use crate::files::Source;
use chem::format::sdf::{RawRecord, Reader};
use chem::format::{Notice, ReadError, Reason, Record, text};
use std::borrow::Cow;
use std::collections::BTreeMap;
use std::num::NonZeroUsize;
use std::panic::{AssertUnwindSafe, catch_unwind};
use std::sync::{Mutex, mpsc};

/// Records on their way at once, for each thread.
const AHEAD: usize = 32;

/// One record as it stands in its file.
#[derive(Debug)]
pub(super) struct Piece {
    /// Number from 1.
    pub(super) number: usize,
    /// Line at which it starts, from 1.
    pub(super) line: usize,
    /// Its bytes, without `$$$$`.
    pub(super) bytes: Vec<u8>,
    /// Whether a line `$$$$` ended it.
    pub(super) ended: bool,
    too_long: bool,
}

/// A record as text.
#[derive(Debug)]
pub(super) struct PieceText<'a> {
    pub(super) text: Cow<'a, str>,
    /// That it is not UTF-8.
    notice: Option<Notice>,
}

impl Piece {
    /// Its text.
    pub(super) fn text(&self) -> Result<PieceText<'_>, ReadError> {
        if self.too_long {
            let reason = Reason::TooLong(Reader::<&[u8]>::LIMIT);
            return Err(ReadError::line(self.line, reason));
        }
        let (text, notice) = text::decode(&self.bytes, self.line)?;
        Ok(PieceText { text, notice })
    }

    /// Whether its bytes are not here.
    pub(super) fn is_lost(&self) -> bool {
        self.too_long
    }

    /// Its first line, as the name to show for it; a tab or other sign that would break a table is a blank.
    pub(super) fn title(&self) -> String {
        let line = self.bytes.split(|b| matches!(b, b'\n' | b'\r')).next();
        let line = line.unwrap_or_default();
        let line = line.strip_prefix(b"\xEF\xBB\xBF").unwrap_or(line);
        let text = match std::str::from_utf8(line) {
            Ok(text) => text.to_owned(),
            Err(_) => line.iter().map(|b| char::from(*b)).collect(),
        };
        text.trim_end().replace(|c: char| c.is_control(), " ")
    }
}

impl PieceText<'_> {
    /// Parted into molfile and data fields.
    pub(super) fn raw(&self, piece: &Piece) -> RawRecord<'_> {
        RawRecord::new(&self.text, piece.number, piece.line)
    }

    /// Whether it had to be read as Latin-1.
    pub(super) fn is_latin(&self) -> bool {
        self.notice.is_some()
    }

    /// Understood.
    pub(super) fn read(&self, piece: &Piece) -> Result<Record, ReadError> {
        let mut record = self.raw(piece).read()?;
        record.notices.extend(self.notice.clone());
        Ok(record)
    }
}

/// Does `work` for each record and hands the results to `take` in the order of the file. A record at
/// which `work` fails by a fault of the program gives `None`.
pub(super) fn each<T: Send>(
    source: &mut Source,
    threads: Option<NonZeroUsize>,
    work: impl Fn(&Piece) -> T + Sync,
    mut take: impl FnMut(Piece, Option<T>) -> Result<(), Failure>,
) -> Result<(), Failure> {
    let guarded = |piece: &Piece| catch_unwind(AssertUnwindSafe(|| work(piece))).ok();
    let available = std::thread::available_parallelism().map_or(1, NonZeroUsize::get);
    let threads = threads.map_or(available, NonZeroUsize::get).min(256);
    if threads == 1 {
        while let Some(piece) = next(source)? {
            let result = guarded(&piece);
            take(piece, result)?;
        }
        return Ok(());
    }
    let (to_work, work_list) = mpsc::sync_channel::<Piece>(threads * AHEAD);
    let work_list = Mutex::new(work_list);
    let (to_main, results) = mpsc::channel::<(Piece, Option<T>)>();
    std::thread::scope(|scope| {
        for _ in 0..threads {
            let (to_main, work_list, guarded) = (to_main.clone(), &work_list, &guarded);
            scope.spawn(move || {
                loop {
                    // the lock is held while waiting: the others have nothing to do either
                    let received = match work_list.lock() {
                        Ok(list) => list.recv(),
                        Err(_) => return,
                    };
                    let Ok(piece) = received else { return };
                    let result = guarded(&piece);
                    if to_main.send((piece, result)).is_err() {
                        return;
                    }
                }
            });
        }
        drop(to_main);
        // moved in, so that the threads end when this block does
        let to_work = to_work;
        let mut waiting = BTreeMap::new();
        let (mut sent, mut taken, mut more) = (0usize, 0usize, true);
        loop {
            while more && sent - taken < threads * AHEAD {
                more = match next(source)? {
                    Some(piece) => to_work.send(piece).is_ok(),
                    None => false,
                };
                sent += usize::from(more);
            }
            if sent == taken {
                return Ok(());
            }
            let Ok((piece, result)) = results.recv() else {
                return Ok(());
            };
            waiting.insert(piece.number, (piece, result));
            while let Some((piece, result)) = waiting.remove(&(taken + 1)) {
                taken += 1;
                take(piece, result)?;
            }
        }
    })
}

pub(super) fn next(source: &mut Source) -> Result<Option<Piece>, Failure> {
    Ok(source.next_chunk()?.map(|chunk| Piece {
        number: chunk.number,
        line: chunk.line,
        bytes: chunk.bytes.to_vec(),
        ended: chunk.ended,
        too_long: chunk.too_long,
    }))
}

/// What is said of a record at which the program itself failed.
pub(super) const FAULT: &str = "a fault of this program: please report it with this record. The other records are not concerned";
