//! What the server sends by itself. Nothing here waits: an answer of the client comes back as an event.

use std::collections::BTreeMap;

use serde::Serialize;
use serde_json::Value;
use tokio::sync::mpsc::UnboundedSender;
use tower_lsp::jsonrpc::{Id, Request};
use tower_lsp::lsp_types::notification::{LogMessage, Notification};
use tower_lsp::lsp_types::request;
use tower_lsp::lsp_types::{LogMessageParams, MessageType};

/// Why the client was asked.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Asked {
    /// For the settings.
    Settings,
    /// To do something; its answer says only whether it did.
    Favour,
}

/// Notifications and requests to the client.
#[derive(Debug)]
pub struct Outbox {
    to: UnboundedSender<Request>,
    next: i64,
    asked: BTreeMap<i64, Asked>,
}

impl Outbox {
    /// An outbox into a channel.
    pub const fn new(to: UnboundedSender<Request>) -> Self {
        Self { to, next: 1, asked: BTreeMap::new() }
    }

    /// The channel, for what sends by itself.
    pub fn channel(&self) -> UnboundedSender<Request> {
        self.to.clone()
    }

    /// Sends a notification.
    pub fn notify<N: Notification>(&self, params: &N::Params) {
        self.send(Request::build(N::METHOD).params(value(params)).finish());
    }

    /// Asks the client.
    pub fn ask<R: request::Request>(&mut self, params: &R::Params, why: Asked) {
        let id = self.next;
        self.next += 1;
        self.asked.insert(id, why);
        let request = Request::build(R::METHOD).id(id);
        let params = value(params);
        let request = if params.is_null() { request } else { request.params(params) };
        self.send(request.finish());
    }

    /// Why the request that is answered was sent.
    pub fn answered(&mut self, id: &Id) -> Option<Asked> {
        match id {
            Id::Number(id) => self.asked.remove(id),
            _ => None,
        }
    }

    /// Tells the client's log.
    pub fn log(&self, grave: MessageType, message: impl Into<String>) {
        self.notify::<LogMessage>(&LogMessageParams { typ: grave, message: message.into() });
    }

    fn send(&self, request: Request) {
        // Without a receiver the server is ending.
        let _ = self.to.send(request);
    }
}

/// A value of the protocol as JSON; all of them can be written so.
pub fn value(of: &impl Serialize) -> Value {
    serde_json::to_value(of).unwrap_or(Value::Null)
}
