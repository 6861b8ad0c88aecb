//! Kogelnik & Li, "Laser Beams and Resonators", Appl. Opt. 5, 1550 (1966): the closed forms of
//! two-mirror cavities (section 3) and the confocal resonator; from memory.

use std::f64::consts::{PI, TAU};

use approx::assert_relative_eq;
use modewright::analysis::check::{Check, check};
use modewright::file;
use proptest::prelude::*;

pub fn checked(text: &str) -> Check {
    match file::load("test.toml", text, &[]) {
        Ok(loaded) => check(&loaded.cavity),
        Err(refused) => panic!("{:?}", refused.diagnostics),
    }
}

pub fn two_mirrors(wavelength: f64, length: f64, roc1: &str, roc2: &str) -> Check {
    checked(&format!(
        r#"
        wavelength = "{wavelength:?} m"
        form = "standing"
        path = [
          {{ mirror = "M1", roc = "{roc1}" }},
          {{ gap = "d", length = "{length:?} m" }},
          {{ mirror = "M2", roc = "{roc2}" }},
        ]
        "#
    ))
}

/// Closed forms and matrices part by rounding, which grows towards the edge as 1/margin; here the
/// margin is above 1e-3.
const CLOSED_FORM: f64 = 1e-12;

proptest! {
    /// w₁, w₂, w₀, the waist's place, the Rayleigh length and the Gouy phase of any stable pair.
    #[test]
    fn two_mirror_closed_forms(g1 in -3.0..3.0_f64, product in 1e-3..0.999_f64, length in 1e-3..1e3_f64) {
        prop_assume!(g1.abs() > 0.01 && (g1 - 1.0).abs() > 1e-3);
        let g2 = product / g1;
        prop_assume!((g2 - 1.0).abs() > 1e-3 && (g1 + g2 - 2.0 * g1 * g2).abs() > 1e-3);
        let wavelength = 1.064e-6;
        let roc = |g: f64| format!("{:?} m", length / (1.0 - g));
        let check = two_mirrors(wavelength, length, &roc(g1), &roc(g2));
        // The radii in the file are rounded once more; so are these.
        let (g1, g2) = (1.0 - length / (length / (1.0 - g1)), 1.0 - length / (length / (1.0 - g2)));
        let scale = length * wavelength / PI;
        let product = g1 * g2;
        let sum = g1 + g2 - 2.0 * product;
        let tolerance = CLOSED_FORM * 100.0 / (product * (1.0 - product)) / sum.abs().min(1.0);

        let spot = |index: usize| check.stations[index].tangential.unwrap().spot_m;
        let w1 = (scale * (g2 / (g1 * (1.0 - product))).sqrt()).sqrt();
        let w2 = (scale * (g1 / (g2 * (1.0 - product))).sqrt()).sqrt();
        assert_relative_eq!(spot(0), w1, max_relative = tolerance);
        assert_relative_eq!(spot(3), w2, max_relative = tolerance);

        let waist = &check.waists[0];
        let w0 = (scale * (product * (1.0 - product) / sum.powi(2)).sqrt()).sqrt();
        assert_relative_eq!(waist.waist_m.unwrap(), w0, max_relative = tolerance);
        let z1 = length * g2 * (1.0 - g1) / sum;
        assert_relative_eq!(
            waist.from_start_m.unwrap(),
            z1,
            max_relative = tolerance,
            epsilon = tolerance * length
        );
        let rayleigh = length * (product * (1.0 - product)).sqrt() / sum.abs();
        assert_relative_eq!(waist.rayleigh_m.unwrap(), rayleigh, max_relative = tolerance);

        // ψ = 2 arccos ±√(g₁g₂) with the sign of g₁: above π where both are negative.
        let plane = &check.planes.tangential;
        let gouy = 2.0 * (product.sqrt() * g1.signum()).acos();
        assert_relative_eq!(plane.gouy_rad.unwrap(), gouy, max_relative = tolerance);
        assert_relative_eq!(plane.gouy_folded_rad.unwrap(), gouy % TAU, max_relative = tolerance);
        assert_relative_eq!(plane.half_trace, 2.0 * product - 1.0, epsilon = tolerance);
        assert_relative_eq!(check.round_trip.fsr_hz, 299_792_458.0 / (2.0 * length), max_relative = 1e-14);
    }
}

