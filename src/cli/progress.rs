//! Progress of a run: a bar on a terminal, plain lines elsewhere, nothing when quiet; and Ctrl-C.

use super::arguments::Shared;
use super::output::complain;
use crate::ensemble::Watch;
use indicatif::{ProgressBar, ProgressDrawTarget, ProgressState, ProgressStyle};
use std::io::IsTerminal;
use std::sync::OnceLock;
use std::sync::atomic::{AtomicBool, Ordering};

static INTERRUPTED: AtomicBool = AtomicBool::new(false);

/// Lets Ctrl-C ask the run to stop, where it would else end the program at once.
pub(super) fn mind_interrupts() {
    // A second handler can only be refused; then Ctrl-C ends the program at once, which is safe too.
    let _ = ctrlc::set_handler(|| INTERRUPTED.store(true, Ordering::Relaxed));
}

/// Whether Ctrl-C was pressed.
pub(super) fn is_interrupted() -> bool {
    INTERRUPTED.load(Ordering::Relaxed)
}

/// How progress is shown.
enum Show {
    Nothing,
    Lines,
    Bar,
}

/// Shows a run's progress on standard error.
pub(super) struct Progress {
    show: Show,
    bar: OnceLock<ProgressBar>,
}

impl Progress {
    pub fn new(shared: &Shared) -> Self {
        let show = match (shared.quiet, std::io::stderr().is_terminal()) {
            (true, _) => Show::Nothing,
            (false, true) => Show::Bar,
            (false, false) => Show::Lines,
        };
        Self { show, bar: OnceLock::new() }
    }

    /// Takes the bar away.
    pub fn ends(&self) {
        if let Some(bar) = self.bar.get() {
            bar.finish_and_clear();
        }
    }

    /// A bar of so many `things`, or of a number not known: only on a terminal.
    pub fn bar_of(&self, things: &str, total: Option<u64>) -> Option<ProgressBar> {
        if !matches!(self.show, Show::Bar) {
            return None;
        }
        let template = match total {
            Some(_) => format!("{{bar:32}} {{pos}} of {{len}} {things}, {{rate}}, {{eta}} left"),
            None => format!("{{pos}} {things}, {{rate}}"),
        };
        let style = ProgressStyle::with_template(&template)
            .unwrap_or_else(|_| ProgressStyle::default_bar())
            .with_key("rate", |state: &ProgressState, text: &mut dyn std::fmt::Write| {
                let _ = write!(text, "{:.0} a second", state.per_sec());
            });
        Some(ProgressBar::with_draw_target(total, ProgressDrawTarget::stderr()).with_style(style))
    }

    /// Says that a stage begins.
    pub fn stage(&self, text: &str) {
        self.ends();
        if !matches!(self.show, Show::Nothing) {
            complain(&format!("{text}\n"));
        }
    }
}

impl Watch for Progress {
    fn begins(&self, realizations: u32) {
        if let Some(bar) = self.bar_of("realizations", Some(u64::from(realizations))) {
            self.bar.get_or_init(|| bar);
        }
    }

    fn realization_done(&self) {
        if let Some(bar) = self.bar.get() {
            bar.inc(1);
        }
    }

    fn wants_stop(&self) -> bool {
        is_interrupted()
    }
}
