//! A propeller at a fixed advance.

use super::fields::{BREAKAWAY_TORQUE, RATED_POWER, RATED_SPEED, RATED_TORQUE};
use super::power::rated_torque;
use super::resisting::{Resisting, breakaway};
use crate::curve::{Against, Line, Monomial};
use crate::fault::Fault;
use crate::kinds::fields::{FLYWHEEL_EFFECT, INERTIA, MAX_SPEED, positive, range};
use crate::kinds::reading::{contradiction, done, missing};
use crate::laws::{affinity as law, drag};
use crate::model::{Model, Motion, Own};
use crate::registry::{Field, KindRow, Need, ResultRow, ResultShape, Role};
use crate::values::Values;

/// The row.
pub static ROW: KindRow = KindRow {
    role: Role::Load,
    name: "propeller",
    title: "propeller",
    summary: "A ship's or air propeller while its advance keeps step with its speed, by a rated point or by its \
              coefficients: torque and thrust go by the square of the speed, power by the cube. At the bollard or in a \
              heavier hull the advance falls and it takes more: give that point in a case of its own.",
    fields: FIELDS,
    results: RESULTS,
    formulas: &[drag::QUADRATIC, law::PROPELLER_TORQUE, law::THRUST, law::PROPELLER_THRUST],
    cautions: &[
        "Where a propeller can reach a swimmer or a rope, the engine is stopped first; cavitation and the vessel's own \
         resistance are not part of these numbers.",
    ],
    example: "load screw: propeller { torque_coefficient = 0.033; thrust_coefficient = 0.19; diameter = 0.62 m; density = 1025 kg/m³ }",
    build,
    given: |_| Vec::new(),
};

static FIELDS: &[Field] = &[
    RATED_TORQUE,
    RATED_POWER,
    RATED_SPEED,
    positive("rated_thrust", "force", Need::Optional, range(0.1, 1e8), "thrust at the rated speed"),
    positive(
        "torque_coefficient",
        "number",
        Need::OneOf,
        range(1e-3, 0.2),
        "K_Q at the advance it runs at: torque over density, square of the revolutions per time and fifth power of the \
         diameter; instead of a rated point",
    ),
    positive(
        "thrust_coefficient",
        "number",
        Need::Optional,
        range(1e-3, 1.5),
        "K_T at the same advance: thrust over density, square of the revolutions per time and fourth power of the diameter",
    ),
    positive("diameter", "length", Need::OneOf, range(0.02, 15.0), "diameter of the propeller"),
    positive(
        "density",
        "density",
        Need::OneOf,
        range(0.5, 1.1e3),
        "density it works in: 1025 kg/m³ in the sea, 1000 kg/m³ in fresh water",
    ),
    positive(
        "advance_coefficient",
        "number",
        Need::Optional,
        range(0.01, 2.0),
        "J at which the coefficients hold: speed of advance over revolutions per time and diameter",
    ),
    BREAKAWAY_TORQUE,
    INERTIA,
    FLYWHEEL_EFFECT,
    MAX_SPEED,
];

static RESULTS: &[ResultRow] = &[
    ResultRow { name: "thrust", shape: ResultShape::Quantity("force"), meaning: "thrust it gives" },
    ResultRow {
        name: "advance_speed",
        shape: ResultShape::Quantity("speed"),
        meaning: "speed through the water at its advance coefficient",
    },
    ResultRow {
        name: "efficiency",
        shape: ResultShape::Quantity("percentage"),
        meaning: "thrust times speed of advance over shaft power",
    },
];

