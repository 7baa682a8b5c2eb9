//! Cells, and tables of them.

use crate::floor::{EndKind, PointKind, Run};
use crate::report::plain;
use crate::report::record::EndRecord;
use crate::units::Unit;

/// A text cell. A spreadsheet runs a cell that begins as a formula does, and this text may come from the drawing: an
/// apostrophe keeps it text. Control characters are written out, line ends kept.
pub(super) fn text(content: &str) -> String {
    let lines: Vec<String> = content.split('\n').map(plain).collect();
    let shown = lines.join("\n");
    // Blanks before the sign do not stop every spreadsheet.
    if shown.trim_start().starts_with(['=', '+', '-', '@']) {
        format!("'{shown}")
    } else {
        shown
    }
}

/// A number cell, empty where the number is not known; zero without a sign.
pub(super) fn rounded(value: Option<f64>, decimals: usize) -> String {
    value.map_or(String::new(), |value| {
        let cell = format!("{value:.decimals$}");
        let zero = cell.chars().all(|c| matches!(c, '-' | '0' | '.'));
        if zero {
            cell.trim_start_matches('-').to_owned()
        } else {
            cell
        }
    })
}

/// A number cell in this unit, empty where the number is not known.
pub(super) fn figure(unit: Unit, value: Option<f64>, decimals: usize) -> String {
    value.map_or(String::new(), |value| unit.figure(value, decimals))
}

/// Banded or distributed.
pub(super) fn run(run: Run) -> &'static str {
    match run {
        Run::Banded => "banded",
        Run::Distributed => "distributed",
    }
}

/// Live or dead, empty where it is not known.
pub(super) fn end_kind(end: &EndRecord) -> &'static str {
    match end.kind {
        Some(EndKind::Live) => "live",
        Some(EndKind::Dead) => "dead",
        None => "",
    }
}

/// What a point is.
pub(super) fn point_kind(kind: PointKind) -> &'static str {
    match kind {
        PointKind::Anchor => "anchor",
        PointKind::High => "high",
        PointKind::Low => "low",
        PointKind::Support => "support",
    }
}

/// Header and rows as a table.
pub(super) fn written<S: AsRef<str>>(
    header: &[S],
    rows: impl Iterator<Item = Vec<String>>,
) -> String {
    let mut writer = ::csv::WriterBuilder::new()
        .terminator(::csv::Terminator::CRLF)
        .flexible(true)
        .from_writer(Vec::new());
    // Writing into memory cannot fail, and rows of any length are taken.
    let mut write = |row: &mut dyn Iterator<Item = &str>| writer.write_record(row).ok();
    write(&mut header.iter().map(AsRef::as_ref));
    for row in rows {
        write(&mut row.iter().map(String::as_str));
    }
    let bytes = writer.into_inner().unwrap_or_default();
    String::from_utf8(bytes).unwrap_or_default()
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_cell_that_a_spreadsheet_would_run_is_kept_text() {
        for evil in ["=1+1", "+1", "-1", "@SUM(A1)", " =1", "\n=1"] {
            assert_eq!(text(evil), format!("'{evil}"));
        }
        assert_eq!(text("\t=1"), "\\t=1");
        assert_eq!(text("D012"), "D012");
    }

    #[test]
    fn numbers_are_rounded_and_zero_has_no_sign() {
        assert_eq!(rounded(Some(-0.0004), 3), "0.000");
        assert_eq!(rounded(Some(-0.0006), 3), "-0.001");
        assert_eq!(rounded(None, 3), "");
    }

    #[test]
    fn cells_are_quoted_where_they_must_be() {
        let row = vec![
            "a,b".to_owned(),
            "say \"x\"".to_owned(),
            "two\nlines".to_owned(),
        ];
        let made = written(&["p", "q", "r"].map(str::to_owned), std::iter::once(row));
        assert_eq!(
            made,
            "p,q,r\r\n\"a,b\",\"say \"\"x\"\"\",\"two\nlines\"\r\n"
        );
    }
}
