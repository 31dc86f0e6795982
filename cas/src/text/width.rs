//! How wide LaTeX comes out, roughly, so that lines can be broken before they are typeset.

/// Deeper groups than this count as nothing: such formulas are not broken well anyway.
const DEEPEST: usize = 60;

/// The width in hundredths of an em, by counting what will be visible; of a fraction the longer line.
pub(super) fn width(tex: &str) -> usize {
    Reader { rest: tex }.sequence(0)
}

struct Reader<'a> {
    rest: &'a str,
}

impl<'a> Reader<'a> {
    fn next(&mut self) -> Option<&'a str> {
        let mut characters = self.rest.char_indices();
        let (_, first) = characters.next()?;
        let end = if first == '\\' {
            let letters = self.rest[1..]
                .find(|c: char| !c.is_ascii_alphabetic())
                .map_or(self.rest.len(), |at| at + 1);
            letters.max(characters.next().map_or(1, |(at, c)| at + c.len_utf8()))
        } else {
            first.len_utf8()
        };
        let (token, rest) = self.rest.split_at(end.min(self.rest.len()));
        self.rest = rest;
        Some(token)
    }

    /// The width up to the end of the group or of the text.
    fn sequence(&mut self, depth: usize) -> usize {
        let (mut sum, mut script) = (0, false);
        while let Some(token) = self.next() {
            let one = match token {
                "}" => return sum,
                "{" => self.group(depth),
                "^" | "_" => {
                    script = true;
                    continue;
                }
                "\\frac" => self.argument(depth).max(self.argument(depth)) + 20,
                "\\left" | "\\right" | "\\bigl" | "\\bigr" | "\\mathrm" | "\\text" | "\\dot" | "\\ddot" => 0,
                "\\," => 17,
                "\\sqrt" => 80,
                "\\sin" | "\\cos" | "\\tan" => 140,
                "\\ln" => 80,
                "+" | "-" | "=" => 120,
                " " | "&" => 0,
                "(" | ")" | "," | "." => 39,
                _ => 58,
            };
            sum += if script { one * 7 / 10 } else { one };
            script = false;
        }
        sum
    }

    fn group(&mut self, depth: usize) -> usize {
        if depth < DEEPEST {
            return self.sequence(depth + 1);
        }
        let mut open = 1;
        while open > 0 {
            match self.next() {
                Some("{") => open += 1,
                Some("}") => open -= 1,
                Some(_) => {}
                None => break,
            }
        }
        0
    }

    /// The width of the argument of a command.
    fn argument(&mut self, depth: usize) -> usize {
        match self.next() {
            Some("{") => self.group(depth),
            Some(_) => 58,
            None => 0,
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn commands_are_not_as_wide_as_their_names() {
        assert_eq!(width("\\varphi"), width("x"));
        assert!(width("x_{t}") < 2 * width("x"));
        assert_eq!(width("\\frac{a}{a b c}"), width("a b c") + 20);
        assert_eq!(width("\\dot{x}"), width("x"));
        assert_eq!(width(&"{".repeat(10_000)), 0);
    }
}
