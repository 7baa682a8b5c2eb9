//! The program from outside: exit status, messages for everything that can be wrong, files complete or not at all.

use std::fs;
use std::path::{Path, PathBuf};
use std::process::{Command, Output};

use tempfile::TempDir;

fn tautplan(folder: &Path, arguments: &[&str]) -> Output {
    Command::new(env!("CARGO_BIN_EXE_tautplan"))
        .args(arguments)
        .current_dir(folder)
        .env("NO_COLOR", "1")
        .output()
        .expect("the program starts")
}

fn err(output: &Output) -> String {
    String::from_utf8_lossy(&output.stderr).into_owned()
}

fn out(output: &Output) -> String {
    String::from_utf8_lossy(&output.stdout).into_owned()
}

/// Not done: exit status 2, nothing on standard output, one message that holds all of these words.
fn refused(folder: &Path, arguments: &[&str], words: &[&str]) -> String {
    let output = tautplan(folder, arguments);
    let message = err(&output);
    assert_eq!(output.status.code(), Some(2), "{message}");
    assert!(output.stdout.is_empty(), "{}", out(&output));
    for word in words {
        assert!(message.contains(word), "{word} is not in: {message}");
    }
    assert!(!message.contains("panicked"), "{message}");
    message
}

fn demo(name: &str) -> PathBuf {
    Path::new(env!("CARGO_MANIFEST_DIR"))
        .join("demo-drawings")
        .join(name)
}

/// A folder with the small floor in it.
fn small() -> TempDir {
    let folder = TempDir::new().expect("a folder");
    fs::copy(
        demo("small-floor.dxf"),
        folder.path().join("small-floor.dxf"),
    )
    .expect("copied");
    folder
}

fn names(folder: &Path) -> Vec<String> {
    let mut names: Vec<String> = fs::read_dir(folder)
        .expect("a folder")
        .map(|entry| {
            entry
                .expect("an entry")
                .file_name()
                .to_string_lossy()
                .into_owned()
        })
        .collect();
    names.sort();
    names
}

/// A drawing of straight lines on one layer: pairs of x, y.
fn lines_on(layer: &str, insunits: Option<u8>, ends: &[[f64; 4]]) -> String {
    let mut text = String::from("0\nSECTION\n2\nHEADER\n9\n$ACADVER\n1\nAC1009\n");
    if let Some(unit) = insunits {
        text += "9\n$INSUNITS\n70\n";
        text += &unit.to_string();
        text += "\n";
    }
    text.push_str("0\nENDSEC\n0\nSECTION\n2\nENTITIES\n");
    for [x0, y0, x1, y1] in ends {
        let line = format!("0\nLINE\n8\n{layer}\n10\n{x0}\n20\n{y0}\n11\n{x1}\n21\n{y1}\n");
        text += &line;
    }
    text.push_str("0\nENDSEC\n0\nEOF\n");
    text
}

const FILES: [&str; 7] = [
    "small-floor-extensions.csv",
    "small-floor-findings.csv",
    "small-floor-marked.dxf",
    "small-floor-methods.csv",
    "small-floor-points.csv",
    "small-floor-result.json",
    "small-floor-tendons.csv",
];

#[test]
fn mark_writes_its_files_and_a_summary() {
    let folder = small();
    let output = tautplan(folder.path(), &["mark", "small-floor.dxf"]);
    assert!(
        matches!(output.status.code(), Some(0 | 1)),
        "{}",
        err(&output)
    );
    let mut expected: Vec<String> = FILES.iter().map(ToString::to_string).collect();
    expected.push("small-floor.dxf".to_owned());
    expected.sort();
    assert_eq!(names(folder.path()), expected);
    assert!(out(&output).contains("small-floor-marked.dxf"));
    assert!(err(&output).contains("no job file"), "{}", err(&output));

    let text = fs::read(folder.path().join("small-floor-result.json")).expect("written");
    let result: serde_json::Value = serde_json::from_slice(&text).expect("JSON");
    assert_eq!(result["schema"], "tautplan-result/1");
    assert_eq!(result["inputs"]["mu_per_rad"], 0.19);
    let assumed = result["assumptions"].as_array().expect("a list");
    assert!(assumed.iter().any(|line| {
        line.as_str()
            .is_some_and(|line| line.starts_with("mu_per_rad = 0.19 (default"))
    }));
    let status = result["findings"]
        .as_array()
        .expect("a list")
        .iter()
        .any(|finding| finding["level"] == "error");
    assert_eq!(output.status.code(), Some(i32::from(status)));
}

