//! Completion, signatures, semantic tokens and formatting while typing, through the wire.

use serde_json::{Value, json};

use crate::client::Client;
use crate::folder::Folder;

const URI: &str = "untitled:spec.shaft";

/// What a capable client says of itself.
fn capable(encoding: &str) -> Value {
    json!({
        "general": { "positionEncodings": [encoding] },
        "textDocument": { "completion": {
            "completionItem": { "snippetSupport": true, "insertReplaceSupport": true, "labelDetailsSupport": true },
            "completionList": { "itemDefaults": ["editRange", "data"] },
        } },
    })
}

fn at(uri: &str, line: u32, character: u32) -> Value {
    json!({ "textDocument": { "uri": uri }, "position": { "line": line, "character": character } })
}

fn result(client: &mut Client, method: &str, params: Value) -> Value {
    let answer = client.ask(method, params);
    assert!(answer.get("error").is_none(), "{method}: {answer}");
    answer["result"].clone()
}

fn labels(list: &Value) -> Vec<&str> {
    let items = list["items"].as_array().map_or(&[][..], Vec::as_slice);
    items.iter().filter_map(|item| item["label"].as_str()).collect()
}

/// `é` is one unit of UTF-16 and two bytes, `𝄞` two units and four bytes.
const BEYOND: &str = "let é = 5 kN  from \"𝄞\"\nload p: constant { torque = \u{e9} × 2 m + 5 Nm }\n";

#[test]
fn a_capable_client_gets_one_range_for_all() {
    for (encoding, start, end) in [("utf-16", 40, 42), ("utf-8", 42, 44)] {
        let mut client = Client::with(capable(encoding));
        client.open(URI, BEYOND);
        let list = result(&mut client, "textDocument/completion", at(URI, 1, start + 1));
        let range = &list["itemDefaults"]["editRange"];
        assert_eq!(range["insert"]["start"]["character"], start, "{encoding} {range}");
        assert_eq!(range["insert"]["end"]["character"], start + 1, "{encoding} {range}");
        assert_eq!(range["replace"]["end"]["character"], end, "{encoding} {range}");
        let first = &list["items"][0];
        assert_eq!(first["label"], "N·m", "{list}");
        assert!(
            first.get("textEdit").is_none() && first["labelDetails"]["description"] == "torque",
            "{first}"
        );
        client.finish();
    }
}

#[test]
fn a_plain_client_gets_an_edit_with_every_entry() {
    let mut client = Client::with(json!({}));
    client.open(URI, "load fan: quadratic { ra }\n");
    let list = result(&mut client, "textDocument/completion", at(URI, 0, 24));
    let first = &list["items"][0];
    assert_eq!(first["label"], "rated_torque", "{list}");
    assert_eq!(first["textEdit"]["newText"], "rated_torque = ");
    assert_eq!(first["textEdit"]["range"]["start"]["character"], 22);
    assert!(first.get("insertTextFormat").is_none() && first["detail"].is_string(), "{first}");
    let sorted: Vec<&str> =
        list["items"].as_array().into_iter().flatten().filter_map(|item| item["sortText"].as_str()).collect();
    assert!(sorted.is_sorted(), "{sorted:?}");
    let told = result(&mut client, "completionItem/resolve", first.clone());
    assert!(told["documentation"]["value"].as_str().is_some_and(|text| text.contains("torque")), "{told}");
    client.finish();
}

#[test]
fn resolving_what_is_gone_gives_it_back() {
    let mut client = Client::with(json!({}));
    client.open(URI, "let abc = 5 m\nlet b = \n");
    let list = result(&mut client, "textDocument/completion", at(URI, 1, 8));
    let entry = list["items"].as_array().and_then(|items| items.iter().find(|item| item["label"] == "abc"));
    let entry = entry.expect("the value is offered").clone();
    let told = result(&mut client, "completionItem/resolve", entry.clone());
    assert_eq!(told["detail"], "5 m", "{told}");
    client.change(URI, 2, json!([{ "text": "let b = \n" }]));
    assert_eq!(result(&mut client, "completionItem/resolve", entry.clone()), entry);
    for odd in [json!({ "label": "x" }), json!(5), json!({ "data": { "uri": 5, "of": "name:9:9" } })] {
        assert_eq!(result(&mut client, "completionItem/resolve", odd.clone()), odd);
    }
    client.finish();
}

#[test]
fn a_blank_gives_a_list_only_where_the_choice_is_small() {
    let mut client = Client::with(json!({}));
    client.open(URI, "source m: \nlet a = \n");
    let mut asked = at(URI, 0, 10);
    asked["context"] = json!({ "triggerKind": 2, "triggerCharacter": " " });
    let kinds = result(&mut client, "textDocument/completion", asked.clone());
    assert!(labels(&kinds).contains(&"dc_motor"), "{kinds}");
    asked["position"] = json!({ "line": 1, "character": 8 });
    assert_eq!(result(&mut client, "textDocument/completion", asked), Value::Null);
    client.finish();
}

