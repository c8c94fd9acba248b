//! How long hovers, hints and lenses take on a long spec: `cargo run --release -p layshaft-ide --example speed [lines]`.
//! With a path, every hover of that spec is written out instead.

#![allow(clippy::disallowed_methods, reason = "a measurement needs the clock, and the spec a file")]

use std::sync::Arc;
use std::time::Instant;

use layshaft_diagnostics::{FileId, Span};
use layshaft_ide::Snapshot;
use layshaft_ide::hints::{Categories, hints};
use layshaft_ide::hover::{Options, hover};
use layshaft_semantics::{Memo, NoFiles};

fn main() {
    let argument = std::env::args().nth(1);
    match argument.as_deref().map(str::parse) {
        Some(Err(_)) => told(argument.as_deref().unwrap_or("")),
        Some(Ok(lines)) => measured(lines),
        None => measured(10_000),
    }
}

fn told(path: &str) {
    let text: Arc<str> = std::fs::read_to_string(path).unwrap_or_default().into();
    let snapshot = Snapshot::new(path, Arc::clone(&text), &NoFiles, &mut Memo::default());
    for hint in hints(&snapshot, FileId(0), Span::new(0, u32::MAX), Categories::default()) {
        let start = text[..hint.offset as usize].rfind('\n').map_or(0, |at| at + 1);
        println!("{:60.60} {}", &text[start..hint.offset as usize], hint.text);
    }
    let mut last = None;
    for offset in 0..text.len() as u32 {
        let found = hover(&snapshot, FileId(0), offset, Options::default());
        if let Some(found) = found.filter(|found| last != Some(found.place)) {
            println!("=== {}\n{}\n", snapshot.text(found.place), found.markdown);
            last = Some(found.place);
        }
    }
}

fn measured(lines: usize) {
    let mut text = String::new();
    for group in 0..lines / 10 {
        text.push_str(&format!(
            "let load{group} = {group} kg + 5 kg  from \"order\"\n\
             source motor{group}: straight_line {{\n    stall_torque = 10 N·m\n    no_load_speed = 3000 rpm\n}}\n\
             load fan{group}: quadratic {{ rated_torque = 5 N·m; rated_speed = 1600 rpm }}\n\
             drive d{group} = motor{group} -> fan{group} {{ direction = forward }}\n\
             require \"R{group}\" d{group}.fan{group}.speed >= 500 rpm\n\
             show d{group}.power\n\n"
        ));
    }
    text.push_str("case weak { motor0.stall_torque = each 8 N·m, 9 N·m }\n");
    let text: Arc<str> = text.into();
    let start = Instant::now();
    let snapshot = Snapshot::new("spec.shaft", Arc::clone(&text), &NoFiles, &mut Memo::default());
    println!("{} lines: analysis {:?}", text.lines().count(), start.elapsed());
    let mut times: Vec<_> = (0..text.len() as u32)
        .step_by(7)
        .map(|offset| {
            let start = Instant::now();
            let found = hover(&snapshot, FileId(0), offset, Options { charts: false });
            (start.elapsed(), found.map(|found| snapshot.text(found.place).to_owned()))
        })
        .collect();
    println!("first hover {:?}", times.first().map(|first| first.0));
    times.sort();
    let at = |share: f64| times[((times.len() - 1) as f64 * share) as usize].0;
    println!("{} hovers: median {:?}, 99 % {:?}, longest {:?}", times.len(), at(0.5), at(0.99), at(1.0));
    for _ in 0..2 {
        let start = Instant::now();
        let found = hints(&snapshot, FileId(0), Span::new(0, u32::MAX), Categories::default());
        println!("{} hints {:?}", found.len(), start.elapsed());
    }
    println!("slowest: {:?}", times.iter().rev().step_by(50).take(20).collect::<Vec<_>>());
}
