//! Pages that no file holds, for clients that can open them.

use serde_json::{Value, json};

use crate::client::Client;
use crate::support;

const URI: &str = "untitled:hoist.shaft";

fn client() -> (Client, Value) {
    let mut client = Client::start();
    let params = json!({
        "processId": null, "rootUri": null, "initializationOptions": { "documents": true },
        "capabilities": {
            "window": { "showDocument": { "support": true } },
            "textDocument": { "publishDiagnostics": { "codeDescriptionSupport": true } }
        }
    });
    let answer = client.ask("initialize", params);
    client.notify("initialized", json!({}));
    (client, answer["result"]["capabilities"].clone())
}

fn text(client: &mut Client, uri: &Value) -> String {
    let answer = client.ask("layshaft/document", json!({ "uri": uri }));
    assert_eq!(answer["result"]["languageId"], "markdown", "{answer}");
    answer["result"]["text"].as_str().unwrap_or("").to_owned()
}

#[test]
fn the_kind_of_a_thing_and_the_page_of_a_code() {
    let (mut client, can) = client();
    assert_eq!(can["typeDefinitionProvider"], true, "{can}");
    client.open(URI, "let a = 4 kW\nlet b = a + 3 kg\n");
    let told = client.published(URI, 1);
    let href = told[0]["codeDescription"]["href"].clone();
    assert!(text(&mut client, &href).contains("kind-mismatch"), "{told:?}");
    let at = json!({ "textDocument": { "uri": URI }, "position": { "line": 0, "character": 4 } });
    let kind = client.ask("textDocument/typeDefinition", at)["result"].clone();
    assert!(text(&mut client, &kind["uri"]).contains("power"), "{kind}");
    let answer = client.ask("layshaft/document", json!({ "uri": "layshaft:/kinds/no_such_kind.md" }));
    assert_eq!(answer["error"]["code"], -32602);
    client.finish();
}

#[test]
fn the_result_table_is_shown() {
    let (mut client, _) = client();
    let hoist = support::text("specs/mill-hoist.shaft");
    client.open(URI, &hoist);
    let line = hoist.lines().position(|line| line.starts_with("load ")).expect("a load");
    let arguments = json!([URI, { "line": line, "character": 6 }]);
    let params = json!({ "command": "layshaft.resultTable", "arguments": arguments });
    let id = client.request("workspace/executeCommand", params);
    let shown = client.wait("a document to show", |message| message["method"] == "window/showDocument");
    client.send(&json!({ "jsonrpc": "2.0", "id": shown["id"], "result": { "success": true } }));
    assert_eq!(client.answer(id)["result"], Value::Null);
    let table = text(&mut client, &shown["params"]["uri"]);
    assert!(table.starts_with("# Mill hoist H3: lift") && table.contains("## Criteria"), "{table}");
    assert!(table.contains("Per 1 % more, the tightest margin"), "{table}");
    client.finish();
}

#[test]
fn a_client_that_cannot_open_them_is_not_sent_there() {
    let mut client = Client::start();
    let can = client.initialize(json!({}))["capabilities"].clone();
    assert!(can.get("typeDefinitionProvider").is_none(), "{can}");
    client.open(URI, "let a = 4 kW + 3 kg\n");
    let told = client.published(URI, 1);
    assert!(told[0].get("codeDescription").is_none(), "{told:?}");
    client.finish();
}
