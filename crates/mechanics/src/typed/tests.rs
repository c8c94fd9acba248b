//! The typed door against closed forms and published values.

use super::*;
use proptest::prelude::*;
use uom::si::angular_velocity::revolution_per_minute;

fn nm(value: f64) -> Torque {
    Torque::new::<newton_meter>(value)
}

fn rads(value: f64) -> AngularVelocity {
    AngularVelocity::new::<radian_per_second>(value)
}

/// Closed form T0 w0 / 4 at half speed, for two small motors.
#[test]
fn peak_power_at_half_speed() {
    for (n0, t0, peak) in [(600.0, 0.325, 5.105_088_062_08), (3750.0, 0.0722, 7.088_218_424_66)] {
        let line = StraightLine::new(nm(t0), AngularVelocity::new::<revolution_per_minute>(n0)).unwrap();
        let found = line.peak_power();
        assert!((found.power.get::<watt>() / peak - 1.0).abs() < 1e-10);
        assert!((found.speed.get::<revolution_per_minute>() / (0.5 * n0) - 1.0).abs() < 1e-12);
    }
}

#[test]
fn a_motor_and_a_fan() {
    // 15 - 0.5 w = 0.5 w² at 5 rad/s.
    let line = StraightLine::new(nm(15.0), rads(30.0)).unwrap();
    let fan = Quadratic::through(nm(0.5), rads(1.0)).unwrap();
    let point = line.against(fan);
    assert!((point.speed.get::<radian_per_second>() - 5.0).abs() < 1e-14);
    assert!((point.torque.get::<newton_meter>() - 12.5).abs() < 1e-13);
}

#[test]
fn nonsense_is_refused_with_its_name() {
    assert_eq!(StraightLine::new(nm(-1.0), rads(1.0)).unwrap_err().what, "the stall torque");
    assert_eq!(StraightLine::new(nm(1.0), rads(f64::NAN)).unwrap_err().what, "the no-load speed");
    assert!(Gear::new(Ratio::new::<ratio>(2.0), Ratio::new::<ratio>(85.0)).is_err());
    assert!(Gear::new(Ratio::new::<ratio>(0.0), Ratio::new::<ratio>(0.9)).is_err());
}

proptest! {
    #[test]
    fn many_at_once_are_the_same(drives in prop::collection::vec((0.1..1e3f64, 1.0..1e3f64, 1e-9..1e3f64), 0..40)) {
        let sources: Vec<_> = drives.iter().map(|d| StraightLine { stall: d.0, no_load: d.1 }).collect();
        let loads: Vec<_> = drives.iter().map(|d| Quadratic { coefficient: d.2 }).collect();
        let mut speeds = vec![rads(0.0); drives.len()];
        straight_lines_against_quadratics(&sources, &loads, &mut speeds);
        for ((source, load), speed) in sources.iter().zip(&loads).zip(&speeds) {
            prop_assert_eq!(source.against(*load).speed, *speed);
            let left = source.torque(*speed).get::<newton_meter>();
            let right = load.torque(*speed).get::<newton_meter>();
            prop_assert!((left - right).abs() <= 1e-12 * source.stall, "{} {}", left, right);
        }
    }

    #[test]
    fn a_gear_keeps_power_but_its_loss(i in 0.1..50.0f64, eta in 0.3..1.0f64, w in 1.0..300.0f64) {
        let fan = Quadratic::through(nm(3.0), rads(100.0)).unwrap();
        let gear = Gear::new(Ratio::new::<ratio>(i), Ratio::new::<ratio>(eta)).unwrap();
        let seen = gear.reflected(fan);
        let given = seen.torque(rads(i * w)).get::<newton_meter>() * i * w;
        let taken = fan.torque(rads(w)).get::<newton_meter>() * w;
        prop_assert!((given * eta / taken - 1.0).abs() < 1e-12);
    }
}
