//! A belt conveyor.

use super::fields::BREAKAWAY_FORCE_INSTEAD;
use super::pulled::Pulled;
use super::resisting::breakaway;
use crate::curve::{Against, Constant, Curve, Law, Line};
use crate::fault::Fault;
use crate::kinds::fields::{BREAKAWAY_RATIO, default, not_negative, positive, quantity, range};
use crate::kinds::reading::{contradiction, done, limits, missing, only_one};
use crate::laws::conveyor::{self as law, Conveyor, least_slack_tension};
use crate::laws::incline::Pull;
use crate::model::{Known, Limit, LimitOn, Model, Motion, Own, Standstill};
use crate::registry::{Bounds, Field, KindRow, Need, ResultRow, ResultShape, Role};
use crate::scalar::Real;
use crate::values::Values;

/// The row.
pub static ROW: KindRow = KindRow {
    role: Role::Load,
    name: "conveyor",
    title: "belt conveyor",
    summary: "A belt with its idlers and the material on it, in the form of ISO 5048: main resistance by the artificial \
              friction coefficient, the rise, secondary resistances by their factor. Stands behind the drive drum; \
              forward carries up the rise. The material is that of the design belt speed, or stated per length.",
    fields: FIELDS,
    results: RESULTS,
    formulas: &[
        law::MAIN_RESISTANCE,
        law::SLOPE_RESISTANCE,
        law::EFFECTIVE_PULL,
        law::SLACK_TENSION,
        law::BELT_TENSION,
    ],
    cautions: &[
        "A loaded belt that rises runs back when the power fails: backstop or brake, guards and pull cords follow the local \
         code. Downhill a low friction coefficient is the dangerous one.",
    ],
    example: "load belt: conveyor { length = 120 m; lift = 9 m; friction_coefficient = 0.022; secondary_factor = 1.78; \
              carrying_idlers = 12 kg/m; return_idlers = 4.5 kg/m; belt_mass = 9.5 kg/m; capacity = 250 t/h; \
              belt_speed = 1.6 m/s }",
    build,
    given: |_| Vec::new(),
};

static FIELDS: &[Field] = &[
    positive(
        "length",
        "length",
        Need::Required,
        range(2.0, 3e4),
        "distance between the end drums, along the belt",
    ),
    quantity(
        "lift",
        "length",
        Need::Required,
        Bounds::ANY,
        range(-500.0, 500.0),
        "rise from tail to head; below zero downhill, 0 m on the level",
    ),
    not_negative(
        "friction_coefficient",
        "number",
        Need::Required,
        range(0.010, 0.06),
        "artificial friction coefficient f of belt and idlers: common practice is 0.017 well kept to 0.03 in dust and cold",
    ),
    quantity(
        "secondary_factor",
        "number",
        Need::Required,
        Bounds::closed(1.0, 100.0),
        range(1.0, 10.0),
        "factor C of the secondary resistances: feeding, scrapers, drums; the shorter the belt the greater, by the standard",
    ),
    not_negative(
        "carrying_idlers",
        "mass_per_length",
        Need::Required,
        range(0.0, 100.0),
        "turning mass of the carrying idlers per length of the belt",
    ),
    not_negative(
        "return_idlers",
        "mass_per_length",
        Need::Required,
        range(0.0, 60.0),
        "turning mass of the return idlers per length of the belt",
    ),
    positive(
        "belt_mass",
        "mass_per_length",
        Need::Required,
        range(0.5, 150.0),
        "mass of the belt per length of one strand",
    ),
    not_negative(
        "material",
        "mass_per_length",
        Need::OneOf,
        range(0.0, 5e3),
        "mass of material per length; 0 kg/m empty; instead of capacity and belt_speed",
    ),
    not_negative(
        "capacity",
        "mass_flow",
        Need::OneOf,
        range(0.0, 1e4),
        "mass carried per time at belt_speed",
    ),
    positive(
        "belt_speed",
        "speed",
        Need::Optional,
        range(0.05, 12.0),
        "belt speed at which the capacity is carried; the belt is as full at every speed",
    ),
    not_negative(
        "special_resistance",
        "force",
        default(0.0, "no skirts, trippers or tilted idlers beyond the secondary factor"),
        range(0.0, 1e6),
        "special resistances: skirts over a length, trippers, tilted idlers",
    ),
    positive(
        "drum_friction",
        "number",
        Need::Optional,
        range(0.05, 0.6),
        "friction of the belt on the drive drum, as wet and dirty as it gets; for tensions and slip",
    ),
    positive(
        "wrap",
        "angle",
        Need::Optional,
        range(1.5, 9.0),
        "angle of the belt round the drive drum or drums",
    ),
    not_negative(
        "slack_tension",
        "force",
        Need::Optional,
        range(0.0, 1e7),
        "tension of the slack strand by its take-up; the least that passes the pull when not given",
    ),
    positive(
        "max_belt_tension",
        "force",
        Need::Optional,
        range(10.0, 1e8),
        "most tension the belt may carry for long",
    ),
    BREAKAWAY_RATIO,
    BREAKAWAY_FORCE_INSTEAD,
    positive("max_speed", "speed", Need::Optional, range(0.05, 15.0), "highest speed the belt may run at"),
];

