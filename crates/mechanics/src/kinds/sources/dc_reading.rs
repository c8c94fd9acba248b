//! Reads the constants of a dc machine from its fields and checks them against one another.

use crate::fault::Fault;
use crate::kinds::reading::{bad_value, contradiction, differ, missing};
use crate::laws::dc_machine::{DcConstants, DcPoint};
use crate::laws::winding::copper_resistance;
use crate::values::{FieldValue, Values};

/// The ways to give constants that points would settle too.
const CONSTANTS: [&str; 7] = [
    "torque_constant",
    "voltage_constant",
    "speed_constant",
    "resistance",
    "stall_current",
    "no_load_current",
    "loss_torque",
];

/// The constants, winding warm where its temperature is given.
pub(super) fn constants(values: &Values, faults: &mut Vec<Fault>) -> Option<DcConstants> {
    let before = faults.len();
    let cold = match values.get("point") {
        Some(FieldValue::Points(_)) => from_points(values, faults),
        _ => from_constants(values, faults),
    };
    let factor = warming(values, faults);
    let cold = cold.filter(|_| faults.len() == before)?;
    Some(DcConstants { resistance: cold.resistance * factor, ..cold })
}

/// Factor on the resistance as given, for the temperature of the winding.
pub(super) fn warming(values: &Values, faults: &mut Vec<Fault>) -> f64 {
    match (values.si("resistance_at"), values.si("winding_temperature")) {
        (Some(given), Some(running)) => copper_resistance(1.0, given, running),
        (None, None) => 1.0,
        (None, Some(_)) => {
            let why = "the temperature at which the resistance (or the points) were measured";
            faults.push(missing(&[&["resistance_at"]], why));
            1.0
        }
        (Some(_), None) => {
            let why = "the temperature the winding has while it runs: cold copper overstates torque";
            faults.push(missing(&[&["winding_temperature"]], why));
            1.0
        }
    }
}

fn from_points(values: &Values, faults: &mut Vec<Fault>) -> Option<DcConstants> {
    let Some(FieldValue::Points(table)) = values.get("point") else { return None };
    let beside: Vec<&'static str> = CONSTANTS.into_iter().filter(|name| values.get(name).is_some()).collect();
    if !beside.is_empty() {
        let fields = [&["point"][..], &beside].concat();
        let how = "two points settle every constant; keep the points or the constants";
        faults.push(contradiction(&fields, how, &[]));
    }
    let column = |name| table.column(name).unwrap_or_default();
    let (speeds, torques, currents) = (column("speed"), column("torque"), column("current"));
    let measured_at = table.at.iter().find(|(kind, _)| *kind == "voltage").map(|(_, si)| *si);
    let voltage = match (values.si("measured_voltage"), measured_at) {
        (Some(a), Some(b)) if differ(a, b, 1e-9) => {
            let how = "the points were taken at {0} by the one and at {1} by the other";
            faults.push(contradiction(
                &["measured_voltage", "point"],
                how,
                &[(a, "voltage"), (b, "voltage")],
            ));
            None
        }
        (a, b) => a.or(b),
    };
    if voltage.is_none() {
        faults.push(missing(
            &[&["measured_voltage"]],
            "the voltage at the motor's terminals while the points were taken",
        ));
    }
    if speeds.len() != 2 || torques.len() != 2 || currents.len() != 2 {
        let why = "two points settle a dc motor, each a torque at a speed and its current";
        faults.push(bad_value("point", why, &[]));
        return None;
    }
    let point = |i: usize| DcPoint { speed: speeds[i], torque: torques[i], current: currents[i] };
    let found = DcConstants::from_points(point(0), point(1), voltage?);
    if found.is_none() {
        let why = "no dc motor runs through these points: with more torque the current rises, the speed falls, and the \
                   line of current over torque begins with a current at no torque";
        faults.push(bad_value("point", why, &[]));
    }
    found
}

