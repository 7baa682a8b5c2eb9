//! The tags that layers and marks are said with, version by version.

use tautplan::drawing::Sheet;

use crate::dxf_text::{Tag, Value, decode, encode};
use crate::kept::mark;
use crate::sample::{LF, WHOLE, drawing, text, with};
use crate::sheets::sheet;

/// The tags of a drawing that was marked in ASCII form.
pub(crate) fn marked_tags(tags: &[Tag], sheet: &Sheet) -> Vec<Tag> {
    let coding = LF;
    decode(&mark(&encode(tags, coding), sheet), coding)
}

/// The group codes of the first record of that name on that layer, markers and line types with their words.
fn shape(tags: &[Tag], name: &str, layer: &str) -> String {
    let records = tags.chunk_by(|_, next| next.0 != 0);
    let mut on_layer = records.filter(|record| {
        record[0] == text(0, name)
            && (record.contains(&text(8, layer)) || record.contains(&text(2, layer)))
    });
    let record = on_layer.next().expect("a record");
    let words = record.iter().map(|(code, value)| match value {
        Value::Text(word) if [6, 100].contains(code) => format!("{code} {word}"),
        _ => code.to_string(),
    });
    words.collect::<Vec<_>>().join(",")
}

#[test]
fn layer_records_have_the_tags_of_their_version_in_order() {
    for (version, expected) in [
        ("AC1009", "0,2,70,62,6 CONTINUOUS"),
        ("AC1014", "0,5,330,M,2,70,62,6 Continuous"),
        ("AC1015", "0,5,330,M,2,70,62,6 Continuous,370,390"),
        ("AC1018", "0,5,330,M,2,70,62,420,6 Continuous,370,390"),
        ("AC1032", "0,5,330,M,2,70,62,420,6 Continuous,370,390"),
    ] {
        let after = marked_tags(&drawing(version, WHOLE), &sheet());
        let markers = "100 AcDbSymbolTableRecord,100 AcDbLayerTableRecord";
        let expected = expected.replace('M', markers);
        assert_eq!(
            shape(&after, "LAYER", "TAUT-FORCE-SERVICE"),
            expected,
            "{version}"
        );
        let off = after
            .iter()
            .position(|tag| *tag == text(2, "TAUT-FORCE-JACKING"));
        assert_eq!(
            after[off.expect("a layer") + 2],
            (62, Value::Short(-3)),
            "{version}"
        );
    }
}

#[test]
fn layers_take_what_layer_0_points_at_as_far_as_the_version_has_it() {
    for (version, expected) in [
        ("AC1014", &[][..]),
        ("AC1018", &[390]),
        ("AC1024", &[390, 347]),
        ("AC1027", &[390, 347, 348]),
    ] {
        let pointers = vec![text(347, "A1"), text(348, "a2")];
        let mut tags = drawing(version, WHOLE);
        if version > "AC1014" {
            tags = with(tags, &text(390, "F"), 0, pointers);
        }
        let after = marked_tags(&tags, &sheet());
        let name = after.iter().position(|tag| *tag == text(2, "TAUT-TABLE"));
        let record = after
            .iter()
            .skip(name.expect("a layer"))
            .take_while(|tag| tag.0 != 0);
        let found: Vec<i16> = record
            .map(|tag| tag.0)
            .filter(|code| *code >= 300 && *code != 370)
            .collect();
        assert_eq!(found, expected, "{version}");
    }
}

