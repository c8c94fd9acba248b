//! What pump and fan share: their curve or rated point, and the system they work on.

use std::sync::Arc;

use super::power::rated_torque;
use super::resisting::{Resisting, breakaway};
use crate::curve::{Against, Curve};
use crate::fault::Fault;
use crate::kinds::fields::{not_negative, positive, quantity, range};
use crate::kinds::reading::{bad_value, contradiction, differ, missing};
use crate::laws::turbo::{NoFlow, Out, Point, System, Turbo, TurboLaw};
use crate::model::{Motion, Own};
use crate::registry::{Bounds, Field, Need};
use crate::values::{FieldValue, Table, Values};

/// How a kind calls what it lifts by.
pub(super) struct Names {
    /// `head` or `pressure`: the column.
    pub column: &'static str,
    /// At the rated point.
    pub rated: &'static str,
    /// At no flow.
    pub closed: &'static str,
    /// Shaft power at no flow.
    pub closed_power: &'static str,
    /// The part the system asks at any flow.
    pub fixed: &'static str,
    /// Its friction.
    pub friction: &'static str,
    /// Power per flow and unit of it: the weight of a litre, or one.
    pub weight: f64,
    /// Factor on pressures and powers of the curve, for another density.
    pub dense: (f64, f64),
    /// Whether valve or damper is shut.
    pub shut: bool,
    /// Kind of the lift.
    pub kind: &'static str,
    /// Names of the results that are lift and power put into the fluid.
    pub results: [&'static str; 2],
    /// Symbols of the lift on the curve and of that at the speed it runs at.
    pub symbols: [&'static str; 2],
}

/// Flow at the rated point.
pub(super) const RATED_FLOW: Field =
    positive("rated_flow", "flow", Need::Optional, range(1e-7, 1e3), "flow at the rated point");

/// Efficiency at the rated point.
pub(super) const RATED_EFFICIENCY: Field = quantity(
    "rated_efficiency",
    "percentage",
    Need::Optional,
    Bounds::EFFICIENCY,
    range(0.05, 0.95),
    "power put into the fluid over shaft power at the rated point; instead of rated_power",
);

/// Flow of the stated friction.
pub(super) const SYSTEM_FLOW: Field = positive(
    "system_flow",
    "flow",
    Need::Optional,
    range(1e-7, 1e3),
    "flow at which the friction of the system is stated; the rated flow when not given",
);

/// Shaft power at no flow.
pub(super) const CLOSED_POWER: Field = not_negative(
    "closed_valve_power",
    "mechanical_power",
    Need::Optional,
    range(0.0, 1e8),
    "shaft power at the rated speed with the valve shut; from the curve when that has a point at no flow",
);

/// The points of the curve, and the speed they were taken at.
fn curve(values: &Values, names: &Names, faults: &mut Vec<Fault>) -> Option<(f64, Vec<Point>)> {
    let Some(FieldValue::Points(table)) = values.get("curve") else { return None };
    let taken = table.at.iter().find(|(kind, _)| *kind == "rotational_speed").map(|(_, si)| *si);
    let Some(speed) = taken.or_else(|| values.si("rated_speed")) else {
        faults.push(missing(&[&["rated_speed"]], "a curve belongs to the speed it was taken at"));
        return None;
    };
    let (flows, heads) = (table.column("flow")?, table.column(names.column)?);
    let powers = powers(values, names, table, (flows, heads), faults)?;
    let point = |((flow, head), power): ((&f64, &f64), f64)| Point {
        flow: *flow,
        head: head * names.dense.0,
        power: power * names.dense.1,
    };
    Some((speed, flows.iter().zip(heads).zip(powers).map(point).collect()))
}

/// Shaft power at every point of the curve.
fn powers(
    values: &Values,
    names: &Names,
    table: &Table,
    (flows, heads): (&[f64], &[f64]),
    faults: &mut Vec<Fault>,
) -> Option<Vec<f64>> {
    if let Some(powers) = table.column("power") {
        return Some(powers.to_vec());
    }
    let Some(shares) = table.column("efficiency") else {
        let before = faults.len();
        let torque = rated_torque(values, faults).zip(values.si("rated_speed"));
        let Some((torque, speed)) = torque else {
            if faults.len() == before {
                let why = "every point needs its power or efficiency, or the rated power holds for the point it runs at";
                faults.push(bad_value("curve", why, &[]));
            }
            return None;
        };
        return Some(vec![torque * speed; flows.len()]);
    };
    let closed = values.si(names.closed_power);
    let mut out = Vec::with_capacity(flows.len());
    for ((flow, head), share) in flows.iter().zip(heads).zip(shares) {
        let power = if *flow > 0.0 { Some(names.weight * flow * head / share) } else { closed };
        match power.filter(|power| power.is_finite()) {
            Some(power) => out.push(power),
            None => {
                let why =
                    "at no flow the efficiency says nothing of the power: the closed valve needs its own";
                faults.push(missing(&[&[names.closed_power]], why));
                return None;
            }
        }
    }
    Some(out)
}

/// The rated point, with its speed.
fn rated(values: &Values, names: &Names, faults: &mut Vec<Fault>) -> Option<(f64, Point)> {
    let before = faults.len();
    let speed = values.si("rated_speed");
    let (flow, head) = (values.si("rated_flow"), values.si(names.rated));
    let lifted = flow.zip(head).map(|(flow, head)| names.weight * flow * head);
    let by_share = lifted.zip(values.si("rated_efficiency")).map(|(lifted, share)| lifted / share);
    let stated = rated_torque(values, faults).zip(speed).map(|(torque, speed)| torque * speed);
    if faults.len() > before {
        return None;
    }
    if let (Some(stated), Some(by_share)) = (stated, by_share)
        && differ(stated, by_share, 0.02)
    {
        let template = "flow, lift and efficiency make a shaft power of {0}, not {1}: which are true?";
        let fields = ["rated_flow", names.rated, "rated_efficiency", "rated_power"];
        faults.push(contradiction(
            &fields,
            template,
            &[(by_share, "mechanical_power"), (stated, "mechanical_power")],
        ));
        return None;
    }
    if let (Some(stated), Some(lifted)) = (stated, lifted)
        && lifted > stated
    {
        let template = "{0} goes into the fluid at the rated point, more than the {1} at the shaft";
        let fields = ["rated_flow", names.rated, "rated_power"];
        faults.push(contradiction(
            &fields,
            template,
            &[(lifted, "mechanical_power"), (stated, "mechanical_power")],
        ));
        return None;
    }
    let (Some(speed), Some(power)) = (speed, stated.or(by_share)) else {
        let choices: [&[&'static str]; 4] = [
            &["rated_speed", "rated_power"],
            &["rated_speed", "rated_torque"],
            &["rated_speed", "rated_flow", names.rated, "rated_efficiency"],
            &["curve"],
        ];
        faults.push(missing(&choices, "one rated point, or a curve, settles what it takes"));
        return None;
    };
    let (flow, head) = (flow.unwrap_or(0.0), head.unwrap_or(0.0) * names.dense.0);
    Some((speed, Point { flow, head, power: power * names.dense.1 }))
}

/// The system, if the fields say one.
fn system(values: &Values, names: &Names, faults: &mut Vec<Fault>) -> Option<System> {
    let fixed = values.si(names.fixed).unwrap_or(0.0);
    let flow = values.si(SYSTEM_FLOW.name).or_else(|| values.si("rated_flow"));
    if let Some(lost) = values.si(names.friction) {
        let Some(flow) = flow else {
            faults.push(missing(
                &[&["system_flow"], &["rated_flow"]],
                "friction belongs to the flow it was stated at",
            ));
            return None;
        };
        return Some(System { fixed, friction: lost / (flow * flow) });
    }
    let (Some(flow), Some(head)) = (values.si("rated_flow"), values.si(names.rated)) else {
        if values.get("curve").is_some() || fixed > 0.0 {
            let choices: [&[&'static str]; 2] =
                [&[names.friction, "system_flow"], &["rated_flow", names.rated]];
            faults.push(missing(&choices, "where it works on its curve the system decides"));
        }
        return None;
    };
    let head = head * names.dense.0;
    if fixed > head {
        let template = "the system asks more at no flow than the machine gives at its rated point";
        faults.push(contradiction(&[names.fixed, names.rated], template, &[]));
        return None;
    }
    Some(System { fixed, friction: (head - fixed) / (flow * flow) })
}

/// The machine on its system.
pub(super) fn turbo(values: &Values, names: &Names, faults: &mut Vec<Fault>) -> Option<Turbo> {
    if values.get("curve").is_some() {
        let (speed, points) = curve(values, names, faults)?;
        if names.shut {
            let first = points.iter().min_by(|a, b| a.flow.total_cmp(&b.flow)).filter(|p| p.flow == 0.0);
            let power = values.si(names.closed_power).map(|p| p * names.dense.1).or(first.map(|p| p.power));
            return shut(speed, first.map_or(0.0, |p| p.head), power, names, faults);
        }
        let system = system(values, names, faults)?;
        return Turbo::through(speed, points, system).map_err(|why| faults.push(no_flow(why))).ok();
    }
    let (speed, point) = rated(values, names, faults)?;
    let closed = values.si(names.closed_power).map(|power| power * names.dense.1);
    let head = values.si(names.closed).map(|head| head * names.dense.0);
    if names.shut {
        return shut(speed, head.unwrap_or(0.0), closed, names, faults);
    }
    if values.si(names.fixed).unwrap_or(0.0) == 0.0 && values.si(names.friction).is_none() {
        return Some(Turbo::similar(speed, point));
    }
    let system = system(values, names, faults)?;
    let (Some(head), Some(power)) = (head, closed) else {
        let choices: [&[&'static str]; 2] = [&["curve"], &[names.closed, names.closed_power]];
        let why =
            "on a system that is not the rated point's own parabola the flow moves along the machine's curve";
        faults.push(missing(&choices, why));
        return None;
    };
    if point.flow == 0.0 || head <= point.head {
        let why = "a curve from no flow to the rated point falls: it needs a rated flow, and less head there";
        faults.push(bad_value(names.closed, why, &[]));
        return None;
    }
    let closed = Point { flow: 0.0, head, power };
    Turbo::parabola(speed, closed, point, system).map_err(|why| faults.push(no_flow(why))).ok()
}

fn shut(speed: f64, head: f64, power: Option<f64>, names: &Names, faults: &mut Vec<Fault>) -> Option<Turbo> {
    if power.is_none() {
        let why = "with the valve shut it takes its power at no flow";
        faults.push(missing(&[&[names.closed_power], &["curve"]], why));
    }
    Some(Turbo::shut(speed, head, power?))
}

fn no_flow(why: NoFlow) -> Fault {
    let why = match why {
        NoFlow::NoCurve => "a curve needs two points at least, each at a flow of its own",
        NoFlow::NoClosedValve => "against a static head the curve needs its point at no flow",
        NoFlow::Beyond => {
            "the flow would lie beyond the last point: give points farther out, or the system's friction"
        }
        NoFlow::Twice => {
            "machine and system meet more than once: such a machine hunts between flows, and no sole point can be told"
        }
    };
    bad_value("curve", why, &[])
}

/// The load with its results and the symbols of its formulas.
pub(super) fn load(
    turbo: &Turbo,
    names: &Names,
    values: &Values,
    faults: &mut Vec<Fault>,
) -> Resisting<Against<TurboLaw>> {
    let has = |field: &str| values.get(field).is_some();
    let flow = names.shut || has("curve") || has(RATED_FLOW.name);
    let lift = flow && (has("curve") || has(if names.shut { names.closed } else { names.rated }));
    let lacking = if flow { names.rated } else { RATED_FLOW.name };
    let own = |known: bool, kind, out, scale| {
        if known { Own::law(kind, Against(turbo.law(out, scale))) } else { Own::Missing(lacking) }
    };
    let [name_of_lift, name_of_power] = names.results;
    let mut load = Resisting {
        breakaway: breakaway(values, Motion::Rotary, 0.0, faults),
        usual_speed: values.si("rated_speed"),
        measured: turbo.measured(),
        own: vec![
            ("flow", own(flow, "flow", Out::Flow, 1.0)),
            (name_of_lift, own(lift, names.kind, Out::Head, 1.0)),
            (name_of_power, own(lift, "mechanical_power", Out::Lifted, names.weight)),
            ("efficiency", own(lift, "percentage", Out::Share, names.weight)),
        ],
        ..Resisting::new(Motion::Rotary, Against(turbo.law(Out::Torque, 1.0)), values, faults)
    };
    let even = |out| -> Arc<dyn Curve> { Arc::new(turbo.law(out, 1.0)) };
    load.symbols.push(("w_r", turbo.speed()));
    load.moving.push(("P_q", even(Out::CurvePower)));
    if flow {
        load.moving.extend([("q", even(Out::CurveFlow)), ("Q", even(Out::Flow))]);
    }
    if lift {
        let [on_curve, here] = names.symbols;
        load.moving.extend([(on_curve, even(Out::CurveHead)), (here, even(Out::Head))]);
    }
    load
}
