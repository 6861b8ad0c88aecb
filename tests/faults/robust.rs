//! Inputs that no builder means: whatever the file holds, the program refuses it in plain words,
//! quickly, and leaves stdout alone.

use std::fmt::Write as _;
use std::fs::{self, File};
use std::path::{Path, PathBuf};
use std::process::{Command, Output};
use std::sync::atomic::{AtomicU32, Ordering};
use std::time::{Duration, Instant};

use modewright::file::{self, LARGEST_FILE, MOST_PARTS};
use modewright::report::render;

/// Nobody waits longer for a refusal; the machines of continuous integration are slow.
const PATIENCE: Duration = Duration::from_secs(2);

const REAL: &str = include_str!("../../cavities/bow-tie-doubling-ring.toml");

const GOOD: &str = r#"
wavelength = "1064 nm"
form = "standing"
path = [
  { mirror = "M1", roc = "flat" },
  { gap = "d1", length = "100 mm" },
  { mirror = "M2", roc = "200 mm" },
]
"#;

/// A folder of its own for one test, gone with it.
struct Folder(PathBuf);

impl Folder {
    fn new() -> Folder {
        static COUNT: AtomicU32 = AtomicU32::new(0);
        let count = COUNT.fetch_add(1, Ordering::Relaxed);
        let name = format!("modewright-faults-{}-{count}", std::process::id());
        let path = std::env::temp_dir().join(name);
        fs::create_dir_all(&path).unwrap();
        Folder(path)
    }

    fn write(&self, contents: impl AsRef<[u8]>) -> PathBuf {
        let path = self.0.join("cavity.toml");
        fs::write(&path, contents).unwrap();
        path
    }
}

impl Drop for Folder {
    fn drop(&mut self) {
        let _ = fs::remove_dir_all(&self.0);
    }
}

fn check(path: &Path, arguments: &[&str]) -> (Output, Duration) {
    let start = Instant::now();
    let output = Command::new(env!("CARGO_BIN_EXE_modewright"))
        .arg("check")
        .arg(path)
        .args(arguments)
        .output()
        .unwrap();
    (output, start.elapsed())
}

/// Runs `check` on what must be refused and returns what it says.
fn refused(path: &Path) -> String {
    let (output, took) = check(path, &[]);
    let told = String::from_utf8(output.stderr).expect("stderr is text");
    assert_eq!(output.status.code(), Some(2), "{told}");
    assert!(output.stdout.is_empty(), "stdout is not empty");
    assert!(took < PATIENCE, "took {took:?}");
    assert!(!told.contains("panicked"), "{told}");
    assert!(told.len() < 100_000, "{} bytes of messages", told.len());
    let name = path.file_name().unwrap().to_string_lossy().into_owned();
    assert!(told.contains(&name), "{told}");
    told
}

fn refused_text(contents: impl AsRef<[u8]>) -> String {
    refused(&Folder::new().write(contents))
}

/// The same, where the message points at a line and column.
fn refused_at(contents: impl AsRef<[u8]>, line_and_column: &str) -> String {
    let told = refused_text(contents);
    let place = format!("cavity.toml:{line_and_column}");
    assert!(told.contains(&place), "{place} in {told}");
    told
}

#[test]
fn bytes_that_are_no_text_are_pointed_at() {
    let mut bytes = GOOD.as_bytes().to_vec();
    let at = GOOD.find("100 mm").unwrap();
    bytes[at + 4] = 0xb5;
    assert!(refused_at(bytes, "6:31").contains("UTF-8"));
    refused_text([0xff, 0xfe, 0, 0, 0x80]);
    refused_text(
        "wavelength"
            .encode_utf16()
            .flat_map(u16::to_le_bytes)
            .collect::<Vec<u8>>(),
    );
}

#[test]
fn a_file_cut_short_anywhere_is_loaded_or_refused_in_its_own_bounds() {
    for end in 0..=REAL.len() {
        let Some(text) = REAL.get(..end) else {
            continue;
        };
        if let Err(refused) = file::load("cut.toml", text, &[]) {
            assert!(!refused.diagnostics.is_empty(), "cut at {end}");
            for place in refused.diagnostics.iter().filter_map(|d| d.place.as_ref()) {
                let source = &refused.sources[place.source].text;
                assert!(place.span.start <= place.span.end, "cut at {end}");
                assert!(place.span.end <= source.len(), "cut at {end}");
            }
            render::diagnostics::render(&refused.diagnostics, &refused.sources);
        }
    }
}

