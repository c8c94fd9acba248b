//! The JSON output against its committed schema, and the schema against what it promised: fields are only added.

use std::collections::BTreeSet;
use std::sync::Arc;

use layshaft_diagnostics::{Code, Diagnostic, FileId, FileSpan, LineIndex, Span};
use layshaft_report::json::{Checked, SCHEMA_TEXT, document};
use layshaft_semantics::Analysis;
use layshaft_semantics::analysis::{
    Accepted, Assumption, CaseRecord, CriterionOutcome, CriterionRecord, DriveCase, DriveRecord, Measure,
    ShowOutcome, ShowRecord, SourceFile, ValueRecord, Verdict,
};
use layshaft_semantics::quantity::{Datum, Quantity};
use serde_json::{Map, Value};

/// Every field of `check/1` so far. A line is never taken out of this file.
const PROMISED: &str = include_str!("../schema/check-1.fields");

/// What the schema says of the words that may stand in a schema here.
const KNOWN: &[&str] = &[
    "$schema",
    "$defs",
    "$ref",
    "title",
    "description",
    "type",
    "properties",
    "required",
    "items",
    "enum",
    "const",
    "minimum",
    "anyOf",
];

fn schema() -> Value {
    serde_json::from_str(SCHEMA_TEXT).expect("the schema is JSON")
}

fn members(value: &Value) -> &Map<String, Value> {
    value.as_object().expect("a schema is an object")
}

/// What a rule says of a value itself, leaving aside what is in it.
fn alone(rule: &Value, value: &Value, path: &str, wrong: &mut Vec<String>) {
    if rule.get("const").is_some_and(|only| only != value) {
        wrong.push(format!("{path}: {value} is not {}", rule["const"]));
    }
    if let Some(choices) = rule.get("enum").and_then(Value::as_array)
        && !choices.contains(value)
    {
        wrong.push(format!("{path}: {value} is none of the choices"));
    }
    if let Some(wanted) = rule.get("type") {
        let fits = |name: &Value| match name.as_str() {
            Some("string") => value.is_string(),
            Some("boolean") => value.is_boolean(),
            Some("number") => value.is_number(),
            Some("integer") => value.is_u64() || value.is_i64(),
            Some("array") => value.is_array(),
            Some("object") => value.is_object(),
            Some("null") => value.is_null(),
            other => panic!("unknown type {other:?}"),
        };
        let fitting = wanted.as_array().map_or_else(|| fits(wanted), |choices| choices.iter().any(fits));
        if !fitting {
            wrong.push(format!("{path}: {value} is not of type {wanted}"));
        }
    }
    if let (Some(least), Some(number)) = (rule.get("minimum").and_then(Value::as_f64), value.as_f64())
        && number < least
    {
        wrong.push(format!("{path}: {number} is below {least}"));
    }
}

/// Everything in which `value` differs from `rule`. Stricter than the schema itself: a field it does not name is a
/// mistake of ours.
fn check(root: &Value, rule: &Value, value: &Value, path: &str, wrong: &mut Vec<String>) {
    for word in members(rule).keys() {
        assert!(KNOWN.contains(&word.as_str()), "the check does not know the word `{word}` at {path}");
    }
    if let Some(target) = rule.get("$ref").and_then(Value::as_str) {
        let name = target.strip_prefix("#/$defs/").expect("a reference into $defs");
        return check(root, &root["$defs"][name], value, path, wrong);
    }
    if let Some(choices) = rule.get("anyOf").and_then(Value::as_array) {
        let fits = |choice: &Value| {
            let mut found = Vec::new();
            check(root, choice, value, path, &mut found);
            found
        };
        let all: Vec<Vec<String>> = choices.iter().map(fits).collect();
        if !all.iter().any(Vec::is_empty) {
            wrong.extend(all.into_iter().flatten());
        }
        return;
    }
    alone(rule, value, path, wrong);
    if let (Some(items), Some(list)) = (rule.get("items"), value.as_array()) {
        for (at, item) in list.iter().enumerate() {
            check(root, items, item, &format!("{path}[{at}]"), wrong);
        }
    }
    if let (Some(fields), Some(object)) = (rule.get("properties"), value.as_object()) {
        for name in rule["required"].as_array().into_iter().flatten().filter_map(Value::as_str) {
            if !object.contains_key(name) {
                wrong.push(format!("{path}: `{name}` is missing"));
            }
        }
        for (name, inner) in object {
            match fields.get(name) {
                Some(rule) => check(root, rule, inner, &format!("{path}.{name}"), wrong),
                None => wrong.push(format!("{path}: `{name}` is not in the schema")),
            }
        }
    }
}

