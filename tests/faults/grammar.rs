//! Cavity files out of arbitrary bytes, in the words of the format: the same bytes always write the
//! same text.

use std::fmt::Write;

/// Bytes as a stream of decisions; zeros when they run out.
struct Choices<'a> {
    bytes: &'a [u8],
    /// How wild the text is: 0 plain, 1 of extreme magnitudes, 2 and above broken here and there.
    wild: u8,
}

impl Choices<'_> {
    fn byte(&mut self) -> usize {
        match self.bytes.split_first() {
            Some((first, rest)) => {
                self.bytes = rest;
                usize::from(*first)
            }
            None => 0,
        }
    }

    fn one<'w>(&mut self, words: &[&'w str]) -> &'w str {
        words[self.byte() % words.len()]
    }

    /// Something that happens once in `n` times, and never when the bytes have run out.
    fn once_in(&mut self, n: usize) -> bool {
        self.byte() % n == n - 1
    }

    fn slips(&mut self) -> bool {
        self.wild >= 2 && self.once_in(96)
    }
}

const PLAIN: [&str; 8] = ["100", "1", "50", "23.5", "7", "0.3", "200", "12.7"];
const EXTREME: [&str; 24] = [
    "0",
    "1e9",
    "1e-9",
    "1e12",
    "1e-12",
    "1e5",
    "1e-5",
    "1e10",
    "1e3",
    "1e6",
    "1e-6",
    "1e8",
    "1e-3",
    "89.999999",
    "90",
    "1.0000001",
    "1e15",
    "2e-16",
    "1e30",
    "1e-30",
    "1e400",
    "5e-324",
    "1e-7",
    "1e7",
];
const BROKEN: [&str; 22] = [
    "true",
    "nan",
    "-inf",
    "\"\"",
    "[]",
    "{}",
    "[1, 2]",
    "\"left\"",
    "\"1 m\"",
    "\"1 2 m\"",
    "1e400",
    "\"1 mm ± \"",
    "\"flat\"",
    "1979-05-27",
    "0x7f",
    "\"\\u001b[2J\"",
    "-5",
    "\"1,5 mm\"",
    "\"µ\"",
    "\"brewster\"",
    "\"-1 m\"",
    "{ a = 1 }",
];

fn number<'w>(c: &mut Choices<'_>) -> &'w str {
    if c.wild >= 1 && c.once_in(6) {
        c.one(&EXTREME)
    } else {
        c.one(&PLAIN)
    }
}

/// A value of one of the kinds that the keys below name.
fn value(c: &mut Choices<'_>, kind: &str) -> String {
    if c.slips() {
        return c.one(&BROKEN).to_string();
    }
    let spread = match c.byte() % 12 {
        11 => " ± 1 %",
        10 => " +0.1/-0.2",
        _ => "",
    };
    match kind {
        "length" => format!(
            "\"{} {}\"",
            number(c),
            c.one(&["mm", "mm", "um", "m", "nm", "in"])
        ),
        "spread" => format!("\"{} mm{spread}\"", number(c)),
        "radius" => match c.byte() % 6 {
            0 => "\"flat\"".into(),
            1 => format!("\"{} mm{spread} convex\"", number(c)),
            2 => format!("\"-{} mm\"", number(c)),
            _ => format!("\"{} {}{spread}\"", number(c), c.one(&["mm", "m"])),
        },
        "focal" => format!("\"{}{} mm{spread}\"", c.one(&["", "", "-"]), number(c)),
        "strength" => format!("\"{} 1/m\"", number(c)),
        "share" => c.one(&["0.9", "1", "1e-9", "\"80 %\""]).into(),
        "material" => c
            .one(&[
                "\"fused silica\"",
                "\"YAG\"",
                "\"N-BK7\"",
                "\"YVO4\", axis = \"e\"",
                "\"air\"",
            ])
            .into(),
        "face" => match c.byte() % 4 {
            0 => format!("\"{} mm convex\"", number(c)),
            1 => format!("\"{} m concave\"", number(c)),
            _ => "\"flat\"".into(),
        },
        "angle" => match c.byte() % 8 {
            0 => "\"0 deg\"".into(),
            1 if c.wild >= 1 => format!("\"{} deg\"", number(c)),
            2 => "\"56.3 deg\"".into(),
            3 if c.wild >= 1 => "\"89.999999 deg\"".into(),
            _ => format!("\"{} deg\"", c.one(&["8", "12", "30", "45"])),
        },
        "slab angle" => match c.byte() % 4 {
            0 => "\"brewster\"".into(),
            1 => value(c, "angle"),
            _ => "\"0 deg\"".into(),
        },
        "curvature" => {
            let sign = c.one(&["", "", "-"]);
            format!("\"{sign}{} 1/m\"", number(c))
        }
        "index" => {
            if c.wild >= 1 && c.once_in(4) {
                c.one(&["1", "1.0000001", "100", "99.9", "1e5", "0.5"])
                    .into()
            } else {
                c.one(&["1.5", "1.82", "1", "3.5", "\"1.605 ± 0.002\""])
                    .into()
            }
        }
        "medium" => match c.byte() % 4 {
            0 => c
                .one(&[
                    "\"air\"",
                    "\"vacuum\"",
                    "\"water\"",
                    "\"fused silica\"",
                    "\"N-BK7\"",
                ])
                .into(),
            _ => value(c, "index"),
        },
        "ratio" => c
            .one(&[
                "\"98.5 %\"",
                "\"50 ppm\"",
                "0.5",
                "1",
                "0",
                "\"> 99.9 %\"",
                "1e-30",
                "\"1e-28 %\"",
            ])
            .into(),
        "power" => format!("\"{} {}\"", number(c), c.one(&["W", "mW", "kW"])),
        "per watt" => format!("\"{} 1/W\"", number(c)),
        "temperature" => format!("\"{} degC\"", number(c)),
        "side" => format!("\"{}\"", c.one(&["left", "right", "up", "down"])),
        "fold plane" => format!("\"{} deg\"", c.one(&["0", "90", "180", "270", "-90"])),
        "profile" => format!("\"{}\"", c.one(&["guiding", "antiguiding"])),
        "place" => format!("\"{}\"", c.one(&["spread", "entrance", "middle", "exit"])),
        "rows" => c
            .one(&[
                "[[1, 0.1], [0, 1]]",
                "[[1, 0], [-2, 1]]",
                "[[0, 1], [-1, 0]]",
                "[[1, 1e12], [0, 1]]",
                "[[1e9, 0], [0, 1e-9]]",
                "[[1e200, 0], [0, 1e-200]]",
                "[[-1, 0], [0, -1]]",
                "[[1, 0], [0]]",
            ])
            .into(),
        _ => format!("\"{}\"", c.one(&["a note", "", "µ", "O"])),
    }
}

