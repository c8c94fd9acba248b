//! A three-phase induction machine from its equivalent circuit.

use super::circuit_draw::CircuitDraw;
use super::circuit_fields::{CIRCUIT_FIELDS, DELTA, INVERTER};
use super::starting::start;
use super::straight_line::ratings;
use crate::fault::{Fault, Note};
use crate::kinds::reading::{HoldBack, bad_value, contradiction, differ, done, inertia, missing, returning};
use crate::laws::induction_circuit::{self as law, Circuit, CircuitCurve, Start};
use crate::laws::synchronous;
use crate::model::{Characteristic, Draw, Feed, Known, Model, Motion, Ratings, Source, SourceState};
use crate::registry::{KindRow, ResultRow, ResultShape, Role};
use crate::solution::{Answer, Marks};
use crate::values::{Duty, Values};

/// The row.
pub static ROW: KindRow = KindRow {
    role: Role::Source,
    name: "induction_circuit",
    title: "induction machine by its circuit",
    summary: "A three-phase induction machine from the equivalent circuit of one phase, computed without the usual \
              simplifications: torque, current, power factor and efficiency at any voltage and frequency, started \
              directly, in star or softly, or fed by an inverter. Above its synchronous speed it generates.",
    fields: CIRCUIT_FIELDS,
    results: RESULTS,
    formulas: &[
        synchronous::SYNCHRONOUS_SPEED,
        synchronous::SLIP,
        law::THEVENIN_VOLTAGE,
        law::THEVENIN_RESISTANCE,
        law::THEVENIN_REACTANCE,
        law::AIR_GAP_TORQUE,
        law::BREAKDOWN_SLIP,
        law::SHAFT_TORQUE,
    ],
    cautions: &[
        "Torque and current of standstill and breakdown are for seconds: the rated values at their duty are what the \
         machine can do for long.",
        "Deep bars and saturated leakage paths give more torque and current near standstill than constant parameters say.",
        "Work on mains is for licensed electricians; motor protection follows the local code.",
    ],
    example: "supply works: mains { voltage = 400 V; frequency = 50 Hz; accepts_return = yes }\n\
              source motor: induction_circuit { supply = works; rated_frequency = 50 Hz; poles = 4; connection = star; \
              stator_resistance = 0.9 Ω; stator_reactance = 1.6 Ω; rotor_resistance = 0.8 Ω; rotor_reactance = 1.9 Ω; \
              magnetizing_reactance = 45 Ω; rotational_loss = 90 W; inertia = 0.03 kg·m² }",
    build,
    given: |_| Vec::new(),
};

static RESULTS: &[ResultRow] = &[
    result("synchronous_speed", "rotational_speed", "speed of the field at the machine's frequency"),
    result("slip", "percentage", "how far the shaft lags behind the field; below zero it generates"),
    result("rotor_frequency", "frequency", "frequency of the currents in the rotor"),
    result("power_factor", "number", "active over apparent power at the terminals"),
    result("line_current", "current", "current in each line, the starter's and connection's share counted"),
    result("rotor_current", "current", "current of a rotor phase, referred to the stator"),
    result("air_gap_torque", "torque", "torque in the air gap, friction and windage not yet taken off"),
    result("locked_rotor_torque", "torque", "torque at standstill, as it is started"),
    result("locked_rotor_current", "current", "current in each line at standstill, as it is started"),
    result("breakdown_torque", "torque", "highest torque in the air gap at full voltage"),
    result("breakdown_speed", "rotational_speed", "speed of the breakdown torque"),
    result("breakdown_slip", "percentage", "slip of the breakdown torque"),
    result("thevenin_voltage", "voltage", "voltage of the stator seen from the rotor"),
    result("thevenin_resistance", "resistance", "resistance of the stator seen from the rotor"),
    result("thevenin_reactance", "resistance", "reactance of the stator seen from the rotor"),
];

const fn result(name: &'static str, kind: &'static str, meaning: &'static str) -> ResultRow {
    ResultRow { name, shape: ResultShape::Quantity(kind), meaning }
}

/// Inverter settings.
#[derive(Clone, Copy, Debug)]
struct Inverter {
    /// Hz
    frequency: f64,
    /// Voltage between lines at the rated frequency.
    rated_voltage: f64,
}

#[derive(Debug)]
struct InductionCircuit {
    /// At rated frequency; its voltage is set by the feed.
    circuit: Circuit,
    rated_frequency: f64,
    rated_voltage: Option<f64>,
    poles: f64,
    delta: bool,
    rotational: f64,
    start: Option<Start>,
    current_limit: Option<f64>,
    inverter: Option<Inverter>,
    inertia: Known,
    ratings: Ratings,
}

