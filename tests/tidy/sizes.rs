//! The size of files and functions: one idea a file, one thing a function.

use crate::tree::Tree;
use crate::{none, one};

/// Lines of a source file at most.
const FILE: usize = 400;
/// Lines of a function at most, from its `fn` to its closing brace.
const FUNCTION: usize = 60;

fn complaints(tree: &Tree) -> Vec<String> {
    let mut out = Vec::new();
    for (path, text) in tree.rust() {
        let lines = text.lines().count();
        if lines > FILE {
            out.push(format!("{path} has {lines} lines, at most {FILE}"));
        }
        let long = functions(text).into_iter().filter(|function| function.lines > FUNCTION);
        out.extend(long.map(|function| {
            let Function { name, line, lines } = function;
            format!("{path}:{line} `{name}` has {lines} lines, at most {FUNCTION}")
        }));
    }
    out
}

#[derive(Debug, PartialEq)]
struct Function<'a> {
    name: &'a str,
    line: usize,
    lines: usize,
}

/// The functions of a source that `rustfmt` has written: the closing brace stands below the `fn`, at its indent.
fn functions(text: &str) -> Vec<Function<'_>> {
    let lines: Vec<&str> = text.lines().collect();
    let mut out = Vec::new();
    for (at, line) in lines.iter().enumerate() {
        let Some(name) = function_name(line) else { continue };
        let indent = &line[..line.len() - line.trim_start().len()];
        let ends = |line: &&str| {
            line.strip_prefix(indent).is_some_and(|rest| rest.starts_with('}') || has_no_block(rest))
        };
        let closing = lines[at..].iter().position(ends).unwrap_or(0);
        out.push(Function { name, line: at + 1, lines: closing + 1 });
    }
    out
}

/// Whether a line at the indent of a `fn` ends it with no block below: `fn f();`, `fn f() {}`, `) -> f64;`.
fn has_no_block(line: &str) -> bool {
    !line.starts_with(' ') && (line.ends_with(';') || line.ends_with('}'))
}

/// The name of the function that a line begins, if it begins one.
fn function_name(line: &str) -> Option<&str> {
    let mut rest = line.trim_start();
    loop {
        if let Some(named) = rest.strip_prefix("fn ") {
            return named.split(|c: char| !c.is_alphanumeric() && c != '_').next();
        }
        let word = ["pub ", "const ", "async ", "unsafe ", "default ", "extern \"C\" "];
        let visible = rest.strip_prefix("pub(").and_then(|rest| rest.split_once(") ")).map(|split| split.1);
        rest = visible.or_else(|| word.iter().find_map(|word| rest.strip_prefix(word)))?;
    }
}

#[test]
fn files_and_functions_are_small() {
    none(&complaints(&Tree::of_the_repository()));
}

#[test]
fn a_long_file_is_seen() {
    let fits = "//! x\n".repeat(FILE);
    none(&complaints(&Tree::sample(&[("a.rs", &fits), ("b.md", &fits.repeat(9))])));
    one(&complaints(&Tree::sample(&[("a.rs", &[&fits, "//! x\n"].concat())])), "a.rs has 401 lines");
}

#[test]
fn a_long_function_is_seen() {
    let body = "    x += 1;\n".repeat(FUNCTION - 2);
    none(&complaints(&Tree::sample(&[("a.rs", &format!("fn fits() {{\n{body}}}\n"))])));
    let body = body.replace("    ", "        ");
    let long =
        format!("mod m {{\n    pub(crate) const fn long(\n        a: u8,\n    ) {{\n{body}    }}\n}}\n");
    one(&complaints(&Tree::sample(&[("a.rs", &long)])), "a.rs:2 `long` has 62 lines");
}

#[test]
fn functions_end_where_they_end() {
    let text = "trait T {\n    fn a(&self);\n    fn b(\n        &self,\n    ) -> u8;\n    fn c(&self) {}\n}\n\
                fn d() -> Option<u8> {\n    if x {\n        1\n    }\n}\nlet fn_like = 1;\n";
    let found: Vec<_> = functions(text).into_iter().map(|one| (one.name, one.line, one.lines)).collect();
    assert_eq!(found, [("a", 2, 1), ("b", 3, 3), ("c", 6, 1), ("d", 8, 5)]);
}
