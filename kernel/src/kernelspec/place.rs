//! Where Jupyter looks for kernels.

use super::NAME;
use crate::error::Error;
use std::path::{Path, PathBuf};

/// A folder of Jupyter data that can hold kernels.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Place {
    jupyter: PathBuf,
}

impl Place {
    /// The current user's: `$JUPYTER_DATA_DIR`, else `~/Library/Jupyter` on macOS, else `$XDG_DATA_HOME/jupyter`,
    /// else `~/.local/share/jupyter`.
    ///
    /// # Errors
    /// When no home folder is known.
    pub fn of_user() -> Result<Place, Error> {
        let named = |variable: &str| {
            std::env::var_os(variable)
                .filter(|value| !value.is_empty())
                .map(PathBuf::from)
        };
        let home = dirs::home_dir();
        let usual = if cfg!(target_os = "macos") {
            home.map(|home| home.join("Library/Jupyter"))
        } else {
            named("XDG_DATA_HOME")
                .or_else(|| home.map(|home| home.join(".local/share")))
                .map(|data| data.join("jupyter"))
        };
        let jupyter = named("JUPYTER_DATA_DIR").or(usual).ok_or(Error::NoHome)?;
        Ok(Place { jupyter })
    }

    /// Below a prefix, as in `/usr/local` or a virtual environment.
    #[must_use]
    pub fn below(prefix: &Path) -> Place {
        Place {
            jupyter: prefix.join("share/jupyter"),
        }
    }

    /// The folder of all kernels.
    #[must_use]
    pub fn kernels(&self) -> PathBuf {
        self.jupyter.join("kernels")
    }

    /// The folder of this kernel.
    #[must_use]
    pub fn folder(&self) -> PathBuf {
        self.kernels().join(NAME)
    }
}
