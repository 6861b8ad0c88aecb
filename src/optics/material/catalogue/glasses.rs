//! Optical glasses and fused silica.

use super::super::{Axis, Formula, Interval, Material, Medium, Rate, Source, Term, Thermal};
use Term::{Constant, Resonance, ResonanceSquared};

/// Dispersion as in the sheets: relative to air at 20 °C and 101 325 Pa.
const SHEETS: Source = Source {
    authors: "glass maker's data sheets",
    journal: "catalogue of 20 January",
    year: 2017,
    note: "",
};

/// dn/dT of the same sheets, which is absolute.
const SHEETS_THERMAL: Source = Source {
    note: "measured between 365 nm and 1.014 µm; its smooth form serves over the whole range",
    ..SHEETS
};

/// A glass of the sheets: n² − 1 = Σ B λ²/(λ² − C), and the coefficients of its dn/dT.
const fn glass(
    formula: &'static [Term],
    wavelength: Interval,
    d: [f64; 3],
    e: [f64; 2],
    pole: f64,
) -> Axis {
    Axis {
        name: "",
        formula: Formula::Sum(formula),
        wavelength,
        temperature: 293.15,
        medium: Medium::Air,
        source: SHEETS,
        thermal: Some(Thermal {
            rate: Rate::Glass(d, e, pole),
            wavelength,
            temperature: Interval::celsius(-100.0, 140.0),
            source: SHEETS_THERMAL,
        }),
    }
}

pub(super) static GLASSES: &[Material] = &[
    Material {
        name: "fused silica",
        aliases: &["SiO2", "silica", "UV fused silica", "UVFS", "fused quartz"],
        chemistry: "SiO₂, amorphous",
        note: "",
        axes: &[Axis {
            name: "",
            formula: Formula::Sum(&[
                Constant(1.0),
                Resonance(0.696_166_3, 0.068_404_3),
                Resonance(0.407_942_6, 0.116_241_4),
                Resonance(0.897_479_4, 9.896_161),
            ]),
            wavelength: Interval::micrometres(0.21, 3.71),
            temperature: 293.15,
            medium: Medium::Air,
            source: Source {
                authors: "Malitson",
                journal: "J. Opt. Soc. Am. 55, 1205",
                year: 1965,
                note: "",
            },
            // From memory, within 6 % of Leviton & Frey's measurement in vacuum (see the tests).
            thermal: Some(Thermal {
                rate: Rate::Glass([2.06e-5, 2.51e-8, -2.47e-11], [3.12e-7, 4.22e-10], 0.16),
                wavelength: Interval::micrometres(0.21, 2.325),
                temperature: Interval::celsius(-100.0, 140.0),
                source: Source {
                    authors: "glass maker's data sheet",
                    journal: "synthetic fused silica",
                    year: 2006,
                    note: "measured between 365 nm and 1.014 µm; its smooth form serves beyond. The year \
                           of the sheet is from memory",
                },
            }),
        }],
    },
    Material {
        name: "N-BK7",
        aliases: &["BK7"],
        chemistry: "borosilicate crown glass",
        note: "",
        axes: &[glass(
            &[
                Constant(1.0),
                ResonanceSquared(1.039_612_12, 0.006_000_698_67),
                ResonanceSquared(0.231_792_344, 0.020_017_914_4),
                ResonanceSquared(1.010_469_45, 103.560_653),
            ],
            Interval::micrometres(0.3, 2.5),
            [1.86e-6, 1.31e-8, -1.37e-11],
            [4.34e-7, 6.27e-10],
            0.17,
        )],
    },
    Material {
        name: "F2",
        aliases: &[],
        chemistry: "lead flint glass",
        note: "",
        axes: &[glass(
            &[
                Constant(1.0),
                ResonanceSquared(1.345_333_59, 0.009_977_438_71),
                ResonanceSquared(0.209_073_176, 0.047_045_076_7),
                ResonanceSquared(0.937_357_162, 111.886_764),
            ],
            Interval::micrometres(0.32, 2.5),
            [1.51e-6, 1.56e-8, -2.78e-11],
            [9.34e-7, 1.04e-9],
            0.25,
        )],
    },
    Material {
        name: "SF10",
        aliases: &[],
        chemistry: "dense lead flint glass",
        note: "",
        axes: &[glass(
            &[
                Constant(1.0),
                ResonanceSquared(1.616_259_77, 0.012_753_455_9),
                ResonanceSquared(0.259_229_334, 0.058_198_395_4),
                ResonanceSquared(1.077_623_17, 116.607_68),
            ],
            Interval::micrometres(0.38, 2.5),
            [5.31e-6, 1.59e-8, -4.07e-11],
            [1.28e-6, 1.32e-9],
            0.27,
        )],
    },
    Material {
        name: "N-SF10",
        aliases: &[],
        chemistry: "dense flint glass",
        note: "",
        axes: &[glass(
            &[
                Constant(1.0),
                ResonanceSquared(1.621_539_02, 0.012_224_145_7),
                ResonanceSquared(0.256_287_842, 0.059_573_677_5),
                ResonanceSquared(1.644_475_52, 147.468_793),
            ],
            Interval::micrometres(0.38, 2.5),
            [-4.68e-6, 7.41e-9, -1.89e-11],
            [9.49e-7, 1.42e-9],
            0.279,
        )],
    },
    Material {
        name: "N-SF11",
        aliases: &[],
        chemistry: "dense flint glass",
        note: "",
        axes: &[glass(
            &[
                Constant(1.0),
                ResonanceSquared(1.737_596_95, 0.013_188_707),
                ResonanceSquared(0.313_747_346, 0.062_306_814_2),
                ResonanceSquared(1.898_781_01, 155.236_29),
            ],
            Interval::micrometres(0.37, 2.5),
            [-3.56e-6, 9.2e-9, -2.1e-11],
            [9.65e-7, 1.44e-9],
            0.294,
        )],
    },
];
