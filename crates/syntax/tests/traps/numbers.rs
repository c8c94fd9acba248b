//! Numbers: signs, decimal points, separators, powers, tolerances.

use crate::check;

#[test]
fn a_minus_belongs_to_the_number_it_stands_tight_before() {
    check(
        r##"
let a = -20 °C
    (let a ‹-20 °C›)
let a = -20 °C ± 5 K
    (let a (± ‹-20 °C› ‹5 K›))
let a = x -3
    (let a (- x ‹3›))
let a = x - -3
    (let a (- x ‹-3›))
let a = - 5
    (let a (- ‹5›))
"##,
    );
}

/// `-2^2`
#[test]
fn the_power_of_a_signed_number_is_refused() {
    check(
        r##"
let a = -2^2
    (let a ?)
    syntax at «-2^2»: the power of a number with a sign can be read in two ways
      help: `(-2)^2` or `-(2^2)`
      fix: write `(-2)^2` ⇒ let a = (-2)^2
      fix: write `-(2^2)` ⇒ let a = -(2^2)
let a = -2²
    (let a ?)
    syntax at «-2²»: the power of a number with a sign can be read in two ways
      help: `(-2)²` or `-(2²)`
      fix: write `(-2)²` ⇒ let a = (-2)²
      fix: write `-(2²)` ⇒ let a = -(2²)
let a = (-2)^2
    (let a (^ [‹-2›] ‹2›))
let a = -x^2
    (let a (- (^ x ‹2›)))
let a = 2^-1
    (let a (^ ‹2› ‹-1›))
"##,
    );
}

/// `2^3^2`
#[test]
fn powers_do_not_chain() {
    check(
        r##"
let a = w²*k
    (let a (* (^ w ‹2›) k))
let a = k·w²
    (let a (* k (^ w ‹2›)))
let a = 2^3^2
    (let a ?)
    syntax at «^3^2»: a power of a power needs brackets
      help: `(2^3)^2` or `2^(3^2)`
      fix: write `(2^3)^2` ⇒ let a = (2^3)^2
      fix: write `2^(3^2)` ⇒ let a = 2^(3^2)
let a = w²^2
    (let a ?)
    syntax at «²^2»: a power of a power needs brackets
let a = x ** 2
    (let a ?)
    syntax at «**»: a power is written `^`
      fix: write `^` ⇒ let a = x ^ 2
"##,
    );
}

#[test]
fn a_tolerance_binds_tightest() {
    check(
        r##"
let a = boat + 380 kg ± 5 kg
    (let a (+ boat (± ‹380 kg› ‹5 kg›)))
let a = 2 * 3 m ± 1 m
    (let a (* ‹2› (± ‹3 m› ‹1 m›)))
let a = supply ± 10 %
    (let a (± supply ‹10 %›))
let a = (boat + 380 kg) ± 2 %
    (let a (± [(+ boat ‹380 kg›)] ‹2 %›))
let a = 5 V +/- 1 V
    (let a (± ‹5 V› ‹1 V›))
let a = 5 +-3
    (let a (+ ‹5› ‹-3›))
let a = 5 ± 1 ± 2
    (let a ?)
    syntax at «±»: a value has one tolerance
      help: `±` binds tighter than any operator: a sum with a tolerance stands in brackets
let a = 10 mm within 9.9 mm .. 10.2 mm
    (let a (within ‹10 mm› ‹9.9 mm› ‹10.2 mm›))
"##,
    );
}

/// The grammar keeps it bare.
#[test]
fn a_bare_left_number_takes_the_unit_of_the_right() {
    check(
        r##"
let a = 220 ± 10 mm
    (let a (± ‹220› ‹10 mm›))
let a = 10 .. 20 N·m
    (let a (.. ‹10› ‹20 N·m›))
"##,
    );
}

#[test]
fn a_tolerance_on_a_percentage_is_spelt_out() {
    check(
        r##"
let a = 74 % ± 4 %
    (let a (± ‹74 %› ‹4 %›))
let a = 74 % ± 4 points
    (let a (± ‹74 %› ‹4› points))
let a = 74 % ± 4 % of value
    (let a (± ‹74 %› ‹4 %› of-value))
let a = 74 % ± 4 % relative
    (let a ?)
    syntax at «relative»: a tolerance relative to a percentage is `of value`
      fix: write `of value` ⇒ let a = 74 % ± 4 % of value
"##,
    );
}

#[test]
fn confidence_and_probability_have_words_of_their_own() {
    check(
        r##"
let a = 5 m ± 1 m confidence 95 %
    (let a (± ‹5 m› ‹1 m› (confidence ‹95 %›)))
require "x" a >= 4 m ± 0.1 m confidence 95 % probability 90 %
    (require "x" (a >= (± ‹4 m› ‹0.1 m› (confidence ‹95 %›))) (probability ‹90 %›))
"##,
    );
}

