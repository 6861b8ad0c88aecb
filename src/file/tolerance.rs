//! `tolerance`: how quantities lie within their spreads and which of them move together.

use std::collections::HashSet;

use toml::Spanned;
use toml::de::{DeTable, DeValue};

use super::adjust::read_adjust;
use super::context::{Raw, in_order, kind_of};
use super::fields::Fields;
use super::keys::{GROUP, Key, SHAPES, TOLERANCE};
use super::reach::number_beyond;
use crate::cavity::{Cavity, Group, MOST_TOLERANCED, Shape, Slot, Tolerancing};
use crate::diagnostic::Place;
use crate::quantity::{Kind, Spread};

const GROUP_FORM: &str =
    "write it like groups = [ { of = [\"M3.roc\", \"M4.roc\"], correlation = 1.0 } ]";

/// Reads `tolerance` of a whole file; without a cavity, what does not need one.
pub(super) fn read_tolerance(top: &Fields<'_, '_>, cavity: Option<&Cavity>) -> Tolerancing {
    let mut tolerancing = Tolerancing::default();
    let advice = "write it like tolerance = { shape = \"rectangular\" }";
    let Some((table, span)) = top.table("tolerance", advice) else {
        return tolerancing;
    };
    let fields = Fields::new(top.context, table, span)
        .owned_by("tolerance")
        .knowing(&TOLERANCE);
    fields.refuse_unknown("`tolerance`", |key| match key {
        "distribution" | "distributions" => Some("how quantities lie within limits is `shape`"),
        "correlation" | "correlations" | "correlated" => {
            Some("quantities that move together are `groups`")
        }
        "adjustment" | "adjustments" | "compensators" => {
            Some("what is adjusted once the parts are there is `adjust`")
        }
        _ => None,
    });
    if let Some(word) = fields.word("shape", &SHAPES) {
        tolerancing.shape = shape(word);
    }
    tolerancing.shapes = read_shapes(&fields);
    tolerancing.groups = read_groups(&fields);
    tolerancing.adjust = read_adjust(&fields, cavity);
    tolerancing.cost = read_cost(&fields);
    tolerancing
}

fn shape(word: usize) -> Shape {
    match word {
        0 => Shape::Rectangular,
        _ => Shape::Normal,
    }
}

/// What one of the tables by address says, entry by entry: the address, its place, its value.
fn by_address<'t>(
    fields: &Fields<'_, 't>,
    key: &str,
    advice: &str,
) -> Vec<(&'t str, Place, &'t Spanned<DeValue<'t>>)> {
    let Some((table, _)) = fields.table(key, advice) else {
        return Vec::new();
    };
    let mut entries = Vec::new();
    for (address, span, value) in in_order(table) {
        let place = fields.context.place(span);
        // TOML reads M3.roc without quotes as a table M3 that holds roc.
        if let DeValue::Table(inner) = value.get_ref() {
            let whole = match in_order(inner).first() {
                Some((rest, ..)) => format!("put the address in quotes: \"{address}.{rest}\" = …"),
                None => advice.to_string(),
            };
            fields.report(
                Some(place),
                format!("`{key}` names addresses, and this is a table"),
                &whole,
            );
            continue;
        }
        entries.push((address, place, value));
    }
    entries
}

fn read_shapes(fields: &Fields<'_, '_>) -> Vec<(Slot, Shape)> {
    let advice = "write it like shapes = { \"M3.roc\" = \"normal\" }";
    let Some((table, span)) = fields.table("shapes", advice) else {
        return Vec::new();
    };
    let words = Fields::new(fields.context, table, span).owned_by("tolerance.shapes");
    let mut shapes = Vec::new();
    for (address, place, _) in by_address(fields, "shapes", advice) {
        let word = words.word(address, &SHAPES);
        let slot = fields.spread_slot(address, &place, "given a shape");
        let (Some(word), Some(slot)) = (word, slot) else {
            continue;
        };
        let spread = fields.context.book.borrow().entry(slot).spread;
        if let Spread::Standard { .. } = spread {
            fields.report(
                Some(place),
                format!("{address} has a standard uncertainty, which is normal by definition"),
                "take it out of `shapes`, or write limits, as in \"100 mm ± 0.5 mm\"",
            );
            continue;
        }
        shapes.push((slot, shape(word)));
    }
    shapes
}

