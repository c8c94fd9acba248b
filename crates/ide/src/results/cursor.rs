//! Which drive, case and part a cursor stands on.

use layshaft_diagnostics::{FileId, FileSpan, Span};
use layshaft_semantics::index::Target;
use layshaft_syntax::ItemKind;

use crate::Snapshot;

/// What a cursor points at.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub(super) struct Pointed {
    /// Index of the drive.
    pub drive: Option<usize>,
    /// Index of the case.
    pub case: Option<usize>,
    /// The place of the name of the part.
    pub part: Option<FileSpan>,
}

/// What stands under the cursor: the name there first, then the names of its declaration.
pub(super) fn pointed(snapshot: &Snapshot, file: FileId, offset: u32) -> Pointed {
    let mut found = Pointed::default();
    if let Some(name) = snapshot.reference(file, offset) {
        found.take(snapshot, &name.target);
    }
    let Some(item) = snapshot.item(file, offset) else { return found };
    let place = |span: Span| FileSpan { file, span: span.shifted(item.offset) };
    match &item.tree.kind {
        ItemKind::Part { name, .. } => found.take(snapshot, &Target::Part(place(name.span))),
        ItemKind::Drive { name, .. } => found.take(snapshot, &Target::Drive(place(name.span))),
        ItemKind::Case { name, .. } => {
            found.take(snapshot, &Target::Case(place(name.span)));
            found.names(snapshot, place(item.tree.span));
        }
        ItemKind::Require { .. } | ItemKind::Show { .. } => {
            let whole = place(item.tree.span);
            found.names(snapshot, whole);
            let criterion = snapshot.analysis.criteria.iter().find(|one| one.place == whole);
            let governing = criterion.and_then(|one| one.outcomes.get(one.governing?));
            found.case = found.case.or(governing.map(|outcome| outcome.case));
        }
        _ => {}
    }
    found
}

impl Pointed {
    fn names(&mut self, snapshot: &Snapshot, place: FileSpan) {
        for name in snapshot.names_in(place) {
            self.take(snapshot, &name.target);
        }
    }

    /// What is known already stays.
    fn take(&mut self, snapshot: &Snapshot, target: &Target) {
        match target {
            Target::Drive(place) => self.drive(snapshot, *place),
            Target::Part(place) => self.part(snapshot, *place),
            Target::Field(owner, _) => {
                self.drive(snapshot, *owner);
                self.part(snapshot, *owner);
            }
            Target::Result { drive, part, .. } => {
                drive.iter().for_each(|place| self.drive(snapshot, *place));
                part.iter().for_each(|place| self.part(snapshot, *place));
            }
            Target::Case(place) => {
                self.case = self.case.or_else(|| snapshot.states(*place).next().map(|(index, _)| index));
            }
            _ => {}
        }
    }

    fn drive(&mut self, snapshot: &Snapshot, place: FileSpan) {
        self.drive = self.drive.or_else(|| snapshot.drive(place).map(|(index, _)| index));
    }

    fn part(&mut self, snapshot: &Snapshot, place: FileSpan) {
        if snapshot.part(place).is_some() {
            self.part = self.part.or(Some(place));
            self.drive = self.drive.or_else(|| snapshot.drives_with(place).next().map(|(index, _)| index));
        }
    }
}
