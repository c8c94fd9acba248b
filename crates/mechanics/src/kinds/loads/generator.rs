//! An electrical machine that is driven.

use super::fields::{BREAKAWAY_TORQUE, RATED_SPEED};
use super::resisting::{Resisting, breakaway};
use crate::curve::{Against, Curve, Law, PowerOf};
use crate::fault::Fault;
use crate::kinds::fields::{
    EFFICIENCY, FLYWHEEL_EFFECT, INERTIA, MAX_SPEED, default, not_negative, plain, positive, range,
};
use crate::kinds::reading::{contradiction, done, missing, only_one};
use crate::laws::bounded_power::{self, BoundedPower};
use crate::laws::drag::Powers;
use crate::laws::generator::{self as law, Magnets};
use crate::model::{Model, Motion, Own};
use crate::registry::{Field, KindRow, Need, ResultRow, ResultShape, Role, Shape};
use crate::scalar::Real;
use crate::values::Values;

/// The row.
pub static ROW: KindRow = KindRow {
    role: Role::Load,
    name: "generator",
    title: "generator",
    summary: "Any electrical machine that is driven: by its rated point and what its regulation holds as the speed changes, \
              or a machine with permanent magnets on a resistor or a battery. A switched-off field or an open circuit is \
              loaded = no.",
    fields: FIELDS,
    results: RESULTS,
    formulas: &[
        law::RATED,
        bounded_power::BOUNDED_TORQUE,
        law::CURRENT_IN_RESISTOR,
        law::CHARGING_CURRENT,
        law::TORQUE_OF_CURRENT,
    ],
    cautions: &[
        "A machine with permanent magnets is live whenever it turns, and without its load the turbine or engine runs away \
         from it: say the highest speed, and judge it with loaded = no.",
    ],
    example: "load charger: generator { torque_constant = 0.62 N·m/A; winding_resistance = 0.4 Ω; charging_voltage = 29 V }",
    build,
    given: |_| Vec::new(),
};

/// The words of `regulation`.
const REGULATIONS: &[(&str, &str)] = &[
    ("constant_power", "holds its electrical power; needs max_torque or from_speed"),
    ("constant_torque", "holds its torque"),
    ("resistor", "works on a fixed resistance: torque in step with speed"),
    ("tracking", "follows the greatest power of wind or water: torque with the square of the speed"),
];

static FIELDS: &[Field] = &[
    positive(
        "rated_power",
        "electrical_power",
        Need::OneOf,
        range(1e-2, 1e9),
        "electrical power it gives at its rated speed",
    ),
    RATED_SPEED,
    Field {
        need: Need::Optional,
        meaning: "electrical power out over shaft power in at the rated point, taken so at every speed",
        ..EFFICIENCY
    },
    plain(
        "regulation",
        Shape::Choice(REGULATIONS),
        Need::Optional,
        "what it holds as the speed changes; with rated_power",
    ),
    positive(
        "max_torque",
        "torque",
        Need::Optional,
        range(1e-3, 1e8),
        "most torque it takes, at constant power",
    ),
    positive(
        "from_speed",
        "rotational_speed",
        Need::Optional,
        range(0.1, 1e4),
        "speed from which it gives its constant power; instead of max_torque",
    ),
    positive(
        "torque_constant",
        "torque_constant",
        Need::OneOf,
        range(1e-4, 1e4),
        "torque for each ampere of a machine with permanent magnets, the same number as volts for each rad/s",
    ),
    positive(
        "voltage_constant",
        "voltage_constant",
        Need::OneOf,
        range(1e-4, 1e4),
        "volts at no current for each speed; instead of torque_constant",
    ),
    positive(
        "winding_resistance",
        "resistance",
        Need::Optional,
        range(1e-5, 1e4),
        "resistance of winding and cables, warm; with torque_constant",
    ),
    positive("load_resistance", "resistance", Need::Optional, range(1e-5, 1e6), "resistance it works on"),
    positive(
        "charging_voltage",
        "voltage",
        Need::Optional,
        range(0.5, 2e3),
        "voltage of the battery it charges, with the drop of its rectifier; instead of load_resistance",
    ),
    not_negative(
        "idle_torque",
        "torque",
        default(0.0, "iron and friction left aside; the efficiency of a rated point holds them"),
        range(0.0, 1e5),
        "torque of the idle losses, of a machine with permanent magnets",
    ),
    plain(
        "loaded",
        Shape::Flag,
        default(1.0, "as it works; the open circuit is a case of its own"),
        "whether its circuit is closed and its field is on",
    ),
    BREAKAWAY_TORQUE,
    INERTIA,
    FLYWHEEL_EFFECT,
    MAX_SPEED,
];

