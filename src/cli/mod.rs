//! The command line: what was typed, and which command answers it.
//!
//! Exit status: 0 done and all is well, 1 done and the answer is no, 2 the input is wrong (nothing
//! on stdout), 3 an internal fault.

mod check;
mod input;
mod manual;
mod materials;
mod modes;
mod new;
mod output;
mod picture;
mod progress;
mod schema;
mod sweep;
mod tolerance;
mod vary;

use std::ffi::OsString;
use std::io::{ErrorKind, Write};
use std::panic::catch_unwind;
use std::process::ExitCode;

use anstream::{AutoStream, ColorChoice};
use clap::{Args, Parser, Subcommand, ValueEnum};
use serde::Serialize;

use crate::report::document::Document;
use crate::report::render;

/// Done, and all is well.
const FINE: u8 = 0;
/// Done, and the answer is no.
const NO: u8 = 1;
/// The input is wrong.
const WRONG_INPUT: u8 = 2;
/// An internal fault.
const FAULT: u8 = 3;

/// Commands that are named but cannot be given yet.
const LATER: [&str; 9] = [
    "response", "couple", "fit-beam", "tilt", "losses", "design", "layout", "report", "live",
];

/// Design lasers and optical cavities: is it stable with real parts, how large is the beam on
/// every optic, and what comes out?
#[derive(Parser)]
#[command(name = "modewright", version, about, max_term_width = 80)]
struct Typed {
    #[command(subcommand)]
    command: Command,
    /// When to use colours
    #[arg(long, global = true, value_enum, default_value_t = Colour::Auto, value_name = "WHEN")]
    color: Colour,
}

#[derive(Clone, Copy, ValueEnum)]
enum Colour {
    Auto,
    Always,
    Never,
}

#[derive(Subcommand)]
enum Command {
    /// Is the cavity stable, how far may each part move, how large is the beam everywhere?
    Check(check::Typed),
    /// Where do the transverse modes resonate, which disturb the fundamental, and how to move out?
    Modes(modes::Typed),
    /// Any measure against one or two quantities; all ranges of stability, edges solved
    Sweep(sweep::Typed),
    /// Will the build still meet its limits with real parts, and what spoils it?
    Tolerance(tolerance::Typed),
    /// Which materials are known, with their sources, and what is their index at a wavelength?
    Materials(materials::Typed),
    /// Print or write a cavity file to start from
    New(new::Typed),
    /// Print the JSON Schema of a cavity file
    Schema(schema::Typed),
    /// Print what a shell needs to complete commands and options
    Completions(manual::Completions),
    /// Print the manual page of the program or of a command
    Manual(manual::Manual),
    #[command(external_subcommand)]
    Other(Vec<OsString>),
}

/// What every command on a cavity file takes.
#[derive(Args)]
struct CavityFile {
    /// The cavity file
    file: std::path::PathBuf,
    /// Replace a value and its spread, as in --set 'M3.roc=75 mm'; may be repeated
    #[arg(long, value_name = "ADDRESS=VALUE")]
    set: Vec<String>,
}

/// What a command has to say, and its exit status.
struct Answer {
    out: String,
    err: String,
    status: u8,
}

impl Answer {
    fn fine(out: String) -> Answer {
        Answer {
            out,
            err: String::new(),
            status: FINE,
        }
    }

    fn fault(what: String) -> Answer {
        Answer {
            out: String::new(),
            err: format!("error: {what}\n"),
            status: FAULT,
        }
    }

    fn wrong(err: String) -> Answer {
        Answer {
            out: String::new(),
            err,
            status: WRONG_INPUT,
        }
    }
}

/// A good answer about no file, as JSON or as a document.
fn finish<R: Serialize>(
    command: &str,
    json: bool,
    result: &R,
    describe: impl FnOnce() -> Document,
) -> Answer {
    if !json {
        return Answer::fine(render::terminal::render(&describe()));
    }
    match render::json::render_bare(command, result) {
        Ok(text) => Answer::fine(text + "\n"),
        Err(error) => Answer::fault(format!("the result does not fit into JSON: {error}")),
    }
}

/// How a result about a cavity file is to be told.
struct Telling<'a> {
    command: &'a str,
    file: &'a std::path::Path,
    json: bool,
    quiet: bool,
}

/// An answer about a cavity file, as JSON or as a document.
fn answer_about<R: Serialize>(
    telling: Telling<'_>,
    result: &R,
    describe: impl FnOnce() -> Document,
    status: u8,
) -> Result<Answer, Answer> {
    let out = if telling.json {
        let file = telling.file.display().to_string();
        render::json::render(telling.command, &file, result)
            .map_err(|error| Answer::fault(format!("the result does not fit into JSON: {error}")))?
            + "\n"
    } else {
        let mut document = describe();
        if telling.quiet {
            document.keep_verdict();
        }
        render::terminal::render(&document)
    };
    Ok(Answer {
        out,
        err: String::new(),
        status,
    })
}

/// Runs the command line of this process.
pub fn run() -> ExitCode {
    let typed = Typed::parse();
    let choice = match typed.color {
        Colour::Auto => ColorChoice::Auto,
        Colour::Always => ColorChoice::Always,
        Colour::Never => ColorChoice::Never,
    };
    let answer = catch_unwind(|| match &typed.command {
        Command::Check(typed) => check::run(typed),
        Command::Sweep(typed) => sweep::run(typed),
        Command::Tolerance(typed) => tolerance::run(typed),
        Command::Modes(typed) => modes::run(typed),
        Command::Materials(typed) => materials::run(typed),
        Command::New(typed) => new::run(typed),
        Command::Schema(_) => schema::run(),
        Command::Completions(typed) => manual::completions(typed),
        Command::Manual(typed) => manual::manual(typed),
        Command::Other(words) => other(words),
    });
    let Ok(answer) = answer else {
        return ExitCode::from(FAULT);
    };
    let told = say(AutoStream::new(std::io::stderr(), choice), &answer.err)
        .and(say(AutoStream::new(std::io::stdout(), choice), &answer.out));
    match told {
        Ok(()) => ExitCode::from(answer.status),
        // Whoever reads has read enough.
        Err(error) if error.kind() == ErrorKind::BrokenPipe => ExitCode::from(answer.status),
        Err(_) => ExitCode::from(FAULT),
    }
}

fn say(mut stream: impl Write, text: &str) -> std::io::Result<()> {
    stream.write_all(text.as_bytes())?;
    stream.flush()
}

fn other(words: &[OsString]) -> Answer {
    let name = words
        .first()
        .map(|word| word.to_string_lossy().into_owned())
        .unwrap_or_default();
    let err = if LATER.contains(&name.as_str()) {
        format!("error: the command `{name}` is not available yet\n")
    } else {
        format!(
            "error: there is no command `{}`; see `modewright help`\n",
            name.escape_debug()
        )
    };
    Answer {
        out: String::new(),
        err,
        status: WRONG_INPUT,
    }
}
