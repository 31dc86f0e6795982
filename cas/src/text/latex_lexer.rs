//! Taking a text in LaTeX apart: characters, commands, and the text that a command takes as it is.

use super::fault::ReadFault;
use super::latex::GREEK;
use super::latex_command::{advice, function, is_conjunction, is_environment, is_ignored, is_size, is_space};
use super::latex_token::{Mark, Placed, Token};
use crate::expr::{Name, NameError};

/// Takes a text apart.
pub(super) fn tokens(source: &str) -> Result<Vec<Token>, Placed> {
    let mut lexer = Lexer {
        source: source.chars().collect(),
        at: 0,
        spaced: false,
        apart: false,
        far: false,
        in_dollars: None,
        tokens: Vec::new(),
    };
    while lexer.at < lexer.source.len() {
        lexer.step()?;
    }
    Ok(lexer.tokens)
}

struct Lexer {
    source: Vec<char>,
    at: usize,
    spaced: bool,
    apart: bool,
    far: bool,
    in_dollars: Option<usize>,
    tokens: Vec<Token>,
}

impl Lexer {
    fn push(&mut self, mark: Mark, from: usize) {
        self.tokens.push(Token {
            mark,
            place: from + 1,
            length: self.at - from,
            spaced: std::mem::take(&mut self.spaced),
            apart: std::mem::take(&mut self.apart),
            far: std::mem::take(&mut self.far),
            partner: 0,
        });
    }

    fn peek(&self) -> Option<char> {
        self.source.get(self.at).copied()
    }

    fn space(&mut self, apart: bool) {
        self.spaced = true;
        self.apart |= apart;
    }

    fn skip_space(&mut self) {
        while self.peek().is_some_and(char::is_whitespace) {
            self.at += 1;
        }
    }

    fn step(&mut self) -> Result<(), Placed> {
        let from = self.at;
        let c = self.source[from];
        self.at += 1;
        let mark = match c {
            c if c.is_whitespace() => {
                self.space(false);
                return Ok(());
            }
            '~' => {
                self.space(true);
                return Ok(());
            }
            '%' => {
                // The rest of the line is a remark.
                while self.peek().is_some_and(|c| c != '\n') {
                    self.at += 1;
                }
                return Ok(());
            }
            '\\' => return self.command(from),
            '$' => self.dollars(),
            '}' => {
                self.close_group(from);
                return Ok(());
            }
            '{' => Mark::OpenGroup,
            '(' | '[' => Mark::Open(c),
            ')' | ']' => Mark::Close(c),
            '^' => Mark::Above,
            '_' => Mark::Below,
            '\'' | '\u{2019}' | '\u{2032}' => Mark::Prime,
            '+' => Mark::Plus,
            '-' | '\u{2212}' => Mark::Minus,
            '*' | '\u{b7}' | '\u{d7}' => Mark::Times,
            '/' => Mark::Slash,
            '=' => Mark::Equals,
            '|' => Mark::Bar,
            '&' => Mark::Column,
            '.' => Mark::Point,
            ',' | ';' => Mark::Comma,
            c if c.is_ascii_digit() => Mark::Digit(c),
            c if c.is_alphabetic() => Mark::Letter(c),
            found => return Err((ReadFault::Sign { found }, from + 1)),
        };
        self.push(mark, from);
        Ok(())
    }

    fn dollars(&mut self) -> Mark {
        let mut count = 1;
        if self.peek() == Some('$') && self.in_dollars != Some(1) {
            self.at += 1;
            count = 2;
        }
        let text = "$".repeat(count);
        match self.in_dollars.take() {
            Some(_) => Mark::End(text),
            None => {
                self.in_dollars = Some(count);
                Mark::Begin(text)
            }
        }
    }

