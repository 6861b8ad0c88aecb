//! Mode spacings, linewidths and lifetimes of cavities that were built, as published; parity.

use approx::assert_relative_eq;
use modewright::analysis::measures;
use modewright::analysis::modes::{APART, Modes, modes};
use modewright::cavity::{Cavity, Measure};
use modewright::file;

fn load(text: &str) -> Cavity {
    match file::load("test.toml", text, &[]) {
        Ok(loaded) => loaded.cavity,
        Err(refused) => panic!("{:?}", refused.diagnostics),
    }
}

/// Two mirrors with a loss each that makes the given finesse: for small losses π/ℱ of the power is
/// lost at either.
fn pair(length: &str, roc1: &str, roc2: &str, finesse: f64, top: &str) -> Cavity {
    // ℱ = π√ρ/(1 − ρ) solved for √ρ; ρ² = R₁R₂, and both mirrors are alike.
    let x = std::f64::consts::PI / (2.0 * finesse);
    let root = (1.0 + x * x).sqrt() - x;
    let loss = 1.0 - root * root;
    load(&format!(
        r#"
        wavelength = "1064 nm"
        form = "standing"
        {top}
        path = [
          {{ mirror = "M1", roc = "{roc1}", loss = "{:?} %" }},
          {{ gap = "d", length = "{length}" }},
          {{ mirror = "M2", roc = "{roc2}", loss = "{:?} %" }},
        ]
        "#,
        100.0 * loss,
        100.0 * loss
    ))
}

fn measure(cavity: &Cavity, name: &str) -> f64 {
    let measure = Measure::parse(name, cavity).unwrap();
    measures::value(cavity, &cavity.book().nominal(), measure).unwrap()
}

fn offset(found: &Modes, m: usize, n: usize) -> f64 {
    let mode = found.modes.iter().find(|mode| (mode.m, mode.n) == (m, n));
    mode.unwrap().offset_hz
}

/// Orders 1 to 22 of a 38.55 m cavity with a 57.1 m mirror, in MHz: laboratory log of the Caltech
/// 40 m interferometer, entry 469. Published to four decimals, folded upwards.
#[test]
fn twenty_two_orders_of_a_long_cavity() {
    const ORDERS: [f64; 22] = [
        1.1936, 2.3871, 3.5807, 0.8859, 2.0795, 3.273, 0.5782, 1.7718, 2.9654, 0.2706, 1.4641,
        2.6577, 3.8512, 1.1564, 2.35, 3.5436, 0.8488, 2.0423, 3.2359, 0.5411, 1.7347, 2.9282,
    ];
    let cavity = pair("38.55 m", "1e6 m", "57.1 m", 1000.0, "highest_order = 22");
    let found = modes(&cavity, APART, &[]);
    for (index, listed) in ORDERS.iter().enumerate() {
        for n in 0..=index + 1 {
            let upwards = (offset(&found, index + 1 - n, n) + found.fsr_hz) % found.fsr_hz;
            assert_relative_eq!(upwards * 1e-6, *listed, epsilon = 6e-5);
        }
    }
    // The nearest of them is the thirteenth, just below the next fundamental.
    let nearest = found.mode_clearance.unwrap();
    assert_eq!(nearest.m + nearest.n, 13);
    assert_relative_eq!(
        nearest.offset_hz * 1e-6,
        3.8512 - found.fsr_hz * 1e-6,
        epsilon = 6e-5
    );
}

/// Power-recycling half-cavity of the Caltech 40 m interferometer, log entry 7961: 4.34 m,
/// g₁g₂ = 0.96, finesse 111; FSR 34.5 MHz, full width 311 kHz, transverse-mode spacing 2.2 MHz.
/// Published to these digits.
#[test]
fn half_of_a_recycling_cavity() {
    let cavity = pair("4.34 m", "flat", "108.5 m", 111.0, "");
    assert_relative_eq!(measure(&cavity, "finesse"), 111.0, max_relative = 1e-9);
    assert_relative_eq!(measure(&cavity, "fsr"), 34.5e6, max_relative = 0.01);
    assert_relative_eq!(measure(&cavity, "linewidth"), 311e3, max_relative = 0.01);
    for plane in ["tangential", "sagittal"] {
        let spacing = measure(&cavity, &format!("spacing.{plane}"));
        assert_relative_eq!(spacing, 2.2e6, max_relative = 0.01);
    }
}

/// Polarimeter of 3.303 m between 2 m mirrors: Della Valle et al., Opt. Express 22, 11570 (2014).
/// Published: the power decays in 2.7 ms, a finesse of 770 000. The field takes twice as long.
#[test]
fn a_long_decay() {
    let cavity = pair("3.303 m", "2 m", "2 m", 770_000.0, "");
    assert_relative_eq!(measure(&cavity, "lifetime"), 2.7e-3, max_relative = 3e-3);
}

