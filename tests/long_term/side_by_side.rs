//! Long-term loss by several methods, from outside: one run, side by side.

use std::fs;
use std::path::{Path, PathBuf};
use std::process::{Command, Output};

use serde_json::Value;
use tempfile::TempDir;

const ALL: [&str; 5] = ["en1992", "aci423", "bs8110", "as3600", "direct"];

fn demo(name: &str) -> PathBuf {
    let root = Path::new(env!("CARGO_MANIFEST_DIR"));
    root.join("demo-drawings").join(name)
}

fn tautplan(arguments: &[&str]) -> Output {
    Command::new(env!("CARGO_BIN_EXE_tautplan"))
        .args(arguments)
        .env("NO_COLOR", "1")
        .output()
        .expect("the program starts")
}

fn path(path: &Path) -> &str {
    path.to_str().expect("a path in Unicode")
}

/// A demo drawing marked by a job of these lines below `[long_term]`.
pub(crate) struct Marked {
    status: Option<i32>,
    pub(crate) summary: String,
    messages: String,
    folder: TempDir,
    stem: &'static str,
}

impl Marked {
    pub(crate) fn by(stem: &'static str, long_term: &str) -> Self {
        Self::by_job(stem, &format!("[long_term]\n{long_term}"))
    }

    pub(crate) fn by_job(stem: &'static str, job: &str) -> Self {
        let folder = TempDir::new().expect("a folder");
        let file = folder.path().join("job.toml");
        fs::write(&file, job).expect("written");
        let drawing = demo(&format!("{stem}.dxf"));
        let output = tautplan(&[
            "mark",
            path(&drawing),
            "--job",
            path(&file),
            "--out",
            path(folder.path()),
        ]);
        Self {
            status: output.status.code(),
            summary: String::from_utf8_lossy(&output.stdout).into_owned(),
            messages: String::from_utf8_lossy(&output.stderr).into_owned(),
            folder,
            stem,
        }
    }

    pub(crate) fn read(&self, ending: &str) -> String {
        let file = self.folder.path().join(format!("{}-{ending}", self.stem));
        fs::read_to_string(file).unwrap_or_else(|_| panic!("no {ending}: {}", self.messages))
    }

    /// A tendon's calculation sheet by the same job.
    pub(crate) fn sheet(&self, mark: &str) -> String {
        let drawing = demo(&format!("{}.dxf", self.stem));
        let job = self.folder.path().join("job.toml");
        let output = tautplan(&["tendon", path(&drawing), mark, "--job", path(&job)]);
        String::from_utf8_lossy(&output.stdout).into_owned()
    }

    pub(crate) fn result(&self) -> Value {
        serde_json::from_str(&self.read("result.json")).expect("the result is JSON")
    }

    pub(crate) fn tendons(&self) -> Vec<Value> {
        self.result()["tendons"].as_array().expect("a list").clone()
    }
}

fn number(value: &Value) -> f64 {
    value
        .as_f64()
        .unwrap_or_else(|| panic!("{value} is no number"))
}

pub(crate) const EVERY: &str = "methods = [\"en1992\", \"aci423\", \"bs8110\", \"as3600\", \"direct\"]\n\
                     basic_relaxation = 0.02\nrelaxation_stress_factor = 1.1\n";

#[test]
fn one_run_gives_every_method_side_by_side() {
    let marked = Marked::by("small-floor", EVERY);
    let tendons = marked.tendons();
    assert!(!tendons.is_empty());
    for tendon in &tendons {
        for point in tendon["points"].as_array().expect("points") {
            let by_method = &point["service_by_method_kn"];
            assert_eq!(by_method.as_object().map(serde_json::Map::len), Some(5));
            assert_eq!(point["service_kn"], by_method["en1992"]);
            assert!(ALL.iter().all(|method| number(&by_method[method]) > 0.0));
        }
        let losses = &tendon["losses_by_method"];
        assert_eq!(
            tendon["mean_service_kn"],
            losses["en1992"]["mean_service_kn"]
        );
        let means = ALL.map(|method| number(&losses[method]["mean_service_kn"]));
        let (least, most) = means.iter().fold((f64::MAX, f64::MIN), |held, &kn| {
            (held.0.min(kn), held.1.max(kn))
        });
        let spread = (most - least) / number(&tendon["mean_service_kn"]);
        assert!((number(&tendon["method_spread_ratio"]) - spread).abs() < 1e-12);
    }
    assert!(marked.summary.contains("Long-term loss by each method"));
    assert!(marked.summary.contains("en1992 is drawn and checked"));
    assert!(
        marked
            .summary
            .contains("Between the methods the mean service force")
    );
    for (table, column) in [
        ("points.csv", "service_as3600_kn"),
        ("tendons.csv", "mean_service_bs8110_kn"),
        ("tendons.csv", "method_spread_percent"),
    ] {
        assert!(
            marked
                .read(table)
                .lines()
                .next()
                .is_some_and(|head| head.contains(column))
        );
    }
}

