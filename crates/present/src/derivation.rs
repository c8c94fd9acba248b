//! How a result came about, as lines: formula, the same with its numbers put in, what it gives, where it is published.

use layshaft_mechanics::drive::DriveSpec;
use layshaft_mechanics::registry::{KindRow, ResultShape};
use layshaft_mechanics::solve::Step;

use crate::note::quantity;
use crate::number::{DIGITS, digits, shortened};
use crate::unit::Habits;

/// One formula of a derivation.
#[derive(Clone, Debug, PartialEq)]
pub struct Line {
    /// The part whose law it is, by name; none for the drive. A name of the author's, not harmless yet.
    pub part: Option<String>,
    /// What the formula gives.
    pub name: &'static str,
    /// The formula: `T0 * (1 - w / w0)`.
    pub formula: &'static str,
    /// The same with numbers: `8.5 N·m × (1 - 1447 rpm / 3000 rpm)`; none for a formula in words.
    pub numbers: Option<String>,
    /// What it gives, with unit.
    pub result: Option<String>,
    /// Each symbol: name, meaning, number with unit.
    pub symbols: Vec<(&'static str, &'static str, String)>,
    /// Where it holds.
    pub validity: &'static str,
    /// Where it is published.
    pub source: &'static str,
    /// Its revision.
    pub revision: u32,
}

/// The steps of a derivation as lines.
#[must_use]
pub fn lines(steps: &[Step], spec: &DriveSpec, habits: &Habits) -> Vec<Line> {
    steps.iter().map(|step| line(step, spec, habits)).collect()
}

fn line(step: &Step, spec: &DriveSpec, habits: &Habits) -> Line {
    let part = step.part.and_then(|part| spec.parts.get(part));
    let number = |si: f64, kind: &'static str| quantity(si, kind, habits);
    let symbols: Vec<_> = step.symbols.iter().map(|s| (s.name, s.meaning, number(s.si, s.kind))).collect();
    let kind = step.kind.or_else(|| kind_of(step, part.map(|part| part.row)));
    let result = step.result.map(|si| match kind {
        Some(kind) => number(si, kind),
        None => shortened(&digits(si, DIGITS)),
    });
    Line {
        part: part.map(|part| part.name.clone()),
        name: step.name,
        formula: step.text,
        numbers: put_in(step.text, &symbols),
        result,
        symbols,
        validity: step.validity,
        source: step.source,
        revision: step.revision,
    }
}

/// The formula with its symbols replaced; none where it holds words that are neither symbols nor functions.
fn put_in(formula: &str, symbols: &[(&'static str, &'static str, String)]) -> Option<String> {
    let mut out = String::with_capacity(formula.len() * 3);
    let mut rest = formula;
    while let Some(first) = rest.chars().next() {
        if first.is_ascii_alphabetic() {
            let end = rest.find(|c: char| !(c.is_ascii_alphanumeric() || c == '_')).unwrap_or(rest.len());
            let (word, behind) = rest.split_at(end);
            out.push_str(&put_word(word, behind, symbols)?);
            rest = behind;
        } else if first.is_ascii_digit() {
            // A number with its unit stands for itself: `9.80665 m/s²`.
            let end = rest.find(['*', ')', '+', '-']).unwrap_or(rest.len());
            let exponent = rest.find(|c: char| !c.is_ascii_digit()).unwrap_or(rest.len());
            let unit = rest[exponent..].starts_with(['.', ' ']) && !rest[exponent..].starts_with(" /");
            let (number, behind) = rest.split_at(if unit { end } else { exponent });
            out.push_str(number);
            rest = behind;
        } else {
            out.push(if first == '*' { '×' } else { first });
            rest = &rest[first.len_utf8()..];
        }
    }
    Some(out)
}

fn put_word(word: &str, behind: &str, symbols: &[(&'static str, &'static str, String)]) -> Option<String> {
    if let Some((.., number)) = symbols.iter().find(|(name, ..)| *name == word) {
        let raised = behind.starts_with('^') && number.contains(' ');
        let closed = number.starts_with('-') || raised;
        return Some(if closed { format!("({number})") } else { number.clone() });
    }
    let function = layshaft_units::Function::from_name(word).is_some() && behind.starts_with('(');
    (function || word == "pi").then(|| word.to_owned())
}

