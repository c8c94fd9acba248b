//! The dc motor on its supply, against hand values of an invented delivery tricycle.

use super::{build, given};
use crate::fault::FaultKind;
use crate::laws::road::RoadLoad;
use crate::laws::testing::{close, rpm};
use crate::laws::wheel::{radius_of, wheel_ratio};
use crate::model::{Braking, Feed, Model, Source, SourceState, SupplyData};
use crate::scalar::{Enclosure, Interval};
use crate::solution::Answer;
use crate::values::{FieldValue, Table, Values};
use proptest::prelude::*;

fn values() -> Values {
    let columns = vec![
        ("speed", vec![rpm(2850.0), rpm(2400.0)]),
        ("torque", vec![1.2, 4.8]),
        ("current", vec![13.0, 44.7]),
    ];
    Values::default()
        .with("supply", FieldValue::Part(0))
        .with("point", FieldValue::Points(Table { columns, at: Vec::new() }))
        .with("measured_voltage", FieldValue::Si(36.0))
        .with("current_limit", FieldValue::Si(45.0))
        .with("braking", FieldValue::Word("as_generator"))
}

fn motor(values: &Values) -> Box<dyn Source> {
    let Ok(Model::Source(motor)) = build(values) else { panic!("no motor") };
    motor
}

fn pack(open_circuit: f64, resistance: f64, accepts_return: Option<bool>) -> Feed {
    let supply = SupplyData {
        voltage: Some(open_circuit),
        resistance: Some(resistance),
        current_limit: Some(30.0),
        accepts_return,
        ..SupplyData::default()
    };
    Feed { supply: Some(supply), machines: 1.0, ambient: None, altitude: None }
}

/// What is left to accelerate at the motor: gearbox of this reduction at 93 %, wheel of 1.52 m, tricycle of 240 kg.
fn net(feed: &Feed, reduction: f64, grade: f64, km_h: f64) -> (f64, f64) {
    let road = RoadLoad {
        mass: 240.0,
        grade,
        rolling_resistance: 0.008,
        air_density: 1.20,
        drag_area: 0.9,
        headwind: 0.0,
    };
    let wheel = wheel_ratio(radius_of(1.52));
    let v = km_h / 3.6;
    let force = road.grade_force() + road.rolling_force() + road.air_force(v);
    let needed = force / wheel / reduction / 0.93;
    let speed = v * wheel * reduction;
    let character = motor(&values()).characteristic(feed).unwrap();
    (character.drive.at(speed) - needed, speed)
}

#[test]
fn hill_by_hand() {
    // By hand: 15.3 km/h, 29.2 A, 33.8 V; with an old pack 12.9 km/h.
    let feed = pack(37.0, 0.110, Some(true));
    assert!(net(&feed, 14.5, 0.06, 15.25).0 > 0.0 && net(&feed, 14.5, 0.06, 15.35).0 < 0.0);
    let (_, speed) = net(&feed, 14.5, 0.06, 15.3);
    let motor = motor(&values());
    let torque = motor.characteristic(&feed).unwrap().drive.at(speed);
    let drawn = motor.draw(&feed).unwrap().at(speed, torque);
    close(drawn.supply_current.unwrap(), 29.2, 0.01);
    close(drawn.voltage.unwrap(), 33.8, 0.003);
    let old = pack(35.0, 0.200, Some(true));
    assert!(net(&old, 14.5, 0.06, 12.85).0 > 0.0 && net(&old, 14.5, 0.06, 12.95).0 < 0.0);
}

#[test]
fn cruising_draws_what_it_needs() {
    // By hand: at 15 km/h on the level in second gear the pack gives 5.0 A.
    let feed = pack(37.0, 0.110, Some(true));
    let (spare, speed) = net(&feed, 8.2, 0.0, 15.0);
    let motor = motor(&values());
    let needed = motor.characteristic(&feed).unwrap().drive.at(speed) - spare;
    let drawn = motor.draw(&feed).unwrap().at(speed, needed);
    close(drawn.supply_current.unwrap(), 5.0, 0.01);
}

