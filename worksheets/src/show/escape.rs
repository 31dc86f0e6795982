//! Escaping of text for HTML and for TeX.

/// Text as it may stand in HTML, in content and in quoted attributes.
pub(super) fn html(text: &str) -> String {
    let mut escaped = String::with_capacity(text.len());
    for character in text.chars() {
        match character {
            '&' => escaped.push_str("&amp;"),
            '<' => escaped.push_str("&lt;"),
            '>' => escaped.push_str("&gt;"),
            '"' => escaped.push_str("&quot;"),
            '\'' => escaped.push_str("&#39;"),
            // A dollar sign in prose would open a formula in front ends that look for TeX in HTML.
            '$' => escaped.push_str("<span>$</span>"),
            other if other.is_control() && other != '\n' && other != '\t' => escaped.push('\u{fffd}'),
            other => escaped.push(other),
        }
    }
    // So would these two.
    escaped
        .replace("\\(", "\\<span>(</span>")
        .replace("\\[", "\\<span>[</span>")
}

/// Text as it may stand in LaTeX prose.
pub(super) fn tex(text: &str) -> String {
    let mut escaped = String::with_capacity(text.len());
    for character in text.chars() {
        match character {
            '\\' => escaped.push_str("\\textbackslash{}"),
            '{' | '}' | '$' | '&' | '#' | '%' | '_' => {
                escaped.push('\\');
                escaped.push(character);
            }
            '^' => escaped.push_str("\\textasciicircum{}"),
            '~' => escaped.push_str("\\textasciitilde{}"),
            '<' => escaped.push_str("\\textless{}"),
            '>' => escaped.push_str("\\textgreater{}"),
            '\u{2713}' => escaped.push_str("$\\checkmark$"),
            '\u{2717}' => escaped.push_str("$\\times$"),
            '\u{2022}' => escaped.push_str("$\\cdot$"),
            '\u{2248}' => escaped.push_str("$\\approx$"),
            other if other.is_control() && other != '\n' => {}
            other => escaped.push(other),
        }
    }
    escaped
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn nothing_opens_a_tag_or_a_formula() {
        let wicked = "<script>alert('x')</script> $x$ \\(y\\) \" & \u{1}";
        let safe = html(wicked);
        assert!(!safe.contains("<script"));
        assert!(!safe.contains("$x$") && !safe.contains("\\(y"));
        assert!(!safe.contains('"') && !safe.contains('\u{1}'));
        assert_eq!(html("a < b"), "a &lt; b");
    }

    #[test]
    fn tex_has_no_commands_of_the_text() {
        assert_eq!(tex("50% of \\input{x}"), "50\\% of \\textbackslash{}input\\{x\\}");
        assert_eq!(tex("m_t & $"), "m\\_t \\& \\$");
    }
}
