//! Builds a library's template: an evcxr working folder in which everything a first cell needs is compiled.

use super::Library;
use crate::error::Error;
use crate::progress::Progress;
use crate::session::{SessionFolder, start_evcxr};
use std::io::{BufRead, BufReader};
use std::process::{Command, Stdio};

/// How many lines of a failed program are shown.
const SHOWN_LINES: usize = 30;

/// Copies the third-party sources into the library, so that no session ever asks a registry.
///
/// What cargo has already on this machine is enough; the network is asked only when it is not.
pub(super) fn vendor(library: &Library, progress: &Progress) -> Result<(), Error> {
    progress.say("copying third-party sources");
    let attempt = |offline: bool| {
        let mut command = Command::new("cargo");
        command
            .args(["vendor", "--quiet", "--respect-source-config"])
            .args(offline.then_some("--offline"))
            .arg(library.vendored())
            .current_dir(library.sources())
            .stdin(Stdio::null());
        run(command, "cargo vendor", |_| ())
    };
    attempt(true).or_else(|_| attempt(false))
}

/// Builds the template in a child process, whose messages become the progress shown here.
pub(super) fn build(library: &Library, progress: &Progress) -> Result<(), Error> {
    progress.say("building the helper library");
    let program = std::env::current_exe().map_err(|cause| Error::ProgramMissing {
        program: "gudgeon".to_owned(),
        cause,
    })?;
    let mut command = Command::new(program);
    command
        .arg("build-template")
        .arg(library.folder())
        .stdin(Stdio::null());
    run(command, "building the helper library", |line| {
        if let Some(package) = line.trim_start().strip_prefix("Compiling ") {
            progress.say(&format!("building {package}"));
        }
    })
}

/// The work of that child process.
///
/// It runs one cell and one failing check, because the first of each costs seconds.
pub(crate) fn build_in_this_process(library: &std::path::Path) -> Result<(), Error> {
    let library = Library {
        folder: library.to_path_buf(),
    };
    let folder = SessionFolder::for_template(&library)?;
    let command = crate::session::cell_process_command(&folder, folder.path(), false)?;
    let (mut context, _collector) = start_evcxr(folder.path(), command)?;
    let failed = |error: evcxr::Error| Error::SessionDidNotStart(error.to_string());
    context.execute("let warm = 1;").map_err(failed)?;
    context.check("let cold: () = 1;").map_err(failed)?;
    Ok(())
}

/// Runs a program, passing on each line of its standard error, and fails with the last of them.
fn run(mut command: Command, name: &str, mut line_seen: impl FnMut(&str)) -> Result<(), Error> {
    let missing = |cause| Error::ProgramMissing {
        program: name.to_owned(),
        cause,
    };
    let mut child = command
        .stdout(Stdio::null())
        .stderr(Stdio::piped())
        .spawn()
        .map_err(missing)?;
    let mut said = Vec::new();
    if let Some(stderr) = child.stderr.take() {
        for line in BufReader::new(stderr).lines().map_while(Result::ok) {
            line_seen(&line);
            // What is being compiled is progress; the advice of a child is given by its parent.
            if !line.trim_start().starts_with("Compiling ") && !line.starts_with(" next: ") {
                said.push(line);
            }
        }
    }
    if child.wait().map_err(missing)?.success() {
        return Ok(());
    }
    let skipped = said.len().saturating_sub(SHOWN_LINES);
    Err(Error::ProgramFailed {
        program: name.to_owned(),
        said: said[skipped..].join("\n"),
    })
}