fn mistakes(text: &str) -> Vec<String> {
    let value: Value = serde_json::from_str(text).expect("the output is JSON");
    let mut wrong = Vec::new();
    check(&schema(), &schema(), &value, "$", &mut wrong);
    wrong
}

/// The page for readers names no field and no choice that the output does not have.
#[test]
fn the_reference_page_speaks_of_what_is_there() {
    let page = include_str!("../../../grammar/json.md");
    let rows = page.lines().filter(|line| line.starts_with('|') || line.starts_with("A value"));
    let missing: Vec<&str> = rows
        .flat_map(|row| row.split('`').skip(1).step_by(2))
        .filter(|word| word.bytes().all(|byte| byte.is_ascii_lowercase() || byte == b'_'))
        .filter(|word| !["plain", "let"].contains(word) && !SCHEMA_TEXT.contains(&format!("\"{word}\"")))
        .collect();
    assert!(missing.is_empty(), "{missing:?} are not in the schema");
}

fn length(millimetres: f64) -> Datum {
    let ty = layshaft_units::kind("length").expect("a kind").ty();
    let unit = Some("mm".into());
    Datum::Quantity(Quantity {
        si: millimetres / 1000.0,
        ty,
        limits: Some((0.01, 0.02)),
        is_range: false,
        confidence: None,
        unit,
    })
}

fn criterion(place: FileSpan) -> CriterionRecord {
    let outcome = |verdict, margin| CriterionOutcome {
        case: 0,
        gear: Some(String::from("1")),
        verdict,
        measure: Some(Measure {
            found: length(14.9),
            low: Some(length(14.0)),
            high: None,
            margin,
            absolute: margin > 1.0,
        }),
        remark: Some(String::from("r")),
    };
    CriterionRecord {
        clause: String::from("A-1"),
        condition: String::from("x >= 14 mm"),
        place,
        condition_place: place,
        outcomes: vec![outcome(Verdict::Holds, 0.06), outcome(Verdict::Fails, f64::INFINITY)],
        governing: Some(0),
        verdict: Verdict::Fails,
    }
}

fn drive(place: FileSpan) -> DriveRecord {
    DriveRecord {
        name: String::from("d"),
        place,
        cases: vec![DriveCase {
            case: 0,
            gear: None,
            spec: None,
            solution: None,
            faults: Vec::new(),
            parts: Vec::new(),
        }],
        docs: Vec::new(),
    }
}

