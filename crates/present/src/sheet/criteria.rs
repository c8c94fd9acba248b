//! Criteria: what was required, what was found, how much room is left, where it is tightest.

use layshaft_semantics::Analysis;
use layshaft_semantics::analysis::{
    CriterionOutcome, CriterionRecord, Measure, ShowOutcome, ShowRecord, Verdict,
};
use layshaft_semantics::quantity::{Datum, Quantity};

use super::{CriterionLine, Margin, OutcomeLine, ShowLine, ShowOutcomeLine, label};
use crate::number::{self, DIGITS};
use crate::shown::{Number, Shown, joined, result, shown, unit_of};
use crate::unit::{Habits, convert, convert_difference, kind_of, of_difference};

pub(super) fn criteria(analysis: &Analysis, habits: &Habits) -> Vec<CriterionLine> {
    analysis.criteria.iter().map(|criterion| line(analysis, criterion, habits, usize::MAX)).collect()
}

/// A criterion with its first `most` outcomes and the governing one.
pub(super) fn line(
    analysis: &Analysis,
    criterion: &CriterionRecord,
    habits: &Habits,
    most: usize,
) -> CriterionLine {
    let known = criterion.outcomes.len();
    let governing = criterion.governing.filter(|at| *at < known);
    let mut shown: Vec<usize> = (0..known.min(most)).collect();
    shown.extend(governing.filter(|at| *at >= shown.len()));
    let outcomes: Vec<OutcomeLine> =
        shown.iter().map(|at| outcome_line(analysis, &criterion.outcomes[*at], habits)).collect();
    let count = |verdict| criterion.outcomes.iter().filter(|outcome| outcome.verdict == verdict).count();
    let governing = governing.and_then(|at| shown.iter().position(|known| *known == at));
    let measured = governing.and_then(|at| outcomes.get(at)).or(outcomes.first());
    let required = measured.and_then(required).unwrap_or_else(|| criterion.condition.clone());
    CriterionLine {
        clause: criterion.clause.clone(),
        condition: criterion.condition.clone(),
        required,
        verdict: criterion.verdict,
        governing,
        failing: count(Verdict::Fails),
        unjudged: count(Verdict::NotJudged),
        outcomes,
    }
}

/// `14 m/min .. 17 m/min`, `at least 12 km/h`
fn required(outcome: &OutcomeLine) -> Option<String> {
    match (&outcome.low, &outcome.high) {
        (Some(low), Some(high)) => Some(format!("{} .. {}", low.text(), high.text())),
        (Some(low), None) => Some(format!("at least {}", low.text())),
        (None, Some(high)) => Some(format!("at most {}", high.text())),
        (None, None) => None,
    }
}

fn outcome_line(analysis: &Analysis, outcome: &CriterionOutcome, habits: &Habits) -> OutcomeLine {
    let measure = outcome.measure.as_ref().map(|measure| Shaped::new(measure, habits));
    OutcomeLine {
        case: outcome.case,
        label: label(analysis, outcome.case, outcome.gear.as_deref()),
        gear: outcome.gear.clone(),
        verdict: outcome.verdict,
        found: measure.as_ref().map(|measure| measure.found.clone()),
        low: measure.as_ref().and_then(|measure| measure.low.clone()),
        high: measure.as_ref().and_then(|measure| measure.high.clone()),
        margin: measure.map(|measure| measure.margin),
        remark: outcome.remark.clone(),
    }
}

/// A measure with everything in one unit and digits that tell value and limits apart.
struct Shaped {
    found: Shown,
    low: Option<Shown>,
    high: Option<Shown>,
    margin: Margin,
}

impl Shaped {
    fn new(measure: &Measure, habits: &Habits) -> Self {
        let unit = common_unit(measure, habits);
        let digits = [&measure.low, &measure.high]
            .into_iter()
            .flatten()
            .filter_map(|limit| Some(apart(&measure.found, limit, unit.as_deref()?)))
            .max()
            .unwrap_or(DIGITS);
        let limit = |datum: &Option<Datum>| datum.as_ref().map(|datum| in_unit(datum, unit.as_deref()));
        Self {
            found: found(&measure.found, unit.as_deref(), digits),
            low: limit(&measure.low),
            high: limit(&measure.high),
            margin: margin(measure, unit.as_deref()),
        }
    }
}

