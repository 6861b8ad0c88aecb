//! The index along one principal direction of a material.

use super::air;
use super::derivative::{first, second};
use super::formula::Formula;
use super::interval::Interval;
use super::outside::{OutOfRange, TemperatureSupport};
use super::source::Source;
use super::thermal::{Rate, Thermal};
use crate::numeric::{Dual, Real};

/// Speed of light in vacuum, m/s.
const LIGHT: f64 = 299_792_458.0;

/// How far from the temperature of the data an index may serve where no dn/dT is published, in K.
/// Common practice: at 10⁻⁵ to 10⁻⁴ per kelvin the error stays below some 10⁻⁴.
const NEAR: f64 = 5.0;

/// What a published index is relative to.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Medium {
    /// The vacuum: the index is absolute.
    Vacuum,
    /// The air of the laboratory, taken as dry air at 101 325 Pa and the temperature of the data.
    Air,
}

impl Medium {
    /// The absolute index from the published one; wavelength in µm, temperature in kelvin.
    pub(super) fn absolute<T: Real>(self, index: T, wavelength_um: T, temperature_k: f64) -> T {
        match self {
            Medium::Vacuum => index,
            Medium::Air => {
                let pressure = T::constant(air::STANDARD_PRESSURE);
                index * air::index(wavelength_um * 1e-6, T::constant(temperature_k), pressure)
            }
        }
    }
}

/// The index of a material for light polarised along one of its principal directions.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Axis {
    /// `o`, `e`, `x`, `y` or `z`; empty for an isotropic material.
    pub name: &'static str,
    /// The dispersion formula.
    pub formula: Formula,
    /// Wavelengths the paper claims it for, in metres.
    pub wavelength: Interval,
    /// Temperature the data were taken at, in kelvin.
    pub temperature: f64,
    /// What the published index is relative to.
    pub medium: Medium,
    /// Where it was published.
    pub source: Source,
    /// The published dependence on temperature, if any.
    pub thermal: Option<Thermal>,
}

impl Axis {
    /// The index as the paper prints it, at the temperature of its data and in its own medium;
    /// wavelength in metres, unchecked.
    pub fn published<T: Real>(&self, wavelength_m: T) -> T {
        self.formula
            .index(wavelength_m * 1e6, T::constant(self.temperature))
    }

    /// The absolute phase index at a vacuum wavelength in metres and a temperature in kelvin.
    ///
    /// Nothing is checked ([`Axis::check`] does that): outside the ranges it extrapolates, and
    /// where no dependence on temperature is published it gives the index of the data's.
    pub fn index<T: Real>(&self, wavelength_m: T, temperature_k: T) -> T {
        let wavelength = wavelength_m * 1e6;
        let Some(thermal) = &self.thermal else {
            let index = self.published(wavelength_m);
            return self.medium.absolute(index, wavelength, self.temperature);
        };
        let at = match thermal.rate {
            Rate::Formula => temperature_k,
            _ => T::constant(self.temperature),
        };
        let index = self.formula.index(wavelength, at);
        let temperatures = (self.temperature, temperature_k);
        let change = thermal
            .rate
            .change(index, wavelength, temperatures, self.medium);
        self.medium.absolute(index, wavelength, self.temperature) + change
    }

    /// The group index n − λ dn/dλ, absolute, by the exact derivative of [`Axis::index`].
    pub fn group_index<T: Real>(&self, wavelength_m: T, temperature_k: T) -> T {
        let (n, slope) = first(wavelength_m, |l| self.index(l, lift(temperature_k)));
        n - wavelength_m * slope
    }

    /// dn/dλ of the absolute index, in 1/m.
    pub fn slope<T: Real>(&self, wavelength_m: T, temperature_k: T) -> T {
        first(wavelength_m, |l| self.index(l, lift(temperature_k))).1
    }

    /// Group-velocity dispersion λ³/(2πc²) · d²n/dλ², in s²/m (1 fs²/mm is 10⁻²⁷ s²/m).
    pub fn group_velocity_dispersion<T: Real>(&self, wavelength_m: T, temperature_k: T) -> T {
        let curvature = second(wavelength_m, |l| self.index(l, lift(lift(temperature_k))));
        let scale = 1.0 / (2.0 * std::f64::consts::PI * LIGHT * LIGHT);
        wavelength_m * wavelength_m.squared() * curvature * scale
    }

    /// dn/dT of the absolute index in 1/K, by the exact derivative; none where none is published.
    pub fn dn_dt<T: Real>(&self, wavelength_m: T, temperature_k: T) -> Option<T> {
        self.thermal?;
        Some(first(temperature_k, |t| self.index(lift(wavelength_m), t)).1)
    }

    /// Brewster's angle in radians, for light arriving from a medium of index `outside`.
    pub fn brewster<T: Real>(&self, wavelength_m: T, temperature_k: T, outside: T) -> T {
        self.index(wavelength_m, temperature_k).atan2(outside)
    }

    /// Refuses what the publications do not cover.
    ///
    /// # Errors
    /// A wavelength outside the formula's range, or a temperature without [`TemperatureSupport`].
    pub fn check(&self, wavelength_m: f64, temperature_k: f64) -> Result<(), OutOfRange> {
        self.check_wavelength(wavelength_m)?;
        match self.temperature_support(wavelength_m, temperature_k) {
            TemperatureSupport::Published | TemperatureSupport::Near => Ok(()),
            TemperatureSupport::Unpublished => Err(match self.thermal {
                None => OutOfRange::NoRate {
                    asked: temperature_k,
                    data: self.temperature,
                    source: self.source,
                },
                Some(thermal) => OutOfRange::Rate {
                    asked: temperature_k,
                    wavelength: thermal.wavelength,
                    temperature: thermal.temperature,
                    source: thermal.source,
                },
            }),
        }
    }

    /// Refuses a wavelength (m) that the formula is not claimed for.
    ///
    /// # Errors
    /// The range and its source.
    pub fn check_wavelength(&self, wavelength_m: f64) -> Result<(), OutOfRange> {
        if self.wavelength.contains(wavelength_m) {
            return Ok(());
        }
        Err(OutOfRange::Wavelength {
            asked: wavelength_m,
            range: self.wavelength,
            source: self.source,
        })
    }

    /// Whether anything published says what the index is at this temperature (K); the wavelength
    /// (m) matters where a dn/dT is known for a part of the formula's range only.
    pub fn temperature_support(&self, wavelength_m: f64, temperature_k: f64) -> TemperatureSupport {
        let covered = self.thermal.is_some_and(|thermal| {
            thermal.wavelength.contains(wavelength_m) && thermal.temperature.contains(temperature_k)
        });
        if covered {
            TemperatureSupport::Published
        } else if (temperature_k - self.temperature).abs() <= NEAR {
            TemperatureSupport::Near
        } else {
            TemperatureSupport::Unpublished
        }
    }
}

/// A number that does not depend on the variable of a derivative.
fn lift<T: Real>(value: T) -> Dual<T> {
    Dual::fixed(value)
}