#[test]
fn numbers_that_are_none_are_refused() {
    for number in [
        "nan",
        "inf",
        "-inf",
        "1e400",
        "\"nan\"",
        "\"1e400 mm\"",
        "\"-1e-400 mm\"",
    ] {
        refused_at(GOOD.replace("\"100 mm\"", number), "6:2");
    }
    let long = format!("\"0.{}1 mm\"", "0".repeat(100_000));
    refused_text(GOOD.replace("\"100 mm\"", &long));
    let digits = "9".repeat(100_000);
    refused_text(GOOD.replace("\"100 mm\"", &digits));
}

#[test]
fn more_parts_than_a_cavity_has_are_refused() {
    let mut small = String::from("wavelength = \"1 um\"\nform = \"ring\"\npath = [\n");
    let mut large = small.clone();
    for index in 0..100_000 {
        small += "{},\n";
        writeln!(large, "{{ gap = \"d{index}\", length = \"1 mm\" }},").unwrap();
    }
    small += "]";
    large += "]";
    assert!(small.len() < LARGEST_FILE && large.len() > LARGEST_FILE);
    assert!(refused_text(&small).contains(&MOST_PARTS.to_string()));
    assert!(refused_text(&large).contains(&LARGEST_FILE.to_string()));
}

#[test]
fn a_gigabyte_is_not_read() {
    let folder = Folder::new();
    let path = folder.0.join("cavity.toml");
    File::create(&path).unwrap().set_len(1 << 30).unwrap();
    assert!(refused(&path).contains(&LARGEST_FILE.to_string()));
}

#[test]
fn what_is_no_file_is_refused() {
    let folder = Folder::new();
    assert!(refused(&folder.0).contains("folder"));
    assert!(refused(&folder.0.join("missing.toml")).contains("no such file"));
    refused(&folder.write("").join("beneath.toml"));
    refused(&folder.write(""));
}

#[test]
fn deep_nesting_is_refused() {
    const DEEP: usize = 10_000;
    let dotted = vec!["a"; DEEP].join(".");
    for text in [
        format!("path = {}", "[".repeat(DEEP)),
        format!("path = {}{}", "[".repeat(DEEP), "]".repeat(DEEP)),
        format!("path = {}", "{ a = ".repeat(DEEP)),
        format!("path = {}1{}", "{ a = ".repeat(DEEP), " }".repeat(DEEP)),
        format!("{dotted} = 1"),
        format!("[{dotted}]"),
        format!("[[{dotted}]]"),
        format!("path = [ {{ {dotted} = 1 }} ]"),
        "[".repeat(DEEP),
        "[[path]]\n".repeat(DEEP),
    ] {
        refused_text(text);
    }
}

#[test]
fn one_line_of_a_megabyte_is_refused_on_a_screen() {
    let notes = "x".repeat(1_000_000);
    refused_text(format!("notes = \"{notes}\" wavelength = 1064"));
    refused_text(format!("notes = \"{notes}\""));
    refused_text(format!("{notes} = 1"));
    refused_text(format!("wavelength = \"{notes}\""));
    refused_text(&notes);
    refused_text("\u{b5}".repeat(500_000));
    refused_text("\"".repeat(1_000_000));
}

#[test]
fn ten_thousand_errors_are_counted() {
    let parts = "{ gap = \"d\", length = 1 },".repeat(900);
    let keys: String = (0..9_000).fold(String::new(), |keys, i| keys + &format!("k{i} = 1\n"));
    let told = refused_text(format!("{keys}form = \"ring\"\npath = [{parts}]"));
    assert!(told.contains("more"), "{told}");
    refused_text("x\n".repeat(10_000));
    let ties = "\"a.b = c.d\",".repeat(10_000);
    refused_text(format!("{GOOD}ties = [{ties}]"));
    let limits = "{ of = \"a.b\" },".repeat(10_000);
    refused_text(format!("{GOOD}limits = [{limits}]"));
}

#[test]
fn ties_without_end_are_refused() {
    let terms = " + d1.length".repeat(50_000);
    refused_text(format!("{GOOD}ties = [\"M2.roc = d1.length{terms} + 1\"]"));
    // Each follows the next one, the worst order to settle them in.
    let count = MOST_PARTS - 2;
    let gaps: String = (0..count).fold(String::new(), |s, i| {
        s + &format!("{{ gap = \"g{i}\" }},\n")
    });
    let ties: String = (0..count).fold(String::new(), |s, i| {
        s + &format!("\"g{i}.length = g{}.length\",\n", (i + 1) % count)
    });
    let text = format!(
        "wavelength = \"1 um\"\nform = \"standing\"\npath = [\n{{ mirror = \"M1\", roc = \"flat\" \
         }},\n{gaps}{{ mirror = \"M2\", roc = \"1 m\" }} ]\nties = [ {ties} ]"
    );
    refused_text(text);
}

