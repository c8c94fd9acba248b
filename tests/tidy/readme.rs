//! README.md against the program: its commands exist, and what it shows is what the program prints.

use std::process::{Command, Stdio};

use crate::tree::{Tree, root};
use crate::{none, one};

/// A command of the page.
#[derive(Debug, PartialEq)]
struct Shown<'a> {
    /// As it is typed.
    line: &'a str,
    /// What the page says it prints, where it says so.
    output: Option<String>,
}

/// What runs the program with arguments: its standard output, or none where it refuses its arguments.
type Run<'a> = &'a dyn Fn(&[&str]) -> Option<String>;

/// How the page calls the program from a checkout, and once it is installed.
const CALLS: &[&str] = &["cargo run --release -p layshaft -- ", "layshaft "];
/// The command that runs the tests.
const TESTS: &str = "cargo test --workspace";

fn complaints(tree: &Tree, run: Run<'_>) -> Vec<String> {
    let page = tree.text("README.md").unwrap_or_default();
    let shown = commands(page);
    let mut out: Vec<String> = shown.iter().filter_map(|shown| wrong(shown, tree, run)).collect();
    for needed in [TESTS, "cargo run --release -p layshaft -- check "] {
        if !shown.iter().any(|shown| shown.line.starts_with(needed)) {
            out.push(format!("README.md does not show `{needed}`"));
        }
    }
    if !shown.iter().any(|shown| shown.output.is_some()) {
        out.push(String::from("README.md shows no output"));
    }
    if !tree.text(".ci/run").unwrap_or_default().lines().any(|line| line.contains(TESTS)) {
        out.push(format!(".ci/run does not run `{TESTS}`"));
    }
    out
}

/// What is wrong with a command.
fn wrong(shown: &Shown<'_>, tree: &Tree, run: Run<'_>) -> Option<String> {
    let line = shown.line;
    let gone =
        line.split_whitespace().find(|word| word.contains('/') && !word.contains('<') && !tree.has(word));
    if let Some(path) = gone {
        return Some(format!("`{line}`: there is no {path}"));
    }
    if let Some(arguments) = CALLS.iter().find_map(|call| line.strip_prefix(call)) {
        let arguments: Vec<&str> = arguments.split_whitespace().collect();
        return match &shown.output {
            Some(output) => {
                let printed = run(&arguments).unwrap_or_default();
                (!shows(output, &printed))
                    .then(|| format!("`{line}` prints not what README.md shows but:\n{printed}"))
            }
            None => run(&[arguments[0], "--help"]).is_none().then(|| format!("`{line}`: no such subcommand")),
        };
    }
    let words: Vec<&str> = line.split_whitespace().collect();
    let package = words.iter().position(|word| *word == "-p").and_then(|at| words.get(at + 1));
    let folder = |name: &str| format!("crates/{}", name.strip_prefix("layshaft-").unwrap_or(name));
    match (words[0], package) {
        ("cargo", Some(name)) if !tree.has(&folder(name)) => {
            Some(format!("`{line}`: there is no package {name}"))
        }
        ("cargo" | "bash", _) => None,
        _ => Some(format!("`{line}` is a command that this test does not know")),
    }
}

/// A line of the page that stands for lines left out.
const LEFT_OUT: &str = "…";

/// Whether a page shows what was printed: the same lines, but for those left out at `…`.
fn shows(page: &str, printed: &str) -> bool {
    let (page, printed): (Vec<&str>, Vec<&str>) =
        (page.trim_end().lines().collect(), printed.trim_end().lines().collect());
    let mut parts = page.split(|line| line.trim() == LEFT_OUT);
    let first = parts.next().unwrap_or_default();
    let Some(mut rest) = printed.strip_prefix(first) else { return false };
    let mut parts: Vec<&[&str]> = parts.collect();
    let Some(last) = parts.pop() else { return rest.is_empty() };
    for part in parts {
        let Some(at) = (0..=rest.len()).find(|at| rest[*at..].starts_with(part)) else { return false };
        rest = &rest[at + part.len()..];
    }
    rest.ends_with(last)
}

