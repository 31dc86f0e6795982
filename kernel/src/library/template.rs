//! Builds a library's template: an evcxr working folder in which everything a first cell needs is compiled.

use super::Library;
use crate::error::Error;
use crate::progress::Progress;
use crate::session::{SessionFolder, start_evcxr};
use serde_json::Value;
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
            said.extend(complaint(&line));
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

/// What a line says about a failure, for a person.
///
/// What is being compiled is progress, and the advice of a child is given by its parent.
/// evcxr repeats all that cargo told it as JSON; only errors of the compiler are for people in that.
fn complaint(line: &str) -> Vec<String> {
    let line = line.strip_prefix("STDOUT:").unwrap_or(line);
    if line.starts_with('{') {
        let told: Value = serde_json::from_str(line).unwrap_or_default();
        let rendered = told["message"]["rendered"].as_str().unwrap_or_default();
        let is_error = told["message"]["level"] == "error";
        return rendered.lines().filter(|_| is_error).map(str::to_owned).collect();
    }
    let start = line.trim_start();
    let silent = start.is_empty() || start.starts_with("Compiling ") || line.starts_with(" next: ");
    if silent { Vec::new() } else { vec![line.to_owned()] }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn only_errors_are_told() {
        for silent in [
            "   Compiling one v1.0.0",
            "",
            " next: run `gudgeon doctor`",
            r#"STDOUT:{"reason":"compiler-artifact","package_id":"one"}"#,
            r#"{"reason":"compiler-message","message":{"level":"warning","rendered":"unused"}}"#,
            "{cut off",
        ] {
            assert_eq!(complaint(silent), Vec::<String>::new(), "{silent}");
        }
        assert_eq!(
            complaint("error: linker `cc` not found"),
            ["error: linker `cc` not found"]
        );
        let message = r#"{"message":{"level":"error","rendered":"error: no `x`\n --> here\n"}}"#;
        assert_eq!(complaint(message), ["error: no `x`", " --> here"]);
    }
}
