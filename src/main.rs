//! The program: argv to exit status, nothing else.

fn main() -> std::process::ExitCode {
    tautplan::cli::run(std::env::args_os())
}
