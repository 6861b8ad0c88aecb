//! The beam that leaves the cavity through a mirror.
//!
//! The coated face of a substrate refracts the beam, and so does its outer face: a plano-concave
//! substrate is a lens of focal length −R/(n − 1) for what passes through it. A mirror without a
//! substrate lets the beam pass unchanged.

use crate::cavity::{Index, Mirror, Part};
use crate::optics::PerPlane;
use crate::optics::beam::Beam;
use crate::optics::element::duct::Stretch;
use crate::optics::element::surface::Crossing;

/// The beam behind a mirror's outer face, in the ambient; none where it is totally reflected on
/// its way out.
///
/// Both faces have their vertex on the beam, and their normals there are parallel. Without a
/// substrate the mirror is a face between its medium and the ambient.
pub fn behind(
    part: &Part,
    mirror: &Mirror,
    ambient: Index,
    values: &[f64],
    arriving: PerPlane<Beam<f64>>,
) -> Option<PerPlane<Beam<f64>>> {
    let own = |pair: PerPlane<Beam<f64>>| if part.swapped { pair.swapped() } else { pair };
    let outside = ambient.phase(values);
    let before = part.before.phase(values);
    let incidence = mirror.incidence.of(values);
    let through = match &mirror.substrate {
        None => cross(before, outside, incidence)?
            .0
            .matrices(PerPlane::both(0.0)),
        Some(substrate) => {
            let curvature = mirror.curvature.map(|slot| slot.of(values));
            let curvature = if part.swapped {
                curvature.swapped()
            } else {
                curvature
            };
            let inside = substrate.index.phase(values);
            let (enter, refracted) = cross(before, inside, incidence)?;
            let (leave, _) = cross(inside, outside, refracted)?;
            let length = substrate.thickness.of(values) / enter.cos_to;
            let path = Stretch::uniform(length, inside).matrix();
            // A concave face has its centre on the beam's side; a convex back bulges outwards.
            let front = enter.matrices(curvature.map(|c| -c));
            let back = leave.matrices(PerPlane::both(-substrate.back.of(values)));
            front.zip(back, |front, back| front.then(path).then(back))
        }
    };
    Some(own(own(arriving).zip(through, Beam::after)))
}

/// The crossing of a face and the angle behind it, in radians; none for total reflection.
fn cross(from: f64, to: f64, incidence: f64) -> Option<(Crossing<f64>, f64)> {
    let sine = from * incidence.sin() / to;
    (sine < 1.0).then(|| (Crossing::at_incidence(from, to, incidence), sine.asin()))
}
