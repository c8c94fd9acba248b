//! The page of a thing's kind, as a document of its own: kinds of parts and kinds of quantities.

use layshaft_diagnostics::{FileId, FileSpan};
use layshaft_mechanics::registry::{self, ResultShape, Role, Shape};
use layshaft_present::sheet::role_word;
use layshaft_present::unit::kind_of;
use layshaft_semantics::index::Target;
use layshaft_semantics::quantity::Datum;

use crate::Snapshot;
use crate::hover::{part_kind, quantity_kind, row_of};

/// A document that no file holds.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Document {
    /// A name that stays the same: `kinds/source/dc_motor.md`.
    pub name: String,
    /// Its Markdown.
    pub text: String,
}

/// The page of the kind of what is named at a place, and the name's own place.
#[must_use]
pub fn type_definition(snapshot: &Snapshot, file: FileId, offset: u32) -> Option<(FileSpan, Document)> {
    let name = snapshot.reference(file, offset)?;
    Some((name.place, page(snapshot, &name.target)?))
}

/// A page by the name of its document, for clients that open it again.
#[must_use]
pub fn document(name: &str) -> Option<Document> {
    let inner = name.strip_prefix("kinds/")?.strip_suffix(".md")?;
    match inner.split_once('/') {
        Some((role, word)) => {
            let roles = [Role::Supply, Role::Source, Role::Transmission, Role::Load];
            part_page(*roles.iter().find(|known| role_word(**known) == role)?, word)
        }
        None => quantity_page(inner),
    }
}

fn part_page(role: Role, word: &str) -> Option<Document> {
    let text = part_kind(role, word)?;
    Some(Document { name: format!("kinds/{}/{word}.md", role_word(role)), text })
}

fn quantity_page(word: &str) -> Option<Document> {
    Some(Document { name: format!("kinds/{word}.md"), text: quantity_kind(word)? })
}

fn page(snapshot: &Snapshot, target: &Target) -> Option<Document> {
    match target {
        Target::Part(place) => {
            let part = snapshot.part(*place)?;
            part_page(part.role, part.row?.name)
        }
        Target::PartKind(role, word) => part_page(*role, word),
        Target::QuantityKind(word) => quantity_page(word),
        Target::Let(place) => of_datum(snapshot.value(*place)?.value.as_ref()?),
        Target::Field(owner, name) => {
            let word = name.split(' ').next().unwrap_or(name);
            let row = match snapshot.part(*owner) {
                Some(part) => {
                    let own = part.row.map_or(&[][..], |row| row.fields);
                    own.iter().chain(registry::common_fields(part.role)).find(|field| field.name == word)?
                }
                None => registry::DRIVE_FIELDS.iter().find(|field| field.name == word)?,
            };
            match row.shape {
                Shape::Quantity(kind) | Shape::OfRated(kind) | Shape::Interval(kind) => quantity_page(kind),
                _ => None,
            }
        }
        Target::Result { part, name, drive, .. } => {
            let row = row_of(snapshot, *part, name)?;
            let linear = || {
                let (_, drive) = snapshot.drive((*drive)?)?;
                let case = crate::numbers::plain(drive)?;
                let at = part.and_then(|part| case.parts.iter().position(|known| *known == part));
                case.solution.as_deref()?.motion(at, None)
            };
            match row.shape {
                ResultShape::Quantity(kind) => quantity_page(kind),
                ResultShape::Speed => quantity_page(linear()?.speed_kind()),
                ResultShape::Effort => quantity_page(linear()?.effort_kind()),
                _ => None,
            }
        }
        _ => None,
    }
}

fn of_datum(datum: &Datum) -> Option<Document> {
    match datum {
        Datum::Quantity(quantity) => quantity_page(kind_of(&quantity.ty)?.name),
        _ => None,
    }
}

#[cfg(test)]
mod tests {
    use super::{document, type_definition};
    use crate::fixture::Fixture;

    fn check(drawn: &str, expected: Option<&str>) {
        let fixture = Fixture::new(drawn);
        let found = type_definition(&fixture.snapshot, fixture.file, fixture.offset).map(|(_, page)| page);
        assert_eq!(found.as_ref().map(|page| page.name.as_str()), expected);
        assert_eq!(found.as_ref().and_then(|page| document(&page.name)), found);
    }

    #[test]
    fn pages_of_parts_values_and_fields() {
        check("let a$0 = 5 N·m\n", Some("kinds/torque.md"));
        check("source m$0: straight_line { }\n", Some("kinds/source/straight_line.md"));
        check("source m: straight_line { stall$0_torque = 5 N·m }\n", Some("kinds/torque.md"));
        check("let a = p$0i\n", None);
    }
}
