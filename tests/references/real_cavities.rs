//! Cavities that were built or fully designed, with the mode sizes their authors published.

use approx::assert_relative_eq;
use modewright::analysis::check::Check;

use crate::kogelnik_li::{checked, two_mirrors};

const YAG: f64 = 1064e-9;

fn spots(check: &Check) -> (f64, f64) {
    let spot = |index: usize| check.stations[index].tangential.unwrap().spot_m;
    (spot(0), spot(3))
}

fn waist(check: &Check, part: &str, plane: &str) -> f64 {
    check
        .waists
        .iter()
        .find(|waist| waist.part == part && waist.plane == plane)
        .and_then(|waist| waist.waist_m)
        .unwrap()
}

/// KAGRA arm, design parameter pages of the project: 3 km between mirrors of 1.9 km. Published.
/// g is negative: the Gouy phase is above half a turn.
#[test]
fn kagra_arm() {
    let check = two_mirrors(YAG, 3000.0, "1900 m", "1900 m");
    let (w1, w2) = spots(&check);
    assert_relative_eq!(w1, 0.0353005, max_relative = 3e-6);
    assert_relative_eq!(w2, 0.0353005, max_relative = 3e-6);
    assert_relative_eq!(
        waist(&check, "d", "sagittal"),
        0.016197,
        max_relative = 1e-5
    );
    assert_relative_eq!(
        check.waists[0].rayleigh_m.unwrap(),
        774.597,
        max_relative = 1e-6
    );
    assert_relative_eq!(
        check.waists[0].from_start_m.unwrap(),
        1500.0,
        max_relative = 1e-9
    );
    let gouy = check.planes.tangential.gouy_rad.unwrap().to_degrees();
    assert_relative_eq!(gouy, 250.75, epsilon = 0.005);
}

/// The same arm as first planned, with a flat input mirror and 7 km at the end; main
/// interferometer parameter page, revision 22. Published to 0.1 mm.
#[test]
fn large_cryogenic_telescope_arm() {
    let (w1, w2) = spots(&two_mirrors(YAG, 3000.0, "flat", "7000 m"));
    assert_relative_eq!(w1, 0.0343, epsilon = 5e-5);
    assert_relative_eq!(w2, 0.0453, epsilon = 5e-5);
}

/// Advanced Virgo arm: Acernese et al., Class. Quantum Grav. 32, 024001 (2015). From memory.
#[test]
fn advanced_virgo_arm() {
    let check = two_mirrors(YAG, 2999.8, "1420 m", "1683 m");
    let (w1, w2) = spots(&check);
    assert_relative_eq!(w1, 0.0487, max_relative = 2e-3);
    assert_relative_eq!(w2, 0.058, max_relative = 2e-3);
    assert_relative_eq!(
        waist(&check, "d", "tangential"),
        0.00969,
        max_relative = 2e-3
    );
}

/// Advanced LIGO arm: LIGO Scientific Collaboration, Class. Quantum Grav. 32, 074001 (2015). From
/// memory. |g₁| > 1, and it is stable.
#[test]
fn advanced_ligo_arm() {
    let check = two_mirrors(YAG, 3994.5, "1934 m", "2245 m");
    let (w1, w2) = spots(&check);
    assert!(check.stable);
    assert_relative_eq!(waist(&check, "d", "tangential"), 0.012, max_relative = 5e-3);
    assert_relative_eq!(w1, 0.053, max_relative = 5e-3);
    assert_relative_eq!(w2, 0.062, max_relative = 5e-3);
    assert_relative_eq!(check.round_trip.fsr_hz, 37_500.0, max_relative = 5e-3);
}

