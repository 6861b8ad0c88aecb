//! A cavity: its parts in the order in which the beam meets them, and the numbers behind them.
//!
//! [`Cavity::assemble`] is the only way to one; it checks what no single part can know (media,
//! ends, the frame carried around) and settles what follows from the order of the parts.

mod assemble;
mod book;
mod frame;
mod measure;
mod part;
mod settle;
mod source;
mod tolerancing;
mod walk;

pub use assemble::{Draft, Fault};
pub use book::{Book, Entry, Origin, Slot, Tie};
pub use measure::{Bounds, HIGHEST_ORDER, Limit, Measure, MeasureError, Presence};
pub use part::{
    Coating, Element, Incidence, Index, Mirror, Opening, Part, Polarisation, Side, Slab, SlabLoss,
    Substrate, ThermalLens, ThermalPlace,
};
pub use source::{Source, SourceBeam};
pub use tolerancing::{Adjust, Group, MOST_TOLERANCED, Shape, Tolerancing};
pub(crate) use walk::slab_crossing;
pub use walk::{End, Leg, Piece};

use crate::numeric::Dual;
use crate::optics::{PerPlane, Plane};

/// How the path closes.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Form {
    /// From one end mirror to the other and back.
    Standing,
    /// The last part returns to the first.
    Ring,
}

impl Form {
    /// The form's name in files.
    pub fn name(self) -> &'static str {
        match self {
            Form::Standing => "standing",
            Form::Ring => "ring",
        }
    }
}

/// A cavity, validated.
#[derive(Clone, Debug)]
pub struct Cavity {
    /// What the builder calls it.
    pub title: Option<String>,
    /// What must hold for the build to be good.
    pub limits: Vec<Limit>,
    /// How the light is polarised.
    pub polarisation: Polarisation,
    /// Highest order of the transverse modes that count.
    pub highest_order: usize,
    /// How quantities lie within their spreads, and what is adjusted.
    pub tolerancing: Tolerancing,
    /// Index of the mirror by which the source enters; the first, unless another is named.
    pub input: usize,
    /// The beam that is sent in, where one is written.
    pub source: Option<Source>,
    /// The optics between the source and the input mirror's outer face, as the beam meets them.
    ///
    /// Their media and planes are settled as a path's are, with the ambient at either end; their
    /// numbers are in the book, and belong to no part of the path.
    pub feed: Vec<Part>,
    /// Modulation frequencies of the source, in hertz, above zero; both signs are meant.
    pub sidebands: Vec<f64>,
    form: Form,
    parts: Vec<Part>,
    book: Book,
    ambient: Index,
    flips: PerPlane<u32>,
    tangential_is_horizontal: bool,
    cautions: Vec<String>,
}

impl Cavity {
    /// Slot of the vacuum wavelength, in metres.
    pub const WAVELENGTH: Slot = Slot(0);
    /// Slot of the temperature, in kelvin.
    pub const TEMPERATURE: Slot = Slot(1);
    /// Slot of the pump power, in watts.
    pub const PUMP: Slot = Slot(2);

    /// How the path closes.
    pub fn form(&self) -> Form {
        self.form
    }

    /// Whether it is a ring.
    pub fn is_ring(&self) -> bool {
        self.form == Form::Ring
    }

    /// The parts in the order in which the beam meets them.
    pub fn parts(&self) -> &[Part] {
        &self.parts
    }

    /// Index of the part with the given name.
    pub fn part_named(&self, name: &str) -> Option<usize> {
        self.parts.iter().position(|part| part.name == name)
    }

    /// Every number under its address.
    pub fn book(&self) -> &Book {
        &self.book
    }

    /// The medium of whatever names none, and of the beams that leave.
    pub fn ambient(&self) -> Index {
        self.ambient
    }

    /// How often each axis of the carried frame is flipped in one round trip.
    ///
    /// Each reflection flips the axis in its own plane of incidence; a frame that comes back
    /// rolled by half a turn counts once more for each axis. A standing cavity flips each axis an
    /// even number of times.
    pub fn flips(&self) -> PerPlane<u32> {
        self.flips
    }

    /// Whether the file's tangential plane is the horizontal one of the carried frame.
    pub fn tangential_is_horizontal(&self) -> bool {
        self.tangential_is_horizontal
    }

    /// Number of reflections in one round trip.
    pub fn reflections(&self) -> u32 {
        let mirrors = self.mirrors() as u32;
        match self.form {
            Form::Ring => mirrors,
            Form::Standing => 2 * (mirrors - 1),
        }
    }

    /// Doubts about the file that do not keep it from being used.
    pub fn cautions(&self) -> &[String] {
        &self.cautions
    }

    /// Whether the round trip of rays depends on a number at its nominal place, tied ones included.
    pub fn moves_rays(&self, slot: Slot) -> bool {
        let nominal: Vec<_> = self.book.nominal();
        let mut values: Vec<Dual<f64>> = nominal.iter().map(|&v| Dual::fixed(v)).collect();
        values[slot.index()] = Dual::variable(nominal[slot.index()]);
        self.book.follow_ties(&mut values);
        let way = self.one_way(&values);
        Plane::BOTH.into_iter().any(|plane| {
            let m = way[plane];
            [m.a, m.b, m.c, m.d].iter().any(|x| x.slope != 0.0)
        })
    }

    fn mirrors(&self) -> usize {
        self.parts
            .iter()
            .filter(|part| matches!(part.element, Element::Mirror(_)))
            .count()
    }
}
