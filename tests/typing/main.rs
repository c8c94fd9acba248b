//! What an editor asks while a text is typed, at every place of every worked spec and of its beginnings: answered
//! without a panic, inside the text, and on whole characters.

#[path = "../support/mod.rs"]
mod support;

use layshaft_diagnostics::{FileId, Span};
use layshaft_ide::Snapshot;
use layshaft_ide::base::{Memo, NoFiles};
use layshaft_ide::completion::{self, NoFolders, Options, completions};
use layshaft_ide::on_type::on_type;
use layshaft_ide::signature::signature;
use layshaft_ide::tokens::semantic_tokens;

const SPEC: FileId = FileId(0);

/// Beginnings of a text are taken at distances of about so many bytes; analyzing each takes its time.
const STRIDE: usize = 61;

fn specs() -> Vec<(String, String)> {
    let names = support::names("specs", ".shaft");
    names.into_iter().map(|name| (name.clone(), support::text(&format!("specs/{name}")))).collect()
}

fn analyzed(text: &str) -> Snapshot {
    Snapshot::new("spec.shaft", text.into(), &NoFiles, &mut Memo::default())
}

/// A span must lie in the text and on borders of characters.
fn sound(text: &str, span: Span, what: &str) {
    let words = text.get(span.start as usize..span.end as usize);
    assert!(words.is_some(), "{what}: {span:?} is not in the text");
}

fn ask_at(snapshot: &Snapshot, text: &str, offset: u32) {
    for (snippets, by_blank) in [(true, false), (false, true)] {
        let options = Options { snippets, by_blank, folders: &NoFolders };
        let Some(found) = completions(snapshot, SPEC, offset, options) else { continue };
        for span in [found.insert, found.replace] {
            sound(text, span, "completion");
            assert!(span.start <= offset && offset.saturating_sub(3) <= span.end, "{span:?} at {offset}");
            assert!(!text[span.start as usize..span.end as usize].contains('\n'), "{span:?} takes lines");
        }
        assert!(found.items.len() <= 100 && !found.items.is_empty());
        assert!(found.items.iter().all(|item| !item.label.is_empty() && !item.text().is_empty()));
        assert!(found.items.is_sorted_by_key(|item| item.rank));
        if offset.is_multiple_of(97) {
            for item in &found.items {
                let told = completion::documentation(snapshot, &item.subject);
                assert!(told.is_none_or(|told| !told.markdown.is_empty()));
            }
        }
    }
    if let Some(help) = signature(snapshot, SPEC, offset) {
        for one in &help.signatures {
            assert!(one.parameters.iter().all(|(name, _)| one.label.contains(name.as_str())), "{one:?}");
        }
        assert!(help.signatures.first().is_some_and(|one| help.parameter < one.parameters.len()));
    }
}

fn typed_at(snapshot: &Snapshot, text: &str, offset: u32) {
    for typed in ['}', '\n', 'x'] {
        let mut edits = on_type(snapshot, SPEC, offset, typed);
        edits.sort_by_key(|(span, _)| (span.start, span.end));
        for (span, _) in &edits {
            sound(text, *span, "on type");
            assert!(span.end <= offset, "{span:?} reaches across {offset}");
        }
        assert!(edits.windows(2).all(|pair| pair[0].0.end <= pair[1].0.start), "{edits:?} overlap");
    }
}

fn painted(snapshot: &Snapshot, text: &str) {
    let tokens = semantic_tokens(snapshot, SPEC, None);
    for token in &tokens {
        sound(text, token.span, "tokens");
        assert!(token.span.start < token.span.end);
        assert!(!text[token.span.start as usize..token.span.end as usize].contains(['\n', '\r']));
    }
    assert!(tokens.windows(2).all(|pair| pair[0].span.end <= pair[1].span.start), "tokens overlap");
    for start in (0..text.len() as u32).step_by(STRIDE) {
        let range = Span::new(start, start + 2 * STRIDE as u32);
        let part = semantic_tokens(snapshot, SPEC, Some(range));
        let inside = |token: &&layshaft_ide::tokens::SemanticToken| {
            token.span.start < range.end && range.start < token.span.end
        };
        let expected: Vec<_> = tokens.iter().filter(inside).copied().collect();
        assert_eq!(part, expected, "{range:?}");
    }
}

#[test]
fn at_every_place_of_every_spec() {
    for (name, text) in specs() {
        println!("{name}");
        let snapshot = analyzed(&text);
        painted(&snapshot, &text);
        for offset in 0..=text.len() as u32 + 3 {
            ask_at(&snapshot, &text, offset);
        }
        for offset in (0..=text.len() as u32 + 3).step_by(7).filter(|at| text.is_char_boundary(*at as usize))
        {
            typed_at(&snapshot, &text, offset);
        }
    }
}

#[test]
fn at_the_end_of_every_beginning() {
    for (name, whole) in specs() {
        println!("{name}");
        let ends = (0..whole.len()).step_by(STRIDE).filter(|at| whole.is_char_boundary(*at));
        for end in ends {
            let text = &whole[..end];
            let snapshot = analyzed(text);
            painted(&snapshot, text);
            for offset in end.saturating_sub(STRIDE)..=end {
                ask_at(&snapshot, text, offset as u32);
            }
            typed_at(&snapshot, text, end as u32);
        }
    }
}

#[test]
fn with_a_piece_taken_out() {
    for (name, whole) in specs() {
        println!("{name}");
        for start in (0..whole.len()).step_by(3 * STRIDE) {
            let end = start + STRIDE / 2;
            let (Some(before), Some(behind)) = (whole.get(..start), whole.get(end..)) else { continue };
            let text = format!("{before}{behind}");
            let snapshot = analyzed(&text);
            painted(&snapshot, &text);
            for offset in start.saturating_sub(5)..=(start + 5).min(text.len()) {
                ask_at(&snapshot, &text, offset as u32);
            }
            typed_at(&snapshot, &text, start as u32);
        }
    }
}
