//! Progress on standard error once work takes over a second, and the interrupt.

use std::io::IsTerminal;
use std::sync::Arc;
use std::sync::atomic::{AtomicBool, Ordering};
use std::time::Duration;

use ebbwell::run::{Stage, Watch};
use indicatif::{ProgressBar, ProgressDrawTarget, ProgressStyle};

use super::exit::Exit;

/// Work shorter than this shows no progress.
const QUIET_FOR: Duration = Duration::from_secs(1);

/// Shows progress and hears the interrupt.
pub struct Progress {
    bar: ProgressBar,
    stop: Arc<AtomicBool>,
    done: Arc<AtomicBool>,
}

impl Progress {
    /// Begins to watch; `show` is false under `--quiet`.
    pub fn begin(show: bool) -> Self {
        let stop = Arc::new(AtomicBool::new(false));
        let asked = Arc::clone(&stop);
        let handler = ctrlc::set_handler(move || {
            // The second interrupt does not wait for the next place to stop at.
            if asked.swap(true, Ordering::SeqCst) {
                std::process::exit(i32::from(Exit::Interrupted.status()));
            }
        });
        let bar = ProgressBar::with_draw_target(None, ProgressDrawTarget::hidden());
        bar.set_style(ProgressStyle::default_spinner());
        let done = Arc::new(AtomicBool::new(false));
        // Without a handler the system's own way to interrupt stands: nothing half-written either.
        let wanted = show && handler.is_ok() && std::io::stderr().is_terminal();
        if wanted {
            let (bar, done) = (bar.clone(), Arc::clone(&done));
            std::thread::spawn(move || {
                std::thread::sleep(QUIET_FOR);
                if !done.load(Ordering::SeqCst) {
                    bar.set_draw_target(ProgressDrawTarget::stderr());
                    bar.enable_steady_tick(Duration::from_millis(120));
                }
            });
        }
        Self { bar, stop, done }
    }

    /// Takes the progress off the terminal.
    pub fn end(&self) {
        self.done.store(true, Ordering::SeqCst);
        self.bar.finish_and_clear();
    }
}

impl Watch for Progress {
    fn stage(&self, stage: Stage, what: &str) {
        self.bar.set_message(ebbwell::words::progress::stage(stage, what));
    }

    fn stop(&self) -> bool {
        self.stop.load(Ordering::SeqCst)
    }
}
