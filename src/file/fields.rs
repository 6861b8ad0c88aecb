//! The fields of one table of a file, read by key: from the command line where it says something
//! of that address, from the table, or from the defaults for its kind.

use std::cell::RefCell;
use std::ops::Range;

use toml::de::{DeTable, DeValue};

use super::context::{Context, Found, Raw, example, in_order, kind_of, nearest, shown};
use super::keys::{Holds, Key, holds, names};
use crate::cavity::{Entry, Origin, Slot};
use crate::diagnostic::Place;
use crate::quantity::{Kind, Quantity, Spread};

/// Different ways of saying the same thing: a default gives way where the part names another way.
const WAYS: [&[&[&str]]; 9] = [
    &[&["fold"], &["fold_plane"]],
    &[&["roc"], &["roc_tangential", "roc_sagittal"]],
    &[&["focal"], &["focal_tangential", "focal_sagittal"]],
    &[&["diameter"], &["width", "height"]],
    &[&["radius"], &["half_width", "plane"]],
    &[&["strength"], &["strength_tangential", "strength_sagittal"]],
    &[&["thermal"], &["thermal_tangential", "thermal_sagittal"]],
    &[
        &["thermal_per_watt"],
        &["thermal_per_watt_tangential", "thermal_per_watt_sagittal"],
    ],
    &[&["material", "axis"], &["index", "group_index"]],
];

/// What a coating does: a mirror that names any of it takes none of it from the defaults.
const COATING: [&str; 9] = [
    "reflectance",
    "reflectance_s",
    "reflectance_p",
    "transmission",
    "transmission_s",
    "transmission_p",
    "loss",
    "loss_s",
    "loss_p",
];

/// One table, and who it is.
pub(super) struct Fields<'c, 't> {
    pub context: &'c Context<'t>,
    table: &'t DeTable<'t>,
    /// The whole table's place.
    pub place: Place,
    /// What comes before the dot in its addresses; empty at the top level.
    pub owner: String,
    /// Index of the part it describes.
    pub part: Option<usize>,
    defaults: Option<&'t DeTable<'t>>,
    /// What it may hold.
    keys: &'static [Key],
    /// Keys that unknown ones seem to stand for: their lack is told already.
    meant: RefCell<Vec<String>>,
}

impl<'c, 't> Fields<'c, 't> {
    pub fn new(context: &'c Context<'t>, table: &'t DeTable<'t>, span: Range<usize>) -> Self {
        Fields {
            context,
            table,
            place: context.place(span),
            owner: String::new(),
            part: None,
            defaults: None,
            keys: &[],
            meant: RefCell::default(),
        }
    }

    pub fn knowing(mut self, keys: &'static [Key]) -> Self {
        self.keys = keys;
        self
    }

    pub fn owned_by(mut self, owner: &str) -> Self {
        self.owner = owner.into();
        self
    }

    pub fn for_part(mut self, part: Option<usize>, defaults: Option<&'t DeTable<'t>>) -> Self {
        self.part = part;
        self.defaults = defaults;
        self
    }

    pub fn address(&self, key: &str) -> String {
        if self.owner.is_empty() {
            key.into()
        } else {
            format!("{}.{key}", self.owner)
        }
    }

    pub fn report(&self, place: Option<Place>, message: impl Into<String>, help: &str) {
        self.context.report(place, message, help);
    }

    /// Reports every key that is not among the known ones.
    pub fn refuse_unknown(&self, what: &str, advice: impl Fn(&str) -> Option<&'static str>) {
        let known = names(self.keys);
        for (key, span, _) in in_order(self.table) {
            if known.contains(&key) {
                continue;
            }
            let near = nearest(key, known.iter().copied());
            let help = match (advice(key), near) {
                (Some(advice), _) => advice.to_string(),
                (None, Some(near)) => format!("did you mean `{near}`?"),
                (None, None) => format!("known here: {}", known.join(", ")),
            };
            let named_in_help = known
                .iter()
                .filter(|key| help.contains(&format!("`{key}`")));
            self.meant
                .borrow_mut()
                .extend(named_in_help.map(|key| key.to_string()));
            self.report(
                Some(self.context.place(span)),
                format!("{what} has no key `{}`", shown(key)),
                &help,
            );
        }
    }

