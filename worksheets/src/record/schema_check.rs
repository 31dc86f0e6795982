//! A check of JSON against the published schema, for tests: exactly the keywords that the schema uses.
//!
//! A general validator costs minutes of building for a schema this plain. Every keyword that is not
//! known here fails, so the schema cannot say something that no test looks at.

use serde_json::Value;

/// Fails with the path where the value does not fit the schema.
pub(super) fn fits(schema: &Value, value: &Value) -> Result<(), String> {
    check(schema, schema, value, "$")
}

fn check(root: &Value, schema: &Value, value: &Value, path: &str) -> Result<(), String> {
    let keywords = schema
        .as_object()
        .ok_or_else(|| format!("{path}: a schema is an object"))?;
    for (keyword, said) in keywords {
        let fits = match keyword.as_str() {
            "$schema" | "$defs" | "title" | "description" => true,
            "$ref" => {
                let pointer = said.as_str().and_then(|text| text.strip_prefix('#'));
                let target = pointer.and_then(|pointer| root.pointer(pointer));
                let target = target.ok_or_else(|| format!("{path}: {said} leads nowhere"))?;
                check(root, target, value, path)?;
                true
            }
            "type" => is_of_type(said, value),
            "const" => value == said,
            "enum" => said.as_array().is_some_and(|choices| choices.contains(value)),
            "minimum" => value.as_f64() >= said.as_f64(),
            "maximum" => value.as_f64() <= said.as_f64(),
            "minItems" => value.as_array().map(Vec::len) >= size(said),
            "maxItems" => value.as_array().map(Vec::len) <= size(said),
            "pattern" => matches_pattern(said, value),
            "items" => {
                for (place, item) in value.as_array().into_iter().flatten().enumerate() {
                    check(root, said, item, &format!("{path}[{place}]"))?;
                }
                true
            }
            "properties" => {
                for (name, property) in said.as_object().into_iter().flatten() {
                    if let Some(inner) = value.get(name) {
                        check(root, property, inner, &format!("{path}.{name}"))?;
                    }
                }
                true
            }
            "required" => {
                let names = said.as_array().into_iter().flatten().filter_map(Value::as_str);
                let missing: Vec<&str> = names.filter(|name| value.get(name).is_none()).collect();
                if !missing.is_empty() {
                    return Err(format!("{path}: {missing:?} is missing"));
                }
                true
            }
            "additionalProperties" => {
                let known = schema["properties"].as_object();
                let strange = value
                    .as_object()
                    .into_iter()
                    .flatten()
                    .find(|(name, _)| known.is_none_or(|known| !known.contains_key(*name)));
                if let Some((name, _)) = strange {
                    return Err(format!("{path}: {name} is not in the schema"));
                }
                said == false
            }
            "anyOf" | "oneOf" => {
                let choices = said.as_array().into_iter().flatten();
                let found: Vec<_> = choices.map(|choice| check(root, choice, value, path)).collect();
                let fitting = found.iter().filter(|found| found.is_ok()).count();
                if fitting == 0 {
                    let reasons: Vec<String> = found.into_iter().filter_map(Result::err).collect();
                    return Err(format!(
                        "{path}: none of the choices fits: {}",
                        reasons.join("; ")
                    ));
                }
                keyword == "anyOf" || fitting == 1
            }
            other => return Err(format!("{path}: the keyword {other} is not known to this check")),
        };
        if !fits {
            return Err(format!("{path}: {value} does not fit {keyword} {said}"));
        }
    }
    Ok(())
}

fn size(said: &Value) -> Option<usize> {
    said.as_u64().and_then(|size| usize::try_from(size).ok())
}

fn is_of_type(said: &Value, value: &Value) -> bool {
    match said.as_str() {
        Some("object") => value.is_object(),
        Some("array") => value.is_array(),
        Some("string") => value.is_string(),
        Some("integer") => value.is_i64() || value.is_u64(),
        Some("number") => value.is_number(),
        Some("boolean") => value.is_boolean(),
        Some("null") => value.is_null(),
        _ => false,
    }
}

/// The two patterns that the schema has.
fn matches_pattern(said: &Value, value: &Value) -> bool {
    let Some(text) = value.as_str() else {
        return true;
    };
    match said.as_str() {
        Some(" (!=|>=|>) 0$") => [" != 0", " >= 0", " > 0"].iter().any(|end| text.ends_with(end)),
        Some("^(step|statement|assumption) ") => ["step ", "statement ", "assumption "]
            .iter()
            .any(|start| text.starts_with(start)),
        _ => false,
    }
}

#[test]
fn the_check_sees_what_does_not_fit() {
    let schema = serde_json::json!({
        "type": "object",
        "properties": {"a": {"$ref": "#/$defs/b"}, "c": {"enum": ["d"]}},
        "required": ["a"],
        "additionalProperties": false,
        "$defs": {"b": {"type": "array", "items": {"type": "integer", "minimum": 1}, "maxItems": 2}},
    });
    let fit = |value: Value| fits(&schema, &value);
    assert_eq!(fit(serde_json::json!({"a": [1, 2], "c": "d"})), Ok(()));
    for wrong in [
        serde_json::json!({"c": "d"}),
        serde_json::json!({"a": [0]}),
        serde_json::json!({"a": [1, 2, 3]}),
        serde_json::json!({"a": [1.5]}),
        serde_json::json!({"a": [], "c": "e"}),
        serde_json::json!({"a": [], "e": 1}),
        serde_json::json!([]),
    ] {
        assert!(fit(wrong.clone()).is_err(), "{wrong}");
    }
}
