//! Optical materials: published dispersion formulas, with their sources and the ranges they hold in.
//!
//! Wavelengths are vacuum wavelengths in metres, temperatures are in kelvin. Rays and fields need
//! the *absolute* index, which [`Axis::index`] gives; many papers print it relative to the air of
//! their laboratory, which [`Axis::published`] gives. Group index and dispersion are exact
//! derivatives of the same formulas.
//!
//! ```
//! use modewright::optics::material;
//! let silica = material::find("fused silica").unwrap().axis(None).unwrap();
//! silica.check(1064e-9, 293.15).unwrap();
//! assert!((silica.index(1064e-9, 293.15) - 1.45002).abs() < 1e-5);
//! ```

pub mod air;
mod axis;
mod catalogue;
mod derivative;
mod find;
mod formula;
mod interval;
#[cfg(test)]
mod laws;
mod outside;
mod power;
mod source;
mod thermal;

pub use axis::{Axis, Medium};
pub use catalogue::all;
pub use find::{AxisError, NotFound, find};
pub use formula::{Formula, Niobate, Term, WarmTerm};
pub use interval::Interval;
pub use outside::{OutOfRange, TemperatureSupport};
pub use source::Source;
pub use thermal::{Rate, Thermal};

/// A material of the catalogue.
#[derive(Debug)]
pub struct Material {
    /// Its name, as a builder writes it.
    pub name: &'static str,
    /// Other names it is found by.
    pub aliases: &'static [&'static str],
    /// Chemical formula, or what kind of glass it is.
    pub chemistry: &'static str,
    /// What a user of the data should know; may be empty.
    pub note: &'static str,
    /// The index along each principal direction of the electric field: one without a name for an
    /// isotropic material, `o` and `e` for a uniaxial one, `x`, `y`, `z` for a biaxial one.
    pub axes: &'static [Axis],
}
