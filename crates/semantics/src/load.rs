//! Reads the spec and the files it uses, and gathers what each declares.

use std::sync::Arc;

use layshaft_diagnostics::{Code, Diagnostic, FileId, FileSpan, Severity};
use layshaft_syntax::{ItemKind, Problem};

use crate::files::{Files, ReadError};
use crate::sink::Sink;
use crate::world::{Declared, ItemRef, World};

/// How many files one spec may use, directly or through others.
const MOST_FILES: usize = 1_000;

/// Loads the spec `path` with the text `text`, and every file reached by `use`.
pub(crate) fn load(
    path: &str,
    text: Arc<str>,
    files: &dyn Files,
    memo: &mut crate::Memo,
    sink: &Sink,
) -> World {
    let mut world = World::default();
    let tree = memo.parse(path, &text);
    world.push(path.to_owned(), text, tree);
    let mut next = 0;
    while next < world.files.len() {
        report_problems(&world, next as u32, sink);
        declare(&mut world, next as u32, files, memo, sink);
        next += 1;
    }
    report_cycles(&world, sink);
    world
}

/// Turns what the parser found into findings.
fn report_problems(world: &World, file: u32, sink: &Sink) {
    let tree = Arc::clone(&world.files[file as usize].tree);
    for problem in &tree.problems {
        sink.push(cook(problem, file, 0));
    }
    for item in &tree.items {
        for problem in &item.tree.problems {
            sink.push(cook(problem, file, item.offset));
        }
    }
}

fn cook(problem: &Problem, file: u32, offset: u32) -> Diagnostic {
    let place =
        |span: layshaft_diagnostics::Span| FileSpan { file: FileId(file), span: span.shifted(offset) };
    let mut found = Diagnostic::new(problem.code, place(problem.span), problem.message.clone());
    if let Some((span, words)) = &problem.related {
        found = found.related(place(*span), words.clone());
    }
    found.help.clone_from(&problem.help);
    found.fixes = problem
        .fixes
        .iter()
        .map(|(title, edits)| layshaft_diagnostics::Fix {
            title: title.clone(),
            edits: edits
                .iter()
                .map(|(span, text)| layshaft_diagnostics::Edit { place: place(*span), text: text.clone() })
                .collect(),
        })
        .collect();
    found
}

/// Fills the scope of a file; a `use` takes up a further file.
fn declare(world: &mut World, file: u32, files: &dyn Files, memo: &mut crate::Memo, sink: &Sink) {
    let tree = Arc::clone(&world.files[file as usize].tree);
    for (index, item) in tree.items.iter().enumerate() {
        let at = ItemRef { file, item: index as u32 };
        let (declared, name, span) = match &item.tree.kind {
            ItemKind::Let { name, .. } => (Declared::Let, name.text.clone(), name.span),
            ItemKind::Part { name, .. } => (Declared::Part, name.text.clone(), name.span),
            ItemKind::Drive { name, .. } => (Declared::Drive, name.text.clone(), name.span),
            ItemKind::Case { name, .. } => (Declared::Case, name.text.clone(), name.span),
            ItemKind::Use { path, alias } => {
                let target = used(world, at, path, files, memo, sink);
                let (name, span) = match alias {
                    Some(alias) => (alias.text.clone(), alias.span),
                    None => (stem(&path.value).into(), path.span),
                };
                (Declared::File(target), name, span)
            }
            _ => continue,
        };
        if name.is_empty() {
            // The parser said that the name is missing.
            continue;
        }
        let place = world.place(at, span);
        if matches!(&*name, "plain" | "pi") {
            let words = if &*name == "pi" { "the number pi" } else { "the spec without case" };
            let message = format!("`{name}` is {words} and cannot be declared");
            sink.push(Diagnostic::new(Code::DoubledName, place, message).help("give it another name"));
            continue;
        }
        let earlier = world.scopes[file as usize].names.get(&name).copied();
        if let Some((_, first)) = earlier {
            sink.push(doubled(world, &name, place, first));
        } else {
            world.scopes[file as usize].names.insert(name, (declared, at));
        }
    }
}

fn doubled(world: &World, name: &str, place: FileSpan, first: ItemRef) -> Diagnostic {
    let found = Diagnostic::new(Code::DoubledName, place, format!("`{name}` is declared twice"))
        .help("the order of declarations does not matter, so neither can win: rename one");
    match world.name(first) {
        Some(name) => found.related(world.place(first, name.span), "first declared here"),
        None => found,
    }
}

/// The name of a file without folders and ending.
pub(crate) fn stem(path: &str) -> &str {
    let file = path.rsplit('/').next().unwrap_or(path);
    file.split('.').next().unwrap_or(file)
}

