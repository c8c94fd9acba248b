//! Operating points and their stability, as published.

use crate::drive::{Chain, StatedSpeed};
use crate::solution::{Outcome, Stability};
use crate::solve::solve_at;
use crate::solve::testing::{Rig, near, number, values};
use crate::values::FieldValue;

/// Speeds and stability of all points.
fn points(rig: &Rig) -> Vec<(f64, Stability)> {
    rig.solved().points().iter().map(|p| (p.source_speed, p.stability)).collect()
}

/// B. R. Gupta, V. Singhal, Fundamentals of Electric Drives and Control, 1st ed., 2013, ex. 3.11: 0.6 + 1.9 w
/// against 2.8 √w; here the lower speed is the stable one.
#[test]
fn two_crossings_the_lower_one_stable() {
    let rig = Rig::new().source(&[("c0", 0.6), ("c1", 1.9), ("top_speed", 2.0)]).load(&[("root", 2.8)]);
    let found = points(&rig);
    assert_eq!(found.len(), 2, "{found:?}");
    near(found[0].0, 0.067_726_360_476_9, 1e-9);
    near(found[1].0, 1.472_439_844_51, 1e-9);
    assert_eq!((found[0].1, found[1].1), (Stability::Stable, Stability::Unstable));
}

/// The same book, ex. 3.12: 15 - 0.5 w against 0.5 w².
#[test]
fn linear_motor_and_quadratic_load() {
    let rig = Rig::new().source(&[("c0", 15.0), ("c1", -0.5), ("top_speed", 30.0)]).load(&[("c2", 0.5)]);
    let found = points(&rig);
    assert_eq!(found.len(), 1, "{found:?}");
    near(found[0].0, 5.0, 1e-14);
    near(number(&rig.solved(), Some(0), "torque").unwrap(), 12.5, 1e-14);
    assert_eq!(found[0].1, Stability::Stable);
}

/// An induction machine by Kloss's formula, slip at breakdown 0.2, synchronous speed 100.
fn kloss(most: f64) -> Rig {
    Rig::new().source(&[
        ("most", most),
        ("breakdown_slip", 0.2),
        ("synchronous", 100.0),
        ("top_speed", 100.0),
    ])
}

/// S. K. Pillai, A First Course on Electrical Drives, 2nd ed., 1989, ex. 4.3.
#[test]
fn two_slips_against_constant_torque() {
    let found = points(&kloss(1.6625).load(&[("c0", 1.0)]));
    assert_eq!(found.len(), 2, "{found:?}");
    near(1.0 - found[0].0 / 100.0, 0.598_124_264_705, 1e-9);
    near(1.0 - found[1].0 / 100.0, 0.066_875_735_295_1, 1e-9);
    assert_eq!((found[0].1, found[1].1), (Stability::Unstable, Stability::Stable));
}

/// Closed form s = sk (k ∓ √(k² - 1)): a point that is not reached from rest.
#[test]
fn a_point_out_of_reach_from_rest() {
    let rig = kloss(2.5).load(&[("c0", 1.2)]);
    let found = points(&rig);
    near(1.0 - found[0].0 / 100.0, 0.782_195_203_324, 1e-10);
    near(1.0 - found[1].0 / 100.0, 0.051_138_130_009, 1e-10);
    let solution = rig.solved();
    assert_eq!(solution.outcome(), Some(Outcome::Stalls));
    assert_eq!(number(&solution, None, "speed"), Ok(0.0));
    near(number(&solution, Some(0), "torque").unwrap(), 0.961_538_461_538, 1e-10);
}

/// The load equals the breakdown torque: one marginal point, not two.
#[test]
fn a_tangent_is_one_marginal_point() {
    let found = points(&kloss(2.5).load(&[("c0", 2.5)]));
    assert_eq!(found.len(), 1, "{found:?}");
    near(1.0 - found[0].0 / 100.0, 0.2, 1e-6);
    assert_eq!(found[0].1, Stability::Marginal);
    // Just below and just above.
    assert_eq!(points(&kloss(2.5).load(&[("c0", 2.5 * (1.0 - 1e-9))])).len(), 2);
    assert_eq!(points(&kloss(2.5).load(&[("c0", 2.5 * (1.0 + 1e-9))])).len(), 0);
}

/// A fan load removes the second crossing (quartic solved beside).
#[test]
fn a_fan_load_leaves_one_crossing() {
    let rig = kloss(2.5).load(&[("c2", 1.2e-4)]);
    let found = points(&rig);
    assert_eq!(found.len(), 1, "{found:?}");
    near(1.0 - found[0].0 / 100.0, 0.045_996_520_473_3, 1e-9);
    near(number(&rig.solved(), Some(0), "torque").unwrap(), 1.092_147_166_74, 1e-9);
}

