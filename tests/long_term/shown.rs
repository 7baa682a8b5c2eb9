//! What the outputs say of the methods: on the drawing, in the tables, in the list of assumptions.

use crate::side_by_side::{EVERY, Marked};
use tautplan::job::LongTermMethod;
use tautplan::losses::long_term::recalled;

#[test]
fn the_drawing_names_the_drawn_method_and_what_it_rests_on() {
    let texts = |long_term: &str| {
        let drawing = Marked::by("small-floor", long_term).read("marked.dxf");
        let values: Vec<&str> = drawing.lines().map(str::trim).collect();
        values.join(" ")
    };
    let by_clause = texts(EVERY);
    assert!(by_clause.contains("Losses after lock-off by en1992"));
    assert!(by_clause.contains("concrete 30 MPa"));
    assert!(by_clause.contains("Between") || by_clause.contains("between"));
    for method in ["aci423", "bs8110", "as3600", "direct"] {
        assert!(by_clause.contains(method), "{method} has no column");
    }
    assert!(!by_clause.contains("Shrinkage strain"));
    let direct = texts("method = \"direct\"\n");
    assert!(direct.contains("Shrinkage strain 0.0004"));
    assert!(!direct.contains("en1992"));
}

#[test]
fn the_table_of_methods_says_why_a_cell_is_empty() {
    let marked = Marked::by("small-floor", EVERY);
    let table = marked.read("methods.csv");
    let mut rows = csv::Reader::from_reader(table.as_bytes());
    let header = rows.headers().expect("a header").clone();
    let column = |name: &str| header.iter().position(|head| head == name).expect(name);
    let (method, note) = (column("method"), column("note"));
    let (early, last) = (column("mean_after_1_days_kn"), column("mean_final_kn"));
    let mut count = 0;
    for row in rows.records() {
        let row = row.expect("the rows are of one length");
        count += 1;
        let knows_time = ["en1992", "as3600"].contains(&&row[method]);
        assert_eq!(row[early].is_empty(), !knows_time);
        assert_eq!(row[note].contains("the final loss only"), !knows_time);
        assert!(row[last].parse::<f64>().is_ok_and(|kn| kn > 0.0));
    }
    assert_eq!(count, 5 * marked.tendons().len());
    for tendon in marked.tendons() {
        for method in ["aci423", "bs8110", "direct"] {
            let reason = &tendon["losses_by_method"][method]["no_force_in_time"];
            let reason = reason.as_str().unwrap_or_default();
            assert!(reason.contains(method) && reason.contains("the final loss only"));
        }
        assert!(tendon["losses_by_method"]["en1992"]["no_force_in_time"].is_null());
    }
    let refused = Marked::by(
        "small-floor",
        &format!("{EVERY}relaxation_class = \"bar\"\n"),
    );
    assert!(refused.read("methods.csv").contains("BS 8110-1 table 4.6"));
}

#[test]
fn what_a_method_quotes_from_memory_is_in_every_result_and_in_the_readme() {
    let readme = include_str!("../../README.md");
    let readme = readme.split_whitespace().collect::<Vec<_>>().join(" ");
    let result = Marked::by("small-floor", EVERY).result();
    let assumed = result["assumptions"].to_string();
    for &method in LongTermMethod::ALL {
        let Some(what) = recalled(method) else {
            continue;
        };
        let said = format!("{} quotes from memory", method.word());
        assert!(assumed.contains(&said) && assumed.contains(what), "{said}");
        assert!(readme.contains(what), "README.md: {what}");
    }
    let direct = Marked::by("small-floor", "method = \"direct\"\n").result();
    assert!(
        !direct["assumptions"]
            .to_string()
            .contains("quotes from memory")
    );
}

#[test]
fn a_force_asked_for_before_the_end_is_never_called_the_final_one() {
    let asked = "method = \"en1992\"\nmethods = [\"as3600\"]\nasked_days = 94\n\
                 basic_relaxation = 0.02\nrelaxation_stress_factor = 1.1\n";
    let marked = Marked::by("small-floor", asked);
    assert!(
        marked
            .summary
            .contains("Long-term loss by each method at an age of 94 days")
    );
    let drawing = marked.read("marked.dxf");
    assert!(!drawing.contains("after all losses"));
    assert!(drawing.contains("94 days"));
    let sheet = marked.sheet("B01");
    assert!(sheet.contains("service: at an age of 94 days"));
    let last = Marked::by("small-floor", "method = \"en1992\"\n");
    assert!(last.read("marked.dxf").contains("after all losses"));
    assert!(last.sheet("B01").contains("service: in the end"));
}

#[test]
fn the_sheet_says_the_units_that_a_method_is_published_in() {
    let job = format!("units = \"us\"\n[height]\nunit = \"mm\"\n[long_term]\n{EVERY}");
    let sheet = Marked::by_job("small-floor", &job).sheet("D005");
    let after = |word: &str| {
        let (_, part) = sheet.split_once(word).expect("the method is on the sheet");
        part.lines().nth(1).unwrap_or_default().to_owned()
    };
    assert!(after("method aci423").ends_with("as published in psi and inches"));
    assert!(after("method en1992").contains("as published in SI"));
    for line in [
        "K_es = 0.5, at stressing in turn",
        "E_c = 2400^1.5 x 0.043 sqrt(f_cmi)",
        "eps*_cse = (0.07 f'c - 0.5) 50e-6 = (0.07 x 30 - 0.5) 50e-6",
        "factor = 1.5, at post-tensioned strand",
        "A_p/A_c = sigma_cp/mean stress after lock-off",
        "f'ci = 20 MPa = 2900.75 psi",
    ] {
        assert!(sheet.contains(line), "{line} is not in:\n{sheet}");
    }
    // 0.64 and more of strength is of the part of the table that was at hand.
    let c = sheet
        .lines()
        .find(|line| line.trim_start().starts_with("C = "));
    let c = c.expect("C is on the sheet");
    assert_eq!(
        c.contains("f_pi/f_pu = 0.63"),
        c.contains("from memory"),
        "{c}"
    );
}
