//! `gudgeon lab`: JupyterLab with the kernel registered and the gallery open.

use super::install::install_at;
use crate::error::Error;
use crate::kernelspec::{self, Found, Place};
use crate::library::{DataFolder, GALLERY, Library, write};
use crate::notebook::absolute;
use clap::Args;
use std::ffi::OsString;
use std::fs;
use std::os::unix::process::CommandExt;
use std::path::{Path, PathBuf};
use std::process::{Command, ExitCode, Stdio};

/// The JupyterLab that is installed where none is found.
const JUPYTERLAB: &str = "jupyterlab==4.6.6";
/// Written last into a JupyterLab of our own.
const STAMP: &str = "ready";

/// The arguments of `gudgeon lab`.
#[derive(Debug, Args)]
pub(super) struct Lab {
    /// The folder to work in; the gallery is put there.  Without it: gudgeon-gallery in the home folder.
    folder: Option<PathBuf>,
    /// Arguments for `jupyter lab` itself, after `--`.
    #[arg(last = true, value_name = "ARGUMENTS")]
    extra: Vec<OsString>,
}

impl Lab {
    pub(super) fn open(self) -> Result<ExitCode, Error> {
        let folder = match self.folder {
            Some(folder) => absolute(&folder)?,
            None => dirs::home_dir().ok_or(Error::NoHome)?.join("gudgeon-gallery"),
        };
        if folder.exists() && !folder.is_dir() {
            return Err(Error::NotFolder(folder));
        }
        fs::create_dir_all(&folder).map_err(|cause| Error::FolderRefuses {
            folder: folder.clone(),
            cause,
        })?;
        let data = DataFolder::open()?;
        let jupyter = find_jupyter(&data)?;
        let place = Place::of_user()?;
        // A new compiler needs a new library, and Jupyter would not wait for a kernel that builds one.
        if kernelspec::find(&place) != Found::Current || Library::find(&data)?.is_none() {
            println!("registering the kernel with Jupyter");
            install_at(&place)?;
        }
        let written = write_missing(GALLERY, &folder)?;
        trust(&jupyter, &written);

        let mut command = Command::new(&jupyter);
        command.arg("lab").args(&self.extra).current_dir(&folder);
        match first_worksheet(&folder) {
            Some(worksheet) => command.arg(worksheet),
            None => command.arg(&folder),
        };
        // JupyterLab takes this process over: it asks on the terminal before it stops.
        Err(Error::ProgramMissing {
            program: jupyter.display().to_string(),
            cause: command.exec(),
        })
    }
}

/// The worksheet of the gallery that is opened first, if the folder has it.
fn first_worksheet(folder: &Path) -> Option<PathBuf> {
    GALLERY
        .iter()
        .map(|(name, _)| folder.join(name))
        .find(|path| path.is_file())
}

/// Writes the worksheets that are missing; a file that is there belongs to the user.
fn write_missing(files: &[(&str, &[u8])], folder: &Path) -> Result<Vec<PathBuf>, Error> {
    let mut written = Vec::new();
    for (name, content) in files {
        let path = folder.join(name);
        if !path.exists() {
            write(&path, content)?;
            written.push(path);
        }
    }
    Ok(written)
}

/// Marks the worksheets that this program has just written as trusted, so that their stored formulas are typeset.
///
/// Where that fails they are shown a little plainer, which is no reason to stop.
fn trust(jupyter: &Path, worksheets: &[PathBuf]) {
    if !worksheets.is_empty() {
        let _ = Command::new(jupyter)
            .arg("trust")
            .args(worksheets)
            .stdin(Stdio::null())
            .output();
    }
}

/// The `jupyter` on PATH if it has JupyterLab, else one in a virtual environment of our own.
fn find_jupyter(data: &DataFolder) -> Result<PathBuf, Error> {
    let has_lab = |jupyter: &Path| {
        Command::new(jupyter)
            .args(["lab", "--version"])
            .stdin(Stdio::null())
            .output()
            .is_ok_and(|output| output.status.success())
    };
    let on_path = PathBuf::from("jupyter");
    if has_lab(&on_path) {
        return Ok(on_path);
    }
    let environment = data.own_jupyter();
    let own = environment.join("bin/jupyter");
    let _held = data.lock("jupyterlab.lock", || {
        println!("waiting for another process that is installing JupyterLab");
    })?;
    if environment.join(STAMP).is_file() && has_lab(&own) {
        return Ok(own);
    }
    println!(
        "no JupyterLab is on PATH: installing {JUPYTERLAB} with pip into {}",
        environment.display()
    );
    let _ = fs::remove_dir_all(&environment);
    must_succeed(
        Command::new("python3").args(["-m", "venv"]).arg(&environment),
        "python3 -m venv",
    )?;
    must_succeed(
        Command::new(environment.join("bin/python")).args(["-m", "pip", "install", "--quiet", JUPYTERLAB]),
        "pip install jupyterlab",
    )?;
    write(&environment.join(STAMP), b"")?;
    Ok(own)
}

fn must_succeed(command: &mut Command, name: &str) -> Result<(), Error> {
    let output = command
        .stdin(Stdio::null())
        .output()
        .map_err(|cause| Error::ProgramMissing {
            program: name.to_owned(),
            cause,
        })?;
    if output.status.success() {
        return Ok(());
    }
    Err(Error::ProgramFailed {
        program: name.to_owned(),
        said: String::from_utf8_lossy(&output.stderr).trim().to_owned(),
    })
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_file_of_the_user_is_never_written_over() {
        let folder = tempfile::tempdir().unwrap();
        let files: [(&str, &[u8]); 2] = [("a.ipynb", b"ours"), ("b.ipynb", b"ours")];
        let mine = folder.path().join("a.ipynb");
        let missing = folder.path().join("b.ipynb");
        fs::write(&mine, "mine").unwrap();
        let written = write_missing(&files, folder.path()).unwrap();
        assert_eq!(written, std::slice::from_ref(&missing));
        assert_eq!(fs::read(&mine).unwrap(), b"mine");
        assert_eq!(fs::read(&missing).unwrap(), b"ours");
    }
}
