//! Closed forms of the series machine, and bounds that hold.

use super::{Knot, Magnet, SeriesEnvelope};
use crate::curve::Curve;
use crate::laws::testing::{close, encloses};
use proptest::prelude::*;

fn plain() -> SeriesEnvelope {
    SeriesEnvelope {
        magnet: Magnet::straight(0.02, 0.0),
        resistance: 0.5,
        open_circuit: 220.0,
        supply_resistance: 0.0,
        supply_limit: None,
        motor_limit: None,
    }
}

fn saturated() -> SeriesEnvelope {
    let knot = |current, flux, loss| Knot { current, flux, loss };
    let magnet = Magnet::new(vec![knot(20.0, 0.4, 0.5), knot(40.0, 0.7, 0.6), knot(80.0, 0.9, 0.9)]).unwrap();
    SeriesEnvelope { magnet, ..plain() }
}

#[test]
fn without_saturation() {
    // Closed form: half the speed constant's resistance: at k·w = R the power is greatest, U²/(4 R).
    let motor = plain();
    close(motor.at(0.0), 0.02 * 440.0 * 440.0, 1e-13);
    close(motor.at(25.0) * 25.0, 220.0 * 220.0 / 2.0, 1e-13);
    assert_eq!(motor.no_load_speed(), None);
    close(motor.magnet.current(0.02 * 900.0), 30.0, 1e-13);
}

#[test]
fn voltage_and_torque_balance_on_every_piece() {
    let motor = saturated();
    for speed in [0.0, 50.0, 150.0, 220.0, 300.0, 450.0, 900.0] {
        let current = motor.current(speed);
        let (flux, loss) = motor.magnet.at(current);
        close(0.5 * current + flux * speed, 220.0, 1e-12);
        close(motor.at(speed), flux * current - loss, 1e-12);
        close(motor.magnet.current(motor.at(speed)), current, 1e-9);
    }
}

#[test]
fn limits() {
    let bare = SeriesEnvelope { supply_limit: Some(60.0), ..saturated() };
    assert_eq!(bare.current(0.0), 60.0);
    let limited = SeriesEnvelope { motor_limit: Some(90.0), ..bare };
    assert_eq!(limited.current(0.0), 90.0);
    let power = limited.power_limit().unwrap();
    close(power, 220.0 * 60.0, 1e-14);
    // A speed at which the supply's power bounds, not its voltage.
    let speed = 0.7 * limited.speed(60.0);
    let current = limited.current(speed);
    let (flux, _) = limited.magnet.at(current);
    close((0.5 * current + flux * speed) * current, power, 1e-12);
}

#[test]
fn points_that_make_no_machine() {
    let knot = |current, flux| Knot { current, flux, loss: 0.0 };
    assert!(Magnet::new(vec![]).is_none());
    assert!(Magnet::new(vec![knot(20.0, 0.5), knot(40.0, 0.4)]).is_none());
    assert!(Magnet::new(vec![knot(20.0, 0.5), knot(20.0, 0.6)]).is_none());
    assert!(Magnet::new(vec![knot(0.0, 0.5)]).is_none());
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(200))]
    #[test]
    fn bounds_hold(
        supply_limit in proptest::option::of(5.0..150.0f64),
        motor_limit in proptest::option::of(5.0..150.0f64),
        lo in -50.0..700.0f64, width in 0.0..100.0f64, t in 0.0..1.0f64,
    ) {
        encloses(&SeriesEnvelope { supply_limit, motor_limit, ..saturated() }, lo, width, t);
    }

    #[test]
    fn torque_falls_with_speed(a in 0.0..900.0f64, b in 0.0..900.0f64) {
        let (slow, fast) = (f64::min(a, b), f64::max(a, b));
        prop_assert!(saturated().at(slow) >= saturated().at(fast) - 1e-12);
    }
}
