//! Water and air.

use super::super::{Axis, Formula, Interval, Material, Medium, Rate, Source, Term, Thermal};
use Term::{Constant, ResonanceSquared};

const WATER: Source = Source {
    authors: "Daimon & Masumura",
    journal: "Appl. Opt. 46, 3811",
    year: 2007,
    note: "",
};

const AIR: Source = Source {
    authors: "Ciddor",
    journal: "Appl. Opt. 35, 1566",
    year: 1996,
    note: "",
};

pub(super) static FLUIDS: &[Material] = &[
    Material {
        name: "water",
        aliases: &["H2O"],
        chemistry: "H₂O, distilled",
        note: "",
        axes: &[Axis {
            name: "",
            formula: Formula::Sum(&[
                Constant(1.0),
                ResonanceSquared(0.568_402_756_5, 5.101_829_712e-3),
                ResonanceSquared(0.172_617_739_1, 1.821_153_936e-2),
                ResonanceSquared(2.086_189_578e-2, 2.620_722_293e-2),
                ResonanceSquared(0.113_074_868_8, 10.697_927_21),
            ]),
            wavelength: Interval::micrometres(0.182, 1.129),
            temperature: 293.15,
            // It gives 1.33335 at the D line: the accepted 1.33299 against air, times that of air.
            medium: Medium::Vacuum,
            source: WATER,
            // The paper's fit at 24 °C (from memory).
            thermal: Some(Thermal {
                rate: Rate::Second(
                    Formula::Sum(&[
                        Constant(1.0),
                        ResonanceSquared(0.566_695_982_0, 5.084_151_894e-3),
                        ResonanceSquared(0.173_190_009_8, 1.818_488_474e-2),
                        ResonanceSquared(2.095_951_857e-2, 2.625_439_472e-2),
                        ResonanceSquared(0.112_522_840_6, 10.738_423_52),
                    ]),
                    297.15,
                ),
                wavelength: Interval::micrometres(0.182, 1.129),
                temperature: Interval::celsius(19.0, 24.0),
                source: WATER,
            }),
        }],
    },
    Material {
        name: "air",
        aliases: &[],
        chemistry: "dry air with 450 ppm of CO₂",
        note: "at 101 325 Pa; the formula's standard air is at 15 °C",
        axes: &[Axis {
            name: "",
            formula: Formula::Air,
            wavelength: Interval::micrometres(0.23, 1.69),
            temperature: 288.15,
            medium: Medium::Vacuum,
            source: AIR,
            thermal: Some(Thermal {
                rate: Rate::Formula,
                wavelength: Interval::micrometres(0.23, 1.69),
                temperature: Interval::celsius(-40.0, 100.0),
                source: AIR,
            }),
        }],
    },
];
