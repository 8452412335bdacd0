//! The records of a file worked on by several threads, given back in their order.

use super::Failure;
use crate::files::{Piece, Source};
use std::collections::BTreeMap;
use std::num::NonZeroUsize;
use std::panic::{AssertUnwindSafe, catch_unwind};
use std::sync::{Mutex, mpsc};

/// Records on their way at once, for each thread.
const AHEAD: usize = 32;

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
        while let Some(piece) = source.next_piece()? {
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
                more = match source.next_piece()? {
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

/// What is said of a record at which the program itself failed.
pub(super) const FAULT: &str = "a fault of this program: please report it with this record. The other records are not concerned";
