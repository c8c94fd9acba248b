//! Tokens: what the lexer makes of a text.

use layshaft_diagnostics::Span;

use crate::tree::Problem;

macro_rules! kinds {
    ($($name:ident $words:literal,)*) => {
        /// The kind of a token. Its text is what stands in its span.
        #[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, PartialOrd, Ord)]
        #[repr(u8)]
        #[allow(missing_docs, reason = "each is described by its words, see `describe`")]
        pub enum TokenKind {
            $($name,)*
        }

        impl TokenKind {
            /// How messages name the kind.
            #[must_use]
            pub const fn describe(self) -> &'static str {
                match self {
                    $(TokenKind::$name => $words,)*
                }
            }
        }
    };
}

kinds! {
    // -- the declaring words, in the order of their table
    Language "`language`", Title "`title`", Revision "`revision`", Use "`use`", Let "`let`",
    Supply "`supply`", Source "`source`", Transmission "`transmission`", Load "`load`",
    Drive "`drive`", Case "`case`", Require "`require`", Show "`show`", Allow "`allow`",
    DutyWord "`duty`", Vary "`vary`", Determine "`determine`",
    // -- the reserved words, in the order of their table
    And "`and`", Or "`or`", Not "`not`", If "`if`", Then "`then`", Else "`else`",
    True "`true`", False "`false`", Yes "`yes`", No "`no`", As "`as`", At "`at`", With "`with`",
    Within "`within`", Only "`only`", Because "`because`", From "`from`", Measured "`measured`",
    Assumed "`assumed`", Confidence "`confidence`", Probability "`probability`", Points "`points`",
    Csv "`csv`", Each "`each`", Absent "`absent`", Rated "`rated`", Drives "`drives`",
    // -- words at their place
    In "`in`", Where "`where`", Of "`of`", ValueWord "`value`",
    // -- what carries a text
    Name "a name", Number "a number", SignedNumber "a negative number", Unit "a unit",
    String "a text in quotes", Superscript "a superscript power",
    // -- signs
    Plus "`+`", Minus "`-`", Star "`*`", Slash "`/`", Caret "`^`", PlusMinus "`±`",
    Less "`<`", LessEqual "`<=`", Greater "`>`", GreaterEqual "`>=`", EqualEqual "`==`", NotEqual "`!=`",
    Equal "`=`", Arrow "`->`", DotDot "`..`", Dot "`.`", Comma "`,`", Semicolon "`;`", Colon "`:`",
    LeftParen "`(`", RightParen "`)`", LeftSquare "`[`", RightSquare "`]`", LeftBrace "`{`", RightBrace "`}`",
    // -- the end of a line, of several with nothing or comments between them
    Newline "the end of the line",
    // -- something unreadable that is reported already
    Bad "something unreadable",
    // -- `(` of a group of quantities, told from `(` of an expression before the grammar runs
    PairParen "`(`",
}

impl TokenKind {
    /// Whether the token is one of the declaring words at its place.
    #[must_use]
    pub const fn is_declaration(self) -> bool {
        (self as u8) <= TokenKind::Determine as u8
    }

    /// Whether the token is a reserved word.
    #[must_use]
    pub const fn is_reserved(self) -> bool {
        (self as u8) >= TokenKind::And as u8 && (self as u8) <= TokenKind::Drives as u8
    }

    /// Whether a minus that stands tight before a number and right behind this belongs to the number.
    pub(crate) const fn takes_sign(self) -> bool {
        use TokenKind as K;
        if matches!(
            self,
            K::True | K::False | K::Yes | K::No | K::Points | K::Absent | K::Rated | K::Superscript
        ) {
            return false;
        }
        self.is_operator()
            || self.is_reserved()
            || matches!(
                self,
                K::Equal | K::Comma | K::LeftParen | K::LeftSquare | K::Colon | K::Where | K::Arrow
            )
    }

    /// Whether a line that ends in this goes on in the next.
    pub(crate) const fn leaves_line_open(self) -> bool {
        use TokenKind as K;
        (self.is_operator() && !matches!(self, K::Superscript))
            || matches!(
                self,
                K::Equal | K::Comma | K::Arrow | K::And | K::Or | K::Not | K::If | K::Then | K::Else
            )
    }

    /// Whether this is an operator that no statement begins with.
    pub(crate) const fn is_operator(self) -> bool {
        use TokenKind as K;
        ((self as u8) >= K::Plus as u8 && (self as u8) <= K::NotEqual as u8)
            || matches!(self, K::DotDot | K::Superscript)
    }
}

/// A token where it stands, in bytes of the text handed to the lexer.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Token {
    /// What it is.
    pub kind: TokenKind,
    /// Where.
    pub span: Span,
}

/// A comment, from its `#` to the end of its line, the line ending excluded.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Comment {
    /// Where.
    pub span: Span,
    /// `##` as the first of its line: documentation.
    pub doc: bool,
    /// Whether nothing but blanks stands before it on its line.
    pub own_line: bool,
}

/// A text taken apart.
#[derive(Clone, Debug, Default)]
pub struct Lexed {
    /// The tokens. A [`TokenKind::Newline`] stands between two tokens of different lines (its span is the first
    /// line ending behind the token before it, blank and comment lines between make no further one); none stands
    /// before the first token.
    pub tokens: Vec<Token>,
    /// The comments, in the order of the text.
    pub comments: Vec<Comment>,
    /// What cannot be read, in the order of the text.
    pub problems: Vec<Problem>,
}