/// Planar, symmetric confocal and concentric cavities: on the edge, exactly and within 1e-12, and
/// never with a value that does not exist.
#[test]
fn planar_confocal_and_concentric_are_on_the_edge() {
    for (roc1, roc2, half_trace) in [
        ("flat", "flat", 1.0),
        ("1 m", "1 m", -1.0),
        ("0.5 m", "0.5 m", 1.0),
        ("1.000000000001 m", "1 m", -1.0),
        ("0.500000000001 m", "0.5 m", 1.0),
        ("0.3 m", "0.7 m", 1.0),
    ] {
        let check = two_mirrors(1.064e-6, 1.0, roc1, roc2);
        assert!(check.on_edge && !check.stable, "{roc1} {roc2}");
        let plane = &check.planes.sagittal;
        assert_relative_eq!(plane.half_trace, half_trace, epsilon = 1e-10);
        assert!(plane.why.is_some() && plane.gouy_rad.is_none());
        for station in &check.stations {
            assert!(station.tangential.is_none() && station.sagittal.is_none());
            assert!(station.why.is_some());
        }
    }
    let confocal = two_mirrors(1.064e-6, 1.0, "1 m", "1 m");
    assert!(confocal.planes.tangential.why.unwrap().contains("identity"));
    // The symmetric limit has b = R, w = √(λL/π) on the mirrors (section 3.4).
    assert!(
        confocal.cautions[0].contains("582.0 µm"),
        "{:?}",
        confocal.cautions
    );
    let planar = two_mirrors(1.064e-6, 1.0, "flat", "flat");
    assert!(!planar.planes.tangential.why.unwrap().contains("identity"));
}

/// Yariv, *Optical Electronics*, the symmetric 2 m cavity at 1 µm: 0.564 mm in the middle and
/// 0.798 mm on the mirrors when confocal, and R = 400 L for 3 mm. From memory.
#[test]
fn a_symmetric_cavity_of_a_textbook() {
    const PRINTED: f64 = 3e-3;
    let nearly_confocal = two_mirrors(1e-6, 2.0, "2.001 m", "2.001 m");
    let waist = nearly_confocal.waists[0].waist_m.unwrap();
    let spot = nearly_confocal.stations[0].tangential.unwrap().spot_m;
    assert_relative_eq!(waist, 0.564e-3, max_relative = PRINTED);
    assert_relative_eq!(spot, 0.798e-3, max_relative = PRINTED);
    let large = two_mirrors(1e-6, 2.0, "800 m", "800 m");
    let spot = large.stations[0].tangential.unwrap().spot_m;
    assert_relative_eq!(spot, 3e-3, max_relative = PRINTED);
}

/// A resonator with an internal lens is the empty one with g₁* = 1 − d₂/f − L*/R₁ and
/// L* = d₁ + d₂ − d₁d₂/f: Kogelnik, Bell Syst. Tech. J. 44, 455 (1965), from memory.
#[test]
fn an_internal_lens_has_equivalent_g_parameters() {
    let (d1, d2, f, r1, r2) = (0.3, 0.45, 0.35, 0.8, 1.1);
    let check = checked(&format!(
        r#"
        wavelength = "1064 nm"
        form = "standing"
        path = [
          {{ mirror = "M1", roc = "{r1} m" }},
          {{ gap = "a", length = "{d1} m" }},
          {{ lens = "L", focal = "{f} m" }},
          {{ gap = "b", length = "{d2} m" }},
          {{ mirror = "M2", roc = "{r2} m" }},
        ]
        "#
    ));
    let length = d1 + d2 - d1 * d2 / f;
    let g1 = 1.0 - d2 / f - length / r1;
    let g2 = 1.0 - d1 / f - length / r2;
    assert_relative_eq!(
        check.planes.tangential.half_trace,
        2.0 * g1 * g2 - 1.0,
        max_relative = CLOSED_FORM
    );
}
