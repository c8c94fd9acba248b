//! The adapter below `tower-lsp`: takes each message in the order of the wire, before any other is looked at.
//!
//! `tower-lsp` polls handlers side by side, so nothing may happen in one. Here a message is put into the queue of
//! the core while it is taken, and what is handed back only waits for the answer. Lifecycle, cancellation and `exit` are
//! settled here, for they must not wait for work.

use std::convert::Infallible;
use std::future::{Future, ready};
use std::pin::Pin;
use std::sync::mpsc;
use std::task::{Context, Poll};

use serde_json::Value;
use tower_lsp::jsonrpc::{Error, ErrorCode, Id, Request, Response};
use tower_service::Service;

use crate::frames::BAD_MESSAGE;
use crate::queue::{End, Event, Pending};
use crate::watch::Watch;

#[derive(Clone, Copy, Debug, PartialEq, Eq)]
enum Life {
    Born,
    Running,
    ShutDown,
}

/// The service that `tower-lsp` calls.
pub struct Adapter {
    life: Life,
    events: mpsc::Sender<Event>,
    pending: Pending,
    end: End,
    watch: Watch,
}

type Answer = Pin<Box<dyn Future<Output = Result<Option<Response>, Infallible>> + Send>>;

impl Adapter {
    /// A service that fills the queue of a core.
    pub const fn new(events: mpsc::Sender<Event>, pending: Pending, end: End, watch: Watch) -> Self {
        Self { life: Life::Born, events, pending, end, watch }
    }

    fn notification(&mut self, method: &str, params: Value) {
        match method {
            "exit" => self.end.exit(),
            "$/cancelRequest" => {
                if let Some(Ok(id)) = params.get("id").map(|id| serde_json::from_value::<Id>(id.clone())) {
                    let key = id.to_string();
                    self.pending.cancel(&key);
                    self.watch.cancelled(&key);
                }
            }
            _ if self.life == Life::Running => {
                let newer = matches!(method, "textDocument/didChange" | "textDocument/didClose");
                let uri = params.pointer("/textDocument/uri").and_then(Value::as_str);
                // Before the change is in the queue: behind it, the analysis of the new text itself could be stopped.
                if let Some(uri) = uri.filter(|_| newer) {
                    self.watch.newer(uri);
                }
                self.push(Event::Notification(method.to_owned(), params));
            }
            _ => {}
        }
    }

    fn request(&mut self, method: &str, id: Id, params: Value) -> Answer {
        if let Err(error) = self.admit(method, &params) {
            return now(id, Err(error));
        }
        if method == "shutdown" {
            self.life = Life::ShutDown;
            self.end.shut_down();
            return now(id, Ok(Value::Null));
        }
        let Some((key, answer)) = self.pending.open(&id) else {
            return now(
                id,
                Err(error(ErrorCode::InvalidRequest, "a request with this id is not answered yet")),
            );
        };
        self.push(Event::Request(key, method.to_owned(), params));
        Box::pin(async move {
            let answer = answer.await.unwrap_or_else(|_| Err(Error::internal_error()));
            Ok(Some(Response::from_parts(id, answer)))
        })
    }

    /// Whether a request comes at its time.
    fn admit(&mut self, method: &str, params: &Value) -> Result<(), Error> {
        if method == BAD_MESSAGE {
            let code = params.get("code").and_then(Value::as_i64).unwrap_or(-32700);
            let message =
                params.get("message").and_then(Value::as_str).unwrap_or("the message cannot be read");
            return Err(Error { code: code.into(), message: message.to_owned().into(), data: None });
        }
        match (self.life, method) {
            (Life::Born, "initialize") => {
                self.life = Life::Running;
                Ok(())
            }
            (Life::Born, _) => Err(error(
                ErrorCode::ServerError(-32002),
                "the server is not initialized: send `initialize` first",
            )),
            (Life::Running, "initialize") => {
                Err(error(ErrorCode::InvalidRequest, "the server is initialized already"))
            }
            (Life::Running, _) => Ok(()),
            (Life::ShutDown, _) => {
                Err(error(ErrorCode::InvalidRequest, "the server is shut down: send `exit`"))
            }
        }
    }

    fn push(&self, event: Event) {
        // Without a core every waiting request is answered with an internal error.
        let _ = self.events.send(event);
    }
}

impl Service<Request> for Adapter {
    type Response = Option<Response>;
    type Error = Infallible;
    type Future = Answer;

    fn poll_ready(&mut self, _: &mut Context<'_>) -> Poll<Result<(), Infallible>> {
        Poll::Ready(Ok(()))
    }

    fn call(&mut self, request: Request) -> Answer {
        let (method, id, params) = request.into_parts();
        let params = params.unwrap_or(Value::Null);
        if self.end.exited() {
            return Box::pin(ready(Ok(None)));
        }
        match id {
            Some(id) => self.request(&method, id, params),
            None => {
                self.notification(&method, params);
                Box::pin(ready(Ok(None)))
            }
        }
    }
}

fn now(id: Id, answer: Result<Value, Error>) -> Answer {
    Box::pin(ready(Ok(Some(Response::from_parts(id, answer)))))
}

/// An error of the protocol.
pub fn error(code: ErrorCode, message: impl Into<String>) -> Error {
    Error { code, message: message.into().into(), data: None }
}
