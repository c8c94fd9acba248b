//! The one thread that owns everything: it applies what changed, then answers, then tells what it found.
//!
//! What waits in the queue is taken as a whole before anything is computed: changes are applied in their order, and
//! a request that was overtaken by a change of its text is answered with "content modified" instead of being worked on.

use std::any::Any;
use std::collections::VecDeque;
use std::panic::{AssertUnwindSafe, catch_unwind};
use std::sync::mpsc::{Receiver, RecvTimeoutError};
use std::time::{Duration, Instant};

use serde_json::Value;
use tower_lsp::jsonrpc::{Error, ErrorCode, Response};
use tower_lsp::lsp_types::request::{
    CodeLensRefresh, InlayHintRefreshRequest, SemanticTokensRefresh, WorkspaceDiagnosticRefresh,
};
use tower_lsp::lsp_types::{MessageType, Url};

use crate::client::Client;
use crate::disk::Disk;
use crate::handlers;
use crate::outbox::{Asked, Outbox};
use crate::queue::{Event, Pending};
use crate::reports::Reports;
use crate::settings::Settings;
use crate::specs::Specs;
use crate::watch::Watch;

/// Findings of one file are told at most so often, so that a burst of edits is not answered one by one.
const PAUSE: Duration = Duration::from_millis(3);
/// The client is asked to take its answers again at most so often.
const REFRESH: Duration = Duration::from_millis(250);

/// Whether the client's process still runs is asked so often.
const WATCH: Duration = Duration::from_secs(3);

/// A request that waits for its turn.
struct Todo {
    key: String,
    method: String,
    params: Value,
    /// Its document with the state that it was asked of.
    about: Option<(Url, u64)>,
}

/// Everything the server knows.
pub struct Core {
    /// What the client can do.
    pub client: Client,
    /// What the user wants.
    pub settings: Settings,
    /// Documents and their analyses.
    pub specs: Specs,
    /// What was found, by file.
    pub reports: Reports,
    /// Messages to the client.
    pub out: Outbox,
    /// The folders that are open.
    pub folders: Vec<Url>,
    /// Whether the client should take its answers again.
    pub stale: bool,
    refreshed: Option<Instant>,
    watched: Instant,
    pending: Pending,
    /// Over the analysis that runs.
    pub watch: Watch,
}

impl Core {
    /// A core that knows nothing yet.
    pub fn new(disk: Box<dyn Disk>, pending: Pending, out: Outbox, watch: Watch) -> Self {
        Self {
            client: Client::default(),
            settings: Settings::default(),
            specs: Specs::new(disk, watch.clone()),
            reports: Reports::default(),
            out,
            folders: Vec::new(),
            stale: false,
            refreshed: None,
            watched: now(),
            pending,
            watch,
        }
    }

    /// Works until nobody can send events any more.
    pub fn run(mut self, events: &Receiver<Event>) {
        let mut todo = VecDeque::new();
        while self.collect(events, &mut todo) {
            match todo.pop_front() {
                Some(next) => self.answer(next),
                None => {
                    self.background();
                    self.specs.retired = None;
                }
            }
        }
    }

    /// Takes everything that waits in the queue; waits for something where there is no work. Whether to go on.
    fn collect(&mut self, events: &Receiver<Event>, todo: &mut VecDeque<Todo>) -> bool {
        let patience = if todo.is_empty() { self.idle() } else { Some(Duration::ZERO) };
        let mut next = match patience {
            None => match events.recv() {
                Ok(event) => Some(event),
                Err(_) => return false,
            },
            Some(Duration::ZERO) => events.try_recv().ok(),
            Some(patience) => match events.recv_timeout(patience) {
                Ok(event) => Some(event),
                Err(RecvTimeoutError::Timeout) => None,
                Err(RecvTimeoutError::Disconnected) => return false,
            },
        };
        while let Some(event) = next {
            self.take(event, todo);
            next = events.try_recv().ok();
        }
        true
    }

    fn take(&mut self, event: Event, todo: &mut VecDeque<Todo>) {
        match event {
            Event::Notification(method, params) => {
                let done = self.guarded(&method, |core| handlers::notification(core, &method, params));
                if let Some(Err(why)) = done {
                    self.out.log(MessageType::WARNING, format!("{method}: {why}"));
                }
            }
            // What follows is understood by what is agreed here.
            Event::Request(key, method, params) if method == "initialize" => {
                self.answer(Todo { key, method, params, about: None });
            }
            Event::Request(key, method, params) => {
                let uri = params.pointer("/textDocument/uri").and_then(Value::as_str);
                let uri = uri.and_then(|uri| Url::parse(uri).ok());
                let about = uri.and_then(|uri| {
                    let revision = self.specs.documents.get(&uri)?.revision;
                    Some((uri, revision))
                });
                todo.push_back(Todo { key, method, params, about });
            }
            Event::Reply(response) => self.replied(response),
        }
    }

    fn replied(&mut self, response: Response) {
        let (id, answer) = response.into_parts();
        match (self.out.answered(&id), answer) {
            (Some(Asked::Settings), Ok(answer)) => {
                let section = answer.get(0).cloned().unwrap_or(Value::Null);
                self.guarded("workspace/configuration", |core| handlers::settings::set(core, &section));
            }
            (Some(_), Err(error)) => {
                self.out.log(MessageType::INFO, format!("the client refused: {}", error.message));
            }
            _ => {}
        }
    }

