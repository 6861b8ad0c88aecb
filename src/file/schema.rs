//! The JSON Schema of a cavity file, for editors and for programs that write such files.
//!
//! It describes the file as data, once TOML has become JSON, in the 2020-12 dialect
//! (<https://json-schema.org/draft/2020-12>). It is looser than the reader: what it refuses the
//! reader refuses too, but only the reader knows whether a cavity can be put together.

use serde_json::{Map, Value, json};

use super::MOST_PARTS;
use super::keys::{GENERAL, Holds, KINDS, Key, PartKind, TOP};
use crate::quantity::{Kind, LONGEST};

/// The schema, as data.
pub fn schema() -> Value {
    let mut definitions = Map::new();
    for kind in Kind::ALL {
        definitions.insert(name(kind).into(), quantity(kind));
    }
    definitions.insert("medium".into(), medium());
    for kind in KINDS {
        let mut part = table(kind.keys);
        part["required"] = json!([kind.name]);
        part["title"] = kind.name.into();
        part["description"] = kind.says.into();
        definitions.insert(kind.name.into(), part);
    }
    let kinds = KINDS.map(|kind| reference(kind.name));
    definitions.insert("part".into(), json!({ "oneOf": kinds }));
    let needs = KINDS.map(needs);
    definitions.insert("whole_part".into(), json!({ "allOf": needs }));

    let mut schema = table(&TOP);
    schema["$schema"] = "https://json-schema.org/draft/2020-12/schema".into();
    schema["title"] = "A cavity file of modewright".into();
    schema["required"] = json!(["wavelength", "form", "path"]);
    // Defaults and ties may give what a part leaves out.
    schema["if"] = json!({
        "not": { "anyOf": [{ "required": ["defaults"] }, { "required": ["ties"] }] },
    });
    schema["then"] = json!({
        "properties": { "path": { "items": reference("whole_part") } },
    });
    schema["$defs"] = Value::Object(definitions);
    schema
}

/// A table that holds nothing but these keys.
fn table(keys: &[Key]) -> Value {
    let properties: Map<String, Value> = keys
        .iter()
        .map(|key| {
            let mut described = value(key.holds);
            described["description"] = key.says.into();
            (key.name.into(), described)
        })
        .collect();
    json!({ "type": "object", "properties": properties, "additionalProperties": false })
}

fn value(holds: Holds) -> Value {
    match holds {
        Holds::Name => json!({
            "type": "string",
            "minLength": 1,
            "maxLength": super::parts::LONGEST_NAME,
        }),
        Holds::Text => json!({ "type": "string" }),
        Holds::Quantity(kind) => reference(name(kind)),
        Holds::Word(words) => json!({ "enum": words }),
        Holds::Medium => reference("medium"),
        Holds::Entries => {
            let row = json!({
                "type": "array",
                "items": { "type": "number" },
                "minItems": 2,
                "maxItems": 2,
            });
            json!({ "type": "array", "items": row, "minItems": 2, "maxItems": 2 })
        }
        Holds::Count(most) => json!({ "type": "integer", "minimum": 1, "maximum": most }),
        Holds::Quantities(kind) => json!({ "type": "array", "items": reference(name(kind)) }),
        Holds::Parts => json!({
            "type": "array",
            "items": reference("part"),
            "maxItems": MOST_PARTS,
        }),
        Holds::Table(keys) => table(keys),
        Holds::Tables(keys) => json!({ "type": "array", "items": table(keys) }),
        Holds::Texts => json!({ "type": "array", "items": { "type": "string" } }),
        Holds::Bound => bound(),
        Holds::Bounds => json!({
            "type": "array",
            "items": bound(),
            "minItems": 2,
            "maxItems": 2,
        }),
        Holds::General => {
            let properties: Map<String, Value> = GENERAL
                .iter()
                .map(|(key, _)| ((*key).into(), json!({ "type": "string" })))
                .collect();
            json!({ "type": "object", "properties": properties, "additionalProperties": false })
        }
        Holds::Defaults => {
            let properties: Map<String, Value> = KINDS
                .iter()
                // What a part is called is its own.
                .map(|kind| (kind.name.into(), table(&kind.keys[1..])))
                .collect();
            json!({ "type": "object", "properties": properties, "additionalProperties": false })
        }
        Holds::Words(words) => json!({
            "type": "object",
            "additionalProperties": { "enum": words },
        }),
        Holds::Numbers => json!({
            "type": "object",
            "additionalProperties": { "type": "number", "exclusiveMinimum": 0 },
        }),
    }
}

/// What a part must say if it is of this kind.
fn needs(kind: PartKind) -> Value {
    let wanted: Vec<Value> = kind
        .needs
        .iter()
        .map(|ways| {
            let ways: Vec<Value> = ways
                .iter()
                .map(|keys| json!({ "required": keys }))
                .collect();
            json!({ "anyOf": ways })
        })
        .collect();
    json!({ "if": { "required": [kind.name] }, "then": { "allOf": wanted } })
}

fn reference(definition: &str) -> Value {
    json!({ "$ref": format!("#/$defs/{definition}") })
}

fn bound() -> Value {
    json!({ "type": ["string", "number"] })
}

fn medium() -> Value {
    json!({
        "description": "A material by its name, \"vacuum\", or a refractive index",
        "type": ["string", "number"],
        "minimum": 1,
        "examples": ["vacuum", "air", "fused silica", 1.45],
    })
}

