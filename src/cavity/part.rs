//! The parts of a cavity: what they are made of, with every number behind a slot.

use super::Cavity;
use super::book::Slot;
use crate::numeric::Real;
use crate::optics::PerPlane;
use crate::optics::material::Axis;

/// To which side a beam is turned or displaced, as a pilot flying along it sees it.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Side {
    /// In the horizontal plane, to the left.
    Left,
    /// In the horizontal plane, to the right.
    Right,
    /// In the vertical plane, upwards.
    Up,
    /// In the vertical plane, downwards.
    Down,
}

impl Side {
    /// Whether the beam stays in the frame's horizontal plane.
    pub fn is_horizontal(self) -> bool {
        matches!(self, Side::Left | Side::Right)
    }

    /// The side's name in files.
    pub fn name(self) -> &'static str {
        match self {
            Side::Left => "left",
            Side::Right => "right",
            Side::Up => "up",
            Side::Down => "down",
        }
    }
}

/// Refractive index of a medium.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Index {
    /// A number that is not varied, such as the ambient's.
    Fixed {
        /// Phase index.
        phase: f64,
        /// Group index, where it is known.
        group: Option<f64>,
    },
    /// Numbers of the address book.
    Slots {
        /// Phase index.
        phase: Slot,
        /// Group index, where it is given.
        group: Option<Slot>,
    },
    /// A material of the catalogue, at the cavity's wavelength.
    Material {
        /// Its principal direction along which the light is polarised.
        axis: &'static Axis,
        /// Its temperature, in kelvin.
        temperature: Slot,
    },
}

impl Index {
    /// Empty space.
    pub const VACUUM: Index = Index::Fixed {
        phase: 1.0,
        group: Some(1.0),
    };

    /// The phase index.
    #[inline(always)]
    pub fn phase<T: Real>(self, values: &[T]) -> T {
        match self {
            Index::Fixed { phase, .. } => T::constant(phase),
            Index::Slots { phase, .. } => phase.of(values),
            Index::Material { axis, temperature } => {
                axis.index(Cavity::WAVELENGTH.of(values), temperature.of(values))
            }
        }
    }

    /// The group index, or the phase index where it is not known.
    #[inline(always)]
    pub fn group<T: Real>(self, values: &[T]) -> T {
        match self {
            Index::Fixed {
                group: Some(group), ..
            } => T::constant(group),
            Index::Slots {
                group: Some(group), ..
            } => group.of(values),
            Index::Material { axis, temperature } => {
                axis.group_index(Cavity::WAVELENGTH.of(values), temperature.of(values))
            }
            _ => self.phase(values),
        }
    }

    /// Whether rays see no difference between two media.
    pub fn bends_like(self, other: Index, values: &[f64]) -> bool {
        self.phase(values) == other.phase(values)
    }

    /// Whether the group index is known.
    pub fn has_group(self) -> bool {
        matches!(
            self,
            Index::Fixed { group: Some(_), .. }
                | Index::Slots { group: Some(_), .. }
                | Index::Material { .. }
        )
    }
}

/// Angle at which the beam meets a slab.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Incidence {
    /// A given angle, in radians.
    Angle(Slot),
    /// Brewster's angle, whatever the indices are.
    Brewster,
}

/// What a mirror's coating does with the power, as far as it is written.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub struct Coating {
    /// Power reflectance.
    pub reflectance: Option<Slot>,
    /// Power transmission.
    pub transmission: Option<Slot>,
    /// Power lost in the coating.
    pub loss: Option<Slot>,
}

impl Coating {
    /// Whether nothing is written about it.
    pub fn is_unknown(&self) -> bool {
        *self == Coating::default()
    }

    /// Power reflectance; all of it where nothing is written about the coating.
    ///
    /// Loss alone, or with it the transmission, leaves the rest.
    pub fn reflectance<T: Real>(&self, values: &[T]) -> T {
        let share = |slot: Option<Slot>| slot.map_or(T::constant(0.0), |slot| slot.of(values));
        match self.reflectance {
            Some(slot) => slot.of(values),
            None => (-(share(self.transmission) + share(self.loss)) + 1.0).max(T::constant(0.0)),
        }
    }

    /// Power transmission; `None` where nothing is written about the coating.
    ///
    /// Two of the three name the third; reflectance or transmission alone leaves no loss; loss
    /// alone leaves no transmission.
    pub fn transmission<T: Real>(&self, values: &[T]) -> Option<T> {
        let rest = |taken: T| (-taken + 1.0).max(T::constant(0.0));
        let loss = self.loss.map_or(T::constant(0.0), |slot| slot.of(values));
        match (self.transmission, self.reflectance, self.loss) {
            (Some(slot), _, _) => Some(slot.of(values)),
            (None, Some(slot), _) => Some(rest(slot.of(values) + loss)),
            (None, None, Some(_)) => Some(T::constant(0.0)),
            (None, None, None) => None,
        }
    }
}