    /// An empty pair of braces after a sign only sets the spacing of that sign.
    fn close_group(&mut self, from: usize) {
        let is_empty = matches!(self.tokens.last(), Some(last) if last.mark == Mark::OpenGroup);
        let before = self.tokens.len().checked_sub(2).map(|at| &self.tokens[at].mark);
        let void = matches!(
            before,
            None | Some(
                Mark::Equals
                    | Mark::Plus
                    | Mark::Minus
                    | Mark::Times
                    | Mark::Break
                    | Mark::Column
                    | Mark::Begin(_)
            )
        );
        if is_empty && void {
            self.tokens.pop();
            self.space(false);
        } else {
            self.push(Mark::CloseGroup, from);
        }
    }

    fn command(&mut self, from: usize) -> Result<(), Placed> {
        let letters = self.source[self.at..]
            .iter()
            .take_while(|c| c.is_ascii_alphabetic())
            .count();
        // A command is a run of letters or one other character.
        self.at = (self.at + letters.max(1)).min(self.source.len());
        let name: String = self.source[from + 1..self.at].iter().collect();
        if let Some(called) = function(&name) {
            self.push(Mark::Function(called), from);
            return Ok(());
        }
        let mark = match name.as_str() {
            "frac" | "dfrac" | "tfrac" | "cfrac" => Mark::Fraction,
            "sqrt" => Mark::Root,
            "dot" => Mark::Dots(1),
            "ddot" => Mark::Dots(2),
            "dddot" => Mark::Dots(3),
            "ddddot" => Mark::Dots(4),
            "partial" => Mark::Partial,
            "prime" => Mark::Prime,
            "cdot" | "times" | "ast" => Mark::Times,
            "{" | "lbrace" => Mark::Open('{'),
            "}" | "rbrace" => Mark::Close('}'),
            "lbrack" => Mark::Open('['),
            "rbrack" => Mark::Close(']'),
            "vert" | "lvert" | "rvert" | "mid" => Mark::Bar,
            "pi" => Mark::Pi,
            "phi" | "varphi" => Mark::Greek("phi"),
            "epsilon" | "varepsilon" => Mark::Greek("epsilon"),
            "vartheta" => Mark::Greek("theta"),
            "varrho" => Mark::Greek("rho"),
            "[" => Mark::Begin("\\]".to_owned()),
            "(" => Mark::Begin("\\)".to_owned()),
            "]" | ")" => Mark::End(format!("\\{name}")),
            "\\" | "newline" | "cr" => return self.line_end(from),
            "begin" | "end" => return self.environment(&name, from),
            "mathrm" | "text" | "operatorname" | "mathit" | "textrm" | "textit" | "mathop" => {
                return self.word(&name, from);
            }
            "tag" | "label" | "hspace" | "vspace" => {
                if self.peek() == Some('*') {
                    self.at += 1;
                }
                self.raw_group(&name, from)?;
                self.space(false);
                return Ok(());
            }
            _ if is_size(&name) => {
                self.skip_space();
                // A full stop stands for the missing bracket of a pair.
                if self.peek() == Some('.') {
                    self.at += 1;
                }
                return Ok(());
            }
            _ if is_space(&name) => {
                self.space(true);
                self.far |= matches!(name.as_str(), "quad" | "qquad");
                return Ok(());
            }
            _ if is_ignored(&name) => return Ok(()),
            _ => match GREEK.iter().find(|letter| **letter == name) {
                Some(letter) => Mark::Greek(letter),
                None => {
                    let fault = ReadFault::Command {
                        instead: advice(&name),
                        command: name,
                    };
                    return Err((fault, from + 1));
                }
            },
        };
        self.push(mark, from);
        Ok(())
    }

    /// The end of a line may have a star and a distance in square brackets.
    fn line_end(&mut self, from: usize) -> Result<(), Placed> {
        self.push(Mark::Break, from);
        if self.peek() == Some('*') {
            self.at += 1;
        }
        if self.peek() == Some('[') {
            self.distance();
        }
        Ok(())
    }

