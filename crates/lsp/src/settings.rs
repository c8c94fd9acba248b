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
    /// Operating point and verdicts above each drive. Off by default: the hints say the same.
    pub lenses: bool,
    /// Results at the ends of lines.
    pub hints: Hints,
}

/// Which results stand at the ends of lines; all by default.
#[derive(Clone, Debug, PartialEq, Eq, Deserialize)]
#[serde(default, rename_all = "camelCase")]
pub struct Hints {
    /// Computed values.
    pub values: bool,
    /// Parts at the operating point.
    pub parts: bool,
    /// Drives, and what `show` asks for.
    pub drives: bool,
    /// Criteria with their margins.
    pub criteria: bool,
}

impl Default for Hints {
    fn default() -> Self {
        Self { values: true, parts: true, drives: true, criteria: true }
    }
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