/// Advanced LIGO input mode cleaner, a triangle of 16.4736 m per half round trip: Mueller et al.,
/// Rev. Sci. Instrum. 87, 014502 (2016). From memory. The short side and the small angle at the
/// far mirror are of the published layout, recalled to a centimetre.
#[test]
fn advanced_ligo_input_mode_cleaner() {
    let short = 0.4653_f64;
    let long = (2.0 * 16.4736 - short) / 2.0;
    let far = (short / 2.0 / long).asin().to_degrees();
    let near = 45.0 - far / 2.0;
    let check = checked(
        &format!(
            r#"
        wavelength = "1064 nm"
        form = "ring"
        path = [
          {{ mirror = "MC1", roc = "flat", aoi = "{near} deg", fold = "left" }},
          {{ gap = "to MC2", length = "{long} m" }},
          {{ mirror = "MC2", roc = "27.24 m", aoi = "{far} deg", fold = "left" }},
          {{ gap = "to MC3", length = "{long} m" }},
          {{ mirror = "MC3", roc = "flat", aoi = "{near} deg", fold = "left" }},
          {{ gap = "short", length = "{short} m" }},
        ]
        "#
        )
        .replace("to MC", "to-MC"),
    );
    assert!(check.cautions.is_empty(), "it closes: {:?}", check.cautions);
    assert_relative_eq!(
        waist(&check, "short", "sagittal"),
        2.12e-3,
        max_relative = 2e-3
    );
    assert_relative_eq!(
        waist(&check, "short", "tangential"),
        2.12e-3,
        max_relative = 2e-3
    );
    let far_mirror = check.stations.iter().find(|s| s.part == "MC2").unwrap();
    assert_relative_eq!(
        far_mirror.sagittal.unwrap().spot_m,
        3.38e-3,
        max_relative = 2e-3
    );
    assert_relative_eq!(check.round_trip.fsr_hz, 9.099e6, max_relative = 2e-3);
    // Three reflections: the folded phases of the planes part by half a turn.
    let folded = |p: &modewright::analysis::check::PlaneCheck| p.gouy_folded_rad.unwrap();
    let apart = folded(&check.planes.tangential) - folded(&check.planes.sagittal);
    assert_relative_eq!(apart.abs(), std::f64::consts::PI, epsilon = 1e-3);
}

/// Transverse-mode frequencies of that cleaner with R = 27.275 m: Raab & Whitcomb, LIGO-T920004
/// (1992): vertical 2 578 177.07 Hz, horizontal half a free spectral range away. Recomputed from
/// the published formula, which has no astigmatism; hence the loose tolerance.
#[test]
fn parity_of_a_three_mirror_ring() {
    let check = checked(
        r#"
        wavelength = "1064 nm"
        form = "ring"
        path = [
          { mirror = "A", roc = "flat", aoi = "45 deg" },
          { gap = "a", length = "16.4736 m" },
          { mirror = "B", roc = "27.275 m", aoi = "0.001 deg" },
          { gap = "b", length = "16.4736 m" },
          { mirror = "C", roc = "flat", aoi = "45 deg" },
        ]
        "#,
    );
    let fsr = check.round_trip.fsr_hz;
    let offset = |phase: f64| {
        let turns = phase / std::f64::consts::TAU;
        fsr * (turns - turns.round())
    };
    let vertical = offset(check.planes.sagittal.gouy_folded_rad.unwrap());
    let horizontal = offset(check.planes.tangential.gouy_folded_rad.unwrap());
    assert_relative_eq!(vertical, 2_578_177.07, max_relative = 1e-8);
    assert_relative_eq!(horizontal, -1_971_412.24, max_relative = 1e-8);
}

