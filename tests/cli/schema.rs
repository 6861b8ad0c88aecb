//! `modewright schema`, judged by a validator that is not ours.

use jsonschema::Validator;
use modewright::quantity::Kind;
use serde_json::{Value, json};

use super::fine;

fn schema() -> Value {
    serde_json::from_str(&fine(&["schema"])).unwrap()
}

fn validator() -> Validator {
    jsonschema::draft202012::new(&schema()).unwrap()
}

fn from_toml(text: &str) -> Value {
    toml::from_str(text).unwrap()
}

fn accepts(validator: &Validator, file: &Value, what: &str) {
    let faults: Vec<String> = validator
        .iter_errors(file)
        .map(|fault| format!("{}: {fault}", fault.instance_path()))
        .collect();
    assert!(faults.is_empty(), "{what}: {faults:#?}");
}

#[test]
fn it_is_a_schema_of_the_2020_12_dialect() {
    let schema = schema();
    assert_eq!(
        schema["$schema"],
        "https://json-schema.org/draft/2020-12/schema"
    );
    jsonschema::draft202012::meta::validate(&schema).unwrap();
}

#[test]
fn every_shipped_cavity_and_starter_satisfies_it() {
    let validator = validator();
    let folder = concat!(env!("CARGO_MANIFEST_DIR"), "/cavities");
    let mut count = 0;
    for entry in std::fs::read_dir(folder).unwrap() {
        let path = entry.unwrap().path();
        if path.extension().is_some_and(|ending| ending == "toml") {
            let text = std::fs::read_to_string(&path).unwrap();
            accepts(&validator, &from_toml(&text), &path.display().to_string());
            count += 1;
        }
    }
    assert!(count > 0);
    for words in [&["new"][..], &["new", "--ring"]] {
        accepts(&validator, &from_toml(&fine(words)), "a starter");
    }
}

/// A file with one of everything, in the spellings that builders use.
const RICH: &str = r#"
title = "One of everything"
notes = "for the schema"
wavelength = "1064nm"
form = "standing"
ambient = "air"
temperature = "22 °C"
polarisation = "p"
pump = "20 W"
input = "M1"
highest_order = 8
sidebands = ["12 MHz"]
ties = ["d2.length = d1.length"]
general = { length = "0.2 mm", roc = "1 %" }
defaults = { mirror = { diameter = "1/2 in" } }
source = { waist = "350 um", at = "-600 mm", m2 = 1.1, power = "10 W" }
feed = [ { lens = "L0", focal = "-200 mm ± 1 %" } ]
limits = [ { of = "margin", above = 0.1 }, { of = "M1.spot", between = ["0.1 mm", "1 mm"] } ]
tolerance = { shape = "normal", shapes = { "d1.length" = "rectangular" }, cost = { "d1.length" = 2.0 }, groups = [ { of = ["M1.roc", "M2.roc_sagittal"], correlation = 0.5 } ], adjust = [ { set = "d1.length", travel = "1 mm", hold = "margin", to = 0.8 }, { set = "X1.temperature", travel = "1 K", hold = "M1.spot", to = "150 um" } ] }
path = [
  { mirror = "M1", roc = "flat ± 0.003 1/m", reflectance = "> 99.9 %", loss = 5e-5, thickness = "6.35 mm", substrate = "fused silica", back = "100 mm convex", pointing = "0 ± 50 urad", damage = "10 J/cm2" },
  { gap = "d1", length = "100.02(5) mm", medium = 1.0003 },
  { slab = "X1", material = "BBO", axis = "o", thickness = "10 mm +0.2/-0.5 mm", aoi = "brewster", thermal = "2 1/m", loss = "0.1 %/cm", conversion = "1e-4 1/W", shift = "up" },
  { gap = "d2" },
  { duct = "D1", length = "20 mm", index = "1.605 ± 0.002", strength = "5 m^-1", profile = "antiguiding" },
  { aperture = "A1", half_width = "1 mm", plane = "sagittal" },
  { matrix = "T1", tangential = [[1, 0.1], [0, 1]], sagittal = [[1, 0.1], [0, 1]], length = "１００ ｍｍ" },
  { mirror = "M2", roc_tangential = "-100 mm", roc_sagittal = "100 mm ± 1 % convex", aoi = "8°", fold_plane = "90 deg" },
]
"#;

#[test]
fn one_of_everything_satisfies_it() {
    accepts(&validator(), &from_toml(RICH), "one of everything");
}

#[test]
fn broken_files_do_not() {
    let validator = validator();
    let good = from_toml(RICH);
    let broken: [(&str, Value); 18] = [
        ("/wavelength", json!(1064)),
        ("/wavelength", json!("1064")),
        ("/wavelength", json!("1064 nmm")),
        ("/form", json!("loop")),
        ("/highest_order", json!(0)),
        ("/path/0/roc", json!("5 1/m")),
        ("/path/0/loss", json!(1.5)),
        ("/path/1/length", json!(100)),
        ("/path/1", json!({ "gap": "d1", "lenght": "100 mm" })),
        ("/path/1", json!({ "length": "100 mm" })),
        ("/path/1", json!({ "gap": "d1", "lens": "L1" })),
        ("/path/2/thermal", json!("300 mm")),
        ("/path/6/tangential", json!([[1, 0.1]])),
        ("/general/length", json!(0.2)),
        ("/tolerance/cost/d1.length", json!(0)),
        ("/tolerance/shapes/d1.length", json!("gaussian")),
        ("/tolerance/groups/0", json!({ "members": ["M1.roc"] })),
        ("/tolerance/adjust/0", json!({ "move": "d1.length" })),
    ];
    for (place, value) in broken {
        let mut file = good.clone();
        *file.pointer_mut(place).unwrap() = value.clone();
        assert!(!validator.is_valid(&file), "{place}: {value}");
    }
    for key in ["wavelength", "form", "path"] {
        let mut file = good.clone();
        file.as_object_mut().unwrap().remove(key);
        assert!(!validator.is_valid(&file), "without {key}");
    }
    let mut file = good.clone();
    for key in ["ties", "defaults"] {
        assert!(validator.is_valid(&file));
        file.as_object_mut().unwrap().remove(key);
    }
    assert!(
        !validator.is_valid(&file),
        "d2 has no length, and no tie gives it one"
    );
    let mut file = good.clone();
    file["lambda"] = json!("1064 nm");
    assert!(!validator.is_valid(&file));
}

#[test]
fn the_reader_knows_every_key_of_the_rich_file_too() {
    let refused = modewright::file::load("rich", RICH, &[]);
    if let Err(refused) = refused {
        for diagnostic in refused.diagnostics {
            assert!(!diagnostic.message.contains("has no key"), "{diagnostic:?}");
        }
    }
}

#[test]
fn every_kind_of_quantity_has_an_example_that_fits() {
    let schema = schema();
    let definitions = schema["$defs"].as_object().unwrap();
    let quantities: Vec<&Value> = definitions
        .values()
        .filter(|definition| definition.get("pattern").is_some())
        .collect();
    assert_eq!(quantities.len(), Kind::ALL.len());
    for definition in quantities {
        let validator = jsonschema::draft202012::new(definition).unwrap();
        for example in definition["examples"].as_array().unwrap() {
            assert!(validator.is_valid(example), "{example}");
        }
        assert!(!validator.is_valid(&json!("")));
    }
}
