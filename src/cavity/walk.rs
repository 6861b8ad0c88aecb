//! One walk along the path: every part as the ray matrices a beam meets, in order.
//!
//! The path is walked one way. A ring starts just behind its first part and ends behind it again.
//! A standing cavity starts and ends in the middle of an end mirror's reflection, each end
//! contributing half its power, C = −n/R; the way back is the same walk reversed.
//! Flips of the axes are left out; [`Cavity::flips`] counts them.

use super::Cavity;
use super::part::{Element, Incidence, Mirror, Part, Slab, ThermalLens, ThermalPlace};
use crate::numeric::Real;
use crate::optics::PerPlane;
use crate::optics::element::duct::Stretch;
use crate::optics::element::mirror;
use crate::optics::element::surface::Crossing;
use crate::optics::ray::RayMatrix;

/// What a leg of the walk does to rays, in the file's planes, flips left out.
#[derive(Clone, Copy, Debug)]
pub enum Piece<T> {
    /// A thin element that adds C·x to the reduced angle, C in 1/m: a mirror (half of it at the
    /// end of a standing cavity), a lens, a lumped thermal lens.
    Kick(PerPlane<T>),
    /// A face of a slab.
    Face(End, PerPlane<RayMatrix<T>>),
    /// A stretch through a medium; lengths and index are the same in both planes.
    Stretch(PerPlane<Stretch<T>>),
    /// A given matrix.
    Given(PerPlane<RayMatrix<T>>),
    /// Nothing: an opening.
    Opening,
}

/// Which face of a slab.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum End {
    /// The one through which the walk enters.
    Entrance,
    /// The one through which it leaves.
    Exit,
}

/// One leg of the walk.
#[derive(Clone, Copy, Debug)]
pub struct Leg<T> {
    /// Index of the part it belongs to.
    pub part: usize,
    /// What it does.
    pub piece: Piece<T>,
}

impl<T: Real> Leg<T> {
    /// Length along the beam, in metres; zero for what is thin.
    #[inline(always)]
    pub fn length(&self) -> T {
        match &self.piece {
            Piece::Stretch(s) => s.tangential.length,
            _ => T::constant(0.0),
        }
    }

    /// Its ray matrices.
    #[inline(always)]
    pub fn matrix(&self) -> PerPlane<RayMatrix<T>> {
        self.after(PerPlane::both(RayMatrix::identity()))
    }

    /// Ray matrices followed by this leg.
    #[inline(always)]
    pub fn after(&self, before: PerPlane<RayMatrix<T>>) -> PerPlane<RayMatrix<T>> {
        match self.piece {
            Piece::Kick(c) => before.kicked(c),
            Piece::Stretch(stretch) => match stretch.tangential.strength_squared {
                None => {
                    let reduced = stretch.tangential.length / stretch.tangential.index;
                    before.propagated(reduced)
                }
                Some(_) => PerPlane {
                    tangential: stretch.tangential.after(before.tangential),
                    sagittal: stretch.sagittal.after(before.sagittal),
                },
            },
            Piece::Face(_, m) | Piece::Given(m) => before.then(m),
            Piece::Opening => before,
        }
    }
}

impl Cavity {
    /// Walks the path once, one way, with the given values in the address book's slots.
    pub fn walk<T: Real>(&self, values: &[T], mut visit: impl FnMut(Leg<T>)) {
        for (part, share) in self.walk_order() {
            self.walk_part(part, share, values, &mut visit);
        }
    }

    /// The parts in the order of the walk, with the share of each that counts.
    pub(crate) fn walk_order(&self) -> impl Iterator<Item = (usize, f64)> + use<> {
        let count = self.parts.len();
        let ring = self.is_ring();
        (0..count).map(move |step| {
            let is_end = step == 0 || step + 1 == count;
            match ring {
                true => ((step + 1) % count, 1.0),
                false => (step, if is_end { 0.5 } else { 1.0 }),
            }
        })
    }

