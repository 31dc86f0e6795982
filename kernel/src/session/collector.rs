//! Collects what cells write on both streams, and knows when a cell has written everything.

use super::sieve::{DONE, KEPT_BYTES, PANIC};
use crossbeam_channel::{Receiver, Sender, bounded, never, select};
use std::thread;
use std::time::{Duration, Instant};

/// How long the end of standard error is waited for; it is in the pipe already when this is needed.
const PATIENCE: Duration = Duration::from_secs(5);

/// The text of one cell.
#[derive(Debug, Default)]
pub(super) struct Texts {
    pub(super) stdout: String,
    pub(super) stderr: String,
    /// The message of the last panic on the cells' own thread.
    pub(super) panic_message: Option<String>,
}

type Request = (Option<u64>, Sender<Texts>);

/// A thread that empties both channels while a cell runs: evcxr waits for that.
pub(crate) struct Collector {
    ask: Sender<Request>,
}

impl Collector {
    /// Starts collecting.
    pub(super) fn start(stdout: Receiver<String>, stderr: Receiver<String>) -> Collector {
        let (ask, asked) = bounded(1);
        thread::spawn(move || collect(&stdout, &stderr, &asked));
        Collector { ask }
    }

    /// Everything since the last call, to be called after evcxr has returned.
    ///
    /// `completed` is the number of the cell that the cell process has completed, if it came so far.
    pub(super) fn collected(&self, completed: Option<u64>) -> Texts {
        let (answer, answered) = bounded(1);
        if self.ask.send((completed, answer)).is_err() {
            return Texts::default();
        }
        answered.recv().unwrap_or_default()
    }
}

#[derive(Default)]
struct State {
    texts: Texts,
    /// The last cell whose end was seen on standard error.
    seen: Option<u64>,
}

fn collect(stdout: &Receiver<String>, stderr: &Receiver<String>, asked: &Receiver<Request>) {
    let mut state = State::default();
    let (mut open_stdout, mut open_stderr) = (stdout.clone(), stderr.clone());
    loop {
        select! {
            recv(open_stdout) -> line => match line {
                Ok(line) => state.stdout_line(&line),
                Err(_) => open_stdout = never(),
            },
            recv(open_stderr) -> line => match line {
                Ok(line) => state.stderr_line(&line),
                Err(_) => open_stderr = never(),
            },
            recv(asked) -> request => {
                let Ok((completed, answer)) = request else { return };
                while let Ok(line) = open_stdout.try_recv() {
                    state.stdout_line(&line);
                }
                state.rest_of_stderr(&open_stderr, completed);
                let _ = answer.send(std::mem::take(&mut state.texts));
            }
        }
    }
}

impl State {
    fn stdout_line(&mut self, line: &str) {
        if let Some(message) = line.strip_prefix(PANIC) {
            self.texts.panic_message = Some(message.replace('\u{2}', "\n"));
        } else {
            push(&mut self.texts.stdout, line);
        }
    }

    fn stderr_line(&mut self, line: &str) {
        if let Some((text, number)) = line.split_once(DONE) {
            self.seen = number.parse().ok();
            if !text.is_empty() {
                push(&mut self.texts.stderr, text);
            }
        } else if self.texts.stderr.len() + line.len() < KEPT_BYTES {
            // Standard error passes no sieve, so its length is limited here.
            push(&mut self.texts.stderr, line);
        }
    }

    fn rest_of_stderr(&mut self, stderr: &Receiver<String>, completed: Option<u64>) {
        let deadline = Instant::now() + PATIENCE;
        loop {
            let awaited = completed.is_some() && self.seen != completed;
            let line = if awaited {
                stderr.recv_deadline(deadline).ok()
            } else {
                stderr.try_recv().ok()
            };
            match line {
                Some(line) => self.stderr_line(&line),
                None => return,
            }
        }
    }
}

fn push(text: &mut String, line: &str) {
    text.push_str(line);
    text.push('\n');
}

#[cfg(test)]
mod tests {
    use super::*;
    use crossbeam_channel::unbounded;

    #[test]
    fn standard_error_is_waited_for() {
        let (out, stdout) = unbounded();
        let (err, stderr) = unbounded();
        let collector = Collector::start(stdout, stderr);
        out.send("first".to_owned()).unwrap();
        out.send(format!("{PANIC}one\u{2}two")).unwrap();
        let late = thread::spawn(move || {
            thread::sleep(Duration::from_millis(50));
            err.send("late".to_owned()).unwrap();
            err.send(format!("unfinished{DONE}7")).unwrap();
            err
        });
        let texts = collector.collected(Some(7));
        assert_eq!(texts.stdout, "first\n");
        assert_eq!(texts.stderr, "late\nunfinished\n");
        assert_eq!(texts.panic_message.as_deref(), Some("one\ntwo"));
        late.join().unwrap();
        assert_eq!(collector.collected(None).stderr, "");
    }
}
