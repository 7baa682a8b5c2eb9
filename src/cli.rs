//! What can be typed. What a command takes is its own type, below [`crate::commands`].

#![allow(
    rustdoc::invalid_html_tags,
    rustdoc::broken_intra_doc_links,
    reason = "these comments are help texts, read on a terminal"
)]

use std::ffi::OsString;
use std::panic::{AssertUnwindSafe, catch_unwind};
use std::path::PathBuf;
use std::process::ExitCode;

use clap::{Parser, Subcommand};

use crate::commands::{self, Outcome};
use crate::terminal::Terminal;

const AFTER: &str = "\
Exit status: 0 done, nothing at error level; 1 done, some finding at error level; 2 not done (bad usage, unreadable \
drawing, bad job file).

The job file is <stem>.toml beside the drawing, else tautplan.toml beside it, else every default; `tautplan survey` \
proposes one.

This is a check of a drawing, not a design certificate: the engineer responsible decides, under the local code.";

/// Marks up a post-tensioned floor's tendon layout in DXF with the forces left in every tendon
#[derive(Debug, Parser)]
#[command(name = "tautplan", version, about, after_help = AFTER, arg_required_else_help = true)]
struct Arguments {
    #[command(subcommand)]
    command: Command,
}

#[derive(Debug, Subcommand)]
enum Command {
    /// Work out every tendon and give each drawing back with the answers drawn on it
    ///
    /// Writes <stem>-marked.dxf, <stem>-result.json, <stem>-tendons.csv, <stem>-points.csv, <stem>-extensions.csv,
    /// <stem>-methods.csv and <stem>-findings.csv, and prints a summary.
    Mark {
        /// Drawings, in DXF
        #[arg(required = true, value_name = "PLAN.dxf")]
        plans: Vec<PathBuf>,
        /// Job file for all of these drawings
        #[arg(long, value_name = "FILE")]
        job: Option<PathBuf>,
        /// Folder for the results, made if it is not there [default: beside each drawing]
        #[arg(long, value_name = "DIR")]
        out: Option<PathBuf>,
    },
    /// Print what a drawing holds, and a job file proposed from it
    ///
    /// The output is itself a job file: `tautplan survey level-2.dxf --out tautplan.toml`.
    Survey {
        /// Drawing, in DXF
        #[arg(value_name = "PLAN.dxf")]
        plan: PathBuf,
        /// Job file by which texts are read and whose keys are kept
        #[arg(long, value_name = "FILE")]
        job: Option<PathBuf>,
        /// File to write instead of standard output; never one that is there already
        #[arg(long, value_name = "FILE")]
        out: Option<PathBuf>,
    },
    /// Print one tendon's whole working, as a calculation sheet
    Tendon {
        /// Drawing, in DXF
        #[arg(value_name = "PLAN.dxf")]
        plan: PathBuf,
        /// Mark of the tendon, such as D012
        #[arg(value_name = "MARK")]
        mark: String,
        /// Job file
        #[arg(long, value_name = "FILE")]
        job: Option<PathBuf>,
    },
    /// Print what is looked for: every rule, or one
    Rules {
        /// Name of a rule, such as hogging-radius
        #[arg(value_name = "RULE")]
        rule: Option<String>,
    },
}

/// Runs the program on these arguments (program name first) and gives its exit status.
pub fn run(arguments: impl IntoIterator<Item = OsString>) -> ExitCode {
    let arguments = match Arguments::try_parse_from(arguments) {
        Ok(arguments) => arguments,
        Err(error) => {
            // Help for a reader who is gone needs no message.
            let _ = error.print();
            return if error.use_stderr() {
                Outcome::NotDone.into()
            } else {
                Outcome::Done.into()
            };
        }
    };
    let mut terminal = Terminal::standard();
    std::panic::set_hook(Box::new(|_| {}));
    let outcome = catch_unwind(AssertUnwindSafe(|| obey(arguments.command, &mut terminal)));
    let outcome = outcome.unwrap_or_else(|fault| {
        let words = fault
            .downcast_ref::<&str>()
            .map(ToString::to_string)
            .or_else(|| fault.downcast_ref::<String>().cloned())
            .unwrap_or_default();
        terminal.error(&format!(
            "a fault in tautplan itself: {words}; the drawing was not at fault for that, please report it with the drawing"
        ));
        Outcome::NotDone
    });
    outcome.into()
}

fn obey(command: Command, terminal: &mut Terminal) -> Outcome {
    match command {
        Command::Mark { plans, job, out } => {
            commands::mark::run(&commands::mark::Order { plans, job, out }, terminal)
        }
        Command::Survey { plan, job, out } => {
            commands::survey::run(&commands::survey::Order { plan, job, out }, terminal)
        }
        Command::Tendon { plan, mark, job } => {
            commands::tendon::run(&commands::tendon::Order { plan, mark, job }, terminal)
        }
        Command::Rules { rule } => commands::rules::run(rule.as_deref(), terminal),
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn what_can_be_typed_is_sound() {
        use clap::CommandFactory as _;
        Arguments::command().debug_assert();
    }
}
