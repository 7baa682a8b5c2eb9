//! The same drawing as release 12 (AC1009) writes it: no owners and classes, polylines vertex by vertex, no hatches
//! (their outlines stand in), no objects, no word of the unit.

use std::fmt::{Display, Write as _};

use super::records::{Record, records};

/// A drawing's text as release 12 would have it.
pub(crate) fn older(text: &str) -> String {
    let mut out = Older {
        text: String::with_capacity(text.len()),
        section: "",
        table: "",
        next_handle: 0,
    };
    let records = records(text);
    let seed = records.iter().find_map(|record| {
        let mut values = record.tags.iter().skip_while(|tag| tag.1 != "$HANDSEED");
        values.nth(1).map(|tag| tag.1)
    });
    out.next_handle = seed.map_or(1, |seed| u64::from_str_radix(seed, 16).unwrap_or(1));
    for record in &records {
        out.record(record);
    }
    let body = out.text;
    format!(
        "  0\nSECTION\n  2\nHEADER\n  9\n$ACADVER\n  1\nAC1009\n  9\n$HANDLING\n 70\n1\n  9\n$HANDSEED\n  5\n{:X}\n  0\nENDSEC\n{body}",
        out.next_handle
    )
}

struct Older<'t> {
    text: String,
    section: &'t str,
    table: &'t str,
    next_handle: u64,
}

impl<'t> Older<'t> {
    fn record(&mut self, record: &Record<'t>) {
        match record.name {
            "SECTION" => self.section = record.get(2).unwrap_or_default(),
            "TABLE" => self.table = record.get(2).unwrap_or_default(),
            _ => {}
        }
        let late = self.section == "HEADER"
            || self.section == "OBJECTS"
            || (self.section == "TABLES" && self.table == "BLOCK_RECORD");
        let named = matches!(record.name, "EOF" | "ENDSEC");
        match record.name {
            "ENDSEC" if matches!(self.section, "HEADER" | "OBJECTS") => {}
            _ if late && !named => {}
            "VIEWPORT" => {}
            "LWPOLYLINE" => self.vertices(record, record.get(70).unwrap_or("0"), &record.tags),
            "HATCH" => {
                let outline = record.tags.iter().position(|tag| tag.0 == 93);
                let outline = record.tags.get(outline.unwrap_or_default()..);
                let end = |tags: &&[(u16, &str)]| tags.iter().position(|tag| tag.0 == 97);
                let outline = outline.and_then(|tags| tags.get(..end(&tags)?));
                self.vertices(record, "1", outline.unwrap_or_default());
            }
            name => {
                self.put(0, name);
                for &(code, value) in &record.tags {
                    let value = match value {
                        "*Model_Space" => "$MODEL_SPACE",
                        "*Paper_Space" => "$PAPER_SPACE",
                        value => value,
                    };
                    let kept = matches!(code, 0..100 | 140..150 | 210..240)
                        && !(code == 5 && self.section == "TABLES");
                    if kept {
                        self.put(code, value);
                    }
                }
            }
        }
    }

    /// A polyline, vertex by vertex, each with a handle of its own.
    fn vertices(&mut self, record: &Record<'_>, flags: &str, corners: &[(u16, &str)]) {
        let layer = record.get(8).unwrap_or("0");
        self.put(0, "POLYLINE");
        self.put(5, record.get(5).unwrap_or_default());
        self.put(8, layer);
        self.put(66, 1);
        for code in [10, 20, 30] {
            self.put(code, "0.0");
        }
        self.put(70, flags);
        for &(code, value) in corners {
            if code == 10 {
                self.follower("VERTEX", layer);
            }
            if matches!(code, 10 | 20 | 42) {
                self.put(code, value);
            }
            if code == 20 {
                self.put(30, "0.0");
            }
        }
        self.follower("SEQEND", layer);
    }

    fn follower(&mut self, name: &str, layer: &str) {
        let handle = self.next_handle;
        self.next_handle += 1;
        self.put(0, name);
        self.put(5, format_args!("{handle:X}"));
        self.put(8, layer);
    }

    fn put(&mut self, code: u16, value: impl Display) {
        // Writing into a string cannot fail.
        let _ = write!(self.text, "{code:>3}\n{value}\n");
    }
}
