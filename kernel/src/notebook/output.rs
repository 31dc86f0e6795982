//! The three kinds of output that a run stores, in the form of notebook format 4.5.

use super::document::sorted;
use crate::session::Failure;
use serde_json::{Map, Value, json};
use std::collections::BTreeMap;

/// Text written to `stdout` or `stderr`.
#[must_use]
pub fn stream(name: &str, text: &str) -> Value {
    json!({"name": name, "output_type": "stream", "text": lines(text)})
}

/// The value at the end of a cell.
///
/// A JSON type is stored as JSON, except where its text is none: then the text is kept as it is.
#[must_use]
pub fn display(count: u64, value: &BTreeMap<String, String>) -> Value {
    let mut data = Map::new();
    for (mime_type, text) in value {
        let is_json = mime_type == "application/json" || mime_type.ends_with("+json");
        let json = serde_json::from_str(text).ok().filter(|_| is_json);
        let stored = json.map_or_else(|| lines(text), sorted);
        data.insert(mime_type.clone(), stored);
    }
    json!({"data": data, "execution_count": count, "metadata": {}, "output_type": "execute_result"})
}

/// A failed cell.
#[must_use]
pub fn error(failure: &Failure) -> Value {
    json!({
        "ename": failure.name,
        "evalue": failure.message,
        "output_type": "error",
        "traceback": failure.lines,
    })
}

/// A text as Jupyter stores it: cut after each line end.
///
/// Jupyter cuts where Python's `splitlines` does, and would change the file on its next save if we did not.
fn lines(text: &str) -> Value {
    let mut lines = Vec::new();
    let mut line = String::new();
    let mut characters = text.chars().peekable();
    while let Some(character) = characters.next() {
        line.push(character);
        let pair = character == '\r' && characters.peek() == Some(&'\n');
        let ends = matches!(
            character,
            '\n' | '\r' | '\u{b}' | '\u{c}' | '\u{1c}'..='\u{1e}' | '\u{85}' | '\u{2028}' | '\u{2029}'
        );
        if ends && !pair {
            lines.push(Value::String(std::mem::take(&mut line)));
        }
    }
    if !line.is_empty() {
        lines.push(Value::String(line));
    }
    Value::Array(lines)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn text_is_cut_after_line_ends() {
        assert_eq!(lines("a\nb"), json!(["a\n", "b"]));
        assert_eq!(lines("a\r\nb\u{2028}"), json!(["a\r\n", "b\u{2028}"]));
        assert_eq!(lines(""), json!([]));
    }

    #[test]
    fn json_types_are_stored_as_json_with_sorted_keys() {
        let value = BTreeMap::from([
            (
                "application/x+json".to_owned(),
                r#"{"b": {"d": 1, "c": [2]}, "a": 0}"#.to_owned(),
            ),
            ("text/plain".to_owned(), "one\ntwo".to_owned()),
        ]);
        let stored = display(3, &value);
        assert_eq!(
            serde_json::to_string(&stored).unwrap(),
            concat!(
                r#"{"data":{"application/x+json":{"a":0,"b":{"c":[2],"d":1}},"#,
                r#""text/plain":["one\n","two"]},"#,
                r#""execution_count":3,"metadata":{},"output_type":"execute_result"}"#
            )
        );
    }

    #[test]
    fn json_that_is_none_stays_text() {
        let value = BTreeMap::from([("application/json".to_owned(), "{oops".to_owned())]);
        assert_eq!(display(1, &value)["data"]["application/json"], json!(["{oops"]));
    }
}
