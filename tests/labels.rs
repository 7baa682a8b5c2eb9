//! What label texts say, row by row: each text as a drawing holds it, the job it is read by, and its reading.

use tautplan::floor::{Word, height_of_line, mark_of_line, thickness_of_line};
use tautplan::job::{self, FromFace, Job};

fn job_of(text: &str) -> Job {
    job::read("tautplan.toml", text)
        .unwrap_or_else(|problems| panic!("{problems}"))
        .job
}

/// A height in words: `H 165`, `L 30`, `165`, `middle`, millimetres to a hundredth; `-` where it is none.
fn height(text: &str, job: &Job) -> String {
    let Some((height, _)) = height_of_line(text, &job.conventions) else {
        return "-".to_owned();
    };
    if height.middle {
        return "middle".to_owned();
    }
    let word = match height.word {
        Some(Word::High) => "H ",
        Some(Word::Low) => "L ",
        None => "",
    };
    let from = match height.from {
        FromFace::Soffit => "",
        FromFace::Top => " from top",
        FromFace::NearerFace => " from nearer face",
    };
    format!("{word}{}{from}", (height.value_m * 1e5).round() / 100.0)
}

/// A mark in words: `D012: 4 x 5 of 12.7, 1441.2 kN`, its parts as far as they are there; `-` where it is none.
fn mark(text: &str, job: &Job) -> String {
    let Some((said, _)) = mark_of_line(text, &job.conventions.mark_patterns) else {
        return "-".to_owned();
    };
    let mut parts = Vec::new();
    parts.extend(said.mark.map(|mark| format!("{mark}:")));
    parts.extend(said.tendons.map(|count| format!("{count} x")));
    parts.extend(said.strands.map(|count| count.to_string()));
    parts.extend(said.strand.map(|size| {
        let known = job.tendon.strand_named(&size);
        format!("of {}", known.map_or("?", |size| &size.name))
    }));
    parts.extend(said.required_kn.map(|kn| format!("{kn:.1} kN")));
    parts.extend(
        said.required_kn_per_m
            .map(|per_m| format!("{per_m:.1} kN/m")),
    );
    parts.join(" ")
}

fn check(job: &str, read: fn(&str, &Job) -> String, rows: &[(&str, &str)]) -> usize {
    let job = job_of(job);
    for (text, reading) in rows {
        assert_eq!(read(text, &job), *reading, "{text}");
    }
    rows.len()
}

