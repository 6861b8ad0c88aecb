//! The beam's radius all along the path, sampled so that straight lines between the samples are
//! as good as the curve, and the optics that stand along it.
//!
//! Within one stretch w(z) is sampled by halving, from the same closed forms as everything else,
//! and a waist is always a sample of its own: halving alone steps over a focus of micrometres in
//! a stretch of a kilometre.

use super::eigenmode::Eigenmode;
use super::envelope::{Envelope, Inside};
use crate::cavity::{Cavity, Element, Opening, Part};
use crate::optics::{PerPlane, Plane};

/// Deviation of a straight line from the curve at which an interval is halved, in the radius and
/// in its logarithm: less than the width of a line in any picture.
const DEVIATION: f64 = 3e-4;
/// How often an interval is halved at most; a stretch of a kilometre is then cut to micrometres.
const DEPTH: u32 = 32;
/// Pieces every stretch is cut into before anything is judged, because a duct may hold many
/// periods of the beam.
const LEAST_PIECES: u32 = 8;

/// Which way something bends a beam.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Bend {
    /// It focuses: a concave mirror, a converging lens.
    Focusing,
    /// It does nothing: a flat mirror, an empty lens.
    None,
    /// It defocuses: a convex mirror, a diverging lens.
    Defocusing,
}

impl Bend {
    fn of(power: PerPlane<f64>) -> Bend {
        // Toric optics are drawn by their stronger plane.
        let stronger = if power.sagittal.abs() > power.tangential.abs() {
            power.sagittal
        } else {
            power.tangential
        };
        match stronger {
            p if p > 0.0 => Bend::Focusing,
            p if p < 0.0 => Bend::Defocusing,
            _ => Bend::None,
        }
    }
}

/// What stands at a place, as far as it can be seen.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Shape {
    /// Free space.
    Gap,
    /// A mirror at which a standing cavity ends.
    EndMirror(Bend),
    /// A mirror that turns the beam.
    FoldMirror(Bend),
    /// A thin lens.
    Lens(Bend),
    /// A slab, tilted or square to the beam.
    Slab {
        /// Whether the beam meets it at an angle.
        tilted: bool,
    },
    /// A duct.
    Duct,
    /// An opening, with half its width in metres and the plane that it limits; both if none.
    Aperture {
        /// Half the opening.
        half_width_m: f64,
        /// The one plane that a slit limits.
        plane: Option<Plane>,
    },
    /// A given matrix.
    Matrix,
}

/// One place in the plane of a picture.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Sample {
    /// Geometric way from the first part, in metres.
    pub at_m: f64,
    /// Beam radius, in metres.
    pub radius_m: f64,
}

/// One part along the path.
#[derive(Clone, Debug)]
pub struct AlongPart {
    /// Its name.
    pub name: String,
    /// What it looks like.
    pub shape: Shape,
    /// Geometric way from the first part to its start, in metres.
    pub at_m: f64,
    /// Length along the beam, in metres.
    pub length_m: f64,
    /// Radius at its middle, in metres; none in a plane without a mode.
    pub spot_m: PerPlane<Option<f64>>,
    /// The radius through its inside; empty where it has none or the plane holds no mode.
    pub radii: PerPlane<Vec<Sample>>,
}

/// The beam along one walk of the path.
#[derive(Clone, Debug)]
pub struct Profile {
    /// Every part, in the order of the path.
    pub parts: Vec<AlongPart>,
    /// Length of the walk, in metres.
    pub length_m: f64,
}

impl Profile {
    /// Samples the mode of a cavity, with the given values in the address book's slots.
    pub fn of(cavity: &Cavity, values: &[f64]) -> Profile {
        let mode = Eigenmode::of(cavity, values);
        let envelope = Envelope::of(cavity, values, mode.start());
        let wavelength = Cavity::WAVELENGTH.of(values);
        let last = cavity.parts().len() - 1;
        let parts = cavity
            .parts()
            .iter()
            .enumerate()
            .map(|(index, part)| {
                let ends_here = !cavity.is_ring() && (index == 0 || index == last);
                let middle = envelope.at_middle(index);
                let at = &envelope.parts[index];
                let holds = |plane: Plane| mode.planes[plane].beam.is_some();
                AlongPart {
                    name: part.name.clone(),
                    shape: shape(part, values, ends_here),
                    at_m: at.at,
                    length_m: at.length,
                    spot_m: PerPlane::from_fn(|plane| {
                        holds(plane).then(|| middle[plane].radius(wavelength))
                    }),
                    radii: PerPlane::from_fn(|plane| {
                        if !holds(plane) {
                            return Vec::new();
                        }
                        envelope
                            .inside(index)
                            .flat_map(|inside| sampled(inside, plane, at.at, wavelength))
                            .collect()
                    }),
                }
            })
            .collect();
        Profile {
            parts,
            length_m: envelope.length,
        }
    }
}

