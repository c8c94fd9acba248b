//! What stands between brackets and behind `±`: the arguments of a function, the quantities of a point, the columns
//! of a table, the spellings of a tolerance; and which of them is being written.

use layshaft_diagnostics::FileId;
use layshaft_mechanics::registry::ColumnRow;
use layshaft_semantics::say::column as spelled;
use layshaft_syntax::{Token, TokenKind as K};
use layshaft_units::Function;

use crate::Snapshot;
use crate::completion::place::{Place, place};
use crate::cursor::{Cursor, frame};

/// One way to write what stands there.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Signature {
    /// The whole: `atan2(rise, run)`.
    pub label: String,
    /// Its parts as they stand in the label, each with what it is.
    pub parameters: Vec<(String, String)>,
    /// What it means.
    pub meaning: String,
}

/// The ways to write what stands there, and where the cursor is in them.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Help {
    /// The ways, the likeliest first.
    pub signatures: Vec<Signature>,
    /// The part that is being written.
    pub parameter: usize,
}

/// What is being written at a place; none outside of brackets and tolerances.
#[must_use]
pub fn signature(snapshot: &Snapshot, file: FileId, offset: u32) -> Option<Help> {
    let cursor = Cursor::new(snapshot, file, offset)?;
    let framed = frame(&cursor.tokens);
    if let Some(header) = framed.header.filter(|header| header.iter().any(|token| token.kind == K::Points)) {
        return row(&cursor, header, framed.statement);
    }
    if cursor.quoted.is_some() {
        return None;
    }
    let Some(open) = framed.bracket else { return tolerance(framed.statement) };
    let statement = framed.statement;
    let inside = &statement[open + 1..];
    if statement[open].kind == K::LeftSquare {
        return None;
    }
    let before = open.checked_sub(1).map(|at| statement[at]);
    match before.map(|token| token.kind) {
        Some(K::Points) => table(columns(snapshot, file, &cursor), false, inside),
        Some(K::String) if has_csv(statement, open) => table(columns(snapshot, file, &cursor), true, inside),
        Some(K::Name) => call(before.map_or("", |token| cursor.text_of(&token)), inside),
        _ => tolerance(inside).or_else(|| point(field_columns(snapshot, file, &cursor, statement), inside)),
    }
}

fn has_csv(statement: &[Token], open: usize) -> bool {
    open >= 2 && statement[open - 2].kind == K::Csv
}

/// How many commas stand between the brackets at hand.
fn commas(inside: &[Token]) -> usize {
    let mut depth = 0_i32;
    let mut count = 0;
    for token in inside {
        match token.kind {
            K::LeftParen | K::LeftSquare | K::PairParen => depth += 1,
            K::RightParen | K::RightSquare => depth -= 1,
            K::Comma if depth == 0 => count += 1,
            _ => {}
        }
    }
    count
}

/// The arguments of each function: name, what it is.
fn arguments(function: Function) -> &'static [(&'static str, &'static str)] {
    const ANGLE: &[(&str, &str)] = &[("angle", "an angle, or a plain number of radians")];
    const NUMBER: &[(&str, &str)] = &[("number", "a number without a unit")];
    const VALUE: &[(&str, &str)] = &[("value", "a quantity of any kind")];
    const MANY: &[(&str, &str)] =
        &[("value", "a quantity of any kind"), ("other", "another of the same kind"), ("…", "and so on")];
    match function {
        Function::Sin | Function::Cos | Function::Tan => ANGLE,
        Function::Asin | Function::Acos => &[("number", "a number from -1 to 1")],
        Function::Atan => &[("number", "a number, or a grade")],
        Function::Atan2 => &[("rise", "a quantity of any kind"), ("run", "another of the same kind")],
        Function::Sqrt => &[("value", "a quantity whose kind has a root: an area, a number")],
        Function::Cbrt => &[("value", "a quantity whose kind has a cube root: a volume, a number")],
        Function::Exp => &[("number", "a number, or an angle in radians")],
        Function::Abs => VALUE,
        Function::Min | Function::Max => MANY,
        Function::Ln | Function::Log10 | Function::Floor | Function::Ceil | Function::Round => NUMBER,
    }
}

fn call(name: &str, inside: &[Token]) -> Option<Help> {
    let function = Function::from_name(name)?;
    let parameters: Vec<(String, String)> =
        arguments(function).iter().map(|(name, what)| ((*name).to_owned(), (*what).to_owned())).collect();
    let names: Vec<&str> = parameters.iter().map(|(name, _)| name.as_str()).collect();
    let label = format!("{}({})", function.name(), names.join(", "));
    let parameter = commas(inside).min(parameters.len().saturating_sub(1));
    let meaning = function.meaning().to_owned();
    Some(Help { signatures: vec![Signature { label, parameters, meaning }], parameter })
}

