//! The walk along the path, prepared: what does not vary is multiplied out once.
//!
//! Most of what does vary acts linearly: a gap's length, a curvature, a lens's power. What one unit
//! of it does is taken from the walk itself at preparation; everything else is walked anew.

use super::Workspace;
use crate::cavity::{Cavity, Element, End, Leg, Piece, Slot};
use crate::numeric::Real;
use crate::optics::PerPlane;
use crate::optics::element::duct::Stretch;
use crate::optics::ray::RayMatrix;

/// One step of the prepared walk.
#[derive(Clone, Copy, Debug)]
pub(super) enum Step {
    /// Keeps the ray matrices from the start to here.
    Keep,
    /// Parts that do not vary, as one matrix.
    Fixed(PerPlane<RayMatrix<f64>>),
    /// A gap of a varied length, times what one metre of it is in reduced length.
    Length { length: Slot, reduced: f64 },
    /// A thin part of varied power, and what one 1/m of it adds to the reduced angle per height.
    Kick {
        power: PerPlane<Slot>,
        effect: PerPlane<f64>,
    },
    /// A part that is walked anew each time; of an end mirror, half. What is met inside is kept
    /// where it is asked about.
    Part {
        index: usize,
        share: f64,
        inside: Option<usize>,
    },
}

/// Stretches of a part and ray matrices to where each begins.
type Reached<T> = (PerPlane<Stretch<T>>, PerPlane<RayMatrix<T>>);

/// What the beam meets inside a part, with the ray matrices from some place before it.
#[derive(Clone, Copy, Debug)]
pub(super) struct Inside<T> {
    /// To just behind its entrance.
    pub(super) entered: PerPlane<RayMatrix<T>>,
    /// One stretch, or two around a lumped lens.
    pub(super) stretches: [Option<Reached<T>>; 2],
}

impl<T: Real> Inside<T> {
    #[inline(always)]
    fn at_start(before: PerPlane<RayMatrix<T>>) -> Self {
        Inside {
            entered: before,
            stretches: [None; 2],
        }
    }

    #[inline(always)]
    fn note(&mut self, leg: &Leg<T>, before: PerPlane<RayMatrix<T>>) {
        match &leg.piece {
            Piece::Face(End::Entrance, _) => self.entered = leg.after(before),
            Piece::Stretch(stretch) => {
                let free = usize::from(self.stretches[0].is_some());
                self.stretches[free] = Some((*stretch, before));
            }
            _ => {}
        }
    }
}

/// Where to look for what a part has inside.
#[derive(Clone, Copy, Debug)]
#[expect(
    clippy::large_enum_variant,
    reason = "there are few of them, and each evaluation reads them in place"
)]
pub(super) enum Within {
    /// It is thin.
    Nothing,
    /// Nothing of it varies; matrices from the part's start.
    Fixed(Inside<f64>),
    /// Kept by the walk under this number; matrices from the start of the walk.
    Walked(usize),
}

/// The prepared walk.
#[derive(Clone, Debug)]
pub(super) struct Route {
    pub(super) steps: Vec<Step>,
    /// What the parts that are asked about have inside, in the order in which they are kept.
    pub(super) watched: Vec<Within>,
    /// For each part of the cavity, its place among those that are asked about.
    pub(super) places: Vec<usize>,
    /// Number of parts whose inside the walk keeps.
    walked_inside: usize,
}

impl Route {
    /// Prepares the walk for values that differ from the nominal ones in some slots only, `None`
    /// meaning any; `watched` tells which parts are asked about.
    pub(super) fn new(
        cavity: &Cavity,
        moves: Option<&[Slot]>,
        watched: impl Fn(usize) -> bool,
    ) -> Route {
        let mut route = Route {
            steps: Vec::new(),
            watched: Vec::new(),
            places: vec![0; cavity.parts().len()],
            walked_inside: 0,
        };
        let values = cavity.book().nominal();
        for (index, share) in cavity.walk_order() {
            let part = &cavity.parts()[index];
            let moving: Vec<Slot> = match moves {
                None => Vec::new(),
                Some(moves) => part
                    .ray_slots()
                    .into_iter()
                    .filter(|slot| moves.contains(slot))
                    .collect(),
            };
            let varies = moves.is_none() || !moving.is_empty();
            let mut inside = None;
            if watched(index) {
                let within = if part.inside().is_none() {
                    Within::Nothing
                } else if varies {
                    inside = Some(route.walked_inside);
                    route.walked_inside += 1;
                    Within::Walked(route.walked_inside - 1)
                } else {
                    let mut product = PerPlane::both(RayMatrix::identity());
                    let mut inside = Inside::at_start(product);
                    cavity.walk_part(index, share, &values, &mut |leg| {
                        inside.note(&leg, product);
                        product = leg.after(product);
                    });
                    Within::Fixed(inside)
                };
                route.places[index] = route.watched.len();
                route.watched.push(within);
                route.steps.push(Step::Keep);
            }
            if !varies {
                route.fold(cavity, index, share, &values);
                continue;
            }
            let linear = match (moves, inside) {
                (Some(_), None) => linear(cavity, index, share, &values, &moving),
                _ => None,
            };
            route.steps.push(linear.unwrap_or(Step::Part {
                index,
                share,
                inside,
            }));
        }
        route
    }

