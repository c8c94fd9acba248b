//! Go to where a name is declared.

use layshaft_diagnostics::{FileId, FileSpan};

use crate::Snapshot;

/// A jump from a name to its declaration.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Jump {
    /// The name jumped from.
    pub from: FileSpan,
    /// The declared name jumped to.
    pub to: FileSpan,
}

/// The declaration of the name at a place.
#[must_use]
pub fn definition(snapshot: &Snapshot, file: FileId, offset: u32) -> Option<Jump> {
    let reference = snapshot.reference(file, offset)?;
    let to = snapshot.declaration(&reference.target)?;
    Some(Jump { from: reference.place, to })
}

#[cfg(test)]
mod tests {
    use super::definition;
    use crate::fixture::Fixture;

    fn check(drawn: &str) {
        let fixture = Fixture::new(drawn);
        let jump = definition(&fixture.snapshot, fixture.file, fixture.offset).map(|jump| jump.to);
        assert_eq!(jump, fixture.ranges.first().copied());
    }

    #[test]
    fn a_value() {
        check("let <|load|> = 5 kN\nlet a = 2 * lo$0ad\n");
    }

    #[test]
    fn a_field_and_its_override() {
        check(
            "source m: straight_line { <|stall_torque|> = 5 N·m; no_load_speed = 3000 rpm }\ncase a { m.stall$0_torque = 4 N·m }\n",
        );
    }

    #[test]
    fn a_part_of_another_file() {
        check("use \"parts.shaft\" as p\nlet a = 2 * p.lo$0ad\n--- parts.shaft\nlet <|load|> = 5 kN\n");
    }

    #[test]
    fn nothing_for_what_is_built_in() {
        check("let a = 2 * p$0i\n");
    }
}
