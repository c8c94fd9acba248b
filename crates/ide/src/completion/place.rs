//! What can stand at a place, told from the tokens before it.

use layshaft_diagnostics::{FileId, Span};
use layshaft_mechanics::registry::{self, ColumnRow, KindRow, Role};
use layshaft_syntax::{Token, TokenKind as K};

use super::value::value;
use super::wanted::{Wanted, of_path};
use crate::Snapshot;
use crate::cursor::{Cursor, Frame, frame, operates, path_at_end, path_before};
use crate::names::{Declared, row_of_part};

/// Whose fields the keys of a block are.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(crate) enum Owner {
    /// Fields of a kind; of a variant where `variant` is set: nothing is missing there.
    Part {
        /// The kind.
        row: &'static KindRow,
        /// `= base with { … }`
        variant: bool,
    },
    /// Settings of a drive.
    Drive,
    /// Paths: a case.
    Paths,
}

/// How the value at hand may go on, and what may begin it.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(crate) enum Flavor {
    /// Of a `let`.
    Let,
    /// Of a field, a setting.
    Field {
        /// Whether the field is one of a variant, where `absent` takes it away.
        variant: bool,
    },
    /// Of an override in a case.
    Case,
    /// The condition of a `require`.
    Require,
    /// What a `show` shows.
    Show,
    /// Behind `at` and `only where`.
    Asked,
}

/// What can stand at a place.
#[derive(Clone, Debug)]
pub(crate) enum Place<'a> {
    /// A declaration begins.
    Start,
    /// The kind of a part.
    PartKind(Role),
    /// A kind of quantity.
    QuantityKind,
    /// The part a variant is made from.
    Base(Role),
    /// A key of a block begins.
    Key(Owner),
    /// A key goes on behind a point.
    KeyMember(Vec<&'a str>),
    /// An operand; `first` where nothing of the value stands before it.
    Operand { wanted: Wanted, flavor: Flavor, first: bool },
    /// A name behind a point.
    Member { names: Vec<&'a str>, wanted: Wanted },
    /// A unit, or a word that may follow a number; what is typed of it.
    Unit { wanted: Wanted, typed: Span, words: &'static [&'static str] },
    /// Words that may follow what stands there.
    Words(&'static [&'static str]),
    /// A part of a chain; `first` at its beginning.
    Chain { first: bool },
    /// A case, by name.
    Case,
    /// A member of a case between brackets.
    CaseMember(&'a str),
    /// A code behind `allow`; what is typed of it.
    Code(Span),
    /// A column of a table; in a file a heading stands before it.
    Column(&'static [ColumnRow]),
    /// A path between quotes.
    Path { csv: bool, typed: Span },
}

/// Finds out what can stand at the cursor.
pub(crate) fn place<'a>(snapshot: &Snapshot, file: FileId, cursor: &Cursor<'a>) -> Option<Place<'a>> {
    let at = Asking { snapshot, file, cursor };
    let Frame { header, statement, bracket } = frame(&cursor.tokens);
    if let Some(typed) = cursor.quoted {
        return at.quoted(header.is_none(), statement, typed);
    }
    match header {
        None => at.top(statement, bracket),
        Some(header) => at.block(header, statement, bracket),
    }
}

/// The cursor in its snapshot.
#[derive(Clone, Copy)]
pub(super) struct Asking<'s, 'c, 'a> {
    pub snapshot: &'s Snapshot,
    pub file: FileId,
    pub cursor: &'c Cursor<'a>,
}

