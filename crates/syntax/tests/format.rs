//! The formatter, drawn: what is written and what it becomes.

use layshaft_diagnostics::Span;
use layshaft_syntax::format::{format, format_range};

/// The text becomes `expected`, and stays so.
#[track_caller]
fn becomes(text: &str, expected: &str) {
    let formatted = format(text);
    assert_eq!(formatted.text, expected);
    assert_eq!(formatted.skipped, [], "left as it was");
    assert_eq!(format(expected).text, expected, "formatting twice is formatting once");
}

#[track_caller]
fn stays(text: &str) {
    becomes(text, text);
}

#[test]
fn nothing_stays_nothing() {
    becomes("", "");
    becomes("\n\n  \n", "");
    becomes("  # a note  ", "# a note\n");
}

#[test]
fn blanks_between_tokens() {
    becomes("let   a=5m\n", "let a = 5 m\n");
    becomes("let a : torque=F*r/2\n", "let a: torque = F × r / 2\n");
    becomes("let\ta = max( 1 m,2 m )\n", "let a = max(1 m, 2 m)\n");
    becomes("let a = ( b . c+d )\n", "let a = (b.c + d)\n");
    becomes("let a = not(b) and c\n", "let a = not (b) and c\n");
    becomes("let a = 5\u{a0}m\u{202f}± 1 m\n", "let a = 5 m ± 1 m\n");
}

#[test]
fn signs_in_one_spelling() {
    becomes("let a = 5 N*m +/- 1 N⋅m\n", "let a = 5 N·m ± 1 N·m\n");
    becomes("let a = 2 m^2 ·b\n", "let a = 2 m² × b\n");
    becomes("let a = b^2 + c ^ -1 + d²\n", "let a = b² + c⁻¹ + d²\n");
    becomes("let a = 20º .. 40˚\n", "let a = 20 ° .. 40 °\n");
    becomes("let a = 1 m…2 m\n", "let a = 1 m .. 2 m\n");
    becomes("drive d = a→b→c\n", "drive d = a -> b -> c\n");
    becomes("require “x” 1 m≤a.b≤2 m\n", "require \"x\" 1 m <= a.b <= 2 m\n");
    becomes("let a = −20 ℃ – 5 K\n", "let a = -20 °C - 5 K\n");
    becomes("let a = 5 µm/min^-1\n", "let a = 5 μm/min⁻¹\n");
}

#[test]
fn numbers_and_units_stay_the_writers() {
    stays("let a = 1e3 m\nlet b = 1000.0 m\nlet c = 0.50 lbf·ft\nlet d = 1450 1/min\n");
}

#[test]
fn a_minus_is_a_sign_or_an_operator() {
    becomes("let a = -5 - -5-5\n", "let a = -5 - -5 - 5\n");
    becomes("let a = - 5 m\n", "let a = - 5 m\n");
    becomes("let a = - b * - c\n", "let a = -b × -c\n");
    becomes("let a = -(b)--c\n", "let a = -(b) - -c\n");
}

#[test]
fn a_power_of_a_quantity_does_not_become_a_unit() {
    stays("let a = 5 m ^ 2\nlet b = 5 m ²\nlet c = (5 m)²\nlet d = 10³\nlet e = b^1.5\nlet f = b^c\n");
    becomes("let a = (5 m)^2 + 10^3 + b ^ (1/2)\n", "let a = (5 m)² + 10³ + b^(1 / 2)\n");
}

#[test]
fn a_comment_stays_inside_a_power() {
    becomes("let a = b^ # two\n2\n", "let a = b^  # two\n    2\n");
}

#[test]
fn a_basis_and_a_scope_stand_apart() {
    becomes("let a = 5 m from \"x\"\n", "let a = 5 m  from \"x\"\n");
    becomes(
        "require \"x\" a.b <= 4 m at a.speed=1 m/s probability 95 % only in c,d[1],e with{f.g=1} not in h\n",
        "require \"x\" a.b <= 4 m  at a.speed = 1 m/s  probability 95 %  only in c, d[1], e with { f.g = 1 }  not in h\n",
    );
    becomes("require \"x\" not a.b only where c.d=e\n", "require \"x\" not a.b  only where c.d = e\n");
    becomes("show a.b as 1/min\n", "show a.b as 1/min\n");
}

#[test]
fn a_block_on_one_line_stays_there_if_it_fits() {
    becomes("load f: fan {a=1;b=2 ;}\n", "load f: fan { a = 1; b = 2 }\n");
    becomes("load f: fan {}\n", "load f: fan { }\n");
    let name = "a_rather_long_name_of_a_field";
    let wide = format!("load f: fan {{ {name}_a = 1; {name}_b = 2; {name}_c = 3 }}\n");
    becomes(&wide, &format!("load f: fan {{\n    {name}_a = 1\n    {name}_b = 2\n    {name}_c = 3\n}}\n"));
}

