//! What a job allows a drawing to cost, seen from outside.

use crate::program::{Ended, folder, small_with};

#[test]
fn a_drawing_beyond_the_memory_cap_is_refused_with_what_to_set() {
    let mut bytes = crate::drawings::file("demo-drawings/small-floor.dxf");
    bytes.extend(std::iter::repeat_n(b' ', 6_000_000));
    let place = folder(&bytes, "[limits]\nmemory_mb = 16\n");
    let Ended { status, said, .. } = place.run(&["mark", "plan.dxf"]);
    assert_eq!(status, Some(2), "{said}");
    for word in [
        "7 MB",
        "limits.memory_mb allows 16",
        "set limits.memory_mb to 19",
    ] {
        assert!(said.contains(word), "{word} is not in: {said}");
    }
}

#[test]
fn blocks_beyond_the_entity_cap_are_cut_and_said() {
    let place = small_with("[limits]\nexpanded_entities = 1\n");
    let Ended {
        status, printed, ..
    } = place.run(&["mark", "plan.dxf"]);
    assert_eq!(status, Some(1), "{printed}");
    assert!(printed.contains("block-too-many"), "{printed}");
    let findings = std::fs::read_to_string(place.path("plan-findings.csv")).expect("findings");
    assert!(findings.contains("limits.expanded_entities"), "{findings}");
}

#[test]
fn caps_out_of_range_are_errors_of_the_job() {
    for line in [
        "memory_mb = 1",
        "expanded_entities = 0",
        "memory_mb = nan",
        "memory_mb = 1e300",
    ] {
        let place = small_with(&format!("[limits]\n{line}\n"));
        let Ended { status, said, .. } = place.run(&["mark", "plan.dxf"]);
        assert_eq!(status, Some(2), "{line}: {said}");
        assert!(
            said.contains("plan.toml:2") || said.contains("line 2") || said.contains("2 |"),
            "{said}"
        );
    }
}
