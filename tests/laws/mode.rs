//! What holds for every cavity whatever its parts: see each test's name.
//!
//! Tolerances are multiples of ε·‖M‖/margin: rounding grows with the entries of the round trip and,
//! near the edge, with the reciprocal of the margin.

use std::f64::consts::TAU;

use modewright::analysis::eigenmode::{Eigenmode, PlaneMode};
use modewright::analysis::envelope::Envelope;
use modewright::analysis::lengths::RoundTripLengths;
use modewright::cavity::{Cavity, Form, Leg};
use modewright::optics::beam::Beam;
use modewright::optics::ray::RayMatrix;
use modewright::optics::{PerPlane, Plane};
use proptest::prelude::*;

use crate::spec::{Spec, any_cavity};

/// Least margin of a cavity on which laws of the mode are tried.
const LEAST_MARGIN: f64 = 1e-4;

/// Roundings along a path of up to 60 elements, each met a few times.
const ROUNDINGS: f64 = 3000.0;

const MOST_PARTS: usize = 30;

struct Case {
    cavity: Cavity,
    values: Vec<f64>,
    mode: Eigenmode,
}

impl Case {
    fn of(spec: &Spec) -> Case {
        let cavity = spec.cavity();
        let values = cavity.book().nominal();
        let mode = Eigenmode::of(&cavity, &values);
        Case {
            cavity,
            values,
            mode,
        }
    }

    fn envelope(&self) -> Envelope<f64> {
        Envelope::of(&self.cavity, &self.values, self.mode.start())
    }

    fn legs(&self) -> Vec<Leg<f64>> {
        let mut legs = Vec::new();
        self.cavity.walk(&self.values, |leg| legs.push(leg));
        legs
    }

    /// Relative rounding to be expected of the mode in one plane.
    fn tolerance(&self, plane: Plane) -> f64 {
        let mut largest: f64 = 1.0;
        let length = RoundTripLengths::of(&self.cavity, &self.values).geometric;
        let mut product = RayMatrix::identity();
        for leg in self.legs() {
            product = product.then(leg.matrix()[plane]);
            largest = largest.max(size(product, length));
        }
        // A standing cavity is walked twice.
        ROUNDINGS * f64::EPSILON * largest * largest / self.mode.planes[plane].margin.abs()
    }
}

/// The largest entry, made dimensionless with a length.
fn size(m: RayMatrix<f64>, length: f64) -> f64 {
    [m.a, m.b / length, m.c * length, m.d]
        .into_iter()
        .map(f64::abs)
        .fold(0.0, f64::max)
}

fn close(a: f64, b: f64, tolerance: f64) -> bool {
    (a - b).abs() <= tolerance * a.abs().max(b.abs())
}

/// Whether two angles agree up to whole turns.
fn same_angle(a: f64, b: f64, tolerance: f64) -> bool {
    let turns = (a - b) / TAU;
    (turns - turns.round()).abs() * TAU <= tolerance
}

/// Whether two beams agree: overlap of their parameters rather than each number for itself, since
/// a wavefront's curvature may pass through zero.
fn same_beam(a: Beam<f64>, b: Beam<f64>, tolerance: f64) -> bool {
    let distance = (a.q() - b.q()).norm() / (a.q() - b.q().conj()).norm();
    distance <= tolerance
}

fn stable(spec: &Spec) -> Option<Case> {
    let case = Case::of(spec);
    (case.mode.margin() > LEAST_MARGIN && Plane::BOTH.iter().all(|p| case.tolerance(*p) < 1e-3))
        .then_some(case)
}

fn stable_cavity() -> impl Strategy<Value = Spec> {
    any_cavity(MOST_PARTS).prop_filter("stable", |spec| stable(spec).is_some())
}

