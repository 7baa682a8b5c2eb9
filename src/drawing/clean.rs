//! Records rewritten so that the DXF library reads them right: only the groups that are used, as UTF-8 in ASCII form,
//! every number checked, every record under a number of our own in place of its handle.

mod groups;
mod kept;
mod record;

use std::io::Write as _;

use super::code_page::CodePage;
use super::handles::parse_handle;
use super::scan::{Entry, Scan};
use super::tags::{Form, Tag, Tags};
use groups::{Use, used};
use record::{Open, lacking};

pub(super) use kept::{Damage, Kept, KeptAttribute, Worn};

/// A stream of cleaned records for the library.
#[derive(Debug)]
pub(super) struct Cleaner<'a> {
    bytes: &'a [u8],
    form: Form,
    code_page: &'a CodePage,
    stream: Vec<u8>,
    kept: Vec<Kept>,
    /// Strings whose characters had to be guessed.
    pub(super) guessed: usize,
    /// Records that may lack something and are read as they are.
    pub(super) doubtful: Vec<Damage>,
}

const HEAD: &[u8] = b"0\nSECTION\n2\nENTITIES\n";
const TAIL: &[u8] = b"0\nENDSEC\n0\nEOF\n";

impl<'a> Cleaner<'a> {
    /// An empty stream from a drawing.
    pub(super) fn new(bytes: &'a [u8], scan: &'a Scan) -> Self {
        Self {
            bytes,
            form: scan.form,
            code_page: &scan.code_page,
            stream: HEAD.to_vec(),
            kept: Vec::new(),
            guessed: 0,
            doubtful: Vec::new(),
        }
    }

    /// Bytes gathered so far.
    pub(super) fn len(&self) -> usize {
        self.stream.len()
    }

    /// The stream, closed, and what is kept beside each record: record `n` has handle `n + 1`. Empties the cleaner.
    pub(super) fn take(&mut self) -> (Vec<u8>, Vec<Kept>) {
        self.stream.extend_from_slice(TAIL);
        let stream = std::mem::replace(&mut self.stream, HEAD.to_vec());
        (stream, std::mem::take(&mut self.kept))
    }

    /// Adds a record with what follows it up to its SEQEND.
    ///
    /// # Errors
    /// A damaged record, which is then not in the stream.
    pub(super) fn add(&mut self, entry: &Entry) -> Result<(), Box<Damage>> {
        let mark = self.stream.len();
        let mut kept = Kept {
            layer: entry.layer,
            number: entry.number,
            block: entry.block,
            start: entry.start,
            ..Kept::default()
        };
        match self.rewrite(entry, &mut kept) {
            Ok(()) => {
                self.kept.push(kept);
                Ok(())
            }
            Err((type_name, at, found)) => {
                self.stream.truncate(mark);
                Err(Box::new(Damage {
                    kept,
                    type_name: String::from_utf8_lossy(type_name).into_owned(),
                    at,
                    found,
                }))
            }
        }
    }

    fn rewrite(&mut self, entry: &Entry, kept: &mut Kept) -> Result<(), (&'a [u8], usize, String)> {
        let part = entry.start..entry.end;
        let mut record = Open::default();
        let mut sequence = false;
        for tag in Tags::within(self.bytes, self.form, part).forgiving() {
            let Ok(tag) = tag else { break };
            if tag.code == 0 {
                if !record.type_name.is_empty() {
                    self.close(&record, kept)?;
                }
                let first = record.type_name.is_empty();
                record = Open {
                    type_name: tag.word(),
                    start: tag.start,
                    ..Open::default()
                };
                if record.type_name == b"SEQEND" {
                    break;
                }
                if !first && !sequence && record.type_name == b"ATTRIB" {
                    // The library takes attributes only where group 66 announces them.
                    self.line(b"66", b"1");
                    sequence = true;
                }
                // A constant attribute is a text that its block brings along.
                let written = match record.type_name {
                    b"ATTDEF" => &b"TEXT"[..],
                    name => name,
                };
                self.line(b"0", written);
                if first {
                    let number = self.kept.len() + 1;
                    self.line(b"5", format!("{number:X}").as_bytes());
                    sequence = record.type_name == b"POLYLINE";
                }
                if record.type_name == b"ATTRIB" {
                    kept.attributes.push(KeptAttribute::default());
                }
                continue;
            }
            self.group(&tag, &mut record, kept)
                .map_err(|found| (record.type_name, tag.start, found))?;
        }
        if !record.type_name.is_empty() && record.type_name != b"SEQEND" {
            self.close(&record, kept)?;
        }
        if sequence {
            self.line(b"0", b"SEQEND");
        }
        Ok(())
    }

