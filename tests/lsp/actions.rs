//! Code actions through the wire, and the promise that "value unchanged" means to the bit.

use std::sync::Arc;

use layshaft_diagnostics::{FileId, Span};
use layshaft_ide::Snapshot;
use layshaft_ide::actions::{actions, applied};
use layshaft_ide::base::Memo;
use layshaft_ide::sensitivity::trial;
use layshaft_present::sheet::{Detail, Entry, Sheet, sheet};
use layshaft_present::shown::Shown;
use layshaft_semantics::Analysis;
use layshaft_syntax::TokenKind;
use serde_json::{Value, json};

use crate::client::Client;
use crate::support;

const URI: &str = "untitled:spec.shaft";

fn offered(client: &mut Client, line: u32, columns: (u32, u32), context: Value) -> Vec<Value> {
    let range = json!({
        "start": { "line": line, "character": columns.0 }, "end": { "line": line, "character": columns.1 }
    });
    let params = json!({ "textDocument": { "uri": URI }, "range": range, "context": context });
    let answer = client.ask("textDocument/codeAction", params);
    assert!(answer.get("error").is_none(), "{answer}");
    answer["result"].as_array().cloned().unwrap_or_default()
}

fn client() -> Client {
    Client::with(json!({ "workspace": { "workspaceEdit": { "documentChanges": true } } }))
}

#[test]
fn a_fix_belongs_to_its_finding_and_to_the_version_it_was_made_for() {
    let mut client = client();
    client.open(URI, "let a = 4 kg\nlet b = 3 ft·lb\n");
    let told = client.published(URI, 1);
    let found = offered(&mut client, 1, (8, 15), json!({ "diagnostics": told }));
    let fix = found
        .iter()
        .find(|one| one["title"].as_str().is_some_and(|title| title.starts_with("Write `ft·lbf`")));
    let fix = fix.unwrap_or_else(|| panic!("{found:#?}"));
    assert_eq!(fix["kind"], "quickfix");
    assert_eq!(fix["diagnostics"][0]["code"], "ambiguous-unit", "{fix}");
    let change = &fix["edit"]["documentChanges"][0];
    assert_eq!(change["textDocument"], json!({ "uri": URI, "version": 1 }));
    assert_eq!(change["edits"][0]["newText"], "ft·lbf");
    client.finish();
}

#[test]
fn kinds_are_told_apart_and_certain_fixes_come_on_demand_only() {
    let mut client = client();
    client.open(URI, "let a = 4 kW\nallow overspeed because \"x\"\n");
    let kinds = |found: &[Value]| -> Vec<String> {
        found.iter().filter_map(|one| one["kind"].as_str().map(str::to_owned)).collect()
    };
    let all = offered(&mut client, 0, (8, 8), json!({ "diagnostics": [] }));
    assert!(kinds(&all).iter().all(|kind| kind == "refactor.rewrite"), "{all:#?}");
    assert!(all.iter().any(|one| one["title"] == "Write `4000 W` (value unchanged)"), "{all:#?}");
    let only = json!({ "diagnostics": [], "only": ["source.fixAll"] });
    let found = offered(&mut client, 0, (0, 0), only);
    assert_eq!(kinds(&found), ["source.fixAll"]);
    assert_eq!(found[0]["edit"]["documentChanges"][0]["edits"][0]["newText"], "", "{found:#?}");
    let refactor = offered(&mut client, 1, (3, 3), json!({ "diagnostics": [], "only": ["refactor"] }));
    assert_eq!(refactor, Vec::<Value>::new());
    client.finish();
}

#[test]
fn an_effect_is_named_and_a_hover_says_how_the_margin_moves() {
    let text = support::text("specs/mill-hoist.shaft");
    let line = text.lines().position(|line| line.contains("reduction = 41.2")).expect("the gear") as u32;
    let column =
        text.lines().nth(line as usize).and_then(|line| line.find("41.2")).expect("its number") as u32;
    let mut client = client();
    client.open(URI, &text);
    let params =
        json!({ "textDocument": { "uri": URI }, "position": { "line": line, "character": column + 1 } });
    let hover = client.ask("textDocument/hover", params);
    let words = hover["result"]["contents"]["value"].as_str().unwrap_or("").to_owned();
    assert!(words.contains("Per 1 % more, the tightest margin"), "{hover}");
    client.finish();
}

