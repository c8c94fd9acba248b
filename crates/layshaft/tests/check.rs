//! `layshaft check` as it is run: exit status, inputs, formats, colour.

#![allow(clippy::disallowed_methods, reason = "tests of the command prepare files")]

mod common;

use common::{Folder, Ran, spec};

const NONE: [&str; 0] = [];

#[test]
fn the_exit_status_says_what_came_of_it() {
    let folder = Folder::new();
    folder.file("holds.shaft", spec("500 rpm"));
    folder.file("fails.shaft", spec("700 rpm"));
    folder.file("broken.shaft", spec("500 furlongs"));
    for (files, code, words) in [
        (vec!["holds.shaft"], 0, "holds.shaft: the criterion holds"),
        (vec!["fails.shaft"], 1, "fails.shaft: 1 of 1 criteria fails"),
        (vec!["broken.shaft"], 2, "1 error"),
        (vec!["missing.shaft"], 3, ""),
        (
            vec!["holds.shaft", "fails.shaft"],
            1,
            "2 specs: 1 without a failure, 1 with a criterion that fails",
        ),
        (vec!["broken.shaft", "fails.shaft"], 2, "2 specs:"),
        (vec!["missing.shaft", "fails.shaft"], 3, "fails.shaft: 1 of 1 criteria fails"),
    ] {
        let ran = folder.run(["check"].iter().chain(&files));
        assert_eq!(ran.code, Some(code), "{files:?}: {ran:?}");
        assert!(ran.out.contains(words), "{files:?}: {}", ran.out);
    }
    let ran = folder.run(["check", "missing.shaft"]);
    assert_eq!(ran.err, "layshaft: missing.shaft is not there\n");
}

#[test]
fn wrong_usage_is_3_and_help_is_0() {
    let folder = Folder::new();
    for args in [vec!["chek"], vec!["check", "--format", "xml"], vec!["check", "--colour"], vec![]] {
        let ran = folder.run(&args);
        assert_eq!(ran.code, Some(3), "{args:?}");
        assert!(ran.out.is_empty() && ran.err.contains("--help"), "{args:?}: {ran:?}");
    }
    for args in [["--help"], ["--version"], ["help"]] {
        let ran = folder.run(args);
        assert_eq!((ran.code, ran.err.as_str()), (Some(0), ""), "{args:?}");
    }
}

#[test]
fn operating_point_power_and_margin_are_shown() {
    let folder = Folder::new();
    folder.file("a.shaft", spec("500 rpm"));
    let ran = folder.run(["check", "a.shaft"]);
    // By hand: 10 N·m (1 − n/1200) = 5 N·m at 600 rpm; 5 N·m · 62.83 rad/s = 314.2 W, which is the peak.
    let row = ran
        .out
        .lines()
        .find(|line| line.trim_start().starts_with("plain"))
        .expect("a row for the plain spec");
    let words: Vec<&str> = row.split_whitespace().collect();
    assert_eq!(words, ["plain", "runs", "up", "600.0", "600.0", "5.000", "314.2", "314.2", "100", "1"]);
    let row = ran.out.lines().find(|line| line.contains("1 speed")).expect("a row for the criterion");
    assert!(row.contains("at least 500 rpm  600.0 rpm  20.0 %  holds"), "{row}");
    assert!(ran.out.contains("motor.stall_torque"), "values without basis are listed: {}", ran.out);
    assert!(ran.out.contains("local codes"), "cautions are said: {}", ran.out);
}

#[test]
fn value_and_limit_never_look_equal_when_they_differ() {
    let folder = Folder::new();
    folder.file("a.shaft", spec("600.004 rpm"));
    let ran = folder.run(["check", "a.shaft"]);
    assert_eq!(ran.code, Some(1), "{ran:?}");
    assert!(ran.out.contains("at least 600.004 rpm  600.000 rpm"), "{}", ran.out);
}

#[test]
fn a_folder_is_searched_and_sorted() {
    let folder = Folder::new();
    for name in ["b/two.shaft", "a.shaft", "b/c/three.shaft", ".hidden/four.shaft", "notes.txt"] {
        folder.file(name, spec("500 rpm"));
    }
    let blocks = |ran: &Ran| -> Vec<String> {
        ran.out.lines().filter(|line| line.ends_with("the criterion holds")).map(String::from).collect()
    };
    let want =
        ["a.shaft", "b/c/three.shaft", "b/two.shaft"].map(|name| format!("{name}: the criterion holds"));
    assert_eq!(blocks(&folder.run(["check", "."])), want);
    assert_eq!(blocks(&folder.run(["check"])), want, "the current folder when none is named");
    assert_eq!(
        blocks(&folder.run(["check", "b/two.shaft", ".", "a.shaft", "./a.shaft"])),
        want,
        "none twice"
    );

    folder.file("empty/readme.md", "");
    let ran = folder.run(["check", "empty"]);
    assert_eq!((ran.code, ran.err.as_str()), (Some(3), "layshaft: there is no .shaft file below empty\n"));
}

