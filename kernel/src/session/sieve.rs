//! Reads the standard output of the cell process and tells text, displays and evcxr's marks apart.
//!
//! - A mark behind an unfinished line is put on a line of its own.
//! - How a cell ended, which evcxr does not pass on, is added as a display of a private type.
//! - Text beyond a limit is counted and dropped, displays never are.
//! - Before a cell counts as complete its unfinished text is flushed, and a numbered mark is put on standard error.

use super::FATE;

/// evcxr's marks.
const COMPLETE: &str = "EVCXR_EXECUTION_COMPLETE";
const PANICKED: &str = "EVCXR_PANIC_NOTIFICATION";
const FAILED: &str = "EVCXR_ERROR_OCCURRED";
const BEGIN: &str = "EVCXR_BEGIN_CONTENT ";
const END: &str = "EVCXR_END_CONTENT";

/// The fate of a cell that met nothing worse.
const FINE: &str = "fine";

/// Written to the pipe once the cells' buffer is flushed.
pub(super) const FLUSHED: &str = "\u{1}GUDGEON-FLUSHED";
/// The last line of a cell on standard error; its number follows.
pub(super) const DONE: &str = "\u{1}GUDGEON-DONE ";
/// Before the message of a panic; line ends in it are written as U+0002.
pub(super) const PANIC: &str = "\u{1}GUDGEON-PANIC ";

/// Text of one cell that is kept.
pub(super) const KEPT_BYTES: usize = 4 << 20;
/// A line longer than this is cut.
const LONGEST_LINE: usize = 1 << 20;

/// What the reading thread has to do.
#[derive(Debug, PartialEq, Eq)]
pub(super) enum Step {
    /// Write this to the real standard output.
    Forward(Vec<u8>),
    /// Write this to standard error.
    MarkStandardError(Vec<u8>),
    /// Have the cells' buffer flushed; the line `FLUSHED` follows.
    Flush,
}

/// The state between two reads.
#[derive(Debug)]
pub(super) struct Sieve {
    report: bool,
    line: Vec<u8>,
    in_display: bool,
    kept: usize,
    dropped: usize,
    /// How the running cell ended, as far as it is known.
    fate: &'static str,
    /// Cells that were completed.
    completed: u64,
}

impl Sieve {
    /// A sieve that adds how cells ended, or one that does not.
    pub(super) fn new(report: bool) -> Sieve {
        Sieve {
            report,
            line: Vec::new(),
            in_display: false,
            kept: 0,
            dropped: 0,
            fate: FINE,
            completed: 0,
        }
    }

    /// Takes what was read.
    pub(super) fn read(&mut self, bytes: &[u8]) -> Vec<Step> {
        let mut steps = Steps::default();
        for part in bytes.split_inclusive(|byte| *byte == b'\n') {
            self.append(part);
            if self.line.last() == Some(&b'\n') {
                self.line.pop();
                let line = std::mem::take(&mut self.line);
                self.finished_line(&line, &mut steps);
            }
        }
        steps.done
    }

    /// Keeps the end of an endless line too, because a mark may stand there.
    fn append(&mut self, part: &[u8]) {
        const TAIL: usize = 256;
        self.line.extend_from_slice(part);
        if !self.in_display && self.line.len() > 2 * LONGEST_LINE {
            let cut = self.line.len() - TAIL;
            self.dropped += cut - LONGEST_LINE;
            self.line.drain(LONGEST_LINE..cut);
        }
    }

    fn finished_line(&mut self, mut line: &[u8], steps: &mut Steps) {
        if self.in_display {
            if let Some(text) = line.strip_suffix(PANICKED.as_bytes()) {
                // The cell panicked while it was showing something: close the display, or the mark is lost in it.
                steps.line(text);
                steps.line(END.as_bytes());
                self.in_display = false;
                self.fate = "panic";
                steps.line(PANICKED.as_bytes());
                return;
            }
            self.in_display = line != END.as_bytes();
            steps.line(line);
            return;
        }
        for (mark, step) in [(COMPLETE, Some(Step::Flush)), (FLUSHED, None)] {
            if let Some(text) = line.strip_suffix(mark.as_bytes()) {
                self.text(text, false, steps);
                match step {
                    Some(step) => steps.done.push(step),
                    None => self.complete(steps),
                }
                return;
            }
        }
        for (mark, fate) in [(PANICKED, "panic"), (FAILED, "error")] {
            if let Some(text) = line.strip_suffix(mark.as_bytes()) {
                self.text(text, false, steps);
                self.fate = fate;
                steps.line(mark.as_bytes());
                return;
            }
        }
        if let Some(at) = find(line, PANIC.as_bytes()) {
            self.text(&line[..at], false, steps);
            line = &line[at..];
            steps.line(line);
            return;
        }
        if let Some(at) = find(line, BEGIN.as_bytes()) {
            self.text(&line[..at], false, steps);
            self.in_display = true;
            steps.line(&line[at..]);
            return;
        }
        self.text(line, true, steps);
    }

