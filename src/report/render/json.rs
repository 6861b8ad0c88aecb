//! Results as one JSON document.

use serde::Serialize;

#[derive(Serialize)]
struct Envelope<'a, R> {
    modewright: &'static str,
    command: &'a str,
    #[serde(skip_serializing_if = "Option::is_none")]
    file: Option<&'a str>,
    #[serde(flatten)]
    result: &'a R,
}

/// The JSON text of a command's result.
///
/// # Errors
/// None that a result of this library can cause; serde's own are passed on.
pub fn render<R: Serialize>(command: &str, file: &str, result: &R) -> serde_json::Result<String> {
    pretty(command, Some(file), result)
}

/// The JSON text of a result that speaks of no file.
///
/// # Errors
/// Those of [`render`].
pub fn render_bare<R: Serialize>(command: &str, result: &R) -> serde_json::Result<String> {
    pretty(command, None, result)
}

fn pretty<R: Serialize>(
    command: &str,
    file: Option<&str>,
    result: &R,
) -> serde_json::Result<String> {
    serde_json::to_string_pretty(&Envelope {
        modewright: env!("CARGO_PKG_VERSION"),
        command,
        file,
        result,
    })
}
