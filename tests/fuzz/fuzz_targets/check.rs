//! Files in the words of the format: whatever is a cavity is checked without a number that is none.

#![no_main]

#[path = "../../faults/grammar.rs"]
mod grammar;
#[path = "../../faults/judge.rs"]
mod judge;

libfuzzer_sys::fuzz_target!(|bytes: &[u8]| {
    judge::examine(&grammar::cavity_text(bytes));
});
