//! Documents that commands open: the full result table of a drive, the page of a code.

use layshaft_diagnostics::{Code, FileSpan};
use layshaft_present::sheet::{self, Detail};

use crate::Snapshot;
use crate::hover::{criterion_page, drive_points, drive_rows};
use crate::markup::{Page, text};
use crate::sensitivity::{self, Trials};

/// The page of a code, in Markdown; none for a word that is no code.
#[must_use]
pub fn explain(code: &str) -> Option<&'static str> {
    Some(Code::from_word(code)?.row().page)
}

/// Everything that is known of a drive, in Markdown: every case, every operating point, every criterion in every case,
/// what is assumed, and the cautions. The drive by the place of its name.
#[must_use]
pub fn result_table(snapshot: &Snapshot, drive: FileSpan, trials: &mut Trials<'_>) -> Option<String> {
    let (index, record) = snapshot.drive(drive)?;
    let of = sheet::drive(&snapshot.analysis, index, snapshot.habits(), usize::MAX)?;
    let mut page = Page::default();
    let title = snapshot.analysis.title.as_deref().map(|title| format!("{}: ", text(title)));
    page.paragraph(format!("# {}{}", title.unwrap_or_default(), text(&record.name)));
    page.paragraph(text(&of.chain));
    drive_rows(&mut page, &of);
    drive_points(&mut page, &of, usize::MAX);
    let criteria = snapshot.criteria_of(drive);
    if !criteria.is_empty() {
        page.paragraph("## Criteria");
    }
    for index in criteria {
        page.paragraph(criterion_page(snapshot, *index, usize::MAX).unwrap_or_default());
    }
    assumptions(snapshot, &mut page, record.place, trials);
    Some(page.finish())
}

/// What was assumed of the parts of this drive, and the cautions of the whole spec.
fn assumptions(snapshot: &Snapshot, page: &mut Page, drive: FileSpan, trials: &mut Trials<'_>) {
    let sheet = sheet::sheet(&snapshot.analysis, Detail::Tables);
    let parts: Vec<String> = snapshot
        .drive(drive)
        .into_iter()
        .flat_map(|(_, drive)| drive.cases.first())
        .flat_map(|case| case.parts.iter().filter_map(|place| snapshot.part(*place)))
        .map(|part| format!("{}.", part.name))
        .collect();
    let lines = sheet.assumptions.iter().zip(&snapshot.analysis.assumptions);
    let told: Vec<String> = lines
        .filter(|(line, _)| {
            // A `let` has no part; it may move any drive.
            !line.subject.contains('.') || parts.iter().any(|part| line.subject.starts_with(part.as_str()))
        })
        .map(|(line, assumption)| {
            let value = line.value.as_ref().map_or("", |value| value.text());
            let who = if line.by_tool { "default" } else { "author" };
            let own = format!("{} = {} ({who}: {})", text(&line.subject), text(value), text(&line.reason));
            match sensitivity::of_assumption(snapshot, assumption, trials) {
                Some(moved) => format!("{own}. {}", moved.markdown),
                None => own,
            }
        })
        .collect();
    if !told.is_empty() {
        page.paragraph("## Assumed");
        page.list(&told);
    }
    if !sheet.cautions.is_empty() {
        page.paragraph("## Mind");
        page.list(&sheet.cautions.iter().map(|caution| (*caution).to_owned()).collect::<Vec<_>>());
    }
}

#[cfg(test)]
mod tests {
    use super::{explain, result_table};
    use crate::fixture::Fixture;

    #[test]
    fn the_table_has_every_case() {
        let values: Vec<String> = (1..40).map(|n| format!("{n} N·m")).collect();
        let fixture = Fixture::new(&format!(
            "title \"Fan <b>\"\nsource m: straight_line {{ stall_torque = 10 N·m; no_load_speed = 3000 rpm }}
load fan: quadratic {{ rated_torque = 5 N·m; rated_speed = 1500 rpm }}
drive <|d|> = m -> fan
case all {{ m.stall_torque = each {} }}
require \"R1\" d.speed >= 1000 rpm
",
            values.join(", ")
        ));
        let mut none = |_: layshaft_diagnostics::FileId, _: std::sync::Arc<str>| None;
        let table =
            result_table(&fixture.snapshot, fixture.ranges[0], &mut none).expect("the drive is there");
        for value in values {
            assert!(table.contains(&format!("all\\[{value}\\]")), "{value} is not in {table}");
        }
        assert!(
            table.starts_with("# Fan &lt;b&gt;: d")
                && table.contains("## Criteria")
                && table.contains("## Mind")
        );
        assert!(!table.contains("more; the result table"), "{table}");
    }

    #[test]
    fn an_assumption_says_how_it_moves_the_tightest_margin() {
        let fixture = Fixture::new(
            "let head = 5 N·m  assumed \"guess\"
source m: straight_line { stall_torque = 10 N·m; no_load_speed = 3000 rpm }
load fan: constant { torque = head }
drive <|d|> = m -> fan
require \"R1 quick\" d.speed >= 1000 rpm
",
        );
        let snapshot = fixture.snapshot.clone();
        let mut memo = layshaft_semantics::Memo::default();
        let mut trials = |file: layshaft_diagnostics::FileId, text: std::sync::Arc<str>| {
            crate::sensitivity::trial(&snapshot, &layshaft_semantics::NoFiles, &mut memo, file, text)
        };
        let table = result_table(&fixture.snapshot, fixture.ranges[0], &mut trials).expect("a drive");
        // Straight line: 1500 rpm at half the stall torque; 1 % more load takes 15 rpm, 1.5 points of 1000 rpm.
        let line = table.lines().find(|line| line.starts_with("- head = 5 N·m")).expect("its line");
        assert!(line.contains("R1 quick") && line.contains("points"), "{line}");
    }

    #[test]
    fn a_code_has_its_page() {
        assert!(explain("kind-mismatch").is_some_and(|page| page.contains("kind-mismatch")));
        assert_eq!(explain("no-such-code"), None);
    }
}