#[test]
fn digits_stand_on_both_sides_of_a_point() {
    check(
        r##"
let a = 1..2
    (let a (.. ‹1› ‹2›))
let a = 1.5..2.5 m
    (let a (.. ‹1.5› ‹2.5 m›))
let a = 5.
    (let a ?)
    bad-number at «5.»: digits stand on both sides of a decimal point
      fix: write `5.0` ⇒ let a = 5.0
let a = .5
    (let a ?)
    bad-number at «.5»: digits stand on both sides of a decimal point
      fix: write `0.5` ⇒ let a = 0.5
let a = -.5 m
    (let a ?)
    bad-number at «.5»: digits stand on both sides of a decimal point
      fix: write `0.5` ⇒ let a = -0.5 m
let a = 1.2.3
    (let a ?)
    bad-number at «1.2.3»: a number has one decimal point
let a = 5 ... 6
    (let a ?)
    syntax at «...»: a range is written `..`
      fix: write `..` ⇒ let a = 5 .. 6
let a = x.5
    (let a ?)
    syntax at «5»: a name is expected here, not `5`
"##,
    );
}

#[test]
fn commas_and_separators_are_no_part_of_a_number() {
    check(
        r##"
let a = 1,000
    (let a ?)
    bad-number at «1,000»: a number has no commas: a decimal sign or thousands?
      help: the decimal sign is a point, and thousands are not set apart
      fix: write `1000` ⇒ let a = 1000
      fix: write `1.000` ⇒ let a = 1.000
let a = 1,000,000 m
    (let a ?)
    bad-number at «1,000,000»: a number has no commas: a decimal sign or thousands?
      help: the decimal sign is a point, and thousands are not set apart
      fix: write `1000000` ⇒ let a = 1000000 m
let a = 0,02
    (let a ?)
    bad-number at «0,02»: the decimal sign is a point
      fix: write `0.02` ⇒ let a = 0.02
let a = 12,5 kg
    (let a ?)
    bad-number at «12,5»: the decimal sign is a point
      fix: write `12.5` ⇒ let a = 12.5 kg
let a = 1_000 m
    (let a ?)
    bad-number at «1_000»: a number is written without separators
      fix: write `1000` ⇒ let a = 1000 m
let a = 1 000 m
    (let a ?)
    bad-number at «1 000»: a number has no blanks between its digits
      fix: write `1000` ⇒ let a = 1000 m
let a = max(1,2)
    (let a (max ‹1› ‹2›))
"##,
    );
}

/// The formatter puts it.
#[test]
fn numbers_need_no_blank_before_their_unit() {
    check(
        r##"
let a = 1e3m
    (let a ‹1e3 m›)
let a = 38N·m
    (let a ‹38 N·m›)
let a = 0x1F
    (let a ?)
    bad-number at «0x1F»: numbers are written in decimal
      fix: write `31` ⇒ let a = 31
let a = 1e999
    (let a ?)
    bad-number at «1e999»: the number is too large to be reckoned with
      help: numbers reach up to about 1.8e308
"##,
    );
}

#[test]
fn fractions_are_written_as_decimals() {
    check(
        r##"
let a = ½ m
    (let a ?)
    bad-number at «½»: a number is written with decimals, not as a fraction sign
      fix: write `0.5` ⇒ let a = 0.5 m
let a = 1½ m
    (let a ?)
    bad-number at «1½»: a number is written with decimals, not as a fraction sign
      fix: write `1.5` ⇒ let a = 1.5 m
let a = ⅓
    (let a ?)
    bad-number at «⅓»: a number is written with decimals, not as a fraction sign
      fix: write `(1/3)` ⇒ let a = (1/3)
"##,
    );
}

#[test]
fn two_values_side_by_side_are_not_multiplied() {
    check(
        r##"
let a = 5 "x"
    (let a ?)
    syntax at «"x"»: a text behind a value needs a word that says what it is
      fix: write `from "x"` ⇒ let a = 5 from "x"
      fix: write `measured "x"` ⇒ let a = 5 measured "x"
      fix: write `assumed "x"` ⇒ let a = 5 assumed "x"
let a = x y
    (let a ?)
    bad-name at «x y»: a name is one word: its parts are joined by `_`
      help: or an operator is missing between `x` and `y`
      fix: write `x_y` ⇒ let a = x_y
let a = (1 + 2) x
    (let a ?)
    syntax at «x»: an operator is missing before `x`
"##,
    );
}
