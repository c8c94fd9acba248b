//! Settings, section `layshaft`. A setting changes what is shown, never a number or a verdict.

use serde::Deserialize;
use serde_json::Value;

/// The section that clients keep the settings under.
pub const SECTION: &str = "layshaft";

/// What can be set. What is not given is as by default; what cannot be read leaves everything as it was.
#[derive(Clone, Debug, Default, PartialEq, Eq, Deserialize)]
#[serde(default, rename_all = "camelCase")]
pub struct Settings {
    /// Charts in hovers, as images in the Markdown. Off by default: not every client shows one.
    pub charts: bool,
}

impl Settings {
    /// Reads settings, the section itself or what holds it.
    ///
    /// # Errors
    /// Says what cannot be read.
    pub fn read(value: &Value) -> Result<Self, String> {
        let value = value.get(SECTION).unwrap_or(value);
        if value.is_null() {
            return Ok(Self::default());
        }
        Self::deserialize(value).map_err(|error| format!("the settings `{SECTION}` cannot be read: {error}"))
    }
}
