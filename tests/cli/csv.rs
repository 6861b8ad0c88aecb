//! `check --csv`: the same numbers as in the JSON.

use super::run;

#[test]
fn the_table_holds_what_the_json_says() {
    let folder = tempfile::tempdir().unwrap();
    let path = folder.path().join("beam.csv");
    let said = run(&[
        "check",
        "cavities/bow-tie-doubling-ring.toml",
        "--json",
        "--csv",
        path.to_str().unwrap(),
    ]);
    assert_eq!(said.status, Some(0), "{}", said.err);
    let json: serde_json::Value = serde_json::from_str(&said.out).unwrap();
    let mut table = csv::Reader::from_path(&path).unwrap();
    let names = table.headers().unwrap().clone();
    let column = |name: &str| names.iter().position(|known| known == name).unwrap();
    let stations = json["stations"].as_array().unwrap();
    let rows: Vec<_> = table.records().map(Result::unwrap).collect();
    assert_eq!(rows.len(), stations.len());
    for (row, station) in rows.iter().zip(stations) {
        assert_eq!(&row[column("part")], station["part"].as_str().unwrap());
        let spot: f64 = row[column("sagittal_spot_m")].parse().unwrap();
        assert_eq!(Some(spot), station["sagittal"]["spot_m"].as_f64());
        let at: f64 = row[column("at_m")].parse().unwrap();
        assert_eq!(Some(at), station["at_m"].as_f64());
    }
}

#[test]
fn a_table_that_cannot_be_written_is_refused_whole() {
    let said = run(&[
        "check",
        "cavities/bow-tie-doubling-ring.toml",
        "--csv",
        "no/such/folder/beam.csv",
    ]);
    assert_eq!(said.status, Some(2));
    assert!(said.out.is_empty());
    assert!(said.err.contains("folder does not exist"), "{}", said.err);
}
