//! Reads a straight line from any two things that settle it, and checks the rest against it.

use crate::fault::Fault;
use crate::kinds::reading::{bad_value, contradiction, differ, missing, points};
use crate::laws::straight_line::Line;
use crate::values::{FieldValue, Values};

/// Numbers that say the same thing may differ by this share, the rounding of catalogues.
const ROUNDING: f64 = 0.02;

/// The names of the fields, which differ between torque and force.
pub(super) struct Names {
    /// Effort at standstill.
    pub stall: &'static str,
    /// Speed without load.
    pub no_load: &'static str,
    /// Greatest power.
    pub peak: &'static str,
    /// Its speed.
    pub peak_speed: &'static str,
    /// Points.
    pub point: &'static str,
    /// The column of the effort, and its kind.
    pub effort_column: &'static str,
    /// The kind of the speed.
    pub speed_kind: &'static str,
}

/// The line; `None` with a fault for every reason against it.
pub(super) fn read_line(values: &Values, names: &Names, faults: &mut Vec<Fault>) -> Option<Line> {
    let before = faults.len();
    let points = match values.get(names.point) {
        Some(FieldValue::Points(table)) => {
            points(table, names.point, names.effort_column, names.speed_kind, faults)
        }
        _ => Vec::new(),
    };
    if points.len() > 2 {
        let template = "two points settle a line; more of them are a measured_curve";
        faults.push(bad_value(names.point, template, &[]));
    }
    if faults.len() > before {
        return None;
    }
    let line = settle(values, names, &points, faults)?;
    check(values, names, &points, line, faults);
    (faults.len() == before).then_some(line)
}

