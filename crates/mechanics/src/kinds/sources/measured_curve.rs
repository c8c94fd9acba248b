//! A source known by measured points.

use super::straight_line::ratings;
use crate::curve::Curve;
use crate::fault::Fault;
use crate::kinds::fields::{
    BRAKING, FLYWHEEL_EFFECT, INERTIA, MAX_SPEED, RATED_DUTY, RATED_TORQUE, SUPPLY_IF_ANY, plain,
};
use crate::kinds::reading::{HoldBack, bad_value, braking, differ, done, inertia, missing, table};
use crate::laws::induction_curve;
use crate::laws::scaled_table::{self, ScaledTable};
use crate::laws::table::{self as law, Table};
use crate::model::{Characteristic, Feed, Known, Model, Motion, Ratings, Source, SourceState};
use crate::registry::{ColumnRow, Field, KindRow, Need, Role, Shape};
use crate::values::{Duty, FieldValue, Values};

/// The row.
pub static ROW: KindRow = KindRow {
    role: Role::Source,
    name: "measured_curve",
    title: "source by measured points",
    summary: "Torque over speed as measured or read from a sheet, at full command, straight between the points. Results \
              outside the measured speeds are marked. At another voltage than that of the measurement the curve is scaled \
              and every result marked so: on direct voltage speeds and torques go with it, on mains the torque by its \
              square.",
    fields: FIELDS,
    results: &[],
    formulas: &[law::BETWEEN, scaled_table::DC_VOLTAGE, induction_curve::VOLTAGE],
    cautions: &[
        "Scaling to another voltage leaves losses, saturation and a controller's limits aside: measure again where it is \
         close.",
        "A curve of peak torque says nothing of what the machine can do for long: give rated_torque.",
    ],
    example: "source engine: measured_curve { curve = points (speed [rpm], torque [N·m]) {\n    1000 150\n    3000 190\n    \
              6000 140\n}; braking = none }",
    build,
    given: |_| Vec::new(),
};

static FIELDS: &[Field] = &[
    SUPPLY_IF_ANY,
    plain("curve", Shape::Points(COLUMNS), Need::Required, "torque or power over speed at full command"),
    RATED_TORQUE,
    RATED_DUTY,
    MAX_SPEED,
    INERTIA,
    FLYWHEEL_EFFECT,
    BRAKING,
];

const COLUMNS: &[ColumnRow] = &[
    ColumnRow { name: "speed", kind: "rotational_speed", optional: false },
    ColumnRow { name: "torque", kind: "torque", optional: true },
    ColumnRow { name: "power", kind: "mechanical_power", optional: true },
];

/// A difference of voltages that is no other voltage yet.
const SAME: f64 = 1e-3;

#[derive(Debug)]
struct Measured {
    table: Table,
    /// The voltage the points were taken at.
    voltage: Option<f64>,
    inertia: Known,
    braking: Option<&'static str>,
    ratings: Ratings,
}

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    let mut faults = Vec::new();
    let inertia = inertia(values, &mut faults);
    let Some(FieldValue::Points(points)) = values.get("curve") else {
        return Err(vec![missing(&[&["curve"]], "the measured points")]);
    };
    let Some(table) = table(values, "curve", "torque", Motion::Rotary, &mut faults) else {
        return Err(faults);
    };
    if table.range().1 <= 0.0 || table.points().iter().all(|(_, torque)| *torque <= 0.0) {
        let why = "a source drives somewhere above standstill: none of these points does";
        faults.push(bad_value("curve", why, &[]));
    }
    let measured = Measured {
        table,
        voltage: points.at.iter().find(|(kind, _)| *kind == "voltage").map(|(_, si)| *si),
        inertia,
        braking: values.word("braking"),
        ratings: ratings(values, "rated_torque"),
    };
    done(Model::Source(Box::new(measured)), faults)
}

impl Measured {
    /// The curve at the voltage of the feed, and whether that is another than the measurement's.
    fn scaled(&self, feed: &Feed) -> (ScaledTable, bool) {
        let plain = ScaledTable::plain(self.table.clone());
        let supply = feed.supply.unwrap_or_default();
        let (Some(measured), Some(given)) = (self.voltage, supply.voltage) else { return (plain, false) };
        if !differ(measured, given, SAME) {
            return (plain, false);
        }
        let ratio = given / measured;
        let scaled = match supply.frequency {
            // An induction machine keeps its speed, and its torque goes by the square of the voltage.
            Some(_) => ScaledTable { effort: ratio * ratio, ..plain },
            None => ScaledTable { effort: ratio, speed: ratio, ..plain },
        };
        (scaled, true)
    }
}

impl Source for Measured {
    fn motion(&self) -> Motion {
        Motion::Rotary
    }

    fn inertia(&self) -> Known {
        self.inertia
    }

