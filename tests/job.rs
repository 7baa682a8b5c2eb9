//! The job file: every mistake at once, each at its line; every default survives a turn through the proposed file.

use std::collections::BTreeMap;

use proptest::prelude::*;
use tautplan::job::key::{Key, Kind};
use tautplan::job::keys::{KEYS, ROOT, TABLES};
use tautplan::job::{self, Datum, Job, Proposal, System, Wobble};
use tautplan::units::{LengthUnit, Units};

fn problems(text: &str) -> job::Problems {
    job::read("tautplan.toml", text).expect_err("the file holds a mistake")
}

/// The only mistake of a file: line, what was found, what was expected, what to type.
fn only(text: &str) -> (usize, String, String, String) {
    let problems = problems(text);
    assert_eq!(problems.list().len(), 1, "{problems}");
    let problem = &problems.list()[0];
    (
        problems.line(problem),
        problem.found.clone(),
        problem.expected.clone(),
        problem.remedy.clone(),
    )
}

/// The line that a key stands below; nothing for a key before every table.
fn header(key: &Key) -> String {
    match key.table {
        ROOT => String::new(),
        table => format!("[{table}]\n"),
    }
}

const FIVE: &str = "\
[stressing]
mu_per_radian = 0.19
jacking_ratio = 75
draw_in_mm = \"6\"

[height]
datum = \"centre\"
patterns = ['^H(\\d+)$']
";

#[test]
fn five_mistakes_are_shown_at_once_each_at_its_line() {
    let problems = problems(FIVE);
    let lines: Vec<usize> = problems.list().iter().map(|p| problems.line(p)).collect();
    assert_eq!(lines, [2, 3, 4, 7, 8]);
    snapbox::assert_data_eq!(
        problems.to_string(),
        snapbox::file!["data/job/five-mistakes.txt"].raw()
    );
}

#[test]
fn an_empty_file_is_the_default_job() {
    let resolved = job::read("tautplan.toml", "").expect("an empty file is a job");
    assert_eq!(resolved.job.inputs(), Job::default().inputs());
    assert!(resolved.given.is_empty());
}

#[test]
fn inputs_have_the_names_of_the_result() {
    let inputs: BTreeMap<String, serde_json::Value> = Job::default().inputs().into_iter().collect();
    assert_eq!(inputs.len(), Job::default().inputs().len(), "a name twice");
    for (name, value) in [
        ("mu_per_rad", 0.19),
        ("wobble_rad_per_m", 0.008),
        ("draw_in_mm", 6.0),
        ("jacking_ratio", 0.75),
        ("inflection", 0.1),
        ("strand_modulus_mpa", 195_000.0),
        ("cover_mm", 20.0),
    ] {
        assert_eq!(inputs[name], serde_json::json!(value), "{name}");
    }
    assert_eq!(inputs["method"], "direct");
    assert_eq!(inputs["height_datum"], "centroid");
    assert!(!inputs.contains_key("wobble_per_m"));
}

#[test]
fn five_strands_of_12_7_at_three_quarters_pull_688_kn() {
    let job = Job::default();
    let size = job.tendon.strands.iter().find(|size| size.name == "12.7");
    let size = size.expect("12.7 is known");
    let force_kn = 5.0 * size.area_mm2 * size.strength_mpa * job.stressing.jacking_ratio / 1000.0;
    assert!((force_kn - 688.4325).abs() < 1e-9, "{force_kn}");
}

