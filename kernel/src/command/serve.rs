//! `gudgeon kernel`: serves the Jupyter protocol, for the time being with the server of evcxr.
//!
//! Two processes: this one makes the session's folder, waits, and removes the folder whatever happens to the other;
//! the other runs `evcxr_jupyter::main`, which reads its own arguments.
//! That server renews an installed kernel named `rust` where it finds one;
//! `JUPYTER_PATH` points it to a folder that holds none, because that kernel is not ours.

use crate::error::Error;
use crate::library::{DataFolder, Library};
use crate::notebook::absolute;
use crate::progress::Progress;
use crate::session::{FOLDER_VARIABLE, LOADER_VARIABLE, SessionFolder, loader_path};
use clap::Args;
use std::path::PathBuf;
use std::process::{Child, Command, ExitCode};
use std::thread;
use std::time::Duration;

/// The first argument by which evcxr's server is asked for.
const PROTOCOL_ARGUMENT: &str = "--control_file";
/// How often the two processes look after each other.
const PAUSE: Duration = Duration::from_millis(200);

/// The arguments of `gudgeon kernel`.
#[derive(Debug, Args)]
pub(super) struct Serve {
    /// The file in which Jupyter writes the addresses.
    #[arg(long, value_name = "FILE")]
    connection_file: PathBuf,
}

impl Serve {
    pub(super) fn serve(self) -> Result<ExitCode, Error> {
        let connection_file = absolute(&self.connection_file)?;
        let cells_folder = absolute(std::path::Path::new("."))?;
        let data = DataFolder::open()?;
        let library = Library::prepare(&data, &Progress::of_unknown_length())?;
        let folder = SessionFolder::create(&data, &library)?;
        let missing = |cause| Error::ProgramMissing {
            program: "gudgeon".to_owned(),
            cause,
        };
        let mut server = Command::new(std::env::current_exe().map_err(missing)?)
            .arg(PROTOCOL_ARGUMENT)
            .arg(connection_file)
            .current_dir(folder.path())
            .env("EVCXR_CONFIG_DIR", folder.path())
            .env("JUPYTER_PATH", folder.path())
            .env(FOLDER_VARIABLE, cells_folder)
            .env(LOADER_VARIABLE, loader_path(&folder)?)
            .spawn()
            .map_err(missing)?;
        let code = wait(&mut server).map_err(missing)?;
        drop(folder);
        Ok(code)
    }
}

/// Waits for the server, and ends it if the Jupyter server that started us is gone.
fn wait(server: &mut Child) -> std::io::Result<ExitCode> {
    let started_by_jupyter = std::env::var_os("JPY_PARENT_PID").is_some();
    let parent = rustix::process::getppid();
    loop {
        if let Some(status) = server.try_wait()? {
            return Ok(if status.success() {
                ExitCode::SUCCESS
            } else {
                ExitCode::FAILURE
            });
        }
        if started_by_jupyter && rustix::process::getppid() != parent {
            server.kill()?;
            server.wait()?;
            return Ok(ExitCode::FAILURE);
        }
        thread::sleep(PAUSE);
    }
}

/// Whether this process is the second of the two.
#[must_use]
pub fn is_protocol_process() -> bool {
    std::env::args_os()
        .nth(1)
        .is_some_and(|first| first == PROTOCOL_ARGUMENT)
}

/// The work of the second process.
#[must_use]
pub fn serve_protocol() -> ExitCode {
    #[cfg(target_os = "linux")]
    {
        let killed = Some(rustix::process::Signal::KILL);
        let _ = rustix::process::set_parent_process_death_signal(killed);
    }
    match evcxr_jupyter::main() {
        Ok(()) => ExitCode::SUCCESS,
        Err(error) => {
            eprintln!("error: the kernel stopped: {error:#}");
            ExitCode::FAILURE
        }
    }
}
