//! Crystals for frequency conversion.

use super::super::{
    Axis, Formula, Interval, Material, Medium, Niobate, Rate, Source, Term, Thermal,
};
use Term::{Constant, Pole, Power, ResonanceSquared};

const LBO: Source = Source {
    authors: "Chen et al.",
    journal: "J. Opt. Soc. Am. B 6, 616",
    year: 1989,
    note: "formula fitted by Hanson & Dick, Opt. Lett. 16, 205 (1991)",
};

const BBO: Source = Source {
    authors: "Tamošauskas et al.",
    journal: "Opt. Mater. Express 8, 1410",
    year: 2018,
    note: "",
};

const KTP: Source = Source {
    authors: "Kato & Takaoka",
    journal: "Appl. Opt. 41, 5040",
    year: 2002,
    note: "",
};

const NIOBATE: Source = Source {
    authors: "Zelmon, Small & Jundt",
    journal: "J. Opt. Soc. Am. B 14, 3319",
    year: 1997,
    note: "",
};

/// The printed formulas of the doped crystal make it optically positive, which it is not.
const DOPED: Source = Source {
    note: "o and e are exchanged in print, and set right here",
    ..NIOBATE
};

const BBO_RANGE: Interval = Interval::micrometres(0.188, 5.2);
const KTP_RANGE: Interval = Interval::micrometres(0.43, 3.54);
const LBO_RANGE: Interval = Interval::micrometres(0.2894, 1.064);
const NIOBATE_RANGE: Interval = Interval::micrometres(0.4, 5.0);

/// A crystal measured in a room, relative to air.
const fn crystal(
    name: &'static str,
    formula: &'static [Term],
    (wavelength, temperature): (Interval, f64),
    source: Source,
    thermal: Thermal,
) -> Axis {
    Axis {
        name,
        formula: Formula::Sum(formula),
        wavelength,
        temperature,
        medium: Medium::Air,
        source,
        thermal: Some(thermal),
    }
}

/// Kato's thermo-optic formulas of LBO (from memory; the phase-matching temperature in the tests
/// rests on y and z).
const fn lbo_thermal(terms: &'static [(f64, i32)], quadratic: f64) -> Thermal {
    Thermal {
        rate: Rate::Powers(terms, quadratic),
        wavelength: LBO_RANGE,
        temperature: Interval::celsius(20.0, 200.0),
        source: Source {
            authors: "Kato",
            journal: "IEEE J. Quantum Electron. 30, 2950",
            year: 1994,
            note: "",
        },
    }
}

/// From memory.
const fn bbo_thermal(rate: f64) -> Thermal {
    Thermal {
        rate: Rate::Constant(rate, Medium::Vacuum),
        wavelength: Interval::micrometres(0.4, 1.1),
        temperature: Interval::celsius(20.0, 80.0),
        source: Source {
            authors: "Eimerl et al.",
            journal: "J. Appl. Phys. 62, 1968",
            year: 1987,
            note: "one number for 405 nm to 1.014 µm, taken as constant to 1.1 µm",
        },
    }
}

/// The paper's thermo-optic formulas (from memory).
const fn ktp_thermal(terms: &'static [(f64, i32)]) -> Thermal {
    Thermal {
        rate: Rate::Powers(terms, 0.0),
        wavelength: Interval::micrometres(0.43, 1.58),
        temperature: Interval::celsius(20.0, 120.0),
        source: KTP,
    }
}

/// n_o of the undoped crystal against temperature (from memory).
const fn edwards(note: &'static str) -> Thermal {
    Thermal {
        rate: Rate::Change(Formula::Niobate(Niobate {
            a: [4.9048, 0.117_75, 0.218_02, 0.0, 0.0, 0.027_153],
            b: [2.1429e-8, 2.2314e-8, -2.9671e-8, 0.0],
            warm: 570.50,
        })),
        wavelength: Interval::micrometres(0.4, 3.1),
        temperature: Interval::celsius(20.0, 250.0),
        source: Source {
            authors: "Edwards & Lawrence",
            journal: "Opt. Quantum Electron. 16, 373",
            year: 1984,
            note,
        },
    }
}

/// n_e of the undoped crystal against temperature (from memory).
const fn jundt(note: &'static str) -> Thermal {
    Thermal {
        rate: Rate::Change(Formula::Niobate(Niobate {
            a: [5.355_83, 0.100_473, 0.206_92, 100.0, 11.349_27, 1.5334e-2],
            b: [4.629e-7, 3.862e-8, -0.89e-8, 2.657e-5],
            warm: 570.82,
        })),
        wavelength: NIOBATE_RANGE,
        temperature: Interval::celsius(20.0, 250.0),
        source: Source {
            authors: "Jundt",
            journal: "Opt. Lett. 22, 1553",
            year: 1997,
            note,
        },
    }
}

/// Why the doped crystal borrows the undoped one's dn/dT. The formulas of Gayer et al., Appl.
/// Phys. B 91, 343 (2008), as recalled give 2.7 · 10⁻⁴/K for n_e at 1.064 µm, six times what Jundt
/// and, for the doped crystal, Paul et al., Appl. Phys. B 86, 111 (2007), give: phase matching,
/// which they were fitted to, fixes differences of the indices only.
const BORROWED: &str = "dn/dT of the undoped crystal";