static RESULTS: &[ResultRow] = &[
    force("effective_pull", "pull the drum has to give; below zero the belt drives it"),
    force("main_resistance", "resistance of idlers and belt along its length"),
    force("lift_force", "what the rise takes; below zero the material pulls ahead"),
    force("belt_tension", "tension in the tight strand at the drive drum"),
    force("least_slack_tension", "tension the slack strand needs so that the belt does not slip"),
    ResultRow {
        name: "mass_flow",
        shape: ResultShape::Quantity("mass_flow"),
        meaning: "material it carries per time",
    },
];

const fn force(name: &'static str, meaning: &'static str) -> ResultRow {
    ResultRow { name, shape: ResultShape::Quantity("force"), meaning }
}

/// The material per length.
fn material(values: &Values, faults: &mut Vec<Fault>) -> Option<f64> {
    let why =
        "the belt's load: mass of material per length, or its capacity with the belt speed; 0 kg/m empty";
    match only_one(values, &["material", "capacity"], why, faults)? {
        "material" => values.si("material"),
        _ => match (values.si("capacity"), values.si("belt_speed")) {
            (Some(capacity), Some(speed)) => Some(capacity / speed),
            _ => {
                faults.push(missing(
                    &[&["belt_speed"], &["material"]],
                    "mass per time is mass per length at a speed",
                ));
                None
            }
        },
    }
}

/// Of a pull the size of it, and what it takes in the slack strand.
#[derive(Clone, Copy, Debug)]
struct Strand {
    pull: Pull,
    /// The slack strand's tension for each newton of pull.
    share: f64,
    /// The stated tension of the slack strand.
    stated: f64,
    /// Whether the tight strand is asked for.
    tight: bool,
}

impl Law for Strand {
    fn eval<R: Real>(&self, speed: R) -> R {
        let pull = self.pull.eval(speed).abs();
        let least = pull * self.share;
        if self.tight { pull + least.max(R::of(self.stated)) } else { least }
    }

    fn jumps(&self) -> Vec<f64> {
        Law::jumps(&self.pull)
    }
}

