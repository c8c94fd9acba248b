//! Slips of the trade: each is drawn into a good spec, gives exactly one message, and its fix mends it.

#[path = "../support/mod.rs"]
mod support;

use std::fmt::Write as _;

use layshaft_diagnostics::Diagnostic;

/// A slip as drawn.
struct Slip {
    title: String,
    code: String,
    /// `mends`, `offers` or `tells`.
    promise: String,
    good: String,
    bad: String,
}

/// Takes the mark `{good => bad}` out of a drawn spec.
fn draw(drawn: &str) -> Option<(String, String)> {
    let arrow = drawn.find("=>")?;
    let open = drawn[..arrow].rfind('{')?;
    let close = arrow + drawn[arrow..].find('}')?;
    let side = |text: &str| text.to_owned();
    let good = side(drawn[open + 1..arrow].strip_suffix(' ').unwrap_or(&drawn[open + 1..arrow]));
    let bad = side(drawn[arrow + 2..close].strip_prefix(' ').unwrap_or(&drawn[arrow + 2..close]));
    let around = |inner: &str| format!("{}{inner}{}", &drawn[..open], &drawn[close + 1..]);
    Some((around(&good), around(&bad)))
}

fn slips(text: &str) -> Vec<Slip> {
    let blocks = text.split("\n=== ").skip(1);
    blocks
        .map(|block| {
            let (head, drawn) = block.split_once('\n').expect("a title, then a spec");
            let (title, promise) = head.rsplit_once(", ").expect("what becomes of the fix");
            let (title, code) = title.rsplit_once(": ").expect("a code behind the title");
            let (good, bad) = draw(drawn).unwrap_or_else(|| panic!("no slip is drawn: {title}"));
            Slip {
                title: title.to_owned(),
                code: code.to_owned(),
                promise: promise.trim().to_owned(),
                good,
                bad,
            }
        })
        .collect()
}

/// Whether a message that offers no fix says more than that something is wrong.
fn explains(found: &Diagnostic) -> bool {
    found.help.is_some() || !found.notes.is_empty() || !found.related.is_empty() || found.message.len() > 40
}

/// What is wrong with a slip.
fn judge(slip: &Slip) -> Result<(), String> {
    let good = support::analyze(&slip.good);
    if !good.diagnostics.is_empty() {
        return Err(format!("the good spec is not clean: {}", support::lines(&good)));
    }
    let bad = support::analyze(&slip.bad);
    let [found] = bad.diagnostics.as_slice() else {
        return Err(format!("{} messages, not one: {}", bad.diagnostics.len(), support::lines(&bad)));
    };
    let line = support::line(&bad, found);
    if found.code.row().word != slip.code {
        return Err(line);
    }
    match (slip.promise.as_str(), found.fixes.as_slice()) {
        ("tells", []) if explains(found) => Ok(()),
        ("offers", [_, ..]) => Ok(()),
        ("mends", [fix, ..]) => {
            let mended = support::analyze(&support::apply(&slip.bad, fix));
            match mended.diagnostics.as_slice() {
                [] => Ok(()),
                _ => Err(format!("`{}` does not mend it: {}", fix.title, support::lines(&mended))),
            }
        }
        (promise, fixes) => Err(format!("{} fixes, where it {promise}: {line}", fixes.len())),
    }
}

#[test]
fn one_slip_one_message() {
    let slips = slips(&support::text("slips/slips.txt"));
    assert!(slips.len() >= 64, "only {} slips", slips.len());
    let mut report = String::new();
    for slip in &slips {
        if let Err(why) = judge(slip) {
            let _ = write!(report, "\n{}\n    {why}", slip.title);
        }
    }
    assert!(report.is_empty(), "{report}");
}

#[test]
fn a_slip_that_is_none_is_seen() {
    let drawn = "\n=== no slip at all: kind-mismatch, tells\nlet travel = {12 m => 13 m}\n";
    let slips = slips(drawn);
    assert_eq!((slips[0].good.trim(), slips[0].bad.trim()), ("let travel = 12 m", "let travel = 13 m"));
    assert!(judge(&slips[0]).is_err());
}