    /// Whether the key is given by the command line or the table itself.
    fn names(&self, key: &str) -> bool {
        self.table.contains_key(key) || self.context.overridden(&self.address(key)).is_some()
    }

    /// The value of a key, wherever it comes from.
    pub fn find(&self, key: &str) -> Option<Found<'t>> {
        // Parts of several kinds share readers; a key that one of them lacks is refused elsewhere.
        if !self.keys.is_empty() && holds(self.keys, key).is_none() {
            return None;
        }
        if let Some(set) = self.context.overridden(&self.address(key)) {
            return Some(Found {
                raw: Raw::Text(set.text.clone(), set.offset),
                place: set.place.clone(),
            });
        }
        if let Some(value) = self.table.get(key) {
            return Some(self.context.found(value));
        }
        let default = self.defaults?.get(key)?;
        let said_otherwise = WAYS
            .iter()
            .filter(|ways| ways.iter().any(|way| way.contains(&key)))
            .flat_map(|ways| ways.iter().filter(|way| !way.contains(&key)))
            .any(|way| way.iter().any(|other| self.names(other)));
        let coated = COATING.contains(&key) && COATING.iter().any(|other| self.names(other));
        let gives_way = said_otherwise || coated;
        (!gives_way).then(|| self.context.found(default))
    }

    /// Whether the key has a value, wherever it comes from; a tie gives one too.
    pub fn has(&self, key: &str) -> bool {
        self.find(key).is_some() || self.context.is_tied(&self.address(key))
    }

    /// The place of a key's value, or of the whole table.
    pub fn place_of(&self, key: &str) -> Place {
        self.find(key)
            .map_or(self.place.clone(), |found| found.place)
    }

    /// What a key measures.
    fn kind(&self, key: &str) -> Kind {
        match holds(self.keys, key) {
            Some(Holds::Quantity(kind)) => kind,
            _ => unreachable!("the tables of keys have no quantity `{key}` here"),
        }
    }

    /// Reports a key that must be there.
    pub fn missing(&self, key: &str, what: &str) {
        let help = match key {
            "roc" => "add roc = \"100 mm\", \"100 mm convex\" or \"flat\"".to_string(),
            "index" if what == "a slab" => {
                "add index = 1.45, or material = \"fused silica\"".to_string()
            }
            "cavity" => "add cavity = \"laser.toml\", the file of the cavity that it leaves".into(),
            "mirror" => "add mirror = \"M2\", the mirror by which it leaves that cavity".into(),
            _ => format!("add {key} = {}", example(key, self.kind(key))),
        };
        self.must_have(
            &[key],
            Some(self.place.clone()),
            format!("{what} needs `{key}`"),
            &help,
        );
    }

    /// Reports the lack of one of some keys, unless another key was meant to be it.
    pub fn must_have(&self, keys: &[&str], place: Option<Place>, message: String, help: &str) {
        let meant = self.meant.borrow();
        if !keys
            .iter()
            .any(|key| meant.iter().any(|known| known == key))
        {
            self.report(place, message, help);
        }
    }

    /// A quantity, without entering it anywhere.
    pub fn quantity(&self, key: &str) -> Option<Quantity> {
        let found = self.find(key)?;
        self.context.quantity(key, &found, self.kind(key))
    }

    /// A quantity entered into the address book.
    pub fn slot(&self, key: &'static str) -> Option<Slot> {
        let kind = self.kind(key);
        let Some(found) = self.find(key) else {
            // A tied number may be left out: its value follows.
            let is_tied = self.context.is_tied(&self.address(key));
            return is_tied.then(|| self.enter(key, 0.0, Spread::Exact, Origin::Tied));
        };
        let quantity = self.context.quantity(key, &found, kind)?;
        let value = if kind.is_reciprocal() {
            quantity.value.curvature()
        } else {
            quantity.value.number()
        };
        let Some(value) = value else {
            self.report(
                Some(found.place),
                format!("`{key}` cannot be \"{}\" here", quantity.text),
                &format!("write it like \"{}\"", kind.example()),
            );
            return None;
        };
        let place = found.place;
        let own = quantity.spread;
        let spread = self.context.spread(key, kind, quantity.value, own, &place);
        let address = self.address(key);
        self.context.places.borrow_mut().insert(address, place);
        Some(self.enter(key, value, spread, Origin::Written))
    }

    /// A quantity entered into the address book, or the format's own default for it.
    pub fn slot_or(&self, key: &'static str, default: f64) -> Slot {
        self.slot(key)
            .unwrap_or_else(|| self.enter(key, default, Spread::Exact, Origin::Implied))
    }

    /// Enters a number into the address book.
    pub fn enter(&self, key: &'static str, value: f64, spread: Spread, origin: Origin) -> Slot {
        self.context.book.borrow_mut().enter(Entry {
            address: self.address(key),
            part: self.part,
            key,
            kind: self.kind(key),
            value,
            spread,
            origin,
        })
    }

    /// A text; nothing is said where the key is not there.
    pub fn text(&self, key: &str) -> Option<(String, Place)> {
        let found = self.find(key)?;
        match found.raw {
            Raw::Text(text, _) => Some((text, found.place)),
            Raw::Number(number) => {
                self.report(
                    Some(found.place),
                    format!("`{key}` is a text, and this is a number"),
                    &format!("write {key} = \"{number}\", in quotes"),
                );
                None
            }
            Raw::Other(value) => {
                self.report(
                    Some(found.place),
                    format!("`{key}` is a text, and this is {}", kind_of(value)),
                    &format!("write it in quotes, as in {key} = \"…\""),
                );
                None
            }
        }
    }

    /// One of a few words, by its index in the list.
    pub fn word(&self, key: &str, words: &[&str]) -> Option<usize> {
        let (text, place) = self.text(key)?;
        let position = words.iter().position(|word| *word == text);
        if position.is_none() {
            let help = match nearest(&text, words.iter().copied()) {
                Some(near) => format!("did you mean \"{near}\"?"),
                None => one_of(words),
            };
            self.report(
                Some(place),
                format!("`{key}` cannot be \"{}\"", shown(&text)),
                &help,
            );
        }
        position
    }

    /// A list, in TOML's own values.
    pub fn list(&self, key: &str, advice: &str) -> Option<Vec<&'t toml::Spanned<DeValue<'t>>>> {
        let value = self.table.get(key)?;
        match value.get_ref() {
            DeValue::Array(items) => Some(items.iter().collect()),
            other => {
                self.report(
                    Some(self.context.place(value.span())),
                    format!("`{key}` is a list, and this is {}", kind_of(other)),
                    advice,
                );
                None
            }
        }
    }

    /// A table within this one.
    pub fn table(&self, key: &str, advice: &str) -> Option<(&'t DeTable<'t>, Range<usize>)> {
        let value = self.table.get(key)?;
        match value.get_ref() {
            DeValue::Table(table) => Some((table, value.span())),
            other => {
                self.report(
                    Some(self.context.place(value.span())),
                    format!("`{key}` is a table, and this is {}", kind_of(other)),
                    advice,
                );
                None
            }
        }
    }
}

fn one_of(words: &[&str]) -> String {
    let quoted: Vec<String> = words.iter().map(|word| format!("\"{word}\"")).collect();
    match quoted.split_last() {
        Some((last, others)) if !others.is_empty() => {
            format!("write {} or {last}", others.join(", "))
        }
        _ => format!("write {}", quoted.join("")),
    }
}
