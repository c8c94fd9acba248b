//! Trees as text: compact s-expressions for tests and for a look at what was understood.
//!
//! Quantities stand in `‹ ›`, paths as written, everything else as `(form parts…)`; what is broken or missing is `?`.

use std::fmt::Write;

use crate::tree::{
    Allow, At, BasisWord, BinaryOp, Block, CaseRef, Chain, ChainKind, Column, CompareOp, Entry, Expr,
    ExprKind, File, ItemKind, ItemTree, Name, Number, Pair, PartBase, Path, RoleWord, Scope, ScopeKind, Text,
    ToleranceForm, UnaryOp, UnitText, Value, ValueKind,
};

/// A file, one item a line, its problems behind them.
#[must_use]
pub fn file(file: &File) -> String {
    let mut out = String::new();
    for doc in &file.docs {
        let _ = writeln!(out, "(doc {:?})", doc.value);
    }
    for item in &file.items {
        let _ = writeln!(out, "{}", self::item(&item.tree));
    }
    for problem in &file.problems {
        let _ = writeln!(out, "! {}: {}", problem.code.row().word, problem.message);
    }
    out
}

/// An item, its problems on lines of their own behind it.
#[must_use]
pub fn item(tree: &ItemTree) -> String {
    let mut out: String = tree.docs.iter().map(|doc| format!("(doc {:?}) ", doc.value)).collect();
    out += &item_kind(&tree.kind);
    for problem in &tree.problems {
        let _ = write!(out, "\n  ! {}: {}", problem.code.row().word, problem.message);
    }
    out
}

/// What an item declares.
#[must_use]
pub fn item_kind(kind: &ItemKind) -> String {
    match kind {
        ItemKind::Language(number) => form("language", [number_text(number)]),
        ItemKind::Title(text) => form("title", [quoted(text)]),
        ItemKind::Revision(text) => form("revision", [quoted(text)]),
        ItemKind::Use { path, alias } => form("use", [quoted(path), opt(alias.as_ref().map(name))]),
        ItemKind::Let { name: n, kind, value: v } => {
            form("let", [name(n), opt(kind.as_ref().map(|kind| format!(":{}", name(kind)))), value(v)])
        }
        ItemKind::Part { role, name: n, base, block: b, .. } => {
            let base = match base {
                PartBase::Kind(kind) => format!(":{}", name(kind)),
                PartBase::Variant(base) => format!("={}", path(base)),
            };
            form(role_word(*role), [name(n), base, block(b)])
        }
        ItemKind::Drive { name: n, chain: c, block: b } => {
            form("drive", [name(n), chain(c), opt(b.as_ref().map(block))])
        }
        ItemKind::Case { name: n, bases, block: b } => {
            let bases = bases.iter().map(|base| format!("={}", name(base))).collect::<Vec<_>>().join(" ");
            form("case", [name(n), bases, opt(b.as_ref().map(block))])
        }
        ItemKind::Require { clause, condition, at: a, probability, scopes } => {
            let share = probability.as_ref().map(|share| form("probability", [expr(share)]));
            form(
                "require",
                [quoted(clause), expr(condition), opt(a.as_ref().map(at)), opt(share), all(scopes, scope)],
            )
        }
        ItemKind::Show { value: v, unit: u, at: a, scopes } => {
            let unit = u.as_ref().map(|u| form("as", [unit(u)]));
            form("show", [expr(v), opt(unit), opt(a.as_ref().map(at)), all(scopes, scope)])
        }
        ItemKind::Allow(a) => allow(a),
        ItemKind::Later(word) => form("later", [name(word)]),
        ItemKind::Broken => "?".into(),
    }
}

fn form<const N: usize>(head: &str, parts: [String; N]) -> String {
    let mut out = format!("({head}");
    for part in parts.iter().filter(|part| !part.is_empty()) {
        out.push(' ');
        out.push_str(part);
    }
    out.push(')');
    out
}

fn opt(part: Option<String>) -> String {
    part.unwrap_or_default()
}

fn all<T>(parts: &[T], show: impl Fn(&T) -> String) -> String {
    parts.iter().map(show).collect::<Vec<_>>().join(" ")
}

fn name(name: &Name) -> String {
    if name.text.is_empty() { "?".into() } else { name.text.to_string() }
}

fn path(path: &Path) -> String {
    path.names.iter().map(name).collect::<Vec<_>>().join(".")
}

fn quoted(text: &Text) -> String {
    format!("{:?}", text.value)
}

fn number_text(number: &Number) -> String {
    number.text.to_string()
}

fn unit(unit: &UnitText) -> String {
    unit.text.to_string()
}

const fn role_word(role: RoleWord) -> &'static str {
    match role {
        RoleWord::Supply => "supply",
        RoleWord::Source => "source",
        RoleWord::Transmission => "transmission",
        RoleWord::Load => "load",
    }
}

fn allow(allow: &Allow) -> String {
    form("allow", [name(&allow.code), quoted(&allow.because)])
}

/// A block.
#[must_use]
pub fn block(block: &Block) -> String {
    form("block", [all(&block.entries, entry), all(&block.allows, allow)])
}

/// An entry of a block.
#[must_use]
pub fn entry(entry: &Entry) -> String {
    let docs = all(&entry.docs, |doc| format!("(doc {:?})", doc.value));
    let member = opt(entry.member.as_ref().map(name));
    form("=", [docs, path(&entry.key), member, value(&entry.value)])
}

/// A value with its basis.
#[must_use]
pub fn value(value: &Value) -> String {
    let kind = value_kind(&value.kind);
    let Some(basis) = &value.basis else { return kind };
    let word = match basis.word {
        BasisWord::From => "from",
        BasisWord::Measured => "measured",
        BasisWord::Assumed => "assumed",
    };
    form(word, [kind, quoted(&basis.text)])
}

