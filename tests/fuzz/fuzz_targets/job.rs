//! Any text as a job file: a job whose every value can be shown, or problems each at its line.
#![no_main]

use libfuzzer_sys::fuzz_target;
use tautplan::job;

fuzz_target!(|text: &str| match job::read("fuzz.toml", text) {
    Ok(resolved) => {
        assert!(!resolved.job.inputs().is_empty());
        let _ = resolved.assumptions();
        let _ = resolved.job.layer_patterns();
    }
    Err(problems) => {
        assert!(!problems.list().is_empty());
        let lines = text.lines().count() + 1;
        assert!(
            problems
                .list()
                .iter()
                .all(|problem| problems.line(problem) <= lines)
        );
        assert!(!problems.render(false).is_empty());
    }
});
