//! Lines, brackets, blocks, documentation, and where a value comes from.

use crate::check;

#[test]
fn a_basis_ends_a_definition() {
    check(
        r##"
let a = 5 m from "x"
    (let a (from ‹5 m› "x"))
let a = 5 m⏎  from "x"⏎let b = 2
    (let a (from ‹5 m› "x"))
    (let b ‹2›)
let a = 5 from
    (let a ?)
    syntax at «»: a text in quotes is missing behind `from`
      help: `from "…"` says where the value comes from
let a = x from "p" measured "q"
    (let a ?)
    syntax at «measured»: a value says once where it comes from
let a = (x from "p") + 2
    (let a ?)
    syntax at «from»: where a value comes from is said behind the whole definition, not inside an expression
      help: name the part with a `let` of its own
let a = x from "p" + 2
    (let a ?)
    syntax at «+»: where a value comes from is said at its end
let a = x given "p"
    (let a ?)
    syntax at «given»: where a value comes from stands behind `from`
      fix: write `from` ⇒ let a = x from "p"
"##,
    );
}

#[test]
fn a_line_goes_on_behind_an_operator() {
    check(
        r##"
let a = b +⏎  3 m
    (let a (+ b ‹3 m›))
drive d = motor⏎  -> gear⏎  -> load
    (drive d (-> motor gear load))
let a = max(1 m,⏎  2 m)⏎let b = 2
    (let a (max ‹1 m› ‹2 m›))
    (let b ‹2›)
require "x" a > 2⏎  and b > 3⏎  only in wet⏎  not in dry
    (require "x" (and (a > ‹2›) (b > ‹3›)) (only-in wet) (not-in dry))
let a = if x > 2⏎  then 3⏎  else 4
    (let a (if (x > ‹2›) ‹3› ‹4›))
"##,
    );
}

#[test]
fn a_line_never_begins_with_an_operator() {
    check(
        r##"
let a = b⏎+ 3 m
    (let a (+ b ‹3 m›))
    syntax at «+»: a line never begins with `+`
      help: an expression goes on in the next line where its line ends in an operator
      fix: move `+` to the end of the line above ⇒ let a = b +⏎3 m
let a = b⏎- 3 m
    (let a (- b ‹3 m›))
    syntax at «-»: a line never begins with `-`
      help: an expression goes on in the next line where its line ends in an operator
      fix: move `-` to the end of the line above ⇒ let a = b -⏎3 m
"##,
    );
}

#[test]
fn a_half_typed_line_does_not_swallow_the_next() {
    check(
        r##"
source s: t {⏎  x =⏎  y = 5⏎  z = 5 +⏎  w = 6⏎}
    (source s :t (block (= x ?) (= y ‹5›) (= z ?) (= w ‹6›)))
    syntax at «»: a value is missing after `=`
    syntax at «»: a value is missing after `+`
let a =⏎let b = 2
    (let a ?)
    (let b ‹2›)
    syntax at «»: a value is missing after `=`
"##,
    );
}

#[test]
fn a_declaration_closes_what_is_open() {
    check(
        r##"
let a = max(1 m⏎let b = 2
    (let a (max ‹1 m›))
    (let b ‹2›)
    unclosed-bracket at «(»: `(` is never closed
      fix: write `)` here ⇒ let a = max(1 m)⏎let b = 2
source s: t {⏎  a = 1⏎source t: t {⏎  b = 2⏎}
    (source s :t (block (= a ‹1›)))
    (source t :t (block (= b ‹2›)))
    unclosed-bracket at «{»: `{` is never closed
      fix: write `}` here ⇒ source s: t {⏎  a = 1⏎}⏎source t: t {⏎  b = 2⏎}
source s: t {⏎  x = max(1 m⏎  y = 5⏎}
    (source s :t (block (= x (max ‹1 m›)) (= y ‹5›)))
    unclosed-bracket at «(»: `(` is never closed
      fix: write `)` here ⇒ source s: t {⏎  x = max(1 m)⏎  y = 5⏎}
source s: t {⏎  x = 1⏎let b = 2⏎}
    (source s :t (block (= x ‹1›)))
    (let b ‹2›)
    unclosed-bracket at «{»: `{` is never closed
      fix: write `}` here ⇒ source s: t {⏎  x = 1⏎}⏎let b = 2⏎}   (1 left)
let a = b + c)
    (let a (+ b c))
    unclosed-bracket at «)»: `)` closes nothing
      fix: take `)` out ⇒ let a = b + c
let a = (b]
    (let a [b])
    unclosed-bracket at «]»: `(` is closed by `]`
      fix: write `)` ⇒ let a = (b)
"##,
    );
}

#[test]
fn a_missing_brace_is_put_in() {
    check(
        r##"
source m: t⏎  a = 1⏎  b = 2⏎}⏎let c = 3
    (source m :t (block (= a ‹1›) (= b ‹2›)))
    (let c ‹3›)
    unclosed-bracket at «»: `{` is missing before the entries
      fix: open the block here ⇒ source m: t {⏎  a = 1⏎  b = 2⏎}⏎let c = 3
source s: t⏎{⏎  x = 1⏎}
    (source s :t (block (= x ‹1›)))
source s: t x = 1; y = 2 }
    (source s :t (block (= x ‹1›) (= y ‹2›)))
    unclosed-bracket at «»: `{` is missing before the entries
      fix: open the block here ⇒ source s: t { x = 1; y = 2 }
case c a.b = 1 }
    (case c (block (= a.b ‹1›)))
    unclosed-bracket at «»: `{` is missing before the entries
      fix: open the block here ⇒ case c { a.b = 1 }
drive d = a -> b gear = 1 }
    (drive d (-> a b) (block (= gear ‹1›)))
    unclosed-bracket at «»: `{` is missing before the entries
      fix: open the block here ⇒ drive d = a -> b { gear = 1 }
"##,
    );
}

