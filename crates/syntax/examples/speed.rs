//! Reports how fast a text of about a megabyte is taken apart and parsed. Run in release mode.

use std::hint::black_box;
#[allow(clippy::disallowed_methods, reason = "a measurement needs the clock")]
fn seconds(mut run: impl FnMut()) -> f64 {
    let mut times: Vec<f64> = (0..15)
        .map(|_| {
            let start = std::time::Instant::now();
            run();
            start.elapsed().as_secs_f64()
        })
        .collect();
    times.sort_by(f64::total_cmp);
    times[times.len() / 2]
}

fn main() {
    let specs =
        [include_str!("../tests/data/mill_hoist.shaft"), include_str!("../tests/data/bakery_trike.shaft")];
    let mut text = String::new();
    while text.len() < 1_000_000 {
        text.push_str(specs[0]);
        text.push_str(specs[1]);
    }
    let megabytes = text.len() as f64 / 1e6;
    let lexed = seconds(|| {
        black_box(layshaft_syntax::lex(black_box(&text)));
    });
    let parsed = seconds(|| {
        black_box(layshaft_syntax::parse(black_box(&text)));
    });
    let mut kept = Vec::new();
    let held = seconds(|| kept.push(layshaft_syntax::parse(black_box(&text))));
    drop(kept);
    let mut memo = layshaft_syntax::Memo::default();
    black_box(layshaft_syntax::parse_with(&text, &mut memo));
    let edited = text.replacen("1250 kg", "1251 kg", 1);
    let mut flip = false;
    let again = seconds(|| {
        flip = !flip;
        let text = if flip { &edited } else { &text };
        black_box(layshaft_syntax::parse_with(black_box(text), &mut memo));
    });
    println!("{megabytes:.2} MB, {} lines", text.lines().count());
    println!("lex          {:7.1} MB/s  {:.2} ms", megabytes / lexed, lexed * 1e3);
    println!("parse        {:7.1} MB/s  {:.2} ms", megabytes / parsed, parsed * 1e3);
    println!("  not dropped{:6.1} MB/s  {:.2} ms", megabytes / held, held * 1e3);
    println!("after 1 edit {:7.1} MB/s  {:.2} ms", megabytes / again, again * 1e3);
}
