//! Where the tags of a damaged drawing make sense again.

use memchr::memchr;

use super::handles::{names_a_handle, parse_handle};
use super::tags::{Form, Tags, code_of};

/// Where reading goes on behind a place that makes no sense.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) struct Resumed {
    /// Offset of the next tag.
    pub(super) at: usize,
    /// Nothing but empty lines was passed over, so the record at hand is whole.
    pub(super) whole: bool,
}

/// Tags that must be in order behind an empty line before it is taken for a mere extra.
const PROOF: usize = 64;

/// The next tag behind the bad one at `bad_at`: behind empty lines if the tags are in step there, else the next record.
/// `None` if there is none.
pub(super) fn resume(bytes: &[u8], form: Form, bad_at: usize) -> Option<Resumed> {
    match form {
        Form::Ascii => behind_blanks(bytes, bad_at).or_else(|| next_pair(bytes, bad_at, is_record)),
        Form::Binary { wide } => next_binary_record(bytes, wide, bad_at),
    }
}

/// The same inside HEADER, where reading goes on at the next variable if that comes before the next record.
pub(super) fn resume_in_header(bytes: &[u8], form: Form, bad_at: usize) -> Option<Resumed> {
    match form {
        Form::Ascii => {
            behind_blanks(bytes, bad_at).or_else(|| next_pair(bytes, bad_at, is_variable))
        }
        Form::Binary { wide } => {
            let record = next_binary_record(bytes, wide, bad_at)?;
            let passed = bytes.get(..record.at)?;
            let variable = next_binary_variable(passed, wide, bad_at);
            let at = variable.unwrap_or(record.at);
            Some(Resumed { at, whole: false })
        }
    }
}

fn behind_blanks(bytes: &[u8], bad_at: usize) -> Option<Resumed> {
    let mut at = bad_at;
    while let Some((line, next)) = line(bytes, at)
        && is_blank(line)
    {
        at = next;
    }
    (at > bad_at && in_step(bytes, at)).then_some(Resumed { at, whole: true })
}

/// Whether tags follow from here on, up to a record's name or at least a good many.
fn in_step(bytes: &[u8], at: usize) -> bool {
    let tags = Tags::within(bytes, Form::Ascii, at..bytes.len());
    for (number, tag) in tags.take(PROOF).enumerate() {
        match tag {
            Ok(tag) if tag.code == 0 => return names_a_record(tag.word()),
            Ok(_) => {}
            // The next empty line too many is judged when its turn comes.
            Err(bad) => {
                return number > 0 && line(bytes, bad.at).is_some_and(|(l, _)| is_blank(l));
            }
        }
    }
    true
}

fn is_blank(line: &[u8]) -> bool {
    line.trim_ascii().is_empty()
}

/// The next two lines that are a code and a value as they are looked for.
fn next_pair(
    bytes: &[u8],
    bad_at: usize,
    looked_for: impl Fn(&[u8], &[u8]) -> bool,
) -> Option<Resumed> {
    let (_, mut at) = line(bytes, bad_at)?;
    let (mut code, mut next) = line(bytes, at)?;
    loop {
        let (value, behind) = line(bytes, next)?;
        if looked_for(code.trim_ascii(), value.trim_ascii()) {
            return Some(Resumed { at, whole: false });
        }
        (at, code, next) = (next, value, behind);
    }
}

fn is_record(code: &[u8], value: &[u8]) -> bool {
    code == b"0" && names_a_record(value)
}

fn is_variable(code: &[u8], value: &[u8]) -> bool {
    is_record(code, value) || (code == b"9" && value.starts_with(b"$"))
}

fn line(bytes: &[u8], at: usize) -> Option<(&[u8], usize)> {
    let rest = bytes.get(at..).filter(|rest| !rest.is_empty())?;
    let length = memchr(b'\n', rest).unwrap_or(rest.len());
    let end = at.saturating_add(length).saturating_add(1);
    Some((rest.get(..length)?, end.min(bytes.len())))
}

/// What may be a handle, or a pointer to a record, in bytes whose tags make no sense.
pub(super) fn handles_in(bytes: &[u8], form: Form, out: &mut Vec<u64>) {
    match form {
        Form::Ascii => {
            let lines = bytes.split(|byte| *byte == b'\n');
            let mut code = None;
            for line in lines {
                if code.is_some_and(names_a_handle) {
                    out.extend(parse_handle(line));
                }
                code = code_of(line);
            }
        }
        Form::Binary { .. } => {
            // A code of one byte, or the second of two, stands before hexadecimal digits up to a NUL.
            for digits in bytes.split(|byte| *byte == 0) {
                let behind = digits.iter().rev();
                let length = behind.take_while(|byte| byte.is_ascii_hexdigit()).count();
                out.extend(parse_handle(&digits[digits.len() - length..]));
            }
        }
    }
}

