//! In which unit a number is shown: the one it was written in, else the one the author uses for its kind, else the
//! kind's usual unit with the prefix that suits its size.

use std::collections::BTreeMap;

pub use layshaft_semantics::unit::{convert, usual_unit};
use layshaft_units::{Angle, KINDS, Kind, Type, parse_unit};

/// The units an author uses, by kind: taken from the limits of criteria and from what `show … as` asks for.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct Habits {
    units: BTreeMap<&'static str, Box<str>>,
}

impl Habits {
    /// Notes that a value of this kind was written in this unit; the first one counts.
    pub fn note(&mut self, kind: &'static str, unit: &str) {
        self.units.entry(kind).or_insert_with(|| unit.into());
    }

    /// The unit for numbers of a kind that stand together, so that they can be compared down a column.
    #[must_use]
    pub fn unit(&self, kind: &'static str, values: impl IntoIterator<Item = f64>) -> String {
        match self.units.get(kind) {
            Some(unit) => unit.to_string(),
            None => usual_unit(kind, values),
        }
    }
}

/// The kind that names a value of this type, where one does.
#[must_use]
pub fn kind_of(ty: &Type) -> Option<&'static Kind> {
    let same = |kind: &&Kind| {
        let of = kind.ty();
        of.dim == ty.dim && of.scale == ty.scale
    };
    let angle = |kind: &Kind| match (kind.ty().angle, ty.angle) {
        (Angle::Free, Angle::Free) => true,
        (Angle::Range(exact, _), state @ Angle::Range(..)) => state.allows(exact),
        _ => false,
    };
    let fitting = || KINDS.iter().filter(same).filter(|kind| angle(kind));
    let tagged = fitting().find(|kind| kind.ty().tag == ty.tag);
    // `moment_of_inertia` carries a tag only to be told from GD²; an untagged value of its type is one.
    tagged.or_else(|| fitting().next().filter(|_| ty.tag.is_none()))
}

/// The unit of a difference of levels: kelvin for degrees Celsius.
#[must_use]
pub fn of_difference(unit: &str) -> &str {
    if unit == "°C" { "K" } else { unit }
}

/// A difference in SI in a unit, which for levels is free of the zero of their scale.
#[must_use]
pub fn convert_difference(si: f64, unit: &str) -> f64 {
    if unit.is_empty() {
        return si;
    }
    parse_unit(unit).map_or(si, |unit| unit.as_difference().from_si(si))
}

#[cfg(test)]
mod tests {
    use super::*;
    use layshaft_units::kind;

    #[test]
    fn every_kind_is_known_by_its_type_or_by_one_that_shares_it() {
        for kind in KINDS {
            let found = kind_of(&kind.ty()).map(|found| found.ty().dim);
            assert_eq!(found, Some(kind.ty().dim), "{}", kind.name);
        }
        let torque = kind("torque").map(Kind::ty).unwrap();
        assert_eq!(kind_of(&torque).map(|kind| kind.name), Some("torque"));
    }

    #[test]
    fn what_the_author_uses_comes_first() {
        let mut habits = Habits::default();
        habits.note("speed", "m/min");
        habits.note("speed", "km/h");
        assert_eq!(habits.unit("speed", [1.0]), "m/min");
        assert_eq!(habits.unit("force", [20_000.0]), "kN");
    }
}
