//! Why a cell failed, as plain text for a notebook: at the right line of the cell, without colour codes.

use evcxr::CompilationError;

/// A failed cell.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Failure {
    /// The kind of failure in a word or two.
    pub name: String,
    /// The message.
    pub message: String,
    /// The lines that a reader sees.
    pub lines: Vec<String>,
}

impl Failure {
    fn new(name: &str, message: String, lines: Vec<String>) -> Failure {
        Failure {
            name: name.to_owned(),
            message,
            lines,
        }
    }

    /// The name and the message are all there is to see.
    fn plain(name: &str, message: String) -> Failure {
        let mut lines = message.lines().map(str::to_owned).collect::<Vec<_>>();
        if let Some(first) = lines.first_mut() {
            *first = format!("{name}: {first}");
        }
        Failure::new(name, message, lines)
    }

    pub(super) fn from_panic(message: Option<String>) -> Failure {
        let message = message.unwrap_or_else(|| "the cell panicked without a message".to_owned());
        Failure::plain("error", message)
    }

    pub(super) fn from_question_mark(printed: &str) -> Failure {
        let printed = printed.trim_end();
        let message = if printed.is_empty() {
            "the operator `?` met an error that says nothing"
        } else {
            printed
        };
        Failure::plain("error", message.to_owned())
    }

    pub(super) fn from_evaluator_panic() -> Failure {
        Failure::plain(
            "evaluator failed",
            "the evaluator stopped while it was reading this cell; restart the session".to_owned(),
        )
    }

    pub(super) fn from_evcxr(error: &evcxr::Error, code: &str) -> Failure {
        match error {
            evcxr::Error::CompilationErrors(errors) => Failure::from_compiler(errors, code),
            evcxr::Error::SubprocessTerminated(message) => {
                Failure::plain("cell process ended", message.trim_end().to_owned())
            }
            evcxr::Error::TypeRedefinedVariablesLost(_) | evcxr::Error::Message(_) => {
                Failure::plain("error", error.to_string().trim_end().to_owned())
            }
        }
    }

    fn from_compiler(errors: &[CompilationError], code: &str) -> Failure {
        // The compiler's order is that of generated code, which is not always the same: sort by place.
        let mut shown = errors
            .iter()
            .map(|error| {
                let place = error
                    .primary_spanned_message()
                    .and_then(|message| message.span)
                    .map(|span| (span.start_line, span.start_column));
                (place, error.message(), described(error, code))
            })
            .collect::<Vec<_>>();
        shown.sort();
        shown.dedup();
        let message = shown
            .iter()
            .map(|(_, message, _)| message.as_str())
            .collect::<Vec<_>>()
            .join("\n");
        let mut lines = Vec::new();
        for (_, _, description) in shown {
            if !lines.is_empty() {
                lines.push(String::new());
            }
            lines.extend(description);
        }
        Failure::new("does not compile", message, lines)
    }
}

/// Message, place, the line with carets under it, then the compiler's help.
fn described(error: &CompilationError, code: &str) -> Vec<String> {
    let code_number = error
        .code()
        .map(|number| format!("[{number}]"))
        .unwrap_or_default();
    let mut lines = vec![format!("error{code_number}: {}", error.message())];
    let source = code.lines().collect::<Vec<_>>();
    let mut spans = error
        .spanned_messages()
        .iter()
        .filter_map(|message| message.span.map(|span| (span, message.label.as_str())))
        .collect::<Vec<_>>();
    spans.sort_by_key(|(span, _)| (span.start_line, span.start_column));
    for (span, label) in spans {
        let Some(text) = source.get(span.start_line.wrapping_sub(1)) else {
            continue;
        };
        let last = if span.end_line == span.start_line {
            span.end_column
        } else {
            text.chars().count() + 1
        };
        let number = span.start_line.to_string();
        let gutter = " ".repeat(number.len());
        let indent = text
            .chars()
            .take(span.start_column.saturating_sub(1))
            .map(|character| if character == '\t' { '\t' } else { ' ' })
            .collect::<String>();
        let carets = "^".repeat(last.saturating_sub(span.start_column).max(1));
        lines.push(format!("{gutter}--> line {number}, column {}", span.start_column));
        lines.push(format!("{number} | {text}"));
        // evcxr repeats the message where the compiler has no label.
        let label = if label.strip_prefix("error: ") == Some(&error.message()) {
            ""
        } else {
            label
        };
        let mark = format!("{gutter} | {indent}{carets} {}", label.replace('\n', " "));
        lines.push(mark.trim_end().to_owned());
    }
    // Our own messages say what to write instead; which trait of ours is missing helps nobody.
    let of_ours = |help: &str| {
        ["the trait `cas::", "the trait `worksheets::"]
            .iter()
            .any(|start| help.starts_with(start))
    };
    for help in error.help().into_iter().filter(|help| !of_ours(help)) {
        let mut parts = help.lines().filter(|line| !line.trim().is_empty());
        if let Some(first) = parts.next() {
            lines.push(format!("help: {first}"));
        }
        lines.extend(parts.map(|line| format!("      {line}")));
    }
    lines
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_panic_is_one_line_with_its_name() {
        let failure = Failure::from_panic(Some("no coordinate `x`\nhint: declare it".to_owned()));
        assert_eq!(failure.message, "no coordinate `x`\nhint: declare it");
        assert_eq!(failure.lines, ["error: no coordinate `x`", "hint: declare it"]);
    }

    #[test]
    fn a_question_mark_without_text_still_says_something() {
        let failure = Failure::from_question_mark(" \n");
        assert!(failure.message.contains('?'), "{failure:?}");
        assert_eq!(failure.lines.len(), 1);
    }
}
