//! The worksheets of the gallery run, say what they prove, and leave nothing behind.

use std::path::{Path, PathBuf};

use anyhow::{Result, ensure};
use tests::program::workshop;
use tests::repository::root;

use super::worksheet::{folder, notebook, run, written};

#[test]
fn gallery_worksheets_prove_everything_and_change_no_byte() -> Result<()> {
    let folder = folder("gallery")?;
    for name in ["portal-crane.ipynb", "turntable-carriage.ipynb"] {
        let committed = root().join("worksheets/gallery").join(name);
        std::fs::copy(&committed, folder.join(name))?;
    }
    // Two at once: they share what is prepared, and nothing else.
    let runs = std::thread::scope(|scope| {
        ["portal-crane.ipynb", "turntable-carriage.ipynb"]
            .map(|name| scope.spawn(|| run(&["run", name], &folder)))
            .map(|running| running.join().expect("the thread ends"))
    });
    for (found, name) in runs
        .into_iter()
        .zip(["portal-crane.ipynb", "turntable-carriage.ipynb"])
    {
        let found = found?;
        ensure!(found.code == Some(0), "{name}: {}", found.said());
        for part in [
            "cells",
            "Proved",
            "Refuted 0",
            "Undecided 0",
            "side conditions",
            "agrees; largest deviation",
        ] {
            ensure!(
                found.stdout.contains(part),
                "{name}: `{part}` is missing in\n{}",
                found.said()
            );
        }
        ensure!(
            found.stderr.is_empty(),
            "progress is for a terminal: {}",
            found.stderr
        );
        let committed = std::fs::read(root().join("worksheets/gallery").join(name))?;
        let executed = std::fs::read(folder.join(name))?;
        ensure!(
            committed == executed,
            "{name}: running it again changed it; run it over itself and read the difference"
        );
    }
    Ok(())
}

#[test]
fn a_session_leaves_nothing_behind() -> Result<()> {
    let folder = folder("nothing-left")?;
    let sheet = notebook(&["let one = 1;", "one + 1"]);
    written(&folder, "small.ipynb", &sheet)?;
    let found = run(&["run", "small.ipynb"], &folder)?;
    ensure!(found.code == Some(0), "{}", found.said());
    let first = std::fs::read(folder.join("small.ipynb"))?;
    let again = run(&["run", "small.ipynb"], &folder)?;
    ensure!(again.code == Some(0), "{}", again.said());
    ensure!(
        first == std::fs::read(folder.join("small.ipynb"))?,
        "running an executed worksheet again changed it"
    );
    let here: Vec<_> = std::fs::read_dir(&folder)?.collect::<Result<_, _>>()?;
    ensure!(here.len() == 1, "files beside the worksheet: {here:?}");
    let left = cell_processes_in(&folder)?;
    ensure!(left.is_empty(), "processes of cells still run: {left:?}");

    // Other checks may have sessions open; one without a holder is left over, and the lock tells.
    // While the folder of sessions is locked none is being made.
    let data = workshop("data")?;
    let making = std::fs::File::open(data.join("sessions.lock"))?;
    making.lock()?;
    for session in std::fs::read_dir(data.join("sessions"))? {
        let lock = session?.path().join("lock");
        if let Ok(lock) = std::fs::File::open(&lock) {
            ensure!(lock.try_lock().is_err(), "an abandoned session: {lock:?}");
        }
    }
    Ok(())
}

/// The processes that run cells of worksheets in this folder, where the system lists processes as files.
fn cell_processes_in(folder: &Path) -> Result<Vec<PathBuf>> {
    let mark = format!("GUDGEON_FOLDER={}", folder.display());
    let Ok(processes) = std::fs::read_dir("/proc") else {
        return Ok(Vec::new());
    };
    let mut found = Vec::new();
    for process in processes {
        let process = process?.path();
        let variables = std::fs::read(process.join("environ")).unwrap_or_default();
        if variables
            .split(|byte| *byte == 0)
            .any(|one| one == mark.as_bytes())
        {
            found.push(process);
        }
    }
    Ok(found)
}

/// A sledge on a rail, held by a spring.
const SLEDGE: &str = "let mut sheet = Sheet::titled(\"Sledge on a rail\");\n\
    let m = sheet.positive_constant(\"m\", \"kg\", \"mass\");\n\
    let k = sheet.positive_constant(\"k\", \"N/m\", \"stiffness\");\n\
    let x = sheet.coordinate(\"x\", \"m\", \"position\");\n\
    let sledge = sheet.particle(\"sledge\", m, vector(x, 0, 0));\n\
    sheet.force(\"spring\", sledge, vector(-k * x, 0, 0));";

#[test]
fn a_reference_that_disagrees_fails_the_run() -> Result<()> {
    let folder = folder("disagreeing")?;
    let sheet = notebook(&[
        SLEDGE,
        "let mut wrong = sheet.equations().for_reference();\n\
         wrong.bias[0] = -wrong.bias[0];\n\
         let reference = worksheets::reference::Reference::new(sheet.model(), wrong);\n\
         let check = worksheets::reference::Check::new(reference);\n\
         check",
    ]);
    written(&folder, "wrong.ipynb", &sheet)?;
    let found = run(&["run", "wrong.ipynb"], &folder)?;
    ensure!(found.code == Some(1), "{}", found.said());
    for part in ["2 of 2 run", "does not agree"] {
        ensure!(found.stdout.contains(part), "{}", found.said());
    }
    Ok(())
}

#[test]
fn a_refuted_step_fails_the_run() -> Result<()> {
    let folder = folder("refuted")?;
    // Our own steps are proved, so the cell hands out a record in which somebody else's step is not.
    let sheet = notebook(&[
        "let record = r#\"{\"steps\": [{\"key\": \"claimed.x\", \"verdict\": {\"kind\": \"Refuted\"}}]}\"#;\n\
         println!(\"EVCXR_BEGIN_CONTENT application/vnd.gudgeon.record+json\");\n\
         println!(\"{record}\");\n\
         println!(\"EVCXR_END_CONTENT\");",
    ]);
    written(&folder, "wrong.ipynb", &sheet)?;
    let found = run(&["run", "wrong.ipynb"], &folder)?;
    ensure!(found.code == Some(1), "{}", found.said());
    for part in ["1 of 1 run", "Refuted 1"] {
        ensure!(found.stdout.contains(part), "{}", found.said());
    }
    Ok(())
}