/// The unit of the limit, else the one of the value, else the one the author uses.
fn common_unit(measure: &Measure, habits: &Habits) -> Option<String> {
    let quantity = |datum: &Datum| match datum {
        Datum::Quantity(quantity) => Some(quantity.clone()),
        _ => None,
    };
    let limits = [&measure.high, &measure.low].into_iter().flatten().filter_map(quantity);
    let found = quantity(&measure.found)?;
    let written = limits.chain([found.clone()]).find_map(|quantity| quantity.unit);
    Some(match (written, kind_of(&found.ty)) {
        (Some(unit), _) => unit.to_string(),
        (None, Some(kind)) => habits.unit(kind.name, [found.si]),
        (None, None) => unit_of(&found),
    })
}

fn in_unit(datum: &Datum, unit: Option<&str>) -> Shown {
    match (datum, unit) {
        // A limit that was itself computed (a rated torque) is shown beside the value in its unit.
        (Datum::Quantity(quantity), Some(unit)) => {
            shown(&Datum::Quantity(Quantity { unit: Some(unit.into()), ..quantity.clone() }))
        }
        _ => shown(datum),
    }
}

fn found(datum: &Datum, unit: Option<&str>, digits: usize) -> Shown {
    let Datum::Quantity(quantity) = datum else { return shown(datum) };
    let unit = unit.map(str::to_owned).unwrap_or_else(|| unit_of(quantity));
    let in_its_unit = Datum::Quantity(Quantity { unit: Some(unit.as_str().into()), ..quantity.clone() });
    if unit == "%" && digits > DIGITS {
        // Three digits of a percentage would hide the difference.
        let value = convert(quantity.si, &unit);
        let text = number::digits(value, digits);
        return Shown::Number(Box::new(Number {
            si: quantity.si,
            kind: kind_of(&quantity.ty).map(|kind| kind.name),
            value,
            text: joined(&text, &unit),
            digits: text,
            unit,
            limits: quantity.limits,
            marks: Default::default(),
        }));
    }
    result(&in_its_unit, Some(&unit), digits)
}

/// Digits that make value and limit look different where they are.
fn apart(found: &Datum, limit: &Datum, unit: &str) -> usize {
    match (found, limit) {
        (Datum::Quantity(found), Datum::Quantity(limit)) => {
            let (found, limit) = (convert(found.si, unit), convert(limit.si, unit));
            let clear = |a: &str, b: &str| number::shortened(a) != number::shortened(b);
            let percent_clear = || clear(&number::percent(found / 100.0), &number::percent(limit / 100.0));
            if unit == "%" && found != limit && !percent_clear() {
                return number::apart(found, limit).max(DIGITS + 1);
            }
            number::apart(found, limit)
        }
        _ => DIGITS,
    }
}

fn margin(measure: &Measure, unit: Option<&str>) -> Margin {
    let (value, absolute) = (measure.margin, measure.absolute);
    if !absolute {
        return Margin { value, absolute, text: joined(&number::percent(value), "%") };
    }
    let unit = of_difference(unit.unwrap_or("")).to_string();
    let difference = number::digits(convert_difference(value, &unit), number::SHARE_DIGITS);
    Margin { value, absolute, text: joined(&difference, &unit) }
}

pub(super) fn shows(analysis: &Analysis, habits: &Habits) -> Vec<ShowLine> {
    analysis.shows.iter().map(|show| show_line(analysis, show, habits, usize::MAX)).collect()
}

/// A `show` with its first `most` outcomes.
pub(super) fn show_line(analysis: &Analysis, show: &ShowRecord, habits: &Habits, most: usize) -> ShowLine {
    let outcome = |outcome: &ShowOutcome| ShowOutcomeLine {
        case: outcome.case,
        label: label(analysis, outcome.case, outcome.gear.as_deref()),
        gear: outcome.gear.clone(),
        value: outcome.value.as_ref().map(|datum| result(datum, usual(datum, habits).as_deref(), DIGITS)),
        remark: outcome.remark.clone(),
    };
    ShowLine { text: show.text.clone(), outcomes: show.outcomes.iter().take(most).map(outcome).collect() }
}

fn usual(datum: &Datum, habits: &Habits) -> Option<String> {
    let Datum::Quantity(quantity) = datum else { return None };
    Some(habits.unit(kind_of(&quantity.ty)?.name, [quantity.si]))
}