#[test]
fn the_proposed_file_parses_to_the_defaults_as_it_is_and_with_every_default_set() {
    let text = job::file(&["Level 2".to_owned()], &BTreeMap::new());
    let as_it_is = job::read("proposed", &text).expect("the proposed file is a job file");
    assert!(as_it_is.given.is_empty());

    let defaults = Job::default();
    let mut set = String::new();
    let mut table = "";
    let mut count = 0;
    for line in text.lines() {
        if let Some((name, _)) = TABLES.iter().find(|(name, _)| line == format!("[{name}]")) {
            table = name;
        }
        let key = KEYS
            .iter()
            .find(|key| key.table == table && line.starts_with(&format!("#{} =", key.name)));
        match key {
            Some(key) if key.value(&defaults).is_some() => {
                count += 1;
                set.push_str(line.trim_start_matches('#'));
            }
            // The further lines of a list that has one entry a line.
            None if line.starts_with("#  ") || line == "#]" => {
                set.push_str(line.trim_start_matches('#'));
            }
            _ => set.push_str(line),
        }
        set.push('\n');
    }
    let with_defaults = KEYS.iter().filter(|key| key.value(&defaults).is_some());
    assert_eq!(count, with_defaults.count());
    let again = job::read("proposed", &set).unwrap_or_else(|problems| panic!("{problems}"));
    assert_eq!(again.given.len(), count);
    assert_eq!(again.job.inputs(), defaults.inputs());
    let left: Vec<String> = again.assumptions();
    assert!(
        left.iter().all(|line| line.contains("not given")),
        "{left:?}"
    );
}

#[test]
fn the_examples_of_keys_without_default_parse_too() {
    for key in KEYS
        .iter()
        .filter(|key| key.value(&Job::default()).is_none())
    {
        let text = format!("{}{}\n", header(key), key.example());
        let resolved = job::read("example", &text).unwrap_or_else(|problems| panic!("{problems}"));
        assert!(key.value(&resolved.job).is_some(), "{}", key.path());
    }
}

#[test]
fn every_range_holds_its_own_ends_and_refuses_what_lies_beyond() {
    let mut numbers = 0;
    for key in KEYS {
        let Kind::Number { least, most, .. } = key.kind else {
            continue;
        };
        numbers += 1;
        let file = |number: &str| format!("{}{} = {number}\n", header(key), key.name);
        for end in [least, most] {
            let read = job::read("range", &file(&format!("{end:?}")));
            // Two limits contradict each other at the far ends of their ranges; that is another rule.
            if !["hogging_radius", "sagging_radius", "support_residual"]
                .iter()
                .any(|pair| key.name.starts_with(pair))
            {
                let job = read.unwrap_or_else(|problems| panic!("{problems}")).job;
                assert_eq!(
                    key.value(&job),
                    Some(serde_json::json!(end)),
                    "{}",
                    key.path()
                );
            }
        }
        for beyond in [
            format!("{:?}", least - 1.0),
            format!("{:?}", most * 1.1),
            "nan".into(),
            "inf".into(),
            "-inf".into(),
        ] {
            let (line, ..) = only(&file(&beyond));
            assert_eq!(line, 2);
        }
    }
    assert!(numbers >= 30, "{numbers}");
}

#[test]
fn an_unknown_key_names_the_nearest() {
    let (line, found, _, remedy) = only("[stressing]\nmu_per_rd = 0.2\n");
    assert_eq!(
        (line, found.as_str()),
        (2, "unknown key `mu_per_rd` in [stressing]")
    );
    assert!(remedy.contains("did you mean `mu_per_rad`?"), "{remedy}");
    let (_, _, _, remedy) = only("[profile]\ndraw_in_mm = 6\n");
    assert_eq!(remedy, "`draw_in_mm` belongs below the line `[stressing]`");
    let (_, _, _, remedy) = only("mu_per_rad = 0.2\n");
    assert_eq!(remedy, "`mu_per_rad` belongs below the line `[stressing]`");
    let (_, _, _, remedy) = only("[stresing]\nmu_per_rad = 0.2\n");
    assert_eq!(remedy, "did you mean `[stressing]`?");
}

