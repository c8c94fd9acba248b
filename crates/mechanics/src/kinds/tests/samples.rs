//! One part of every kind, by its fields, for tests that hold for all of them.

use crate::registry::{KindRow, Role};
use crate::values::{FieldValue, Gear, Table, Values};

fn si(fields: &[(&'static str, f64)]) -> Values {
    fields.iter().fold(Values::default(), |values, (name, si)| values.with(name, FieldValue::Si(*si)))
}

fn table(columns: &[(&'static str, &[f64])]) -> FieldValue {
    let columns = columns.iter().map(|(name, values)| (*name, values.to_vec())).collect();
    FieldValue::Points(Table { columns, at: Vec::new() })
}

fn losses(values: Values) -> Values {
    values.with("efficiency", FieldValue::Si(0.9)).with("efficiency_backward", FieldValue::Si(0.8))
}

fn source(name: &str) -> Option<Values> {
    Some(match name {
        "straight_line" => si(&[("stall_torque", 10.0), ("no_load_speed", 200.0)]),
        "straight_line_force" => si(&[("stall_force", 300.0), ("no_load_speed", 2.0)]),
        "dc_motor" => si(&[("torque_constant", 0.11), ("resistance", 0.085), ("no_load_current", 2.4)]),
        "induction_motor" => si(&[
            ("rated_power", 4000.0),
            ("rated_speed", 150.8),
            ("rated_voltage", 400.0),
            ("rated_frequency", 50.0),
            ("locked_rotor_torque", 61.0),
            ("pull_up_torque", 50.0),
            ("breakdown_torque", 77.0),
        ]),
        "servo" => {
            si(&[("peak_torque", 12.0), ("rated_torque", 4.0), ("rated_speed", 80.0), ("max_speed", 450.0)])
        }
        "person" => si(&[("sustained_power", 90.0)]).with("cadence", FieldValue::Interval(5.0, 300.0)),
        "measured_curve" => {
            Values::default().with("curve", table(&[("speed", &[10.0, 300.0]), ("torque", &[9.0, 5.0])]))
        }
        "series_motor" => si(&[("series_constant", 0.02), ("resistance", 0.3), ("loss_torque", 0.01)]),
        "induction_circuit" => si(&[
            ("poles", 4.0),
            ("rated_frequency", 50.0),
            ("stator_resistance", 0.9),
            ("stator_reactance", 1.6),
            ("rotor_resistance", 0.8),
            ("rotor_reactance", 1.9),
            ("magnetizing_reactance", 45.0),
            ("rotational_loss", 90.0),
            ("current_limit", 40.0),
        ]),
        "polynomial" => {
            si(&[("constant_torque", 12.0), ("viscous_torque", 0.05), ("quadratic_torque", -0.0008)])
        }
        "constant_speed" => si(&[("speed", 150.0)]),
        _ => return prime_mover(name),
    })
}

/// Engines, turbines, motors on oil and air.
fn prime_mover(name: &str) -> Option<Values> {
    Some(match name {
        "engine" => si(&[("idle_speed", 80.0), ("governed_speed", 240.0), ("droop", 0.05)])
            .with("curve", table(&[("speed", &[80.0, 150.0, 240.0]), ("torque", &[150.0, 210.0, 180.0])])),
        "wind_turbine" => si(&[("diameter", 0.8), ("wind_speed", 8.0), ("air_density", 1.2)]).with(
            "curve",
            table(&[("tip_speed_ratio", &[2.0, 7.0, 12.0]), ("power_coefficient", &[0.08, 0.44, 0.0])]),
        ),
        "water_turbine" => si(&[("head", 12.0), ("measured_head", 10.0)]).with(
            "curve",
            table(&[
                ("speed", &[0.0, 50.0, 150.0]),
                ("torque", &[420.0, 300.0, 0.0]),
                ("flow", &[0.09, 0.08, 0.06]),
            ]),
        ),
        "hydraulic_motor" => {
            si(&[("displacement", 1.6e-5), ("mechanical_efficiency", 0.9), ("volumetric_efficiency", 0.94)])
        }
        "pneumatic_motor" => si(&[
            ("rated_pressure", 6e5),
            ("stall_torque", 8.0),
            ("no_load_speed", 400.0),
            ("air_consumption", 0.01),
        ]),
        _ => return None,
    })
}

fn transmission(name: &str) -> Option<Values> {
    let teeth = FieldValue::Ratio { driver: 20.0, driven: 50.0 };
    let pulleys = FieldValue::Ratio { driver: 0.1, driven: 0.25 };
    Some(match name {
        "gear" => losses(si(&[("reduction", 2.5)])),
        "gearbox" => losses(Values::default()).with("gear", FieldValue::Gears(vec![Gear::of("1", 2.5)])),
        "planetary" => losses(si(&[("sun_teeth", 16.0), ("ring_teeth", 64.0)]))
            .with("input", FieldValue::Word("sun"))
            .with("output", FieldValue::Word("carrier"))
            .with("fixed", FieldValue::Word("ring")),
        "worm" => si(&[("friction_coefficient", 0.04), ("diameter_factor", 8.0), ("pressure_angle", 0.35)])
            .with("teeth", FieldValue::Ratio { driver: 3.0, driven: 50.0 }),
        "screw" => si(&[
            ("lead", 0.01),
            ("mean_diameter", 0.03),
            ("friction_coefficient", 0.1),
            ("thread_angle", 0.52),
            ("collar_friction_coefficient", 0.05),
            ("collar_diameter", 0.04),
        ]),
        "belt" => losses(si(&[("slip", 0.02)])).with("pitch_diameters", pulleys),
        "chain" => losses(Values::default()).with("teeth", teeth),
        "drum" => losses(si(&[("pitch_diameter", 0.3), ("rope_diameter", 0.01), ("layers", 2.0)])),
        "reeving" => losses(si(&[("falls", 4.0)])),
        "wheel" => si(&[("rolling_circumference", 2.0)]),
        "brake" => si(&[("torque", 60.0)]),
        "clutch" => si(&[
            ("surfaces", 2.0),
            ("friction_coefficient", 0.3),
            ("clamp_force", 4e3),
            ("outer_diameter", 0.24),
            ("inner_diameter", 0.16),
        ]),
        "friction_pulley" => losses(si(&[
            ("pitch_diameter", 0.6),
            ("friction_coefficient", 0.25),
            ("wrap", 2.8),
            ("slack_tension", 1300.0),
        ])),
        "rack" => losses(si(&[("module", 0.004), ("pinion_teeth", 20.0)])),
        "crank" => losses(si(&[("stroke", 0.12), ("rod_length", 0.3)])),
        "shaft" => si(&[("drag_torque", 1.2), ("viscous_drag", 0.01), ("torsional_stiffness", 5e3)]),
        "fluid_coupling" => si(&[
            ("rated_torque", 98.0),
            ("rated_speed", 154.0),
            ("rated_slip", 0.03),
            ("stall_torque_ratio", 2.0),
        ]),
        "universal_joint" => si(&[("angle", 0.3)]),
        "variable" => {
            losses(si(&[("reduction", 1.4)])).with("reduction_range", FieldValue::Interval(0.5, 2.2))
        }
        "reversing_gear" => losses(si(&[("ahead_reduction", 2.5), ("astern_reduction", 2.9)])),
        "freewheel" | "coupling" => Values::default(),
        _ => return None,
    })
}

fn pump() -> Values {
    let columns: [(&'static str, &[f64]); 3] =
        [("flow", &[0.0, 0.01, 0.03]), ("head", &[40.0, 38.0, 22.0]), ("power", &[4e3, 5e3, 7e3])];
    si(&[("rated_speed", 110.0), ("static_head", 12.0), ("friction_head", 15.0), ("system_flow", 0.02)])
        .with("curve", table(&columns))
}

/// Loads of conveying and working machines.
fn machine(name: &str) -> Option<Values> {
    Some(match name {
        "conveyor" => si(&[
            ("length", 120.0),
            ("lift", 9.0),
            ("friction_coefficient", 0.022),
            ("secondary_factor", 1.78),
            ("carrying_idlers", 12.0),
            ("return_idlers", 4.5),
            ("belt_mass", 9.5),
            ("material", 43.0),
            ("drum_friction", 0.3),
            ("wrap", 3.3),
        ]),
        "cutting" => {
            si(&[("specific_cutting_force", 2e9), ("depth_of_cut", 3e-3), ("feed", 5e-5), ("diameter", 0.12)])
        }
        "work_stroke" => si(&[("work", 3200.0), ("rate", 0.5), ("stroke_time", 0.12), ("inertia", 18.0)]),
        "generator" => {
            si(&[("torque_constant", 0.6), ("winding_resistance", 0.4), ("charging_voltage", 29.0)])
        }
        "winder" => si(&[
            ("web_tension", 260.0),
            ("core_diameter", 0.09),
            ("diameter", 0.8),
            ("taper", 0.3),
            ("web_width", 1.2),
            ("web_density", 820.0),
        ]),
        "off_axis_mass" => si(&[("mass", 38.0), ("radius", 0.55), ("angle", 0.4), ("friction_torque", 2.0)]),
        _ => return None,
    })
}

fn load(name: &str) -> Option<Values> {
    Some(match name {
        "constant" => si(&[("torque", 30.0)]),
        "viscous" | "quadratic" => si(&[("rated_torque", 30.0), ("rated_speed", 100.0)]),
        "constant_power" => si(&[("power", 900.0), ("max_torque", 20.0)]),
        "power_law" => si(&[("rated_torque", 30.0), ("rated_speed", 100.0), ("exponent", 1.6)]),
        "fan" => si(&[
            ("rated_power", 3e3),
            ("rated_speed", 100.0),
            ("rated_flow", 1.5),
            ("rated_pressure", 900.0),
        ]),
        "pump" => pump(),
        "propeller" => si(&[
            ("torque_coefficient", 0.03),
            ("thrust_coefficient", 0.2),
            ("diameter", 0.5),
            ("density", 1025.0),
        ]),
        "polynomial" => si(&[("constant_torque", 3.0), ("viscous_torque", 0.1), ("quadratic_torque", 0.002)]),
        "measured_curve" => {
            Values::default().with("curve", table(&[("speed", &[0.0, 300.0]), ("torque", &[5.0, 9.0])]))
        }
        "hoist" => si(&[("mass", 1310.0), ("counterweight", 200.0), ("guide_friction", 40.0)]),
        "incline" => si(&[("mass", 900.0), ("slope", 0.3), ("friction_coefficient", 0.05)]),
        "vehicle" => si(&[
            ("mass", 240.0),
            ("rolling_resistance", 0.008),
            ("drag_area", 0.9),
            ("air_density", 1.2),
            ("grade", 0.06),
            ("headwind", -3.0),
        ]),
        "flywheel" => si(&[("inertia", 3.5)]),
        _ => return machine(name),
    })
}

/// Loads that run straight, where their kind does either.
pub(super) fn straight_loads() -> Vec<(&'static str, Values)> {
    vec![
        ("constant", si(&[("force", 30.0)])),
        ("constant_power", si(&[("power", 900.0), ("max_force", 500.0)])),
        ("viscous", si(&[("force_coefficient", 3.0)])),
        ("quadratic", si(&[("force_coefficient", 0.3)])),
        ("polynomial", si(&[("constant_force", 12.0), ("quadratic_force", 0.25), ("cubic_force", 0.01)])),
        (
            "measured_curve",
            Values::default().with("force_curve", table(&[("speed", &[0.0, 9.0]), ("force", &[50.0, 90.0])])),
        ),
    ]
}

/// Fields of a part of this kind; a kind without a sample is a failure of the test that asks.
pub(super) fn sample(row: &KindRow) -> Values {
    let found = match row.role {
        Role::Supply => Some(si(&[
            ("voltage", 400.0),
            ("open_circuit_voltage", 37.0),
            ("frequency", 50.0),
            ("resistance", 0.1),
            ("pressure", 6e5),
            ("flow_limit", 0.05),
        ])),
        Role::Source => source(row.name),
        Role::Transmission => transmission(row.name),
        Role::Load => load(row.name),
    };
    found.unwrap_or_else(|| panic!("{:?} {} has no sample", row.role, row.name))
}
