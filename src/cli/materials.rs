//! `materials`: the catalogue, or one material's figures.

use clap::Args;

use super::{Answer, finish, input};
use crate::analysis::materials::{LookUpError, catalogue, entry, look_up};
use crate::optics::material;
use crate::quantity::Kind;
use crate::report::describe::materials as describe;

/// Temperature of a material where none is typed, as in a cavity file.
const ROOM_TEMPERATURE: f64 = 293.15;

#[derive(Args)]
#[command(after_help = "\
Examples:
  modewright materials
  modewright materials BBO
  modewright materials BBO --axis o --wavelength \"532 nm\" --temperature \"40 °C\"")]
pub(super) struct Typed {
    /// A material, such as "fused silica" or BBO; all are listed without it
    name: Option<String>,
    /// Wavelength in vacuum, as in "1064 nm": answers the figures there
    #[arg(long, requires = "name", allow_hyphen_values = true)]
    wavelength: Option<String>,
    /// Temperature, as in "40 °C"; 20 °C without it
    #[arg(long, requires = "wavelength", allow_hyphen_values = true)]
    temperature: Option<String>,
    /// Crystal axis along which the light is polarised; all without it
    #[arg(long, requires = "wavelength")]
    axis: Option<String>,
    /// Print one JSON document, SI units, and nothing else
    #[arg(long)]
    json: bool,
}

pub(super) fn run(typed: &Typed) -> Answer {
    answer(typed).unwrap_or_else(|refusal| refusal)
}

fn answer(typed: &Typed) -> Result<Answer, Answer> {
    let Some(name) = &typed.name else {
        let all = catalogue();
        return Ok(finish("materials", typed.json, &all, || {
            describe::catalogue(&all)
        }));
    };
    let wavelength = input::quantity(
        "--wavelength",
        typed.wavelength.as_deref(),
        Kind::Length,
        "nm",
    );
    let temperature = input::quantity(
        "--temperature",
        typed.temperature.as_deref(),
        Kind::Temperature,
        "degC",
    );
    let Some(wavelength) = wavelength? else {
        let found = material::find(name).map_err(|error| refuse(name, typed, error.into()))?;
        let found = entry(found);
        return Ok(finish("materials", typed.json, &found, || {
            describe::entry(&found)
        }));
    };
    let temperature = temperature?.unwrap_or(ROOM_TEMPERATURE);
    let report = look_up(name, typed.axis.as_deref(), wavelength, temperature)
        .map_err(|error| refuse(name, typed, error))?;
    Ok(finish("materials", typed.json, &report, || {
        describe::report(&report)
    }))
}

fn refuse(name: &str, typed: &Typed, error: LookUpError) -> Answer {
    match &error {
        LookUpError::Unknown(unknown) => input::refuse_argument(
            "NAME",
            name,
            0..name.len(),
            format!("no material is known as \"{}\"", name.escape_debug()),
            Some(match unknown.nearest.first() {
                Some(near) => format!("did you mean \"{near}\"?"),
                None => "`modewright materials` lists those known".into(),
            }),
        ),
        LookUpError::Axis(_) => {
            let axis = typed.axis.as_deref().unwrap_or_default();
            input::refuse_argument("--axis", axis, 0..axis.len(), error.to_string(), None)
        }
        LookUpError::Outside { .. } => {
            let message = error.to_string();
            let (argument, text) = match (&typed.temperature, error.is_about_wavelength()) {
                (Some(temperature), false) => ("--temperature", temperature.as_str()),
                _ => (
                    "--wavelength",
                    typed.wavelength.as_deref().unwrap_or_default(),
                ),
            };
            input::refuse_argument(argument, text, 0..text.len(), message, None)
        }
    }
}
