//! How an index moves with temperature.

use super::formula::Formula;
use super::interval::Interval;
use super::power::power;
use super::source::Source;
use super::{air, axis::Medium};
use crate::numeric::Real;

/// A published temperature dependence with the ranges it may be used in.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Thermal {
    /// The dependence itself.
    pub rate: Rate,
    /// Wavelengths it holds for, in metres.
    pub wavelength: Interval,
    /// Temperatures it holds for, in kelvin.
    pub temperature: Interval,
    /// Where it was published.
    pub source: Source,
}

/// The forms in which papers publish a temperature dependence; λ in µm, t − t₀ in K.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Rate {
    /// The dispersion formula itself depends on temperature.
    Formula,
    /// The change of another formula for the same material, from the temperature of the data on.
    Change(Formula),
    /// The same formula fitted anew at a second temperature (K); straight between the two.
    Second(Formula, f64),
    /// dn/dT is one number (1/K), absolute or relative to air as its medium says.
    Constant(f64, Medium),
    /// Glass data sheets, absolute: Δn = (n² − 1)/(2n) · [d₀Δ + d₁Δ² + d₂Δ³ +
    /// (e₀Δ + e₁Δ²)/(λ² − λ₀²)] with Δ = t − 20 °C; coefficients (d, e, λ₀ in µm).
    Glass([f64; 3], [f64; 2], f64),
    /// Δn = Σ K λᵉ · (Δ + qΔ²) with Δ = t − 20 °C: the pairs (K in 1/K, e), and q in 1/K.
    Powers(&'static [(f64, i32)], f64),
}

/// 20 °C, from which glass sheets and the crystals' thermo-optic formulas count, in kelvin.
const TWENTY: f64 = 293.15;

impl Rate {
    /// The change of the absolute index between the temperature of the data and `temperature`,
    /// both in kelvin, where the published index at the former is `index`.
    pub(super) fn change<T: Real>(
        &self,
        index: T,
        wavelength: T,
        (from, temperature): (f64, T),
        medium: Medium,
    ) -> T {
        let origin = T::constant(from);
        match self {
            Rate::Formula => T::constant(0.0),
            Rate::Change(formula) => {
                formula.index(wavelength, temperature) - formula.index(wavelength, origin)
            }
            Rate::Second(formula, at) => {
                let at_second = medium.absolute(formula.index(wavelength, origin), wavelength, *at);
                let at_first = medium.absolute(index, wavelength, from);
                (at_second - at_first) * (temperature - from) / (at - from)
            }
            Rate::Constant(rate, Medium::Vacuum) => (temperature - from) * *rate,
            Rate::Constant(rate, Medium::Air) => {
                // Both the crystal and the air it is measured in get warmer.
                let warm = index + (temperature - from) * *rate;
                warm * air_at(wavelength, temperature) - index * air_at(wavelength, origin)
            }
            Rate::Glass([d0, d1, d2], [e0, e1], pole) => {
                let sheet = |t: T| {
                    let warm = t - TWENTY;
                    let resonant = warm * (warm * *e1 + *e0) / (wavelength.squared() - pole * pole);
                    warm * (warm * (warm * *d2 + *d1) + *d0) + resonant
                };
                (index - index.recip()) * 0.5 * (sheet(temperature) - sheet(origin))
            }
            Rate::Powers(terms, quadratic) => {
                let rate = terms
                    .iter()
                    .map(|&(k, e)| power(wavelength, e) * k)
                    .fold(T::constant(0.0), |sum, term| sum + term);
                let warmth = |t: T| {
                    let warm = t - TWENTY;
                    warm * (warm * *quadratic + 1.0)
                };
                rate * (warmth(temperature) - warmth(origin))
            }
        }
    }
}

/// Index of dry air at standard pressure, λ in µm.
fn air_at<T: Real>(wavelength: T, temperature: T) -> T {
    air::index(
        wavelength * 1e-6,
        temperature,
        T::constant(air::STANDARD_PRESSURE),
    )
}
