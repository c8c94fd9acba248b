//! Watches over an analysis while it runs: newer text of the same spec, or the end of the request it is for, stops it;
//! where it takes long, the client is told that it goes on.

use std::sync::atomic::{AtomicBool, AtomicU64, Ordering};
use std::sync::{Arc, Condvar, Mutex, MutexGuard, PoisonError};
use std::time::{Duration, Instant};

use serde_json::json;
use tokio::sync::mpsc::UnboundedSender;
use tower_lsp::jsonrpc::{Id, Request};
use tower_lsp::lsp_types::Url;

/// An analysis that takes longer is told of.
const LONG: Duration = Duration::from_millis(300);

/// What is worked on, shared by the thread that works, the one that reads, and the one that tells.
#[derive(Clone, Debug, Default)]
pub struct Watch(Arc<Shared>);

#[derive(Debug, Default)]
struct Shared {
    stop: AtomicBool,
    work: Mutex<Work>,
    moved: Condvar,
    told: AtomicU64,
}

#[derive(Debug, Default)]
struct Work {
    /// The spec under analysis, where newer text may stop it.
    spec: Option<Url>,
    /// The request that is answered.
    request: Option<String>,
    /// Since when, and with which words.
    running: Option<(Instant, String)>,
    /// Under which name the client was told of it.
    token: Option<String>,
}

impl Watch {
    fn work(&self) -> MutexGuard<'_, Work> {
        self.0.work.lock().unwrap_or_else(PoisonError::into_inner)
    }

    /// A request is answered from here on, or none.
    pub fn answering(&self, request: Option<&str>) {
        self.work().request = request.map(str::to_owned);
    }

    /// An analysis begins; newer text stops it unless it has been stopped too often.
    pub fn begin(&self, spec: &Url, may_stop: bool) {
        let mut work = self.work();
        self.0.stop.store(false, Ordering::Relaxed);
        work.spec = may_stop.then(|| spec.clone());
        let name = spec.path().rsplit('/').next().unwrap_or_default();
        work.running = Some((crate::core::now(), format!("Solving {name}")));
        drop(work);
        self.0.moved.notify_all();
    }

    /// It ends; whether it was stopped, so that what came out is worthless.
    pub fn end(&self) -> bool {
        let mut work = self.work();
        work.spec = None;
        work.running = None;
        drop(work);
        self.0.moved.notify_all();
        self.0.stop.load(Ordering::Relaxed)
    }

    /// Whether it is to stop.
    pub fn stopped(&self) -> bool {
        self.0.stop.load(Ordering::Relaxed)
    }

    /// There is newer text of a document.
    pub fn newer(&self, document: &str) {
        let work = self.work();
        if let Some(spec) = &work.spec
            && (spec.as_str() == document || Url::parse(document).is_ok_and(|document| document == *spec))
        {
            self.0.stop.store(true, Ordering::Relaxed);
        }
    }

    /// A request was cancelled.
    pub fn cancelled(&self, request: &str) {
        let work = self.work();
        if work.spec.is_some() && work.request.as_deref() == Some(request) {
            self.0.stop.store(true, Ordering::Relaxed);
        }
    }

    /// Starts to tell a client of work that takes long.
    pub fn tell(&self, to: UnboundedSender<Request>) {
        let watch = self.clone();
        // Without the thread nothing is told, and nothing else is lost.
        let _ = std::thread::Builder::new().name(String::from("progress")).spawn(move || watch.follow(&to));
    }

    fn follow(&self, to: &UnboundedSender<Request>) {
        let mut work = self.work();
        loop {
            let left = match (&work.running, &work.token) {
                (Some((since, _)), None) => {
                    Some((*since + LONG).saturating_duration_since(crate::core::now()))
                }
                _ => None,
            };
            match (left, work.running.clone(), work.token.clone()) {
                (Some(Duration::ZERO), Some((_, words)), None) => {
                    let number = self.0.told.fetch_add(1, Ordering::Relaxed);
                    let token = format!("layshaft/{number}");
                    let create = Request::build("window/workDoneProgress/create")
                        .id(Id::String(token.clone()))
                        .params(json!({ "token": token }));
                    if to.send(create.finish()).is_err() {
                        return;
                    }
                    send(to, &token, json!({ "kind": "begin", "title": words }));
                    work.token = Some(token);
                }
                (_, None, Some(token)) => {
                    send(to, &token, json!({ "kind": "end" }));
                    work.token = None;
                }
                (Some(left), ..) => {
                    let woken = self.0.moved.wait_timeout(work, left);
                    work = woken.unwrap_or_else(PoisonError::into_inner).0;
                }
                _ => work = self.0.moved.wait(work).unwrap_or_else(PoisonError::into_inner),
            }
            if to.is_closed() {
                return;
            }
        }
    }
}

fn send(to: &UnboundedSender<Request>, token: &str, value: serde_json::Value) {
    // Without a receiver the server is ending.
    let _ = to.send(Request::build("$/progress").params(json!({ "token": token, "value": value })).finish());
}