#[test]
fn both_forms_of_wobble_contradict_and_either_stands_alone() {
    let (line, found, ..) = only("[stressing]\nwobble_rad_per_m = 0.008\nwobble_per_m = 0.0015\n");
    assert_eq!(line, 3);
    assert_eq!(
        found,
        "both `wobble_rad_per_m` and `wobble_per_m` are given"
    );
    let resolved = job::read("job", "[stressing]\nwobble_per_m = 0.0015\n").expect("fine");
    assert_eq!(resolved.job.stressing.wobble, Wobble::PerM(0.0015));
    assert!(
        !resolved
            .assumptions()
            .iter()
            .any(|line| line.starts_with("wobble"))
    );
    assert!(
        !resolved
            .job
            .inputs()
            .iter()
            .any(|(name, _)| name == "wobble_rad_per_m")
    );
}

#[test]
fn each_other_mistake_is_told_apart() {
    for (text, words) in [
        ("[layers]\nbanded = []\n", "empty list"),
        ("[layers]\nbanded = \"PT*\"\n", "cannot be the text"),
        ("[layers]\nbanded = [\"PT[\"]\n", "broken shell pattern"),
        ("[layers]\nbanded = [\"\"]\n", "empty word"),
        ("[layers]\nbanded = [3]\n", "cannot hold the number 3"),
        (
            "[labels]\nmark_patterns = ['(']\n",
            "broken regular expression",
        ),
        ("[labels]\nmark_patterns = ['^D']\n", "no group"),
        (
            "[long_term]\nmethod = \"guess\"\n",
            "does not know \"guess\"",
        ),
        ("[profile]\nfit_inflection = 1\n", "cannot be the number 1"),
        ("[drawing]\nunit = \"inch\"\n", "does not know \"inch\""),
        ("[slab]\nthickness_mm = 1979-05-27\n", "cannot be a date"),
        ("[tendon]\ndefault_strand = \"13\"\n", "not known"),
        ("[tendon]\ndefault_strands = 4.5\n", "not a whole number"),
        ("[tendon]\ndefault_strands = 0\n", "0"),
        (
            "[limits]\nhogging_radius_error_m = 9\n",
            "before it is a warning",
        ),
        (
            "[limits]\nsagging_radius_warning_m = 2\n",
            "a sagging radius would be an error",
        ),
        ("stressing = 3\n", "is a table"),
        ("[stressing]\nmu_per_rad = \n", "not TOML"),
        (
            "[stressing]\nmu_per_rad = 0.1\nmu_per_rad = 0.1\n",
            "not TOML",
        ),
        (
            "[[tendon.strand]]\nname = \"9\"\narea_mm2 = 52\nstrength_mpa = 1860\n\
             [[tendon.strand]]\nname = \"9\"\narea_mm2 = 53\nstrength_mpa = 1860\n",
            "two strands of the name",
        ),
        (
            "[[tendon.strand]]\nname = \"9\"\narea_mm2 = 52\n",
            "no `strength_mpa`",
        ),
        (
            "[[tendon.strand]]\nname = 9\narea_mm2 = 52\nstrength_mpa = 1860\n",
            "cannot be the number 9",
        ),
        ("[tendon]\nstrand = [4]\n", "cannot hold the number 4"),
    ] {
        let (line, found, expected, remedy) = only(text);
        assert!(found.contains(words), "{text}: {found}");
        assert!(
            line >= 1 && !expected.is_empty() && !remedy.is_empty(),
            "{text}"
        );
    }
    let (_, _, _, remedy) = only("[stressing]\njacking_ratio = 75\n");
    assert_eq!(
        remedy,
        "this is a ratio, not a percentage: type `jacking_ratio = 0.75`"
    );
    let (_, _, _, remedy) = only("[stressing]\nmu_per_rad = 1.9\n");
    assert!(
        !remedy.contains("percentage") && !remedy.contains("0.019"),
        "{remedy}"
    );
}