    /// Adds a part that does not vary.
    fn fold(&mut self, cavity: &Cavity, index: usize, share: f64, values: &[f64]) {
        let identity = PerPlane::both(RayMatrix::identity());
        let mut product = match self.steps.last() {
            Some(Step::Fixed(before)) => *before,
            _ => identity,
        };
        cavity.walk_part(index, share, values, &mut |leg| {
            product = leg.after(product);
        });
        if matches!(self.steps.last(), Some(Step::Fixed(_))) {
            self.steps.pop();
        }
        if product != identity {
            self.steps.push(Step::Fixed(product));
        }
    }

    /// Walks; the workspace keeps what is asked about.
    #[inline(always)]
    pub(super) fn walk<T: Real>(
        &self,
        cavity: &Cavity,
        values: &[T],
        workspace: &mut Workspace<T>,
    ) -> PerPlane<RayMatrix<T>> {
        let mut product = PerPlane::both(RayMatrix::identity());
        workspace.kept.clear();
        workspace
            .inside
            .resize(self.walked_inside, Inside::at_start(product));
        for step in &self.steps {
            match step {
                Step::Keep => workspace.kept.push(product),
                Step::Fixed(fixed) => {
                    product = product.then_fixed(*fixed);
                }
                Step::Length { length, reduced } => {
                    let reduced = length.of(values) * *reduced;
                    product = product.propagated(reduced);
                }
                Step::Kick { power, effect } => {
                    let kick = PerPlane {
                        tangential: power.tangential.of(values) * effect.tangential,
                        sagittal: power.sagittal.of(values) * effect.sagittal,
                    };
                    product = product.kicked(kick);
                }
                Step::Part {
                    index,
                    share,
                    inside,
                } => {
                    let inside = inside.map(|number| &mut workspace.inside[number]);
                    product = walk_anew(cavity, *index, *share, values, product, inside);
                }
            }
        }
        product
    }
}

/// Walks one part. A call of its own: what is inlined is compiled for every set of instructions.
#[inline(never)]
fn walk_anew<T: Real>(
    cavity: &Cavity,
    index: usize,
    share: f64,
    values: &[T],
    before: PerPlane<RayMatrix<T>>,
    mut inside: Option<&mut Inside<T>>,
) -> PerPlane<RayMatrix<T>> {
    let mut product = before;
    if let Some(inside) = &mut inside {
        **inside = Inside::at_start(before);
    }
    cavity.walk_part(index, share, values, &mut |leg| {
        if let Some(inside) = &mut inside {
            inside.note(&leg, product);
        }
        product = leg.after(product);
    });
    product
}

/// The step of a part of which only a length or powers vary, on which it depends linearly.
fn linear(
    cavity: &Cavity,
    index: usize,
    share: f64,
    values: &[f64],
    moving: &[Slot],
) -> Option<Step> {
    let only = |slots: &[Slot]| moving.iter().all(|slot| slots.contains(slot));
    let with_one = |slots: &[Slot]| {
        let mut values = values.to_vec();
        for slot in slots {
            values[slot.index()] = 1.0;
        }
        let mut piece = None;
        cavity.walk_part(index, share, &values, &mut |leg| piece = Some(leg.piece));
        piece
    };
    let power = match &cavity.parts()[index].element {
        Element::Gap { length, .. } if only(&[*length]) => {
            let Some(Piece::Stretch(stretch)) = with_one(&[*length]) else {
                return None;
            };
            return Some(Step::Length {
                length: *length,
                reduced: 1.0 / stretch.tangential.index,
            });
        }
        Element::Mirror(mirror) => mirror.curvature,
        Element::Lens { power, .. } => *power,
        _ => return None,
    };
    let slots = [power.tangential, power.sagittal];
    match with_one(&slots) {
        Some(Piece::Kick(effect)) if only(&slots) => Some(Step::Kick { power, effect }),
        _ => None,
    }
}
