//! Fetches the script, style sheet and fonts that typeset formulas, and puts them into the kernelspec folder.
//!
//! They are third-party files: pinned here by version and checksum, fetched at installation, and never committed.
//! Every Jupyter server hands out the files of a kernelspec folder, so notebooks need no copy of them.

use super::Typesetting;
use crate::error::Error;
use crate::library::write;
use crate::progress::Progress;
use std::fs;
use std::io;
use std::path::Path;
use std::process::{Command, Stdio};

const PACKAGE: &[u8] = include_bytes!("../../katex/package.json");
const LOCK: &[u8] = include_bytes!("../../katex/package-lock.json");

/// The folder in the kernelspec, and the copy of the lock by which its content is known.
const FOLDER: &str = "katex";
const LOCK_NAME: &str = "package-lock.json";

/// Whether a kernelspec holds the typesetter of this version.
pub(super) fn is_in(kernelspec: &Path) -> bool {
    fs::read(kernelspec.join(FOLDER).join(LOCK_NAME)).is_ok_and(|lock| lock == LOCK)
}

/// Puts the typesetter into `fresh`: from the earlier kernelspec if that has it, else from npm.
///
/// That npm or the network is missing is no error: formulas are then shown with what the page itself offers.
pub(super) fn place(earlier: &Path, fresh: &Path, progress: &Progress) -> Result<Typesetting, Error> {
    let target = fresh.join(FOLDER);
    let written = if is_in(earlier) {
        copy_files(&earlier.join(FOLDER), &target)
    } else {
        progress.say("fetching the typesetter of formulas with npm");
        let working = tempfile::tempdir().map_err(|cause| Error::FolderRefuses {
            folder: std::env::temp_dir(),
            cause,
        })?;
        if let Err(reason) = fetch(working.path())? {
            return Ok(Typesetting::Plain(reason));
        }
        copy_files(&working.path().join("node_modules/katex/dist"), &target)
    };
    written.map_err(|cause| Error::Unwritable {
        path: target.clone(),
        cause,
    })?;
    write(&target.join(LOCK_NAME), LOCK)?;
    Ok(Typesetting::Ready)
}

/// Runs npm; the inner error is the reason why there is nothing to install.
fn fetch(folder: &Path) -> Result<Result<(), String>, Error> {
    write(&folder.join("package.json"), PACKAGE)?;
    write(&folder.join(LOCK_NAME), LOCK)?;
    let ran = Command::new("npm")
        .args(["ci", "--ignore-scripts", "--no-audit", "--no-fund"])
        .args(["--fetch-retries=1", "--fetch-timeout=60000"])
        .current_dir(folder)
        .stdin(Stdio::null())
        .output();
    Ok(match ran {
        Err(cause) => Err(format!("npm cannot be started ({cause})")),
        Ok(output) if output.status.success() => Ok(()),
        Ok(output) => {
            let said = String::from_utf8_lossy(&output.stderr);
            let lines = said.lines().filter(|line| !line.trim().is_empty());
            let first = lines.take(3).collect::<Vec<_>>().join("; ");
            Err(format!("npm could not fetch it ({first})"))
        }
    })
}

/// Copies what a page loads: the two small files and the fonts in their smallest form.
fn copy_files(from: &Path, to: &Path) -> io::Result<()> {
    fs::create_dir_all(to.join("fonts"))?;
    for name in ["katex.min.css", "katex.min.js"] {
        fs::copy(from.join(name), to.join(name))?;
    }
    for entry in fs::read_dir(from.join("fonts"))? {
        let path = entry?.path();
        let Some(name) = path.file_name() else {
            continue;
        };
        if path.extension().is_some_and(|kind| kind == "woff2") {
            fs::copy(&path, to.join("fonts").join(name))?;
        }
    }
    Ok(())
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_typesetter_is_pinned_by_checksum_and_names_no_host() {
        let lock: serde_json::Value = serde_json::from_slice(LOCK).unwrap();
        let katex = &lock["packages"]["node_modules/katex"];
        assert_eq!(katex["version"], "0.16.4");
        let integrity = katex["integrity"].as_str().unwrap();
        assert!(integrity.starts_with("sha512-"), "{integrity}");
        assert!(!String::from_utf8_lossy(LOCK).contains("http"));
    }

    #[test]
    fn an_earlier_copy_is_used_again() {
        let outer = tempfile::tempdir().unwrap();
        let earlier = outer.path().join("earlier");
        let fresh = outer.path().join("fresh");
        for name in ["katex.min.css", "katex.min.js", "fonts/a.woff2", "fonts/a.ttf"] {
            write(&earlier.join(FOLDER).join(name), name.as_bytes()).unwrap();
        }
        assert!(!is_in(&earlier));
        write(&earlier.join(FOLDER).join(LOCK_NAME), LOCK).unwrap();
        let placed = place(&earlier, &fresh, &Progress::of_unknown_length()).unwrap();
        assert_eq!(placed, Typesetting::Ready);
        assert!(is_in(&fresh));
        assert!(fresh.join("katex/fonts/a.woff2").exists());
        assert!(!fresh.join("katex/fonts/a.ttf").exists());
    }
}