/// w² - w0 w + P w0 / T0 = 0: against constant power the higher crossing is the stable one.
#[test]
fn constant_power_on_a_straight_line() {
    let drive = |power| {
        let source = &[("c0", 10.0), ("c1", -0.04), ("top_speed", 250.0)];
        Rig::new().source(source).load(&[("power", power), ("from", 1.0)])
    };
    let found = points(&drive(500.0));
    near(found[0].0, 69.098_300_562_5, 1e-10);
    near(found[1].0, 180.901_699_437, 1e-10);
    assert_eq!((found[0].1, found[1].1), (Stability::Unstable, Stability::Stable));
    // At the most the source can give, the two merge; above, there is none.
    assert_eq!(points(&drive(625.0)).len(), 1);
    assert_eq!(points(&drive(626.0)).len(), 0);
}

/// G. K. Dubey, Fundamentals of Electrical Drives, 2nd ed., 2004, ex. 2.1: a load through a gear (0.1, 90 %) and a
/// weight of 1000 kg hauled at 1.5 m/s (85 %) by one motor at 1420 rpm; g = 9.81. Equivalent torque 117.53 N·m, and
/// inertia 0.4018 kg·m² by kinetic energy.
#[test]
fn two_loads_referred_to_one_motor() {
    let speed = 1420.0 * std::f64::consts::PI / 30.0;
    let winch = values(&[("ratio", speed / 1.5), ("forward", 0.85), ("backward", 0.85)])
        .with("linear", FieldValue::Flag(true));
    let weight =
        values(&[("weight", 1000.0 * 9.81), ("inertia", 1000.0)]).with("linear", FieldValue::Flag(true));
    let mut rig = Rig::new()
        .source(&[("c0", 200.0), ("top_speed", speed), ("inertia", 0.2), ("brake_effort", 0.0)])
        .stage(&[("ratio", 10.0), ("forward", 0.9), ("backward", 0.9)])
        .load(&[("c0", 10.0), ("inertia", 10.0)])
        .stage_of(winch)
        .load_of(weight);
    let part = |index| Chain::Part { index, count: 1 };
    let (gear, haul) = (Chain::Series(vec![part(1), part(2)]), Chain::Series(vec![part(3), part(4)]));
    rig.spec.chain = Chain::Series(vec![part(0), Chain::Joined(vec![gear, haul])]);
    let stated = StatedSpeed { part: Some(0), port: None, speed };
    let solution = solve_at(&rig.spec, stated).unwrap();
    near(number(&solution, Some(0), "torque").unwrap(), 117.530_248_854, 1e-10);
    let inertia: f64 = solution.drive.shafts.iter().map(|s| s.inertia * s.speed * s.speed).sum();
    near(inertia, 0.401_753_321_204, 1e-10);
}

/// The same book, ex. 10.2: four motors of 5000 N·m, gear 0.25 at 98 %, wheels of 0.54 m, a train of 100 t whose
/// rotating parts add a tenth, 25 N/t and a grade of 50 per mille (taken as rise over way), g = 9.81: 32.63 s to
/// 100 km/h. The book counts no loss on the accelerating force of the rotating parts, nor does this model of one mass.
#[test]
fn a_train_uphill() {
    let mass = 100e3;
    let wheel = values(&[("ratio", 1.0 / (0.25 * 0.54)), ("forward", 0.98), ("backward", 0.98)])
        .with("linear", FieldValue::Flag(true));
    let train = values(&[("weight", mass * 9.81 * 0.05), ("c0", 25.0 * 100.0), ("inertia", 1.1 * mass)])
        .with("linear", FieldValue::Flag(true));
    let end = 100.0 / 3.6;
    let mut rig = Rig::new()
        .source(&[("c0", 5000.0), ("top_speed", 300.0), ("inertia", 0.0), ("brake_effort", 0.0)])
        .stage_of(wheel)
        .load_of(train);
    rig.spec.chain = Chain::Series(vec![
        Chain::Part { index: 0, count: 4 },
        Chain::Part { index: 1, count: 1 },
        Chain::Part { index: 2, count: 1 },
    ]);
    rig.spec.settings.set_speed = Some(StatedSpeed { part: None, port: None, speed: end });
    rig.spec.settings.run_up_to = 1.0;
    let solution = rig.solved();
    near(number(&solution, None, "run_up_time").unwrap(), 32.632_557_403_6, 1e-6);
}
