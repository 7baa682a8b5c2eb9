//! One file per command; the only callers of files.

use std::process::ExitCode;

mod files;
mod job_file;
pub mod mark;
mod refused;
pub mod rules;
pub mod survey;
pub mod tendon;
mod units;
mod work;

pub use refused::Refused;

use crate::finding::{Finding, Level};
use crate::terminal::Terminal;

/// How a command ended, from best to worst.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub enum Outcome {
    /// Done, nothing at error level.
    Done,
    /// Done, and some finding is at error level.
    Found,
    /// Not done, or not all of it.
    NotDone,
}

impl Outcome {
    /// Of something done with these findings.
    fn of<'f>(findings: impl IntoIterator<Item = &'f Finding>) -> Self {
        let mut levels = findings.into_iter().map(|finding| finding.level);
        if levels.any(|level| level == Level::Error) {
            Self::Found
        } else {
            Self::Done
        }
    }
}

impl From<Outcome> for ExitCode {
    fn from(outcome: Outcome) -> Self {
        match outcome {
            Outcome::Done => 0,
            Outcome::Found => 1,
            Outcome::NotDone => 2,
        }
        .into()
    }
}

/// Prints a result as the last thing of a command.
fn print(text: &str, terminal: &mut Terminal) -> Outcome {
    match terminal.result(text) {
        Ok(()) => Outcome::Done,
        Err(error) => {
            terminal.error(&format!(
                "standard output cannot be written: {}; send the result to a place with room",
                refused::reason(&error)
            ));
            Outcome::NotDone
        }
    }
}

/// Says why something was not done.
fn refuse(refused: &Refused, terminal: &mut Terminal) -> Outcome {
    match refused {
        Refused::Job(problems) => {
            let text = problems.render(terminal.colour());
            terminal.rendered(&text);
        }
        other => terminal.error(&other.to_string()),
    }
    Outcome::NotDone
}
