//! `completions` and `manual`: what the definitions of the arguments tell a shell and a reader.

use clap::{Args, CommandFactory};
use clap_complete::Shell;

use super::{Answer, FAULT, Typed as Program};
use crate::file::nearest;

#[derive(Args)]
#[command(after_help = "\
Examples:
  modewright completions bash > ~/.local/share/bash-completion/completions/modewright
  modewright completions fish > ~/.config/fish/completions/modewright.fish")]
pub(super) struct Completions {
    /// The shell
    shell: Shell,
}

#[derive(Args)]
#[command(after_help = "\
Examples:
  modewright manual > modewright.1
  modewright manual check > modewright-check.1")]
pub(super) struct Manual {
    /// A command; the program as a whole without it
    command: Option<String>,
}

pub(super) fn completions(typed: &Completions) -> Answer {
    let mut program = Program::command();
    let mut out = Vec::new();
    clap_complete::generate(typed.shell, &mut program, "modewright", &mut out);
    Answer::fine(String::from_utf8_lossy(&out).into_owned())
}

pub(super) fn manual(typed: &Manual) -> Answer {
    let mut program = Program::command();
    program.build();
    let page = match &typed.command {
        None => program,
        Some(name) => match program.find_subcommand(name) {
            Some(command) => command.clone(),
            None => return unknown(&program, name),
        },
    };
    let mut out = Vec::new();
    match clap_mangen::Man::new(page).render(&mut out) {
        Ok(()) => Answer::fine(String::from_utf8_lossy(&out).into_owned()),
        Err(error) => Answer {
            out: String::new(),
            err: format!("error: the page cannot be put together: {error}\n"),
            status: FAULT,
        },
    }
}

fn unknown(program: &clap::Command, name: &str) -> Answer {
    let names: Vec<&str> = program
        .get_subcommands()
        .map(clap::Command::get_name)
        .collect();
    let help = match nearest(name, names.iter().copied()) {
        Some(near) => format!("did you mean {near}?"),
        None => format!("commands: {}", names.join(", ")),
    };
    Answer::wrong(format!(
        "error: there is no command `{}`\nhelp: {help}\n",
        name.escape_debug()
    ))
}
