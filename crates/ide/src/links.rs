//! The files a spec names: each path in quotes with the file it leads to.

use layshaft_diagnostics::{FileId, FileSpan};
use layshaft_semantics::index::Target;

use crate::Snapshot;

/// A path in the text.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Link {
    /// The path between its quotes, these included.
    pub place: FileSpan,
    /// The file, relative to the root, `/` between names.
    pub path: String,
}

/// Every path of a file that stays inside the root.
#[must_use]
pub fn document_links(snapshot: &Snapshot, file: FileId) -> Vec<Link> {
    let Some(source) = snapshot.file(file) else { return Vec::new() };
    let whole = FileSpan { file, span: layshaft_diagnostics::Span::new(0, source.text.len() as u32) };
    let link = |name: &layshaft_semantics::index::Reference| match &name.target {
        Target::Path(path) => Some(Link { place: name.place, path: beside(&source.path, path)? }),
        _ => None,
    };
    snapshot.names_in(whole).iter().filter_map(link).collect()
}

/// A path as written in a file, relative to the root; none where it leads out of it.
pub(crate) fn beside(from: &str, written: &str) -> Option<String> {
    if written.is_empty() || written.starts_with('/') || written.contains(['\\', ':', '\0']) {
        return None;
    }
    let mut names: Vec<&str> = from.split('/').collect();
    names.pop();
    for name in written.split('/') {
        match name {
            "" | "." => {}
            ".." => {
                names.pop()?;
            }
            name => names.push(name),
        }
    }
    Some(names.join("/"))
}

#[cfg(test)]
mod tests {
    use super::{beside, document_links};
    use crate::fixture::Fixture;

    #[test]
    fn used_files_and_tables_are_links() {
        let fixture = Fixture::new(
            "use <|\"parts/a.shaft\"|> as a\nsource m: measured_curve { curve = csv <|\"c.csv\"|> (n as speed [rpm], M as torque [N·m]) }\n--- parts/a.shaft\nlet b = 1 m\n",
        );
        let links = document_links(&fixture.snapshot, fixture.file);
        let places: Vec<_> = links.iter().map(|link| link.place).collect();
        assert_eq!(places, fixture.ranges);
        assert_eq!(links[0].path, "parts/a.shaft");
    }

    #[test]
    fn a_path_stays_inside() {
        assert_eq!(beside("a/b.shaft", "../c.csv").as_deref(), Some("c.csv"));
        assert_eq!(beside("a/b.shaft", "./d/c.csv").as_deref(), Some("a/d/c.csv"));
        for out in ["../../c.csv", "/etc/passwd", "C:\\x", "http://a/b", ""] {
            assert_eq!(beside("a/b.shaft", out), None, "{out}");
        }
    }
}
