//! The beam of a mode carried once along the path: what arrives at every part, what it is inside,
//! what leaves.
//!
//! On the way back through a standing cavity the same beam runs the other way: its wavefronts
//! coincide with the end mirrors, so that every radius is the same and every curvature changes
//! its sign.

use crate::cavity::{Cavity, Element, End, Form, Piece};
use crate::numeric::Real;
use crate::optics::PerPlane;
use crate::optics::beam::Beam;
use crate::optics::element::duct::Stretch;

/// The beam at one part, in both planes, in the direction of the walk.
#[derive(Clone, Copy, Debug)]
pub struct AtPart<T> {
    /// Geometric way from the first part to this one's start, in metres.
    pub at: T,
    /// Length along the beam, in metres.
    pub length: T,
    /// The beam that arrives, still outside.
    pub arriving: PerPlane<Beam<T>>,
    /// The beam just inside the entrance.
    pub entered: PerPlane<Beam<T>>,
    /// The beam just inside the exit.
    pub at_exit: PerPlane<Beam<T>>,
    /// The beam that has left.
    pub left: PerPlane<Beam<T>>,
}

/// A stretch through a medium and the beam that enters it.
#[derive(Clone, Copy, Debug)]
pub struct Inside<T> {
    /// Index of the part it belongs to.
    pub part: usize,
    /// Way from the part's start to the stretch's, in metres.
    pub from_start: T,
    /// The stretch in either plane.
    pub stretch: PerPlane<Stretch<T>>,
    /// The beam that enters it.
    pub entering: PerPlane<Beam<T>>,
}

/// The beam along one walk of the path.
#[derive(Clone, Debug)]
pub struct Envelope<T> {
    /// One entry a part, in the order of the path.
    pub parts: Vec<AtPart<T>>,
    /// Every stretch through a medium, in the order of the walk.
    pub stretches: Vec<Inside<T>>,
    /// Gouy phase accumulated in one round trip, flips left out, in radians.
    pub gouy_phase: PerPlane<T>,
    /// Geometric length of one walk, in metres.
    pub length: T,
}

impl<T: Real> Envelope<T> {
    /// Carries the given beam along the path.
    pub fn of(cavity: &Cavity, values: &[T], start: PerPlane<Beam<T>>) -> Self {
        let count = cavity.parts().len();
        let zero = T::constant(0.0);
        let blank = AtPart {
            at: zero,
            length: zero,
            arriving: start,
            entered: start,
            at_exit: start,
            left: start,
        };
        let mut envelope = Envelope {
            parts: vec![blank; count],
            stretches: Vec::with_capacity(count),
            gouy_phase: PerPlane::both(zero),
            length: zero,
        };
        let mut beam = start;
        let mut current = None;
        cavity.walk(values, |leg| {
            let part = &mut envelope.parts[leg.part];
            if current != Some(leg.part) {
                current = Some(leg.part);
                *part = AtPart {
                    at: envelope.length,
                    length: zero,
                    arriving: beam,
                    entered: beam,
                    at_exit: beam,
                    left: beam,
                };
                if let Element::Matrix { length, .. } = cavity.parts()[leg.part].element {
                    part.length = length.of(values);
                    envelope.length = envelope.length + part.length;
                }
            }
            let matrix = leg.matrix();
            let next = beam.zip(matrix, Beam::after);
            let phase = match leg.piece {
                Piece::Stretch(stretch) => {
                    envelope.stretches.push(Inside {
                        part: leg.part,
                        from_start: part.length,
                        stretch,
                        entering: beam,
                    });
                    part.length = part.length + leg.length();
                    envelope.length = envelope.length + leg.length();
                    part.at_exit = next;
                    stretch.zip(beam, Stretch::gouy_phase)
                }
                Piece::Face(End::Entrance, _) => {
                    part.entered = next;
                    PerPlane::both(zero)
                }
                Piece::Face(End::Exit, _) => {
                    part.at_exit = beam;
                    PerPlane::both(zero)
                }
                Piece::Given(_) => {
                    part.at_exit = next;
                    beam.zip(matrix, Beam::gouy_phase)
                }
                Piece::Kick(_) | Piece::Opening => PerPlane::both(zero),
            };
            envelope.gouy_phase = envelope.gouy_phase.zip(phase, |a, b| a + b);
            part.left = next;
            beam = next;
        });
        match cavity.form() {
            // The walk ends at the first part, which is where the path begins.
            Form::Ring => envelope.parts[0].at = zero,
            Form::Standing => {
                envelope.gouy_phase = envelope.gouy_phase.map(|phase| phase * 2.0);
                // What arrives at the first mirror is what left it, on its way back.
                let first = &mut envelope.parts[0];
                first.arriving = first.left.map(Beam::reversed);
            }
        }
        envelope
    }

    /// The stretches inside one part.
    pub fn inside(&self, part: usize) -> impl Iterator<Item = &Inside<T>> {
        self.stretches.iter().filter(move |s| s.part == part)
    }

    /// The beam at the middle of a part, or at the part itself where it has no inside.
    ///
    /// A part is one stretch, or two equal ones around a lumped lens.
    pub fn at_middle(&self, part: usize) -> PerPlane<Beam<T>> {
        let mut stretches = self.inside(part);
        match (stretches.next(), stretches.next()) {
            (None, _) => self.parts[part].arriving,
            (Some(whole), None) => whole.entering.zip(whole.stretch, |beam, stretch| {
                beam.after(stretch.part(0.5).matrix())
            }),
            (Some(_), Some(second)) => second.entering,
        }
    }
}
