//! The table of kinds. Order matters twice: the first kind of a dimension and angle names a value in messages,
//! and lists are shown in this order.

use crate::dimension::Dim;
use crate::kind::Kind;
use crate::quantity::Tag;

const fn dim(length: i16, mass: i16, time: i16) -> Dim {
    Dim::whole(length, mass, time, 0, 0)
}

const NUMBER: Dim = Dim::NONE;
const TORQUE: Dim = dim(2, 1, -2);
const POWER: Dim = dim(2, 1, -3);
const PRESSURE: Dim = dim(-1, 1, -2);
const INERTIA: Dim = dim(2, 1, 0);
const PER_TIME: Dim = dim(0, 0, -1);
const VOLT_SECOND: Dim = Dim::whole(2, 1, -2, -1, 0);
const THETA: Dim = Dim::whole(0, 0, 0, 0, 1);

const POWERS: &[&str] = &["kW", "W", "MW", "hp", "PS"];
const PRESSURES: &[&str] = &["bar", "Pa", "kPa", "MPa", "mbar", "psi", "kgf/cm²", "atm"];
const INERTIAS: &[&str] = &["kg·m²", "kg·cm²", "g·cm²", "lb·ft²", "lb·in²", "slug·ft²"];
const TORQUES: &[&str] = &["N·m", "kN·m", "mN·m", "lbf·ft", "lbf·in", "ozf·in", "kgf·m", "kgf·cm"];

