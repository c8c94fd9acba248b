//! Tests of the belt conveyor.

use super::build;
use crate::kinds::loads::testing::{loaded, result};
use crate::laws::testing::close;
use crate::model::{Known, LimitOn, Load, Own};
use crate::values::{FieldValue::Si, Values};

fn belt(more: &[(&'static str, f64)]) -> Values {
    let base = [
        ("length", 300.0),
        ("lift", 12.0),
        ("friction_coefficient", 0.02),
        ("secondary_factor", 1.31),
        ("carrying_idlers", 14.8),
        ("return_idlers", 6.0),
        ("belt_mass", 12.0),
    ];
    base.iter().chain(more).fold(Values::default(), |values, (name, si)| values.with(name, Si(*si)))
}

fn built(values: &Values) -> Box<dyn Load> {
    loaded(build(values))
}

#[test]
fn pull_mass_and_what_runs_back() {
    let load = built(&belt(&[("capacity", 600.0 / 3.6), ("belt_speed", 2.0)]));
    // With 9.81 instead of 9.80665 m/s²: 19683.3021428 N.
    close(load.demand().at(2.0) * 9.81 / 9.806_65, 19_683.302_142_8, 1e-11);
    close(result(load.as_ref(), "mass_flow", 1.5), 125.0, 1e-12);
    assert!(load.demand().at(-1.0) < 0.0 && !load.needs_holding());
    close(load.standstill().holding, 9806.65, 1e-9);
    let Known::Value(mass) = load.inertia() else { panic!("a mass") };
    close(mass, 300.0 * (44.8 + 83.0 + 1.0 / 3.0), 1e-12);
}

#[test]
fn tensions_and_slip() {
    let full = [("material", 80.0), ("drum_friction", 0.3), ("wrap", 3.5), ("slack_tension", 9e3)];
    let load = built(&belt(&full));
    let pull = load.demand().at(2.0);
    close(result(load.as_ref(), "belt_tension", 2.0), pull + 9e3, 1e-12);
    let gain = libm::exp(1.05) - 1.0;
    close(result(load.as_ref(), "least_slack_tension", 2.0), pull / gain, 1e-12);
    let limit = load.limits().into_iter().find(|l| l.code == "slips").unwrap();
    assert_eq!(limit.on, LimitOn::InputEffort);
    close(limit.value, 9e3 * gain, 1e-12);
    let bare = built(&belt(&[("material", 80.0)]));
    assert!(matches!(bare.own("belt_tension"), Some(Own::Missing("drum_friction"))));
}

#[test]
fn what_does_not_fit() {
    assert!(build(&belt(&[])).is_err());
    assert!(build(&belt(&[("capacity", 100.0)])).is_err());
    assert!(build(&belt(&[("material", 10.0), ("lift", 301.0)])).is_err());
}
