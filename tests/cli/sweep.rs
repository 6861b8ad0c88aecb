//! `sweep`: ranges, curves and maps as text, JSON and tables; mistakes where they were typed.

use serde_json::Value;

use super::{fine, fits_80_columns, run, wrong};

const RING: &str = "cavities/bow-tie-doubling-ring.toml";
const GAP: &str = "d3.length=15 mm..35 mm";

fn json(words: &[&str]) -> Value {
    let mut all = vec!["sweep", RING, "--json"];
    all.extend(words);
    serde_json::from_str(&fine(&all)).unwrap()
}

fn numbers(list: &Value) -> Vec<f64> {
    let list = list.as_array().unwrap();
    list.iter().map(|x| x.as_f64().unwrap()).collect()
}

#[test]
fn the_text_fits_the_terminal_and_says_the_edges_first() {
    let out = fine(&["sweep", RING, "--vary", GAP]);
    fits_80_columns(&out);
    assert!(
        out.contains("STABLE   from 18.146 mm to 31.005 mm"),
        "{out}"
    );
    assert!(out.contains("sagittal") && out.contains("tangential"));
    let quiet = fine(&["sweep", RING, "--vary", GAP, "--quiet"]);
    assert_eq!(quiet.lines().count(), 1);
    let many = "margin,half_trace.tangential,X1.least.tangential,X1.least.sagittal,M3.spot,fsr";
    fits_80_columns(&fine(&["sweep", RING, "--vary", GAP, "--measure", many]));
}

/// The edges are those of `check`.
#[test]
fn ranges_agree_with_those_of_check() {
    let checked: Value = serde_json::from_str(&fine(&["check", RING, "--json"])).unwrap();
    let find = |address: &str| {
        let ranges = checked["ranges"].as_array().unwrap();
        ranges
            .iter()
            .find(|r| r["quantity"] == address)
            .unwrap()
            .clone()
    };
    let swept = json(&["--vary", GAP]);
    let ranges = swept["stable_ranges"].as_array().unwrap();
    assert_eq!(ranges.len(), 1);
    let same = |a: &Value, b: &Value| {
        let (a, b) = (a.as_f64().unwrap(), b.as_f64().unwrap());
        assert!((a - b).abs() <= 1e-12 * b.abs(), "{a} {b}");
    };
    same(&ranges[0]["from"], &find("d3.length")["from"]);
    same(&ranges[0]["to"], &find("d3.length")["to"]);
    assert_eq!(ranges[0]["from_plane"], "sagittal");
    assert_eq!(ranges[0]["from_is_touch"], false);
    let swept = json(&["--vary", "M3.roc=30..80 mm"]);
    let ranges = swept["stable_ranges"].as_array().unwrap();
    same(&ranges[0]["from_per_m"], &find("M3.roc")["from_per_m"]);
    same(&ranges[0]["to_per_m"], &find("M3.roc")["to_per_m"]);
    assert!(ranges[0].get("from").is_none());
}

#[test]
fn json_has_a_value_for_every_point_or_says_why_not() {
    let swept = json(&["--vary", GAP, "--measure", "margin,X1.spot"]);
    let varied = &swept["vary"][0];
    assert_eq!(varied["quantity"], "d3.length");
    let values = numbers(&varied["values"]);
    assert_eq!(values.len(), 201);
    assert_eq!((values[0], values[200]), (0.015, 0.035));
    let margins = numbers(&swept["measures"]["margin"]);
    let spots = swept["measures"]["X1.spot"].as_array().unwrap();
    for (margin, spot) in margins.iter().zip(spots) {
        assert_eq!(*margin > 1e-10, spot.is_f64());
    }
    assert_eq!(swept["why"]["X1.spot"], "the cavity holds no mode");
    assert!(swept["why"].get("margin").is_none());
    let extreme = &swept["extremes"]["margin"]["greatest"];
    assert_eq!(extreme["where"], "inside");
    // The greatest margin of either plane is one; of both, where they cross.
    assert!((extreme["value"].as_f64().unwrap() - 0.9086).abs() < 1e-3);
    let point = &swept["stationary"][0];
    assert_eq!(
        (&point["measure"], &point["kind"]),
        (&"X1.spot".into(), &"minimum".into())
    );
}

#[test]
fn a_radius_is_swept_as_written_and_through_flat_as_curvature() {
    let swept = json(&["--vary", "M3.roc=45..65 mm", "--points", "5"]);
    let radii = numbers(&swept["vary"][0]["values"]);
    for (radius, expected) in radii.iter().zip([0.045, 0.05, 0.055, 0.06, 0.065]) {
        assert!((radius - expected).abs() < 1e-15);
    }
    let words = ["--vary", "M1.roc=100 mm convex..100 mm", "--points", "5"];
    let swept = json(&words);
    let varied = &swept["vary"][0];
    assert_eq!(
        numbers(&varied["values_per_m"]),
        [-10.0, -5.0, 0.0, 5.0, 10.0]
    );
    assert!(varied["values"][2].is_null());
    assert!(swept["cautions"].to_string().contains("even steps of 1/m"));
}

#[test]
fn ties_move_along() {
    let tied = json(&["--vary", GAP, "--tie", "d4.length = d3.length"]);
    let alone = json(&["--vary", GAP]);
    let from = |swept: &Value| swept["stable_ranges"][0]["from"].as_f64().unwrap();
    // Both gaps share what one gap has to do alone.
    let (tied, alone) = (from(&tied), from(&alone));
    assert!(tied > alone && tied < 0.023, "{tied} {alone}");
}

