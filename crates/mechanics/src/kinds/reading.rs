//! What the kinds share when they read their fields: faults, inertia, braking, limits.

use crate::curve::{Curve, Law};
use crate::fault::{Fault, FaultKind, Note};
use crate::kinds::fields::{AS_GENERATOR, INTO_RESISTOR};
use crate::laws::inertia::from_flywheel_effect;
use crate::laws::table::{Table, TableError};
use crate::model::{Braking, Feed, Known, Limit, LimitOn, Motion};
use crate::scalar::Real;
use crate::values::{FieldValue, Table as Given, Values};

/// Groups of fields of which one must be given.
pub(crate) fn missing(any_of: &[&[&'static str]], why: &'static str) -> Fault {
    let any_of = any_of.iter().map(|group| group.to_vec()).collect();
    Fault { part: None, kind: FaultKind::Missing { any_of, why: Note::plain(why) } }
}

/// Fields that cannot all be true.
pub(crate) fn contradiction(
    fields: &[&'static str],
    template: &'static str,
    quantities: &[(f64, &'static str)],
) -> Fault {
    let how = Note { template, quantities: quantities.to_vec() };
    Fault { part: None, kind: FaultKind::Contradiction { fields: fields.to_vec(), how } }
}

/// A value the law cannot take.
pub(crate) fn bad_value(
    field: &'static str,
    template: &'static str,
    quantities: &[(f64, &'static str)],
) -> Fault {
    let why = Note { template, quantities: quantities.to_vec() };
    Fault { part: None, kind: FaultKind::Value { field, why } }
}

/// Whether two numbers differ by more than a share of the larger.
pub(crate) fn differ(a: f64, b: f64, share: f64) -> bool {
    (a - b).abs() > share * f64::max(a.abs(), b.abs())
}

/// Inertia from `inertia` or `flywheel_effect`; both are one too many.
pub(crate) fn inertia(values: &Values, faults: &mut Vec<Fault>) -> Known {
    match (values.si("inertia"), values.si("flywheel_effect")) {
        (Some(inertia), Some(effect)) => {
            faults.push(contradiction(
                &["inertia", "flywheel_effect"],
                "both say the same thing: the inertia is {0}, a quarter of the flywheel effect is {1}; keep one",
                &[(inertia, "moment_of_inertia"), (from_flywheel_effect(effect), "moment_of_inertia")],
            ));
            Known::Value(inertia)
        }
        (None, Some(effect)) => Known::Value(from_flywheel_effect(effect)),
        (inertia, None) => Known::of(inertia, "inertia"),
    }
}

/// Of several ways to say one thing, the only one given.
pub(crate) fn only_one(
    values: &Values,
    ways: &[&'static str],
    why: &'static str,
    faults: &mut Vec<Fault>,
) -> Option<&'static str> {
    let given: Vec<&'static str> = ways.iter().copied().filter(|name| values.get(name).is_some()).collect();
    match given.as_slice() {
        [one] => return Some(one),
        [] => {
            let groups: Vec<&[&'static str]> = ways.iter().map(std::slice::from_ref).collect();
            faults.push(missing(&groups, why));
        }
        more => faults.push(contradiction(more, "these say the same thing twice; keep one", &[])),
    }
    None
}

/// What happens when the load drives: `braking` of the source and `accepts_return` of its supply.
pub(crate) fn braking(
    word: Option<&'static str>,
    feed: &Feed,
    hold: impl FnOnce() -> Box<dyn Curve>,
) -> Braking {
    match word {
        None => Braking::Unknown("braking"),
        Some(INTO_RESISTOR) => Braking::Can(hold()),
        Some(AS_GENERATOR) => returning(feed, hold),
        Some(_) => Braking::Cannot,
    }
}

/// What happens when the load drives a machine that always returns power: its supply decides.
pub(crate) fn returning(feed: &Feed, hold: impl FnOnce() -> Box<dyn Curve>) -> Braking {
    match feed.supply {
        None => Braking::Can(hold()),
        Some(supply) => match supply.accepts_return {
            Some(true) => Braking::Can(hold()),
            Some(false) => Braking::Cannot,
            None => Braking::Unknown("accepts_return"),
        },
    }
}

/// What a machine holds back where its own drive curve lies below zero; 0 elsewhere.
pub(crate) struct HoldBack<L>(pub L);

impl<L: Law> Law for HoldBack<L> {
    fn eval<R: Real>(&self, x: R) -> R {
        (-self.0.eval(x)).max(R::of(0.0))
    }

    fn jumps(&self) -> Vec<f64> {
        self.0.jumps()
    }

    fn kinks(&self) -> Vec<f64> {
        self.0.kinks()
    }
}

/// Points (speed, effort) of a table with columns `speed` and an effort or `power`.
pub(crate) fn points(
    table: &Given,
    field: &'static str,
    effort_column: &str,
    speed_kind: &'static str,
    faults: &mut Vec<Fault>,
) -> Vec<(f64, f64)> {
    let speeds = table.column("speed").unwrap_or_default();
    if let Some(efforts) = table.column(effort_column) {
        return speeds.iter().copied().zip(efforts.iter().copied()).collect();
    }
    let Some(powers) = table.column("power") else {
        faults.push(bad_value(field, "every point needs its torque, force or power beside its speed", &[]));
        return Vec::new();
    };
    if let Some(speed) = speeds.iter().find(|speed| **speed <= 0.0) {
        let template = "power over speed says nothing at {0}: give the effort at this point instead";
        faults.push(bad_value(field, template, &[(*speed, speed_kind)]));
        return Vec::new();
    }
    speeds.iter().zip(powers).map(|(speed, power)| (*speed, power / speed)).collect()
}

/// The measured curve of a field, with a fault for what makes it none.
pub(crate) fn table(
    values: &Values,
    field: &'static str,
    effort_column: &str,
    motion: Motion,
    faults: &mut Vec<Fault>,
) -> Option<Table> {
    let Some(FieldValue::Points(given)) = values.get(field) else { return None };
    let before = faults.len();
    let points = points(given, field, effort_column, motion.speed_kind(), faults);
    if faults.len() > before {
        return None;
    }
    match Table::new(points) {
        Ok(table) => return Some(table),
        Err(TableError::TooFew) => faults.push(bad_value(field, "a curve needs two points at least", &[])),
        Err(TableError::NotFinite) => faults.push(bad_value(field, "a point is not a finite number", &[])),
        Err(TableError::Twice(speed)) => {
            let template = "two different values at {0}: keep one";
            faults.push(bad_value(field, template, &[(speed, motion.speed_kind())]));
        }
    }
    None
}

/// The limits of a part that are given.
pub(crate) fn limits(values: &Values, fields: &[(&'static str, LimitOn)]) -> Vec<Limit> {
    let limit = |(field, on): &(&'static str, LimitOn)| {
        let code = match on {
            LimitOn::InputSpeed | LimitOn::OutputSpeed => "overspeed",
            LimitOn::InputEffort | LimitOn::OutputEffort | LimitOn::Power => "part-limit",
        };
        values.si(field).map(|value| Limit { field, on: *on, value, code })
    };
    fields.iter().filter_map(limit).collect()
}

/// The model, or what stands in its way.
pub(crate) fn done<T>(model: T, faults: Vec<Fault>) -> Result<T, Vec<Fault>> {
    if faults.is_empty() { Ok(model) } else { Err(faults) }
}
