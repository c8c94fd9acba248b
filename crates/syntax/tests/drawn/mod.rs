//! Drawing what a text gives: shared by the tests of the grammar.
#![allow(dead_code, reason = "every test file uses a part of it")]

use std::fmt::Write;

use layshaft_syntax::{File, Problem, show};

/// Every problem of a file with file offsets.
pub fn problems(file: &File) -> Vec<Problem> {
    let mut all = file.problems.clone();
    for item in &file.items {
        for problem in &item.tree.problems {
            let mut problem = problem.clone();
            problem.span = problem.span.shifted(item.offset);
            if let Some((span, _)) = &mut problem.related {
                *span = span.shifted(item.offset);
            }
            for edit in problem.fixes.iter_mut().flat_map(|fix| &mut fix.1) {
                edit.0 = edit.0.shifted(item.offset);
            }
            all.push(problem);
        }
    }
    all.sort_by_key(|problem| problem.span.start);
    all
}

/// A text as a test writes it: `⏎` is a line end, `⟨200B⟩` the character U+200B.
pub fn written(text: &str) -> String {
    let mut out = String::new();
    let mut rest = text;
    while let Some((before, behind)) = rest.split_once('⟨') {
        let (code, after) = behind.split_once('⟩').unwrap_or((behind, ""));
        let c = u32::from_str_radix(code, 16).ok().and_then(char::from_u32);
        out.push_str(before);
        out.extend(c);
        rest = after;
    }
    out.push_str(rest);
    out.replace('⏎', "\n")
}

/// The other way round.
pub fn shown(text: &str) -> String {
    let mut out = String::new();
    for c in text.chars() {
        match c {
            '\n' => out.push('⏎'),
            '\0'..='\u{1f}' | '\u{a0}' | '\u{200b}'..='\u{202f}' => out += &format!("⟨{:04X}⟩", c as u32),
            _ => out.push(c),
        }
    }
    out
}

/// The text with one fix of a problem applied.
pub fn mended(text: &str, problem: &Problem, fix: usize) -> String {
    let mut edits = problem.fixes[fix].1.clone();
    edits.sort_by_key(|(span, _)| std::cmp::Reverse(span.start));
    let mut out = text.to_owned();
    for (span, new) in edits {
        out.replace_range(span.start as usize..span.end as usize, &new);
    }
    out
}

/// The trees without problems, then each problem: its code, the text it marks, its message, its help and the text
/// that each of its fixes gives.
pub fn drawn(text: &str) -> String {
    let file = layshaft_syntax::parse(text);
    let mut out = String::new();
    for doc in &file.docs {
        let _ = writeln!(out, "(doc {:?})", doc.value);
    }
    for item in &file.items {
        let docs: String = item.tree.docs.iter().map(|doc| format!("(doc {:?}) ", doc.value)).collect();
        let _ = writeln!(out, "{docs}{}", show::item_kind(&item.tree.kind));
    }
    for problem in problems(&file) {
        let marked = shown(&text[problem.span.start as usize..problem.span.end as usize]);
        let _ = writeln!(out, "{} at «{marked}»: {}", problem.code.row().word, problem.message);
        if let Some(help) = &problem.help {
            let _ = writeln!(out, "  help: {help}");
        }
        for (index, (title, _)) in problem.fixes.iter().enumerate() {
            let mended = mended(text, &problem, index);
            let left = self::problems(&layshaft_syntax::parse(&mended)).len();
            let rest = if left == 0 { String::new() } else { format!("   ({left} left)") };
            let mended = shown(&mended);
            let _ = writeln!(out, "  fix: {title} ⇒ {mended}{rest}");
        }
    }
    out
}
