//! The program `gudgeon` as a user has it: built, with a home folder and a data folder of its own.

use std::path::{Path, PathBuf};
use std::process::Command;
use std::sync::OnceLock;

use anyhow::{Context, Result, anyhow, bail};

use crate::repository;

/// Names another program to check instead of the one built here, such as an installed one.
const ANOTHER: &str = "GUDGEON";

/// The program, built if it is not.
///
/// # Errors
/// It does not build.
pub fn gudgeon() -> Result<&'static Path> {
    static PROGRAM: OnceLock<Result<PathBuf, String>> = OnceLock::new();
    PROGRAM
        .get_or_init(|| built().map_err(|error| format!("{error:#}")))
        .as_deref()
        .map_err(|error| anyhow!("{error}"))
}

fn built() -> Result<PathBuf> {
    if let Some(program) = std::env::var_os(ANOTHER) {
        return Ok(PathBuf::from(program));
    }
    let (target, profile) = repository::build_folder()?;
    let cargo = std::env::var_os("CARGO").context("cargo runs the tests")?;
    let mut build = Command::new(cargo);
    // The selection of the README's test command, so that cargo finds everything built with the
    // same features: another selection would compile evcxr once more.
    build.args(["test", "--locked", "--workspace", "--no-run", "--quiet"]);
    build.args(["--profile", if profile == "debug" { "test" } else { &profile }]);
    build
        .env("CARGO_TARGET_DIR", &target)
        .current_dir(repository::root());
    // What cargo tells a test program about its package would look like a change to build scripts.
    for (name, _) in std::env::vars_os() {
        if name
            .to_str()
            .is_some_and(|name| name.starts_with("CARGO_PKG_") || name.starts_with("CARGO_MANIFEST"))
        {
            build.env_remove(name);
        }
    }
    let output = build.output().context("cargo builds the program")?;
    if !output.status.success() {
        bail!(
            "the program does not build:\n{}",
            String::from_utf8_lossy(&output.stderr)
        );
    }
    let program = target.join(profile).join("gudgeon");
    if !program.is_file() {
        bail!("cargo built no program at {}", program.display());
    }
    Ok(program)
}

/// A folder below the build folder for what a check makes; what lies in it may be used again.
///
/// # Errors
/// The folder cannot be made.
pub fn workshop(name: &str) -> Result<PathBuf> {
    let folder = repository::build_folder()?.0.join("checks").join(name);
    std::fs::create_dir_all(&folder).with_context(|| format!("making {}", folder.display()))?;
    Ok(folder)
}

/// A folder as [`workshop`], emptied.
///
/// # Errors
/// The folder cannot be emptied or made.
pub fn empty_workshop(name: &str) -> Result<PathBuf> {
    let folder = workshop(name)?;
    std::fs::remove_dir_all(&folder).with_context(|| format!("emptying {}", folder.display()))?;
    workshop(name)
}

/// Gives a command a home folder of its own: nothing of the user's is read or changed.
///
/// All checks share one data folder, so that the helper library is prepared once.
///
/// # Errors
/// A folder cannot be made.
pub fn at_home(command: &mut Command, home: &Path) -> Result<()> {
    let users_home = std::env::home_dir().context("a home folder")?;
    for (variable, folder) in [("CARGO_HOME", ".cargo"), ("RUSTUP_HOME", ".rustup")] {
        // The toolchain and the packages that cargo has fetched lie in the user's home.
        if std::env::var_os(variable).is_none() {
            command.env(variable, users_home.join(folder));
        }
    }
    for (variable, _) in std::env::vars_os() {
        let name = variable.to_string_lossy();
        if [
            "JUPYTER",
            "IPYTHON",
            "XDG_",
            "GUDGEON",
            "CARGO_PKG_",
            "CARGO_MANIFEST",
        ]
        .iter()
        .any(|start| name.starts_with(start))
        {
            command.env_remove(&variable);
        }
    }
    command
        .env("HOME", home)
        .env("GUDGEON_DATA_DIR", workshop("data")?);
    Ok(())
}