    /// Geometric way from the first part to another one's start, in metres.
    pub(crate) fn way_to<T: Real>(&self, part: usize, values: &[T]) -> T {
        let mut sum = T::constant(0.0);
        for index in 0..part {
            if let Element::Matrix { length, .. } = self.parts[index].element {
                sum = sum + length.of(values);
            }
            self.walk_part(index, 1.0, values, &mut |leg| sum = sum + leg.length());
        }
        sum
    }

    /// The half reflection with which the walk of a standing cavity starts.
    pub(crate) fn walk_first<T: Real>(&self, values: &[T], mut visit: impl FnMut(Leg<T>)) {
        self.walk_part(0, 0.5, values, &mut visit);
    }

    /// The product of all matrices of the walk.
    pub fn one_way<T: Real>(&self, values: &[T]) -> PerPlane<RayMatrix<T>> {
        let mut product = PerPlane::both(RayMatrix::identity());
        self.walk(values, |leg| {
            product = leg.after(product);
        });
        product
    }

    /// Walks the feed from its start to the input mirror's outer face; a leg's part is counted in
    /// the feed.
    pub fn walk_feed<T: Real>(&self, values: &[T], mut visit: impl FnMut(Leg<T>)) {
        for (index, part) in self.feed.iter().enumerate() {
            part.walk(index, 1.0, values, &mut visit);
        }
    }

    /// The product of all matrices of the feed; nothing happens without one.
    pub fn feed_way<T: Real>(&self, values: &[T]) -> PerPlane<RayMatrix<T>> {
        let mut product = PerPlane::both(RayMatrix::identity());
        self.walk_feed(values, |leg| {
            product = leg.after(product);
        });
        product
    }

    /// The legs of one part; `share` is the part of a mirror's power that counts.
    #[inline(always)]
    pub(crate) fn walk_part<T: Real>(
        &self,
        index: usize,
        share: f64,
        values: &[T],
        visit: &mut impl FnMut(Leg<T>),
    ) {
        self.parts[index].walk(index, share, values, visit);
    }
}

impl Part {
    /// Its legs, under the given index; `share` is the part of a mirror's power that counts.
    #[inline(always)]
    fn walk<T: Real>(
        &self,
        index: usize,
        share: f64,
        values: &[T],
        visit: &mut impl FnMut(Leg<T>),
    ) {
        // Gathered first, so that there is one place only from which `visit` is called: it is large,
        // and inlined.
        let (pieces, count) = self.pieces(share, values);
        for piece in &pieces[..count] {
            visit(Leg {
                part: index,
                piece: *piece,
            });
        }
    }

    #[inline(always)]
    fn pieces<T: Real>(&self, share: f64, values: &[T]) -> Pieces<T> {
        let mut pieces = [Piece::Opening; MOST_PIECES];
        pieces[0] = match &self.element {
            Element::Mirror(mirror) => {
                let power = mirror_power(mirror, self.swapped, self.before.phase(values), values);
                Piece::Kick(power.map(|p| p * -share))
            }
            Element::Gap { length, medium } => {
                let stretch = Stretch::uniform(length.of(values), medium.phase(values));
                Piece::Stretch(PerPlane::both(stretch))
            }
            Element::Lens { power, .. } => Piece::Kick(power.map(|slot| -slot.of(values))),
            Element::Slab(slab) => {
                let outside = self.before.phase(values);
                return slab_pieces(slab, self.swapped, outside, values);
            }
            Element::Duct {
                length,
                index,
                strength,
                antiguiding,
            } => {
                let sign = if *antiguiding { -1.0 } else { 1.0 };
                Piece::Stretch(strength.map(|slot| Stretch {
                    length: length.of(values),
                    index: index.phase(values),
                    strength_squared: Some(slot.of(values).squared() * sign),
                }))
            }
            Element::Aperture => Piece::Opening,
            Element::Matrix { entries, .. } => {
                Piece::Given(entries.map(|[a, b, c, d]| RayMatrix { a, b, c, d }.map(T::constant)))
            }
        };
        (pieces, 1)
    }
}

