//! The language server: the protocol on one side, `layshaft_ide` on the other, and a queue between them that keeps
//! the messages in the order of the wire.
//!
//! It belongs to an issue of its own and is not here yet, so the command does not offer it. What it will stand on
//! is declared in the manifest: `tower-lsp` on `tokio`, behind one adapter.