#[test]
fn an_unbonded_tendon_loses_the_same_everywhere() {
    let marked = Marked::by("small-floor", &format!("{EVERY}bonded = false\n"));
    for tendon in marked.tendons() {
        let area_mm2 = number(&tendon["area_mm2"]);
        for method in &ALL[..4] {
            let losses = &tendon["losses_by_method"][method];
            let causes = [
                "shortening_mpa",
                "shrinkage_mpa",
                "creep_mpa",
                "relaxation_mpa",
            ];
            let lost_mpa: f64 = causes.iter().map(|cause| number(&losses[cause])).sum();
            for point in tendon["points"].as_array().expect("points") {
                let left_kn = number(&point["service_by_method_kn"][method]);
                let expected_kn = number(&point["lockoff_kn"]) - lost_mpa * area_mm2 / 1000.0;
                assert!((left_kn - expected_kn).abs() < 1e-9 * expected_kn);
            }
        }
    }
}

#[test]
fn a_bonded_tendon_loses_by_its_own_level() {
    // Twice the load that is balanced: compression and loss fall with eccentricity; half of it: they grow.
    let creep = |share: &str| {
        let job = format!("{EVERY}balanced_share = {share}\nload_share_at_stressing = 1\n");
        let marked = Marked::by("small-floor", &job);
        let tendons = marked.tendons();
        ["en1992", "aci423", "bs8110", "as3600"].map(|method| {
            let of = |tendon: &Value| number(&tendon["losses_by_method"][method]["creep_mpa"]);
            tendons.iter().map(of).sum::<f64>()
        })
    };
    let (loaded, balanced, light) = (creep("0.5"), creep("1"), creep("2"));
    for method in 0..4 {
        assert!(loaded[method] < balanced[method] && balanced[method] < light[method]);
    }
}

#[test]
fn force_falls_with_time_towards_the_final() {
    let marked = Marked::by("small-floor", EVERY);
    let tendon = &marked.tendons()[0];
    for method in ["en1992", "as3600"] {
        let losses = &tendon["losses_by_method"][method];
        let in_time = losses["mean_force_in_time"].as_array().expect("a list");
        let mut forces: Vec<f64> = in_time.iter().map(|at| number(&at["force_kn"])).collect();
        forces.push(number(&losses["mean_force_final_kn"]));
        assert_eq!(forces.len(), 6);
        assert!(
            forces.windows(2).all(|pair| pair[0] > pair[1]),
            "{forces:?}"
        );
    }
    for method in ["aci423", "bs8110", "direct"] {
        let at = &tendon["losses_by_method"][method]["mean_force_in_time"][0];
        assert_eq!(at["days"], 1.0);
        assert!(at["force_kn"].is_null());
    }
    // Asked for at 90 days after stressing at 4: the service force is that of the table.
    let early = Marked::by("small-floor", &format!("{EVERY}asked_days = 94\n"));
    let early = &early.tendons()[0];
    let table = &tendon["losses_by_method"]["en1992"]["mean_force_in_time"][3];
    assert_eq!(table["days"], 90.0);
    assert_eq!(early["mean_service_kn"], table["force_kn"]);
    let reason = early["losses_by_method"]["aci423"]["no_loss"].as_str();
    assert!(reason.is_some_and(|reason| reason.contains("final loss only")));
    // What it knows it still says.
    for method in ALL {
        let of = |tendon: &Value| tendon["losses_by_method"][method]["mean_force_final_kn"].clone();
        assert_eq!(of(early), of(tendon), "{method}");
        assert!(of(early).is_number());
    }
}

#[test]
fn as3600_asks_for_its_relaxation() {
    for lines in [
        "method = \"as3600\"\n",
        "methods = [\"direct\", \"as3600\"]\nbasic_relaxation = 0.02\n",
    ] {
        let marked = Marked::by("small-floor", lines);
        assert_eq!(marked.status, Some(2));
        assert!(
            marked.messages.contains("relaxation_stress_factor"),
            "{}",
            marked.messages
        );
        assert!(
            marked.messages.contains("job.toml:2"),
            "{}",
            marked.messages
        );
    }
}

