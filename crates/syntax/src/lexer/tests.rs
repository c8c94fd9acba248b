//! Tests of the lexer, drawn as lists of tokens.

use super::*;

/// `kind:text` of every token, those whose text says their kind by text alone.
fn shown(text: &str) -> String {
    let lexed = lex(text);
    let words: Vec<String> = lexed
        .tokens
        .iter()
        .map(|token| {
            let part = &text[token.span.start as usize..token.span.end as usize];
            match token.kind {
                TokenKind::Newline => "⏎".into(),
                TokenKind::Unit => format!("‹{part}›"),
                TokenKind::Name => format!("{part}′"),
                TokenKind::Bad => format!("bad:{part}"),
                TokenKind::SignedNumber => format!("({part})"),
                _ => part.to_owned(),
            }
        })
        .collect();
    words.join(" ")
}

#[test]
fn a_unit_stands_directly_after_a_number_and_nowhere_else() {
    assert_eq!(shown("5 m"), "5 ‹m›");
    assert_eq!(shown("5 * m"), "5 * m′");
    assert_eq!(shown("10 kg*9.81 m/s²"), "10 ‹kg› * 9.81 ‹m/s²›");
    assert_eq!(shown("1/2*m*v²"), "1 / 2 * m′ * v′ ²");
    assert_eq!(shown("1450 1/min"), "1450 ‹1/min›");
    assert_eq!(shown("1450 min⁻¹ only in a"), "1450 ‹min⁻¹› only in a′");
    assert_eq!(shown("12 W/(m²·K)"), "12 ‹W/(m²·K)›");
    assert_eq!(shown("12 kg/(a+b)"), "12 ‹kg› / ( a′ + b′ )");
    assert_eq!(shown("5 min(3, 4)"), "5 min′ ( 3 , 4 )");
    assert_eq!(shown("0.39 %/K"), "0.39 ‹%/K›");
    assert_eq!(shown("42 drives 18"), "42 drives 18");
    assert_eq!(shown("3 in"), "3 ‹in›");
    assert_eq!(
        shown("3 gal_us/min + 20 mmH2O * 2 hp_electric"),
        "3 ‹gal_us/min› + 20 ‹mmH2O› * 2 ‹hp_electric›"
    );
    assert_eq!(shown("3 g_n² + 3 g_nx"), "3 ‹g_n²› + 3 g_nx′");
    assert_eq!(shown("show 3 m as in"), "show 3 ‹m› as ‹in›");
    assert_eq!(shown("show x as 1/min"), "show x′ as ‹1/min›");
    assert_eq!(shown("use \"a\" as m"), "use \"a\" as m′");
    assert_eq!(shown("points (speed [rpm], torque [N·m]) { 0 12.1 }"), {
        "points ( speed′ [ ‹rpm› ] , torque′ [ ‹N·m› ] ) { 0 12.1 }"
    });
    assert_eq!(shown("only in downhill[no]"), "only in downhill′ [ no ]");
    assert_eq!(shown("5 ℃ + 3 º"), "5 ‹℃› + 3 ‹º›");
}

#[test]
fn a_minus_belongs_to_the_number_where_no_value_stands_before_it() {
    assert_eq!(shown("= -20 °C"), "= (-20) ‹°C›");
    assert_eq!(shown("a -20"), "a′ - 20");
    assert_eq!(shown("5 m -3 m"), "5 ‹m› - 3 ‹m›");
    assert_eq!(shown("then −5"), "then (−5)");
    assert_eq!(shown("2^-1"), "2 ^ (-1)");
    assert_eq!(shown("= - 5"), "= - 5");
    assert_eq!(shown("5 +-3"), "5 + (-3)");
    assert_eq!(shown("5 V +/- 1 V"), "5 ‹V› +/- 1 ‹V›");
}

#[test]
fn declaring_words_are_words_at_their_place() {
    let kinds: Vec<_> = lex("load x\nload = 5\n  case a {").tokens.iter().map(|token| token.kind).collect();
    use TokenKind as K;
    assert_eq!(
        kinds,
        [
            K::Load,
            K::Name,
            K::Newline,
            K::Name,
            K::Equal,
            K::Number,
            K::Newline,
            K::Case,
            K::Name,
            K::LeftBrace
        ]
    );
}

#[test]
fn comments_and_line_breaks_are_kept() {
    let text = "## doc\r\nlet a = 1 # end\r\r\n# own\nlet b = 2";
    let lexed = lex(text);
    let comments: Vec<_> = lexed
        .comments
        .iter()
        .map(|c| (&text[c.span.start as usize..c.span.end as usize], c.doc, c.own_line))
        .collect();
    assert_eq!(comments, [("## doc", true, true), ("# end", false, false), ("# own", false, true)]);
    assert_eq!(shown(text), "let a′ = 1 ⏎ let b′ = 2");
}

#[test]
fn dots_belong_to_numbers_only_between_digits() {
    assert_eq!(shown("1..2"), "1 .. 2");
    assert_eq!(shown("1.5..2.5 m"), "1.5 .. 2.5 ‹m›");
    assert_eq!(shown("5."), "5 .");
    assert_eq!(shown(".5"), ". 5");
    assert_eq!(shown("0…4"), "0 … 4");
}
