//! The round trip and the mode that repeats itself after it.
//!
//! With the half-trace h = (A + D)/2 of the round-trip matrix a plane is stable where |h| < 1, and
//! its *margin* is 1 − |h|. The mode at the chosen plane has 1/q̂ = (D − A)/(2B) − i√(1 − h²)/|B|
//! (Kogelnik & Li, Appl. Opt. 5, 1550 (1966)), that is
//!
//! ```text
//!     β = |B|/√(1 − h²),   α = sgn(B)·(A − D)/(2√(1 − h²)),   γ = |C|/√(1 − h²).
//! ```
//!
//! A standing cavity is computed from the matrix U of *one* way, from the middle of one end
//! mirror's reflection to the middle of the other's: h = AD + BC, so that its margin is the
//! lesser of 2AD and −2BC, and on the mirror β = √(BD/(−AC)), α = 0. Both are good to rounding
//! however near the edge the cavity is.

use std::f64::consts::TAU;

use crate::cavity::{Cavity, Element, Form};
use crate::numeric::Real;
use crate::optics::beam::Beam;
use crate::optics::ray::RayMatrix;
use crate::optics::{PerPlane, Plane};

/// A margin within this of zero is on the edge: neither stable nor unstable with any real part.
pub const EDGE: f64 = 1e-10;

/// The mode of one plane, at the place where the walk starts; over any number type.
#[derive(Clone, Copy, Debug)]
pub struct PlaneMode<T: Real> {
    /// Half-trace of the round trip, flips left out.
    pub half_trace: T,
    /// 1 − |half-trace|, negative where unstable.
    pub margin: T,
    /// Whether the margin is clear of the edge.
    pub stable: T::Mask,
    /// Gouy phase of a round trip modulo 2π, flips left out, in [0, 2π); of no meaning where the
    /// mode does not exist.
    pub gouy_phase: T,
    /// The mode; a harmless placeholder where it does not exist.
    pub beam: Beam<T>,
}

impl<T: Real> PlaneMode<T> {
    /// The mode that belongs to the matrix of one walk along a cavity of the given form.
    #[inline(always)]
    pub fn of(form: Form, way: RayMatrix<T>) -> Self {
        match form {
            Form::Ring => Self::of_ring(way),
            Form::Standing => Self::of_standing(way),
        }
    }

    #[inline(always)]
    fn of_ring(m: RayMatrix<T>) -> Self {
        let half_trace = m.half_trace();
        let (below, above) = (half_trace + 1.0, -half_trace + 1.0);
        let margin = below.min(above);
        let stable = T::constant(EDGE).less(margin);
        let sine = T::select(stable, below * above, T::constant(1.0)).sqrt();
        let positive = T::constant(0.0).less(m.b);
        let scale = sine.recip();
        let skew = (m.a - m.d) * (scale * 0.5);
        let beam = Beam {
            beta: m.b.abs() * scale,
            alpha: T::select(positive, skew, -skew),
            gamma: m.c.abs() * scale,
        };
        Self::new(half_trace, margin, stable, sine, positive, beam)
    }

    #[inline(always)]
    fn of_standing(u: RayMatrix<T>) -> Self {
        let (ad, bc) = (u.a * u.d, u.b * u.c);
        let half_trace = ad + bc;
        let margin = (ad * 2.0).min(bc * -2.0);
        let stable = T::constant(EDGE).less(margin);
        let one = T::constant(1.0);
        let sine = T::select(stable, ad * bc * -4.0, one).sqrt();
        let square = T::select(stable, -(u.b * u.d) / (u.a * u.c), one);
        let positive = T::constant(0.0).less(u.b * u.d);
        let beam = Beam::new(square.sqrt(), T::constant(0.0));
        Self::new(half_trace, margin, stable, sine, positive, beam)
    }

    #[inline(always)]
    fn new(
        half_trace: T,
        margin: T,
        stable: T::Mask,
        sine: T,
        positive: T::Mask,
        beam: Beam<T>,
    ) -> Self {
        let placeholder = Beam::new(T::constant(1.0), T::constant(0.0));
        let angle = sine.atan2(half_trace);
        PlaneMode {
            half_trace,
            margin,
            stable,
            gouy_phase: T::select(positive, angle, -angle + TAU),
            beam: Beam {
                beta: T::select(stable, beam.beta, placeholder.beta),
                alpha: T::select(stable, beam.alpha, placeholder.alpha),
                gamma: T::select(stable, beam.gamma, placeholder.gamma),
            },
        }
    }
}

