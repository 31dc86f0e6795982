//! Embeds the sources of the helper library and the gallery, so that the program carries all that it installs.

use std::fmt::Write as _;
use std::path::{Path, PathBuf};
use std::{env, fs, io};

fn main() -> io::Result<()> {
    let kernel = PathBuf::from(env::var_os("CARGO_MANIFEST_DIR").expect("cargo sets this"));
    let root = kernel.parent().expect("the crate lies in a workspace");

    let mut library = vec![root.join("Cargo.toml"), root.join("Cargo.lock")];
    for name in ["cas", "worksheets"] {
        library.push(root.join(name).join("Cargo.toml"));
        collect(&root.join(name).join("src"), &mut library)?;
    }
    let mut gallery = Vec::new();
    collect(&root.join("worksheets/gallery"), &mut gallery)?;
    gallery.retain(|path| path.extension().is_some_and(|extension| extension == "ipynb"));

    let mut code = String::new();
    write_table(&mut code, "LIBRARY", root, library)?;
    write_table(&mut code, "GALLERY", &root.join("worksheets/gallery"), gallery)?;
    let out = PathBuf::from(env::var_os("OUT_DIR").expect("cargo sets this"));
    fs::write(out.join("embedded.rs"), code)
}

/// Adds every file below `folder`; a folder that does not exist holds none.
fn collect(folder: &Path, files: &mut Vec<PathBuf>) -> io::Result<()> {
    println!("cargo::rerun-if-changed={}", folder.display());
    if !folder.is_dir() {
        return Ok(());
    }
    for entry in fs::read_dir(folder)? {
        let path = entry?.path();
        let hidden = path
            .file_name()
            .is_some_and(|name| name.to_string_lossy().starts_with('.'));
        if hidden {
            continue;
        }
        if path.is_dir() {
            collect(&path, files)?;
        } else {
            files.push(path);
        }
    }
    Ok(())
}

fn write_table(code: &mut String, name: &str, base: &Path, mut files: Vec<PathBuf>) -> io::Result<()> {
    // The order of a directory listing is an accident, the order of the table must not be.
    files.sort();
    let _ = writeln!(code, "pub(crate) static {name}: &[(&str, &[u8])] = &[");
    for file in files {
        println!("cargo::rerun-if-changed={}", file.display());
        let shown = file
            .strip_prefix(base)
            .map_err(io::Error::other)?
            .to_string_lossy()
            .replace('\\', "/");
        let _ = writeln!(
            code,
            "    ({shown:?}, include_bytes!({:?})),",
            file.display().to_string()
        );
    }
    code.push_str("];\n");
    Ok(())
}
