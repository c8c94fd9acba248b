//! Beginning, end, order of the lifecycle, cancellation.

use serde_json::{Value, json};

use crate::client::Client;

#[test]
fn a_session_from_beginning_to_end() {
    let mut client = Client::start();
    let offered = client.initialize(json!({}));
    assert_eq!(offered["serverInfo"]["name"], "layshaft");
    assert_eq!(offered["capabilities"]["positionEncoding"], "utf-16");
    let uri = "untitled:a.shaft";
    client.open(uri, "let a = 5 kW + 3 kN\nlet b = 2 * a\n");
    let found = client.published(uri, 1);
    assert_eq!(found.len(), 1, "{found:?}");
    assert_eq!(found[0]["code"], "kind-mismatch");
    let place = json!({ "textDocument": { "uri": uri }, "position": { "line": 1, "character": 12 } });
    let answer = client.ask("textDocument/definition", place);
    assert_eq!(answer["result"]["range"]["start"], json!({ "line": 0, "character": 4 }), "{answer}");
    client.finish();
}

#[test]
fn columns_are_counted_as_agreed() {
    let text = String::from("let αβγ = 2 * bogus\n");
    let before = text.split("bogus").next().unwrap_or("");
    let (bytes, units) = (before.len(), before.encode_utf16().count());
    assert_ne!(bytes, units);
    for (offered, agreed, column) in [
        (json!(["utf-8", "utf-16"]), "utf-8", bytes),
        (json!(["utf-16", "utf-8"]), "utf-16", units),
        (json!(["utf-32"]), "utf-16", units),
        (Value::Null, "utf-16", units),
    ] {
        let mut client = Client::start();
        let said = client.initialize(json!({ "general": { "positionEncodings": offered } }));
        assert_eq!(said["capabilities"]["positionEncoding"], agreed);
        client.open("untitled:b.shaft", &text);
        let found = client.published("untitled:b.shaft", 1);
        assert_eq!(found[0]["code"], "unknown-name", "{found:?}");
        assert_eq!(found[0]["range"]["start"]["character"], column, "{agreed} {found:?}");
        client.finish();
    }
}

#[test]
fn a_request_before_the_beginning_and_behind_the_end_is_refused() {
    let mut client = Client::start();
    let place = json!({ "textDocument": { "uri": "untitled:a" }, "position": { "line": 0, "character": 0 } });
    assert_eq!(client.ask("textDocument/definition", place.clone())["error"]["code"], -32002);
    client.initialize(json!({}));
    assert_eq!(client.ask("initialize", json!({ "capabilities": {} }))["error"]["code"], -32600);
    assert_eq!(client.ask("shutdown", Value::Null)["result"], Value::Null);
    assert_eq!(client.ask("textDocument/definition", place)["error"]["code"], -32600);
    client.notify("exit", Value::Null);
    assert_eq!(client.end().code(), Some(0));
}

#[test]
fn exit_without_shutdown_is_a_failure() {
    let mut client = Client::with(json!({}));
    client.notify("exit", Value::Null);
    assert_eq!(client.end().code(), Some(1));
    let mut client = Client::start();
    client.notify("exit", Value::Null);
    assert_eq!(client.end().code(), Some(1));
}

#[test]
fn the_answer_to_shutdown_leaves_before_the_end() {
    let mut client = Client::with(json!({}));
    let id = client.request("shutdown", Value::Null);
    client.notify("exit", Value::Null);
    assert_eq!(client.answer(id)["result"], Value::Null);
    assert_eq!(client.end().code(), Some(0));
}

#[test]
fn a_client_that_is_gone_takes_the_server_along() {
    let mut client = Client::with(json!({}));
    client.open("untitled:a.shaft", "let a = 5 kW\n");
    client.hang_up();
    assert_eq!(client.end().code(), Some(1));
}

#[test]
fn a_cancelled_request_is_answered_at_once() {
    let mut client = Client::with(json!({}));
    let text = "let a = 5 kW + 3 kN\n".repeat(20_000);
    client.open("untitled:a.shaft", &text);
    let params = json!({ "textDocument": { "uri": "untitled:a.shaft" }, "options": { "tabSize": 4, "insertSpaces": true } });
    let ids: Vec<i64> = (0..20).map(|_| client.request("textDocument/formatting", params.clone())).collect();
    for id in &ids {
        client.notify("$/cancelRequest", json!({ "id": id }));
    }
    let cancelled = ids.iter().filter(|id| client.answer(**id)["error"]["code"] == -32800).count();
    // The first may have been answered before its cancellation came.
    assert!(cancelled >= ids.len() - 2, "{cancelled}");
    client.notify("$/cancelRequest", json!({ "id": "never sent" }));
    client.finish();
}

#[test]
fn a_request_overtaken_by_an_edit_is_given_back() {
    let mut client = Client::with(json!({}));
    let uri = "untitled:a.shaft";
    client.open(uri, &"let a = 5 kW + 3 kN\n".repeat(5_000));
    let place = json!({ "textDocument": { "uri": uri }, "position": { "line": 0, "character": 5 } });
    let first = client.request("textDocument/definition", place.clone());
    let second = client.request("textDocument/definition", place.clone());
    client.change(uri, 2, json!([{ "text": "let a = 5 kW\n" }]));
    let third = client.request("textDocument/definition", place);
    for id in [first, second] {
        let answer = client.answer(id);
        let code = answer["error"]["code"].as_i64();
        assert!(code.is_none() || code == Some(-32801), "{answer}");
    }
    assert!(client.answer(third).get("error").is_none());
    client.finish();
}

#[test]
#[cfg(target_os = "linux")]
fn a_server_whose_client_died_ends_though_its_pipe_is_open() {
    let mut client = Client::start();
    // A process that has ended: its number is free, or waits to be.
    let mut gone = std::process::Command::new("true").spawn().expect("a process that ends at once");
    gone.wait().expect("it ends");
    client.ask("initialize", json!({ "processId": gone.id(), "capabilities": {} }));
    assert_eq!(client.end().code(), Some(1));
}