#[test]
fn each_mistake_in_a_pattern_is_told_at_its_line() {
    for (text, words) in [
        (
            "[labels]\nmark_patterns = [3]\n",
            "cannot hold the number 3",
        ),
        ("[labels]\nmark_patterns = []\n", "empty list"),
        (
            "[labels]\nmark_patterns = ['^(?<mrak>D\\d+)$']\n",
            "unknown group `mrak`",
        ),
        (
            "[height]\npatterns = ['^H$(?<value>\\d+)']\n",
            "can never match: no line",
        ),
        (
            "[height]\npatterns = ['^(?<value>H)\\d+$']\n",
            "can never match a number",
        ),
        (
            "[height]\npatterns = [{ name = \"ours\" }]\n",
            "no `expression`",
        ),
        (
            "[height]\npatterns = [{ expresion = 'x', expression = '(?<value>\\d+)' }]\n",
            "unknown key `expresion`",
        ),
        (
            "[height]\npatterns = [{ expression = '(?<value>\\d+)', strands = 1 }]\n",
            "unknown key `strands`",
        ),
        (
            "[height]\npatterns = [{ expression = '(?<value>\\d+)', unit = \"inch\" }]\n",
            "does not know \"inch\"",
        ),
        (
            "[height]\npatterns = [{ expression = '(?<value>\\d+)', unit = \"kN\" }]\n",
            "does not know \"kN\"",
        ),
        (
            "[height]\npatterns = [{ expression = '(?<value>\\d+)', from = \"bottom\" }]\n",
            "does not know \"bottom\"",
        ),
        (
            "[labels]\nmark_patterns = [{ expression = '(?<force>\\d+) KIPS' }]\n",
            "no unit that fits",
        ),
        (
            "[labels]\nmark_patterns = [{ expression = '(?<force_per_width>\\d+)', unit = \"kip\" }]\n",
            "no unit that fits",
        ),
        (
            "[labels]\nmark_patterns = [{ expression = '(?<tendons>\\d+)T', strands = 1.5 }]\n",
            "not a whole number",
        ),
        (
            "[labels]\nmark_patterns = [{ expression = '(?<tendons>\\d+)T', strand = \"13\" }]\n",
            "not known",
        ),
    ] {
        let (line, found, expected, remedy) = only(text);
        assert!(found.contains(words), "{text}: {found}");
        assert_eq!(line, 2, "{text}");
        assert!(!expected.is_empty() && !remedy.is_empty(), "{text}");
    }
}

#[test]
fn a_syntax_error_hides_no_other_mistake() {
    let problems =
        problems("[stressing]\nmu_per_rad = = 0.2\ndraw_in_mm = 600\n\n[height]\nunti = \"mm\"\n");
    let lines: Vec<usize> = problems.list().iter().map(|p| problems.line(p)).collect();
    assert!(
        lines.contains(&2) && lines.contains(&3) && lines.contains(&6),
        "{problems}"
    );
}

#[test]
fn layer_patterns_and_shapes_are_checked_at_their_line() {
    let (line, found, expected, _) = only("[layers]\nbanded = [\"PT\",\n\"PT@colour=300\"]\n");
    assert_eq!(line, 3);
    assert!(found.contains("@colour=300") && expected.contains("@linetype="));
    let (_, found, ..) = only("[layers]\nends = [\"PT@color=1@weight=2\"]\n");
    assert!(found.contains("@weight="), "{found}");
    let (_, found, _, remedy) = only("[ends]\nlive_shapes = [\"triangel\"]\n");
    assert!(found.contains("triangel") && remedy.contains("\"triangle\""));
    let text = "[layers]\ntendons = []\nbanded = [\"0@linetype=DASHED*@colour=3\"]\n[ends]\ndead_shapes = [\"bar\", \"solid\"]\n\
        [drawing]\nbanded_along_deg = 90\n";
    let job = job::read("job", text).expect("fine").job;
    assert!(
        (job.conventions.banded_along_rad.expect("given") - std::f64::consts::FRAC_PI_2).abs()
            < 1e-12
    );
    assert_eq!(job.conventions.dead_end_shapes, ["bar", "solid"]);
    assert!(
        job.layer_patterns()
            .contains(&"0@linetype=DASHED*@colour=3".to_owned())
    );
    only("[layers]\nbanded = []\n");
}

