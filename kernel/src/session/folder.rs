//! The working folder of a session: a copy of the library's template with a configuration of its own.
//!
//! ```text
//! <session>/evcxr.toml           settings, dependency, prelude
//! <session>/.cargo/config.toml   no network, vendored sources, optimised dependencies
//! <session>/crate/               the crate that evcxr writes, and its target folder
//! <session>/lock                 held while the session runs
//! ```

use super::PRELUDE;
use crate::error::Error;
use crate::library::{DataFolder, Library, belongs_to_cells, write};
use std::fs::{self, File};
use std::path::{Path, PathBuf};
use toml::{Table, Value};

/// Packages that only run inside the compiler: optimising them costs more than it saves.
const COMPILE_TIME_ONLY: [&str; 8] = [
    "darling_core",
    "derive_builder_core",
    "proc-macro2",
    "quote",
    "serde_derive",
    "syn",
    "thiserror-impl",
    "unicode-ident",
];

/// A folder that goes away when it is dropped.
#[derive(Debug)]
pub struct SessionFolder {
    path: PathBuf,
    /// Present for a session, absent for a template, which stays.
    held: Option<Held>,
}

#[derive(Debug)]
struct Held {
    _own: File,
    /// Keeps the library from being removed as outdated.
    _library: File,
}

impl SessionFolder {
    /// Makes the folder of a new session, and removes those whose process has ended without doing so.
    ///
    /// # Errors
    /// When the template cannot be copied.
    pub fn create(data: &DataFolder, library: &Library) -> Result<SessionFolder, Error> {
        let _serial = data.lock("sessions.lock", || ())?;
        let sessions = data.sessions();
        fs::create_dir_all(&sessions).map_err(|cause| Error::FolderRefuses {
            folder: sessions.clone(),
            cause,
        })?;
        remove_abandoned(&sessions);
        let in_use = library.held_in_use()?;
        let path = tempfile::Builder::new()
            .prefix("session-")
            .tempdir_in(&sessions)
            .map_err(|cause| Error::FolderRefuses {
                folder: sessions,
                cause,
            })?
            .keep();
        let lock = path.join("lock");
        let own = File::create(&lock)
            .and_then(|file| file.lock().map(|()| file))
            .map_err(|cause| Error::Unwritable { path: lock, cause })?;
        let folder = SessionFolder {
            path,
            held: Some(Held {
                _own: own,
                _library: in_use,
            }),
        };
        folder.configure(library)?;
        let copied = copy_folder(&library.template().join("crate"), &folder.path.join("crate"));
        copied.map_err(|cause| Error::Unwritable {
            path: folder.path.clone(),
            cause,
        })?;
        Ok(folder)
    }

    /// The folder in which a library's template is built.
    pub(crate) fn for_template(library: &Library) -> Result<SessionFolder, Error> {
        let folder = SessionFolder {
            path: library.template(),
            held: None,
        };
        folder.configure(library)?;
        Ok(folder)
    }

    /// The folder itself.
    #[must_use]
    pub fn path(&self) -> &Path {
        &self.path
    }

    fn configure(&self, library: &Library) -> Result<(), Error> {
        let text = |path: &Path| Value::String(path.to_string_lossy().into_owned());

        let mut settings = Table::new();
        settings.insert("tmpdir".to_owned(), text(&self.path.join("crate")));
        settings.insert("offline_mode".to_owned(), Value::Boolean(true));
        settings.insert("opt_level".to_owned(), Value::String("0".to_owned()));
        settings.insert("preserve_vars_on_panic".to_owned(), Value::Boolean(true));
        // Forbidding it fails with dependencies that have build scripts.
        settings.insert("allow_static_linking".to_owned(), Value::Boolean(true));
        settings.insert("prelude".to_owned(), Value::String(PRELUDE.to_owned()));
        let worksheets = text(&library.sources().join("worksheets"));
        let mut evcxr = Table::new();
        evcxr.insert("evcxr".to_owned(), Value::Table(settings));
        evcxr.insert(
            "dependencies".to_owned(),
            table([("worksheets", table([("path", worksheets)]))]),
        );
        write_toml(&self.path.join("evcxr.toml"), &evcxr)?;

        let crates_io = table([("replace-with", Value::String("vendored".to_owned()))]);
        let vendored = table([("directory", text(&library.vendored()))]);
        let level = |level| table([("opt-level", Value::Integer(level))]);
        let mut packages = Table::new();
        packages.insert("*".to_owned(), level(2));
        for name in COMPILE_TIME_ONLY {
            packages.insert(name.to_owned(), level(0));
        }
        let mut cargo = Table::new();
        cargo.insert("net".to_owned(), table([("offline", Value::Boolean(true))]));
        cargo.insert(
            "source".to_owned(),
            table([("crates-io", crates_io), ("vendored", vendored)]),
        );
        cargo.insert(
            "profile".to_owned(),
            table([("dev", table([("package", Value::Table(packages))]))]),
        );
        write_toml(&self.path.join(".cargo/config.toml"), &cargo)
    }
}

