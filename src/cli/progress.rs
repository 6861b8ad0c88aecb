//! How far a long study has come, on a terminal; and its end at a reader's wish.

use std::sync::OnceLock;
use std::sync::atomic::{AtomicBool, Ordering};
use std::time::{Duration, Instant};

use indicatif::{ProgressBar, ProgressDrawTarget, ProgressStyle};

/// Whether the reader has asked for an end.
static ENDED: AtomicBool = AtomicBool::new(false);

/// Work shorter than this says nothing.
const SILENT: Duration = Duration::from_secs(1);

/// Steps of a bar.
const STEPS: u64 = 1000;

/// A bar on the standard error, shown once the work has taken longer than a second.
pub(super) struct Progress {
    begun: Instant,
    bar: Option<ProgressBar>,
    quiet: bool,
}

impl Progress {
    /// Begins, and from now on lets the first Ctrl-C end the study instead of the program.
    pub(super) fn new(quiet: bool) -> Progress {
        static HANDLER: OnceLock<()> = OnceLock::new();
        HANDLER.get_or_init(|| {
            // Without a handler Ctrl-C ends the program at once, which is no harm.
            let _ = ctrlc::set_handler(|| {
                if ENDED.swap(true, Ordering::Relaxed) {
                    // The second one means it.
                    std::process::exit(130);
                }
            });
        });
        Progress {
            begun: Instant::now(),
            bar: None,
            quiet,
        }
    }

    /// Shows what is being done and how much of it, from 0 to 1; and whether to go on.
    pub(super) fn tell(&mut self, what: &'static str, share: f64) -> bool {
        if !self.quiet && self.begun.elapsed() > SILENT {
            let bar = self.bar.get_or_insert_with(|| {
                let bar = ProgressBar::with_draw_target(Some(STEPS), ProgressDrawTarget::stderr());
                if let Ok(style) = ProgressStyle::with_template("{msg:24} {bar:40} {percent} %") {
                    bar.set_style(style);
                }
                bar
            });
            bar.set_message(what);
            bar.set_position((share * STEPS as f64) as u64);
        }
        !ENDED.load(Ordering::Relaxed)
    }
}

impl Drop for Progress {
    fn drop(&mut self) {
        if let Some(bar) = &self.bar {
            bar.finish_and_clear();
        }
    }
}
