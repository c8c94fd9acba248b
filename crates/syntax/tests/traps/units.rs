//! Units: where one stands and how far it reaches.

use crate::check;

/// `5 m` with a value `m`, `2 h`, `1 min`.
#[test]
fn a_unit_stands_directly_after_a_number() {
    check(
        r##"
let a = 5 m
    (let a ‹5 m›)
let a = 5 * m
    (let a (* ‹5› m))
let a = 2 h
    (let a ‹2 h›)
let a = 2 * h
    (let a (* ‹2› h))
let a = min(3 s, 1 min)
    (let a (min ‹3 s› ‹1 min›))
"##,
    );
}

/// `5 min(3, 4)` is refused at `min`.
#[test]
fn a_unit_before_a_bracket_is_a_call() {
    check(
        r##"
let a = 5 min(3, 4)
    (let a ?)
    syntax at «min»: a function stands directly after a number, where only a unit can
      help: to multiply, write `*`
      fix: put `*` between ⇒ let a = 5 * min(3, 4)
"##,
    );
}

/// A unit to show in stands behind `as`.
#[test]
fn in_is_always_the_inch_behind_a_number() {
    check(
        r##"
let a = 3 in + 2 ft
    (let a (+ ‹3 in› ‹2 ft›))
show 3 m as in
    (show ‹3 m› (as in))
show x as A
    (show x (as A))
show x in A
    (show ?)
    syntax at «in»: a unit to show in stands behind `as`
      fix: write `as` ⇒ show x as A
require "x" a > 2 in hill
    (require "x" ?)
    syntax at «in»: cases are named behind `only in` or `not in`
      help: `in` directly after a number is the inch
      fix: write `only in` ⇒ require "x" a > 2 only in hill
require "x" a.b > c in hill
    (require "x" ?)
    syntax at «in»: cases are named behind `only in` or `not in`
      fix: write `only in` ⇒ require "x" a.b > c only in hill
require "x" a > 2 only hill
    (require "x" (a > ‹2›))
    syntax at «hill»: `in` or `where` stands behind `only`
      fix: write `only in` ⇒ require "x" a > 2 only in hill
"##,
    );
}

/// No modulo and no "of".
#[test]
fn per_cent_is_a_unit() {
    check(
        r##"
let a = 10 % * x
    (let a (* ‹10 %› x))
let a = 5 % / 2 K
    (let a (/ ‹5 %› ‹2 K›))
let a = 0.39 %/K
    (let a ‹0.39 %/K›)
let a = a % b
    (let a ?)
    syntax at «%»: the unit `%` stands where no number is before it
      help: a unit stands directly after a number
"##,
    );
}

/// With blanks they are arithmetic.
#[test]
fn operators_belong_to_a_unit_only_where_tight() {
    check(
        r##"
let a = 10 kg*9.81 m/s²
    (let a (* ‹10 kg› ‹9.81 m/s²›))
let a = 1/2*m*v²
    (let a (* (* (/ ‹1› ‹2›) m) (^ v ‹2›)))
let a = 10 m/2 s
    (let a (/ ‹10 m› ‹2 s›))
let a = 100 km / h
    (let a (/ ‹100 km› h))
let a = 12 kg/(a+b)
    (let a (/ ‹12 kg› [(+ a b)]))
let a = 12 W/(m²·K)
    (let a ‹12 W/(m²·K)›)
"##,
    );
}

/// The meaning is checked where names are known.
#[test]
fn a_tight_symbol_is_read_as_a_unit() {
    check(
        r##"
let a = 10 kg*g
    (let a ‹10 kg*g›)
let a = 10 kg * g
    (let a (* ‹10 kg› g))
let a = 12 V/R
    (let a ‹12 V/R›)
"##,
    );
}

/// Cut whole here; refused where units are read.
#[test]
fn one_unit_may_have_two_readings() {
    check(
        r##"
let a = 12 W/m²·K
    (let a ‹12 W/m²·K›)
let a = 5 m/s/s
    (let a ‹5 m/s/s›)
"##,
    );
}