#[test]
fn marking_twice_gives_the_same_bytes_and_out_is_made() {
    let folder = small();
    for _ in 0..2 {
        let output = tautplan(folder.path(), &["mark", "small-floor.dxf", "--out", "a/b"]);
        assert!(
            matches!(output.status.code(), Some(0 | 1)),
            "{}",
            err(&output)
        );
        assert_eq!(names(&folder.path().join("a/b")), FILES);
    }
    let first = fs::read(folder.path().join("a/b/small-floor-marked.dxf")).expect("written");
    fs::copy(
        folder.path().join("a/b/small-floor-marked.dxf"),
        folder.path().join("again.dxf"),
    )
    .expect("copied");
    tautplan(folder.path(), &["mark", "again.dxf"]);
    let again = fs::read(folder.path().join("again-marked.dxf")).expect("written");
    assert!(first == again, "marking a marked drawing changes it");
}

#[test]
fn the_job_beside_the_drawing_is_read_its_own_first_and_the_named_one_before_both() {
    let folder = small();
    let write = |name: &str, mu: &str| {
        fs::write(
            folder.path().join(name),
            format!("[stressing]\nmu_per_rad = {mu}\n"),
        )
        .expect("written");
    };
    let mu = |arguments: &[&str]| {
        let output = tautplan(folder.path(), arguments);
        assert!(
            matches!(output.status.code(), Some(0 | 1)),
            "{}",
            err(&output)
        );
        let text = fs::read(folder.path().join("small-floor-result.json")).expect("written");
        let result: serde_json::Value = serde_json::from_slice(&text).expect("JSON");
        (result["inputs"]["mu_per_rad"].as_f64(), err(&output))
    };
    write("tautplan.toml", "0.20");
    let (used, said) = mu(&["mark", "small-floor.dxf"]);
    assert_eq!(used, Some(0.20));
    assert!(said.contains("job file tautplan.toml"), "{said}");
    write("small-floor.toml", "0.21");
    let (used, said) = mu(&["mark", "small-floor.dxf"]);
    assert_eq!(used, Some(0.21));
    assert!(said.contains("job file small-floor.toml"), "{said}");
    write("named.toml", "0.22");
    assert_eq!(
        mu(&["mark", "small-floor.dxf", "--job", "named.toml"]).0,
        Some(0.22)
    );
}

#[test]
fn each_bad_drawing_has_its_own_message() {
    let folder = small();
    let put =
        |name: &str, bytes: &[u8]| fs::write(folder.path().join(name), bytes).expect("written");
    let whole = fs::read(demo("small-floor.dxf")).expect("read");
    put("empty.dxf", b"");
    put("dwg.dxf", b"AC1032\0\0\0\0\0\0binary");
    // Cut before its entities; one cut further on is read as far as it goes (tests/hostile/program.rs).
    put("cut.dxf", &whole[..whole.len() / 10]);
    put(
        "letter.dxf",
        b"Dear all,\nplease find the drawing enclosed.\n",
    );
    put(
        "other.dxf",
        lines_on("TENDONS-BANDED", Some(4), &[[0.0, 0.0, 30000.0, 0.0]]).as_bytes(),
    );
    put(
        "bare.dxf",
        lines_on("TENDON-BANDED", Some(4), &[]).as_bytes(),
    );
    put("text-only.dxf", b"0\nSECTION\n2\nENTITIES\n0\nTEXT\n8\nTENDON-BANDED\n10\n0\n20\n0\n40\n100\n1\nD1\n0\nENDSEC\n0\nEOF\n");
    fs::create_dir(folder.path().join("plans")).expect("made");
    for command in ["mark", "survey"] {
        for (file, words) in [
            ("none.dxf", &["none.dxf", "no such file"][..]),
            ("plans", &["plans", "a folder; name the drawings in it"]),
            ("empty.dxf", &["empty.dxf", "empty"]),
            ("dwg.dxf", &["dwg.dxf", "DWG", "AC1032", "save it as DXF"]),
            ("cut.dxf", &["cut.dxf", "cut short"]),
            ("letter.dxf", &["letter.dxf", "no DXF"]),
        ] {
            refused(folder.path(), &[command, file], words);
        }
    }
    refused(
        folder.path(),
        &["mark", "other.dxf"],
        &[
            "no layer fits the tendon patterns TENDON-BANDED*, TENDON-DISTRIBUTED*",
            "TENDONS-BANDED (1 LINE)",
            "comes nearest",
            "[layers]",
            "tautplan survey",
        ],
    );
    refused(
        folder.path(),
        &["mark", "bare.dxf"],
        &["no layer fits", "none"],
    );
    refused(
        folder.path(),
        &["mark", "text-only.dxf"],
        &[
            "no line on the tendon layers TENDON-BANDED (1 TEXT)",
            "expected LINE",
        ],
    );
    assert!(
        !names(folder.path())
            .iter()
            .any(|name| name.contains("-marked") || name.starts_with(".tautplan"))
    );
}