/// The kind of what a formula gives, where the solver does not say it: by the row's results, else by its name.
fn kind_of(step: &Step, row: Option<&'static KindRow>) -> Option<&'static str> {
    let result = row.and_then(|row| row.results.iter().find(|result| result.name == step.name));
    if let Some(ResultShape::Quantity(kind)) = result.map(|result| result.shape) {
        return Some(kind);
    }
    let linear = || step.symbols.iter().any(|s| matches!(s.kind, "speed" | "length"));
    Some(match step.name {
        "speed" if linear() => "speed",
        "speed" | "synchronous_speed" => "rotational_speed",
        "slope" => "angle",
        "layer_diameter" | "system_head" => "length",
        "system_pressure" => "pressure",
        "inertia" => "moment_of_inertia",
        "reduction" | "basic_ratio" | "holding_reserve" | "thread_friction" | "shape" => "number",
        "power" | "peak_power" | "cutting_power" => "mechanical_power",
        "drag" => "torque",
        "voltage" | "resistance" => layshaft_units::kind(step.name)?.name,
        name if name.contains("torque") => "torque",
        name if name.contains("force") || name.contains("tension") || name.starts_with("most_pull") => {
            "force"
        }
        name if name.ends_with("current") => "current",
        name if name.contains("efficiency") || name.ends_with("slip") => "percentage",
        _ => return None,
    })
}

#[cfg(test)]
mod tests {
    use layshaft_mechanics::laws::checked;

    use super::*;

    fn step_of(formula: &layshaft_mechanics::registry::Formula) -> Step {
        let symbols = formula.symbols.iter().map(|(name, kind, meaning)| layshaft_mechanics::solve::Symbol {
            name,
            kind,
            meaning,
            si: 2.0,
        });
        Step {
            part: None,
            name: formula.name,
            text: formula.text,
            symbols: symbols.collect(),
            result: Some(1.0),
            kind: None,
            validity: formula.validity,
            source: formula.source,
            revision: formula.revision,
        }
    }

    #[test]
    fn every_law_of_a_part_takes_its_numbers_and_gives_a_kind() {
        let mut without = Vec::new();
        for row in layshaft_mechanics::registry::rows() {
            for formula in row.formulas {
                let step = step_of(formula);
                let kind = kind_of(&step, Some(row));
                if kind.is_none_or(|kind| layshaft_units::kind(kind).is_none()) {
                    without.push(format!("{} {}: {}", row.name, formula.name, formula.text));
                }
                let symbols: Vec<_> = step.symbols.iter().map(|s| (s.name, s.meaning, "2".into())).collect();
                assert!(put_in(formula.text, &symbols).is_some(), "{}: {}", formula.name, formula.text);
            }
        }
        assert!(without.is_empty(), "of no known kind:\n{}", without.join("\n"));
        assert!(checked().count() > 20);
    }

    #[test]
    fn numbers_take_the_places_of_symbols() {
        let symbols =
            [("T_b", "", "9 N·m".to_owned()), ("s", "", "-0.1".to_owned()), ("w", "", "3 rpm".to_owned())];
        let text = put_in("2 * T_b / (s / s + sqrt(w))", &symbols);
        assert_eq!(text.as_deref(), Some("2 × 9 N·m / ((-0.1) / (-0.1) + sqrt(3 rpm))"));
        assert_eq!(put_in("T_b * w^2", &symbols).as_deref(), Some("9 N·m × (3 rpm)^2"));
        assert_eq!(put_in("integral of dw", &symbols), None);
        let constant = put_in("T_b * (9.80665 m/s²) * (235 K + w)", &symbols);
        assert_eq!(constant.as_deref(), Some("9 N·m × (9.80665 m/s²) × (235 K + 3 rpm)"));
    }
}
