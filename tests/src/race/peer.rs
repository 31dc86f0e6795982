//! The general-purpose libraries that the race is run against, and where their programs lie.

use std::path::{Path, PathBuf};
use std::process::Command;
use std::time::Duration;

use super::case::Case;
use super::process::Run;
use crate::repository;

/// The way to the equations.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
enum Route {
    /// Every intermediate result is reduced by `s^2 + c^2 = 1` before it is differentiated.
    Reduced,
    /// Only the equations are.
    Brute,
}

/// How a program is run.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
enum Program {
    /// As the script `tests/peers/install` built it.
    Built(&'static str),
    /// By the interpreter that it installed.
    Python(&'static str),
}

/// A library by one of its ways to the equations.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Peer {
    /// What the table calls it.
    pub name: &'static str,
    program: Program,
    route: Route,
}

impl Peer {
    /// All peers, the one that is hardest to beat first.
    pub const ALL: [Self; 7] = [
        Self::new("FLINT", Program::Built("with_flint"), Route::Reduced),
        Self::new("FLINT, brute", Program::Built("with_flint"), Route::Brute),
        Self::new(
            "FLINT from Python",
            Program::Python("with_flint.py"),
            Route::Reduced,
        ),
        Self::new("SymEngine", Program::Python("with_symengine.py"), Route::Reduced),
        Self::new(
            "SymEngine, brute",
            Program::Python("with_symengine.py"),
            Route::Brute,
        ),
        Self::new("GiNaC", Program::Built("with_ginac"), Route::Reduced),
        Self::new("GiNaC, brute", Program::Built("with_ginac"), Route::Brute),
    ];

    const fn new(name: &'static str, program: Program, route: Route) -> Self {
        Self { name, program, route }
    }

    /// Runs it on a case, with what was installed into a folder.
    #[must_use]
    pub fn run(&self, case: Case, installed: &Path, limit: Duration) -> Run {
        let Some(mut command) = self.command(installed) else {
            return Run::NotInstalled;
        };
        let route = match self.route {
            Route::Reduced => "reduced",
            Route::Brute => "brute",
        };
        Run::of(command.arg(case.to_string()).arg(route), limit)
    }

    fn command(&self, installed: &Path) -> Option<Command> {
        match self.program {
            Program::Built(name) => there(installed.join("bin").join(name)).map(Command::new),
            Program::Python(name) => {
                let mut command = Command::new(there(installed.join("bin").join("python"))?);
                // The sources stay as they are: no compiled files beside them.
                command
                    .arg("-B")
                    .arg(repository::root().join("tests/peers").join(name));
                Some(command)
            }
        }
    }
}

fn there(program: PathBuf) -> Option<PathBuf> {
    program.is_file().then_some(program)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn what_is_not_installed_is_said_to_be_missing() -> anyhow::Result<()> {
        let case: Case = "abs 1".parse()?;
        for peer in Peer::ALL {
            let run = peer.run(case, Path::new("no such folder"), Duration::from_secs(1));
            assert_eq!(run, Run::NotInstalled, "{}", peer.name);
        }
        Ok(())
    }

    #[test]
    fn every_program_is_in_the_repository() {
        for peer in Peer::ALL {
            let source = match peer.program {
                Program::Built(name) => format!("{name}.cpp"),
                Program::Python(name) => name.to_owned(),
            };
            assert!(
                repository::root().join("tests/peers").join(&source).is_file(),
                "{source}"
            );
        }
    }
}
