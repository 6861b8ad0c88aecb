//! The forms in which papers publish dispersion, evaluated over any number type.
//!
//! λ is in micrometres and the temperature in kelvin, as the coefficients have it.

use super::air;
use super::power::{polynomial, power};
use crate::numeric::Real;

/// A dispersion formula with its coefficients.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Formula {
    /// n² as a sum of terms, at one temperature.
    Sum(&'static [Term]),
    /// n² as a sum of terms whose coefficients are polynomials in T − `origin` (K).
    Warm {
        /// The temperature from which the polynomials count.
        origin: f64,
        /// The terms.
        terms: &'static [WarmTerm],
    },
    /// The temperature-dependent form in use for lithium niobate.
    Niobate(Niobate),
    /// [`air::index`] at standard pressure.
    Air,
}

/// One term of n².
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Term {
    /// A constant.
    Constant(f64),
    /// (B, L in µm): B λ²/(λ² − L²).
    Resonance(f64, f64),
    /// (B, C in µm²): B λ²/(λ² − C).
    ResonanceSquared(f64, f64),
    /// (A in µm², C in µm²): A/(λ² − C).
    Pole(f64, f64),
    /// (K, e): K λᵉ.
    Power(f64, i32),
}

/// One term of n² whose coefficients are polynomials in a temperature, the constant first.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum WarmTerm {
    /// A constant in λ.
    Constant(&'static [f64]),
    /// (B, L in µm): B λ²/(λ² − L²).
    Resonance(&'static [f64], &'static [f64]),
    /// (B, C in µm²): B λ²/(λ² − C).
    ResonanceSquared(&'static [f64], &'static [f64]),
    /// (G in µm⁻², L in µm): G/(L⁻² − λ⁻²).
    Reciprocal(&'static [f64], &'static [f64]),
}

/// n² = a₁ + b₁f + (a₂ + b₂f)/(λ² − (a₃ + b₃f)²) + (a₄ + b₄f)/(λ² − a₅²) − a₆λ² with
/// f = (t − 24.5)(t + `warm`), t in °C: Jundt's form, which holds that of Edwards & Lawrence.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Niobate {
    /// a₁ … a₆, for λ in µm.
    pub a: [f64; 6],
    /// b₁ … b₄, for t in °C.
    pub b: [f64; 4],
    /// The constant added to t in the second factor of f, in °C.
    pub warm: f64,
}

impl Formula {
    /// The index at a wavelength in micrometres and a temperature in kelvin, in the medium and
    /// within the ranges of its paper; nothing is checked.
    pub fn index<T: Real>(&self, wavelength_um: T, temperature_k: T) -> T {
        match self {
            Formula::Sum(terms) => terms
                .iter()
                .map(|term| term.value(wavelength_um))
                .fold(T::constant(0.0), |sum, term| sum + term)
                .sqrt(),
            Formula::Warm { origin, terms } => terms
                .iter()
                .map(|term| term.value(wavelength_um, temperature_k - *origin))
                .fold(T::constant(0.0), |sum, term| sum + term)
                .sqrt(),
            Formula::Niobate(niobate) => niobate.square(wavelength_um, temperature_k).sqrt(),
            Formula::Air => air::index(
                wavelength_um * 1e-6,
                temperature_k,
                T::constant(air::STANDARD_PRESSURE),
            ),
        }
    }
}

impl Term {
    fn value<T: Real>(self, wavelength: T) -> T {
        let square = wavelength.squared();
        match self {
            Term::Constant(c) => T::constant(c),
            Term::Resonance(b, l) => square / (square - l * l) * b,
            Term::ResonanceSquared(b, c) => square / (square - c) * b,
            Term::Pole(a, c) => (square - c).recip() * a,
            Term::Power(k, e) => power(wavelength, e) * k,
        }
    }
}

impl WarmTerm {
    fn value<T: Real>(self, wavelength: T, warmth: T) -> T {
        let square = wavelength.squared();
        match self {
            WarmTerm::Constant(c) => polynomial(c, warmth),
            WarmTerm::Resonance(b, l) => {
                let pole = polynomial(l, warmth).squared();
                polynomial(b, warmth) * square / (square - pole)
            }
            WarmTerm::ResonanceSquared(b, c) => {
                polynomial(b, warmth) * square / (square - polynomial(c, warmth))
            }
            WarmTerm::Reciprocal(g, l) => {
                let pole = polynomial(l, warmth).squared();
                polynomial(g, warmth) / (pole.recip() - square.recip())
            }
        }
    }
}

impl Niobate {
    fn square<T: Real>(&self, wavelength: T, temperature_k: T) -> T {
        let [a1, a2, a3, a4, a5, a6] = self.a;
        let [b1, b2, b3, b4] = self.b;
        let t = temperature_k - 273.15;
        let f = (t - 24.5) * (t + self.warm);
        let square = wavelength.squared();
        f * b1
            + a1
            + (f * b2 + a2) / (square - (f * b3 + a3).squared())
            + (f * b4 + a4) / (square - a5 * a5)
            - square * a6
    }
}
