//! `new`: a file to start from.

use std::fs::OpenOptions;
use std::io::{ErrorKind, Write};
use std::path::{Path, PathBuf};

use clap::Args;

use super::Answer;
use crate::file::nearest;
use crate::file::starters::{self, RING, SHIPPED, STANDING};

#[derive(Args)]
#[command(after_help = "\
Examples:
  modewright new --ring my-ring.toml
  modewright new --from bow-tie-doubling-ring > mine.toml
  modewright new | modewright check /dev/stdin")]
pub(super) struct Typed {
    /// A cavity between two end mirrors, which it is without any of these
    #[arg(long, conflicts_with_all = ["ring", "from"])]
    standing: bool,
    /// A ring
    #[arg(long, conflicts_with = "from")]
    ring: bool,
    /// A copy of a shipped cavity; a name that is not known lists them
    #[arg(long, value_name = "NAME")]
    from: Option<String>,
    /// File to write, which must not exist yet; standard output without it
    path: Option<PathBuf>,
}

pub(super) fn run(typed: &Typed) -> Answer {
    let text = match &typed.from {
        Some(name) => match starters::find(name) {
            Some(shipped) => shipped.text,
            None => return unknown(name),
        },
        None if typed.ring => RING,
        None => STANDING,
    };
    match &typed.path {
        Some(path) => write(path, text),
        None => Answer::fine(text.into()),
    }
}

fn write(path: &Path, text: &str) -> Answer {
    let name = path.display();
    let written = OpenOptions::new()
        .write(true)
        .create_new(true)
        .open(path)
        .and_then(|mut file| file.write_all(text.as_bytes()));
    match written {
        Ok(()) => Answer::fine(format!(
            "wrote {name}; see what it does with: modewright check {name}\n"
        )),
        Err(error) if error.kind() == ErrorKind::AlreadyExists => Answer::wrong(format!(
            "error: {name} exists already and stays as it is\nhelp: choose another name\n"
        )),
        Err(error) => Answer::wrong(format!("error: cannot write {name}: {error}\n")),
    }
}

fn unknown(name: &str) -> Answer {
    let width = SHIPPED.iter().map(|shipped| shipped.name.len()).max();
    let width = width.unwrap_or_default();
    let listed: Vec<String> = SHIPPED
        .iter()
        .map(|shipped| format!("  {:width$}  {}", shipped.name, shipped.title()))
        .map(|line| line.trim_end().to_string())
        .collect();
    let names = SHIPPED.iter().map(|shipped| shipped.name);
    let mut err = format!(
        "error: no shipped cavity is named \"{}\"\n",
        name.escape_debug()
    );
    if let Some(near) = nearest(name, names) {
        err += &format!("help: did you mean {near}?\n");
    }
    err += &format!("\nShipped cavities:\n{}\n", listed.join("\n"));
    Answer::wrong(err)
}
