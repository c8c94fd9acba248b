//! `layshaft/results`: what a panel beside the text shows. A request of our own; its form stands in `crates/lsp/README.md`
//! and only grows.

use layshaft_ide::results::{self, Case, Criterion, Part, Picture, Point, Query, Results};
use layshaft_report::json::{entry, number, shown};
use serde::Deserialize;
use serde_json::{Value, json};
use tower_lsp::jsonrpc::Result;
use tower_lsp::lsp_types::TextDocumentPositionParams;

use crate::core::Core;
use crate::handlers::{Asked, SPEC};

/// What a panel asks for.
#[derive(Debug, Deserialize)]
#[serde(rename_all = "camelCase")]
pub struct ResultsParams {
    #[serde(flatten)]
    at: TextDocumentPositionParams,
    drive: Option<String>,
    case: Option<String>,
    gear: Option<String>,
    station: Option<String>,
}

/// The drive under the cursor, in one case, at one station.
pub fn asked(core: &mut Core, params: ResultsParams) -> Result<Option<Value>> {
    let (asked, offset) = Asked::at(core, &params.at)?;
    let query = Query {
        drive: params.drive.as_deref(),
        case: params.case.as_deref(),
        gear: params.gear.as_deref(),
        station: params.station.as_deref(),
    };
    let version = core.specs.documents.get(&asked.uri).map(|document| document.version);
    Ok(results::results(&asked.snapshot, SPEC, offset, query).map(|found| {
        let mut answer = answer(core, &asked, &found);
        answer["uri"] = json!(asked.uri);
        answer["version"] = json!(version);
        answer
    }))
}

fn answer(core: &Core, asked: &Asked, found: &Results) -> Value {
    json!({
        "schema": "results/1",
        "drive": {
            "name": found.drive,
            "chain": found.chain,
            "underCursor": found.under_cursor,
            "location": asked.location(core, found.place),
        },
        "drives": found.drives,
        "cases": found.cases.iter().map(case).collect::<Vec<_>>(),
        "case": found.case,
        "stations": found.stations.iter().map(|station| json!({
            "part": station.part, "role": station.role, "kind": station.kind,
        })).collect::<Vec<_>>(),
        "station": found.station,
        "chart": found.chart.as_ref().map(chart),
        "noChart": found.no_chart,
        "results": found.parts.iter().map(part).collect::<Vec<_>>(),
        "criteria": found.criteria.iter().map(|one| criterion(core, asked, one)).collect::<Vec<_>>(),
    })
}

fn case(case: &Case) -> Value {
    json!({
        "label": case.label,
        "gear": case.gear,
        "changes": case.changes,
        "outcome": case.outcome,
        "moves": case.moves,
        "speed": entry(&case.speed),
        "verdict": case.verdict.map(results::verdict_word),
    })
}

fn chart(chart: &Picture) -> Value {
    let axis = |axis: &results::Axis| json!({ "kind": axis.kind, "unit": axis.unit });
    json!({
        "speed": axis(&chart.speed),
        "effort": axis(&chart.effort),
        "power": axis(&chart.power),
        "available": chart.available,
        "required": chart.required,
        "availablePower": chart.available_power,
        "points": chart.points.iter().map(point).collect::<Vec<_>>(),
        "continuous": chart.continuous.as_ref().map(number),
        "measured": chart.measured.as_ref().map(|(low, high)| json!({ "low": number(low), "high": number(high) })),
    })
}

fn point(point: &Point) -> Value {
    json!({
        "speed": number(&point.speed),
        "effort": number(&point.effort),
        "stability": point.stability,
        "mode": point.mode,
        "reached": point.reached,
    })
}

fn part(part: &Part) -> Value {
    let row =
        |row: &results::Row| json!({ "name": row.name, "meaning": row.meaning, "value": entry(&row.entry) });
    json!({ "part": part.name, "port": part.port, "rows": part.results.iter().map(row).collect::<Vec<_>>() })
}

fn criterion(core: &Core, asked: &Asked, criterion: &Criterion) -> Value {
    let line = &criterion.line;
    let outcome = |at: usize| {
        let of = line.outcomes.get(at)?;
        let margin = of.margin.as_ref().filter(|margin| margin.value.is_finite());
        Some(json!({
            "case": of.label,
            "verdict": results::verdict_word(of.verdict),
            "found": of.found.as_ref().map(shown),
            "low": of.low.as_ref().map(shown),
            "high": of.high.as_ref().map(shown),
            "margin": margin.map(|margin| json!({
                "value": margin.value, "absolute": margin.absolute, "shown": margin.text,
            })),
            "remark": of.remark,
        }))
    };
    json!({
        "clause": line.clause,
        "condition": line.condition,
        "required": line.required,
        "verdict": results::verdict_word(line.verdict),
        "location": asked.location(core, criterion.place),
        "here": criterion.here.iter().filter_map(|at| outcome(*at)).collect::<Vec<_>>(),
        "governing": line.governing.and_then(outcome),
    })
}
