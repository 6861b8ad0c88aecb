//! What is known of a material: the catalogue, and its figures at a wavelength and a temperature.

use std::fmt;

use serde::Serialize;

use crate::optics::material::{
    self, Axis, AxisError, Interval, Material, Medium, NotFound, OutOfRange, Source,
    TemperatureSupport,
};

/// The known materials.
#[derive(Clone, Debug, Serialize)]
pub struct Catalogue {
    /// One entry each, by family.
    pub materials: Vec<MaterialEntry>,
}

/// What is known of one material.
#[derive(Clone, Debug, Serialize)]
pub struct MaterialEntry {
    /// Its name, as a cavity file writes it.
    pub name: &'static str,
    /// Other names it is found by.
    pub aliases: &'static [&'static str],
    /// Chemical formula, or what kind of glass it is.
    pub chemistry: &'static str,
    /// What a user of the data should know; may be empty.
    pub note: &'static str,
    /// Its principal directions.
    pub axes: Vec<AxisEntry>,
}

/// What is known of one principal direction of a material.
#[derive(Clone, Debug, PartialEq, Serialize)]
pub struct AxisEntry {
    /// `o`, `e`, `x`, `y` or `z`; none for an isotropic material.
    pub axis: Option<&'static str>,
    /// Vacuum wavelengths that the formula is claimed for.
    pub wavelength_range_m: [f64; 2],
    /// Temperature the data were taken at.
    pub data_temperature_k: f64,
    /// `vacuum` or `air`: what the published index is relative to.
    pub relative_to: &'static str,
    /// Where the formula was published.
    pub source: Citation,
    /// The published dependence on temperature; none where none is known.
    pub thermal: Option<ThermalEntry>,
}

/// A published dependence on temperature.
#[derive(Clone, Debug, PartialEq, Serialize)]
pub struct ThermalEntry {
    /// Temperatures it is claimed for.
    pub temperature_range_k: [f64; 2],
    /// Vacuum wavelengths it is claimed for.
    pub wavelength_range_m: [f64; 2],
    /// Where it was published.
    pub source: Citation,
}

/// A publication.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Serialize)]
pub struct Citation {
    /// Authors, as one cites them.
    pub authors: &'static str,
    /// Journal or book, volume and first page.
    pub journal: &'static str,
    /// Year of publication.
    pub year: u16,
    /// How the value was taken from it, where that is not plain; may be empty.
    pub note: &'static str,
}

/// The figures of a material at a wavelength and a temperature.
#[derive(Clone, Debug, Serialize)]
pub struct MaterialReport {
    /// Its name, as a cavity file writes it.
    pub name: &'static str,
    /// Chemical formula, or what kind of glass it is.
    pub chemistry: &'static str,
    /// What a user of the data should know; may be empty.
    pub note: &'static str,
    /// Wavelength in vacuum.
    pub wavelength_m: f64,
    /// Temperature of the material.
    pub temperature_k: f64,
    /// One entry for each direction asked for.
    pub axes: Vec<AxisReport>,
}

/// The figures along one principal direction; a figure that nobody published is none.
#[derive(Clone, Debug, Serialize)]
pub struct AxisReport {
    /// Phase index, absolute.
    pub index: Option<f64>,
    /// The index as the publication gives it, at the temperature of its data and relative to
    /// `relative_to`.
    pub published_index: Option<f64>,
    /// Group index, absolute.
    pub group_index: Option<f64>,
    /// Slope of the absolute index over the vacuum wavelength.
    pub dn_dlambda_per_m: Option<f64>,
    /// Group-velocity dispersion; 1e-27 s²/m is 1 fs²/mm.
    pub gvd_s2_per_m: Option<f64>,
    /// Slope of the absolute index over temperature.
    pub dn_dt_per_k: Option<f64>,
    /// Brewster's angle for light that arrives from vacuum.
    pub brewster_rad: Option<f64>,
    /// Why figures are missing, or doubtful.
    pub why: Option<String>,
    /// What is known of this direction.
    #[serde(flatten)]
    pub entry: AxisEntry,
}