/// The line from the first two things that settle it.
fn settle(values: &Values, names: &Names, points: &[(f64, f64)], faults: &mut Vec<Fault>) -> Option<Line> {
    let stall = values.si(names.stall);
    let no_load = values.si(names.no_load).or(values.si(names.peak_speed).map(|speed| 2.0 * speed));
    let line = match (stall, no_load, values.si(names.peak), points) {
        (Some(stall), Some(no_load), _, _) => Some(Line { stall, no_load }),
        (_, _, _, [a, b]) => Line::through(*a, *b),
        (Some(stall), None, _, [point]) => Line::through((0.0, stall), *point),
        (None, Some(no_load), _, [point]) => Line::through((no_load, 0.0), *point),
        (Some(stall), None, Some(peak), _) => Some(Line::from_stall_and_peak(stall, peak)),
        (None, Some(no_load), Some(peak), _) => Some(Line::from_no_load_and_peak(no_load, peak)),
        _ => {
            let choices: [&[&'static str]; 5] = [
                &[names.stall, names.no_load],
                &[names.stall, names.peak],
                &[names.no_load, names.peak],
                &[names.peak, names.peak_speed],
                &[names.point],
            ];
            let why = "two things settle a straight line: two of its ends and its peak, two points, or an end and a \
                       point (a point and the peak power leave two lines)";
            faults.push(missing(&choices, why));
            return None;
        }
    };
    if line.is_none_or(|line| !(line.stall.is_finite() && line.no_load.is_finite())) {
        let fields = [names.point, names.stall, names.no_load];
        let given: Vec<&'static str> = fields.into_iter().filter(|name| values.get(name).is_some()).collect();
        faults.push(contradiction(
            &given,
            "these lie on no line that falls from a standstill effort above zero to a no-load speed above zero",
            &[],
        ));
        return None;
    }
    line
}

/// Whatever else is given has to lie on the line.
fn check(values: &Values, names: &Names, points: &[(f64, f64)], line: Line, faults: &mut Vec<Fault>) {
    let (effort, speed) = (names.effort_column, names.speed_kind);
    if let Some(peak) = values.si(names.peak).filter(|peak| differ(*peak, line.peak_power(), ROUNDING)) {
        faults.push(contradiction(
            &[names.stall, names.no_load, names.peak],
            "{0} at standstill and {1} without load make a peak power of {2}, a quarter of their product, not {3}",
            &[
                (line.stall, effort),
                (line.no_load, speed),
                (line.peak_power(), "mechanical_power"),
                (peak, "mechanical_power"),
            ],
        ));
    }
    for (name, wanted) in [(names.no_load, line.no_load), (names.peak_speed, line.no_load / 2.0)] {
        if let Some(given) = values.si(name).filter(|given| differ(*given, wanted, ROUNDING)) {
            faults.push(contradiction(
                &[name],
                "the other fields settle a line on which this speed is {0}, not {1}; peak power stands at half the \
                 no-load speed",
                &[(wanted, speed), (given, speed)],
            ));
        }
    }
    for (at, found) in points {
        if (line.effort(*at) - found).abs() > ROUNDING * line.stall {
            faults.push(contradiction(
                &[names.point],
                "the other fields settle a line that gives {0} at {1}, not {2}",
                &[(line.effort(*at), effort), (*at, speed), (*found, effort)],
            ));
        }
    }
}

#[cfg(test)]
mod tests {
    use super::{Line, Names, read_line};
    use crate::fault::{Fault, FaultKind};
    use crate::laws::testing::{close, rpm};
    use crate::values::{FieldValue, Table, Values};

    const NAMES: Names = Names {
        stall: "stall_torque",
        no_load: "no_load_speed",
        peak: "peak_power",
        peak_speed: "peak_power_speed",
        point: "point",
        effort_column: "torque",
        speed_kind: "rotational_speed",
    };

    type Fields<'a> = &'a [(&'static str, f64)];

    fn read(fields: &[(&'static str, f64)], points: &[(f64, f64)]) -> Result<Line, Vec<Fault>> {
        let mut values = Values::default();
        for (name, si) in fields {
            values.set(name, FieldValue::Si(*si));
        }
        if !points.is_empty() {
            let columns = vec![
                ("speed", points.iter().map(|(speed, _)| *speed).collect()),
                ("torque", points.iter().map(|(_, torque)| *torque).collect()),
            ];
            values.set("point", FieldValue::Points(Table { columns, at: Vec::new() }));
        }
        let mut faults = Vec::new();
        read_line(&values, &NAMES, &mut faults).ok_or(faults)
    }

    #[test]
    fn any_two_settle_it() {
        let (stall, no_load) = (10.0, 200.0);
        let ways: [(Fields<'_>, &[(f64, f64)]); 8] = [
            (&[("stall_torque", stall), ("no_load_speed", no_load)], &[]),
            (&[("stall_torque", stall), ("peak_power", 500.0)], &[]),
            (&[("no_load_speed", no_load), ("peak_power", 500.0)], &[]),
            (&[("peak_power_speed", 100.0), ("peak_power", 500.0)], &[]),
            (&[("peak_power_speed", 100.0), ("stall_torque", stall)], &[]),
            (&[("stall_torque", stall)], &[(50.0, 7.5)]),
            (&[("no_load_speed", no_load)], &[(50.0, 7.5)]),
            (&[], &[(150.0, 2.5), (50.0, 7.5)]),
        ];
        for (fields, points) in ways {
            let line = read(fields, points).unwrap();
            close(line.stall, stall, 1e-12);
            close(line.no_load, no_load, 1e-12);
        }
    }

    #[test]
    fn stall_times_no_load_is_not_the_peak() {
        let faults = read(&[("stall_torque", 10.0), ("no_load_speed", 200.0), ("peak_power", 2000.0)], &[]);
        let [Fault { kind: FaultKind::Contradiction { how, .. }, .. }] = &faults.unwrap_err()[..] else {
            panic!("one contradiction");
        };
        assert_eq!(how.quantities[2], (500.0, "mechanical_power"));
        assert_eq!(how.quantities[3], (2000.0, "mechanical_power"));
    }

    #[test]
    fn rounding_of_a_catalogue_is_no_contradiction() {
        assert!(
            read(&[("stall_torque", 10.0), ("no_load_speed", rpm(1910.0)), ("peak_power", 505.0)], &[])
                .is_ok()
        );
    }

    #[test]
    fn too_little_and_too_much() {
        let kind = |fields: &[(&'static str, f64)], points: &[(f64, f64)]| {
            read(fields, points).unwrap_err().remove(0).kind
        };
        assert!(matches!(kind(&[("stall_torque", 10.0)], &[]), FaultKind::Missing { .. }));
        assert!(matches!(kind(&[("peak_power", 10.0)], &[(1.0, 1.0)]), FaultKind::Missing { .. }));
        assert!(matches!(kind(&[("stall_torque", 10.0)], &[(1.0, 11.0)]), FaultKind::Contradiction { .. }));
        let three = [(1.0, 9.0), (2.0, 8.0), (3.0, 7.0)];
        assert!(matches!(kind(&[], &three), FaultKind::Value { .. }));
        let off = [(100.0, 3.0)];
        let ends = [("stall_torque", 10.0), ("no_load_speed", 200.0)];
        assert!(matches!(kind(&ends, &off), FaultKind::Contradiction { .. }));
    }
}
