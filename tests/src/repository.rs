//! The repository as the checks see it: its root, the files that belong to it, and its build folder.

use std::path::{Path, PathBuf};
use std::process::Command;

use anyhow::{Context, Result, bail};

/// The root of the repository.
///
/// # Panics
/// Never: cargo puts this package one folder below the root.
#[must_use]
pub fn root() -> &'static Path {
    Path::new(env!("CARGO_MANIFEST_DIR"))
        .parent()
        .expect("invariant: this package lies one folder below the root")
}

/// The files that belong to the repository, relative to its root and in order: those that are
/// tracked and those that would be added.
///
/// # Errors
/// Git is missing or this is no clone.
pub fn files() -> Result<Vec<PathBuf>> {
    let output = Command::new("git")
        .args(["ls-files", "-z", "--cached", "--others", "--exclude-standard"])
        .current_dir(root())
        .output()
        .context("git lists the files of the repository; is it installed?")?;
    if !output.status.success() {
        bail!("git ls-files: {}", String::from_utf8_lossy(&output.stderr));
    }
    let listed = String::from_utf8(output.stdout)?;
    let mut files: Vec<PathBuf> = listed
        .split_terminator('\0')
        .map(PathBuf::from)
        // A file that was deleted but not yet committed is still listed.
        .filter(|file| root().join(file).is_file())
        .collect();
    files.sort();
    files.dedup();
    Ok(files)
}

/// The files of one language, by their ending, with their text.
///
/// # Errors
/// As [`files`]; a file that is no text.
pub fn texts(ending: &str) -> Result<Vec<(PathBuf, String)>> {
    let chosen = files()?
        .into_iter()
        .filter(|file| file.extension().is_some_and(|found| found == ending));
    chosen
        .map(|file| {
            let text = std::fs::read_to_string(root().join(&file))
                .with_context(|| format!("reading {}", file.display()))?;
            Ok((file, text))
        })
        .collect()
}

/// The build folder that this test program was built in, and the profile's folder in it.
///
/// # Errors
/// The program does not lie where cargo puts it.
pub fn build_folder() -> Result<(PathBuf, String)> {
    let program = std::env::current_exe()?;
    // <target>/<profile>/deps/<program>
    let folder = program.parent().and_then(Path::parent);
    let name = folder.and_then(Path::file_name).and_then(|name| name.to_str());
    match (folder.and_then(Path::parent), name) {
        (Some(target), Some(profile)) => Ok((target.to_owned(), profile.to_owned())),
        _ => bail!("{} is not in a build folder of cargo", program.display()),
    }
}
