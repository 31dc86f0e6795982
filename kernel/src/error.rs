//! Everything that can go wrong outside a cell, each with the thing it happened to and the next step.

use std::io;
use std::path::PathBuf;

/// An error of the kernel or the command line.
#[derive(Debug, thiserror::Error)]
pub enum Error {
    /// The file to read does not exist.
    #[error("there is no file `{}`", .0.display())]
    MissingFile(PathBuf),
    /// A file was expected and a folder found.
    #[error("`{}` is a folder, not a file", .0.display())]
    IsFolder(PathBuf),
    /// A folder was expected and a file found.
    #[error("`{}` is not a folder", .0.display())]
    NotFolder(PathBuf),
    /// The file is marked as read-only.
    #[error("`{}` is marked as read-only", .0.display())]
    ReadOnly(PathBuf),
    /// The folder of the file to write refuses new files.
    #[error("cannot write into the folder `{}`: {cause}", folder.display())]
    FolderRefuses {
        /// The folder.
        folder: PathBuf,
        /// What the system says.
        cause: io::Error,
    },
    /// Reading failed.
    #[error("cannot read `{}`: {cause}", path.display())]
    Unreadable {
        /// The file or folder.
        path: PathBuf,
        /// What the system says.
        cause: io::Error,
    },
    /// Writing failed.
    #[error("cannot write `{}`: {cause}", path.display())]
    Unwritable {
        /// The file or folder.
        path: PathBuf,
        /// What the system says.
        cause: io::Error,
    },
    /// The file is not JSON.
    #[error("`{}` is not a notebook: it is not JSON ({cause})", path.display())]
    NotJson {
        /// The file.
        path: PathBuf,
        /// Where the text stops being JSON.
        cause: serde_json::Error,
    },
    /// The file is JSON but lacks what a notebook has.
    #[error("`{}` is not a notebook: {lack}", path.display())]
    NotNotebook {
        /// The file.
        path: PathBuf,
        /// What is missing or of the wrong kind.
        lack: String,
    },
    /// The notebook is of a format that is not read.
    #[error("`{}` is of notebook format {found}; format 4 is read", path.display())]
    OtherFormat {
        /// The file.
        path: PathBuf,
        /// Its major format number.
        found: i64,
    },
    /// The notebook belongs to another kernel.
    #[error("`{}` is a notebook of the kernel `{found}`, not of `gudgeon`", path.display())]
    OtherKernel {
        /// The file.
        path: PathBuf,
        /// The kernel that it names.
        found: String,
    },
    /// The notebook names no kernel.
    #[error("`{}` names no kernel", .0.display())]
    NoKernel(PathBuf),
    /// No place for prepared libraries is known.
    #[error("there is no home folder to keep the prepared library in")]
    NoHome,
    /// evcxr reads paths up to the first space and only as UTF-8.
    #[error("the data folder `{}` has a space in its name or is not UTF-8", .0.display())]
    UnusableDataFolder(PathBuf),
    /// A program that is needed could not be started.
    #[error("cannot start `{program}`: {cause}")]
    ProgramMissing {
        /// Its name.
        program: String,
        /// What the system says.
        cause: io::Error,
    },
    /// A program that is needed failed.
    #[error("`{program}` failed:\n{said}")]
    ProgramFailed {
        /// Its command line in short.
        program: String,
        /// The end of what it wrote.
        said: String,
    },
    /// The session of cells could not be started.
    #[error("the session of cells did not start: {0}")]
    SessionDidNotStart(String),
    /// A kernelspec folder of this name was not written by this program.
    #[error("`{}` was not written by gudgeon", .0.display())]
    ForeignKernelspec(PathBuf),
    /// Nothing to uninstall.
    #[error("no kernel `gudgeon` is installed in `{}`", .0.display())]
    NotInstalled(PathBuf),
}

impl Error {
    /// The next thing to try, in words that the reader can act on.
    #[must_use]
    pub fn hint(&self) -> &'static str {
        match self {
            Self::MissingFile(_) => "check the spelling and the folder you are in",
            Self::IsFolder(_) => "name a file with the ending .ipynb",
            Self::NotFolder(_) => "name a folder, or a name that does not exist yet",
            Self::ReadOnly(_) => "write somewhere else with --output FILE, or make the file writable",
            Self::FolderRefuses { cause, .. } => match cause.kind() {
                io::ErrorKind::NotFound => "make the folder first, or name another one",
                io::ErrorKind::NotADirectory => "name a folder; a part of this path is a file",
                _ => "name another folder, or change the permissions of this one",
            },
            Self::Unreadable { .. } => "check the permissions of the file",
            Self::Unwritable { .. } => "check the permissions and the free space of the disk",
            Self::NotJson { .. } | Self::NotNotebook { .. } => {
                "name a worksheet saved by Jupyter, with the ending .ipynb"
            }
            Self::OtherFormat { .. } => "open the notebook in JupyterLab and save it, which writes format 4",
            Self::OtherKernel { .. } | Self::NoKernel(_) => {
                "open the notebook in JupyterLab, choose the kernel Gudgeon and save it"
            }
            Self::NoHome => "set GUDGEON_DATA_DIR to a folder of your own",
            Self::UnusableDataFolder(_) => "set GUDGEON_DATA_DIR to a folder whose full name has no space",
            Self::ProgramMissing { .. } => "run `gudgeon doctor`, which says how to get it",
            Self::ProgramFailed { .. } | Self::SessionDidNotStart(_) => {
                "run `gudgeon doctor`; it checks everything that is needed"
            }
            Self::ForeignKernelspec(_) => "move that folder away, or install elsewhere with --prefix",
            Self::NotInstalled(_) => "name the place it was installed in: --user or --prefix DIR",
        }
    }
}