/// The columns of the table whose head the cursor is in.
fn columns(snapshot: &Snapshot, file: FileId, cursor: &Cursor<'_>) -> &'static [ColumnRow] {
    let mut head = cursor_before_word(cursor);
    // What stands between the brackets does not matter: the columns are those of the field.
    while head.tokens.last().is_some_and(|token| token.kind != K::LeftParen) {
        head.tokens.pop();
    }
    match place(snapshot, file, &head) {
        Some(Place::Column(columns)) => columns,
        _ => &[],
    }
}

/// The columns of the points of the field whose value the cursor is in.
fn field_columns(
    snapshot: &Snapshot,
    file: FileId,
    cursor: &Cursor<'_>,
    statement: &[Token],
) -> &'static [ColumnRow] {
    let Some(equal) = statement.iter().position(|token| token.kind == K::Equal) else { return &[] };
    let mut start = cursor_before_word(cursor);
    let end = statement[equal].span.end;
    start.tokens.retain(|token| token.span.end <= end);
    match place(snapshot, file, &start) {
        Some(Place::Operand { wanted, .. }) => wanted.columns,
        _ => &[],
    }
}

fn cursor_before_word<'a>(cursor: &Cursor<'a>) -> Cursor<'a> {
    Cursor { tokens: cursor.tokens.clone(), unit: None, quoted: None, ..*cursor }
}

fn title(kind: &str) -> String {
    layshaft_units::kind(kind).map_or(kind, |kind| kind.title).to_owned()
}

fn table(columns: &'static [ColumnRow], csv: bool, inside: &[Token]) -> Option<Help> {
    let heading = if csv { "heading as " } else { "" };
    let parameters: Vec<(String, String)> = if columns.is_empty() {
        vec![(format!("{heading}name [unit]"), "a column with its unit".to_owned())]
    } else {
        let one = |column: &ColumnRow| {
            let what = if column.optional { ", may be missing" } else { "" };
            (format!("{heading}{}", spelled(column)), format!("{}{what}", title(column.kind)))
        };
        columns.iter().map(one).collect()
    };
    let names: Vec<&str> = parameters.iter().map(|(name, _)| name.as_str()).collect();
    let word = if csv { "csv \"file\"" } else { "points" };
    let rest = if csv { "" } else { " { rows }" };
    let label = format!("{word} ({}){rest}", names.join(", "));
    let parameter = commas(inside).min(parameters.len() - 1);
    let meaning = "the columns, in any order; `at` behind the bracket names the conditions".to_owned();
    Some(Help { signatures: vec![Signature { label, parameters, meaning }], parameter })
}

/// A row of a table: its cells are those of the head.
fn row(cursor: &Cursor<'_>, header: &[Token], cells: &[Token]) -> Option<Help> {
    let open = header.iter().position(|token| token.kind == K::LeftParen)?;
    let close = header.iter().rposition(|token| token.kind == K::RightParen)?;
    let inside = header.get(open + 1..close)?;
    let mut parameters = Vec::new();
    for column in inside.split(|token| token.kind == K::Comma) {
        let (first, last) = (column.first()?, column.last()?);
        let text = cursor.slice(first.span.cover(last.span));
        parameters.push((text.to_owned(), String::new()));
    }
    let names: Vec<&str> = parameters.iter().map(|(name, _)| name.as_str()).collect();
    let label = names.join("  ");
    let done = cells.iter().filter(|token| matches!(token.kind, K::Number | K::SignedNumber)).count();
    let touching = cells.last().is_some_and(|token| token.span.end as usize == cursor.offset);
    let parameter = done - usize::from(touching && done > 0);
    let meaning = "one number for each column, blanks between".to_owned();
    (parameter < parameters.len())
        .then(|| Help { signatures: vec![Signature { label, parameters, meaning }], parameter })
}

/// A point: quantities that belong together.
fn point(columns: &'static [ColumnRow], inside: &[Token]) -> Option<Help> {
    let speed = columns.iter().find(|column| column.name == "speed")?;
    let others = || columns.iter().filter(|column| column.name != speed.name);
    let choices: Vec<&ColumnRow> = others().filter(|column| column.optional).collect();
    let mut firsts: Vec<&ColumnRow> = others().filter(|column| !column.optional).collect();
    let mut parameters = Vec::new();
    if choices.is_empty() && !firsts.is_empty() {
        let first = firsts.remove(0);
        parameters.push((spelled(first), title(first.kind)));
    } else {
        let words: Vec<String> = choices.iter().map(|column| spelled(column)).collect();
        let kinds: Vec<String> = choices.iter().map(|column| title(column.kind)).collect();
        parameters.push((words.join(" or "), kinds.join(" or ")));
    }
    parameters.push((spelled(speed), title(speed.kind)));
    parameters.extend(firsts.iter().map(|column| (spelled(column), title(column.kind))));
    let behind: String = parameters.iter().skip(2).map(|(name, _)| format!(", {name}")).collect();
    let label = format!("({} at {}{behind})", parameters[0].0, parameters[1].0);
    let at = usize::from(inside.iter().any(|token| token.kind == K::At));
    let parameter = (at + commas(inside)).min(parameters.len() - 1);
    let meaning = "quantities that belong together; further points in brackets behind a comma".to_owned();
    Some(Help { signatures: vec![Signature { label, parameters, meaning }], parameter })
}

