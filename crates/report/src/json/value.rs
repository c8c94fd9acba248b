//! Values and places of `check/1`.

use layshaft_diagnostics::FileSpan;
use layshaft_present::sheet::Entry;
use layshaft_present::shown::{Number, Shown};
use layshaft_semantics::Analysis;

use super::model::{Place, Value};

/// A number.
#[must_use]
pub fn number(number: &Number) -> Value {
    Value {
        kind_of: "number",
        shown: number.text.clone(),
        si: Some(number.si),
        kind: number.kind,
        unit: Some(number.unit.clone()),
        value: Some(number.value),
        low_si: number.limits.map(|limits| limits.0).filter(|low| low.is_finite()),
        high_si: number.limits.map(|limits| limits.1).filter(|high| high.is_finite()),
        outside_data: number.marks.outside.then_some(true),
        scaled_data: number.marks.scaled.then_some(true),
        ..Value::default()
    }
}

/// A value of the spec.
#[must_use]
pub fn shown(value: &Shown) -> Value {
    match value {
        Shown::Number(of) => number(of),
        Shown::Flag(flag) => {
            Value { kind_of: "flag", shown: value.text().into(), flag: Some(*flag), ..Value::default() }
        }
        Shown::Word(_) => Value { kind_of: "word", shown: value.text().into(), ..Value::default() },
        Shown::Text(_) => Value { kind_of: "text", shown: value.text().into(), ..Value::default() },
    }
}

/// An answer; `None` where the part has no such result.
#[must_use]
pub fn entry(entry: &Entry) -> Option<Value> {
    let of = |kind_of, reason: Option<&String>| {
        Some(Value { kind_of, shown: entry.text().into(), reason: reason.cloned(), ..Value::default() })
    };
    match entry {
        Entry::Number(of) => Some(number(of)),
        Entry::Flag(flag) => {
            Some(Value { kind_of: "flag", shown: entry.text().into(), flag: Some(*flag), ..Value::default() })
        }
        Entry::Word(_) => of("word", None),
        Entry::Unbounded(why) => of("unbounded", Some(why)),
        Entry::Absent(why) => of("absent", Some(why)),
        Entry::None => None,
    }
}

/// A place with lines and columns from 1 (columns in characters) and bytes from 0.
pub(super) fn place(analysis: &Analysis, names: &[String], place: FileSpan) -> Option<Place> {
    let file = analysis.file(place.file)?;
    let name = names.get(place.file.0 as usize).unwrap_or(&file.path);
    let size = file.text.len() as u32;
    let (start, end) = (place.span.start.min(size), place.span.end.clamp(place.span.start.min(size), size));
    let (line, column) = file.lines.human(&file.text, start);
    let (end_line, end_column) = file.lines.human(&file.text, end);
    Some(Place { file: name.clone(), line, column, end_line, end_column, start, end })
}
