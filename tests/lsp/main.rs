//! The server as a client sees it: the program itself, at the other end of a pipe.

#[path = "../support/mod.rs"]
mod support;

mod abuse;
mod actions;
mod client;
mod closed;
mod complete;
mod documents;
mod edits;
mod features;
mod folder;
mod life;
mod long;
mod places;
mod pull;
mod results;
mod same;