fn inverter(values: &Values, faults: &mut Vec<Fault>) -> Option<Inverter> {
    let frequency = values.si("output_frequency");
    if values.word("control") != Some(INVERTER) {
        if frequency.is_some() {
            let how =
                "an output frequency belongs to an inverter, and this machine hangs directly on its supply";
            faults.push(contradiction(&["output_frequency", "control"], how, &[]));
        }
        return None;
    }
    let voltage = values.si("rated_voltage");
    if frequency.is_none() || voltage.is_none() {
        let why =
            "what the inverter puts out: its frequency, and the voltage that belongs to the rated frequency";
        faults.push(missing(&[&["output_frequency", "rated_voltage"]], why));
    }
    if values.word("starting").is_some_and(|word| word != "direct") {
        let how = "an inverter starts the machine by its frequency, not in star or with reduced voltage";
        faults.push(contradiction(&["control", "starting"], how, &[]));
    }
    Some(Inverter { frequency: frequency?, rated_voltage: voltage? })
}

fn build(values: &Values) -> Result<Model, Vec<Fault>> {
    let mut faults = Vec::new();
    let inertia = inertia(values, &mut faults);
    let field = |name| values.si(name).unwrap_or(0.0);
    let poles = field("poles");
    if (poles / 2.0) != (poles / 2.0).round() {
        faults.push(bad_value("poles", "poles come in pairs: 2, 4, 6 …, not {0}", &[(poles, "number")]));
    }
    let delta = values.word("connection") == Some(DELTA);
    let start = start(values, &mut faults);
    if start.is_some() && values.word("starting") == Some("star_delta") && !delta {
        let how = "a motor that is started in star runs in delta";
        faults.push(contradiction(&["starting", "connection"], how, &[]));
    }
    let magnetizing = values.si("magnetizing_reactance");
    let core = values.si("core_resistance");
    if core.is_some() && magnetizing.is_none() {
        let why = "the core-loss resistance lies across the magnetising reactance";
        faults.push(missing(&[&["magnetizing_reactance"]], why));
    }
    let circuit = Circuit {
        r1: field("stator_resistance"),
        x1: field("stator_reactance"),
        r2: field("rotor_resistance"),
        x2: field("rotor_reactance"),
        magnetizing,
        core,
        voltage: 0.0,
    };
    let machine = InductionCircuit {
        circuit,
        rated_frequency: field("rated_frequency"),
        rated_voltage: values.si("rated_voltage"),
        poles,
        delta,
        rotational: field("rotational_loss"),
        start,
        current_limit: values.si("current_limit"),
        inverter: inverter(values, &mut faults),
        inertia,
        ratings: Ratings {
            power: values.si("rated_power"),
            current: values.si("rated_current"),
            ..ratings(values, "rated_torque")
        },
    };
    done(Model::Source(Box::new(machine)), faults)
}

impl InductionCircuit {
    /// Voltage between lines and frequency at the machine.
    fn terminals(&self, feed: &Feed) -> Result<(f64, f64), Vec<Fault>> {
        let Some(supply) = feed.supply else {
            return Err(vec![missing(&[&["supply"]], "voltage and frequency of the mains it hangs on")]);
        };
        let Some(voltage) = supply.voltage.filter(|_| supply.frequency.is_some() || self.inverter.is_some())
        else {
            let why = "an induction machine needs a supply with voltage and frequency: mains; or an inverter";
            return Err(vec![bad_value("supply", why, &[])]);
        };
        match self.inverter {
            // Constant voltage over frequency up to the rated one, constant voltage above: the field weakens.
            Some(inverter) => {
                let wanted =
                    inverter.rated_voltage * f64::min(1.0, inverter.frequency / self.rated_frequency);
                Ok((f64::min(wanted, voltage), inverter.frequency))
            }
            None => Ok((voltage, supply.frequency.unwrap_or(self.rated_frequency))),
        }
    }

    fn curve(&self, feed: &Feed) -> Result<CircuitCurve, Vec<Fault>> {
        let (voltage, frequency) = self.terminals(feed)?;
        let ratio = frequency / self.rated_frequency;
        let phase = if self.delta { voltage } else { voltage / 3.0_f64.sqrt() };
        let circuit = Circuit {
            x1: self.circuit.x1 * ratio,
            x2: self.circuit.x2 * ratio,
            magnetizing: self.circuit.magnetizing.map(|x| x * ratio),
            voltage: phase,
            ..self.circuit
        };
        let rated_field = synchronous::synchronous_speed(self.rated_frequency, self.poles);
        let field = synchronous::synchronous_speed(frequency, self.poles);
        if let Some(start) = self.start.filter(|start| start.until >= field) {
            let why = "the change to full voltage at {0} is not reached: the synchronous speed is {1}";
            let quantities = [(start.until, "rotational_speed"), (field, "rotational_speed")];
            return Err(vec![bad_value("changeover_speed", why, &quantities)]);
        }
        Ok(CircuitCurve {
            rotational: (self.rotational > 0.0).then_some((self.rotational, rated_field)),
            start: self.start,
            current_limit: self.current_limit,
            lines: if self.delta { 3.0_f64.sqrt() } else { 1.0 },
            ..circuit.on(field)
        })
    }

    /// Whether the circuit is used away from the voltage it was given for.
    fn scaled(&self, feed: &Feed) -> bool {
        let Ok((voltage, frequency)) = self.terminals(feed) else { return false };
        let Some(rated) = self.rated_voltage else { return false };
        differ(voltage / frequency, rated / self.rated_frequency, 0.05)
    }

