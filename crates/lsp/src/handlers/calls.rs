//! What feeds a value and what it moves, as a hierarchy of calls.

use layshaft_ide::base::{FileId, FileSpan, Span};
use layshaft_ide::call_hierarchy::{self as hierarchy, Call, Node};
use serde_json::{Value, json};
use tower_lsp::jsonrpc::{Error, Result};
use tower_lsp::lsp_types::{
    CallHierarchyIncomingCall, CallHierarchyIncomingCallsParams, CallHierarchyItem,
    CallHierarchyOutgoingCall, CallHierarchyOutgoingCallsParams, CallHierarchyPrepareParams, Range, Url,
};

use crate::core::Core;
use crate::handlers::{Asked, SPEC, outline};

/// The value at a place.
pub fn prepare(
    core: &mut Core,
    params: CallHierarchyPrepareParams,
) -> Result<Option<Vec<CallHierarchyItem>>> {
    let (asked, offset) = Asked::at(core, &params.text_document_position_params)?;
    let node = hierarchy::prepare(&asked.snapshot, SPEC, offset);
    Ok(node.and_then(|node| item(core, &asked, node)).map(|item| vec![item]))
}

/// What feeds it.
pub fn outgoing(
    core: &mut Core,
    params: CallHierarchyOutgoingCallsParams,
) -> Result<Vec<CallHierarchyOutgoingCall>> {
    let (asked, place) = again(core, params.item.data.as_ref())?;
    let call = |call: Call| {
        let from_ranges = ranges(core, &asked, &call);
        Some(CallHierarchyOutgoingCall { to: item(core, &asked, call.node)?, from_ranges })
    };
    Ok(hierarchy::outgoing(&asked.snapshot, place).into_iter().filter_map(call).collect())
}

/// What it moves.
pub fn incoming(
    core: &mut Core,
    params: CallHierarchyIncomingCallsParams,
) -> Result<Vec<CallHierarchyIncomingCall>> {
    let (asked, place) = again(core, params.item.data.as_ref())?;
    let call = |call: Call| {
        let from_ranges = ranges(core, &asked, &call);
        Some(CallHierarchyIncomingCall { from: item(core, &asked, call.node)?, from_ranges })
    };
    Ok(hierarchy::incoming(&asked.snapshot, place).into_iter().filter_map(call).collect())
}

fn ranges(core: &Core, asked: &Asked, call: &Call) -> Vec<Range> {
    call.places.iter().filter_map(|place| asked.range(core, *place)).collect()
}

fn item(core: &Core, asked: &Asked, node: Node) -> Option<CallHierarchyItem> {
    let location = asked.location(core, node.place)?;
    let FileSpan { file, span } = node.place;
    Some(CallHierarchyItem {
        name: node.name,
        kind: outline::kind(node.kind),
        tags: None,
        detail: Some(node.detail).filter(|detail| !detail.is_empty()),
        uri: location.uri,
        range: asked.range(core, node.whole)?,
        selection_range: location.range,
        data: Some(json!({ "spec": asked.uri, "file": file.0, "start": span.start, "end": span.end })),
    })
}

/// The value an item stands for, as it is now.
fn again(core: &mut Core, data: Option<&Value>) -> Result<(Asked, FileSpan)> {
    let number = |name| data?.get(name)?.as_u64().and_then(|number| u32::try_from(number).ok());
    let uri = data.and_then(|data| data.get("spec")).and_then(Value::as_str);
    let uri = uri.and_then(|uri| Url::parse(uri).ok());
    let (Some(uri), Some(file), Some(start), Some(end)) =
        (uri, number("file"), number("start"), number("end"))
    else {
        return Err(Error::invalid_params("the item is not one of this server"));
    };
    let place = FileSpan { file: FileId(file), span: Span::new(start, end) };
    Ok((Asked::new(core, &uri)?, place))
}