#[test]
fn given_values_reach_the_job_in_internal_units() {
    let text = "[drawing]\nunit = \"in\"\n[height]\nunit = \"in\"\ndatum = \"duct-underside\"\n\
        [stressing]\ndraw_in_mm = 8\n[slab]\nthickness_mm = 225\n\
        [[tendon.strand]]\nname = \"0.6\"\narea_mm2 = 140\nstrength_mpa = 1860\n";
    let resolved = job::read("job", text).expect("fine");
    let job = &resolved.job;
    assert_eq!(job.conventions.unit, Some(LengthUnit::In));
    assert_eq!(job.conventions.height.datum, Datum::DuctUnderside);
    assert!((job.stressing.draw_in_m - 0.008).abs() < 1e-15);
    assert!((job.slab.thickness_m.expect("given") - 0.225).abs() < 1e-15);
    assert_eq!(job.tendon.strands.len(), 5);
    assert!(
        job.conventions
            .height_patterns
            .iter()
            .any(|p| p.is_match("1 1/4\""))
    );
    assert!(
        !Job::default()
            .conventions
            .height_patterns
            .iter()
            .any(|p| p.is_match("1 1/4\""))
    );
    assert_eq!(resolved.given.len(), 6);
    assert!(
        !resolved
            .assumptions()
            .iter()
            .any(|line| line.starts_with("draw_in_mm"))
    );
    assert!(
        resolved
            .assumptions()
            .iter()
            .any(|line| line == "mu_per_rad = 0.19 (default: EN 1992-1-1 table 5.1, from memory)")
    );
}

