//! Cells that cannot be right: one clear message in the cell, the next step, and no file lost.

use std::path::Path;

use anyhow::{Result, ensure};

use super::worksheet::{folder, notebook, outputs, run, written};

/// A wrong cell, and words that its message has to have.
struct Wrong {
    name: &'static str,
    cell: &'static str,
    words: &'static [&'static str],
}

/// What every one of these worksheets begins with.
const BEGINNING: &str = "let mut sheet = Sheet::titled(\"Test rig\");\n\
    let m = sheet.positive_constant(\"m\", \"kg\", \"mass of the carriage\");\n\
    let x = sheet.coordinate(\"x\", \"m\", \"position\");";

const WRONG: [Wrong; 12] = [
    Wrong {
        name: "unit",
        cell: "let v = sheet.constant(\"v\", \"furlong\", \"speed of the belt\");",
        words: &["furlong", "unit", "what to do"],
    },
    Wrong {
        name: "components",
        cell: "let carriage = sheet.particle(\"carriage\", m, vector(x, 0));",
        words: &["argument", "vector", "line 1"],
    },
    Wrong {
        name: "undeclared",
        cell: "let stray = Expr::symbol(\"y\").unwrap();\nlet carriage = sheet.particle(\"carriage\", m, vector(x, stray, 0));",
        words: &["`y`", "declare", "what to do"],
    },
    Wrong {
        name: "undeclared-variable",
        cell: "let carriage = sheet.particle(\"carriage\", m, vector(x, y, 0));",
        words: &["`y`", "line 1"],
    },
    Wrong {
        name: "twice",
        cell: "let again = sheet.constant(\"m\", \"m\", \"length of the rail\");",
        words: &["`m`", "what to do"],
    },
    Wrong {
        name: "division",
        cell: "let carriage = sheet.particle(\"carriage\", m, vector(x / 0, 0, 0));",
        words: &["`carriage`", "`1/0`", "divided by zero", "what to do"],
    },
    Wrong {
        name: "gravity",
        cell: "sheet.gravity(exact(\"9.81\") * x, vector(0, 0, -1));",
        words: &["gravity", "coordinate `x`", "what to do", "sheet.force"],
    },
    Wrong {
        name: "force",
        cell: "let push = sheet.input(\"F\", \"N\", \"push\");\nsheet.force(\"push\", \"carriage\", vector(push, 0, 0));",
        words: &["there is no particle `carriage`", "what to do", "declare"],
    },
    Wrong {
        name: "empty",
        cell: "sheet.equations()",
        words: &["particle", "what to do"],
    },
    Wrong {
        name: "decimal",
        cell: "let half = 0.5 * x;",
        words: &["decimal", "as text", "exact(\"", "line 1"],
    },
    Wrong {
        name: "rust",
        cell: "let one = 1;\nlet two: i32 = \"two\";",
        words: &["mismatched types", "line 2"],
    },
    Wrong {
        name: "panic",
        cell: "let none: Option<i32> = None;\nnone.expect(\"the belt has stopped\");",
        words: &["the belt has stopped"],
    },
];

#[test]
fn wrong_cells_are_explained_where_they_stand() -> Result<()> {
    let folder = folder("cells")?;
    let (first, second) = WRONG.split_at(WRONG.len() / 2);
    let both = std::thread::scope(|scope| {
        [first, second]
            .map(|part| {
                let folder = &folder;
                scope.spawn(move || {
                    part.iter()
                        .filter_map(|wrong| explained(wrong, folder).err())
                        .collect()
                })
            })
            .map(|running| running.join().expect("the thread ends"))
    });
    let complaints: Vec<anyhow::Error> = both.into_iter().flat_map(|found: Vec<_>| found).collect();
    ensure!(complaints.is_empty(), "{complaints:#?}");
    Ok(())
}

fn explained(wrong: &Wrong, folder: &Path) -> Result<()> {
    let name = format!("{}.ipynb", wrong.name);
    let path = written(folder, &name, &notebook(&[BEGINNING, wrong.cell, "sheet"]))?;
    let before = std::fs::read(&path)?;
    let output = format!("{}-executed.ipynb", wrong.name);
    let found = run(&["run", &name, "--output", &output], folder)?;
    ensure!(found.code == Some(1), "{name}: {}", found.said());
    ensure!(
        std::fs::read(&path)? == before,
        "{name}: the original was changed"
    );
    let executed = folder.join(&output);
    let in_cell = serde_json::to_string(&outputs(&executed, 1)?)?.replace("\\\"", "\"");
    for word in wrong.words.iter().chain(&["code cell 2 failed", "2 of 3 run"]) {
        ensure!(
            found.stdout.contains(word),
            "{name}: `{word}` is missing in\n{}",
            found.said()
        );
    }
    for word in wrong.words {
        ensure!(
            in_cell.contains(word),
            "{name}: `{word}` is missing in the cell\n{in_cell}"
        );
    }
    ensure!(
        !in_cell.contains("stack backtrace") && !in_cell.contains("\\u001b"),
        "{name}: {in_cell}"
    );
    ensure!(
        outputs(&executed, 2)?.is_empty(),
        "{name}: a cell behind the wrong one has outputs"
    );
    Ok(())
}
