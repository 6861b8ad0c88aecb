//! Infrared materials and diamond.

use super::super::{
    Axis, Formula, Interval, Material, Medium, Rate, Source, Term, Thermal, WarmTerm,
};
use Term::{Constant, Resonance, ResonanceSquared};

/// Measured in a cryostat: absolute, 20 K to 300 K (coefficients from memory; see the tests).
const SILICON: Source = Source {
    authors: "Frey, Leviton & Madison",
    journal: "Proc. SPIE 6273, 62732J",
    year: 2006,
    note: "",
};

const ARSENIDE: Source = Source {
    authors: "Skauli et al.",
    journal: "J. Appl. Phys. 94, 6447",
    year: 2003,
    note: "",
};

pub(super) static SEMICONDUCTORS: &[Material] = &[
    Material {
        name: "silicon",
        aliases: &["Si"],
        chemistry: "Si",
        note: "",
        axes: &[Axis {
            name: "",
            formula: Formula::Warm {
                origin: 0.0,
                terms: &[
                    WarmTerm::Constant(&[1.0]),
                    WarmTerm::Resonance(
                        &[10.4907, -2.08020e-4, 4.21694e-6, -5.82298e-9, 3.44688e-12],
                        &[
                            0.299_713,
                            -1.14234e-5,
                            1.67134e-7,
                            -2.51049e-10,
                            2.32484e-14,
                        ],
                    ),
                    WarmTerm::Resonance(
                        &[-1346.61, 29.1664, -0.278_724, 1.05939e-3, -1.35089e-6],
                        &[-3.51710e3, 42.3892, -0.357_957, 1.17504e-3, -1.13212e-6],
                    ),
                    WarmTerm::Resonance(
                        &[4.42827e7, -1.76213e6, -7.61575e4, 678.414, 103.243],
                        &[1.71400e6, -1.44984e5, -6.90744e3, -39.3699, 23.5770],
                    ),
                ],
            },
            wavelength: Interval::micrometres(1.1, 5.6),
            temperature: 295.0,
            medium: Medium::Vacuum,
            source: SILICON,
            thermal: Some(Thermal {
                rate: Rate::Formula,
                wavelength: Interval::micrometres(1.1, 5.6),
                temperature: Interval::kelvin(20.0, 300.0),
                source: SILICON,
            }),
        }],
    },
    Material {
        name: "germanium",
        aliases: &["Ge"],
        chemistry: "Ge",
        note: "",
        axes: &[Axis {
            name: "",
            formula: Formula::Sum(&[
                Constant(1.0),
                ResonanceSquared(0.488_633_1, 1.393_959),
                ResonanceSquared(14.514_253_5, 0.162_642_7),
                ResonanceSquared(0.009_122_4, 752.19),
            ]),
            wavelength: Interval::micrometres(2.0, 14.0),
            temperature: 295.15,
            // Times the index of air it meets the measurement in vacuum within 10⁻⁴ (see the tests).
            medium: Medium::Air,
            source: Source {
                authors: "Burnett, Kaplan, Stover & Phenis",
                journal: "Proc. SPIE 9974, 99740X",
                year: 2016,
                note: "",
            },
            thermal: Some(Thermal {
                rate: Rate::Change(Formula::Warm {
                    origin: 0.0,
                    terms: &[
                        WarmTerm::Constant(&[11.051_28, -6.040e-3]),
                        WarmTerm::ResonanceSquared(&[4.005_36, 9.295e-3], &[0.599_034, -5.392e-4]),
                        WarmTerm::ResonanceSquared(&[0.09145, 4.151e-4], &[3426.5, 1.51408]),
                    ],
                }),
                wavelength: Interval::micrometres(2.5, 12.0),
                temperature: Interval::kelvin(95.0, 298.0),
                source: Source {
                    authors: "Barnes & Piltch",
                    journal: "J. Opt. Soc. Am. 69, 178",
                    year: 1979,
                    note: "fitted to Icenogle, Platt & Wolfe, Appl. Opt. 15, 2348 (1976)",
                },
            }),
        }],
    },
    Material {
        name: "ZnSe",
        aliases: &["zinc selenide"],
        chemistry: "ZnSe, grown from vapour",
        note: "",
        axes: &[Axis {
            name: "",
            formula: Formula::Sum(&[
                Constant(1.0),
                Resonance(4.458_137_34, 0.200_859_853),
                Resonance(0.467_216_334, 0.391_371_166),
                Resonance(2.895_662_9, 47.136_210_8),
            ]),
            wavelength: Interval::micrometres(0.54, 18.2),
            temperature: 296.15,
            medium: Medium::Air,
            source: Source {
                authors: "Connolly, diBenedetto & Donadio",
                journal: "Proc. SPIE 181, 141",
                year: 1979,
                note: "formula fitted by Tatian, Appl. Opt. 23, 4477 (1984)",
            },
            // 61e-6/K at 10.6 µm and 62e-6/K at 3.39 µm (from memory); towards the band edge it
            // rises too fast for one number.
            thermal: Some(Thermal {
                rate: Rate::Constant(61e-6, Medium::Air),
                wavelength: Interval::micrometres(3.0, 12.0),
                temperature: Interval::celsius(0.0, 80.0),
                source: Source {
                    authors: "Harris et al.",
                    journal: "Appl. Opt. 16, 436",
                    year: 1977,
                    note: "the value at 10.6 µm, taken as constant from 3 µm to 12 µm",
                },
            }),
        }],
    },
    Material {
        name: "GaAs",
        aliases: &["gallium arsenide"],
        chemistry: "GaAs",
        note: "",
        axes: &[Axis {
            name: "",
            // Coefficients at 22 °C, and their dependence on temperature (from memory).
            formula: Formula::Warm {
                origin: 295.15,
                terms: &[
                    WarmTerm::Constant(&[5.372_514]),
                    WarmTerm::Reciprocal(&[27.839_72], &[0.443_130_7, 5.0564e-5]),
                    WarmTerm::Reciprocal(
                        &[0.031_764, 4.350e-5, 4.664e-7],
                        &[0.874_645_3, 1.913e-4, -4.882e-7],
                    ),
                    WarmTerm::Reciprocal(&[0.001_436_36], &[36.9166, -0.011_622]),
                ],
            },
            wavelength: Interval::micrometres(0.97, 17.0),
            temperature: 295.15,
            // Interference in a slab gives the optical thickness in wavelengths in vacuum.
            medium: Medium::Vacuum,
            source: ARSENIDE,
            thermal: Some(Thermal {
                rate: Rate::Formula,
                wavelength: Interval::micrometres(0.97, 17.0),
                temperature: Interval::celsius(20.0, 95.0),
                source: ARSENIDE,
            }),
        }],
    },
    Material {
        name: "diamond",
        aliases: &["CVD diamond"],
        chemistry: "C, cubic",
        note: "no change of index was seen between 10 °C and 30 °C",
        axes: &[Axis {
            name: "",
            formula: Formula::Sum(&[
                Constant(1.0),
                Resonance(0.3306, 0.175),
                Resonance(4.3356, 0.106),
            ]),
            wavelength: Interval::micrometres(0.226, 0.76),
            temperature: 293.15,
            medium: Medium::Air,
            source: Source {
                authors: "Peter",
                journal: "Z. Phys. 15, 358",
                year: 1923,
                note: "",
            },
            thermal: None,
        }],
    },
];
