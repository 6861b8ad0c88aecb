//! The refractive index of dry air.
//!
//! Ciddor, Appl. Opt. 35, 1566 (1996): dry air with 450 ppm of CO₂. His moist-air and other-CO₂
//! terms are left out: they move n by less than 1 · 10⁻⁶ in a laboratory.

use crate::numeric::Real;

/// Temperature of the standard air of the formula, 15 °C, in kelvin.
pub const STANDARD_TEMPERATURE: f64 = 288.15;
/// Pressure of the standard air of the formula, in pascal.
pub const STANDARD_PRESSURE: f64 = 101_325.0;

/// Absolute index of dry air with 450 ppm of CO₂ at a wavelength in metres (230 nm to 1.69 µm),
/// a temperature in kelvin (−40 °C to 100 °C) and a pressure in pascal (80 kPa to 120 kPa).
///
/// Ciddor claims 5 · 10⁻⁸ between 350 nm and 1.3 µm. Beyond 1.69 µm the formula goes on smoothly,
/// past the absorption lines of water and CO₂, and is still good to some 10⁻⁶.
pub fn index<T: Real>(wavelength_m: T, temperature_k: T, pressure_pa: T) -> T {
    // His equation (1), σ² in µm⁻².
    let sigma_squared = (wavelength_m * 1e6).squared().recip();
    let standard = (-sigma_squared + 238.0185).recip() * 0.057_921_05
        + (-sigma_squared + 57.362).recip() * 0.001_679_17;
    // n − 1 goes with the density p/(ZRT).
    let reference = compressibility(
        T::constant(STANDARD_TEMPERATURE),
        T::constant(STANDARD_PRESSURE),
    );
    let density = (pressure_pa / STANDARD_PRESSURE)
        * temperature_k.recip()
        * STANDARD_TEMPERATURE
        * reference
        / compressibility(temperature_k, pressure_pa);
    standard * density + 1.0
}

/// Z of dry air: Ciddor's appendix, after Davis, Metrologia 29, 67 (1992).
fn compressibility<T: Real>(temperature_k: T, pressure_pa: T) -> T {
    let t = temperature_k - 273.15;
    let ratio = pressure_pa / temperature_k;
    let linear = (t * 1.1043e-10 - 2.9331e-8) * t + 1.581_23e-6;
    ratio.squared() * 1.83e-11 - ratio * linear + 1.0
}

#[cfg(test)]
mod tests {
    use super::*;
    use approx::assert_abs_diff_eq;

    /// Ciddor 1996, Table 1, dry air at 633 nm (from memory): his own digits of 10⁸ (n − 1).
    #[test]
    fn reproduces_the_papers_table() {
        for (celsius, pascal, expected) in [
            (20.0, 80e3, 21458.0),
            (20.0, 100e3, 26824.4),
            (20.0, 120e3, 32191.6),
            (10.0, 100e3, 27774.7),
            (30.0, 100e3, 25937.2),
        ] {
            let n = index(633e-9, celsius + 273.15, pascal);
            assert_abs_diff_eq!((n - 1.0) * 1e8, expected, epsilon = 0.06);
        }
    }
}
