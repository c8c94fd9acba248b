//! The language server: the protocol on one side, `layshaft_ide` on the other, and a queue between them that keeps
//! the messages in the order of the wire.
//!
//! ```text
//! stdin -> frames -> tower-lsp -> service -> queue -> core: one thread, owns everything
//! stdout <- tower-lsp <- answers by id, and what the server sends by itself
//! ```

mod client;
mod closed;
mod convert;
mod core;
pub mod disk;
mod document;
mod frames;
mod handlers;
mod outbox;
mod queue;
mod reports;
mod service;
mod settings;
mod specs;
mod watch;
mod wire;

use std::io;
use std::sync::mpsc;

use tower_lsp::Server;

use crate::core::Core;
use crate::disk::Disk;
use crate::outbox::Outbox;
use crate::queue::{End, Pending};
use crate::service::Adapter;
use crate::watch::Watch;
use crate::wire::{Input, Loop, Output};

/// Room for expressions as deep as the language allows, in any build.
const STACK: usize = 32 << 20;
/// Answers that may be under way at once. More than any client asks for: the reader must never wait for the core.
const MOST_ANSWERS: usize = 1 << 16;

/// Serves one client on standard input and output until it is gone. Gives the exit status: 0 after `shutdown`.
///
/// # Errors
/// A thread cannot be started.
pub fn serve(disk: Box<dyn Disk>) -> io::Result<i32> {
    let (events, received) = mpsc::channel();
    let (messages, outgoing) = tokio::sync::mpsc::unbounded_channel();
    let (pending, end, watch) = (Pending::default(), End::default(), Watch::default());
    let core = Core::new(disk, pending.clone(), Outbox::new(messages), watch.clone());
    std::thread::Builder::new()
        .name(String::from("core"))
        .stack_size(STACK)
        .spawn(move || core.run(&received))?;
    let adapter = Adapter::new(events.clone(), pending, end.clone(), watch);
    let client = Loop { messages: outgoing, events };
    let (input, output) = (Input::start(end.clone())?, Output::new(end.clone()));
    let runtime = tokio::runtime::Builder::new_current_thread().build()?;
    runtime.block_on(Server::new(input, output, client).concurrency_level(MOST_ANSWERS).serve(adapter));
    Ok(end.status())
}