static RESULTS: &[ResultRow] = &[
    ResultRow {
        name: "electrical_power",
        shape: ResultShape::Quantity("electrical_power"),
        meaning: "electrical power it gives",
    },
    ResultRow { name: "current", shape: ResultShape::Quantity("current"), meaning: "current it gives" },
    ResultRow { name: "voltage", shape: ResultShape::Quantity("voltage"), meaning: "voltage at its load" },
    ResultRow {
        name: "efficiency",
        shape: ResultShape::Quantity("percentage"),
        meaning: "electrical power out over shaft power in",
    },
];

/// Torque over a speed of zero or above.
#[derive(Clone, Copy, Debug)]
enum Machine {
    Open(f64),
    Power(BoundedPower),
    Rated(Powers),
    Magnets(Magnets),
}

impl Law for Machine {
    fn eval<R: Real>(&self, speed: R) -> R {
        match self {
            Self::Open(idle) => R::of(*idle),
            Self::Power(law) => law.eval(speed),
            Self::Rated(law) => law.at(speed),
            Self::Magnets(law) => law.eval(speed),
        }
    }

    fn kinks(&self) -> Vec<f64> {
        match self {
            Self::Open(_) | Self::Rated(_) => Vec::new(),
            Self::Power(law) => Law::kinks(law),
            Self::Magnets(law) => Law::kinks(law),
        }
    }
}

/// What is asked of a machine with permanent magnets beside its torque.
#[derive(Clone, Copy, Debug)]
enum Side {
    Power,
    Current,
    Voltage,
    Share,
}

#[derive(Clone, Copy, Debug)]
struct OfMagnets(Magnets, Side);

impl Law for OfMagnets {
    fn eval<R: Real>(&self, speed: R) -> R {
        let (magnets, speed) = (&self.0, speed.abs());
        match self.1 {
            Side::Power => magnets.power(speed),
            Side::Current => magnets.current(speed),
            Side::Voltage => magnets.voltage(speed),
            Side::Share => magnets.power(speed) / (magnets.eval(speed) * speed),
        }
    }
}

