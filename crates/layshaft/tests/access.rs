//! What a spec may read, and what it may say: roots, links, sizes, hostile strings.

#![allow(clippy::disallowed_methods, reason = "tests of the command prepare files")]

mod common;

use common::{Folder, is_harmless, spec};

const PART: &str = "source shelf: straight_line { stall_torque = 10 N·m; no_load_speed = 1200 rpm }\n";

/// A spec that takes its source from another file.
fn using(path: &str) -> String {
    format!(
        "use \"{path}\" as parts\n\
         load fan: constant {{ torque = 5 N·m }}\n\
         drive run = parts.shelf -> fan {{ direction = forward }}\n\
         require \"1 speed\" run.speed >= 500 rpm\n"
    )
}

#[test]
fn a_used_file_is_read_below_the_spec_and_below_a_marked_root() {
    let folder = Folder::new();
    folder.file("shelf/parts/motors.shaft", PART);
    folder.file("shelf/a.shaft", using("parts/motors.shaft"));
    assert_eq!(folder.run(["check", "shelf/a.shaft"]).code, Some(0));

    // Beside the spec's own folder only where the root says so.
    folder.file("plant/specs/a.shaft", using("../parts/motors.shaft"));
    folder.file("plant/parts/motors.shaft", PART);
    let ran = folder.run(["check", "plant/specs/a.shaft"]);
    assert_eq!(ran.code, Some(2), "{ran:?}");
    assert!(ran.out.contains("[missing-file]"), "{}", ran.out);
    folder.file("plant/layshaft.toml", "");
    let ran = folder.run(["check", "plant/specs/a.shaft"]);
    assert_eq!(ran.code, Some(0), "the mark makes the folder above the root: {ran:?}");
}

#[test]
fn nothing_outside_the_root_is_read() {
    let folder = Folder::new();
    let secret = folder.file("secret.shaft", PART);
    for path in
        ["../secret.shaft".to_string(), secret.display().to_string(), "inner/../../secret.shaft".into()]
    {
        folder.file("specs/inner/note.txt", "");
        folder.file("specs/a.shaft", using(&path));
        let ran = folder.run(["check", "specs/a.shaft"]);
        assert_eq!(ran.code, Some(2), "{path}: {ran:?}");
        assert!(ran.out.contains("[missing-file]"), "{path}: {}", ran.out);
        assert!(!ran.out.contains("1200"), "nothing of the file is shown: {}", ran.out);
    }
}

#[cfg(unix)]
#[test]
fn links_are_followed_inside_the_root_and_refused_out_of_it() {
    use std::os::unix::fs::symlink;
    let folder = Folder::new();
    let secret = folder.file("secret.shaft", PART);
    folder.file("specs/real/motors.shaft", PART);
    folder.file("specs/a.shaft", using("link.shaft"));
    let link = folder.path().join("specs/link.shaft");

    symlink("real/motors.shaft", &link).expect("a link");
    assert_eq!(folder.run(["check", "specs/a.shaft"]).code, Some(0), "a link inside");

    std::fs::remove_file(&link).expect("gone");
    symlink(&secret, &link).expect("a link");
    let ran = folder.run(["check", "specs/a.shaft"]);
    assert!(ran.code == Some(2) && ran.out.contains("[missing-file]"), "a link out: {ran:?}");
    let ran = folder.run(["check", "specs"]);
    assert!(!ran.out.contains("specs/link.shaft:"), "a search does not take it up: {}", ran.out);

    std::fs::remove_file(&link).expect("gone");
    symlink(folder.path(), folder.path().join("specs/loop")).expect("a link to the folder above");
    assert_eq!(folder.run(["check", "specs/real"]).code, Some(0));
    assert_eq!(folder.run(["check", "specs"]).code, Some(2), "ends although a link leads round in a circle");
}

#[cfg(unix)]
#[test]
fn a_folder_or_a_pipe_is_no_spec() {
    let folder = Folder::new();
    let pipe = folder.path().join("pipe.shaft");
    let made = std::process::Command::new("mkfifo").arg(&pipe).status().expect("mkfifo runs");
    assert!(made.success());
    let ran = folder.run(["check", "pipe.shaft"]);
    assert_eq!(
        (ran.code, ran.err.as_str()),
        (Some(3), "layshaft: pipe.shaft cannot be read: it is not a regular file\n")
    );
    folder.file("a.shaft", using("pipe.shaft"));
    assert_eq!(folder.run(["check", "a.shaft"]).code, Some(2), "and does not hang");
}

#[test]
fn a_file_that_is_too_large_or_no_text_is_refused_with_a_reason() {
    let folder = Folder::new();
    folder.file("large.shaft", vec![b'#'; 10_000_001]);
    let ran = folder.run(["check", "large.shaft"]);
    assert_eq!(
        (ran.code, ran.err.as_str()),
        (Some(3), "layshaft: large.shaft is larger than 10 MB; split the spec with `use`\n")
    );
    folder.file("latin.shaft", b"# ok\ntitle \"Gr\xfc\xdfe\"\n");
    let ran = folder.run(["check", "latin.shaft"]);
    assert!(ran.code == Some(3) && ran.err.contains("the first wrong byte is number 15"), "{ran:?}");
    folder.file("a.shaft", using("latin.shaft"));
    let ran = folder.run(["check", "a.shaft"]);
    assert!(
        ran.code == Some(2) && ran.out.contains("[missing-file]") && ran.out.contains("UTF-8"),
        "{ran:?}"
    );
}

