//! A panic takes its own message along, is told to the log, and nothing else.

use std::path::{Path, PathBuf};
use std::sync::Arc;
use std::sync::mpsc;

use layshaft_ide::base::ReadError;
use serde_json::{Value, json};
use tower_lsp::jsonrpc::{ErrorCode, Id, Request};

use super::Core;
use crate::disk::{Disk, Place, Stamp};
use crate::outbox::Outbox;
use crate::queue::{Event, Pending};
use crate::watch::Watch;

/// A disk that cannot be relied on.
struct Shaky;

impl Disk for Shaky {
    fn place(&self, file: &Path) -> Option<Place> {
        assert!(!file.ends_with("bad.shaft"), "a shaky place");
        let path = file.file_name()?.to_str()?.to_owned();
        Some(Place { root: PathBuf::from("/nowhere"), path })
    }

    fn read(&self, _: &Path, _: &str) -> Result<Arc<str>, ReadError> {
        Err(ReadError::Missing)
    }

    fn stamp(&self, _: &Path, _: &str) -> Option<Stamp> {
        None
    }

    fn specs(&self, _: &Path) -> Vec<PathBuf> {
        Vec::new()
    }

    fn list(&self, _: &Path, _: &str) -> Vec<(String, bool)> {
        panic!("a shaky list")
    }

    fn runs(&self, _: u32) -> Option<bool> {
        None
    }
}

fn open(name: &str) -> Event {
    let document = json!({
        "uri": format!("file:///nowhere/{name}"), "languageId": "layshaft", "version": 1, "text": "use \"\n",
    });
    Event::Notification("textDocument/didOpen".to_owned(), json!({ "textDocument": document }))
}

#[test]
fn a_panic_takes_only_its_own_message_along() {
    let (events, received) = mpsc::channel();
    let (messages, mut outgoing) = tokio::sync::mpsc::unbounded_channel::<Request>();
    let pending = Pending::default();
    let core = Core::new(Box::new(Shaky), pending.clone(), Outbox::new(messages), Watch::default());
    let send = |event| events.send(event).expect("the core listens");
    let ask = |id: i64, method: &str, params: Value| {
        let (key, answer) = pending.open(&Id::Number(id)).expect("a new id");
        send(Event::Request(key, method.to_owned(), params));
        answer
    };
    let document = json!({ "uri": "file:///nowhere/good.shaft" });
    send(open("bad.shaft"));
    send(open("good.shaft"));
    let place = json!({ "textDocument": document, "position": { "line": 0, "character": 5 } });
    let mut failing = ask(1, "textDocument/completion", place);
    let mut good = ask(2, "textDocument/documentSymbol", json!({ "textDocument": document }));
    drop(events);
    core.run(&received);

    let failed = failing.try_recv().expect("an answer").expect_err("an error");
    assert_eq!(failed.code, ErrorCode::InternalError);
    assert!(good.try_recv().expect("an answer").is_ok());
    let mut logged = String::new();
    while let Ok(message) = outgoing.try_recv() {
        logged.push_str(&message.to_string());
    }
    assert!(logged.contains("a shaky place") && logged.contains("a shaky list"), "{logged}");
}