#[test]
fn files_inside_the_root() {
    let folder = Folder::new("complete");
    folder.write("parts.shaft", "let a = 5 kW\n");
    folder.write("d4.csv", "a,b\n1,2\n");
    folder.write(".hidden.shaft", "let a = 5 kW\n");
    let uri = folder.uri("spec.shaft");
    let mut client = Client::with(json!({}));
    client.open(&uri, "use \"\nlet c = csv \"\nuse \"../\n");
    let list = result(&mut client, "textDocument/completion", at(&uri, 0, 5));
    assert_eq!(labels(&list), ["parts.shaft"], "{list}");
    let list = result(&mut client, "textDocument/completion", at(&uri, 1, 13));
    assert_eq!(labels(&list), ["d4.csv"], "{list}");
    assert_eq!(result(&mut client, "textDocument/completion", at(&uri, 2, 8)), Value::Null);
    client.finish();
}

#[test]
fn what_stands_between_brackets() {
    let mut client = Client::with(json!({}));
    client.open(URI, "let a = atan2(1 m, \n");
    let help = result(&mut client, "textDocument/signatureHelp", at(URI, 0, 19));
    assert_eq!(help["signatures"][0]["label"], "atan2(rise, run)", "{help}");
    assert_eq!(help["activeParameter"], 1);
    client.finish();
}

fn decoded(data: &[u64]) -> Vec<Vec<u64>> {
    data.chunks(5).map(<[u64]>::to_vec).collect()
}

fn numbers(value: &Value) -> Vec<u64> {
    value.as_array().into_iter().flatten().filter_map(Value::as_u64).collect()
}

#[test]
fn tokens_in_full_in_steps_and_in_a_range() {
    let mut client = Client::with(json!({}));
    client.open(URI, "let é = 5 kN\nlet b = é × 2\n");
    let document = json!({ "textDocument": { "uri": URI } });
    let full = result(&mut client, "textDocument/semanticTokens/full", document.clone());
    let mut data = numbers(&full["data"]);
    // `é` is one column wide, and `=` stands two behind its start.
    assert_eq!(decoded(&data)[1][1..3], [4, 1]);
    assert_eq!(decoded(&data)[2][1], 2);
    for (version, text) in [
        (2, "let é = 5 kN\nlet bb = é × 2\nlet c = 1\n"),
        (3, "let c = 1\n"),
        (4, ""),
        (5, "# a\nlet é = \nlet b = 7 m"),
    ] {
        client.change(URI, version, json!([{ "text": text }]));
        let before = result(&mut client, "textDocument/semanticTokens/full", document.clone());
        let whole = numbers(&before["data"]);
        data = whole.clone();
        client.change(URI, version + 10, json!([{ "text": format!("# top\n{text}let z = 9\n") }]));
        let mut asked = document.clone();
        asked["previousResultId"] = before["resultId"].clone();
        let steps = result(&mut client, "textDocument/semanticTokens/full/delta", asked);
        for edit in steps["edits"].as_array().expect("edits") {
            let (start, count) = (edit["start"].as_u64().unwrap(), edit["deleteCount"].as_u64().unwrap());
            data.splice(start as usize..(start + count) as usize, numbers(&edit["data"]));
        }
        let again = result(&mut client, "textDocument/semanticTokens/full", document.clone());
        assert_eq!(data, numbers(&again["data"]));
    }
    let mut asked = document;
    asked["previousResultId"] = json!("no such answer");
    let all = result(&mut client, "textDocument/semanticTokens/full/delta", asked);
    assert!(all["data"].is_array(), "{all}");
    let range = json!({ "start": { "line": 0, "character": 0 }, "end": { "line": 1, "character": 0 } });
    let params = json!({ "textDocument": { "uri": URI }, "range": range });
    let part = result(&mut client, "textDocument/semanticTokens/range", params);
    assert_eq!(numbers(&part["data"]).len(), 5, "{part}");
    client.finish();
}

#[test]
fn what_a_brace_and_a_line_end_put_in_order() {
    let mut client = Client::with(json!({}));
    client.open(URI, "load p:constant{torque=5 N·m}\nlet   b=2 m\n");
    let options = json!({ "tabSize": 4, "insertSpaces": true });
    let mut asked = at(URI, 0, 29);
    asked["ch"] = json!("}");
    asked["options"] = options.clone();
    let edits = result(&mut client, "textDocument/onTypeFormatting", asked.clone());
    assert!(edits.as_array().is_some_and(|edits| edits.len() > 3), "{edits}");
    asked["position"] = json!({ "line": 2, "character": 0 });
    asked["ch"] = json!("\n");
    let edits = result(&mut client, "textDocument/onTypeFormatting", asked);
    assert_eq!(edits[0]["range"]["start"], json!({ "line": 1, "character": 3 }), "{edits}");
    let range = json!({ "start": { "line": 1, "character": 0 }, "end": { "line": 1, "character": 2 } });
    let params = json!({ "textDocument": { "uri": URI }, "range": range, "options": options });
    let edits = result(&mut client, "textDocument/rangeFormatting", params);
    assert_eq!(edits.as_array().map(Vec::len), Some(1), "{edits}");
    assert_eq!(edits[0]["newText"], "let b = 2 m");
    client.finish();
}
