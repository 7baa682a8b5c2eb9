//! Which groups of each entity are passed on to the library, and how.

/// How a group is passed on.
#[derive(Clone, Copy, PartialEq, Eq)]
pub(super) enum Use {
    Skip,
    Number,
    Short,
    Text,
}

/// Which groups of a record are passed on.
pub(super) fn used(type_name: &[u8], code: i32) -> Use {
    let number = match type_name {
        b"LINE" => matches!(code, 10 | 20 | 30 | 11 | 21 | 31),
        b"ARC" => matches!(code, 10 | 20 | 30 | 40 | 50 | 51),
        b"CIRCLE" => matches!(code, 10 | 20 | 30 | 40),
        b"ELLIPSE" => matches!(code, 10 | 20 | 30 | 11 | 21 | 31 | 40..=42),
        b"SOLID" | b"TRACE" => matches!(code, 10..=13 | 20..=23 | 30),
        b"LWPOLYLINE" => matches!(code, 10 | 20 | 38 | 42),
        b"POLYLINE" => matches!(code, 10 | 20 | 30),
        b"VERTEX" => matches!(code, 10 | 20 | 30 | 42),
        // Levels, which a plan has no use for, are given anew.
        b"SPLINE" => matches!(code, 10..=13 | 20..=23 | 32 | 33 | 40 | 41),
        b"TEXT" | b"ATTRIB" | b"ATTDEF" => {
            matches!(code, 10 | 20 | 30 | 11 | 21 | 31 | 40 | 41 | 50 | 51)
        }
        b"MTEXT" => matches!(code, 10 | 20 | 30 | 11 | 21 | 31 | 40 | 41 | 44 | 50),
        b"INSERT" => matches!(code, 10 | 20 | 30 | 41..=45 | 50),
        _ => false,
    };
    let flat = !matches!(type_name, b"LINE" | b"VERTEX");
    if number || (flat && matches!(code, 210 | 220 | 230)) {
        return Use::Number;
    }
    let short = match type_name {
        b"LWPOLYLINE" | b"POLYLINE" | b"VERTEX" => code == 70,
        b"SPLINE" => matches!(code, 70 | 71),
        b"TEXT" => matches!(code, 71..=73),
        b"ATTRIB" => matches!(code, 70..=72 | 74),
        b"ATTDEF" => matches!(code, 71 | 72 | 74),
        b"MTEXT" => code == 71,
        b"INSERT" => matches!(code, 70 | 71),
        _ => false,
    };
    if short {
        return Use::Short;
    }
    let text = match type_name {
        b"TEXT" | b"ATTDEF" => code == 1,
        b"MTEXT" => matches!(code, 1 | 3 | 7),
        b"ATTRIB" => matches!(code, 1 | 2),
        b"INSERT" => code == 2,
        _ => false,
    };
    if text { Use::Text } else { Use::Skip }
}