    fn quantity(
        &self,
        curve: &CircuitCurve,
        name: &str,
        state: &SourceState<'_>,
    ) -> Option<(f64, &'static str)> {
        let slip = curve.slip(state.speed);
        let no_branch = curve.circuit.magnetizing.is_none();
        let shared = curve.share(state.speed);
        Some(match name {
            "synchronous_speed" => (curve.field_speed, "rotational_speed"),
            "slip" => (slip, "percentage"),
            "rotor_frequency" => {
                (slip.abs() * curve.field_speed * self.poles / (4.0 * core::f64::consts::PI), "frequency")
            }
            "power_factor" if !no_branch => {
                let (active, reactive) = curve.power(slip);
                (active.abs() / (active * active + reactive * reactive).sqrt(), "number")
            }
            "line_current" if !no_branch => {
                (curve.phase_current(slip) * curve.line_factor(state.speed, shared), "current")
            }
            "rotor_current" => (curve.rotor_current(slip) * shared.max(0.0).sqrt(), "current"),
            "air_gap_torque" => ((state.effort + curve.friction(state.speed)).abs(), "torque"),
            "locked_rotor_torque" => (curve.air_gap_torque(1.0) * curve.share(0.0), "torque"),
            "locked_rotor_current" if !no_branch => {
                (curve.phase_current(1.0) * curve.line_factor(0.0, curve.share(0.0)), "current")
            }
            "breakdown_torque" => (curve.air_gap_torque(curve.breakdown_slip()), "torque"),
            "breakdown_speed" => (curve.field_speed * (1.0 - curve.breakdown_slip()), "rotational_speed"),
            "breakdown_slip" => (curve.breakdown_slip(), "percentage"),
            "thevenin_voltage" => (curve.seen.voltage, "voltage"),
            "thevenin_resistance" => (curve.seen.resistance, "resistance"),
            "thevenin_reactance" => (curve.seen.reactance, "resistance"),
            _ => return None,
        })
    }
}

impl Source for InductionCircuit {
    fn motion(&self) -> Motion {
        Motion::Rotary
    }

    fn inertia(&self) -> Known {
        self.inertia
    }

    fn characteristic(&self, feed: &Feed) -> Result<Characteristic, Vec<Fault>> {
        let curve = self.curve(feed)?;
        let braking = returning(feed, || Box::new(HoldBack(curve)));
        let mut character = Characteristic::new(Box::new(curve), braking, curve.field_speed);
        character.scaled = self.scaled(feed);
        character.follows_set_speed = false;
        Ok(character)
    }

    fn draw(&self, feed: &Feed) -> Option<Box<dyn Draw>> {
        Some(Box::new(CircuitDraw { curve: self.curve(feed).ok()? }))
    }

    fn ratings(&self, _duty: Option<Duty>) -> Ratings {
        self.ratings
    }

    fn limited_by(&self, feed: &Feed, speed: f64) -> &'static str {
        match self.curve(feed) {
            Ok(curve) if self.current_limit.is_some() => {
                let free = CircuitCurve { current_limit: None, ..curve };
                if curve.share(speed) < free.share(speed) { "current" } else { "torque" }
            }
            _ => "torque",
        }
    }

    fn answer(&self, name: &str, state: &SourceState<'_>) -> Option<Answer> {
        let curve = self.curve(state.feed).ok()?;
        match self.quantity(&curve, name, state) {
            Some((si, kind)) => {
                let marks = Marks { outside: false, scaled: self.scaled(state.feed) };
                Some(Answer::Quantity { si, kind, marks })
            }
            None if ROW.results.iter().any(|row| row.name == name) => {
                let why = "the circuit has no magnetising branch: its current and power factor are not known";
                Some(Answer::Absent(Note::plain(why)))
            }
            None => None,
        }
    }

    fn symbols(&self, state: &SourceState<'_>) -> Vec<(&'static str, f64)> {
        let Ok(curve) = self.curve(state.feed) else { return Vec::new() };
        let Ok((_, frequency)) = self.terminals(state.feed) else { return Vec::new() };
        let slip = curve.slip(state.speed);
        let mut out = vec![
            ("f", frequency),
            ("p", self.poles),
            ("w_s", curve.field_speed),
            ("w", state.speed),
            ("s", slip),
            ("U_p", curve.circuit.voltage),
            ("R_1", curve.circuit.r1),
            ("X_1", curve.circuit.x1),
            ("R_2", curve.circuit.r2),
            ("X_2", curve.circuit.x2),
            ("U_th", curve.seen.voltage),
            ("R_th", curve.seen.resistance),
            ("X_th", curve.seen.reactance),
            ("T_g", curve.air_gap_torque(slip)),
            ("T_r", curve.friction(state.speed)),
            ("y", curve.share(state.speed)),
        ];
        out.extend(curve.circuit.magnetizing.filter(|_| curve.circuit.core.is_none()).map(|x| ("X_m", x)));
        out
    }
}

#[cfg(test)]
mod tests;
