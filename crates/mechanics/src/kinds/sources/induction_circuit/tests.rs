//! Published machines, starts and inverters.

use super::build;
use crate::fault::Fault;
use crate::laws::testing::{close, rpm};
use crate::model::{Feed, Model, Source, SourceState, SupplyData};
use crate::solution::Answer;
use crate::values::{FieldValue, Values};

/// A. E. Fitzgerald, C. Kingsley, S. D. Umans, Electric Machinery, 6th ed., 2003, Ex. 6.2.
fn values() -> Values {
    let fields = [
        ("poles", 6.0),
        ("rated_frequency", 60.0),
        ("stator_resistance", 0.294),
        ("stator_reactance", 0.503),
        ("rotor_resistance", 0.144),
        ("rotor_reactance", 0.209),
        ("magnetizing_reactance", 13.25),
        ("rotational_loss", 403.0),
    ];
    let values =
        fields.iter().fold(Values::default(), |values, (name, si)| values.with(name, FieldValue::Si(*si)));
    values.with("connection", FieldValue::Word("star"))
}

fn machine(values: &Values) -> Box<dyn Source> {
    let Ok(Model::Source(machine)) = build(values) else { panic!("no machine") };
    machine
}

fn feed(voltage: f64, frequency: f64) -> Feed {
    let supply = SupplyData {
        voltage: Some(voltage),
        frequency: Some(frequency),
        accepts_return: Some(true),
        ..SupplyData::default()
    };
    Feed { supply: Some(supply), machines: 1.0, ambient: None, altitude: None }
}

fn asked(machine: &dyn Source, name: &str, feed: &Feed, speed: f64) -> f64 {
    let effort = machine.characteristic(feed).unwrap().drive.at(speed);
    match machine.answer(name, &SourceState { speed, effort, feed }) {
        Some(Answer::Quantity { si, .. }) => si,
        other => panic!("{other:?}"),
    }
}

#[test]
fn published_point() {
    let machine = machine(&values());
    let (feed, speed) = (feed(220.0, 60.0), rpm(1176.0));
    close(asked(&*machine, "power_factor", &feed, speed), 0.845_565_190_614, 1e-9);
    close(asked(&*machine, "line_current", &feed, speed), 18.778_193_872_2, 1e-9);
    close(asked(&*machine, "rotor_frequency", &feed, speed), 1.2, 1e-9);
    let effort = machine.characteristic(&feed).unwrap().drive.at(speed);
    let drawn = machine.draw(&feed).unwrap().at(speed, effort);
    close(drawn.current.unwrap(), 18.778_193_872_2, 1e-9);
    close(effort * speed / drawn.input_power.unwrap(), 0.863_017_504_466, 1e-9);
    close(drawn.voltage.unwrap(), 220.0, 1e-9);
}

#[test]
fn star_instead_of_delta_is_a_third() {
    let delta = values().with("connection", FieldValue::Word("delta"));
    let star_start = delta
        .clone()
        .with("starting", FieldValue::Word("star_delta"))
        .with("changeover_speed", FieldValue::Si(rpm(900.0)));
    let feed = feed(220.0, 60.0);
    let torque = |values: &Values, speed| machine(values).characteristic(&feed).unwrap().drive.at(speed);
    close(torque(&star_start, 0.0) * 3.0, torque(&delta, 0.0), 1e-12);
    close(torque(&star_start, rpm(1000.0)), torque(&delta, rpm(1000.0)), 1e-12);
    let current = |values: &Values| asked(&*machine(values), "locked_rotor_current", &feed, 0.0);
    close(current(&star_start) * 3.0, current(&delta), 1e-12);
}

#[test]
fn an_inverter_keeps_the_flux_and_weakens_it_above() {
    let at = |frequency: f64| {
        let values = values()
            .with("control", FieldValue::Word("inverter"))
            .with("rated_voltage", FieldValue::Si(220.0))
            .with("output_frequency", FieldValue::Si(frequency));
        asked(&*machine(&values), "breakdown_torque", &feed(220.0, 50.0), 0.0)
    };
    let rated = at(60.0);
    // The stator's resistance takes its part of the lower voltage.
    assert!(at(30.0) < rated && at(30.0) > 0.6 * rated);
    // Closed form with the stator's resistance small: by the square of the frequency.
    let weak = at(120.0) / rated;
    assert!(0.25 < weak && weak < 0.35, "{weak}");
}

#[test]
fn fields_that_do_not_fit() {
    let bad = |values: Values| -> Vec<Fault> { build(&values).err().unwrap_or_default() };
    assert!(!bad(values().with("poles", FieldValue::Si(5.0))).is_empty());
    let star = values().with("starting", FieldValue::Word("star_delta"));
    assert!(!bad(star.clone()).is_empty());
    assert!(!bad(star.with("changeover_speed", FieldValue::Si(90.0))).is_empty());
    assert!(!bad(values().with("output_frequency", FieldValue::Si(30.0))).is_empty());
    assert!(!bad(values().with("control", FieldValue::Word("inverter"))).is_empty());
    let late = values()
        .with("connection", FieldValue::Word("delta"))
        .with("starting", FieldValue::Word("star_delta"))
        .with("changeover_speed", FieldValue::Si(rpm(1300.0)));
    assert!(machine(&late).characteristic(&feed(220.0, 60.0)).is_err());
}