#[test]
fn braking_is_asked_of_motor_and_pack() {
    let braking =
        |values: &Values, accepts| motor(values).characteristic(&pack(37.0, 0.11, accepts)).unwrap().braking;
    assert!(matches!(braking(&values(), Some(true)), Braking::Can(_)));
    assert!(matches!(braking(&values(), Some(false)), Braking::Cannot));
    assert!(matches!(braking(&values(), None), Braking::Unknown("accepts_return")));
    let resistor = values().with("braking", FieldValue::Word("into_resistor"));
    assert!(matches!(braking(&resistor, None), Braking::Can(_)));
    let none = values().with("braking", FieldValue::Word("none"));
    assert!(matches!(braking(&none, Some(true)), Braking::Cannot));
}

#[test]
fn two_machines_pull_the_pack_down_together() {
    let mut feed = pack(37.0, 0.110, Some(true));
    let alone = motor(&values()).characteristic(&feed).unwrap().drive.at(rpm(2600.0));
    feed.machines = 2.0;
    let shared = motor(&values()).characteristic(&feed).unwrap().drive.at(rpm(2600.0));
    assert!(shared < alone);
}

#[test]
fn supplies_that_do_not_fit() {
    let mut feed = pack(37.0, 0.110, Some(true));
    feed.supply = Some(SupplyData { frequency: Some(50.0), ..feed.supply.unwrap() });
    let kind = motor(&values()).characteristic(&feed).err().unwrap().remove(0).kind;
    assert!(matches!(kind, FaultKind::Value { field: "supply", .. }));
    feed.supply = None;
    let kind = motor(&values()).characteristic(&feed).err().unwrap().remove(0).kind;
    assert!(matches!(kind, FaultKind::Missing { .. }));
}

#[test]
fn results_of_its_own() {
    let names: Vec<&str> = given(&values()).iter().map(|(name, _)| *name).collect();
    assert_eq!(names, ["torque_constant", "voltage_constant", "resistance", "loss_torque"]);
    let feed = pack(37.0, 0.110, Some(true));
    let state = SourceState { speed: 100.0, effort: 1.0, feed: &feed };
    let motor = motor(&values());
    let Some(Answer::Quantity { si, .. }) = motor.answer("stall_torque", &state) else { panic!("a torque") };
    close(si, motor.characteristic(&feed).unwrap().drive.at(0.0), 1e-14);
    assert!(motor.answer("flow", &state).is_none());
    assert_eq!(motor.limited_by(&feed, 0.0), "current");
    assert_eq!(motor.limited_by(&feed, rpm(2700.0)), "voltage");
    let mut seen: Vec<&str> = (0..60).map(|i| motor.limited_by(&feed, f64::from(i) * 5.0)).collect();
    seen.dedup();
    assert_eq!(seen, ["current", "supply", "voltage"]);
}

#[test]
fn rated_current_against_rated_torque() {
    let both = values().with("rated_current", FieldValue::Si(20.0));
    assert!(build(&both.clone().with("rated_torque", FieldValue::Si(2.0))).is_ok());
    assert!(build(&both.with("rated_torque", FieldValue::Si(4.0))).is_err());
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(200))]
    #[test]
    fn draw_bounds_hold(lo in 0.0..300.0f64, width in 0.0..20.0f64, t in 0.0..1.0f64, torque in 0.0..4.0f64) {
        let draw = motor(&values()).draw(&pack(37.0, 0.11, Some(true))).unwrap();
        let at = draw.at(lo + t * width, torque);
        let effort = Enclosure { value: Interval::point(torque), slope: Interval::ZERO };
        let over = draw.over(Enclosure::variable(lo, lo + width), effort);
        prop_assert!(over.supply_current.unwrap().value.holds(at.supply_current.unwrap()));
        prop_assert!(over.voltage.unwrap().value.holds(at.voltage.unwrap()));
        prop_assert!(over.input_power.unwrap().value.holds(at.input_power.unwrap()));
    }
}
