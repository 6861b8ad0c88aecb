//! Files to start from: two that explain themselves, and the cavities that are shipped.

/// A standing cavity that explains the format and is stable.
pub const STANDING: &str = include_str!("starters/standing.toml");

/// A ring that explains the format and is stable.
pub const RING: &str = include_str!("starters/ring.toml");

/// A cavity file that is shipped.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Shipped {
    /// Its name: that of its file without the ending.
    pub name: &'static str,
    /// Its text.
    pub text: &'static str,
}

macro_rules! shipped {
    ($($name:literal,)*) => {
        &[$(Shipped {
            name: $name,
            text: include_str!(concat!("../../cavities/", $name, ".toml")),
        }),*]
    };
}

/// Every shipped cavity, in the order of their names.
pub const SHIPPED: &[Shipped] = shipped![
    "bow-tie-doubling-ring",
    "compensated-z-fold",
    "confocal-analyser",
    "end-pumped-v-fold",
    "grin-rod-filter",
    "hemispherical-gas-laser",
    "kilometre-arm",
    "micrometre-open-cavity",
    "mode-locked-x-fold",
    "monolithic-crystal-resonator",
    "ring-down-cell",
    "side-pumped-rod",
    "thin-disc-laser",
    "triangular-mode-cleaner",
    "two-deck-laser-head",
    "ultra-stable-reference-cavity",
    "unstable-empty-z-fold",
];

/// The shipped cavity of that name; the ending of its file may stand behind it.
pub fn find(name: &str) -> Option<&'static Shipped> {
    let name = name.strip_suffix(".toml").unwrap_or(name);
    SHIPPED.iter().find(|shipped| shipped.name == name)
}

impl Shipped {
    /// What the cavity is, in the words of its own title; empty where it has none.
    pub fn title(&self) -> String {
        super::load(self.name, self.text, &[])
            .ok()
            .and_then(|loaded| loaded.cavity.title)
            .unwrap_or_default()
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn no_file_of_the_folder_is_forgotten() {
        let folder = concat!(env!("CARGO_MANIFEST_DIR"), "/cavities");
        let mut found: Vec<String> = std::fs::read_dir(folder)
            .unwrap()
            .map(|entry| entry.unwrap().file_name().into_string().unwrap())
            .filter_map(|name| name.strip_suffix(".toml").map(str::to_owned))
            .collect();
        found.sort();
        let known: Vec<&str> = SHIPPED.iter().map(|shipped| shipped.name).collect();
        assert_eq!(found, known, "SHIPPED must name the files of cavities/");
    }

    #[test]
    fn a_shipped_cavity_has_a_title_and_is_found() {
        for shipped in SHIPPED {
            assert!(!shipped.title().is_empty(), "{}", shipped.name);
            assert_eq!(find(&format!("{}.toml", shipped.name)), Some(shipped));
        }
        assert_eq!(find("no such cavity"), None);
    }
}
