//! Where a spec stands and what the user wants: roots, folders, settings, and how often the client is bothered.

use std::time::{Duration, Instant};

use serde_json::{Value, json};

use crate::client::Client;
use crate::folder::Folder;

fn findings(client: &mut Client, uri: &str, meant: impl Fn(&[Value]) -> bool) -> Vec<Value> {
    let message = client.wait("findings", |message| {
        let found = message["params"]["diagnostics"].as_array();
        message["method"] == "textDocument/publishDiagnostics"
            && message["params"]["uri"] == uri
            && found.is_some_and(|found| meant(found))
    });
    message["params"]["diagnostics"].as_array().cloned().unwrap_or_default()
}

#[test]
fn a_root_that_comes_and_goes() {
    let folder = Folder::new("roots");
    folder.write("parts.shaft", "let a = 5 kW\n");
    let inner = folder.write("inner/spec.shaft", "");
    let mut client = Client::with(json!({}));
    client.open(&inner, "use \"../parts.shaft\" as p\nlet b = 2 * p.a\n");
    let outside = findings(&mut client, &inner, |found| !found.is_empty());
    assert!(outside[0]["severity"] == 1, "{outside:?}");
    let mark = folder.write("layshaft.toml", "");
    client.notify("workspace/didChangeWatchedFiles", json!({ "changes": [{ "uri": mark, "type": 1 }] }));
    findings(&mut client, &inner, <[Value]>::is_empty);
    folder.remove("layshaft.toml");
    client.notify("workspace/didChangeWatchedFiles", json!({ "changes": [{ "uri": mark, "type": 3 }] }));
    findings(&mut client, &inner, |found| !found.is_empty());
    client.finish();
}

#[test]
fn several_folders_each_with_a_root_of_its_own() {
    let (one, two) = (Folder::new("first-root"), Folder::new("second-root"));
    let mut specs = Vec::new();
    for (folder, unit) in [(&one, "kW"), (&two, "kN")] {
        folder.write("layshaft.toml", "");
        folder.write("parts.shaft", &format!("let a = 5 {unit}\n"));
        specs.push(folder.uri("spec.shaft"));
    }
    let mut client = Client::start();
    let folders = json!([{ "uri": one.uri(""), "name": "one" }]);
    let params =
        json!({ "processId": null, "rootUri": null, "workspaceFolders": folders, "capabilities": {} });
    let offered = client.ask("initialize", params)["result"]["capabilities"].clone();
    assert_eq!(offered["workspace"]["workspaceFolders"]["supported"], true, "{offered}");
    client.notify("initialized", json!({}));
    let added = json!({ "event": { "added": [{ "uri": two.uri(""), "name": "two" }], "removed": folders } });
    client.notify("workspace/didChangeWorkspaceFolders", added);
    for (spec, kind) in specs.iter().zip(["power", "force"]) {
        client.open(spec, "use \"parts.shaft\" as p\nlet b = 2 * p.a\n");
        assert_eq!(client.published(spec, 1), Vec::<Value>::new());
        let at = json!({ "textDocument": { "uri": spec }, "position": { "line": 1, "character": 4 } });
        let hover = client.ask("textDocument/hover", at);
        let told = hover["result"]["contents"]["value"].as_str().unwrap_or_default().to_owned();
        assert!(told.contains(kind), "{told}");
    }
    client.finish();
}

const LENSED: &str =
    "source m: straight_line { stall_torque = 5 N·m; no_load_speed = 3000 rpm; braking = none }
load f: constant { torque = 1 N·m }
drive d = m -> f
";

fn lenses(client: &mut Client, uri: &str) -> usize {
    let answer = client.ask("textDocument/codeLens", json!({ "textDocument": { "uri": uri } }));
    answer["result"].as_array().map_or(0, Vec::len)
}

#[test]
fn settings_at_the_beginning_and_when_they_change() {
    let uri = "untitled:spec.shaft";
    let mut client = Client::start();
    let options = json!({ "layshaft": { "lenses": true } });
    let params =
        json!({ "processId": null, "rootUri": null, "capabilities": {}, "initializationOptions": options });
    client.ask("initialize", params);
    client.notify("initialized", json!({}));
    client.open(uri, LENSED);
    assert!(lenses(&mut client, uri) > 0);
    let settings = |value: Value| json!({ "settings": { "layshaft": value } });
    client.notify("workspace/didChangeConfiguration", settings(json!({ "lenses": false })));
    assert_eq!(lenses(&mut client, uri), 0);
    client.notify("workspace/didChangeConfiguration", settings(json!({ "lenses": true })));
    client.notify("workspace/didChangeConfiguration", settings(json!({ "lenses": "often" })));
    let told = client.wait("a word on the bad setting", |message| message["method"] == "window/logMessage");
    assert!(told["params"]["message"].as_str().is_some_and(|text| text.contains("layshaft")), "{told}");
    assert!(lenses(&mut client, uri) > 0, "what cannot be read leaves the settings as they were");
    client.finish();
}

#[test]
fn settings_that_are_asked_for() {
    let uri = "untitled:spec.shaft";
    let mut client = Client::with(json!({ "workspace": { "configuration": true } }));
    let asked = client.wait("a question", |message| message["method"] == "workspace/configuration");
    assert_eq!(asked["params"]["items"][0]["section"], "layshaft");
    client.send(&json!({ "jsonrpc": "2.0", "id": asked["id"], "result": [{ "lenses": true }] }));
    client.open(uri, LENSED);
    assert!(lenses(&mut client, uri) > 0);
    client.finish();
}

#[test]
#[allow(clippy::disallowed_methods, reason = "how often something is sent is a matter of the clock")]
fn a_client_is_asked_to_look_again_at_most_every_quarter_of_a_second() {
    let folder = Folder::new("refresh");
    let (parts, user) = (folder.uri("parts.shaft"), folder.uri("user.shaft"));
    let mut client = Client::with(json!({
        "textDocument": { "diagnostic": {} },
        "workspace": { "diagnostics": { "refreshSupport": true } },
    }));
    client.open(&parts, "let a = 5 kW\n");
    client.open(&user, "use \"parts.shaft\" as p\nlet b = 2 * p.a\n");
    client.ask("textDocument/diagnostic", json!({ "textDocument": { "uri": user } }));
    let begun = Instant::now();
    for version in 2..42 {
        let name = if version % 2 == 0 { "other" } else { "a" };
        client.change(&parts, version, json!([{ "text": format!("let {name} = 5 kW\n") }]));
        client.ask("textDocument/diagnostic", json!({ "textDocument": { "uri": user } }));
        std::thread::sleep(Duration::from_millis(12));
    }
    let is_refresh = |message: &Value| message["method"] == "workspace/diagnostic/refresh";
    client.wait("a request to look again", is_refresh);
    let told = 1 + client.waiting.iter().filter(|message| is_refresh(message)).count();
    let most = 2 + begun.elapsed().as_millis() / 250;
    assert!(told as u128 <= most, "{told} requests, at most {most}");
    client.finish();
}
