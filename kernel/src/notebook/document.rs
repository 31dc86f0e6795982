//! The notebook as JSON, checked once for what a run relies on.

use super::file::{self, Destination};
use crate::error::Error;
use serde_json::ser::{PrettyFormatter, Serializer};
use serde_json::{Map, Value};
use std::fs;
use std::path::Path;

/// A worksheet: a notebook of format 4 for the kernel `gudgeon`.
#[derive(Debug, Clone)]
pub struct Notebook {
    document: Value,
    indentation: String,
    ends_with_newline: bool,
}

impl Notebook {
    /// Reads a worksheet.
    ///
    /// # Errors
    /// When there is no such file, it is not a notebook of format 4, or it belongs to another kernel.
    pub fn read(path: &Path) -> Result<Notebook, Error> {
        file::must_be_file(path)?;
        let bytes = fs::read(path).map_err(|cause| Error::Unreadable {
            path: path.to_path_buf(),
            cause,
        })?;
        Self::parse(path, &bytes)
    }

    /// Reads a worksheet from its bytes; `path` is what errors name.
    ///
    /// # Errors
    /// As for [`Notebook::read`].
    pub fn parse(path: &Path, bytes: &[u8]) -> Result<Notebook, Error> {
        let document = serde_json::from_slice(bytes).map_err(|cause| Error::NotJson {
            path: path.to_path_buf(),
            cause,
        })?;
        let notebook = Notebook {
            document,
            indentation: indentation_of(bytes),
            ends_with_newline: bytes.ends_with(b"\n"),
        };
        notebook.check(path)?;
        Ok(notebook)
    }

    fn check(&self, path: &Path) -> Result<(), Error> {
        let lacks = |lack: String| Error::NotNotebook {
            path: path.to_path_buf(),
            lack,
        };
        if !self.document.is_object() {
            return Err(lacks("it is not an object with keys".to_owned()));
        }
        let format = self.document["nbformat"]
            .as_i64()
            .ok_or_else(|| lacks("it has no number `nbformat`".to_owned()))?;
        if format != 4 {
            return Err(Error::OtherFormat {
                path: path.to_path_buf(),
                found: format,
            });
        }
        match self.document["metadata"]["kernelspec"]["name"].as_str() {
            Some("gudgeon") => {}
            Some(other) => {
                return Err(Error::OtherKernel {
                    path: path.to_path_buf(),
                    found: other.to_owned(),
                });
            }
            None => return Err(Error::NoKernel(path.to_path_buf())),
        }
        let cells = self.document["cells"]
            .as_array()
            .ok_or_else(|| lacks("it has no list `cells`".to_owned()))?;
        for (index, cell) in cells.iter().enumerate() {
            let number = index + 1;
            if !cell["cell_type"].is_string() {
                return Err(lacks(format!("cell {number} has no `cell_type`")));
            }
            if text_of(&cell["source"]).is_none() {
                return Err(lacks(format!("cell {number} has no text `source`")));
            }
        }
        Ok(())
    }

    /// Places of the code cells, in order.
    #[must_use]
    pub fn code_cells(&self) -> Vec<usize> {
        self.cells()
            .iter()
            .enumerate()
            .filter(|(_, cell)| cell["cell_type"] == "code")
            .map(|(place, _)| place)
            .collect()
    }

    /// The text of the cell at a place.
    #[must_use]
    pub fn source(&self, place: usize) -> String {
        self.cells()
            .get(place)
            .and_then(|cell| text_of(&cell["source"]))
            .unwrap_or_default()
    }

    /// Replaces what a run left in the cell at a place.
    pub fn set_outputs(&mut self, place: usize, count: Option<u64>, outputs: Vec<Value>) {
        let cell = self
            .document
            .get_mut("cells")
            .and_then(|cells| cells.get_mut(place))
            .and_then(Value::as_object_mut);
        if let Some(cell) = cell {
            cell.insert(
                "execution_count".to_owned(),
                count.map_or(Value::Null, Value::from),
            );
            cell.insert("outputs".to_owned(), Value::Array(outputs));
        }
    }

    /// Writes the notebook, all of it or nothing.
    ///
    /// # Errors
    /// When the destination refuses it.
    pub fn write(&self, destination: &Destination) -> Result<(), Error> {
        destination.write(&self.to_bytes())
    }

    /// The bytes of the file.
    #[must_use]
    pub fn to_bytes(&self) -> Vec<u8> {
        let mut bytes = Vec::new();
        let formatter = PrettyFormatter::with_indent(self.indentation.as_bytes());
        let mut serializer = Serializer::with_formatter(&mut bytes, formatter);
        serde::Serialize::serialize(&self.document, &mut serializer)
            .expect("invariant: a JSON value can be written to memory");
        if self.ends_with_newline {
            bytes.push(b'\n');
        }
        bytes
    }

