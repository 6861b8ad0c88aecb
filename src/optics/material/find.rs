//! Finding a material and its axis by name.

use std::fmt;

use super::{Axis, Material, all};

/// No material of that name.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct NotFound {
    /// The name that was asked for.
    pub asked: String,
    /// Names of known materials that look like it, the likest first; may be empty.
    pub nearest: Vec<&'static str>,
}

/// No axis of that name, or no name where one is needed.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum AxisError {
    /// The material has several axes, and none was named.
    Missing {
        /// Name of the material.
        material: &'static str,
        /// Its axes.
        axes: Vec<&'static str>,
    },
    /// The material has no axis of that name.
    Unknown {
        /// Name of the material.
        material: &'static str,
        /// The axis that was asked for.
        asked: String,
        /// Its axes.
        axes: Vec<&'static str>,
    },
    /// The material is isotropic, and an axis was named.
    Isotropic {
        /// Name of the material.
        material: &'static str,
    },
}

/// Finds a material by name or alias. Case, spaces and punctuation do not matter.
///
/// # Errors
/// [`NotFound`], with the names that come nearest.
pub fn find(name: &str) -> Result<&'static Material, NotFound> {
    let wanted = plain(name);
    let mut near: Vec<(usize, &'static str)> = Vec::new();
    for material in all() {
        let names = std::iter::once(&material.name).chain(material.aliases);
        let Some(distance) = names
            .map(|known| strsim::levenshtein(&wanted, &plain(known)))
            .min()
        else {
            continue;
        };
        if distance == 0 {
            return Ok(material);
        }
        // A third of the letters may be wrong, at least one: "bk8" still finds N-BK7.
        if distance <= (wanted.chars().count() / 3).max(1) {
            near.push((distance, material.name));
        }
    }
    near.sort_by_key(|&(distance, _)| distance);
    Err(NotFound {
        asked: name.to_owned(),
        nearest: near.into_iter().take(3).map(|(_, name)| name).collect(),
    })
}

impl Material {
    /// The axis of that name; an isotropic material has its only one without a name.
    ///
    /// `ordinary` and `extraordinary` serve for `o` and `e`; case does not matter.
    ///
    /// # Errors
    /// [`AxisError`], which lists the axes.
    pub fn axis(&self, name: Option<&str>) -> Result<&'static Axis, AxisError> {
        let axes = || self.axes.iter().map(|axis| axis.name).collect();
        let material = self.name;
        match (name, self.axes) {
            (None, [only]) => Ok(only),
            (Some(_), [_]) => Err(AxisError::Isotropic { material }),
            (None, _) => Err(AxisError::Missing {
                material,
                axes: axes(),
            }),
            (Some(asked), _) => {
                let wanted = match asked.trim().to_lowercase().as_str() {
                    "ordinary" => "o".to_owned(),
                    "extraordinary" => "e".to_owned(),
                    other => other.to_owned(),
                };
                let found = self.axes.iter().find(|axis| axis.name == wanted);
                found.ok_or_else(|| AxisError::Unknown {
                    material,
                    asked: asked.to_owned(),
                    axes: axes(),
                })
            }
        }
    }
}

impl fmt::Display for NotFound {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(f, "no material is known as \"{}\"", self.asked)?;
        if self.nearest.is_empty() {
            return Ok(());
        }
        write!(f, "; near it are {}", self.nearest.join(", "))
    }
}

impl fmt::Display for AxisError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            AxisError::Missing { material, axes } => write!(
                f,
                "{material} is birefringent: name the axis the light is polarised along ({})",
                axes.join(", ")
            ),
            AxisError::Unknown {
                material,
                asked,
                axes,
            } => write!(
                f,
                "{material} has no axis \"{asked}\"; its axes are {}",
                axes.join(", ")
            ),
            AxisError::Isotropic { material } => {
                write!(f, "{material} is isotropic: it has no axis to name")
            }
        }
    }
}

impl std::error::Error for NotFound {}
impl std::error::Error for AxisError {}

/// Letters and digits alone, in lower case.
fn plain(name: &str) -> String {
    name.chars()
        .filter(|c| c.is_alphanumeric())
        .flat_map(char::to_lowercase)
        .collect()
}
