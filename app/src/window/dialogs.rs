//! Choosing files: the platform's dialog on a thread of its own, and a typed path where there is none.
//!
//! Where neither a desktop portal nor `zenity` answers, the dialog crate gives nothing at once, just as
//! if the person had cancelled, and says why in the log only. So the log is listened to while a dialog
//! is open; only a dialog that has failed leads to the typed path, a cancelled one to nothing.

use std::path::{Path, PathBuf};
use std::sync::atomic::{AtomicU64, Ordering};
use std::sync::mpsc::{Receiver, TryRecvError, channel};
use std::thread;
use std::time::{Duration, Instant};

/// Why a file is chosen.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Purpose {
    Open,
    Save,
    Figure,
}

impl Purpose {
    /// Title of the dialog.
    pub(super) fn title(self) -> &'static str {
        match self {
            Purpose::Open => "Open a molfile",
            Purpose::Save => "Save the molfile",
            Purpose::Figure => "Save the figure",
        }
    }

    /// What the button does.
    pub(super) fn verb(self) -> &'static str {
        match self {
            Purpose::Open => "Open",
            Purpose::Save | Purpose::Figure => "Save",
        }
    }

    /// The usual ending of a file.
    pub(super) fn ending(self) -> &'static str {
        match self {
            Purpose::Open | Purpose::Save => "mol",
            Purpose::Figure => "svg",
        }
    }

    /// The path to write, with the usual ending if it has none.
    pub(super) fn complete(self, path: PathBuf) -> PathBuf {
        match (self, path.extension()) {
            (Purpose::Save | Purpose::Figure, None) => path.with_extension(self.ending()),
            _ => path,
        }
    }

    fn endings(self) -> &'static [(&'static str, &'static [&'static str])] {
        match self {
            Purpose::Open => &[("Molfile or SDF", &["mol", "sdf", "sd", "mdl"])],
            Purpose::Save => &[("Molfile", &["mol"]), ("SDF", &["sdf"])],
            Purpose::Figure => &[("SVG", &["svg"]), ("PDF", &["pdf"]), ("PNG", &["png"])],
        }
    }
}

/// How choosing ended.
#[derive(Clone, Debug, PartialEq, Eq)]
pub(super) enum Choice {
    /// This file.
    File(PathBuf),
    /// The person chose none.
    Cancelled,
    /// No dialog could be shown.
    NoDialog,
}

/// Failures of the dialog crate so far.
static FAILURES: AtomicU64 = AtomicU64::new(0);

/// Listens to the log for dialogs that failed; everything else goes on to `next`.
struct Listener {
    next: env_logger::Logger,
}

impl log::Log for Listener {
    fn enabled(&self, metadata: &log::Metadata<'_>) -> bool {
        metadata.target().starts_with("rfd") || self.next.enabled(metadata)
    }

    fn log(&self, record: &log::Record<'_>) {
        let failed = record.level() == log::Level::Error
            && record.target().starts_with("rfd")
            && record.args().to_string().contains("zenity");
        if failed {
            // it is told in the window
            FAILURES.fetch_add(1, Ordering::SeqCst);
        } else if self.next.enabled(record.metadata()) {
            self.next.log(record);
        }
    }

    fn flush(&self) {
        self.next.flush();
    }
}

/// Installs the listener; if the program logs elsewhere already, dialogs that end at once count as failed.
pub(super) fn listen() -> bool {
    let next = env_logger::Builder::from_default_env().build();
    let most = next.filter().max(log::LevelFilter::Error);
    let installed = log::set_boxed_logger(Box::new(Listener { next }));
    if installed.is_ok() {
        log::set_max_level(most);
    }
    installed.is_ok()
}

/// No person cancels a dialog faster than this.
const AT_ONCE: Duration = Duration::from_millis(250);

/// A dialog that is open.
#[derive(Debug)]
pub(super) struct Dialog {
    pub(super) purpose: Purpose,
    receiver: Receiver<Choice>,
}

impl Dialog {
    /// Opens the platform's dialog; the window stays alive. `near` is the file it starts from.
    pub(super) fn open(purpose: Purpose, near: Option<&Path>, ctx: &egui::Context) -> Dialog {
        let (sender, receiver) = channel();
        let near = near.map(Path::to_owned);
        let ctx = ctx.clone();
        let failing = sender.clone();
        let run = move || {
            let _ = sender.send(choose(purpose, near.as_deref()));
            ctx.request_repaint();
        };
        if thread::Builder::new()
            .name("dialog".to_owned())
            .spawn(run)
            .is_err()
        {
            let _ = failing.send(Choice::NoDialog);
        }
        Dialog { purpose, receiver }
    }

    /// How it ended, once it has.
    pub(super) fn poll(&self) -> Option<Choice> {
        match self.receiver.try_recv() {
            Ok(choice) => Some(choice),
            Err(TryRecvError::Empty) => None,
            Err(TryRecvError::Disconnected) => Some(Choice::NoDialog),
        }
    }
}

fn choose(purpose: Purpose, near: Option<&Path>) -> Choice {
    let mut dialog = rfd::AsyncFileDialog::new().set_title(purpose.title());
    for (name, endings) in purpose.endings() {
        dialog = dialog.add_filter(*name, endings);
    }
    if let Some(folder) = near.and_then(Path::parent).filter(|f| f.is_dir()) {
        dialog = dialog.set_directory(folder);
    }
    if let (Purpose::Save | Purpose::Figure, Some(name)) = (purpose, near.and_then(Path::file_name))
    {
        dialog = dialog.set_file_name(name.to_string_lossy());
    }
    let (failures, start) = (FAILURES.load(Ordering::SeqCst), Instant::now());
    let chosen = match purpose {
        Purpose::Open => wait(dialog.pick_file()),
        Purpose::Save | Purpose::Figure => wait(dialog.save_file()),
    };
    match chosen {
        Some(file) => Choice::File(file.path().to_owned()),
        None if FAILURES.load(Ordering::SeqCst) > failures => Choice::NoDialog,
        None if start.elapsed() < AT_ONCE => Choice::NoDialog,
        None => Choice::Cancelled,
    }
}

/// Waits for a future on this thread.
fn wait<T>(future: impl Future<Output = T>) -> T {
    struct Unpark(thread::Thread);
    impl std::task::Wake for Unpark {
        fn wake(self: std::sync::Arc<Self>) {
            self.0.unpark();
        }
    }
    let waker = std::sync::Arc::new(Unpark(thread::current())).into();
    let mut context = std::task::Context::from_waker(&waker);
    let mut future = std::pin::pin!(future);
    loop {
        match future.as_mut().poll(&mut context) {
            std::task::Poll::Ready(value) => return value,
            std::task::Poll::Pending => thread::park(),
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn waiting_ends() {
        assert_eq!(wait(async { 7 }), 7);
    }
}
