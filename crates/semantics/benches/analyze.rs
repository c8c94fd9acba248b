//! The whole analysis of a spec, beside the `toml` crate reading a text of equal size in the same run.

#[path = "../../../tests/bench/texts.rs"]
mod texts;

use std::sync::Arc;

use divan::counter::BytesCount;
use divan::{Bencher, black_box};
use layshaft_semantics::{Memo, NoFiles, analyze, analyze_with};

const LINES: &[usize] = &[100, 1_000, 10_000];

fn main() {
    divan::main();
}

/// Baseline: TOML of the same size to a tree with places; nothing is evaluated.
#[divan::bench(args = LINES)]
fn baseline_toml(bencher: Bencher, lines: usize) {
    let text = texts::toml(texts::spec(lines).len());
    bencher.counter(BytesCount::of_str(&text)).bench_local(|| toml::de::DeTable::parse(black_box(&text)));
}

/// Reading alone: the share of the grammar in the whole.
#[divan::bench(args = LINES)]
fn parse(bencher: Bencher, lines: usize) {
    let text = texts::spec(lines);
    bencher.counter(BytesCount::of_str(&text)).bench_local(|| layshaft_syntax::parse(black_box(&text)));
}

/// From nothing to every operating point and verdict.
#[divan::bench(args = LINES)]
fn cold(bencher: Bencher, lines: usize) {
    let text: Arc<str> = texts::spec(lines).into();
    let analysis = analyze("a.shaft", text.clone(), &NoFiles);
    assert!(!analysis.has_errors(), "{:#?}", analysis.diagnostics.first());
    bencher.counter(BytesCount::of_str(&*text)).bench_local(|| analyze("a.shaft", text.clone(), &NoFiles));
}

/// One value is typed anew in the middle of a text that is known; everything is evaluated.
#[divan::bench(args = LINES)]
fn one_edit(bencher: Bencher, lines: usize) {
    let text = texts::spec(lines);
    let middle = text[..text.len() / 2].rfind("2980").expect("the text has drives");
    let edited = [&text[..middle], "2975", &text[middle + 4..]].concat();
    let states: [Arc<str>; 2] = [text.into(), edited.into()];
    let mut memo = Memo::default();
    let _ = analyze_with("a.shaft", states[0].clone(), &NoFiles, &mut memo);
    let mut turn = 0;
    bencher.counter(BytesCount::of_str(&*states[0])).bench_local(|| {
        turn += 1;
        analyze_with("a.shaft", states[turn % 2].clone(), &NoFiles, &mut memo)
    });
}