/// The commands of a page: every line of a block `sh`, and lines behind `$` in a block `console`, whose output stands
/// below them.
fn commands(page: &str) -> Vec<Shown<'_>> {
    let mut out: Vec<Shown<'_>> = Vec::new();
    for block in page.split("```").skip(1).step_by(2) {
        let (language, lines) = block.split_once('\n').unwrap_or((block, ""));
        for line in lines.lines() {
            match (language, line.strip_prefix("$ ")) {
                ("console", Some(line)) => out.push(Shown { line, output: None }),
                ("console", None) => {
                    let Some(shown) = out.last_mut() else { continue };
                    let output = shown.output.get_or_insert_default();
                    output.push_str(line);
                    output.push('\n');
                }
                ("sh", _) if !line.trim().is_empty() => out.push(Shown { line, output: None }),
                _ => {}
            }
        }
    }
    out
}

/// The specs of a page.
fn specs(page: &str) -> Vec<&str> {
    let blocks = page.split("```").skip(1).step_by(2);
    blocks.filter_map(|block| block.strip_prefix("shaft\n")).collect()
}

fn program() -> Command {
    let mut command = Command::new(layshaft_tests::program());
    command.current_dir(root()).stdin(Stdio::null()).stderr(Stdio::null()).env("NO_COLOR", "1");
    command
}

#[test]
fn the_page_is_true() {
    let run = |arguments: &[&str]| {
        let done = program().args(arguments).output().expect("the program was built");
        (done.status.code() != Some(3)).then(|| String::from_utf8_lossy(&done.stdout).into_owned())
    };
    none(&complaints(&Tree::of_the_repository(), &run));
}

#[test]
fn its_specs_have_no_errors_and_are_in_their_one_form() {
    use std::io::Write;
    let tree = Tree::of_the_repository();
    let specs = specs(tree.text("README.md").expect("the project has a first page"));
    assert!(!specs.is_empty(), "README.md shows no spec");
    for spec in specs {
        for (arguments, wanted) in [(&["check", "-"][..], &[0, 1][..]), (&["fmt", "--check", "-"], &[0])] {
            let mut child = program()
                .args(arguments)
                .stdin(Stdio::piped())
                .stdout(Stdio::piped())
                .stderr(Stdio::piped())
                .spawn()
                .expect("the program was built");
            child.stdin.take().expect("it is piped").write_all(spec.as_bytes()).expect("the program reads");
            let done = child.wait_with_output().expect("the program ends");
            let said = [done.stdout, done.stderr].concat();
            let code = done.status.code().unwrap_or(-1);
            assert!(
                wanted.contains(&code),
                "{arguments:?} ends with {code}:\n{}",
                String::from_utf8_lossy(&said)
            );
        }
    }
}

#[test]
fn lines_can_be_left_out_and_not_changed() {
    let printed = "a\nb\nc\nd\ne\n";
    for page in ["a\nb\nc\nd\ne", "a\n…\ne", "a\n…\nc\n…\ne", "…\nd\ne", "a\n…"] {
        assert!(shows(page, printed), "{page}");
    }
    for page in ["", "a\nb\nc\nd", "b\n…\ne", "a\n…\nd", "a\n…\nd\n…\nb\n…\ne", "a\n…\nb\nd\n…\ne", "a\nc\n…"]
    {
        assert!(!shows(page, printed), "{page}");
    }
}

#[test]
fn a_false_page_is_seen() {
    let page = "# L\n```console\n$ cargo run --release -p layshaft -- check tests/a.shaft\nholds\n```\n\
                ```sh\ncargo test --workspace\nlayshaft units\n```\n";
    let run = |arguments: &[&str]| match arguments {
        ["check", "tests/a.shaft"] => Some(String::from("holds\n")),
        ["units" | "check", "--help"] => Some(String::new()),
        _ => None,
    };
    let seen = |from: &str, to: &str| {
        assert!(page.contains(from), "`{from}` is not in the sample");
        let page = page.replace(from, to);
        let files =
            [("README.md", page.as_str()), ("tests/a.shaft", ""), (".ci/run", "cargo test --workspace\n")];
        complaints(&Tree::sample(&[&files[..], &[("crates/units/src/lib.rs", "")]].concat()), &run)
    };
    none(&seen("# L", "# M"));
    one(&seen("\nholds", "\nfails"), "prints not what README.md shows");
    one(&seen("layshaft units", "layshaft unit"), "no such subcommand");
    one(&seen("layshaft units", "layshaft units tests/b.shaft"), "there is no tests/b.shaft");
    one(&seen("layshaft units", "cargo bench -p layshaft-unit"), "there is no package layshaft-unit");
    one(&seen("layshaft units", "make all"), "does not know");
    one(
        &seen("cargo test --workspace", "cargo test -p layshaft-units"),
        "does not show `cargo test --workspace`",
    );
    one(&seen("\nholds", ""), "shows no output");
}
