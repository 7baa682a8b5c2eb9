//! Small drawings, each named after its one fault: what must be read of every one of them, in one table.

use std::collections::BTreeSet;
use std::fs;
use std::path::{Path, PathBuf};
use std::process::Command;
use std::time::{Duration, Instant};

use tautplan::drawing::{
    Align, Drawing, Drawn, Ink, Mark, Sheet, SheetLayer, Wanted, insert, open, read,
};
use tautplan::finding::Finding;
use tautplan::geometry::Coord;

/// What must come of a drawing.
#[derive(Debug, Clone, Copy)]
enum Truth {
    /// So many lines, nothing to say.
    Lines(usize),
    /// One text of these characters, nothing to say.
    Text(&'static str),
    /// One text that ends so, nothing to say.
    Tail(&'static str),
    /// One text of these characters, and it is said that they were guessed.
    Guessed(&'static str),
    /// So many lines, and one entity left out, with these words of it.
    LeftOut(usize, &'static str),
    /// Read on behind damage: so many lines, with these words of the damage.
    Damaged(usize, &'static str),
    /// The same with a line that is read as it stands, and with these words of it.
    Short(usize, &'static str),
    /// Refused with these words.
    Refused(&'static str),
}

use Truth::{Damaged, Guessed, LeftOut, Lines, Refused, Short, Tail, Text};

const NO_NUMBER: &str = "a finite number was expected";

#[rustfmt::skip]
const TRUTH: [(&str, Truth); 146] = [
    ("acadver_after", Text("Ø15")),
    ("acadver_missing_utf8", Text("Ø15")),
    ("acadver_unknown", Lines(1)),
    ("acds", Lines(1)),
    ("attdef_then_mtext", Text("free text")),
    ("bad_310", Lines(1)),
    ("badint_in_unknown_ent", Lines(1)),
    ("blank_after_lwp", Short(2, "announces 3 vertices, and there are 2")),
    ("blank_code_line", Damaged(1, "line 35, found an empty line")),
    ("blank_code_line_in_ent", Damaged(2, "line 33, found an empty line")),
    ("blank_in_lwp", Damaged(2, "line 23, found an empty line")),
    ("block_bad_entity", Lines(1)),
    ("block_bad_text", Lines(1)),
    ("bom_utf16", Refused("UTF-16")),
    ("bom_utf8", Lines(1)),
    ("classes_bad", Lines(1)),
    ("clayer_bad", Lines(2)),
    ("comment999", Lines(1)),
    ("cr_only", Refused("carriage return")),
    ("crlf", Lines(1)),
    ("datatable_100k", Lines(1)),
    ("datatable_huge", Lines(1)),
    ("datatable_neg", Lines(1)),
    ("dcomma", LeftOut(0, NO_NUMBER)),
    ("dexp", LeftOut(0, NO_NUMBER)),
    ("dim_2l", Lines(1)),
    ("dim_r12", Lines(1)),
    ("dwg", Refused("DWG (AC1032)")),
    ("e400", LeftOut(0, NO_NUMBER)),
    ("empty", Refused("empty")),
    ("empty_float", LeftOut(0, NO_NUMBER)),
    ("ent_bad_last_pair", LeftOut(1, "line 49, group 31 holds \"bad\"")),
    ("ent_bad_mid", LeftOut(1, "group 10 holds \"bad\"")),
    ("eof_only", Refused("no section at all")),
    ("eof_trailing_space", Lines(1)),
    ("ext_102_nobrace", Lines(1)),
    ("ext_102_unclosed", Lines(2)),
    ("ext_nest_1000", Lines(1)),
    ("garbage", Refused("hello world")),
    ("handle_bad", Lines(1)),
    ("handle_long", Lines(1)),
    ("handle_lower", Lines(1)),
    ("hdr_insunits_bad", Lines(1)),
    ("hdr_unknown_var", Lines(1)),
    ("hdr_wrong_code", Lines(1)),
    ("inf", LeftOut(0, NO_NUMBER)),
    ("infword", LeftOut(0, NO_NUMBER)),
    ("ins_no66_attrib", Lines(1)),
    ("int90_as_float", Lines(1)),
    ("int_as_float62", Lines(1)),
    ("int_over_420", Lines(1)),
    ("int_over_440", Lines(1)),
    ("int_over_62", Lines(1)),
    ("int_over_90", Lines(1)),
    ("layer_bslash", Lines(1)),
    ("layer_caret", Lines(1)),
    ("layer_flags", Lines(1)),
    ("lwp_20first", LeftOut(0, "there is no group 20")),
    ("lwp_40first", Lines(0)),
    ("lwp_91first", Lines(0)),
    ("mtext_2000_U", Text("Ø15 tail text")),
    ("mtext_2007_P", Text("12\n34")),
    ("mtext_2007_U", Text("Ø15 tail text")),
    ("mtext_M", Tail(" tail text")),
    ("mtext_P_U", Text("A\nØ 123456")),
    ("mtext_P_end", Text("12\n34")),
    ("mtext_P_long", Text("12\n3456789 abc")),
    ("mtext_chunk_bslash_end", Tail("AAx\n END tail")),
    ("mtext_chunk_split_U", Tail("AAØ END tail")),
    ("mtext_chunks", Tail("BBEND")),
    ("mtext_fmt", Text("10-15.2mm")),
    ("mtext_fmt_tail", Text("abc")),
    ("mtext_stack", Text("1/2 tail text")),
    ("mtext_stack_sp", Text("1/2 tail text")),
    ("nan", LeftOut(0, NO_NUMBER)),
    ("newline_only", Refused("empty")),
    ("no_block_end", Lines(1)),
    ("no_eof", Lines(1)),
    ("nospace", Lines(1)),
    ("obj_bad", Lines(1)),
    ("obj_bad_lastpair", Lines(1)),
    ("plusfloat", Lines(1)),
    ("poly_nested_block_dup", Lines(1)),
    ("r12_dimblk5", Lines(1)),
    ("r2018_mtext", Text("hello world")),
    ("seqend_orphan", Lines(1)),
    ("tables_stray", Lines(1)),
    ("tabs_before_codes", Lines(1)),
    ("tdcreate_big", Lines(1)),
    ("tdcreate_huge", Lines(1)),
    ("tdcreate_nan", Lines(1)),
    ("tdcreate_neg", Lines(1)),
    ("tdindwg_neg", Lines(1)),
    ("text_1251", Text("Жи")),
    ("text_bslash_tail", Text(r"C:\dir")),
    ("text_caret", Text("a b c^d")),
    ("text_caret_digit", Text("m^2")),
    ("text_caret_end", Text("2^")),
    ("text_caret_utf", Guessed("m^€")),
    ("text_cc", Text("Ø12 ° ±")),
    ("text_gbk", Text("中文")),
    ("text_latin1_in_r2007", Guessed("Ø15")),
    ("text_utf8_in_r2000", Text("Ø15")),
    ("thumb_30k", Lines(1)),
    ("thumb_bad_hdr", Lines(1)),
    ("thumb_code310_first", Lines(1)),
    ("thumb_empty", Lines(1)),
    ("thumb_huge", Lines(1)),
    ("thumb_huge8", Lines(1)),
    ("thumb_ok", Lines(1)),
    ("thumb_pal_huge", Lines(1)),
    ("thumb_png", Lines(1)),
    ("thumb_short", Lines(1)),
    ("thumb_tiny", Lines(1)),
    ("trailing_garbage", Lines(1)),
    ("trunc_after_endsec", Lines(1)),
    ("trunc_mid_entity", Damaged(1, "ends inside section ENTITIES, and ENDSEC and EOF were expected; one entity")),
    ("two_entities_sections", Lines(2)),
    ("type_trailing_space", Lines(1)),
    ("unk_code_-5", Lines(1)),
    ("unk_code_-666", Lines(1)),
    ("unk_code_103", Lines(1)),
    ("unk_code_106", Lines(1)),
    ("unk_code_1072", Lines(1)),
    ("unk_code_150", Lines(1)),
    ("unk_code_180", Lines(1)),
    ("unk_code_200", Lines(1)),
    ("unk_code_205", Lines(1)),
    ("unk_code_240", Lines(1)),
    ("unk_code_260", Lines(1)),
    ("unk_code_482", Lines(1)),
    ("unk_code_500", Lines(1)),
    ("unk_code_5001", Lines(1)),
    ("unk_code_85", Lines(1)),
    ("unk_code_998", Lines(1)),
    ("unk_code_in_range", Lines(1)),
    ("value_trailing_space", Lines(1)),
    ("vertex_orphan", Lines(1)),
    ("xdata_1004_bad", Lines(1)),
    ("xdata_1042x", Lines(1)),
    ("xdata_bad_order", Lines(1)),
    ("xdata_extra_close", Lines(2)),
    ("xdata_nest_1000", Lines(1)),
    ("xdata_no_1001", Lines(2)),
    ("xdata_ok", Lines(1)),
    ("xdata_unclosed", Lines(2)),
];

fn path(name: &str) -> PathBuf {
    Path::new(env!("CARGO_MANIFEST_DIR"))
        .join("tests/data/dxf-triggers")
        .join(format!("{name}.dxf"))
}

/// Everything wrong with what is read of a drawing, by its truth.
fn faults(name: &str, truth: Truth) -> Vec<String> {
    let bytes = fs::read(path(name)).unwrap_or_else(|error| panic!("{name}: {error}"));
    let begun = Instant::now();
    let mut faults = Vec::new();
    let mut wrong = |what: String| faults.push(format!("{name}: {what}"));
    match (open(bytes.clone()), truth) {
        (Err(refusal), Refused(words)) => {
            if !refusal.to_string().contains(words) {
                wrong(format!("refused with {refusal}"));
            }
        }
        (Err(refusal), _) => wrong(format!("refused: {refusal}")),
        (Ok(_), Refused(_)) => wrong("not refused".to_owned()),
        (Ok(source), _) => {
            let (drawing, mut findings) = read(&source, &Wanted::everything(), None);
            findings.retain(|f| !["unit-assumed", "block-missing"].contains(&f.rule.name));
            if let Some(fault) = compare(&drawing, &findings, truth) {
                wrong(fault);
            }
            match insert(&source, drawing.unit_m, &sheet()) {
                Ok(marked) if !stands_in(&bytes, &marked) => {
                    wrong("marking loses bytes".to_owned());
                }
                Ok(_) => {}
                Err(refusal) => wrong(format!("not marked: {refusal}")),
            }
        }
    }
    if begun.elapsed() > Duration::from_secs(10) {
        wrong(format!("took {:?}", begun.elapsed()));
    }
    faults
}

fn compare(drawing: &Drawing, findings: &[Finding], truth: Truth) -> Option<String> {
    let texts: Vec<&str> = drawing.texts.iter().map(|t| t.content.as_str()).collect();
    let said: Vec<(&str, &str)> = findings
        .iter()
        .map(|f| (f.rule.name, f.text.as_str()))
        .collect();
    let says = |rule: &str, words: &str| matches!(said.as_slice(), [(name, text)] if *name == rule && text.contains(words));
    let lines = drawing.shapes.len();
    let right = match truth {
        Lines(count) => lines == count && said.is_empty(),
        Text(content) => texts == [content] && said.is_empty(),
        Tail(end) => texts.len() == 1 && texts[0].ends_with(end) && said.is_empty(),
        Guessed(content) => texts == [content] && says("text-code-page", "code page"),
        LeftOut(count, words) => lines == count && says("entity-damaged", words),
        Damaged(count, words) => lines == count && says("drawing-damaged", words),
        Short(count, words) => {
            let [(_, _), (rule, text)] = said.as_slice() else {
                return Some(format!("{said:?}"));
            };
            lines == count && *rule == "entity-damaged" && text.contains(words)
        }
        Refused(_) => false,
    };
    (!right).then(|| format!("{lines} lines, texts {texts:?}, findings {said:?}"))
}

/// Whether every line of one stands in the other in its order; the value of `$HANDSEED` alone may differ.
fn stands_in(original: &[u8], marked: &[u8]) -> bool {
    let (original, marked) = (lines_but_seed(original), lines_but_seed(marked));
    let mut rest = marked.iter();
    original.iter().all(|line| rest.any(|other| other == line))
}

/// A drawing's lines, and a blank in the place of the value of each `$HANDSEED`.
fn lines_but_seed(bytes: &[u8]) -> Vec<&[u8]> {
    let mut lines: Vec<&[u8]> = bytes.split_inclusive(|byte| *byte == b'\n').collect();
    for at in 2..lines.len() {
        if lines[at - 2].trim_ascii() == b"$HANDSEED" && lines[at - 1].trim_ascii() == b"5" {
            lines[at] = b"";
        }
    }
    lines
}

#[test]
fn a_line_lost_anywhere_is_seen() {
    let original = b"0\nSECTION\n2\nHEADER\n9\n$HANDSEED\n5\nFF\n0\nENDSEC\n0\nEOF\n";
    let text = String::from_utf8_lossy(original).into_owned();
    let raised = text.replace("FF", "1A0");
    assert!(stands_in(original, raised.as_bytes()));
    for lost in ["SECTION\n", "$HANDSEED\n", "ENDSEC\n", "EOF\n"] {
        let harmed = raised.replacen(lost, "", 1);
        assert!(!stands_in(original, harmed.as_bytes()), "{lost}");
    }
}

fn sheet() -> Sheet {
    let ink = Ink {
        index: 1,
        rgb: None,
    };
    Sheet {
        layers: vec![SheetLayer {
            name: "TAUT-TABLE".to_owned(),
            ink,
            on: true,
        }],
        marks: vec![Mark {
            layer: "TAUT-TABLE".to_owned(),
            ink: None,
            drawn: Drawn::Text {
                place: Coord { x: 0.0, y: 0.0 },
                height_m: 0.1,
                rotation_rad: 0.0,
                align: Align::Left,
                content: "mark".to_owned(),
            },
        }],
    }
}

#[test]
fn every_trigger_is_read_as_the_table_says() {
    let faults: Vec<String> = TRUTH
        .iter()
        .flat_map(|(name, truth)| faults(name, *truth))
        .collect();
    assert!(faults.is_empty(), "{}", faults.join("\n"));
}

#[test]
fn the_table_holds_every_trigger() {
    let folder = path("x").parent().expect("a folder").to_owned();
    let files: BTreeSet<String> = fs::read_dir(folder)
        .expect("the triggers")
        .map(|entry| entry.expect("a file").path())
        .filter_map(|path| Some(path.file_stem()?.to_string_lossy().into_owned()))
        .collect();
    let named: BTreeSet<String> = TRUTH.iter().map(|(name, _)| (*name).to_owned()).collect();
    assert_eq!(files, named);
}

#[test]
fn names_and_handles_come_through() {
    let of = |name: &str| {
        let source = open(fs::read(path(name)).expect("a file")).expect("a drawing");
        read(&source, &Wanted::everything(), None).0
    };
    for (name, handle) in [
        ("handle_bad", "#1"),
        ("handle_long", "#1"),
        ("handle_lower", "ABC"),
    ] {
        assert_eq!(of(name).shapes[0].handle, handle, "{name}");
    }
    assert_eq!(of("layer_bslash").shapes[0].layer, r"a\b");
    let block = &of("ins_no66_attrib").inserts[0];
    assert_eq!(block.attributes, [("TAG".to_owned(), "val".to_owned())]);
    let plus = of("plusfloat").shapes[0].path.start().expect("a start");
    assert!((plus.x - 0.0015).abs() < 1e-12);
}

#[test]
fn the_program_says_in_one_message_why_it_does_nothing() {
    let program = |command: &str, name: &str| {
        let folder = tempfile::TempDir::new().expect("a folder");
        let output = Command::new(env!("CARGO_BIN_EXE_tautplan"))
            .args([command.as_ref(), path(name).as_os_str()])
            .current_dir(folder.path())
            .env("NO_COLOR", "1")
            .output()
            .expect("the program starts");
        let said = String::from_utf8_lossy(&output.stderr).into_owned();
        assert!(!said.contains("panicked"), "{name}: {said}");
        (output.status.code(), said)
    };
    for (name, truth) in TRUTH {
        let Refused(words) = truth else { continue };
        let (status, said) = program("survey", name);
        assert_eq!(status, Some(2), "{name}: {said}");
        assert!(said.contains(words), "{name}: {said}");
    }
    for name in [
        "datatable_huge",
        "tdcreate_huge",
        "xdata_nest_1000",
        "ext_nest_1000",
        "thumb_huge",
        "r2018_mtext",
        "blank_in_lwp",
        "trunc_mid_entity",
    ] {
        let found = i32::from(name == "trunc_mid_entity");
        assert_eq!(program("survey", name).0, Some(found), "{name}");
        // Nothing lies on a tendon layer.
        assert_eq!(program("mark", name).0, Some(2), "{name}");
    }
}
