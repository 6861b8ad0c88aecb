//! `modewright materials`.

use modewright::optics::material;
use serde_json::Value;

use super::{fine, fits_80_columns, wrong};

fn json(words: &[&str]) -> Value {
    serde_json::from_str(&fine(words)).unwrap()
}

#[test]
fn the_list_has_them_all_in_80_columns() {
    let list = fine(&["materials"]);
    fits_80_columns(&list);
    for material in material::all() {
        let is_there = |line: &str| line.trim_start().starts_with(material.name);
        assert!(list.lines().any(is_there), "{}", material.name);
    }
    let all = json(&["materials", "--json"]);
    assert_eq!(all["command"], "materials");
    assert_eq!(all["file"], Value::Null);
    let listed = all["materials"].as_array().unwrap();
    assert_eq!(listed.len(), material::all().count());
    assert!(listed[0]["axes"][0]["wavelength_range_m"][1].is_f64());
}

#[test]
fn one_material_tells_its_ranges_and_sources() {
    let text = fine(&["materials", "lbo"]);
    fits_80_columns(&text);
    assert!(text.contains("Kato, IEEE J. Quantum Electron. 30, 2950 (1994)"));
    assert_eq!(json(&["materials", "lbo", "--json"])["name"], "LBO");
}

#[test]
fn figures_are_those_of_the_library() {
    let words = [
        "materials",
        "bbo",
        "--wavelength",
        "1064 nm",
        "--temperature",
        "40 °C",
        "--axis",
        "o",
    ];
    let text = fine(&words);
    fits_80_columns(&text);
    let (l, t) = (1064e-9, 313.15);
    let axis = material::find("BBO").unwrap().axis(Some("o")).unwrap();
    assert!(text.contains(&format!("{:.6}", axis.index(l, t))));

    let report = json(&[&words[..], &["--json"]].concat());
    assert_eq!(report["wavelength_m"], l);
    assert_eq!(report["temperature_k"], t);
    let figures = &report["axes"][0];
    assert_eq!(figures["axis"], "o");
    for (key, expected) in [
        ("index", axis.index(l, t)),
        ("published_index", axis.published(l)),
        ("group_index", axis.group_index(l, t)),
        ("dn_dlambda_per_m", axis.slope(l, t)),
        ("gvd_s2_per_m", axis.group_velocity_dispersion(l, t)),
        ("dn_dt_per_k", axis.dn_dt(l, t).unwrap()),
        ("brewster_rad", axis.brewster(l, t, 1.0)),
    ] {
        assert_eq!(figures[key].as_f64(), Some(expected), "{key}");
    }
    assert_eq!(figures["relative_to"], "air");
    assert_eq!(figures["source"]["year"], 2018);
    assert_eq!(figures["why"], Value::Null);
}

#[test]
fn without_an_axis_all_are_answered_at_20_degrees() {
    let report = json(&["materials", "KTP", "--wavelength", "1064 nm", "--json"]);
    assert_eq!(report["axes"].as_array().unwrap().len(), 3);
    assert_eq!(report["temperature_k"], 293.15);
}

#[test]
fn what_nobody_published_is_null_with_a_reason() {
    let words = ["materials", "MgF2", "--wavelength", "1064 nm"];
    assert!(fine(&words).contains("no dn/dT is known"));
    let report = json(&[&words[..], &["--json"]].concat());
    let figures = &report["axes"][0];
    assert!(figures["index"].is_f64());
    assert_eq!(figures["dn_dt_per_k"], Value::Null);
    assert!(figures["why"].as_str().unwrap().contains("no dn/dT"));
}

#[test]
fn slips_are_answered_with_the_way_out() {
    for (words, message) in [
        (&["N-BK8"][..], "did you mean \"N-BK7\"?"),
        (&["unobtainium"], "`modewright materials` lists those known"),
        (
            &["BBO", "--wavelength", "20 um"],
            "20 µm lies outside 188 nm to 5.2 µm, the range of Tamošauskas et al.",
        ),
        (&["BBO", "--wavelength", "1064"], "write \"1064 nm\""),
        (&["BBO", "--wavelength", "5 mrad"], "\"mrad\" is an angle"),
        (&["BBO", "--wavelength", "1064 nm ± 1 nm"], "has a spread"),
        (&["BBO", "--wavelength", "-1 um"], "negative"),
        (
            &["BBO", "--wavelength", "1 um", "--temperature", "300 degC"],
            "dn/dT is known from 20 °C to 80 °C",
        ),
        (
            &["BBO", "--wavelength", "1 um", "--axis", "z"],
            "its axes are o, e",
        ),
        (
            &["YAG", "--wavelength", "1 um", "--axis", "o"],
            "YAG is isotropic",
        ),
        (&["BBO", "--temperature", "300 K"], "--wavelength"),
    ] {
        let said = wrong(&[&["materials"], words].concat());
        assert!(said.contains(message), "{said}");
    }
    let said = wrong(&["materials", "BBO", "--wavelength", "1064 quux"]);
    assert!(said.contains("--> --wavelength:1:6"), "{said}");
}
