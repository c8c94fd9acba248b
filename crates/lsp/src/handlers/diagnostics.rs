//! Findings, sent or asked for: never both to one client.

use std::collections::BTreeMap;

use layshaft_ide::Snapshot;
use layshaft_ide::base::{Code, FileId, Severity};
use layshaft_ide::diagnostics::{Finding, findings};
use tower_lsp::jsonrpc::Result;
use tower_lsp::lsp_types::notification::PublishDiagnostics;
use tower_lsp::lsp_types::{
    CodeDescription, Diagnostic, DiagnosticRelatedInformation, DiagnosticSeverity, DiagnosticTag,
    DocumentDiagnosticParams, DocumentDiagnosticReport, DocumentDiagnosticReportKind,
    FullDocumentDiagnosticReport, Location, NumberOrString, PublishDiagnosticsParams,
    RelatedFullDocumentDiagnosticReport, RelatedUnchangedDocumentDiagnosticReport,
    UnchangedDocumentDiagnosticReport, Url, WorkspaceDiagnosticParams, WorkspaceDiagnosticReport,
    WorkspaceDocumentDiagnosticReport, WorkspaceFullDocumentDiagnosticReport,
    WorkspaceUnchangedDocumentDiagnosticReport,
};

use crate::core::Core;
use crate::handlers::{Asked, documents};
use crate::reports::Found;

/// The name that stands beside each finding.
const SOURCE: &str = "layshaft";

/// Tells what a spec comes to now, where the client does not ask.
pub fn tell(core: &mut Core, uri: &Url) {
    let Some(snapshot) = core.specs.snapshot(uri) else {
        // Stopped by newer text, which waits in the queue or is about to.
        if core.specs.specs.get(uri).is_some_and(|spec| spec.stopped > 0) {
            core.specs.untold.insert(uri.clone());
        }
        return;
    };
    let by_itself = core.specs.specs.get(uri).is_some_and(|spec| spec.own_change);
    let changed = take(core, uri, &snapshot);
    core.stale |= !by_itself || changed.iter().any(|other| other != uri);
    if core.client.pulls {
        return;
    }
    // The version tells the client that this text was looked at, be the findings the same.
    publish(core, uri);
    for other in changed.iter().filter(|other| *other != uri) {
        publish(core, other);
    }
}

/// A spec was closed: its findings go, those of other specs stay.
pub fn forget(core: &mut Core, uri: &Url) {
    let changed = core.reports.forget(uri);
    if core.client.pulls {
        core.stale |= changed.iter().any(|other| other != uri);
        return;
    }
    for file in changed {
        publish(core, &file);
    }
}

fn publish(core: &Core, uri: &Url) {
    let (items, _) = core.reports.of(uri);
    let version = core.specs.documents.get(uri).map(|document| document.version);
    let params = PublishDiagnosticsParams::new(uri.clone(), items.to_vec(), version);
    core.out.notify::<PublishDiagnostics>(&params);
}

/// Takes the findings of an analysis; gives the files whose findings are others now.
fn take(core: &mut Core, uri: &Url, snapshot: &Snapshot) -> Vec<Url> {
    let uris: Vec<Option<Url>> = (0..snapshot.analysis.files.len() as u32)
        .map(|file| core.specs.uri_of(uri, snapshot, FileId(file)))
        .collect();
    let mut found: Found = uris.iter().flatten().map(|uri| (uri.clone(), Vec::new())).collect();
    for finding in findings(snapshot) {
        let Some(Some(file)) = uris.get(finding.place.file.0 as usize) else { continue };
        let Some(item) = diagnostic(core, snapshot, &uris, finding) else { continue };
        found.entry(file.clone()).or_default().push(item);
    }
    core.reports.take(uri, found)
}

