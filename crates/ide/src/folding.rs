//! What can be folded, and how a selection grows.

use layshaft_diagnostics::{FileId, Span};
use layshaft_syntax::{Block, Expr, ExprKind, ItemKind, ItemTree, Value, ValueKind};

use crate::Snapshot;

/// A range of whole lines that folds to its first.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Fold {
    /// First line, from 0.
    pub first: u32,
    /// Last line.
    pub last: u32,
    /// Whether it is a comment.
    pub comment: bool,
}

/// Blocks, tables and runs of comment lines that take more than one line.
#[must_use]
pub fn folds(snapshot: &Snapshot, file: FileId) -> Vec<Fold> {
    let Some(source) = snapshot.file(file) else { return Vec::new() };
    let mut folds = Vec::new();
    let mut push = |span: Span, comment| {
        let (first, last) =
            (source.lines.line_of(span.start), source.lines.line_of(span.end.saturating_sub(1)));
        if first < last {
            folds.push(Fold { first, last, comment });
        }
    };
    for item in &source.tree.items {
        push(item.tree.span.shifted(item.offset), false);
    }
    let mut run: Option<(u32, u32)> = None;
    for (number, line) in source.text.lines().enumerate() {
        let number = number as u32;
        if line.trim_start().starts_with('#') {
            run = Some((run.map_or(number, |(first, _)| first), number));
        } else if let Some((first, last)) = run.take()
            && first < last
        {
            folds.push(Fold { first, last, comment: true });
        }
    }
    if let Some((first, last)) = run
        && first < last
    {
        folds.push(Fold { first, last, comment: true });
    }
    folds.sort_by_key(|fold| (fold.first, fold.last));
    folds
}

/// The ranges that hold a place, from the smallest to the whole file.
#[must_use]
pub fn selections(snapshot: &Snapshot, file: FileId, offset: u32) -> Vec<Span> {
    let Some(source) = snapshot.file(file) else { return Vec::new() };
    let mut holding = vec![Span::new(0, source.text.len() as u32)];
    for item in &source.tree.items {
        let whole = item.tree.span.shifted(item.offset);
        if whole.touches(offset) {
            holding.push(whole);
            let mut spans = Vec::new();
            item_spans(&item.tree, &mut spans);
            let inside = spans.into_iter().map(|span| span.shifted(item.offset));
            holding.extend(inside.filter(|span| span.touches(offset)));
        }
    }
    if let Some(reference) = snapshot.reference(file, offset) {
        holding.push(reference.place.span);
    }
    holding.sort_by_key(|span| (span.end - span.start, span.start));
    holding.dedup();
    // Each range holds the one before it; neighbours that only touch the cursor are left out.
    let mut nested: Vec<Span> = Vec::new();
    for span in holding {
        if nested.last().is_none_or(|inner| span.start <= inner.start && inner.end <= span.end) {
            nested.push(span);
        }
    }
    nested
}

fn item_spans(tree: &ItemTree, spans: &mut Vec<Span>) {
    match &tree.kind {
        ItemKind::Let { value, .. } => value_spans(value, spans),
        ItemKind::Part { block, .. } => block_spans(block, spans),
        ItemKind::Drive { chain, block, .. } => {
            spans.push(chain.span);
            block.iter().for_each(|block| block_spans(block, spans));
        }
        ItemKind::Case { block: Some(block), .. } => block_spans(block, spans),
        ItemKind::Require { condition, at, scopes, .. } => {
            expr_spans(condition, spans);
            spans.extend(at.iter().map(|at| at.span));
            spans.extend(scopes.iter().map(|scope| scope.span));
        }
        ItemKind::Show { value, .. } => expr_spans(value, spans),
        _ => {}
    }
}

fn block_spans(block: &Block, spans: &mut Vec<Span>) {
    spans.push(block.span);
    for entry in &block.entries {
        spans.push(entry.span);
        value_spans(&entry.value, spans);
    }
}

fn value_spans(value: &Value, spans: &mut Vec<Span>) {
    spans.push(value.span);
    match &value.kind {
        ValueKind::Expr(expr) => expr_spans(expr, spans),
        ValueKind::Range { low, high } => {
            expr_spans(low, spans);
            expr_spans(high, spans);
        }
        ValueKind::Each(values) => values.iter().for_each(|value| value_spans(value, spans)),
        ValueKind::Points(points) => {
            spans.push(points.span);
            spans.extend(points.rows.iter().filter_map(|row| {
                let (first, last) = (row.first()?, row.last()?);
                Some(first.1.cover(last.1))
            }));
        }
        _ => {}
    }
}

fn expr_spans(expr: &Expr, spans: &mut Vec<Span>) {
    spans.push(expr.span);
    match &expr.kind {
        ExprKind::Binary { left, right, .. } => {
            expr_spans(left, spans);
            expr_spans(right, spans);
        }
        ExprKind::Unary { arg, .. } | ExprKind::Paren(arg) => expr_spans(arg, spans),
        ExprKind::Power { base, exponent } => {
            expr_spans(base, spans);
            expr_spans(exponent, spans);
        }
        ExprKind::Call { args, .. } => args.iter().for_each(|arg| expr_spans(arg, spans)),
        ExprKind::Compare { first, rest } => {
            expr_spans(first, spans);
            rest.iter().for_each(|(_, _, expr)| expr_spans(expr, spans));
        }
        ExprKind::If { condition, then, otherwise } => {
            [condition, then, otherwise].into_iter().for_each(|expr| expr_spans(expr, spans));
        }
        ExprKind::Tolerance { value, tolerance, .. } => {
            expr_spans(value, spans);
            expr_spans(tolerance, spans);
        }
        _ => {}
    }
}

#[cfg(test)]
mod tests {
    use super::{Fold, folds, selections};
    use crate::fixture::Fixture;

    #[test]
    fn blocks_and_comments_fold() {
        let fixture = Fixture::new(
            "# one\n# two\nsource m: straight_line {\n    stall_torque = 5 N·m\n}\nlet a = 5 m\n",
        );
        let found = folds(&fixture.snapshot, fixture.file);
        assert_eq!(
            found,
            [Fold { first: 0, last: 1, comment: true }, Fold { first: 2, last: 4, comment: false }]
        );
    }

    #[test]
    fn a_selection_grows_from_name_to_file() {
        let fixture = Fixture::new("let b = 1 m\nlet a = (b$0 + 2 m) * 3\n");
        let grown = selections(&fixture.snapshot, fixture.file, fixture.offset);
        let texts: Vec<_> = grown
            .iter()
            .map(|span| {
                fixture.snapshot.text(layshaft_diagnostics::FileSpan { file: fixture.file, span: *span })
            })
            .collect();
        assert_eq!(texts[..5], ["b", "b + 2 m", "(b + 2 m)", "(b + 2 m) * 3", "let a = (b + 2 m) * 3"]);
    }
}
