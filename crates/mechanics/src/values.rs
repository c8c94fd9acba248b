//! The values of a part's fields, units already taken off: SI throughout.

use std::collections::BTreeMap;
use std::sync::Arc;

/// A value of a field.
#[derive(Clone, Debug, PartialEq)]
pub enum FieldValue {
    /// A quantity in SI.
    Si(f64),
    /// So many times the rated value.
    OfRated(f64),
    /// `lo .. hi` in SI, `lo <= hi`.
    Interval(f64, f64),
    /// A word of the field's choice.
    Word(&'static str),
    /// Yes or no.
    Flag(bool),
    /// A part, by its index in the drive's list of parts.
    Part(usize),
    /// A table.
    Points(Table),
    /// `driver drives driven`: driven over driver is the reduction.
    Ratio {
        /// Teeth or diameter (m) of the driving wheel.
        driver: f64,
        /// Teeth or diameter (m) of the driven wheel.
        driven: f64,
    },
    /// Named gears.
    Gears(Vec<Gear>),
    /// A duty type.
    Duty(Duty),
}

/// A gear of a gearbox.
#[derive(Clone, Debug, PartialEq)]
pub struct Gear {
    /// Its name.
    pub name: String,
    /// Its reduction; none in neutral.
    pub reduction: Option<f64>,
    /// Its own efficiency, where it has one.
    pub efficiency: Option<f64>,
    /// Its own efficiency backward.
    pub efficiency_backward: Option<f64>,
}

impl Gear {
    /// A gear with the losses of its gearbox.
    #[must_use]
    pub fn of(name: impl Into<String>, reduction: f64) -> Self {
        Self { name: name.into(), reduction: Some(reduction), efficiency: None, efficiency_backward: None }
    }
}

/// A duty type of IEC 60034-1 and its number.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Duty {
    /// 1 to 10 for S1 … S10.
    pub class: u8,
    /// Cyclic duration factor as a ratio (S3 … S8), or the duration in seconds (S2).
    pub value: Option<f64>,
}

/// A table of points, in SI, columns as the registry names them.
#[derive(Clone, Debug, PartialEq, Default)]
pub struct Table {
    /// Name and values of each column; all of the same length.
    pub columns: Vec<(&'static str, Vec<f64>)>,
    /// The conditions it was taken in: kind and SI value (`voltage`, 36).
    pub at: Vec<(&'static str, f64)>,
}

impl Table {
    /// The values of a column.
    #[must_use]
    pub fn column(&self, name: &str) -> Option<&[f64]> {
        self.columns.iter().find(|(n, _)| *n == name).map(|(_, values)| values.as_slice())
    }
}

/// The fields of one part, by name.
#[derive(Clone, Debug, PartialEq, Default)]
pub struct Values {
    /// Shared between the states of a spec that leave a part alone.
    map: Arc<BTreeMap<&'static str, FieldValue>>,
}

impl Values {
    /// Sets a field.
    pub fn set(&mut self, name: &'static str, value: FieldValue) {
        Arc::make_mut(&mut self.map).insert(name, value);
    }

    /// The same with a field set.
    #[must_use]
    pub fn with(mut self, name: &'static str, value: FieldValue) -> Self {
        self.set(name, value);
        self
    }

    /// A field.
    #[must_use]
    pub fn get(&self, name: &str) -> Option<&FieldValue> {
        self.map.get(name)
    }

    /// A quantity in SI.
    #[must_use]
    pub fn si(&self, name: &str) -> Option<f64> {
        match self.map.get(name) {
            Some(FieldValue::Si(value)) => Some(*value),
            _ => None,
        }
    }

    /// A quantity, or a multiple of `rated`.
    #[must_use]
    pub fn of_rated(&self, name: &str, rated: Option<f64>) -> Option<f64> {
        match self.map.get(name) {
            Some(FieldValue::Si(value)) => Some(*value),
            Some(FieldValue::OfRated(times)) => rated.map(|rated| times * rated),
            _ => None,
        }
    }

    /// A flag.
    #[must_use]
    pub fn flag(&self, name: &str) -> Option<bool> {
        match self.map.get(name) {
            Some(FieldValue::Flag(value)) => Some(*value),
            _ => None,
        }
    }

    /// A word.
    #[must_use]
    pub fn word(&self, name: &str) -> Option<&'static str> {
        match self.map.get(name) {
            Some(FieldValue::Word(value)) => Some(value),
            _ => None,
        }
    }

    /// Every field given, in the order of the alphabet.
    pub fn iter(&self) -> impl Iterator<Item = (&'static str, &FieldValue)> {
        self.map.iter().map(|(name, value)| (*name, value))
    }
}
