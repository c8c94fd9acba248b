//! Tests of a machine on its system.

use super::{NoFlow, Out, Point, System, Turbo};
use crate::curve::Curve;
use crate::laws::testing::{close, encloses};
use proptest::prelude::*;

fn points(list: &[(f64, f64, f64)]) -> Vec<Point> {
    list.iter().map(|(flow, head, power)| Point { flow: *flow, head: *head, power: *power }).collect()
}

fn pump() -> Vec<Point> {
    points(&[(0.0, 40.0, 4e3), (0.01, 38.0, 5e3), (0.02, 32.0, 6.5e3), (0.03, 22.0, 7.6e3)])
}

#[test]
fn published_fan_on_a_duct() {
    // Y. A. Çengel, J. M. Cimbala, Fluid Mechanics, 2nd ed., Ex. 14-1 (p. 767), points joined by straight lines: in
    // cfm and inches of water 646.446831782 and 0.823847647473.
    let fan = [(0.0, 0.90), (250.0, 0.95), (500.0, 0.90), (750.0, 0.77), (1000.0, 0.40), (1250.0, 0.0)];
    let fan = fan.iter().map(|(flow, head)| Point { flow: *flow, head: *head, power: 100.0 }).collect();
    let system = System { fixed: 0.0, friction: 1.971_429_646_58e-6 };
    let fan = Turbo::through(100.0, fan, system).unwrap();
    close(fan.law(Out::Flow, 1.0).at(100.0), 646.446_831_782, 1e-10);
    close(fan.law(Out::Head, 1.0).at(100.0), 0.823_847_647_473, 1e-10);
    close(fan.law(Out::Flow, 1.0).at(50.0), 323.223_415_891, 1e-10);
    close(fan.law(Out::Torque, 1.0).at(50.0), 0.25, 1e-12);
    assert!(fan.law(Out::Torque, 1.0).jumps().is_empty());
}

#[test]
fn meets_its_system_at_every_speed() {
    let system = System { fixed: 20.0, friction: 3e4 };
    let turbo = Turbo::through(150.0, pump(), system).unwrap();
    let (flow, head) = (turbo.law(Out::Flow, 1.0), turbo.law(Out::Head, 1.0));
    for speed in [107.0, 115.0, 131.0, 150.0, 180.0, 260.0] {
        close(head.at(speed), system.asks(flow.at(speed)), 1e-12);
    }
    // The check valve opens where 40 m times the square of the ratio of speeds is 20 m.
    let opens = 150.0 * 0.5_f64.sqrt();
    assert_eq!(flow.at(opens * 0.999), 0.0);
    assert!(flow.at(opens * 1.001) > 0.0);
    close(turbo.law(Out::Torque, 1.0).at(100.0), 4e3 / 150.0 * 4.0 / 9.0, 1e-12);
    close(
        turbo.law(Out::Share, 1.0).at(150.0),
        flow.at(150.0) * head.at(150.0) / (turbo.law(Out::Torque, 1.0).at(150.0) * 150.0),
        1e-12,
    );
}

#[test]
fn a_parabola_in_closed_form() {
    // H = 40 - 8·(Q/0.02)² against 20 + 12·(Q/0.02)²: both pass 32 m at 0.02 m³/s.
    let (closed, rated) =
        (Point { flow: 0.0, head: 40.0, power: 3e3 }, Point { flow: 0.02, head: 32.0, power: 9e3 });
    let system = System { fixed: 20.0, friction: 12.0 / 0.0004 };
    let turbo = Turbo::parabola(150.0, closed, rated, system).unwrap();
    close(turbo.law(Out::Flow, 1.0).at(150.0), 0.02, 1e-12);
    close(turbo.law(Out::Torque, 1.0).at(150.0), 60.0, 1e-12);
    assert_eq!(turbo.measured(), None);
}

#[test]
fn a_humped_curve_opens_with_a_jump() {
    let humped = points(&[(0.0, 30.0, 1e3), (0.01, 34.0, 2e3), (0.02, 30.0, 3e3), (0.03, 20.0, 4e3)]);
    let turbo = Turbo::through(100.0, humped, System { fixed: 15.0, friction: 0.0 }).unwrap();
    let flow = turbo.law(Out::Flow, 1.0);
    let opens = 100.0 * 0.5_f64.sqrt();
    close(flow.jumps()[0], opens, 1e-12);
    assert_eq!(flow.at(opens * (1.0 - 1e-9)), 0.0);
    close(flow.at(opens * (1.0 + 1e-9)), 0.02 * 0.5_f64.sqrt(), 1e-6);
}

#[test]
fn what_has_no_operating_point() {
    let two = |fixed, friction| Turbo::through(150.0, pump(), System { fixed, friction }).unwrap_err();
    assert_eq!(two(0.0, 0.0), NoFlow::Beyond);
    let late = points(&[(0.01, 38.0, 5e3), (0.02, 32.0, 6.5e3)]);
    let on =
        |list: Vec<Point>, fixed| Turbo::through(150.0, list, System { fixed, friction: 9e4 }).unwrap_err();
    assert_eq!(on(late, 10.0), NoFlow::NoClosedValve);
    assert_eq!(on(pump()[..1].to_vec(), 0.0), NoFlow::NoCurve);
    let saddle = points(&[(0.0, 30.0, 1e3), (0.01, 25.0, 2e3), (0.02, 29.0, 3e3), (0.03, 10.0, 4e3)]);
    let twice = Turbo::through(100.0, saddle, System { fixed: 5.0, friction: 0.0 }).unwrap_err();
    assert_eq!(twice, NoFlow::Twice);
}

proptest! {
    #[test]
    fn bounds_hold(
        fixed in 0.0..30.0f64, friction in 3e4..2e5f64, lo in 1.0..300.0f64, width in 0.0..80.0f64, t in 0.0..1.0f64,
    ) {
        let turbo = Turbo::through(150.0, pump(), System { fixed, friction }).unwrap();
        for out in [Out::Torque, Out::Flow, Out::Head, Out::Share] {
            encloses(&turbo.law(out, 1.0), lo, width, t);
        }
    }
}
