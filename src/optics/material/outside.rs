//! What the publications do not cover.

use std::fmt;

use super::interval::Interval;
use super::source::Source;

/// Whether an index at some temperature rests on a publication.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum TemperatureSupport {
    /// A published dependence covers it.
    Published,
    /// None does, but the data were taken within 5 K of it.
    Near,
    /// None does; the index would be a guess.
    Unpublished,
}

/// A wavelength or temperature outside what a publication claims; its message has no full stop.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum OutOfRange {
    /// The dispersion formula does not reach there.
    Wavelength {
        /// What was asked for, in metres.
        asked: f64,
        /// What is claimed, in metres.
        range: Interval,
        /// By whom.
        source: Source,
    },
    /// No dn/dT is published that would reach this temperature.
    NoRate {
        /// What was asked for, in kelvin.
        asked: f64,
        /// Temperature of the index data, in kelvin.
        data: f64,
        /// Source of the index data.
        source: Source,
    },
    /// A dn/dT is published, but not for this temperature or wavelength.
    Rate {
        /// What was asked for, in kelvin.
        asked: f64,
        /// Wavelengths of the dn/dT, in metres.
        wavelength: Interval,
        /// Temperatures of the dn/dT, in kelvin.
        temperature: Interval,
        /// Source of the dn/dT.
        source: Source,
    },
}

impl fmt::Display for OutOfRange {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            OutOfRange::Wavelength {
                asked,
                range,
                source,
            } => write!(
                f,
                "a wavelength of {} lies outside {} to {}, the range of {source}",
                length(*asked),
                length(range.low),
                length(range.high)
            ),
            OutOfRange::NoRate {
                asked,
                data,
                source,
            } => write!(
                f,
                "the index is known at {} ({source}), and no dn/dT to reach {}",
                celsius(*data),
                celsius(*asked)
            ),
            OutOfRange::Rate {
                asked,
                wavelength,
                temperature,
                source,
            } => write!(
                f,
                "dn/dT is known from {} to {} and from {} to {} ({source}), which leaves out {}",
                celsius(temperature.low),
                celsius(temperature.high),
                length(wavelength.low),
                length(wavelength.high),
                celsius(*asked)
            ),
        }
    }
}

impl std::error::Error for OutOfRange {}

/// A wavelength as one says it.
fn length(metres: f64) -> String {
    // A tenth of a picometre hides the rounding of the change of units.
    if metres < 999.95e-9 {
        format!("{} nm", (metres * 1e13).round() / 1e4)
    } else {
        format!("{} µm", (metres * 1e13).round() / 1e7)
    }
}

/// A temperature as one says it.
fn celsius(kelvin: f64) -> String {
    let degrees = ((kelvin - 273.15) * 100.0).round() / 100.0;
    if degrees < 0.0 {
        format!("−{} °C", -degrees)
    } else {
        format!("{} °C", degrees.abs())
    }
}
