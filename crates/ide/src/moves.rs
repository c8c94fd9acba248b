//! What a spec has to say otherwise when files are moved: the paths of `use` and `csv`.

use layshaft_diagnostics::{Edit, FileId, FileSpan};
use layshaft_syntax::{Item, ItemKind};

use crate::Snapshot;
use crate::links::{beside, document_links};

/// The spec itself.
const SPEC: FileId = FileId(0);

/// A file or folder that moves: old and new path below the root, `/` between names; no new path where it leaves the root.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Move {
    /// The old path.
    pub from: String,
    /// The new one.
    pub to: Option<String>,
}

/// The replacements in the spec's own text, places as they are before the move. A path that cannot be said any more, for
/// it would lead out of the root, stays as it is and is told as missing.
#[must_use]
pub fn moved(snapshot: &Snapshot, moves: &[Move]) -> Vec<Edit> {
    let Some(source) = snapshot.file(SPEC) else { return Vec::new() };
    let Some(own) = after(&source.path, moves) else { return Vec::new() };
    let mut edits = Vec::new();
    for link in document_links(snapshot, SPEC) {
        let Some(target) = after(&link.path, moves) else { continue };
        let written = snapshot.text(link.place);
        let inside = written.strip_prefix('"').and_then(|rest| rest.strip_suffix('"'));
        // An escape in a path is left to its author.
        let Some(old) = inside.filter(|path| !path.contains('\\')) else { continue };
        if beside(&own, old).as_deref() == Some(&target) {
            continue;
        }
        let new = relative(&own, &target);
        if beside(&own, &new).as_deref() != Some(&target) {
            continue;
        }
        let mut text = format!("\"{new}\"");
        if let Some(name) = keeps_its_name(snapshot, link.place, old, &new) {
            text.push_str(&format!(" as {name}"));
        }
        edits.push(Edit { place: link.place, text });
    }
    edits
}

/// A path after the moves; none where it leaves the root.
fn after(path: &str, moves: &[Move]) -> Option<String> {
    for one in moves {
        if path == one.from {
            return one.to.clone();
        }
        if let Some(rest) = path.strip_prefix(&one.from).and_then(|rest| rest.strip_prefix('/')) {
            return one.to.as_ref().map(|to| format!("{to}/{rest}"));
        }
    }
    Some(path.to_owned())
}

/// A path as it is written in a file.
fn relative(from: &str, target: &str) -> String {
    let mut folders: Vec<&str> = from.split('/').collect();
    folders.pop();
    let names: Vec<&str> = target.split('/').collect();
    let common = folders.iter().zip(&names[..names.len() - 1]).take_while(|(a, b)| a == b).count();
    let up = std::iter::repeat_n("..", folders.len() - common);
    up.chain(names[common..].iter().copied()).collect::<Vec<_>>().join("/")
}

/// The name that a used file had from its path, where the new path would give it another.
fn keeps_its_name(snapshot: &Snapshot, place: FileSpan, old: &str, new: &str) -> Option<String> {
    let item: &Item = snapshot.item(place.file, place.span.start)?;
    let ItemKind::Use { alias: None, .. } = &item.tree.kind else { return None };
    let stem = |path: &str| {
        let name = path.rsplit('/').next().unwrap_or(path);
        name.rsplit_once('.').map_or(name, |(stem, _)| stem).to_owned()
    };
    let (old, new) = (stem(old), stem(new));
    let is_name = old.starts_with(|c: char| c.is_alphabetic() || c == '_')
        && old.chars().all(|c| c.is_alphanumeric() || c == '_');
    (old != new && is_name).then_some(old)
}

#[cfg(test)]
mod tests {
    use super::{Move, moved};
    use crate::actions::applied;
    use crate::fixture::Fixture;

    fn check(drawn: &str, moves: &[(&str, Option<&str>)], expected: &str) {
        let fixture = Fixture::new(drawn);
        let moves: Vec<Move> = moves
            .iter()
            .map(|(from, to)| Move { from: (*from).to_owned(), to: to.map(str::to_owned) })
            .collect();
        let text = &fixture.snapshot.analysis.files[0].text;
        assert_eq!(applied(text, &moved(&fixture.snapshot, &moves)), expected);
    }

    #[test]
    fn paths_follow_their_files() {
        let use_it = "use \"parts/a.shaft\" as p\nlet b = p.x\n--- parts/a.shaft\nlet x = 1 m\n";
        check(use_it, &[("parts/a.shaft", Some("lib/b.shaft"))], "use \"lib/b.shaft\" as p\nlet b = p.x\n");
        check(use_it, &[("parts", Some("old/parts"))], "use \"old/parts/a.shaft\" as p\nlet b = p.x\n");
        check(use_it, &[("parts/ab.shaft", Some("c.shaft"))], "use \"parts/a.shaft\" as p\nlet b = p.x\n");
        check(use_it, &[("parts/a.shaft", None)], "use \"parts/a.shaft\" as p\nlet b = p.x\n");
        check(
            "source m: measured_curve { curve = csv \"c.csv\" (n as speed [rpm], M as torque [N·m]) }\n",
            &[("c.csv", Some("curves/d.csv"))],
            "source m: measured_curve { curve = csv \"curves/d.csv\" (n as speed [rpm], M as torque [N·m]) }\n",
        );
    }

    #[test]
    fn a_spec_that_moves_takes_its_paths_along() {
        let use_it = "use \"parts/a.shaft\" as p\nlet b = p.x\n--- parts/a.shaft\nlet x = 1 m\n";
        check(
            use_it,
            &[("spec.shaft", Some("mill/spec.shaft"))],
            "use \"../parts/a.shaft\" as p\nlet b = p.x\n",
        );
    }

    #[test]
    fn a_name_that_came_from_the_path_stays() {
        check(
            "use \"a.shaft\"\nlet b = a.x\n--- a.shaft\nlet x = 1 m\n",
            &[("a.shaft", Some("c.shaft"))],
            "use \"c.shaft\" as a\nlet b = a.x\n",
        );
    }
}
