// Colours of a spec, line by line. The lists of words are written by the tests of the repository.
import { StreamLanguage } from "@codemirror/language";

const declaring = new Set([
  "language", "title", "revision", "use", "let", "supply", "source", "transmission", "load", "drive", "case",
  "require", "show", "allow"
]);
const logic = new Set([
  "and", "or", "not", "if", "then", "else"
]);
const constants = new Set([
  "true", "false", "yes", "no", "absent", "rated"
]);
const clauses = new Set([
  "as", "at", "with", "within", "only", "because", "from", "measured", "assumed", "confidence",
  "probability", "points", "csv", "each", "drives"
]);
const functions = new Set([
  "sin", "cos", "tan", "asin", "acos", "atan", "atan2", "sqrt", "cbrt", "exp", "ln", "log10", "abs", "min",
  "max", "floor", "ceil", "round"
]);
const knownValues = new Set([
  "pi", "standard_gravity"
]);
const kinds = new Set([
  "mains", "battery", "dc_bus", "hydraulic_unit", "compressed_air", "straight_line", "straight_line_force",
  "dc_motor", "series_motor", "induction_motor", "induction_circuit", "servo", "engine", "wind_turbine",
  "water_turbine", "hydraulic_motor", "pneumatic_motor", "person", "measured_curve", "polynomial",
  "constant_speed", "gear", "gearbox", "reversing_gear", "variable", "planetary", "worm", "belt", "chain",
  "friction_pulley", "drum", "reeving", "wheel", "screw", "rack", "crank", "shaft", "universal_joint",
  "brake", "freewheel", "coupling", "clutch", "fluid_coupling", "constant", "viscous", "quadratic",
  "power_law", "constant_power", "fan", "pump", "propeller", "conveyor", "cutting", "work_stroke",
  "generator", "winder", "hoist", "off_axis_mass", "incline", "vehicle", "flywheel"
]);
const quantities = new Set([
  "number", "percentage", "count", "grade", "angle", "slope", "length", "area", "volume", "lead",
  "displacement", "time", "frequency", "rate", "rotational_speed", "angular_acceleration", "speed",
  "acceleration", "mass", "mass_per_length", "mass_per_area", "density", "force", "torque", "energy",
  "power", "mechanical_power", "electrical_power", "heat", "moment_of_inertia", "flywheel_effect",
  "torsional_stiffness", "angular_momentum", "viscous_torque_coefficient", "quadratic_torque_coefficient",
  "cubic_power_coefficient", "stiffness", "viscous_force_coefficient", "quadratic_force_coefficient",
  "cubic_force_coefficient", "momentum", "voltage", "current", "resistance", "inductance", "capacitance",
  "charge", "torque_constant", "series_constant", "voltage_constant", "speed_constant", "force_constant",
  "speed_regulation", "pressure", "gauge_pressure", "absolute_pressure", "flow", "mass_flow",
  "dynamic_viscosity", "kinematic_viscosity", "temperature", "temperature_difference",
  "temperature_coefficient", "thermal_resistance", "thermal_conductance", "heat_transfer_coefficient",
  "heat_capacity", "specific_heat_capacity", "specific_energy", "specific_consumption", "specific_power",
  "power_per_area"
]);
const symbol = "(?:hp_electric|short_ton|hp_boiler|long_ton|gal_imp|gal_us|mmH2O|inH2O|inch|thou|krpm|slug|barg|bara|psig|psia|mH2O|degC|degF|[%]|‰|ppm|deg|rev|nmi|mil|min|rpm|rps|mph|g_n|cfm|lbm|kgf|lbf|ozf|psi|atm|cSt|°C|°F|°|in|ft|yd|mi|ha|kn|lb|oz|kp|gf|tf|hp|PS|cP|cd|r|h|d|t|(?:T|G|M|k|h|da|d|c|m|μ|µ|u|n|p)?(?:Ohm|ohm|Hz|Wh|VA|Pa|Ω|Ah|Wb|m|l|L|g|N|J|W|A|V|H|F|C|T)|(?:m)?(?:bar|K)|(?:m|k)?(?:mol)|(?:m|μ|µ|u)?(?:rad|S)|(?:m|μ|µ|u|n|p)?(?:s))";

