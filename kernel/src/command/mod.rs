//! The commands of `gudgeon`, one file each.

mod run;
mod serve;

pub use serve::{is_protocol_process, serve_protocol};

use crate::error::Error;
use clap::{Parser, Subcommand};
use std::path::PathBuf;
use std::process::ExitCode;

/// Worksheets that derive equations of motion and prove each step.
#[derive(Debug, Parser)]
#[command(name = "gudgeon", version, about)]
pub struct CommandLine {
    #[command(subcommand)]
    command: Command,
}

#[derive(Debug, Subcommand)]
enum Command {
    /// Execute a worksheet without a browser and say what it proves.
    ///
    /// A worksheet is a program: run only those whose author you trust.
    /// The exit code is 0 if every cell ran, no step is refuted and the reference run agrees,
    /// 1 if not, and 2 if the worksheet could not be run at all.
    Run(run::Run),
    /// Serve the Jupyter protocol; Jupyter calls this.
    #[command(hide = true)]
    Kernel(serve::Serve),
    /// Build the template of a helper library; `install` and `run` call this.
    #[command(hide = true)]
    BuildTemplate {
        /// The folder of the library.
        library: PathBuf,
    },
}

impl CommandLine {
    /// Does what the command line asks for.
    ///
    /// # Errors
    /// Everything that keeps the command from doing its work; a failed cell is not an error but an exit code.
    pub fn run(self) -> Result<ExitCode, Error> {
        match self.command {
            Command::Run(run) => run.execute(),
            Command::Kernel(serve) => serve.serve(),
            Command::BuildTemplate { library } => {
                crate::library::build_in_this_process(&library).map(|()| ExitCode::SUCCESS)
            }
        }
    }
}