/// A slab with a lens at its middle: two faces, two stretches, a kick.
const MOST_PIECES: usize = 5;

/// What a part does, and how many of the pieces count.
type Pieces<T> = ([Piece<T>; MOST_PIECES], usize);

/// Dioptric power of a mirror in the file's planes.
#[inline(always)]
fn mirror_power<T: Real>(mirror: &Mirror, swapped: bool, index: T, values: &[T]) -> PerPlane<T> {
    let own = |pair: PerPlane<T>| if swapped { pair.swapped() } else { pair };
    let curvature = own(mirror.curvature.map(|slot| slot.of(values)));
    own(mirror::power(
        curvature,
        mirror.incidence.of(values).cos(),
        index,
    ))
}

/// How the beam crosses a slab's entrance face, from a medium of index `outside`.
#[inline(always)]
pub(crate) fn slab_crossing<T: Real>(slab: &Slab, outside: T, values: &[T]) -> Crossing<T> {
    let inside = slab.index.phase(values);
    match slab.incidence {
        Incidence::Brewster => Crossing::at_brewster(outside, inside),
        Incidence::Angle(slot) => Crossing::at_incidence(outside, inside, slot.of(values)),
    }
}

#[inline(always)]
fn slab_pieces<T: Real>(slab: &Slab, swapped: bool, outside: T, values: &[T]) -> Pieces<T> {
    let own = |pair: PerPlane<RayMatrix<T>>| if swapped { pair.swapped() } else { pair };
    let crossing = slab_crossing(slab, outside, values);
    let path = slab.thickness.of(values) / crossing.cos_to;
    let uniform = Stretch::uniform(path, crossing.index_to);

    // Convex from outside: the entrance has its centre on the far side, the exit on the near side.
    let entrance = PerPlane::both(slab.entrance.of(values));
    let exit = PerPlane::both(-slab.exit.of(values));
    let entrance = Piece::Face(End::Entrance, own(crossing.matrices(entrance)));
    let exit = Piece::Face(End::Exit, own(crossing.reversed().matrices(exit)));

    let nothing = Piece::Opening;
    let whole = Piece::Stretch(PerPlane::both(uniform));
    let half = Piece::Stretch(PerPlane::both(uniform.part(0.5)));
    let Some(lens) = &slab.thermal else {
        return ([entrance, whole, exit, nothing, nothing], 3);
    };
    let power = thermal_power(lens, values);
    let kick = Piece::Kick(power.map(|p| -p));
    match lens.place {
        ThermalPlace::Spread => {
            let spread = Piece::Stretch(power.map(|p| Stretch {
                strength_squared: Some(p / (crossing.index_to * path)),
                ..uniform
            }));
            ([entrance, spread, exit, nothing, nothing], 3)
        }
        ThermalPlace::Entrance => ([entrance, kick, whole, exit, nothing], 4),
        ThermalPlace::Middle => ([entrance, half, kick, half, exit], 5),
        ThermalPlace::Exit => ([entrance, whole, kick, exit, nothing], 4),
    }
}

/// Power of a thermal lens in the file's planes, in 1/m.
#[inline(always)]
fn thermal_power<T: Real>(lens: &ThermalLens, values: &[T]) -> PerPlane<T> {
    let zero = PerPlane::both(T::constant(0.0));
    let fixed = lens
        .power
        .map_or(zero, |power| power.map(|slot| slot.of(values)));
    let pump = Cavity::PUMP.of(values);
    let pumped = lens
        .power_per_watt
        .map_or(zero, |power| power.map(|slot| slot.of(values) * pump));
    fixed.zip(pumped, |a, b| a + b)
}
