// What a token is depends on what stands around it, in five places:
//
//  - A line end ends a statement, unless the next line begins with `->`, with an operator, with `{` or with a reserved
//    word. Inside ( and [, and behind an operator, the grammar asks for no line end and none is looked for.
//  - A unit stands directly behind a number and reaches as far as its operators stand tight.
//  - `reduction`, `increase`, `teeth` and `S3` are words where a number or a name follows, else names.
//  - Nothing has been typed yet where a value is wanted and the line ends before a statement.
//  - A block was never closed where a declaration begins inside of it.
//
// The scanner keeps no state: each of these is seen from the text behind it.

#include "tree_sitter/parser.h"

#include <string.h>

enum Token {
    LINE_END,
    ROW_END,
    UNIT,
    RATIO_WORD,
    TEETH_WORD,
    DUTY_WORD,
    NOT_TYPED,
    NEVER_CLOSED,
    ERROR_SENTINEL,
};

// The longest word that is told from others, and the deepest brackets of a unit.
#define LONGEST 16
#define DEEPEST 8

// Reserved everywhere.
static const char *const RESERVED[] = {
    "and", "or", "not", "if", "then", "else", "true", "false", "yes", "no", "as", "at", "with", "within",
    "only", "because", "from", "measured", "assumed", "confidence", "probability", "points", "csv", "each",
    "absent", "rated", "drives", NULL,
};

// Words that declare and end whatever is open; `allow` may stand inside of a block.
static const char *const DECLARING[] = {
    "language", "title", "revision", "use", "let", "supply", "source", "transmission", "load", "drive",
    "case", "require", "show", NULL,
};

// Units of more than letters.
static const char *const ODD_UNITS[] = {
    "gal_us", "gal_imp", "g_n", "short_ton", "long_ton", "hp_electric", "hp_boiler", "mmH2O", "mH2O", "inH2O", NULL,
};

static bool among(const char *const *words, const char *word) {
    for (; *words; words++) {
        if (strcmp(*words, word) == 0) {
            return true;
        }
    }
    return false;
}

// -- Characters ---------------------------------------------------------------------------------------------------

static bool is_blank(int32_t c) {
    return c == ' ' || c == '\t' || c == 0xa0 || c == 0x1680 || (c >= 0x2000 && c <= 0x200a) || c == 0x202f ||
           c == 0x205f || c == 0x3000 || c == 0xfeff;
}

static bool is_line_end(int32_t c) { return c == '\n' || c == '\r'; }

static bool is_digit(int32_t c) { return c >= '0' && c <= '9'; }

static bool is_superscript(int32_t c) {
    return c == 0xb2 || c == 0xb3 || c == 0xb9 || c == 0x2070 || (c >= 0x2074 && c <= 0x2079) || c == 0x207b;
}

// Signs outside of ASCII that no word holds.
static bool is_foreign_sign(int32_t c) {
    switch (c) {
        case 0xb7: case 0x387: case 0xd7: case 0xf7:                  // · · × ÷
        case 0xb0: case 0xba: case 0xaa: case 0x2da: case 0xb1:       // ° º ª ˚ ±
        case 0xbd: case 0xbc: case 0xbe:                              // ½ ¼ ¾
        case 0x201c: case 0x201d: case 0x201e: case 0x2019:           // quotes
            return true;
        default:
            return is_superscript(c) || is_blank(c) || (c >= 0x2010 && c <= 0x2044) || (c >= 0x2190 && c <= 0x22ff) ||
                   c == 0x2103 || c == 0x2109 || (c >= 0x2080 && c <= 0x2089);
    }
}

static bool is_letter(int32_t c) {
    return (c >= 'a' && c <= 'z') || (c >= 'A' && c <= 'Z') || (c >= 0x80 && !is_foreign_sign(c));
}

static bool continues_word(int32_t c) { return is_letter(c) || is_digit(c) || c == '_'; }

static void skip_blanks(TSLexer *lexer) {
    while (is_blank(lexer->lookahead)) {
        lexer->advance(lexer, true);
    }
}

