//! The code map of DEVELOPERS.md, and the links of every page: a map that is wrong is worse than none.

use std::collections::BTreeSet;

use crate::arrows::{self, Arrows};
use crate::tree::Tree;
use crate::{none, one};

/// Folders a path must begin with to be taken for one of the repository.
const ROOMS: &[&str] = &["crates/", "editors/", "grammar/", "tests/", ".ci/"];

/// The arrows drawn in the code map: rows `| crate | what lives there | uses |`.
fn drawn(text: &str) -> Arrows {
    let section = text.split("\n## Code map\n").nth(1).unwrap_or_default();
    let section = section.split("\n## ").next().unwrap_or_default();
    let rows = section.lines().filter(|line| line.starts_with("| `")).filter_map(|line| {
        let cells: Vec<&str> = line.trim_matches('|').split('|').map(str::trim).collect();
        let [name, _, uses] = cells[..] else { return None };
        let uses: BTreeSet<String> = ticked(uses).into_iter().map(String::from).collect();
        Some((name.trim_matches('`').to_string(), uses))
    });
    rows.collect()
}

fn map_complaints(text: &str, manifests: &Arrows) -> Vec<String> {
    let drawn = drawn(text);
    let mut out = Vec::new();
    for name in manifests.keys().chain(drawn.keys()).collect::<BTreeSet<_>>() {
        match (manifests.get(name), drawn.get(name)) {
            (Some(_), None) => out.push(format!("crates/{name} is missing from the code map")),
            (None, Some(_)) => out.push(format!("the code map names `{name}`, which is no crate")),
            (Some(real), Some(said)) if real != said => {
                out.push(format!("the code map says that {name} uses {said:?}, its manifest says {real:?}"));
            }
            _ => {}
        }
    }
    out
}

/// Every path between backticks and every link of the pages that leads nowhere.
fn path_complaints(tree: &Tree) -> Vec<String> {
    let mut out = Vec::new();
    for (page, text) in tree.files().filter(|(path, _)| path.ends_with(".md")) {
        let named = ticked(text).into_iter().filter(|path| is_path(path)).map(String::from);
        let folder = page.rsplit_once('/').map_or("", |split| split.0);
        let linked = links(text).into_iter().filter(|link| !link.contains("://") && !link.starts_with('#'));
        let linked = linked.map(|link| from_top(folder, link.split('#').next().unwrap_or_default()));
        let gone = named.chain(linked).filter(|path| !tree.has(path));
        out.extend(gone.map(|path| format!("{page} names `{path}`, which is not there")));
    }
    out
}

/// What stands between single backticks on one line, outside fenced blocks.
fn ticked(text: &str) -> Vec<&str> {
    let plain = text.split("```").step_by(2);
    plain.flat_map(str::lines).flat_map(|line| line.split('`').skip(1).step_by(2)).collect()
}

/// A path as written in full; one with a placeholder (`crates/NAME`, `*`, `<code>`) stands for many.
fn is_path(text: &str) -> bool {
    let plain = |c: char| c.is_ascii_lowercase() || c.is_ascii_digit() || "./_-".contains(c);
    ROOMS.iter().any(|room| text.starts_with(room)) && (text.ends_with(".toml") || text.chars().all(plain))
}

/// The targets of `[text](target)`, outside fenced blocks.
fn links(text: &str) -> Vec<&str> {
    let plain = text.split("```").step_by(2);
    plain.flat_map(|part| part.split("](").skip(1)).filter_map(|rest| rest.split(')').next()).collect()
}

/// A link of a page in `folder`, from the top.
fn from_top(folder: &str, link: &str) -> String {
    let mut names: Vec<&str> = folder.split('/').filter(|name| !name.is_empty()).collect();
    for name in link.split('/') {
        match name {
            "." | "" => {}
            ".." => drop(names.pop()),
            _ => names.push(name),
        }
    }
    names.join("/")
}

#[test]
fn the_code_map_is_true() {
    let tree = Tree::of_the_repository();
    let text = tree.text("DEVELOPERS.md").expect("the developers have a page");
    none(&map_complaints(text, &arrows::of_the_manifests(&tree)));
}

#[test]
fn every_path_that_a_page_names_is_there() {
    none(&path_complaints(&Tree::of_the_repository()));
}

#[test]
fn a_false_map_is_seen() {
    let map = "# D\n\n## Code map\n\n| crate | holds | uses |\n| --- | --- | --- |\n\
               | `units` | units | nothing |\n| `syntax` | `parse` | `units` |\n\n## Next\n\n| `other` | a | b |\n";
    let set = |names: &[&str]| names.iter().map(ToString::to_string).collect::<BTreeSet<_>>();
    let mut real =
        Arrows::from([(String::from("units"), set(&[])), (String::from("syntax"), set(&["units"]))]);
    none(&map_complaints(map, &real));
    real.insert(String::from("syntax"), set(&["units", "lines"]));
    one(&map_complaints(map, &real), "syntax uses");
    real.insert(String::from("syntax"), set(&["units"]));
    real.insert(String::from("lines"), set(&[]));
    one(&map_complaints(map, &real), "crates/lines is missing");
    real.remove("lines");
    real.remove("units");
    one(&map_complaints(map, &real), "`units`, which is no crate");
}

#[test]
fn a_path_that_leads_nowhere_is_seen() {
    let page = |text: &str| path_complaints(&Tree::sample(&[("grammar/a.md", text), ("tests/lib.rs", "")]));
    none(&page("`tests/lib.rs` [x](../tests/lib.rs) [y](a.md#top) [z](#top) `crates/NAME/src` `a/b`\n"));
    none(&page("```sh\n`crates/none`\n```\n"));
    one(&page("see `tests/lob.rs`\n"), "`tests/lob.rs`, which is not there");
    one(&page("see [it](b.md)\n"), "`grammar/b.md`, which is not there");
}
