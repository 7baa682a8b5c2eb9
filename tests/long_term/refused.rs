//! What a method does not cover: the clause is named, the other methods go on, and nothing panics.

use crate::kit::{ALL, slab, tendon, worked};
use tautplan::floor::PointKind;
use tautplan::job;

const GIVEN: &str = "methods = [\"en1992\", \"aci423\", \"bs8110\", \"as3600\", \"direct\"]\n\
                     basic_relaxation = 0.02\nrelaxation_stress_factor = 1.1\n";

/// Why each method gives no loss, as far as it gives none, for a job of these lines.
fn refusals(before: &str, lines: &str, thickness_m: f64) -> Vec<(&'static str, Option<String>)> {
    let text = format!("{before}\n[long_term]\n{GIVEN}{lines}\n");
    let job = job::read("job", &text).unwrap_or_else(|problems| panic!("{problems}"));
    let half_m = 0.5 * thickness_m;
    let points = [
        (PointKind::Anchor, 0.0, half_m, thickness_m, 0.0),
        (PointKind::Low, 10.0, 0.040, thickness_m, 0.0),
        (PointKind::Anchor, 20.0, half_m, thickness_m, 0.0),
    ];
    let mut slab = slab(&[]);
    slab.thickness_m = Some(thickness_m);
    let analysis = worked(slab, tendon(&points), &job.job);
    let result = &analysis.results[0];
    let by_method = result.by_method.iter().zip(ALL);
    by_method
        .map(|(one, word)| {
            assert_eq!(one.method.word(), word);
            match &one.outcome {
                Ok(forces) => {
                    assert!(
                        forces
                            .service_kn
                            .iter()
                            .all(|kn| kn.is_finite() && *kn > 0.0)
                    );
                    assert!(forces.mean_service_kn.is_finite());
                    (word, None)
                }
                Err(reason) => {
                    let reason = reason.to_string();
                    let told = |finding: &&tautplan::finding::Finding| {
                        finding.rule.name == "method-without-loss" && finding.text.contains(&reason)
                    };
                    assert!(
                        analysis.findings.iter().any(|finding| told(&finding)),
                        "{reason}"
                    );
                    assert!(
                        !reason.contains("inf") && !reason.contains("NaN"),
                        "{reason}"
                    );
                    (word, Some(reason))
                }
            }
        })
        .collect()
}

/// Lines of the job; the methods that refuse, each with a word of its reason.
type Row = (&'static str, &'static [(&'static str, &'static str)]);

#[test]
fn each_clause_is_named_and_the_other_methods_go_on() {
    let rows: [Row; 17] = [
        ("", &[]),
        ("humidity_percent = 100", &[]),
        (
            "humidity_percent = 39",
            &[("en1992", "EN 1992-1-1 3.1.4(2)")],
        ),
        (
            "strength_mpa = 11\nstrength_at_stressing_mpa = 11",
            &[
                ("en1992", "EN 1992-1-1 table 3.1"),
                ("bs8110", "BS 8110-2 table 7.2"),
                ("as3600", "AS 3600 table 3.1.2"),
            ],
        ),
        (
            "strength_mpa = 101\nstrength_at_stressing_mpa = 40",
            &[
                ("en1992", "EN 1992-1-1 table 3.1"),
                ("bs8110", "BS 8110-2 table 7.2"),
                ("as3600", "AS 3600 table 3.1.2"),
            ],
        ),
        (
            "strength_at_stressing_mpa = 31",
            &[
                ("en1992", "EN 1992-1-1 3.1.2(5)"),
                ("bs8110", "BS 8110-2 7.2"),
            ],
        ),
        (
            "stressing_days = 0.5",
            &[
                ("aci423", "ACI-ASCE 423 method, table 1"),
                ("bs8110", "BS 8110-1 4.8.5"),
                ("as3600", "AS 3600 3.1.8.3"),
            ],
        ),
        ("stressing_days = 29", &[("bs8110", "BS 8110-1 4.8.5")]),
        (
            "stressing_days = 64",
            &[
                ("aci423", "ACI-ASCE 423 method, table 1"),
                ("bs8110", "BS 8110-1 4.8.5"),
            ],
        ),
        (
            "curing_days = 4",
            &[("aci423", "ACI-ASCE 423 method, table 1")],
        ),
        (
            "notional_thickness_mm = 49",
            &[
                ("en1992", "EN 1992-1-1 table 3.3"),
                ("as3600", "AS 3600 figures 3.1.7.2 and 3.1.8.3"),
            ],
        ),
        (
            "notional_thickness_mm = 850",
            &[
                ("aci423", "V/S"),
                ("as3600", "AS 3600 figures 3.1.7.2 and 3.1.8.3"),
            ],
        ),
        (
            "relaxation_class = \"bar\"",
            &[
                ("aci423", "ACI-ASCE 423 method, table 2"),
                ("bs8110", "BS 8110-1 table 4.6"),
            ],
        ),
        (
            "stressing_days = 25\nfinal_days = 100\nasked_days = 24",
            &[
                ("en1992", "EN 1992-1-1 (B.7)"),
                ("aci423", "the final loss only"),
                ("bs8110", "the final loss only"),
                ("as3600", "AS 3600"),
                ("direct", "the final loss only"),
            ],
        ),
        (
            "concrete_stress_mpa = 24",
            &[
                ("en1992", "EN 1992-1-1 (3.7)"),
                ("bs8110", "BS 8110-1 4.8.5"),
                ("as3600", "AS 3600 3.1.8.3"),
            ],
        ),
        ("concrete_stress_mpa = 0", &[]),
        ("bonded = false\nbonded_steel_ratio = 0.1", &[]),
    ];
    for (lines, expected) in rows {
        compare(lines, &refusals("", lines, 0.250), expected);
    }
}

