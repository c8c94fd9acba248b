//! Completion: lists of entries, and what is told of one.

use layshaft_ide::completion::{
    Completion, CompletionKind as Kind, Completions, Folders, Listed, NoFolders, Options, completions,
    documentation,
};
use serde_json::{Map, Value, json};
use tower_lsp::jsonrpc::Result;
use tower_lsp::lsp_types::{CompletionItemKind, CompletionParams, CompletionTriggerKind, Url};

use crate::core::Core;
use crate::disk::{Disk, Place};
use crate::handlers::{Asked, SPEC};

/// Characters behind which a list is worth being asked for. A blank gives one only where the choice is small.
pub const TRIGGERS: [&str; 5] = [".", " ", "\"", "/", "["];

/// Snippets in the words of the protocol.
const SNIPPET: u8 = 2;

/// What can be written at a place. The types at hand are older than the defaults of a list, so it is put together here.
pub fn complete(core: &mut Core, params: CompletionParams) -> Result<Value> {
    let (asked, offset) = Asked::at(core, &params.text_document_position)?;
    let by_blank = params.context.is_some_and(|context| {
        context.trigger_kind == CompletionTriggerKind::TRIGGER_CHARACTER
            && context.trigger_character.as_deref() == Some(" ")
    });
    let place = core.specs.documents.get(&asked.uri).and_then(|document| document.place.clone());
    let below = place.map(|place| Below { disk: core.specs.disk(), place });
    let folders = below.as_ref().map_or(&NoFolders as &dyn Folders, |below| below);
    let options = Options { snippets: core.client.completion.snippets, by_blank, folders };
    let found = completions(&asked.snapshot, SPEC, offset, options);
    Ok(found.map_or(Value::Null, |found| list(core, &asked, &found)))
}

/// The folders below the root of a document.
struct Below<'a> {
    disk: &'a dyn Disk,
    place: Place,
}

impl Folders for Below<'_> {
    fn list(&self, folder: &str) -> Vec<Listed> {
        let found = self.disk.list(&self.place.root, folder);
        found.into_iter().map(|(name, folder)| Listed { name, folder }).collect()
    }
}

fn list(core: &Core, asked: &Asked, found: &Completions) -> Value {
    let range = |span| json!(core.client.encoding.range(asked.file(), span));
    let (insert, replace) = (range(found.insert), range(found.replace));
    let both = core.client.completion.insert_replace.then(|| json!({ "insert": insert, "replace": replace }));
    let defaults = core.client.completion.default_range;
    let item = |(at, item): (usize, &Completion)| {
        let mut entry = entry(core, asked, at, item);
        let text = json!(item.text());
        if defaults {
            if item.insert.is_some() {
                entry.insert("textEditText".into(), text);
            }
        } else {
            let edit = match &both {
                Some(_) => json!({ "insert": insert, "replace": replace, "newText": text }),
                None => json!({ "range": insert, "newText": text }),
            };
            entry.insert("textEdit".into(), edit);
        }
        Value::Object(entry)
    };
    let items: Vec<Value> = found.items.iter().enumerate().map(item).collect();
    let mut list = json!({ "isIncomplete": found.incomplete, "items": items });
    if defaults {
        let range = both.unwrap_or(insert);
        list["itemDefaults"] = json!({ "editRange": range });
    }
    list
}

/// An entry without its edit.
fn entry(core: &Core, asked: &Asked, at: usize, item: &Completion) -> Map<String, Value> {
    let mut entry = Map::new();
    let mut put = |key: &str, value: Value| {
        entry.insert(key.into(), value);
    };
    put("label", json!(item.label));
    put("kind", json!(kind(item.kind)));
    put("sortText", json!(format!("{}{at:03}", item.rank)));
    if !item.note.is_empty() {
        if core.client.completion.label_details {
            put("labelDetails", json!({ "description": item.note }));
        } else {
            put("detail", json!(item.note));
        }
    }
    if let Some(filter) = &item.filter {
        put("filterText", json!(filter));
    }
    if item.snippet {
        put("insertTextFormat", json!(SNIPPET));
    }
    if !item.subject.is_empty() {
        put("data", json!({ "uri": asked.uri, "of": item.subject }));
    }
    entry
}

const fn kind(kind: Kind) -> CompletionItemKind {
    match kind {
        Kind::Keyword => CompletionItemKind::KEYWORD,
        Kind::PartKind => CompletionItemKind::CLASS,
        Kind::QuantityKind => CompletionItemKind::TYPE_PARAMETER,
        Kind::Field => CompletionItemKind::FIELD,
        Kind::Unit => CompletionItemKind::UNIT,
        Kind::Value => CompletionItemKind::VARIABLE,
        Kind::Part => CompletionItemKind::MODULE,
        Kind::Drive => CompletionItemKind::STRUCT,
        Kind::Case => CompletionItemKind::EVENT,
        Kind::Result => CompletionItemKind::PROPERTY,
        Kind::Function => CompletionItemKind::FUNCTION,
        Kind::Constant => CompletionItemKind::CONSTANT,
        Kind::Word => CompletionItemKind::ENUM_MEMBER,
        Kind::Code => CompletionItemKind::VALUE,
        Kind::File => CompletionItemKind::FILE,
        Kind::Folder => CompletionItemKind::FOLDER,
        Kind::Form => CompletionItemKind::SNIPPET,
    }
}

/// An entry with what is told of it. An entry that is not ours, or not of the text as it is now, comes back as it was.
pub fn resolve(core: &mut Core, mut item: Value) -> Result<Value> {
    let word = |name: &str| item.pointer(&format!("/data/{name}")).and_then(Value::as_str);
    let uri = word("uri").and_then(|uri| Url::parse(uri).ok());
    let of = word("of").map(str::to_owned);
    if let (Some(uri), Some(of)) = (uri, of)
        && item.is_object()
        && let Ok(asked) = Asked::new(core, &uri)
        && let Some(told) = documentation(&asked.snapshot, &of)
    {
        item["documentation"] = json!({ "kind": "markdown", "value": told.markdown });
        if let Some(detail) = told.detail {
            item["detail"] = json!(detail);
        }
    }
    Ok(item)
}