#[test]
fn entities_have_the_tags_of_their_version_in_order() {
    let head = "0,5,330,100 AcDbEntity,8";
    let cases = [
        (
            "AC1009",
            "POLYLINE",
            "TAUT-FORCE-SERVICE",
            "0,5,8,62,66,10,20,30,70,40,41".to_owned(),
        ),
        (
            "AC1009",
            "VERTEX",
            "TAUT-FORCE-SERVICE",
            "0,5,8,10,20,30,40,41".to_owned(),
        ),
        (
            "AC1009",
            "TEXT",
            "TAUT-TABLE",
            "0,5,8,62,10,20,30,40,1,50,72,11,21,31,73".to_owned(),
        ),
        (
            "AC1012",
            "POLYLINE",
            "TAUT-FORCE-SERVICE",
            "0,5,100 AcDbEntity,8,62,100 AcDb2dPolyline,66,10,20,30,70,40,41".to_owned(),
        ),
        (
            "AC1012",
            "VERTEX",
            "TAUT-FORCE-SERVICE",
            "0,5,100 AcDbEntity,8,100 AcDbVertex,100 AcDb2dVertex,10,20,30,40,41".to_owned(),
        ),
        (
            "AC1014",
            "LWPOLYLINE",
            "TAUT-FORCE-SERVICE",
            "0,5,100 AcDbEntity,8,62,100 AcDbPolyline,90,70,43,10,20,10,20,10,20".to_owned(),
        ),
        (
            "AC1015",
            "LWPOLYLINE",
            "TAUT-FORCE-SERVICE",
            format!("{head},62,100 AcDbPolyline,90,70,43,10,20,10,20,10,20"),
        ),
        (
            "AC1018",
            "LWPOLYLINE",
            "TAUT-FORCE-SERVICE",
            format!("{head},62,420,100 AcDbPolyline,90,70,43,10,20,10,20,10,20"),
        ),
        (
            "AC1032",
            "LWPOLYLINE",
            "TAUT-FORCE-JACKING",
            format!("{head},100 AcDbPolyline,90,70,10,20,10,20,10,20"),
        ),
        (
            "AC1032",
            "POLYLINE",
            "TAUT-TABLE",
            format!("{head},100 AcDb3dPolyline,66,10,20,30,70"),
        ),
        (
            "AC1032",
            "VERTEX",
            "TAUT-TABLE",
            format!("{head},100 AcDbVertex,100 AcDb3dPolylineVertex,10,20,30,70"),
        ),
        ("AC1032", "SEQEND", "TAUT-TABLE", head.to_owned()),
        (
            "AC1032",
            "TEXT",
            "TAUT-TABLE",
            format!("{head},62,420,100 AcDbText,10,20,30,40,1,50,72,11,21,31,100 AcDbText,73"),
        ),
        (
            "AC1032",
            "CIRCLE",
            "TAUT-TABLE",
            format!("{head},100 AcDbCircle,10,20,30,40"),
        ),
        (
            "AC1032",
            "SOLID",
            "TAUT-TABLE",
            format!("{head},100 AcDbTrace,10,20,30,11,21,31,12,22,32,13,23,33"),
        ),
    ];
    for (version, name, layer, expected) in cases {
        let after = marked_tags(&drawing(version, WHOLE), &sheet());
        assert_eq!(shape(&after, name, layer), expected, "{version} {name}");
    }
}

#[test]
fn values_are_in_drawing_units_and_said_as_the_version_can() {
    let after = marked_tags(&drawing("AC1015", WHOLE), &sheet());
    assert!(after.contains(&text(1, "540 kN %%p2 \\U+00B2")));
    let newer = marked_tags(&drawing("AC1021", WHOLE), &sheet());
    assert!(newer.contains(&text(1, "540 kN %%p2 ²")));
    assert!(newer.contains(&(420, Value::Long(0xFA_0A_14))));
    // A third of a metre in millimetres, to a millionth; half a radian in degrees.
    assert!(newer.contains(&(10, Value::Real(333.333_333))));
    assert!(newer.contains(&(50, Value::Real(28.647_89))));
    let corners = newer.iter().position(|tag| *tag == text(100, "AcDbTrace"));
    let solid = &newer[corners.expect("a solid") + 1..][..12];
    let x: Vec<_> = solid
        .iter()
        .step_by(3)
        .map(|(_, value)| value.clone())
        .collect();
    assert_eq!(x, [0.0, 1000.0, 0.0, 1000.0].map(Value::Real));
}
