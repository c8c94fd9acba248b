//! Findings on a terminal: the place in the text, underlined, with the reason and what to write instead.

use ariadne::{CharSet, Color, Config, IndexType, Label, Report, ReportKind};
use layshaft_diagnostics::{Diagnostic, Severity};
use layshaft_present::escape::terminal;
use layshaft_semantics::Analysis;

use super::sources::{Place, Sources};
use super::style::{Style, Tone};

/// Every finding of an analysis, each followed by an empty line.
#[must_use]
pub fn findings(analysis: &Analysis, names: &[String], style: Style) -> String {
    if analysis.diagnostics.is_empty() {
        return String::new();
    }
    let sources = Sources::new(analysis, names);
    let mut out = String::new();
    for finding in &analysis.diagnostics {
        out.push_str(&one(finding, &sources, style));
        out.push('\n');
    }
    out
}

fn one(finding: &Diagnostic, sources: &Sources, style: Style) -> String {
    let places: Option<Vec<Place>> = std::iter::once(&finding.primary)
        .chain(&finding.related)
        .map(|label| sources.place(label.place))
        .collect();
    match places {
        Some(places) if !places.iter().any(|place| sources.on_long_line(*place)) => {
            drawn(finding, &places, sources, style).unwrap_or_else(|| plain(finding, sources, style))
        }
        _ => plain(finding, sources, style),
    }
}

/// With the lines of the text.
fn drawn(finding: &Diagnostic, places: &[Place], sources: &Sources, style: Style) -> Option<String> {
    let config = Config::new()
        .with_color(style.color)
        .with_index_type(IndexType::Char)
        .with_char_set(CharSet::Unicode)
        .with_tab_width(4);
    let (kind, color) = match finding.severity {
        Severity::Error => (ReportKind::Error, Color::Red),
        Severity::Warning => (ReportKind::Warning, Color::Yellow),
        Severity::Hint => (ReportKind::Custom("Hint", Color::Cyan), Color::Cyan),
    };
    let mut report = Report::build(kind, *places.first()?)
        .with_config(config)
        .with_code(finding.code.row().word)
        .with_message(terminal(&finding.message));
    let labels = std::iter::once(&finding.primary).chain(&finding.related);
    for (at, (label, place)) in labels.zip(places).enumerate() {
        let color = if at == 0 { color } else { Color::Cyan };
        // A label without words would be marked by colour alone.
        let words = if label.text.is_empty() { "here" } else { &label.text };
        let drawn = Label::new(*place).with_color(color).with_order(at as i32);
        report = report.with_label(drawn.with_message(terminal(words)));
    }
    for note in &finding.notes {
        report = report.with_note(terminal(note));
    }
    for help in helps(finding) {
        let lines: Vec<_> = help.lines().map(terminal).collect();
        report = report.with_help(lines.join("\n"));
    }
    let mut bytes = Vec::new();
    report.finish().write(sources, &mut bytes).ok()?;
    let mut text = String::from_utf8(bytes).ok()?;
    if !style.color {
        // The library paints the word of a kind of its own even so.
        text = unpainted(&text);
    }
    Some(text.lines().map(|line| format!("{}\n", line.trim_end())).collect())
}

/// Without colour codes; none can be the author's, whose control characters are escaped before.
fn unpainted(text: &str) -> String {
    let mut parts = text.split("\u{1b}[");
    let mut out = String::from(parts.next().unwrap_or_default());
    parts.for_each(|part| out.push_str(part.split_once('m').map_or(part, |(_, rest)| rest)));
    out
}

/// Without the lines of the text, where these are too long: places with a piece around each.
fn plain(finding: &Diagnostic, sources: &Sources, style: Style) -> String {
    let (word, tone) = match finding.severity {
        Severity::Error => ("Error", Tone::Bad),
        Severity::Warning => ("Warning", Tone::Warn),
        Severity::Hint => ("Hint", Tone::Strong),
    };
    let head = format!("[{}] {word}:", finding.code.row().word);
    let mut out = format!("{} {}\n", style.paint(tone, &head), terminal(&finding.message));
    for label in std::iter::once(&finding.primary).chain(&finding.related) {
        let name = sources.name(label.place.file);
        let Some(place) = sources.place(label.place) else { continue };
        let (line, column, piece) = sources.excerpt(place);
        out.push_str(&format!("   {name}:{line}:{column}: {piece}\n"));
        if !label.text.is_empty() {
            out.push_str(&format!("      {}\n", terminal(&label.text)));
        }
    }
    for help in helps(finding) {
        let lines: Vec<_> = help.lines().map(terminal).collect();
        out.push_str(&format!("   Help: {}\n", lines.join("\n         ")));
    }
    for note in &finding.notes {
        out.push_str(&format!("   Note: {}\n", terminal(note)));
    }
    out
}

/// What to write instead: the help, then every fix by its title.
fn helps(finding: &Diagnostic) -> Vec<String> {
    finding.help.iter().cloned().chain(finding.fixes.iter().map(|fix| fix.title.clone())).collect()
}

