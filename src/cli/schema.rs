//! `schema`: what a cavity file may hold, for editors and programs.

use clap::Args;

use super::{Answer, FAULT};
use crate::file::schema::schema;

#[derive(Args)]
#[command(after_help = "\
Example:
  modewright schema > cavity.schema.json
An editor that knows TOML and JSON Schema then completes keys and marks slips in
a file whose first line is
  #:schema ./cavity.schema.json")]
pub(super) struct Typed {}

pub(super) fn run() -> Answer {
    match serde_json::to_string_pretty(&schema()) {
        Ok(text) => Answer::fine(text + "\n"),
        Err(error) => Answer {
            out: String::new(),
            err: format!("error: the schema does not fit into JSON: {error}\n"),
            status: FAULT,
        },
    }
}
