//! The command and the server say the same of the same text.

use std::path::Path;

use layshaft_report::json::{Checked, document};
use serde_json::{Value, json};

use crate::client::Client;
use crate::support;

/// Code, severity, message and place, as the server counts them.
fn of_the_server(found: &[Value]) -> Vec<Value> {
    let one = |found: &Value| {
        let (start, end) = (&found["range"]["start"], &found["range"]["end"]);
        json!([
            found["code"],
            found["severity"],
            found["message"].as_str().unwrap_or("").lines().next(),
            [start["line"], start["character"], end["line"], end["character"]],
        ])
    };
    found.iter().map(one).collect()
}

/// The same from what the command prints of the first file of a spec.
fn of_the_command(name: &str, text: &str) -> Vec<Value> {
    let analysis = layshaft_semantics::analyze(&format!("{name}.shaft"), text.into(), &support::spec_files());
    let printed = document(&[Checked { analysis: &analysis, names: &[] }], &[]);
    let printed: Value = serde_json::from_str(&printed).expect("the command prints JSON");
    let lines = &analysis.files[0].lines;
    let column = |offset: &Value| {
        let place = lines.utf16(text, offset.as_u64().unwrap_or(0) as u32);
        (json!(place.line), json!(place.column))
    };
    let mut out = Vec::new();
    for found in printed["specs"][0]["findings"].as_array().into_iter().flatten() {
        let place = &found["place"];
        if place["file"] != format!("{name}.shaft") {
            continue;
        }
        let severity = match found["severity"].as_str() {
            Some("error") => 1,
            Some("warning") => 2,
            _ => 4,
        };
        let (start, end) = (column(&place["start"]), column(&place["end"]));
        let first = found["message"].as_str().unwrap_or("").lines().next();
        out.push(json!([found["code"], severity, first, [start.0, start.1, end.0, end.1]]));
    }
    out
}

#[test]
fn the_worked_specs_and_broken_ones() {
    let folder =
        std::fs::canonicalize(Path::new(env!("CARGO_MANIFEST_DIR")).join("specs")).expect("the specs");
    let mut client = Client::with(json!({}));
    let names = support::names("specs", ".shaft");
    assert!(names.len() >= 6, "{names:?}");
    let mut findings = 0;
    for name in names.iter().filter_map(|name| name.strip_suffix(".shaft")) {
        let uri = format!("file://{}/{name}.shaft", folder.display());
        let whole = support::text(&format!("specs/{name}.shaft"));
        client.open(&uri, &whole);
        let mut told = client.published(&uri, 1);
        assert_eq!(of_the_server(&told), of_the_command(name, &whole), "{name}");
        // The same with every seventh line gone, which breaks much.
        for gone in 0..7 {
            let kept = whole.lines().enumerate().filter(|(at, _)| at % 7 != gone);
            let broken: String = kept.map(|(_, line)| format!("{line}\n")).collect();
            client.change(&uri, gone as i64 + 2, json!([{ "text": broken }]));
            told = client.published(&uri, gone as i64 + 2);
            let (server, command) = (of_the_server(&told), of_the_command(name, &broken));
            assert_eq!(server, command, "{name} without every line {gone} of seven");
            findings += command.len();
        }
    }
    assert!(findings > 100, "only {findings}");
    client.finish();
}
