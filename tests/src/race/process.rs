//! Measuring in a process of its own: time, peak memory, and an end where it takes too long.

use std::io::Read;
use std::process::{Child, Command, ExitStatus, Stdio};
use std::thread::{JoinHandle, sleep, spawn};
use std::time::{Duration, Instant};

use anyhow::{Context, Result, anyhow, bail};
use serde_json::{Value, json};

/// How often a run is looked at.
const BETWEEN_LOOKS: Duration = Duration::from_millis(2);

/// What repeated runs of one case may take: at most so many runs, and none begun after so long.
/// The peers' programs keep to the same.
const MOST_RUNS: usize = 5;
const LAST_START: Duration = Duration::from_secs(2);

/// What was measured of one case in one process.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Measurement {
    /// The shortest time of all runs, in milliseconds.
    pub ms: f64,
    /// The terms of all equations in canonical form, where that was asked for.
    pub terms: Option<u64>,
    /// The most memory in use, in MB, where the system tells.
    pub mb: Option<f64>,
}

/// How a process that measures ended.
#[derive(Clone, Debug, PartialEq)]
pub enum Run {
    /// With a result.
    Measured(Measurement),
    /// What it would measure is not installed.
    NotInstalled,
    /// It was ended because it took longer than this.
    OverLimit(Duration),
    /// With an error.
    Failed(String),
}

impl Measurement {
    /// The shortest of several runs, each of which gives its number of terms.
    ///
    /// # Errors
    /// That of a run.
    pub fn best(run: impl Fn() -> Result<(Duration, Option<u64>)>) -> Result<Self> {
        let begin = Instant::now();
        let (mut shortest, terms) = run()?;
        for _ in 1..MOST_RUNS {
            if begin.elapsed() > LAST_START {
                break;
            }
            let (time, again) = run()?;
            if again != terms {
                bail!("two runs gave {terms:?} and {again:?} terms");
            }
            shortest = shortest.min(time);
        }
        Ok(Self {
            ms: shortest.as_secs_f64() * 1e3,
            terms,
            mb: peak_memory(),
        })
    }

    /// As a process writes it for another.
    #[must_use]
    pub fn written(&self) -> String {
        json!({"ms": self.ms, "terms": self.terms, "mb": self.mb}).to_string()
    }
}

/// The most memory that this process had in use, in MB; none where the system does not tell.
fn peak_memory() -> Option<f64> {
    let status = std::fs::read_to_string("/proc/self/status").ok()?;
    let line = status.lines().find_map(|line| line.strip_prefix("VmHWM:"))?;
    let kilobytes: f64 = line.trim().strip_suffix("kB")?.trim().parse().ok()?;
    Some(kilobytes / 1024.0)
}

impl Run {
    /// Runs a program that prints a measurement, and ends it where it takes longer than the limit.
    #[must_use]
    pub fn of(command: &mut Command, limit: Duration) -> Self {
        match finished(command, limit) {
            Ok(Some(output)) => {
                Self::read(&output).unwrap_or_else(|error| Self::Failed(format!("{error:#}")))
            }
            Ok(None) => Self::OverLimit(limit),
            Err(error) => Self::Failed(format!("{error:#}")),
        }
    }

    /// Reads what a measuring program printed: a measurement, or the name of what is missing.
    ///
    /// # Errors
    /// It is neither.
    pub fn read(output: &str) -> Result<Self> {
        let value: Value =
            serde_json::from_str(output).with_context(|| format!("`{}` is no measurement", output.trim()))?;
        if value["missing"].is_string() {
            return Ok(Self::NotInstalled);
        }
        let ms = value["ms"].as_f64().filter(|ms| ms.is_finite() && *ms > 0.0);
        Ok(Self::Measured(Measurement {
            ms: ms.with_context(|| format!("`{}` has no time `ms` above zero", output.trim()))?,
            terms: value["terms"].as_u64(),
            mb: value["mb"].as_f64(),
        }))
    }

    /// The measurement, where there is one.
    #[must_use]
    pub fn measurement(&self) -> Option<&Measurement> {
        match self {
            Self::Measured(measurement) => Some(measurement),
            _ => None,
        }
    }
}

