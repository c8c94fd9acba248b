//! What passes between the protocol and the core: events in wire order, answers by id, and how the process ends.

use std::collections::BTreeMap;
use std::sync::atomic::{AtomicBool, Ordering};
use std::sync::{Arc, Mutex, MutexGuard, PoisonError};
use std::time::Duration;

use serde_json::Value;
use tokio::sync::oneshot;
use tower_lsp::jsonrpc::{Error, Id, Response, Result};

/// How long answers may take to leave after the last message.
const GRACE: Duration = Duration::from_secs(2);

/// Something for the core to do.
#[derive(Debug)]
pub enum Event {
    /// A notification.
    Notification(String, Value),
    /// A request, with the key under which it waits.
    Request(String, String, Value),
    /// An answer of the client.
    Reply(Response),
}

/// The requests that wait for an answer. Whoever answers first answers: the core, or the cancellation.
#[derive(Clone, Debug, Default)]
pub struct Pending(Arc<Mutex<BTreeMap<String, oneshot::Sender<Result<Value>>>>>);

impl Pending {
    fn map(&self) -> MutexGuard<'_, BTreeMap<String, oneshot::Sender<Result<Value>>>> {
        self.0.lock().unwrap_or_else(PoisonError::into_inner)
    }

    /// Lets a request wait; none if one of the same id does.
    pub fn open(&self, id: &Id) -> Option<(String, oneshot::Receiver<Result<Value>>)> {
        let key = id.to_string();
        let mut map = self.map();
        if map.contains_key(&key) {
            return None;
        }
        let (send, receive) = oneshot::channel();
        map.insert(key.clone(), send);
        Some((key, receive))
    }

    /// Whether the request still waits.
    pub fn waits(&self, key: &str) -> bool {
        self.map().contains_key(key)
    }

    /// Answers a request, unless it was answered.
    pub fn answer(&self, key: &str, answer: Result<Value>) {
        let waiting = self.map().remove(key);
        if let Some(waiting) = waiting {
            // Nobody listens where the process is ending.
            let _ = waiting.send(answer);
        }
    }

    /// Answers a request as cancelled.
    pub fn cancel(&self, key: &str) {
        self.answer(key, Err(Error::request_cancelled()));
    }
}

/// How the process is to end.
#[derive(Clone, Debug, Default)]
pub struct End(Arc<Flags>);

#[derive(Debug, Default)]
struct Flags {
    shut_down: AtomicBool,
    exited: AtomicBool,
}

impl End {
    /// `shutdown` was asked for.
    pub fn shut_down(&self) {
        self.0.shut_down.store(true, Ordering::SeqCst);
    }

    /// `exit` was sent.
    pub fn exit(&self) {
        self.0.exited.store(true, Ordering::SeqCst);
        let end = self.clone();
        // Without the thread the process ends as soon as its last answer has left.
        let _ = std::thread::Builder::new().spawn(move || end.watch());
    }

    /// Whether `exit` was sent.
    pub fn exited(&self) -> bool {
        self.0.exited.load(Ordering::SeqCst)
    }

    /// 0 after `shutdown`, else 1.
    pub fn status(&self) -> i32 {
        i32::from(!self.0.shut_down.load(Ordering::SeqCst))
    }

    /// Ends the process when the grace is over, whatever it does.
    pub fn watch(&self) {
        std::thread::sleep(GRACE);
        std::process::exit(self.status());
    }
}