/// Sources: the families are common practice; each row's arithmetic is by hand (1 in = 25.4 mm,
/// 1 kip = 4.4482 kN, 1 kip/ft = 14.594 kN/m).
#[test]
fn strands_and_required_forces() {
    let mut rows = check(
        "",
        mark,
        &[
            ("5-12.7", "5 of 12.7"),
            ("5S12.7", "5 of 12.7"),
            ("5/12.7", "5 of 12.7"),
            ("5 - 12,7", "5 of 12.7"),
            ("5-Ø12.7", "5 of 12.7"),
            ("5Ø15.2", "5 of 15.2"),
            ("5 No. 12.7", "5 of 12.7"),
            ("5-12.7mm", "5 of 12.7"),
            ("5-12.7 STRANDS", "5 of 12.7"),
            ("4x15.2", "4 of 15.2"),
            ("4 × 15,2", "4 of 15.2"),
            ("4x0.6\"", "4 of 15.2"),
            ("5-0.5\"", "5 of 12.7"),
            ("5-0.5\"Ø", "5 of 12.7"),
            ("5-.5\"", "5 of 12.7"),
            ("5-.5", "5 of 12.7"),
            ("5-1/2\"", "5 of 12.7"),
            ("5-1/2\" DIA. STRANDS", "5 of 12.7"),
            ("4-½\"", "4 of 12.7"),
            ("4 x 1/2\"", "4 of 12.7"),
            ("B01 (5) 1/2\"Ø", "B01: 5 of 12.7"),
            ("(18) 1/2\"Ø STRANDS", "18 of 12.7"),
            ("B02 (4) 12.7", "B02: 4 of 12.7"),
            ("4x1/2\"", "4 of 12.7"),
            ("10 No. 1/2\"", "10 of 12.7"),
            ("D3: 4 x ½\"", "D3: 4 of 12.7"),
            ("2 x 4 - 1/2\"", "2 x 4 of 12.7"),
            ("2x5/12.7", "2 x 5 of 12.7"),
            // No number of tendons, one beyond counting, and a mark that meets half an inch.
            ("0x5-12.7", "-"),
            ("99999999999x5-12.7", "-"),
            ("D1/2-12.7", "-"),
            ("4-0.6", "4 of 15.2"),
            ("4-0.62\"", "4 of 15.7"),
            ("3-12", "3 of ?"),
            ("3x5S12.7", "3 x 5 of 12.7"),
            ("3 x 5 - 0.5\"", "3 x 5 of 12.7"),
            ("3*4-15.7", "3 x 4 of 15.7"),
            ("5 STRANDS", "5"),
            ("5-STRAND", "5"),
            ("2x4 strands", "2 x 4"),
            ("D012 5-12.7", "D012: 5 of 12.7"),
            ("d12a: 5s12.7", "d12a: 5 of 12.7"),
            ("B03 - 4x5-12.7", "B03: 4 x 5 of 12.7"),
            ("PT-7, 4x15.2", "PT-7: 4 of 15.2"),
            ("B-03", "B-03:"),
            ("D012 (5-12.7)", "D012: 5 of 12.7"),
            ("D012/5-12.7", "D012: 5 of 12.7"),
            ("B7 4 TENDONS OF 5-12.7", "B7: 4 x 5 of 12.7"),
            ("2 No. 5-12.7", "2 x 5 of 12.7"),
            ("5T15.2", "5 of 15.2"),
            ("D1 5C12.7", "D1: 5 of 12.7"),
            ("324 KIPS", "1441.2 kN"),
            ("324K", "1441.2 kN"),
            ("P=324 k", "1441.2 kN"),
            ("Pe = 1,440 kN", "1440.0 kN"),
            ("1440kN", "1440.0 kN"),
            ("B7 324 KIPS (EFF.)", "B7: 1441.2 kN"),
            ("40.5 K/FT", "591.1 kN/m"),
            ("40.5 KLF", "591.1 kN/m"),
            ("40.5 kips/ft.", "591.1 kN/m"),
            ("40.5 k/'", "591.1 kN/m"),
            ("590 kN/m", "590.0 kN/m"),
            // May mean top or thickness: not by the defaults.
            ("12T", "-"),
            ("2T @ 28\" O.C.", "-"),
            ("T350", "T350:"),
            ("4x15", "-"),
            ("0-12.7", "0 of 12.7"),
            ("TYP. U.N.O.", "-"),
            ("SEE DETAIL 4/S5.01", "-"),
        ],
    );
    rows += check(
        "[labels]\nmark_patterns = [\
         { name = 'singles', expression = '(?i)^(?<tendons>\\d+)T(?:\\s*@.*)?$', strands = 1, strand = '0.5\"' },\
         { expression = '^(?<force>\\d+)$', unit = 'kN' }, '^(?<mark>T\\d+)$']",
        mark,
        &[
            ("12T", "12 x 1 of 12.7"),
            ("2T @ 28\" O.C.", "2 x 1 of 12.7"),
            ("350", "350.0 kN"),
            ("T7", "T7:"),
            ("5-12.7", "-"),
        ],
    );
    assert_eq!(rows, 74);
}

#[test]
fn heights_in_millimetres_centimetres_and_metres() {
    let mut rows = check(
        "",
        height,
        &[
            ("165", "165"),
            ("H165", "H 165"),
            ("H 165", "H 165"),
            ("H=165", "H 165"),
            ("H: 165", "H 165"),
            ("z=165", "165"),
            ("V = 165", "165"),
            ("CG: 165", "165"),
            ("e=165", "-"),
            ("z165", "-"),
            ("h=165", "165"),
            ("h : 30", "30"),
            ("h 30", "H 30"),
            ("HP165", "H 165"),
            ("H.P. 165", "H 165"),
            ("HIGH 165", "H 165"),
            ("165H", "H 165"),
            ("165 (H)", "H 165"),
            ("165 hp", "H 165"),
            ("L30", "L 30"),
            ("LOW 30", "L 30"),
            ("30 L.P.", "L 30"),
            ("(30)", "30"),
            ("H 162.5", "H 162.5"),
            ("H 162,5", "H 162.5"),
            ("165 mm", "165"),
            ("165mm H", "H 165"),
            ("H16.5cm", "H 165"),
            ("H0.165 m", "H 165"),
            ("В=165", "-"),
            ("-20", "-20"),
            ("T/2", "middle"),
            ("h/2", "middle"),
            ("mid", "middle"),
            ("MID.", "middle"),
            ("MID 120", "120"),
            ("1 1/4\"", "-"),
            ("1,250", "-"),
            ("D12", "-"),
            ("X165", "-"),
            ("H", "-"),
            ("", "-"),
        ],
    );
    rows += check(
        "[height]\nunit = \"cm\"",
        height,
        &[
            ("16.5", "165"),
            ("H16,5", "H 165"),
            ("3 L", "L 30"),
            ("165mm", "165"),
        ],
    );
    rows += check(
        "[height]\nunit = \"m\"",
        height,
        &[
            ("0.165", "165"),
            (".165", "165"),
            ("H 0,165", "H 165"),
            ("L .03", "L 30"),
            ("+0.165", "165"),
            ("0.165 m", "165"),
        ],
    );
    assert_eq!(rows, 52);
}