#[test]
fn what_a_method_does_not_cover_is_said_and_the_others_go_on() {
    let beside = Marked::by(
        "small-floor",
        "methods = [\"direct\", \"en1992\"]\nhumidity_percent = 30\n",
    );
    let result = beside.result();
    let found = result["findings"].as_array().expect("a list");
    let said: Vec<&Value> = found
        .iter()
        .filter(|finding| finding["rule"] == "method-without-loss")
        .collect();
    assert_eq!(said.len(), 1, "one reason, one finding");
    let text = said[0]["text"].as_str().unwrap_or_default();
    assert!(
        text.contains("RH = 30 %") && text.contains("EN 1992-1-1 3.1.4(2)"),
        "{text}"
    );
    for tendon in result["tendons"].as_array().expect("a list") {
        let point = &tendon["points"][0];
        assert!(point["service_by_method_kn"]["en1992"].is_null());
        assert!(number(&point["service_kn"]) > 0.0);
    }

    let drawn = Marked::by(
        "small-floor",
        "method = \"en1992\"\nhumidity_percent = 30\n",
    );
    assert_eq!(drawn.status, Some(1));
    for tendon in drawn.tendons() {
        assert!(tendon["points"][0]["service_kn"].is_null());
        assert!(tendon["losses"]["creep_mpa"].is_null());
        // Jacking and lock-off ask nothing of the method.
        assert!(number(&tendon["points"][0]["lockoff_kn"]) > 0.0);
    }
}

#[test]
fn the_first_stressed_loses_most_by_shortening() {
    let shortening = |order: &str| {
        let job = format!("[stressing]\n{order}\n[long_term]\nmethod = \"direct\"\n");
        let marked = Marked::by_job("small-floor", &job);
        let of = |tendon: &Value| {
            let mark = tendon["mark"].as_str().unwrap_or_default().to_owned();
            (
                mark,
                number(&tendon["losses"]["shortening_mpa"]),
                number(&tendon["concrete_stress_mpa"]),
            )
        };
        marked.tendons().iter().map(of).collect::<Vec<_>>()
    };
    let ordered = shortening("order = [\"D*\", \"B*\"]");
    let free = shortening("");
    assert_eq!(ordered.len(), free.len());
    let first = &ordered
        .iter()
        .find(|tendon| tendon.0.starts_with('D'))
        .expect("a tendon")
        .0;
    let early = shortening(&format!("order = [\"{first}\"]"));
    let of = |list: &[(String, f64, f64)]| {
        let tendon = list
            .iter()
            .find(|tendon| &tendon.0 == first)
            .expect("the same floor");
        tendon.1 / tendon.2
    };
    // Alone at the front of its run all others shorten it; in one entry with all of its run half of them do.
    assert!(of(&early) > of(&free) && of(&free) > of(&ordered));
}

/// The block of README that the demo's run must give.
#[test]
fn the_table_of_the_readme_is_that_of_the_demo() {
    let folder = TempDir::new().expect("a folder");
    let output = tautplan(&[
        "mark",
        path(&demo("harbour-level-2.dxf")),
        "--job",
        path(&demo("harbour-level-2-methods.toml")),
        "--out",
        path(folder.path()),
    ]);
    let summary = String::from_utf8_lossy(&output.stdout).into_owned();
    let block = summary
        .split("\n\n")
        .find(|part| part.starts_with("Long-term loss by each method"))
        .expect("the methods are shown side by side");
    let readme = fs::read_to_string(Path::new(env!("CARGO_MANIFEST_DIR")).join("README.md"))
        .expect("there is a README");
    assert!(
        readme.contains(block.trim_end()),
        "README.md should hold:\n{block}"
    );
}

#[test]
fn the_sheet_shows_every_equation_with_its_clause_and_what_is_from_memory() {
    let sheet = tautplan(&[
        "tendon",
        path(&demo("harbour-level-2.dxf")),
        "B01",
        "--job",
        path(&demo("harbour-level-2-methods.toml")),
    ]);
    let sheet = String::from_utf8_lossy(&sheet.stdout).into_owned();
    for clause in [
        "[EN 1992-1-1 (B.3)]",
        "[EN 1992-1-1 (5.46)]",
        "[ACI-ASCE 423 method, RE]",
        "[ACI-ASCE 423 method, table 1, from memory]",
        "[BS 8110-1 4.8.5, from memory]",
        "[AS 3600 3.1.8.3]",
        "[AS 3600 3.4.3.4, from memory]",
        "quoted from memory, to be checked against the standard:",
        "Service force by each method",
        "Mean force along the tendon against time",
    ] {
        assert!(sheet.contains(clause), "{clause} is not in:\n{sheet}");
    }
    assert!(!sheet.contains("NaN"), "{sheet}");
}