/// A key and the kind of its value.
type Key = (&'static str, &'static str);

type PartKind = (&'static str, &'static [Key], &'static [&'static [Key]]);

/// A kind of part, the keys that it always has, and groups of keys that it may have.
const PARTS: [PartKind; 9] = [
    (
        "mirror",
        &[("roc", "radius")],
        &[
            &[("aoi", "angle"), ("fold", "side")],
            &[("aoi", "angle"), ("fold_plane", "fold plane")],
            &[("aoi", "angle")],
            &[("reflectance", "ratio")],
            &[("loss_s", "ratio")],
            &[("diameter", "length"), ("clear", "share")],
            &[("width", "length"), ("height", "length")],
            &[
                ("substrate", "medium"),
                ("thickness", "length"),
                ("back", "face"),
            ],
            &[("pointing", "angle"), ("notes", "text")],
        ],
    ),
    ("gap", &[("length", "spread")], &[&[("medium", "medium")]]),
    ("gap", &[("length", "length")], &[&[("notes", "text")]]),
    (
        "lens",
        &[("focal", "focal")],
        &[&[("diameter", "length")], &[("loss", "ratio")]],
    ),
    (
        "slab",
        &[("thickness", "length"), ("index", "index")],
        &[
            &[("group_index", "index")],
            &[("aoi", "slab angle")],
            &[("aoi", "slab angle"), ("shift", "side")],
            &[("entrance", "face")],
            &[("exit", "face")],
            &[("thermal", "curvature"), ("thermal_at", "place")],
            &[("thermal_per_watt", "curvature")],
            &[("temperature", "temperature")],
            &[("loss", "ratio"), ("conversion", "per watt")],
            &[("width", "length"), ("height", "length")],
        ],
    ),
    (
        "slab",
        &[("thickness", "length"), ("material", "material")],
        &[&[("aoi", "slab angle")], &[("temperature", "temperature")]],
    ),
    (
        "duct",
        &[
            ("length", "length"),
            ("index", "index"),
            ("strength", "strength"),
        ],
        &[&[("group_index", "index")], &[("profile", "profile")]],
    ),
    ("aperture", &[("radius", "length")], &[&[("notes", "text")]]),
    (
        "matrix",
        &[("tangential", "rows"), ("sagittal", "rows")],
        &[&[("length", "length")]],
    ),
];

fn write_part(c: &mut Choices<'_>, text: &mut String, kind: usize, name: &str, is_end: bool) {
    let (word, required, optional) = PARTS[kind];
    let word = if c.slips() {
        c.one(&["prism", "miror", "lens", "slab"])
    } else {
        word
    };
    write!(text, "  {{ {word} = \"{name}\"").unwrap();
    for (key, kind) in required {
        if !c.slips() {
            let value = value(c, kind);
            write!(text, ", {key} = {value}").unwrap();
        }
    }
    let mut written: Vec<&str> = Vec::new();
    for group in optional {
        let known = group.iter().any(|(key, _)| written.contains(key));
        let tilts = is_end && group[0].0 == "aoi";
        if !c.once_in(6) || (known || tilts) && !c.slips() {
            continue;
        }
        for (key, kind) in *group {
            let key = if c.slips() {
                c.one(&["lenght", "roc_tangential", "axis", "n"])
            } else {
                key
            };
            let value = value(c, kind);
            write!(text, ", {key} = {value}").unwrap();
            written.push(key);
        }
    }
    text.push_str(if c.slips() {
        c.one(&["\n", " },,\n", ",\n"])
    } else {
        " },\n"
    });
}

