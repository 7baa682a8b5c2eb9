//! Handles as they are met in one pass: which is the greatest, and whether the drawing uses any.

/// A handle's number: hexadecimal, blanks around it allowed; `None` for what is no handle, and for zero.
pub(super) fn parse_handle(word: &[u8]) -> Option<u64> {
    let word = word.trim_ascii();
    let word = match word.iter().position(|b| *b != b'0') {
        Some(first) => word.get(first..)?,
        None => return None,
    };
    if word.len() > 16 {
        return None;
    }
    let mut number = 0_u64;
    for byte in word {
        let digit = match byte {
            b'0'..=b'9' => byte - b'0',
            b'a'..=b'f' => byte - b'a' + 10,
            b'A'..=b'F' => byte - b'A' + 10,
            _ => return None,
        };
        number = number << 4 | u64::from(digit);
    }
    Some(number)
}

/// Whether a group's value is a handle, or a pointer to a record.
#[inline]
pub(super) fn names_a_handle(code: i32) -> bool {
    matches!(code, 5 | 105) || is_pointer(code)
}

/// Whether a group's value is a pointer to a record; of the owners (330 to 339) most are.
#[inline]
pub(super) fn is_pointer(code: i32) -> bool {
    matches!(code, 320..=369 | 390..=399 | 480 | 481 | 1005)
}

/// What a pass has met so far.
#[derive(Debug, Default)]
pub(super) struct Handles {
    /// Greatest handle or pointer of the settled records that are not this tool's own.
    pub(super) greatest: u64,
    /// Least and greatest handle of this tool's own records.
    pub(super) own_range: Option<(u64, u64)>,
    /// Greatest of the record at hand, with pointers.
    open: u64,
    /// Least and greatest of the record at hand, handles only.
    open_range: Option<(u64, u64)>,
    entities: bool,
    broken_entities: bool,
    others: bool,
}

impl Handles {
    /// Takes a record's own handle.
    #[inline]
    pub(super) fn own(&mut self, word: &[u8]) {
        if let Some(handle) = parse_handle(word) {
            self.open = self.open.max(handle);
            self.open_range = Some(match self.open_range {
                Some((least, greatest)) => (least.min(handle), greatest.max(handle)),
                None => (handle, handle),
            });
        }
    }

    /// Takes a pointer to another record.
    #[inline]
    pub(super) fn pointer(&mut self, word: &[u8]) {
        if let Some(handle) = parse_handle(word) {
            self.open = self.open.max(handle);
        }
    }

    /// Takes what may be handles in a stretch that is passed over: nothing new may have one of them.
    pub(super) fn passed_over(&mut self, handles: &[u64]) {
        let greatest = handles.iter().copied().max().unwrap_or(0);
        self.greatest = self.greatest.max(greatest);
    }

    /// Closes a record that is no entity.
    pub(super) fn settle(&mut self, own: bool) {
        self.others |= self.open_range.is_some();
        self.close(own);
    }

    /// Closes an entity with its followers; `handle` is what its group 5 says.
    pub(super) fn settle_entity(&mut self, own: bool, handle: Option<&[u8]>) {
        if !own {
            let valid = handle.is_some_and(|word| parse_handle(word).is_some());
            self.entities |= valid;
            self.broken_entities |= handle.is_some() && !valid;
        }
        self.close(own);
    }

    fn close(&mut self, own: bool) {
        if own {
            if let Some((least, greatest)) = self.open_range {
                self.own_range = Some(match self.own_range {
                    Some((low, high)) => (low.min(least), high.max(greatest)),
                    None => (least, greatest),
                });
            }
        } else {
            self.greatest = self.greatest.max(self.open);
        }
        self.open = 0;
        self.open_range = None;
    }

    /// Whether a drawing that may do without handles uses them: its entities have them, or nothing but tables and
    /// objects has them; empty ones mean that it does not.
    pub(super) fn in_use(&self) -> bool {
        self.entities || (self.others && !self.broken_entities)
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn handles_may_be_padded_and_of_any_case() {
        assert_eq!(parse_handle(b" 00a1 "), Some(0xA1));
        assert_eq!(parse_handle(b"FFFFFFFFFFFFFFFF"), Some(u64::MAX));
        for word in [&b""[..], b"0", b"DOT", b"10000000000000000"] {
            assert_eq!(parse_handle(word), None);
        }
    }

    #[test]
    fn own_records_do_not_count() {
        let mut handles = Handles::default();
        handles.own(b"10");
        handles.pointer(b"20");
        handles.settle_entity(false, Some(b"10"));
        handles.own(b"99");
        handles.settle_entity(true, Some(b"99"));
        assert_eq!(
            (handles.greatest, handles.own_range),
            (0x20, Some((0x99, 0x99)))
        );
    }
}
