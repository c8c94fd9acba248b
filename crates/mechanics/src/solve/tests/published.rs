//! Operating points and their stability, as published.

use crate::solution::{Outcome, Stability};
use crate::solve::testing::{Rig, near, number};

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
