//! Semantic tokens: what each word of a text is. Words are told by the index of names; where an item is broken, by
//! what stands beside them.

use layshaft_diagnostics::{FileId, Span};
use layshaft_semantics::index::{Reference, Target};
use layshaft_syntax::{Lexed, Token as Lexeme, TokenKind as K};
use layshaft_units::Function;

use crate::Snapshot;
use crate::cursor::is_name;

macro_rules! legend {
    ($(#[$doc:meta])* $name:ident { $($variant:ident $word:literal $meaning:literal;)* }) => {
        $(#[$doc])*
        #[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
        pub enum $name {
            $(#[doc = $meaning] $variant,)*
        }

        impl $name {
            /// Every one with its word in the protocol and its meaning, in the order of the numbers.
            pub const ALL: &'static [(&'static str, &'static str)] = &[$(($word, $meaning)),*];
        }
    };
}

legend! {
    /// What a token is.
    TokenType {
        Keyword "keyword" "a word of the language";
        Type "type" "the kind of a part or of a quantity";
        Property "property" "a field, a setting, a result";
        Variable "variable" "the name of a value, part, drive or case; a constant";
        Namespace "namespace" "the name of a used file";
        Number "number" "a number";
        Unit "unit" "a unit";
        Text "string" "a text in quotes";
        Comment "comment" "a comment";
        Operator "operator" "an operator";
        Word "enumMember" "a word of a choice: `forward`, `S3`, a code";
        Function "function" "a function";
    }
}

legend! {
    /// What more can be said of a token: one bit each.
    Modifier {
        Declaration "declaration" "it is declared here, or given its value";
        ReadOnly "readonly" "it is computed: a result";
        Library "defaultLibrary" "it belongs to the language";
        Documentation "documentation" "a comment that describes what stands below it";
    }
}

impl Modifier {
    /// The bit of the modifier.
    #[must_use]
    pub const fn bit(self) -> u32 {
        1 << self as u32
    }
}

/// A token.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct SemanticToken {
    /// Where; within one line.
    pub span: Span,
    /// What.
    pub kind: TokenType,
    /// Bits of [`Modifier`].
    pub modifiers: u32,
}

/// The tokens of a file, or of the items that a range touches, in the order of the text.
#[must_use]
pub fn semantic_tokens(snapshot: &Snapshot, file: FileId, range: Option<Span>) -> Vec<SemanticToken> {
    let Some(source) = snapshot.file(file) else { return Vec::new() };
    let whole = Span::new(0, source.text.len() as u32);
    let part = range.map_or(whole, |range| items_of(snapshot, file, range, whole));
    let Some(text) = source.text.get(part.start as usize..part.end as usize) else { return Vec::new() };
    let lexed = layshaft_syntax::lex(text);
    let from = |name: &Reference| (name.place.file, name.place.span.end) <= (file, part.start);
    let names = &snapshot.index.references;
    let names = names.get(names.partition_point(from)..).unwrap_or(&[]);
    let mut painter =
        Painter { snapshot, file, base: part.start, text, lexed: &lexed, names, found: Vec::new() };
    painter.run();
    let mut found = painter.found;
    if let Some(range) = range {
        found.retain(|token| token.span.start < range.end && range.start < token.span.end);
    }
    found
}

/// The span of whole lines and items that holds a range: what is cut into tokens there is cut as it is in the whole.
fn items_of(snapshot: &Snapshot, file: FileId, range: Span, whole: Span) -> Span {
    let Some(source) = snapshot.file(file) else { return whole };
    let text = source.text.as_bytes();
    let ends = |byte: &u8| matches!(byte, b'\n' | b'\r');
    let begins_line = |offset: u32| {
        let before = text.get(..offset as usize).unwrap_or(&[]);
        let blanks = before.iter().rev().take_while(|byte| matches!(byte, b' ' | b'\t')).count();
        before.iter().rev().nth(blanks).is_none_or(ends)
    };
    let items = &source.tree.items;
    let first = items.partition_point(|item| item.tree.span.end + item.offset < range.start);
    let start = items.get(..first).unwrap_or(&[]).iter().rev().find(|item| begins_line(item.offset));
    let start = start.map_or(0, |item| item.offset);
    let behind = items.partition_point(|item| item.offset < range.end);
    let end = items.get(behind).map_or(whole.end, |item| item.offset);
    let rest = text.get(end as usize..).unwrap_or(&[]);
    let line = rest.iter().position(ends).unwrap_or(rest.len());
    Span::new(start.min(end), end + line as u32)
}

struct Painter<'a> {
    snapshot: &'a Snapshot,
    file: FileId,
    base: u32,
    text: &'a str,
    lexed: &'a Lexed,
    /// The names from here on.
    names: &'a [Reference],
    found: Vec<SemanticToken>,
}

impl Painter<'_> {
    fn run(&mut self) {
        let mut comments = self.lexed.comments.iter().peekable();
        for at in 0..self.lexed.tokens.len() {
            let lexeme = self.lexed.tokens[at];
            while let Some(comment) = comments.next_if(|comment| comment.span.start < lexeme.span.start) {
                self.comment(comment.span, comment.doc);
            }
            self.lexeme(at, lexeme);
        }
        for comment in comments {
            self.comment(comment.span, comment.doc);
        }
    }

    fn comment(&mut self, span: Span, doc: bool) {
        self.push(span, TokenType::Comment, if doc { Modifier::Documentation.bit() } else { 0 });
    }

    fn push(&mut self, span: Span, kind: TokenType, modifiers: u32) {
        if span.start < span.end {
            self.found.push(SemanticToken { span: span.shifted(self.base), kind, modifiers });
        }
    }

    fn lexeme(&mut self, at: usize, lexeme: Lexeme) {
        let named = self.named(lexeme.span.shifted(self.base));
        let simple = match lexeme.kind {
            K::Newline | K::Bad | K::Comma | K::Semicolon | K::Colon | K::Dot => return,
            K::LeftParen | K::RightParen | K::PairParen => return,
            K::LeftSquare | K::RightSquare | K::LeftBrace | K::RightBrace => return,
            K::Number | K::SignedNumber | K::Superscript => TokenType::Number,
            K::Unit => TokenType::Unit,
            K::String => TokenType::Text,
            _ if is_name(lexeme.kind) && named.is_some() => {
                let (kind, modifiers) = named.map_or((TokenType::Variable, 0), of_target);
                return self.push(lexeme.span, kind, modifiers);
            }
            K::Name => return self.unknown(at, lexeme),
            kind if kind.is_declaration() || kind.is_reserved() => TokenType::Keyword,
            K::In | K::Where | K::Of | K::ValueWord => TokenType::Keyword,
            // The hyphens of a code.
            K::Minus if named.is_some_and(|name| matches!(name.target, Target::Code(_))) => TokenType::Word,
            _ => TokenType::Operator,
        };
        self.push(lexeme.span, simple, 0);
    }

    /// The name that covers a token.
    fn named(&mut self, span: Span) -> Option<&Reference> {
        let file = self.file;
        let gone = |name: &Reference| (name.place.file, name.place.span.end) <= (file, span.start);
        while self.names.first().is_some_and(gone) {
            self.names = &self.names[1..];
        }
        let name = self.names.first()?;
        let place = name.place;
        (place.file == file && place.span.start <= span.start && span.end <= place.span.end).then_some(name)
    }

    /// A word that stands for nothing the index knows: of a broken item, or a word at its place.
    fn unknown(&mut self, at: usize, lexeme: Lexeme) {
        let tokens = &self.lexed.tokens;
        let kind = |at: Option<usize>| at.and_then(|at| tokens.get(at)).map(|token| token.kind);
        let before = kind(at.checked_sub(1));
        let behind = kind(Some(at + 1));
        let word = self.text.get(lexeme.span.start as usize..lexeme.span.end as usize).unwrap_or("");
        let library = Modifier::Library.bit();
        let (kind, modifiers) = match (before, behind) {
            (_, Some(K::LeftParen)) if Function::from_name(word).is_some() => (TokenType::Function, library),
            (Some(K::Colon), _) => (TokenType::Type, library),
            (Some(K::LeftParen | K::Comma | K::As), Some(K::LeftSquare | K::As | K::Comma)) => {
                (TokenType::Property, 0)
            }
            (Some(before), _) if before.is_declaration() && before != K::Allow => {
                (TokenType::Variable, Modifier::Declaration.bit())
            }
            (_, Some(K::Equal)) => (TokenType::Property, Modifier::Declaration.bit()),
            _ if layshaft_syntax::PLACE_WORDS.iter().any(|row| row.word == word) => (TokenType::Keyword, 0),
            _ if self.snapshot.names().find(self.file, word).is_some() => (TokenType::Variable, 0),
            (Some(K::Dot), _) => (TokenType::Property, 0),
            _ => return,
        };
        self.push(lexeme.span, kind, modifiers);
    }
}