fn value_kind(kind: &ValueKind) -> String {
    match kind {
        ValueKind::Expr(e) => expr(e),
        ValueKind::Range { low, high } => form("..", [expr(low), expr(high)]),
        ValueKind::Each(values) => form("each", [all(values, value)]),
        ValueKind::Pairs(pairs) => form("pairs", [all(pairs, pair)]),
        ValueKind::Points(points) => {
            let rows = all(&points.rows, |row| format!("[{}]", all(row, |cell| cell.0.to_string())));
            form("points", [all(&points.columns, column), conditions(&points.at), rows])
        }
        ValueKind::Csv(csv) => {
            form("csv", [quoted(&csv.path), all(&csv.columns, column), conditions(&csv.at)])
        }
        ValueKind::Teeth { driver, driven } => form("drives", [expr(driver), expr(driven)]),
        ValueKind::Ratio { word, value } => form(&name(word), [expr(value)]),
        ValueKind::Duty { word, value } => form("duty", [name(word), opt(value.as_ref().map(expr))]),
        ValueKind::Absent => "absent".into(),
        ValueKind::Missing => "?".into(),
    }
}

fn conditions(at: &[Expr]) -> String {
    if at.is_empty() { String::new() } else { form("at", [all(at, expr)]) }
}

fn pair(pair: &Pair) -> String {
    format!("({})", all(&pair.values, expr))
}

fn column(column: &Column) -> String {
    let heading = column.heading.as_ref().map(|heading| format!("{:?}→", heading.value));
    let unit = column.unit.as_ref().map(|u| format!("[{}]", unit(u)));
    format!("{}{}{}", opt(heading), name(&column.name), opt(unit))
}

/// A chain of a drive.
#[must_use]
pub fn chain(chain: &Chain) -> String {
    match &chain.kind {
        ChainKind::Part { count: 1, path: p } => path(p),
        ChainKind::Part { count, path: p } => format!("{count}*{}", path(p)),
        ChainKind::Times { count, inner } => format!("{count}*{}", self::chain(inner)),
        ChainKind::Series(parts) => form("->", [all(parts, self::chain)]),
        ChainKind::Joined(parts) => form("+", [all(parts, self::chain)]),
        ChainKind::Broken => "?".into(),
    }
}

fn at(at: &At) -> String {
    form("at", [path(&at.path), value(&at.value)])
}

fn scope(scope: &Scope) -> String {
    match &scope.kind {
        ScopeKind::OnlyIn(cases) => form("only-in", [all(cases, case_ref)]),
        ScopeKind::NotIn(cases) => form("not-in", [all(cases, case_ref)]),
        ScopeKind::OnlyWhere(e) => form("only-where", [entry(e)]),
    }
}

fn case_ref(case: &CaseRef) -> String {
    let members =
        if case.members.is_empty() { String::new() } else { format!("[{}]", all(&case.members, value)) };
    let with = case.with.as_ref().map(|with| format!(" with {}", block(with)));
    format!("{}{members}{}", name(&case.name), opt(with))
}

/// An expression.
#[must_use]
pub fn expr(e: &Expr) -> String {
    match &e.kind {
        ExprKind::Quantity { number, unit: None } => format!("‹{}›", number.text),
        ExprKind::Quantity { number, unit: Some(u) } => format!("‹{} {}›", number.text, u.text),
        ExprKind::Text(text) => format!("{text:?}"),
        ExprKind::Flag(flag) => if *flag { "yes" } else { "no" }.into(),
        ExprKind::Path(p) => path(p),
        ExprKind::Call { function, args } => form(&name(function), [all(args, expr)]),
        ExprKind::Unary { op: UnaryOp::Minus, arg } => form("-", [expr(arg)]),
        ExprKind::Unary { op: UnaryOp::Not, arg } => form("not", [expr(arg)]),
        ExprKind::Binary { op, left, right, .. } => form(binary(*op), [expr(left), expr(right)]),
        ExprKind::Power { base, exponent } => form("^", [expr(base), expr(exponent)]),
        ExprKind::Compare { first, rest } => {
            let rest: Vec<_> =
                rest.iter().map(|(op, _, e)| format!("{} {}", compare(*op), expr(e))).collect();
            format!("({} {})", expr(first), rest.join(" "))
        }
        ExprKind::If { condition, then, otherwise } => {
            form("if", [expr(condition), expr(then), expr(otherwise)])
        }
        ExprKind::Tolerance { value, tolerance, form: meant, confidence } => {
            let meant = match meant {
                ToleranceForm::Plain => "",
                ToleranceForm::Points => "points",
                ToleranceForm::OfValue => "of-value",
            };
            let share = confidence.as_ref().map(|share| form("confidence", [expr(share)]));
            form("±", [expr(value), expr(tolerance), meant.into(), opt(share)])
        }
        ExprKind::Within { value, low, high } => form("within", [expr(value), expr(low), expr(high)]),
        ExprKind::Rated => "rated".into(),
        ExprKind::Paren(inner) => format!("[{}]", expr(inner)),
        ExprKind::Broken => "?".into(),
    }
}

const fn binary(op: BinaryOp) -> &'static str {
    match op {
        BinaryOp::Add => "+",
        BinaryOp::Subtract => "-",
        BinaryOp::Multiply => "*",
        BinaryOp::Divide => "/",
        BinaryOp::And => "and",
        BinaryOp::Or => "or",
    }
}

const fn compare(op: CompareOp) -> &'static str {
    match op {
        CompareOp::Less => "<",
        CompareOp::LessEqual => "<=",
        CompareOp::Greater => ">",
        CompareOp::GreaterEqual => ">=",
        CompareOp::Equal => "==",
        CompareOp::NotEqual => "!=",
    }
}