#[test]
fn a_strand_or_a_slab_that_a_table_does_not_know_is_named_too() {
    let strand =
        "[tendon]\n[[tendon.strand]]\nname = \"12.7\"\narea_mm2 = 98.7\nstrength_mpa = 1770\n";
    let expected: &[_] = &[("aci423", "grades 250 and 270")];
    compare(strand, &refusals(strand, "", 0.250), expected);
    let slack = "[stressing]\njacking_ratio = 0.6\n";
    let expected: &[_] = &[
        ("aci423", "ACI-ASCE 423 method, table 3"),
        ("bs8110", "BS 8110-1 4.8.2"),
    ];
    compare(slack, &refusals(slack, "", 0.250), expected);
    let expected: &[_] = &[("en1992", "h_0 = 90 mm is outside EN 1992-1-1 table 3.3")];
    compare("thin", &refusals("", "", 0.090), expected);
}

fn compare(lines: &str, found: &[(&str, Option<String>)], expected: &[(&str, &str)]) {
    for (word, reason) in found {
        let clause = expected.iter().find(|(method, _)| method == word);
        match (reason, clause) {
            (None, None) => {}
            (Some(reason), Some((_, clause))) if reason.contains(clause) => {}
            _ => panic!("{lines}: {word}: found {reason:?}, expected {clause:?}"),
        }
    }
}

#[test]
fn a_method_named_twice_counts_once_and_an_unknown_one_is_refused() {
    let read = |text: &str| job::read("job", text);
    let twice =
        read("[long_term]\nmethod = \"bs8110\"\nmethods = [\"en1992\", \"en1992\", \"bs8110\"]\n");
    let methods = twice.expect("fine").job.long_term.all_methods();
    let words: Vec<&str> = methods.iter().map(|method| method.word()).collect();
    assert_eq!(words, ["bs8110", "en1992"]);
    let none = read("[long_term]\nmethods = []\n").expect("none beside the default");
    assert_eq!(none.job.long_term.all_methods().len(), 1);
    let unknown = read("[long_term]\nmethods = [\"en1993\"]\n").expect_err("no such method");
    assert!(unknown.to_string().contains("en1992"), "{unknown}");
}

#[test]
fn one_tendon_alone_shortens_by_no_other() {
    let text = format!("[long_term]\n{GIVEN}");
    let job = job::read("job", &text).expect("fine").job;
    let points = [
        (PointKind::Anchor, 0.0, 0.125, 0.250, 0.0),
        (PointKind::Anchor, 20.0, 0.125, 0.250, 0.0),
    ];
    let analysis = worked(slab(&[]), tendon(&points), &job);
    for one in &analysis.results[0].by_method {
        let shortening_mpa = one.outcome.as_ref().expect("covered").lost.shortening_mpa;
        let by_count = ["en1992", "as3600"].contains(&one.method.word());
        assert_eq!(shortening_mpa == 0.0, by_count, "{}", one.method.word());
    }
}