/// Why a material has no figures.
#[derive(Clone, Debug, PartialEq)]
pub enum LookUpError {
    /// No material has that name.
    Unknown(NotFound),
    /// The material has no such axis.
    Axis(AxisError),
    /// No direction asked for is known at that wavelength and temperature.
    Outside {
        /// The material.
        material: &'static str,
        /// What its publications cover; of the first direction where they differ.
        reason: OutOfRange,
    },
}

impl LookUpError {
    /// Whether the wavelength is what the publications do not cover.
    pub fn is_about_wavelength(&self) -> bool {
        matches!(
            self,
            LookUpError::Outside {
                reason: OutOfRange::Wavelength { .. },
                ..
            }
        )
    }
}

impl From<NotFound> for LookUpError {
    fn from(error: NotFound) -> Self {
        LookUpError::Unknown(error)
    }
}

/// Everything that is known.
pub fn catalogue() -> Catalogue {
    Catalogue {
        materials: material::all().map(entry).collect(),
    }
}

/// What is known of one material.
pub fn entry(material: &'static Material) -> MaterialEntry {
    MaterialEntry {
        name: material.name,
        aliases: material.aliases,
        chemistry: material.chemistry,
        note: material.note,
        axes: material.axes.iter().map(axis_entry).collect(),
    }
}

/// The figures of a material along one direction, or along all where `axis` is none; wavelength
/// in vacuum in metres, temperature in kelvin.
///
/// # Errors
/// A name that is not known, or figures that nothing published covers.
pub fn look_up(
    name: &str,
    axis: Option<&str>,
    wavelength_m: f64,
    temperature_k: f64,
) -> Result<MaterialReport, LookUpError> {
    let material = material::find(name).map_err(LookUpError::Unknown)?;
    let one;
    let axes = match axis {
        None => material.axes,
        Some(_) => {
            one = [*material.axis(axis).map_err(LookUpError::Axis)?];
            &one[..]
        }
    };
    let refusals: Vec<OutOfRange> = axes
        .iter()
        .filter_map(|axis| axis.check(wavelength_m, temperature_k).err())
        .collect();
    if let (true, Some(first)) = (refusals.len() == axes.len(), refusals.first()) {
        return Err(LookUpError::Outside {
            material: material.name,
            reason: *first,
        });
    }
    Ok(MaterialReport {
        name: material.name,
        chemistry: material.chemistry,
        note: material.note,
        wavelength_m,
        temperature_k,
        axes: axes
            .iter()
            .map(|axis| axis_report(axis, wavelength_m, temperature_k))
            .collect(),
    })
}

fn axis_report(axis: &Axis, wavelength: f64, temperature: f64) -> AxisReport {
    let refusal = axis.check(wavelength, temperature).err();
    let known = |figure: f64| refusal.is_none().then_some(figure);
    let covered =
        axis.temperature_support(wavelength, temperature) == TemperatureSupport::Published;
    let dn_dt = axis
        .dn_dt(wavelength, temperature)
        .filter(|_| covered && refusal.is_none());
    let why = match (&refusal, &axis.thermal) {
        (Some(refusal), _) => Some(refusal.to_string()),
        (None, _) if covered => None,
        (None, None) => Some(
            "no dn/dT is known; the index is that of the data, taken within 5 K of this temperature"
                .into(),
        ),
        (None, Some(_)) => Some(
            "the dn/dT that is known does not cover this wavelength and temperature; the data \
             were taken within 5 K of this temperature"
                .into(),
        ),
    };
    AxisReport {
        index: known(axis.index(wavelength, temperature)),
        // It depends on the wavelength alone.
        published_index: axis
            .check_wavelength(wavelength)
            .is_ok()
            .then(|| axis.published(wavelength)),
        group_index: known(axis.group_index(wavelength, temperature)),
        dn_dlambda_per_m: known(axis.slope(wavelength, temperature)),
        gvd_s2_per_m: known(axis.group_velocity_dispersion(wavelength, temperature)),
        dn_dt_per_k: dn_dt,
        brewster_rad: known(axis.brewster(wavelength, temperature, 1.0)),
        why,
        entry: axis_entry(axis),
    }
}