    fn cells(&self) -> &[Value] {
        self.document["cells"].as_array().map_or(&[][..], Vec::as_slice)
    }
}

/// Jupyter stores a text as one string or as a list of lines.
fn text_of(value: &Value) -> Option<String> {
    match value {
        Value::String(text) => Some(text.clone()),
        Value::Array(lines) => lines.iter().map(Value::as_str).collect(),
        Value::Null | Value::Bool(_) | Value::Number(_) | Value::Object(_) => None,
    }
}

/// The white space before the first key; one space, as Jupyter writes it, if the file is a single line.
fn indentation_of(bytes: &[u8]) -> String {
    let mut lines = bytes.split(|byte| *byte == b'\n').skip(1);
    let line = lines.find(|line| !line.trim_ascii().is_empty());
    let found = line
        .unwrap_or_default()
        .iter()
        .take_while(|byte| **byte == b' ' || **byte == b'\t')
        .map(|byte| char::from(*byte))
        .collect::<String>();
    if found.is_empty() { " ".to_owned() } else { found }
}

/// The same object with its keys in alphabetical order at every depth, as Jupyter writes them when it saves a file.
pub(super) fn sorted(value: Value) -> Value {
    match value {
        Value::Object(map) => {
            let mut entries = map.into_iter().collect::<Vec<_>>();
            entries.sort_by(|(left, _), (right, _)| left.cmp(right));
            Value::Object(Map::from_iter(
                entries.into_iter().map(|(name, value)| (name, sorted(value))),
            ))
        }
        Value::Array(values) => Value::Array(values.into_iter().map(sorted).collect()),
        plain @ (Value::Null | Value::Bool(_) | Value::Number(_) | Value::String(_)) => plain,
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use serde_json::json;

    const SMALL: &str = r#"{
   "zeta": [1, 2.5],
   "cells": [
      {
         "cell_type": "code",
         "execution_count": null,
         "id": "a",
         "metadata": {"mine": "ä"},
         "outputs": [],
         "source": ["let a = 1;\n", "a"]
      },
      {"cell_type": "markdown", "id": "b", "metadata": {}, "source": "text"}
   ],
   "metadata": {"kernelspec": {"name": "gudgeon"}, "unknown": {"b": 1, "a": 2}},
   "nbformat": 4,
   "nbformat_minor": 5
}
"#;

    fn parse(text: &str) -> Result<Notebook, Error> {
        Notebook::parse(Path::new("sheet.ipynb"), text.as_bytes())
    }

    #[test]
    fn writing_twice_changes_no_byte() {
        let once = parse(SMALL).unwrap().to_bytes();
        let text = String::from_utf8(once.clone()).unwrap();
        assert_eq!(parse(&text).unwrap().to_bytes(), once);
        assert!(text.starts_with("{\n   \"zeta\": [\n      1,\n      2.5\n   ]"));
        assert!(text.ends_with("}\n"));
        assert!(text.contains("\"mine\": \"ä\""));
    }

    #[test]
    fn only_outputs_and_count_change() {
        let mut notebook = parse(SMALL).unwrap();
        assert_eq!(notebook.code_cells(), [0]);
        assert_eq!(notebook.source(0), "let a = 1;\na");
        notebook.set_outputs(0, Some(1), vec![json!({"output_type": "x"})]);
        let changed = String::from_utf8(notebook.to_bytes()).unwrap();
        let mut expected = serde_json::from_str::<Value>(SMALL).unwrap();
        expected["cells"][0]["execution_count"] = json!(1);
        expected["cells"][0]["outputs"] = json!([{"output_type": "x"}]);
        assert_eq!(serde_json::from_str::<Value>(&changed).unwrap(), expected);
        assert!(changed.find("zeta").unwrap() < changed.find("cells").unwrap());
    }

    #[test]
    fn what_is_no_worksheet_is_named() {
        assert!(matches!(parse("{oops"), Err(Error::NotJson { .. })));
        assert!(matches!(parse("[]"), Err(Error::NotNotebook { .. })));
        assert!(matches!(parse("{}"), Err(Error::NotNotebook { .. })));
        let third = SMALL.replace("\"nbformat\": 4", "\"nbformat\": 3");
        assert!(matches!(parse(&third), Err(Error::OtherFormat { found: 3, .. })));
        let other = SMALL.replace("gudgeon", "other");
        assert!(matches!(parse(&other), Err(Error::OtherKernel { found, .. }) if found == "other"));
        let none = SMALL.replace("kernelspec", "something");
        assert!(matches!(parse(&none), Err(Error::NoKernel(_))));
        let cell = SMALL.replace("\"source\": \"text\"", "\"source\": 7");
        let error = parse(&cell).unwrap_err().to_string();
        assert!(error.contains("cell 2"), "{error}");
    }
}
