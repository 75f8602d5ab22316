//! What a fit says as it goes: its stages, how many sets of parameters have been tried, and how fast.

use super::super::progress::{Progress, is_interrupted};
use crate::fit::{Follow, Plan, Split, Stage};
use indicatif::ProgressBar;
use std::time::Instant;

/// What stands behind a number of them.
const SETS: &str = "sets of parameters";

/// Follows a fit.
pub(super) struct Told<'a> {
    progress: &'a Progress,
    /// Sets that a search tries before it refines; how many refining takes is not known before.
    searched: u64,
    bar: Option<ProgressBar>,
    tried: usize,
    began: Instant,
}

impl<'a> Told<'a> {
    pub fn new(progress: &'a Progress, plan: &Plan<'_>) -> Self {
        let searched = (Split::EACH.len() * plan.starts * plan.evaluations) as u64;
        Self { progress, searched, bar: None, tried: 0, began: Instant::now() }
    }

    /// Takes the bar away; `71 000 sets of parameters tried in 12.3 s, 5 770 a second`, for a terminal alone.
    pub fn ends(mut self) -> String {
        self.begins_bar(None);
        let seconds = self.began.elapsed().as_secs_f64();
        let rate = self.tried as f64 / seconds.max(1e-3);
        format!("{} {SETS} tried in {seconds:.1} s, {rate:.0} a second", self.tried)
    }

    /// Another bar in the place of the one before.
    fn begins_bar(&mut self, bar: Option<ProgressBar>) {
        if let Some(before) = std::mem::replace(&mut self.bar, bar) {
            before.finish_and_clear();
        }
    }
}

impl Follow for Told<'_> {
    fn begins(&mut self, stage: Stage) {
        self.begins_bar(None);
        let (words, total) = match stage {
            Stage::Search => {
                ("searching for parameters on all winters and on halves of them", Some(self.searched))
            }
            Stage::Profiles => ("looking how well the snow tells each of them", None),
            Stage::Again => {
                ("searching again without those that the snow does not tell", Some(self.searched))
            }
            Stage::OtherWinters => ("fitting to winters drawn anew: how far others might have led", None),
        };
        self.progress.stage(words);
        self.begins_bar(self.progress.bar_of(SETS, total));
    }

    fn tried(&mut self, sets: usize) {
        self.tried += sets;
        let Some(bar) = &self.bar else { return };
        bar.inc(sets as u64);
        // All that was planned has been tried: what follows refines it.
        if bar.length().is_some_and(|length| bar.position() >= length) {
            self.begins_bar(self.progress.bar_of(&format!("{SETS} to refine what was found"), None));
        }
    }

    fn wants_stop(&self) -> bool {
        is_interrupted()
    }
}