#[test]
fn standard_input_is_a_spec() {
    let folder = Folder::new();
    let ran = folder.run_with(["check", "-"], spec("500 rpm").as_bytes(), &[]);
    assert_eq!(ran.code, Some(0), "{ran:?}");
    assert!(ran.out.ends_with("standard input: the criterion holds\n"), "{}", ran.out);
    let ran = folder.run_with(["check", "-"], b"title \"\xff\"\n", &[]);
    assert_eq!(ran.code, Some(3));
    assert_eq!(
        ran.err,
        "layshaft: standard input is not UTF-8 text: the first wrong byte is number 8; save it as UTF-8\n"
    );
    let ran = folder.run_with(["check", "-"], b"", &[]);
    assert!(ran.code == Some(0) && ran.out.contains("no criteria"), "{ran:?}");
}

#[test]
fn json_holds_what_the_text_says() {
    let folder = Folder::new();
    folder.file("a.shaft", spec("700 rpm"));
    let ran = folder.run(["check", "--format", "json", "a.shaft", "gone.shaft"]);
    assert_eq!(ran.code, Some(3));
    let json: serde_json::Value = serde_json::from_str(&ran.out).expect("JSON");
    assert_eq!(json["schema"], "check/1");
    assert_eq!(json["unread"][0]["path"], "gone.shaft");
    let spec = &json["specs"][0];
    assert_eq!((&spec["path"], &spec["verdict"]), (&"a.shaft".into(), &"fails".into()));
    let outcome = &spec["criteria"][0]["outcomes"][0];
    assert_eq!(outcome["found"]["shown"], "600.0 rpm");
    let si = outcome["found"]["si"].as_f64().expect("a number");
    assert!((si - 20.0 * std::f64::consts::PI).abs() < 1e-9, "600 rpm is 20π rad/s: {si}");
    assert_eq!(outcome["margin"]["shown"], "-14.3 %");
    assert_eq!(spec["drives"][0]["cases"][0]["operating_points"][0]["stability"], "stable");
    assert_eq!(
        folder.run(["check", "--format", "json", "a.shaft"]).out,
        folder.run(["check", "--format", "json", "a.shaft"]).out
    );
}

#[test]
fn colour_comes_only_when_asked_for() {
    let folder = Folder::new();
    folder.file("a.shaft", spec("500 furlongs"));
    let colored = |args: &[&str], variables: &[(&str, &str)]| {
        let ran = folder.run_with(["check", "a.shaft"].iter().chain(args), b"", variables);
        assert_eq!(ran.code, Some(2));
        ran.out.contains('\u{1b}')
    };
    assert!(!colored(&[], &[]), "no terminal, no colour");
    assert!(!colored(&["--color", "never"], &[]));
    assert!(colored(&["--color", "always"], &[]));
    assert!(colored(&["--color", "always"], &[("NO_COLOR", "1")]), "the flag was asked for by name");
}

/// On a real terminal, which `script` (util-linux) provides.
#[cfg(target_os = "linux")]
#[test]
fn a_terminal_gets_colour_unless_no_color_is_set() {
    let folder = Folder::new();
    folder.file("a.shaft", spec("700 rpm"));
    let on_terminal = |setting: &str| {
        let line = format!("{setting} TERM=xterm '{}' check a.shaft", env!("CARGO_BIN_EXE_layshaft"));
        let mut command = std::process::Command::new("script");
        command
            .args(["-q", "-e", "-c", &line, "/dev/null"])
            .current_dir(folder.path())
            .env_remove("NO_COLOR");
        command.stdin(std::process::Stdio::null());
        let output = command.output().expect("`script` of util-linux is there");
        assert_eq!(output.status.code(), Some(1));
        String::from_utf8_lossy(&output.stdout).contains("\u{1b}[1;31m")
    };
    assert!(on_terminal("env"));
    assert!(!on_terminal("NO_COLOR=1"));
    assert!(on_terminal("NO_COLOR="), "set but empty means nothing");
}

#[test]
fn a_reader_that_goes_away_is_no_fault() {
    let folder = Folder::new();
    for n in 0..60 {
        folder.file(&format!("{n:02}.shaft"), spec("500 rpm"));
    }
    let mut command = std::process::Command::new(env!("CARGO_BIN_EXE_layshaft"));
    command.arg("check").current_dir(folder.path());
    command.stdout(std::process::Stdio::piped()).stderr(std::process::Stdio::piped());
    let mut child = command.spawn().expect("the command runs");
    drop(child.stdout.take());
    let output = child.wait_with_output().expect("its end");
    assert_eq!((output.status.code(), output.stderr), (Some(0), Vec::new()));
}

#[test]
fn output_that_cannot_be_written_is_a_fault() {
    if !std::path::Path::new("/dev/full").exists() {
        return;
    }
    let folder = Folder::new();
    folder.file("a.shaft", spec("500 rpm"));
    let full = std::fs::OpenOptions::new().write(true).open("/dev/full").expect("/dev/full");
    let mut command = std::process::Command::new(env!("CARGO_BIN_EXE_layshaft"));
    let output =
        command.args(["check", "a.shaft"]).current_dir(folder.path()).stdout(full).output().expect("its end");
    let err = String::from_utf8_lossy(&output.stderr);
    assert_eq!(output.status.code(), Some(3), "{err}");
    assert!(err.starts_with("layshaft: the output cannot be written"), "{err}");
}

#[test]
fn no_arguments_show_the_way() {
    let ran = Folder::new().run(NONE);
    assert!(ran.err.contains("layshaft new NAME"), "{ran:?}");
}
