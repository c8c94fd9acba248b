//! Any text against the laws of the formatter.
#![no_main]

libfuzzer_sys::fuzz_target!(|text: &str| layshaft_tests::laws::format(text));