#[test]
fn half_an_inch_is_one_over_two_inches() {
    check(
        r##"
let a = 1/2 in
    (let a (/ ‹1› ‹2 in›))
let a = 0.5 in
    (let a ‹0.5 in›)
"##,
    );
}

/// Name plates.
#[test]
fn per_minute_is_a_unit_of_its_own() {
    check(
        r##"
let a = 1450 min⁻¹
    (let a ‹1450 min⁻¹›)
let a = 1450 1/min
    (let a ‹1450 1/min›)
let a = 150 1/s
    (let a ‹150 1/s›)
show n as 1/min
    (show n (as 1/min))
"##,
    );
}

/// `38 N m`
#[test]
fn a_unit_has_no_blanks() {
    check(
        r##"
let a = 38 N m
    (let a ?)
    syntax at «N m»: a unit has no blanks
      help: inside a unit the signs stand tight: `N·m`, `kg/m³`
      fix: write `38 N·m` ⇒ let a = 38 N·m
let a = 3 m 4 cm
    (let a ?)
    syntax at «3 m 4»: two quantities stand side by side
      help: an operator is missing between them
      fix: add them ⇒ let a = 3 m + 4 cm
let a = 5 m2
    (let a ?)
    syntax at «m2»: `m2` is no unit: a power of a unit is raised
      help: `m²`, or `m^2` in plain signs
      fix: write `m²` ⇒ let a = 5 m²
let a = 5 foo_bar
    (let a ?)
    syntax at «foo_bar»: a name stands directly after a number, where only a unit can
      help: to multiply, write `*`
      fix: put `*` between ⇒ let a = 5 * foo_bar
let a = 2.3 rated
    (let a ?)
    syntax at «rated»: a multiple of the rated value is written with `×` or `*`
      fix: put `×` between ⇒ let a = 2.3 × rated
let a = 2.3 × rated
    (let a (* ‹2.3› rated))
"##,
    );
}

/// Minute or foot? Second or inch?
#[test]
fn minutes_and_seconds_are_refused() {
    check(
        r##"
let a = 6° + 5º
    (let a (+ ‹6 °› ‹5 °›))
let a = 6°30′
    (let a ?)
    bad-number at «6°30′»: an angle is written as one number of degrees
      fix: write `6.5°` ⇒ let a = 6.5°
let a = 5′
    (let a ?)
    bad-number at «5′»: `′` is read as minutes of arc or feet
      help: write `5 ft`, or the angle in degrees with decimals, such as `6.5°`
      fix: write `5 ft` ⇒ let a = 5 ft
let a = 3″
    (let a ?)
    bad-number at «3″»: `″` is read as seconds of arc or inches
      help: write `3 in`, or the angle in degrees with decimals, such as `6.5°`
      fix: write `3 in` ⇒ let a = 3 in
let a = 5'
    (let a ?)
    bad-number at «5'»: `'` is read as minutes of arc or feet
      help: write `5 ft`, or the angle in degrees with decimals, such as `6.5°`
      fix: write `5 ft` ⇒ let a = 5 ft
"##,
    );
}

#[test]
fn the_unit_of_a_column_stands_between_brackets() {
    check(
        r##"
let a = points (speed [1/min], torque [N·m]) { 0 1 }
    (let a (points speed[1/min] torque[N·m] [0 1]))
let a = points (speed rpm) { 0 12.1 }
    (let a ?)
    syntax at «rpm»: the unit of a column stands between `[` and `]`
      fix: write `[rpm]` ⇒ let a = points (speed [rpm]) { 0 12.1 }
let a = points (speed [N m], x) { 0 12.1 }
    (let a ?)
    syntax at «N m»: a unit has no blanks
      fix: write `N·m` ⇒ let a = points (speed [N·m], x) { 0 12.1 }
let a = points (speed [], torque) { 0 12.1 }
    (let a ?)
    syntax at «]»: the unit of a column is missing or cannot be read
      help: `[N·m]`, `[1/min]`; a column of plain numbers has no brackets
"##,
    );
}