impl<'a> Asking<'_, '_, 'a> {
    fn text(&self, token: Option<&Token>) -> &'a str {
        token.map_or("", |token| self.cursor.text_of(token))
    }

    fn quoted(&self, top: bool, statement: &[Token], typed: Span) -> Option<Place<'a>> {
        let last = statement.last()?;
        match last.kind {
            K::Csv => Some(Place::Path { csv: true, typed }),
            _ if top && statement.len() == 1 && self.text(Some(last)) == "use" => {
                Some(Place::Path { csv: false, typed })
            }
            _ => None,
        }
    }

    /// At the top of the file.
    fn top(self, statement: &[Token], bracket: Option<usize>) -> Option<Place<'a>> {
        let Some(first) = statement.first() else { return Some(Place::Start) };
        let last = statement.last().map_or(first.kind, |token| token.kind);
        let equal = statement.iter().position(|token| token.kind == K::Equal);
        let rest = equal.map(|at| &statement[at + 1..]);
        match self.text(Some(first)) {
            "use" if statement.len() == 2 && last == K::String => Some(Place::Words(&["as"])),
            "let" => match rest {
                Some(rest) => value(self, rest, self.settled(statement), Flavor::Let),
                None => (last == K::Colon).then_some(Place::QuantityKind),
            },
            "supply" => self.part(Role::Supply, last, rest),
            "source" => self.part(Role::Source, last, rest),
            "transmission" => self.part(Role::Transmission, last, rest),
            "load" => self.part(Role::Load, last, rest),
            "drive" => self.chain(rest?),
            "case" => case(rest?),
            "require" if statement.len() >= 2 => self.asked(&statement[2..], Flavor::Require, bracket),
            "show" => self.asked(&statement[1..], Flavor::Show, bracket),
            "allow" => self.allow(statement),
            _ => None,
        }
    }

    /// The kind a `let` is settled to.
    fn settled(self, statement: &[Token]) -> Wanted {
        let named = statement.get(2).is_some_and(|token| token.kind == K::Colon);
        let kind = layshaft_units::kind(self.text(statement.get(3)));
        kind.filter(|_| named).map_or_else(Wanted::default, |kind| Wanted::of_kind(kind.name))
    }

    fn part(self, role: Role, last: K, rest: Option<&[Token]>) -> Option<Place<'a>> {
        match rest {
            None => (last == K::Colon).then_some(Place::PartKind(role)),
            Some([]) => Some(Place::Base(role)),
            Some(rest) if last == K::Dot => {
                let names = path_before(self.cursor, rest);
                Some(Place::Member { names, wanted: Wanted::default() })
            }
            Some(_) => (last == K::Name).then_some(Place::Words(&["with"])),
        }
    }

    fn chain(self, rest: &[Token]) -> Option<Place<'a>> {
        match rest.last().map(|token| token.kind) {
            None => Some(Place::Chain { first: true }),
            Some(K::Arrow) => Some(Place::Chain { first: false }),
            Some(K::Plus | K::LeftParen | K::Star) => {
                let first = rest.iter().all(|token| token.kind != K::Arrow);
                Some(Place::Chain { first })
            }
            Some(K::Dot) => {
                let names = path_before(self.cursor, rest);
                Some(Place::Member { names, wanted: Wanted::default() })
            }
            _ => None,
        }
    }

    /// What is asked, with its clauses.
    fn asked(self, rest: &[Token], flavor: Flavor, bracket: Option<usize>) -> Option<Place<'a>> {
        let clause = rest.iter().rposition(|token| {
            matches!(token.kind, K::At | K::As | K::Only | K::In | K::Where | K::Probability | K::With)
        });
        let Some(at) = clause else {
            return value(self, rest, Wanted::default(), flavor);
        };
        let behind = &rest[at + 1..];
        match rest[at].kind {
            K::At | K::Where => self.clause_path(behind),
            K::As => self.shown_unit(&rest[..at], &rest[at]),
            K::Only => behind.is_empty().then_some(Place::Words(&["in", "where"])),
            K::Probability => value(self, behind, Wanted::of_kind("percentage"), Flavor::Asked),
            K::In => self.cases(behind, bracket),
            _ => None,
        }
    }

    /// `at ride.speed = 15 km/h`, `only where lift.direction = forward`
    fn clause_path(self, behind: &[Token]) -> Option<Place<'a>> {
        match behind.iter().position(|token| token.kind == K::Equal) {
            Some(at) => {
                let names = path_at_end(self.cursor, &behind[..at]);
                let wanted = of_path(self.snapshot, self.file, &names);
                value(self, &behind[at + 1..], wanted, Flavor::Asked)
            }
            None => value(self, behind, Wanted::default(), Flavor::Asked),
        }
    }

    /// The unit behind `as`: whatever is typed of it, in any letters and signs.
    fn shown_unit(self, shown: &[Token], word: &Token) -> Option<Place<'a>> {
        let typed = self.cursor.text.get(word.span.end as usize..self.cursor.offset)?;
        let unit = typed.trim_start();
        if unit.contains(char::is_whitespace) || unit.len() == typed.len() {
            return (!unit.is_empty()).then_some(Place::Words(SCOPES));
        }
        let start = (self.cursor.offset - unit.len()) as u32;
        let typed = Span::new(start, self.cursor.offset as u32);
        Some(Place::Unit { wanted: self.beside(shown), typed, words: &[] })
    }

    fn cases(self, behind: &[Token], bracket: Option<usize>) -> Option<Place<'a>> {
        let open = behind.iter().rposition(|token| token.kind == K::LeftSquare);
        if let Some(open) = open.filter(|_| bracket.is_some()) {
            let name = open.checked_sub(1).and_then(|at| behind.get(at));
            return Some(Place::CaseMember(self.text(name)));
        }
        match behind.last().map(|token| token.kind) {
            None | Some(K::Comma) => Some(Place::Case),
            _ => Some(Place::Words(&["with", "only in", "not in", "only where", "at", "probability"])),
        }
    }

    fn allow(self, statement: &[Token]) -> Option<Place<'a>> {
        let first = statement.first()?;
        let typed = self.cursor.text.get(first.span.end as usize..self.cursor.offset)?;
        let code = typed.trim_start();
        if code.contains(char::is_whitespace) {
            let done = code.split_whitespace().count() == 1 && self.cursor.word.start == self.cursor.word.end;
            let started = code.split_whitespace().count() == 2 && !code.ends_with(char::is_whitespace);
            return (done || started).then_some(Place::Words(&["because"]));
        }
        let start = (self.cursor.offset - code.len()) as u32;
        (!typed.is_empty()).then(|| Place::Code(Span::new(start, self.cursor.offset as u32)))
    }

    /// In a block.
    fn block(self, header: &[Token], statement: &[Token], bracket: Option<usize>) -> Option<Place<'a>> {
        let owner = self.owner(header)?;
        let Some(first) = statement.first() else { return Some(Place::Key(owner)) };
        let equal = statement.iter().position(|token| token.kind == K::Equal);
        if self.text(Some(first)) == "allow" && equal.is_none() {
            return self.allow(statement);
        }
        let Some(equal) = equal else {
            let dotted = statement.last().is_some_and(|token| token.kind == K::Dot);
            return dotted.then(|| Place::KeyMember(path_before(self.cursor, statement)));
        };
        let key = &statement[..equal];
        let names = path_at_end(self.cursor, key);
        let (wanted, flavor) = match owner {
            Owner::Part { row, variant } => {
                let name = self.text(key.first());
                let field = crate::names::fields_of(row).find(|field| field.name == name);
                (field.map_or_else(Wanted::default, Wanted::of_field), Flavor::Field { variant })
            }
            Owner::Drive => {
                let field = registry::DRIVE_FIELDS.iter().find(|field| names.first() == Some(&field.name));
                (field.map_or_else(Wanted::default, Wanted::of_field), Flavor::Field { variant: false })
            }
            Owner::Paths => (of_path(self.snapshot, self.file, &names), Flavor::Case),
        };
        let _ = bracket;
        value(self, &statement[equal + 1..], wanted, flavor)
    }

    /// Whose block this is; none for the rows of a table.
    fn owner(self, header: &[Token]) -> Option<Owner> {
        if header.iter().any(|token| token.kind == K::Points) {
            return None;
        }
        let role = match self.text(header.first()) {
            "supply" => Role::Supply,
            "source" => Role::Source,
            "transmission" => Role::Transmission,
            "load" => Role::Load,
            "drive" => return Some(Owner::Drive),
            "case" | "require" | "show" => return Some(Owner::Paths),
            _ => return None,
        };
        match header.get(2).map(|token| token.kind) {
            Some(K::Colon) => {
                let row = registry::row(role, self.text(header.get(3)))?;
                Some(Owner::Part { row, variant: false })
            }
            Some(K::Equal) => {
                let end = header.iter().rposition(|token| token.kind == K::With).unwrap_or(header.len());
                let names = path_at_end(self.cursor, header.get(3..end)?);
                let (part, _) = self.snapshot.names().head(self.file, &names)?;
                matches!(part.what, Declared::Part(_)).then_some(())?;
                Some(Owner::Part { row: row_of_part(self.snapshot, part)?, variant: true })
            }
            _ => None,
        }
    }

    /// What the operand before these tokens' end is: what stands beside it in a comparison is of its kind.
    pub(super) fn beside(self, tokens: &[Token]) -> Wanted {
        let names = path_at_end(self.cursor, tokens);
        if !names.is_empty() {
            return of_path(self.snapshot, self.file, &names);
        }
        let unit = tokens.last().filter(|token| token.kind == K::Unit);
        let unit = unit.and_then(|token| layshaft_units::parse_unit(self.text(Some(token))).ok());
        let kind = unit.and_then(|unit| layshaft_present::unit::kind_of(&unit.ty));
        kind.map_or_else(Wanted::default, |kind| Wanted::of_kind(kind.name))
    }
}

/// Words that may follow a condition.
pub(super) const SCOPES: &[&str] = &["only in", "not in", "only where", "at"];

fn case(rest: &[Token]) -> Option<Place<'static>> {
    match rest.last().map(|token| token.kind) {
        None | Some(K::Plus) => Some(Place::Case),
        Some(K::Name) => Some(Place::Words(&["with"])),
        _ => None,
    }
}

/// Whether an operand is wanted behind a token.
pub(super) const fn wants_operand(kind: K) -> bool {
    operates(kind)
        || matches!(
            kind,
            K::Equal | K::Comma | K::LeftParen | K::PairParen | K::LeftSquare | K::Within | K::Each | K::At
        )
}
