//! The embedded sources of the helper library, and the manifests with which cells are built against them.

use super::DataFolder;
use crate::error::Error;
use sha2::{Digest, Sha256};
use std::fmt::Write as _;
use std::path::Path;
use std::process::Command;
use toml::{Table, Value};

include!(concat!(env!("OUT_DIR"), "/embedded.rs"));

/// Raised when the layout of a library folder or the way it is built changes.
const LAYOUT: &str = "library layout 2";

/// The crates that cells are built against.
const CRATES: [&str; 2] = ["cas", "worksheets"];

/// The name of a library's folder: a hash of the sources, the layout, the prelude and the compiler.
///
/// The compiler belongs to it because a dynamic library of Rust fits only the compiler that built it.
/// It is asked from the data folder, where cells are built: a toolchain file beside a worksheet has no say there.
///
/// # Errors
/// When `rustc` cannot be run.
pub fn content_hash(data: &DataFolder) -> Result<String, Error> {
    let compiler = Command::new("rustc")
        .arg("-vV")
        .current_dir(data.path())
        .output()
        .map_err(|cause| Error::ProgramMissing {
            program: "rustc".to_owned(),
            cause,
        })?;
    let mut hash = Sha256::new();
    for part in [LAYOUT, crate::session::PRELUDE] {
        hash.update(part.as_bytes());
        hash.update([0]);
    }
    hash.update(&compiler.stdout);
    for (path, content) in LIBRARY {
        hash.update(path.as_bytes());
        hash.update([0]);
        hash.update(content.len().to_le_bytes());
        hash.update(content);
    }
    let mut name = String::new();
    for byte in &hash.finalize()[..8] {
        let _ = write!(name, "{byte:02x}");
    }
    Ok(name)
}

/// Writes the embedded workspace into a folder.
pub(super) fn write(folder: &Path) -> Result<(), Error> {
    for (path, content) in LIBRARY {
        let is_manifest = path.ends_with("Cargo.toml");
        if is_manifest {
            let text = adapted_manifest(path, &String::from_utf8_lossy(content));
            super::write(&folder.join(path), text.as_bytes())?;
        } else {
            super::write(&folder.join(path), content)?;
        }
    }
    Ok(())
}

/// The manifest that cells are built with.
///
/// The workspace shrinks to the two crates, what only tests need goes away,
/// and `worksheets` becomes a dynamic library so that all cells share its statics.
fn adapted_manifest(path: &str, text: &str) -> String {
    let mut manifest: Table = toml::from_str(text).expect("invariant: cargo has read this manifest already");
    if let Some(Value::Table(workspace)) = manifest.get_mut("workspace") {
        let members = CRATES.map(|name| Value::String(name.to_owned()));
        workspace.insert("members".to_owned(), Value::Array(members.to_vec()));
        workspace.remove("default-members");
        workspace.remove("lints");
        if let Some(Value::Table(dependencies)) = workspace.get_mut("dependencies") {
            dependencies.retain(|_, value| match value.get("path") {
                Some(Value::String(path)) => CRATES.contains(&path.as_str()),
                _ => true,
            });
        }
    }
    for section in ["profile", "dev-dependencies", "bench", "test", "lints"] {
        manifest.remove(section);
    }
    if path.starts_with("worksheets/") {
        let library = manifest
            .entry("lib")
            .or_insert_with(|| Value::Table(Table::new()));
        if let Value::Table(library) = library {
            let kind = Value::Array(vec![Value::String("dylib".to_owned())]);
            library.insert("crate-type".to_owned(), kind);
        }
    }
    toml::to_string(&manifest).expect("invariant: a table that was read can be written")
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_sources_of_both_crates_are_embedded() {
        for wanted in ["Cargo.lock", "cas/src/lib.rs", "worksheets/src/lib.rs"] {
            assert!(LIBRARY.iter().any(|(path, _)| *path == wanted), "{wanted}");
        }
    }

    #[test]
    fn the_workspace_shrinks_to_the_library() {
        let (path, content) = LIBRARY.iter().find(|(path, _)| *path == "Cargo.toml").unwrap();
        let text = adapted_manifest(path, std::str::from_utf8(content).unwrap());
        let manifest: Table = toml::from_str(&text).unwrap();
        let workspace = &manifest["workspace"];
        assert_eq!(workspace["members"].as_array().unwrap().len(), 2);
        assert!(workspace["dependencies"].get("kernel").is_none());
        assert!(workspace["dependencies"].get("cas").is_some());
        assert!(manifest.get("profile").is_none());
    }

    #[test]
    fn only_worksheets_becomes_a_dynamic_library() {
        let text = "[package]\nname = \"x\"\n[dev-dependencies]\nproptest = \"1\"\n";
        let dynamic = adapted_manifest("worksheets/Cargo.toml", text);
        assert!(dynamic.contains("crate-type = [\"dylib\"]"), "{dynamic}");
        assert!(!dynamic.contains("proptest"), "{dynamic}");
        let usual = adapted_manifest("cas/Cargo.toml", text);
        assert!(!usual.contains("crate-type"), "{usual}");
    }
}