/// The spellings of a tolerance.
const TOLERANCES: &[(&str, &str, &str)] = &[
    ("± tolerance", "tolerance", "limits on both sides, in a unit of the value's kind"),
    ("± 5 %", "5 %", "limits as a share of the value; of a percentage say which is meant"),
    ("± 4 points", "4 points", "of a percentage: percentage points"),
    ("± 4 % of value", "4 % of value", "of a percentage: a share of the value"),
    ("± tolerance confidence 95 %", "confidence 95 %", "this share of all pieces lies inside"),
];

/// Behind `±`, before anything else follows.
fn tolerance(statement: &[Token]) -> Option<Help> {
    let at = statement.iter().rposition(|token| token.kind == K::PlusMinus)?;
    let behind = &statement[at + 1..];
    let own = |token: &Token| {
        matches!(
            token.kind,
            K::Number | K::Unit | K::Of | K::ValueWord | K::Points | K::Confidence | K::Name | K::Dot
        )
    };
    if !behind.iter().all(own) {
        return None;
    }
    let confident = behind.iter().any(|token| token.kind == K::Confidence);
    let one = |(label, part, meaning): &(&str, &str, &str)| Signature {
        label: (*label).to_owned(),
        parameters: vec![((*part).to_owned(), (*meaning).to_owned())],
        meaning: (*meaning).to_owned(),
    };
    let mut signatures: Vec<Signature> = TOLERANCES.iter().map(one).collect();
    if confident {
        signatures.rotate_right(1);
    }
    Some(Help { signatures, parameter: 0 })
}

#[cfg(test)]
mod tests {
    use super::signature;
    use crate::fixture::Fixture;

    /// The label with the part that is being written between `<` and `>`.
    fn check(drawn: &str, expected: Option<&str>) {
        let fixture = Fixture::new(drawn);
        let found = signature(&fixture.snapshot, fixture.file, fixture.offset).map(|help| {
            let first = &help.signatures[0];
            let part = &first.parameters[help.parameter].0;
            first.label.replacen(part.as_str(), &format!("<{part}>"), 1)
        });
        assert_eq!(found.as_deref(), expected, "{drawn}");
    }

    #[test]
    fn functions() {
        check("let a = atan2($0", Some("atan2(<rise>, run)"));
        check("let a = atan2(1 m, $0)", Some("atan2(rise, <run>)"));
        check("let a = max(1 m, min(2 m, 3 m), 4 m, 5$0)", Some("max(value, other, <…>)"));
        check("let a = max(1 m, min(2 m, $0", Some("min(value, <other>, …)"));
        check("let a = sin(2 + ($0", None);
        check("let a = foo($0", None);
        check("let a = sin(2) + $0", None);
    }

    #[test]
    fn points_and_tables() {
        check(
            "source m: dc_motor { point = (1 N·m at $0",
            Some("(torque [N·m] at <speed [rpm]>, current [A])"),
        );
        check(
            "source m: dc_motor { point = (1 N·m at 2 rpm, $0)",
            Some("(torque [N·m] at speed [rpm], <current [A]>)"),
        );
        check("source m: straight_line { point = ($0", Some("(<torque [N·m] or power [kW]> at speed [rpm])"));
        check(
            "source m: measured_curve { curve = points (speed [rpm], $0",
            Some("points (speed [rpm], <torque [N·m]>, power [kW]) { rows }"),
        );
        check(
            "source m: measured_curve { curve = points (speed [rpm], torque [N·m]) { 0 12\n 100 $0",
            Some("speed [rpm]  <torque [N·m]>"),
        );
        check("let c = csv \"a.csv\" ($0", Some("csv \"file\" (<heading as name [unit]>)"));
    }

    #[test]
    fn spellings_of_a_tolerance() {
        check("let a = 5 m ± $0", Some("± <tolerance>"));
        check("let a = 5 m ± 1 mm confidence $0", Some("± tolerance <confidence 95 %>"));
        check("let a = 5 m ± 1 mm + $0", None);
        check("let a = (5 m ± $0", Some("± <tolerance>"));
    }
}
