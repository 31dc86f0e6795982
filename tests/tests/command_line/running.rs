//! The worksheets of the gallery run, say what they prove, and leave nothing behind.

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
    let sheet = notebook(&["let one = 1;"]);
    written(&folder, "small.ipynb", &sheet)?;
    let found = run(&["run", "small.ipynb"], &folder)?;
    ensure!(found.code == Some(0), "{}", found.said());
    let here: Vec<_> = std::fs::read_dir(&folder)?.collect::<Result<_, _>>()?;
    ensure!(here.len() == 1, "files beside the worksheet: {here:?}");
    // Other checks may have sessions open; one without a holder is left over, and the lock tells.
    for session in std::fs::read_dir(workshop("data")?.join("sessions"))? {
        let lock = session?.path().join("lock");
        if let Ok(lock) = std::fs::File::open(&lock) {
            ensure!(lock.try_lock().is_err(), "an abandoned session: {lock:?}");
        }
    }
    Ok(())
}

#[test]
fn a_refuted_step_or_a_reference_that_disagrees_fails_the_run() -> Result<()> {
    let folder = folder("refuted")?;
    let sheet = notebook(&[
        "let mut sheet = Sheet::titled(\"Sledge on a rail\");\n\
         let m = sheet.positive_constant(\"m\", \"kg\", \"mass\");\n\
         let k = sheet.positive_constant(\"k\", \"N/m\", \"stiffness\");\n\
         let x = sheet.coordinate(\"x\", \"m\", \"position\");\n\
         let sledge = sheet.particle(\"sledge\", m, vector(x, 0, 0));\n\
         sheet.force(\"spring\", sledge, vector(-k * x, 0, 0));",
        "let mut wrong = sheet.equations().for_reference();\n\
         wrong.bias[0] = -wrong.bias[0];\n\
         let reference = worksheets::reference::Reference::new(sheet.model(), wrong);\n\
         let check = worksheets::reference::Check::new(reference);\n\
         check",
    ]);
    written(&folder, "wrong.ipynb", &sheet)?;
    let found = run(&["run", "wrong.ipynb"], &folder)?;
    ensure!(found.code == Some(1), "{}", found.said());
    ensure!(found.stdout.contains("does not agree"), "{}", found.said());
    Ok(())
}
