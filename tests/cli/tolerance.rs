//! `tolerance` as its users run it.

use super::{fine, fits_80_columns, run, wrong};

const RING: &str = "cavities/bow-tie-doubling-ring.toml";

#[test]
fn json_has_the_promised_keys() {
    let out = fine(&[
        "tolerance",
        RING,
        "--samples",
        "20000",
        "--json",
        "--measure",
        "margin",
    ]);
    let json: serde_json::Value = serde_json::from_str(&out).unwrap();
    assert_eq!(json["command"], "tolerance");
    assert_eq!(json["samples"], 20000);
    assert_eq!(json["seed"], 1);
    for key in [
        "yield",
        "yield_interval",
        "unstable",
        "fails",
        "culprits",
        "contributions",
    ] {
        assert!(!json[key].is_null(), "{key}");
    }
    let margin = &json["measures"]["margin"];
    for key in ["nominal", "mean", "standard_uncertainty"] {
        assert!(margin[key].is_f64(), "{key}");
    }
    assert!(margin["quantiles"]["0.025"].as_f64() < margin["quantiles"]["0.975"].as_f64());
    let shares = json["contributions"].as_array().unwrap();
    assert!(
        shares
            .iter()
            .all(|share| share["first_order"].is_f64() && share["total"].is_f64())
    );
}

#[test]
fn the_text_fits_and_a_wanted_yield_decides() {
    let words = ["tolerance", RING, "--samples", "20000"];
    fits_80_columns(&fine(&words));
    let failing = run(&[
        "tolerance",
        RING,
        "--samples",
        "20000",
        "--set",
        "M3.roc=50 mm ± 20 %",
        "--yield",
        "99 %",
    ]);
    assert_eq!(failing.status, Some(1), "{}", failing.err);
    assert!(failing.out.contains("wanted 99.0 %"), "{}", failing.out);
    fits_80_columns(&failing.out);
}

#[test]
fn wrong_input_is_told_once_and_clearly() {
    let said = wrong(&["tolerance", RING, "--measure", "margin,M9.spot"]);
    assert!(
        said.contains("no part is named \"M9\"") && said.contains("--measure"),
        "{said}"
    );
    let said = wrong(&["tolerance", RING, "--yield", "120 %"]);
    assert!(said.contains("--yield"), "{said}");
    let said = wrong(&["tolerance", "cavities/confocal-analyser.toml"]);
    assert!(said.contains("has a tolerance"), "{said}");
    assert!(!wrong(&["tolerance", RING, "--samples", "0"]).is_empty());
    assert!(wrong(&["tolerance", RING, "--apart", "0"]).contains("above zero"));
}
