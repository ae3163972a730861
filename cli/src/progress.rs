//! The progress bar of a run: one for warm-up and draws of all chains.

use std::sync::Mutex;

use indicatif::{ProgressBar, ProgressDrawTarget, ProgressStyle};
use stook_sampler::run::{Options, Phase, Progress, Watch};

use crate::terminal;

/// Shows how far a run has come.
pub(crate) struct Bar {
    bar: ProgressBar,
    warmup: usize,
    /// Sweeps done, by chain.
    done: Mutex<Vec<usize>>,
}

impl Bar {
    /// A bar for a run under a title; where none is wanted or there is no terminal, one that shows nothing.
    pub(crate) fn new(title: &str, options: &Options, wanted: bool) -> Bar {
        let sweeps = options.chains * (options.warmup + options.draws);
        let target = if wanted && terminal::shows_progress() {
            ProgressDrawTarget::stderr()
        } else {
            ProgressDrawTarget::hidden()
        };
        let bar = ProgressBar::with_draw_target(Some(sweeps as u64), target);
        if let Ok(style) =
            ProgressStyle::with_template("{prefix}  {wide_bar} {percent:>3} %  {msg:<7} {eta:>5} left")
        {
            bar.set_style(style.progress_chars("=>."));
        }
        bar.set_prefix(title.to_string());
        bar.set_message("warm-up");
        Bar { bar, warmup: options.warmup, done: Mutex::new(vec![0; options.chains]) }
    }

    /// Takes the bar away.
    pub(crate) fn clear(&self) {
        self.bar.finish_and_clear();
    }
}

impl Watch for Bar {
    fn progress(&self, progress: Progress) {
        let before = match progress.phase {
            Phase::Warmup => 0,
            Phase::Draws => {
                self.bar.set_message("draws");
                self.warmup
            }
        };
        let Ok(mut done) = self.done.lock() else { return };
        if let Some(chain) = done.get_mut(progress.chain) {
            *chain = before + progress.done;
        }
        self.bar.set_position(done.iter().sum::<usize>() as u64);
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_bar_counts_the_sweeps_of_all_chains() {
        let options = Options { seed: 1, chains: 2, warmup: 10, draws: 20, threads: 1 };
        let bar = Bar::new("fit", &options, false);
        bar.progress(Progress { chain: 0, phase: Phase::Warmup, done: 10, of: 10 });
        bar.progress(Progress { chain: 1, phase: Phase::Draws, done: 5, of: 20 });
        assert_eq!(bar.bar.position(), 25);
        assert_eq!(bar.bar.length(), Some(60));
    }
}