fn next_binary_record(bytes: &[u8], wide: bool, bad_at: usize) -> Option<Resumed> {
    let code_bytes = if wide { 2 } else { 1 };
    let mut at = bad_at.saturating_add(1);
    loop {
        at = at.saturating_add(memchr(0, bytes.get(at..)?)?);
        let rest = bytes.get(at..)?;
        let whole_code = rest.get(..code_bytes)?.iter().all(|byte| *byte == 0);
        let name = rest.get(code_bytes..)?;
        // A name is short: looking for its end stays cheap however often it is tried.
        let name = name.get(..LONGEST + 1).unwrap_or(name);
        if whole_code && memchr(0, name).is_some_and(|end| names_a_record(&name[..end])) {
            return Some(Resumed { at, whole: false });
        }
        at += 1;
    }
}

fn next_binary_variable(bytes: &[u8], wide: bool, bad_at: usize) -> Option<usize> {
    let begin: &[u8] = if wide { b"\x09\0$" } else { b"\x09$" };
    let rest = bytes.get(bad_at.saturating_add(1)..)?;
    let at = memchr::memmem::find(rest, begin)?;
    Some(bad_at.saturating_add(1).saturating_add(at))
}

const LONGEST: usize = 40;

/// Whether this is how records are named: capitals, digits and underscores, with a letter among them.
fn names_a_record(name: &[u8]) -> bool {
    (3..=LONGEST).contains(&name.len())
        && name.iter().any(u8::is_ascii_uppercase)
        && name
            .iter()
            .all(|b| b.is_ascii_uppercase() || b.is_ascii_digit() || *b == b'_')
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn an_empty_line_too_many_is_passed_over_alone() {
        let text = b"\n \n 10\n1.0\n 0\nLINE\n";
        let found = resume(text, Form::Ascii, 0);
        assert_eq!(found, Some(Resumed { at: 3, whole: true }));
    }

    #[test]
    fn behind_anything_else_the_next_record_is_looked_for() {
        let text = b"oops\n 10\n0\n 20\n  0\nLINE\n  8\n0\n";
        let found = resume(text, Form::Ascii, 0).expect("a record");
        assert!(text[found.at..].starts_with(b"  0\nLINE") && !found.whole);
        let out_of_step = b"\n1.0\n 10\n  0\nLINE\n";
        let found = resume(out_of_step, Form::Ascii, 0).expect("a record");
        assert!(out_of_step[found.at..].starts_with(b"  0\nLINE") && !found.whole);
        assert_eq!(resume(b"oops\n1\n0\n", Form::Ascii, 0), None);
    }

    #[test]
    fn in_a_header_the_next_variable_is_looked_for() {
        let text = b"oops\n 70\n9\n  9\n$INSUNITS\n 70\n6\n  0\nENDSEC\n";
        let found = resume_in_header(text, Form::Ascii, 0).expect("a variable");
        assert!(text[found.at..].starts_with(b"  9\n$INSUNITS") && !found.whole);
        let last = b"oops\n 70\n9\n  0\nENDSEC\n  9\n$X\n";
        let found = resume_in_header(last, Form::Ascii, 0).expect("a record");
        assert!(last[found.at..].starts_with(b"  0\nENDSEC"));
        let wide = b"\x7f\x7f\x09\0$A\0\0\0ENDSEC\0";
        let found = resume_in_header(wide, Form::Binary { wide: true }, 0);
        assert_eq!(found.map(|r| r.at), Some(2));
        let narrow = b"\x7f\0ENDSEC\0\x09$A\0";
        let found = resume_in_header(narrow, Form::Binary { wide: false }, 0);
        assert_eq!(found.map(|r| r.at), Some(1));
    }

    #[test]
    fn binary_records_are_found_by_their_names() {
        let wide = b"\x7f\x7f\0\0ab\0\0\0LINE\0\x08\0A\0";
        let found = resume(wide, Form::Binary { wide: true }, 0);
        assert_eq!(found.map(|r| r.at), Some(7));
        let narrow = b"\x7f\0ab\0\0LINE\0\x08A\0";
        let found = resume(narrow, Form::Binary { wide: false }, 0);
        assert_eq!(found.map(|r| r.at), Some(5));
    }
}