    /// A line of text, or the unfinished text before a mark, which may be empty.
    fn text(&mut self, text: &[u8], finished: bool, steps: &mut Steps) {
        if text.is_empty() && !finished {
            return;
        }
        if self.kept + text.len() < KEPT_BYTES {
            self.kept += text.len() + 1;
            steps.line(text);
        } else {
            self.dropped += text.len() + 1;
        }
    }

    fn complete(&mut self, steps: &mut Steps) {
        if self.dropped > 0 {
            let note = format!("({} more bytes of output were dropped)", self.dropped);
            steps.line(note.as_bytes());
        }
        self.completed += 1;
        if self.report {
            let fate = format!("{} {}", self.fate, self.completed);
            for line in [&format!("{BEGIN}{FATE}"), &fate, END] {
                steps.line(line.as_bytes());
            }
            // Everything the cell wrote to standard error is in that pipe already: mark its end.
            let mark = format!("{DONE}{}\n", self.completed).into_bytes();
            steps.done.push(Step::MarkStandardError(mark));
        }
        steps.line(COMPLETE.as_bytes());
        self.fate = FINE;
        self.kept = 0;
        self.dropped = 0;
    }
}

/// Steps under construction; neighbouring lines become one write.
#[derive(Default)]
struct Steps {
    done: Vec<Step>,
}

impl Steps {
    fn line(&mut self, line: &[u8]) {
        if !matches!(self.done.last(), Some(Step::Forward(_))) {
            self.done.push(Step::Forward(Vec::new()));
        }
        if let Some(Step::Forward(bytes)) = self.done.last_mut() {
            bytes.extend_from_slice(line);
            bytes.push(b'\n');
        }
    }
}

fn find(line: &[u8], mark: &[u8]) -> Option<usize> {
    line.windows(mark.len()).position(|window| window == mark)
}

#[cfg(test)]
mod tests {
    use super::*;

    fn forwarded(sieve: &mut Sieve, text: &str) -> String {
        let mut all = String::new();
        for step in sieve.read(text.as_bytes()) {
            if let Step::Forward(bytes) = step {
                all.push_str(&String::from_utf8(bytes).unwrap());
            }
        }
        all
    }

    #[test]
    fn a_mark_behind_unfinished_text_gets_its_own_line() {
        let mut sieve = Sieve::new(true);
        assert_eq!(
            sieve.read(b"abcEVCXR_EXECUTION_COMPLETE\n"),
            [Step::Forward(b"abc\n".to_vec()), Step::Flush]
        );
        let rest = sieve.read(format!("tail{FLUSHED}\n").as_bytes());
        assert_eq!(
            rest,
            [
                Step::Forward(format!("tail\n{BEGIN}{FATE}\nfine 1\n{END}\n").into_bytes()),
                Step::MarkStandardError(format!("{DONE}1\n").into_bytes()),
                Step::Forward(b"EVCXR_EXECUTION_COMPLETE\n".to_vec()),
            ]
        );
    }

    #[test]
    fn a_line_may_arrive_in_pieces() {
        let mut sieve = Sieve::new(true);
        assert_eq!(forwarded(&mut sieve, "on"), "");
        assert_eq!(forwarded(&mut sieve, "e\ntw"), "one\n");
        assert_eq!(forwarded(&mut sieve, "o\n"), "two\n");
    }

    #[test]
    fn a_panic_is_told_when_the_cell_is_complete() {
        let end = format!("{PANICKED}\n{FLUSHED}\n{FLUSHED}\n");
        let told = forwarded(&mut Sieve::new(true), &end);
        assert_eq!(
            told,
            format!(
                "{PANICKED}\n{BEGIN}{FATE}\npanic 1\n{END}\n{COMPLETE}\n\
                 {BEGIN}{FATE}\nfine 2\n{END}\n{COMPLETE}\n"
            )
        );
        let untold = forwarded(&mut Sieve::new(false), &end);
        assert_eq!(untold, format!("{PANICKED}\n{COMPLETE}\n{COMPLETE}\n"));
    }

    #[test]
    fn a_panic_inside_a_display_closes_the_display() {
        let text = format!("{BEGIN}text/plain\nhalf{PANICKED}\n");
        let told = forwarded(&mut Sieve::new(true), &text);
        assert_eq!(told, format!("{BEGIN}text/plain\nhalf\n{END}\n{PANICKED}\n"));
    }

    #[test]
    fn a_flood_of_text_is_cut_and_counted_but_displays_are_kept() {
        let mut sieve = Sieve::new(true);
        let line = format!("{}\n", "x".repeat(999));
        let mut length = 0;
        for _ in 0..10_000 {
            length += forwarded(&mut sieve, &line).len();
        }
        assert!(length <= KEPT_BYTES);
        let display = format!("{BEGIN}text/plain\n{line}{END}\n");
        assert_eq!(forwarded(&mut sieve, &display), display);
        let end = forwarded(&mut sieve, &format!("{FLUSHED}\n"));
        assert!(end.contains("more bytes of output were dropped"), "{end}");
    }
}
