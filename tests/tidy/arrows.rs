//! The arrows between crates: which crate may use which.

use std::collections::{BTreeMap, BTreeSet};

use crate::tree::Tree;
use crate::{none, one};

/// Which crate may use which. A new arrow is a decision about the architecture: it is made here and in the code map
/// of DEVELOPERS.md, or not at all.
const ALLOWED: &[(&str, &[&str])] = &[
    ("units", &[]),
    ("diagnostics", &[]),
    ("syntax", &["diagnostics"]),
    ("mechanics", &["units"]),
    ("semantics", &["units", "diagnostics", "syntax", "mechanics"]),
    ("present", &["units", "diagnostics", "syntax", "mechanics", "semantics"]),
    ("ide", &["units", "diagnostics", "syntax", "mechanics", "semantics", "present"]),
    ("report", &["units", "diagnostics", "syntax", "mechanics", "semantics", "present"]),
    ("lsp", &["ide", "report"]),
    (
        "layshaft",
        &["units", "diagnostics", "syntax", "mechanics", "semantics", "present", "ide", "report", "lsp"],
    ),
];

/// Each crate with those it uses.
pub type Arrows = BTreeMap<String, BTreeSet<String>>;

/// The arrows of the manifests, those of tests and benchmarks included.
pub fn of_the_manifests(tree: &Tree) -> Arrows {
    let manifests =
        tree.below("crates").filter_map(|(path, text)| Some((path.strip_suffix("/Cargo.toml")?, text)));
    manifests
        .filter(|(name, _)| !name.contains('/'))
        .map(|(name, text)| (name.to_string(), uses(text)))
        .collect()
}

/// The crates of this workspace that a manifest names, under any heading that ends in `dependencies`.
fn uses(manifest: &str) -> BTreeSet<String> {
    let manifest: toml::Table = manifest.parse().expect("a manifest is TOML");
    let mut found = BTreeSet::new();
    let mut tables = vec![manifest];
    while let Some(table) = tables.pop() {
        for (key, value) in table {
            let toml::Value::Table(inner) = value else { continue };
            if key.ends_with("dependencies") {
                let own = |name: &String| name.strip_prefix("layshaft-").map(String::from);
                found.extend(inner.keys().filter_map(own));
            } else {
                tables.push(inner);
            }
        }
    }
    found
}

fn complaints(arrows: &Arrows) -> Vec<String> {
    let mut out = Vec::new();
    for (from, to) in arrows {
        let Some((_, allowed)) = ALLOWED.iter().find(|row| row.0 == from) else {
            out.push(format!("crates/{from} has no row among the allowed arrows"));
            continue;
        };
        let forbidden = to.iter().filter(|name| !allowed.contains(&name.as_str()));
        out.extend(forbidden.map(|name| format!("crates/{from} must not use crates/{name}")));
    }
    let gone = ALLOWED.iter().filter(|row| !arrows.contains_key(row.0));
    out.extend(gone.map(|row| format!("crates/{} has allowed arrows and no manifest", row.0)));
    out
}

#[test]
fn the_manifests_keep_to_the_allowed_arrows() {
    none(&complaints(&of_the_manifests(&Tree::of_the_repository())));
}

#[test]
fn nothing_allowed_points_back() {
    for (index, (from, to)) in ALLOWED.iter().enumerate() {
        for name in *to {
            let place = ALLOWED.iter().position(|row| row.0 == *name);
            assert!(
                place.is_some_and(|place| place < index),
                "{from} may use {name}, which stands not before it"
            );
        }
    }
}

#[test]
fn a_new_arrow_is_seen() {
    let mut arrows: Arrows = ALLOWED
        .iter()
        .map(|row| (row.0.to_string(), row.1.iter().map(ToString::to_string).collect()))
        .collect();
    none(&complaints(&arrows));
    arrows.get_mut("syntax").unwrap().insert(String::from("mechanics"));
    one(&complaints(&arrows), "crates/syntax must not use crates/mechanics");
    arrows.get_mut("syntax").unwrap().remove("mechanics");
    arrows.insert(String::from("extra"), BTreeSet::new());
    one(&complaints(&arrows), "crates/extra has no row");
}

#[test]
fn arrows_are_read_under_every_heading() {
    let manifest = "[dependencies]\nlayshaft-units.workspace = true\nlibm = \"0.2\"\n\
                    [dev-dependencies]\nlayshaft-lsp = { path = \"../lsp\" }\n\
                    [target.'cfg(unix)'.build-dependencies.layshaft-ide]\npath = \"../ide\"\n";
    assert_eq!(uses(manifest).into_iter().collect::<Vec<_>>(), ["ide", "lsp", "units"]);
}
