//! Files that cannot be run: one clear error each, and no file is changed.

use std::path::Path;

use anyhow::{Result, ensure};
use serde_json::json;

use super::worksheet::{folder, notebook, run, written};

/// Runs the program and asks for exit code 2, these words, and the next step.
fn refused(arguments: &[&str], folder: &Path, words: &[&str]) -> Result<()> {
    let found = run(arguments, folder)?;
    ensure!(found.code == Some(2), "{arguments:?}: {}", found.said());
    for word in words.iter().chain(&["next:"]) {
        ensure!(
            found.stderr.contains(word),
            "{arguments:?}: `{word}` is missing in\n{}",
            found.said()
        );
    }
    ensure!(!found.stderr.contains("panicked"), "{}", found.said());
    Ok(())
}

#[test]
fn files_that_are_no_worksheets_are_named() -> Result<()> {
    let folder = folder("files")?;
    refused(
        &["run", "nowhere.ipynb"],
        &folder,
        &["there is no file", "nowhere.ipynb"],
    )?;
    refused(&["run", "."], &folder, &["is a folder"])?;

    let text = "this is a letter, not a notebook";
    std::fs::write(folder.join("letter.ipynb"), text)?;
    refused(&["run", "letter.ipynb"], &folder, &["letter.ipynb", "not JSON"])?;
    ensure!(std::fs::read_to_string(folder.join("letter.ipynb"))? == text);

    let mut other = notebook(&["1 + 1"]);
    other["metadata"]["kernelspec"]["name"] = json!("python3");
    let path = written(&folder, "other.ipynb", &other)?;
    let before = std::fs::read(&path)?;
    refused(&["run", "other.ipynb"], &folder, &["python3", "not of `gudgeon`"])?;
    ensure!(std::fs::read(&path)? == before);

    let mut nameless = notebook(&["1 + 1"]);
    nameless["metadata"] = json!({});
    written(&folder, "nameless.ipynb", &nameless)?;
    refused(
        &["run", "nameless.ipynb"],
        &folder,
        &["nameless.ipynb", "names no kernel"],
    )?;

    let mut old = notebook(&["1 + 1"]);
    old["nbformat"] = json!(3);
    written(&folder, "old.ipynb", &old)?;
    refused(&["run", "old.ipynb"], &folder, &["old.ipynb", "format 3"])?;

    written(&folder, "list.ipynb", &json!([1, 2]))?;
    refused(&["run", "list.ipynb"], &folder, &["is not a notebook"])?;
    Ok(())
}

#[test]
fn places_that_cannot_be_written_are_refused_before_anything_runs() -> Result<()> {
    let folder = folder("places")?;
    let path = written(&folder, "sheet.ipynb", &notebook(&["let one = 1;"]))?;
    let before = std::fs::read(&path)?;
    std::fs::write(folder.join("file"), "in the way")?;
    refused(
        &["run", "sheet.ipynb", "--output", "missing/out.ipynb"],
        &folder,
        &["missing", "make the folder first"],
    )?;
    refused(
        &["run", "sheet.ipynb", "--output", "file/out.ipynb"],
        &folder,
        &["file", "name a folder"],
    )?;
    // What the system itself keeps anybody, root included, from writing to.
    if Path::new("/proc/self").exists() {
        refused(
            &["run", "sheet.ipynb", "--output", "/proc/out.ipynb"],
            &folder,
            &["/proc"],
        )?;
    }
    refused(
        &["install", "--prefix", "file"],
        &folder,
        &["file", "is not a folder"],
    )?;

    let mut permissions = std::fs::metadata(&path)?.permissions();
    permissions.set_readonly(true);
    std::fs::set_permissions(&path, permissions)?;
    refused(
        &["run", "sheet.ipynb"],
        &folder,
        &["sheet.ipynb", "read-only", "--output"],
    )?;

    ensure!(std::fs::read_to_string(folder.join("file"))? == "in the way");
    ensure!(std::fs::read(&path)? == before);
    ensure!(
        std::fs::read_dir(&folder)?.count() == 2,
        "a refused run left a file"
    );
    Ok(())
}

#[test]
fn the_command_line_explains_itself() -> Result<()> {
    let folder = folder("usage")?;
    for arguments in [&["run"][..], &["fly"], &[]] {
        let found = run(arguments, &folder)?;
        ensure!(found.code == Some(2), "{arguments:?}: {}", found.said());
        ensure!(found.stderr.contains("Usage"), "{arguments:?}: {}", found.said());
    }
    let help = run(&["--help"], &folder)?;
    for command in ["run", "install", "uninstall", "lab", "doctor"] {
        ensure!(help.stdout.contains(command), "{}", help.said());
    }
    Ok(())
}