static void advance_blanks(TSLexer *lexer) {
    while (is_blank(lexer->lookahead)) {
        lexer->advance(lexer, false);
    }
}

// Takes a word; what does not fit into `word` is cut off there and taken all the same.
static unsigned take_word(TSLexer *lexer, char word[LONGEST]) {
    unsigned length = 0;
    while (continues_word(lexer->lookahead)) {
        if (length < LONGEST - 1) {
            word[length] = lexer->lookahead < 0x80 ? (char)lexer->lookahead : '?';
        }
        length++;
        lexer->advance(lexer, false);
    }
    word[length < LONGEST - 1 ? length : LONGEST - 1] = 0;
    return length;
}

// -- Units --------------------------------------------------------------------------------------------------------

static bool take_factor(TSLexer *lexer, unsigned depth);

static bool is_unit_operator(int32_t c) {
    return c == '*' || c == '/' || c == 0xb7 || c == 0x387 || c == 0x22c5 || c == 0x2219 || c == 0x2022 || c == 0xd7 ||
           c == 0xf7;
}

// One symbol. `m2` and `x_1` are names, `min(` is a call, reserved words are never units.
static bool take_symbol(TSLexer *lexer) {
    int32_t first = lexer->lookahead;
    if (first == '%' || first == 0x2030 || first == 0x2103 || first == 0x2109) {
        lexer->advance(lexer, false);
        return true;
    }
    if (first == 0xb0 || first == 0xba || first == 0x2da) {
        lexer->advance(lexer, false);
        if (lexer->lookahead == 'C' || lexer->lookahead == 'F') {
            lexer->advance(lexer, false);
        }
        return true;
    }
    if (!is_letter(first)) {
        return false;
    }
    char word[LONGEST];
    take_word(lexer, word);
    if (lexer->lookahead == '(' || among(RESERVED, word)) {
        return false;
    }
    bool plain = strpbrk(word, "0123456789_") == NULL;
    return plain || among(ODD_UNITS, word);
}

static void take_exponent(TSLexer *lexer) {
    if (lexer->lookahead == '^') {
        lexer->advance(lexer, false);
        if (lexer->lookahead == '-' || lexer->lookahead == 0x2212 || lexer->lookahead == 0x2013) {
            lexer->advance(lexer, false);
        }
        while (is_digit(lexer->lookahead)) {
            lexer->advance(lexer, false);
        }
        return;
    }
    while (is_superscript(lexer->lookahead)) {
        lexer->advance(lexer, false);
    }
}

static bool take_product(TSLexer *lexer, unsigned depth) {
    if (!take_factor(lexer, depth)) {
        return false;
    }
    while (is_unit_operator(lexer->lookahead)) {
        // Outside of brackets, what follows an operator may turn out to be none of the unit's.
        if (depth == 0) {
            lexer->mark_end(lexer);
        }
        lexer->advance(lexer, false);
        if (!take_factor(lexer, depth)) {
            return depth == 0;
        }
    }
    if (depth == 0) {
        lexer->mark_end(lexer);
    }
    return true;
}

static bool take_factor(TSLexer *lexer, unsigned depth) {
    if (lexer->lookahead == '(') {
        if (depth >= DEEPEST) {
            return false;
        }
        lexer->advance(lexer, false);
        if (!take_product(lexer, depth + 1) || lexer->lookahead != ')') {
            return false;
        }
        lexer->advance(lexer, false);
    } else if (!take_symbol(lexer)) {
        return false;
    }
    take_exponent(lexer);
    return true;
}

// Blanks before it are skipped already.
static bool scan_unit(TSLexer *lexer) {
    if (lexer->lookahead == '(') {
        return false;
    }
    if (lexer->lookahead == '1') {
        lexer->advance(lexer, false);
        if (lexer->lookahead != '/') {
            return false;
        }
        lexer->advance(lexer, false);
    }
    lexer->result_symbol = UNIT;
    return take_product(lexer, 0);
}

// -- Words at their place -----------------------------------------------------------------------------------------