/// What a program wrote, or nothing where it took longer than the limit.
fn finished(command: &mut Command, limit: Duration) -> Result<Option<String>> {
    command
        .stdin(Stdio::null())
        .stdout(Stdio::piped())
        .stderr(Stdio::piped());
    let mut child = command
        .spawn()
        .with_context(|| format!("starting {}", command.get_program().display()))?;
    let output = read_along(child.stdout.take());
    let errors = read_along(child.stderr.take());
    let Some(status) = waited(&mut child, limit)? else {
        child.kill()?;
        child.wait()?;
        return Ok(None);
    };
    let joined = |reader: JoinHandle<String>| reader.join().map_err(|_| anyhow!("reading its output"));
    let (output, errors) = (joined(output)?, joined(errors)?);
    if !status.success() {
        let last = errors.lines().rfind(|line| !line.trim().is_empty());
        bail!("{status}: {}", last.unwrap_or("no word of why"));
    }
    Ok(Some(output))
}

/// Reads to the end in a thread, so that a long output does not hold up the program.
fn read_along(pipe: Option<impl Read + Send + 'static>) -> JoinHandle<String> {
    spawn(move || {
        let mut bytes = Vec::new();
        if let Some(mut pipe) = pipe {
            // What was read before an error is still of use.
            let _ = pipe.read_to_end(&mut bytes);
        }
        String::from_utf8_lossy(&bytes).into_owned()
    })
}

fn waited(child: &mut Child, limit: Duration) -> Result<Option<ExitStatus>> {
    let start = Instant::now();
    while start.elapsed() < limit {
        if let Some(status) = child.try_wait()? {
            return Ok(Some(status));
        }
        sleep(BETWEEN_LOOKS);
    }
    Ok(None)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn what_peers_print_is_read() -> Result<()> {
        let whole = Run::read("{\"ms\": 1.5, \"terms\": 12, \"mb\": 3.25}\n")?;
        let known = Measurement {
            ms: 1.5,
            terms: Some(12),
            mb: Some(3.25),
        };
        assert_eq!(whole, Run::Measured(known));
        assert_eq!(Run::read(&known.written())?, whole);
        let less = Run::read("{\"ms\": 2, \"terms\": 0, \"mb\": null}")?;
        let expected = Measurement {
            ms: 2.0,
            terms: Some(0),
            mb: None,
        };
        assert_eq!(less, Run::Measured(expected));
        assert_eq!(Run::read("{\"missing\": \"symengine\"}")?, Run::NotInstalled);
        for wrong in ["", "12 ms", "{}", "{\"ms\": \"1\"}", "{\"ms\": 0, \"terms\": 1}"] {
            assert!(Run::read(wrong).is_err(), "{wrong}");
        }
        Ok(())
    }

    #[test]
    fn the_shortest_run_counts_and_all_must_agree() -> Result<()> {
        let times = std::cell::RefCell::new(vec![4, 2, 7, 3, 5]);
        let next = || {
            times
                .borrow_mut()
                .pop()
                .map(Duration::from_millis)
                .context("too many runs")
        };
        let best = Measurement::best(|| Ok((next()?, Some(9))))?;
        assert!((best.ms - 2.0).abs() < 1e-9 && best.terms == Some(9));
        let count = std::cell::Cell::new(0);
        let changing = Measurement::best(|| {
            count.set(count.get() + 1);
            Ok((Duration::from_millis(1), Some(count.get())))
        });
        assert!(changing.is_err());
        Ok(())
    }

    #[cfg(unix)]
    #[test]
    fn a_run_that_takes_too_long_is_ended() {
        let start = Instant::now();
        let limit = Duration::from_millis(50);
        let run = Run::of(Command::new("sleep").arg("20"), limit);
        assert_eq!(run, Run::OverLimit(limit));
        assert!(start.elapsed() < Duration::from_secs(10));
    }

    #[test]
    fn a_program_that_is_not_there_is_named() {
        let Run::Failed(error) = Run::of(&mut Command::new("no-such-program-here"), Duration::from_secs(1))
        else {
            panic!("it ran");
        };
        assert!(error.contains("no-such-program-here"), "{error}");
    }
}