fn read_cost(fields: &Fields<'_, '_>) -> Vec<(Slot, f64)> {
    let advice = "write it like cost = { \"d1.length\" = 2.0 }";
    let mut cost = Vec::new();
    for (address, place, value) in by_address(fields, "cost", advice) {
        let found = fields.context.found(value);
        let number = match found.raw {
            Raw::Number(number)
                if number > 0.0 && number_beyond(number, Kind::Number).is_none() =>
            {
                Some(number)
            }
            _ => {
                fields.report(
                    Some(found.place),
                    "a cost is a bare number above zero",
                    "it is relative: 2 where tightening costs twice what it costs elsewhere",
                );
                None
            }
        };
        let slot = fields.spread_slot(address, &place, "tightened");
        if let (Some(number), Some(slot)) = (number, slot) {
            cost.push((slot, number));
        }
    }
    cost
}

/// The tables of a list, each with its keys checked for their names.
pub(super) fn tables<'c, 't>(
    fields: &Fields<'c, 't>,
    key: &str,
    form: &str,
    keys: &'static [Key],
) -> Vec<Fields<'c, 't>> {
    let items = fields.list(key, form).unwrap_or_default();
    if items.len() > MOST_TOLERANCED {
        fields.report(
            Some(fields.context.place(items[MOST_TOLERANCED].span())),
            format!(
                "`{key}` has {} entries; at most {MOST_TOLERANCED} are read",
                items.len()
            ),
            "keep those that matter",
        );
        return Vec::new();
    }
    let table = |item: &'t Spanned<DeValue<'t>>| match item.get_ref() {
        DeValue::Table(table) => {
            let table: &'t DeTable<'t> = table;
            Some(Fields::new(fields.context, table, item.span()).knowing(keys))
        }
        other => {
            fields.report(
                Some(fields.context.place(item.span())),
                format!(
                    "every entry of `{key}` is a table, and this is {}",
                    kind_of(other)
                ),
                form,
            );
            None
        }
    };
    items.into_iter().filter_map(table).collect()
}

fn read_groups(fields: &Fields<'_, '_>) -> Vec<Group> {
    let mut taken = HashSet::new();
    tables(fields, "groups", GROUP_FORM, &GROUP)
        .into_iter()
        .filter_map(|group| {
            group.refuse_unknown("a group", |key| match key {
                "members" | "quantities" | "addresses" | "set" | "between" => {
                    Some("the quantities of a group are `of`")
                }
                "coefficient" | "rho" | "r" => Some("how far they move together is `correlation`"),
                _ => None,
            });
            let correlation = read_correlation(&group);
            let of = read_members(&group, &mut taken)?;
            Some(Group {
                of,
                correlation: correlation?,
            })
        })
        .collect()
}

fn read_correlation(group: &Fields<'_, '_>) -> Option<f64> {
    let Some(found) = group.find("correlation") else {
        return Some(1.0);
    };
    let quantity = group
        .context
        .quantity("correlation", &found, Kind::Number)?;
    match quantity.value.number() {
        _ if quantity.spread != Spread::Exact => {
            group.report(
                Some(found.place),
                "a correlation has no spread",
                "write one number, such as correlation = 0.8",
            );
            None
        }
        Some(number) if number > 0.0 && number <= 1.0 => Some(number),
        _ => {
            group.report(
                Some(found.place),
                format!(
                    "a correlation lies above 0 and not above 1, and this is {}",
                    quantity.text
                ),
                "1 where they move as one, less where only partly; without a group they are \
                 independent",
            );
            None
        }
    }
}

