//! A machine that works in strokes from a flywheel: press, punch, shear, riveter.

use std::sync::Arc;

use super::resisting::Resisting;
use crate::curve::{Against, Constant, Curve, Law};
use crate::fault::Fault;
use crate::kinds::fields::{
    FLYWHEEL_EFFECT, INERTIA, MAX_SPEED, default, not_negative, plain, positive, range,
};
use crate::kinds::reading::{bad_value, contradiction, done, only_one};
use crate::laws::work_stroke::{self as law, MeanTorque, Stroke, Strokes};
use crate::model::{Known, Model, Motion, Own};
use crate::registry::{Field, KindRow, Need, ResultRow, ResultShape, Role, Shape};
use crate::scalar::Real;
use crate::values::Values;

/// The row.
pub static ROW: KindRow = KindRow {
    role: Role::Load,
    name: "work_stroke",
    title: "work in strokes",
    summary: "A press, punch, shear or riveter: work of a stroke, so often, with a flywheel that gives what the source does \
              not give in time. The source sees the mean torque; the drop of the speed is told beside it, counted from \
              the speed at the operating point down. A press with a clutch is run up without strokes: give from_speed, \
              or say working = no in a case of its own.",
    fields: FIELDS,
    results: RESULTS,
    formulas: &[
        law::TORQUE_BY_TURNS,
        law::TORQUE_BY_RATE,
        law::FLYWHEEL_ENERGY,
        law::SPEED_DROP,
        law::FLUCTUATION,
    ],
    cautions: &[
        "Presses maim: clutch, brake, guards and two-hand controls follow the local code and licensed practice, and the \
         flywheel turns on when the source is off.",
    ],
    example: "load press: work_stroke { work = 3.2 kJ; rate = 30 1/min; stroke_time = 120 ms; inertia = 18 kg·m² }",
    build,
    given: |_| Vec::new(),
};

static FIELDS: &[Field] = &[
    not_negative(
        "work",
        "energy",
        Need::Required,
        range(1e-2, 1e8),
        "work of one stroke at this shaft, losses included",
    ),
    positive(
        "rate",
        "rate",
        Need::OneOf,
        range(1e-4, 100.0),
        "strokes per time; instead of turns_per_stroke",
    ),
    positive(
        "turns_per_stroke",
        "number",
        Need::OneOf,
        range(0.1, 1e4),
        "turns of this shaft for each stroke: 1 where the crank sits on it and works every turn",
    ),
    positive(
        "from_speed",
        "rotational_speed",
        Need::Optional,
        range(0.1, 1e4),
        "speed from which the clutch is put in and strokes are made; at every speed when not given",
    ),
    positive(
        "stroke_time",
        "time",
        Need::Optional,
        range(1e-4, 100.0),
        "time in which the work of a stroke is done",
    ),
    positive(
        "stroke_angle",
        "angle",
        Need::Optional,
        range(1e-3, 1e3),
        "angle of this shaft in which the work of a stroke is done; instead of stroke_time",
    ),
    positive(
        "flywheel_energy",
        "energy",
        Need::Optional,
        range(1e-3, 1e8),
        "energy the flywheel gives in a cycle, from a turning-moment diagram; instead of stroke_time",
    ),
    plain(
        "working",
        Shape::Flag,
        default(1.0, "as it works; the run-up without strokes is a case of its own"),
        "whether strokes are made; without them the load takes nothing",
    ),
    INERTIA,
    FLYWHEEL_EFFECT,
    MAX_SPEED,
];

static RESULTS: &[ResultRow] = &[
    ResultRow {
        name: "flywheel_energy",
        shape: ResultShape::Quantity("energy"),
        meaning: "energy the flywheel gives for a stroke",
    },
    ResultRow {
        name: "speed_drop",
        shape: ResultShape::Quantity("rotational_speed"),
        meaning: "drop of the speed by a stroke; all of it where the flywheel does not hold the energy",
    },
    ResultRow {
        name: "speed_fluctuation",
        shape: ResultShape::Quantity("percentage"),
        meaning: "coefficient of fluctuation: greatest less least speed over the mean",
    },
    ResultRow {
        name: "strokes",
        shape: ResultShape::Quantity("rate"),
        meaning: "strokes per time at the speed it runs at",
    },
];

/// What the flywheel gives for a stroke, over the speed.
#[derive(Clone, Copy, Debug)]
enum Given {
    Stated(f64),
    By(f64, Strokes, Stroke),
}

impl Law for Given {
    fn eval<R: Real>(&self, speed: R) -> R {
        match *self {
            Self::Stated(energy) => R::of(energy),
            Self::By(work, strokes, stroke) => (-strokes.share(stroke, speed.abs()) + 1.0) * work,
        }
    }
}

/// What a stroke does to the speed.
#[derive(Clone, Copy, Debug)]
struct Drop {
    given: Given,
    inertia: f64,
    relative: bool,
}

impl Law for Drop {
    fn eval<R: Real>(&self, speed: R) -> R {
        let energy = self.given.eval(speed);
        if self.relative {
            law::fluctuation(speed, energy, self.inertia)
        } else {
            law::drop(speed.abs(), energy, self.inertia)
        }
    }
}

/// Strokes per time over the speed: of the mean power.
#[derive(Clone, Copy, Debug)]
struct Rate(Against<MeanTorque>, f64);

