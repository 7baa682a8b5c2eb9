//! The result as JSON, `tautplan-result/1`: SI, full precision, null where unknown.

use serde::Serialize;
use serde::ser::{SerializeMap, Serializer};
use serde_json::Value;

use super::DrawingFacts;
use super::record::{FindingRecord, TendonRecord, number};
use crate::analysis::{Analysis, pair};

/// Name and number of the shape of the result; the number rises when a reader would have to change.
const SCHEMA: &str = "tautplan-result/1";

#[derive(Serialize)]
struct Result<'a> {
    schema: &'static str,
    drawing: Drawing<'a>,
    #[serde(serialize_with = "in_order")]
    inputs: &'a [(String, Value)],
    assumptions: Vec<String>,
    tendons: Vec<TendonRecord<'a>>,
    findings: Vec<FindingRecord<'a>>,
}

#[derive(Serialize)]
struct Drawing<'a> {
    file: &'a str,
    version: &'a str,
    unit_m: Option<f64>,
}

/// The whole result as indented JSON with a newline at its end; `inputs` are the job's values by key, kept in order.
pub fn json(facts: &DrawingFacts, inputs: &[(String, Value)], analysis: &Analysis) -> String {
    let result = Result {
        schema: SCHEMA,
        drawing: Drawing {
            file: &facts.file,
            version: &facts.version,
            unit_m: number(facts.unit_m),
        },
        inputs,
        assumptions: analysis.all_assumptions(),
        tendons: pair(analysis)
            .map(|(tendon, result)| TendonRecord::of(tendon, result))
            .collect(),
        findings: analysis.findings.iter().map(FindingRecord::of).collect(),
    };
    // Strings, numbers and lists only: nothing in a result can fail to be written.
    let mut text = serde_json::to_string_pretty(&result).unwrap_or_default();
    text.push('\n');
    text
}

fn in_order<S: Serializer>(
    inputs: &&[(String, Value)],
    serializer: S,
) -> std::result::Result<S::Ok, S::Error> {
    let mut map = serializer.serialize_map(Some(inputs.len()))?;
    for (key, value) in *inputs {
        map.serialize_entry(key, value)?;
    }
    map.end()
}
