//! What the tests of whole specs share: analyze a text, put questions to it, take its fixes.

#![allow(dead_code, reason = "every test takes what it needs")]
#![allow(clippy::disallowed_methods, reason = "tests read their own folders")]

use std::path::{Path, PathBuf};
use std::sync::Arc;

use layshaft_diagnostics::{Diagnostic, Fix};
use layshaft_semantics::analysis::ShowOutcome;
use layshaft_semantics::quantity::Datum;
use layshaft_semantics::{Analysis, MemoryFiles};

/// A file or folder of the tests.
pub fn path(name: &str) -> PathBuf {
    Path::new(env!("CARGO_MANIFEST_DIR")).join(name)
}

/// The text of a file of the tests.
pub fn text(name: &str) -> String {
    std::fs::read_to_string(path(name)).unwrap_or_else(|error| panic!("{name}: {error}"))
}

/// The names of the files of a folder of the tests that end so, in order.
pub fn names(folder: &str, ending: &str) -> Vec<String> {
    let entries = path(folder).read_dir().unwrap_or_else(|error| panic!("{folder}: {error}"));
    let mut names: Vec<String> = entries
        .map(|entry| entry.expect("a folder can be listed").file_name().to_string_lossy().into_owned())
        .filter(|name| name.ends_with(ending))
        .collect();
    names.sort();
    assert!(!names.is_empty(), "{folder} has no file that ends in `{ending}`");
    names
}

/// Files in memory: path and text.
pub fn files(texts: &[(&str, &str)]) -> MemoryFiles {
    let texts = texts.iter().map(|(path, text)| ((*path).to_owned(), Arc::from(*text))).collect();
    MemoryFiles { texts }
}

/// The files that the worked specs use, by their paths.
pub fn spec_files() -> MemoryFiles {
    let mut texts = std::collections::BTreeMap::new();
    for (folder, ending) in [("parts", ".shaft"), ("curves", ".csv")] {
        for name in names(&format!("specs/{folder}"), ending) {
            let text = text(&format!("specs/{folder}/{name}"));
            texts.insert(format!("{folder}/{name}"), Arc::from(text));
        }
    }
    MemoryFiles { texts }
}

/// The analysis of a spec that stands alone.
pub fn analyze(text: &str) -> Analysis {
    layshaft_semantics::analyze("spec.shaft", text.into(), &MemoryFiles::default())
}

/// The codes of the messages, in order.
pub fn codes(analysis: &Analysis) -> Vec<&'static str> {
    analysis.diagnostics.iter().map(|found| found.code.row().word).collect()
}

/// A message as one line: code, place in the text, words, help.
pub fn line(analysis: &Analysis, found: &Diagnostic) -> String {
    let place = found.primary.place;
    let text = analysis.file(place.file).map_or("", |file| &file.text);
    let at = text.get(place.span.start as usize..place.span.end as usize).unwrap_or("?");
    let at: String = at.chars().take(40).collect();
    let help = found.help.as_deref().map_or(String::new(), |help| format!(" [{help}]"));
    let fixes: Vec<&str> = found.fixes.iter().map(|fix| fix.title.as_str()).collect();
    format!("{}: {} at `{at}`{help} {fixes:?}", found.code.row().word, found.message)
}

/// Every message, one a line.
pub fn lines(analysis: &Analysis) -> String {
    let lines: Vec<String> = analysis.diagnostics.iter().map(|found| line(analysis, found)).collect();
    lines.join("\n")
}

/// The text with a fix applied; fixes of other files leave it as it is.
pub fn apply(text: &str, fix: &Fix) -> String {
    let mut edits: Vec<_> = fix.edits.iter().filter(|edit| edit.place.file.0 == 0).collect();
    edits.sort_by_key(|edit| edit.place.span.start);
    let mut out = text.to_owned();
    for edit in edits.iter().rev() {
        out.replace_range(edit.place.span.start as usize..edit.place.span.end as usize, &edit.text);
    }
    out
}

/// A spec with questions behind it, one `show` each.
pub fn asking<'a>(text: &str, asks: impl Iterator<Item = &'a str>) -> String {
    let mut out = text.trim_end().to_owned();
    for ask in asks {
        out.push_str("\nshow ");
        out.push_str(ask);
    }
    out.push('\n');
    out
}

/// The answer to the question `index` in a case, or why there is none.
pub fn answer(analysis: &Analysis, index: usize, case: &str) -> Result<Datum, String> {
    let show = analysis.shows.get(index).ok_or("the question was not read")?;
    let case = |outcome: &&ShowOutcome| {
        let label = analysis.cases.get(outcome.case).map_or("", |case| case.label.as_str());
        let named = match &outcome.gear {
            Some(gear) => format!("{label}, gear {gear}"),
            None => label.to_owned(),
        };
        named == case || label == case
    };
    let outcome = show.outcomes.iter().find(case).ok_or("it is not asked in this case")?;
    match (&outcome.value, &outcome.remark) {
        (Some(value), _) => Ok(value.clone()),
        (None, Some(remark)) => Err(remark.clone()),
        (None, None) => Err("no value".to_owned()),
    }
}

/// SI value of one of a unit: factors of the tests' own, so that a wrong unit of the tool is seen.
pub fn factor(unit: &str) -> f64 {
    let pi = std::f64::consts::PI;
    match unit {
        "" | "rad/s" | "N·m" | "N" | "W" | "A" | "V" | "s" | "m" | "m/s" | "m/s²" | "Hz" | "N·m/A"
        | "V·s/rad" | "Ω" | "m³/s" | "Pa" | "kg" | "kg·m²" | "kg/m" | "kg/s" | "J" | "rad/s²" => 1.0,
        "rpm" => pi / 30.0,
        "°" => pi / 180.0,
        "lbf·in" => 0.453_592_37 * 9.806_65 * 0.0254,
        "kW" | "kN·m" | "kN" | "kJ" | "kPa" => 1000.0,
        "hp" => 745.699_871_582_270_2,
        "km/h" => 1.0 / 3.6,
        "m/min" | "1/min" => 1.0 / 60.0,
        "m³/h" => 1.0 / 3600.0,
        "t/h" => 1.0 / 3.6,
        "cfm" => 0.3048 * 0.3048 * 0.3048 / 60.0,
        "gal_us/min" => 231.0 * 0.0254 * 0.0254 * 0.0254 / 60.0,
        "ft" => 0.3048,
        "mm" | "ms" => 1e-3,
        "%" => 0.01,
        other => panic!("the tests know no unit `{other}`"),
    }
}
