//! Run-up and stop against closed forms.

use crate::solve::testing::{Rig, near, number, values};
use crate::values::FieldValue;

fn line(inertia: f64) -> Rig {
    Rig::new().source(&[("c0", 10.0), ("c1", -0.04), ("top_speed", 250.0), ("inertia", inertia)])
}

/// First-order: tau = J / (k + b), t95 = tau ln 20.
#[test]
fn viscous_load() {
    let solution = line(0.05).load(&[("c1", 0.02), ("inertia", 0.0)]).solved();
    near(number(&solution, None, "speed").unwrap(), 166.666_666_667, 1e-11);
    near(number(&solution, None, "run_up_time").unwrap(), 2.496_443_561_29, 1e-9);
    // x = w_end (t - tau (1 - e^(-t/tau)))
    let way = 166.666_666_666_667 * (2.496_443_561_292_3 - 0.833_333_333_333_333 * 0.95);
    near(number(&solution, None, "run_up_distance").unwrap(), way, 1e-9);
}

/// Riccati: fan load.
#[test]
fn fan_load() {
    let mut rig = line(0.05).load(&[("c2", 1e-4), ("inertia", 0.0)]);
    rig.spec.settings.run_up_to = 0.99;
    let solution = rig.solved();
    near(number(&solution, None, "speed").unwrap(), 174.165_738_677, 1e-11);
    near(number(&solution, Some(0), "torque").unwrap(), 3.033_370_452_9, 1e-9);
    near(number(&solution, Some(0), "power").unwrap(), 528.309_205_612, 1e-9);
    near(number(&solution, None, "run_up_time").unwrap(), 3.252_414_315_39, 1e-9);
    near(number(&solution, Some(0), "peak_power").unwrap(), 625.0, 1e-12);
    near(number(&solution, Some(0), "peak_power_speed").unwrap(), 125.0, 1e-12);
}

/// R. S. Khurmi, J. K. Gupta, Theory of Machines, 14th ed., 2009, ex. 3.13 (equivalent mass (I_A + G² I_B / η) / r²,
/// g = 9.81): a falling mass turns a drum and, through gears, a second wheel; efficiency slows it.
#[test]
fn efficiency_acts_on_accelerating_torque() {
    for (efficiency, expected) in [(1.0, 0.230_924_149_956), (0.9, 0.215_867_970_66)] {
        // The weight as the source: 75 kg on 0.3 m, with the inertia of mass and drum; a viscous load far too weak
        // to matter ends the run.
        let source = &[
            ("c0", 75.0 * 9.81 * 0.3),
            ("inertia", 100.0 + 75.0 * 0.09),
            ("top_speed", 1.0),
            ("brake_effort", 0.0),
        ];
        let rig = Rig::new()
            .source(source)
            .stage(&[("ratio", 1.0 / 6.0), ("forward", efficiency), ("backward", efficiency)])
            .load(&[("c1", 1e-3), ("inertia", 5.0)]);
        let mut rig = rig;
        rig.spec.settings.run_up_to = 1e-9;
        let solution = rig.solved();
        let (time, speed) =
            (number(&solution, None, "run_up_time").unwrap(), number(&solution, None, "speed").unwrap());
        let acceleration = 1e-9 * speed / time / 6.0 * 0.3;
        near(acceleration, expected, 1e-6);
    }
}

/// Constant torques: t = J w / ΔT; then a brake that bites at once.
#[test]
fn constant_torques_and_a_brake() {
    let source = values(&[("c0", 12.0), ("top_speed", 60.0), ("inertia", 0.4), ("brake_effort", 100.0)])
        .with("braking", FieldValue::Word("as_generator"));
    let mut rig = Rig::new()
        .source_of(source)
        .stage(&[("brake", 20.0), ("apply_time", 0.0)])
        .load(&[("c0", 2.0), ("inertia", 0.6)]);
    rig.spec.settings.set_speed = Some(crate::drive::StatedSpeed { part: Some(0), port: None, speed: 50.0 });
    rig.spec.settings.run_up_to = 1.0;
    let solution = rig.solved();
    near(number(&solution, None, "speed").unwrap(), 50.0, 1e-12);
    near(number(&solution, Some(0), "torque").unwrap(), 2.0, 1e-9);
    near(number(&solution, None, "run_up_time").unwrap(), 5.0, 1e-9);
    near(number(&solution, None, "run_up_reserve").unwrap(), 6.0, 1e-9);
    near(number(&solution, None, "stop_time").unwrap(), 50.0 / 22.0, 1e-9);
    near(number(&solution, None, "stop_distance").unwrap(), 0.5 * 50.0 * 50.0 / 22.0, 1e-9);
}

/// A weight let down: until the brake bites it gains speed; lifted, it loses speed and may turn back.
#[test]
fn the_load_drives_until_the_brake_bites() {
    let rig = |apply: f64| {
        Rig::new()
            .source(&[("c0", 50.0), ("c1", -0.5), ("top_speed", 100.0), ("inertia", 1.0)])
            .stage(&[("brake", 30.0), ("apply_time", apply)])
            .load(&[("weight", 10.0), ("inertia", 1.0)])
    };
    // Lowering: w = 120, gains 10 / 2 · 0.2 = 1, then 20 / 2 slows it.
    let down = rig(0.2).reverse().solved();
    near(number(&down, None, "speed").unwrap(), 120.0, 1e-12);
    near(number(&down, None, "stop_peak_speed").unwrap(), 121.0, 1e-10);
    near(number(&down, None, "highest_speed").unwrap(), 121.0, 1e-10);
    near(number(&down, None, "stop_time").unwrap(), 0.2 + 12.1, 1e-9);
    near(number(&down, None, "stop_distance").unwrap(), 0.2 * 120.5 + 12.1 * 60.5, 1e-9);
    // Lifting at 80 with a brake 20 s late: at rest after 16 s, falls back for 4 s to 20, then stopped in 2 s.
    let up = rig(20.0).solved();
    near(number(&up, None, "speed").unwrap(), 80.0, 1e-12);
    near(number(&up, None, "stop_time").unwrap(), 22.0, 1e-8);
    near(number(&up, None, "stop_distance").unwrap(), 640.0 + 40.0 + 20.0, 1e-8);
}
