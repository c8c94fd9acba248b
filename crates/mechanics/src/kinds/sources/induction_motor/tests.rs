//! The induction motor: plate, catalogue, mains.

use super::{build, given};
use crate::fault::{Fault, FaultKind};
use crate::laws::testing::{close, rpm};
use crate::model::{Braking, Feed, Model, Source, SourceState, SupplyData};
use crate::solution::Answer;
use crate::values::{
    FieldValue::{OfRated, Si},
    Values,
};

/// An invented motor of 4 kW.
fn values() -> Values {
    Values::default()
        .with("rated_power", Si(4000.0))
        .with("rated_speed", Si(rpm(1440.0)))
        .with("rated_voltage", Si(400.0))
        .with("rated_frequency", Si(50.0))
        .with("poles", Si(4.0))
        .with("inertia", Si(0.019))
        .with("locked_rotor_torque", OfRated(2.3))
        .with("pull_up_torque", OfRated(1.9))
        .with("breakdown_torque", OfRated(2.9))
}

fn motor(values: &Values) -> Box<dyn Source> {
    let Ok(Model::Source(motor)) = build(values) else { panic!("no motor") };
    motor
}

fn mains(voltage: f64, frequency: f64, accepts_return: Option<bool>) -> Feed {
    let supply = SupplyData {
        voltage: Some(voltage),
        frequency: Some(frequency),
        accepts_return,
        ..SupplyData::default()
    };
    Feed { supply: Some(supply), machines: 1.0, ambient: None, altitude: None }
}

fn faults(values: &Values) -> Vec<Fault> {
    build(values).unwrap_err()
}

fn contradicts(values: &Values) -> Vec<(f64, &'static str)> {
    match &faults(values)[..] {
        [Fault { kind: FaultKind::Contradiction { how, .. }, .. }] => how.quantities.clone(),
        other => panic!("one contradiction: {other:?}"),
    }
}

#[test]
fn hoist_by_hand() {
    // By hand: up 23.55 N·m at 1447.1 rpm, down 18.81 N·m braking at 1541.9 rpm.
    let character = motor(&values()).characteristic(&mains(400.0, 50.0, Some(true))).unwrap();
    close(character.drive.at(rpm(1447.1)), 23.55, 3e-3);
    close(character.drive.at(rpm(1541.9)), -18.81, 3e-3);
    assert!(matches!(&character.braking, Braking::Can(hold) if (hold.at(rpm(1541.9)) - 18.81).abs() < 0.06));
    assert!(!character.scaled && !character.follows_set_speed);
}

#[test]
fn low_voltage_goes_by_the_square() {
    let at = |voltage| motor(&values()).characteristic(&mains(voltage, 50.0, Some(true))).unwrap();
    let (full, low) = (at(400.0), at(360.0));
    for n in [0.0, 500.0, 1200.0, 1440.0, 1550.0] {
        close(low.drive.at(rpm(n)), 0.81 * full.drive.at(rpm(n)), 1e-12);
    }
    assert!(low.scaled);
}

#[test]
fn another_frequency_moves_the_field() {
    let motor = motor(&values());
    let character = motor.characteristic(&mains(480.0, 60.0, Some(true))).unwrap();
    close(character.top_speed, rpm(1800.0), 1e-12);
    // The same flux and the same slip speed give the same torque.
    close(character.drive.at(rpm(1740.0)), 4000.0 / rpm(1440.0), 1e-12);
    assert!(motor.characteristic(&mains(400.0, 10.0, None)).is_err());
    assert!(motor.characteristic(&Feed { supply: None, ..mains(0.0, 0.0, None) }).is_err());
}

#[test]
fn the_supply_says_whether_it_brakes() {
    let braking = |accepts| motor(&values()).characteristic(&mains(400.0, 50.0, accepts)).unwrap().braking;
    assert!(matches!(braking(Some(true)), Braking::Can(_)));
    assert!(matches!(braking(Some(false)), Braking::Cannot));
    assert!(matches!(braking(None), Braking::Unknown("accepts_return")));
}

#[test]
fn no_current_is_made_up() {
    let motor = motor(&values().with("rated_current", Si(8.3)));
    assert_eq!(motor.ratings(None).current, Some(8.3));
    assert!(motor.draw(&mains(400.0, 50.0, Some(true))).is_none());
}

#[test]
fn results_of_its_own() {
    assert_eq!(given(&values())[0].0, "rated_torque");
    close(given(&values())[0].1, 26.525_823_848_6, 1e-10);
    let (motor, feed) = (motor(&values()), mains(360.0, 50.0, Some(true)));
    let ask = |name| match motor.answer(name, &SourceState { speed: rpm(1440.0), effort: 20.0, feed: &feed })
    {
        Some(Answer::Quantity { si, .. }) => si,
        other => panic!("{name}: {other:?}"),
    };
    close(ask("slip"), 0.04, 1e-12);
    close(ask("locked_rotor_torque"), 0.81 * 2.3 * 26.525_823_848_6, 1e-10);
    close(ask("pull_up_torque"), 0.81 * 1.9 * 26.525_823_848_6, 1e-10);
    close(ask("synchronous_speed"), rpm(1500.0), 1e-12);
}

#[test]
fn power_speed_and_torque_have_to_agree() {
    assert!(build(&values().with("rated_torque", Si(26.5))).is_ok());
    let quantities = contradicts(&values().with("rated_torque", Si(28.5)));
    close(quantities[2].0, 26.525_823_848_6, 1e-10);
    close(quantities[3].0, 28.5, 1e-14);
}

#[test]
fn speeds_that_no_plate_has() {
    contradicts(&values().with("rated_speed", Si(rpm(1500.0))));
    contradicts(&values().with("rated_speed", Si(rpm(1520.0))));
    contradicts(&values().with("rated_speed", Si(rpm(970.0))));
    assert!(matches!(
        &faults(&values().with("poles", Si(5.0)))[..],
        [Fault { kind: FaultKind::Value { .. }, .. }]
    ));
}

#[test]
fn poles_follow_from_speed_and_frequency() {
    let mut without = Values::default();
    for (name, value) in values().iter().filter(|(name, _)| *name != "poles") {
        without.set(name, value.clone());
    }
    for (n, field) in [(2890.0, 3000.0), (1440.0, 1500.0), (940.0, 1000.0), (705.0, 750.0)] {
        let motor = motor(&without.clone().with("rated_speed", Si(rpm(n))));
        let character = motor.characteristic(&mains(400.0, 50.0, None)).unwrap();
        close(character.top_speed, rpm(field), 1e-12);
    }
    contradicts(&without.with("rated_speed", Si(rpm(3100.0))));
}

#[test]
fn ratios_that_no_curve_has() {
    contradicts(&values().with("breakdown_torque", OfRated(0.9)));
    contradicts(&values().with("locked_rotor_torque", OfRated(3.2)));
    contradicts(&values().with("pull_up_torque", OfRated(2.5)));
    contradicts(&values().with("pull_up_speed_ratio", Si(0.9)));
    contradicts(&values().with("rated_speed", Si(rpm(1190.0))).with("breakdown_torque", OfRated(2.9)));
    let mut dip = values();
    dip.set("breakdown_torque", OfRated(2.9));
    assert!(build(&dip.with("locked_rotor_torque", Si(61.0))).is_ok());
}
