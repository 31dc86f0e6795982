//! Runs the race against general-purpose libraries and prints its table.
#![forbid(unsafe_code)]

use std::collections::BTreeSet;
use std::path::PathBuf;
use std::process::{Command, ExitCode};
use std::time::Duration;

use anyhow::{Context, Result, bail};
use tests::race::{Case, Family, Peer, Row, Run, Task, growth, measure};

const USAGE: &str = "\
usage: race [--json] [--only CASE] [--peers FOLDER] [--limit SECONDS]
       race --case CASE

  --json           print the rows as JSON
  --only CASE      run this case and no other; may be given several times
  --peers FOLDER   where tests/peers/install put the peers; `peers` in the build folder otherwise
  --limit SECONDS  end a run that takes longer; 60 otherwise
  --case CASE      measure ours alone, in this process

Cases are `abs 10`, `rel 10`, `arm 6` and `arm 6, every offset nonzero`.";

/// The case of which the two routes are proved to agree.
const AGREEMENT: Case = Case {
    family: Family::Arm,
    links: 6,
};

/// What the command line asks for.
struct Race {
    json: bool,
    only: Vec<Case>,
    peers: PathBuf,
    limit: Duration,
}

fn main() -> Result<ExitCode> {
    let mut words = std::env::args().skip(1);
    let mut race = Race {
        json: false,
        only: Vec::new(),
        peers: build_folder()?.join("peers"),
        limit: Duration::from_secs(60),
    };
    while let Some(word) = words.next() {
        let mut value = || {
            words
                .next()
                .with_context(|| format!("`{word}` wants a value\n{USAGE}"))
        };
        match word.as_str() {
            "--json" => race.json = true,
            "--only" => race.only.push(value()?.parse()?),
            "--peers" => race.peers = value()?.into(),
            "--limit" => {
                race.limit = Duration::from_secs(value()?.parse().context("`--limit` wants whole seconds")?)
            }
            "--case" => {
                println!("{}", measure(value()?.parse()?)?.written());
                return Ok(ExitCode::SUCCESS);
            }
            "--help" => {
                println!("{USAGE}");
                return Ok(ExitCode::SUCCESS);
            }
            other => bail!("`{other}` is no option\n{USAGE}"),
        }
    }
    race.run()
}

/// The build folder that this program lies in.
fn build_folder() -> Result<PathBuf> {
    let program = std::env::current_exe()?;
    // <target>/<profile>/race
    let folder = program.ancestors().nth(2);
    Ok(folder
        .context("the program lies in a build folder of cargo")?
        .to_owned())
}

impl Race {
    fn run(&self) -> Result<ExitCode> {
        if !self.json {
            println!("{}", Row::heading());
        }
        let mut rows = Vec::new();
        let mut too_slow = BTreeSet::new();
        for case in Case::all() {
            if !self.only.is_empty() && !self.only.contains(&case) {
                continue;
            }
            let ours = self.ours(Task::Equations(case))?;
            for peer in Peer::ALL {
                // What took too long for a smaller system of the family takes too long for this one.
                let theirs = if too_slow.contains(&(peer.name, case.family)) {
                    Run::OverLimit(self.limit)
                } else {
                    peer.run(case, &self.peers, self.limit)
                };
                if matches!(theirs, Run::OverLimit(_)) {
                    too_slow.insert((peer.name, case.family));
                }
                self.add(
                    &mut rows,
                    Some(case),
                    row(Task::Equations(case), peer.name, &ours, theirs),
                );
            }
            if case == AGREEMENT {
                let task = Task::Agreement(case);
                let proof = self.ours(task)?;
                self.add(&mut rows, None, row(task, "building once", &proof, ours));
            }
        }
        if self.json {
            let values: Vec<_> = rows.iter().map(|(_, row)| row.json()).collect();
            println!("{}", serde_json::to_string_pretty(&values)?);
        } else {
            print_growth(&rows);
        }
        let sound = rows.iter().all(|(_, row)| row.is_sound());
        Ok(if sound {
            ExitCode::SUCCESS
        } else {
            ExitCode::FAILURE
        })
    }

    /// Ours, in a process of its own.
    fn ours(&self, task: Task) -> Result<Run> {
        let mut command = Command::new(std::env::current_exe()?);
        // The last line of a failure is what the table shows: the message, not the end of a backtrace.
        command.env("RUST_BACKTRACE", "0");
        Ok(Run::of(command.args(["--case", &task.to_string()]), self.limit))
    }

    /// Keeps a row, and shows it at once to whoever waits for the table.
    fn add(&self, rows: &mut Vec<(Option<Case>, Row)>, case: Option<Case>, row: Row) {
        if !self.json {
            println!("{}", row.line());
        }
        rows.push((case, row));
    }
}

fn row(task: Task, peer: &str, ours: &Run, theirs: Run) -> Row {
    Row {
        case: task.to_string(),
        peer: peer.to_owned(),
        ours: ours.clone(),
        theirs,
    }
}

/// How the time grows with the size of the chains.
fn print_growth(rows: &[(Option<Case>, Row)]) {
    for (family, name) in [(Family::AbsoluteChain, "abs n"), (Family::RelativeChain, "rel n")] {
        let points = |peer: &str, run: fn(&Row) -> &Run| -> Vec<(usize, f64)> {
            let of_peer = rows.iter().filter(|(_, row)| row.peer == peer);
            let of_family = of_peer.filter_map(|(case, row)| Some((case.as_ref()?, row)));
            of_family
                .filter(|(case, _)| case.family == family)
                .filter_map(|(case, row)| Some((case.links, run(row).measurement()?.ms)))
                .collect()
        };
        // Ours stands in the rows of every peer.
        let ours = [("ours", points(Peer::ALL[0].name, |row| &row.ours))];
        let theirs = Peer::ALL.map(|peer| (peer.name, points(peer.name, |row| &row.theirs)));
        let exponents: Vec<String> = (ours.into_iter().chain(theirs))
            .filter_map(|(who, points)| Some(format!("{who} n^{:.1}", growth(&points)?)))
            .collect();
        if !exponents.is_empty() {
            println!("growth of {name}: {}", exponents.join("; "));
        }
    }
}