/// Tensions, as far as the fields say them.
fn tensions(values: &Values, pull: Pull) -> [(&'static str, Own); 2] {
    let share = match (values.si("drum_friction"), values.si("wrap")) {
        (Some(friction), Some(wrap)) => Ok(least_slack_tension(1.0, friction, wrap)),
        (Some(_), None) => Err("wrap"),
        _ => Err("drum_friction"),
    };
    let stated = values.si("slack_tension");
    let strand = |share, tight| Strand { pull, share, stated: stated.unwrap_or(0.0), tight };
    let least = match share {
        Ok(share) => Own::law("force", strand(share, false)),
        Err(field) => Own::Missing(field),
    };
    let tight = match (share, stated) {
        // A belt that would slip is a finding; its take-up still says the tension.
        (_, Some(_)) => Own::law("force", strand(0.0, true)),
        (Ok(share), None) => Own::law("force", strand(share, true)),
        (Err(field), None) => Own::Missing(field),
    };
    [("belt_tension", tight), ("least_slack_tension", least)]
}

/// The pull at which the belt slips or is overstretched.
fn limits_of(values: &Values) -> Vec<Limit> {
    let mut out = limits(values, &[("max_speed", LimitOn::InputSpeed)]);
    let gain = values.si("drum_friction").zip(values.si("wrap")).map(|(mu, phi)| libm::exp(mu * phi) - 1.0);
    let slack = values.si("slack_tension");
    if let (Some(gain), Some(slack)) = (gain, slack) {
        let value = slack * gain;
        out.push(Limit { field: "slack_tension", on: LimitOn::InputEffort, value, code: "slips" });
    }
    if let Some(most) = values.si("max_belt_tension") {
        let pull = match (slack, gain) {
            (Some(slack), _) => Some(most - slack),
            (None, Some(gain)) => Some(most * gain / (gain + 1.0)),
            (None, None) => None,
        };
        out.extend(pull.map(|value| Limit {
            field: "max_belt_tension",
            on: LimitOn::InputEffort,
            value: f64::max(value, 0.0),
            code: "part-limit",
        }));
    }
    out
}

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    let mut faults = Vec::new();
    let field = |name| values.si(name).unwrap_or(0.0);
    let (length, rise) = (field("length"), field("lift"));
    if rise.abs() >= length {
        let template = "over {0} a belt cannot rise by {1}: the length runs along the belt";
        faults.push(contradiction(&["length", "lift"], template, &[(length, "length"), (rise, "length")]));
    }
    let Some(material) = material(values, &mut faults) else { return Err(faults) };
    let belt = Conveyor {
        friction: field("friction_coefficient"),
        length,
        rise,
        carry: field("carrying_idlers"),
        back: field("return_idlers"),
        belt: field("belt_mass"),
        material,
    };
    let special = field("special_resistance");
    let friction = field("secondary_factor") * belt.main_resistance() + special;
    let pull = Pull { pull: belt.lift_force(), friction };
    let at_rest = breakaway(values, Motion::Linear, f64::max(pull.pull + friction, 0.0), &mut faults);
    let sticking = f64::max(at_rest - f64::max(pull.pull + friction, 0.0), 0.0) + friction;
    let [tension, slack] = tensions(values, pull);
    let constant = |value: f64| Own::law("force", Constant(value));
    let law: std::sync::Arc<dyn Curve> = std::sync::Arc::new(pull);
    let load = Pulled {
        motion: Motion::Linear,
        demand: pull,
        standstill: Standstill {
            holding: pull.pull,
            breakaway_forward: pull.pull + sticking,
            breakaway_reverse: pull.pull - sticking,
        },
        mass: Known::Value(belt.moved_mass()),
        needs_holding: pull.pull.abs() > friction,
        limits: limits_of(values),
        symbols: symbols(values, &belt, special),
        own: vec![
            ("effective_pull", Own::Law { kind: "force", curve: law }),
            ("main_resistance", Own::law("force", Against(Constant(belt.main_resistance())))),
            ("lift_force", constant(belt.lift_force())),
            tension,
            slack,
            ("mass_flow", Own::law("mass_flow", Line { at_zero: 0.0, slope: material })),
        ],
    };
    done(Model::Load(Box::new(load)), faults)
}

fn symbols(values: &Values, belt: &Conveyor, special: f64) -> Vec<(&'static str, f64)> {
    let factor = values.si("secondary_factor").unwrap_or(1.0);
    let main = belt.main_resistance();
    let pull = factor * main + belt.lift_force() + special;
    let mut out = vec![
        ("f", belt.friction),
        ("L", belt.length),
        ("q_RO", belt.carry),
        ("q_RU", belt.back),
        ("q_B", belt.belt),
        ("q_G", belt.material),
        ("H", belt.rise),
        ("C", factor),
        ("F_H", main),
        ("F_St", belt.lift_force()),
        ("F_S", special),
        ("F_U", pull),
    ];
    let (friction, wrap) = (values.si("drum_friction"), values.si("wrap"));
    out.extend(friction.map(|mu| ("mu", mu)));
    out.extend(wrap.map(|phi| ("phi", phi)));
    let least = friction.zip(wrap).map(|(mu, phi)| least_slack_tension(pull, mu, phi));
    out.extend(values.si("slack_tension").or(least).map(|slack| ("T_2", slack)));
    out
}

#[cfg(test)]
mod tests;
