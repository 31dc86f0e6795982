//! The worksheets in a real JupyterLab, in Chromium: run, from an untrusted sender, and as a static page.
//!
//! What the browser does is in `browser/*.mjs`; here is what it needs: Python and npm packages,
//! pinned, below the build folder. Screenshots are left in `checks/browser/pictures` there.

use std::io::Write as _;
use std::path::{Path, PathBuf};
use std::process::Command;

use anyhow::{Context, Result, bail, ensure};
use serde_json::{Value, json};
use tests::program::{at_home, empty_workshop, gudgeon, workshop};
use tests::repository::root;

/// The worksheet that is looked at.
const WORKSHEET: &str = "portal-crane.ipynb";
/// The name under which the same worksheet comes from somebody else.
const SENT: &str = "sent-by-a-colleague.ipynb";

#[test]
fn worksheets_read_in_a_browser() -> Result<()> {
    let Some(chromium) = chromium() else {
        let message = "the browser check was NOT run: there is no `chromium` on PATH. Install Chromium \
                       (Debian: apt-get install chromium) or set CHROMIUM to the program";
        assert!(std::env::var("CI").is_err(), "{message}");
        // Written past the capture of the test harness, so that a person sees it.
        writeln!(std::io::stderr(), "{message}")?;
        return Ok(());
    };
    say("installing JupyterLab and the browser driver below the build folder");
    let environment = python_environment()?;
    let scripts = browser_scripts()?;

    let folder = empty_workshop("browser/run")?;
    let home = workshop("browser/run/home")?;
    let gallery = workshop("browser/run/gallery")?;
    settings(&home)?;
    let jupyter = |arguments: &[&str]| {
        let mut command = Command::new(environment.join("bin/jupyter"));
        command.args(arguments).current_dir(&folder);
        command
    };

    say("running the worksheet headless");
    let executed = folder.join("executed.ipynb");
    let mut run = Command::new(gudgeon()?);
    run.arg("run")
        .arg(root().join("worksheets/gallery").join(WORKSHEET));
    run.arg("--output").arg(&executed);
    output_of(run, &home)?;
    send(&executed, &gallery.join(SENT))?;

    say("installing the kernel");
    let mut install = Command::new(gudgeon()?);
    install.arg("install").arg("--prefix").arg(&environment);
    let installed = output_of(install, &home)?;
    ensure!(
        environment
            .join("share/jupyter/kernels/gudgeon/katex/katex.min.js")
            .is_file(),
        "the typesetter is not in the folder of the kernel:\n{installed}"
    );

    say("exporting a static page");
    let export = [
        "nbconvert",
        "--to",
        "html",
        "--output",
        "exported.html",
        "executed.ipynb",
    ];
    output_of(jupyter(&export), &home)?;

    say("opening the worksheets in the browser");
    let plan = json!({
        "chromium": chromium,
        "program": gudgeon()?,
        "gallery": gallery,
        "worksheet": WORKSHEET,
        "untrusted": SENT,
        "exported": folder.join("exported.html"),
        "pictures": empty_workshop("browser/pictures")?,
    });
    let mut check = Command::new("node");
    check.arg(scripts.join("check.mjs")).arg(plan.to_string());
    // `gudgeon lab` takes the JupyterLab that is on PATH.
    let path = std::env::var_os("PATH").unwrap_or_default();
    let path = std::iter::once(environment.join("bin")).chain(std::env::split_paths(&path));
    check.env("PATH", std::env::join_paths(path)?);
    let seen = output_of(check, &home)?;
    println!("{seen}");
    Ok(())
}

/// The browser: what `CHROMIUM` names, else what is on PATH.
fn chromium() -> Option<PathBuf> {
    if let Some(named) = std::env::var_os("CHROMIUM") {
        return Some(PathBuf::from(named));
    }
    let path = std::env::var_os("PATH")?;
    ["chromium", "chromium-browser"]
        .iter()
        .flat_map(|name| std::env::split_paths(&path).map(move |folder| folder.join(name)))
        .find(|program| program.is_file())
}

