//! Searches run beside the thread that paints; short ones are waited for, so that nothing flickers.

use crate::session::{Answer, Work};
use std::sync::mpsc::{Receiver, RecvTimeoutError, channel};
use std::thread;
use std::time::Duration;

/// How long a frame waits for an answer before it paints without.
const PATIENCE: Duration = Duration::from_millis(30);

/// At most one search runs and one waits; of those that wait only the last one counts.
#[derive(Debug, Default)]
pub(super) struct Search {
    running: Option<Receiver<Answer>>,
    waiting: Option<Work>,
}

impl Search {
    /// Hands over the next search.
    pub(super) fn give(&mut self, work: Work, ctx: &egui::Context) {
        self.waiting = Some(work);
        self.start(ctx);
    }

    fn start(&mut self, ctx: &egui::Context) {
        if self.running.is_some() {
            return;
        }
        let Some(work) = self.waiting.take() else {
            return;
        };
        let (sender, receiver) = channel();
        let ctx = ctx.clone();
        let run = move || {
            // nobody listens any more once the window is gone
            let _ = sender.send(work.run());
            ctx.request_repaint();
        };
        match thread::Builder::new().name("search".to_owned()).spawn(run) {
            Ok(_) => self.running = Some(receiver),
            Err(e) => log::error!("no thread for the search: {e}"),
        }
    }

    /// An answer, if one has come; `patient` waits a moment for it.
    pub(super) fn poll(&mut self, patient: bool, ctx: &egui::Context) -> Option<Answer> {
        let receiver = self.running.as_ref()?;
        let wait = if patient { PATIENCE } else { Duration::ZERO };
        match receiver.recv_timeout(wait) {
            Ok(answer) => {
                self.running = None;
                self.start(ctx);
                Some(answer)
            }
            Err(RecvTimeoutError::Timeout) => None,
            Err(RecvTimeoutError::Disconnected) => {
                self.running = None;
                self.start(ctx);
                None
            }
        }
    }
}
