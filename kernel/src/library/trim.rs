//! Takes away from a library that is built what no session needs, so that sessions start sooner.

use super::Library;
use crate::error::Error;
use std::ffi::OsStr;
use std::fs::{self, File};
use std::io;
use std::path::{Path, PathBuf};

/// Third-party crates whose types stand in signatures of the helper library, and what those types are made of.
///
/// The analysis of cells finds the types of variables in their sources.
const IN_SIGNATURES: [&str; 3] = ["num-bigint", "num-integer", "num-traits"];

/// Empties the sources of third-party crates and drops what would make a second build of the library faster.
///
/// The analysis of cells reads the sources of all crates whenever a session starts: with those of the third parties
/// that costs some twenty seconds of processor time, and not one of their names can stand in a cell.
/// They are compiled already; cargo compares the checksum of a package and the times of files, which stay as they are.
pub(super) fn trim(library: &Library) -> Result<(), Error> {
    let unwritable = |cause| Error::Unwritable {
        path: library.folder().to_path_buf(),
        cause,
    };
    for package in folders_in(&library.vendored()).map_err(unwritable)? {
        let kept = package
            .file_name()
            .and_then(OsStr::to_str)
            .is_some_and(|name| IN_SIGNATURES.contains(&name));
        if !kept {
            empty_sources(&package).map_err(unwritable)?;
        }
    }
    drop_incremental(&library.template().join("crate/target")).map_err(unwritable)
}

/// Empties every Rust source below a folder; each keeps the time of its last change.
fn empty_sources(folder: &Path) -> io::Result<()> {
    let mut waiting = vec![folder.to_path_buf()];
    while let Some(folder) = waiting.pop() {
        for entry in fs::read_dir(&folder)? {
            let path = entry?.path();
            if path.is_dir() {
                waiting.push(path);
            } else if path.extension().is_some_and(|kind| kind == "rs") {
                let modified = fs::metadata(&path)?.modified()?;
                File::create(&path)?.set_modified(modified)?;
            }
        }
    }
    Ok(())
}

/// Removes the state of incremental builds except that of the crate of the cells.
fn drop_incremental(target: &Path) -> io::Result<()> {
    let mut waiting = vec![target.to_path_buf()];
    while let Some(folder) = waiting.pop() {
        for inner in folders_in(&folder)? {
            if inner.file_name().is_some_and(|name| name == "incremental") {
                for state in folders_in(&inner)? {
                    if !belongs_to_cells(&state) {
                        fs::remove_dir_all(state)?;
                    }
                }
            } else {
                waiting.push(inner);
            }
        }
    }
    Ok(())
}

/// Whether cargo or rustc made this for the crate that evcxr writes the cells into.
pub(crate) fn belongs_to_cells(path: &Path) -> bool {
    let name = path.file_name().and_then(OsStr::to_str).unwrap_or_default();
    name.trim_start_matches("lib").starts_with("ctx")
}

fn folders_in(folder: &Path) -> io::Result<Vec<PathBuf>> {
    let mut folders = Vec::new();
    for entry in fs::read_dir(folder)? {
        let entry = entry?;
        if entry.file_type()?.is_dir() {
            folders.push(entry.path());
        }
    }
    Ok(folders)
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::library::write;
    use std::time::{Duration, SystemTime};

    #[test]
    fn sources_become_empty_and_keep_their_time() {
        let outer = tempfile::tempdir().unwrap();
        let source = outer.path().join("src/deep/lib.rs");
        let manifest = outer.path().join("Cargo.toml");
        write(&source, b"fn f() {}").unwrap();
        write(&manifest, b"[package]").unwrap();
        let time = SystemTime::UNIX_EPOCH + Duration::from_secs(1_000_000_000);
        let file = File::options().write(true).open(&source).unwrap();
        file.set_modified(time).unwrap();
        empty_sources(outer.path()).unwrap();
        assert_eq!(fs::read(&source).unwrap(), b"");
        assert_eq!(fs::metadata(&source).unwrap().modified().unwrap(), time);
        assert_eq!(fs::read(&manifest).unwrap(), b"[package]");
    }

    #[test]
    fn only_the_cells_keep_their_incremental_state() {
        let outer = tempfile::tempdir().unwrap();
        let states = outer.path().join("machine/debug/incremental");
        for name in ["ctx-1", "worksheets-2", "cas-3"] {
            write(&states.join(name).join("state"), b"").unwrap();
        }
        drop_incremental(outer.path()).unwrap();
        let left = folders_in(&states).unwrap();
        assert_eq!(left, [states.join("ctx-1")]);
    }
}
