//! Settings: from the first message, from an answer, from a change.

use serde_json::Value;
use tower_lsp::lsp_types::request::WorkspaceConfiguration;
use tower_lsp::lsp_types::{
    ConfigurationItem, ConfigurationParams, DidChangeConfigurationParams, MessageType,
};

use crate::core::Core;
use crate::outbox::Asked;
use crate::settings::{SECTION, Settings};

/// Asks the client for the settings, where it can be asked.
pub fn ask(core: &mut Core) {
    if core.client.configuration {
        let item = ConfigurationItem { scope_uri: None, section: Some(SECTION.to_owned()) };
        core.out.ask::<WorkspaceConfiguration>(&ConfigurationParams { items: vec![item] }, Asked::Settings);
    }
}

/// The settings changed. Some clients send them along, the others are asked.
pub fn changed(core: &mut Core, params: DidChangeConfigurationParams) {
    if core.client.configuration {
        ask(core);
    } else {
        set(core, &params.settings);
    }
}

/// Takes settings. What cannot be read leaves them as they were.
pub fn set(core: &mut Core, settings: &Value) {
    match Settings::read(settings) {
        Ok(settings) => {
            core.stale |= settings != core.settings;
            core.settings = settings;
        }
        Err(why) => core.out.log(MessageType::WARNING, why),
    }
}
