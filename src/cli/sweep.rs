//! `sweep`: any measure against one or two quantities.

use clap::Args;

use super::input::CavityText;
use super::picture::Target;
use super::vary;
use super::{Answer, CavityFile, FINE, NO, Telling, answer_about, input, output};
use crate::cavity::{Cavity, Measure};
use crate::report::{describe, render};
use crate::study::sweep::{self, MOST_POINTS, MOST_VALUES, Options, SweepError};

#[derive(Args)]
#[command(after_help = "\
Examples:
  modewright sweep laser.toml --vary 'd3.length=18 mm..31 mm'
  modewright sweep laser.toml --vary 'X1.thermal=0..20 1/m' --measure X1.spot,margin
  modewright sweep ring.toml --vary 'd1.length=60 mm..100 mm' --vary 'd3.length=18 mm..31 mm' \
--tie 'd4.length = d3.length' --plot map.png")]
pub(super) struct Typed {
    #[command(flatten)]
    cavity: CavityFile,
    /// A quantity and its range, as in 'd3.length=18 mm..31 mm'; once or twice
    #[arg(long, value_name = "ADDRESS=FROM..TO", required = true)]
    vary: Vec<String>,
    /// Points along each quantity [default: 201, and 101 along each of two]
    #[arg(long, value_name = "N")]
    points: Option<String>,
    /// Measures, such as X1.spot,margin [default: margin and those in the file's limits]
    #[arg(long, value_name = "NAMES")]
    measure: Option<String>,
    /// Let a quantity follow others, as in 'd4.length = d3.length'; may be repeated
    #[arg(long, value_name = "TIE")]
    tie: Vec<String>,
    /// Print one JSON document, SI units, and nothing else
    #[arg(long)]
    json: bool,
    /// Print the verdict only
    #[arg(long, conflicts_with = "json")]
    quiet: bool,
    /// Draw curves or maps, as .svg or .png by the ending of the name
    #[arg(long, value_name = "PATH")]
    plot: Option<std::path::PathBuf>,
    /// Write all points as comma-separated values, SI units
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
    let points = points(typed.points.as_deref())?;
    if let Some(third) = typed.vary.get(2) {
        let message = "one or two quantities are varied, and this is a third".into();
        let help = Some("tie it to another one with --tie".into());
        return Err(input::refuse_argument(
            "--vary",
            third,
            0..third.len(),
            message,
            help,
        ));
    }
    let ranges = typed
        .vary
        .iter()
        .map(|text| vary::Typed::split(text))
        .collect::<Result<Vec<_>, _>>()?;
    let changes = typed
        .tie
        .iter()
        .fold(input::settings(&typed.cavity), |changes, tie| {
            changes.tie(tie)
        });
    let text = CavityText::read(&typed.cavity)?;
    if let [one, other] = &ranges[..]
        && one.address() == other.address()
    {
        let message = format!("{} is varied twice", other.address());
        return Err(other.refuse_address(message, None));
    }
    let (cavity, vary) = vary::read(&text, &changes, &ranges)?;
    let measures = match &typed.measure {
        Some(names) => input::measures(&cavity, names)?,
        None => usual_measures(&cavity),
    };
    let options = Options {
        vary,
        points,
        measures,
    };
    let sweep = sweep::sweep(&cavity, &options)
        .map_err(|error| refuse(&error, &ranges, typed, &options))?;
    if let Some(target) = target {
        target.write(&describe::sweep_chart(&sweep))?;
    }
    if let Some(path) = &typed.csv {
        output::write_table(path, render::csv::sweep(&sweep))?;
    }
    let telling = Telling {
        command: "sweep",
        file: &typed.cavity.file,
        json: typed.json,
        quiet: typed.quiet,
    };
    let status = if sweep.has_stable { FINE } else { NO };
    answer_about(telling, &sweep, || describe::sweep(&sweep), status)
}

/// Margin and what the file's limits are about.
fn usual_measures(cavity: &Cavity) -> Vec<(String, Measure)> {
    let mut measures = vec![("margin".to_string(), Measure::Margin(None))];
    for limit in &cavity.limits {
        if measures.iter().any(|(_, known)| *known == limit.measure) {
            continue;
        }
        // The same name may be limited for several orders of modes.
        let same = measures
            .iter()
            .filter(|(name, _)| {
                *name == limit.name || name.starts_with(&format!("{} (", limit.name))
            })
            .count();
        let name = match same {
            0 => limit.name.clone(),
            same => format!("{} ({})", limit.name, same + 1),
        };
        measures.push((name, limit.measure));
    }
    measures
}

fn points(text: Option<&str>) -> Result<Option<usize>, Answer> {
    let Some(text) = text else { return Ok(None) };
    match text.trim().parse::<usize>() {
        Ok(points) => Ok(Some(points)),
        Err(_) => Err(input::refuse_argument(
            "--points",
            text,
            0..text.len(),
            "a number of points is wanted here".into(),
            Some("write it like --points 401".into()),
        )),
    }
}

/// What the library refuses, shown where it was typed.
fn refuse(
    error: &SweepError,
    ranges: &[vary::Typed<'_>],
    typed: &Typed,
    options: &Options,
) -> Answer {
    let message = error.to_string();
    match error {
        SweepError::Points(_) | SweepError::Values(_) => {
            let along = typed.points.clone().unwrap_or_default();
            let most = match options.vary.len() {
                1 => MOST_POINTS.min(MOST_VALUES / options.measures.len().max(1)),
                _ => MOST_POINTS.isqrt(),
            };
            let help = format!("write a number from 2 to {most}, or ask for fewer measures");
            input::refuse_argument("--points", &along, 0..along.len(), message, Some(help))
        }
        SweepError::NoWay(index) => ranges[*index].refuse_range(message, None),
        SweepError::MovesNothing(index) => {
            let names: Vec<&str> = options.measures.iter().map(|(n, _)| n.as_str()).collect();
            let message = format!(
                "{} moves neither the beam nor {}",
                ranges[*index].address(),
                names.join(", ")
            );
            let help = Some("name a measure that depends on it with --measure".into());
            ranges[*index].refuse_address(message, help)
        }
        SweepError::Tied(index) => ranges[*index].refuse_address(message, None),
        SweepError::Quantities | SweepError::Twice => match ranges.last() {
            Some(last) => last.refuse_address(message, None),
            None => Answer::wrong(format!("error: {message}\n")),
        },
    }
}
