//! `modes`: where the transverse modes of a cavity file resonate.

use clap::Args;

use super::picture::Target;
use super::{Answer, CavityFile, FINE, NO, Telling, WRONG_INPUT, answer_about, input, output};
use crate::analysis::modes::{self, APART};
use crate::cavity::{Cavity, Origin, Slot};
use crate::report::{describe, render};

#[derive(Args)]
#[command(after_help = "\
Examples:
  modewright modes ring.toml
  modewright modes ring.toml --apart 3 --free d1.length,M3.roc --plot modes.png")]
pub(super) struct Typed {
    #[command(flatten)]
    cavity: CavityFile,
    /// Wanted distance of every transverse mode from the fundamental, in linewidths
    #[arg(long, value_name = "LINEWIDTHS", default_value_t = APART, value_parser = apart)]
    apart: f64,
    /// Quantities to seek a way out along, beside those with a tolerance: PART.key,…
    #[arg(long, value_name = "PART.KEY,…", value_delimiter = ',')]
    free: Vec<String>,
    /// Print one JSON document, SI units, and nothing else
    #[arg(long)]
    json: bool,
    /// Print the verdict only
    #[arg(long, conflicts_with = "json")]
    quiet: bool,
    /// Draw the spectrum, as .svg or .png by the ending of the name
    #[arg(long, value_name = "PATH")]
    plot: Option<std::path::PathBuf>,
    /// Write every mode as comma-separated values, SI units
    #[arg(long, value_name = "PATH")]
    csv: Option<std::path::PathBuf>,
}

/// A number of linewidths.
fn apart(text: &str) -> Result<f64, String> {
    match text.trim().parse::<f64>() {
        Ok(count) if count.is_finite() && count > 0.0 => Ok(count),
        _ => Err("a number of linewidths above zero is wanted, such as 5".into()),
    }
}

pub(super) fn run(typed: &Typed) -> Answer {
    match answer(typed) {
        Ok(answer) | Err(answer) => answer,
    }
}

fn answer(typed: &Typed) -> Result<Answer, Answer> {
    let target = typed.plot.as_deref().map(Target::of).transpose()?;
    let cavity = input::load(&typed.cavity)?.cavity;
    let free = typed
        .free
        .iter()
        .map(|address| quantity(&cavity, address.trim()))
        .collect::<Result<Vec<Slot>, Answer>>()?;
    let mut once = Vec::new();
    for slot in free {
        if !once.contains(&slot) {
            once.push(slot);
        }
    }
    let found = modes::modes(&cavity, typed.apart, &once);
    if let Some(target) = target {
        target.write(&describe::modes_chart(&found))?;
    }
    if let Some(path) = &typed.csv {
        output::write_table(path, render::csv::modes(&found))?;
    }
    let telling = Telling {
        command: "modes",
        file: &typed.cavity.file,
        json: typed.json,
        quiet: typed.quiet,
    };
    let status = if found.no_answer.is_none() { FINE } else { NO };
    answer_about(telling, &found, || describe::modes(&found), status)
}

/// The quantity of an address typed behind `--free`.
fn quantity(cavity: &Cavity, address: &str) -> Result<Slot, Answer> {
    let refuse = |message: String, help: &str| {
        let mut answer = input::refuse_argument(
            "--free",
            address,
            0..address.len(),
            message,
            Some(help.into()),
        );
        answer.status = WRONG_INPUT;
        answer
    };
    let Some(slot) = cavity.book().find(address) else {
        return Err(refuse(
            "there is no such quantity".into(),
            "name a part of the path and one of its keys, such as d1.length",
        ));
    };
    let entry = cavity.book().entry(slot);
    if entry.origin == Origin::Tied {
        return Err(refuse(
            format!("{address} is tied to other quantities"),
            "name one that it follows; it moves along",
        ));
    }
    if !cavity.moves_rays(slot) {
        return Err(refuse(
            format!("{address} does not move the transverse modes"),
            "lengths, radii, thicknesses and focal lengths do",
        ));
    }
    Ok(slot)
}
