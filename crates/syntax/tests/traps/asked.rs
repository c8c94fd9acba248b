//! Drives, cases, conditions.

use crate::check;

/// `2 motor` is two of the unit motor.
#[test]
fn a_count_is_multiplied() {
    check(
        r##"
drive d = 2 * motor -> gear
    (drive d (-> 2*motor gear))
drive d = 2 × motor -> gear
    (drive d (-> 2*motor gear))
drive d = 2 motor -> gear
    (drive d ?)
    syntax at «2 motor»: a number of equal parts is written with `*`
      help: `2 motor` is a quantity with a unit
      fix: write `2 * motor` ⇒ drive d = 2 * motor -> gear
drive d = 2 m -> gear
    (drive d ?)
    syntax at «2 m»: a number of equal parts is written with `*`
      help: `2 m` is a quantity with a unit
      fix: write `2 * m` ⇒ drive d = 2 * m -> gear
drive d = 2 * (a -> b) -> c
    (drive d (-> 2*(-> a b) c))
drive d = 2.5 * a -> b
    (drive d ?)
    syntax at «2.5»: a number of equal parts is a whole number from 1 on
      help: `2 * motor`
"##,
    );
}

#[test]
fn plus_binds_tighter_than_the_arrow() {
    check(
        r##"
drive d = a + b -> c
    (drive d (-> (+ a b) c))
drive d = (e -> p) + (m -> b) -> s
    (drive d (-> (+ (-> e p) (-> m b)) s))
"##,
    );
}

#[test]
fn slips_in_a_chain() {
    check(
        r##"
drive d = motor -> -> gear { gear = 1 }
    (drive d ? (block (= gear ‹1›)))
    syntax at «->»: a part is missing behind `->`
drive d = motor -> gear ->
    (drive d ?)
    syntax at «»: a part is missing behind `->`
drive d: motor -> gear
    (drive d ?)
    syntax at «:»: the chain of a drive stands behind `=`
      fix: write `=` ⇒ drive d = motor -> gear
drive d = motor - gear
    (drive d ?)
    syntax at «-»: parts are joined by `->`
      fix: write `->` ⇒ drive d = motor -> gear
drive d = motor => gear
    (drive d ?)
    syntax at «=>»: parts are joined by `->`
      fix: write `->` ⇒ drive d = motor -> gear
drive d = motor gear
    (drive d ?)
    syntax at «gear»: `->` or `+` is missing before `gear`
      fix: write `->` ⇒ drive d = motor -> gear
drive d
    (drive d ?)
    syntax at «»: `=` and the chain of the drive are missing here
      help: such as `drive lift = motor -> reducer -> hook { … }`
let a = 5 -> 6
    (let a ?)
    syntax at «->»: `->` joins the parts of a drive and nothing else
      help: `drive name = source -> transmission -> load`
"##,
    );
}

#[test]
fn comparisons_have_at_most_two_sides() {
    check(
        r##"
require "x" 3 m/s <= v <= 4 m/s
    (require "x" (‹3 m/s› <= v <= ‹4 m/s›))
let a = a < b < c < d
    (let a ?)
    syntax at «<»: a comparison has at most two sides: `low <= x <= high`
      help: join several comparisons by `and`
let a = a < b > c
    (let a ?)
    syntax at «>»: the two comparisons point different ways
      help: join several comparisons by `and`
let a = a => b
    (let a ?)
    syntax at «=>»: `=>` is written `>=`
      fix: write `>=` ⇒ let a = a >= b
"##,
    );
}

#[test]
fn equality_is_compared_in_conditions() {
    check(
        r##"
require "x" a == b
    (require "x" (a == b))
require "x" lift.mode = braking
    (require "x" (lift.mode == braking))
let a = if x = y then 1 else 2
    (let a (if (x == y) ‹1› ‹2›))
require "x" a > 2 only where b.c = d
    (require "x" (a > ‹2›) (only-where (= b.c d)))
"##,
    );
}

#[test]
fn cases_are_named_with_their_members() {
    check(
        r##"
require "x" a.ok only in ramp[1], corner[360 V, reverse], plain with { b.c = no }
    (require "x" a.ok (only-in ramp[‹1›] corner[‹360 V› reverse] plain with (block (= b.c no))))
require "x" a.ok not in b at c.speed = 5 m/s .. 6 m/s
    (require "x" a.ok (at c.speed (.. ‹5 m/s› ‹6 m/s›)) (not-in b))
require "x" a > 2 at 5 m
    (require "x" (a > ‹2›))
    syntax at «5»: behind `at` stands a speed and its value
      help: such as `at ride.speed = 15 km/h`
"##,
    );
}