/// Progress for a person who waits, past the capture of the test harness.
fn say(what: &str) {
    let _ = writeln!(std::io::stderr(), "browser check: {what}");
}

/// Runs a command with a home of its own; all that it said is in the error.
fn output_of(mut command: Command, home: &Path) -> Result<String> {
    at_home(&mut command, home)?;
    let output = command
        .output()
        .with_context(|| format!("starting {command:?}"))?;
    let said = [output.stdout, output.stderr].map(|bytes| String::from_utf8_lossy(&bytes).into_owned());
    let said = said.join("\n");
    ensure!(output.status.success(), "{command:?}: {}\n{said}", output.status);
    Ok(said)
}

/// A virtual environment with the pinned packages; made again when the pins change.
fn python_environment() -> Result<PathBuf> {
    let pins = std::fs::read_to_string(root().join("tests/browser/requirements.txt"))?;
    let folder = workshop("browser")?.join("python");
    let stamp = folder.join("installed.txt");
    if std::fs::read_to_string(&stamp).is_ok_and(|installed| installed == pins) {
        return Ok(folder);
    }
    if folder.exists() {
        std::fs::remove_dir_all(&folder)?;
    }
    let home = workshop("browser/home")?;
    let mut venv = Command::new("python3");
    venv.args(["-m", "venv"]).arg(&folder);
    output_of(venv, &home)?;
    let mut pip = Command::new(folder.join("bin/python"));
    pip.args([
        "-m",
        "pip",
        "install",
        "--quiet",
        "--disable-pip-version-check",
        "--requirement",
    ]);
    pip.arg(root().join("tests/browser/requirements.txt"));
    output_of(pip, &home)?;
    std::fs::write(&stamp, pins)?;
    Ok(folder)
}

/// The scripts beside the packages that they import, which npm installs as the lock file says.
fn browser_scripts() -> Result<PathBuf> {
    let folder = workshop("browser/scripts")?;
    let sources = root().join("tests/browser");
    for entry in std::fs::read_dir(&sources)? {
        let file = entry?.path();
        let ending = file.extension().and_then(|ending| ending.to_str());
        if let (Some("mjs" | "json"), Some(name)) = (ending, file.file_name()) {
            std::fs::copy(&file, folder.join(name))?;
        }
    }
    let lock = std::fs::read_to_string(sources.join("package-lock.json"))?;
    let stamp = folder.join("installed.txt");
    if !std::fs::read_to_string(&stamp).is_ok_and(|installed| installed == lock) {
        let mut npm = Command::new("npm");
        npm.args(["ci", "--ignore-scripts", "--no-audit", "--no-fund"])
            .current_dir(&folder);
        output_of(npm, &workshop("browser/home")?)?;
        std::fs::write(&stamp, lock)?;
    }
    Ok(folder)
}

/// Settings of JupyterLab: no news, and every cell laid out, since the check looks at all of them.
fn settings(home: &Path) -> Result<()> {
    let settings = [
        ("notebook-extension/tracker", json!({"windowingMode": "none"})),
        (
            "apputils-extension/notification",
            json!({"fetchNews": "false", "checkForUpdates": false}),
        ),
    ];
    for (plugin, content) in settings {
        let file = home
            .join(".jupyter/lab/user-settings/@jupyterlab")
            .join(format!("{plugin}.jupyterlab-settings"));
        let folder = file.parent().context("the file lies in a folder")?;
        std::fs::create_dir_all(folder)?;
        std::fs::write(&file, content.to_string())?;
    }
    Ok(())
}

/// The worksheet as it comes from somebody else: JupyterLab knows trusted files by their content, so
/// one that it has never seen must differ from those of the gallery.
fn send(executed: &Path, to: &Path) -> Result<()> {
    let mut notebook: Value = serde_json::from_str(&std::fs::read_to_string(executed)?)?;
    let Some(metadata) = notebook["metadata"].as_object_mut() else {
        bail!("the executed worksheet has no metadata");
    };
    metadata.insert("title".to_owned(), json!("Sent by a colleague"));
    std::fs::write(to, notebook.to_string())?;
    Ok(())
}
