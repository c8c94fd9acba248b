//! Every feature once through the wire, on a worked spec: asked, answered, and about what is in the text.

use serde_json::{Value, json};

use crate::client::Client;
use crate::support;

const SPEC: &str = "let a = 2 kW\nlet b = 3 * a\nlet c = b + a\nsource m: straight_line {\n    stall_torque = 5 N·m\n    no_load_speed = 3000 rpm\n}\n";
const URI: &str = "untitled:spec.shaft";

fn opened() -> Client {
    let mut client = Client::with(json!({}));
    client.open(URI, SPEC);
    client
}

fn at(line: u32, character: u32) -> Value {
    json!({ "textDocument": { "uri": URI }, "position": { "line": line, "character": character } })
}

fn answer(client: &mut Client, method: &str, params: Value) -> Value {
    let answer = client.ask(method, params);
    assert!(answer.get("error").is_none(), "{method}: {answer}");
    answer["result"].clone()
}

#[test]
fn reading() {
    let mut client = opened();
    let hover = answer(&mut client, "textDocument/hover", at(1, 4));
    assert!(hover["contents"]["value"].as_str().is_some_and(|text| text.contains("6")), "{hover}");
    let range = json!({ "start": { "line": 0, "character": 0 }, "end": { "line": 9, "character": 0 } });
    let asked = json!({ "textDocument": { "uri": URI }, "range": range });
    let hints = answer(&mut client, "textDocument/inlayHint", asked.clone());
    let first = &hints[0];
    assert_eq!(first["position"]["line"], 1, "{hints}");
    let whole = answer(&mut client, "inlayHint/resolve", first.clone());
    assert!(whole["tooltip"]["value"].is_string(), "{whole}");
    client.change(URI, 2, json!([{ "text": SPEC.replace("3 * a", "3 * ") }]));
    let old = answer(&mut client, "textDocument/inlayHint", asked);
    assert!(old[0]["label"][0]["value"].as_str().is_some_and(|text| text.starts_with("was ")), "{old}");
    client.finish();
}

#[test]
fn names() {
    let mut client = opened();
    let mut params = at(0, 4);
    params["context"] = json!({ "includeDeclaration": true });
    let found = answer(&mut client, "textDocument/references", params);
    assert_eq!(found.as_array().map(Vec::len), Some(3), "{found}");
    let lights = answer(&mut client, "textDocument/documentHighlight", at(0, 4));
    assert_eq!(lights.as_array().map(Vec::len), Some(3), "{lights}");
    let may = answer(&mut client, "textDocument/prepareRename", at(0, 4));
    assert_eq!(may["placeholder"], "a");
    let mut params = at(0, 4);
    params["newName"] = json!("power");
    let edit = answer(&mut client, "textDocument/rename", params.clone());
    assert_eq!(edit["changes"][URI].as_array().map(Vec::len), Some(3), "{edit}");
    params["newName"] = json!("b");
    let refused = client.ask("textDocument/rename", params);
    assert_eq!(refused["error"]["code"], -32803, "{refused}");
    client.finish();
}

#[test]
fn outline() {
    let mut client = opened();
    let document = json!({ "textDocument": { "uri": URI } });
    let symbols = answer(&mut client, "textDocument/documentSymbol", document.clone());
    assert_eq!(symbols[3]["name"], "m", "{symbols}");
    assert_eq!(symbols[3]["children"].as_array().map(Vec::len), Some(2));
    let folds = answer(&mut client, "textDocument/foldingRange", document.clone());
    assert_eq!(folds[0]["startLine"], 3, "{folds}");
    let found = answer(&mut client, "workspace/symbol", json!({ "query": "m" }));
    assert_eq!(found[0]["name"], "m", "{found}");
    let params = json!({ "textDocument": { "uri": URI }, "positions": [{ "line": 2, "character": 8 }] });
    let grown = answer(&mut client, "textDocument/selectionRange", params);
    assert!(grown[0]["parent"]["parent"].is_object(), "{grown}");
    assert_eq!(answer(&mut client, "textDocument/documentLink", document), json!([]));
    client.finish();
}

#[test]
fn what_feeds_a_value_and_what_it_moves() {
    let mut client = opened();
    let items = answer(&mut client, "textDocument/prepareCallHierarchy", at(1, 4));
    let feeds = answer(&mut client, "callHierarchy/outgoingCalls", json!({ "item": items[0] }));
    assert_eq!(feeds[0]["to"]["name"], "a", "{feeds}");
    let moves = answer(&mut client, "callHierarchy/incomingCalls", json!({ "item": items[0] }));
    assert_eq!(moves[0]["from"]["name"], "c", "{moves}");
    client.finish();
}

#[test]
fn pages_and_tables() {
    let mut client = Client::with(json!({}));
    let run = |client: &mut Client, command: &str, arguments: Value| {
        client.ask("workspace/executeCommand", json!({ "command": command, "arguments": arguments }))
    };
    let page = run(&mut client, "layshaft.explain", json!(["kind-mismatch"]));
    assert!(page["result"].as_str().is_some_and(|text| text.len() > 100), "{page}");
    assert_eq!(run(&mut client, "layshaft.explain", json!(["no-code"]))["error"]["code"], -32602);
    let text = support::text("specs/mill-hoist.shaft");
    client.open(URI, &text);
    let line = text.lines().position(|line| line.starts_with("drive ")).expect("a drive");
    let table = run(&mut client, "layshaft.resultTable", json!([URI, { "line": line, "character": 7 }]));
    assert!(table["result"].is_string(), "{table}");
    client.finish();
}

#[test]
fn the_form_of_a_text() {
    let mut client = Client::with(json!({}));
    client.open(URI, "let   a=5 kW\nlet b = 2 kW\n");
    let params = json!({ "textDocument": { "uri": URI }, "options": { "tabSize": 4, "insertSpaces": true } });
    let edits = answer(&mut client, "textDocument/formatting", params);
    assert_eq!(edits.as_array().map(Vec::len), Some(1), "{edits}");
    assert_eq!(edits[0]["newText"], "let a = 5 kW");
    client.finish();
}
