//! What one pass finds, on drawings of a few tags.

use super::*;

/// A drawing from its tags: codes and values in turn, blanks between.
fn dxf(tags: &str) -> Vec<u8> {
    let words: Vec<&str> = tags.split_whitespace().collect();
    let lines = words.chunks(2).flat_map(|pair| {
        let code = pair.first().copied().unwrap_or_default();
        let value = pair.get(1).copied().unwrap_or_default();
        [format!("{code:>3}\r\n"), format!("{value}\r\n")]
    });
    lines.collect::<String>().into_bytes()
}

const HEADER: &str =
    "0 SECTION 2 HEADER 9 $ACADVER 1 AC1015 9 $HANDSEED 5 1F0 9 $INSUNITS 70 6 0 ENDSEC ";
const TABLES: &str = "0 SECTION 2 TABLES 0 TABLE 2 LAYER 5 2 70 2
    0 LAYER 5 10 2 0 70 0 62 7 390 F 0 LAYER 5 11 2 Slab 70 1 62 -3 0 ENDTAB
    0 TABLE 2 BLOCK_RECORD 5 1 0 BLOCK_RECORD 5 1C 2 *MODEL_SPACE 0 ENDTAB 0 ENDSEC ";

fn at(bytes: &[u8], offset: Option<usize>) -> String {
    let rest = offset.and_then(|at| bytes.get(at..)).unwrap_or_default();
    let lines = rest.split(|b| *b == b'\n').take(4);
    let words = lines.map(|line| String::from_utf8_lossy(line.trim_ascii()).into_owned());
    words.collect::<Vec<_>>().join(" ")
}

#[test]
fn one_pass_finds_layers_sections_and_handles() {
    let bytes = dxf(&format!(
        "{HEADER}{TABLES}0 SECTION 2 ENTITIES
         0 LINE 5 A0 330 1C 8 slab 10 1.0 20 2.0 11 3.0 21 4.0
         0 TEXT 5 2a1 102 {{ACAD 330 9999 102 }} 8 New 67 1 1 x
         0 POLYLINE 5 A2 8 taut-table 66 1 0 VERTEX 5 300 8 0 0 SEQEND 5 301 8 0
         0 LINE 5 A3 8 New 0 ENDSEC 0 EOF"
    ));
    let scan = scan(&bytes, &Caps::default()).expect("read");
    assert_eq!((scan.version.as_str(), scan.insunits), ("AC1015", Ok(6)));
    assert_eq!((scan.line_end, scan.code_width), ("\r\n", 3));
    let names: Vec<_> = scan.layers.iter().map(|l| l.name.as_str()).collect();
    assert_eq!(names, ["0", "Slab", "New", "taut-table"]);
    assert!(scan.layers[1].off() && scan.layers[1].frozen());
    assert_eq!(scan.zero_layer_pointers[0].as_deref(), Some("F"));
    assert!(scan.layers_have_handles && scan.uses_handles);
    assert_eq!(scan.greatest_handle, 0x9999);
    assert_eq!(scan.own_handles, Some((0xA2, 0x301)));
    assert_eq!(scan.own_marks.len(), 1);
    let own = &bytes[scan.own_marks[0].clone()];
    assert!(
        own.starts_with(b"  0\r\nPOLYLINE")
            && own.ends_with(b"SEQEND\r\n  5\r\n301\r\n  8\r\n0\r\n")
    );
    assert_eq!(scan.model_space_record.as_deref(), Some("1C"));
    assert_eq!(scan.layer_table_handle.as_deref(), Some("2"));
    let (seed, number) = scan.handseed.clone().expect("seed");
    assert_eq!((&bytes[seed], number), (&b"1F0"[..], 0x1F0));
    assert_eq!(at(&bytes, scan.header_end), "0 ENDSEC 0 SECTION");
    assert_eq!(at(&bytes, scan.layer_table_end), "0 ENDTAB 0 TABLE");
    assert_eq!(at(&bytes, scan.tables_end), "0 ENDSEC 0 SECTION");
    assert_eq!(at(&bytes, scan.entities_start), "0 SECTION 2 ENTITIES");
    assert_eq!(at(&bytes, scan.entities_end), "0 ENDSEC 0 EOF");
    assert_eq!(at(&bytes, scan.eof_start), "0 EOF ");
    assert_eq!(scan.entries.len(), 2);
    assert_eq!(scan.counts[1], [(0, 1)]);
    assert!(!scan.open_sequence);
}

#[test]
fn a_sequence_without_its_end_is_open() {
    let open = |entities: &str| {
        let bytes = dxf(&format!("0 SECTION 2 ENTITIES {entities} 0 ENDSEC 0 EOF"));
        scan(&bytes, &Caps::default()).expect("read").open_sequence
    };
    assert!(open("0 POLYLINE 8 0 66 1 0 VERTEX 8 0"));
    assert!(open("0 INSERT 8 0 66 1 2 B 0 ATTRIB 8 0"));
    assert!(!open("0 INSERT 8 0 2 B"));
    assert!(!open("0 POLYLINE 8 0 0 VERTEX 8 0 0 SEQEND 8 0"));
}

#[test]
fn old_drawings_use_handles_where_their_entities_do() {
    let uses = |tags: &str| {
        let bytes = dxf(&format!(
            "0 SECTION 2 TABLES 0 TABLE 2 LAYER 0 LAYER {tags} 0 ENDSEC 0 EOF"
        ));
        scan(&bytes, &Caps::default()).expect("read").uses_handles
    };
    let to_entities = "2 0 0 ENDTAB 0 ENDSEC 0 SECTION 2 ENTITIES 0 LINE";
    assert!(uses(&format!("{to_entities} 5 A1 8 0")));
    assert!(!uses(&format!("{to_entities} 8 0")));
    assert!(!uses(&format!("5 2 {to_entities} 5 GG 8 0")));
    assert!(uses(&format!("5 2 {to_entities} 8 0")));
}

#[test]
fn what_is_no_drawing_is_refused_in_words() {
    let refused = |bytes: &[u8]| {
        scan(bytes, &Caps::default())
            .map(|_| ())
            .expect_err("refused")
            .to_string()
    };
    assert!(refused(b" \n").contains("empty"));
    assert!(refused(b"AC1032\0\0\0\0").contains("DWG (AC1032)"));
    assert!(refused(b"%PDF-1.7\n").contains("\"%PDF-1.7\""));
    assert!(refused(b"0\rSECTION\r").contains("carriage return"));
    assert!(refused(&dxf("0 EOF")).contains("no section"));
    assert!(refused(b"0\nSECTION\n2\nENTITIES\n0\nLINE\n8\n").contains("line 7: the file ends"));
    assert!(
        refused(&dxf("0 SECTION 2 ENTITIES 0 LINE 8 0")).contains("ends inside section ENTITIES")
    );
    assert!(refused(&dxf("0 SECTION 2 HEADER 0 ENDSEC")).contains("without section ENTITIES"));
    assert!(
        refused(&dxf("0 SECTION 2 ENTITIES oops 8 0 ENDSEC")).contains("line 5: found \"oops\"")
    );
    assert!(scan(&dxf("0 SECTION 2 HEADER 0 ENDSEC 0 EOF"), &Caps::default()).is_ok());
}
