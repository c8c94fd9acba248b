//! Derating of a source by altitude and ambient temperature, from the user's own tables.

use super::fields::plain;
use super::reading::bad_value;
use crate::curve::Law;
use crate::fault::Fault;
use crate::laws::table::{Table, TableError};
use crate::model::Feed;
use crate::registry::{ColumnRow, Field, Need, Shape};
use crate::values::{FieldValue, Values};

/// Factor over altitude.
pub(crate) const ALTITUDE_DERATING: Field = plain(
    ALTITUDE,
    Shape::Points(&[
        ColumnRow { name: "altitude", kind: "length", optional: false },
        ColumnRow { name: "factor", kind: "percentage", optional: false },
    ]),
    Need::Where("a drive above 1000 m"),
    "share of the rated values that is left at an altitude, as its maker says; an engine's whole curve follows it",
);

/// Factor over ambient temperature.
pub(crate) const AMBIENT_DERATING: Field = plain(
    AMBIENT,
    Shape::Points(&[
        ColumnRow { name: "ambient", kind: "temperature", optional: false },
        ColumnRow { name: "factor", kind: "percentage", optional: false },
    ]),
    Need::Where("a drive above 40 °C"),
    "share of the rated values that is left at an ambient temperature, as its maker says; an engine's whole curve \
     follows it",
);

const ALTITUDE: &str = "altitude_derating";
const AMBIENT: &str = "ambient_derating";

/// The tables of a source.
#[derive(Clone, Debug, Default, PartialEq)]
pub(crate) struct Derating {
    altitude: Option<Table>,
    ambient: Option<Table>,
}

impl Derating {
    /// From the fields of a source.
    pub fn read(values: &Values, faults: &mut Vec<Fault>) -> Self {
        let mut table = |field, column| {
            let Some(FieldValue::Points(given)) = values.get(field) else { return None };
            let pairs = given
                .column(column)
                .unwrap_or_default()
                .iter()
                .zip(given.column("factor").unwrap_or_default());
            let pairs: Vec<(f64, f64)> = pairs.map(|(x, y)| (*x, *y)).collect();
            if let Some((_, factor)) = pairs.iter().find(|(_, factor)| !(*factor > 0.0 && *factor <= 1.5)) {
                let why = "a derating factor is a share that is left, not {0}";
                faults.push(bad_value(field, why, &[(*factor, "percentage")]));
                return None;
            }
            let why = match Table::new(pairs) {
                Ok(table) => return Some(table),
                Err(TableError::TooFew) => "a derating table needs two points at least",
                Err(TableError::NotFinite) => "a point is not a finite number",
                Err(TableError::Twice(_)) => "two different factors at one place: keep one",
            };
            faults.push(bad_value(field, why, &[]));
            None
        };
        Self { altitude: table(ALTITUDE, "altitude"), ambient: table(AMBIENT, "ambient") }
    }

    /// The factor at a site. Below the first point of a table its factor stays; beyond the last it is not known.
    pub fn factor(&self, feed: &Feed) -> Result<f64, Vec<Fault>> {
        let tables = [
            (&self.altitude, feed.altitude, ALTITUDE, "length"),
            (&self.ambient, feed.ambient, AMBIENT, "temperature"),
        ];
        let mut factor = 1.0;
        for (table, here, field, kind) in tables {
            let (Some(table), Some(here)) = (table, here) else { continue };
            let (first, last) = table.range();
            if here > last * (1.0 + 1e-12) {
                let why = "the drive stands at {0}, and this table ends at {1}: ask the maker for what is left there";
                return Err(vec![bad_value(field, why, &[(here, kind), (last, kind)])]);
            }
            factor *= table.eval(f64::max(here, first));
        }
        Ok(factor)
    }

    /// Whether it says what the altitude, or the ambient temperature, takes.
    pub fn knows(&self) -> (bool, bool) {
        (self.altitude.is_some(), self.ambient.is_some())
    }
}