/// The index of the file a `use` names.
fn used(
    world: &mut World,
    at: ItemRef,
    path: &layshaft_syntax::Text,
    files: &dyn Files,
    memo: &mut crate::Memo,
    sink: &Sink,
) -> Option<u32> {
    let place = world.place(at, path.span);
    let full = match beside(&world.files[at.file as usize].path, &path.value) {
        Ok(full) => full,
        Err(why) => {
            sink.push(Diagnostic::new(Code::MissingFile, place, why));
            return None;
        }
    };
    if let Some(known) = world.files.iter().position(|file| file.path == full) {
        return Some(known as u32);
    }
    if world.files.len() >= MOST_FILES {
        let message = format!("more than {MOST_FILES} files are used by one spec");
        sink.push(Diagnostic::new(Code::TooLarge, place, message));
        return None;
    }
    match files.read(&full) {
        Ok(text) => {
            let tree = memo.parse(&full, &text);
            Some(world.push(full, text, tree))
        }
        Err(why) => {
            sink.push(unreadable(place, &full, &why));
            None
        }
    }
}

/// The finding for a file that cannot be had.
pub(crate) fn unreadable(place: FileSpan, path: &str, why: &ReadError) -> Diagnostic {
    let (message, help) = match why {
        ReadError::Missing => (
            format!("there is no file `{path}`"),
            "paths are taken from the folder of the file that names them",
        ),
        ReadError::Outside => (
            format!("`{path}` lies outside the folder this spec may read from"),
            "an empty `layshaft.toml` in a folder further up makes that folder the root",
        ),
        ReadError::TooLarge(limit) => (
            format!("`{path}` is larger than {} MB", limit / 1_000_000),
            "split it, or keep only the columns that are used",
        ),
        ReadError::NotText(offset) => {
            (format!("`{path}` is not UTF-8 text: byte {offset} does not fit"), "save it as UTF-8")
        }
        ReadError::Other(words) => {
            (format!("`{path}` cannot be read: {words}"), "see that the file may be read")
        }
    };
    Diagnostic::new(Code::MissingFile, place, message).help(help)
}

/// The path of `name`, as named in the file `from`, relative to the root.
///
/// # Errors
/// Says why the path may not be used.
pub(crate) fn beside(from: &str, name: &str) -> Result<String, String> {
    if name.is_empty() {
        return Err("the path is empty".to_owned());
    }
    if name.contains('\\') {
        return Err("folders are separated by `/` in a spec, on every system".to_owned());
    }
    if name.starts_with('/') || name.contains(':') {
        return Err("the path is absolute; a spec names files relative to its own folder".to_owned());
    }
    if name.chars().any(char::is_control) {
        return Err("the path holds a control character".to_owned());
    }
    let folder = from.rsplit_once('/').map_or("", |(folder, _)| folder);
    let mut names: Vec<&str> = folder.split('/').filter(|part| !part.is_empty()).collect();
    for part in name.split('/') {
        match part {
            "" | "." => {}
            ".." => {
                if names.pop().is_none() {
                    return Err("`..` leads out of the folder this spec may read from".to_owned());
                }
            }
            part => names.push(part),
        }
    }
    Ok(names.join("/"))
}

/// Files that use each other in a ring: nothing is wrong with the values, but the ring has no first file.
fn report_cycles(world: &World, sink: &Sink) {
    for file in 0..world.files.len() as u32 {
        for scope_entry in world.scopes[file as usize].names.values() {
            let (Declared::File(Some(target)), at) = *scope_entry else { continue };
            if reaches(world, target, file) {
                let ItemKind::Use { path, .. } = &world.tree(at).kind else { continue };
                let message = if target == file {
                    "a file cannot use itself".to_owned()
                } else {
                    format!("`{}` uses this file in turn", world.files[target as usize].path)
                };
                let mut found = Diagnostic::new(Code::Cycle, world.place(at, path.span), message)
                    .help("move what both need into a third file");
                found.severity = Severity::Error;
                sink.push(found);
            }
        }
    }
}

/// Whether `from` uses `to`, directly or through others, or is it.
fn reaches(world: &World, from: u32, to: u32) -> bool {
    let mut seen = vec![false; world.files.len()];
    let mut open = vec![from];
    while let Some(file) = open.pop() {
        if file == to {
            return true;
        }
        if std::mem::replace(&mut seen[file as usize], true) {
            continue;
        }
        for (declared, _) in world.scopes[file as usize].names.values() {
            if let Declared::File(Some(target)) = declared {
                open.push(*target);
            }
        }
    }
    false
}

#[cfg(test)]
mod tests {
    use super::beside;

    #[test]
    fn paths_stay_inside() {
        assert_eq!(beside("a/b.shaft", "c/d.shaft").as_deref(), Ok("a/c/d.shaft"));
        assert_eq!(beside("b.shaft", "./d.shaft").as_deref(), Ok("d.shaft"));
        assert_eq!(beside("a/b.shaft", "../d.shaft").as_deref(), Ok("d.shaft"));
        for bad in ["../../d.shaft", "/d", "C:/d", "a\\b", "", "c/../../../b"] {
            assert!(beside("a/b.shaft", bad).is_err(), "{bad}");
        }
    }
}
