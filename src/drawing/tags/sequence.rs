//! One tag after another.

use std::ops::Range;

use super::ascii::{code_of, near, plain_code};
use super::binary::{binary_code, binary_size, binary_value};
use super::{Bad, BadTag, Form, Kind, Tag, form_of, shown};
use crate::drawing::resume::resume;

/// The tags of a file or of a part of it, in order; comments (999) are skipped. Ends after `0/EOF`, at the end of the
/// bytes, or after the first error, unless that is passed over.
#[derive(Debug, Clone)]
pub(in crate::drawing) struct Tags<'a> {
    bytes: &'a [u8],
    at: usize,
    form: Form,
    done: bool,
    forgives: bool,
}

impl<'a> Tags<'a> {
    /// All tags of a file.
    pub(in crate::drawing) fn new(bytes: &'a [u8]) -> Self {
        let (form, at) = form_of(bytes);
        Self {
            bytes,
            at,
            form,
            done: false,
            forgives: false,
        }
    }

    /// The same, passing over what makes no sense.
    pub(in crate::drawing) fn forgiving(mut self) -> Self {
        self.forgives = true;
        self
    }

    /// The tags of a part of a file, which must begin and end between tags.
    pub(in crate::drawing) fn within(bytes: &'a [u8], form: Form, part: Range<usize>) -> Self {
        Self {
            bytes: bytes.get(..part.end).unwrap_or(bytes),
            at: part.start,
            form,
            done: false,
            forgives: false,
        }
    }

    /// The line at the cursor without its line end, and the offset past it.
    #[inline]
    fn line(&self, at: usize) -> Option<(&'a [u8], usize)> {
        let rest = self.bytes.get(at..)?;
        if rest.is_empty() {
            return None;
        }
        let (line, end) = match near(b'\n', rest) {
            Some(length) => (&rest[..length], at + length + 1),
            None => (rest, self.bytes.len()),
        };
        Some((line.strip_suffix(b"\r").unwrap_or(line), end))
    }

    /// The tag at the cursor if it is written as nearly all are: a plain code, and whole lines.
    #[inline]
    fn plain(&mut self) -> Option<Tag<'a>> {
        let start = self.at;
        let rest = self.bytes.get(start..)?;
        let (code, head) = plain_code(rest)?;
        let body = rest.get(head..)?;
        let length = near(b'\n', body)?;
        let line = body.get(..length)?;
        let value_start = start + head;
        self.at = value_start + length + 1;
        Some(Tag {
            code,
            value: line.strip_suffix(b"\r").unwrap_or(line),
            start,
            end: self.at,
            value_start,
            kind: Kind::Text,
        })
    }

    fn ascii(&mut self) -> Option<Result<Tag<'a>, BadTag>> {
        let start = self.at;
        let (code_line, value_start) = self.line(start)?;
        let Some(code) = code_of(code_line) else {
            let rest = self.bytes.get(start..).unwrap_or_default();
            if rest.iter().all(|b| b.is_ascii_whitespace() || *b == 0x1A) {
                return None;
            }
            return Some(Err(bad(start, Bad::Code, shown(code_line))));
        };
        let Some((value, end)) = self.line(value_start) else {
            let found = format!("group code {code} without a value");
            return Some(Err(bad(start, Bad::Cut, found)));
        };
        self.at = end;
        Some(Ok(Tag {
            code,
            value,
            start,
            end,
            value_start,
            kind: Kind::Text,
        }))
    }

    fn binary(&mut self, wide: bool) -> Option<Result<Tag<'a>, BadTag>> {
        let start = self.at;
        let rest = self.bytes.get(start..).filter(|rest| !rest.is_empty())?;
        let cut = || Some(Err(bad(start, Bad::Cut, "a tag cut short".to_owned())));
        let Some((code, head)) = binary_code(rest, wide) else {
            return cut();
        };
        let Some((kind, size)) = binary_size(code, wide) else {
            let found = format!("group code {code}, which binary DXF does not know");
            return Some(Err(bad(start, Bad::Code, found)));
        };
        let body = rest.get(head..).unwrap_or_default();
        let Some(value) = binary_value(kind, size, body) else {
            return cut();
        };
        let after = usize::from(kind == Kind::Text);
        let value_start = start + head + value.start;
        self.at = start + head + value.end + after;
        Some(Ok(Tag {
            code,
            value: body.get(value)?,
            start,
            end: self.at,
            value_start,
            kind,
        }))
    }

    /// Passes over tags for as long as they are soundly written and their codes of no use; where the last of them ends, if
    /// there is one.
    #[inline]
    pub(in crate::drawing) fn pass_over(&mut self, useless: impl Fn(i32) -> bool) -> Option<usize> {
        let mut last = None;
        while let Some(end) = self.end_of_useless(&useless).filter(|_| !self.done) {
            self.at = end;
            last = Some(end);
        }
        last
    }

    #[inline]
    fn end_of_useless(&self, useless: impl Fn(i32) -> bool) -> Option<usize> {
        let rest = self.bytes.get(self.at..)?;
        let (code, head) = match self.form {
            Form::Ascii => plain_code(rest)?,
            Form::Binary { wide } => binary_code(rest, wide)?,
        };
        if !useless(code) {
            return None;
        }
        let body = rest.get(head..)?;
        let length = match self.form {
            Form::Ascii => near(b'\n', body)? + 1,
            Form::Binary { wide } => {
                let (kind, size) = binary_size(code, wide)?;
                binary_value(kind, size, body)?.end + usize::from(kind == Kind::Text)
            }
        };
        Some(self.at + head + length)
    }
}

impl<'a> Iterator for Tags<'a> {
    type Item = Result<Tag<'a>, BadTag>;

    #[inline]
    fn next(&mut self) -> Option<Self::Item> {
        loop {
            if self.done {
                return None;
            }
            if self.form == Form::Ascii
                && let Some(tag) = self.plain()
            {
                if tag.code == 999 {
                    continue;
                }
                self.done = tag.begins(b"EOF");
                return Some(Ok(tag));
            }
            let next = match self.form {
                Form::Ascii => self.ascii(),
                Form::Binary { wide } => self.binary(wide),
            };
            match &next {
                Some(Ok(tag)) if tag.code == 999 => continue,
                Some(Ok(tag)) => self.done = tag.code == 0 && tag.begins(b"EOF"),
                Some(Err(bad)) if self.forgives && bad.kind == Bad::Code => {
                    if let Some(found) = resume(self.bytes, self.form, bad.at) {
                        self.at = found.at;
                        continue;
                    }
                    self.done = true;
                }
                Some(Err(_)) | None => self.done = true,
            }
            return next;
        }
    }
}

fn bad(at: usize, kind: Bad, found: String) -> BadTag {
    BadTag { at, kind, found }
}