    /// Skips an option in square brackets if it is one: a bracket of a formula is left alone.
    fn distance(&mut self) {
        let inside = self.source[self.at + 1..].iter().take(12);
        let length = inside
            .take_while(|c| c.is_ascii_alphanumeric() || matches!(c, '.' | '-'))
            .count();
        let text: String = self.source[self.at + 1..self.at + 1 + length].iter().collect();
        let unit = ["pt", "em", "ex", "mm", "cm", "in", "mu", "t", "b", "c"];
        let closed = self.source.get(self.at + 1 + length) == Some(&']');
        if closed && unit.iter().any(|unit| text.ends_with(unit)) {
            self.at += length + 2;
        }
    }

    fn environment(&mut self, command: &str, from: usize) -> Result<(), Placed> {
        let name = self.raw_group(command, from)?;
        let plain = name.trim_end_matches('*');
        if !is_environment(plain) {
            return Err((ReadFault::Environment { name }, from + 1));
        }
        if command == "end" {
            self.push(Mark::End(name), from);
            return Ok(());
        }
        if matches!(plain, "alignat" | "alignedat" | "xalignat") {
            self.raw_group(command, from)?;
        }
        if self.peek() == Some('[') {
            self.distance();
        }
        self.push(Mark::Begin(name), from);
        Ok(())
    }

    /// Upright letters are one word; the name of a function means that function.
    fn word(&mut self, command: &str, from: usize) -> Result<(), Placed> {
        if self.peek() == Some('*') {
            self.at += 1;
        }
        let text = self.raw_group(command, from)?;
        let word = text.trim();
        if word.is_empty() {
            self.space(false);
            return Ok(());
        }
        // A function has an argument, and no index.
        let is_name = self.in_index() || matches!(self.peek(), Some('_' | '}'));
        if is_name {
            self.push(Mark::Word(word.to_owned()), from);
            return Ok(());
        }
        if word.len() < text.len() || is_conjunction(word) {
            let fault = ReadFault::Unclear {
                what: "there are words between formulas",
                instead: "leave the words out and give one formula on each line",
            };
            return Err((fault, from + 1));
        }
        let reserved = matches!(Name::new(word), Err(NameError::Reserved { .. }));
        let operator = command == "operatorname" && advice(word) != advice("");
        if (reserved || operator) && function(word).is_none() && word != "pi" {
            let fault = ReadFault::Command {
                instead: advice(word),
                command: word.to_owned(),
            };
            return Err((fault, from + 1));
        }
        let mark = function(word).map_or_else(|| Mark::Word(word.to_owned()), Mark::Function);
        self.push(mark, from);
        Ok(())
    }

    /// Whether an index begins here, where words name no functions.
    fn in_index(&self) -> bool {
        let mut before = self.tokens.iter().rev().map(|token| &token.mark);
        match before.next() {
            Some(Mark::Below) => true,
            Some(Mark::OpenGroup) => before.next() == Some(&Mark::Below),
            _ => false,
        }
    }

    /// What stands in braces after a command, as it is, or the one character that stands for it.
    fn raw_group(&mut self, command: &str, from: usize) -> Result<String, Placed> {
        self.skip_space();
        let ends = |place| {
            let fault = ReadFault::Braces {
                command: command.to_owned(),
            };
            (fault, place)
        };
        let first = self.peek().ok_or_else(|| ends(from + 1))?;
        self.at += 1;
        if first != '{' {
            return if first.is_alphanumeric() {
                Ok(first.to_string())
            } else {
                Err(ends(from + 1))
            };
        }
        let (inside, mut depth) = (self.at, 1_usize);
        while let Some(c) = self.peek() {
            match c {
                '{' => depth += 1,
                '}' => depth -= 1,
                _ => {}
            }
            self.at += 1;
            if depth == 0 {
                return Ok(self.source[inside..self.at - 1].iter().collect());
            }
        }
        Err(ends(from + 1))
    }
}
