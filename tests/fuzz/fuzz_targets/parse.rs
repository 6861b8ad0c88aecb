//! Any text whatever is read or refused, and a refusal is fit to be shown.

#![no_main]

#[allow(dead_code, reason = "this target uses a part of the shared judge")]
#[path = "../../faults/judge.rs"]
mod judge;

libfuzzer_sys::fuzz_target!(|text: &str| {
    // Showing a refusal takes many times as long as reading the text.
    if let Err(refused) = judge::judged(text)
        && text.len() % 32 == 0
    {
        judge::show(&refused);
    }
});
