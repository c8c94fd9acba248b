//! The Layshaft language: lexer, grammar, tree and formatter.
//!
//! [`parse`] is total: any text gives a [`File`] of items, each with its own problems, and a broken item
//! leaves its neighbours whole.

mod cut;
mod diagnose;
pub mod format;
mod grammar;
mod lexer;
mod parse;
mod problem;
pub mod show;
pub mod token;
pub mod tree;
pub mod words;

pub use lexer::lex;
pub use parse::{Memo, parse, parse_with};
pub use token::{Comment, Lexed, Token, TokenKind};
pub use tree::*;
pub use words::{DECLARATION_WORDS, KEYWORDS, PLACE_WORDS, RESERVED, Word};
