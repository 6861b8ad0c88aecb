//! Crystals that serve as laser hosts, sapphire among them.

use super::super::{Axis, Formula, Interval, Material, Medium, Rate, Source, Term, Thermal};
use Term::{Constant, Pole, Power, Resonance, ResonanceSquared};

const SAPPHIRE: Source = Source {
    authors: "Malitson & Dodge",
    journal: "J. Opt. Soc. Am. 62, 1405",
    year: 1972,
    note: "formula printed by Dodge, Handbook of Laser Science and Technology IV, CRC (1986), p. 30",
};

const YLF: Source = Source {
    authors: "Barnes & Gettemy",
    journal: "J. Opt. Soc. Am. 70, 1244",
    year: 1980,
    note: "",
};

const VANADATE: Source = Source {
    authors: "Shi, Zhang & Shen",
    journal: "J. Synth. Cryst. 30, 85",
    year: 2001,
    note: "",
};

/// dn/dT near 300 K, measured in vacuum (from memory).
const fn aggarwal(rate: f64) -> Option<Thermal> {
    Some(Thermal {
        rate: Rate::Constant(rate, Medium::Vacuum),
        wavelength: Interval::micrometres(0.7, 1.7),
        temperature: Interval::celsius(0.0, 60.0),
        source: Source {
            authors: "Aggarwal et al.",
            journal: "J. Appl. Phys. 98, 103514",
            year: 2005,
            note: "the value at 300 K near 1.06 µm, taken as constant over 0.7 to 1.7 µm and \
                   0 to 60 °C",
        },
    })
}

/// A host measured in a room: relative to air, at room temperature unless the paper says which.
const fn host(
    name: &'static str,
    formula: &'static [Term],
    wavelength: Interval,
    source: Source,
    thermal: Option<Thermal>,
) -> Axis {
    Axis {
        name,
        formula: Formula::Sum(formula),
        wavelength,
        temperature: 293.15,
        medium: Medium::Air,
        source,
        thermal,
    }
}

pub(super) static HOSTS: &[Material] = &[
    Material {
        name: "sapphire",
        aliases: &["Al2O3", "corundum", "Ti:sapphire", "Ti:Al2O3"],
        chemistry: "Al₂O₃",
        note: "serves as Ti:sapphire too, whose light is usually polarised along c (e): the \
               titanium changes the index little",
        axes: &[
            host(
                "o",
                &[
                    Constant(1.0),
                    Resonance(1.431_349_3, 0.072_663_1),
                    Resonance(0.650_547_13, 0.119_324_2),
                    Resonance(5.341_402_1, 18.028_251),
                ],
                Interval::micrometres(0.2, 5.0),
                SAPPHIRE,
                Some(Thermal {
                    rate: Rate::Constant(13.1e-6, Medium::Air),
                    wavelength: Interval::micrometres(0.4, 2.0),
                    temperature: Interval::celsius(0.0, 60.0),
                    // From memory, as handbooks quote it.
                    source: Source {
                        authors: "Malitson",
                        journal: "J. Opt. Soc. Am. 52, 1377",
                        year: 1962,
                        note: "one number at 546 nm, relative to air, taken as constant to 2 µm",
                    },
                }),
            ),
            host(
                "e",
                &[
                    Constant(1.0),
                    Resonance(1.503_975_9, 0.074_028_8),
                    Resonance(0.550_691_41, 0.121_652_9),
                    Resonance(6.592_737_9, 20.072_248),
                ],
                Interval::micrometres(0.2, 5.0),
                SAPPHIRE,
                None,
            ),
        ],
    },
    Material {
        name: "YAG",
        aliases: &["Y3Al5O12", "Nd:YAG", "Yb:YAG", "Er:YAG"],
        chemistry: "Y₃Al₅O₁₂",
        note: "undoped; doping at the per-cent level changes the index little",
        axes: &[host(
            "",
            &[
                Constant(1.0),
                ResonanceSquared(2.282, 0.01185),
                ResonanceSquared(3.276_44, 282.734),
            ],
            Interval::micrometres(0.4, 5.0),
            Source {
                authors: "Zelmon, Small & Page",
                journal: "Appl. Opt. 37, 4933",
                year: 1998,
                note: "",
            },
            aggarwal(7.8e-6),
        )],
    },
    Material {
        name: "LuAG",
        aliases: &["Lu3Al5O12", "Yb:LuAG"],
        chemistry: "Lu₃Al₅O₁₂",
        note: "measured by ellipsometry: good to some 10⁻³",
        axes: &[host(
            "",
            &[Constant(2.077), Resonance(1.237, 0.1376), Power(-0.0104, 2)],
            Interval::micrometres(0.193, 1.69),
            Source {
                authors: "Hrabovský et al.",
                journal: "Opt. Mater. Express 11, 1218",
                year: 2021,
                note: "",
            },
            aggarwal(8.3e-6),
        )],
    },
    Material {
        name: "YLF",
        aliases: &["LiYF4", "YLiF4", "Nd:YLF", "Yb:YLF"],
        chemistry: "LiYF₄",
        note: "undoped; doping at the per-cent level changes the index little",
        axes: &[
            host(
                "o",
                &[
                    Constant(1.387_57),
                    ResonanceSquared(0.707_57, 0.00931),
                    ResonanceSquared(0.188_49, 50.997_41),
                ],
                Interval::micrometres(0.225, 2.6),
                YLF,
                // Textbooks quote −2.0e-6 (o) and −4.3e-6 (e) from older work: the two disagree.
                aggarwal(-4.6e-6),
            ),
            host(
                "e",
                &[
                    Constant(1.310_21),
                    ResonanceSquared(0.849_03, 0.00876),
                    ResonanceSquared(0.536_07, 134.9566),
                ],
                Interval::micrometres(0.225, 2.6),
                YLF,
                aggarwal(-6.6e-6),
            ),
        ],
    },
    Material {
        name: "YVO4",
        aliases: &["Nd:YVO4", "yttrium vanadate", "vanadate"],
        chemistry: "YVO₄",
        // Published values of dn/dT run from 3 to 16 · 10⁻⁶/K: none of them is taken.
        note: "undoped; published values of dn/dT disagree, so none is given",
        axes: &[
            host(
                "o",
                &[
                    Constant(3.778_79),
                    Pole(0.070_479, 0.045_731),
                    Power(-0.009_701, 2),
                ],
                Interval::micrometres(0.48, 1.34),
                VANADATE,
                None,
            ),
            host(
                "e",
                &[
                    Constant(4.6072),
                    Pole(0.108_087, 0.052_495),
                    Power(-0.014_305, 2),
                ],
                Interval::micrometres(0.48, 1.34),
                VANADATE,
                None,
            ),
        ],
    },
];
