//! Drawn tests: `$0` is the cursor, `<|…|>` a range; `--- name` begins a further file.

use std::sync::Arc;

use layshaft_diagnostics::{FileId, FileSpan, Span};
use layshaft_semantics::{Memo, MemoryFiles};

use crate::Snapshot;

/// A drawn text, analyzed.
pub struct Fixture {
    /// The analysis of the undrawn text.
    pub snapshot: Snapshot,
    /// The file with the cursor.
    pub file: FileId,
    /// The cursor.
    pub offset: u32,
    /// The ranges, in the order of the files and texts.
    pub ranges: Vec<FileSpan>,
}

struct Drawn {
    name: String,
    text: String,
    cursor: Option<u32>,
    ranges: Vec<Span>,
}

impl Fixture {
    /// Reads a drawing. The first file is `spec.shaft`, the spec itself.
    pub fn new(drawn: &str) -> Self {
        let mut files = vec![Drawn {
            name: "spec.shaft".to_owned(),
            text: String::new(),
            cursor: None,
            ranges: Vec::new(),
        }];
        for line in drawn.split_inclusive('\n') {
            if let Some(name) = line.strip_prefix("--- ") {
                files.push(Drawn {
                    name: name.trim().to_owned(),
                    text: String::new(),
                    cursor: None,
                    ranges: Vec::new(),
                });
            } else if let Some(file) = files.last_mut() {
                file.take(line);
            }
        }
        let texts = files.iter().map(|file| (file.name.clone(), Arc::from(file.text.as_str()))).collect();
        let memory = MemoryFiles { texts };
        let text = Arc::from(files[0].text.as_str());
        let snapshot = Snapshot::new("spec.shaft", text, &memory, &mut Memo::default());
        let id = |name: &str| {
            let found = snapshot.analysis.files.iter().position(|file| file.path == name);
            FileId(found.unwrap_or(0) as u32)
        };
        let ranges = files
            .iter()
            .flat_map(|file| file.ranges.iter().map(|span| FileSpan { file: id(&file.name), span: *span }))
            .collect();
        let cursor = files.iter().find_map(|file| file.cursor.map(|offset| (id(&file.name), offset)));
        let (file, offset) = cursor.unwrap_or((FileId(0), 0));
        Self { snapshot, file, offset, ranges }
    }
}

impl Drawn {
    fn take(&mut self, line: &str) {
        let mut rest = line;
        while let Some(at) = ["$0", "<|", "|>"].iter().filter_map(|mark| rest.find(mark)).min() {
            self.text.push_str(&rest[..at]);
            let here = self.text.len() as u32;
            match &rest[at..at + 2] {
                "$0" => self.cursor = Some(here),
                "<|" => self.ranges.push(Span::new(here, here)),
                _ => {
                    if let Some(range) = self.ranges.last_mut() {
                        range.end = here;
                    }
                }
            }
            rest = &rest[at + 2..];
        }
        self.text.push_str(rest);
    }
}