#[test]
fn entries_are_parted_by_semicolons_or_lines() {
    check(
        r##"
case a { x.y = 1 V, z.w = 2 }
    (case a (block (= x.y ?)))
    syntax at «,»: the entries of a block are parted by `;` or a new line
      fix: write `;` ⇒ case a { x.y = 1 V; z.w = 2 }
source s: t { a = 1 b = 2 }
    (source s :t (block (= a ?)))
    syntax at «b»: a `;` or a new line is missing before the next entry
      fix: write `;` ⇒ source s: t { a = 1; b = 2 }
source s: t { a = x b = 2 }
    (source s :t (block (= a ?)))
    syntax at «b»: a `;` or a new line is missing before the next entry
      fix: write `;` ⇒ source s: t { a = x; b = 2 }
source s: t { x = 1; }
    (source s :t (block (= x ‹1›)))
source s: t { ; x = 1 ;; }
    (source s :t (block (= x ‹1›)))
let a = 5; let b = 6
    (let a ‹5›)
    (let b ‹6›)
    syntax at «;»: `;` parts the entries of a block; a declaration ends with its line
      fix: begin a new line ⇒ let a = 5⏎ let b = 6
let a = 5 let b = 6
    (let a ?)
    syntax at «let»: a declaration begins on a line of its own
      fix: begin a new line ⇒ let a = 5⏎let b = 6
"##,
    );
}

#[test]
fn an_empty_block_is_allowed() {
    check(
        r##"
source s = x with { }
    (source s =x (block))
transmission c: freewheel { }
    (transmission c :freewheel (block))
"##,
    );
}

#[test]
fn a_field_is_set_by_an_equal_sign() {
    check(
        r##"
source s: t { x: 5; y 5 m; z; w = ; v = 1 }
    (source s :t (block (= x ?) (= y 5 ?) (= w ?) (= v ‹1›)))
    syntax at «:»: a field is set by `=`
      fix: write `=` ⇒ source s: t { x = 5; y 5 m; z; w = ; v = 1 }   (3 left)
    syntax at «5»: `=` is missing here
      fix: write `=` ⇒ source s: t { x: 5; y = 5 m; z; w = ; v = 1 }   (3 left)
    syntax at «;»: `=` and a value are missing here
    syntax at «;»: a value is missing after `=`
let a == 5
    (let a ?)
    syntax at «==»: a `let` is set by `=`
      fix: write `=` ⇒ let a = 5
let a := 5
    (let a ‹5›)
    syntax at «:=»: a `let` is set by `=`
      fix: write `=` ⇒ let a = 5
let a = x = y
    (let a ?)
    syntax at «=»: a definition has one `=`
      help: to compare, write `==`
"##,
    );
}

#[test]
fn a_row_holds_signed_numbers_only() {
    check(
        r##"
let a = points (s, t) {⏎ 0 12.1⏎ 500 -2⏎}
    (let a (points s t [0 12.1] [500 -2]))
let a = points (s, t) {⏎ 1000 - 2⏎ 0 1,5⏎ 500 rpm 2⏎ x 3⏎ 5 6⏎}
    (let a (points s t [5 6]))
    syntax at «-»: a row holds numbers, not sums
      help: a minus stands tight before its number
    bad-number at «1,5»: the decimal sign is a point
      fix: write `1.5` ⇒ let a = points (s, t) {⏎ 1000 - 2⏎ 0 1.5⏎ 500 rpm 2⏎ x 3⏎ 5 6⏎}   (3 left)
    syntax at «rpm»: a row holds numbers only
      help: their units stand in the head: `speed [rpm]`
    syntax at «x»: a row holds numbers only
      help: a cell that is not known leaves its row out
"##,
    );
}

/// A block of it above `title` or before a blank line is the file's.
#[test]
fn documentation_belongs_to_the_declaration_below() {
    check(
        r##"
## one⏎## two⏎let a = 5
    (doc "one") (doc "two") (let a ‹5›)
## file⏎⏎let a = 5
    (doc "file")
    (let a ‹5›)
## file⏎title "x"
    (doc "file")
    (title "x")
# note⏎let a = 5
    (let a ‹5›)
source s: t {⏎  ## field⏎  x = 1⏎  ## lost⏎⏎  y = 2⏎}
    (source s :t (block (= (doc "field") x ‹1›) (= y ‹2›)))
"##,
    );
}

#[test]
fn texts_are_closed_and_not_empty() {
    check(
        r##"
title "a
    (title "a")
    unclosed-bracket at «"»: the closing quote is missing on this line
      help: a text ends on the line it begins on
      fix: close the text here ⇒ title "a"
title ""
    (title "")
    syntax at «""»: the text between the quotes is empty
      help: say in a few words what it is
source s: t { x = 1 from "abc }⏎let c = 3
    (source s :t (block (= x (from ‹1› "abc"))))
    (let c ‹3›)
    unclosed-bracket at «"»: the closing quote is missing on this line
      help: a text ends on the line it begins on
      fix: close the text here ⇒ source s: t { x = 1 from "abc" }⏎let c = 3
use "a\b"
    (use "a\\b")
    bad-text at «\b»: behind `\` in a text stands `"` or `\`
      help: folders of a path are parted by `/`
      fix: write `\\` ⇒ use "a\\b"
let a = "say \"so\""
    (let a "say \"so\"")
"##,
    );
}
