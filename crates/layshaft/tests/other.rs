//! The smaller commands as they are run: `new`, `explain`, `units`, `kinds`, completions, man page.

#![allow(clippy::disallowed_methods, reason = "tests of the command prepare files")]

mod common;

use common::{Folder, is_harmless};

#[test]
fn a_new_spec_holds_and_has_its_form() {
    let folder = Folder::new();
    let ran = folder.run(["new", "pump"]);
    assert_eq!((ran.code, ran.err.as_str()), (Some(0), ""));
    assert!(folder.read("pump.shaft").contains("title \"pump\""));
    let ran = folder.run(["check", "pump.shaft"]);
    assert_eq!(ran.code, Some(0), "{}", ran.out);
    assert!(ran.out.ends_with("pump.shaft: all 4 criteria hold\n"), "no finding: {}", ran.out);
    assert_eq!(folder.run(["fmt", "--check", "pump.shaft"]).code, Some(0));
}

#[test]
fn new_never_writes_over_a_file() {
    let folder = Folder::new();
    folder.file("pump.shaft", "mine");
    for name in ["pump", "pump.shaft", "./pump"] {
        let ran = folder.run(["new", name]);
        assert_eq!(ran.code, Some(3), "{name}");
        assert!(ran.err.contains("pump.shaft is already there"), "{ran:?}");
    }
    assert_eq!(folder.read("pump.shaft"), "mine");
    let ran = folder.run(["new", "no/such/folder/x"]);
    assert!(ran.code == Some(3) && ran.err.contains("cannot be written"), "{ran:?}");
    for name in ["a\"b", "a\\b", "a\u{1b}b", "a\nb"] {
        let ran = folder.run(["new", name]);
        assert_eq!(ran.code, Some(3), "{name:?}: {ran:?}");
        assert!(is_harmless(&ran.err), "{ran:?}");
    }
    assert_eq!(folder.names(), ["pump.shaft"]);
}

#[test]
fn a_code_is_explained_and_a_slip_is_met() {
    let folder = Folder::new();
    for word in ["kind-mismatch", "[kind-mismatch]"] {
        let ran = folder.run(["explain", word]);
        assert!(ran.code == Some(0) && ran.out.starts_with("# kind-mismatch"), "{ran:?}");
    }
    let ran = folder.run(["explain", "kind-mismach"]);
    assert_eq!(
        (ran.code, ran.err.as_str()),
        (Some(3), "layshaft: there is no code `kind-mismach`; did you mean `kind-mismatch`?\n")
    );
    let ran = folder.run(["explain"]);
    assert!(ran.code == Some(0) && ran.out.contains("\n  kind-mismatch"), "{ran:?}");
    assert!(ran.out.lines().all(|line| line.chars().count() <= 100), "{}", ran.out);
}

#[test]
fn units_are_listed_with_their_size() {
    let folder = Folder::new();
    let ran = folder.run(["units", "torque"]);
    assert_eq!(ran.code, Some(0));
    // One lbf·ft is 0.3048 m · 0.45359237 kg · 9.80665 m/s², exactly.
    assert!(ran.out.contains("1 lbf·ft = 1.3558179483314"), "{}", ran.out);
    assert!(folder.run(["units", "temperature"]).out.contains("0 °C = 273.15 K"));
    let ran = folder.run(["units", "torqe"]);
    assert!(ran.code == Some(3) && ran.err.contains("did you mean `torque`?"), "{ran:?}");
    let ran = folder.run(["units"]);
    assert!(
        ran.code == Some(0) && ran.out.contains("rotational_speed") && ran.out.contains("rpm"),
        "{ran:?}"
    );
}

#[test]
fn kinds_show_fields_results_and_formulas() {
    let folder = Folder::new();
    let ran = folder.run(["kinds"]);
    assert!(
        ran.code == Some(0) && ran.out.contains("induction_motor") && ran.out.contains("hoist"),
        "{ran:?}"
    );
    for row in layshaft_mechanics::registry::rows() {
        let ran = folder.run(["kinds", row.name]);
        assert_eq!(ran.code, Some(0), "{}", row.name);
        for part in [row.title, "Fields", "Results", "Example"] {
            assert!(ran.out.contains(part), "{}: no {part} in {}", row.name, ran.out);
        }
        for field in row.fields {
            assert!(ran.out.contains(&format!("\n  {}: ", field.name)), "{}.{}", row.name, field.name);
        }
        assert!(row.formulas.iter().all(|formula| ran.out.contains(formula.text)), "{}", row.name);
    }
    let ran = folder.run(["kinds", "dcmotor"]);
    assert!(ran.code == Some(3) && ran.err.contains("did you mean `dc_motor`?"), "{ran:?}");
}

#[test]
fn completions_and_man_pages_name_every_command() {
    let folder = Folder::new();
    for shell in ["bash", "zsh", "fish", "elvish", "powershell"] {
        let ran = folder.run(["completions", shell]);
        assert!(ran.code == Some(0) && ran.out.contains("explain"), "{shell}: {ran:?}");
    }
    let ran = folder.run(["man"]);
    assert!(ran.code == Some(0) && ran.out.contains(".TH layshaft 1"), "{ran:?}");
    for name in ["check", "fmt", "explain", "units", "kinds", "new", "completions", "man"] {
        assert!(ran.out.contains(&format!("layshaft\\-{name}(1)")), "{name}: {}", ran.out);
        let page = folder.run(["man", name]);
        assert!(page.code == Some(0) && page.out.contains(".SH SYNOPSIS"), "{name}: {page:?}");
    }
    assert_eq!(folder.run(["man", "fly"]).code, Some(3));
}