#[test]
fn a_unit_that_no_floor_has_is_refused_with_the_units_that_would_do() {
    let folder = TempDir::new().expect("a folder");
    let put =
        |name: &str, text: String| fs::write(folder.path().join(name), text).expect("written");
    let metres = [[0.0, 0.0, 30.0, 0.0], [0.0, 5.0, 30.0, 5.0]];
    put("unit.dxf", lines_on("TENDON-BANDED", None, &metres));
    refused(
        folder.path(),
        &["mark", "unit.dxf"],
        &[
            "read in mm, since the drawing has no $INSUNITS",
            "0.0300 m",
            "1 m to 300 m",
            "set unit below [drawing] in the job file",
            "\"m\" would make that 30.0 m",
        ],
    );
    put("unit.toml", "[drawing]\nunit = \"m\"\n".to_owned());
    let output = tautplan(folder.path(), &["mark", "unit.dxf"]);
    assert!(
        matches!(output.status.code(), Some(0 | 1)),
        "{}",
        err(&output)
    );
    let millimetres = [[0.0, 0.0, 30000.0, 0.0]];
    put("big.dxf", lines_on("TENDON-BANDED", Some(6), &millimetres));
    refused(
        folder.path(),
        &["mark", "big.dxf"],
        &[
            "read in m as $INSUNITS of the drawing says",
            "longer than 30000 m",
            "\"mm\" would make that 30.0 m",
        ],
    );
    let survey = tautplan(folder.path(), &["survey", "big.dxf"]);
    assert!(
        out(&survey).contains("\nunit = \"mm\"\n"),
        "{}",
        out(&survey)
    );
}

#[test]
fn a_job_file_with_five_mistakes_shows_all_five() {
    let folder = small();
    let five = "[stressing]\nmu_per_radian = 0.19\njacking_ratio = 75\ndraw_in_mm = \"6\"\n\n[height]\ndatum = \"centre\"\npatterns = ['^H(\\d+)$']\n";
    fs::write(folder.path().join("bad.toml"), five).expect("written");
    let message = refused(
        folder.path(),
        &["mark", "small-floor.dxf", "--job", "bad.toml"],
        &["5 mistakes in bad.toml"],
    );
    for line in [2, 3, 4, 7, 8] {
        assert!(message.contains(&format!("bad.toml:{line}:")), "{message}");
    }
    refused(
        folder.path(),
        &["mark", "small-floor.dxf", "--job", "none.toml"],
        &["none.toml", "no such file"],
    );
    fs::write(folder.path().join("latin.toml"), b"# \xe9\n").expect("written");
    refused(
        folder.path(),
        &["mark", "small-floor.dxf", "--job", "latin.toml"],
        &["no UTF-8"],
    );
    assert_eq!(
        names(folder.path()),
        ["bad.toml", "latin.toml", "small-floor.dxf"]
    );
}

