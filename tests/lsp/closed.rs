//! Specs that are not open: their names are found and renamed, their paths follow files that move.

#![allow(clippy::disallowed_methods, reason = "a test of closed files writes some of its own")]

use std::path::PathBuf;

use serde_json::{Value, json};

use crate::client::Client;

/// A folder of its own with these files, and a client that has it open.
struct Folder {
    path: PathBuf,
    client: Client,
}

impl Folder {
    fn new(name: &str, files: &[(&str, &str)]) -> Self {
        let path = std::env::temp_dir().join(format!("layshaft-closed-{}-{name}", std::process::id()));
        for (name, text) in files.iter().chain(&[("layshaft.toml", "")]) {
            let file = path.join(name);
            std::fs::create_dir_all(file.parent().expect("a folder")).expect("a folder can be made");
            std::fs::write(file, text).expect("a file can be written");
        }
        let path = path.canonicalize().expect("it is there");
        let mut client = Client::start();
        let root = format!("file://{}", path.display());
        let params = json!({
            "processId": null, "rootUri": root, "capabilities": {},
            "workspaceFolders": [{ "uri": root, "name": "mill" }]
        });
        let answer = client.ask("initialize", params);
        let filters =
            &answer["result"]["capabilities"]["workspace"]["fileOperations"]["willRename"]["filters"];
        assert!(filters.as_array().is_some_and(|all| all.len() == 3), "{answer}");
        client.notify("initialized", json!({}));
        Self { path, client }
    }

    fn uri(&self, name: &str) -> String {
        format!("file://{}", self.path.join(name).display())
    }

    fn open(&mut self, name: &str) -> String {
        let uri = self.uri(name);
        let text = std::fs::read_to_string(self.path.join(name)).expect("the file is there");
        self.client.open(&uri, &text);
        uri
    }

    fn ask(&mut self, method: &str, params: Value) -> Value {
        let answer = self.client.ask(method, params);
        assert!(answer.get("error").is_none(), "{method}: {answer}");
        answer["result"].clone()
    }
}

impl Drop for Folder {
    fn drop(&mut self) {
        let _ = std::fs::remove_dir_all(&self.path);
    }
}

const PARTS: (&str, &str) = ("parts/a.shaft", "let crate_mass = 40 kg\n");
const MILL: (&str, &str) = ("mill.shaft", "use \"parts/a.shaft\" as p\nlet whole = 3 * p.crate_mass\n");
const SHED: (&str, &str) = ("shed.shaft", "use \"parts/a.shaft\"\nlet half = a.crate_mass / 2\n");

#[test]
fn a_rename_reaches_closed_specs_and_conflicts_are_refused() {
    let mut folder = Folder::new("rename", &[PARTS, MILL, SHED]);
    let uri = folder.open("parts/a.shaft");
    let at = json!({ "line": 0, "character": 6 });
    let mut params = json!({ "textDocument": { "uri": uri }, "position": at, "newName": "load" });
    params["newName"] = json!("bin_mass");
    let edit = folder.ask("textDocument/rename", params.clone());
    let changes = edit["changes"].as_object().expect("changes");
    assert_eq!(changes.len(), 3, "{edit}");
    for name in ["mill.shaft", "shed.shaft", "parts/a.shaft"] {
        let of = &edit["changes"][folder.uri(name)];
        assert_eq!(of.as_array().map(Vec::len), Some(1), "{name}: {edit}");
        assert_eq!(of[0]["newText"], "bin_mass");
    }
    params["newName"] = json!("if");
    let refused = folder.client.ask("textDocument/rename", params);
    assert_eq!(refused["error"]["code"], -32803, "{refused}");
    let mut params = json!({ "textDocument": { "uri": uri }, "position": { "line": 0, "character": 6 } });
    params["context"] = json!({ "includeDeclaration": false });
    let found = folder.ask("textDocument/references", params);
    assert_eq!(found.as_array().map(Vec::len), Some(2), "{found}");
}

#[test]
fn symbols_of_closed_specs() {
    let mut folder = Folder::new("symbols", &[PARTS, MILL, SHED]);
    let found = folder.ask("workspace/symbol", json!({ "query": "half" }));
    assert_eq!(found[0]["name"], "half", "{found}");
    assert_eq!(found[0]["location"]["uri"], folder.uri("shed.shaft"));
    let found = folder.ask("workspace/symbol", json!({ "query": "crate_mass" }));
    assert_eq!(found.as_array().map(Vec::len), Some(1), "each once: {found}");
}

#[test]
fn paths_follow_a_file_that_moves() {
    let mut folder = Folder::new("moves", &[PARTS, MILL, SHED]);
    let mill = folder.open("mill.shaft");
    let files =
        json!([{ "oldUri": folder.uri("parts/a.shaft"), "newUri": folder.uri("parts/crates.shaft") }]);
    let edit = folder.ask("workspace/willRenameFiles", json!({ "files": files }));
    assert_eq!(edit["changes"][&mill][0]["newText"], "\"parts/crates.shaft\"", "{edit}");
    let shed = folder.uri("shed.shaft");
    assert_eq!(edit["changes"][&shed][0]["newText"], "\"parts/crates.shaft\" as a", "{edit}");
    let files = json!([{ "oldUri": folder.uri("parts"), "newUri": folder.uri("lib") }]);
    let edit = folder.ask("workspace/willRenameFiles", json!({ "files": files }));
    assert_eq!(edit["changes"][&mill][0]["newText"], "\"lib/a.shaft\"", "{edit}");
    let files = json!([{ "oldUri": folder.uri("x.csv"), "newUri": folder.uri("y.csv") }]);
    assert_eq!(folder.ask("workspace/willRenameFiles", json!({ "files": files })), Value::Null);
}
