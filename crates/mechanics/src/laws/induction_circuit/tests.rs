//! Published circuits, and bounds that hold.

use super::{Circuit, CircuitCurve, Start};
use crate::curve::Curve;
use crate::laws::synchronous::synchronous_speed;
use crate::laws::testing::{close, encloses, rpm};
use proptest::prelude::*;

/// A. E. Fitzgerald, C. Kingsley, S. D. Umans, Electric Machinery, 6th ed., 2003, Ex. 6.2 and 6.3.
fn published() -> CircuitCurve {
    let circuit = Circuit {
        r1: 0.294,
        x1: 0.503,
        r2: 0.144,
        x2: 0.209,
        magnetizing: Some(13.25),
        core: None,
        voltage: 220.0 / 3.0_f64.sqrt(),
    };
    let field_speed = synchronous_speed(60.0, 6.0);
    CircuitCurve { rotational: Some((403.0, field_speed)), ..circuit.on(field_speed) }
}

#[test]
fn published_point() {
    let machine = published();
    let speed = rpm(1176.0);
    close(machine.phase_current(0.02), 18.778_193_872_2, 1e-9);
    let (active, reactive) = machine.power(0.02);
    close(active / active.hypot(reactive), 0.845_565_190_614, 1e-9);
    close(machine.at(speed), 42.400_198_288_5, 1e-9);
    close(machine.at(speed) * speed / active, 0.863_017_504_466, 1e-9);
}

#[test]
fn published_breakdown_and_start() {
    let machine = published();
    close(machine.rotor_current(0.03), 23.891_711_182_6, 1e-9);
    close(machine.air_gap_torque(0.03), 65.410_450_501_8, 1e-9);
    close(machine.breakdown_slip(), 0.191_811_171_861, 1e-9);
    close(machine.air_gap_torque(machine.breakdown_slip()), 174.564_308_677, 1e-9);
    close(machine.air_gap_torque(1.0), 77.622_659_557_5, 1e-9);
    close(machine.rotor_current(1.0), 150.264_820_868, 1e-9);
}

#[test]
fn published_thevenin_values() {
    // S. J. Chapman, Electric Machinery Fundamentals, 4th ed., Ex. 7-5 (from memory), exact circuit.
    let circuit = Circuit {
        r1: 0.641,
        x1: 1.106,
        r2: 0.332,
        x2: 0.464,
        magnetizing: Some(26.3),
        core: None,
        voltage: 460.0 / 3.0_f64.sqrt(),
    };
    let seen = circuit.thevenin();
    close(seen.voltage, 254.793_615_895, 1e-9);
    close(seen.resistance, 0.589_984_640_008, 1e-9);
    close(seen.reactance, 1.075_165_297_9, 1e-9);
    close(circuit.on(synchronous_speed(60.0, 4.0)).air_gap_torque(1.0), 106.562_104_547, 1e-9);
}

#[test]
fn power_is_conserved() {
    // Closed form: what enters is copper, core, air gap; the air gap carries torque times synchronous speed.
    let machine = published();
    let with_core = Circuit { core: Some(90.0), ..machine.circuit }.on(machine.field_speed);
    for slip in [-0.05_f64, 0.001, 0.02, 0.3, 1.0] {
        let (input, _) = with_core.power(slip);
        let stator = 3.0 * square(with_core.phase_current(slip)) * 0.294;
        let rotor = 3.0 * square(with_core.rotor_current(slip)) * 0.144;
        let gap = with_core.air_gap_torque(slip) * with_core.field_speed;
        close(rotor, gap * slip, 1e-9);
        let core = input - stator - gap;
        let voltage = rotor_voltage(&with_core, slip);
        close(core, 3.0 * voltage * voltage / 90.0, 1e-8);
    }
}

fn square(x: f64) -> f64 {
    x * x
}

fn rotor_voltage(machine: &CircuitCurve, slip: f64) -> f64 {
    machine.rotor_current(slip) * (0.144_f64 / slip).hypot(0.209)
}

#[test]
fn a_third_in_star() {
    let start = Start { torque: 1.0 / 3.0, current: 1.0 / 3.0, until: 100.0 };
    let delta = CircuitCurve { rotational: None, lines: 3.0_f64.sqrt(), ..published() };
    let star = CircuitCurve { start: Some(start), ..delta };
    close(star.at(50.0), delta.at(50.0) / 3.0, 1e-14);
    close(star.at(110.0), delta.at(110.0), 1e-14);
    let (full, reduced) = (delta.line_factor(50.0, 1.0), star.line_factor(50.0, 1.0 / 3.0));
    close(reduced, full / 3.0, 1e-14);
    assert_eq!(Curve::jumps(&star), [100.0]);
}

#[test]
fn a_current_limit_lowers_the_torque_by_its_square() {
    let limited = CircuitCurve { current_limit: Some(60.0), rotational: None, ..published() };
    let full = published();
    let current: f64 = full.phase_current(1.0);
    close(limited.at(0.0), full.air_gap_torque(1.0) * square(60.0 / current), 1e-12);
    close(limited.at(rpm(1190.0)), full.air_gap_torque(limited.slip(rpm(1190.0))), 1e-12);
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(200))]
    #[test]
    fn bounds_hold(
        limit in proptest::option::of(5.0..150.0f64),
        lo in -150.0..250.0f64, width in 0.0..60.0f64, t in 0.0..1.0f64,
    ) {
        encloses(&CircuitCurve { current_limit: limit, ..published() }, lo, width, t);
    }
}
