//! Cutting: turning, planing, and any cut by the volume it removes.

use super::fields::MASS;
use super::resisting::Resisting;
use crate::curve::{Against, Law, Line, PowerOf, Scaled};
use crate::fault::Fault;
use crate::kinds::fields::{FLYWHEEL_EFFECT, INERTIA, MAX_SPEED, default, plain, positive, quantity, range};
use crate::kinds::reading::{bad_value, contradiction, done, missing, only_one};
use crate::laws::bounded_power::{self, BoundedPower};
use crate::laws::cutting::{self as law, turned_chip};
use crate::model::{Model, Motion, Own};
use crate::registry::{Bounds, Field, KindRow, Need, ResultRow, ResultShape, Role, Shape};
use crate::scalar::Real;
use crate::values::Values;

/// The row.
pub static ROW: KindRow = KindRow {
    role: Role::Load,
    name: "cutting",
    title: "cutting",
    summary: "The cut of a machine tool by the specific cutting force: turning by depth, feed a turn and diameter takes the \
              same torque at every speed; planing by depth and width takes a force; a cut fed by a drive of its own takes \
              power by the volume it removes. The machine is started out of cut: say in_cut = no in that case.",
    fields: FIELDS,
    results: RESULTS,
    formulas: &[
        law::TURNING_FORCE,
        law::CUTTING_TORQUE,
        law::PLANING_FORCE,
        law::CUTTING_POWER,
        bounded_power::BOUNDED_TORQUE,
    ],
    cautions: &[
        "Guards, clamping and the highest speed of chuck and tool follow their makers and the local code.",
    ],
    example: "load cut: cutting { specific_cutting_force = 2100 N/mm²; depth_of_cut = 3 mm; feed = 0.3 mm/rev; diameter = 120 mm }",
    build,
    given: |_| Vec::new(),
};

static FIELDS: &[Field] = &[
    positive(
        "specific_cutting_force",
        "pressure",
        Need::Required,
        range(1e6, 1e10),
        "force per section of the chip, the same as energy per volume removed; for this material and chip thickness",
    ),
    quantity(
        "wear_factor",
        "number",
        default(1.0, "a sharp tool; a dull one takes 1.25 to 1.5 times as much"),
        Bounds::closed(1.0, 5.0),
        range(1.0, 2.0),
        "force of the tool as it is over that of a sharp one",
    ),
    positive("depth_of_cut", "length", Need::OneOf, range(1e-6, 0.2), "depth of cut"),
    positive(
        "feed",
        "lead",
        Need::Optional,
        range(1e-8, 1e-2),
        "feed for each turn; with depth_of_cut and diameter",
    ),
    positive("width_of_cut", "length", Need::Optional, range(1e-6, 1.0), "width of cut, running straight"),
    positive(
        "removal_rate",
        "flow",
        Need::OneOf,
        range(1e-10, 1e-2),
        "volume removed per time by a feed of its own; with max_torque or from_speed; instead of depth_of_cut",
    ),
    positive(
        "diameter",
        "length",
        Need::Optional,
        range(1e-4, 20.0),
        "diameter at the tool: of the work, or of the cutter",
    ),
    positive(
        "max_torque",
        "torque",
        Need::Optional,
        range(1e-3, 1e7),
        "most torque of the cut; with removal_rate",
    ),
    positive(
        "from_speed",
        "rotational_speed",
        Need::Optional,
        range(0.1, 1e4),
        "speed from which the volume is removed; with removal_rate; instead of max_torque",
    ),
    plain(
        "in_cut",
        Shape::Flag,
        default(1.0, "as it works; the start out of cut is a case of its own"),
        "whether the tool is in the cut; out of it the load takes nothing",
    ),
    INERTIA,
    FLYWHEEL_EFFECT,
    MASS,
    MAX_SPEED,
];

static RESULTS: &[ResultRow] = &[
    ResultRow { name: "cutting_force", shape: ResultShape::Quantity("force"), meaning: "force at the tool" },
    ResultRow { name: "cutting_speed", shape: ResultShape::Quantity("speed"), meaning: "speed at the tool" },
    ResultRow {
        name: "removed",
        shape: ResultShape::Quantity("flow"),
        meaning: "volume removed per time at the speed it runs at",
    },
];

/// Effort of a cut over a speed of zero or above.
#[derive(Clone, Copy, Debug, PartialEq)]
enum Cut {
    /// The same at every speed.
    Even(f64),
    /// The same power.
    Volume(BoundedPower),
}

impl Law for Cut {
    fn eval<R: Real>(&self, speed: R) -> R {
        match self {
            Self::Even(effort) => R::of(*effort),
            Self::Volume(power) => power.eval(speed),
        }
    }

    fn kinks(&self) -> Vec<f64> {
        match self {
            Self::Even(_) => Vec::new(),
            Self::Volume(power) => power.kinks(),
        }
    }
}

