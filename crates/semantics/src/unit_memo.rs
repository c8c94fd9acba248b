//! Units as read so far in one analysis: a text says the same few units thousands of times.

use std::cell::RefCell;
use std::collections::BTreeMap;
use std::ops::Deref;
use std::rc::Rc;
use std::sync::Arc;

use layshaft_units::{Type, Unit, UnitError, interpret_unit, parse_unit};

/// A unit as read, or what is wrong with it.
pub(crate) type Reading = Result<Rc<Read>, Rc<UnitError>>;

/// A unit, its spelling ready to be shared.
#[derive(Debug)]
pub(crate) struct Read {
    unit: Unit,
    /// The spelling of the formatter.
    pub spelling: Arc<str>,
}

impl Read {
    fn new(unit: Unit) -> Rc<Self> {
        let spelling = unit.text.as_str().into();
        Rc::new(Self { unit, spelling })
    }
}

impl Deref for Read {
    type Target = Unit;

    fn deref(&self) -> &Unit {
        &self.unit
    }
}

/// Readings of one unit that are remembered: a unit is wanted as a few types only.
const MOST_READINGS: usize = 16;

/// What was made of one text.
#[derive(Debug)]
struct Known {
    alone: Reading,
    wanted: Vec<(Type, Reading)>,
}

impl Known {
    fn new(text: &str) -> Self {
        Self { alone: parse_unit(text).map(Read::new).map_err(Rc::new), wanted: Vec::new() }
    }

    fn wanted(&mut self, wanted: &Type) -> Reading {
        if let Some((_, known)) = self.wanted.iter().find(|(ty, _)| ty == wanted) {
            return known.clone();
        }
        let alone = self.alone.as_ref().map_err(Rc::clone)?;
        let reading = match interpret_unit(alone, wanted) {
            Ok(unit) if unit == alone.unit => Ok(Rc::clone(alone)),
            Ok(unit) => Ok(Read::new(unit)),
            Err(error) => Err(Rc::new(error)),
        };
        if self.wanted.len() < MOST_READINGS {
            self.wanted.push((*wanted, reading.clone()));
        }
        reading
    }
}

/// Every unit read so far.
#[derive(Debug, Default)]
pub(crate) struct Units {
    known: RefCell<BTreeMap<Box<str>, Known>>,
}

impl Units {
    /// A unit as its place wants it.
    pub fn read(&self, text: &str, wanted: Option<&Type>) -> Reading {
        let mut all = self.known.borrow_mut();
        let read = |known: &mut Known| match wanted {
            Some(wanted) => known.wanted(wanted),
            None => known.alone.clone(),
        };
        if let Some(known) = all.get_mut(text) {
            return read(known);
        }
        read(all.entry(text.into()).or_insert_with(|| Known::new(text)))
    }
}

#[cfg(test)]
mod tests {
    use layshaft_units::{KINDS, interpret_unit, parse_unit};

    use super::Units;

    #[test]
    fn remembered_readings_are_those_of_the_table() {
        let units = Units::default();
        for text in ["N·m", "1/min", "rpm", "°C", "K", "lb·ft", "furlong", "kg*m^2", "m/s/s"] {
            for _ in 0..2 {
                let fresh = parse_unit(text);
                match (&fresh, units.read(text, None)) {
                    (Ok(fresh), Ok(known)) => assert_eq!(*fresh, **known),
                    (Err(fresh), Err(known)) => assert_eq!(*fresh, *known),
                    (fresh, known) => panic!("{text}: {fresh:?} {known:?}"),
                }
                for kind in KINDS {
                    let fresh = fresh.clone().and_then(|unit| interpret_unit(&unit, &kind.ty()));
                    let known = units.read(text, Some(&kind.ty()));
                    assert_eq!(fresh.as_ref().ok(), known.as_deref().ok().map(|read| &**read), "{text}");
                    assert_eq!(fresh.err().as_ref(), known.err().as_deref(), "{text} as {}", kind.name);
                }
            }
        }
    }
}
