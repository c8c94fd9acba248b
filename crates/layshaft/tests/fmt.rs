//! `layshaft fmt` as it is run: one form, atomic writes, broken items left alone.

#![allow(clippy::disallowed_methods, reason = "tests of the command prepare files")]

mod common;

use common::{Folder, spec};

const UNTIDY: &str = "title   \"Fan\"\nlet a=5   kg\n";
const TIDY: &str = "title \"Fan\"\nlet a = 5 kg\n";

#[test]
fn a_file_gets_its_form_and_keeps_it() {
    let folder = Folder::new();
    folder.file("a.shaft", UNTIDY);
    let ran = folder.run(["fmt", "a.shaft"]);
    assert_eq!((ran.code, ran.out.as_str()), (Some(0), "a.shaft formatted\n"));
    assert_eq!(folder.read("a.shaft"), TIDY);
    let ran = folder.run(["fmt", "a.shaft"]);
    assert_eq!((ran.code, ran.out.as_str()), (Some(0), ""));
    assert_eq!(folder.names(), ["a.shaft"], "nothing is left behind");
}

#[test]
fn check_changes_nothing() {
    let folder = Folder::new();
    folder.file("a.shaft", UNTIDY);
    folder.file("b.shaft", TIDY);
    let ran = folder.run(["fmt", "--check", "."]);
    assert_eq!((ran.code, ran.out.as_str()), (Some(1), "a.shaft would change\n"));
    assert_eq!(folder.read("a.shaft"), UNTIDY);
    assert_eq!(folder.run(["fmt", "--check", "b.shaft"]).code, Some(0));
}

#[test]
fn standard_input_goes_to_standard_output() {
    let folder = Folder::new();
    let ran = folder.run_with(["fmt", "-"], UNTIDY.as_bytes(), &[]);
    assert_eq!((ran.code, ran.out.as_str()), (Some(0), TIDY));
    assert_eq!(folder.run_with(["fmt", "--check", "-"], UNTIDY.as_bytes(), &[]).code, Some(1));
}

#[test]
fn an_item_with_a_syntax_error_stays_as_it_is() {
    let folder = Folder::new();
    let broken = "let   b = ) 5\n";
    folder.file("a.shaft", format!("{UNTIDY}{broken}"));
    let ran = folder.run(["fmt", "a.shaft"]);
    assert_eq!(ran.code, Some(2), "{ran:?}");
    assert!(ran.err.contains("at line 3"), "{ran:?}");
    assert_eq!(folder.read("a.shaft"), format!("{TIDY}{broken}"));
}

#[test]
fn what_cannot_be_read_is_left_alone() {
    let folder = Folder::new();
    let bytes = b"title \"\xff\"\n".to_vec();
    let path = folder.file("a.shaft", &bytes);
    let ran = folder.run(["fmt", "a.shaft", "gone.shaft"]);
    assert_eq!(ran.code, Some(3));
    assert!(
        ran.err.contains("a.shaft is not UTF-8") && ran.err.contains("gone.shaft is not there"),
        "{ran:?}"
    );
    assert_eq!(std::fs::read(path).expect("the file"), bytes);
}

#[cfg(unix)]
#[test]
fn permissions_and_links_stay() {
    use std::os::unix::fs::{PermissionsExt, symlink};
    let folder = Folder::new();
    let path = folder.file("real/a.shaft", UNTIDY);
    std::fs::set_permissions(&path, std::fs::Permissions::from_mode(0o640)).expect("permissions");
    let link = folder.path().join("link.shaft");
    symlink("real/a.shaft", &link).expect("a link");
    assert_eq!(folder.run(["fmt", "link.shaft"]).code, Some(0));
    assert!(std::fs::symlink_metadata(&link).expect("the link").is_symlink());
    assert_eq!(std::fs::metadata(&path).expect("the file").permissions().mode() & 0o777, 0o640);
    assert_eq!(folder.read("real/a.shaft"), TIDY);
}

#[cfg(unix)]
#[test]
fn a_read_only_file_is_left_with_a_message() {
    use std::os::unix::fs::PermissionsExt;
    let folder = Folder::new();
    let path = folder.file("a.shaft", UNTIDY);
    std::fs::set_permissions(&path, std::fs::Permissions::from_mode(0o444)).expect("permissions");
    let ran = folder.run(["fmt", "a.shaft"]);
    assert_eq!(
        (ran.code, ran.err.as_str()),
        (Some(3), "layshaft: a.shaft is left as it was: the file is read-only\n")
    );
    assert_eq!(folder.read("a.shaft"), UNTIDY);
}

/// Whether the folder's permissions bind this user; they do not bind root.
#[cfg(unix)]
#[test]
fn a_read_only_folder_leaves_the_file_with_a_message() {
    use std::os::unix::fs::PermissionsExt;
    let folder = Folder::new();
    folder.file("inner/a.shaft", UNTIDY);
    let inner = folder.path().join("inner");
    let set =
        |mode| std::fs::set_permissions(&inner, std::fs::Permissions::from_mode(mode)).expect("permissions");
    set(0o555);
    let binds = std::fs::write(inner.join("probe"), "").is_err();
    let ran = folder.run(["fmt", "inner/a.shaft"]);
    set(0o755);
    if binds {
        assert_eq!(ran.code, Some(3), "{ran:?}");
        assert!(ran.err.starts_with("layshaft: inner/a.shaft is left as it was: "), "{ran:?}");
        assert_eq!(folder.read("inner/a.shaft"), UNTIDY);
    } else {
        assert_eq!((ran.code, folder.read("inner/a.shaft")), (Some(0), TIDY.into()));
    }
}

/// A disk that takes no more bytes, for every user: the limit on the size of files, its signal passed over.
#[cfg(target_os = "linux")]
#[test]
fn a_write_that_fails_half_way_leaves_the_file() {
    let folder = Folder::new();
    let long = UNTIDY.repeat(200).replace("let a", "let   a");
    folder.file("a.shaft", &long);
    let line = format!("trap '' XFSZ; ulimit -f 1; exec '{}' fmt a.shaft", env!("CARGO_BIN_EXE_layshaft"));
    let mut command = std::process::Command::new("bash");
    let output = command.args(["-c", &line]).current_dir(folder.path()).output().expect("bash runs");
    let err = String::from_utf8_lossy(&output.stderr);
    assert_eq!(output.status.code(), Some(3), "{err}");
    assert!(err.contains("a.shaft is left as it was"), "{err}");
    assert_eq!(folder.read("a.shaft"), long);
    assert_eq!(folder.names(), ["a.shaft"], "nothing is left behind");
}

#[test]
fn a_good_spec_gives_the_same_results_in_its_form() {
    let folder = Folder::new();
    folder.file("a.shaft", spec("500 rpm"));
    let before = folder.run(["check", "a.shaft"]);
    assert_eq!(folder.run(["fmt", "a.shaft"]).code, Some(0));
    let after = folder.run(["check", "a.shaft"]);
    assert_eq!((before.code, before.out), (after.code, after.out));
}
