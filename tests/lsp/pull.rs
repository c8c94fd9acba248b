//! Findings that are asked for, files that use one another, files that change on the disk.

use serde_json::{Value, json};

use crate::client::Client;
use crate::folder::Folder;

fn pulling() -> Value {
    json!({
        "textDocument": { "diagnostic": { "relatedDocumentSupport": true } },
        "workspace": {
            "diagnostics": { "refreshSupport": true },
            "didChangeWatchedFiles": { "dynamicRegistration": true },
        },
    })
}

fn pull(client: &mut Client, uri: &str, previous: Option<&str>) -> Value {
    let params = json!({ "textDocument": { "uri": uri }, "previousResultId": previous });
    client.ask("textDocument/diagnostic", params)["result"].clone()
}

const USER: &str = "use \"parts.shaft\" as p\nlet b = 2 * p.a\n";

#[test]
fn a_client_that_asks_is_not_told_as_well() {
    let mut client = Client::with(pulling());
    let uri = "untitled:a.shaft";
    client.open(uri, "let a = 5 kW + 3 kN\n");
    let first = pull(&mut client, uri, None);
    assert_eq!(first["kind"], "full");
    assert_eq!(first["items"].as_array().map(Vec::len), Some(1), "{first}");
    let id = first["resultId"].as_str().map(str::to_owned);
    assert_eq!(pull(&mut client, uri, id.as_deref())["kind"], "unchanged");
    client.change(uri, 2, json!([{ "text": "let a = 5 kW\n" }]));
    let second = pull(&mut client, uri, id.as_deref());
    assert_eq!(second["items"], json!([]), "{second}");
    let all = client.ask("workspace/diagnostic", json!({ "previousResultIds": [] }));
    assert_eq!(all["result"]["items"][0]["uri"], uri, "{all}");
    assert!(client.waiting.iter().all(|message| message["method"] != "textDocument/publishDiagnostics"));
    client.finish();
}

#[test]
fn an_edit_reaches_those_who_use_the_file() {
    let folder = Folder::new("use");
    let (parts, user) = (folder.uri("parts.shaft"), folder.uri("user.shaft"));
    let mut client = Client::with(json!({}));
    client.open(&user, USER);
    assert_eq!(client.published(&user, 1)[0]["code"], "missing-file");
    client.open(&parts, "let a = 5 kW\n");
    let gone = client.wait("the user is told again", |message| {
        message["params"]["uri"] == user && message["params"]["diagnostics"] == json!([])
    });
    assert_eq!(gone["params"]["version"], 1);
    client.change(&parts, 2, json!([{ "text": "let other = 5 kW\n" }]));
    client.wait("the user misses its name", |message| {
        message["params"]["uri"] == user && message["params"]["diagnostics"][0]["code"] == "unknown-name"
    });
    client.finish();
}

#[test]
fn a_finding_in_a_file_that_two_use_is_told_once() {
    let folder = Folder::new("twice");
    let parts = folder.write("parts.shaft", "let a = 5 kW + 3 kN\n");
    let mut client = Client::with(json!({}));
    client.open(&folder.uri("one.shaft"), USER);
    client.open(&folder.uri("two.shaft"), USER);
    client.published(&folder.uri("one.shaft"), 1);
    client.published(&folder.uri("two.shaft"), 1);
    client.open(&parts, "let a = 5 kW + 3 kN\n");
    assert_eq!(client.published(&parts, 1).len(), 1);
    client.finish();
}

#[test]
fn a_file_that_changes_on_the_disk() {
    let folder = Folder::new("disk");
    let parts = folder.write("parts.shaft", "let a = 5 kW\n");
    let (user, other) = (folder.uri("user.shaft"), folder.uri("other.shaft"));
    let mut client = Client::with(pulling());
    let asked =
        client.wait("a request to watch files", |message| message["method"] == "client/registerCapability");
    client.send(&json!({ "jsonrpc": "2.0", "id": asked["id"], "result": null }));
    client.open(&user, USER);
    client.open(&other, "let c = 5 kW\n");
    let before = pull(&mut client, &user, None);
    assert_eq!(before["items"], json!([]), "{before}");
    let quiet = pull(&mut client, &other, None);
    folder.write("parts.shaft", "let abc = 5 kW + 1 kW\n");
    client.notify("workspace/didChangeWatchedFiles", json!({ "changes": [{ "uri": parts, "type": 2 }] }));
    client.wait("a request to ask again", |message| message["method"] == "workspace/diagnostic/refresh");
    let after = pull(&mut client, &user, before["resultId"].as_str());
    assert_eq!(after["items"][0]["code"], "unknown-name", "{after}");
    assert_eq!(pull(&mut client, &other, quiet["resultId"].as_str())["kind"], "unchanged");
    client.finish();
}

#[test]
fn a_file_of_another_kind_of_place_is_analyzed_alone() {
    let folder = Folder::new("alone");
    folder.write("parts.shaft", "let a = 5 kW\n");
    let uri = folder.uri("user.shaft").replace("file:", "git:");
    let mut client = Client::with(json!({}));
    client.open(&uri, USER);
    assert_eq!(client.published(&uri, 1)[0]["code"], "missing-file");
    client.finish();
}