    fn characteristic(&self, feed: &Feed) -> Result<Characteristic, Vec<Fault>> {
        let (curve, scaled) = self.scaled(feed);
        let range = curve.range();
        let braking = braking(self.braking, feed, || Box::new(HoldBack(curve.clone())));
        let mut character = Characteristic::new(Box::new(curve), braking, range.1);
        character.measured = Some(range);
        character.scaled = scaled;
        Ok(character)
    }

    fn ratings(&self, _duty: Option<Duty>) -> Ratings {
        self.ratings
    }

    fn symbols(&self, state: &SourceState<'_>) -> Vec<(&'static str, f64)> {
        let (curve, scaled) = self.scaled(state.feed);
        let mut out = self.table.symbols(state.speed / curve.speed, Motion::Rotary);
        let supply = state.feed.supply.unwrap_or_default();
        if let (true, Some(measured), Some(given)) = (scaled, self.voltage, supply.voltage) {
            let torque = self.table.at(state.speed / curve.speed);
            let name = if supply.frequency.is_some() { "U_n" } else { "U_1" };
            out.extend([("T", torque), ("U", given), (name, measured)]);
        }
        out
    }
}

#[cfg(test)]
mod tests {
    use super::build;
    use crate::laws::testing::{close, rpm};
    use crate::model::{Braking, Feed, Model, Source, SupplyData};
    use crate::values::{FieldValue, Table, Values};

    fn values(points: &[(f64, f64)], column: &'static str, volts: Option<f64>) -> Values {
        let columns = vec![
            ("speed", points.iter().map(|(n, _)| rpm(*n)).collect()),
            (column, points.iter().map(|(_, y)| *y).collect()),
        ];
        let at = volts.map(|si| ("voltage", si)).into_iter().collect();
        Values::default().with("curve", FieldValue::Points(Table { columns, at }))
    }

    fn source(values: &Values) -> Box<dyn Source> {
        let Ok(Model::Source(source)) = build(values) else { panic!("no source") };
        source
    }

    const ALONE: Feed = Feed { supply: None, machines: 1.0, ambient: None, altitude: None };

    /// Closed form: on a straight piece the power peaks inside it, not at a point.
    const ENGINE: [(f64, f64); 6] = [
        (1000.0, 150.0),
        (2000.0, 180.0),
        (3000.0, 190.0),
        (4000.0, 185.0),
        (5000.0, 170.0),
        (6000.0, 140.0),
    ];

    #[test]
    fn peak_power_lies_inside_a_piece() {
        let character = source(&values(&ENGINE, "torque", None)).characteristic(&ALONE).unwrap();
        let power = |n: f64| character.drive.at(rpm(n)) * rpm(n);
        close(power(16_000.0 / 3.0), 89_360.857_702_1, 1e-10);
        for n in [5000.0, 5332.0, 5335.0, 6000.0] {
            assert!(power(n) < 89_360.857_702_1);
        }
        assert_eq!(character.measured, Some((rpm(1000.0), rpm(6000.0))));
        assert!(matches!(character.braking, Braking::Unknown("braking")));
    }

    #[test]
    fn by_power_over_speed() {
        let points: Vec<(f64, f64)> = ENGINE.iter().map(|(n, torque)| (*n, torque * rpm(*n))).collect();
        let character = source(&values(&points, "power", None)).characteristic(&ALONE).unwrap();
        close(character.drive.at(rpm(2500.0)), 185.0, 1e-12);
        assert!(build(&values(&[(0.0, 0.0), (1000.0, 10.0)], "power", None)).is_err());
    }

    #[test]
    fn another_voltage_is_another_curve() {
        let source = source(&values(&ENGINE, "torque", Some(36.0)));
        let feed = |voltage| Feed {
            supply: Some(SupplyData { voltage: Some(voltage), ..SupplyData::default() }),
            ..ALONE
        };
        let same = source.characteristic(&feed(36.0)).unwrap();
        assert!(!same.scaled);
        // Closed form: speeds and torques of a dc machine both go with its voltage.
        let more = source.characteristic(&feed(48.0)).unwrap();
        assert!(more.scaled);
        close(more.drive.at(rpm(4000.0)), 190.0 * 48.0 / 36.0, 1e-12);
        assert_eq!(more.measured, Some((rpm(1000.0) * 48.0 / 36.0, rpm(6000.0) * 48.0 / 36.0)));
        // An induction machine keeps its speed, and its torque goes by the square.
        let mut mains = feed(32.4);
        mains.supply = mains.supply.map(|supply| SupplyData { frequency: Some(50.0), ..supply });
        let less = source.characteristic(&mains).unwrap();
        close(less.drive.at(rpm(3000.0)), 190.0 * 0.81, 1e-12);
    }

    #[test]
    fn points_that_drive_nothing() {
        assert!(build(&values(&[(100.0, -1.0), (200.0, -2.0)], "torque", None)).is_err());
        assert!(build(&values(&[(100.0, 1.0)], "torque", None)).is_err());
        assert!(build(&Values::default()).is_err());
    }
}
