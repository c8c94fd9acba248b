//! What a derivation prints is what the model does: the symbols a part gives, put into its row's formulas, make the
//! numbers the solver uses.

use super::samples::{sample, straight_loads};
use crate::kinds::ROWS;
use crate::laws::checked;
use crate::laws::testing::close;
use crate::model::{
    Coupling, Feed, Known, LoadState, Model, Motion, SourceState, SupplyData, TransmissionState,
};
use crate::registry::{Formula, KindRow, Role, row};
use crate::values::Values;
use std::collections::BTreeMap;

type Symbols = BTreeMap<&'static str, f64>;

fn mains() -> SupplyData {
    SupplyData {
        voltage: Some(390.0),
        frequency: Some(50.0),
        accepts_return: Some(true),
        ..SupplyData::default()
    }
}

fn battery() -> SupplyData {
    SupplyData {
        voltage: Some(37.0),
        resistance: Some(0.110),
        accepts_return: Some(true),
        ..SupplyData::default()
    }
}

fn oil_or_air() -> SupplyData {
    SupplyData { pressure: Some(5e6), flow_limit: Some(1.0), ..SupplyData::default() }
}

fn built(row: &KindRow) -> Model {
    (row.build)(&sample(row)).unwrap_or_else(|faults| panic!("{}: {faults:?}", row.name))
}

/// The value of a row's formula; `None` when a symbol of it is not given.
fn value(row: &KindRow, name: &str, symbols: &Symbols) -> Option<f64> {
    row.formulas.iter().filter(|formula| formula.name == name).find_map(|formula| evaluate(formula, symbols))
}

fn evaluate(formula: &Formula, symbols: &Symbols) -> Option<f64> {
    let law = checked()
        .find(|law| law.formula.text == formula.text && law.formula.symbols == formula.symbols)
        .unwrap_or_else(|| panic!("`{}` has no kernel", formula.text));
    let inputs: Option<Vec<f64>> =
        formula.symbols.iter().map(|(name, _, _)| symbols.get(name).copied()).collect();
    Some((law.kernel)(&inputs?))
}

/// Every symbol must belong to a formula of the row.
fn declared(row: &KindRow, symbols: Vec<(&'static str, f64)>) -> Symbols {
    for (name, si) in &symbols {
        let known =
            row.formulas.iter().any(|formula| formula.symbols.iter().any(|(symbol, ..)| symbol == name));
        assert!(known, "{}: no formula names {name}", row.name);
        assert!(si.is_finite(), "{}: {name} is {si}", row.name);
    }
    let count = symbols.len();
    let out: Symbols = symbols.into_iter().collect();
    assert_eq!(out.len(), count, "{}: a symbol twice", row.name);
    out
}

#[test]
fn sources_do_what_they_print() {
    for row in ROWS {
        let Model::Source(source) = built(row) else { continue };
        let supply = match row.name {
            "induction_motor" | "induction_circuit" => mains(),
            "hydraulic_motor" | "pneumatic_motor" => oil_or_air(),
            _ => battery(),
        };
        let feed = Feed { supply: Some(supply), machines: 1.0, ambient: None, altitude: None };
        let curve = source.characteristic(&feed).unwrap_or_else(|faults| panic!("{faults:?}")).drive;
        let speed = if source.motion() == Motion::Linear { 1.3 } else { 120.0 };
        let effort = curve.at(speed);
        let symbols = declared(row, source.symbols(&SourceState { speed, effort, feed: &feed }));
        // What holds its speed whatever it takes has no torque of its own to print.
        if row.formulas.is_empty() {
            continue;
        }
        let (name, factor) = match row.name {
            "straight_line_force" => ("force", 1.0),
            "servo" => ("torque_above_corner", 1.0),
            "water_turbine" => ("torque_at_head", 1.0),
            "induction_motor" => {
                let torque = value(row, "torque_below_breakdown", &symbols).unwrap();
                let at_slip = if symbols["s"] > symbols["s_b"] { torque } else { symbols["K"] };
                close(at_slip, symbols["T"], 1e-12);
                ("torque_at_voltage", 1.0)
            }
            _ => ("torque", 1.0),
        };
        close(value(row, name, &symbols).unwrap() * factor, effort, 1e-12);
    }
}

#[test]
fn transmissions_do_what_they_print() {
    for row in ROWS {
        let Model::Transmission(part) = built(row) else { continue };
        let Coupling { speed, effort, forward, backward, .. } = part.coupling(0);
        let state = TransmissionState {
            input_speed: 30.0,
            input_effort: 8.0,
            output_speed: 30.0 / speed,
            output_effort: 8.0 * effort * forward,
            gear: 0,
        };
        let symbols = declared(row, part.symbols(&state));
        if let Some(out) = value(row, "speed", &symbols) {
            close(out, state.output_speed, 1e-12);
        }
        let name = if part.output() == Motion::Linear { "force" } else { "torque" };
        if let Some(out) = value(row, name, &symbols) {
            close(out, state.output_effort, 1e-12);
        }
        if let (Some(back), Known::Value(backward)) =
            (value(row, "input_torque_backward", &symbols), backward)
        {
            close(back, state.output_effort * backward / effort, 1e-12);
        }
        let losing = row.fields.iter().any(|field| field.name == "efficiency");
        assert_eq!(losing, value(row, name, &symbols).is_some(), "{}", row.name);
    }
}

fn prints_its_demand(row: &KindRow, values: &Values) {
    let Ok(Model::Load(load)) = (row.build)(values) else { panic!("{} is no load", row.name) };
    let speed = if load.motion() == Motion::Linear { 4.0 } else { 120.0 };
    let effort = load.demand().at(speed);
    let symbols = declared(row, load.symbols(&LoadState { speed, effort }));
    let name = if load.motion() == Motion::Linear { "force" } else { "torque" };
    match value(row, name, &symbols) {
        Some(printed) => close(printed, effort, 1e-12),
        None => assert_eq!(row.name, "flywheel"),
    }
}

#[test]
fn loads_do_what_they_print() {
    for row in ROWS.iter().filter(|row| row.role == Role::Load) {
        prints_its_demand(row, &sample(row));
    }
    for (name, values) in straight_loads() {
        prints_its_demand(row(Role::Load, name).unwrap(), &values);
    }
}

#[test]
fn supplies_do_what_they_print() {
    for row in ROWS {
        let Model::Supply(supply) = built(row) else { continue };
        let symbols = declared(row, supply.symbols(12.0));
        if let Some(voltage) = value(row, "voltage", &symbols) {
            close(voltage, supply.terminal(12.0), 1e-12);
        }
        let given: BTreeMap<&str, f64> = (row.given)(&sample(row)).into_iter().collect();
        assert_eq!(value(row, "peak_power", &symbols), given.get("peak_power").copied(), "{}", row.name);
    }
}

#[test]
fn given_results_are_named_in_the_row() {
    for row in ROWS {
        for (name, si) in (row.given)(&sample(row)) {
            assert!(row.results.iter().any(|result| result.name == name), "{}: {name}", row.name);
            assert!(si.is_finite(), "{}: {name} is {si}", row.name);
        }
    }
}
