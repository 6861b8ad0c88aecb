//! Writing a picture to disk: whole or not at all.

use std::path::{Path, PathBuf};

use super::{Answer, FAULT, WRONG_INPUT, output};
use crate::report::render::plot::{self, Picture};

/// Where a picture goes and what it is, by the ending of its name.
#[derive(Clone, Debug)]
pub(super) struct Target {
    path: PathBuf,
    format: Format,
}

#[derive(Clone, Copy, Debug)]
enum Format {
    Svg,
    #[cfg(feature = "png")]
    Png,
}

impl Target {
    /// Judges the typed path before anything is computed.
    pub(super) fn of(path: &Path) -> Result<Target, Answer> {
        let ending = path
            .extension()
            .map(|ending| ending.to_string_lossy().to_ascii_lowercase());
        let format = match ending.as_deref() {
            Some("svg") => Format::Svg,
            #[cfg(feature = "png")]
            Some("png") => Format::Png,
            #[cfg(not(feature = "png"))]
            Some("png") => {
                return Err(refuse(
                    path,
                    "this build writes no .png pictures; name an .svg file",
                ));
            }
            _ => {
                return Err(refuse(
                    path,
                    "a picture's name ends in .svg or .png, and so says what it is",
                ));
            }
        };
        Ok(Target {
            path: path.into(),
            format,
        })
    }

    /// Paints the picture and writes it.
    pub(super) fn write(&self, picture: &dyn Picture) -> Result<(), Answer> {
        let painted = match self.format {
            Format::Svg => plot::svg(picture).map(String::into_bytes),
            #[cfg(feature = "png")]
            Format::Png => plot::png(picture),
        };
        let bytes = painted.map_err(|error| Answer {
            out: String::new(),
            err: format!("error: the picture cannot be painted: {error}\n"),
            status: FAULT,
        })?;
        output::write_whole(&self.path, &bytes)
            .map_err(|error| refuse(&self.path, &error.to_string()))
    }
}

fn refuse(path: &Path, why: &str) -> Answer {
    Answer {
        out: String::new(),
        err: format!(
            "error: cannot write the picture {}: {why}\n",
            path.display().to_string().escape_debug()
        ),
        status: WRONG_INPUT,
    }
}