/// Every kind of quantity a spec can name.
pub static KINDS: &[Kind] = &[
    // Numbers and angles
    Kind::new("number", "plain number", NUMBER, Some(0))
        .units("", &["", "%", "‰"])
        .means("a number without a unit"),
    Kind::new("percentage", "percentage", NUMBER, Some(0))
        .units("", &["%", "‰", "ppm", ""])
        .means("a share of a whole, such as an efficiency, a slip or a duty factor"),
    Kind::new("count", "count", NUMBER, Some(0))
        .means("a whole number of things: teeth, poles, falls of rope"),
    Kind::new("grade", "grade", NUMBER, Some(0))
        .tagged(Tag::Grade)
        .units("", &["%", "‰", ""])
        .means("rise per run of a road or track, uphill positive; its angle is atan(grade)"),
    Kind::new("angle", "angle", NUMBER, Some(1))
        .units("rad", &["°", "rad", "rev", "mrad"])
        .means("an angle turned or enclosed"),
    Kind::new("slope", "slope", NUMBER, Some(1))
        .units("rad", &["°", "rad"])
        .means("an inclination as an angle to the level"),
    // Space and time
    Kind::new("length", "length", dim(1, 0, 0), None)
        .units("m", &["mm", "m", "cm", "km", "in", "ft"])
        .means("a length; as a radius it may also stand for a length per radian"),
    Kind::new("area", "area", dim(2, 0, 0), None)
        .units("m²", &["m²", "mm²", "cm²", "in²", "ft²"])
        .means("an area"),
    Kind::new("volume", "volume", dim(3, 0, 0), None)
        .units("m³", &["l", "m³", "cm³", "in³", "ft³", "gal_us"])
        .means("a volume"),
    Kind::new("lead", "lead", dim(1, 0, 0), Some(-1))
        .units("m/rad", &["mm/rev", "m/rev", "in/rev"])
        .means("travel per turn of a screw, a drum or a wheel"),
    Kind::new("displacement", "displacement", dim(3, 0, 0), Some(-1))
        .units("m³/rad", &["cm³/rev", "l/rev", "in³/rev"])
        .means("volume that a hydraulic or pneumatic machine takes per turn"),
    Kind::new("time", "time", dim(0, 0, 1), Some(0))
        .units("s", &["s", "ms", "min", "h", "d"])
        .means("a duration"),
    Kind::new("frequency", "frequency", PER_TIME, Some(0))
        .units("Hz", &["Hz", "kHz", "1/s", "1/min"])
        .means("cycles per time; a rotational speed counts radians and is another kind"),
    Kind::new("rate", "rate of events", PER_TIME, Some(0))
        .units("Hz", &["1/h", "1/min", "1/s", "1/d"])
        .means("events per time, such as starts per hour or strokes per minute"),
    Kind::new("rotational_speed", "rotational speed", PER_TIME, Some(1))
        .units("rad/s", &["rpm", "rad/s", "rev/s", "rev/min", "°/s", "krpm"])
        .means("angle turned per time"),
    Kind::new("angular_acceleration", "angular acceleration", dim(0, 0, -2), Some(1))
        .units("rad/s²", &["rad/s²", "rpm/s", "rev/s²"])
        .means("change of rotational speed per time"),
    Kind::new("speed", "speed", dim(1, 0, -1), Some(0))
        .units("m/s", &["m/s", "m/min", "km/h", "mm/s", "mph", "kn", "ft/min", "ft/s"])
        .means("distance per time"),
    Kind::new("acceleration", "acceleration", dim(1, 0, -2), Some(0))
        .units("m/s²", &["m/s²", "ft/s²", "g_n"])
        .means("change of speed per time"),
    // Mass, force, work
    Kind::new("mass", "mass", dim(0, 1, 0), Some(0))
        .units("kg", &["kg", "g", "t", "lb", "oz", "slug"])
        .means("a mass; its weight is mass * g"),
    Kind::new("mass_per_length", "mass per length", dim(-1, 1, 0), Some(0))
        .units("kg/m", &["kg/m", "g/m", "lb/ft"])
        .means("mass of a rope, belt or chain per length"),
    Kind::new("mass_per_area", "mass per area", dim(-2, 1, 0), Some(0))
        .units("kg/m²", &["kg/m²", "g/m²"])
        .means("mass of a sheet or web per area"),
    Kind::new("density", "density", dim(-3, 1, 0), Some(0))
        .units("kg/m³", &["kg/m³", "g/cm³", "kg/l", "t/m³", "lb/ft³"])
        .means("mass per volume"),
    Kind::new("force", "force", dim(1, 1, -2), Some(0))
        .units("N", &["N", "kN", "MN", "lbf", "kgf", "ozf"])
        .means("a force"),
    Kind::new("torque", "torque", TORQUE, Some(-1))
        .units("N·m", TORQUES)
        .means("a turning moment: work per angle turned"),
    Kind::new("energy", "energy", TORQUE, Some(0))
        .units("J", &["J", "kJ", "MJ", "Wh", "kWh"])
        .means("work, heat or stored energy; a torque is another kind although both are force times length"),
    Kind::new("power", "power", POWER, Some(0)).units("W", POWERS).means("energy per time, of any form"),
    Kind::new("mechanical_power", "mechanical power", POWER, Some(0))
        .tagged(Tag::Mechanical)
        .units("W", POWERS)
        .means("power at a shaft or a moving part"),
    Kind::new("electrical_power", "electrical power", POWER, Some(0))
        .tagged(Tag::Electrical)
        .units("W", &["kW", "W", "MW", "kVA", "hp_electric"])
        .means("power at terminals"),
    Kind::new("heat", "heat flow", POWER, Some(0))
        .tagged(Tag::Heat)
        .units("W", &["W", "kW"])
        .means("power lost as heat: electrical less mechanical power"),
    // Turning
    Kind::new("moment_of_inertia", "moment of inertia", INERTIA, Some(-2))
        .tagged(Tag::Inertia)
        .units("kg·m²", INERTIAS)
        .means("resistance to angular acceleration, J = ∫ r² dm"),
    Kind::new("flywheel_effect", "flywheel effect", INERTIA, Some(-2))
        .tagged(Tag::FlywheelEffect)
        .units("kg·m²", INERTIAS)
        .means("GD², four times the moment of inertia"),
    Kind::new("torsional_stiffness", "torsional stiffness", TORQUE, Some(-2))
        .units("N·m/rad", &["N·m/rad", "kN·m/rad", "N·m/°"])
        .means("torque per angle of twist"),
    Kind::new("angular_momentum", "angular momentum", dim(2, 1, -1), Some(-1))
        .units("N·m·s", &["N·m·s", "kg·m²/s"])
        .means("moment of inertia times rotational speed"),
    Kind::new("viscous_torque_coefficient", "viscous torque coefficient", dim(2, 1, -1), Some(-2))
        .units("N·m/(rad/s)", &["N·m/rpm", "N·m·s/rad", "N·m/(rad/s)", "N·m/krpm"])
        .means("torque per rotational speed"),
    Kind::new("quadratic_torque_coefficient", "quadratic torque coefficient", INERTIA, Some(-3))
        .units("N·m/(rad/s)²", &["N·m/rpm²", "N·m/(rad/s)²", "N·m·s²/rad²"])
        .means("torque per square of the rotational speed, as of a fan or a pump"),
    Kind::new("cubic_power_coefficient", "cubic power coefficient", INERTIA, Some(-3))
        .units("W/(rad/s)³", &["W/rpm³", "W/(rad/s)³", "kW/krpm³"])
        .means("power per cube of the rotational speed, as of a propeller"),
    // Along a line
    Kind::new("stiffness", "stiffness", dim(0, 1, -2), Some(0))
        .units("N/m", &["N/mm", "N/m", "kN/m", "lbf/in"])
        .means("force per deflection"),
    Kind::new("viscous_force_coefficient", "viscous force coefficient", dim(0, 1, -1), Some(0))
        .units("N/(m/s)", &["N/(m/s)", "N·s/m", "kN·s/m"])
        .means("force per speed"),
    Kind::new("quadratic_force_coefficient", "quadratic force coefficient", dim(-1, 1, 0), Some(0))
        .units("N/(m/s)²", &["N/(m/s)²", "N·s²/m²"])
        .means("force per square of the speed, as of air or water resistance"),
    Kind::new("cubic_force_coefficient", "cubic force coefficient", dim(-2, 1, 1), Some(0))
        .units("N/(m/s)³", &["N/(m/s)³"])
        .means("force per cube of the speed"),
    Kind::new("momentum", "momentum", dim(1, 1, -1), Some(0))
        .units("N·s", &["N·s", "kg·m/s"])
        .means("mass times speed, or force times time"),
    // Electricity
    Kind::new("voltage", "voltage", Dim::whole(2, 1, -3, -1, 0), Some(0))
        .units("V", &["V", "kV", "mV"])
        .means("electrical voltage"),
    Kind::new("current", "current", Dim::whole(0, 0, 0, 1, 0), Some(0))
        .units("A", &["A", "mA", "kA"])
        .means("electrical current"),
    Kind::new("resistance", "resistance", Dim::whole(2, 1, -3, -2, 0), Some(0))
        .units("Ω", &["Ω", "mΩ", "kΩ"])
        .means("electrical resistance"),
    Kind::new("inductance", "inductance", Dim::whole(2, 1, -2, -2, 0), None)
        .units("H", &["mH", "H", "μH"])
        .means("electrical inductance"),
    Kind::new("capacitance", "capacitance", Dim::whole(-2, -1, 4, 2, 0), None)
        .units("F", &["μF", "mF", "F"])
        .means("electrical capacitance"),
    Kind::new("charge", "charge", Dim::whole(0, 0, 1, 1, 0), Some(0))
        .units("C", &["Ah", "A·h", "mAh", "C"])
        .means("electrical charge, as a battery holds it"),
    Kind::new("torque_constant", "torque constant", VOLT_SECOND, Some(-1))
        .units("N·m/A", &["N·m/A", "mN·m/A", "lbf·in/A", "ozf·in/A"])
        .means("torque per current"),
    Kind::new("series_constant", "series constant", Dim::whole(2, 1, -2, -2, 0), Some(-1))
        .units("N·m/A²", &["N·m/A²", "mN·m/A²"])
        .means("torque per square of the current of a series-wound motor"),
    Kind::new("voltage_constant", "voltage constant", VOLT_SECOND, Some(-1))
        .units("V/(rad/s)", &["V/krpm", "V/rpm", "V·s/rad", "V/(rad/s)"])
        .means("induced voltage per rotational speed"),
    Kind::new("speed_constant", "speed constant", Dim::whole(-2, -1, 2, 1, 0), Some(1))
        .units("rad/(V·s)", &["rpm/V", "rad/(V·s)"])
        .means("rotational speed without load per voltage"),
    Kind::new("force_constant", "force constant", Dim::whole(1, 1, -2, -1, 0), Some(0))
        .units("N/A", &["N/A", "V/(m/s)"])
        .means("force per current of a linear motor, or induced voltage per speed"),
    Kind::new("speed_regulation", "speed regulation", dim(-2, -1, 1), Some(2))
        .units("rad/(N·m·s)", &["rpm/(N·m)", "rpm/(mN·m)", "rad/(N·m·s)"])
        .means("fall of rotational speed per torque along a straight line"),
    // Pressure and flow
    Kind::new("pressure", "pressure", PRESSURE, Some(0))
        .units("Pa", PRESSURES)
        .means("a pressure difference or a stress; a gauge or absolute pressure is another kind"),
    Kind::new("gauge_pressure", "gauge pressure", PRESSURE, Some(0))
        .tagged(Tag::Gauge)
        .units("Pa", &["barg", "psig", "bar", "Pa", "kPa", "mbar"])
        .means("pressure above that of the surroundings"),
    Kind::new("absolute_pressure", "absolute pressure", PRESSURE, Some(0))
        .tagged(Tag::Absolute)
        .units("Pa", &["bara", "psia", "bar", "Pa", "kPa", "mbar", "atm"])
        .means("pressure above vacuum"),
    Kind::new("flow", "volume flow", dim(3, 0, -1), Some(0))
        .units("m³/s", &["l/min", "m³/h", "m³/s", "l/s", "gal_us/min", "cfm"])
        .means("volume per time"),
    Kind::new("mass_flow", "mass flow", dim(0, 1, -1), Some(0))
        .units("kg/s", &["t/h", "kg/s", "kg/h", "lb/h"])
        .means("mass per time"),
    Kind::new("dynamic_viscosity", "dynamic viscosity", dim(-1, 1, -1), Some(0))
        .units("Pa·s", &["mPa·s", "Pa·s", "cP"])
        .means("shear stress per rate of shear"),
    Kind::new("kinematic_viscosity", "kinematic viscosity", dim(2, 0, -1), Some(0))
        .units("m²/s", &["mm²/s", "cSt", "m²/s"])
        .means("dynamic viscosity over density"),
    // Heat and fuel
    Kind::new("temperature", "temperature", THETA, Some(0))
        .level()
        .units("K", &["°C", "K", "°F"])
        .means("a level of temperature"),
    Kind::new("temperature_difference", "temperature difference", THETA, Some(0))
        .units("K", &["K"])
        .means("a rise or fall of temperature"),
    Kind::new("temperature_coefficient", "temperature coefficient", Dim::whole(0, 0, 0, 0, -1), Some(0))
        .units("1/K", &["%/K", "1/K", "ppm/K"])
        .means("relative change per change of temperature, as of a winding's resistance"),
    Kind::new("thermal_resistance", "thermal resistance", Dim::whole(-2, -1, 3, 0, 1), Some(0))
        .units("K/W", &["K/W"])
        .means("rise of temperature per heat flow"),
    Kind::new("thermal_conductance", "thermal conductance", Dim::whole(2, 1, -3, 0, -1), Some(0))
        .units("W/K", &["W/K"])
        .means("heat flow per difference of temperature"),
    Kind::new("heat_transfer_coefficient", "heat transfer coefficient", Dim::whole(0, 1, -3, 0, -1), Some(0))
        .units("W/(m²·K)", &["W/(m²·K)"])
        .means("heat flow per area and difference of temperature"),
    Kind::new("heat_capacity", "heat capacity", Dim::whole(2, 1, -2, 0, -1), Some(0))
        .units("J/K", &["J/K", "kJ/K", "Wh/K"])
        .means("energy per change of temperature"),
    Kind::new("specific_heat_capacity", "specific heat capacity", Dim::whole(2, 0, -2, 0, -1), Some(0))
        .units("J/(kg·K)", &["J/(kg·K)", "kJ/(kg·K)"])
        .means("energy per mass and change of temperature"),
    Kind::new("specific_energy", "specific energy", dim(2, 0, -2), Some(0))
        .units("J/kg", &["MJ/kg", "kJ/kg", "Wh/kg", "J/kg"])
        .means("energy per mass, as of a fuel or a battery"),
    Kind::new("specific_consumption", "specific consumption", dim(-2, 0, 2), Some(0))
        .units("kg/J", &["g/kWh", "kg/kWh"])
        .means("fuel mass per work delivered"),
    Kind::new("specific_power", "specific power", dim(2, 0, -3), Some(0))
        .units("W/kg", &["W/kg", "kW/kg", "kW/t"])
        .means("power per mass"),
    Kind::new("power_per_area", "power per area", dim(0, 1, -3), Some(0))
        .units("W/m²", &["W/m²", "kW/m²"])
        .means("power per area, as of wind, sun or a cooled face"),
];
