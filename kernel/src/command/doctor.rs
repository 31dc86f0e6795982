//! `gudgeon doctor`: what this machine has, what it lacks, and how to mend it.

use crate::kernelspec::{self, Found, Place};
use crate::library::{DataFolder, Library};
use std::path::Path;
use std::process::{Command, ExitCode, Stdio};

/// One line of the examination.
struct Check {
    name: &'static str,
    /// What it is for; without the first kind no worksheet runs.
    purpose: Purpose,
    result: Result<String, Lack>,
}

#[derive(Clone, Copy, PartialEq, Eq)]
enum Purpose {
    Running,
    Typesetting,
    Jupyter,
}

/// What is wrong, in a word, and what to do.
struct Lack {
    word: &'static str,
    mend: String,
}

/// Prints the examination; the exit code says whether worksheets can be run.
pub(super) fn examine() -> ExitCode {
    let checks = [
        program("cargo", "cargo", Purpose::Running, RUST),
        program("rustc", "rustc", Purpose::Running, RUST),
        rust_src(),
        program(
            "C compiler",
            "cc",
            Purpose::Running,
            "install the C compiler of your system, for example `apt-get install build-essential`",
        ),
        program(
            "patch",
            "patch",
            Purpose::Running,
            "install the program `patch`, for example `apt-get install patch`",
        ),
        data_folder(),
        library(),
        program(
            "npm",
            "npm",
            Purpose::Typesetting,
            "install Node.js with npm, then run `gudgeon install` again",
        ),
        program(
            "python3",
            "python3",
            Purpose::Jupyter,
            "install Python 3 with its venv module",
        ),
        jupyter(),
        registered(),
    ];
    let mut runs = true;
    for check in &checks {
        let purpose = match check.purpose {
            Purpose::Running => "running worksheets",
            Purpose::Typesetting => "typesetting",
            Purpose::Jupyter => "JupyterLab",
        };
        let (word, text) = match &check.result {
            Ok(found) => ("ok", found.as_str()),
            Err(lack) => (lack.word, lack.mend.as_str()),
        };
        runs &= check.result.is_ok() || check.purpose != Purpose::Running;
        println!("{word:<11} {:<16} {text} [{purpose}]", check.name);
    }
    if runs {
        println!("\nworksheets can be run on this machine");
        ExitCode::SUCCESS
    } else {
        println!("\nworksheets cannot be run before the lines for running worksheets are ok");
        ExitCode::FAILURE
    }
}

const RUST: &str = "install Rust with rustup, and see that its folder `bin` is on PATH";

fn program(name: &'static str, program: &str, purpose: Purpose, mend: &str) -> Check {
    let result = version(Command::new(program).arg("--version")).ok_or_else(|| Lack {
        word: "missing",
        mend: mend.to_owned(),
    });
    Check {
        name,
        purpose,
        result,
    }
}

/// The first line that a program prints about itself.
fn version(command: &mut Command) -> Option<String> {
    let output = command.stdin(Stdio::null()).output().ok()?;
    let text = String::from_utf8_lossy(&output.stdout).into_owned();
    let first = text.lines().next().unwrap_or_default().trim().to_owned();
    output.status.success().then_some(first)
}

fn rust_src() -> Check {
    let lack = || Lack {
        word: "missing",
        mend: "run `rustup component add rust-src`; the types of variables are read from it".to_owned(),
    };
    let sysroot = version(Command::new("rustc").args(["--print", "sysroot"]));
    let result = sysroot.ok_or_else(lack).and_then(|sysroot| {
        let source = Path::new(&sysroot).join("lib/rustlib/src/rust/library/core/src/lib.rs");
        if source.is_file() {
            Ok("present".to_owned())
        } else {
            Err(lack())
        }
    });
    Check {
        name: "rust-src",
        purpose: Purpose::Running,
        result,
    }
}

fn data_folder() -> Check {
    let result = DataFolder::open()
        .and_then(|data| data.lock("library.lock", || ()).map(|_| data))
        .map(|data| data.path().display().to_string())
        .map_err(|error| Lack {
            word: "unwritable",
            mend: format!("{error}; {}", error.hint()),
        });
    Check {
        name: "data folder",
        purpose: Purpose::Running,
        result,
    }
}

fn library() -> Check {
    let found = DataFolder::open().and_then(|data| Library::find(&data));
    let result = match found {
        Ok(Some(library)) => Ok(format!("ready in {}", library.folder().display())),
        Ok(None) => Ok("will be prepared by the next `gudgeon run` or `gudgeon install`".to_owned()),
        Err(error) => Err(Lack {
            word: "unknown",
            mend: format!("{error}; {}", error.hint()),
        }),
    };
    Check {
        name: "helper library",
        purpose: Purpose::Running,
        result,
    }
}

fn jupyter() -> Check {
    let own = DataFolder::open().map(|data| data.own_jupyter().join("bin/jupyter"));
    let on_path = version(Command::new("jupyter").args(["lab", "--version"]));
    let result = on_path
        .or_else(|| version(Command::new(own.ok()?).args(["lab", "--version"])))
        .map(|version| format!("JupyterLab {version}"))
        .ok_or_else(|| Lack {
            word: "missing",
            mend: "run `gudgeon lab`, which installs a JupyterLab of its own".to_owned(),
        });
    Check {
        name: "jupyter",
        purpose: Purpose::Jupyter,
        result,
    }
}

fn registered() -> Check {
    let lack = |word, mend: String| Err(Lack { word, mend });
    let result = match Place::of_user() {
        Err(error) => lack("unknown", format!("{error}; {}", error.hint())),
        Ok(place) => {
            let folder = place.folder().display().to_string();
            match kernelspec::find(&place) {
                Found::Current if kernelspec::has_typesetter(&place) => Ok(folder),
                Found::Current => Ok(format!("{folder}, without the typesetter of formulas")),
                Found::Outdated => {
                    let program = kernelspec::executable(&place).unwrap_or_default();
                    lack(
                        "outdated",
                        format!(
                            "it starts `{}`; run `gudgeon install` for this one",
                            program.display()
                        ),
                    )
                }
                Found::Foreign => lack(
                    "foreign",
                    format!("`{folder}` was not written by gudgeon; move it away"),
                ),
                Found::Nothing => lack("missing", "run `gudgeon install`".to_owned()),
            }
        }
    };
    Check {
        name: "kernel",
        purpose: Purpose::Jupyter,
        result,
    }
}