/// Advanced LIGO output mode cleaner, a bow-tie of 1.132 m with two 2.575 m mirrors at 4°: Arai et
/// al., LIGO-T1000276 and G1301001. From memory.
#[test]
fn advanced_ligo_output_mode_cleaner() {
    // Between the curved mirrors 0.283 m; the other 0.849 m by way of the two flats.
    let check = checked(
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
    assert_relative_eq!(
        waist(&check, "flats", "sagittal"),
        490e-6,
        max_relative = 0.01
    );
    assert_relative_eq!(check.round_trip.fsr_hz, 264.8e6, max_relative = 3e-3);
    let spacing = |p: &modewright::analysis::check::PlaneCheck| {
        p.gouy_folded_rad.unwrap() / std::f64::consts::TAU
    };
    assert_relative_eq!(spacing(&check.planes.tangential), 0.21934, epsilon = 1e-4);
    assert_relative_eq!(spacing(&check.planes.sagittal), 0.21876, epsilon = 1e-4);
}

/// GEO 600 mode cleaner, 8 m round trip, R = 6.72 m: Goßler et al., Class. Quantum Grav. 20, S117
/// (2003). From memory.
#[test]
fn geo_mode_cleaner() {
    let check = checked(
        r#"
        wavelength = "1064 nm"
        form = "ring"
        path = [
          { mirror = "A", roc = "flat", aoi = "44 deg" },
          { gap = "a", length = "3.925 m" },
          { mirror = "B", roc = "6.72 m", aoi = "1 deg" },
          { gap = "b", length = "3.925 m" },
          { mirror = "C", roc = "flat", aoi = "44 deg" },
          { gap = "c", length = "0.15 m" },
        ]
        "#,
    );
    assert_relative_eq!(
        waist(&check, "c", "sagittal"),
        1.05e-3,
        max_relative = 0.015
    );
}

/// PVLAS polarimeter, 3.303 m between 2 m mirrors: Della Valle et al., Opt. Express 22, 11570
/// (2014) and later papers. From memory.
#[test]
fn pvlas() {
    let check = two_mirrors(YAG, 3.303, "2 m", "2 m");
    assert_relative_eq!(
        waist(&check, "d", "tangential"),
        0.51e-3,
        max_relative = 8e-3
    );
    assert_relative_eq!(check.round_trip.fsr_hz, 45.4e6, max_relative = 8e-3);
}

/// ALPS II, 122 m, flat and 214 m: Diaz Ortiz et al., arXiv 2009.14294. From memory.
#[test]
fn alps_ii() {
    let check = two_mirrors(YAG, 122.0, "flat", "214 m");
    assert_relative_eq!(waist(&check, "d", "tangential"), 6e-3, max_relative = 5e-3);
}

/// Cavity-QED pairs of 100 and 200 mm mirrors a few tens of micrometres apart: Hood et al., Science
/// 287, 1447 (2000); McKeever et al., Phys. Rev. Lett. 90, 133602 (2003). From memory; the first
/// differs by the light's depth in the coatings.
#[test]
fn cavity_qed() {
    let cesium = 852.36e-9;
    let hood = two_mirrors(cesium, 10.9e-6, "100 mm", "100 mm");
    assert_relative_eq!(
        waist(&hood, "d", "tangential"),
        14.06e-6,
        max_relative = 0.012
    );
    let mckeever = two_mirrors(cesium, 42.2e-6, "200 mm", "200 mm");
    assert_relative_eq!(
        waist(&mckeever, "d", "tangential"),
        23.6e-6,
        max_relative = 2e-3
    );
}

/// Two flat mirrors with a thin lens between, 0.5 m and 0.8 m: stable from 0 to 1.25 and from 2 to
/// 3.25 dioptres. Zones of Magni, Appl. Opt. 25, 117 (1986); recomputed.
#[test]
fn thermal_lens_zones_of_two_flats() {
    let zone = |power: f64| {
        let text = format!(
            r#"
            wavelength = "1064 nm"
            form = "standing"
            path = [
              {{ mirror = "A", roc = "flat" }},
              {{ gap = "a", length = "0.5 m" }},
              {{ lens = "L", focal = "{:?} m" }},
              {{ gap = "b", length = "0.8 m" }},
              {{ mirror = "B", roc = "flat" }},
            ]
            "#,
            1.0 / power
        );
        let check = checked(&text);
        let range = check
            .ranges
            .iter()
            .find(|r| r.quantity == "L.focal")
            .unwrap();
        (
            range.from_per_m.unwrap().unwrap(),
            range.to_per_m.unwrap().unwrap(),
        )
    };
    let (from, to) = zone(0.6);
    assert_relative_eq!(from, 0.0, epsilon = 1e-14);
    assert_relative_eq!(to, 1.25, max_relative = 1e-14);
    let (from, to) = zone(2.5);
    assert_relative_eq!(from, 2.0, max_relative = 1e-14);
    assert_relative_eq!(to, 3.25, max_relative = 1e-14);
    // From between the zones, the nearer one is named.
    let (from, to) = zone(1.9);
    assert_relative_eq!(from, 2.0, max_relative = 1e-14);
    assert_relative_eq!(to, 3.25, max_relative = 1e-14);
}
