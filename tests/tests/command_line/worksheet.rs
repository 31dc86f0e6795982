//! Worksheets made for a check, and what running one left behind.

use std::path::{Path, PathBuf};
use std::process::{Command, Output};

use anyhow::{Context, Result};
use serde_json::{Value, json};
use tests::program::{at_home, empty_workshop, gudgeon, workshop};

/// What a run said and left.
pub(crate) struct Run {
    pub(crate) code: Option<i32>,
    pub(crate) stdout: String,
    pub(crate) stderr: String,
}

impl Run {
    fn of(output: Output) -> Self {
        let text = |bytes: Vec<u8>| String::from_utf8_lossy(&bytes).into_owned();
        Self {
            code: output.status.code(),
            stdout: text(output.stdout),
            stderr: text(output.stderr),
        }
    }

    /// Everything that was said.
    pub(crate) fn said(&self) -> String {
        format!("exit code {:?}\n{}\n{}", self.code, self.stdout, self.stderr)
    }
}

/// Runs the program with a home of its own and the data folder that all checks share.
pub(crate) fn run(arguments: &[&str], folder: &Path) -> Result<Run> {
    run_with_data(arguments, folder, &workshop("data")?)
}

/// The same with another data folder.
pub(crate) fn run_with_data(arguments: &[&str], folder: &Path, data: &Path) -> Result<Run> {
    let mut command = command(arguments, folder)?;
    command.env("GUDGEON_DATA_DIR", data);
    finished(command)
}

/// The same on a machine that has no other program.
pub(crate) fn run_where_no_program_is(arguments: &[&str], folder: &Path) -> Result<Run> {
    let mut command = command(arguments, folder)?;
    command.env("PATH", empty_workshop("command_line/no-programs")?);
    command.env("GUDGEON_DATA_DIR", folder.join("data"));
    finished(command)
}

fn command(arguments: &[&str], folder: &Path) -> Result<Command> {
    let mut command = Command::new(gudgeon()?);
    command.args(arguments).current_dir(folder);
    at_home(&mut command, &workshop("command_line/home")?)?;
    Ok(command)
}

fn finished(mut command: Command) -> Result<Run> {
    let output = command.output().context("starting the program")?;
    Ok(Run::of(output))
}

/// An empty folder for one check.
pub(crate) fn folder(name: &str) -> Result<PathBuf> {
    empty_workshop(&format!("command_line/{name}"))
}

/// A notebook of these code cells.
pub(crate) fn notebook(cells: &[&str]) -> Value {
    let cells: Vec<Value> = cells
        .iter()
        .enumerate()
        .map(|(place, source)| {
            json!({
                "cell_type": "code",
                "execution_count": null,
                "id": format!("cell-{place}"),
                "metadata": {},
                "outputs": [],
                "source": [source],
            })
        })
        .collect();
    json!({
        "cells": cells,
        "metadata": {"kernelspec": {"display_name": "Gudgeon", "language": "rust", "name": "gudgeon"}},
        "nbformat": 4,
        "nbformat_minor": 5,
    })
}

/// Writes a notebook and returns its path.
pub(crate) fn written(folder: &Path, name: &str, notebook: &Value) -> Result<PathBuf> {
    let path = folder.join(name);
    std::fs::write(&path, serde_json::to_string_pretty(notebook)?)?;
    Ok(path)
}

/// The outputs of the code cell of this place, as text.
pub(crate) fn outputs(path: &Path, place: usize) -> Result<Vec<Value>> {
    let notebook: Value = serde_json::from_str(&std::fs::read_to_string(path)?)?;
    let cells = notebook["cells"].as_array().context("cells")?;
    let mut code = cells.iter().filter(|cell| cell["cell_type"] == "code");
    let cell = code.nth(place).context("a code cell of this place")?;
    Ok(cell["outputs"].as_array().context("outputs")?.clone())
}
