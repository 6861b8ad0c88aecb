//! `check`: the verdict on a cavity file.

use clap::Args;

use super::picture::Target;
use super::{Answer, CavityFile, FINE, NO, Telling, answer_about, input, output};
use crate::analysis;
use crate::analysis::profile::Profile;
use crate::report::{describe, render};

#[derive(Args)]
#[command(after_help = "\
Examples:
  modewright check laser.toml
  modewright check laser.toml --set 'M2.roc=75 mm' --json")]
pub(super) struct Typed {
    #[command(flatten)]
    cavity: CavityFile,
    /// Print one JSON document, SI units, and nothing else
    #[arg(long)]
    json: bool,
    /// Print the verdict only
    #[arg(long, conflicts_with = "json")]
    quiet: bool,
    /// Draw the beam along the path, as .svg or .png by the ending of the name
    #[arg(long, value_name = "PATH")]
    plot: Option<std::path::PathBuf>,
    /// Write the beam at every part as comma-separated values, SI units
    #[arg(long, value_name = "PATH")]
    csv: Option<std::path::PathBuf>,
}

pub(super) fn run(typed: &Typed) -> Answer {
    match answer(typed) {
        Ok(answer) | Err(answer) => answer,
    }
}

fn answer(typed: &Typed) -> Result<Answer, Answer> {
    let target = typed.plot.as_deref().map(Target::of).transpose()?;
    let loaded = input::load(&typed.cavity)?;
    let check = analysis::check::check(&loaded.cavity);
    if let Some(target) = target {
        let cavity = &loaded.cavity;
        let profile = Profile::of(cavity, &cavity.book().nominal());
        target.write(&describe::envelope(&check, &profile))?;
    }
    if let Some(path) = &typed.csv {
        output::write_table(path, render::csv::stations(&check))?;
    }
    let good = check.stable && check.limits.iter().all(|limit| limit.holds);
    let status = if good { FINE } else { NO };
    let telling = Telling {
        command: "check",
        file: &typed.cavity.file,
        json: typed.json,
        quiet: typed.quiet,
    };
    answer_about(telling, &check, || describe::check(&check), status)
}