/// A quantity of a kind: its number with its unit, as a text; a bare number where one is right.
fn quantity(kind: Kind) -> Value {
    let units: Vec<&str> = kind
        .units()
        .map(|unit| unit.symbol())
        .filter(|symbol| !symbol.is_empty())
        .collect();
    let units = match units[..] {
        [] => String::new(),
        _ => format!(" ({})", units.join(", ")),
    };
    let mut schema = json!({
        "title": format!("{}{units}", kind.phrase()),
        "type": "string",
        "maxLength": LONGEST,
        "pattern": pattern(kind),
        "examples": [kind.example()],
    });
    if kind.takes_bare_numbers() {
        schema["type"] = json!(["string", "number"]);
    }
    if matches!(kind, Kind::Ratio | Kind::Loss) {
        schema["minimum"] = 0.into();
        schema["maximum"] = 1.into();
    }
    schema
}

/// What every text of that kind contains: a digit and, where it needs one, a unit right behind a
/// number; or a word.
fn pattern(kind: Kind) -> String {
    // Full-width characters are read like the plain ones they resemble.
    let full_width = "[\u{ff01}-\u{ff5e}]";
    if kind.takes_bare_numbers() {
        return format!("[0-9]|{full_width}");
    }
    let spelt: Vec<String> = kind
        .units()
        .flat_map(|unit| unit.names().iter().map(|name| spelling(name)))
        .collect();
    let mut alternatives = vec![
        format!(
            "[0-9.)]\\s*(?:{})(?:$|[^A-Za-z0-9/^°²⁻\u{b5}\u{3bc}])",
            spelt.join("|")
        ),
        full_width.into(),
    ];
    match kind {
        Kind::Radius | Kind::Face => alternatives.push("^\\s*flat".into()),
        Kind::SlabAngle => alternatives.push("^\\s*brewster".into()),
        _ => {}
    }
    alternatives.join("|")
}

/// A unit's name as a regular expression, with both characters for micro.
fn spelling(name: &str) -> String {
    name.replace('^', "\\^")
        .replace('\u{b5}', "[\u{b5}\u{3bc}]")
}

/// A kind's name among the schema's definitions.
fn name(kind: Kind) -> &'static str {
    match kind {
        Kind::Length => "length",
        Kind::Position => "position",
        Kind::Radius => "radius_of_curvature",
        Kind::Face => "face",
        Kind::Focal => "focal_length",
        Kind::Angle => "angle",
        Kind::SlabAngle => "slab_angle",
        Kind::Curvature => "curvature",
        Kind::Strength => "strength",
        Kind::Number => "number",
        Kind::Ratio => "ratio",
        Kind::Loss => "loss",
        Kind::Frequency => "frequency",
        Kind::Power => "power",
        Kind::Energy => "energy",
        Kind::Time => "time",
        Kind::Temperature => "temperature",
        Kind::PerWatt => "per_watt",
        Kind::Damage => "damage",
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::quantity::parse;

    #[test]
    fn no_quantity_that_is_read_is_refused() {
        let numbers = [
            "100",
            ".5",
            "1e-3",
            "1/2",
            "1 1/2",
            "-75",
            "+3",
            "> 99.9",
            "１００",
            "0",
        ];
        let spreads = ["", " ± 1 %", " +0.2/-0.5", " ± 0.5 mm", " ± 1 K", "(5)"];
        let senses = ["", " convex"];
        let mut read = 0;
        for kind in Kind::ALL {
            let validator = jsonschema::draft202012::new(&quantity(kind)).unwrap();
            let mut texts: Vec<String> = ["flat", " flat ± 0.003 1/m", "brewster", "0 ± 50 urad"]
                .map(String::from)
                .to_vec();
            for unit in kind.units().flat_map(|unit| unit.names()) {
                let unit = unit.replace('\u{b5}', "\u{3bc}");
                for number in numbers {
                    for space in ["", " ", "\u{a0}"] {
                        texts.push(format!("{number}(5){space}{unit}"));
                        for spread in spreads {
                            for sense in senses {
                                texts.push(format!("{number}{space}{unit}{spread}{sense}"));
                            }
                        }
                    }
                }
            }
            for text in texts {
                if parse(&text, kind).is_ok() {
                    read += 1;
                    assert!(validator.is_valid(&text.clone().into()), "{kind:?}: {text}");
                }
            }
        }
        assert!(read > 1000, "{read}");
    }

    #[test]
    fn what_the_schema_asks_of_a_part_the_reader_asks_too() {
        let validator = jsonschema::draft202012::new(&schema()).unwrap();
        for kind in KINDS {
            let part = format!("{} = \"P\"", kind.name);
            let file = format!("wavelength = \"1 um\"\nform = \"standing\"\npath = [{{ {part} }}]");
            let data: Value = toml::from_str(&file).unwrap();
            assert!(!validator.is_valid(&data), "{file}");
            let said: Vec<String> = super::super::load("file", &file, &[])
                .unwrap_err()
                .diagnostics
                .iter()
                .flat_map(|found| {
                    [
                        found.message.clone(),
                        found.help.clone().unwrap_or_default(),
                    ]
                })
                .collect();
            for ways in kind.needs {
                let is_asked = |key: &&str| said.iter().any(|text| text.contains(*key));
                assert!(
                    ways.iter().flat_map(|keys| keys.iter()).any(is_asked),
                    "{file}: {said:?}"
                );
            }
        }
    }
}
