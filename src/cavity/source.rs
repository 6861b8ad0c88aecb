//! The beam that is sent in, as it is written: every number behind a slot.

use std::f64::consts::PI;

use super::Cavity;
use super::book::Slot;
use super::part::Index;
use crate::numeric::Real;
use crate::optics::PerPlane;
use crate::optics::beam::Beam;
use crate::optics::ray::RayMatrix;

/// How the shape of the beam is written.
///
/// Places count along the beam in the undisturbed ambient, downstream positive: from the start of
/// the feed or, where there is none, from the input mirror's outer face.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum SourceBeam {
    /// A waist in either plane of the file.
    Waists {
        /// Radius, in metres.
        radius: PerPlane<Slot>,
        /// Its place, in metres.
        at: PerPlane<Slot>,
    },
    /// A round beam met on its way.
    Spot {
        /// Beam radius there, in metres.
        radius: Slot,
        /// Curvature of its wavefront there, in 1/m, diverging positive.
        wavefront: Slot,
        /// The place, in metres.
        at: Slot,
    },
    /// The end of a fibre.
    Fibre {
        /// Mode-field diameter, in metres: twice the radius of a waist at the fibre's end.
        mode_field: Slot,
        /// Place of the fibre's end, in metres.
        at: Slot,
    },
    /// What leaves another cavity; named only.
    Cavity {
        /// Its file.
        file: String,
        /// The mirror by which the beam leaves it.
        mirror: String,
    },
}

/// The beam that is sent in.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Source {
    /// Its shape; none where nothing is written of it.
    pub beam: Option<SourceBeam>,
    /// Beam quality M², 1 or more; of both planes.
    pub m2: Slot,
    /// Power, in watts.
    pub power: Option<Slot>,
    /// Energy of a pulse, in joules.
    pub energy: Option<Slot>,
    /// How far its axis lies off the mode's at the input mirror, in metres.
    pub offset: PerPlane<Slot>,
    /// By which angle its axis is tilted against the mode's at the input mirror, in radians.
    pub tilt: PerPlane<Slot>,
}

impl Source {
    /// The beam at the place from which its places count, before any optic of the feed; none where
    /// its shape is not written or is that of another cavity's beam.
    ///
    /// Of a beam with M² above 1 it is the Gaussian beam of the same wavefronts and Rayleigh
    /// length: its radii are smaller by √M² everywhere.
    pub fn start<T: Real>(&self, values: &[T], ambient: Index) -> Option<PerPlane<Beam<T>>> {
        let index = ambient.phase(values);
        let wavelength = Cavity::WAVELENGTH.of(values);
        let beta = |radius: T| radius.squared() * PI / (wavelength * self.m2.of(values));
        let seen =
            |beam: Beam<T>, at: Slot| beam.after(RayMatrix::propagation(-at.of(values) / index));
        let waist = |radius: T, at: Slot| seen(Beam::new(beta(radius), T::constant(0.0)), at);
        match self.beam.as_ref()? {
            SourceBeam::Waists { radius, at } => {
                Some(radius.zip(*at, |radius, at| waist(radius.of(values), at)))
            }
            SourceBeam::Spot {
                radius,
                wavefront,
                at,
            } => {
                let beta = beta(radius.of(values));
                let beam = Beam::new(beta, -(beta * index * wavefront.of(values)));
                Some(PerPlane::both(seen(beam, *at)))
            }
            SourceBeam::Fibre { mode_field, at } => {
                Some(PerPlane::both(waist(mode_field.of(values) * 0.5, *at)))
            }
            SourceBeam::Cavity { .. } => None,
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use approx::assert_relative_eq;

    /// A few roundings.
    const ROUNDING: f64 = 1e-13;
    const WAVELENGTH: f64 = 1e-6;
    const WATER: Index = Index::Fixed {
        phase: 1.33,
        group: None,
    };

    /// Slots 0 to 2 are the cavity's own; 3 is M², 4 a zero, from 5 on the beam's.
    fn start(beam: SourceBeam, m2: f64, numbers: &[f64]) -> PerPlane<Beam<f64>> {
        let source = Source {
            beam: Some(beam),
            m2: Slot(3),
            power: None,
            energy: None,
            offset: PerPlane::both(Slot(4)),
            tilt: PerPlane::both(Slot(4)),
        };
        let mut values = vec![WAVELENGTH, 293.0, 0.0, m2, 0.0];
        values.extend(numbers);
        source.start(&values, WATER).unwrap()
    }

    #[test]
    fn a_waist_lies_where_it_is_written() {
        let waists = SourceBeam::Waists {
            radius: PerPlane {
                tangential: Slot(5),
                sagittal: Slot(6),
            },
            at: PerPlane {
                tangential: Slot(7),
                sagittal: Slot(8),
            },
        };
        let beams = start(waists, 1.0, &[0.3e-3, 0.2e-3, -0.6, 0.1]);
        for (beam, radius, at) in [
            (beams.tangential, 0.3e-3, -0.6),
            (beams.sagittal, 0.2e-3, 0.1),
        ] {
            assert_relative_eq!(
                beam.waist_radius(WAVELENGTH),
                radius,
                max_relative = ROUNDING
            );
            assert_relative_eq!(beam.distance_to_waist(1.33), at, max_relative = ROUNDING);
        }
        assert!(beams.tangential.wavefront_curvature(1.33) > 0.0, "diverges");
    }

    #[test]
    fn a_fibre_has_half_its_mode_field_for_a_radius() {
        let fibre = SourceBeam::Fibre {
            mode_field: Slot(5),
            at: Slot(6),
        };
        let beam = start(fibre, 1.0, &[10e-6, -0.003]).sagittal;
        assert_relative_eq!(beam.waist_radius(WAVELENGTH), 5e-6, max_relative = ROUNDING);
        assert_relative_eq!(
            beam.distance_to_waist(1.33),
            -0.003,
            max_relative = ROUNDING
        );
    }

    #[test]
    fn a_spot_is_met_with_its_wavefront_whatever_the_quality() {
        let spot = || SourceBeam::Spot {
            radius: Slot(5),
            wavefront: Slot(6),
            at: Slot(7),
        };
        for m2 in [1.0, 2.25] {
            let beam = start(spot(), m2, &[1e-3, -0.5, 0.2]).tangential;
            let there = beam.after(RayMatrix::propagation(0.2 / 1.33));
            assert_relative_eq!(
                there.radius(WAVELENGTH),
                1e-3 / m2.sqrt(),
                max_relative = ROUNDING
            );
            assert_relative_eq!(
                there.wavefront_curvature(1.33),
                -0.5,
                max_relative = ROUNDING
            );
        }
    }
}