static bool begins_number(TSLexer *lexer) {
    int32_t c = lexer->lookahead;
    if (c == '-' || c == 0x2212 || c == 0x2013) {
        lexer->advance(lexer, false);
    }
    return is_digit(lexer->lookahead);
}

static bool begins_name(TSLexer *lexer) {
    char word[LONGEST];
    return (is_letter(lexer->lookahead) || lexer->lookahead == '_') && take_word(lexer, word) > 0 &&
           !among(RESERVED, word);
}

static bool is_duty(const char *word) {
    bool one = word[0] == 'S' && word[1] >= '1' && word[1] <= '9' && word[2] == 0;
    return one || strcmp(word, "S10") == 0;
}

// Whether a value may end before what comes next.
static bool ends_value(TSLexer *lexer) {
    int32_t c = lexer->lookahead;
    if (c == ';' || c == ',' || c == '}' || c == ']' || c == '#' || is_line_end(c) || lexer->eof(lexer)) {
        return true;
    }
    char word[LONGEST];
    return is_letter(c) && take_word(lexer, word) > 0 && among(RESERVED, word);
}

static bool scan_place_word(TSLexer *lexer, const bool *valid) {
    char word[LONGEST];
    take_word(lexer, word);
    lexer->mark_end(lexer);
    advance_blanks(lexer);
    if (valid[RATIO_WORD] && (strcmp(word, "reduction") == 0 || strcmp(word, "increase") == 0)) {
        lexer->result_symbol = RATIO_WORD;
        return begins_number(lexer) || begins_name(lexer);
    }
    if (valid[TEETH_WORD] && strcmp(word, "teeth") == 0) {
        lexer->result_symbol = TEETH_WORD;
        return begins_number(lexer) || begins_name(lexer);
    }
    if (valid[DUTY_WORD] && is_duty(word)) {
        lexer->result_symbol = DUTY_WORD;
        return begins_number(lexer) || ends_value(lexer);
    }
    return false;
}

// -- Line ends ----------------------------------------------------------------------------------------------------

// What the next line that is not empty begins with.
enum Start {
    NOTHING,       // the end of the text
    CLOSING,       // the end of a block
    GOES_ON,       // what goes on with the line before: an operator, `->`, `{`, a reserved word
    ENTRY,         // `path =`
    DECLARATION,   // a declaring word with something behind it
    SOMETHING,
};

// Passes over line ends, blanks and comments.
static void advance_to_text(TSLexer *lexer) {
    for (;;) {
        if (is_blank(lexer->lookahead) || is_line_end(lexer->lookahead)) {
            lexer->advance(lexer, false);
        } else if (lexer->lookahead == '#') {
            while (!is_line_end(lexer->lookahead) && !lexer->eof(lexer)) {
                lexer->advance(lexer, false);
            }
        } else {
            return;
        }
    }
}

// Behind a first word: `= …`, `.b.c = …`, `1 = …`.
static bool goes_on_as_entry(TSLexer *lexer) {
    char word[LONGEST];
    advance_blanks(lexer);
    while (lexer->lookahead == '.') {
        lexer->advance(lexer, false);
        take_word(lexer, word);
        advance_blanks(lexer);
    }
    if (continues_word(lexer->lookahead)) {
        take_word(lexer, word);
        advance_blanks(lexer);
    }
    if (lexer->lookahead != '=') {
        return false;
    }
    lexer->advance(lexer, false);
    return lexer->lookahead != '=';
}

static enum Start word_start(TSLexer *lexer) {
    char word[LONGEST];
    take_word(lexer, word);
    bool blank = is_blank(lexer->lookahead);
    advance_blanks(lexer);
    int32_t next = lexer->lookahead;
    if (among(RESERVED, word)) {
        return next == '=' ? ENTRY : GOES_ON;
    }
    bool named = next == '"' || next == 0x201c || next == 0x201e || continues_word(next);
    bool shown = strcmp(word, "show") == 0 && (next == '(' || next == '-');
    if (among(DECLARING, word) && ((blank && named) || next == '"' || shown)) {
        return DECLARATION;
    }
    if (strcmp(word, "allow") == 0 && named) {
        return ENTRY;
    }
    return goes_on_as_entry(lexer) ? ENTRY : SOMETHING;
}