fn diagnostic(
    core: &Core,
    snapshot: &Snapshot,
    uris: &[Option<Url>],
    finding: Finding,
) -> Option<Diagnostic> {
    let encoding = core.client.encoding;
    let range = encoding.range(snapshot.file(finding.place.file)?, finding.place.span);
    let related = |(place, message): (layshaft_ide::base::FileSpan, String)| {
        let uri = uris.get(place.file.0 as usize)?.clone()?;
        let range = encoding.range(snapshot.file(place.file)?, place.span);
        Some(DiagnosticRelatedInformation { location: Location::new(uri, range), message })
    };
    let mut message = finding.message;
    let mut others = None;
    if core.client.related_information || core.client.pulls {
        let all: Vec<_> = finding.related.into_iter().filter_map(related).collect();
        others = (!all.is_empty()).then_some(all);
    } else {
        // Nothing exists only where some clients show it.
        for (place, words) in finding.related.iter().filter(|(_, words)| !words.is_empty()) {
            let file = snapshot.file(place.file)?;
            message.push_str(&format!("\nline {}: {words}", file.lines.line_of(place.span.start) + 1));
        }
    }
    Some(Diagnostic {
        range,
        severity: Some(match finding.severity {
            Severity::Error => DiagnosticSeverity::ERROR,
            Severity::Warning => DiagnosticSeverity::WARNING,
            Severity::Hint => DiagnosticSeverity::HINT,
        }),
        code: Some(NumberOrString::String(finding.code.row().word.to_owned())),
        code_description: code_page(core, finding.code),
        source: Some(SOURCE.to_owned()),
        message,
        related_information: others,
        tags: finding.unnecessary.then(|| vec![DiagnosticTag::UNNECESSARY]),
        data: None,
    })
}

/// The link to the page of a code, for clients that can open it.
fn code_page(core: &Core, code: Code) -> Option<CodeDescription> {
    let can = core.client.documents && (core.client.code_links || core.client.pulls);
    can.then(|| documents::code_page(code.row().word)).flatten().map(|href| CodeDescription { href })
}

/// The findings of a document.
pub fn document(core: &mut Core, params: DocumentDiagnosticParams) -> Result<DocumentDiagnosticReport> {
    let uri = params.text_document.uri;
    let asked = Asked::new(core, &uri)?;
    let changed = take(core, &uri, &asked.snapshot);
    core.stale |= changed.iter().any(|other| *other != uri && core.specs.documents.contains_key(other));
    let related_documents = core.client.related_documents.then(|| related(core, &uri).into_iter().collect());
    let (items, id) = core.reports.of(&uri);
    Ok(if params.previous_result_id.is_some_and(|previous| previous == id.to_string()) {
        DocumentDiagnosticReport::Unchanged(RelatedUnchangedDocumentDiagnosticReport {
            related_documents,
            unchanged_document_diagnostic_report: unchanged(id),
        })
    } else {
        DocumentDiagnosticReport::Full(RelatedFullDocumentDiagnosticReport {
            related_documents,
            full_document_diagnostic_report: full(items, id),
        })
    })
}

/// The findings in files that a spec uses and that are not open: nobody asks for those.
fn related(core: &Core, spec: &Url) -> BTreeMap<Url, DocumentDiagnosticReportKind> {
    let files = core.reports.files_of(spec).filter(|file| !core.specs.documents.contains_key(file));
    let report = |file: &Url| {
        let (items, id) = core.reports.of(file);
        (file.clone(), DocumentDiagnosticReportKind::Full(full(items, id)))
    };
    files.map(report).collect()
}

fn full(items: &[Diagnostic], id: u64) -> FullDocumentDiagnosticReport {
    FullDocumentDiagnosticReport { result_id: Some(id.to_string()), items: items.to_vec() }
}

fn unchanged(id: u64) -> UnchangedDocumentDiagnosticReport {
    UnchangedDocumentDiagnosticReport { result_id: id.to_string() }
}

/// The findings of every file that is open, or used by one.
pub fn workspace(core: &mut Core, params: WorkspaceDiagnosticParams) -> Result<WorkspaceDiagnosticReport> {
    let specs: Vec<Url> = core.specs.specs.keys().cloned().collect();
    for uri in specs {
        if let Some(snapshot) = core.specs.snapshot(&uri) {
            take(core, &uri, &snapshot);
        }
    }
    let known: BTreeMap<Url, String> =
        params.previous_result_ids.into_iter().map(|known| (known.uri, known.value)).collect();
    let report = |uri: &Url| {
        let (items, id) = core.reports.of(uri);
        let version = core.specs.documents.get(uri).map(|document| i64::from(document.version));
        let uri = uri.clone();
        if known.get(&uri).is_some_and(|known| *known == id.to_string()) {
            let unchanged_document_diagnostic_report = unchanged(id);
            return WorkspaceDocumentDiagnosticReport::Unchanged(
                WorkspaceUnchangedDocumentDiagnosticReport {
                    uri,
                    version,
                    unchanged_document_diagnostic_report,
                },
            );
        }
        let full_document_diagnostic_report = full(items, id);
        WorkspaceDocumentDiagnosticReport::Full(WorkspaceFullDocumentDiagnosticReport {
            uri,
            version,
            full_document_diagnostic_report,
        })
    };
    Ok(WorkspaceDiagnosticReport { items: core.reports.files().map(report).collect() })
}
