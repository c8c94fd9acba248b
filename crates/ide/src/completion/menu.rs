//! The entries of a list, ranked, and cut where there are very many.

use std::borrow::Cow;

use crate::names::Named;

/// Most entries of a list; more are cut by what is typed, and the list is asked for again with the next letter.
const MOST: usize = 100;

/// Names have ranks below this.
const RANKS: usize = 6;

/// What an entry is.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
#[allow(missing_docs, reason = "the names say it")]
pub enum CompletionKind {
    Keyword,
    PartKind,
    QuantityKind,
    Field,
    Unit,
    Value,
    Part,
    Drive,
    Case,
    Result,
    Function,
    Constant,
    Word,
    Code,
    File,
    Folder,
    Form,
}

/// An entry.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Completion {
    /// What is shown.
    pub label: String,
    /// What it is.
    pub kind: CompletionKind,
    /// A few words beside it: kind, unit, meaning.
    pub note: Cow<'static, str>,
    /// What is written where it is not the label.
    pub insert: Option<String>,
    /// Whether `insert` holds places to be filled in.
    pub snippet: bool,
    /// What the typed letters are compared with; the label where it is none.
    pub filter: Option<String>,
    /// The lower, the better; equal ones stay in their order.
    pub rank: u8,
    /// What [`super::documentation`] is asked for; empty where there is nothing more to tell.
    pub subject: String,
}

/// A list in the making.
pub(super) struct Menu<'t> {
    typed: &'t str,
    /// Whether an entry may hold places to be filled in.
    pub snippets: bool,
    /// Whether some names were left out.
    cut: bool,
    items: Vec<Completion>,
}

impl<'t> Menu<'t> {
    pub fn new(typed: &'t str, snippets: bool) -> Self {
        Self { typed, snippets, cut: false, items: Vec::new() }
    }

    /// What is typed so far.
    pub fn typed(&self) -> &'t str {
        self.typed
    }

    /// Adds an entry that is written as it is shown; the entry, to be described further.
    pub fn add(&mut self, rank: u8, kind: CompletionKind, label: &str) -> &mut Completion {
        self.items.push(Completion {
            label: label.to_owned(),
            kind,
            note: Cow::Borrowed(""),
            insert: None,
            snippet: false,
            filter: None,
            rank,
            subject: String::new(),
        });
        let last = self.items.len() - 1;
        &mut self.items[last]
    }

    /// The best of many names by their ranks, in their order: where there are more than a list holds, the typed
    /// letters choose first. Nothing is made of the others.
    pub fn best<'n>(
        &mut self,
        names: impl ExactSizeIterator<Item = (&'n str, Named)>,
        rank: impl Fn(&str, Named) -> Option<u8>,
    ) -> Vec<(u8, &'n str, Named)> {
        // A client chooses among few by rules of its own.
        let many = names.len() > MOST;
        self.cut |= many;
        let mut ranks: Vec<Vec<(u8, &'n str, Named)>> = vec![Vec::new(); RANKS];
        for (name, named) in names {
            if many && !holds(name, self.typed) {
                continue;
            }
            let Some(rank) = rank(name, named) else { continue };
            if let Some(found) = ranks.get_mut(usize::from(rank)).filter(|found| found.len() < MOST) {
                found.push((rank, name, named));
            }
        }
        ranks.into_iter().flatten().take(MOST).collect()
    }

    /// The entries, ranked; whether some were left out.
    pub fn finish(mut self) -> (Vec<Completion>, bool) {
        self.items.sort_by_key(|item| item.rank);
        if self.items.len() <= MOST {
            return (self.items, self.cut);
        }
        let typed = self.typed;
        self.items.retain(|item| holds(item.filter.as_deref().unwrap_or(&item.label), typed));
        self.items.truncate(MOST);
        (self.items, true)
    }
}

/// Whether a label holds the typed letters in their order, case aside.
fn holds(label: &str, typed: &str) -> bool {
    if label.is_ascii() && typed.is_ascii() {
        let mut letters = label.bytes();
        return typed.bytes().all(|byte| letters.any(|other| other.eq_ignore_ascii_case(&byte)));
    }
    let mut letters = label.chars().flat_map(char::to_lowercase);
    typed.chars().flat_map(char::to_lowercase).all(|c| letters.any(|other| other == c))
}

impl Completion {
    /// What is written.
    #[must_use]
    pub fn text(&self) -> &str {
        self.insert.as_deref().unwrap_or(&self.label)
    }

    /// A few words beside the label.
    pub fn note(&mut self, words: impl Into<Cow<'static, str>>) -> &mut Self {
        self.note = words.into();
        self
    }

    /// What is written instead of the label.
    pub fn insert(&mut self, text: impl Into<String>) -> &mut Self {
        self.insert = Some(text.into());
        self
    }

    /// What is written, with places to be filled in.
    pub fn form(&mut self, text: impl Into<String>) -> &mut Self {
        self.snippet = true;
        self.insert(text)
    }

    /// What more can be told of.
    pub fn about(&mut self, subject: impl Into<String>) -> &mut Self {
        self.subject = subject.into();
        self
    }
}
