//! Where a notebook is read from and written to: checked before the run, replaced in one step after it.

use crate::error::Error;
use std::fs::{self, Permissions};
use std::io::Write;
use std::path::{Path, PathBuf};

/// Fails unless there is a file.
pub(super) fn must_be_file(path: &Path) -> Result<(), Error> {
    match fs::metadata(path) {
        Ok(found) if found.is_dir() => Err(Error::IsFolder(path.to_path_buf())),
        Ok(_) => Ok(()),
        Err(cause) if cause.kind() == std::io::ErrorKind::NotFound => {
            Err(Error::MissingFile(path.to_path_buf()))
        }
        Err(cause) => Err(Error::Unreadable {
            path: path.to_path_buf(),
            cause,
        }),
    }
}

/// The same path from the root, because the current folder changes when a session starts.
///
/// # Errors
/// When the current folder is gone.
pub fn absolute(path: &Path) -> Result<PathBuf, Error> {
    std::path::absolute(path).map_err(|cause| Error::Unreadable {
        path: path.to_path_buf(),
        cause,
    })
}

/// A file that can be written.
#[derive(Debug)]
pub struct Destination {
    path: PathBuf,
    folder: PathBuf,
    /// Those of the file that will be replaced, if there is one.
    permissions: Option<Permissions>,
}

impl Destination {
    /// Checks that `path` can be written, before any work is done for it.
    ///
    /// A link is followed: the file behind it is replaced, not the link.
    ///
    /// # Errors
    /// When it is a folder, is marked read-only, or its folder refuses new files.
    pub fn check(path: &Path) -> Result<Destination, Error> {
        let path = fs::canonicalize(path).unwrap_or_else(|_| path.to_path_buf());
        let permissions = match fs::metadata(&path) {
            Ok(found) if found.is_dir() => return Err(Error::IsFolder(path)),
            Ok(found) if found.permissions().readonly() => return Err(Error::ReadOnly(path)),
            Ok(found) => Some(found.permissions()),
            Err(_) => None,
        };
        let folder = path
            .parent()
            .filter(|folder| !folder.as_os_str().is_empty())
            .map_or_else(|| PathBuf::from("."), Path::to_path_buf);
        let destination = Destination {
            path,
            folder,
            permissions,
        };
        destination.temporary_file().map(drop)?;
        Ok(destination)
    }

    /// The file.
    #[must_use]
    pub fn path(&self) -> &Path {
        &self.path
    }

    /// Replaces the file in one step: whoever reads it sees the old or the new content, never a part.
    ///
    /// # Errors
    /// When the disk refuses.
    pub fn write(&self, bytes: &[u8]) -> Result<(), Error> {
        let mut file = self.temporary_file()?;
        let written = file
            .write_all(bytes)
            .and_then(|()| match &self.permissions {
                Some(permissions) => file.as_file().set_permissions(permissions.clone()),
                None => Ok(()),
            })
            .and_then(|()| file.as_file().sync_all())
            .and_then(|()| file.persist(&self.path).map_err(|refused| refused.error));
        match written {
            Ok(_) => Ok(()),
            Err(cause) => Err(Error::Unwritable {
                path: self.path.clone(),
                cause,
            }),
        }
    }

    fn temporary_file(&self) -> Result<tempfile::NamedTempFile, Error> {
        let mut builder = tempfile::Builder::new();
        builder.prefix(".gudgeon-");
        #[cfg(unix)]
        {
            // A new notebook gets the usual permissions, not the private ones of temporary files.
            use std::os::unix::fs::PermissionsExt;
            builder.permissions(Permissions::from_mode(0o666));
        }
        builder
            .tempfile_in(&self.folder)
            .map_err(|cause| Error::FolderRefuses {
                folder: self.folder.clone(),
                cause,
            })
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn names_in(folder: &Path) -> Vec<String> {
        fs::read_dir(folder)
            .unwrap()
            .map(|entry| entry.unwrap().file_name().into_string().unwrap())
            .collect()
    }

    #[test]
    fn a_file_is_replaced_with_its_permissions() {
        use std::os::unix::fs::PermissionsExt;
        let folder = tempfile::tempdir().unwrap();
        let path = folder.path().join("sheet.ipynb");
        fs::write(&path, "old").unwrap();
        fs::set_permissions(&path, Permissions::from_mode(0o640)).unwrap();
        Destination::check(&path).unwrap().write(b"new").unwrap();
        assert_eq!(fs::read(&path).unwrap(), b"new");
        assert_eq!(fs::metadata(&path).unwrap().permissions().mode() & 0o777, 0o640);
        assert_eq!(names_in(folder.path()), ["sheet.ipynb"]);
    }

    #[test]
    fn a_link_stays_a_link() {
        let folder = tempfile::tempdir().unwrap();
        let real = folder.path().join("real.ipynb");
        let link = folder.path().join("link.ipynb");
        fs::write(&real, "old").unwrap();
        std::os::unix::fs::symlink(&real, &link).unwrap();
        Destination::check(&link).unwrap().write(b"new").unwrap();
        assert_eq!(fs::read(&real).unwrap(), b"new");
        assert!(fs::symlink_metadata(&link).unwrap().is_symlink());
    }

    #[test]
    fn refusals_come_before_the_work() {
        let folder = tempfile::tempdir().unwrap();
        assert!(matches!(
            Destination::check(folder.path()),
            Err(Error::IsFolder(_))
        ));
        let missing = folder.path().join("nowhere/sheet.ipynb");
        assert!(matches!(
            Destination::check(&missing),
            Err(Error::FolderRefuses { .. })
        ));
        let fixed = folder.path().join("fixed.ipynb");
        fs::write(&fixed, "x").unwrap();
        let mut permissions = fs::metadata(&fixed).unwrap().permissions();
        permissions.set_readonly(true);
        fs::set_permissions(&fixed, permissions).unwrap();
        assert!(matches!(Destination::check(&fixed), Err(Error::ReadOnly(_))));
    }
}