    fn answer(&mut self, todo: Todo) {
        let Todo { key, method, params, about } = todo;
        if !self.pending.waits(&key) {
            return;
        }
        if let Some((uri, revision)) = about
            && self.specs.documents.get(&uri).map(|document| document.revision) != Some(revision)
        {
            return self.pending.answer(&key, Err(overtaken(&method)));
        }
        self.watch.answering(Some(&key));
        let answer = self.guarded(&method, |core| handlers::request(core, &method, params));
        self.watch.answering(None);
        let stopped = matches!(&answer, Some(Err(error)) if error.code == ErrorCode::ContentModified);
        if stopped {
            return self.pending.answer(&key, Err(overtaken(&method)));
        }
        let failed = || {
            Err(Error {
                code: ErrorCode::InternalError,
                message: format!("{method} failed: a mistake in layshaft, not in your spec").into(),
                data: None,
            })
        };
        self.pending.answer(&key, answer.unwrap_or_else(failed));
    }

    /// Runs something that must not take the server along.
    fn guarded<T>(&mut self, what: &str, work: impl FnOnce(&mut Self) -> T) -> Option<T> {
        match catch_unwind(AssertUnwindSafe(|| work(self))) {
            Ok(done) => Some(done),
            Err(panic) => {
                self.watch.end();
                let why = words(&*panic);
                self.out
                    .log(MessageType::ERROR, format!("internal error in {what}: {why}. Please report it."));
                None
            }
        }
    }

    /// How long nothing has to be done; none for as long as nothing comes.
    fn idle(&self) -> Option<Duration> {
        let now = now();
        let left = |since: Option<Instant>, pause: Duration| {
            since.map_or(Duration::ZERO, |since| (since + pause).saturating_duration_since(now))
        };
        let told = |uri: &Url| self.specs.specs.get(uri).and_then(|spec| spec.told);
        let mut tell = None;
        for uri in &self.specs.untold {
            let left = left(told(uri), PAUSE);
            if left.is_zero() {
                return Some(left);
            }
            tell = Some(tell.map_or(left, |least: Duration| least.min(left)));
        }
        let refresh = self.stale.then(|| left(self.refreshed, REFRESH));
        let watch = self.client.process.map(|_| left(Some(self.watched), WATCH));
        tell.into_iter().chain(refresh).chain(watch).min()
    }

    /// One piece of work that nobody waits for.
    fn background(&mut self) {
        let now = now();
        let due = |uri: &&Url| {
            let told = self.specs.specs.get(*uri).and_then(|spec| spec.told);
            told.is_none_or(|told| now >= told + PAUSE)
        };
        // What was touched last is looked at now.
        let latest = self.specs.latest.iter().filter(|uri| self.specs.untold.contains(*uri));
        let next = latest.chain(&self.specs.untold).find(due).cloned();
        if let Some(uri) = next {
            self.specs.untold.remove(&uri);
            self.guarded("the analysis", |core| handlers::diagnostics::tell(core, &uri));
            if let Some(spec) = self.specs.specs.get_mut(&uri) {
                spec.told = Some(crate::core::now());
            }
        } else if self.stale && self.refreshed.is_none_or(|last| now >= last + REFRESH) {
            self.refresh();
            self.refreshed = Some(now);
        } else if now >= self.watched + WATCH {
            self.watched = now;
            let runs = self.client.process.and_then(|process| self.specs.disk().runs(process));
            if runs == Some(false) {
                // A pipe may outlive its client where another process has it too.
                std::process::exit(1);
            }
        }
    }

    /// Asks the client to take its answers again.
    fn refresh(&mut self) {
        self.stale = false;
        let may = self.client.refresh;
        if may.diagnostics && self.client.pulls {
            self.out.ask::<WorkspaceDiagnosticRefresh>(&(), Asked::Favour);
        }
        if may.hints {
            self.out.ask::<InlayHintRefreshRequest>(&(), Asked::Favour);
        }
        if may.tokens {
            self.out.ask::<SemanticTokensRefresh>(&(), Asked::Favour);
        }
        if may.lenses {
            self.out.ask::<CodeLensRefresh>(&(), Asked::Favour);
        }
    }
}

/// The answer to a request whose text has changed since.
fn overtaken(method: &str) -> Error {
    if method == "textDocument/diagnostic" {
        let data = Some(serde_json::json!({ "retriggerRequest": true }));
        let message = "the text has changed since".into();
        return Error { code: ErrorCode::ServerError(-32802), message, data };
    }
    Error { message: "the text has changed since".into(), ..Error::content_modified() }
}

/// What a panic says.
fn words(panic: &(dyn Any + Send)) -> &str {
    let text = panic.downcast_ref::<String>().map(String::as_str);
    text.or_else(|| panic.downcast_ref::<&str>().copied()).unwrap_or("no words")
}

#[allow(clippy::disallowed_methods, reason = "when something is told depends on the clock, never what")]
pub(crate) fn now() -> Instant {
    Instant::now()
}

#[cfg(test)]
mod tests;
