//! The drawing's unit: what the job says, else the header, else millimetres.

use crate::drawing::rules::UNIT_ASSUMED;
use crate::drawing::scan::Scan;
use crate::drawing::{UnitFrom, Unsaid};
use crate::finding::{Finding, Level};
use crate::units::LengthUnit;

/// Metres in a drawing unit, and who says so.
pub(super) fn unit_of(scan: &Scan, unit: Option<LengthUnit>) -> (f64, UnitFrom) {
    if let Some(unit) = unit {
        return (unit.metres(), UnitFrom::Job);
    }
    match in_header(scan) {
        Ok(unit_m) => (unit_m, UnitFrom::Header),
        Err(unsaid) => (LengthUnit::Mm.metres(), UnitFrom::Assumed(unsaid)),
    }
}

/// A finding where nobody says it.
pub(super) fn unit_finding(from: UnitFrom) -> Option<Finding> {
    let UnitFrom::Assumed(unsaid) = from else {
        return None;
    };
    let level = match unsaid {
        Unsaid::Absent | Unsaid::NoUnit(0) => Level::Note,
        Unsaid::NoNumber | Unsaid::NoUnit(_) | Unsaid::NoPlans { .. } => Level::Warning,
        Unsaid::Lost => Level::Error,
    };
    Some(Finding::new(
        &UNIT_ASSUMED,
        level,
        format!("{unsaid}; millimetres are assumed"),
        "set the drawing's unit in the job file",
    ))
}

fn in_header(scan: &Scan) -> Result<f64, Unsaid> {
    let over = scan.passed_over.as_ref();
    match scan.insunits {
        Err(Unsaid::Absent) if over.is_some_and(|over| over.in_header) => Err(Unsaid::Lost),
        said => said.and_then(metres_of),
    }
}

/// Metres in a unit by its `$INSUNITS` number (DXF reference).
fn metres_of(number: i64) -> Result<f64, Unsaid> {
    let no_plans = |name| Err(Unsaid::NoPlans { number, name });
    Ok(match number {
        1 => LengthUnit::In.metres(),
        2 => LengthUnit::Ft.metres(),
        3 => return no_plans("miles"),
        4 => LengthUnit::Mm.metres(),
        5 => LengthUnit::Cm.metres(),
        6 => LengthUnit::M.metres(),
        7 => 1000.0,
        8 => return no_plans("microinches"),
        9 => return no_plans("mils"),
        10 => YARD_M,
        11 => return no_plans("angstroms"),
        12 => return no_plans("nanometres"),
        13 => return no_plans("microns"),
        14 => 0.1,
        15 => 10.0,
        16 => 100.0,
        17 => return no_plans("gigametres"),
        18 => return no_plans("astronomical units"),
        19 => return no_plans("light years"),
        20 => return no_plans("parsecs"),
        21 => SURVEY_FOOT_M,
        22 => SURVEY_FOOT_M / 12.0,
        23 => 3.0 * SURVEY_FOOT_M,
        24 => return no_plans("US survey miles"),
        _ => return Err(Unsaid::NoUnit(number)),
    })
}

const YARD_M: f64 = 0.9144;
/// The US survey foot (Mendenhall order of 1893: a metre is 39.37 inches).
const SURVEY_FOOT_M: f64 = 1200.0 / 3937.0;

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
        let assumed = UnitFrom::Assumed;
        let no_plans = |number, name| UnitFrom::Assumed(Unsaid::NoPlans { number, name });
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
            ("9 $INSUNITS 70 22", None, 200.0 / 3937.0, UnitFrom::Header),
            ("9 $INSUNITS 70 23", None, 7200.0 / 3937.0, UnitFrom::Header),
            ("9 $INSUNITS 70 0", None, 0.002, assumed(Unsaid::NoUnit(0))),
            (
                "9 $INSUNITS 70 99",
                None,
                0.002,
                assumed(Unsaid::NoUnit(99)),
            ),
            ("9 $INSUNITS 70 12", None, 0.002, no_plans(12, "nanometres")),
            (
                "9 $INSUNITS 70 24",
                None,
                0.002,
                no_plans(24, "US survey miles"),
            ),
            ("9 $INSUNITS 70 m", None, 0.002, assumed(Unsaid::NoNumber)),
            ("", None, 0.002, assumed(Unsaid::Absent)),
        ] {
            let (drawing, findings) = with_unit(header, unit);
            assert_eq!(drawing.unit_from, from, "{header}");
            assert!(
                (drawing.shapes[0].path.length_m() - length_m).abs() < 1e-12,
                "{header}"
            );
            let said = findings.iter().find(|f| f.rule.name == "unit-assumed");
            match from {
                UnitFrom::Assumed(unsaid) => {
                    let said = said.expect(header).text.to_string();
                    assert!(said.starts_with(&unsaid.to_string()), "{said}");
                }
                _ => assert!(said.is_none(), "{header}"),
            }
        }
    }
}
