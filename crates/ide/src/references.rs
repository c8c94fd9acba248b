//! Every place that stands for the same thing, and the rename of all of them.

use layshaft_diagnostics::{FileId, FileSpan};
use layshaft_semantics::index::{Reference, Target};
use layshaft_syntax::{DECLARATION_WORDS, RESERVED};

use crate::Snapshot;

/// The places of the thing named at a place, in the order of the texts; without its declaration where `declaration` is
/// false.
#[must_use]
pub fn references(snapshot: &Snapshot, file: FileId, offset: u32, declaration: bool) -> Vec<FileSpan> {
    let Some(reference) = snapshot.reference(file, offset) else { return Vec::new() };
    snapshot
        .index
        .of_target(&reference.target)
        .filter(|other| declaration || !other.declares)
        .map(|other| other.place)
        .collect()
}

/// A place of the same thing in the same file.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Highlight {
    /// Where.
    pub place: FileSpan,
    /// Whether it gives the thing its value there.
    pub writes: bool,
}

/// The places to light up while the cursor stands on a name.
#[must_use]
pub fn highlights(snapshot: &Snapshot, file: FileId, offset: u32) -> Vec<Highlight> {
    let Some(reference) = snapshot.reference(file, offset) else { return Vec::new() };
    snapshot
        .index
        .of_target(&reference.target)
        .filter(|other| other.place.file == file)
        .map(|other| Highlight { place: other.place, writes: other.declares })
        .collect()
}

/// What a rename would change.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Renaming {
    /// The name under the cursor.
    pub place: FileSpan,
    /// Its text, to begin with.
    pub name: String,
}

/// Whether the name at a place can be renamed.
///
/// # Errors
/// Says why not.
pub fn prepare_rename(snapshot: &Snapshot, file: FileId, offset: u32) -> Result<Renaming, String> {
    let reference = snapshot.reference(file, offset).ok_or("there is no name here")?;
    match &reference.target {
        Target::Let(_) | Target::Part(_) | Target::Drive(_) | Target::Case(_) => {}
        Target::File(place, _) if snapshot.text(*place).starts_with('"') => {
            return Err("the name is that of the file; give it another with `use \"…\" as name`".to_owned());
        }
        Target::File(..) => {}
        Target::Field(_, name) if name.contains(' ') => {}
        Target::Field(..) | Target::Result { .. } => {
            return Err("the names of fields and results are words of the language".to_owned());
        }
        _ => return Err("this is a word of the language, not a name of the spec".to_owned()),
    }
    let name = snapshot.text(reference.place).to_owned();
    let name = name.rsplit(' ').next().unwrap_or("").to_owned();
    Ok(Renaming { place: reference.place, name })
}

/// One replacement.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Edit {
    /// What is replaced.
    pub place: FileSpan,
    /// By what.
    pub text: String,
}

/// The replacements that rename the thing at a place everywhere.
///
/// # Errors
/// Says why the name cannot be given: no name, a word of the language, or taken.
pub fn rename(snapshot: &Snapshot, file: FileId, offset: u32, new: &str) -> Result<Vec<Edit>, String> {
    prepare_rename(snapshot, file, offset)?;
    let reference = snapshot.reference(file, offset).ok_or("there is no name here")?;
    allowed(new)?;
    conflict(snapshot, reference, new)?;
    let edit = |other: &Reference| {
        let text = match &other.target {
            Target::Field(_, name) => match name.split_once(' ') {
                Some((field, _)) => format!("{field} {new}"),
                None => new.to_owned(),
            },
            _ => new.to_owned(),
        };
        Edit { place: other.place, text }
    };
    Ok(snapshot.index.of_target(&reference.target).map(edit).collect())
}

/// Whether a word can be a name at all: the lexer decides.
fn allowed(new: &str) -> Result<(), String> {
    let tokens = layshaft_syntax::lex(new);
    let one = tokens.tokens.iter().filter(|token| token.span.start != token.span.end).count() == 1;
    let whole = new.chars().next().is_some_and(|c| c.is_alphabetic() || c == '_')
        && new.chars().all(|c| c.is_alphanumeric() || c == '_');
    if !one || !whole || !tokens.problems.is_empty() {
        return Err(format!("`{new}` cannot be a name: letters, digits and `_`, beginning with a letter"));
    }
    let reserved = RESERVED.iter().chain(DECLARATION_WORDS).any(|word| word.word == new);
    if reserved || matches!(new, "plain" | "pi" | "standard_gravity") {
        return Err(format!("`{new}` is a word of the language"));
    }
    Ok(())
}

/// A declaration of the same file that already has the name.
fn conflict(snapshot: &Snapshot, reference: &Reference, new: &str) -> Result<(), String> {
    let own = match &reference.target {
        Target::Let(place) | Target::Part(place) | Target::Drive(place) | Target::Case(place) => place.file,
        Target::File(place, _) => place.file,
        _ => return Ok(()),
    };
    let taken = snapshot.index.references.iter().find(|other| {
        other.declares
            && other.place.file == own
            && !matches!(other.target, Target::Field(..))
            && other.target != reference.target
            && snapshot.text(other.place) == new
    });
    match (taken, snapshot.file(own)) {
        (Some(other), Some(file)) => {
            let (line, _) = file.lines.human(&file.text, other.place.span.start);
            Err(format!("`{new}` is declared already, in line {line}"))
        }
        _ => Ok(()),
    }
}

#[cfg(test)]
mod tests {
    use super::{references, rename};
    use crate::fixture::Fixture;

    fn check(drawn: &str) {
        let fixture = Fixture::new(drawn);
        assert_eq!(references(&fixture.snapshot, fixture.file, fixture.offset, true), fixture.ranges);
    }

    #[test]
    fn a_value_across_files() {
        check(
            "use \"p.shaft\" as p\nlet a = 2 * p.<|load|>\nlet load = 1 m\n--- p.shaft\nlet <|lo$0ad|> = 5 kN\nlet b = <|load|> / 2\n",
        );
    }

    #[test]
    fn a_part_in_chain_case_and_criterion() {
        check(
            "source <|m$0|>: straight_line { stall_torque = 5 N·m; no_load_speed = 3000 rpm }
load p: constant { torque = 1 N·m }
drive d = <|m|> -> p
case a { <|m|>.stall_torque = 4 N·m }
require \"1\" d.<|m|>.torque <= <|m|>.stall_torque
",
        );
    }

    #[test]
    fn a_rename_refuses_what_is_taken_or_no_name() {
        let fixture = Fixture::new("let lo$0ad = 5 kN\nlet b = load / 2\n");
        let new = |name: &str| rename(&fixture.snapshot, fixture.file, fixture.offset, name);
        assert_eq!(new("weight").map(|edits| edits.len()), Ok(2));
        assert_eq!(new("b"), Err("`b` is declared already, in line 2".to_owned()));
        for bad in ["let", "a b", "2x", "", "a-b", "plain", "if"] {
            assert!(new(bad).is_err(), "{bad}");
        }
    }

    #[test]
    fn a_result_is_no_name_of_the_spec() {
        let fixture = Fixture::new("let a = 2 * p$0i\n");
        assert!(rename(&fixture.snapshot, fixture.file, fixture.offset, "tau").is_err());
    }
}