/// What a name is painted as.
fn of_target(name: &Reference) -> (TokenType, u32) {
    let library = Modifier::Library.bit();
    let declares = if name.declares { Modifier::Declaration.bit() } else { 0 };
    match &name.target {
        Target::Let(_) | Target::Part(_) | Target::Drive(_) | Target::Case(_) => {
            (TokenType::Variable, declares)
        }
        Target::Plain => (TokenType::Variable, library),
        Target::File(..) => (TokenType::Namespace, declares),
        Target::Field(..) => (TokenType::Property, declares),
        Target::Result { .. } => (TokenType::Property, Modifier::ReadOnly.bit()),
        Target::PartKind(..) | Target::QuantityKind(_) => (TokenType::Type, library),
        Target::Constant(_) => (TokenType::Variable, library | Modifier::ReadOnly.bit()),
        Target::Function(_) => (TokenType::Function, library),
        Target::Word(_) | Target::Code(_) => (TokenType::Word, 0),
        Target::Path(_) => (TokenType::Text, 0),
    }
}

#[cfg(test)]
mod tests {
    use layshaft_diagnostics::{FileSpan, Span};

    use super::{Modifier, TokenType, semantic_tokens};
    use crate::fixture::Fixture;

    /// Every token as `text:type+modifiers`.
    fn painted(text: &str, range: Option<Span>) -> Vec<String> {
        let fixture = Fixture::new(text);
        let one = |token: super::SemanticToken| {
            let words = fixture.snapshot.text(FileSpan { file: fixture.file, span: token.span });
            let kind = TokenType::ALL[token.kind as usize].0;
            let bits = (0..Modifier::ALL.len()).filter(|bit| token.modifiers & (1 << bit) != 0);
            let modifiers: String = bits.map(|bit| format!("+{}", Modifier::ALL[bit].0)).collect();
            format!("{words}:{kind}{modifiers}")
        };
        semantic_tokens(&fixture.snapshot, fixture.file, range).into_iter().map(one).collect()
    }