/// The body behind a mirror's coated face.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Substrate {
    /// Its index.
    pub index: Index,
    /// Thickness square to the faces, in metres.
    pub thickness: Slot,
    /// Curvature of the outer face, in 1/m, positive where it is convex as seen from outside.
    pub back: Slot,
}

/// Where along a slab its thermal lens acts.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum ThermalPlace {
    /// A quadratic index along the whole path.
    Spread,
    /// A thin lens just behind the entrance face.
    Entrance,
    /// A thin lens half-way.
    Middle,
    /// A thin lens just before the exit face.
    Exit,
}

/// The thermal lens of a slab: dioptric power inside, per single pass, converging positive.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct ThermalLens {
    /// Power in either plane, in 1/m.
    pub power: Option<PerPlane<Slot>>,
    /// Power per watt of pump, in 1/m; it adds to `power`.
    pub power_per_watt: Option<PerPlane<Slot>>,
    /// Where it acts.
    pub place: ThermalPlace,
}

/// Across which of its planes the light is polarised.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Polarisation {
    /// Across the file's tangential plane.
    S,
    /// Along it.
    P,
}

impl Polarisation {
    /// Its name in files.
    pub fn name(self) -> &'static str {
        match self {
            Polarisation::S => "s",
            Polarisation::P => "p",
        }
    }

    /// The one square to it.
    pub fn other(self) -> Polarisation {
        match self {
            Polarisation::S => Polarisation::P,
            Polarisation::P => Polarisation::S,
        }
    }
}

/// A mirror.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Mirror {
    /// Curvature 1/R in the file's planes, in 1/m, concave positive.
    pub curvature: PerPlane<Slot>,
    /// Angle of incidence, in radians.
    pub incidence: Slot,
    /// To which side it turns the beam, where that is named.
    pub fold: Option<Side>,
    /// What its coating does with light polarised across the mirror's plane of incidence (`s`)…
    pub coating_s: Coating,
    /// … and along it (`p`).
    pub coating_p: Coating,
    /// The body behind it.
    pub substrate: Option<Substrate>,
}

/// How a slab's loss is written.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum SlabLoss {
    /// A share of the power in each pass.
    PerPass(Slot),
    /// An attenuation α in 1/m: 1 − exp(−αℓ) is lost along the path ℓ inside.
    PerLength(Slot),
}

/// A plate, rod or crystal with two faces.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Slab {
    /// Thickness square to the faces, in metres.
    pub thickness: Slot,
    /// Its index.
    pub index: Index,
    /// Angle at which the beam meets the entrance face.
    pub incidence: Incidence,
    /// To which side the tilted slab displaces the beam.
    pub shift: Side,
    /// Curvature of the entrance face, in 1/m, positive where convex as seen from outside.
    pub entrance: Slot,
    /// Curvature of the exit face, in 1/m, positive where convex as seen from outside.
    pub exit: Slot,
    /// Its thermal lens.
    pub thermal: Option<ThermalLens>,
    /// Power lost in one pass.
    pub loss: Option<SlabLoss>,
}

/// What a part does to the beam.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Element {
    /// A mirror.
    Mirror(Mirror),
    /// Free space.
    Gap {
        /// Length, in metres.
        length: Slot,
        /// What fills it.
        medium: Index,
    },
    /// A thin lens.
    Lens {
        /// Dioptric power 1/f in the file's planes, in 1/m.
        power: PerPlane<Slot>,
        /// Power lost in one pass.
        loss: Option<Slot>,
    },
    /// A slab.
    Slab(Slab),
    /// A duct with flat faces square to the beam.
    Duct {
        /// Length, in metres.
        length: Slot,
        /// Index on the axis.
        index: Index,
        /// γ in the file's planes, in 1/m.
        strength: PerPlane<Slot>,
        /// Whether it defocuses: γ² counts as negative.
        antiguiding: bool,
    },
    /// An opening, transparent to rays.
    Aperture,
    /// A ray matrix given as it is, in reduced coordinates and the file's planes.
    Matrix {
        /// A, B, C, D in either plane, in metres.
        entries: PerPlane<[f64; 4]>,
        /// Length it stands for, geometric and optical, in metres.
        length: Slot,
    },
}

