//! What no client should do, and some do.

use serde_json::{Value, json};

use crate::client::Client;

const URI: &str = "untitled:a.shaft";

/// The server still tells what it finds.
fn lives(mut client: Client) {
    client.open("untitled:alive.shaft", "let a = 5 kW + 3 kN\n");
    assert_eq!(client.published("untitled:alive.shaft", 1).len(), 1);
    client.finish();
}

fn refused(client: &mut Client, code: i64) {
    let answer = client
        .wait("an error without id", |message| message["id"].is_null() && message.get("error").is_some());
    assert_eq!(answer["error"]["code"], code, "{answer}");
    assert!(answer["error"]["message"].as_str().is_some_and(|words| words.len() > 8), "{answer}");
}

#[test]
fn bad_messages_are_refused_one_by_one() {
    let mut client = Client::with(json!({}));
    for (body, code) in [
        ("{\"jsonrpc\": \"2.0\", ", -32700),
        ("nonsense", -32700),
        ("[]", -32600),
        ("{}", -32600),
        ("7", -32600),
    ] {
        client.raw(format!("Content-Length: {}\r\n\r\n{body}", body.len()).as_bytes());
        refused(&mut client, code);
    }
    client.raw(b"Content-Length: 2\r\n\r\n\xff\xff");
    refused(&mut client, -32700);
    client.raw(b"Content-Length: many\r\n\r\n{}");
    refused(&mut client, -32700);
    // The next good message ends the search for one.
    assert_eq!(client.ask("spec/solve", json!({}))["error"]["code"], -32601);
    client.raw(b"X-Nothing: 1\r\n\r\n");
    refused(&mut client, -32700);
    client.raw(b"Content-Length: 5\r\n\r\n{\"jsonrpc\":\"2.0\",\"method\":\"a\"}");
    refused(&mut client, -32700);
    lives(client);
}

#[test]
fn unknown_methods_and_wrong_params() {
    let mut client = Client::with(json!({}));
    assert_eq!(client.ask("spec/solve", json!({}))["error"]["code"], -32601);
    assert_eq!(client.ask("$/whatever", json!({}))["error"]["code"], -32601);
    client.notify("spec/solved", json!({}));
    client.notify("$/whatever", Value::Null);
    assert_eq!(client.ask("textDocument/definition", json!({ "textDocument": 5 }))["error"]["code"], -32602);
    assert_eq!(client.ask("textDocument/definition", Value::Null)["error"]["code"], -32602);
    client.notify("textDocument/didOpen", json!([1, 2]));
    client.wait("a word in the log", |message| message["method"] == "window/logMessage");
    client.send(&json!({ "jsonrpc": "2.0", "id": 99_999, "result": null }));
    client.send(&json!({ "jsonrpc": "2.0", "id": "x", "error": { "code": 1, "message": "no" } }));
    lives(client);
}

#[test]
fn places_outside_the_text() {
    let mut client = Client::with(json!({}));
    client.open(URI, "let a = 5 kW\n");
    for (line, character) in [(0, 999), (7, 0), (4_000_000_000_u32, 4_000_000_000_u32), (1, 1)] {
        let place =
            json!({ "textDocument": { "uri": URI }, "position": { "line": line, "character": character } });
        assert!(client.ask("textDocument/definition", place).get("error").is_none());
    }
    let far = json!({ "line": 90, "character": 90 });
    client.change(URI, 2, json!([{ "range": { "start": far, "end": far }, "text": "let b = 1 kW + 1 m\n" }]));
    let back = json!({ "start": { "line": 1, "character": 3 }, "end": { "line": 0, "character": 4 } });
    client.change(URI, 3, json!([{ "range": back, "text": "zz" }]));
    client.published(URI, 3);
    lives(client);
}

#[test]
fn documents_that_are_not_open_and_versions_that_jump() {
    let mut client = Client::with(json!({}));
    client.change(URI, 5, json!([{ "text": "x" }]));
    client.wait("a word in the log", |message| message["method"] == "window/logMessage");
    client.notify("textDocument/didClose", json!({ "textDocument": { "uri": URI } }));
    client.notify("textDocument/didSave", json!({ "textDocument": { "uri": URI } }));
    client.open(URI, "let a = 5 kW\n");
    client.change(URI, 900, json!([{ "text": "let a = 5 kW + 1 m\n" }]));
    assert_eq!(client.published(URI, 900).len(), 1);
    client.change(URI, 3, json!([{ "text": "let a = 5 kW\n" }]));
    assert_eq!(client.published(URI, 3).len(), 0);
    client.open(URI, "let a = 5 kW + 1 m\n");
    assert_eq!(client.published(URI, 1).len(), 1);
    lives(client);
}

#[test]
fn a_client_that_closes_its_ear() {
    let mut client = Client::with(json!({}));
    client.open(URI, "let a = 5 kW\n");
    client.published(URI, 1);
    client.deaf();
    for version in 2..200 {
        client.change(URI, version, json!([{ "text": "let a = 5 kW + 1 m\n" }]));
        std::thread::sleep(std::time::Duration::from_millis(5));
    }
    assert!(client.end().code().is_some());
}

#[test]
fn ten_megabytes() {
    let mut client = Client::with(json!({}));
    let text = "let a = 5 kW # a line like many others of its kind\n".repeat(210_000);
    assert!(text.len() > 10_000_000);
    client.open(URI, &text);
    let found = client.published(URI, 1);
    assert_eq!(found.len(), 1, "{:?}", found.first());
    assert_eq!(found[0]["code"], "too-large");
    lives(client);
}

#[test]
fn two_thousand_open_files() {
    let mut client = Client::with(json!({}));
    for number in 0..2_000 {
        client.open(&format!("untitled:{number}.shaft"), "let a = 5 kW + 3 kN\n");
    }
    for number in (0..2_000).rev() {
        assert_eq!(client.published(&format!("untitled:{number}.shaft"), 1).len(), 1);
    }
    lives(client);
}
