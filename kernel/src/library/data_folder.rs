//! The folder in which this program keeps prepared libraries, sessions and its own JupyterLab.

use crate::error::Error;
use std::fs::{self, File};
use std::path::{Path, PathBuf};

/// The data folder: `$GUDGEON_DATA_DIR`, else `$XDG_DATA_HOME/gudgeon`, else `~/.local/share/gudgeon`.
///
/// The same rule holds on every system: the usual place on macOS has a space in its name, which evcxr cannot use.
#[derive(Debug, Clone)]
pub struct DataFolder {
    root: PathBuf,
}

impl DataFolder {
    /// Finds the folder and makes it.
    ///
    /// # Errors
    /// When no home folder is known, the name has a space, or the folder cannot be made.
    pub fn open() -> Result<DataFolder, Error> {
        let named = |variable: &str| {
            std::env::var_os(variable)
                .map(PathBuf::from)
                .filter(|path| path.is_absolute())
        };
        let root = named("GUDGEON_DATA_DIR")
            .or_else(|| named("XDG_DATA_HOME").map(|folder| folder.join("gudgeon")))
            .or_else(|| dirs::home_dir().map(|home| home.join(".local/share/gudgeon")))
            .ok_or(Error::NoHome)?;
        Self::at(root)
    }

    /// The data folder at a given place.
    ///
    /// # Errors
    /// When the name has a space, or the folder cannot be made.
    pub fn at(root: PathBuf) -> Result<DataFolder, Error> {
        let usable = root
            .to_str()
            .is_some_and(|name| !name.contains(char::is_whitespace));
        if !usable {
            return Err(Error::UnusableDataFolder(root));
        }
        fs::create_dir_all(&root).map_err(|cause| Error::FolderRefuses {
            folder: root.clone(),
            cause,
        })?;
        Ok(DataFolder { root })
    }

    /// The folder itself.
    #[must_use]
    pub fn path(&self) -> &Path {
        &self.root
    }

    /// Where libraries lie.
    #[must_use]
    pub fn libraries(&self) -> PathBuf {
        self.root.join("library")
    }

    /// Where sessions lie while they run.
    #[must_use]
    pub fn sessions(&self) -> PathBuf {
        self.root.join("sessions")
    }

    /// Where this program's own JupyterLab lies, if it had to install one.
    #[must_use]
    pub fn own_jupyter(&self) -> PathBuf {
        self.root.join("jupyterlab")
    }

    /// Holds a lock among processes until the returned file is dropped; `waiting` is called once if another has it.
    ///
    /// # Errors
    /// When the lock file cannot be made.
    pub fn lock(&self, name: &str, waiting: impl FnOnce()) -> Result<File, Error> {
        let path = self.root.join(name);
        let unwritable = |cause| Error::Unwritable {
            path: path.clone(),
            cause,
        };
        let file = File::options()
            .create(true)
            .truncate(false)
            .write(true)
            .open(&path)
            .map_err(unwritable)?;
        if file.try_lock().is_err() {
            waiting();
            file.lock().map_err(unwritable)?;
        }
        Ok(file)
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_name_with_a_space_is_refused() {
        let outer = tempfile::tempdir().unwrap();
        let error = DataFolder::at(outer.path().join("my data")).unwrap_err();
        assert!(matches!(error, Error::UnusableDataFolder(_)));
    }

    #[test]
    fn a_lock_is_held_until_it_is_dropped() {
        let outer = tempfile::tempdir().unwrap();
        let data = DataFolder::at(outer.path().join("data")).unwrap();
        let held = data.lock("a.lock", || panic!("nobody else is here")).unwrap();
        let second = File::open(data.path().join("a.lock")).unwrap();
        assert!(second.try_lock().is_err());
        drop(held);
        assert!(second.try_lock().is_ok());
    }
}