fn read_members(group: &Fields<'_, '_>, taken: &mut HashSet<Slot>) -> Option<Vec<Slot>> {
    if !group.has("of") {
        group.must_have(
            &["of"],
            Some(group.place.clone()),
            "a group needs `of`, the quantities that move together".into(),
            GROUP_FORM,
        );
        return None;
    }
    let items = group.list("of", GROUP_FORM)?;
    if items.len() < 2 {
        group.report(
            Some(group.place_of("of")),
            "a group has two quantities or more",
            "name those that move together, or take the group out",
        );
    }
    let mut members = Vec::new();
    for item in items {
        let found = group.context.found(item);
        let Raw::Text(address, _) = found.raw else {
            group.report(
                Some(found.place),
                format!(
                    "an address is a text, and this is {}",
                    kind_of(item.get_ref())
                ),
                GROUP_FORM,
            );
            continue;
        };
        let Some(slot) = group.spread_slot(&address, &found.place, "moved with others") else {
            continue;
        };
        if members.contains(&slot) {
            group.report(
                Some(found.place),
                format!("{address} stands twice in this group"),
                "name every quantity once",
            );
        } else if !taken.insert(slot) {
            group.report(
                Some(found.place),
                format!("{address} is in another group already"),
                "a quantity moves with one group; make one group of the two, or leave it out of \
                 one",
            );
        } else {
            members.push(slot);
        }
    }
    // What is left where the command line has made one of them exact moves by itself.
    (members.len() >= 2).then_some(members)
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::cavity::{Adjust, Measure};
    use crate::file::load;
    use crate::optics::Plane;

    const FILE: &str = r#"
wavelength = "1064 nm"
form = "ring"
path = [
  { mirror = "M1", roc = "50 mm ± 1 %", aoi = "8 deg" },
  { gap = "d1", length = "80 mm ± 0.3 mm" },
  { mirror = "M2", roc = "50 mm ± 1 %", aoi = "8 deg" },
  { gap = "d2", length = "23.00(5) mm" },
]
tolerance = {
  shape = "normal",
  shapes = { "M1.roc" = "rectangular" },
  groups = [ { of = ["M1.roc", "M2.roc"] }, { of = ["d1.length", "d2.length"], correlation = 0.5 } ],
  adjust = [
    { set = "d2.length", travel = "1 mm", hold = "margin.tangential", to = 0.84 },
    { set = "temperature", travel = "5 K", hold = "M1.spot" },
  ],
  cost = { "d1.length" = 2 },
}
"#;

    fn read(set: &[&str]) -> Cavity {
        let set: Vec<String> = set.iter().map(|set| set.to_string()).collect();
        load("file", FILE, &set).unwrap().cavity
    }

    #[test]
    fn what_is_written_is_kept() {
        let cavity = read(&[]);
        let slot = |address| cavity.book().find(address).unwrap();
        let [m1, m2] = [slot("M1.roc"), slot("M2.roc")];
        let [d1, d2] = [slot("d1.length"), slot("d2.length")];
        let expected = Tolerancing {
            shape: Shape::Normal,
            shapes: vec![(m1, Shape::Rectangular)],
            groups: vec![
                Group {
                    of: vec![m1, m2],
                    correlation: 1.0,
                },
                Group {
                    of: vec![d1, d2],
                    correlation: 0.5,
                },
            ],
            adjust: vec![
                Adjust {
                    set: d2,
                    travel: 1e-3,
                    hold: Measure::Margin(Some(Plane::Tangential)),
                    hold_name: "margin.tangential".into(),
                    to: Some(0.84),
                },
                Adjust {
                    set: Cavity::TEMPERATURE,
                    travel: 5.0,
                    hold: Measure::Spot(0, None),
                    hold_name: "M1.spot".into(),
                    to: None,
                },
            ],
            cost: vec![(d1, 2.0)],
        };
        assert_eq!(cavity.tolerancing, expected);
    }

    /// Trying a value without its spread leaves the file as good as it was.
    #[test]
    fn what_the_command_line_makes_exact_moves_with_nothing() {
        let cavity = read(&["M1.roc=50 mm", "d1.length=80 mm"]);
        assert!(cavity.tolerancing.groups.is_empty());
        assert!(cavity.tolerancing.shapes.is_empty());
        assert!(cavity.tolerancing.cost.is_empty());
        assert_eq!(cavity.tolerancing.adjust.len(), 2);
    }

    #[test]
    fn a_slip_of_the_path_hides_no_slip_of_the_tolerances() {
        let broken = FILE.replace("length = \"80 mm ± 0.3 mm\"", "length = 80");
        let broken = broken.replace("\"normal\"", "\"gaussian\"");
        let said = load("file", &broken, &[]).unwrap_err().diagnostics;
        // The lost length is not missed in its group.
        assert_eq!(said.len(), 2, "{said:?}");
        let ends = FILE.replace("form = \"ring\"", "form = \"standing\"");
        let ends = ends.replace("\"normal\"", "\"gaussian\"");
        let said = load("file", &ends, &[]).unwrap_err().diagnostics;
        assert_eq!(said.len(), 2, "{said:?}");
    }
}
