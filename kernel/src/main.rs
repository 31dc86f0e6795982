//! The command line `gudgeon`.

use clap::Parser;
use kernel::command::{CommandLine, is_protocol_process, serve_protocol};
use std::process::ExitCode;

fn main() -> ExitCode {
    kernel::session::enter_if_cell_process();
    evcxr::runtime_hook();
    if is_protocol_process() {
        return serve_protocol();
    }
    match CommandLine::parse().run() {
        Ok(code) => code,
        Err(error) => {
            eprintln!("error: {error}");
            eprintln!(" next: {}", error.hint());
            ExitCode::from(2)
        }
    }
}
