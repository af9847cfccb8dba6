//! A progress bar on standard error, for runs that take long enough to wonder.

use std::sync::Mutex;
use std::time::{Duration, Instant};

use indicatif::{ProgressBar, ProgressDrawTarget, ProgressStyle};

use crate::rating;

/// A run shorter than this shows no bar: it would only flicker.
const QUIET: Duration = Duration::from_millis(500);
/// Steps of the bar for one file.
const STEPS: f64 = 1000.0;

/// The bar of a run over several files.
pub(super) struct Progress {
    bar: ProgressBar,
    begun: Instant,
    state: Mutex<State>,
}

struct State {
    shown: bool,
    files: Vec<FileState>,
}

#[derive(Clone, Copy, Default)]
struct FileState {
    first: Option<f64>,
    share: f64,
    done: bool,
}

impl Progress {
    /// A bar for so many files, hidden until it is worth showing; `allowed` says whether it ever may be.
    pub(super) fn new(files: usize, allowed: bool) -> Self {
        let bar = ProgressBar::with_draw_target(Some(files as u64 * STEPS as u64), ProgressDrawTarget::hidden());
        let template = "{bar:20} {elapsed} {wide_msg}";
        bar.set_style(ProgressStyle::with_template(template).expect("the template is sound").progress_chars("━╸─"));
        let state = State { shown: !allowed, files: vec![FileState::default(); files] };
        Self { bar, begun: Instant::now(), state: Mutex::new(state) }
    }

    /// A file has come this far.
    pub(super) fn pass(&self, file: usize, pass: rating::Progress) {
        self.update(file, |state| {
            let first = *state.first.get_or_insert(pass.ratio);
            state.share = state.share.max(share(first, pass.ratio));
        });
        let reached = if pass.ratio > 1.0 {
            format!("bracket {:.3} times as wide as asked, ", pass.ratio)
        } else {
            String::new()
        };
        self.bar.set_message(format!("{}{reached}pass {}, {} nodes", self.files_done(), pass.pass, pass.nodes));
    }

    /// A file has its result, or none.
    pub(super) fn done(&self, file: usize) {
        self.update(file, |state| *state = FileState { share: 1.0, done: true, ..*state });
    }

    /// Takes the bar away.
    pub(super) fn clear(&self) {
        self.bar.finish_and_clear();
    }

    fn update(&self, file: usize, change: impl FnOnce(&mut FileState)) {
        let mut state = self.state.lock().unwrap_or_else(std::sync::PoisonError::into_inner);
        change(&mut state.files[file]);
        let total: f64 = state.files.iter().map(|file| file.share).sum();
        self.bar.set_position((total * STEPS) as u64);
        if !state.shown && self.begun.elapsed() > QUIET {
            state.shown = true;
            self.bar.set_draw_target(ProgressDrawTarget::stderr());
        }
    }

    fn files_done(&self) -> String {
        let state = self.state.lock().unwrap_or_else(std::sync::PoisonError::into_inner);
        match state.files.len() {
            1 => String::new(),
            files => format!("{} of {files} files, now ", state.files.iter().filter(|file| file.done).count()),
        }
    }
}

/// How much of the way from the first width to the asked one is behind, on a scale of powers.
///
/// `first` and `now` are widths over what was asked. The width falls about as one over the number of nodes, so equal
/// factors take equal numbers of passes.
fn share(first: f64, now: f64) -> f64 {
    if first > 1.0 { ((first / now).ln() / first.ln()).clamp(0.0, 0.99) } else { 0.99 }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn pass(ratio: f64) -> rating::Progress {
        rating::Progress { pass: 1, nodes: 100, ratio }
    }

    #[test]
    fn equal_factors_are_equal_steps() {
        assert!(share(100.0, 100.0).abs() < 1e-12);
        assert!((share(100.0, 10.0) - 0.5).abs() < 1e-12);
        assert!((share(100.0, 0.1) - 0.99).abs() < 1e-12);
        assert!(share(100.0, 500.0).abs() < 1e-12, "a wider bracket does not turn the bar back");
        assert!((share(0.0, 0.0) - 0.99).abs() < 1e-12, "nothing to narrow");
    }

    #[test]
    fn files_add_up() {
        let progress = Progress::new(2, false);
        progress.pass(0, pass(100.0));
        progress.pass(0, pass(10.0));
        assert_eq!(progress.bar.position(), 500);
        progress.done(0);
        progress.pass(1, pass(100.0));
        assert_eq!(progress.bar.position(), 1000);
        assert!(progress.bar.message().starts_with("1 of 2 files, now bracket 100.000 times"));
    }
}
