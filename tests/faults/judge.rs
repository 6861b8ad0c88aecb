//! What holds of every text whatever, once it has been read.

use modewright::analysis;
use modewright::cavity::Cavity;
use modewright::file::{self, Loaded, Refused};
use modewright::optics::Plane;
use modewright::report::{describe, render};

/// Reads a text; where it is refused, every finding says something and points into the text.
pub fn judged(text: &str) -> Result<Loaded, Refused> {
    let result = file::load("any.toml", text, &[]);
    if let Err(refused) = &result {
        assert!(!refused.diagnostics.is_empty());
        for diagnostic in &refused.diagnostics {
            assert!(!diagnostic.message.is_empty());
            if let Some(place) = &diagnostic.place {
                let source = &refused.sources[place.source].text;
                assert!(place.span.start <= place.span.end);
                assert!(place.span.end <= source.len());
            }
        }
    }
    result
}

/// Shows a refusal, as the command line would.
pub fn show(refused: &Refused) -> String {
    render::diagnostics::render(&refused.diagnostics, &refused.sources)
}

/// Reads a text; where it is refused, the refusal is fit to be shown.
pub fn examine_load(text: &str) -> Option<Loaded> {
    judged(text)
        .inspect_err(|refused| assert!(!show(refused).is_empty()))
        .ok()
}

/// Reads a text and, where it is a cavity, checks it: every number is one, and what has none says
/// why. Returns whether it was a cavity.
pub fn examine(text: &str) -> bool {
    let Some(loaded) = examine_load(text) else {
        return false;
    };
    let cavity = &loaded.cavity;
    let values = cavity.book().nominal();
    let source = cavity.source.as_ref();
    if let Some(sent) = source.and_then(|source| source.start(&values, cavity.ambient())) {
        assert!(
            Plane::BOTH
                .iter()
                .all(|plane| sent[*plane].beta > 0.0 && sent[*plane].q().is_finite())
        );
    }
    let check = analysis::check::check(cavity);
    let json = render::json::render("check", "any.toml", &check).unwrap();
    let value: serde_json::Value = serde_json::from_str(&json).unwrap();
    assert_explained(&value, &mut Vec::new());
    let told = render::terminal::render(&describe::check(&check));
    for word in ["NaN", "inf "] {
        assert!(!told.contains(word), "{told}");
    }
    examine_modes(cavity);
    true
}

/// The same of the transverse modes.
fn examine_modes(cavity: &Cavity) {
    let modes = analysis::modes::modes(cavity, analysis::modes::APART, &[]);
    let json = render::json::render("modes", "any.toml", &modes).unwrap();
    let value: serde_json::Value = serde_json::from_str(&json).unwrap();
    assert_explained(&value, &mut Vec::new());
    let told = render::terminal::render(&describe::modes(&modes));
    for word in ["NaN", "inf "] {
        assert!(!told.contains(word), "{told}");
    }
    assert!(render::plot::scene(&describe::modes_chart(&modes)).is_ok());
}

/// What is null stands beside a reason.
fn assert_explained(value: &serde_json::Value, path: &mut Vec<String>) {
    match value {
        serde_json::Value::Object(fields) => {
            let explained = fields.get("why").is_some_and(serde_json::Value::is_string);
            for (key, field) in fields {
                assert!(
                    explained || !field.is_null(),
                    "{}.{key} is null",
                    path.join(".")
                );
                path.push(key.clone());
                assert_explained(field, path);
                path.pop();
            }
        }
        serde_json::Value::Array(items) => {
            for item in items {
                assert!(!item.is_null(), "an entry of {} is null", path.join("."));
                assert_explained(item, path);
            }
        }
        _ => {}
    }
}
