//! An expression with the numbers of its names put in: `1.25 × 1250 kg + 60 kg`.

use layshaft_diagnostics::{FileId, FileSpan, Span};
use layshaft_mechanics::drive::Port;
use layshaft_mechanics::solution::Answer;
use layshaft_present::sheet::{self, Entry};
use layshaft_present::shown::shown;
use layshaft_semantics::analysis::{DriveCase, DriveRecord};
use layshaft_semantics::index::Target;
use layshaft_syntax::{BinaryOp, Expr, ExprKind, Item, Value, ValueKind};

use crate::Snapshot;

/// An answer about a drive in one case.
pub(crate) fn answer(case: &DriveCase, part: Option<FileSpan>, port: Option<&str>, name: &str) -> Answer {
    let Some(solution) = case.solution.as_deref() else { return Answer::NoSuch };
    let part = match part {
        Some(place) => match case.parts.iter().position(|known| *known == place) {
            Some(at) => Some(at),
            None => return Answer::NoSuch,
        },
        None => None,
    };
    solution.answer(part, port_of(port), name)
}

/// The side of a part by its word.
pub(crate) fn port_of(word: Option<&str>) -> Option<Port> {
    match word {
        Some("input") => Some(Port::Input),
        Some("output") => Some(Port::Output),
        _ => None,
    }
}

/// The first answer of these names that the part has.
pub(crate) fn entry(
    snapshot: &Snapshot,
    case: &DriveCase,
    part: Option<FileSpan>,
    port: Option<&str>,
    names: &[&str],
) -> Entry {
    let mut answers = names.iter().map(|name| answer(case, part, port, name));
    let found = answers.find(|answer| *answer != Answer::NoSuch).unwrap_or(Answer::NoSuch);
    sheet::answer(found, case, snapshot.habits())
}

/// The drive in the plain spec.
pub(crate) fn plain(drive: &DriveRecord) -> Option<&DriveCase> {
    drive.cases.iter().find(|case| case.case == 0)
}

/// What a name stands for in the plain spec, as it is shown; not harmless yet where it is a text.
pub(crate) fn plain_text(snapshot: &Snapshot, target: &Target) -> Option<String> {
    match target {
        Target::Let(place) => Some(shown(snapshot.value(*place)?.value.as_ref()?).text().to_owned()),
        Target::Field(owner, name) => {
            let part = snapshot.part(*owner)?;
            let field = part.fields.iter().find(|field| field.name == *name)?;
            Some(shown(field.value.as_ref()?).text().to_owned())
        }
        Target::Result { drive: None, part, name, .. } => {
            let part = snapshot.part((*part)?)?;
            let (_, datum) = part.given.iter().find(|(known, _)| known == name)?;
            Some(shown(datum).text().to_owned())
        }
        Target::Result { drive: Some(drive), part, port, name } => {
            let (_, drive) = snapshot.drive(*drive)?;
            let found = entry(snapshot, plain(drive)?, *part, port.as_deref(), &[name]);
            Some(found.text().to_owned()).filter(|text| !text.is_empty())
        }
        Target::Constant(name) if name == "standard_gravity" => Some("9.80665 m/s²".to_owned()),
        _ => None,
    }
}

/// The source text of a value with the numbers of its names in their places; none where it names nothing.
pub(crate) fn put_in(snapshot: &Snapshot, file: FileId, item: &Item, value: &Value) -> Option<String> {
    let mut work = Work { snapshot, file, offset: item.offset, edits: Vec::new(), named: false };
    match &value.kind {
        ValueKind::Expr(expr) => work.expr(expr),
        ValueKind::Range { low, high } => {
            work.expr(low);
            work.expr(high);
        }
        _ => return None,
    }
    work.named.then(|| work.splice(value.span))
}

struct Work<'a> {
    snapshot: &'a Snapshot,
    file: FileId,
    offset: u32,
    edits: Vec<(Span, String)>,
    named: bool,
}

impl Work<'_> {
    fn expr(&mut self, expr: &Expr) {
        match &expr.kind {
            ExprKind::Path(path) => {
                let Some(last) = path.names.last() else { return };
                let Some(name) = self.snapshot.reference(self.file, last.span.start + self.offset) else {
                    return;
                };
                if let Some(text) = plain_text(self.snapshot, &name.target) {
                    self.named = true;
                    self.edits.push((path.span, text));
                }
            }
            ExprKind::Binary { op, op_span, left, right } => {
                self.expr(left);
                if *op == BinaryOp::Multiply {
                    self.edits.push((*op_span, "×".to_owned()));
                }
                self.expr(right);
            }
            ExprKind::Call { args, .. } => args.iter().for_each(|arg| self.expr(arg)),
            ExprKind::Unary { arg, .. } | ExprKind::Paren(arg) => self.expr(arg),
            ExprKind::Power { base, exponent } => {
                self.expr(base);
                if let Some((span, text)) = self.edits.last_mut()
                    && *span == base.span
                    && text.contains(' ')
                {
                    *text = format!("({text})");
                }
                // A raised digit is an exponent of no width of its own.
                if exponent.span.start >= base.span.end {
                    self.expr(exponent);
                }
            }
            ExprKind::Compare { first, rest } => {
                self.expr(first);
                rest.iter().for_each(|(_, _, expr)| self.expr(expr));
            }
            ExprKind::If { condition, then, otherwise } => {
                [condition, then, otherwise].into_iter().for_each(|expr| self.expr(expr));
            }
            ExprKind::Tolerance { value, tolerance, .. } => {
                self.expr(value);
                self.expr(tolerance);
            }
            ExprKind::Within { value, low, high } => {
                [value, low, high].into_iter().for_each(|expr| self.expr(expr));
            }
            _ => {}
        }
    }

    fn splice(&mut self, whole: Span) -> String {
        let place = |span: Span| FileSpan { file: self.file, span: span.shifted(self.offset) };
        let mut out = String::new();
        let mut from = whole.start;
        for (span, text) in &self.edits {
            if span.start < from || span.end > whole.end {
                continue;
            }
            out.push_str(self.snapshot.text(place(Span::new(from, span.start))));
            out.push_str(text);
            from = span.end;
        }
        out.push_str(self.snapshot.text(place(Span::new(from, whole.end))));
        out.split_whitespace().collect::<Vec<_>>().join(" ")
    }
}

#[cfg(test)]
mod tests {
    use layshaft_syntax::ItemKind;

    use super::put_in;
    use crate::fixture::Fixture;

    fn check(drawn: &str, expected: Option<&str>) {
        let fixture = Fixture::new(drawn);
        let item = fixture.snapshot.item(fixture.file, fixture.offset);
        let found = item.and_then(|item| match &item.tree.kind {
            ItemKind::Let { value, .. } => put_in(&fixture.snapshot, fixture.file, item, value),
            _ => None,
        });
        assert_eq!(found.as_deref(), expected);
    }

    #[test]
    fn names_become_numbers() {
        check(
            "let load = 1250 kg\nlet block = 60 kg\nlet a$0 = 1.25 * load + block\n",
            Some("1.25 × 1250 kg + 60 kg"),
        );
        check("let r = 0.5 m\nlet a$0 = 2 kg * r^2\n", Some("2 kg × (0.5 m)^2"));
        check("let a$0 = 2 kg\n", None);
    }

    #[test]
    fn fields_and_results_too() {
        check(
            "source m: straight_line { stall_torque = 8 N·m; no_load_speed = 3000 rpm }\nlet a$0 = m.stall_torque / 2\n",
            Some("8 N·m / 2"),
        );
    }
}
