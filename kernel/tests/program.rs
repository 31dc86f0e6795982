//! The program starts and names itself.
//!
//! Cargo builds a program for the integration tests of its own package; this one makes the test command
//! of the workspace build it for the checks in the package `tests` too.

use std::process::Command;

#[test]
fn the_program_names_its_version() {
    let output = Command::new(env!("CARGO_BIN_EXE_gudgeon"))
        .arg("--version")
        .output()
        .expect("the program starts");
    let said = String::from_utf8_lossy(&output.stdout).into_owned();
    assert_eq!(said.trim(), concat!("gudgeon ", env!("CARGO_PKG_VERSION")));
}