pub(super) static NONLINEAR: &[Material] = &[
    Material {
        name: "LBO",
        aliases: &["LiB3O5", "lithium triborate"],
        chemistry: "LiB₃O₅",
        note: "",
        axes: &[
            crystal(
                "x",
                &[
                    Constant(2.457_68),
                    Pole(0.009_887_7, 0.026_095),
                    Power(-0.013_847, 2),
                ],
                (LBO_RANGE, 293.15),
                LBO,
                lbo_thermal(&[(2.30e-6, 0), (-3.76e-6, 1)], 29.13e-3),
            ),
            crystal(
                "y",
                &[
                    Constant(2.525),
                    Pole(0.017_123, -0.006_051_7),
                    Power(-0.008_783_8, 2),
                ],
                (LBO_RANGE, 293.15),
                LBO,
                lbo_thermal(&[(-19.40e-6, 0), (6.01e-6, 1)], -32.89e-4),
            ),
            crystal(
                "z",
                &[
                    Constant(2.584_88),
                    Pole(0.012_737, 0.021_414),
                    Power(-0.016_293, 2),
                ],
                (LBO_RANGE, 293.15),
                LBO,
                lbo_thermal(&[(-9.70e-6, 0), (1.50e-6, 1)], -74.49e-4),
            ),
        ],
    },
    Material {
        name: "BBO",
        aliases: &["BaB2O4", "beta barium borate", "β-BaB2O4"],
        chemistry: "β-BaB₂O₄",
        note: "",
        axes: &[
            crystal(
                "o",
                &[
                    Constant(1.0),
                    ResonanceSquared(0.902_91, 0.003_926),
                    ResonanceSquared(0.831_55, 0.018_786),
                    ResonanceSquared(0.765_36, 60.01),
                ],
                (BBO_RANGE, 293.15),
                BBO,
                bbo_thermal(-16.6e-6),
            ),
            crystal(
                "e",
                &[
                    Constant(1.0),
                    ResonanceSquared(1.151_075, 0.007_142),
                    ResonanceSquared(0.218_03, 0.022_59),
                    ResonanceSquared(0.656, 263.0),
                ],
                (BBO_RANGE, 293.15),
                BBO,
                bbo_thermal(-9.3e-6),
            ),
        ],
    },
    Material {
        name: "KTP",
        aliases: &["KTiOPO4", "potassium titanyl phosphate"],
        chemistry: "KTiOPO₄",
        note: "",
        axes: &[
            crystal(
                "x",
                &[
                    Constant(3.291),
                    Pole(0.0414, 0.03978),
                    Pole(9.355_22, 31.455_71),
                ],
                (KTP_RANGE, 293.15),
                KTP,
                ktp_thermal(&[
                    (0.1717e-5, -3),
                    (-0.5353e-5, -2),
                    (0.8416e-5, -1),
                    (0.1627e-5, 0),
                ]),
            ),
            crystal(
                "y",
                &[
                    Constant(3.450_18),
                    Pole(0.04341, 0.04597),
                    Pole(16.988_25, 39.437_99),
                ],
                (KTP_RANGE, 293.15),
                KTP,
                ktp_thermal(&[
                    (0.1997e-5, -3),
                    (-0.4063e-5, -2),
                    (0.5154e-5, -1),
                    (0.5425e-5, 0),
                ]),
            ),
            crystal(
                "z",
                &[
                    Constant(4.594_23),
                    Pole(0.06206, 0.04763),
                    Pole(110.806_72, 86.121_71),
                ],
                (KTP_RANGE, 293.15),
                KTP,
                ktp_thermal(&[
                    (0.9221e-5, -3),
                    (-2.9220e-5, -2),
                    (3.6677e-5, -1),
                    (-0.1897e-5, 0),
                ]),
            ),
        ],
    },
    Material {
        name: "LiNbO3",
        aliases: &["lithium niobate", "congruent lithium niobate", "LN"],
        chemistry: "LiNbO₃, congruent",
        note: "",
        axes: &[
            crystal(
                "o",
                &[
                    Constant(1.0),
                    ResonanceSquared(2.6734, 0.01764),
                    ResonanceSquared(1.229, 0.05914),
                    ResonanceSquared(12.614, 474.6),
                ],
                (NIOBATE_RANGE, 294.15),
                NIOBATE,
                edwards(""),
            ),
            crystal(
                "e",
                &[
                    Constant(1.0),
                    ResonanceSquared(2.9804, 0.02047),
                    ResonanceSquared(0.5981, 0.0666),
                    ResonanceSquared(8.9543, 416.08),
                ],
                (NIOBATE_RANGE, 294.15),
                NIOBATE,
                jundt(""),
            ),
        ],
    },
    Material {
        name: "MgO:LiNbO3",
        aliases: &["MgO-doped lithium niobate", "MgO:LN"],
        chemistry: "LiNbO₃, congruent, with 5 mol% MgO",
        note: "",
        axes: &[
            crystal(
                "o",
                &[
                    Constant(1.0),
                    ResonanceSquared(2.4272, 0.01478),
                    ResonanceSquared(1.4617, 0.05612),
                    ResonanceSquared(9.6536, 371.216),
                ],
                (NIOBATE_RANGE, 294.15),
                DOPED,
                edwards(BORROWED),
            ),
            crystal(
                "e",
                &[
                    Constant(1.0),
                    ResonanceSquared(2.2454, 0.01242),
                    ResonanceSquared(1.3005, 0.05313),
                    ResonanceSquared(6.8972, 331.33),
                ],
                (NIOBATE_RANGE, 294.15),
                DOPED,
                jundt(BORROWED),
            ),
        ],
    },
];
