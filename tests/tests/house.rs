//! The rules of the repository: its layers, its files and what must not be written in them.

use std::collections::BTreeSet;
use std::process::Command;

use anyhow::{Context, Result};
use tests::repository::{files, root, texts};

/// Fails with one line for each offence.
fn none(what: &str, offences: &[String]) {
    assert!(offences.is_empty(), "{what}:\n  {}", offences.join("\n  "));
}

#[test]
fn every_source_file_says_what_it_is_for() -> Result<()> {
    let sources = texts("rs")?;
    assert!(sources.len() > 50, "only {} sources were found", sources.len());
    let silent = sources
        .iter()
        .filter(|(_, text)| {
            let words = text.lines().next().and_then(|line| line.strip_prefix("//! "));
            words.is_none_or(|words| words.trim().len() <= 10)
        })
        .map(|(file, _)| file.display().to_string())
        .collect::<Vec<_>>();
    none("line one is not a `//!` sentence", &silent);
    Ok(())
}

#[test]
fn no_source_file_is_too_long() -> Result<()> {
    let long = texts("rs")?
        .iter()
        .map(|(file, text)| (file, text.lines().count()))
        .filter(|(_, lines)| *lines > 800)
        .map(|(file, lines)| format!("{} has {lines} lines", file.display()))
        .collect::<Vec<_>>();
    none("a file above 800 lines is two files", &long);
    Ok(())
}

#[test]
fn no_file_has_a_name_that_says_nothing() -> Result<()> {
    let empty_words = ["utils", "util", "helpers", "helper", "common", "misc"];
    let vague = files()?
        .iter()
        .filter(|file| {
            let stem = file.file_stem().and_then(|stem| stem.to_str());
            stem.is_some_and(|stem| empty_words.contains(&stem))
        })
        .map(|file| file.display().to_string())
        .collect::<Vec<_>>();
    none("names that say nothing", &vague);
    Ok(())
}

/// Hosts of package registries and folders of one person's machine belong into no file, except that
/// cargo names its registry in its lock file. The words are put together here, so that this file
/// passes its own test.
#[test]
fn no_file_names_a_registry_or_a_folder_of_one_machine() -> Result<()> {
    let hosts = [
        ["crates", "io"].join("."),
        ["npmjs", "org"].join("."),
        ["npmjs", "com"].join("."),
        ["pypi", "org"].join("."),
        ["pythonhosted", "org"].join("."),
        ["debian", "org"].join("."),
    ];
    let folders = ["root", "work", "tmp"].map(|folder| format!("/{folder}/"));
    let mut offences = Vec::new();
    for file in files()?.iter().filter(|file| file.as_os_str() != "Cargo.lock") {
        let bytes = std::fs::read(root().join(file))?;
        for word in hosts.iter().chain(&folders) {
            let found = bytes.windows(word.len()).position(|part| part == word.as_bytes());
            // `~/work/` or `target/work/` is no folder of the machine; `"/work/` is.
            let absolute = |at: usize| {
                !word.starts_with('/')
                    || at == 0
                    || !(bytes[at - 1].is_ascii_alphanumeric() || b"}).~_-".contains(&bytes[at - 1]))
            };
            if found.is_some_and(absolute) {
                offences.push(format!("{} has `{word}`", file.display()));
            }
        }
    }
    none("words that belong to one machine", &offences);
    Ok(())
}

#[test]
fn nothing_is_left_for_later() -> Result<()> {
    let marks = ["TO", "FIX", "XX"].map(|half| match half {
        "TO" => "TODO".to_owned(),
        "FIX" => ["FIX", "ME"].concat(),
        _ => ["XX", "X"].concat(),
    });
    let ignored = ["#[ign", "ore"].concat();
    let left = texts("rs")?
        .into_iter()
        .filter(|(file, _)| !file.ends_with("house.rs"))
        .flat_map(|(file, text)| {
            let lines = text.lines().enumerate();
            let found: Vec<String> = lines
                .filter(|(_, line)| line.contains(&ignored) || marks.iter().any(|mark| line.contains(mark)))
                .map(|(place, _)| format!("{}:{}", file.display(), place + 1))
                .collect();
            found
        })
        .collect::<Vec<_>>();
    none("marks of unfinished work", &left);
    Ok(())
}

