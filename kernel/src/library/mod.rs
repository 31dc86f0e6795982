//! The prepared helper library: written, built and warmed once, then copied for every session.
//!
//! | word | meaning |
//! |---|---|
//! | data folder | where this program keeps what it prepares |
//! | library | one folder in it, named by the hash of all that determines its content |
//! | template | an evcxr working folder in which the helper library is already built |
//!
//! A library without its stamp is unfinished: it is thrown away and built again.
//! It is built at its final path, because cargo's fingerprints contain that path.

mod data_folder;
mod sources;
mod template;
mod trim;

pub use data_folder::DataFolder;
pub(crate) use sources::GALLERY;
pub use sources::content_hash;
pub(crate) use template::build_in_this_process;
pub(crate) use trim::belongs_to_cells;

use crate::error::Error;
use crate::progress::Progress;
use std::fs::{self, File};
use std::path::{Path, PathBuf};

/// The name of the file that is written last.
const STAMP: &str = "ready";

/// A helper library that is ready to be used.
#[derive(Debug, Clone)]
pub struct Library {
    folder: PathBuf,
}

impl Library {
    /// The library of this program and this compiler, if it is prepared.
    ///
    /// # Errors
    /// When the compiler cannot be asked for its version.
    pub fn find(data: &DataFolder) -> Result<Option<Library>, Error> {
        let folder = data.libraries().join(content_hash(data)?);
        Ok(folder.join(STAMP).is_file().then_some(Library { folder }))
    }

    /// The library of this program and this compiler, prepared now if it was not.
    ///
    /// Two processes that come here at once do the work once: the second waits.
    /// Libraries of other contents are removed afterwards.
    ///
    /// # Errors
    /// When the folder cannot be written, or the library does not build.
    pub fn prepare(data: &DataFolder, progress: &Progress) -> Result<Library, Error> {
        if let Some(ready) = Self::find(data)? {
            return Ok(ready);
        }
        let held = data.lock("library.lock", || {
            progress.say("waiting for another process that is preparing the helper library");
        })?;
        // Processes started from here hold the lock too: if this one is killed, the next waits for its compilers.
        let _ = rustix::io::fcntl_setfd(&held, rustix::io::FdFlags::empty());
        if let Some(ready) = Self::find(data)? {
            return Ok(ready);
        }
        let hash = content_hash(data)?;
        let folder = data.libraries().join(&hash);
        remove_unused(&data.libraries(), Some(&hash));
        if folder.exists() {
            fs::remove_dir_all(&folder).map_err(|cause| Error::Unwritable {
                path: folder.clone(),
                cause,
            })?;
        }
        progress.say("preparing the helper library (once for this version)");
        let library = Library { folder };
        sources::write(&library.sources())?;
        template::vendor(&library, progress)?;
        template::build(&library, progress)?;
        trim::trim(&library)?;
        write(&library.folder.join(STAMP), b"")?;
        Ok(library)
    }

    /// Removes every library that no session uses, and says how many there were.
    ///
    /// # Errors
    /// When the data folder cannot be locked.
    pub fn remove_all(data: &DataFolder) -> Result<usize, Error> {
        let _held = data.lock("library.lock", || ())?;
        let removed = remove_unused(&data.libraries(), None);
        // Succeeds only if nothing is left in it.
        let _ = fs::remove_dir(data.libraries());
        Ok(removed)
    }

    /// The folder of the workspace with the crates `cas` and `worksheets`.
    #[must_use]
    pub fn sources(&self) -> PathBuf {
        self.folder.join("sources")
    }

    /// The folder with the third-party sources.
    #[must_use]
    pub fn vendored(&self) -> PathBuf {
        self.folder.join("vendored")
    }

    /// The evcxr working folder in which everything is built.
    #[must_use]
    pub fn template(&self) -> PathBuf {
        self.folder.join("template")
    }

    /// Says that the library is in use until the returned file is dropped.
    pub(crate) fn held_in_use(&self) -> Result<File, Error> {
        let path = self.folder.join(STAMP);
        File::open(&path)
            .and_then(|file| file.lock_shared().map(|()| file))
            .map_err(|cause| Error::Unreadable { path, cause })
    }

    /// The library's own folder.
    #[must_use]
    pub fn folder(&self) -> &Path {
        &self.folder
    }
}

/// Removes libraries that no session builds against, except the one to keep, and counts them.
fn remove_unused(libraries: &Path, keep: Option<&str>) -> usize {
    let Ok(entries) = fs::read_dir(libraries) else {
        return 0;
    };
    let mut removed = 0;
    for entry in entries.flatten() {
        if keep.is_some_and(|keep| entry.file_name() == keep) {
            continue;
        }
        let in_use = File::open(entry.path().join(STAMP)).is_ok_and(|stamp| stamp.try_lock().is_err());
        if !in_use && fs::remove_dir_all(entry.path()).is_ok() {
            removed += 1;
        }
    }
    removed
}

/// Writes a file and the folders above it.
pub(crate) fn write(path: &Path, content: &[u8]) -> Result<(), Error> {
    let written = match path.parent() {
        Some(folder) => fs::create_dir_all(folder).and_then(|()| fs::write(path, content)),
        None => fs::write(path, content),
    };
    written.map_err(|cause| Error::Unwritable {
        path: path.to_path_buf(),
        cause,
    })
}
