//! The Layshaft language: lexer, grammar, tree and formatter.
//!
//! `parse` is total: any text gives a [`File`] of items, each with its own problems, and a broken item
//! leaves its neighbours whole.

pub mod format;
mod lexer;
mod problem;
pub mod token;
pub mod tree;
pub mod words;

pub use lexer::lex;
pub use token::{Comment, Lexed, Token, TokenKind};
pub use tree::*;
pub use words::{DECLARATION_WORDS, KEYWORDS, PLACE_WORDS, RESERVED, Word};
