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

/// The beam behind a mirror's outer face, in the ambient.
///
/// Both faces have their vertex on the beam, and their normals there are parallel.
pub fn behind(
    part: &Part,
    mirror: &Mirror,
    ambient: Index,
    values: &[f64],
    arriving: PerPlane<Beam<f64>>,
) -> PerPlane<Beam<f64>> {
    let Some(substrate) = &mirror.substrate else {
        return arriving;
    };
    let own = |pair: PerPlane<Beam<f64>>| if part.swapped { pair.swapped() } else { pair };
    let curvature = mirror.curvature.map(|slot| slot.of(values));
    let curvature = if part.swapped {
        curvature.swapped()
    } else {
        curvature
    };
    let inside = substrate.index.phase(values);
    let enter = Crossing::at_incidence(
        part.before.phase(values),
        inside,
        mirror.incidence.of(values),
    );
    // A concave face has its centre on the beam's side.
    let front = enter.matrices(curvature.map(|c| -c));
    let path = Stretch::uniform(substrate.thickness.of(values) / enter.cos_to, inside).matrix();
    let outside = ambient.phase(values);
    let sine = (1.0 - enter.cos_to * enter.cos_to).max(0.0).sqrt() * inside / outside;
    let leave = Crossing {
        index_from: inside,
        index_to: outside,
        cos_from: enter.cos_to,
        cos_to: (1.0 - sine * sine).max(0.0).sqrt(),
    };
    let back = leave.matrices(PerPlane::both(-substrate.back.of(values)));
    let through = front.zip(back, |front, back| front.then(path).then(back));
    own(own(arriving).zip(through, Beam::after))
}
