//! Says on a terminal what is being built or run; says nothing when standard error is not a terminal.

use indicatif::{ProgressBar, ProgressStyle};
use std::time::Duration;

/// A line on the terminal that is written over as the work goes on.
#[derive(Debug)]
pub struct Progress {
    bar: ProgressBar,
}

impl Progress {
    /// Work whose length is not known.
    #[must_use]
    pub fn of_unknown_length() -> Progress {
        // indicatif draws on standard error and stays silent when that is not a terminal.
        let bar = ProgressBar::new_spinner();
        bar.enable_steady_tick(Duration::from_millis(120));
        Progress { bar }
    }

    /// Says what is being done now.
    pub fn say(&self, message: &str) {
        self.bar.set_message(message.to_owned());
    }

    /// From here on the work has this many parts.
    pub fn count_parts(&self, parts: usize) {
        if let Ok(style) = ProgressStyle::with_template("{bar:24} {pos}/{len} {wide_msg}") {
            self.bar.set_style(style);
        }
        self.bar.set_length(parts as u64);
        self.bar.set_position(0);
    }

    /// One part is done.
    pub fn part_done(&self) {
        self.bar.inc(1);
    }

    /// Takes the line off the terminal.
    pub fn finish(&self) {
        self.bar.finish_and_clear();
    }
}
