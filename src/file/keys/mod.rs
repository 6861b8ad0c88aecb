//! The keys that a cavity file may hold: one table for the reader that checks them and the schema
//! that describes them.

mod part;
mod top;

pub(super) use part::{KINDS, PROFILES, PartKind, SIDES, SLIT_PLANES, THERMAL_PLACES};
pub(super) use top::{
    ADJUST, FORMS, GENERAL, GROUP, LIMIT, POLARISATIONS, SHAPES, SOURCE, TOLERANCE, TOP,
};

use crate::quantity::Kind;

/// A key of one table.
#[derive(Clone, Copy, Debug)]
pub(super) struct Key {
    pub name: &'static str,
    pub holds: Holds,
    /// What it is, for someone who reads it for the first time.
    pub says: &'static str,
}

/// What stands behind a key.
#[derive(Clone, Copy, Debug)]
pub(super) enum Holds {
    /// Name of a part.
    Name,
    /// Any text.
    Text,
    /// A quantity.
    Quantity(Kind),
    /// One of a few words.
    Word(&'static [&'static str]),
    /// A material or an index.
    Medium,
    /// Two rows of two bare numbers.
    Entries,
    /// A whole number from 1 to this one.
    Count(u32),
    /// Quantities of one kind.
    Quantities(Kind),
    /// Parts in the order of the beam.
    Parts,
    /// A table with these keys.
    Table(&'static [Key]),
    /// Tables with these keys.
    Tables(&'static [Key]),
    /// Texts.
    Texts,
    /// A quantity, in whatever the measure or quantity it belongs to is written in.
    Bound,
    /// Two bounds.
    Bounds,
    /// A tolerance for each of the keys that can have a general one.
    General,
    /// A table of defaults for each kind of part.
    Defaults,
    /// A word of these for each address.
    Words(&'static [&'static str]),
    /// A number above zero for each address.
    Numbers,
}

const fn key(name: &'static str, holds: Holds, says: &'static str) -> Key {
    Key { name, holds, says }
}

const fn quantity(name: &'static str, kind: Kind, says: &'static str) -> Key {
    key(name, Holds::Quantity(kind), says)
}

/// What stands behind a key of a table.
pub(super) fn holds(keys: &[Key], name: &str) -> Option<Holds> {
    keys.iter()
        .find(|key| key.name == name)
        .map(|key| key.holds)
}

/// Names of the keys of a table.
pub(super) fn names(keys: &[Key]) -> Vec<&'static str> {
    keys.iter().map(|key| key.name).collect()
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn no_table_names_a_key_twice() {
        let tables = KINDS.iter().map(|kind| kind.keys);
        for table in tables.chain([&TOP[..], &SOURCE, &LIMIT, &TOLERANCE, &GROUP, &ADJUST]) {
            let mut known = names(table);
            known.sort_unstable();
            known.dedup();
            assert_eq!(known.len(), table.len());
        }
    }

    #[test]
    fn a_key_of_another_kind_of_part_is_refused_wherever_it_stands() {
        let file = |extra: &str, lens: &str| {
            format!(
                "wavelength = \"1 um\"\nform = \"ring\"\n{extra}\npath = [{{ mirror = \"M1\", \
                 roc = \"1 m\" }}, {{ lens = \"L1\", focal = \"1 m\"{lens} }}]"
            )
        };
        let width = ["L1.width=5 mm".to_string()];
        for (text, set) in [
            (file("", ", width = \"5 mm\", height = \"5 mm\""), &[][..]),
            (file("defaults = { lens = { width = \"5 mm\" } }", ""), &[]),
            (file("", ""), &width),
        ] {
            let refused = crate::file::load("file", &text, set).unwrap_err();
            let said = &refused.diagnostics[0].message;
            assert!(said.contains("width"), "{said}");
        }
    }

    #[test]
    fn a_general_tolerance_is_of_a_key_that_some_part_has() {
        for (name, kind) in GENERAL {
            let found = KINDS
                .iter()
                .filter_map(|part| holds(part.keys, name))
                .any(|held| matches!(held, Holds::Quantity(k) if k == kind));
            assert!(found, "{name}");
        }
    }
}