impl Law for Rate {
    fn eval<R: Real>(&self, speed: R) -> R {
        self.0.eval(speed) * speed / self.1
    }
}

/// What the flywheel gives, by whichever field says it.
fn given(values: &Values, work: f64, strokes: Strokes, faults: &mut Vec<Fault>) -> Option<Given> {
    let ways = ["stroke_time", "stroke_angle", "flywheel_energy"];
    let several: Vec<&'static str> = ways.into_iter().filter(|way| values.get(way).is_some()).collect();
    if several.len() > 1 {
        faults.push(contradiction(&several, "these say the same thing twice; keep one", &[]));
    }
    let way = several.first()?;
    let value = values.si(way)?;
    if let (&"stroke_time", Strokes::PerTime(rate)) = (way, strokes)
        && value * rate > 1.0
    {
        let template = "a stroke every {0} is over before this";
        faults.push(bad_value("stroke_time", template, &[(1.0 / rate, "time")]));
    }
    Some(match *way {
        "stroke_time" => Given::By(work, strokes, Stroke::Time(value)),
        "stroke_angle" => Given::By(work, strokes, Stroke::Angle(value)),
        _ => Given::Stated(value),
    })
}

/// Results by what the flywheel gives and its inertia.
fn own(
    work: f64,
    mean: Against<MeanTorque>,
    given: Option<Given>,
    inertia: Known,
) -> Vec<(&'static str, Own)> {
    let drop = |kind, relative| match (given, inertia) {
        (Some(given), Known::Value(inertia)) => Own::law(kind, Drop { given, inertia, relative }),
        (None, _) => Own::Missing("stroke_time"),
        (_, Known::Missing(field)) => Own::Missing(field),
    };
    let energy = match given {
        Some(given) => Own::law("energy", given),
        None => Own::Missing("stroke_time"),
    };
    let strokes =
        if work > 0.0 { Own::law("rate", Rate(mean, work)) } else { Own::law("rate", Constant(0.0)) };
    vec![
        ("flywheel_energy", energy),
        ("speed_drop", drop("rotational_speed", false)),
        ("speed_fluctuation", drop("percentage", true)),
        ("strokes", strokes),
    ]
}

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    let mut faults = Vec::new();
    let why = "how often it works: strokes per time, or turns of its shaft for each";
    let Some(way) = only_one(values, &["rate", "turns_per_stroke"], why, &mut faults) else {
        return Err(faults);
    };
    let often = values.si(way).unwrap_or(1.0);
    let strokes = if way == "rate" { Strokes::PerTime(often) } else { Strokes::EveryTurns(often) };
    let stated = values.si("work").unwrap_or(0.0);
    let given = given(values, stated, strokes, &mut faults);
    let working = values.flag("working") != Some(false);
    let work = if working { stated } else { 0.0 };
    let mean = Against(strokes.mean_torque(work).from(values.si("from_speed").unwrap_or(0.0)));
    let mut load = Resisting {
        breakaway: mean.eval(0.0),
        symbols: vec![("W", work), if way == "rate" { ("n", often) } else { ("N", often) }],
        ..Resisting::new(Motion::Rotary, mean, values, &mut faults)
    };
    let given = if working { given } else { given.map(|_| Given::Stated(0.0)) };
    load.own = own(work, mean, given, load.inertia);
    if let Known::Value(inertia) = load.inertia {
        load.symbols.push(("J", inertia));
    }
    if let Some(given) = given {
        let energy: Arc<dyn Curve> = Arc::new(given);
        load.moving.push(("dE", energy));
    }
    done(Model::Load(Box::new(load)), faults)
}

#[cfg(test)]
mod tests {
    use super::build;
    use crate::kinds::loads::testing::{loaded, result};
    use crate::laws::testing::{close, rpm};
    use crate::model::{Load, Own};
    use crate::values::{FieldValue, FieldValue::Si, Values};

    fn built(values: &Values) -> Box<dyn Load> {
        loaded(build(values))
    }

    #[test]
    fn published_riveter() {
        // R. S. Khurmi, J. K. Gupta, Theory of Machines, 14th ed., Ex. 3.3 (p. 34).
        let values = Values::default()
            .with("work", Si(10e3))
            .with("rate", Si(0.4))
            .with("stroke_time", Si(1.0))
            .with("inertia", Si(140.0));
        let load = built(&values);
        close(load.demand().at(rpm(240.0)) * rpm(240.0), 4e3, 1e-12);
        close(result(load.as_ref(), "speed_drop", rpm(240.0)), rpm(16.877_176_414_6), 1e-10);
        close(result(load.as_ref(), "strokes", rpm(240.0)), 0.4, 1e-12);
        let idle = built(&values.clone().with("working", FieldValue::Flag(false)));
        assert_eq!((idle.demand().at(20.0), result(idle.as_ref(), "speed_drop", 20.0)), (0.0, 0.0));
        assert!(build(&values.with("stroke_time", Si(3.0))).is_err());
    }

    #[test]
    fn every_turn() {
        let values =
            Values::default().with("work", Si(628.318_530_717_958_6)).with("turns_per_stroke", Si(2.0));
        let load = built(&values);
        close(load.demand().at(3.0), 50.0, 1e-12);
        assert!(matches!(load.own("speed_drop"), Some(Own::Missing("stroke_time"))));
        assert!(build(&values.with("rate", Si(1.0))).is_err());
    }
}
