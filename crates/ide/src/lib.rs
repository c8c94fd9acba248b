//! What an editor asks of a spec, in editor words: offsets, labels and markup, never types of a protocol.
//!
//! Each feature will be one file here that takes an analysis and a place and gives plain data: hover, inlay hints,
//! completion, definition and references, rename, symbols, code actions. They belong to the language server's
//! issue; nothing of them is here yet. Whatever they show comes from `layshaft_present`, so that an editor and
//! the command cannot disagree.
