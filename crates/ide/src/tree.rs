//! Walks through the expressions of an item.

use layshaft_syntax::{Block, Expr, ExprKind, ItemKind, ItemTree, Scope, ScopeKind, Value, ValueKind};

/// The expressions that hold a place (an offset in the item), outermost first.
pub(crate) fn holding(tree: &ItemTree, here: u32) -> Vec<&Expr> {
    let mut found = Vec::new();
    values(tree, &mut |value| {
        if value.span.touches(here) {
            in_value(value, here, &mut found);
        }
    });
    if let ItemKind::Require { condition: expr, .. } | ItemKind::Show { value: expr, .. } = &tree.kind {
        in_expr(expr, here, &mut found);
    }
    if let ItemKind::Require { probability: Some(expr), .. } = &tree.kind {
        in_expr(expr, here, &mut found);
    }
    found
}

/// Every value of an item: of a `let`, of the lines of blocks, of stated speeds and scopes.
pub(crate) fn values<'t>(tree: &'t ItemTree, visit: &mut dyn FnMut(&'t Value)) {
    match &tree.kind {
        ItemKind::Let { value, .. } => visit(value),
        ItemKind::Part { block, .. } => of_block(block, visit),
        ItemKind::Drive { block: Some(block), .. } | ItemKind::Case { block: Some(block), .. } => {
            of_block(block, visit);
        }
        ItemKind::Require { at, scopes, .. } | ItemKind::Show { at, scopes, .. } => {
            at.iter().for_each(|at| visit(&at.value));
            scopes.iter().for_each(|scope| of_scope(scope, visit));
        }
        _ => {}
    }
}

fn of_block<'t>(block: &'t Block, visit: &mut dyn FnMut(&'t Value)) {
    block.entries.iter().for_each(|entry| visit(&entry.value));
}

fn of_scope<'t>(scope: &'t Scope, visit: &mut dyn FnMut(&'t Value)) {
    match &scope.kind {
        ScopeKind::OnlyIn(cases) | ScopeKind::NotIn(cases) => {
            for case in cases {
                case.members.iter().for_each(&mut *visit);
                if let Some(block) = &case.with {
                    of_block(block, visit);
                }
            }
        }
        ScopeKind::OnlyWhere(entry) => visit(&entry.value),
    }
}

fn in_value<'t>(value: &'t Value, here: u32, found: &mut Vec<&'t Expr>) {
    match &value.kind {
        ValueKind::Expr(expr) | ValueKind::Ratio { value: expr, .. } => in_expr(expr, here, found),
        ValueKind::Range { low, high } => [low, high].into_iter().for_each(|expr| in_expr(expr, here, found)),
        ValueKind::Each(values) => values.iter().for_each(|value| in_value(value, here, found)),
        ValueKind::Pairs(pairs) => {
            pairs.iter().flat_map(|pair| &pair.values).for_each(|expr| in_expr(expr, here, found));
        }
        ValueKind::Points(points) => points.at.iter().for_each(|expr| in_expr(expr, here, found)),
        ValueKind::Csv(csv) => csv.at.iter().for_each(|expr| in_expr(expr, here, found)),
        ValueKind::Teeth { driver, driven } => {
            [driver, driven].into_iter().for_each(|expr| in_expr(expr, here, found));
        }
        ValueKind::Duty { value: Some(expr), .. } => in_expr(expr, here, found),
        ValueKind::Duty { .. } | ValueKind::Absent | ValueKind::Missing => {}
    }
}

fn in_expr<'t>(expr: &'t Expr, here: u32, found: &mut Vec<&'t Expr>) {
    if !expr.span.touches(here) {
        return;
    }
    found.push(expr);
    children(expr, &mut |child| in_expr(child, here, found));
}

/// The operands of an expression.
pub(crate) fn children<'t>(expr: &'t Expr, visit: &mut dyn FnMut(&'t Expr)) {
    match &expr.kind {
        ExprKind::Call { args, .. } => args.iter().for_each(visit),
        ExprKind::Unary { arg, .. } | ExprKind::Paren(arg) => visit(arg),
        ExprKind::Binary { left, right, .. } => [left, right].into_iter().for_each(|e| visit(e)),
        ExprKind::Power { base, exponent } => [base, exponent].into_iter().for_each(|e| visit(e)),
        ExprKind::Compare { first, rest } => {
            visit(first);
            rest.iter().for_each(|(_, _, expr)| visit(expr));
        }
        ExprKind::If { condition, then, otherwise } => {
            [condition, then, otherwise].into_iter().for_each(|e| visit(e));
        }
        ExprKind::Tolerance { value, tolerance, confidence, .. } => {
            [value, tolerance].into_iter().for_each(|e| visit(e));
            confidence.iter().for_each(|e| visit(e));
        }
        ExprKind::Within { value, low, high } => [value, low, high].into_iter().for_each(|e| visit(e)),
        _ => {}
    }
}
