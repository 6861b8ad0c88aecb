//! Where a text is not TOML: one finding for each slip of the pen, in words that say what to type.
//!
//! A parser that goes on after a fault trips over what the fault left behind. So a line gets one
//! finding, and nothing is claimed about what follows a bracket or a text that was left open.

use std::ops::Range;

use crate::diagnostic::{Diagnostic, Place, Severity};

/// Most slips that are told at once: nobody mends more before reading the file anew.
const MOST: usize = 100;

/// What is wrong where, and whether what follows can still be read.
struct Slip {
    span: Range<usize>,
    message: String,
    help: String,
    is_last: bool,
    /// Whether it concerns one value only, and the rest of its line may be read.
    is_local: bool,
}

/// One finding for each slip.
pub(super) fn slips(text: &str, errors: &[toml::de::Error]) -> Vec<Diagnostic> {
    let mut found: Vec<(usize, &toml::de::Error)> = errors
        .iter()
        .map(|error| (error.span().map_or(0, |span| span.start), error))
        .collect();
    found.sort_by_key(|(at, _)| *at);
    let mut diagnostics = Vec::new();
    let mut line_end = None;
    // Where reading goes on within a line, after a slip that concerned one value.
    let mut resume: Option<usize> = None;
    for (at, error) in found {
        let at = floor(text, at);
        let same_line = line_end.is_some_and(|end| at <= end);
        if same_line && resume.is_none_or(|from| at < from) {
            continue;
        }
        let line = line_around(text, at);
        line_end = Some(line.end);
        let end = error.span().map_or(at, |span| span.end);
        let slip = slip_at(text, at..floor(text, end.max(at)), &line, error.message());
        resume = slip.is_local.then_some(slip.span.end);
        if same_line && !slip.is_local {
            continue;
        }
        diagnostics.push(Diagnostic {
            severity: Severity::Error,
            message: slip.message,
            place: Some(Place {
                source: 0,
                span: slip.span,
            }),
            label: String::new(),
            help: Some(slip.help),
        });
        if slip.is_last || diagnostics.len() == MOST {
            break;
        }
    }
    diagnostics
}

fn slip_at(text: &str, span: Range<usize>, line: &Range<usize>, told: &str) -> Slip {
    let at = span.start;
    let before = text[line.start..at].trim_end();
    let after = &text[at..line.end];
    let open = still_open(text, at);
    let slip = |span: Range<usize>, message: &str, help: String| Slip {
        span,
        message: message.into(),
        help,
        is_last: false,
        is_local: false,
    };
    let whole_line = || {
        let written = &text[line.clone()];
        let start = line.start + written.len() - written.trim_start().len();
        start..line.start + written.trim_end().len()
    };

    if told.contains("recurs") || told.contains("nest") {
        return Slip {
            is_last: true,
            ..slip(
                span,
                "this is nested too deep for a cavity file",
                "a path is a list of tables, and no table in it holds tables of its own".into(),
            )
        };
    }
    if told.contains("duplicate key") {
        return duplicate(text, span, line);
    }
    if after.starts_with(['“', '”', '„', '‘', '’', '«']) {
        return Slip {
            is_local: true,
            ..slip(
                at..at + word(after).len(),
                "these are typographic quotation marks",
                "write plain ones, as in \"flat\"".into(),
            )
        };
    }
    if quotes(&text[line.clone()]) % 2 == 1 && !told.contains("escape") {
        return Slip {
            is_last: still_open(text, line.end).len() > still_open(text, line.start).len(),
            ..slip(
                whole_line(),
                "a quotation mark is missing in this line",
                "every text stands between two of them, as in mirror = \"M1\"".into(),
            )
        };
    }
    if told.contains("escape") {
        return slip(
            span,
            "a backslash in a text begins an escape, and this is none",
            "write the text between single quotes, or / for \\".into(),
        );
    }
    if let Some(number) = decimal_comma(&text[line.clone()], at - line.start) {
        return slip(
            line.start + number.start..line.start + number.end,
            "decimals follow a point here, not a comma",
            format!(
                "write {}",
                text[line.start + number.start..line.start + number.end].replace(',', ".")
            ),
        );
    }
    if after.starts_with(':') || before.ends_with(':') {
        let colon = if after.starts_with(':') {
            at
        } else {
            line.start + before.len() - 1
        };
        return slip(
            colon..colon + 1,
            "a key and its value are joined by =",
            "write it like roc = \"100 mm\"".into(),
        );
    }
    let begins_entry =
        word(after).len() < after.len() && after[word(after).len()..].trim_start().starts_with('=');
    let opened = open.last().copied();
    if let Some(opened) = opened
        && text.as_bytes()[opened] == b'['
        && begins_entry
        && before.is_empty()
    {
        return left_open(text, opened, at..at + word(after).len());
    }
    if let Some(opened) = opened
        && text.as_bytes()[opened] == b'{'
        && after.starts_with('{')
        && before.is_empty()
    {
        return left_open(text, opened, at..at + 1);
    }
    if told.starts_with("unclosed")
        && let Some(opened) = opened
    {
        return left_open(text, opened, opened..opened + 1);
    }
    if before.ends_with('=') && word(after).is_empty() {
        let equals = line.start + before.len() - 1;
        return slip(
            equals..equals + 1,
            "a value is missing after this =",
            "write it like roc = \"100 mm\"".into(),
        );
    }
    if before.ends_with('=') {
        let value = after
            .split([',', '}', ']', '#'])
            .next()
            .unwrap_or_default()
            .trim_end();
        return Slip {
            is_local: true,
            ..slip(
                at..at + value.len(),
                "this value is no number and stands without quotation marks",
                format!("write \"{}\"", super::context::shown(value)),
            )
        };
    }
    if told.contains("missing comma") {
        return slip(
            span,
            "a comma is missing before this",
            "parts, keys and the entries of a list are separated by commas".into(),
        );
    }
    if opened.is_none() && after.starts_with(',') {
        return slip(
            at..at + 1,
            "no comma stands at the end of this line",
            "leave it out; commas separate the entries within [ ] and { } only".into(),
        );
    }
    if opened.is_none() && begins_entry && !before.is_empty() {
        return slip(
            at..at + word(after).len(),
            "a key begins a line of its own here",
            "break the line before it".into(),
        );
    }
    if told.contains("extra comma") || after.starts_with(',') {
        return slip(
            at..at + 1,
            "this comma separates nothing",
            "leave it out, or write what is missing beside it".into(),
        );
    }
    if told.contains("expected `=`") && !word(after).is_empty() {
        return slip(
            at..at + word(after).len(),
            "a key without a value",
            "write it like roc = \"100 mm\"".into(),
        );
    }
    slip(
        span,
        "this is not TOML, the notation of cavity files",
        format!(
            "a text stands in quotes, a list in [ ], a table in {{ }} ({})",
            super::context::shown(&told.replace('\n', ", "))
        ),
    )
}

