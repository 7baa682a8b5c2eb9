//! A small table for a terminal, and texts made fit for one.

/// Which side of its column a cell stands on.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Align {
    /// Words.
    Left,
    /// Numbers.
    Right,
}

/// Cells wider than this stand out of their column: no name in a drawing makes every row as long as itself.
const WIDEST: usize = 80;

/// Rows of cells in columns as wide as their widest cell, counted in characters, up to a bound; two blanks between
/// columns, none at a line's end. The first row is the header.
pub fn table(aligns: &[Align], rows: &[Vec<String>]) -> String {
    let widths: Vec<usize> = (0..aligns.len())
        .map(|column| {
            rows.iter()
                .filter_map(|row| row.get(column))
                .map(|cell| cell.chars().count())
                .max()
                .unwrap_or(0)
                .min(WIDEST)
        })
        .collect();
    let mut text = String::new();
    for row in rows {
        let cells: Vec<String> = row
            .iter()
            .zip(aligns)
            .zip(&widths)
            .map(|((cell, align), &width)| match align {
                Align::Left => format!("{cell:<width$}"),
                Align::Right => format!("{cell:>width$}"),
            })
            .collect();
        text.push_str("  ");
        text.push_str(cells.join("  ").trim_end());
        text.push('\n');
    }
    text
}

/// A text from a drawing as a terminal may show it: control characters and those that turn the reading direction are
/// written out, so that no drawing can move the cursor or hide words.
pub fn plain(text: &str) -> String {
    let mut shown = String::with_capacity(text.len());
    for c in text.chars() {
        let turns = matches!(c, '\u{200e}' | '\u{200f}' | '\u{202a}'..='\u{202e}' | '\u{2066}'..='\u{2069}');
        if c.is_control() || turns {
            shown.extend(c.escape_default());
        } else {
            shown.push(c);
        }
    }
    shown
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn columns_are_as_wide_as_their_widest_cell_in_characters() {
        let rows = [["mark", "m"], ["É1", "12.0"], ["B10", "7"]]
            .map(|row| row.map(str::to_owned).to_vec());
        assert_eq!(
            table(&[Align::Left, Align::Right], &rows),
            "  mark     m\n  É1    12.0\n  B10      7\n"
        );
    }

    #[test]
    fn one_long_name_does_not_widen_every_row() {
        let rows = ["x", &"y".repeat(100_000)].map(|name| vec![name.to_owned(), "1".to_owned()]);
        let text = table(&[Align::Left, Align::Right], &rows);
        assert!(text.len() < 101_000, "{}", text.len());
    }

    #[test]
    fn control_characters_are_written_out() {
        assert_eq!(plain("D1\u{1b}[31m\n"), "D1\\u{1b}[31m\\n");
        assert_eq!(plain("D\u{202e}1 °"), "D\\u{202e}1 °");
    }
}