#[test]
fn odd_texts_end_with_a_verdict_or_a_message() {
    let folder = Folder::new();
    for (name, text, code) in [
        ("empty", String::new(), 0),
        ("comments", String::from("# nothing\n## at all\n"), 0),
        ("bom", format!("\u{feff}{}", spec("500 rpm")), 0),
        ("crlf", spec("500 rpm").replace('\n', "\r\n"), 0),
        ("nul", spec("500 rpm").replace("Fan", "F\0n"), 2),
    ] {
        let file = format!("{name}.shaft");
        folder.file(&file, text);
        let ran = folder.run(["check", &file]);
        assert_eq!(ran.code, Some(code), "{name}: {ran:?}");
        assert!(is_harmless(&ran.out) && ran.err.is_empty(), "{name}: {ran:?}");
    }
}

#[test]
fn a_spec_at_the_limits_of_the_language_ends_with_a_message() {
    let folder = Folder::new();
    let chained: String = (1..20_000).map(|n| format!("let a{n} = a{} + 1\n", n - 1)).collect();
    for (name, text) in [
        ("sum", format!("let a = {}1\nlet b = {}5 furlong\n", "1 + ".repeat(900), "1 + ".repeat(900))),
        ("long_sum", format!("let a = {}1\n", "1 + ".repeat(200_000))),
        ("nested", format!("let a = {}1{}\n", "(".repeat(120), ")".repeat(120))),
        ("deeper", format!("let a = {}1{}\n", "(".repeat(100_000), ")".repeat(100_000))),
        ("open", "a { ".repeat(2_000)),
        ("chained", format!("let a0 = 1\n{chained}")),
        ("errors", (0..2_000).map(|n| format!("let a{n} = 5 furlongs\n")).collect()),
        ("wide", format!("let a = 5 furlong # {}\n", "é".repeat(1_000_000))),
    ] {
        let file = format!("{name}.shaft");
        folder.file(&file, text);
        for format in ["text", "json"] {
            let ran = folder.run(["check", "--format", format, &file]);
            assert!(
                matches!(ran.code, Some(0 | 2)) && ran.err.is_empty(),
                "{name}: {:?} {}",
                ran.code,
                ran.err
            );
            assert!(is_harmless(&ran.out), "{name}");
        }
    }
}

/// Everything of the author's that is printed somewhere.
fn hostile() -> String {
    let bad = "\u{1b}]0;owned\u{7}\u{9b}31m\u{202e}x\u{2028}\u{200b}";
    format!(
        "title \"T{bad}\"\n\
         revision \"R{bad}\"\n\
         let weight = 5 kg  assumed \"A{bad}\"\n\
         source motor: straight_line {{ stall_torque = 10 N·m  from \"F{bad}\"; no_load_speed = 1200 rpm }}\n\
         load fan: constant {{ torque = 5 N·m; breakaway_ratio = 1.5  assumed \"B{bad}\" }}\n\
         drive run = motor -> fan {{ direction = forward }}\n\
         require \"1 {bad}\" run.speed >= 500 rpm\n\
         require \"2 {bad}\" run.speed >= 5 furlongs\n\
         allow unused-allow because \"W{bad}\"\n\
         # a comment{bad}\n"
    )
}

#[test]
fn hostile_strings_are_harmless_at_every_exit() {
    let folder = Folder::new();
    folder.file("a.shaft", hostile());
    for args in [vec!["check", "a.shaft"], vec!["check", "--format", "json", "a.shaft"]] {
        let ran = folder.run(&args);
        assert_eq!(ran.code, Some(2), "{args:?}");
        assert!(is_harmless(&ran.out), "{args:?}: {:?}", ran.out);
        assert!(is_harmless(&ran.err), "{args:?}: {:?}", ran.err);
        assert!(ran.out.contains("owned"), "the text itself is shown");
    }
}

#[cfg(unix)]
#[test]
fn hostile_file_names_are_harmless() {
    let folder = Folder::new();
    let name = "a\u{1b}[2J\u{202e}\nb.shaft";
    folder.file(name, spec("5 furlongs").replace("title", "ttle"));
    for args in [
        vec!["check", "."],
        vec!["check", "--format", "json", "."],
        vec!["fmt", "--check", "."],
        vec!["fmt", "."],
    ] {
        let ran = folder.run(&args);
        assert!(is_harmless(&ran.out) && is_harmless(&ran.err), "{args:?}: {ran:?}");
        assert!(ran.out.contains("b.shaft") || ran.err.contains("b.shaft"), "{args:?}: {ran:?}");
    }
    let ran = folder.run(["check", "gone\u{1b}.shaft"]);
    assert!(is_harmless(&ran.err) && ran.err.contains("gone\\u{1b}.shaft"), "{ran:?}");
}