#[test]
fn a_block_on_several_lines_has_one_entry_a_line() {
    becomes("load f: fan { a = 1; b = 2\n}\n", "load f: fan {\n    a = 1\n    b = 2\n}\n");
    becomes("load f: fan {\n\n\n a = 1;\n\n\n\n  b = 2\n\n}\n", "load f: fan {\n    a = 1\n\n    b = 2\n}\n");
    becomes(
        "transmission g: gearbox {\ngear 1=reduction 14.5;gear low=teeth 42 drives 18\nallow part-limit because \"x\" }\n",
        "transmission g: gearbox {\n    gear 1 = reduction 14.5\n    gear low = teeth 42 drives 18\n    \
         allow part-limit because \"x\"\n}\n",
    );
}

#[test]
fn rows_are_aligned_at_the_point() {
    becomes(
        "load f: points_load {\n curve = points (speed[rpm],torque [N*m]) at 36 V{\n0 12.1\n500 -2 # down\n1000 3.25 }\n}\n",
        "load f: points_load {\n    curve = points (speed [rpm], torque [N·m]) at 36 V {\n           0  12.1\n         \
         500  -2  # down\n        1000   3.25\n    }\n}\n",
    );
    stays("let a = points (speed [rpm], torque [N·m]) { 0 1; 500 -2 }\n");
}

#[test]
fn comments_stay_where_they_are() {
    becomes(
        "#top\n\n\n## doc\nload f: fan{ # behind the brace\n#own\na=1;b=2 # behind b\n\n   # last\n} #behind\n# end",
        "#top\n\n## doc\nload f: fan {  # behind the brace\n    #own\n    a = 1\n    b = 2  # behind b\n\n    # last\n}  \
         #behind\n# end\n",
    );
    becomes("let a = max(1 m, # one\n2 m) # two\n", "let a = max(1 m,  # one\n    2 m)  # two\n");
    becomes("let a = 5 m\n# between\n from \"x\"\n", "let a = 5 m\n    # between\n    from \"x\"\n");
}

#[test]
fn a_line_broken_by_the_writer_stays_broken() {
    becomes("let a = b +\nc\n", "let a = b +\n    c\n");
    becomes("let a = max(\n1 m,\n2 m\n)\n", "let a = max(\n    1 m,\n    2 m\n)\n");
    becomes("let a = 5 m\n\n from \"x\"\n", "let a = 5 m\n    from \"x\"\n");
}

#[test]
fn a_chain_has_one_arrow_a_line_or_stands_on_one() {
    becomes("drive d = a ->\n b -> c {gear=1}\n", "drive d = a\n    -> b\n    -> c { gear = 1 }\n");
    becomes(
        "drive d = a -> b\n -> c {\ngear=1\n}\n",
        "drive d = a\n    -> b\n    -> c {\n        gear = 1\n    }\n",
    );
    let part = "a_part_of_a_drive_with_a_long_name";
    becomes(
        &format!("drive d = 2*({part}->a) -> {part} -> {part} -> b\n"),
        &format!("drive d = 2 × ({part} -> a)\n    -> {part}\n    -> {part}\n    -> b\n"),
    );
}

#[test]
fn a_wide_line_breaks_where_it_reads_best() {
    let name = "a_value_with_a_long_name_of_its_own";
    becomes(
        &format!("require \"x\" {name} >= {name}  only in {name}, b\n"),
        &format!("require \"x\" {name} >= {name}\n    only in {name}, b\n"),
    );
    becomes(
        &format!("let a = {name} + max(b, {name}) + {name}\n"),
        &format!("let a = {name} + max(b, {name}) +\n    {name}\n"),
    );
}

#[test]
fn line_ends_are_unified() {
    becomes("let a = 1\r\n\r\n\r\nlet b = 2\rlet c = 3", "let a = 1\n\nlet b = 2\nlet c = 3\n");
}

#[test]
fn a_range_touches_its_items_only() {
    let text = "let  a = 1\nlet  b = 2\nlet  c = 3\n";
    let at = text.find("b").unwrap() as u32;
    let edits = format_range(text, Span::new(at, at + 1));
    assert_eq!(edits, [(Span::new(11, 21), "let b = 2".to_string())]);
    assert_eq!(format_range(text, Span::new(0, text.len() as u32)).len(), 3);
}

#[test]
fn a_code_stays_whole() {
    let reason = "a reason that is told at some length, so that the line grows wider than a line should be";
    stays(&format!("allow peak-as-continuous because \"{reason}, {reason}\"\n"));
}

#[test]
fn a_negative_number_keeps_its_sign_at_the_beginning_of_a_line() {
    stays("let a = max(\n    -20 °C, b)\nlet c = d +\n    -5\n");
    becomes("let a = max(\n- 20 K, b)\n", "let a = max(\n    - 20 K, b)\n");
    let name = "a_value_with_a_long_name_of_its_own_that_goes";
    becomes(
        &format!("let a = max({name}, {name}, -20 °C, b)\n"),
        &format!("let a = max({name}, {name},\n    -20 °C, b)\n"),
    );
}
