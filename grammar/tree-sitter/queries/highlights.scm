; Colours, in the capture names that Neovim, the tree-sitter command and Zed share. The lists of names are written by
; the tests of the repository.

; -- Comments and texts
(comment) @comment
(documentation) @comment.documentation
(string) @string
(escape) @string.escape

; -- Words
[
  "language" "title" "revision" "let" "drive" "case" "require" "show" "allow"
] @keyword
"use" @keyword.import
(role) @keyword

[
  "as" "at" "with" "within" "only" "in" "where" "because" "from" "measured" "assumed" "confidence" "probability"
  "points" "csv" "each" "drives" "of" "value" "teeth"
] @keyword
(ratio_word) @keyword
(duty_type) @constant

[ "and" "or" "not" ] @keyword.operator
[ "if" "then" "else" ] @keyword.conditional

(flag) @boolean
[ (absent) (rated) ] @constant.builtin

; -- Names
(name) @variable
(heading) @string.special
(code) @constant

(part name: (name) @variable)
(variant name: (name) @variable)
(let name: (name) @constant)
(drive name: (name) @module)
(case name: (name) @label)
(case of: (name) @label)
(case_name name: (name) @label)
(column name: (name) @property)

(path (name) (name) @variable.member)
(entry field: (path (name) @property .))
(entry gear: (_) @property)

((kind) @type
  (#any-of? @type
    "mains" "battery" "dc_bus" "hydraulic_unit" "compressed_air" "straight_line" "straight_line_force"
    "dc_motor" "series_motor" "induction_motor" "induction_circuit" "servo" "engine" "wind_turbine"
    "water_turbine" "hydraulic_motor" "pneumatic_motor" "person" "measured_curve" "polynomial"
    "constant_speed" "gear" "gearbox" "reversing_gear" "variable" "planetary" "worm" "belt" "chain"
    "friction_pulley" "drum" "reeving" "wheel" "screw" "rack" "crank" "shaft" "universal_joint" "brake"
    "freewheel" "coupling" "clutch" "fluid_coupling" "constant" "viscous" "quadratic" "power_law"
    "constant_power" "fan" "pump" "propeller" "conveyor" "cutting" "work_stroke" "generator" "winder" "hoist"
    "off_axis_mass" "incline" "vehicle" "flywheel"))
((quantity_kind) @type
  (#any-of? @type
    "number" "percentage" "count" "grade" "angle" "slope" "length" "area" "volume" "lead" "displacement"
    "time" "frequency" "rate" "rotational_speed" "angular_acceleration" "speed" "acceleration" "mass"
    "mass_per_length" "mass_per_area" "density" "force" "torque" "energy" "power" "mechanical_power"
    "electrical_power" "heat" "moment_of_inertia" "flywheel_effect" "torsional_stiffness" "angular_momentum"
    "viscous_torque_coefficient" "quadratic_torque_coefficient" "cubic_power_coefficient" "stiffness"
    "viscous_force_coefficient" "quadratic_force_coefficient" "cubic_force_coefficient" "momentum" "voltage"
    "current" "resistance" "inductance" "capacitance" "charge" "torque_constant" "series_constant"
    "voltage_constant" "speed_constant" "force_constant" "speed_regulation" "pressure" "gauge_pressure"
    "absolute_pressure" "flow" "mass_flow" "dynamic_viscosity" "kinematic_viscosity" "temperature"
    "temperature_difference" "temperature_coefficient" "thermal_resistance" "thermal_conductance"
    "heat_transfer_coefficient" "heat_capacity" "specific_heat_capacity" "specific_energy"
    "specific_consumption" "specific_power" "power_per_area"))

(call function: (name) @function)
((call function: (name) @function.builtin)
  (#any-of? @function.builtin
    "sin" "cos" "tan" "asin" "acos" "atan" "atan2" "sqrt" "cbrt" "exp" "ln" "log10" "abs" "min" "max" "floor"
    "ceil" "round"))
((path . (name) @constant.builtin .)
  (#any-of? @constant.builtin
    "pi" "standard_gravity"))

; -- Numbers
[ (number) (negative) (superscript) ] @number
(unit) @type.builtin

; -- Signs
[
  "->" "+" "-" "−" "–" "*" "×" "·" "/" "÷" "^" "±" "+/-" ".." "=" "==" "!=" "≠" "<" "<=" "≤" ">" ">=" "≥"
] @operator
[ "(" ")" "[" "]" "{" "}" ] @punctuation.bracket
[ "," ";" ":" "." ] @punctuation.delimiter