#[cfg(test)]
mod tests {
    use super::*;
    use layshaft_diagnostics::{Code, FileId, FileSpan, LineIndex, Span};
    use layshaft_present::escape::is_hostile;
    use layshaft_semantics::analysis::SourceFile;
    use proptest::prelude::*;
    use std::sync::Arc;

    const NO: Style = Style { color: false };

    fn analysis(texts: &[&str], found: Vec<Diagnostic>) -> Analysis {
        let file = |text: &&str| SourceFile {
            path: String::from("a.shaft"),
            text: Arc::from(*text),
            lines: Arc::new(LineIndex::new(text)),
            tree: Arc::default(),
        };
        Analysis { files: texts.iter().map(file).collect(), diagnostics: found, ..Analysis::default() }
    }

    fn at(file: u32, start: u32, end: u32) -> FileSpan {
        FileSpan { file: FileId(file), span: Span::new(start, end) }
    }

    #[test]
    fn a_help_of_several_lines_stands_in_several_lines() {
        let found = Diagnostic::new(Code::MissingField, at(0, 4, 5), "m").help("add a = … m\nb = … s");
        let shown = findings(&analysis(&["let x = 9.81\n"], vec![found]), &[String::from("a.shaft")], NO);
        assert!(shown.contains("add a = … m\n") && !shown.contains("\\n"), "{shown}");
    }

    #[test]
    fn no_colour_means_none_for_any_severity() {
        for code in [Code::KindMismatch, Code::Overspeed, Code::TypedFactor] {
            let found = Diagnostic::new(code, at(0, 4, 5), "m");
            let shown = findings(&analysis(&["let x = 9.81\n"], vec![found]), &[String::from("a.shaft")], NO);
            assert!(!shown.contains('\u{1b}') && shown.contains(code.row().word), "{shown:?}");
        }
    }

    #[test]
    fn a_finding_shows_place_reason_and_cure() {
        let text = "title \"é\"\nlet x: torque = 5 J\n";
        let start = text.find("5 J").unwrap() as u32;
        let found = Diagnostic::new(
            Code::KindMismatch,
            at(0, start, start + 3),
            "an energy where a torque is wanted",
        )
        .label("this is an energy")
        .note("a torque is force times arm")
        .fix("write `5 N·m`", at(0, start, start + 3), "5 N·m");
        let want = "\
[kind-mismatch] Error: an energy where a torque is wanted
   ╭─[ spec.shaft:2:17 ]
   │
 2 │ let x: torque = 5 J
   │                 ─┬─
   │                  ╰─── this is an energy
   │
   │ Help: write `5 N·m`
   │
   │ Note: a torque is force times arm
───╯

";
        assert_eq!(findings(&analysis(&[text], vec![found]), &[String::from("spec.shaft")], NO), want);
    }

    #[test]
    fn hostile_characters_of_text_and_message_are_shown_by_signs() {
        let text = "let a = \"\u{1b}[2J\u{202e}\"\n";
        let found = Diagnostic::new(Code::BadText, at(0, 9, 10), "a \u{1b}[31m control\ncharacter");
        let out = findings(&analysis(&[text], vec![found]), &[String::from("x\u{1b}.shaft")], NO);
        assert!(!out.chars().any(|c| is_hostile(c) && c != '\n'), "{out:?}");
        assert!(out.contains("␛[2J") && out.contains("x\\u{1b}.shaft"), "{out}");
    }

    #[test]
    fn a_very_long_line_is_cut_around_the_place() {
        let text = format!("let a = {}5 J{}\n", "1 + ".repeat(100_000), " + 2".repeat(100_000));
        let start = text.find("5 J").unwrap() as u32;
        let found = Diagnostic::new(Code::KindMismatch, at(0, start, start + 3), "not a number").help("no");
        let out = findings(&analysis(&[&text], vec![found]), &[], NO);
        assert!(out.contains("a.shaft:1:400009: …") && out.contains("5 J + 2") && out.len() < 400, "{out}");
    }

    proptest! {
        #![proptest_config(ProptestConfig::with_cases(200))]
        #[test]
        fn any_span_in_any_text_is_drawn_harmlessly(
            texts in proptest::collection::vec("[ab é日\\t\\r\\n\u{1b}\u{85}\u{2028}\u{feff}]{0,40}", 1..3),
            spans in proptest::collection::vec((0u32..3, 0u32..60, 0u32..60), 1..4),
        ) {
            let mut spans = spans.into_iter();
            let (file, start, end) = spans.next().unwrap();
            let mut found = Diagnostic::new(Code::Syntax, at(file, start, end), "m").label("l");
            for (file, start, end) in spans {
                found = found.related(at(file, start, end), "r");
            }
            let texts: Vec<&str> = texts.iter().map(String::as_str).collect();
            let out = findings(&analysis(&texts, vec![found]), &[], NO);
            prop_assert!(out.contains("[syntax] Error: m"));
            prop_assert!(!out.chars().any(|c| is_hostile(c) && c != '\n'), "{out:?}");
        }
    }
}
