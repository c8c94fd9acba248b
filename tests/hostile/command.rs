//! Bad files, as the command meets them.

#![allow(clippy::disallowed_methods, reason = "these tests write the bad files")]

use std::path::PathBuf;
use std::process::{Command, Output};

/// A folder of its own for a test.
fn folder(name: &str) -> PathBuf {
    let folder = PathBuf::from(env!("CARGO_TARGET_TMPDIR")).join("hostile").join(name);
    let _ = std::fs::remove_dir_all(&folder);
    std::fs::create_dir_all(&folder).expect("a folder for the test");
    folder
}

fn check(folder: &std::path::Path, file: &str) -> (i32, String) {
    let Output { status, stdout, stderr } = Command::new(layshaft_tests::program())
        .args(["check", file])
        .current_dir(folder)
        .output()
        .expect("the program runs");
    let said = String::from_utf8_lossy(&stdout).into_owned() + &String::from_utf8_lossy(&stderr);
    assert!(!said.contains("internal error"), "{said}");
    (status.code().unwrap_or(-1), said)
}

#[test]
fn bytes_that_are_no_text() {
    let folder = folder("bytes");
    std::fs::write(folder.join("a.shaft"), b"let a = 2 m\nlet b = \xff\xfe 3 m\n").expect("a file");
    let (code, said) = check(&folder, "a.shaft");
    assert_eq!(code, 3, "{said}");
    assert!(said.contains("UTF-8"), "{said}");
}

#[test]
fn a_table_that_is_no_text() {
    let folder = folder("table");
    let spec = "source motor: measured_curve { curve = csv \"t.csv\" (n as speed [rpm], Md as torque [N·m]); braking = none }\n";
    std::fs::write(folder.join("a.shaft"), spec).expect("a file");
    std::fs::write(folder.join("t.csv"), b"n,Md\n0,9.6\n1200,\xff\n").expect("a file");
    let (code, said) = check(&folder, "a.shaft");
    assert_eq!(code, 2, "{said}");
    assert!(said.contains("UTF-8") && said.contains("missing-file"), "{said}");
}

#[test]
fn a_file_too_large() {
    let folder = folder("large");
    let line = "# a comment that fills the file up and says nothing at all\n";
    std::fs::write(folder.join("a.shaft"), line.repeat(11_000_000 / line.len())).expect("a file");
    let (code, said) = check(&folder, "a.shaft");
    assert_eq!(code, 3, "{said}");
    assert!(said.contains("10 MB"), "{said}");
}

#[cfg(unix)]
#[test]
fn a_link_that_leads_out() {
    let outer = folder("link");
    let inner = outer.join("inner");
    std::fs::create_dir_all(&inner).expect("a folder");
    std::fs::write(outer.join("secret.shaft"), "let secret = 42 m\n").expect("a file");
    std::os::unix::fs::symlink(outer.join("secret.shaft"), inner.join("link.shaft")).expect("a link");
    std::fs::write(inner.join("a.shaft"), "use \"link.shaft\" as link\nlet a = link.secret\n")
        .expect("a file");
    let (code, said) = check(&inner, "a.shaft");
    assert_eq!(code, 2, "{said}");
    assert!(said.contains("outside") && !said.contains("42"), "{said}");
}

#[test]
fn names_that_would_paint_the_terminal() {
    let folder = folder("paint");
    std::fs::write(folder.join("a.shaft"), "title \"a \u{1b}[2J title\"\nlet a = 2 m\n").expect("a file");
    let (_, said) = check(&folder, "a.shaft");
    assert!(!said.contains('\u{1b}'), "{said:?}");
}