#[test]
fn two_quantities_make_rows_within_rows_and_a_long_table() {
    let folder = tempfile::tempdir().unwrap();
    let path = folder.path().join("map.csv");
    let words = [
        "--vary",
        "M3.roc=45..65 mm",
        "--vary",
        "d3.length=18..30 mm",
        "--points",
        "7",
        "--measure",
        "margin,X1.spot",
        "--csv",
        path.to_str().unwrap(),
    ];
    let swept = json(&words);
    let rows = swept["measures"]["X1.spot"].as_array().unwrap();
    assert_eq!((rows.len(), rows[0].as_array().unwrap().len()), (7, 7));
    assert!(swept.get("stable_ranges").is_none());
    let at = &swept["extremes"]["margin"]["greatest"]["at"];
    assert_eq!(at.as_array().unwrap().len(), 2, "{at}");
    let mut table = csv::Reader::from_path(&path).unwrap();
    let names = table.headers().unwrap().clone();
    let names: Vec<&str> = names.iter().collect();
    assert_eq!(names, ["M3.roc_m", "d3.length_m", "margin", "X1.spot_m"]);
    let records: Vec<_> = table.records().map(Result::unwrap).collect();
    assert_eq!(records.len(), 49);
    for (index, record) in records.iter().enumerate() {
        let in_json = &rows[index / 7][index % 7];
        assert_eq!(record[3].parse::<f64>().ok(), in_json.as_f64());
    }
    let mut words: Vec<&str> = words.to_vec();
    words.splice(0..0, ["sweep", RING]);
    let text = fine(&words);
    fits_80_columns(&text);
    assert!(text.contains("% of the points"), "{text}");
}

/// What the file does not write can be swept as well, and what it says in another way.
#[test]
fn what_is_not_written_is_swept_too() {
    let swept = json(&["--vary", "X1.thermal=0..20 1/m", "--points", "3"]);
    assert_eq!(numbers(&swept["vary"][0]["values"]), [0.0, 10.0, 20.0]);
    assert!(swept["vary"][0]["nominal"].is_null());
}

#[test]
fn without_a_stable_point_the_answer_is_no() {
    let said = run(&["sweep", RING, "--vary", "d3.length=100..200 mm"]);
    assert_eq!(said.status, Some(1), "{}", said.err);
    assert!(
        said.out.contains("UNSTABLE   at every value"),
        "{}",
        said.out
    );
}

#[test]
fn mistakes_are_shown_where_they_were_typed() {
    for (range, place, message) in [
        ("d3.length", "--vary:1:1", "an address, = and two values"),
        ("d3.length=5 mm", "--vary:1:1", "has .. between"),
        ("d3.length=5 mm..", "--vary:1:1", "on either side of its .."),
        ("d3.length=5..6", "--vary:1:11", "needs a unit"),
        ("d3.length=5 mm..6 W", "--vary:1:1", "length"),
        ("d3.length=-5..6 mm", "--vary:1:11", "never negative"),
        ("d3.length=5 mm ± 1 mm..6 mm", "--vary:1:11", "has a spread"),
        ("d3.length=5..5 mm", "--vary:1:11", "begins where it ends"),
        (
            "d9.length=5..6 mm",
            "--vary:1:1",
            "nothing at the address d9.length",
        ),
        ("X1.loss=0.1..0.2 %", "--vary:1:1", "moves neither the beam"),
        (
            "M3.fold=left..right",
            "--vary:1:1",
            "no number that can be swept",
        ),
    ] {
        let err = wrong(&["sweep", RING, "--vary", range]);
        assert!(
            err.contains(place) && err.contains(message),
            "{range}: {err}"
        );
    }
    let with = |more: &[&str]| {
        let mut words = vec!["sweep", RING, "--vary", GAP];
        words.extend(more);
        wrong(&words)
    };
    for (words, place, message) in [
        (
            &["--points", "1"][..],
            "--points:1:1",
            "between 2 along each quantity and 1000000",
        ),
        (&["--points", "1000001"], "--points:1:1", "1000000 in all"),
        (
            &["--points", "99999999999999999999999"],
            "--points:1:1",
            "number of points",
        ),
        (
            &["--measure", "margin,X1.foo"],
            "--measure:1:8",
            "no measure of a part",
        ),
        (
            &["--measure", "margin,"],
            "--measure:1:8",
            "a measure is missing",
        ),
        (
            &["--tie", "d4.length = d9.length"],
            "--tie:1:13",
            "no quantity d9.length",
        ),
        (
            &["--tie", "d3.length = d4.length"],
            "--vary:1:1",
            "d3.length is tied",
        ),
        (
            &["--tie", "d5.length = 20 mm - d3.length"],
            "--tie:1:1",
            "negative",
        ),
        (&["--vary", GAP], "--vary:1:1", "varied twice"),
        (
            &["--vary", "pump=1..2 W", "--vary", "d1.length=1..2 mm"],
            "--vary:1:1",
            "a third",
        ),
    ] {
        let err = with(words);
        assert!(
            err.contains(place) && err.contains(message),
            "{words:?}: {err}"
        );
    }
}