/// Reference cavity of 0.2032 m: Caltech coating-noise log, entry 424. Published: poles of 54 kHz
/// and 38 kHz (half the linewidth), 738 MHz, finesse 6835 and 9710.
#[test]
fn poles_are_half_a_linewidth() {
    for (finesse, pole) in [(6835.0, 54e3), (9710.0, 38e3)] {
        let cavity = pair("0.2032 m", "flat", "1 m", finesse, "");
        assert_relative_eq!(measure(&cavity, "fsr"), 738e6, max_relative = 1e-3);
        assert_relative_eq!(
            measure(&cavity, "linewidth"),
            2.0 * pole,
            max_relative = 1e-3
        );
        // The Lorentzian linewidth of the decay is the same, but for (π/ℱ)².
        let lifetime = measure(&cavity, "lifetime");
        let lorentzian = 1.0 / (std::f64::consts::TAU * lifetime);
        assert_relative_eq!(
            lorentzian,
            measure(&cavity, "linewidth"),
            max_relative = 1e-6
        );
    }
}

/// KAGRA arm, characterisation page of the project: Gouy phase 250.75° a round trip (published), so
/// that orders lie 250.75/360 of a free spectral range apart.
#[test]
fn kagra_arm() {
    let cavity = pair("3000 m", "1900 m", "1900 m", 1550.0, "");
    let found = modes(&cavity, APART, &[]);
    let turns = offset(&found, 1, 0) / found.fsr_hz;
    assert_relative_eq!(turns, 250.75 / 360.0 - 1.0, epsilon = 0.005 / 360.0);
}

/// Output mode cleaner of Advanced LIGO: Arai et al., LIGO-T1000276 and G1301001. From memory:
/// spacings of 0.21934 tangential and 0.21876 sagittal, in free spectral ranges.
#[test]
fn spacings_of_an_output_mode_cleaner() {
    let cavity = load(
        r#"
        wavelength = "1064 nm"
        form = "ring"
        path = [
          { mirror = "FM1", roc = "flat", aoi = "4 deg", fold = "left" },
          { gap = "flats", length = "0.283 m" },
          { mirror = "FM2", roc = "flat", aoi = "4 deg", fold = "left" },
          { gap = "cross", length = "0.283 m" },
          { mirror = "CM1", roc = "2.575 m", aoi = "4 deg", fold = "right" },
          { gap = "curved", length = "0.283 m" },
          { mirror = "CM2", roc = "2.575 m", aoi = "4 deg", fold = "right" },
          { gap = "back", length = "0.283 m" },
        ]
        "#,
    );
    let found = modes(&cavity, APART, &[]);
    assert_relative_eq!(offset(&found, 1, 0) / found.fsr_hz, 0.21934, epsilon = 1e-4);
    assert_relative_eq!(offset(&found, 0, 1) / found.fsr_hz, 0.21876, epsilon = 1e-4);
    // Four reflections: both polarisations resonate together.
    assert_eq!(found.other_polarisation_offset_hz, Some(0.0));
    assert!(found.other_polarisation.is_none());
    // Without losses 1 % of a free spectral range counts as near, and that is said.
    assert_eq!(found.apart_hz, 0.01 * found.fsr_hz);
    assert!(found.cautions.iter().any(|caution| caution.contains("1 %")));
}

/// Three mirrors: f_mn = FSR·[(m + n)·arccos(1 − 2L/R)/2π + η/2], η = 1 for odd m in the plane of
/// the ring (Raab & Whitcomb, LIGO-T920004 (1992), from memory; Caltech coating-noise log, entry
/// 1174, published). With L = 16.4736 m and R = 27.275 m: 2 578 177.07 Hz up and −1 971 412.24 Hz
/// in the plane. Recomputed from that formula, which has no astigmatism.
#[test]
fn parity_of_three_mirrors() {
    let cavity = load(
        r#"
        wavelength = "1064 nm"
        form = "ring"
        path = [
          { mirror = "A", roc = "flat", aoi = "45 deg", loss_s = "0.1 %", loss_p = "0.7 %" },
          { gap = "a", length = "16.4736 m" },
          { mirror = "B", roc = "27.275 m", aoi = "0.001 deg" },
          { gap = "b", length = "16.4736 m" },
          { mirror = "C", roc = "flat", aoi = "45 deg" },
        ]
        "#,
    );
    let found = modes(&cavity, APART, &[]);
    assert_relative_eq!(offset(&found, 0, 1), 2_578_177.07, max_relative = 1e-8);
    assert_relative_eq!(offset(&found, 1, 0), -1_971_412.24, max_relative = 1e-8);
    let spacing = |plane: &str| measure(&cavity, &format!("spacing.{plane}"));
    assert_relative_eq!(spacing("sagittal"), 2_578_177.07, max_relative = 1e-8);
    assert_relative_eq!(spacing("tangential"), -1_971_412.24, max_relative = 1e-8);
    for mode in &found.modes {
        let alike = offset(&found, 0, mode.order);
        let parity = if mode.m % 2 == 1 { 0.5 } else { 0.0 };
        let apart = (mode.offset_hz - alike) / found.fsr_hz - parity;
        assert_relative_eq!(apart - apart.round(), 0.0, epsilon = 1e-7);
    }
    // The other polarisation is turned over three times too: its comb lies half-way between.
    let other = found.other_polarisation.unwrap();
    assert_eq!(
        found.other_polarisation_offset_hz,
        Some(-0.5 * found.fsr_hz)
    );
    assert!(other.finesse.unwrap() < 0.2 * found.finesse.unwrap());
    // And so its TEM_10 lies where TEM_01 of the first does.
    let tem10 = offset(&found, 1, 0) - 0.5 * found.fsr_hz;
    let turns = (tem10 - offset(&found, 0, 1)) / found.fsr_hz;
    assert_relative_eq!(turns - turns.round(), 0.0, epsilon = 1e-9);
}

