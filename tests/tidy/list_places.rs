//! Where the lists of words stand in the grammars and in the files of editors: each between two texts of its file, as
//! `lists.toml` has it.
//!
//! `LAYSHAFT_BLESS=1 cargo test -p layshaft-tests --test tidy word_lists` writes them anew.

use toml::{Table, Value};

use crate::lists::{Form, KNOWN_VALUES, written};
use crate::tree::{Tree, root};
use crate::{none, one};

/// One list of one file.
#[derive(Clone, Debug)]
struct Place {
    file: String,
    words: String,
    form: Form,
    before: String,
    after: String,
}

/// The places of the table, file by file.
fn places(text: &str) -> Result<Vec<Place>, String> {
    let table: Table = text.parse().map_err(|error| format!("lists.toml: {error}"))?;
    let mut out = Vec::new();
    for file in table.get("file").and_then(Value::as_array).into_iter().flatten() {
        let path = text_of(file, "path")?;
        for list in file.get("list").and_then(Value::as_array).into_iter().flatten() {
            out.push(Place {
                form: form(list.get("form").or(file.get("form")))?,
                words: text_of(list, "words")?,
                before: text_of(list, "before")?,
                after: text_of(list, "after")?,
                file: path.clone(),
            });
        }
    }
    Ok(out)
}

fn text_of(value: &Value, key: &str) -> Result<String, String> {
    let text = value.get(key).and_then(Value::as_str);
    text.map(String::from).ok_or_else(|| format!("lists.toml: an entry has no `{key}`: {value}"))
}

fn form(value: Option<&Value>) -> Result<Form, String> {
    let texts: Vec<&str> =
        value.and_then(Value::as_array).into_iter().flatten().filter_map(Value::as_str).collect();
    match texts[..] {
        ["regex", a, b, c] => Ok(Form::Regex([a, b, c].map(String::from))),
        ["lines", a, b, c] => Ok(Form::Lines([a, b, c].map(String::from))),
        _ => Err(format!("lists.toml: no form {texts:?}")),
    }
}

/// Where a list begins and ends in its file.
fn span(text: &str, place: &Place) -> Option<(usize, usize)> {
    let start = text.find(&place.before)? + place.before.len();
    let end = start + text[start..].find(&place.after)?;
    Some((start, end))
}

fn complaint(tree: &Tree, place: &Place) -> Option<String> {
    let Place { file, words, before, .. } = place;
    let Some(text) = tree.text(file) else { return Some(format!("{file} is not there")) };
    let Some(wanted) = written(words, &place.form) else { return Some(format!("no list is called {words}")) };
    let Some((start, end)) = span(text, place) else {
        return Some(format!("{file} has no list of {words} behind `{before}`"));
    };
    let wrong = text[start..end] != wanted;
    wrong.then(|| format!("{file}: the list of {words} differs from the code; LAYSHAFT_BLESS=1 writes it"))
}

fn complaints(tree: &Tree, places: &[Place]) -> Vec<String> {
    places.iter().filter_map(|place| complaint(tree, place)).collect()
}

/// Writes the lists of all files anew.
fn bless(places: &[Place]) {
    for place in places {
        let path = root().join(&place.file);
        let Ok(mut text) = std::fs::read_to_string(&path) else { continue };
        if let (Some((start, end)), Some(words)) = (span(&text, place), written(&place.words, &place.form)) {
            text.replace_range(start..end, &words);
            std::fs::write(&path, text).expect("a file of the repository can be written");
        }
    }
}

#[test]
fn word_lists_are_those_of_the_code() {
    let places = places(include_str!("lists.toml")).expect("the table can be read");
    assert!(places.len() > 40, "only {} lists", places.len());
    if std::env::var("LAYSHAFT_BLESS").is_ok_and(|value| value == "1") {
        bless(&places);
    }
    none(&complaints(&Tree::of_the_repository(), &places));
}

#[test]
fn a_list_that_differs_is_seen() {
    let table = r#"
        [[file]]
        path = "a.vim"
        form = ["lines", "", "", "  \\ "]
        list = [{ words = "logic", before = "keyword logic", after = "\n\n" }]
    "#;
    let places = |table: &str| places(table).expect("the table can be read");
    let good = "keyword logic\n  \\ and or not if then else\n\n";
    let seen = |text: &str| complaints(&Tree::sample(&[("a.vim", text)]), &places(table));
    none(&seen(good));
    one(&seen(&good.replace(" or", "")), "list of logic differs");
    one(&seen("keyword words\n"), "no list of logic");
    one(&complaints(&Tree::sample(&[]), &places(table)), "a.vim is not there");
    let odd = table.replace("\"logic\"", "\"magic\"");
    one(&complaints(&Tree::sample(&[("a.vim", good)]), &places(&odd)), "no list is called magic");
}

#[test]
fn a_table_that_cannot_be_read_is_seen() {
    assert!(places("[[file]]\nlist = []").is_err());
    assert!(places("[[file]]\npath = \"a\"\nlist = [{ words = \"logic\" }]").is_err());
}

#[test]
fn every_spec_knows_the_known_values() {
    for name in KNOWN_VALUES {
        let text = format!("let a = 2 * {name}\n");
        let files = layshaft_semantics::MemoryFiles::default();
        let analysis = layshaft_semantics::analyze("a.shaft", text.as_str().into(), &files);
        assert!(analysis.diagnostics.is_empty(), "{name}");
    }
}

#[test]
fn every_unit_can_be_written() {
    let mut wrong = Vec::new();
    for row in layshaft_units::unit_rows() {
        for symbol in std::iter::once(&row.symbol).chain(row.also) {
            let text = format!("let a = 2 {symbol}\n");
            let files = layshaft_semantics::MemoryFiles::default();
            let analysis = layshaft_semantics::analyze("a.shaft", text.as_str().into(), &files);
            wrong.extend(analysis.diagnostics.iter().map(|found| format!("{symbol}: {}", found.message)));
        }
    }
    none(&wrong);
}
