//! Names: what a name is, look-alike characters, reserved words.

use crate::check;

/// `low-battery`, `low battery`
#[test]
fn names_are_joined_by_low_lines() {
    check(
        r##"
let low-battery = 3 V
    (let low_battery ‹3 V›)
    bad-name at «low-battery»: a name is one word: its parts are joined by `_`
      fix: write `low_battery` ⇒ let low_battery = 3 V
let low battery = 3 V
    (let low_battery ‹3 V›)
    bad-name at «low battery»: a name is one word: its parts are joined by `_`
      fix: write `low_battery` ⇒ let low_battery = 3 V
case low-battery { a.b = 1 }
    (case low_battery (block (= a.b ‹1›)))
    bad-name at «low-battery»: a name is one word: its parts are joined by `_`
      fix: write `low_battery` ⇒ case low_battery { a.b = 1 }
source my motor: t { }
    (source my_motor :t (block))
    bad-name at «my motor»: a name is one word: its parts are joined by `_`
      fix: write `my_motor` ⇒ source my_motor: t { }
source s: t { low battery = 1; x = 2 }
    (source s :t (block (= x ‹2›)))
    bad-name at «low battery»: a name is one word: its parts are joined by `_`
      fix: write `low_battery` ⇒ source s: t { low_battery = 1; x = 2 }
"##,
    );
}

#[test]
fn reserved_words_are_never_names() {
    check(
        r##"
let at = 5 m
    (let ? ‹5 m›)
    bad-name at «at»: `at` is a word of the language and cannot be a name
      fix: write `at_` ⇒ let at_ = 5 m
source s: t { points = 5; x = 1 }
    (source s :t (block (= x ‹1›)))
    bad-name at «points»: `points` is a word of the language and cannot be a name
      fix: write `point` ⇒ source s: t { point = 5; x = 1 }
source s: t { at = 5⏎ from = 3⏎ x = 1 }
    (source s :t (block (= x ‹1›)))
    bad-name at «at»: `at` is a word of the language and cannot be a name
      fix: write `at_` ⇒ source s: t { at_ = 5⏎ from = 3⏎ x = 1 }   (1 left)
    bad-name at «from»: `from` is a word of the language and cannot be a name
      fix: write `from_` ⇒ source s: t { at = 5⏎ from_ = 3⏎ x = 1 }   (1 left)
"##,
    );
}

#[test]
fn declaring_words_are_words_at_the_start_of_a_line_only() {
    check(
        r##"
source s: t { load = 5 N; case = 2; show = 3 }
    (source s :t (block (= load ‹5 N›) (= case ‹2›) (= show ‹3›)))
source s: t {⏎  load = 5 N⏎  drive = 2⏎}
    (source s :t (block (= load ‹5 N›) (= drive ‹2›)))
let a = load + case
    (let a (+ load case))
"##,
    );
}

/// Spans refer to the user's bytes.
#[test]
fn look_alikes_are_one() {
    check(
        r##"
let a = 5 N⋅m + 5 N∙m + 5 N·m
    (let a (+ (+ ‹5 N·m› ‹5 N·m›) ‹5 N·m›))
let a = 3 − 2 × x ÷ y
    (let a (- ‹3› (/ (* ‹2› x) y)))
let a = 1 … 2
    (let a (.. ‹1› ‹2›))
drive d = a → b
    (drive d (-> a b))
require "x" a ≤ 5 and b ≥ 3 and c ≠ 2
    (require "x" (and (and (a <= ‹5›) (b >= ‹3›)) (c != ‹2›)))
let a = 5 Ω + 5 ⟨2126⟩
    (let a (+ ‹5 Ω› ‹5 Ω›))
let µ = 5 µm
    (let μ ‹5 μm›)
let a = “quoted”
    (let a "quoted")
let a = „quoted“
    (let a "quoted")
let a = 20 ℃ + 5 º
    (let a (+ ‹20 °C› ‹5 °›))
let a = 5⟨00A0⟩m + 5⟨202F⟩m
    (let a (+ ‹5 m› ‹5 m›))
"##,
    );
}

/// U+00B7 continues words in Unicode and never here.
#[test]
fn a_middle_dot_is_no_letter() {
    check(
        r##"
let a = F·r
    (let a (* F r))
let é = 3
    (let é ‹3›)
"##,
    );
}

/// `T₀`
#[test]
fn subscripts_are_refused() {
    check(
        r##"
let T₀ = 5 N·m
    (let T0 ‹5 N·m›)
    bad-name at «T₀»: a name is written with plain digits
      help: subscripts look like plain digits in many fonts
      fix: write `T0` ⇒ let T0 = 5 N·m
"##,
    );
}

#[test]
fn invisible_characters_are_reported() {
    check(
        r##"
let a⟨200B⟩b = 5
    (let ab ‹5›)
    bad-text at «⟨200B⟩»: an invisible character (U+200B) stands here
      fix: take it out ⇒ let ab = 5
let a = 5⟨200B⟩ m
    (let a ‹5 m›)
    bad-text at «⟨200B⟩»: an invisible character (U+200B) stands here
      fix: take it out ⇒ let a = 5 m
# ⟨202E⟩note
    writing-direction at «⟨202E⟩»: a mark of writing direction (U+202E) stands here: the text may read otherwise than it is
      fix: take it out ⇒ # note
let a = 5 m # ⟨202E⟩note
    (let a ‹5 m›)
    writing-direction at «⟨202E⟩»: a mark of writing direction (U+202E) stands here: the text may read otherwise than it is
      fix: take it out ⇒ let a = 5 m # note
"##,
    );
}

#[test]
fn signs_of_other_notations() {
    check(
        r##"
let a = x && y
    (let a (and x y))
    bad-text at «&&»: `&&` has no meaning in the language
      help: both conditions: `and`
      fix: write `and` ⇒ let a = x and y
let a = !x
    (let a (not x))
    bad-text at «!»: `!` has no meaning in the language
      help: the opposite of a condition: `not`
      fix: write `not` ⇒ let a = not x
let a = 'x'
    (let a ?)
    bad-text at «'x'»: a text stands between double quotes
      fix: write `"x"` ⇒ let a = "x"
let a = $5
    (let a ?)
    bad-text at «$»: `$` has no meaning in the language
"##,
    );
}
