//! The findings of an analysis as an editor lists them.

use layshaft_diagnostics::{Code, Diagnostic, FileSpan, Severity};

use crate::Snapshot;

/// A finding.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Finding {
    /// Where.
    pub place: FileSpan,
    /// How grave.
    pub severity: Severity,
    /// Its code.
    pub code: Code,
    /// What is wrong, why it matters, what to write instead: one line each.
    pub message: String,
    /// Whether it is about words that do nothing.
    pub unnecessary: bool,
    /// Other places that take part, with what is to be seen there.
    pub related: Vec<(FileSpan, String)>,
}

/// Every finding, in the order of the analysis. The same as the command prints, one for one.
#[must_use]
pub fn findings(snapshot: &Snapshot) -> Vec<Finding> {
    snapshot.analysis.diagnostics.iter().map(finding).collect()
}

fn finding(found: &Diagnostic) -> Finding {
    let mut message = found.message.clone();
    let label = Some(&found.primary.text).filter(|text| !text.is_empty());
    for line in label.into_iter().chain(&found.notes).chain(&found.help) {
        message.push('\n');
        message.push_str(line);
    }
    Finding {
        place: found.primary.place,
        severity: found.severity,
        code: found.code,
        message,
        unnecessary: is_unnecessary(found.code),
        related: found.related.iter().map(|label| (label.place, label.text.clone())).collect(),
    }
}

/// Whether a code is about words that could be left out.
fn is_unnecessary(code: Code) -> bool {
    code.row().word.starts_with("unused")
}

#[cfg(test)]
mod tests {
    use super::findings;
    use crate::fixture::Fixture;

    #[test]
    fn one_mistake_is_one_finding_where_it_stands() {
        let fixture = Fixture::new("let a = <|5 kW + 3 kN|>\nlet b = 2 * a\n$0");
        let found = findings(&fixture.snapshot);
        assert_eq!(found.len(), 1, "{found:?}");
        let place = found[0].place;
        assert!(
            fixture.ranges[0].span.start <= place.span.start && place.span.end <= fixture.ranges[0].span.end
        );
        assert_eq!(found[0].code.row().word, "kind-mismatch");
    }

    #[test]
    fn a_finding_of_another_file_names_that_file() {
        let fixture =
            Fixture::new("use \"parts.shaft\" as p\nlet a = p.x\n--- parts.shaft\nlet x = 5 kW + <|3 kN|>\n");
        let found = findings(&fixture.snapshot);
        assert!(found.iter().any(|one| one.place.file == fixture.ranges[0].file), "{found:?}");
    }
}
