//! The kernel in Jupyter's list: installed, examined and taken away again.

use anyhow::{Result, ensure};
use serde_json::Value;

use super::worksheet::{Run, folder, run, run_where_no_program_is, run_with_data};

#[test]
fn the_kernel_is_registered_and_removed_and_no_other_is_touched() -> Result<()> {
    let folder = folder("installing")?;
    let kernels = folder.join("place/share/jupyter/kernels");
    std::fs::create_dir_all(kernels.join("rust"))?;
    std::fs::write(kernels.join("rust/kernel.json"), "{\"somebody\": \"else\"}")?;

    let found = run(&["install", "--prefix", "place"], &folder)?;
    ensure!(found.code == Some(0), "{}", found.said());
    let ours = kernels.join("gudgeon");
    let spec: Value = serde_json::from_str(&std::fs::read_to_string(ours.join("kernel.json"))?)?;
    ensure!(
        spec["display_name"] == "Gudgeon" && spec["interrupt_mode"] == "message",
        "{spec}"
    );
    ensure!(spec["language"] == "rust", "{spec}");
    for file in [
        "logo-32x32.png",
        "logo-64x64.png",
        "logo-svg.svg",
        "katex/katex.min.js",
        "katex/katex.min.css",
    ] {
        ensure!(ours.join(file).is_file(), "{file} is missing: {}", found.said());
    }
    let fonts = std::fs::read_dir(ours.join("katex/fonts"))?.count();
    ensure!(fonts >= 9, "only {fonts} fonts");

    let again = run(&["install", "--prefix", "place"], &folder)?;
    ensure!(again.code == Some(0), "{}", again.said());

    // A data folder of its own: the library that the other checks use at this moment stays.
    let removed = run_with_data(&["uninstall", "--prefix", "place"], &folder, &folder.join("data"))?;
    ensure!(removed.code == Some(0) && !ours.exists(), "{}", removed.said());
    let twice = run_with_data(&["uninstall", "--prefix", "place"], &folder, &folder.join("data"))?;
    ensure!(
        twice.code == Some(2) && twice.stderr.contains("next:"),
        "{}",
        twice.said()
    );
    let other = std::fs::read_to_string(kernels.join("rust/kernel.json"))?;
    ensure!(
        other == "{\"somebody\": \"else\"}",
        "another kernel was touched: {other}"
    );
    Ok(())
}

#[test]
fn the_doctor_says_what_is_there_and_what_is_missing() -> Result<()> {
    let folder = folder("doctor")?;
    let found = run(&["doctor"], &folder)?;
    for part in ["cargo", "rust-src", "helper library", "npm"] {
        ensure!(
            found.stdout.contains(part),
            "`{part}` is missing in\n{}",
            found.said()
        );
    }
    ensure!(found.code == Some(0), "worksheets run here: {}", found.said());
    ensure!(
        line_of(&found, "kernel").starts_with("missing")
            && line_of(&found, "kernel").contains("gudgeon install"),
        "nothing is installed in this home: {}",
        found.said()
    );

    let bare = run_where_no_program_is(&["doctor"], &folder)?;
    ensure!(bare.code == Some(1), "{}", bare.said());
    for (name, mend) in [
        ("cargo", "rustup"),
        ("rust-src", "rustup component add"),
        ("C compiler", "install the C compiler"),
        ("npm", "install Node.js"),
        ("jupyter", "gudgeon lab"),
    ] {
        let line = line_of(&bare, name);
        ensure!(
            line.starts_with("missing") && line.contains(mend),
            "{name}: {}",
            bare.said()
        );
    }
    ensure!(bare.stdout.contains("cannot be run"), "{}", bare.said());
    Ok(())
}

/// The line of an examination that is about this.
fn line_of<'said>(found: &'said Run, name: &str) -> &'said str {
    // A word of eleven letters, then the name.
    let about = |line: &&str| {
        line.get(12..)
            .is_some_and(|rest| rest.starts_with(&format!("{name} ")))
    };
    found.stdout.lines().find(about).unwrap_or_default()
}
