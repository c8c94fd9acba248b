//! Documents that no file holds: pages of codes and kinds, result tables. Their names are in a scheme of the server's
//! own; a client that shows them says so with `documents` among its initialization options.

use std::time::Duration;

use layshaft_ide::documents::{explain, result_table};
use layshaft_ide::results::drive_at;
use layshaft_ide::type_definition;
use serde::Deserialize;
use serde_json::{Value, json};
use tower_lsp::jsonrpc::{Error, Result};
use tower_lsp::lsp_types::request::{GotoTypeDefinitionParams, ShowDocument};
use tower_lsp::lsp_types::{Location, Position, Range, ShowDocumentParams, Url};

use crate::core::{Core, now};
use crate::handlers::{Asked, SPEC};
use crate::outbox::Asked as Why;

/// The scheme of the names.
pub const SCHEME: &str = "layshaft";
/// How long trials may be begun for the influence of assumptions.
const PATIENCE: Duration = Duration::from_millis(500);

/// A document by its name.
#[derive(Debug, Deserialize)]
pub struct DocumentParams {
    uri: Url,
}

/// The name of the page of a code.
pub fn code_page(word: &str) -> Option<Url> {
    Url::parse(&format!("{SCHEME}:/codes/{word}.md")).ok()
}

/// The name of the result table of the drive at a position.
fn table_page(drive: &str, spec: &Url, at: Position) -> Option<Url> {
    let mut uri = Url::parse(&format!("{SCHEME}:/results")).ok()?;
    uri.path_segments_mut().ok()?.push(&format!("{drive}.md"));
    let place = format!("{}:{}", at.line, at.character);
    uri.query_pairs_mut().append_pair("spec", spec.as_str()).append_pair("at", &place);
    Some(uri)
}

/// The text of a document, in the form of a request of our own.
pub fn document(core: &mut Core, params: DocumentParams) -> Result<Value> {
    let text = text(core, &params.uri)?;
    Ok(json!({ "uri": params.uri, "languageId": "markdown", "text": text }))
}

/// The same in the form of version 3.18 of the protocol.
pub fn content(core: &mut Core, params: DocumentParams) -> Result<Value> {
    Ok(json!({ "text": text(core, &params.uri)? }))
}

fn text(core: &mut Core, uri: &Url) -> Result<String> {
    let unknown = || Error::invalid_params(format!("{uri} is no document of this server"));
    if uri.scheme() != SCHEME {
        return Err(unknown());
    }
    let path = uri.path().trim_start_matches('/');
    let word = |folder: &str| path.strip_prefix(folder)?.strip_suffix(".md");
    if let Some(page) = word("codes/").and_then(explain) {
        return Ok(page.to_owned());
    }
    if let Some(page) = type_definition::document(path) {
        return Ok(page.text);
    }
    let find =
        |name: &str| uri.query_pairs().find(|(key, _)| key == name).map(|(_, value)| value.into_owned());
    let spec = find("spec").and_then(|spec| Url::parse(&spec).ok()).ok_or_else(unknown)?;
    let at = find("at").ok_or_else(unknown)?;
    let (line, character) = at.split_once(':').ok_or_else(unknown)?;
    let number = |text: &str| text.parse().map_err(|_| unknown());
    let at = Position::new(number(line)?, number(character)?);
    table(core, &spec, at)?.map(|(_, text)| text).ok_or_else(unknown)
}

/// The result table of the drive at a position, with its name.
pub fn table(core: &mut Core, spec: &Url, at: Position) -> Result<Option<(String, String)>> {
    let asked = Asked::new(core, spec)?;
    let offset = asked.offset(core, at);
    let Some((name, drive)) = drive_at(&asked.snapshot, SPEC, offset) else { return Ok(None) };
    let mut trials = core.specs.trials(&asked.uri, &asked.snapshot, now() + PATIENCE);
    Ok(result_table(&asked.snapshot, drive, &mut trials).map(|text| (name, text)))
}

/// Shows a result table as a document, where the client can; whether it was asked to.
pub fn show_table(core: &mut Core, drive: &str, spec: &Url, at: Position) -> bool {
    match table_page(drive, spec, at) {
        Some(uri) => show(core, uri),
        None => false,
    }
}

/// Shows the page of a code as a document, where the client can; whether it was asked to.
pub fn show_code(core: &mut Core, word: &str) -> bool {
    code_page(word).is_some_and(|uri| show(core, uri))
}

fn show(core: &mut Core, uri: Url) -> bool {
    let can = core.client.documents && core.client.shows;
    if can {
        let params =
            ShowDocumentParams { uri, external: Some(false), take_focus: Some(true), selection: None };
        core.out.ask::<ShowDocument>(&params, Why::Favour);
    }
    can
}

/// The page of the kind of what is named at a place.
pub fn of_kind(core: &mut Core, params: GotoTypeDefinitionParams) -> Result<Option<Location>> {
    let (asked, offset) = Asked::at(core, &params.text_document_position_params)?;
    let found = type_definition::type_definition(&asked.snapshot, SPEC, offset);
    Ok(found.and_then(|(_, page)| {
        let uri = Url::parse(&format!("{SCHEME}:/{}", page.name)).ok()?;
        Some(Location::new(uri, Range::default()))
    }))
}
