//! Random cavities as plain data: they can be written as files, unfolded, reversed and scaled.

use modewright::cavity::Cavity;
use modewright::file;
use proptest::prelude::*;

#[derive(Clone, Debug)]
pub enum Part {
    Mirror {
        /// Curvatures in the tangential and sagittal plane, in 1/m.
        curvature: [f64; 2],
        aoi_deg: f64,
        fold: &'static str,
    },
    Gap {
        length: f64,
        index: f64,
    },
    Lens {
        power: [f64; 2],
    },
    Slab {
        thickness: f64,
        index: f64,
        /// `None` is Brewster's angle.
        aoi_deg: Option<f64>,
        shift: &'static str,
        /// Curvatures, convex positive.
        faces: [f64; 2],
        thermal: Option<([f64; 2], &'static str)>,
    },
    Duct {
        length: f64,
        index: f64,
        strength: [f64; 2],
        antiguiding: bool,
    },
}

#[derive(Clone, Debug)]
pub struct Spec {
    pub ring: bool,
    pub wavelength: f64,
    pub parts: Vec<Part>,
}

fn radius(key: &str, curvature: f64) -> String {
    if curvature == 0.0 {
        format!("{key} = \"flat\"")
    } else {
        format!("{key} = \"{:?} m\"", 1.0 / curvature)
    }
}

fn face(key: &str, curvature: f64) -> String {
    if curvature == 0.0 {
        return format!("{key} = \"flat\"");
    }
    let sense = if curvature > 0.0 { "convex" } else { "concave" };
    format!("{key} = \"{:?} m {sense}\"", 1.0 / curvature.abs())
}

impl Part {
    fn line(&self, name: usize) -> String {
        let body = match self {
            Part::Mirror {
                curvature: [t, s],
                aoi_deg,
                fold,
            } => {
                let shape = if t == s {
                    radius("roc", *t)
                } else {
                    format!(
                        "{}, {}",
                        radius("roc_tangential", *t),
                        radius("roc_sagittal", *s)
                    )
                };
                format!(
                    "mirror = \"P{name}\", {shape}, aoi = \"{aoi_deg:?} deg\", fold = \"{fold}\""
                )
            }
            Part::Gap { length, index } => {
                format!("gap = \"P{name}\", length = \"{length:?} m\", medium = {index:?}")
            }
            Part::Lens { power: [t, s] } => format!(
                "lens = \"P{name}\", focal_tangential = \"{:?} m\", focal_sagittal = \"{:?} m\"",
                1.0 / t,
                1.0 / s
            ),
            Part::Slab {
                thickness,
                index,
                aoi_deg,
                shift,
                faces,
                thermal,
            } => {
                let aoi = match aoi_deg {
                    Some(angle) => format!("{angle:?} deg"),
                    None => "brewster".into(),
                };
                let thermal = thermal.map_or(String::new(), |([t, s], place)| {
                    format!(
                        ", thermal_tangential = \"{t:?} 1/m\", thermal_sagittal = \"{s:?} 1/m\", \
                         thermal_at = \"{place}\""
                    )
                });
                format!(
                    "slab = \"P{name}\", thickness = \"{thickness:?} m\", index = {index:?}, \
                     aoi = \"{aoi}\", shift = \"{shift}\", {}, {}{thermal}",
                    face("entrance", faces[0]),
                    face("exit", faces[1])
                )
            }
            Part::Duct {
                length,
                index,
                strength: [t, s],
                antiguiding,
            } => format!(
                "duct = \"P{name}\", length = \"{length:?} m\", index = {index:?}, \
                 strength_tangential = \"{t:?} 1/m\", strength_sagittal = \"{s:?} 1/m\", \
                 profile = \"{}\"",
                if *antiguiding {
                    "antiguiding"
                } else {
                    "guiding"
                }
            ),
        };
        format!("  {{ {body} }},\n")
    }

    /// The part as met from its other side.
    pub fn reversed(&self) -> Part {
        let mut part = self.clone();
        if let Part::Slab { faces, thermal, .. } = &mut part {
            faces.swap(0, 1);
            if let Some((_, place)) = thermal {
                *place = match *place {
                    "entrance" => "exit",
                    "exit" => "entrance",
                    other => other,
                };
            }
        }
        part
    }

    /// The part with every length multiplied.
    pub fn scaled(&self, by: f64) -> Part {
        let mut part = self.clone();
        match &mut part {
            Part::Mirror { curvature, .. } => *curvature = curvature.map(|c| c / by),
            Part::Gap { length, .. } => *length *= by,
            Part::Lens { power } => *power = power.map(|p| p / by),
            Part::Slab {
                thickness,
                faces,
                thermal,
                ..
            } => {
                *thickness *= by;
                *faces = faces.map(|c| c / by);
                if let Some((power, _)) = thermal {
                    *power = power.map(|p| p / by);
                }
            }
            Part::Duct {
                length, strength, ..
            } => {
                *length *= by;
                *strength = strength.map(|g| g / by);
            }
        }
        part
    }
}

impl Spec {
    pub fn text(&self) -> String {
        let form = if self.ring { "ring" } else { "standing" };
        let parts: String = self
            .parts
            .iter()
            .enumerate()
            .map(|(index, part)| part.line(index))
            .collect();
        format!(
            "wavelength = \"{:?} m\"\nform = \"{form}\"\npath = [\n{parts}]\n",
            self.wavelength
        )
    }

