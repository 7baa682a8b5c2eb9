//! How a drawing writes its characters: UTF-8 from R2007 on, the header's code page before.

use std::borrow::Cow;

use encoding_rs::{
    BIG5, EUC_KR, Encoding, GBK, SHIFT_JIS, UTF_8, WINDOWS_874, WINDOWS_1250, WINDOWS_1251,
    WINDOWS_1252, WINDOWS_1253, WINDOWS_1254, WINDOWS_1255, WINDOWS_1256, WINDOWS_1257,
    WINDOWS_1258,
};

use super::release;

/// How a drawing's strings turn into characters.
#[derive(Debug, Clone)]
pub(super) struct CodePage {
    encoding: &'static Encoding,
    /// What the header names, whatever the drawing's texts are written in: `%%nnn` means this one.
    named: &'static Encoding,
    /// What the header names, if it is not known here or if nothing is named; then 8-bit text is a guess.
    pub(super) unsure_of: Option<String>,
    /// UTF-8 is tried first: nothing in the file says which code page it is, and hardly any other text looks like it.
    tries_utf8: bool,
}

impl CodePage {
    /// The code page of a drawing with this `$ACADVER` (empty if absent) and `$DWGCODEPAGE`.
    pub(super) fn of(version: &str, named: Option<&str>) -> Self {
        let known = named.and_then(by_name);
        let utf8 = release::number(version) >= release::R2007;
        let encoding = if utf8 {
            UTF_8
        } else {
            known.unwrap_or(WINDOWS_1252)
        };
        let unsure_of = (!utf8 && known.is_none()).then(|| named.unwrap_or("no code page").into());
        Self {
            encoding,
            named: known.unwrap_or(WINDOWS_1252),
            unsure_of,
            tries_utf8: !utf8 && (version.is_empty() || known.is_none()),
        }
    }

    /// A text with the codes `%%128` to `%%255` as the characters that the header's code page has there.
    pub(super) fn numbered<'a>(&self, text: Cow<'a, str>) -> Cow<'a, str> {
        if !text.contains("%%1") && !text.contains("%%2") {
            return text;
        }
        let mut out = String::with_capacity(text.len());
        let mut rest = text.as_ref();
        while let Some(at) = rest.find("%%") {
            let (before, code) = rest.split_at(at);
            out.push_str(before);
            let digits = code.get(2..5);
            let byte = digits.and_then(|digits| digits.parse::<u8>().ok());
            let character = byte.filter(|byte| *byte > 127).and_then(|byte| {
                let bytes = [byte];
                let (character, failed) = self.named.decode_without_bom_handling(&bytes);
                (!failed).then(|| character.into_owned())
            });
            let length = match &character {
                Some(character) => {
                    out.push_str(character);
                    5
                }
                // The sign behind belongs to the code: `%%%` is a percent sign.
                None => {
                    2 + code
                        .get(2..)
                        .and_then(|r| r.chars().next())
                        .map_or(0, char::len_utf8)
                }
            };
            if character.is_none() {
                out.push_str(code.get(..length).unwrap_or(code));
            }
            rest = code.get(length..).unwrap_or_default();
        }
        out.push_str(rest);
        Cow::Owned(out)
    }

    /// The characters of a string, and whether they are a guess: 8-bit text of an unknown page, or bytes that the
    /// page does not have.
    pub(super) fn decode<'a>(&self, bytes: &'a [u8]) -> (Cow<'a, str>, bool) {
        if bytes.is_ascii() {
            return (String::from_utf8_lossy(bytes), false);
        }
        if self.tries_utf8
            && let Ok(text) = std::str::from_utf8(bytes)
        {
            return (Cow::Borrowed(text), false);
        }
        let (text, failed) = self.encoding.decode_without_bom_handling(bytes);
        if failed {
            let (text, _) = WINDOWS_1252.decode_without_bom_handling(bytes);
            return (text, true);
        }
        (text, self.unsure_of.is_some())
    }
}

/// The encoding that `$DWGCODEPAGE` names; DOS pages are not among them.
fn by_name(name: &str) -> Option<&'static Encoding> {
    let name = name.trim().to_ascii_uppercase();
    let number = name
        .strip_prefix("ANSI_")
        .or_else(|| name.strip_prefix("DOS"))
        .unwrap_or(&name);
    Some(match number {
        "874" => WINDOWS_874,
        "932" => SHIFT_JIS,
        "936" | "GB2312" => GBK,
        "949" | "KSC5601" => EUC_KR,
        "950" | "BIG5" => BIG5,
        "1250" => WINDOWS_1250,
        "1251" => WINDOWS_1251,
        "1252" => WINDOWS_1252,
        "1253" => WINDOWS_1253,
        "1254" => WINDOWS_1254,
        "1255" => WINDOWS_1255,
        "1256" => WINDOWS_1256,
        "1257" => WINDOWS_1257,
        "1258" => WINDOWS_1258,
        "UTF-8" | "UTF8" => UTF_8,
        _ => return None,
    })
}

/// The encoding of `\M+nXXXX`: n from 1 to 5.
pub(super) fn multibyte(number: u8) -> Option<&'static Encoding> {
    Some(match number {
        1 => SHIFT_JIS,
        2 => BIG5,
        3 | 4 => EUC_KR,
        5 => GBK,
        _ => return None,
    })
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_header_decides_below_r2007_and_utf8_from_then_on() {
        let page = CodePage::of("AC1015", Some("ANSI_1251"));
        assert_eq!(page.decode(b"\xCF\xEB\xE0\xED"), ("План".into(), false));
        let page = CodePage::of("AC1021", Some("ANSI_1251"));
        assert_eq!(page.decode("План".as_bytes()), ("План".into(), false));
        assert_eq!(page.decode(b"\xE9"), ("é".into(), true));
    }

    #[test]
    fn codes_by_number_are_of_the_page_that_the_header_names() {
        for version in ["AC1015", "AC1027"] {
            let page = CodePage::of(version, Some("ANSI_1251"));
            for (text, shown) in [
                ("%%200x", "Иx"),
                ("100%%%200", "100%%%200"),
                ("%%d%%200%%065%%", "%%dИ%%065%%"),
                ("%%+99 %%2", "%%+99 %%2"),
            ] {
                assert_eq!(page.numbered(text.into()), shown);
            }
        }
        assert_eq!(CodePage::of("AC1015", None).numbered("%%200".into()), "È");
    }

    #[test]
    fn an_unknown_page_is_a_guess_only_where_it_matters() {
        let page = CodePage::of("AC1009", Some("dos850"));
        assert_eq!(page.decode(b"T350"), ("T350".into(), false));
        assert!(page.decode(b"\x81").1);
        let silent = CodePage::of("", None);
        assert_eq!(silent.decode("ü".as_bytes()), ("ü".into(), false));
    }
}