/// The free opening of a part, before any share of it counts as unusable; in metres.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Opening {
    /// A round one.
    Round {
        /// Diameter.
        diameter: Slot,
    },
    /// A rectangular one.
    Rectangle {
        /// Full width, in the horizontal plane of the carried frame.
        width: Slot,
        /// Full height, square to it.
        height: Slot,
    },
    /// A round hole given by its radius.
    Hole {
        /// Radius.
        radius: Slot,
    },
    /// A slit: it limits one plane of the file only.
    Slit {
        /// Half its width.
        half_width: Slot,
        /// The plane it limits.
        plane: crate::optics::Plane,
    },
}

/// One part of a cavity.
#[derive(Clone, Debug, PartialEq)]
pub struct Part {
    /// Its name, unique in the cavity.
    pub name: String,
    /// What it does to the beam.
    pub element: Element,
    /// Whether its own plane of incidence is the file's sagittal plane.
    pub swapped: bool,
    /// The medium in which the beam arrives.
    pub before: Index,
    /// The medium into which it leaves; a slab's or gap's own medium lies between.
    pub after: Index,
    /// Its opening, where one is given.
    pub opening: Option<Opening>,
    /// Share of the opening's width that may be used, from 0 to 1.
    pub clear: f64,
}

impl Mirror {
    /// The coating as the light meets it: a mirror that folds in the other plane meets light
    /// polarised across the file's tangential plane along its own.
    pub fn coating(&self, swapped: bool, polarisation: Polarisation) -> &Coating {
        if (polarisation == Polarisation::P) != swapped {
            &self.coating_p
        } else {
            &self.coating_s
        }
    }
}

impl Slab {
    /// Whether the beam meets it at an angle.
    pub fn is_tilted(&self, values: &[f64]) -> bool {
        match self.incidence {
            Incidence::Brewster => true,
            Incidence::Angle(slot) => slot.of(values) != 0.0,
        }
    }
}

impl Index {
    fn slots(self) -> [Option<Slot>; 2] {
        match self {
            Index::Fixed { .. } => [None; 2],
            Index::Slots { phase, group } => [Some(phase), group],
            Index::Material { temperature, .. } => [Some(Cavity::WAVELENGTH), Some(temperature)],
        }
    }
}

impl Part {
    /// The medium inside a part that has a length; of a given matrix, what follows it.
    pub fn inside(&self) -> Option<Index> {
        match &self.element {
            Element::Gap { medium, .. } => Some(*medium),
            Element::Slab(slab) => Some(slab.index),
            Element::Duct { index, .. } => Some(*index),
            Element::Matrix { .. } => Some(self.after),
            _ => None,
        }
    }

    /// Whether the beam inside is bent along its way and so has no single waist.
    pub fn bends_inside(&self) -> bool {
        match &self.element {
            Element::Duct { .. } => true,
            Element::Slab(slab) => slab.thermal.is_some(),
            _ => false,
        }
    }

    /// The slots on which the part's ray matrices depend.
    pub fn ray_slots(&self) -> Vec<Slot> {
        let pair = |pair: PerPlane<Slot>| [Some(pair.tangential), Some(pair.sagittal)];
        let mut slots: Vec<Option<Slot>> = self.before.slots().into();
        slots.extend(self.after.slots());
        match &self.element {
            Element::Mirror(mirror) => {
                slots.push(Some(mirror.incidence));
                slots.extend(pair(mirror.curvature));
            }
            Element::Gap { length, medium } => {
                slots.push(Some(*length));
                slots.extend(medium.slots());
            }
            Element::Lens { power, .. } => slots.extend(pair(*power)),
            Element::Slab(slab) => {
                slots.extend([slab.thickness, slab.entrance, slab.exit].map(Some));
                slots.extend(slab.index.slots());
                if let Incidence::Angle(slot) = slab.incidence {
                    slots.push(Some(slot));
                }
                if let Some(lens) = &slab.thermal {
                    slots.extend(lens.power.into_iter().flat_map(pair));
                    if let Some(per_watt) = lens.power_per_watt {
                        slots.extend(pair(per_watt));
                        slots.push(Some(Cavity::PUMP));
                    }
                }
            }
            Element::Duct {
                length,
                index,
                strength,
                ..
            } => {
                slots.push(Some(*length));
                slots.extend(index.slots());
                slots.extend(pair(*strength));
            }
            Element::Aperture => {}
            Element::Matrix { length, .. } => slots.push(Some(*length)),
        }
        slots.into_iter().flatten().collect()
    }

    /// The part's kind, as files name it.
    pub fn kind(&self) -> &'static str {
        match self.element {
            Element::Mirror(_) => "mirror",
            Element::Gap { .. } => "gap",
            Element::Lens { .. } => "lens",
            Element::Slab(_) => "slab",
            Element::Duct { .. } => "duct",
            Element::Aperture => "aperture",
            Element::Matrix { .. } => "matrix",
        }
    }
}