/// One of everything that can be made by hand.
fn full() -> Analysis {
    let text: Arc<str> = Arc::from("title \"é\u{1b}\"\nlet x = 5 mm\n");
    let place = FileSpan { file: FileId(0), span: Span::new(14, 26) };
    let found = Diagnostic::new(Code::Implausible, place, "m")
        .label("l")
        .related(FileSpan { file: FileId(7), span: Span::new(0, 9) }, "elsewhere")
        .note("n")
        .help("h")
        .fix("write `6 mm`", place, "6 mm");
    Analysis {
        files: vec![SourceFile {
            path: String::from("a.shaft"),
            lines: Arc::new(LineIndex::new(&text)),
            text,
            tree: Arc::default(),
        }],
        title: Some(String::from("é\u{1b}\u{202e}\u{e0001}")),
        revision: None,
        diagnostics: vec![found.clone()],
        values: vec![ValueRecord {
            name: String::from("x"),
            place,
            value_place: place,
            value: Some(length(5.0)),
            basis: Some(("from", String::from("order"))),
            docs: Vec::new(),
        }],
        parts: Vec::new(),
        cases: vec![CaseRecord {
            label: String::from("plain"),
            name: String::from("plain"),
            place,
            overrides: vec![(String::from("a.b"), String::from("1"))],
            changes: Vec::new(),
        }],
        drives: vec![drive(place)],
        criteria: vec![criterion(place)],
        shows: vec![ShowRecord {
            text: String::from("x"),
            place,
            outcomes: vec![ShowOutcome { case: 0, gear: None, value: Some(Datum::Flag(true)), remark: None }],
        }],
        assumptions: vec![Assumption {
            subject: String::from("s"),
            value: Some(Datum::Text("t".into())),
            reason: String::from("r"),
            by_tool: true,
            place: None,
        }],
        without_basis: vec![(String::from("y"), place)],
        accepted: vec![Accepted { diagnostic: found, because: String::from("b"), place }],
    }
}

#[test]
fn the_output_is_what_the_schema_says() {
    let analysis = full();
    let names = [String::from("specs/a.shaft")];
    let checked = Checked { analysis: &analysis, names: &names };
    let unread = [(String::from("b.shaft"), String::from("is not there"))];
    let text = document(&[checked, Checked { analysis: &Analysis::default(), names: &[] }], &unread);
    assert_eq!(mistakes(&text), Vec::<String>::new());
    let hostile = |c: char| layshaft_present::escape::is_hostile(c) && c != '\n';
    assert!(!text.chars().any(hostile), "what steers a terminal is escaped");
    let value: Value = serde_json::from_str(&text).expect("the output is JSON");
    assert_eq!(value["specs"][0]["title"], "é\u{1b}\u{202e}\u{e0001}");
}

#[test]
fn the_check_of_the_schema_sees_mistakes() {
    let good = document(&[], &[]);
    assert_eq!(mistakes(&good), Vec::<String>::new());
    assert_eq!(mistakes(&good.replace("check/1", "check/2")).len(), 1);
    assert_eq!(mistakes(&good.replace("\"unread\": []", "\"unread\": [{}]")).len(), 2);
    assert_eq!(mistakes(&good.replace("\"specs\": []", "\"specs\": 1, \"more\": 2")).len(), 2);
}

/// `name.field: type` of every field of a rule.
fn fields(name: &str, rule: &Value, found: &mut BTreeSet<String>) {
    for (field, inner) in rule.get("properties").map(members).into_iter().flatten() {
        found.insert(format!("{name}.{field}: {}", shape(inner)));
    }
}

fn shape(rule: &Value) -> String {
    if let Some(target) = rule.get("$ref").and_then(Value::as_str) {
        return target.replace("#/$defs/", "");
    }
    if let Some(choices) = rule.get("anyOf").and_then(Value::as_array) {
        return choices.iter().map(shape).collect::<Vec<_>>().join(" or ");
    }
    if let Some(items) = rule.get("items") {
        return format!("list of {}", shape(items));
    }
    match rule.get("type") {
        Some(Value::Array(choices)) => {
            choices.iter().filter_map(Value::as_str).collect::<Vec<_>>().join(" or ")
        }
        Some(Value::String(name)) => name.clone(),
        _ => String::from("word"),
    }
}

#[test]
fn fields_are_only_added() {
    let schema = schema();
    let mut found = BTreeSet::new();
    fields("$", &schema, &mut found);
    for (name, rule) in members(&schema["$defs"]) {
        fields(name, rule, &mut found);
    }
    let promised: BTreeSet<String> = PROMISED.lines().map(str::to_owned).collect();
    let gone: Vec<_> = promised.difference(&found).collect();
    let new: Vec<_> = found.difference(&promised).collect();
    assert!(gone.is_empty(), "promised in check/1 and no longer there: {gone:#?}");
    assert!(new.is_empty(), "new fields; add these lines to schema/check-1.fields: {new:#?}");
}
