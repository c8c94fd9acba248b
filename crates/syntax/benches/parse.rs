//! Reading and writing a spec, beside the `toml` crate on a text of equal size in the same run.

#[path = "../../../tests/bench/texts.rs"]
mod texts;

use divan::counter::BytesCount;
use divan::{Bencher, black_box};
use layshaft_syntax::{Memo, format::format, parse, parse_with};

const LINES: &[usize] = &[100, 1_000, 10_000];

fn main() {
    divan::main();
}

/// Baseline: TOML of the same size to a tree with places.
#[divan::bench(args = LINES)]
fn baseline_toml(bencher: Bencher, lines: usize) {
    let text = texts::toml(texts::spec(lines).len());
    assert!(toml::de::DeTable::parse(&text).is_ok());
    bencher.counter(BytesCount::of_str(&text)).bench_local(|| toml::de::DeTable::parse(black_box(&text)));
}

#[divan::bench(args = LINES)]
fn lex(bencher: Bencher, lines: usize) {
    let text = texts::spec(lines);
    bencher.counter(BytesCount::of_str(&text)).bench_local(|| layshaft_syntax::lex(black_box(&text)));
}

/// From nothing to a tree with places and comments.
#[divan::bench(args = LINES)]
fn cold(bencher: Bencher, lines: usize) {
    let text = texts::spec(lines);
    let file = parse(&text);
    assert!(file.problems.is_empty() && file.items.iter().all(|item| item.tree.problems.is_empty()));
    bencher.counter(BytesCount::of_str(&text)).bench_local(|| parse(black_box(&text)));
}

/// One value is typed anew in the middle of a text that is known.
#[divan::bench(args = LINES)]
fn one_edit(bencher: Bencher, lines: usize) {
    let text = texts::spec(lines);
    let states = [text.clone(), edited(&text)];
    let mut memo = Memo::default();
    let _ = parse_with(&states[0], &mut memo);
    let mut turn = 0;
    bencher.counter(BytesCount::of_str(&text)).bench_local(|| {
        turn += 1;
        parse_with(black_box(&states[turn % 2]), &mut memo)
    });
}

#[divan::bench(args = LINES)]
fn write(bencher: Bencher, lines: usize) {
    let text = texts::spec(lines);
    bencher.counter(BytesCount::of_str(&text)).bench_local(|| format(black_box(&text)));
}

fn edited(text: &str) -> String {
    let middle = text[..text.len() / 2].rfind("2980").expect("the text has drives");
    [&text[..middle], "2975", &text[middle + 4..]].concat()
}
