//! Cells evaluated by evcxr: where a session lives, how its process is guarded, and what became of each cell.
//!
//! | part | holds |
//! |---|---|
//! | `folder` | the working folder of one session, copied from the library's template |
//! | `cell_process` | what is added to the process that runs the cells |
//! | `sieve` | what is read from the standard output of that process |
//! | `collector` | the two streams of text of a running cell |
//! | `failure` | an error of a cell as text for a notebook |

mod cell_process;
mod collector;
mod failure;
mod folder;
mod sieve;

pub use cell_process::enter_if_cell_process;
pub(crate) use cell_process::{FOLDER_VARIABLE, LOADER_VARIABLE, cell_process_command, loader_path};
pub use failure::Failure;
pub use folder::SessionFolder;

use crate::error::Error;
use crate::library::{DataFolder, Library};
use collector::Collector;
use evcxr::{CommandContext, EvalContext};
use std::collections::BTreeMap;
use std::panic::{AssertUnwindSafe, catch_unwind};
use std::path::Path;
use std::process::Command;

/// Runs before the first cell of every session.
pub const PRELUDE: &str = include_str!("prelude.rs.txt");

/// The MIME type under which the cell process tells how a cell ended.
const FATE: &str = "application/x-gudgeon-fate";

/// A running session.
///
/// The context is dropped before the folder: it ends the process that works in it.
pub struct Session {
    context: CommandContext,
    collector: Collector,
    _folder: SessionFolder,
}

/// What a cell left behind.
#[derive(Debug, Default)]
pub struct Evaluation {
    /// Text written to standard output.
    pub stdout: String,
    /// Text written to standard error.
    pub stderr: String,
    /// The value at the end of the cell, by MIME type; empty if there was none.
    pub value: BTreeMap<String, String>,
    /// Why the cell failed, if it did.
    pub failure: Option<Failure>,
}

impl Session {
    /// Starts a session whose cells see `cells_folder` as their current folder.
    ///
    /// The current folder of this process becomes the session's own, because evcxr reads an `evcxr.toml` from there
    /// first: one that happens to lie beside a worksheet must not change how its cells are built.
    ///
    /// # Errors
    /// When the folder cannot be made or evcxr does not start.
    pub fn start(data: &DataFolder, library: &Library, cells_folder: &Path) -> Result<Session, Error> {
        let folder = SessionFolder::create(data, library)?;
        let command = cell_process_command(&folder, cells_folder, true)?;
        let (context, collector) = start_evcxr(folder.path(), command)?;
        Ok(Session {
            context,
            collector,
            _folder: folder,
        })
    }

    /// Evaluates one cell.
    pub fn evaluate(&mut self, code: &str) -> Evaluation {
        // A panic inside evcxr is a bug of ours or theirs, but no reason to lose the cells before it.
        let mut result = catch_unwind(AssertUnwindSafe(|| self.context.execute(code)));
        let fate = match &mut result {
            Ok(Ok(outputs)) => outputs.content_by_mime_type.remove(FATE),
            Ok(Err(_)) | Err(_) => None,
        }
        .unwrap_or_default();
        let (fate, number) = fate.split_once(' ').unwrap_or_default();
        let texts = self.collector.collected(number.parse().ok());
        let mut evaluation = Evaluation {
            stdout: texts.stdout,
            stderr: texts.stderr,
            ..Evaluation::default()
        };
        match (result, fate) {
            (Ok(Ok(_)), "panic") => {
                evaluation.failure = Some(Failure::from_panic(texts.panic_message));
            }
            (Ok(Ok(_)), "error") => {
                // evcxr prints the error of a failed `?`; it belongs to the failure, not to the stream.
                let printed = std::mem::take(&mut evaluation.stderr);
                evaluation.failure = Some(Failure::from_question_mark(&printed));
            }
            (Ok(Ok(outputs)), _) => {
                evaluation.value = outputs.content_by_mime_type.into_iter().collect();
            }
            (Ok(Err(error)), _) => evaluation.failure = Some(Failure::from_evcxr(&error, code)),
            (Err(_), _) => evaluation.failure = Some(Failure::from_evaluator_panic()),
        }
        if is_unit(&evaluation.value) {
            evaluation.value.clear();
        }
        evaluation
    }
}

/// A `for` loop at the end of a cell has the value `()`, which nobody wants to read.
fn is_unit(value: &BTreeMap<String, String>) -> bool {
    value.len() == 1 && value.get("text/plain").is_some_and(|text| text == "()")
}

/// Starts evcxr with the configuration that lies in `folder`.
pub(crate) fn start_evcxr(folder: &Path, command: Command) -> Result<(CommandContext, Collector), Error> {
    std::env::set_current_dir(folder).map_err(|cause| Error::Unreadable {
        path: folder.to_path_buf(),
        cause,
    })?;
    let failed = |error: evcxr::Error| Error::SessionDidNotStart(error.to_string());
    let (context, outputs) = EvalContext::with_subprocess_command(command).map_err(failed)?;
    let mut context = CommandContext::with_eval_context(context);
    let collector = Collector::start(outputs.stdout, outputs.stderr);
    context.execute(":load_config --quiet").map_err(failed)?;
    collector.collected(None);
    Ok((context, collector))
}