impl Drop for SessionFolder {
    fn drop(&mut self) {
        if self.held.is_some() {
            // What cannot be removed now is removed when the next session starts.
            let _ = fs::remove_dir_all(&self.path);
        }
    }
}

fn table<const N: usize>(entries: [(&str, Value); N]) -> Value {
    Value::Table(Table::from_iter(
        entries.map(|(name, value)| (name.to_owned(), value)),
    ))
}

fn write_toml(path: &Path, content: &Table) -> Result<(), Error> {
    let text = toml::to_string(content).expect("invariant: a table of plain values can be written");
    write(path, text.as_bytes())
}

/// Removes the sessions whose lock nobody holds.
fn remove_abandoned(sessions: &Path) {
    let Ok(entries) = fs::read_dir(sessions) else {
        return;
    };
    for entry in entries.flatten() {
        let free = match File::open(entry.path().join("lock")) {
            Ok(lock) => lock.try_lock().is_ok(),
            Err(_) => true,
        };
        if free {
            let _ = fs::remove_dir_all(entry.path());
        }
    }
}

/// Copies a folder with its times, by which cargo judges what is up to date.
///
/// What was compiled for other crates than that of the cells is never written again: a second name for it is enough,
/// and spares each session some hundred megabytes.
fn copy_folder(from: &Path, to: &Path) -> std::io::Result<()> {
    let mut waiting = vec![(from.to_path_buf(), to.to_path_buf())];
    while let Some((from, to)) = waiting.pop() {
        fs::create_dir_all(&to)?;
        let compiled = from.ends_with("deps");
        for entry in fs::read_dir(&from)? {
            let entry = entry?;
            let target = to.join(entry.file_name());
            if entry.file_type()?.is_dir() {
                waiting.push((entry.path(), target));
                continue;
            }
            let linked =
                compiled && !belongs_to_cells(&target) && fs::hard_link(entry.path(), &target).is_ok();
            if !linked {
                fs::copy(entry.path(), &target)?;
                let modified = entry.metadata()?.modified()?;
                File::options()
                    .write(true)
                    .open(&target)?
                    .set_modified(modified)?;
            }
        }
    }
    Ok(())
}

#[cfg(test)]
mod tests {
    use super::*;
    use std::time::{Duration, SystemTime};

    #[test]
    fn a_copy_keeps_the_times() {
        let outer = tempfile::tempdir().unwrap();
        let from = outer.path().join("from");
        let file = from.join("deep/file");
        write(&file, b"content").unwrap();
        let time = SystemTime::UNIX_EPOCH + Duration::from_secs(1_000_000_000);
        File::options()
            .write(true)
            .open(&file)
            .unwrap()
            .set_modified(time)
            .unwrap();
        let to = outer.path().join("to");
        copy_folder(&from, &to).unwrap();
        let copy = to.join("deep/file");
        assert_eq!(fs::read(&copy).unwrap(), b"content");
        assert_eq!(fs::metadata(&copy).unwrap().modified().unwrap(), time);
    }

    #[test]
    fn only_the_outputs_of_cells_are_copies() {
        use std::os::unix::fs::MetadataExt;
        let outer = tempfile::tempdir().unwrap();
        let from = outer.path().join("from");
        let to = outer.path().join("to");
        let names = ["deps/libcas-1.rlib", "deps/libctx-2.so", "deps/ctx-2.d", "state"];
        for name in names {
            write(&from.join(name), b"content").unwrap();
        }
        copy_folder(&from, &to).unwrap();
        let shared = names.map(|name| fs::metadata(to.join(name)).unwrap().nlink() == 2);
        assert_eq!(shared, [true, false, false, false]);
    }

    #[test]
    fn only_abandoned_sessions_are_removed() {
        let outer = tempfile::tempdir().unwrap();
        let running = outer.path().join("running");
        let abandoned = outer.path().join("abandoned");
        write(&running.join("lock"), b"").unwrap();
        write(&abandoned.join("lock"), b"").unwrap();
        let held = File::open(running.join("lock")).unwrap();
        held.lock().unwrap();
        remove_abandoned(outer.path());
        assert!(running.exists());
        assert!(!abandoned.exists());
    }
}