fn shape(part: &Part, values: &[f64], ends_here: bool) -> Shape {
    match &part.element {
        Element::Mirror(mirror) => {
            let bend = Bend::of(mirror.curvature.map(|slot| slot.of(values)));
            if ends_here {
                Shape::EndMirror(bend)
            } else {
                Shape::FoldMirror(bend)
            }
        }
        Element::Gap { .. } => Shape::Gap,
        Element::Lens { power, .. } => Shape::Lens(Bend::of(power.map(|slot| slot.of(values)))),
        Element::Slab(slab) => Shape::Slab {
            tilted: slab.is_tilted(values),
        },
        Element::Duct { .. } => Shape::Duct,
        Element::Aperture => {
            let (half_width_m, plane) = match part.opening {
                Some(Opening::Hole { radius }) => (radius.of(values), None),
                Some(Opening::Slit { half_width, plane }) => (half_width.of(values), Some(plane)),
                Some(Opening::Round { diameter }) => (0.5 * diameter.of(values), None),
                Some(Opening::Rectangle { width, height }) => {
                    (0.5 * width.of(values).min(height.of(values)), None)
                }
                None => (f64::INFINITY, None),
            };
            Shape::Aperture {
                half_width_m,
                plane,
            }
        }
        Element::Matrix { .. } => Shape::Matrix,
    }
}

/// The radius along one stretch, both ends included.
fn sampled(inside: &Inside<f64>, plane: Plane, part_at: f64, wavelength: f64) -> Vec<Sample> {
    let stretch = inside.stretch[plane];
    let beam = inside.entering[plane];
    let start = part_at + inside.from_start;
    let radius = |share: f64| beam.after(stretch.part(share).matrix()).radius(wavelength);
    let mut shares: Vec<f64> = (0..=LEAST_PIECES)
        .map(|piece| f64::from(piece) / f64::from(LEAST_PIECES))
        .collect();
    if stretch.strength_squared.is_none() && stretch.length > 0.0 {
        let waist = beam.distance_to_waist(stretch.index) / stretch.length;
        if waist > 0.0 && waist < 1.0 {
            shares.push(waist);
            shares.sort_by(f64::total_cmp);
        }
    } else {
        // A period of the beam in a guide is γL = π; a few pieces to each.
        let strength_squared = stretch.strength_squared.unwrap_or(0.0);
        let z = (strength_squared * stretch.length * stretch.length).max(0.0);
        let periods = (z.sqrt() / std::f64::consts::PI).min(200.0);
        let pieces = LEAST_PIECES * (1 + periods as u32);
        shares = (0..=pieces)
            .map(|piece| f64::from(piece) / f64::from(pieces))
            .collect();
    }
    let mut points = vec![(0.0, radius(0.0))];
    for pair in shares.windows(2) {
        let (from, to) = ((pair[0], radius(pair[0])), (pair[1], radius(pair[1])));
        halve(&radius, from, to, DEPTH, &mut points);
    }
    points
        .into_iter()
        .map(|(share, radius_m)| Sample {
            at_m: start + share * stretch.length,
            radius_m,
        })
        .collect()
}

/// Adds what is needed between two samples, and the second of them.
fn halve(
    radius: &impl Fn(f64) -> f64,
    from: (f64, f64),
    to: (f64, f64),
    depth: u32,
    points: &mut Vec<(f64, f64)>,
) {
    let share = 0.5 * (from.0 + to.0);
    let middle = (share, radius(share));
    let straight = (0.5 * (from.1 + to.1) / middle.1 - 1.0).abs();
    let straight_in_logarithm = ((from.1 * to.1).sqrt() / middle.1 - 1.0).abs();
    if depth > 0 && straight.max(straight_in_logarithm) > DEVIATION {
        halve(radius, from, middle, depth - 1, points);
        halve(radius, middle, to, depth - 1, points);
    } else {
        points.push(to);
    }
}
