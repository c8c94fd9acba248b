//! Texts of a wanted length for the benchmarks: specs as people write them, and TOML of the same size.

/// One drive with everything around it; `@` stands for its number. 25 lines.
const DRIVE: &str = "\
## Fan @ of the drying hall.
let flow_torque_@ = 12 N·m  measured \"works test\"
let case_speed_@ = 960 rpm  from \"order 0417, sheet @\"
source motor_@: straight_line {
    stall_torque = 42.5 N·m ± 5 %
    no_load_speed = 2980 rpm
    inertia = 0.0123 kg·m²  # rotor alone
    braking = none
}
transmission gear_@: gear {
    reduction = 2.75
    efficiency = 95.5 %
    efficiency_backward = 95.5 %
}
load fan_@: quadratic {
    rated_torque = flow_torque_@  assumed \"as sister plant\"
    rated_speed = case_speed_@
    inertia = 0.21 kg·m² + 0.04 kg·m²
}
drive air_@ = motor_@ -> gear_@ -> fan_@ { direction = forward; run_up_to = 95 % }
require \"A@-1 speed\"   800 rpm <= air_@.speed <= 1040 rpm
require \"A@-2 run-up\"  air_@.run_up_time <= 12 s
# the room is counted without the stair
require \"A@-3 motor\"   air_@.motor_@.torque <= 0.6 * motor_@.stall_torque

";

/// The same facts as tables and values of TOML; `@` stands for the number.
const TABLE: &str = "\
# Fan @ of the drying hall.
[motor_@]
kind = \"straight_line\"
stall_torque = { value = 42.5, unit = \"N·m\", tolerance = 0.05 }
no_load_speed = { value = 2980, unit = \"rpm\" }
inertia = { value = 0.0123, unit = \"kg·m²\" }  # rotor alone
braking = \"none\"

[gear_@]
kind = \"gear\"
reduction = 2.75
efficiency = 0.955
efficiency_backward = 0.955

[fan_@]
rated_torque = { value = 12.0, unit = \"N·m\" }
rated_speed = { value = 960, unit = \"rpm\" }
inertia = { value = 0.25, unit = \"kg·m²\", basis = \"as sister plant\" }

[air_@]
chain = [\"motor_@\", \"gear_@\", \"fan_@\"]
direction = \"forward\"
run_up_to = 0.95
criteria = [\"800 rpm <= air_@.speed <= 1040 rpm\", \"air_@.run_up_time <= 12 s\"]

";

/// A spec of about so many lines.
pub fn spec(lines: usize) -> String {
    repeated(DRIVE, |text| text.lines().count() < lines)
}

/// TOML of about so many bytes.
pub fn toml(bytes: usize) -> String {
    repeated(TABLE, |text| text.len() < bytes)
}

fn repeated(pattern: &str, wants_more: impl Fn(&str) -> bool) -> String {
    let mut text = String::new();
    let mut number = 1;
    while wants_more(&text) {
        text.push_str(&pattern.replace('@', &number.to_string()));
        number += 1;
    }
    text
}
