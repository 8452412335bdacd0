//! Searches and audits run beside the thread that paints; short searches are waited for, so that nothing
//! flickers.

use crate::session::{Answer, Look, Seen, Work};
use std::sync::mpsc::{Receiver, RecvTimeoutError, channel};
use std::thread;
use std::time::Duration;

/// How long a frame waits for an answer before it paints without.
const PATIENCE: Duration = Duration::from_millis(30);

/// What can be run on a thread of its own.
pub(super) trait Job: Send + 'static {
    /// What comes of it.
    type Answer: Send + 'static;
    /// Name of its thread.
    const NAME: &'static str;

    fn answer(&self) -> Self::Answer;
}

impl Job for Work {
    type Answer = Answer;
    const NAME: &'static str = "search";

    fn answer(&self) -> Answer {
        self.run()
    }
}

impl Job for Look {
    type Answer = Seen;
    const NAME: &'static str = "audit";

    fn answer(&self) -> Seen {
        self.run()
    }
}

/// At most one job runs and one waits; of those that wait only the last one counts.
#[derive(Debug)]
pub(super) struct Search<J: Job> {
    running: Option<Receiver<J::Answer>>,
    waiting: Option<J>,
}

impl<J: Job> Default for Search<J> {
    fn default() -> Self {
        Search {
            running: None,
            waiting: None,
        }
    }
}

impl<J: Job> Search<J> {
    /// Hands over the next job.
    pub(super) fn give(&mut self, job: J, ctx: &egui::Context) {
        self.waiting = Some(job);
        self.start(ctx);
    }

    /// Whether nothing runs.
    pub(super) fn is_idle(&self) -> bool {
        self.running.is_none()
    }

    fn start(&mut self, ctx: &egui::Context) {
        if self.running.is_some() {
            return;
        }
        let Some(job) = self.waiting.take() else {
            return;
        };
        let (sender, receiver) = channel();
        let ctx = ctx.clone();
        let run = move || {
            // nobody listens any more once the window is gone
            let _ = sender.send(job.answer());
            ctx.request_repaint();
        };
        match thread::Builder::new().name(J::NAME.to_owned()).spawn(run) {
            Ok(_) => self.running = Some(receiver),
            Err(e) => log::error!("no thread for the {}: {e}", J::NAME),
        }
    }

    /// An answer, if one has come; `patient` waits a moment for it.
    pub(super) fn poll(&mut self, patient: bool, ctx: &egui::Context) -> Option<J::Answer> {
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
