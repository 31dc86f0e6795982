//! `gudgeon run`: executes a worksheet and says in a few lines what it proves.

use crate::error::Error;
use crate::facts::Facts;
use crate::library::{DataFolder, Library};
use crate::notebook::{self, Destination, Notebook, absolute};
use crate::progress::Progress;
use crate::session::{Failure, Session};
use clap::Args;
use std::fmt::Write as _;
use std::io::Write as _;
use std::path::PathBuf;
use std::process::ExitCode;

/// The arguments of `gudgeon run`.
#[derive(Debug, Args)]
pub(super) struct Run {
    /// The worksheet, a file with the ending .ipynb.
    worksheet: PathBuf,
    /// Write the executed worksheet here and leave the original alone.
    #[arg(long, short, value_name = "FILE")]
    output: Option<PathBuf>,
}

/// What a run found.
struct Outcome {
    cells_run: usize,
    code_cells: usize,
    facts: Facts,
    failed: Option<(usize, Failure)>,
}

impl Run {
    pub(super) fn execute(self) -> Result<ExitCode, Error> {
        let worksheet = absolute(&self.worksheet)?;
        let mut notebook = Notebook::read(&worksheet)?;
        let destination = match &self.output {
            Some(output) => Destination::check(&absolute(output)?)?,
            None => Destination::check(&worksheet)?,
        };

        let progress = Progress::of_unknown_length();
        let data = DataFolder::open()?;
        let library = Library::prepare(&data, &progress)?;
        progress.say("starting the session");
        let folder = worksheet.parent().unwrap_or(&worksheet);
        let mut session = Session::start(&data, &library, folder)?;
        let outcome = run_cells(&mut notebook, &mut session, &progress);
        progress.finish();
        drop(session);

        notebook.write(&destination)?;
        let shown = self.output.as_ref().unwrap_or(&self.worksheet);
        let summary = outcome.summary(&self.worksheet.display(), &shown.display());
        // A reader that has gone away is no reason to fail after the file is written.
        let _ = std::io::stdout().write_all(summary.as_bytes());
        Ok(outcome.exit_code())
    }
}

/// Runs the code cells in order up to the first that fails.
///
/// What earlier runs left in the cells behind it goes away: it would read as if it belonged to this run.
fn run_cells(notebook: &mut Notebook, session: &mut Session, progress: &Progress) -> Outcome {
    let places = notebook.code_cells();
    let mut outcome = Outcome {
        cells_run: 0,
        code_cells: 0,
        facts: Facts::default(),
        failed: None,
    };
    progress.count_parts(places.len());
    let mut count = 0;
    for (index, place) in places.into_iter().enumerate() {
        let source = notebook.source(place);
        if source.trim().is_empty() {
            notebook.set_outputs(place, None, Vec::new());
            progress.part_done();
            continue;
        }
        outcome.code_cells += 1;
        if outcome.failed.is_some() {
            notebook.set_outputs(place, None, Vec::new());
            continue;
        }
        progress.say(&format!("cell {}", index + 1));
        count += 1;
        let evaluation = session.evaluate(&source);
        let mut outputs = Vec::new();
        for (name, text) in [("stdout", &evaluation.stdout), ("stderr", &evaluation.stderr)] {
            if !text.is_empty() {
                outputs.push(notebook::stream(name, text));
            }
        }
        if !evaluation.value.is_empty() {
            let output = notebook::display(count, &evaluation.value);
            outcome.facts.add_output(&output);
            outputs.push(output);
        }
        if let Some(failure) = evaluation.failure {
            outputs.push(notebook::error(&failure));
            outcome.failed = Some((index + 1, failure));
        }
        notebook.set_outputs(place, Some(count), outputs);
        outcome.cells_run += 1;
        progress.part_done();
    }
    outcome
}

impl Outcome {
    fn exit_code(&self) -> ExitCode {
        if self.failed.is_none() && self.facts.hold() {
            ExitCode::SUCCESS
        } else {
            ExitCode::FAILURE
        }
    }

    fn summary(&self, worksheet: &dyn std::fmt::Display, written: &dyn std::fmt::Display) -> String {
        let facts = &self.facts;
        let mut text = String::new();
        let mut line = |name: &str, content: String| {
            let _ = writeln!(text, "{name:<16} {content}");
        };
        line("worksheet", worksheet.to_string());
        line("cells", format!("{} of {} run", self.cells_run, self.code_cells));
        let kinds = ["Proved", "Refuted", "Supported", "Undecided"]
            .map(|kind| format!("{kind} {}", facts.steps_with(kind)));
        line("steps", format!("{}: {}", facts.steps(), kinds.join(", ")));
        if facts.stated() > 0 {
            line("", format!("and {} definitions and laws", facts.stated()));
        }
        let conditions = facts.conditions();
        line("side conditions", conditions.len().to_string());
        for condition in conditions {
            line("", condition.to_owned());
        }
        let reference = facts.worst_reference().map_or_else(
            || "none".to_owned(),
            |reference| {
                let word = reference.finding.words();
                format!(
                    "{word}; largest deviation {} (tolerance {})",
                    reference.largest_deviation, reference.tolerance
                )
            },
        );
        line("reference run", reference);
        line("written", written.to_string());
        if let Some((cell, failure)) = &self.failed {
            let _ = writeln!(text, "\ncode cell {cell} failed: {}", failure.name);
            for line in &failure.lines {
                let _ = writeln!(text, "  {line}");
            }
        }
        text
    }
}