proptest! {
    #![proptest_config(crate::config(400))]

    #[test]
    fn every_leg_has_determinant_one(spec in any_cavity(MOST_PARTS)) {
        for leg in Case::of(&spec).legs() {
            for plane in Plane::BOTH {
                let m = leg.matrix()[plane];
                let terms = (m.a * m.d).abs() + (m.b * m.c).abs();
                prop_assert!((m.determinant() - 1.0).abs() <= 8.0 * f64::EPSILON * terms);
            }
        }
    }

    /// The product of the rest of the way and of the way so far, from every leg on, repeats the
    /// beam that the envelope carries there, with the same half-trace and Gouy phase.
    #[test]
    fn the_mode_repeats_itself_from_every_plane(spec in stable_cavity()) {
        let case = Case::of(&spec);
        let mut legs: Vec<PerPlane<RayMatrix<f64>>> =
            case.legs().into_iter().map(|leg| leg.matrix()).collect();
        if case.cavity.form() == Form::Standing {
            let back: Vec<_> = legs.iter().rev().map(|m| m.map(RayMatrix::reversed)).collect();
            legs.extend(back);
        }
        for plane in Plane::BOTH {
            let tolerance = case.tolerance(plane);
            let mut carried = case.mode.start()[plane];
            let h = PlaneMode::of(
                case.cavity.form(),
                case.cavity.one_way(&case.values)[plane],
            );
            for first in 0..legs.len() {
                let round = legs[first..]
                    .iter()
                    .chain(&legs[..first])
                    .fold(RayMatrix::identity(), |m, leg| m.then(leg[plane]));
                let mode = PlaneMode::of(Form::Ring, round);
                prop_assert!(close(mode.half_trace, h.half_trace, tolerance.max(1e-12))
                    || (mode.half_trace - h.half_trace).abs() < tolerance);
                if mode.stable {
                    prop_assert!(same_beam(mode.beam, carried, tolerance));
                    prop_assert!(same_angle(mode.gouy_phase, h.gouy_phase, tolerance));
                }
                prop_assert!(same_beam(carried.after(round), carried, tolerance));
                carried = carried.after(legs[first][plane]);
            }
        }
    }

    /// The phase gathered piece by piece is the angle of the round trip, up to whole turns.
    #[test]
    fn the_accumulated_gouy_phase_is_the_angle_of_the_round_trip(spec in stable_cavity()) {
        let case = Case::of(&spec);
        let envelope = case.envelope();
        for plane in Plane::BOTH {
            let way = case.cavity.one_way(&case.values)[plane];
            let mode = PlaneMode::of(case.cavity.form(), way);
            prop_assert!(same_angle(
                envelope.gouy_phase[plane],
                mode.gouy_phase,
                case.tolerance(plane)
            ));
        }
    }

    #[test]
    fn a_standing_cavity_is_the_ring_of_its_unfolded_path(
        spec in stable_cavity().prop_filter("standing", |spec| !spec.ring)
    ) {
        // Folds up and down of an unfolded ring would roll the frame; the planes are the same.
        let horizontal = spec.text().replace("\"up\"", "\"left\"").contains("\"down\"");
        prop_assume!(!horizontal && !spec.text().contains("\"up\""));
        let (standing, ring) = (Case::of(&spec), Case::of(&spec.unfolded()));
        for plane in Plane::BOTH {
            let tolerance = standing.tolerance(plane);
            let (a, b) = (&standing.mode.planes[plane], &ring.mode.planes[plane]);
            prop_assert!((a.half_trace - b.half_trace).abs() <= tolerance);
            let beam = ring.envelope().parts[0].left[plane];
            prop_assert!(same_beam(standing.envelope().parts[0].left[plane], beam, tolerance));
            let (m, n) = (a.matrix, b.matrix);
            let length = RoundTripLengths::of(&standing.cavity, &standing.values).geometric;
            let difference = RayMatrix { a: m.a - n.a, b: m.b - n.b, c: m.c - n.c, d: m.d - n.d };
            prop_assert!(size(difference, length) <= tolerance * size(m, length));
        }
        let lengths = |case: &Case| RoundTripLengths::of(&case.cavity, &case.values);
        let (a, b) = (lengths(&standing), lengths(&ring));
        prop_assert!(close(a.geometric, b.geometric, 1e-13));
        prop_assert!(close(a.group, b.group, 1e-13));
        prop_assert_eq!(standing.cavity.reflections(), ring.cavity.reflections());
    }

    #[test]
    fn reversing_a_ring_leaves_the_spots(
        spec in stable_cavity().prop_filter("ring", |spec| spec.ring)
    ) {
        let (there, back) = (Case::of(&spec), Case::of(&spec.reversed()));
        let (a, b) = (there.envelope(), back.envelope());
        let count = a.parts.len();
        for plane in Plane::BOTH {
            let tolerance = there.tolerance(plane);
            let h = |case: &Case| case.mode.planes[plane].half_trace.abs();
            prop_assert!((h(&there) - h(&back)).abs() <= tolerance);
            for part in 0..count {
                let other = (count - part) % count;
                // What leaves a part is what arrives there the other way round.
                let left = a.parts[part].left[plane].reversed();
                prop_assert!(same_beam(left, b.parts[other].arriving[plane], tolerance));
            }
        }
    }

    #[test]
    fn scaling_all_lengths_scales_the_beam_by_the_root(spec in stable_cavity(), by in 0.1..10.0_f64) {
        let (one, other) = (Case::of(&spec), Case::of(&spec.scaled(by)));
        for plane in Plane::BOTH {
            let tolerance = one.tolerance(plane);
            let radius = |case: &Case| {
                case.envelope().at_middle(1)[plane].radius(spec.wavelength)
            };
            prop_assert!(close(radius(&one) * by.sqrt(), radius(&other), tolerance));
        }
    }

    #[test]
    fn doubling_the_wavelength_widens_the_beam_by_the_root_of_two(spec in stable_cavity()) {
        let doubled = Spec { wavelength: 2.0 * spec.wavelength, ..spec.clone() };
        let radius = |spec: &Spec, plane| {
            let case = Case::of(spec);
            case.envelope().at_middle(1)[plane].radius(case.values[Cavity::WAVELENGTH.index()])
        };
        for plane in Plane::BOTH {
            let (one, two) = (radius(&spec, plane), radius(&doubled, plane));
            prop_assert!(close(one * 2.0_f64.sqrt(), two, 4.0 * f64::EPSILON));
        }
    }
}
