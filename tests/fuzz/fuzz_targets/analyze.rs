//! Any text against the laws of the whole analysis.
#![no_main]

libfuzzer_sys::fuzz_target!(|text: &str| layshaft_tests::laws::analyze(text));