/// A law with its results and the symbols of its formulas.
struct Read {
    machine: Machine,
    own: Vec<(&'static str, Own)>,
    symbols: Vec<(&'static str, f64)>,
    moving: Vec<(&'static str, std::sync::Arc<dyn Curve>)>,
}

fn by_point(values: &Values, faults: &mut Vec<Fault>) -> Option<Read> {
    let si = |name| values.si(name);
    let (Some(power), Some(speed), Some(share), Some(regulation)) =
        (si("rated_power"), si("rated_speed"), si("efficiency"), values.word("regulation"))
    else {
        let why =
            "a rated point is a power at a speed, with an efficiency and what holds as the speed changes";
        faults.push(missing(&[&["rated_power", "rated_speed", "efficiency", "regulation"]], why));
        return None;
    };
    let torque = power / (share * speed);
    let mut symbols = vec![("P_r", power), ("eta", share), ("w_r", speed)];
    let exponent = match regulation {
        "constant_torque" => Some(0),
        "resistor" => Some(1),
        "tracking" => Some(2),
        _ => None,
    };
    let machine = match exponent {
        Some(exponent) => {
            symbols.push(("n", exponent as f64));
            Machine::Rated(Powers::through(exponent, speed, torque))
        }
        None => {
            let why =
                "at constant power the torque at rest has no end: say the most, or the speed it begins at";
            let way = only_one(values, &["max_torque", "from_speed"], why, faults)?;
            let bound = si(way)?;
            let shaft = power / share;
            let most = if way == "max_torque" { bound } else { shaft / bound };
            symbols.extend([("T_max", most), ("P", shaft)]);
            Machine::Power(BoundedPower { power: shaft, most })
        }
    };
    let own = vec![
        ("electrical_power", Own::law("electrical_power", PowerOf(Against(machine), share))),
        ("current", Own::Missing("torque_constant")),
        ("voltage", Own::Missing("torque_constant")),
        ("efficiency", Own::law("percentage", crate::curve::Constant(share))),
    ];
    Some(Read { machine, own, symbols, moving: Vec::new() })
}

fn by_magnets(values: &Values, constant: f64, faults: &mut Vec<Fault>) -> Option<Read> {
    let why = "what it works on: a resistance, or a battery by its charging voltage";
    let way = only_one(values, &["load_resistance", "charging_voltage"], why, faults)?;
    let on = values.si(way)?;
    let Some(winding) = values.si("winding_resistance") else {
        faults.push(missing(&[&["winding_resistance"]], "the current goes by the resistance of the winding"));
        return None;
    };
    let idle = values.si("idle_torque").unwrap_or(0.0);
    let magnets = match way {
        "load_resistance" => Magnets::resistor(constant, winding, on),
        _ => Magnets::battery(constant, winding, on),
    };
    let magnets = Magnets { idle, ..magnets };
    let side = |kind, side| Own::law(kind, OfMagnets(magnets, side));
    Some(Read {
        machine: Machine::Magnets(magnets),
        own: vec![
            ("electrical_power", side("electrical_power", Side::Power)),
            ("current", side("current", Side::Current)),
            ("voltage", side("voltage", Side::Voltage)),
            ("efficiency", side("percentage", Side::Share)),
        ],
        symbols: vec![
            ("k", constant),
            ("R_a", winding),
            (if way == "load_resistance" { "R_L" } else { "U" }, on),
            ("T_0", idle),
        ],
        moving: vec![("I", std::sync::Arc::new(OfMagnets(magnets, Side::Current)))],
    })
}

/// The torque constant by whichever field says it; none where the machine is given by a rated point.
fn constant(values: &Values, faults: &mut Vec<Fault>) -> Option<f64> {
    match (values.si("torque_constant"), values.si("voltage_constant")) {
        (Some(_), Some(_)) => {
            let fields = ["torque_constant", "voltage_constant"];
            faults.push(contradiction(&fields, "these say the same thing twice; keep one", &[]));
            None
        }
        (torque, voltage) => torque.or(voltage),
    }
}

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    let mut faults = Vec::new();
    let constant = constant(values, &mut faults);
    let read = match constant {
        Some(constant) if values.si("rated_power").is_none() => by_magnets(values, constant, &mut faults),
        Some(_) => {
            let fields = ["rated_power", "torque_constant"];
            let how = "a rated point with its regulation, or a machine with permanent magnets; keep one";
            faults.push(contradiction(&fields, how, &[]));
            None
        }
        None if values.si("rated_power").is_none() && faults.is_empty() => {
            let choices: [&[&'static str]; 2] = [
                &["rated_power", "rated_speed", "efficiency", "regulation"],
                &["torque_constant", "winding_resistance", "load_resistance"],
            ];
            faults.push(missing(&choices, "its rated point, or its constants, settle what it takes"));
            None
        }
        None => by_point(values, &mut faults),
    };
    let Some(mut read) = read else { return Err(faults) };
    if values.flag("loaded") == Some(false) {
        let zero = |kind| Own::law(kind, crate::curve::Constant(0.0));
        read.own = vec![("electrical_power", zero("electrical_power")), ("current", zero("current"))];
        read.machine = Machine::Open(values.si("idle_torque").unwrap_or(0.0));
        read.symbols.clear();
        read.moving.clear();
    }
    let given = breakaway(values, Motion::Rotary, 0.0, &mut faults);
    let mut load = Resisting {
        breakaway: f64::max(given, read.machine.eval(0.0)),
        usual_speed: values.si("rated_speed"),
        symbols: read.symbols,
        own: read.own,
        ..Resisting::new(Motion::Rotary, Against(read.machine), values, &mut faults)
    };
    load.moving.extend(read.moving);
    done(Model::Load(Box::new(load)), faults)
}

#[cfg(test)]
mod tests {
    use super::build;
    use crate::kinds::loads::testing::{loaded, result};
    use crate::laws::testing::close;
    use crate::model::Load;
    use crate::values::{FieldValue, FieldValue::Si, Values};

    fn built(values: &Values) -> Box<dyn Load> {
        loaded(build(values))
    }

    #[test]
    fn by_its_rated_point() {
        let point = Values::default()
            .with("rated_power", Si(900.0))
            .with("rated_speed", Si(100.0))
            .with("efficiency", Si(0.9));
        assert!(build(&point).is_err());
        for (word, at_half) in [("constant_torque", 10.0), ("resistor", 5.0), ("tracking", 2.5)] {
            let load = built(&point.clone().with("regulation", FieldValue::Word(word)));
            close(load.demand().at(50.0), at_half, 1e-12);
            close(result(load.as_ref(), "electrical_power", 50.0), at_half * 45.0, 1e-12);
        }
        let power = point.with("regulation", FieldValue::Word("constant_power"));
        assert!(build(&power).is_err());
        let load = built(&power.with("from_speed", Si(40.0)));
        close(result(load.as_ref(), "electrical_power", 200.0), 900.0, 1e-12);
    }

    #[test]
    fn magnets_on_a_battery() {
        let magnets = Values::default()
            .with("torque_constant", Si(0.8))
            .with("winding_resistance", Si(0.5))
            .with("charging_voltage", Si(48.0))
            .with("idle_torque", Si(0.3));
        let load = built(&magnets);
        close(load.demand().at(65.0), 6.7, 1e-12);
        close(load.demand().at(30.0), 0.3, 1e-12);
        close(result(load.as_ref(), "electrical_power", 65.0), 384.0, 1e-12);
        close(result(load.as_ref(), "efficiency", 65.0), 384.0 / (6.7 * 65.0), 1e-12);
        close(result(load.as_ref(), "voltage", 30.0), 24.0, 1e-12);
        let open = built(&magnets.clone().with("loaded", FieldValue::Flag(false)));
        close(open.demand().at(65.0), 0.3, 1e-12);
        assert!(build(&magnets.with("voltage_constant", Si(0.8))).is_err());
    }
}