/// What its fields say of it.
struct Screw {
    /// Torque and thrust per square of the speed.
    torque: f64,
    thrust: Own,
    /// Speed of advance per speed.
    advance: Option<f64>,
    symbols: Vec<(&'static str, f64)>,
    rated_speed: Option<f64>,
}

/// By its coefficients.
fn of_coefficients(values: &Values, faults: &mut Vec<Fault>) -> Option<Screw> {
    let field = |name| values.si(name);
    let (Some(k_q), Some(diameter), Some(density)) =
        (field("torque_coefficient"), field("diameter"), field("density"))
    else {
        let why = "a coefficient makes a torque with density and diameter";
        faults.push(missing(&[&["torque_coefficient", "diameter", "density"]], why));
        return None;
    };
    let thrust = field("thrust_coefficient");
    let mut symbols = vec![("K_Q", k_q), ("rho", density), ("D", diameter)];
    symbols.extend(thrust.map(|k_t| ("K_T", k_t)));
    let square = |coefficient| Against(Monomial { coefficient, power: 2 });
    Some(Screw {
        torque: law::propeller_torque(k_q, density, diameter),
        thrust: match thrust {
            Some(k_t) => Own::law("force", square(law::propeller_thrust(k_t, density, diameter))),
            None => Own::Missing("thrust_coefficient"),
        },
        advance: field("advance_coefficient").map(|j| j * diameter / std::f64::consts::TAU),
        symbols,
        rated_speed: field("rated_speed"),
    })
}

/// By its rated point.
fn of_point(values: &Values, faults: &mut Vec<Fault>) -> Option<Screw> {
    let before = faults.len();
    let (torque, speed) = (rated_torque(values, faults), values.si("rated_speed"));
    let (Some(torque), Some(speed)) = (torque, speed) else {
        let choices: [&[&'static str]; 3] = [
            &["rated_torque", "rated_speed"],
            &["rated_power", "rated_speed"],
            &["torque_coefficient", "diameter", "density"],
        ];
        if faults.len() == before {
            faults.push(missing(&choices, "one rated point, or its coefficients, settle what it takes"));
        }
        return None;
    };
    let mut symbols = vec![("T_r", torque), ("w_r", speed)];
    let thrust = values.si("rated_thrust");
    symbols.extend(thrust.map(|thrust| ("F_r", thrust)));
    let advance = values.si("advance_coefficient").zip(values.si("diameter"));
    Some(Screw {
        torque: torque / (speed * speed),
        thrust: match thrust {
            Some(thrust) => Own::law("force", Against(Monomial::through(2, speed, thrust))),
            None => Own::Missing("rated_thrust"),
        },
        advance: advance.map(|(j, diameter)| j * diameter / std::f64::consts::TAU),
        symbols,
        rated_speed: Some(speed),
    })
}

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    let mut faults = Vec::new();
    let coefficients = values.get("torque_coefficient").is_some();
    let point: Vec<&'static str> = ["rated_torque", "rated_power", "rated_thrust"]
        .into_iter()
        .filter(|name| coefficients && values.get(name).is_some())
        .collect();
    if !point.is_empty() {
        let both = [point.as_slice(), &["torque_coefficient"]].concat();
        faults.push(contradiction(&both, "a rated point or coefficients settle it; keep one", &[]));
    }
    let screw =
        if coefficients { of_coefficients(values, &mut faults) } else { of_point(values, &mut faults) };
    let Some(screw) = screw else { return Err(faults) };
    let advance = match screw.advance {
        Some(slope) => Own::law("speed", Line { at_zero: 0.0, slope }),
        None => Own::Missing("advance_coefficient"),
    };
    let efficiency = match (&screw.thrust, screw.advance) {
        (Own::Law { curve, .. }, Some(advance)) => {
            let share = curve.at(1.0) * advance / screw.torque;
            Own::law("percentage", crate::curve::Constant(share))
        }
        (Own::Missing(field), _) => Own::Missing(field),
        _ => Own::Missing("advance_coefficient"),
    };
    let law = Against(Monomial { coefficient: screw.torque, power: 2 });
    let load = Resisting {
        breakaway: breakaway(values, Motion::Rotary, 0.0, &mut faults),
        usual_speed: screw.rated_speed,
        symbols: screw.symbols,
        own: vec![("thrust", screw.thrust), ("advance_speed", advance), ("efficiency", efficiency)],
        ..Resisting::new(Motion::Rotary, law, values, &mut faults)
    };
    done(Model::Load(Box::new(load)), faults)
}

#[cfg(test)]
mod tests {
    use super::build;
    use crate::kinds::loads::testing::{loaded, result};
    use crate::laws::testing::{close, rpm};
    use crate::model::{Load, Own};
    use crate::values::{FieldValue::Si, Values};

    fn screw(fields: &[(&'static str, f64)]) -> Box<dyn Load> {
        let values = fields.iter().fold(Values::default(), |values, (name, si)| values.with(name, Si(*si)));
        loaded(build(&values))
    }

    #[test]
    fn by_coefficients_as_published() {
        // E. C. Tupper, Introduction to Naval Architecture: K_Q 0.05, D 4 m at 120 rpm in sea water.
        let base = [("torque_coefficient", 0.05), ("diameter", 4.0), ("density", 1025.0)];
        let load = screw(&[&base[..], &[("thrust_coefficient", 0.3), ("advance_coefficient", 0.7)]].concat());
        close(load.demand().at(rpm(120.0)), 209_920.0, 1e-12);
        close(result(load.as_ref(), "thrust", rpm(120.0)), 0.3 * 1025.0 * 4.0 * 256.0, 1e-12);
        close(result(load.as_ref(), "advance_speed", rpm(120.0)), 0.7 * 2.0 * 4.0, 1e-12);
        // Open-water efficiency J·K_T / (2·π·K_Q).
        close(result(load.as_ref(), "efficiency", 5.0), 0.7 * 0.3 / (0.05 * std::f64::consts::TAU), 1e-12);
        assert!(matches!(screw(&base).own("thrust"), Some(Own::Missing("thrust_coefficient"))));
    }

    #[test]
    fn by_a_rated_point() {
        let load = screw(&[("rated_power", 30e3), ("rated_speed", 60.0), ("rated_thrust", 4e3)]);
        close(load.demand().at(30.0), 125.0, 1e-12);
        close(load.demand().at(-30.0), -125.0, 1e-12);
        close(result(load.as_ref(), "thrust", 30.0), 1e3, 1e-12);
        let both = Values::default().with("rated_torque", Si(1.0)).with("torque_coefficient", Si(0.05));
        assert!(build(&both).is_err());
    }
}