    pub fn cavity(&self) -> Cavity {
        let text = self.text();
        match file::load("random.toml", &text, &[]) {
            Ok(loaded) => loaded.cavity,
            Err(refused) => panic!("{:?}\n{text}", refused.diagnostics),
        }
    }

    pub fn scaled(&self, by: f64) -> Spec {
        Spec {
            parts: self.parts.iter().map(|part| part.scaled(by)).collect(),
            ..self.clone()
        }
    }

    /// A ring walked the other way round, from the same first mirror.
    pub fn reversed(&self) -> Spec {
        let mut parts = vec![self.parts[0].clone()];
        parts.extend(self.parts[1..].iter().rev().map(Part::reversed));
        Spec {
            parts,
            ..self.clone()
        }
    }

    /// The ring that a standing cavity is when its way back is laid out behind its way out.
    pub fn unfolded(&self) -> Spec {
        let inner = &self.parts[1..self.parts.len() - 1];
        let mut parts = self.parts.clone();
        parts.extend(inner.iter().rev().map(Part::reversed));
        Spec {
            ring: true,
            parts,
            ..self.clone()
        }
    }
}

fn curvature() -> impl Strategy<Value = f64> {
    prop_oneof![
        2 => Just(0.0),
        3 => 0.2..3.0_f64,
        1 => -1.0..-0.1_f64,
    ]
}

fn mirror(folds: bool) -> impl Strategy<Value = Part> {
    let aoi = if folds { 2.0..30.0 } else { 0.0..1e-300 };
    let shape = prop_oneof![
        4 => curvature().prop_map(|c| [c, c]),
        1 => [curvature(), curvature()],
    ];
    // Folds in one axis only where a ring must come back without roll; both, where it is a
    // standing cavity, are drawn by `fold_both_ways`.
    (shape, aoi, prop_oneof![Just("left"), Just("right")]).prop_map(
        move |(curvature, aoi, fold)| Part::Mirror {
            curvature,
            aoi_deg: if folds { aoi } else { 0.0 },
            fold,
        },
    )
}

fn fold_both_ways() -> impl Strategy<Value = Part> {
    let side = prop_oneof![Just("left"), Just("right"), Just("up"), Just("down")];
    (mirror(true), side).prop_map(|(mut part, side)| {
        if let Part::Mirror { fold, .. } = &mut part {
            *fold = side;
        }
        part
    })
}

fn power() -> impl Strategy<Value = f64> {
    prop_oneof![0.1..2.0_f64, -1.0..-0.1_f64]
}

fn slab() -> impl Strategy<Value = Part> {
    let aoi = prop_oneof![
        3 => Just(Some(0.0)),
        1 => (1.0..60.0_f64).prop_map(Some),
        1 => Just(None)
    ];
    let place = prop_oneof![
        Just("spread"),
        Just("entrance"),
        Just("middle"),
        Just("exit")
    ];
    let thermal = proptest::option::weighted(0.4, ([power(), power()], place));
    let faces = prop_oneof![
        3 => Just([0.0, 0.0]),
        1 => [-1.0..1.0_f64, -1.0..1.0_f64],
    ];
    let shift = prop_oneof![Just("left"), Just("down")];
    (0.002..0.05_f64, 1.3..2.4_f64, aoi, shift, faces, thermal).prop_map(
        |(thickness, index, aoi_deg, shift, faces, thermal)| Part::Slab {
            thickness,
            index,
            aoi_deg,
            shift,
            faces,
            thermal,
        },
    )
}

fn gap() -> impl Strategy<Value = Part> {
    (0.005..0.4_f64).prop_map(|length| Part::Gap { length, index: 1.0 })
}

fn inner(ring: bool) -> BoxedStrategy<Part> {
    let fold = if ring {
        mirror(true).boxed()
    } else {
        fold_both_ways().boxed()
    };
    prop_oneof![
        6 => gap(),
        3 => fold,
        1 => [power(), power()].prop_map(|power| Part::Lens { power }),
        2 => slab(),
        1 => (0.01..0.1_f64, 1.3..2.0_f64, [0.1..8.0_f64, 0.1..8.0_f64], any::<bool>()).prop_map(
            |(length, index, strength, antiguiding)| Part::Duct {
                length,
                index,
                strength,
                antiguiding,
            }
        ),
    ]
    .boxed()
}

/// Any cavity of up to `most` parts, stable or not.
pub fn any_cavity(most: usize) -> impl Strategy<Value = Spec> {
    any::<bool>().prop_flat_map(move |ring| {
        let ends = if ring {
            (mirror(true).boxed(), mirror(true).boxed())
        } else {
            (mirror(false).boxed(), mirror(false).boxed())
        };
        let inner = proptest::collection::vec(inner(ring), 0..most - 2);
        (ends, gap(), inner, 0.4e-6..11e-6_f64).prop_map(
            move |((first, last), gap, inner, wavelength)| {
                let mut parts = vec![first, gap];
                parts.extend(inner);
                parts.push(last);
                Spec {
                    ring,
                    wavelength,
                    parts,
                }
            },
        )
    })
}
