//! Text from elsewhere, made safe to show: nothing in it steers a terminal or turns the direction
//! of reading.

use std::borrow::Cow;

/// The text with every character that steers replaced by a visible one of as many bytes, so that
/// places in it stay where they are. Line breaks and tabs stay.
pub fn harmless(text: &str) -> Cow<'_, str> {
    if !text.chars().any(steers) {
        return Cow::Borrowed(text);
    }
    let mut chars = text.chars().peekable();
    let mut shown = String::with_capacity(text.len());
    while let Some(c) = chars.next() {
        let ends_line = c == '\r' && chars.peek() == Some(&'\n');
        shown.push(match c.len_utf8() {
            _ if !steers(c) || ends_line => c,
            1 => '?',
            2 => '¿',
            3 => '\u{fffd}',
            _ => '\u{1fbc4}',
        });
    }
    Cow::Owned(shown)
}

fn steers(c: char) -> bool {
    match c {
        '\n' | '\t' => false,
        '\u{61c}' | '\u{200b}'..='\u{200f}' | '\u{2028}'..='\u{202e}' => true,
        '\u{2060}'..='\u{206f}' | '\u{feff}' | '\u{fff9}'..='\u{fffb}' => true,
        '\u{e0000}'..='\u{e007f}' => true,
        _ => c.is_control(),
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn places_stay_and_nothing_steers() {
        let evil = "a\u{1b}[2J\u{9b}1\u{202e}b\r\nc\rd\u{e0041}µ";
        let shown = harmless(evil);
        assert_eq!(shown.len(), evil.len());
        assert_eq!(shown, "a?[2J¿1\u{fffd}b\r\nc?d\u{1fbc4}µ");
        assert!(matches!(harmless("100 µm ± 1 %\n"), Cow::Borrowed(_)));
    }
}