    /// Passes one group on, or keeps it, or leaves it out.
    fn group(
        &mut self,
        tag: &Tag<'a>,
        record: &mut Open<'a>,
        kept: &mut Kept,
    ) -> Result<(), String> {
        match tag.code {
            102 => record.in_group = tag.word().starts_with(b"{"),
            101 => record.past = true,
            // The second half of an old attribute repeats groups in another sense.
            100 if tag.word() == b"AcDbXrecord" => record.past = true,
            75 if record.type_name == b"MTEXT" => record.columns = true,
            90 if record.type_name == b"LWPOLYLINE" && !record.in_group && !record.past => {
                record.announced = tag.integer();
            }
            _ => {}
        }
        if record.in_group || record.past || tag.code >= 1000 {
            return Ok(());
        }
        match (tag.code, record.type_name) {
            (5 | 6 | 60 | 62 | 420, b"VERTEX") => {}
            (5, b"ATTRIB") => {
                if let Some(own) = kept.attributes.last_mut() {
                    own.handle = own.handle.take().or(written_handle(tag.word()));
                }
            }
            (5, _) => kept.handle = kept.handle.take().or(written_handle(tag.word())),
            (8, b"ATTRIB") => {
                if let Some(own) = kept.attributes.last_mut() {
                    own.layer = Some(tag.word().to_vec());
                }
            }
            (6 | 60 | 62 | 420, b"ATTRIB") => {
                if let Some(own) = kept.attributes.last_mut() {
                    own.worn.note(tag);
                }
            }
            (6 | 60 | 62 | 420, _) => kept.worn.note(tag),
            _ => {}
        }
        match used(record.type_name, tag.code) {
            Use::Skip => {}
            Use::Text => {
                record.named |= tag.code == 2 && !tag.word().is_empty();
                self.text(tag);
            }
            Use::Short => {
                let Some(number) = tag.integer() else {
                    return Err(expected(tag, "a whole number"));
                };
                let number = number.clamp(i64::from(i16::MIN), i64::from(i16::MAX));
                let code = match (tag.code, record.type_name) {
                    (74, b"ATTDEF") => 73,
                    (code, _) => code,
                };
                self.line(code.to_string().as_bytes(), number.to_string().as_bytes());
                record.justified |= matches!(tag.code, 72..=74) && number != 0;
            }
            Use::Number => {
                let Some(number) = tag.float() else {
                    return Err(expected(tag, "a finite number"));
                };
                if record.leaves_out(tag.code) {
                    return Ok(());
                }
                record.pair(tag.code)?;
                record.note(tag.code);
                let word = tag.word();
                let word = word.strip_prefix(b"+").unwrap_or(word);
                if word.is_empty() {
                    let _ = write!(self.stream, "{}\n{number:?}\n", tag.code);
                } else {
                    self.line(tag.code.to_string().as_bytes(), word);
                }
                if record.type_name == b"SPLINE" && matches!(tag.code, 20 | 21) {
                    // The library takes no point without its level.
                    let level: &[u8] = if tag.code == 20 { b"30" } else { b"31" };
                    self.line(level, b"0");
                }
            }
        }
        Ok(())
    }