const factor = `${symbol}(?:\\^-?\\d+|[⁰¹²³⁴⁵⁶⁷⁸⁹⁻]+)?`;
const unit = `(?:1/)?${factor}(?:[·*/]\\(?${factor}\\)?)*(?![\\p{L}\\p{Nd}_(])`;
const NUMBER = /^\d+(?:\.\d+)?(?:[eE][+-]?\d+)?/;
const UNIT = new RegExp(`^[ \\t]*${unit}`, "u");
const COLUMN = new RegExp(`^\\[[ \\t]*${unit}[ \\t]*\\]`, "u");
const NAME = /^[\p{L}_][\p{L}\p{M}\p{Nd}_]*/u;

/** What a word is, from the words before it on its line and the character behind it. */
function word(stream, state) {
  const name = stream.match(NAME)[0];
  const first = state.first;
  const { before } = state;
  state.first = false;
  state.before = name;
  const rest = stream.string.slice(stream.pos);
  if (first && declaring.has(name) && /^\s+["\p{L}\p{Nd}_(-]/u.test(rest)) return "keyword";
  if (/^(?:\.[\p{L}\p{M}\p{Nd}_]+)*\s*(?:[\p{L}\p{Nd}_]+\s*)?=(?!=)/u.test(rest) && state.field) {
    return "propertyName";
  }
  if (state.point) return "propertyName";
  if (before === "only" && (name === "in" || name === "where")) return "keyword";
  if (before === "not" && name === "in") return "keyword";
  if (["reduction", "increase", "teeth"].includes(name) && /^\s+[\p{L}\p{Nd}_]/u.test(rest)) return "keyword";
  if (state.colon) return kinds.has(name) || quantities.has(name) ? "typeName" : "variableName";
  if (logic.has(name)) return "operatorKeyword";
  if (clauses.has(name)) return "keyword";
  if (constants.has(name)) return "atom";
  if (knownValues.has(name)) return "atom";
  if (functions.has(name) && rest.startsWith("(")) return "variableName.standard";
  if (declaring.has(before)) return "variableName.definition";
  return "variableName";
}

function token(stream, state) {
  if (stream.sol()) Object.assign(state, { first: true, field: true, before: "", point: false, colon: false });
  if (stream.eatSpace()) return null;
  const next = stream.peek();
  if (next === "#") {
    const documentation = stream.match(/^##/, false) && state.first;
    stream.skipToEnd();
    return documentation ? "docComment" : "lineComment";
  }
  if (state.unit && stream.match(UNIT)) {
    state.unit = false;
    return "unit";
  }
  state.unit = false;
  if (NAME.test(next)) {
    const style = word(stream, state);
    state.point = state.colon = false;
    state.field = state.field && style === "propertyName";
    state.unit = state.before === "as" && state.shows;
    state.shows = state.shows || (state.before === "show" && style === "keyword");
    return style;
  }
  state.first = false;
  if (/\d/.test(next)) {
    stream.match(NUMBER);
    state.unit = true;
    return "number";
  }
  if (stream.match(/^"(?:[^"\\]|\\.)*"?/)) return "string";
  if (stream.match(COLUMN)) return "unit";
  return sign(stream, state);
}

function sign(stream, state) {
  if (stream.match(/^(?:->|→|±|\+\/-|\.\.|[<>=!]=)/)) return "operator";
  const c = stream.next();
  state.point = c === ".";
  state.colon = c === ":";
  if (c === "{" || c === ";") state.field = true;
  if (c === "{" || c === ";") state.first = true;
  if ("{}()[]".includes(c)) return "bracket";
  if (",;:.".includes(c)) return "punctuation";
  return "operator";
}

export const shaft = StreamLanguage.define({
  name: "shaft",
  startState: () => ({ first: true, field: true, before: "", point: false, colon: false, unit: false, shows: false }),
  token: (stream, state) => {
    if (stream.sol()) state.shows = false;
    return token(stream, state);
  },
  languageData: { commentTokens: { line: "#" } },
});