#[test]
fn heights_in_inches_and_by_patterns_of_their_own() {
    let mut rows = check(
        "[height]\nunit = \"in\"",
        height,
        &[
            ("1 1/4\"", "31.75"),
            ("1-1/4\"", "31.75"),
            ("1-1/4", "31.75"),
            ("1 - 1/4\"", "31.75"),
            ("7/8\"", "22.23"),
            ("7/8", "22.23"),
            ("1¼\"", "31.75"),
            ("1 ¼", "31.75"),
            ("½\"", "12.7"),
            ("5.25", "133.35"),
            (".75\"", "19.05"),
            ("6", "152.4"),
            ("6''", "152.4"),
            ("H 6 1/2\"", "H 165.1"),
            ("HP=6-1/2", "H 165.1"),
            ("1\" L", "L 25.4"),
            ("1 1/4 LOW", "L 31.75"),
            ("H 1'-2 1/2\"", "H 368.3"),
            ("1'-2\"", "355.6"),
            ("-1/2\"", "-12.7"),
            ("6 in.", "152.4"),
            ("1 1/0", "-"),
            ("T/2", "middle"),
        ],
    );
    rows += check(
        "[height]\nhigh_words = [\"T\", \"TOP\"]\nlow_words = [\"B\", \"BOT\"]\nmiddle_words = [\"CL\"]\npatterns = [\
         { name = 'cover to top', expression = '^(?<word>T)(?<value>\\d+)$', from = 'top', datum = 'duct-underside' },\
         { name = 'chair', expression = '^C(?<value>\\d+)$', datum = 'chair', word = 'low' },\
         { expression = '^(?<value>[\\d /]+)\"(?<word>[A-Z]+)?$', unit = 'in', from = 'nearer-face' },\
         '^(?<word>[A-Z]+)(?<value>\\d+)$']",
        height,
        &[
            ("T35", "H 35 from top"),
            ("C30", "L 30"),
            ("1 1/4\"TOP", "H 31.75 from nearer face"),
            ("7/8\"", "22.23 from nearer face"),
            ("BOT40", "L 40"),
            ("H165", "-"),
            ("165", "-"),
            ("cl", "middle"),
        ],
    );
    assert_eq!(rows, 31);
}

fn thickness(text: &str, job: &Job) -> String {
    let found = thickness_of_line(text, &job.conventions);
    found.map_or("-".to_owned(), |(value_m, _)| {
        format!("{:.1}", value_m * 1000.0)
    })
}

#[test]
fn thicknesses() {
    let mut rows = check(
        "",
        thickness,
        &[
            ("T350", "350.0"),
            ("t = 350", "350.0"),
            ("350 THK", "350.0"),
            ("350mm THK. SLAB", "350.0"),
            ("SLAB THICKNESS: 350", "350.0"),
            ("T35cm", "350.0"),
            ("T8\"", "-"),
            ("TYP", "-"),
            ("350", "-"),
            ("d=25cm", "250.0"),
            ("h = 250", "250.0"),
            ("e=250", "250.0"),
            ("ép. 260", "260.0"),
            ("tl. 250", "250.0"),
            ("SLAB 250 THICK U.N.O.", "250.0"),
            ("250 mm THK. PT SLAB", "250.0"),
            ("250 P.T. SLAB", "250.0"),
            ("EP250X", "-"),
            ("SLAB", "-"),
            ("D 250", "-"),
        ],
    );
    rows += check(
        "[slab]\ntext_unit = \"in\"",
        thickness,
        &[
            ("T8", "203.2"),
            ("T=8 1/2\"", "215.9"),
            ("8\" THK", "203.2"),
            ("8\" P.T. SLAB", "203.2"),
            ("10\" SLAB", "254.0"),
        ],
    );
    assert_eq!(rows, 25);
}

/// What a note says of all marks, a pattern may say of them.
#[test]
fn a_pattern_may_give_strands_that_the_text_does_not() {
    let job = job_of(
        "[labels]\nmark_patterns = [{ expression = '^(?<mark>[BD]\\d+)$', strands = 5, strand = \"12.7\" }]",
    );
    assert_eq!(mark("B01", &job), "B01: 5 of 12.7");
    let job = job_of(
        "[labels]\nmark_patterns = [{ expression = '^(?<mark>[BD]\\d+)( (?<tendons>\\d+)T)?$', strands = 1 }]",
    );
    assert_eq!(mark("B01", &job), "B01:");
    assert_eq!(mark("B01 4T", &job), "B01: 4 x 1");
}

/// The README's job file is one.
#[test]
fn the_patterns_of_the_readme_are_read() {
    let readme = include_str!("../README.md");
    let block = readme
        .split("```toml\n")
        .nth(1)
        .and_then(|rest| rest.split("```").next());
    let job = job_of(block.expect("the README shows patterns"));
    assert_eq!(mark("12T", &job), "12 x 1 of 12.7");
    assert_eq!(mark("D12 5-12.7", &job), "D12: 5 of 12.7");
    assert_eq!(height("C30", &job), "L 30");
    assert_eq!(height("1 1/4\"", &job), "31.75 from top");
}