fn axis_entry(axis: &Axis) -> AxisEntry {
    AxisEntry {
        axis: (!axis.name.is_empty()).then_some(axis.name),
        wavelength_range_m: ends(axis.wavelength),
        data_temperature_k: axis.temperature,
        relative_to: match axis.medium {
            Medium::Vacuum => "vacuum",
            Medium::Air => "air",
        },
        source: axis.source.into(),
        thermal: axis.thermal.map(|thermal| ThermalEntry {
            temperature_range_k: ends(thermal.temperature),
            wavelength_range_m: ends(thermal.wavelength),
            source: thermal.source.into(),
        }),
    }
}

fn ends(interval: Interval) -> [f64; 2] {
    [interval.low, interval.high]
}

impl From<Source> for Citation {
    fn from(source: Source) -> Self {
        Citation {
            authors: source.authors,
            journal: source.journal,
            year: source.year,
            note: source.note,
        }
    }
}

impl fmt::Display for Citation {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(f, "{}, {} ({})", self.authors, self.journal, self.year)
    }
}

impl fmt::Display for LookUpError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            LookUpError::Unknown(error) => error.fmt(f),
            LookUpError::Axis(error) => error.fmt(f),
            LookUpError::Outside { material, reason } => write!(f, "{material}: {reason}"),
        }
    }
}

impl std::error::Error for LookUpError {}

#[cfg(test)]
mod tests {
    use super::*;
    use approx::assert_relative_eq;

    const ROOM: f64 = 293.15;

    #[test]
    fn every_figure_is_that_of_the_material() {
        let report = look_up("bbo", None, 1064e-9, ROOM).unwrap();
        let axes: Vec<_> = report.axes.iter().map(|axis| axis.entry.axis).collect();
        assert_eq!(axes, [Some("o"), Some("e")]);
        let axis = material::find("BBO").unwrap().axis(Some("e")).unwrap();
        let e = &report.axes[1];
        assert_eq!(e.index, Some(axis.index(1064e-9, ROOM)));
        assert_eq!(e.published_index, Some(axis.published(1064e-9)));
        assert_eq!(e.why, None);
        assert_relative_eq!(
            e.group_index.unwrap(),
            e.index.unwrap() - 1064e-9 * e.dn_dlambda_per_m.unwrap(),
            max_relative = 1e-14
        );
    }

    #[test]
    fn what_is_not_published_is_none_and_says_why() {
        // No dn/dT is known for it; its data were taken at 19 °C.
        let report = look_up("MgF2", Some("o"), 1064e-9, ROOM).unwrap();
        let [axis] = &report.axes[..] else {
            panic!("one axis was asked for")
        };
        assert!(axis.index.is_some());
        assert_eq!(axis.dn_dt_per_k, None);
        assert!(axis.why.as_deref().unwrap().contains("no dn/dT is known"));
    }

    #[test]
    fn nothing_is_guessed() {
        let refused = |name, axis, wavelength, temperature| {
            look_up(name, axis, wavelength, temperature)
                .unwrap_err()
                .to_string()
        };
        assert!(refused("N-BK8", None, 1e-6, ROOM).contains("N-BK7"));
        assert!(refused("BBO", Some("z"), 1e-6, ROOM).contains("its axes are o, e"));
        assert!(refused("BBO", None, 20e-6, ROOM).contains("188 nm to 5.2 µm"));
        assert!(refused("MgF2", None, 1e-6, 400.0).contains("no dn/dT"));
    }
}