fn from_constants(values: &Values, faults: &mut Vec<Fault>) -> Option<DcConstants> {
    let (k_t, k_e) = flux(values, faults)?;
    let resistance = resistance(values, faults);
    let loss_torque = match (values.si("no_load_current"), values.si("loss_torque")) {
        (Some(current), Some(torque)) if differ(current * k_t, torque, 0.05) => {
            faults.push(contradiction(
                &["no_load_current", "loss_torque"],
                "the no-load current makes a loss torque of {0}, not {1}",
                &[(current * k_t, "torque"), (torque, "torque")],
            ));
            None
        }
        (_, Some(torque)) => Some(torque),
        (Some(current), None) => Some(current * k_t),
        (None, None) => {
            let why = "what it takes to turn without load; a loss torque of 0 N·m, if you will, says so";
            faults.push(missing(&[&["no_load_current"], &["loss_torque"]], why));
            None
        }
    };
    Some(DcConstants { k_t, k_e, resistance: resistance?, loss_torque: loss_torque? })
}

/// Torque constant and voltage constant; one stands for both.
fn flux(values: &Values, faults: &mut Vec<Fault>) -> Option<(f64, f64)> {
    let of_speed = values.si("speed_constant").map(|constant| 1.0 / constant);
    let k_e = match (values.si("voltage_constant"), of_speed) {
        (Some(a), Some(b)) if differ(a, b, 0.02) => {
            faults.push(contradiction(
                &["voltage_constant", "speed_constant"],
                "one is the inverse of the other: the speed constant makes a voltage constant of {0}, not {1}",
                &[(b, "voltage_constant"), (a, "voltage_constant")],
            ));
            return None;
        }
        (a, b) => a.or(b),
    };
    match (values.si("torque_constant"), k_e) {
        (Some(k_t), Some(k_e)) => agree(values, k_t, k_e, faults).then_some((k_t, k_e)),
        (Some(k), None) | (None, Some(k)) => Some((k, k)),
        (None, None) => {
            let choices: [&[&'static str]; 4] = [
                &["point", "measured_voltage"],
                &["torque_constant"],
                &["voltage_constant"],
                &["speed_constant"],
            ];
            let why = "two measured points, or one of the constants: N·m/A equals V·s/rad, and rpm/V is its inverse";
            faults.push(missing(&choices, why));
            None
        }
    }
}

/// Whether torque and voltage constant can belong to one motor.
fn agree(values: &Values, k_t: f64, k_e: f64, faults: &mut Vec<Fault>) -> bool {
    let ratio = k_t / k_e;
    let apart = f64::max(ratio, 1.0 / ratio);
    if apart <= 1.25 {
        return true;
    }
    let per_phase = (apart - 3.0_f64.sqrt()).abs() < 0.1;
    let template = if per_phase {
        "a torque constant of {0} needs a voltage constant of the same number of V·s/rad, not {1}: they are a factor of \
         {2} apart, close to √3, so one is per phase and the other per line"
    } else {
        "a torque constant of {0} needs a voltage constant of the same number of V·s/rad, up to some percent of losses, \
         not {1}: they are a factor of {2} apart"
    };
    let other = if values.get("voltage_constant").is_some() { "voltage_constant" } else { "speed_constant" };
    let quantities = [(k_t, "torque_constant"), (k_e, "voltage_constant"), (apart, "number")];
    faults.push(contradiction(&["torque_constant", other], template, &quantities));
    false
}

fn resistance(values: &Values, faults: &mut Vec<Fault>) -> Option<f64> {
    let stall = match (values.si("stall_current"), values.si("measured_voltage")) {
        (Some(current), Some(voltage)) => Some(voltage / current),
        (Some(_), None) => {
            faults.push(missing(&[&["measured_voltage"]], "the voltage at which the stall current flows"));
            return None;
        }
        (None, _) => None,
    };
    match (values.si("resistance"), stall) {
        (Some(given), Some(stall)) if differ(given, stall, 0.05) => {
            faults.push(contradiction(
                &["resistance", "stall_current", "measured_voltage"],
                "voltage over stall current is {0}, not {1}",
                &[(stall, "resistance"), (given, "resistance")],
            ));
            None
        }
        (Some(given), _) => Some(given),
        (None, Some(stall)) => Some(stall),
        (None, None) => {
            let why = "the resistance of the winding with brushes, warm, or the current at standstill";
            faults.push(missing(&[&["resistance"], &["stall_current", "measured_voltage"]], why));
            None
        }
    }
}

#[cfg(test)]
mod tests {
    use super::constants;
    use crate::fault::{Fault, FaultKind};
    use crate::laws::dc_machine::DcConstants;
    use crate::laws::testing::close;
    use crate::values::{FieldValue, Table, Values};

    fn values(fields: &[(&'static str, f64)]) -> Values {
        fields.iter().fold(Values::default(), |values, (name, si)| values.with(name, FieldValue::Si(*si)))
    }

    fn read(values: &Values) -> Result<DcConstants, Vec<Fault>> {
        let mut faults = Vec::new();
        constants(values, &mut faults).ok_or(faults)
    }

    fn how(values: &Values) -> (&'static str, Vec<(f64, &'static str)>) {
        match read(values).unwrap_err().remove(0).kind {
            FaultKind::Contradiction { how, .. } => (how.template, how.quantities),
            other => panic!("{other:?}"),
        }
    }

    #[test]
    fn one_constant_stands_for_both() {
        let fields = [("speed_constant", 10.0), ("resistance", 0.5), ("no_load_current", 0.4)];
        let dc = read(&values(&fields)).unwrap();
        assert_eq!((dc.k_t, dc.k_e), (0.1, 0.1));
        close(dc.loss_torque, 0.04, 1e-14);
        let stall = [
            ("torque_constant", 0.1),
            ("stall_current", 48.0),
            ("measured_voltage", 24.0),
            ("loss_torque", 0.0),
        ];
        assert_eq!(read(&values(&stall)).unwrap().resistance, 0.5);
    }

    #[test]
    fn per_phase_against_per_line() {
        let base = [("torque_constant", 0.1), ("resistance", 0.5), ("loss_torque", 0.0)];
        let near = [("voltage_constant", 0.11)];
        assert!(read(&values(&[&base[..], &near].concat())).is_ok());
        let (template, quantities) =
            how(&values(&[&base[..], &[("voltage_constant", 0.1 / 1.732)]].concat()));
        assert!(template.contains("√3"));
        close(quantities[2].0, 1.732, 1e-9);
        let (template, _) = how(&values(&[&base[..], &[("speed_constant", 95.5)]].concat()));
        assert!(!template.contains("√3"));
    }

    #[test]
    fn warm_copper() {
        let base = [("torque_constant", 0.1), ("resistance", 0.5), ("loss_torque", 0.0)];
        let warm = [("resistance_at", 293.15), ("winding_temperature", 373.15)];
        let dc = read(&values(&[&base[..], &warm].concat())).unwrap();
        close(dc.resistance, 0.5 * 335.0 / 255.0, 1e-14);
        for half in warm {
            assert!(read(&values(&[&base[..], &[half]].concat())).is_err());
        }
    }

    #[test]
    fn disagreements() {
        let base = [("torque_constant", 0.1), ("resistance", 0.5), ("loss_torque", 0.02)];
        how(&values(&[&base[..], &[("no_load_current", 0.5)]].concat()));
        how(&values(&[&base[..], &[("stall_current", 40.0), ("measured_voltage", 24.0)]].concat()));
        how(&values(&[&base[..], &[("voltage_constant", 0.1), ("speed_constant", 9.0)]].concat()));
    }

    #[test]
    fn points_settle_all() {
        let columns =
            vec![("speed", vec![298.0, 251.0]), ("torque", vec![1.2, 4.8]), ("current", vec![13.0, 44.7])];
        let table = Table { columns, at: Vec::new() };
        let points = Values::default().with("point", FieldValue::Points(table));
        let missing = read(&points).unwrap_err().remove(0).kind;
        assert!(matches!(missing, FaultKind::Missing { .. }));
        let points = points.with("measured_voltage", FieldValue::Si(36.0));
        close(read(&points).unwrap().k_t, 3.6 / 31.7, 1e-12);
        how(&points.with("resistance", FieldValue::Si(0.1)));
    }
}