/// Every number of a sheet, by a name, as bits: the values and results, whatever they are shown in.
fn numbers(analysis: &Analysis) -> Vec<(String, u64)> {
    let sheet: Sheet = sheet(analysis, Detail::Everything);
    let mut all = Vec::new();
    let shown = |name: String, value: &Shown, all: &mut Vec<(String, u64)>| {
        if let Shown::Number(number) = value {
            all.push((name, number.si.to_bits()));
        }
    };
    for line in &sheet.values {
        line.value.iter().for_each(|value| shown(line.name.clone(), value, &mut all));
    }
    for part in &sheet.parts {
        for line in &part.fields {
            line.value
                .iter()
                .for_each(|value| shown(format!("{}.{}", part.name, line.name), value, &mut all));
        }
    }
    for (drive, row) in sheet.drives.iter().flat_map(|drive| drive.rows.iter().map(move |row| (drive, row))) {
        for point in &row.points {
            all.push((format!("{} {} point", drive.name, row.label), point.speed.si.to_bits()));
        }
        for part in &row.results {
            for (name, entry) in &part.results {
                if let Entry::Number(number) = entry {
                    let name = format!("{} {} {} {:?} {name}", drive.name, row.label, part.part, part.port);
                    all.push((name, number.si.to_bits()));
                }
            }
        }
    }
    for criterion in &sheet.criteria {
        for outcome in &criterion.outcomes {
            let name = format!("{} {}", criterion.clause, outcome.label);
            outcome.found.iter().for_each(|value| shown(name.clone(), value, &mut all));
            let margin = outcome.margin.as_ref().map_or(0, |margin| margin.value.to_bits());
            all.push((format!("{name} {:?}", outcome.verdict), margin));
        }
    }
    all
}

#[test]
fn value_unchanged_means_to_the_bit() {
    let files = support::spec_files();
    let (mut tried, mut rewritten, mut named) = (0, 0, 0);
    for name in support::names("specs", ".shaft") {
        let text = support::text(&format!("specs/{name}"));
        let snapshot = Snapshot::new(&name, text.as_str().into(), &files, &mut Memo::default());
        let before = numbers(&snapshot.analysis);
        let mut memo = Memo::default();
        let lexed = layshaft_syntax::lex(&text);
        let numbers_at = lexed.tokens.iter().filter(|token| matches!(token.kind, TokenKind::Number));
        // Every few numbers, another of its offers each time: all of them would take minutes.
        for (turn, token) in numbers_at.step_by(3).enumerate() {
            let mut trials = |file: FileId, text: Arc<str>| trial(&snapshot, &files, &mut memo, file, text);
            let here = Span::new(token.span.start, token.span.start);
            let offers = actions(&snapshot, FileId(0), here, &mut trials);
            let same: Vec<_> = offers.iter().filter(|offer| offer.unchanged).collect();
            if same.is_empty() {
                continue;
            }
            let offer = same[turn % same.len()];
            let new = applied(&text, &offer.edits);
            let after = layshaft_semantics::analyze(&name, new.as_str().into(), &files);
            let after = numbers(&after);
            // A name of its own brings a value along; nothing that was there may be another.
            let mut rest = after.iter();
            for one in &before {
                assert!(rest.any(|other| other == one), "{name}: {}: {one:?}", offer.title);
            }
            tried += 1;
            rewritten += usize::from(offer.title.starts_with("write"));
            named += usize::from(offer.title.starts_with("name"));
        }
    }
    assert!(
        tried > 60 && rewritten > 20 && named > 10,
        "{tried} tried, {rewritten} rewritten, {named} named"
    );
}
