//! Any text against the laws of the reader of tables.
#![no_main]

libfuzzer_sys::fuzz_target!(|text: &str| layshaft_tests::laws::csv(text));
