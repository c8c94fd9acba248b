//! A scripted client: starts the server, sends, waits for what it asked for, never longer than a limit.

use std::collections::VecDeque;
use std::io::{BufRead, BufReader, Write};
use std::process::{Child, ChildStdin, Command, ExitStatus, Stdio};
use std::sync::mpsc::{Receiver, Sender, channel};
use std::thread;
use std::time::{Duration, Instant};

use serde_json::{Value, json};

/// Longer than any machine should need.
pub const PATIENCE: Duration = Duration::from_secs(60);

/// A server with a client at its other end.
pub struct Client {
    child: Child,
    stdin: Option<ChildStdin>,
    messages: Receiver<Value>,
    deaf: Sender<()>,
    /// Messages that came while another was waited for.
    pub waiting: VecDeque<Value>,
    next: i64,
}

impl Client {
    /// Starts a server; nothing is sent.
    pub fn start() -> Self {
        let mut child = Command::new(layshaft_tests::program())
            .args(["lsp", "--stdio"])
            .stdin(Stdio::piped())
            .stdout(Stdio::piped())
            .stderr(Stdio::null())
            .spawn()
            .expect("the server starts");
        let stdin = child.stdin.take();
        let stdout = child.stdout.take().expect("a pipe");
        let (send, messages) = channel();
        let (deaf, told) = channel();
        thread::spawn(move || {
            let mut from = BufReader::new(stdout);
            while let Some(message) = read(&mut from) {
                if told.try_recv().is_ok() || send.send(message).is_err() {
                    break;
                }
            }
        });
        Self { child, stdin, messages, deaf, waiting: VecDeque::new(), next: 0 }
    }

    /// A server that is initialized with these capabilities.
    pub fn with(capabilities: Value) -> Self {
        let mut client = Self::start();
        client.initialize(capabilities);
        client
    }

    /// The first two messages.
    pub fn initialize(&mut self, capabilities: Value) -> Value {
        let params = json!({ "processId": null, "rootUri": null, "capabilities": capabilities });
        let answer = self.ask("initialize", params);
        self.notify("initialized", json!({}));
        answer["result"].clone()
    }

    /// Sends bytes as they are.
    pub fn raw(&mut self, bytes: &[u8]) {
        let stdin = self.stdin.as_mut().expect("the pipe is open");
        // A server that has gone is seen by what it did not answer.
        let _ = stdin.write_all(bytes);
        let _ = stdin.flush();
    }

    /// Sends a message.
    pub fn send(&mut self, message: &Value) {
        let body = message.to_string();
        self.raw(format!("Content-Length: {}\r\n\r\n{body}", body.len()).as_bytes());
    }

    /// Sends a notification.
    pub fn notify(&mut self, method: &str, params: Value) {
        self.send(&json!({ "jsonrpc": "2.0", "method": method, "params": params }));
    }

    /// Sends a request; gives its id.
    pub fn request(&mut self, method: &str, params: Value) -> i64 {
        self.next += 1;
        let id = self.next;
        self.send(&json!({ "jsonrpc": "2.0", "id": id, "method": method, "params": params }));
        id
    }

    /// Sends a request and waits for its answer.
    pub fn ask(&mut self, method: &str, params: Value) -> Value {
        let id = self.request(method, params);
        self.answer(id)
    }

    /// The answer to a request.
    pub fn answer(&mut self, id: i64) -> Value {
        self.wait(&format!("an answer to {id}"), |message| {
            message["id"] == json!(id) && message.get("method").is_none()
        })
    }

    /// The next message that is meant; others are kept.
    pub fn wait(&mut self, what: &str, is_meant: impl Fn(&Value) -> bool) -> Value {
        if let Some(at) = self.waiting.iter().position(&is_meant) {
            return self.waiting.remove(at).expect("it was found");
        }
        let until = now() + PATIENCE;
        loop {
            let left = until.saturating_duration_since(now());
            let Ok(message) = self.messages.recv_timeout(left) else {
                panic!("{what} did not come; waiting: {:?}", self.waiting.iter().take(5).collect::<Vec<_>>());
            };
            if is_meant(&message) {
                return message;
            }
            self.waiting.push_back(message);
        }
    }

    /// The findings told of a version of a document.
    pub fn published(&mut self, uri: &str, version: i64) -> Vec<Value> {
        let message = self.wait(&format!("findings of {uri}, version {version}"), |message| {
            message["method"] == "textDocument/publishDiagnostics"
                && message["params"]["uri"] == uri
                && message["params"]["version"] == version
        });
        message["params"]["diagnostics"].as_array().cloned().unwrap_or_default()
    }

    /// Opens a document, version 1.
    pub fn open(&mut self, uri: &str, text: &str) {
        let document = json!({ "uri": uri, "languageId": "layshaft", "version": 1, "text": text });
        self.notify("textDocument/didOpen", json!({ "textDocument": document }));
    }

    /// Changes a document.
    pub fn change(&mut self, uri: &str, version: i64, changes: Value) {
        let document = json!({ "uri": uri, "version": version });
        self.notify("textDocument/didChange", json!({ "textDocument": document, "contentChanges": changes }));
    }

    /// Closes the pipe to the server.
    pub fn hang_up(&mut self) {
        self.stdin = None;
    }

    /// Stops to listen and closes the pipe from the server, at the next message that comes.
    pub fn deaf(&self) {
        let _ = self.deaf.send(());
    }

    /// Waits for the process to end.
    pub fn end(&mut self) -> ExitStatus {
        let until = now() + PATIENCE;
        while now() < until {
            if let Some(status) = self.child.try_wait().expect("a process of our own") {
                return status;
            }
            thread::sleep(Duration::from_millis(5));
        }
        panic!("the server did not end");
    }

    /// `shutdown` and `exit`; the status must be 0.
    pub fn finish(mut self) {
        let answer = self.ask("shutdown", Value::Null);
        assert_eq!(answer["result"], Value::Null, "{answer}");
        self.notify("exit", Value::Null);
        assert_eq!(self.end().code(), Some(0));
    }
}

impl Drop for Client {
    fn drop(&mut self) {
        // Only a failed test leaves one running.
        let _ = self.child.kill();
        let _ = self.child.wait();
    }
}

fn read(from: &mut impl BufRead) -> Option<Value> {
    let mut length = 0;
    loop {
        let mut line = String::new();
        if from.read_line(&mut line).ok()? == 0 {
            return None;
        }
        let line = line.trim_end();
        if line.is_empty() {
            break;
        }
        if let Some(value) = line.strip_prefix("Content-Length: ") {
            length = value.parse().ok()?;
        }
    }
    let mut body = vec![0; length];
    from.read_exact(&mut body).ok()?;
    serde_json::from_slice(&body).ok()
}

#[allow(clippy::disallowed_methods, reason = "a test that waits must end")]
fn now() -> Instant {
    Instant::now()
}