type Read = (Motion, Cut, Vec<(&'static str, f64)>);

/// A cut by the volume it removes.
fn by_volume(values: &Values, k_c: f64, volume: f64, faults: &mut Vec<Fault>) -> Option<Read> {
    let power = k_c * volume;
    let why = "a power makes a torque without end at rest: say the most, or the speed it begins at";
    let way = only_one(values, &["max_torque", "from_speed"], why, faults)?;
    let bound = values.si(way)?;
    let most = if way == "max_torque" { bound } else { power / bound };
    let symbols = vec![("k_c", k_c), ("Q", volume), ("P", power), ("T_max", most)];
    Some((Motion::Rotary, Cut::Volume(BoundedPower { power, most }), symbols))
}

/// The cut by its fields, how it moves, and the symbols of its formulas.
fn cut(values: &Values, faults: &mut Vec<Fault>) -> Option<Read> {
    let si = |name| values.si(name);
    let k_c = si("specific_cutting_force")? * si("wear_factor").unwrap_or(1.0);
    let mut symbols = vec![("k_c", k_c)];
    match (si("depth_of_cut"), si("feed"), si("width_of_cut"), si("removal_rate")) {
        (Some(depth), Some(feed), None, None) => {
            let Some(diameter) = si("diameter") else {
                faults.push(missing(&[&["diameter"]], "a force makes a torque at a diameter"));
                return None;
            };
            let force = k_c * turned_chip(depth, feed);
            symbols.extend([("a_p", depth), ("f", feed), ("F_c", force), ("D", diameter)]);
            Some((Motion::Rotary, Cut::Even(force * diameter / 2.0), symbols))
        }
        (Some(depth), None, Some(width), None) => {
            if si("diameter").is_some() {
                let why = "a width of cut belongs to a tool that runs straight; turning has a feed";
                faults.push(bad_value("diameter", why, &[]));
            }
            symbols.extend([("a_p", depth), ("b", width)]);
            Some((Motion::Linear, Cut::Even(k_c * depth * width), symbols))
        }
        (None, None, None, Some(volume)) => by_volume(values, k_c, volume, faults),
        (None, None, None, None) => {
            let choices: [&[&'static str]; 3] = [
                &["depth_of_cut", "feed", "diameter"],
                &["depth_of_cut", "width_of_cut"],
                &["removal_rate", "max_torque"],
            ];
            faults.push(missing(&choices, "the section of the chip, or the volume removed, settles the cut"));
            None
        }
        _ => {
            let ways = ["depth_of_cut", "feed", "width_of_cut", "removal_rate"];
            let given: Vec<&'static str> = ways.into_iter().filter(|way| values.get(way).is_some()).collect();
            let how = "turning is depth, feed and diameter; planing depth and width; else the volume removed";
            faults.push(contradiction(&given, how, &[]));
            None
        }
    }
}

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    let mut faults = Vec::new();
    let Some((motion, cut, symbols)) = cut(values, &mut faults) else { return Err(faults) };
    let k_c = symbols.first().map_or(1.0, |(_, k_c)| *k_c);
    let cut = if values.flag("in_cut") == Some(false) { Cut::Even(0.0) } else { cut };
    let law = Against(cut);
    let at_tool = match (motion, values.si("diameter")) {
        (Motion::Linear, _) => Some(1.0),
        (Motion::Rotary, diameter) => diameter.map(|d| d / 2.0),
    };
    let (force, speed) = match at_tool {
        Some(arm) => {
            (Own::law("force", Scaled(law, 1.0 / arm)), Own::law("speed", Line { at_zero: 0.0, slope: arm }))
        }
        None => (Own::Missing("diameter"), Own::Missing("diameter")),
    };
    let load = Resisting {
        breakaway: cut.eval(0.0),
        usual_speed: values.si("from_speed"),
        symbols: if cut == Cut::Even(0.0) { Vec::new() } else { symbols },
        own: vec![
            ("cutting_force", force),
            ("cutting_speed", speed),
            ("removed", Own::law("flow", PowerOf(law, 1.0 / k_c))),
        ],
        ..Resisting::new(motion, law, values, &mut faults)
    };
    done(Model::Load(Box::new(load)), faults)
}

#[cfg(test)]
mod tests {
    use super::build;
    use crate::kinds::loads::testing::{loaded, result};
    use crate::laws::testing::close;
    use crate::model::{Load, Motion, Own};
    use crate::values::{FieldValue, FieldValue::Si, Values};

    fn built(values: &Values) -> Box<dyn Load> {
        loaded(build(values))
    }

    fn steel() -> Values {
        Values::default().with("specific_cutting_force", Si(2000e6))
    }

    #[test]
    fn turning_takes_a_torque() {
        // Closed form: 3 mm × 0.3 mm at 2000 N/mm² are 1800 N, on 120 mm 108 N·m.
        let turning = steel()
            .with("depth_of_cut", Si(3e-3))
            .with("feed", Si(0.3e-3 / std::f64::consts::TAU))
            .with("diameter", Si(0.12));
        let load = built(&turning);
        close(load.demand().at(20.0), 108.0, 1e-12);
        close(result(load.as_ref(), "cutting_force", 20.0), 1800.0, 1e-12);
        close(result(load.as_ref(), "cutting_speed", 20.0), 1.2, 1e-12);
        close(result(load.as_ref(), "removed", 20.0), 0.9e-6 * 1.2, 1e-12);
        let free = built(&turning.with("in_cut", FieldValue::Flag(false)));
        assert_eq!((free.demand().at(20.0), free.standstill().breakaway_forward), (0.0, 0.0));
    }

    #[test]
    fn planing_and_volume() {
        let planing = built(&steel().with("depth_of_cut", Si(3e-3)).with("width_of_cut", Si(1e-3)));
        assert_eq!(planing.motion(), Motion::Linear);
        close(planing.demand().at(0.5), 6000.0, 1e-12);
        let milling = steel().with("removal_rate", Si(2e-6));
        assert!(build(&milling).is_err());
        let load = built(&milling.with("from_speed", Si(40.0)));
        close(load.demand().at(80.0), 50.0, 1e-12);
        assert!(matches!(load.own("cutting_force"), Some(Own::Missing("diameter"))));
        assert!(build(&steel().with("depth_of_cut", Si(3e-3))).is_err());
    }
}
