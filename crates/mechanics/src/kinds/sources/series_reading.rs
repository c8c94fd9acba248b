//! Reads flux and losses of a series machine from its fields.

use crate::fault::Fault;
use crate::kinds::reading::{bad_value, contradiction, missing};
use crate::laws::series_machine::{Knot, Magnet, induced_flux};
use crate::values::{FieldValue, Table, Values};

/// Flux and losses over the current.
pub(super) fn magnet(values: &Values, faults: &mut Vec<Fault>) -> Option<Magnet> {
    match (values.get("point"), values.si("series_constant")) {
        (Some(FieldValue::Points(_)), Some(_)) => {
            let how = "points settle the series constant; keep the points or the constant";
            faults.push(contradiction(&["point", "series_constant"], how, &[]));
            None
        }
        (Some(FieldValue::Points(table)), None) => from_points(values, table, faults),
        (_, Some(constant)) => {
            let loss = values.si("loss_torque");
            if loss.is_none() {
                let why = "what it takes to turn without load; a loss torque of 0 N·m, if you will, says so";
                faults.push(missing(&[&["loss_torque"]], why));
            }
            Some(Magnet::straight(constant, loss?))
        }
        _ => {
            let why = "a measured point with its voltage, or torque per square of the current";
            faults.push(missing(&[&["point", "measured_voltage"], &["series_constant", "loss_torque"]], why));
            None
        }
    }
}

fn from_points(values: &Values, table: &Table, faults: &mut Vec<Fault>) -> Option<Magnet> {
    let measured_at = table.at.iter().find(|(kind, _)| *kind == "voltage").map(|(_, si)| *si);
    let Some(voltage) = values.si("measured_voltage").or(measured_at) else {
        let why = "the voltage at the motor's terminals while the points were taken";
        faults.push(missing(&[&["measured_voltage"]], why));
        return None;
    };
    let resistance = values.si("resistance")?;
    let column = |name| table.column(name).unwrap_or_default();
    let each = column("speed").iter().zip(column("torque")).zip(column("current"));
    let mut knots = Vec::new();
    for ((speed, torque), current) in each {
        let flux = induced_flux(voltage, resistance, *current, *speed);
        let loss = flux * current - torque;
        // A loss torque of zero may come out a rounding error below it.
        let loss = if loss.abs() <= 1e-9 * torque.abs() { 0.0 } else { loss };
        if !(*current > 0.0 && *speed > 0.0 && flux > 0.0 && flux.is_finite()) {
            let why = "the resistance leaves no voltage to be induced at this point: current and speed lie above zero, and \
                       the drop of {0} in the winding below the voltage, {1}";
            faults.push(bad_value("point", why, &[(resistance * current, "voltage"), (voltage, "voltage")]));
            return None;
        }
        if loss < 0.0 {
            let why = "at this point {0} would come out where the voltage induced leaves {1} at most: are torque, \
                       voltage and resistance those of one measurement?";
            faults.push(bad_value("point", why, &[(*torque, "torque"), (flux * current, "torque")]));
            return None;
        }
        knots.push(Knot { current: *current, flux, loss });
    }
    if let Some(given) = values.si("loss_torque") {
        let how = "points settle the loss torque: keep the points, without the {0}";
        faults.push(contradiction(&["point", "loss_torque"], how, &[(given, "torque")]));
        return None;
    }
    let magnet = Magnet::new(knots);
    if magnet.is_none() {
        let why = "no series motor runs through these points: with more current torque and flux rise, and no current \
                   stands twice";
        faults.push(bad_value("point", why, &[]));
    }
    magnet
}
