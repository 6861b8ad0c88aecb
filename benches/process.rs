//! The whole process for one file, from start to exit.

use std::process::{Command, Stdio};

fn main() {
    divan::main();
}

#[divan::bench(sample_count = 50, sample_size = 1)]
fn check_a_file() {
    let status = Command::new(env!("CARGO_BIN_EXE_modewright"))
        .args(["check", "cavities/bow-tie-doubling-ring.toml"])
        .stdout(Stdio::null())
        .status();
    assert!(status.is_ok_and(|status| status.success()));
}