#[test]
fn no_input_is_written_over_and_no_two_drawings_share_a_result() {
    let folder = small();
    fs::create_dir(folder.path().join("b")).expect("made");
    fs::copy(
        demo("small-floor.dxf"),
        folder.path().join("b/small-floor.dxf"),
    )
    .expect("copied");
    fs::copy(
        demo("small-floor.dxf"),
        folder.path().join("small-floor-marked.dxf"),
    )
    .expect("copied");
    let before = fs::read(folder.path().join("small-floor-marked.dxf")).expect("read");
    refused(
        folder.path(),
        &["mark", "small-floor.dxf", "b/small-floor.dxf", "--out", "o"],
        &["would both write", "nothing was written"],
    );
    refused(
        folder.path(),
        &["mark", "small-floor.dxf", "small-floor.dxf"],
        &["would both write"],
    );
    refused(
        folder.path(),
        &["mark", "small-floor.dxf", "small-floor-marked.dxf"],
        &["over this input"],
    );
    assert_eq!(
        names(folder.path()),
        ["b", "small-floor-marked.dxf", "small-floor.dxf"]
    );
    assert!(before == fs::read(folder.path().join("small-floor-marked.dxf")).expect("read"));
}

#[test]
fn a_place_that_cannot_be_written_is_refused_before_the_work() {
    let folder = small();
    fs::write(folder.path().join("file"), "x").expect("written");
    refused(
        folder.path(),
        &["mark", "small-floor.dxf", "--out", "file"],
        &[
            "file: cannot be written: a file stands where a folder is needed",
            "--out",
        ],
    );
    refused(
        folder.path(),
        &["mark", "small-floor.dxf", "--out", "file/below"],
        &["cannot be written"],
    );
    // One target is a folder: none of them is written.
    fs::create_dir_all(folder.path().join("o/small-floor-findings.csv")).expect("made");
    refused(
        folder.path(),
        &["mark", "small-floor.dxf", "--out", "o"],
        &[
            "small-floor-findings.csv: cannot be written: a folder of that name is there",
            "--out",
        ],
    );
    assert_eq!(
        names(&folder.path().join("o")),
        ["small-floor-findings.csv"]
    );
}

#[test]
fn one_bad_drawing_does_not_stop_the_others() {
    let folder = small();
    fs::write(folder.path().join("bad.dxf"), "").expect("written");
    let output = tautplan(
        folder.path(),
        &["mark", "bad.dxf", "small-floor.dxf", "--out", "o"],
    );
    assert_eq!(output.status.code(), Some(2));
    assert_eq!(names(&folder.path().join("o")), FILES);
    assert!(err(&output).contains("bad.dxf"));
}

#[test]
fn a_survey_is_a_job_file_as_it_stands() {
    for name in ["small-floor.dxf", "harbour-level-2.dxf", "faulty-floor.dxf"] {
        let folder = TempDir::new().expect("a folder");
        let drawing = demo(name);
        let drawing = drawing.to_string_lossy();
        let printed = tautplan(folder.path(), &["survey", &drawing]);
        assert_eq!(printed.status.code(), Some(0), "{}", err(&printed));
        let text = out(&printed);
        let resolved =
            tautplan::job::read("survey", &text).unwrap_or_else(|problems| panic!("{problems}"));
        assert!(
            resolved.given.is_empty(),
            "{name} keeps to the conventions: {:?}",
            resolved.given
        );
        let written = tautplan(
            folder.path(),
            &["survey", &drawing, "--out", "tautplan.toml"],
        );
        assert_eq!(written.status.code(), Some(0), "{}", err(&written));
        assert_eq!(
            fs::read_to_string(folder.path().join("tautplan.toml")).expect("written"),
            text
        );
        refused(
            folder.path(),
            &["survey", &drawing, "--out", "tautplan.toml"],
            &["is left as it is"],
        );
    }
}