/// The text that the bytes stand for.
pub fn cavity_text(bytes: &[u8]) -> String {
    let mut c = Choices { bytes, wild: 0 };
    c.wild = (c.byte() % 4) as u8;
    let ring = c.byte() % 2 == 1;
    let mut text = String::new();
    let wavelength = if c.wild >= 1 && c.once_in(4) {
        value(&mut c, "length")
    } else {
        "\"1064 nm\"".into()
    };
    writeln!(text, "wavelength = {wavelength}").unwrap();
    writeln!(
        text,
        "form = \"{}\"",
        if ring { "ring" } else { "standing" }
    )
    .unwrap();
    for (key, kind) in [
        ("title", "text"),
        ("ambient", "medium"),
        ("temperature", "temperature"),
        ("pump", "power"),
    ] {
        if c.once_in(6) {
            let value = value(&mut c, kind);
            writeln!(text, "{key} = {value}").unwrap();
        }
    }
    text.push_str("path = [\n");
    let inner = c.byte() % 9;
    write_part(&mut c, &mut text, 0, "P0", !ring);
    for index in 1..=inner {
        let kind = c.byte() % PARTS.len();
        let name = if c.slips() {
            "P0".into()
        } else {
            format!("P{index}")
        };
        write_part(&mut c, &mut text, kind, &name, false);
    }
    write_part(&mut c, &mut text, 1, "L", false);
    write_part(&mut c, &mut text, 0, "E", !ring);
    text.push_str("]\n");
    if c.once_in(5) {
        let of = c.one(&[
            "margin",
            "P0.spot",
            "L.least",
            "L.waist_at",
            "E.aspect",
            "distance.P0.E",
            "fsr",
            "mode_clearance",
            "P1.spot.tangential",
        ]);
        let bound = c.one(&[
            "above = \"1 um\"",
            "below = 0.5",
            "between = [0, 1]",
            "above = \"1e30 m\"",
        ]);
        writeln!(text, "limits = [ {{ of = \"{of}\", {bound} }} ]").unwrap();
    }
    if c.once_in(5) {
        let tie = c.one(&[
            "P1.length = L.length",
            "L.length = 300 mm - P1.length",
            "E.roc = 2 * P0.roc",
            "E.roc = 1e300 * P0.roc + 1 mm",
            "P1.length = 1e200 * L.length",
            "E.aoi = P0.aoi",
            "L.length = L.length",
        ]);
        writeln!(text, "ties = [ \"{tie}\" ]").unwrap();
    }
    if c.once_in(5) {
        let general = c.one(&[
            "length = \"0.2 mm\"",
            "roc = \"1 %\"",
            "aoi = \"0.1 deg\"",
            "roc = \"1e29 m\"",
        ]);
        writeln!(text, "general = {{ {general} }}").unwrap();
    }
    if c.once_in(8) {
        text.push_str(
            "defaults = { mirror = { reflectance = \"99.95 %\", diameter = \"12.7 mm\" } }\n",
        );
    }
    write_sent(&mut c, &mut text);
    if c.once_in(16) {
        let tolerance = c.one(&[
            "shape = \"normal\"",
            "groups = [ { of = [\"P0.roc\", \"E.roc\"], correlation = 0.5 } ]",
            "groups = [ { of = [\"P1.length\", \"L.length\"] } ], cost = { \"L.length\" = 2 }",
            "shapes = { \"L.length\" = \"normal\" }",
            "adjust = [ { set = \"L.length\", travel = \"1 mm\", hold = \"margin\", to = 0.5 } ]",
            "adjust = [ { set = \"P1.aoi\", travel = \"1 deg\", hold = \"P1.spot\" } ]",
            "adjust = [ { set = \"temperature\", travel = \"5 K\", hold = \"L.least\" } ]",
        ]);
        writeln!(text, "tolerance = {{ {tolerance} }}").unwrap();
    }
    text
}

/// What is sent into the cavity.
fn write_sent(c: &mut Choices<'_>, text: &mut String) {
    if c.once_in(8) {
        let keys: &[Key] = match c.byte() % 5 {
            0 => &[
                ("spot", "length"),
                ("wavefront", "curvature"),
                ("at", "length"),
            ],
            1 => &[("mode_field", "length"), ("at", "length")],
            2 => &[("power", "power")],
            _ => &[("waist", "length"), ("at", "length"), ("m2", "index")],
        };
        let written: Vec<String> = keys
            .iter()
            .map(|(key, kind)| format!("{key} = {}", value(c, kind)))
            .collect();
        writeln!(text, "source = {{ {} }}", written.join(", ")).unwrap();
    }
    if c.once_in(12) {
        text.push_str("feed = [\n");
        for index in 0..c.byte() % 4 {
            // A mirror of a feed needs the angle that only some of these have.
            let kind = if c.slips() {
                0
            } else {
                1 + c.byte() % (PARTS.len() - 1)
            };
            write_part(c, text, kind, &format!("F{index}"), false);
        }
        text.push_str("]\n");
    }
}