/// Every q-th order coincides with the fundamental where the Gouy phase of a round trip is 2πp/q:
/// Ramsay & Degnan, Appl. Opt. 9, 385 (1970), from memory. Confocal 180°, flat and R = 2L 90°,
/// flat and R = 4L/3 120°, flat and R = 4L 60°. Recomputed.
#[test]
fn every_qth_order_coincides() {
    for (roc1, roc2, p, q) in [
        ("1 m", "1 m", 1, 2),
        ("flat", "2 m", 1, 4),
        ("flat", "1.3333333333333333 m", 1, 3),
        ("flat", "4 m", 1, 6),
    ] {
        let found = modes(&pair("1 m", roc1, roc2, 500.0, ""), APART, &[]);
        for mode in &found.modes {
            let near = mode.offset_linewidths.unwrap().abs() < 1e-3;
            assert_eq!(
                near,
                mode.order.is_multiple_of(q),
                "{roc1}, {roc2}: {mode:?}"
            );
        }
        assert!(!found.coincidences.is_empty());
        for found in &found.coincidences {
            let fractions = found.fractions.unwrap();
            let one = fractions.tangential.or(fractions.sagittal).unwrap();
            assert_eq!((one.p, one.q), (p, q));
        }
        assert_eq!(found.mode_clearance.unwrap().m, q);
    }
}

/// The order of the mirrors of a ring matters to its mode spacing, so that no product of g factors
/// of single mirrors can tell it: Arai, LIGO-T1300189 (2013). Published in words; a ring of ours.
#[test]
fn mirrors_of_a_ring_cannot_be_exchanged() {
    let spacing = |order: [&str; 4]| {
        let mirrors: String = order
            .iter()
            .enumerate()
            .map(|(k, roc)| {
                format!(
                    "{{ mirror = \"M{k}\", roc = \"{roc}\", aoi = \"3 deg\" }},\n\
                     {{ gap = \"d{k}\", length = \"0.3 m\" }},\n"
                )
            })
            .collect();
        let cavity = load(&format!(
            "wavelength = \"1064 nm\"\nform = \"ring\"\npath = [\n{mirrors}]"
        ));
        measure(&cavity, "spacing.sagittal") / measure(&cavity, "fsr")
    };
    let beside = spacing(["2 m", "3 m", "flat", "flat"]);
    let opposite = spacing(["2 m", "flat", "3 m", "flat"]);
    assert!((beside - opposite).abs() > 1e-3, "{beside} {opposite}");
}

/// From the fundamental's resonance a mode at half a linewidth holds half its power, at five a
/// hundred and first part: the Lorentzian limit, common knowledge without a source.
#[test]
fn suppression_of_a_lorentzian_line() {
    let cavity = pair("1 m", "flat", "3 m", 1e5, "");
    let found = modes(&cavity, APART, &[]);
    for mode in &found.modes {
        let turns = mode.offset_hz / found.fsr_hz;
        let sine = (std::f64::consts::PI * turns).sin() / std::f64::consts::PI;
        let exact = 1.0 + (2.0 * sine * found.finesse.unwrap()).powi(2);
        let ratio = 10_f64.powf(0.1 * mode.suppression_db.unwrap());
        assert_relative_eq!(ratio, exact, max_relative = 1e-9);
    }
    let least = measure(&cavity, "suppression.12");
    let nearest = found.mode_clearance.unwrap();
    let near = found
        .modes
        .iter()
        .find(|mode| (mode.m, mode.n) == (nearest.m, nearest.n))
        .and_then(|mode| mode.suppression_db);
    assert_relative_eq!(10.0 * least.log10(), near.unwrap(), max_relative = 1e-9);
    // The first order alone lies farther away.
    assert!(measure(&cavity, "suppression.1") > least);
}
