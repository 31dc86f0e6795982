//! What is added to the process that runs the cells: its current folder, and the sieve on its standard output.
//!
//! Printed text reaches evcxr only line by line, in between evcxr's own marks:
//! an unfinished line would hide a mark, and evcxr would wait for it for ever.
//! So standard output is led through a pipe, and a thread reads it (see `sieve`).

use super::SessionFolder;
use super::sieve::{FLUSHED, Sieve, Step};
use crate::error::Error;
use std::ffi::OsString;
use std::fs::File;
use std::io::{self, PipeReader, Read, Write};
use std::os::fd::AsFd;
use std::path::{Path, PathBuf};
use std::process::Command;
use std::sync::atomic::{AtomicUsize, Ordering};
use std::sync::mpsc;
use std::thread;

/// Set by evcxr for the process that runs the cells.
const CELL_PROCESS_VARIABLE: &str = "EVCXR_IS_RUNTIME";
/// The folder in which cells run.
pub(crate) const FOLDER_VARIABLE: &str = "GUDGEON_FOLDER";
/// Where the system's loader looks for shared objects.
pub(crate) const LOADER_VARIABLE: &str = if cfg!(target_os = "macos") {
    "DYLD_LIBRARY_PATH"
} else {
    "LD_LIBRARY_PATH"
};
/// Present if the parent understands how cells end.
const REPORT_VARIABLE: &str = "GUDGEON_REPORT";
/// Where a cell finds `FLUSH_CELLS`: process number and address.
const SLOT_VARIABLE: &str = "GUDGEON_FLUSH_SLOT";

/// Address of a function of the cells that flushes their standard output, or zero.
///
/// The cells' standard library is a shared object, this program's is linked in: two buffers for one stream.
static FLUSH_CELLS: AtomicUsize = AtomicUsize::new(0);

/// The command that starts a cell process of a session.
pub(crate) fn cell_process_command(
    session: &SessionFolder,
    cells_folder: &Path,
    report: bool,
) -> Result<Command, Error> {
    let program = std::env::current_exe().map_err(|cause| Error::ProgramMissing {
        program: "gudgeon".to_owned(),
        cause,
    })?;
    let mut command = Command::new(program);
    command.env(FOLDER_VARIABLE, cells_folder);
    command.env(LOADER_VARIABLE, loader_path(session)?);
    if report {
        command.env(REPORT_VARIABLE, "1");
    } else {
        command.env_remove(REPORT_VARIABLE);
    }
    Ok(command)
}

/// The folders of the standard library and of the helper library, then those that were named already.
///
/// The compiler writes relative paths into the object of a cell, and evcxr then moves that object one folder up:
/// they lead astray wherever the data folder and the toolchain have a common folder, as in every home.
pub(crate) fn loader_path(session: &SessionFolder) -> Result<OsString, Error> {
    let unusable = |cause| Error::ProgramMissing {
        program: "rustc".to_owned(),
        cause,
    };
    let output = Command::new("rustc")
        .args(["--print", "target-libdir"])
        .current_dir(session.path())
        .output()
        .map_err(unusable)?;
    let standard = PathBuf::from(String::from_utf8_lossy(&output.stdout).trim());
    // The folder is <toolchain>/lib/rustlib/<target>/lib.
    let target = standard.parent().and_then(Path::file_name).unwrap_or_default();
    let helper = session
        .path()
        .join("crate/target")
        .join(target)
        .join("debug/deps");
    let inherited = std::env::var_os(LOADER_VARIABLE).unwrap_or_default();
    let folders = [standard, helper]
        .into_iter()
        .chain(std::env::split_paths(&inherited));
    std::env::join_paths(folders).map_err(|cause| unusable(io::Error::other(cause)))
}

/// Prepares the process if it is one that runs cells; otherwise does nothing.
///
/// To be called first in `main`, before `evcxr::runtime_hook`, while there is one thread.
pub fn enter_if_cell_process() {
    if std::env::var_os(CELL_PROCESS_VARIABLE).is_none() {
        return;
    }
    if let Some(folder) = std::env::var_os(FOLDER_VARIABLE) {
        // A folder that is gone is no reason to run no cells.
        let _ = std::env::set_current_dir(folder);
    }
    #[cfg(target_os = "linux")]
    {
        let killed = Some(rustix::process::Signal::KILL);
        let _ = rustix::process::set_parent_process_death_signal(killed);
    }
    let slot = format!("{}:{}", std::process::id(), &raw const FLUSH_CELLS as usize);
    // SAFETY: this is the first thing that `main` does, no other thread exists that could read the environment.
    unsafe { std::env::set_var(SLOT_VARIABLE, slot) };
    if let Err(error) = sieve_standard_output() {
        eprintln!("standard output of the cells is not watched: {error}");
    }
}

fn sieve_standard_output() -> io::Result<()> {
    let real = File::from(io::stdout().as_fd().try_clone_to_owned()?);
    let (reader, writer) = io::pipe()?;
    rustix::stdio::dup2_stdout(&writer)?;
    drop(writer);
    let report = std::env::var_os(REPORT_VARIABLE).is_some();
    let (completed, to_flush) = mpsc::channel();
    thread::Builder::new()
        .name("sieve".to_owned())
        .spawn(move || read_on(reader, real, Sieve::new(report), &completed))?;
    // A thread of its own: flushing waits for a lock that a cell may hold while it waits for the reader.
    thread::Builder::new().name("flush".to_owned()).spawn(move || {
        for () in to_flush {
            flush_cells();
            println!("{FLUSHED}");
        }
    })?;
    Ok(())
}

fn read_on(mut reader: PipeReader, mut real: File, mut sieve: Sieve, completed: &mpsc::Sender<()>) {
    let mut buffer = vec![0; 1 << 16];
    loop {
        let count = match reader.read(&mut buffer) {
            Ok(0) => return,
            Ok(count) => count,
            Err(error) if error.kind() == io::ErrorKind::Interrupted => continue,
            Err(_) => return,
        };
        for step in sieve.read(&buffer[..count]) {
            let written = match step {
                Step::Forward(bytes) => real.write_all(&bytes),
                Step::MarkStandardError(bytes) => io::stderr().write_all(&bytes),
                Step::Flush => completed.send(()).map_err(io::Error::other),
            };
            if written.is_err() {
                return;
            }
        }
    }
}

fn flush_cells() {
    let address = FLUSH_CELLS.load(Ordering::SeqCst);
    if address != 0 {
        // SAFETY: the only writer is the prelude, which stores the address of an `extern "C" fn()`;
        // evcxr never unloads the object that holds it.
        let flush = unsafe { std::mem::transmute::<usize, extern "C" fn()>(address) };
        flush();
    }
}
