//! Cavities that are hard to draw, each for a reason of its own.

use std::fmt::Write;

/// A name for messages, and the text of a cavity file.
pub type Case = (&'static str, String);

/// All of them.
pub fn all() -> Vec<Case> {
    vec![
        ("two parts", two()),
        ("twelve parts", twelve()),
        ("sixty parts", sixty()),
        ("three hundred lenses", lenses(300)),
        ("kilometre arm and a tiny waist", kilometre()),
        ("kilometre arm, nearly concentric", concentric()),
        ("one plane unstable", one_plane()),
        ("both planes unstable", no_plane()),
        ("Brewster slab, duct, slit", brewster_and_duct()),
        ("everything at one place", crowded()),
        ("ring", ring()),
    ]
}

/// Half-confocal: a waist on the flat mirror.
pub fn two() -> String {
    r#"title = "Two mirrors"
    wavelength = "1064 nm"
    form = "standing"
    path = [
      { mirror = "M1", roc = "flat" },
      { gap = "d", length = "100 mm" },
      { mirror = "M2", roc = "200 mm" },
    ]"#
    .into()
}

/// A crystal of 4 mm in a metre and a half, with a focus of its own.
pub fn twelve() -> String {
    r#"title = "Z-fold"
    wavelength = "800 nm"
    form = "standing"
    path = [
      { mirror = "OC", roc = "flat", reflectance = "97 %" },
      { gap = "a1", length = "600 mm" },
      { mirror = "M3", roc = "100 mm", aoi = "9.1 deg", fold = "left" },
      { gap = "a2", length = "52.5 mm" },
      { slab = "X1", index = 1.76, group_index = 1.78, thickness = "4 mm", aoi = "brewster" },
      { gap = "a3", length = "52.5 mm" },
      { mirror = "M4", roc = "100 mm", aoi = "9.1 deg", fold = "right" },
      { gap = "a4", length = "300 mm" },
      { aperture = "A1", radius = "0.9 mm" },
      { gap = "a5", length = "500 mm" },
      { lens = "L1", focal = "20 m" },
      { mirror = "M6", roc = "flat" },
    ]"#
    .into()
}

/// Thirty optics of four kinds at uneven distances.
pub fn sixty() -> String {
    let mut path = String::from("{ mirror = \"End1\", roc = \"flat\" },\n");
    for i in 0..29 {
        let length = match i {
            17 => 78,
            i => 60 + (i * 37) % 50,
        };
        writeln!(path, "{{ gap = \"g{i}\", length = \"{length} mm\" }},").unwrap();
        let optic = match i % 4 {
            _ if i == 28 => continue,
            0 => format!("lens = \"L{i}\", focal = \"70 mm\""),
            1 => format!("mirror = \"Fold{i}\", roc = \"flat\", aoi = \"10 deg\", fold = \"left\""),
            2 => format!("mirror = \"C{i}\", roc = \"150 mm\", aoi = \"4 deg\", fold = \"right\""),
            _ => format!("slab = \"X{i}\", index = 1.5, group_index = 1.5, thickness = \"8 mm\""),
        };
        writeln!(path, "{{ {optic} }},").unwrap();
    }
    path += "{ mirror = \"End2\", roc = \"600 mm\" },\n";
    format!("wavelength = \"1030 nm\"\nform = \"standing\"\npath = [\n{path}]")
}

/// A guide of equal lenses with the longest names there are.
pub fn lenses(count: usize) -> String {
    let mut path = String::from("{ mirror = \"End1\", roc = \"flat\" },\n");
    for i in 0..count {
        writeln!(path, "{{ gap = \"g{i}\", length = \"100 mm\" }},").unwrap();
        writeln!(
            path,
            "{{ lens = \"Lens-of-a-long-name-{i:04}\", focal = \"90 mm\" }},"
        )
        .unwrap();
    }
    path += "{ gap = \"last\", length = \"100 mm\" }, { mirror = \"End2\", roc = \"flat\" },\n";
    format!("wavelength = \"1030 nm\"\nform = \"standing\"\npath = [\n{path}]")
}

/// From 60 mm to 350 nm in one picture.
pub fn kilometre() -> String {
    r#"title = "Kilometre arm"
    wavelength = "1064 nm"
    form = "standing"
    path = [
      { mirror = "ETM", roc = "900 m" },
      { gap = "arm", length = "1 km" },
      { lens = "T", focal = "9.0 mm" },
      { gap = "d2", length = "9.0005 mm" },
      { mirror = "M3", roc = "flat" },
    ]"#
    .into()
}

fn concentric() -> String {
    r#"wavelength = "1064 nm"
    form = "standing"
    path = [
      { mirror = "ITM", roc = "500.0001 m" },
      { gap = "arm", length = "1 km" },
      { mirror = "ETM", roc = "500.0001 m" },
    ]"#
    .into()
}

/// Folded so widely that the tangential plane is lost.
pub fn one_plane() -> String {
    r#"title = "Wide bow-tie"
    wavelength = "1064 nm"
    form = "ring"
    path = [
      { mirror = "M1", roc = "flat", aoi = "25 deg", fold = "left" },
      { gap = "d1", length = "80 mm" },
      { mirror = "M2", roc = "flat", aoi = "25 deg", fold = "left" },
      { gap = "d2", length = "73 mm" },
      { mirror = "M3", roc = "50 mm", aoi = "25 deg", fold = "right" },
      { gap = "d3", length = "59 mm" },
      { mirror = "M4", roc = "50 mm", aoi = "25 deg", fold = "right" },
      { gap = "d5", length = "73 mm" },
    ]"#
    .into()
}

/// No beam at all.
pub fn no_plane() -> String {
    r#"wavelength = "1064 nm"
    form = "standing"
    path = [
      { mirror = "M1", roc = "50 mm" },
      { gap = "d", length = "300 mm" },
      { lens = "L", focal = "-40 mm" },
      { gap = "e", length = "5 mm" },
      { mirror = "M2", roc = "100 mm convex" },
    ]"#
    .into()
}

/// The tangential radius jumps at the plate's faces.
pub fn brewster_and_duct() -> String {
    r#"title = "Plate and rod"
    wavelength = "1064 nm"
    form = "standing"
    path = [
      { mirror = "HR", roc = "flat" },
      { gap = "b1", length = "120 mm" },
      { slab = "BP", index = 1.45, group_index = 1.46, thickness = "6 mm", aoi = "brewster" },
      { gap = "b2", length = "80 mm" },
      { duct = "Rod", length = "100 mm", index = 1.82, group_index = 1.83, strength = "2.5 1/m" },
      { gap = "b3", length = "30 mm" },
      { aperture = "S1", half_width = "1.0 mm", plane = "tangential" },
      { gap = "b4", length = "170 mm" },
      { mirror = "OC", roc = "flat" },
    ]"#
    .into()
}

fn crowded() -> String {
    r#"title = "Everything at one place, under a title so long that no picture can show it whole, whatever its size, and which goes on and on for the sake of it"
    wavelength = "1064 nm"
    form = "standing"
    limits = [{ of = "margin", above = 0.9 }]
    path = [
      { mirror = "HR", roc = "20 mm" },
      { slab = "Crystal", index = 1.82, group_index = 1.84, thickness = "5 mm" },
      { aperture = "Ap", radius = "200 um" },
      { lens = "A-lens-with-a-long-name", focal = "1 m" },
      { slab = "Plate", index = 1.5, group_index = 1.5, thickness = "0.2 mm" },
      { gap = "air", length = "0.1 mm" },
      { matrix = "Box", tangential = [[1.0, 0.001], [0.0, 1.0]], sagittal = [[1.0, 0.001], [0.0, 1.0]], length = "1 mm" },
      { gap = "air2", length = "0.1 mm" },
      { mirror = "OC", roc = "flat" },
    ]"#
    .into()
}

fn ring() -> String {
    include_str!("../../cavities/bow-tie-doubling-ring.toml").into()
}