    #[test]
    fn every_word_of_a_part() {
        assert_eq!(
            painted(
                "## A motor.\nsource m: straight_line { stall_torque = 5 N·m; braking = none }  # end\n",
                None
            ),
            [
                "## A motor.:comment+documentation",
                "source:keyword",
                "m:variable+declaration",
                "straight_line:type+defaultLibrary",
                "stall_torque:property+declaration",
                "=:operator",
                "5:number",
                "N·m:unit",
                "braking:property+declaration",
                "=:operator",
                "none:enumMember",
                "# end:comment",
            ]
        );
    }

    #[test]
    fn paths_functions_and_codes() {
        let found = painted(
            "let a = 2 * sqrt(pi)\nallow peak-as-continuous because \"x\"\nrequire \"R\" a > 1 only in plain\n",
            None,
        );
        for expected in [
            "sqrt:function+defaultLibrary",
            "pi:variable+readonly+defaultLibrary",
            "peak:enumMember",
            "in:keyword",
        ] {
            assert!(found.iter().any(|token| token == expected), "{expected} is not in {found:?}");
        }
    }

    #[test]
    fn a_broken_item_is_painted_by_what_stands_beside() {
        let found = painted("let a = 5 m\nsource m: dc_motor { resistance = \nload x = = a\n", None);
        for expected in ["dc_motor:type+defaultLibrary", "resistance:property+declaration", "a:variable"] {
            assert!(found.iter().any(|token| token == expected), "{expected} is not in {found:?}");
        }
    }

    #[test]
    fn a_range_gives_the_same_tokens_as_the_whole() {
        let text = "# first\nlet a = 5 m\n\n# second\nlet b = a * 2\nsource m: dc_motor { resistance = \n";
        let fixture = Fixture::new(text);
        let all = semantic_tokens(&fixture.snapshot, fixture.file, None);
        for start in 0..text.len() as u32 {
            for end in start..=text.len() as u32 {
                let range = Span::new(start, end);
                let expected: Vec<_> = all
                    .iter()
                    .filter(|token| token.span.start < end && start < token.span.end)
                    .copied()
                    .collect();
                assert_eq!(
                    semantic_tokens(&fixture.snapshot, fixture.file, Some(range)),
                    expected,
                    "{range:?}"
                );
            }
        }
    }
}
