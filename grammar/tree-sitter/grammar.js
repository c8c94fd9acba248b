/// <reference types="tree-sitter-cli/dsl" />
// The grammar of Layshaft specs after ../layshaft.ebnf, in the same order and words, for editors.
//
// What the lexer of Layshaft settles by looking around, src/scanner.c settles here: where a line ends a statement,
// where a unit stands and how far it reaches, which words are words at their place. `missing` nodes stand where
// something has not been typed yet, so that a line being typed leaves its neighbours alone.

const PREC = { or: 1, and: 2, not: 3, compare: 4, sum: 5, product: 6, negative: 7, tolerance: 9 };

/** One or more, with commas between. */
const listed = (rule) => seq(rule, repeat(seq(",", rule)));

module.exports = grammar({
  name: "shaft",

  externals: ($) => [
    $._line_end,
    $._row_end,
    $.unit,
    $._ratio_word,
    $._teeth_word,
    $._duty_word,
    $._not_typed,
    $._never_closed,
    $._error_sentinel,
  ],

  extras: ($) => [/[\s\u00a0\u2009\u202f\ufeff]/, $.comment, $.documentation],

  word: ($) => $.name,

  reserved: {
    global: (_) => [
      "and", "or", "not", "if", "then", "else", "true", "false", "yes", "no", "as", "at", "with", "within",
      "only", "because", "from", "measured", "assumed", "confidence", "probability", "points", "csv", "each",
      "absent", "rated", "drives",
    ],
  },

  supertypes: ($) => [$.declaration],

  rules: {
    // -- A file
    file: ($) =>
      seq(
        optional($._line_end),
        optional(seq($.declaration, repeat(seq($._line_end, $.declaration)), optional($._line_end))),
      ),

    declaration: ($) =>
      choice(
        $.identity, $.use, $.let, $.part, $.variant, $.drive, $.case, $.require, $.show, $.allow,
      ),

    identity: ($) =>
      choice(seq("language", $.number), seq("title", $.string), seq("revision", $.string)),

    use: ($) => seq("use", choice(seq(field("file", $.string), optional(seq("as", field("name", $.name)))), $._missing)),

    let: ($) =>
      seq(
        "let",
        choice(
          seq(
            field("name", $.name),
            optional(seq(":", field("quantity", choice(alias($.name, $.quantity_kind), $._missing)))),
            choice($._equals_value, $._missing),
          ),
          $._missing,
        ),
      ),

    part: ($) =>
      seq(
        field("role", $.role),
        choice(
          seq(
            field("name", $.name),
            choice(
              seq(
                ":",
                field("kind", choice(alias($.name, $.kind), $._missing)),
                optional(field("fields", $.block)),
              ),
              $._missing,
            ),
          ),
          $._missing,
        ),
      ),

    variant: ($) =>
      seq(
        field("role", $.role),
        field("name", $.name),
        "=",
        choice(seq(field("base", $.path), choice(seq("with", field("fields", $.block)), $._missing)), $._missing),
      ),

    role: (_) => choice("supply", "source", "transmission", "load"),

    drive: ($) =>
      seq(
        "drive",
        choice(
          seq(
            field("name", $.name),
            choice(
              seq("=", field("chain", choice($._chain, $._missing)), optional(field("settings", $.block))),
              $._missing,
            ),
          ),
          $._missing,
        ),
      ),

    case: ($) =>
      seq(
        "case",
        choice(
          seq(
            field("name", $.name),
            choice(
              field("changes", $.block),
              seq("=", choice($._combined, $._missing)),
              $._missing,
            ),
          ),
          $._missing,
        ),
      ),

    _combined: ($) =>
      seq(
        field("of", $.name),
        repeat(seq("+", field("of", $.name))),
        optional(seq("with", field("changes", $.block))),
      ),

    require: ($) =>
      seq(
        "require",
        choice(
          seq(
            field("clause", $.string),
            field("condition", $._condition),
            repeat(choice($.at, $.probability, $.scope)),
          ),
          $._missing,
        ),
      ),

    show: ($) =>
      seq(
        "show",
        field("result", $._condition),
        repeat(choice($.at, seq("as", field("unit", $.unit)), $.scope)),
      ),

    allow: ($) => seq("allow", field("code", $.code), "because", field("reason", $.string)),

    code: (_) => /[a-z]+(-[a-z0-9]+)*/,

    // -- Blocks
    block: ($) =>
      seq(
        "{",
        optional($._separator),
        optional(seq($._entry, repeat(seq($._separator, $._entry)), optional($._separator))),
        $._brace,
      ),

    _brace: ($) => choice("}", $._unclosed),

    _separator: ($) => repeat1(choice(";", $._line_end)),

    _entry: ($) => choice($.entry, $.allow),

    entry: ($) =>
      seq(
        field("field", $.path),
        choice(seq(optional(field("gear", choice($.number, $.name))), $._equals_value), $._missing),
      ),

    _equals_value: ($) => seq("=", field("value", $._value), optional($.basis)),

    // -- Values
    _value: ($) =>
      choice(
        $.each, $._condition, $.range, $.pairs, $.teeth, $.ratio, $.duty, $.points, $.csv, $.absent,
      ),

    absent: (_) => "absent",

    each: ($) => seq("each", listed($._choice)),

    _choice: ($) =>
      choice($._condition, $.range, $.group, alias($.pair, $.group), $.teeth, $.ratio, $.duty),

    range: ($) => seq(field("low", $._sum), "..", field("high", $._sum)),

    pairs: ($) =>
      choice(listed($.group), seq($._sum, "at", listed($._sum))),

    pair: ($) => seq($._sum, "at", $._sum),

    group: ($) => seq("(", $._sum, choice("at", ","), listed($._sum), $._closing),

    teeth: ($) =>
      seq(
        optional(alias($._teeth_word, "teeth")),
        field("driver", $._sum),
        "drives",
        field("driven", $._sum),
      ),

    ratio: ($) => seq(alias($._ratio_word, $.ratio_word), $._sum),

    duty: ($) => prec.right(seq(alias($._duty_word, $.duty_type), optional($.quantity))),

    basis: ($) => seq(field("word", choice("from", "measured", "assumed")), $.string),

    points: ($) => seq("points", $.head, optional($.conditions), $.rows),

    csv: ($) => prec.right(seq("csv", field("file", $.string), optional($.head), optional($.conditions))),

    head: ($) => seq("(", listed($.column), ")"),

    column: ($) =>
      seq(
        optional(seq(field("heading", choice(alias($.name, $.heading), $.string)), "as")),
        field("name", $.name),
        optional(seq("[", field("unit", $.unit), "]")),
      ),

    conditions: ($) => seq("at", listed($._sum)),

    rows: ($) =>
      seq(
        "{",
        optional($._rows_between),
        optional(seq($.row, repeat(seq($._rows_between, $.row)), optional($._rows_between))),
        $._brace,
      ),

    _rows_between: ($) => repeat1(choice(";", $._row_end)),

    row: ($) => repeat1(choice($.number, $.negative)),

    // -- Drives
    _chain: ($) => choice($._joined, $.chain),

    chain: ($) => seq($._joined, repeat1(seq("->", choice($._joined, $._missing)))),

    _joined: ($) => choice($._station, $.joined),

    joined: ($) => seq($._station, repeat1(seq("+", $._station))),

    _station: ($) => choice($.station, $.several, $.branch),

    several: ($) => seq(field("count", $.number), choice("*", "×", "·"), choice($.station, $.branch)),

    station: ($) => $.path,

    branch: ($) => seq("(", $._chain, ")"),

    // -- In which cases, at which speed
    at: ($) => seq("at", $.path, "=", $._sum, optional(seq("..", $._sum))),

    probability: ($) => seq("probability", $.quantity),

    scope: ($) =>
      choice(
        seq("only", "in", listed($.case_name)),
        seq("not", "in", listed($.case_name)),
        seq("only", "where", $.path, "=", $._sum, optional(seq("..", $._sum))),
      ),

    case_name: ($) =>
      seq(
        field("name", $.name),
        optional(seq("[", listed($._choice), "]")),
        optional(seq("with", field("changes", $.block))),
      ),

    // -- Expressions
    _condition: ($) => choice($.if, $.or, $.and, $.not, $.comparison, $._sum),

    if: ($) =>
      prec.right(
        seq("if", field("test", $._condition), "then", field("then", $._condition), "else", field("else", $._condition)),
      ),

    or: ($) => prec.left(PREC.or, seq($._condition, "or", $._condition)),

    and: ($) => prec.left(PREC.and, seq($._condition, "and", $._condition)),

    not: ($) => prec(PREC.not, seq("not", $._condition)),

    comparison: ($) =>
      prec(PREC.compare, seq($._sum, $._compare, $._sum, optional(seq($._compare, $._sum)))),

    _compare: (_) => choice("<", "<=", "≤", ">", ">=", "≥", "==", "!=", "≠", "="),

    _sum: ($) => choice($.sum, $.product, $.negation, $._power),

    sum: ($) => prec.left(PREC.sum, seq($._sum, choice("+", "-", "−", "–"), $._sum)),

    product: ($) => prec.left(PREC.product, seq($._sum, choice("*", "×", "·", "/", "÷"), $._sum)),

    negation: ($) => prec(PREC.negative, seq(choice("-", "−", "–"), $._sum)),

    _power: ($) => choice($.power, $._tolerated, alias($.negative_tolerance, $.tolerance), $._negative_quantity),

    power: ($) =>
      seq(
        field("base", $._tolerated),
        choice(seq("^", field("exponent", $._exponent)), field("exponent", $.superscript)),
      ),

    _exponent: ($) => choice($.number, $.negative, $.path, $.parenthesized),

    _tolerated: ($) => choice($._primary, $.tolerance),

    tolerance: ($) => prec.right(PREC.tolerance, seq($._primary, $._tolerance)),

    negative_tolerance: ($) => prec.right(PREC.tolerance, seq($._negative_quantity, $._tolerance)),

    _tolerance: ($) =>
      choice(
        seq(
          choice("±", "+/-"),
          $._operand,
          optional(choice("points", seq("of", "value"))),
          optional(seq("confidence", $.quantity)),
        ),
        seq("within", $._operand, "..", $._operand),
      ),

    _operand: ($) => choice($._primary, $._negative_quantity),

    _primary: ($) =>
      choice($.quantity, $.path, $.call, $.rated, $.flag, $.string, $.parenthesized, $._missing),

    rated: (_) => "rated",

    flag: (_) => choice("yes", "no", "true", "false"),

    parenthesized: ($) => seq("(", $._condition, $._closing),

    _closing: ($) => choice(")", $._unclosed),

    quantity: ($) => seq($.number, optional($.unit)),

    _negative_quantity: ($) => alias($.negative_quantity, $.quantity),

    negative_quantity: ($) => seq($.negative, optional($.unit)),

    call: ($) => seq(field("function", $.name), "(", optional(listed($._condition)), $._closing),

    path: ($) => prec.right(seq($.name, repeat(seq(".", choice($.name, $._missing))))),

    _missing: ($) => alias($._not_typed, $.missing),

    _unclosed: ($) => alias($._never_closed, $.missing),

    // -- Tokens
    name: (_) => new RustRegex("[\\p{XID_Start}_&&[^ºª]][\\p{XID_Continue}&&[^ºª·\\u0387]]*"),

    number: (_) => /\d+(\.\d+)?([eE][+-]?\d+)?/,

    negative: (_) => /[-−–]\d+(\.\d+)?([eE][+-]?\d+)?/,

    superscript: (_) => /[⁰¹²³⁴⁵⁶⁷⁸⁹⁻]+/,

    string: ($) =>
      choice(
        seq('"', repeat(choice($.escape, token.immediate(prec(1, /[^"\\\n\r]+/)))), token.immediate('"')),
        seq(
          choice("“", "„"),
          repeat(choice($.escape, token.immediate(prec(1, /[^"“”„\\\n\r]+/)))),
          token.immediate(choice('"', "“", "”", "„")),
        ),
      ),

    escape: (_) => token.immediate(/\\["\\]/),

    comment: (_) => /#[^\n\r]*/,

    documentation: (_) => token(prec(1, /##[^\n\r]*/)),
  },
});