#[test]
fn files_of_other_systems_are_read() {
    let foreign = format!("\u{feff}{}", GOOD.replace('\n', "\r\n"));
    let folder = Folder::new();
    let (output, _) = check(&folder.write(&foreign), &[]);
    assert_eq!(output.status.code(), Some(0));
    refused_at(foreign.replace("\"100 mm\"", "100"), "6:26");
}

#[test]
fn the_exit_status_is_the_verdict() {
    let status = |text: &str, arguments: &[&str]| {
        let folder = Folder::new();
        let (output, _) = check(&folder.write(text), arguments);
        let quiet = output.stderr.is_empty();
        assert_eq!(quiet, output.status.code() != Some(2));
        assert_eq!(output.stdout.is_empty(), !quiet);
        output.status.code()
    };
    let limited =
        |bound: &str| format!("{GOOD}limits = [ {{ of = \"margin\", above = {bound} }} ]");
    assert_eq!(status(GOOD, &[]), Some(0));
    assert_eq!(status(GOOD, &["--json"]), Some(0));
    assert_eq!(status(REAL, &[]), Some(0));
    assert_eq!(status(GOOD, &["--set", "d1.length=300 mm"]), Some(1));
    assert_eq!(
        status(GOOD, &["--set", "d1.length=200 mm", "--json"]),
        Some(1)
    );
    assert_eq!(status(&limited("0.1"), &[]), Some(0));
    assert_eq!(status(&limited("1.5"), &["--json"]), Some(1));
    assert_eq!(status(GOOD, &["--set", "d1.length=300"]), Some(2));
    assert_eq!(
        status(
            &GOOD.replace("ring", "rung").replace("M2", "M1"),
            &["--json"]
        ),
        Some(2)
    );
}

/// No byte that steers a terminal, nor a character that turns the direction of reading.
fn assert_harmless(told: &str) {
    for c in told.chars() {
        let steers = matches!(c, '\u{200b}'..='\u{200f}' | '\u{2028}'..='\u{202e}' | '\u{2060}'..='\u{206f}' | '\u{feff}');
        assert!(
            c == '\n' || !(c.is_control() || steers),
            "{c:?} in {told:?}"
        );
    }
}

#[test]
fn what_steers_a_terminal_does_not_reach_it() {
    for evil in [
        "\u{1b}[2J",
        "\u{1b}]0;title\u{7}",
        "\u{9b}2J",
        "\u{202e}",
        "\u{2066}",
        "\u{8}\u{8}",
        "\u{7f}",
        "\r",
        "\0",
    ] {
        let escaped: String = evil
            .chars()
            .map(|c| format!("\\u{:04x}", u32::from(c)))
            .collect();
        for evil in [evil, escaped.as_str()] {
            for text in [
                format!("{GOOD}{evil} = 1"),
                format!("{GOOD}\"{evil}\" = 1"),
                format!("{GOOD}# {evil}\nx = 1"),
                GOOD.replace("M1", evil),
                GOOD.replace("100 mm", evil),
                GOOD.replace("100 mm", &format!("100 {evil}")),
                GOOD.replace("standing", evil),
                GOOD.replace("gap =", &format!("\"{evil}\" =")),
                GOOD.replace(
                    "\"flat\" }",
                    &format!("\"flat\", notes = \"{evil}\", fold = \"{evil}\" }}"),
                ),
                format!("{GOOD}ambient = \"a{evil}\""),
                format!("{GOOD}input = \"{evil}\""),
                format!("{GOOD}ties = [\"{evil} = M1.roc\", \"M1.roc = {evil}\"]"),
                format!("{GOOD}limits = [ {{ of = \"{evil}\", above = 1 }} ]"),
                format!("{GOOD}general = {{ \"{evil}\" = \"{evil}\", length = \"{evil}\" }}"),
                format!("{GOOD}defaults = {{ \"{evil}\" = \"{evil}\" }}"),
            ] {
                assert_harmless(&refused_text(text));
            }
        }
        let folder = Folder::new();
        let titled = folder.write(format!("title = \"{escaped}\"\n{GOOD}"));
        let (output, _) = check(&titled, &[]);
        assert_harmless(&String::from_utf8(output.stdout).unwrap());
        if !evil.contains('\0') {
            let (output, _) = check(&folder.write(GOOD), &["--set", &format!("{evil}={evil}")]);
            assert_harmless(&String::from_utf8(output.stderr).unwrap());
        }
    }
}
