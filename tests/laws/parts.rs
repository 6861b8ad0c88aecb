//! Parts that must make no difference, or the same one, however they are written.

use approx::assert_relative_eq;
use modewright::analysis::check::{Check, check};
use modewright::file;

/// A few roundings.
const SAME: f64 = 1e-12;

fn checked(top: &str, path: &str) -> Check {
    let text =
        format!("wavelength = \"1064 nm\"\nform = \"standing\"\n{top}\npath = [\n{path}\n]\n");
    match file::load("test.toml", &text, &[]) {
        Ok(loaded) => check(&loaded.cavity),
        Err(refused) => panic!("{:?}\n{text}", refused.diagnostics),
    }
}

fn spots(check: &Check, part: &str) -> Vec<(u32, bool, f64, f64, f64)> {
    check
        .stations
        .iter()
        .filter(|station| station.part == part)
        .map(|station| {
            let spot = station.tangential.unwrap();
            let exit = station.face.is_some();
            (
                station.pass,
                exit,
                station.at_m,
                spot.spot_m,
                spot.curvature_per_m,
            )
        })
        .collect()
}

#[test]
fn the_matrix_of_a_gap_is_a_gap() {
    let ends = |middle: &str| {
        checked(
            "",
            &format!(
                "{{ mirror = \"A\", roc = \"flat\" }}, {{ gap = \"a\", length = \"50 mm\" }}, {middle}, \
                 {{ gap = \"b\", length = \"50 mm\" }}, {{ mirror = \"B\", roc = \"300 mm\" }}"
            ),
        )
    };
    let gap = ends("{ gap = \"Z\", length = \"100 mm\" }");
    let matrix = ends(
        "{ matrix = \"Z\", tangential = [[1, 0.1], [0, 1]], sagittal = [[1, 0.1], [0, 1]], \
         length = \"100 mm\" }",
    );
    for part in ["A", "a", "Z", "b", "B"] {
        for (one, other) in spots(&gap, part).iter().zip(&spots(&matrix, part)) {
            assert_eq!((one.0, one.1), (other.0, other.1));
            assert_relative_eq!(one.2, other.2, max_relative = SAME);
            assert_relative_eq!(one.3, other.3, max_relative = SAME);
            assert_relative_eq!(one.4, other.4, max_relative = SAME, epsilon = SAME);
        }
    }
    assert_relative_eq!(
        gap.round_trip.fsr_hz,
        matrix.round_trip.fsr_hz,
        max_relative = SAME
    );
}

#[test]
fn an_open_aperture_changes_nothing() {
    let path = |aperture: &str| {
        format!(
            "{{ mirror = \"A\", roc = \"flat\" }}, {{ gap = \"a\", length = \"50 mm\", medium = 1.33 }}, \
             {aperture} {{ slab = \"X\", index = 1.8, thickness = \"5 mm\", entrance = \"80 mm convex\" }}, \
             {{ gap = \"b\", length = \"50 mm\", medium = 1.33 }}, {{ mirror = \"B\", roc = \"300 mm\" }}"
        )
    };
    let without = checked("", &path(""));
    let with = checked("", &path("{ aperture = \"H\", radius = \"5 mm\" },"));
    assert_eq!(
        without.planes.tangential.matrix,
        with.planes.tangential.matrix
    );
}

/// Out of water through a bare mirror the beam diverges as in the ambient: by the vacuum wavelength
/// over πw₀, whatever it stood in.
#[test]
fn a_beam_leaves_into_the_ambient() {
    let check = checked(
        "",
        "{ mirror = \"A\", roc = \"flat\" }, { gap = \"a\", length = \"50 mm\", medium = 1.33 }, \
         { mirror = \"B\", roc = \"300 mm\" }",
    );
    let leaving = check.leaving[0].tangential.unwrap();
    let half_angle = 1064e-9 / (std::f64::consts::PI * leaving.waist_m);
    assert_relative_eq!(leaving.divergence_rad, half_angle, max_relative = SAME);
}

#[test]
fn defaults_give_way_to_another_way_of_saying_it_only() {
    let ends = |slab: &str| {
        format!(
            "{{ mirror = \"A\", roc = \"flat\" }}, {{ slab = \"X\", thickness = \"5 mm\"{slab} }}, \
             {{ gap = \"b\", length = \"50 mm\" }}, {{ mirror = \"B\", roc = \"300 mm\", width = \"3 mm\" }}"
        )
    };
    let top = "defaults = { slab = { index = 1.7, group_index = 1.72 }, \
               mirror = { width = \"5 mm\", height = \"5 mm\" } }";
    let own_group = checked(top, &ends(", group_index = 1.75"));
    assert_relative_eq!(
        own_group.round_trip.group_m,
        0.1 + 0.01 * 1.75,
        max_relative = SAME
    );
    let own_material = checked(top, &ends(", material = \"YAG\""));
    assert!(own_material.round_trip.optical_m > 0.1 + 0.01 * 1.8);
}

#[test]
fn a_tied_key_may_be_left_out_of_its_part() {
    let check = checked(
        "ties = [\"B.diameter = A.diameter\"]",
        "{ mirror = \"A\", roc = \"flat\", diameter = \"1 mm\" }, { gap = \"a\", length = \"50 mm\" }, \
         { mirror = \"B\", roc = \"300 mm\" }",
    );
    let station = check.stations.iter().find(|s| s.part == "B").unwrap();
    let clip = station.clip_loss.unwrap();
    let spot = station.tangential.unwrap().spot_m;
    let expected = (-2.0 * (0.45e-3 / spot).powi(2)).exp();
    assert_relative_eq!(clip, expected, max_relative = 1e-9);
}
