//! The tree of a spec.
//!
//! Every span inside an [`ItemTree`] is relative to the start of its item, so a tree depends on the text of its
//! item alone and can be shared between two states of a file (and kept in a memo by that text).

use std::sync::Arc;

use layshaft_diagnostics::{Code, Span};

mod asked;
mod expr;
mod value;

pub use asked::*;
pub use expr::*;
pub use value::*;

/// A whole file: its items in the order of the text.
#[derive(Clone, Debug, Default)]
pub struct File {
    /// The items.
    pub items: Vec<Item>,
    /// What is wrong with the text outside every item (encoding, size, unreadable characters), file offsets.
    pub problems: Vec<Problem>,
    /// The documentation of the file itself: the `##` block above `title` or followed by a blank line.
    pub docs: Vec<Text>,
}

/// One item where it stands.
#[derive(Clone, Debug)]
pub struct Item {
    /// Offset of the item's first byte in the file.
    pub offset: u32,
    /// The item's tree; equal for equal item texts.
    pub tree: Arc<ItemTree>,
}

/// The tree of one item, independent of its place.
#[derive(Clone, Debug)]
pub struct ItemTree {
    /// The bytes of the item that mean something, from its first word (its `##` lines excluded) to its last.
    pub span: Span,
    /// Its `##` lines.
    pub docs: Vec<Text>,
    /// What it declares; `Broken` where not even that could be read.
    pub kind: ItemKind,
    /// What is wrong in it.
    pub problems: Vec<Problem>,
}

/// A finding of the lexer or the grammar.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Problem {
    /// The code of the finding.
    pub code: Code,
    /// Where, relative to the item (or to the file for a problem of the file).
    pub span: Span,
    /// What is wrong.
    pub message: String,
    /// A second place and its words, such as the bracket that was opened.
    pub related: Option<(Span, String)>,
    /// What to write instead, in words.
    pub help: Option<String>,
    /// Offers to mend it: a title and replacements.
    pub fixes: Vec<(String, Vec<(Span, String)>)>,
}

/// A name as written, in normal form C. An empty one stands where a name is missing, which was reported: nothing is
/// to be said of it again.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Name {
    /// The name.
    pub text: Box<str>,
    /// Where.
    pub span: Span,
}

/// A text between quotes (or of a `##` line), its escapes resolved.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Text {
    /// The text.
    pub value: Box<str>,
    /// Where, the quotes included.
    pub span: Span,
}

/// `a.b.c`
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Path {
    /// At least one name.
    pub names: Vec<Name>,
    /// From the first to the last name.
    pub span: Span,
}

/// What an item declares.
#[derive(Clone, Debug)]
#[allow(clippy::large_enum_variant, reason = "items live behind an Arc, one each")]
pub enum ItemKind {
    /// `language 1`
    Language(Number),
    /// `title "…"`
    Title(Text),
    /// `revision "…"`
    Revision(Text),
    /// `use "path" as name`
    Use {
        /// The path as written.
        path: Text,
        /// The name its declarations are reached by; the file's stem without one.
        alias: Option<Name>,
    },
    /// `let name: kind = value`
    Let {
        /// The name.
        name: Name,
        /// The kind it is settled to.
        kind: Option<Name>,
        /// The value.
        value: Value,
    },
    /// `source name: kind { … }` or `source name = base with { … }`
    Part {
        /// The word of the declaration.
        role: RoleWord,
        /// Its place.
        role_span: Span,
        /// The name.
        name: Name,
        /// Kind or base.
        base: PartBase,
        /// The fields.
        block: Block,
    },
    /// `drive name = chain { … }`
    Drive {
        /// The name.
        name: Name,
        /// The parts from the sources to the loads.
        chain: Chain,
        /// The settings.
        block: Option<Block>,
    },
    /// `case name { … }`, `case name = a + b with { … }`
    Case {
        /// The name.
        name: Name,
        /// The cases it is composed of.
        bases: Vec<Name>,
        /// What it overrides; every key is a path of at least two names.
        block: Option<Block>,
    },
    /// `require "clause" condition …`
    Require {
        /// The clause it stands for.
        clause: Text,
        /// The condition.
        condition: Expr,
        /// `at ride.speed = 15 km/h`, `at ride.speed = 10 km/h .. 20 km/h`
        at: Option<At>,
        /// `probability 95 %`
        probability: Option<Expr>,
        /// `only in …`, `not in …`, `only where …`
        scopes: Vec<Scope>,
    },
    /// `show value as unit`
    Show {
        /// What is shown.
        value: Expr,
        /// In which unit.
        unit: Option<UnitText>,
        /// At a stated speed.
        at: Option<At>,
        /// In which cases.
        scopes: Vec<Scope>,
    },
    /// `allow code because "reason"`
    Allow(Allow),
    /// Words of a later language: `duty`, `vary`, `determine`, kept so that they are named in the message.
    Later(Name),
    /// Not readable; the problems say why.
    Broken,
}

/// `allow code because "reason"`
#[derive(Clone, Debug)]
pub struct Allow {
    /// The code, its hyphens included.
    pub code: Name,
    /// The reason.
    pub because: Text,
    /// The whole.
    pub span: Span,
}

/// The word that declares a part.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub enum RoleWord {
    /// `supply`
    Supply,
    /// `source`
    Source,
    /// `transmission`
    Transmission,
    /// `load`
    Load,
}

/// What a part is made of.
#[derive(Clone, Debug)]
pub enum PartBase {
    /// `: kind`
    Kind(Name),
    /// `= base with`
    Variant(Path),
}

/// `{ … }`
#[derive(Clone, Debug, Default)]
pub struct Block {
    /// The entries that could be read.
    pub entries: Vec<Entry>,
    /// `allow` lines inside.
    pub allows: Vec<Allow>,
    /// Braces included.
    pub span: Span,
}

/// `path = value`, or `gear 1 = reduction 14.5`
#[derive(Clone, Debug)]
pub struct Entry {
    /// `##` lines above.
    pub docs: Vec<Text>,
    /// The key. `gear 1` has the path `gear` and the member `1`.
    pub key: Path,
    /// The `1` of `gear 1`, the name in `gear low`.
    pub member: Option<Name>,
    /// The value; `Missing` where the line is half typed.
    pub value: Value,
    /// The whole.
    pub span: Span,
}
