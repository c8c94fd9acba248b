//! A load that grows with a stated power of the speed.

use super::fields::{BREAKAWAY_TORQUE, RATED_POWER, RATED_SPEED, RATED_TORQUE};
use super::power::rated_torque;
use super::resisting::{Resisting, breakaway};
use crate::curve::Against;
use crate::fault::Fault;
use crate::kinds::fields::{FLYWHEEL_EFFECT, INERTIA, MAX_SPEED, quantity, range};
use crate::kinds::reading::{done, missing};
use crate::laws::power_law::{self as law, PowerLaw};
use crate::model::{Model, Motion};
use crate::registry::{Bounds, Field, KindRow, Need, Role};
use crate::values::Values;

/// The row.
pub static ROW: KindRow = KindRow {
    role: Role::Load,
    name: "power_law",
    title: "load by a power of the speed",
    summary: "Torque grows with any power of the speed through a rated point: an agitator between laminar and turbulent, \
              a mill whose exponent was measured. Exponents 1 and 2 are the kinds viscous and quadratic.",
    fields: FIELDS,
    results: &[],
    formulas: &[law::POWER_LAW],
    cautions: &[],
    example: "load mixer: power_law { rated_torque = 40 N·m; rated_speed = 90 rpm; exponent = 1.6 }",
    build,
    given: |_| Vec::new(),
};

static FIELDS: &[Field] = &[
    RATED_TORQUE,
    RATED_POWER,
    RATED_SPEED,
    quantity(
        "exponent",
        "number",
        Need::Required,
        Bounds::closed(0.0, 5.0),
        range(0.0, 3.0),
        "power of the speed the torque grows with",
    ),
    BREAKAWAY_TORQUE,
    INERTIA,
    FLYWHEEL_EFFECT,
    MAX_SPEED,
];

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    let mut faults = Vec::new();
    let (torque, speed) = (rated_torque(values, &mut faults), values.si("rated_speed"));
    let (Some(torque), Some(speed)) = (torque, speed) else {
        let choices: [&[&'static str]; 2] =
            [&["rated_torque", "rated_speed"], &["rated_power", "rated_speed"]];
        if faults.is_empty() {
            faults.push(missing(&choices, "one rated point settles the curve"));
        }
        return Err(faults);
    };
    let law = PowerLaw { torque, speed, exponent: values.si("exponent").unwrap_or(0.0) };
    let at_rest = if law.exponent == 0.0 { torque } else { 0.0 };
    let given = breakaway(values, Motion::Rotary, 0.0, &mut faults);
    let load = Resisting {
        breakaway: f64::max(given, at_rest),
        usual_speed: Some(speed),
        symbols: vec![("T_r", torque), ("w_r", speed), ("n", law.exponent)],
        ..Resisting::new(Motion::Rotary, Against(law), values, &mut faults)
    };
    done(Model::Load(Box::new(load)), faults)
}

#[cfg(test)]
mod tests {
    use super::build;
    use crate::laws::testing::close;
    use crate::model::Model;
    use crate::values::{FieldValue::Si, Values};

    #[test]
    fn through_its_rated_point() {
        let values = Values::default()
            .with("rated_power", Si(200.0))
            .with("rated_speed", Si(20.0))
            .with("exponent", Si(1.5));
        let Ok(Model::Load(load)) = build(&values) else { panic!("no load") };
        close(load.demand().at(20.0), 10.0, 1e-14);
        close(load.demand().at(5.0), 1.25, 1e-14);
        close(load.demand().at(-20.0), -10.0, 1e-14);
        assert!(build(&Values::default().with("exponent", Si(1.0))).is_err());
    }
}
