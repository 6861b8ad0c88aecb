//! Reading a cavity file from disk.

use std::fs::File;
use std::io::Read;
use std::path::Path;

use super::{Answer, CavityFile, WRONG_INPUT};
use crate::diagnostic::{Diagnostic, Place, Severity, Source};
use crate::file::{self, LARGEST_FILE, Loaded};
use crate::report::render;

/// The cavity that was typed, or what is wrong with it.
pub(super) fn load(typed: &CavityFile) -> Result<Loaded, Answer> {
    let name = typed.file.display().to_string();
    let text = read(&typed.file, &name)?;
    file::load(&name, &text, &typed.set)
        .map_err(|refused| refuse(&refused.diagnostics, &refused.sources))
}

fn refuse(diagnostics: &[Diagnostic], sources: &[Source]) -> Answer {
    Answer {
        out: String::new(),
        err: render::diagnostics::render(diagnostics, sources),
        status: WRONG_INPUT,
    }
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
    let unreadable = |error: std::io::Error| fail(format!("cannot read the file: {error}"), None);
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
        let text = String::from_utf8_lossy(error.as_bytes()).into_owned();
        let diagnostic = Diagnostic {
            severity: Severity::Error,
            message: "the file is not UTF-8 text".into(),
            place: Some(Place {
                source: 0,
                span: good..good + 1,
            }),
            label: String::new(),
            help: Some(
                "save it as UTF-8; often this is a µ or ° from an old editor, and \"um\" or \
                 \"deg\" will do"
                    .into(),
            ),
        };
        let source = Source {
            name: name.into(),
            text,
        };
        refuse(&[diagnostic], &[source])
    })
}
