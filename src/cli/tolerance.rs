//! `tolerance`: will the build still meet its limits with real parts?

use clap::Args;

use super::picture::Target;
use super::progress::Progress;
use super::{Answer, CavityFile, FINE, NO, Telling, answer_about, input, output};
use crate::quantity::Kind;
use crate::report::{describe, render};
use crate::study::tolerance::{self, MOST_SAMPLES, Nothing, Options, Stage};

#[derive(Args)]
#[command(after_help = "\
Examples:
  modewright tolerance ring.toml
  modewright tolerance ring.toml --yield 95% --plot yield.svg")]
pub(super) struct Typed {
    #[command(flatten)]
    cavity: CavityFile,
    /// Measures to describe beside the limited ones, as in --measure M1.spot,margin
    #[arg(long, value_name = "NAMES")]
    measure: Option<String>,
    /// Number of samples; without it, sampling stops at the precision
    #[arg(long, value_name = "N", value_parser = clap::value_parser!(u64).range(1..=MOST_SAMPLES))]
    samples: Option<u64>,
    /// Half the width of the yield's 95 % interval that is good enough, as in 0.2%
    #[arg(long, value_name = "SHARE", default_value = "0.1%")]
    precision: String,
    /// The yield that is wanted, as in 95%: decides the exit status, and asks for a budget
    #[arg(long = "yield", value_name = "SHARE")]
    wanted: Option<String>,
    /// How many linewidths off the fundamental a transverse mode must be
    #[arg(long, value_name = "N", default_value_t = 5.0)]
    apart: f64,
    /// Where chance starts from; the same seed gives the same answer
    #[arg(long, value_name = "N", default_value_t = 1)]
    seed: u64,
    /// Print one JSON document, SI units, and nothing else
    #[arg(long)]
    json: bool,
    /// Print the verdict only
    #[arg(long, conflicts_with = "json")]
    quiet: bool,
    /// Draw histograms and contributions, as .svg or .png by the ending of the name
    #[arg(long, value_name = "PATH")]
    plot: Option<std::path::PathBuf>,
    /// Write the contributions as comma-separated values
    #[arg(long, value_name = "PATH")]
    csv: Option<std::path::PathBuf>,
}

pub(super) fn run(typed: &Typed) -> Answer {
    match answer(typed) {
        Ok(answer) | Err(answer) => answer,
    }
}

/// A share between 0 and 1, ends left out.
fn share(argument: &str, text: Option<&str>) -> Result<Option<f64>, Answer> {
    let Some(found) = input::quantity(argument, text, Kind::Ratio, "%")? else {
        return Ok(None);
    };
    if found > 0.0 && found < 1.0 {
        return Ok(Some(found));
    }
    Err(input::refuse_argument(
        argument,
        text.unwrap_or_default(),
        0..text.unwrap_or_default().len(),
        "this is a share between 0 and 100 %, the ends left out".into(),
        Some(format!("write it like {argument} 95%")),
    ))
}

fn answer(typed: &Typed) -> Result<Answer, Answer> {
    let target = typed.plot.as_deref().map(Target::of).transpose()?;
    let loaded = input::load(&typed.cavity)?;
    let cavity = &loaded.cavity;
    if !(typed.apart > 0.0 && typed.apart.is_finite()) {
        return Err(Answer::wrong(
            "error: --apart is a number of linewidths above zero, such as 5\n".into(),
        ));
    }
    let precision = share("--precision", Some(&typed.precision))?.unwrap_or(1e-3);
    if precision < 5e-5 {
        return Err(Answer::wrong(
            "error: a precision finer than 0.005 % would take more than 10⁸ samples\n".into(),
        ));
    }
    let options = Options {
        measures: match &typed.measure {
            Some(text) => input::measures(cavity, text)?,
            None => Vec::new(),
        },
        samples: typed.samples,
        precision,
        seed: typed.seed,
        apart: typed.apart,
        wanted: share("--yield", typed.wanted.as_deref())?,
    };
    let mut progress = Progress::new(typed.quiet);
    let found = tolerance::tolerance(cavity, &options, &mut |stage, share| {
        progress.tell(name(stage), share)
    });
    drop(progress);
    let found = found.map_err(|Nothing::NoSpread| {
        Answer::wrong(format!(
            "error: nothing in {} has a tolerance on which the measures depend\n  help: write one \
             as on the drawing, such as length = \"80 mm ± 0.3 mm\", or for all quantities of a \
             key: general = {{ length = \"0.2 mm\", roc = \"1 %\" }}\n",
            typed.cavity.file.display().to_string().escape_debug()
        ))
    })?;
    if let Some(target) = target {
        target.write(&describe::tolerance_chart(&found))?;
    }
    if let Some(path) = &typed.csv {
        output::write_table(path, render::csv::contributions(&found))?;
    }
    let reached = options.wanted.is_none_or(|wanted| found.passing >= wanted);
    let status = if reached { FINE } else { NO };
    let telling = Telling {
        command: "tolerance",
        file: &typed.cavity.file,
        json: typed.json,
        quiet: typed.quiet,
    };
    answer_about(telling, &found, || describe::tolerance(&found), status)
}

fn name(stage: Stage) -> &'static str {
    match stage {
        Stage::Sampling => "sampling",
        Stage::Tightening => "tolerances one by one",
        Stage::Contributions => "contributions",
        Stage::Worst => "worst corners",
        Stage::Adjusting => "adjusting",
        Stage::Budget => "budget",
    }
}