/// Whether a plane holds a mode.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Stability {
    /// It does.
    Stable,
    /// The half-trace is ±1 within [`EDGE`].
    OnEdge,
    /// It does not.
    Unstable,
}

impl Stability {
    fn of_margin(margin: f64) -> Stability {
        if margin > EDGE {
            Stability::Stable
        } else if margin >= -EDGE {
            Stability::OnEdge
        } else {
            Stability::Unstable
        }
    }
}

/// What one plane of a cavity does in a round trip.
#[derive(Clone, Copy, Debug)]
pub struct PlaneResult {
    /// The round trip that starts just behind the first part, flips included.
    pub matrix: RayMatrix<f64>,
    /// Half-trace of that matrix.
    pub half_trace: f64,
    /// 1 − |half-trace|.
    pub margin: f64,
    /// Whether the plane holds a mode.
    pub stability: Stability,
    /// Gouy phase modulo 2π with the flips counted, in [0, 2π); none where unstable.
    pub gouy_folded: Option<f64>,
    /// The mode where the walk starts, if there is one.
    pub beam: Option<Beam<f64>>,
}

/// The mode of a cavity.
#[derive(Clone, Debug)]
pub struct Eigenmode {
    /// Both planes.
    pub planes: PerPlane<PlaneResult>,
}

impl Eigenmode {
    /// Finds the mode of a cavity, with the given values in the address book's slots.
    pub fn of(cavity: &Cavity, values: &[f64]) -> Eigenmode {
        let way = cavity.one_way(values);
        let first = first_reflection(cavity, values);
        let planes = PerPlane::from_fn(|plane| {
            let mode = PlaneMode::of(cavity.form(), way[plane]);
            let unflipped = match cavity.form() {
                Form::Ring => way[plane],
                // From the middle of the first mirror's reflection on to just behind it.
                Form::Standing => first[plane]
                    .inverse()
                    .then(way[plane])
                    .then(way[plane].reversed())
                    .then(first[plane]),
            };
            let odd = cavity.flips()[plane] % 2 == 1;
            let matrix = if odd { unflipped.flipped() } else { unflipped };
            let stability = Stability::of_margin(mode.margin);
            let flip = if odd { TAU / 2.0 } else { 0.0 };
            let gouy_folded = match stability {
                Stability::Stable => Some((mode.gouy_phase + flip) % TAU),
                Stability::OnEdge => {
                    let edge = if mode.half_trace > 0.0 {
                        0.0
                    } else {
                        TAU / 2.0
                    };
                    Some((edge + flip) % TAU)
                }
                Stability::Unstable => None,
            };
            PlaneResult {
                matrix,
                half_trace: if odd {
                    -mode.half_trace
                } else {
                    mode.half_trace
                },
                margin: mode.margin,
                stability,
                gouy_folded,
                beam: mode.stable.then_some(mode.beam),
            }
        });
        Eigenmode { planes }
    }

    /// The lesser margin of the two planes.
    pub fn margin(&self) -> f64 {
        self.planes
            .tangential
            .margin
            .min(self.planes.sagittal.margin)
    }

    /// Whether both planes hold a mode, one is on the edge, or one is unstable.
    pub fn stability(&self) -> Stability {
        Stability::of_margin(self.margin())
    }

    /// The plane with the lesser margin.
    pub fn worse_plane(&self) -> Plane {
        if self.planes.sagittal.margin < self.planes.tangential.margin {
            Plane::Sagittal
        } else {
            Plane::Tangential
        }
    }

    /// The mode where the walk starts, with a placeholder in a plane that has none.
    pub fn start(&self) -> PerPlane<Beam<f64>> {
        self.planes
            .map(|plane| plane.beam.unwrap_or(Beam::new(1.0, 0.0)))
    }
}

/// The half reflection with which the walk of a standing cavity starts; nothing for a ring.
fn first_reflection(cavity: &Cavity, values: &[f64]) -> PerPlane<RayMatrix<f64>> {
    let mut first = PerPlane::both(RayMatrix::identity());
    if cavity.form() == Form::Standing {
        cavity.walk_first(values, |leg| first = leg.matrix());
    }
    debug_assert!(matches!(cavity.parts()[0].element, Element::Mirror(_)));
    first
}