#[test]
fn a_composed_case_changes_behind_with() {
    check(
        r##"
case a = b
    (case a =b)
case a = b + c
    (case a =b =c)
case a = b + c with { x.y = 1 }
    (case a =b =c (block (= x.y ‹1›)))
case a = b { x.y = 1 }
    (case a =b (block (= x.y ‹1›)))
    syntax at «{»: what a composed case changes stands behind `with`
      fix: write `with` ⇒ case a = b with { x.y = 1 }
case a = b + { x.y = 1 }
    (case a =b (block (= x.y ‹1›)))
    syntax at «{»: a case is missing behind `+`
case a
    (case a)
    syntax at «»: a case names what it changes between `{` and `}`
      help: such as `case hill { road.grade = 6 % }`
"##,
    );
}

#[test]
fn groups_stand_alone_as_a_value() {
    check(
        r##"
let a = (1.2 N·m at 2850 rpm, 13.0 A), (4.8 N·m at 2400 rpm, 44.7 A)
    (let a (pairs (‹1.2 N·m› ‹2850 rpm› ‹13.0 A›) (‹4.8 N·m› ‹2400 rpm› ‹44.7 A›)))
let a = 5.6 kW at 980 rpm
    (let a (pairs (‹5.6 kW› ‹980 rpm›)))
let a = (a, b) * 2
    (let a ?)
    syntax at «*»: a group of quantities stands alone as a value, not inside an expression
let a = 2 + (1 N·m at 3 rpm)
    (let a ?)
    syntax at «(»: a group of quantities stands alone as a value, not inside an expression
let a = [36, 40, 44]
    (let a ?)
    syntax at «[»: a list of values stands without brackets
      help: `each 360 V, 400 V` in a case, or pairs: `(1.2 N·m at 2850 rpm), (…)`
"##,
    );
}

#[test]
fn a_part_has_a_kind_or_a_base() {
    check(
        r##"
source motor { a = 1 }
    (source motor :? (block (= a ‹1›)))
    syntax at «{»: the kind is missing
      help: such as `source motor: dc_motor { … }`
source motor: { a = 1 }
    (source motor :? (block (= a ‹1›)))
    syntax at «{»: the kind is missing behind `:`
      help: such as `source motor: dc_motor { … }`
source motor dc_motor { a = 1 }
    (source motor :dc_motor (block (= a ‹1›)))
    syntax at «dc_motor»: a colon is missing between name and kind
      fix: write `:` ⇒ source motor: dc_motor { a = 1 }
source m = base { a = 1 }
    (source m =base (block (= a ‹1›)))
    syntax at «{»: a variant names what it is made of and then `with` its changes
      help: `source name = base with { … }`
      fix: write `with` ⇒ source m = base with { a = 1 }
source m = base
    (source m =base (block))
    syntax at «»: a variant names what it is made of and then `with` its changes
      help: `source name = base with { … }`
      fix: write `with` ⇒ source m = base with { }
source m =
    (source m :? (block))
    syntax at «»: what the variant is made of is missing behind `=`
      help: `source name = base with { … }`
sorce motor: dc_motor { a = 1 }
    (source motor :dc_motor (block (= a ‹1›)))
    syntax at «sorce»: `sorce` declares nothing
      help: `source` may be meant
      fix: write `source` ⇒ source motor: dc_motor { a = 1 }
motor: dc_motor { }
    ?
    syntax at «motor»: a part begins with what it is
      help: `supply`, `source`, `transmission` or `load`
low = 5 m
    ?
    syntax at «low»: `low = …` stands in no block
      help: a named value is declared by `let`
      fix: write `let` ⇒ let low = 5 m
"##,
    );
}

#[test]
fn what_is_not_complete_says_so() {
    check(
        r##"
let
    ?
    syntax at «let»: `let` is not complete
      help: such as `let rated_load = 1250 kg from "order"`
let a
    (let a ?)
    syntax at «»: `=` and a value are missing here
let a = if x > 2 m then 3
    (let a ?)
    syntax at «»: `else` is missing
      help: a choice is written `if condition then value else value`
let a = x *
    (let a ?)
    syntax at «»: a value is missing after `*`
require "x"
    (require "x" ?)
    syntax at «»: the condition is missing
      help: such as `require "H-1 speed" lift.hook.speed >= 14 m/min`
require a > 2
    ?
    syntax at «a»: its clause in quotes is missing behind `require`
      help: such as `require "H-1 speed" lift.hook.speed >= 14 m/min`
show x as
    (show x)
    syntax at «»: a unit is missing behind `as`
allow part-limit
    ?
    syntax at «»: `because` and the reason are missing here
      help: such as `allow part-limit because "short duty"`
allow part limit because "x"
    ?
    syntax at «part limit»: the words of a code are joined by `-`
      fix: write `-` ⇒ allow part-limit because "x"
use parts
    ?
    syntax at «parts»: a text in quotes is missing behind `use`
      help: such as `use "parts/motors.shaft" as parts`
language "1"
    ?
    syntax at «"1"»: a number is expected here, not a text in quotes
"##,
    );
}

#[test]
fn words_of_a_later_language_are_named_once() {
    check(
        r##"
vary x = 1 .. 2
    (later vary)
    syntax at «vary»: `vary` belongs to a later version of the language
duty cycle { a = 1⏎ b = 2 }⏎let a = 2
    (later duty)
    (let a ‹2›)
    syntax at «duty»: `duty` belongs to a later version of the language
source s: t {⏎  duty = S3 40 %⏎}
    (source s :t (block (= duty (duty S3 ‹40 %›))))
"##,
    );
}
