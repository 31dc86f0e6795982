//! The kernelspec: the folder by which Jupyter finds the kernel, with its logo and its typesetter of formulas.
//!
//! Only a folder that this program wrote is ever replaced or removed.

mod place;
mod typesetter;

pub use place::Place;

use crate::error::Error;
use crate::library::write;
use crate::progress::Progress;
use serde_json::{Value, json};
use std::fs;
use std::path::{Path, PathBuf};
use tempfile::TempDir;

/// The name under which notebooks ask for the kernel.
pub const NAME: &str = "gudgeon";

const LOGO_32: &[u8] = include_bytes!("../../logo/logo-32x32.png");
const LOGO_64: &[u8] = include_bytes!("../../logo/logo-64x64.png");
const LOGO_SVG: &[u8] = include_bytes!("../../logo/logo-svg.svg");

/// How formulas will be typeset after an installation.
#[derive(Debug, Clone, PartialEq, Eq)]
pub enum Typesetting {
    /// The typesetter is in place.
    Ready,
    /// It could not be fetched, for this reason; formulas are still readable.
    Plain(String),
}

/// What is found at a place.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Found {
    /// No kernelspec of our name.
    Nothing,
    /// One that this program wrote, just as it would be written now.
    Current,
    /// One that this program wrote, but for another executable or version.
    Outdated,
    /// One that this program did not write.
    Foreign,
}

/// Looks at a place.
#[must_use]
pub fn find(place: &Place) -> Found {
    let Ok(text) = fs::read(place.folder().join("kernel.json")) else {
        return if place.folder().exists() {
            Found::Foreign
        } else {
            Found::Nothing
        };
    };
    let ours =
        serde_json::from_slice::<Value>(&text).is_ok_and(|found| found["metadata"]["written_by"] == NAME);
    match description() {
        _ if !ours => Found::Foreign,
        Ok(current) if text == current => Found::Current,
        Ok(_) | Err(_) => Found::Outdated,
    }
}

/// Fails unless a kernelspec can be written to this place.
///
/// # Errors
/// When the place holds a kernelspec that is not ours, or cannot be written.
pub fn check(place: &Place) -> Result<(), Error> {
    if find(place) == Found::Foreign {
        return Err(Error::ForeignKernelspec(place.folder()));
    }
    folder_beside(place).map(drop)
}

/// A folder beside the kernelspec, which goes away when it is dropped.
fn folder_beside(place: &Place) -> Result<TempDir, Error> {
    let kernels = place.kernels();
    fs::create_dir_all(&kernels)
        .and_then(|()| tempfile::Builder::new().prefix(".gudgeon-").tempdir_in(&kernels))
        .map_err(|cause| Error::FolderRefuses {
            folder: kernels,
            cause,
        })
}

/// Writes the kernelspec: first into a folder beside, then in one step to its place.
///
/// # Errors
/// When the place holds a kernelspec that is not ours, or cannot be written.
pub fn install(place: &Place, progress: &Progress) -> Result<Typesetting, Error> {
    check(place)?;
    let folder = place.folder();
    let beside = folder_beside(place)?;
    let fresh = beside.path().join(NAME);
    for (name, content) in [
        ("kernel.json", description()?.as_slice()),
        ("logo-32x32.png", LOGO_32),
        ("logo-64x64.png", LOGO_64),
        ("logo-svg.svg", LOGO_SVG),
    ] {
        write(&fresh.join(name), content)?;
    }
    let typesetting = typesetter::place(&folder, &fresh, progress)?;
    remove_ours(&folder)?;
    fs::rename(&fresh, &folder).map_err(|cause| Error::FolderRefuses {
        folder: place.kernels(),
        cause,
    })?;
    Ok(typesetting)
}

/// Removes the kernelspec and says whether there was one.
///
/// # Errors
/// When it is not ours or cannot be removed.
pub fn uninstall(place: &Place) -> Result<bool, Error> {
    match find(place) {
        Found::Nothing => Ok(false),
        Found::Foreign => Err(Error::ForeignKernelspec(place.folder())),
        Found::Current | Found::Outdated => remove_ours(&place.folder()).map(|()| true),
    }
}

/// Whether the typesetter lies in the kernelspec.
#[must_use]
pub fn has_typesetter(place: &Place) -> bool {
    typesetter::is_in(&place.folder())
}

/// The executable that an installed kernelspec starts.
#[must_use]
pub fn executable(place: &Place) -> Option<PathBuf> {
    let text = fs::read(place.folder().join("kernel.json")).ok()?;
    let found: Value = serde_json::from_slice(&text).ok()?;
    found["argv"][0].as_str().map(PathBuf::from)
}

fn remove_ours(folder: &Path) -> Result<(), Error> {
    match fs::remove_dir_all(folder) {
        Err(cause) if cause.kind() != std::io::ErrorKind::NotFound => Err(Error::Unwritable {
            path: folder.to_path_buf(),
            cause,
        }),
        Ok(()) | Err(_) => Ok(()),
    }
}

/// The bytes of `kernel.json`.
fn description() -> Result<Vec<u8>, Error> {
    let program = std::env::current_exe().map_err(|cause| Error::ProgramMissing {
        program: NAME.to_owned(),
        cause,
    })?;
    let mut description = json!({
        "argv": [program, "kernel", "--connection-file", "{connection_file}"],
        "display_name": "Gudgeon",
        "language": "rust",
        "interrupt_mode": "message",
        "metadata": {"written_by": NAME},
    });
    // A data folder chosen for the installation is the one that the kernel has to find.
    if let Ok(data) = std::env::var("GUDGEON_DATA_DIR") {
        description["env"] = json!({"GUDGEON_DATA_DIR": data});
    }
    let mut bytes = serde_json::to_vec_pretty(&description).expect("invariant: a JSON value can be written");
    bytes.push(b'\n');
    Ok(bytes)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_foreign_kernelspec_is_left_alone() {
        let prefix = tempfile::tempdir().unwrap();
        let place = Place::below(prefix.path());
        assert_eq!(find(&place), Found::Nothing);
        let file = place.folder().join("kernel.json");
        write(&file, b"{\"argv\": [\"other\"]}").unwrap();
        assert_eq!(find(&place), Found::Foreign);
        assert!(matches!(uninstall(&place), Err(Error::ForeignKernelspec(_))));
        assert!(file.exists());
    }

    #[test]
    fn only_our_folder_is_removed() {
        let prefix = tempfile::tempdir().unwrap();
        let place = Place::below(prefix.path());
        let other = place.kernels().join("python3/kernel.json");
        write(&other, b"{}").unwrap();
        write(&place.folder().join("kernel.json"), &description().unwrap()).unwrap();
        assert_eq!(find(&place), Found::Current);
        assert!(uninstall(&place).unwrap());
        assert!(!uninstall(&place).unwrap());
        assert!(other.exists());
    }

    #[test]
    fn another_executable_makes_it_outdated() {
        let prefix = tempfile::tempdir().unwrap();
        let place = Place::below(prefix.path());
        let text = "{\"argv\": [\"moved\"], \"metadata\": {\"written_by\": \"gudgeon\"}}";
        write(&place.folder().join("kernel.json"), text.as_bytes()).unwrap();
        assert_eq!(find(&place), Found::Outdated);
        assert_eq!(executable(&place), Some(PathBuf::from("moved")));
    }
}