fn duplicate(text: &str, span: Range<usize>, line: &Range<usize>) -> Slip {
    let name = super::context::shown(text[span.clone()].trim());
    let written = text[line.clone()].trim_start();
    let (message, help) = if written.starts_with('[') && !written.starts_with("[[") {
        (
            format!("the table [{name}] is there already"),
            format!("write [[{name}]] before each block of a list, such as the parts of a path"),
        )
    } else {
        (
            format!("`{name}` is written twice"),
            "keep one of the two".to_string(),
        )
    };
    Slip {
        span,
        message,
        help,
        is_last: false,
        is_local: false,
    }
}

/// Something opened at one byte is missing its end before another place.
fn left_open(text: &str, opened: usize, before: Range<usize>) -> Slip {
    let line = text[..opened].bytes().filter(|byte| *byte == b'\n').count() + 1;
    let (what, end) = if text.as_bytes()[opened] == b'[' {
        ("list", "]")
    } else {
        ("table", "}")
    };
    let is_itself = before.start == opened;
    Slip {
        span: before,
        message: if is_itself {
            format!("this {what} is not closed")
        } else {
            format!("the {what} that begins in line {line} is not closed before this")
        },
        help: format!("add {end} where it ends"),
        is_last: true,
        is_local: false,
    }
}

/// Bytes of the brackets that are open at a place, the innermost last.
fn still_open(text: &str, at: usize) -> Vec<usize> {
    let mut open = Vec::new();
    let mut quote = None;
    let mut escaped = false;
    let mut comment = false;
    for (place, byte) in text.as_bytes()[..at].iter().copied().enumerate() {
        match (byte, quote) {
            // Texts of one line end with it, closed or not.
            (b'\n', _) => (quote, comment, escaped) = (None, false, false),
            _ if comment => {}
            (_, Some(b'"')) if escaped => escaped = false,
            (b'\\', Some(b'"')) => escaped = true,
            (_, Some(mark)) if byte == mark => quote = None,
            (_, Some(_)) => {}
            (b'"' | b'\'', None) => quote = Some(byte),
            (b'#', None) => comment = true,
            (b'[' | b'{', None) => open.push(place),
            (b']' | b'}', None) => drop(open.pop()),
            _ => {}
        }
    }
    open
}

/// Quotation marks in a line, escaped ones and comments left out.
fn quotes(line: &str) -> usize {
    let mut count = 0;
    let mut escaped = false;
    for byte in line.bytes() {
        match byte {
            b'#' if count % 2 == 0 => break,
            b'"' if !escaped => count += 1,
            _ => {}
        }
        escaped = byte == b'\\' && !escaped;
    }
    count
}

/// The number with a comma around a place in a line, such as 1,605.
fn decimal_comma(line: &str, at: usize) -> Option<Range<usize>> {
    let bytes = line.as_bytes();
    let is_part = |byte: u8| byte.is_ascii_digit() || byte == b',' || byte == b'.';
    let start = (0..at).rev().take_while(|i| is_part(bytes[*i])).last()?;
    let length = bytes[start..]
        .iter()
        .take_while(|byte| is_part(**byte))
        .count();
    let number = line[start..start + length].trim_end_matches(',');
    let (whole, decimals) = number.split_once(',')?;
    let digits = |part: &str| !part.is_empty() && part.bytes().all(|b| b.is_ascii_digit());
    (digits(whole) && digits(decimals)).then_some(start..start + number.len())
}

/// The run of letters, digits and the like that begins here.
fn word(text: &str) -> &str {
    let ends = |c: char| {
        c.is_whitespace() || matches!(c, ',' | '=' | '{' | '}' | '[' | ']' | ':' | '#' | '"')
    };
    &text[..text.find(ends).unwrap_or(text.len())]
}

fn line_around(text: &str, at: usize) -> Range<usize> {
    let start = text[..at].rfind('\n').map_or(0, |newline| newline + 1);
    let end = text[at..]
        .find('\n')
        .map_or(text.len(), |offset| at + offset);
    start..end
}

fn floor(text: &str, at: usize) -> usize {
    let mut at = at.min(text.len());
    while !text.is_char_boundary(at) {
        at -= 1;
    }
    at
}
