//! Alkaline-earth fluorides.

use super::super::{Axis, Formula, Interval, Material, Medium, Rate, Source, Term, Thermal};
use Term::{Constant, Resonance};

const CALCIUM: Source = Source {
    authors: "Malitson",
    journal: "Appl. Opt. 2, 1103",
    year: 1963,
    note: "",
};

const BARIUM: Source = Source {
    authors: "Malitson",
    journal: "J. Opt. Soc. Am. 54, 628",
    year: 1964,
    note: "",
};

const MAGNESIUM: Source = Source {
    authors: "Dodge",
    journal: "Appl. Opt. 23, 1980",
    year: 1984,
    note: "",
};

/// One number in the visible, as handbooks quote it from the paper (from memory).
const fn visible(rate: f64, source: Source) -> Option<Thermal> {
    Some(Thermal {
        rate: Rate::Constant(rate, Medium::Air),
        wavelength: Interval::micrometres(0.4, 2.0),
        temperature: Interval::celsius(0.0, 60.0),
        source: Source {
            note: "one number for the visible, relative to air, taken as constant to 2 µm",
            ..source
        },
    })
}

/// Magnesium fluoride at 19 °C.
const fn magnesium(name: &'static str, formula: &'static [Term]) -> Axis {
    Axis {
        name,
        formula: Formula::Sum(formula),
        wavelength: Interval::micrometres(0.2, 7.0),
        temperature: 292.15,
        medium: Medium::Air,
        source: MAGNESIUM,
        thermal: None,
    }
}

pub(super) static FLUORIDES: &[Material] = &[
    Material {
        name: "CaF2",
        aliases: &["calcium fluoride", "fluorite"],
        chemistry: "CaF₂",
        note: "",
        axes: &[Axis {
            name: "",
            formula: Formula::Sum(&[
                Constant(1.0),
                Resonance(0.567_588_8, 0.050_263_605),
                Resonance(0.471_091_4, 0.100_390_9),
                Resonance(3.848_472_3, 34.649_04),
            ]),
            wavelength: Interval::micrometres(0.23, 9.7),
            temperature: 297.15,
            medium: Medium::Air,
            source: CALCIUM,
            thermal: visible(-10.6e-6, CALCIUM),
        }],
    },
    Material {
        name: "MgF2",
        aliases: &["magnesium fluoride"],
        chemistry: "MgF₂",
        note: "",
        axes: &[
            magnesium(
                "o",
                &[
                    Constant(1.0),
                    Resonance(0.487_551_08, 0.043_384_08),
                    Resonance(0.398_750_31, 0.094_614_42),
                    Resonance(2.312_035_3, 23.793_604),
                ],
            ),
            magnesium(
                "e",
                &[
                    Constant(1.0),
                    Resonance(0.413_440_23, 0.036_842_62),
                    Resonance(0.504_974_99, 0.090_761_62),
                    Resonance(2.490_486_2, 23.771_995),
                ],
            ),
        ],
    },
    Material {
        name: "BaF2",
        aliases: &["barium fluoride"],
        chemistry: "BaF₂",
        note: "",
        axes: &[Axis {
            name: "",
            formula: Formula::Sum(&[
                Constant(1.0),
                Resonance(0.643_356, 0.057_789),
                Resonance(0.506_762, 0.109_68),
                Resonance(3.826_1, 46.386_4),
            ]),
            wavelength: Interval::micrometres(0.2652, 10.346),
            temperature: 298.15,
            medium: Medium::Air,
            source: BARIUM,
            thermal: visible(-15.2e-6, BARIUM),
        }],
    },
];
