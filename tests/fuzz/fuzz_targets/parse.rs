//! Any text whatever is read or refused, and a refusal is fit to be shown.

#![no_main]

#[allow(dead_code)]
#[path = "../../faults/grammar.rs"]
mod grammar;

libfuzzer_sys::fuzz_target!(|text: &str| {
    grammar::examine_load(text);
});