static enum Start next_start(TSLexer *lexer) {
    advance_to_text(lexer);
    if (lexer->eof(lexer)) {
        return NOTHING;
    }
    int32_t c = lexer->lookahead;
    if (is_letter(c) || c == '_') {
        return word_start(lexer);
    }
    if (c == '}') {
        return CLOSING;
    }
    if (c < 0x80 ? strchr("{+-*/^<>=.", (char)c) != NULL : is_foreign_sign(c)) {
        return GOES_ON;
    }
    return SOMETHING;
}

// At a line end, a comment, the end of the text, or a sign that ends a value.
static bool scan_not_typed(TSLexer *lexer) {
    lexer->result_symbol = NOT_TYPED;
    lexer->mark_end(lexer);
    int32_t c = lexer->lookahead;
    if (c == ';' || c == '}') {
        return true;
    }
    if (!is_line_end(c) && c != '#' && !lexer->eof(lexer)) {
        return false;
    }
    enum Start start = next_start(lexer);
    return start != GOES_ON && start != SOMETHING;
}

static bool scan_line_end(TSLexer *lexer, const bool *valid) {
    lexer->advance(lexer, false);
    lexer->mark_end(lexer);
    // A row of a table ends with its line, whatever the next begins with.
    if (valid[ROW_END] && !valid[LINE_END]) {
        lexer->result_symbol = ROW_END;
        return true;
    }
    lexer->result_symbol = LINE_END;
    return valid[LINE_END] && next_start(lexer) != GOES_ON;
}

// A declaration inside of brackets: they were never closed. Behind that, the declaration before it has ended, though
// no line end is left to say so. A table and round brackets are left by an entry, too.
static bool scan_declaration(TSLexer *lexer, const bool *valid) {
    lexer->mark_end(lexer);
    enum Start start = next_start(lexer);
    bool leaves = start == DECLARATION || start == NOTHING || (start == ENTRY && !valid[LINE_END]);
    if (valid[NEVER_CLOSED] && leaves) {
        lexer->result_symbol = NEVER_CLOSED;
        return true;
    }
    lexer->result_symbol = LINE_END;
    return valid[LINE_END] && start == DECLARATION;
}

bool tree_sitter_shaft_external_scanner_scan(void *payload, TSLexer *lexer, const bool *valid) {
    (void)payload;
    skip_blanks(lexer);
    // While it recovers from an error the parser takes any token; a line end is all that is certain then.
    if (valid[ERROR_SENTINEL]) {
        return is_line_end(lexer->lookahead) && scan_line_end(lexer, valid);
    }
    int32_t c = lexer->lookahead;
    if (valid[NOT_TYPED] && (c == ';' || c == '}' || c == '#' || is_line_end(c) || lexer->eof(lexer))) {
        return scan_not_typed(lexer);
    }
    if (is_line_end(c) && (valid[LINE_END] || valid[ROW_END])) {
        return scan_line_end(lexer, valid);
    }
    if (valid[UNIT] && !is_line_end(c)) {
        return scan_unit(lexer);
    }
    if ((valid[RATIO_WORD] || valid[TEETH_WORD] || valid[DUTY_WORD]) && is_letter(c)) {
        return scan_place_word(lexer, valid);
    }
    if ((valid[LINE_END] || valid[NEVER_CLOSED]) && (is_letter(c) || is_line_end(c) || lexer->eof(lexer))) {
        return scan_declaration(lexer, valid);
    }
    return false;
}

void *tree_sitter_shaft_external_scanner_create(void) { return NULL; }
void tree_sitter_shaft_external_scanner_destroy(void *payload) { (void)payload; }
unsigned tree_sitter_shaft_external_scanner_serialize(void *payload, char *buffer) {
    (void)payload;
    (void)buffer;
    return 0;
}
void tree_sitter_shaft_external_scanner_deserialize(void *payload, const char *buffer, unsigned length) {
    (void)payload;
    (void)buffer;
    (void)length;
}
