//! The drawing's unit: what the job says, else the header, else millimetres.

use crate::drawing::UnitFrom;
use crate::drawing::rules::UNIT_ASSUMED;
use crate::drawing::scan::Scan;
use crate::finding::{Finding, Level};
use crate::units::LengthUnit;

/// Metres in a drawing unit, and who says so.
pub(super) fn unit_of(scan: &Scan, unit: Option<LengthUnit>) -> (f64, UnitFrom) {
    if let Some(unit) = unit {
        return (unit.metres(), UnitFrom::Job);
    }
    match scan.insunits.and_then(metres_of) {
        Some(unit_m) => (unit_m, UnitFrom::Header),
        None => (LengthUnit::Mm.metres(), UnitFrom::Assumed),
    }
}

/// A finding where nobody says it.
pub(super) fn unit_finding(scan: &Scan, from: UnitFrom) -> Option<Finding> {
    let header = match scan.insunits {
        None => "the drawing has no $INSUNITS".to_owned(),
        Some(number) => {
            format!("$INSUNITS of the drawing is {number}, which names no unit of plans")
        }
    };
    let over = scan.passed_over.as_ref();
    let lost = scan.insunits.is_none() && over.is_some_and(|over| over.in_header);
    let (level, header) = if lost {
        let header = "the header of the drawing is damaged, and its $INSUNITS was not found";
        (Level::Error, header.to_owned())
    } else {
        (Level::Note, header)
    };
    let finding = Finding::new(
        &UNIT_ASSUMED,
        level,
        format!("{header}; millimetres are assumed"),
        "set the drawing's unit in the job file",
    );
    (from == UnitFrom::Assumed).then_some(finding)
}

/// Metres in a unit by its `$INSUNITS` number (DXF reference); `None` for none and for what no plan is drawn in.
fn metres_of(insunits: i64) -> Option<f64> {
    Some(match insunits {
        1 => LengthUnit::In.metres(),
        2 => LengthUnit::Ft.metres(),
        4 => LengthUnit::Mm.metres(),
        5 => LengthUnit::Cm.metres(),
        6 => LengthUnit::M.metres(),
        7 => 1000.0,
        10 => 0.9144,
        14 => 0.1,
        15 => 10.0,
        16 => 100.0,
        // US survey foot: 1200/3937 m.
        21 => 1200.0 / 3937.0,
        _ => return None,
    })
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::drawing::{Drawing, Wanted, open, read};

    fn with_unit(header: &str, unit: Option<LengthUnit>) -> (Drawing, Vec<Finding>) {
        let text = format!(
            "0 SECTION 2 HEADER {header} 0 ENDSEC 0 SECTION 2 ENTITIES
             0 LINE 8 0 10 0 20 0 11 2 21 0 0 ENDSEC 0 EOF"
        );
        let lines = text.split_whitespace().collect::<Vec<_>>().join("\n");
        let source = open(lines.into_bytes()).expect("a drawing");
        read(&source, &Wanted::everything(), unit)
    }

    #[test]
    fn the_job_goes_before_the_header_and_the_header_before_millimetres() {
        for (header, unit, length_m, from) in [
            (
                "9 $INSUNITS 70 6",
                Some(LengthUnit::Ft),
                0.6096,
                UnitFrom::Job,
            ),
            ("9 $INSUNITS 70 6", None, 2.0, UnitFrom::Header),
            ("9 $INSUNITS 70 1", None, 0.0508, UnitFrom::Header),
            ("9 $INSUNITS 70 2", None, 0.6096, UnitFrom::Header),
            ("9 $INSUNITS 70 5", None, 0.02, UnitFrom::Header),
            ("9 $INSUNITS 70 14", None, 0.2, UnitFrom::Header),
            ("9 $INSUNITS 70 0", None, 0.002, UnitFrom::Assumed),
            ("9 $INSUNITS 70 12", None, 0.002, UnitFrom::Assumed),
            ("", None, 0.002, UnitFrom::Assumed),
        ] {
            let (drawing, findings) = with_unit(header, unit);
            assert_eq!(drawing.unit_from, from, "{header}");
            assert!(
                (drawing.shapes[0].path.length_m() - length_m).abs() < 1e-12,
                "{header}"
            );
            let said = findings
                .iter()
                .any(|finding| finding.rule.name == "unit-assumed");
            assert_eq!(said, from == UnitFrom::Assumed, "{header}");
        }
    }
}
