//! The server as a client sees it: the program itself, at the other end of a pipe.

#[path = "../support/mod.rs"]
mod support;

mod abuse;
mod client;
mod complete;
mod edits;
mod features;
mod folder;
mod life;
mod places;
mod pull;
mod same;
