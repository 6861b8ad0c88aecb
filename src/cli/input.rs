//! Reading what was typed: a cavity file from disk, a quantity behind an option.

use std::fs::File;
use std::io::{ErrorKind, Read};
use std::ops::Range;
use std::path::Path;

use super::{Answer, CavityFile, WRONG_INPUT};
use crate::cavity::{Cavity, Measure};
use crate::diagnostic::{Diagnostic, Place, Severity, Source};
use crate::file::{self, Changes, LARGEST_FILE, Loaded};
use crate::quantity::{self, Kind, Spread};
use crate::report::render;

/// The cavity that was typed, or what is wrong with it.
pub(super) fn load(typed: &CavityFile) -> Result<Loaded, Answer> {
    CavityText::read(typed)?.load(&settings(typed))
}

/// What was typed behind `--set`.
pub(super) fn settings(typed: &CavityFile) -> Changes {
    let none = Changes::new();
    typed.set.iter().fold(none, |changes, set| changes.set(set))
}

/// A cavity file's text, to be read more than once.
pub(super) struct CavityText {
    name: String,
    text: String,
}

impl CavityText {
    /// The text on disk.
    pub(super) fn read(typed: &CavityFile) -> Result<CavityText, Answer> {
        let name = typed.file.display().to_string();
        let text = read(&typed.file, &name)?;
        Ok(CavityText { name, text })
    }

    /// The cavity with some changes.
    pub(super) fn load(&self, changes: &Changes) -> Result<Loaded, Answer> {
        file::load_changed(&self.name, &self.text, changes)
            .map_err(|refused| refuse(&refused.diagnostics, &refused.sources))
    }
}

/// What is typed for `--measure`: names of measures, separated by commas.
pub(super) fn measures(cavity: &Cavity, text: &str) -> Result<Vec<(String, Measure)>, Answer> {
    let mut measures: Vec<(String, Measure)> = Vec::new();
    let mut start = 0;
    for piece in text.split(',') {
        let name = piece.trim();
        let from = start + (piece.len() - piece.trim_start().len());
        let span = from..from + name.len();
        start += piece.len() + 1;
        let refuse =
            |message, help| refuse_argument("--measure", text, span.clone(), message, help);
        if name.is_empty() {
            return Err(refuse(
                "a measure is missing here".into(),
                Some("write them like --measure margin,X1.spot".into()),
            ));
        }
        let measure = Measure::parse(name, cavity)
            .map_err(|error| refuse(error.message, Some(error.help)))?;
        if measures.iter().all(|(_, known)| *known != measure) {
            measures.push((name.to_string(), measure));
        }
    }
    Ok(measures)
}

fn refuse(diagnostics: &[Diagnostic], sources: &[Source]) -> Answer {
    Answer {
        out: String::new(),
        err: render::diagnostics::render(diagnostics, sources),
        status: WRONG_INPUT,
    }
}

/// What is typed for an argument, as a quantity in SI units; `unit` is the one to propose.
pub(super) fn quantity(
    argument: &str,
    text: Option<&str>,
    kind: Kind,
    unit: &str,
) -> Result<Option<f64>, Answer> {
    let Some(text) = text else {
        return Ok(None);
    };
    let refuse = |span: Range<usize>, message, help| {
        let span = if span.is_empty() { 0..text.len() } else { span };
        refuse_argument(argument, text, span, message, help)
    };
    let quantity = quantity::parse(text, kind).map_err(|error| {
        // The usual unit of a length is no wavelength's.
        let bare = text.trim().parse::<f64>().ok();
        let help = bare.map(|_| format!("write \"{} {unit}\"", text.trim()));
        refuse(error.span, error.message, help.or(error.help))
    })?;
    match quantity.value.number() {
        Some(_) if quantity.spread != Spread::Exact => Err(refuse(
            0..0,
            "one value is asked for here, and this one has a spread".into(),
            Some(format!("write it like \"{}\"", kind.example())),
        )),
        Some(number) => Ok(Some(number)),
        None => Err(refuse(
            0..0,
            format!("{} is wanted here", kind.phrase()),
            Some(format!("write it like \"{}\"", kind.example())),
        )),
    }
}

/// What is wrong with the text of an argument.
pub(super) fn refuse_argument(
    argument: &str,
    text: &str,
    span: Range<usize>,
    message: String,
    help: Option<String>,
) -> Answer {
    let diagnostic = Diagnostic {
        severity: Severity::Error,
        message,
        place: Some(Place { source: 0, span }),
        label: String::new(),
        help,
    };
    let source = Source {
        name: argument.into(),
        text: text.into(),
    };
    refuse(&[diagnostic], &[source])
}

fn read(path: &Path, name: &str) -> Result<String, Answer> {
    let fail = |message: String, help: Option<&str>| {
        let diagnostic = Diagnostic {
            severity: Severity::Error,
            message,
            place: None,
            label: String::new(),
            help: help.map(str::to_string),
        };
        let source = Source {
            name: name.into(),
            text: String::new(),
        };
        refuse(&[diagnostic], &[source])
    };
    let unreadable = |error: std::io::Error| match error.kind() {
        ErrorKind::NotFound => fail(
            "there is no such file".into(),
            Some("check its name, its ending and the folder you are in"),
        ),
        _ => fail(format!("cannot read the file: {error}"), None),
    };
    if path.is_dir() {
        return Err(fail(
            "this is a folder, not a cavity file".into(),
            Some("name one of the .toml files in it"),
        ));
    }
    let file = File::open(path).map_err(unreadable)?;
    let mut bytes = Vec::new();
    file.take(LARGEST_FILE as u64 + 1)
        .read_to_end(&mut bytes)
        .map_err(unreadable)?;
    if bytes.len() > LARGEST_FILE {
        return Err(fail(
            format!("the file is larger than {LARGEST_FILE} bytes, the most that is read"),
            Some("a cavity file lists the parts of one cavity; is this the right file?"),
        ));
    }
    String::from_utf8(bytes).map_err(|error| {
        let good = error.utf8_error().valid_up_to();
        let help = match error.as_bytes() {
            [0xff, 0xfe, ..] | [0xfe, 0xff, ..] => "this looks like UTF-16; save it as UTF-8",
            _ => {
                "save it as UTF-8; often this is a µ or ° from an old editor, and \"um\" or \
                 \"deg\" will do"
            }
        };
        let text = String::from_utf8_lossy(error.as_bytes()).into_owned();
        let diagnostic = Diagnostic {
            severity: Severity::Error,
            message: "the file is not UTF-8 text".into(),
            place: Some(Place {
                source: 0,
                span: good..good + 1,
            }),
            label: String::new(),
            help: Some(help.into()),
        };
        let source = Source {
            name: name.into(),
            text,
        };
        refuse(&[diagnostic], &[source])
    })
}
