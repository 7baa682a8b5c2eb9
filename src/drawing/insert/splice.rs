//! Changes to a file's bytes, applied in one go.

use std::borrow::Cow;
use std::ops::Range;

/// Changes by their place in the original; nothing else moves.
#[derive(Debug, Clone, Default)]
pub(super) struct Splice {
    changes: Vec<(Range<usize>, Vec<u8>)>,
}

impl Splice {
    /// Puts bytes in at an offset; what is put in at one offset stands in the order of the calls.
    pub(super) fn insert(&mut self, at: usize, bytes: Vec<u8>) {
        self.replace(at..at, bytes);
    }

    /// Puts bytes in the place of others.
    pub(super) fn replace(&mut self, range: Range<usize>, bytes: Vec<u8>) {
        if !range.is_empty() || !bytes.is_empty() {
            self.changes.push((range, bytes));
        }
    }

    /// The changed file as pieces of the original and what was put between them: nothing is copied. Changes must not
    /// overlap; of two that do, the later one keeps what the earlier took away.
    pub(super) fn pieces(mut self, original: &[u8]) -> Vec<Cow<'_, [u8]>> {
        // Stable, and an insertion stands before the removal that begins where it stands.
        self.changes
            .sort_by_key(|(range, _)| (range.start, range.end));
        let mut pieces = Vec::with_capacity(2 * self.changes.len() + 1);
        let mut copied = 0;
        for (range, bytes) in self.changes {
            pieces.push(Cow::Borrowed(
                original.get(copied..range.start).unwrap_or_default(),
            ));
            pieces.push(Cow::Owned(bytes));
            copied = copied.max(range.end);
        }
        pieces.push(Cow::Borrowed(original.get(copied..).unwrap_or_default()));
        pieces
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn changes_apply_in_the_order_of_the_file_and_of_the_calls() {
        let mut splice = Splice::default();
        splice.insert(9, b"<1>".to_vec());
        splice.replace(2..4, b"<2>".to_vec());
        splice.insert(9, b"<3>".to_vec());
        splice.replace(6..9, Vec::new());
        splice.insert(0, b"<4>".to_vec());
        assert_eq!(splice.pieces(b"012345678").concat(), b"<4>01<2>45<1><3>");
    }

    #[test]
    fn the_original_is_not_copied() {
        let mut splice = Splice::default();
        splice.replace(1..2, b"four".to_vec());
        let pieces = splice.pieces(b"abc");
        assert_eq!(pieces.concat(), b"afourc");
        assert!(matches!(
            pieces.as_slice(),
            [Cow::Borrowed(_), Cow::Owned(_), Cow::Borrowed(_)]
        ));
    }
}
