//! The commands of `gudgeon`, one file each.

mod doctor;
mod install;
mod lab;
mod run;
mod serve;

pub use serve::{is_protocol_process, serve_protocol};

use crate::error::Error;
use clap::{Args, Parser, Subcommand};
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
    /// Register the kernel with Jupyter and prepare it.
    Install(Place),
    /// Remove the kernel from Jupyter, and what was prepared for it.
    Uninstall(Place),
    /// Open JupyterLab with the gallery and the kernel.
    Lab(lab::Lab),
    /// Check this machine for everything that is needed.
    Doctor,
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

/// Where the kernel is registered.
#[derive(Debug, Clone, Args)]
#[group(multiple = false)]
pub struct Place {
    /// For the current user; this is the default.
    #[arg(long)]
    user: bool,
    /// Below this folder, for example that of a virtual environment.
    #[arg(long, value_name = "DIR")]
    prefix: Option<PathBuf>,
}

impl CommandLine {
    /// Does what the command line asks for.
    ///
    /// # Errors
    /// Everything that keeps the command from doing its work; a failed cell is not an error but an exit code.
    pub fn run(self) -> Result<ExitCode, Error> {
        match self.command {
            Command::Run(run) => run.execute(),
            Command::Install(place) => install::install(&place).map(|()| ExitCode::SUCCESS),
            Command::Uninstall(place) => install::uninstall(&place).map(|()| ExitCode::SUCCESS),
            Command::Lab(lab) => lab.open(),
            Command::Doctor => Ok(doctor::examine()),
            Command::Kernel(serve) => serve.serve(),
            Command::BuildTemplate { library } => {
                crate::library::build_in_this_process(&library).map(|()| ExitCode::SUCCESS)
            }
        }
    }
}
