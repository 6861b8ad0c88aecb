//! Results as one JSON document.

use serde::Serialize;

#[derive(Serialize)]
struct Envelope<'a, R> {
    modewright: &'static str,
    command: &'a str,
    file: &'a str,
    #[serde(flatten)]
    result: &'a R,
}

/// The JSON text of a command's result.
///
/// # Errors
/// None that a result of this library can cause; serde's own are passed on.
pub fn render<R: Serialize>(command: &str, file: &str, result: &R) -> serde_json::Result<String> {
    serde_json::to_string_pretty(&Envelope {
        modewright: env!("CARGO_PKG_VERSION"),
        command,
        file,
        result,
    })
}
