//! Any text against the laws of the reader.
#![no_main]

libfuzzer_sys::fuzz_target!(|text: &str| layshaft_tests::laws::parse(text));