#[test]
fn a_proposal_is_set_in_the_file_whatever_characters_it_holds() {
    let name = "PT'\"\\ [1] {a}\u{7}é*".to_owned();
    let proposals = BTreeMap::from([
        (
            "labels.mark_patterns".to_owned(),
            Proposal {
                value: serde_json::json!([r"^(?<mark>D\d+)'s$", r#"(?<strands>\d+)""#]),
                why: name.clone(),
            },
        ),
        (
            "ends.live_blocks".to_owned(),
            Proposal {
                value: serde_json::json!([tautplan::patterns::pattern_of(&name)]),
                why: "two\nlines".to_owned(),
            },
        ),
    ]);
    let text = job::file(&[name], &proposals);
    let resolved = job::read("proposed", &text).unwrap_or_else(|problems| panic!("{problems}"));
    assert_eq!(resolved.given.len(), 2);
    assert_eq!(resolved.job.conventions.mark_patterns.len(), 2);
}

/// Findings send the reader to keys of the job file by their path: each of them is a key.
#[test]
fn keys_that_the_rules_name_are_keys() {
    let pattern = regex::Regex::new(r"\b(limits|stressing|tendon|long_term)\.([a-z][a-z0-9_]*)");
    let pattern = pattern.expect("a pattern");
    let mut named = 0;
    for rule in tautplan::checks::rules() {
        for found in pattern.captures_iter(rule.meaning) {
            named += 1;
            let key = job::keys::find(&found[1], &found[2]);
            assert!(key.is_some(), "{}: {}", rule.name, &found[0]);
        }
    }
    assert!(named >= 10, "{named}");
}

#[test]
fn the_keys_before_the_tables_are_read_and_known_to_messages() {
    let job = job::read(
        "job",
        "units = \"us\"\nsystem = \"greased-single-strand\"\n",
    );
    let job = job.expect("fine").job;
    assert_eq!(
        (job.units, job.system),
        (Units::Us, System::GreasedSingleStrand)
    );
    let (line, found, expected, remedy) = only("units = \"imperial\"\n");
    assert_eq!(
        (line, found.as_str()),
        (1, "`units` does not know \"imperial\"")
    );
    assert_eq!(expected, "expected one of \"si\", \"us\"");
    assert!(remedy.contains("units = "), "{remedy}");
    let (_, _, _, remedy) = only("[stressing]\nsystem = \"bonded-flat-duct\"\n");
    assert_eq!(remedy, "`system` belongs before the first [table]");
    let (_, _, _, remedy) = only("sistem = \"bonded-flat-duct\"\n");
    assert_eq!(remedy, "did you mean `system`?");
    let (_, found, ..) = only("[\"\"]\nunits = \"us\"\n");
    assert_eq!(found, "unknown table ``");
    let (_, found, ..) = only("[units]\nforce = \"kip\"\n");
    assert_eq!(found, "`units` cannot be a table");
}

#[test]
fn the_old_name_of_the_table_of_strands_is_told_where_it_went() {
    for text in [
        "[system]\nduct_height_mm = 20\n",
        "[[system.strand]]\nname = \"9\"\narea_mm2 = 52\nstrength_mpa = 1860\n",
    ] {
        let (line, _, _, remedy) = only(text);
        assert_eq!(line, 1);
        assert_eq!(
            remedy,
            "write `[tendon]` for `[system]`, and `[[tendon.strand]]` for `[[system.strand]]`"
        );
    }
}

#[test]
fn a_system_gives_defaults_and_every_key_still_overrides() {
    let read = |text: &str| job::read("job", text).unwrap_or_else(|problems| panic!("{problems}"));
    let greased = read("system = \"greased-single-strand\"\n");
    let job = &greased.job;
    assert_eq!(job.stressing.wobble, Wobble::PerM(0.0046));
    assert!((job.stressing.mu_per_rad - 0.07).abs() < 1e-15);
    assert!((job.stressing.draw_in_m - 0.00635).abs() < 1e-15);
    assert!((job.tendon.duct_height_m - 0.016).abs() < 1e-15);
    assert!((job.limits.plan_radius_m - 3.0).abs() < 1e-15);
    let said = greased.assumptions();
    let says = |line: &str| said.iter().any(|known| known == line);
    assert!(
        says("mu_per_rad = 0.07 (default of greased-single-strand: common practice, 0.05 to 0.07)"),
        "{said:?}"
    );
    assert!(says("jacking_ratio = 0.75 (default: common practice)"));
    // Bonded or not is asked by the published methods only.
    assert!(!job.long_term.published.bonded);
    assert!(!said.iter().any(|line| line.starts_with("bonded")));
    let by_clause = read("system = \"greased-single-strand\"\n[long_term]\nmethod = \"aci423\"\n");
    assert!(by_clause.assumptions().iter().any(|line| {
        line == "bonded = false (default of greased-single-strand: a strand in grease is free along its whole length)"
    }));
    let grouted = read(
        "system = \"greased-single-strand\"\n[long_term]\nmethod = \"aci423\"\nbonded = true\n",
    );
    assert!(grouted.job.long_term.published.bonded);
    assert!(!said.iter().any(|line| line.starts_with("system")));

    // Wherever the keys stand, what they say holds.
    let given = read(
        "system = \"greased-single-strand\"\n[stressing]\nmu_per_rad = 0.05\nwobble_rad_per_m = 0.01\n",
    );
    assert!((given.job.stressing.mu_per_rad - 0.05).abs() < 1e-15);
    assert_eq!(given.job.stressing.wobble, Wobble::RadPerM(0.01));
    let said = given.assumptions();
    assert!(!said.iter().any(|line| line.starts_with("wobble")));

    // The default system by name is the same as none.
    let named = read("system = \"bonded-flat-duct\"\n");
    assert_eq!(named.job.inputs(), Job::default().inputs());
}

#[test]
fn a_proposed_file_shows_the_defaults_of_its_system() {
    let system = Proposal {
        value: serde_json::json!("greased-single-strand"),
        why: String::new(),
    };
    let text = job::file(&[], &BTreeMap::from([("system".to_owned(), system)]));
    for line in [
        "#units = \"si\"",
        "system = \"greased-single-strand\"",
        "#mu_per_rad = 0.07",
        "#wobble_per_m = 0.0046",
        "#plan_radius_m = 3",
    ] {
        assert!(text.lines().any(|known| known == line), "{line}\n{text}");
    }
    let read = job::read("proposed", &text).unwrap_or_else(|problems| panic!("{problems}"));
    assert_eq!(
        read.job.inputs(),
        System::GreasedSingleStrand.job().inputs()
    );
}

proptest! {
    #![proptest_config(ProptestConfig { failure_persistence: None, ..ProptestConfig::with_cases(400) })]

    #[test]
    fn no_text_panics(text in "\\PC{0,200}|[\\[\\]a-z_=\"'.0-9\n#{}, \u{e9}\u{1F600}\t\r\u{0}]{0,200}") {
        if let Err(problems) = job::read("random", &text) {
            prop_assert!(!problems.render(false).is_empty());
            prop_assert!(!problems.render(true).is_empty());
        }
    }

    #[test]
    fn no_value_in_any_key_panics(index in 0..KEYS.len(), value in "[\\[\\]{}a-z=\"'.0-9, \u{e9}\n-]{0,30}") {
        let key = &KEYS[index];
        let text = format!("{}{} = {value}\n[height]\nunit = {value}", header(key), key.name);
        if let Err(problems) = job::read("random", &text) {
            prop_assert!(!problems.to_string().is_empty());
        }
    }
}

#[test]
fn where_the_strand_lies_in_the_duct_is_assumed_only_for_heights_of_the_duct() {
    let said = |text: &str| {
        let resolved = job::read("job", text).expect("fine");
        let said = resolved.assumptions();
        said.iter().any(|line| line.contains("strand_in_duct"))
    };
    assert!(!said(""));
    assert!(said("[height]\ndatum = \"duct-underside\"\n"));
}

#[test]
fn only_what_the_named_methods_look_at_is_assumed() {
    let read = |text: &str| job::read("job", text).unwrap_or_else(|problems| panic!("{problems}"));
    let assumed = |text: &str| -> Vec<String> {
        let fallbacks = read(text).fallbacks();
        let of_table = fallbacks.iter().filter(|key| key.table == "long_term");
        of_table.map(|key| key.name.clone()).collect()
    };
    let direct = assumed("");
    assert!(direct.contains(&"creep_coefficient".to_owned()));
    assert!(!direct.contains(&"strength_mpa".to_owned()));
    assert_eq!(
        assumed("[long_term]\nmethod = \"bs8110\"\n"),
        [
            "methods",
            "concrete_stress_mpa",
            "strength_mpa",
            "strength_at_stressing_mpa",
            "environment",
            "stressing_days",
            "relaxation_class",
            "bonded",
            "balanced_share",
            "load_share_at_stressing",
        ]
    );
    let unbonded = assumed("[long_term]\nmethod = \"aci423\"\nbonded = false\n");
    assert!(!unbonded.contains(&"balanced_share".to_owned()));
    let both = assumed("[long_term]\nmethods = [\"direct\", \"aci423\"]\n");
    for key in ["creep_coefficient", "humidity_percent", "balanced_share"] {
        assert!(both.contains(&key.to_owned()), "{key}");
    }
    assert!(!both.contains(&"cement_class".to_owned()));

    // What is given and looked at by no method is said.
    let idle =
        read("[long_term]\nmethod = \"en1992\"\ncreep_coefficient = 2\nhumidity_percent = 60\n")
            .idle();
    let expected = "Given below [long_term] and not looked at by en1992: creep_coefficient.";
    assert_eq!(idle.as_deref(), Some(expected));
    assert_eq!(read("[long_term]\ncreep_coefficient = 2\n").idle(), None);
}