/// The crates of this workspace that each crate depends on.
fn layers() -> Result<Vec<(String, BTreeSet<String>)>> {
    let cargo = std::env::var_os("CARGO").context("cargo runs the tests")?;
    let output = Command::new(cargo)
        .args(["metadata", "--no-deps", "--format-version", "1", "--locked"])
        .current_dir(root())
        .output()?;
    assert!(
        output.status.success(),
        "{}",
        String::from_utf8_lossy(&output.stderr)
    );
    let metadata: serde_json::Value = serde_json::from_slice(&output.stdout)?;
    let packages = metadata["packages"]
        .as_array()
        .context("metadata lists packages")?;
    let names: BTreeSet<&str> = packages
        .iter()
        .filter_map(|package| package["name"].as_str())
        .collect();
    Ok(packages
        .iter()
        .map(|package| {
            let dependencies = package["dependencies"].as_array().into_iter().flatten();
            let inner = dependencies
                .filter_map(|dependency| dependency["name"].as_str())
                .filter(|name| names.contains(name))
                .map(str::to_owned)
                .collect();
            (package["name"].as_str().unwrap_or_default().to_owned(), inner)
        })
        .collect())
}

#[test]
fn dependencies_point_downwards() -> Result<()> {
    // A crate may depend on those before it in this list, and `tests` only on the libraries: it meets
    // the kernel as a user does, by its program.
    let allowed: [(&str, &[&str]); 4] = [
        ("cas", &[]),
        ("worksheets", &["cas"]),
        ("kernel", &["cas", "worksheets"]),
        ("tests", &["cas", "worksheets"]),
    ];
    let layers = layers()?;
    assert!(
        layers.len() == allowed.len(),
        "another number of crates: {layers:?}"
    );
    for (name, dependencies) in layers {
        let (_, below) = allowed
            .iter()
            .find(|(known, _)| *known == name)
            .with_context(|| format!("the crate `{name}` has no place in the house"))?;
        for dependency in dependencies {
            assert!(
                below.contains(&dependency.as_str()),
                "`{name}` depends on `{dependency}`"
            );
        }
    }
    Ok(())
}

/// Whether the code, without its comments, has the word.
fn has_word(text: &str, word: &str) -> bool {
    text.lines()
        .map(|line| line.split("//").next().unwrap_or_default())
        .flat_map(|code| code.split(|c: char| !c.is_ascii_alphanumeric() && c != '_'))
        .any(|token| token == word || token.ends_with(&format!("_{word}")))
}

/// Exact algebra keeps floating-point numbers in the rooms that are named here.
#[test]
fn floats_stay_in_their_room() -> Result<()> {
    // `operators` names the type only to refuse it with a sentence of our own.
    let rooms = ["cas/src/sample", "cas/src/program", "cas/src/expr/operators.rs"];
    let sources = texts("rs")?;
    let strays = sources
        .iter()
        .filter(|(file, _)| file.starts_with("cas/src"))
        .filter(|(file, _)| !rooms.iter().any(|room| file.to_string_lossy().starts_with(room)))
        .filter(|(_, text)| has_word(text, "f64") || has_word(text, "f32"))
        .map(|(file, _)| file.display().to_string())
        .collect::<Vec<_>>();
    none("floating-point numbers outside their room", &strays);
    Ok(())
}

#[test]
fn the_libraries_forbid_unsafe_code() -> Result<()> {
    for library in ["cas/src/lib.rs", "worksheets/src/lib.rs"] {
        let text = std::fs::read_to_string(root().join(library))?;
        assert!(
            text.contains("#![forbid(unsafe_code)]"),
            "{library} allows unsafe code"
        );
    }
    Ok(())
}