/// The small floor under another office's names: the survey's own file makes it readable.
#[test]
fn a_survey_of_another_offices_drawing_makes_it_readable() {
    let folder = TempDir::new().expect("a folder");
    let text = fs::read_to_string(demo("small-floor.dxf")).expect("read");
    let text = text
        .replace("TENDON-BANDED", "P-CABLE-BANDED")
        .replace("TENDON-DISTRIBUTED", "P-CABLE-SLAB")
        .replace("TENDON-HEIGHT", "P-LEVELS")
        .replace("TENDON-MARK", "P-NUMBERS")
        .replace("TENDON-END", "P-ANCHORS")
        .replace("SLAB-ZONE", "C-THICK")
        .replace("LIVE-END", "ANCHOR-LIVE")
        .replace("DEAD-END", "ANCHOR-DEAD");
    fs::write(folder.path().join("plan.dxf"), text).expect("written");
    refused(folder.path(), &["mark", "plan.dxf"], &["no layer fits"]);
    let survey = tautplan(
        folder.path(),
        &["survey", "plan.dxf", "--out", "tautplan.toml"],
    );
    assert_eq!(survey.status.code(), Some(0), "{}", err(&survey));
    let marked = tautplan(folder.path(), &["mark", "plan.dxf"]);
    assert!(
        matches!(marked.status.code(), Some(0 | 1)),
        "{}",
        err(&marked)
    );

    let plain = small();
    tautplan(plain.path(), &["mark", "small-floor.dxf"]);
    let read = |path: PathBuf| -> serde_json::Value {
        serde_json::from_slice(&fs::read(path).expect("written")).expect("JSON")
    };
    let one = read(folder.path().join("plan-result.json"));
    let other = read(plain.path().join("small-floor-result.json"));
    let forces = |result: &serde_json::Value| -> Vec<(String, serde_json::Value)> {
        let tendons = result["tendons"].as_array().expect("a list");
        tendons
            .iter()
            .map(|t| (t["mark"].to_string(), t["mean_service_kn"].clone()))
            .collect()
    };
    assert_eq!(forces(&one).len(), 14);
    assert_eq!(forces(&one), forces(&other));
}

#[test]
fn a_tendon_is_found_by_its_mark_in_any_letter_case() {
    let folder = small();
    let output = tautplan(folder.path(), &["tendon", "small-floor.dxf", "b03"]);
    assert_eq!(output.status.code(), Some(0), "{}", err(&output));
    assert!(out(&output).contains("B03"));
    assert_eq!(names(folder.path()), ["small-floor.dxf"]);
    refused(
        folder.path(),
        &["tendon", "small-floor.dxf", "B033"],
        &["no tendon is marked B033", "B03"],
    );
}

#[test]
fn rules_are_listed_and_explained_one_by_one() {
    let folder = TempDir::new().expect("a folder");
    let all = out(&tautplan(folder.path(), &["rules"]));
    let names: Vec<&str> = all.lines().filter(|line| !line.starts_with(' ')).collect();
    assert!(names.len() >= 20, "{}", names.len());
    assert!(names.is_sorted());
    let mut once = names.clone();
    once.dedup();
    assert_eq!(once.len(), names.len());
    for name in names {
        let one = tautplan(folder.path(), &["rules", name]);
        assert_eq!(one.status.code(), Some(0));
        assert!(out(&one).starts_with(name));
    }
    refused(
        folder.path(),
        &["rules", "hoging-radius"],
        &["did you mean hogging-radius?"],
    );
}

#[test]
fn bad_usage_is_two_and_help_is_nought() {
    let folder = TempDir::new().expect("a folder");
    for arguments in [
        &[][..],
        &["mark"],
        &["paint"],
        &["mark", "a.dxf", "--jobs", "x"],
        &["tendon", "a.dxf"],
    ] {
        let output = tautplan(folder.path(), arguments);
        assert_eq!(output.status.code(), Some(2), "{arguments:?}");
        assert!(output.stdout.is_empty() && !output.stderr.is_empty());
    }
    for arguments in [
        &["--help"][..],
        &["help"],
        &["mark", "--help"],
        &["survey", "--help"],
        &["tendon", "--help"],
        &["--version"],
    ] {
        let output = tautplan(folder.path(), arguments);
        assert_eq!(output.status.code(), Some(0), "{arguments:?}");
        assert!(!output.stdout.is_empty() && output.stderr.is_empty());
    }
    let help = out(&tautplan(folder.path(), &["--help"]));
    for word in [
        "mark",
        "survey",
        "tendon",
        "Exit status",
        "tautplan.toml",
        "engineer responsible",
    ] {
        assert!(help.contains(word), "{word}");
    }
}

#[test]
fn a_reader_who_leaves_is_no_error() {
    use std::process::Stdio;
    let folder = small();
    let mut child = Command::new(env!("CARGO_BIN_EXE_tautplan"))
        .args(["survey", "small-floor.dxf"])
        .current_dir(folder.path())
        .stdout(Stdio::piped())
        .stderr(Stdio::piped())
        .spawn()
        .expect("the program starts");
    drop(child.stdout.take());
    let output = child.wait_with_output().expect("ends");
    assert_eq!(output.status.code(), Some(0), "{}", err(&output));
    assert!(output.stderr.is_empty(), "{}", err(&output));
}