    /// Ends a record: what it must have is there, what contradicts is settled.
    fn close(
        &mut self,
        record: &Open<'a>,
        kept: &mut Kept,
    ) -> Result<(), (&'a [u8], usize, String)> {
        let needed: &[i32] = match record.type_name {
            b"LINE" => &[10, 20, 11, 21],
            b"ARC" => &[10, 20, 40, 50, 51],
            b"CIRCLE" => &[10, 20, 40],
            b"ELLIPSE" => &[10, 20, 11, 21, 40],
            b"LWPOLYLINE" | b"VERTEX" | b"SOLID" | b"TRACE" | b"TEXT" | b"ATTDEF" | b"MTEXT"
            | b"INSERT" => &[10, 20],
            _ => &[],
        };
        if let Some(code) = record.half {
            return Err((record.type_name, record.start, lacking(code)));
        }
        if let Some(code) = needed.iter().find(|code| !record.has(**code)) {
            return Err((record.type_name, record.start, lacking(*code)));
        }
        if let Some(announced) = record.announced
            && (record.vertices + 1..=i64::from(i32::MAX)).contains(&announced)
        {
            self.doubtful.push(Damage {
                kept: kept.clone(),
                type_name: String::from_utf8_lossy(record.type_name).into_owned(),
                at: record.start,
                found: format!(
                    "group 90 announces {announced} vertices, and there are {}",
                    record.vertices
                ),
            });
        }
        if record.type_name == b"INSERT" && !record.named {
            let found = "there is no group 2, and a block's name was expected".to_owned();
            return Err((record.type_name, record.start, found));
        }
        if record.type_name == b"ATTRIB"
            && !(record.has(10) && record.has(20))
            && let Some(own) = kept.attributes.last_mut()
        {
            own.nowhere = true;
        }
        if record.justified && !(record.has(11) && record.has(21)) {
            // Without an alignment point the insertion point, left on the base line, is all there is.
            for code in [&b"72"[..], b"73", b"74"] {
                if code != b"74" || record.type_name == b"ATTRIB" {
                    self.line(code, b"0");
                }
            }
        }
        if record.type_name == b"MTEXT" && record.last_direction == 11 {
            self.line(b"50", b"0");
        }
        if record.type_name == b"MTEXT" && record.last_direction == 50 {
            for (code, value) in [(&b"11"[..], &b"1"[..]), (b"21", b"0"), (b"31", b"0")] {
                self.line(code, value);
            }
        }
        Ok(())
    }

    fn line(&mut self, code: &[u8], value: &[u8]) {
        self.stream.extend_from_slice(code);
        self.stream.push(b'\n');
        self.stream.extend_from_slice(value);
        self.stream.push(b'\n');
    }

    /// A string as UTF-8; carets are written so that the library gives them back as they came.
    fn text(&mut self, tag: &Tag<'a>) {
        let (text, guessed) = self.code_page.decode(tag.value);
        let text = self.code_page.numbered(text);
        self.guessed += usize::from(guessed);
        let _ = writeln!(self.stream, "{}", tag.code);
        for byte in text.bytes() {
            match byte {
                b'^' => self.stream.extend_from_slice(b"^ "),
                b'\n' => self.stream.extend_from_slice(b"^J"),
                b'\r' => {}
                _ => self.stream.push(byte),
            }
        }
        self.stream.push(b'\n');
    }
}

/// What a group holds, in at most so many bytes, and what was expected.
pub(super) fn expected(tag: &Tag<'_>, what: &str) -> String {
    let word = tag.word();
    let short = word.get(..40).unwrap_or(word).escape_ascii();
    format!(
        "group {} holds \"{short}\", and {what} was expected",
        tag.code
    )
}

fn written_handle(word: &[u8]) -> Option<String> {
    parse_handle(word).map(|handle| format!("{handle:X}"))
}
