//! Semantic tokens: of the whole text, of a range, and what changed since the last answer.

use layshaft_ide::base::SourceFile;
use layshaft_ide::tokens::{Modifier, SemanticToken as Painted, TokenType, semantic_tokens};
use tower_lsp::jsonrpc::Result;
use tower_lsp::lsp_types::{
    SemanticToken, SemanticTokenModifier, SemanticTokenType, SemanticTokens, SemanticTokensDelta,
    SemanticTokensDeltaParams, SemanticTokensEdit, SemanticTokensFullDeltaResult, SemanticTokensFullOptions,
    SemanticTokensLegend, SemanticTokensOptions, SemanticTokensParams, SemanticTokensRangeParams,
};

use crate::convert::Encoding;
use crate::core::Core;
use crate::handlers::{Asked, SPEC};

/// What was last painted of a text.
#[derive(Debug, Default)]
pub struct Kept {
    /// Counts the answers; its number is what the client names.
    count: u64,
    tokens: Vec<SemanticToken>,
}

/// What the server offers.
pub fn options() -> SemanticTokensOptions {
    SemanticTokensOptions {
        legend: SemanticTokensLegend {
            token_types: TokenType::ALL.iter().map(|row| SemanticTokenType::new(row.0)).collect(),
            token_modifiers: Modifier::ALL.iter().map(|row| SemanticTokenModifier::new(row.0)).collect(),
        },
        range: Some(true),
        full: Some(SemanticTokensFullOptions::Delta { delta: Some(true) }),
        ..SemanticTokensOptions::default()
    }
}

/// The tokens of a text.
pub fn full(core: &mut Core, params: SemanticTokensParams) -> Result<SemanticTokens> {
    let asked = Asked::new(core, &params.text_document.uri)?;
    let data = encoded(core, &asked, semantic_tokens(&asked.snapshot, SPEC, None));
    let result_id = keep(core, &asked, &data);
    Ok(SemanticTokens { result_id, data })
}

/// The tokens of a range.
pub fn range(core: &mut Core, params: SemanticTokensRangeParams) -> Result<SemanticTokens> {
    let asked = Asked::new(core, &params.text_document.uri)?;
    let range = core.client.encoding.span(asked.file(), params.range);
    let data = encoded(core, &asked, semantic_tokens(&asked.snapshot, SPEC, Some(range)));
    Ok(SemanticTokens { result_id: None, data })
}

/// What changed since the last answer; everything where the client knows another one.
pub fn delta(core: &mut Core, params: SemanticTokensDeltaParams) -> Result<SemanticTokensFullDeltaResult> {
    let asked = Asked::new(core, &params.text_document.uri)?;
    let data = encoded(core, &asked, semantic_tokens(&asked.snapshot, SPEC, None));
    let kept = core.specs.specs.get(&asked.uri).map(|spec| &spec.painted);
    let known = kept.filter(|kept| kept.count > 0 && kept.count.to_string() == params.previous_result_id);
    let edits = known.map(|kept| difference(&kept.tokens, &data));
    let result_id = keep(core, &asked, &data);
    Ok(match edits {
        Some(edits) => SemanticTokensDelta { result_id, edits }.into(),
        None => SemanticTokens { result_id, data }.into(),
    })
}

/// Keeps an answer for the next question; its number.
fn keep(core: &mut Core, asked: &Asked, data: &[SemanticToken]) -> Option<String> {
    let spec = core.specs.specs.get_mut(&asked.uri)?;
    spec.painted = Kept { count: spec.painted.count + 1, tokens: data.to_vec() };
    Some(spec.painted.count.to_string())
}

fn encoded(core: &Core, asked: &Asked, tokens: Vec<Painted>) -> Vec<SemanticToken> {
    in_steps(asked.file(), core.client.encoding, &tokens)
}

/// Each token by its distance from the one before it, in lines and columns.
fn in_steps(file: &SourceFile, encoding: Encoding, tokens: &[Painted]) -> Vec<SemanticToken> {
    let text: &str = &file.text;
    let units = |from: u32, to: u32| {
        let words = text.get(from as usize..to as usize).unwrap_or("");
        match encoding {
            Encoding::Utf8 => words.len() as u32,
            Encoding::Utf16 => words.chars().map(|c| c.len_utf16() as u32).sum(),
        }
    };
    let mut out = Vec::with_capacity(tokens.len());
    let mut before: Option<(u32, u32)> = None;
    for token in tokens {
        let span = token.span;
        let line = file.lines.line_of(span.start);
        let (delta_line, delta_start) = match before {
            Some((last, start)) if last == line => (0, units(start, span.start)),
            _ => {
                let column = encoding.position(file, span.start).character;
                (line - before.map_or(0, |(last, _)| last), column)
            }
        };
        out.push(SemanticToken {
            delta_line,
            delta_start,
            length: units(span.start, span.end),
            token_type: token.kind as u32,
            token_modifiers_bitset: token.modifiers,
        });
        before = Some((line, span.start));
    }
    out
}

/// One edit from one list of tokens to another; none where they are equal. Counted in numbers, five a token.
fn difference(old: &[SemanticToken], new: &[SemanticToken]) -> Vec<SemanticTokensEdit> {
    let start = old.iter().zip(new).take_while(|(one, other)| one == other).count();
    if start == old.len() && start == new.len() {
        return Vec::new();
    }
    let most = old.len().min(new.len()) - start;
    let end =
        old.iter().rev().zip(new.iter().rev()).take(most).take_while(|(one, other)| one == other).count();
    vec![SemanticTokensEdit {
        start: 5 * start as u32,
        delete_count: 5 * (old.len() - start - end) as u32,
        data: Some(new[start..new.len() - end].to_vec()),
    }]
}

#[cfg(test)]
mod tests {
    use tower_lsp::lsp_types::SemanticToken;

    use super::difference;

    #[test]
    fn an_edit_leads_from_any_list_to_any_other() {
        let mut seed = 11_u64;
        let mut below = |most: u64| {
            seed = seed.wrapping_mul(6_364_136_223_846_793_005).wrapping_add(1_442_695_040_888_963_407);
            (seed >> 33) % (most + 1)
        };
        let mut list = || -> Vec<SemanticToken> {
            let length = below(6);
            let one = |n: u64| SemanticToken {
                delta_line: n as u32,
                delta_start: 0,
                length: 1,
                token_type: 0,
                token_modifiers_bitset: 0,
            };
            (0..length).map(|_| one(below(1))).collect()
        };
        for _ in 0..20_000 {
            let (old, new) = (list(), list());
            let mut told = old.clone();
            for edit in difference(&old, &new) {
                assert!(edit.start % 5 == 0 && edit.delete_count % 5 == 0);
                let (start, count) = (edit.start as usize / 5, edit.delete_count as usize / 5);
                told.splice(start..start + count, edit.data.unwrap_or_default());
            }
            assert_eq!(told, new);
        }
    }
}
