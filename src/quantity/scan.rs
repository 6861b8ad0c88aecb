//! The characters of a written quantity, and the numbers and unit names they form.

use std::ops::Range;

use super::decimal::Written;
use super::error::{QuantityError, quoted};

/// The longest text that is read as a quantity, in bytes.
pub const LONGEST: usize = 200;

/// A number without sign.
#[derive(Clone, Debug)]
pub(super) struct Number {
    pub(super) written: Written,
    /// Power of ten of its last digit, which an uncertainty in parentheses counts in.
    pub(super) last_place: i64,
    pub(super) is_fraction: bool,
    /// Whether only digits were written.
    pub(super) is_plain: bool,
}

/// The characters, each with its place in the text.
pub(super) struct Scanner<'a> {
    text: &'a str,
    chars: Vec<(usize, char)>,
    at: usize,
}

/// Characters that are only another dress of a plain one.
fn plain(c: char) -> char {
    match c {
        '\u{2212}' => '-',
        '\u{3bc}' => '\u{b5}',
        '\u{ff01}'..='\u{ff5e}' => char::from_u32(c as u32 - 0xfee0).unwrap_or(c),
        c if c.is_whitespace() => ' ',
        c => c,
    }
}

impl<'a> Scanner<'a> {
    /// # Errors
    /// A text that is too long.
    pub(super) fn new(text: &'a str) -> Result<Self, QuantityError> {
        if text.len() > LONGEST {
            return Err(QuantityError::new(
                0..text.len(),
                format!(
                    "this text has {} bytes, and a quantity takes at most {LONGEST}",
                    text.len()
                ),
            ));
        }
        let chars = text.char_indices().map(|(i, c)| (i, plain(c))).collect();
        let mut scanner = Self { text, chars, at: 0 };
        scanner.skip_spaces();
        Ok(scanner)
    }

    pub(super) fn position(&self) -> usize {
        self.at
    }

    pub(super) fn rewind(&mut self, position: usize) {
        self.at = position;
    }

    pub(super) fn is_at_end(&self) -> bool {
        self.at >= self.chars.len()
    }

    fn ahead(&self, distance: usize) -> Option<char> {
        self.chars.get(self.at + distance).map(|(_, c)| *c)
    }

    pub(super) fn peek(&self) -> Option<char> {
        self.ahead(0)
    }

    pub(super) fn skip_spaces(&mut self) {
        while self.peek() == Some(' ') {
            self.at += 1;
        }
    }

    /// Takes these characters if they come next.
    pub(super) fn take(&mut self, wanted: &str) -> bool {
        let fits = wanted
            .chars()
            .enumerate()
            .all(|(i, c)| self.ahead(i) == Some(c));
        if fits {
            self.at += wanted.chars().count();
        }
        fits
    }

    fn byte(&self, position: usize) -> usize {
        self.chars
            .get(position)
            .map_or(self.text.len(), |(byte, _)| *byte)
    }

    /// From a position to here, without the spaces before here.
    pub(super) fn since(&self, position: usize) -> Range<usize> {
        let mut end = self.at.max(position);
        while end > position && self.chars.get(end - 1).is_some_and(|(_, c)| *c == ' ') {
            end -= 1;
        }
        self.byte(position)..self.byte(end)
    }

    /// All of the text but the spaces around it.
    pub(super) fn whole(&self) -> Range<usize> {
        let start = self.text.len() - self.text.trim_start().len();
        start..self.text.trim_end().len().max(start)
    }

    /// From here to the end of the text.
    pub(super) fn rest(&self) -> Range<usize> {
        let start = self.byte(self.at);
        start..self.text.trim_end().len().max(start)
    }

    /// A stretch of the original text in quotes, for messages.
    pub(super) fn quote(&self, span: &Range<usize>) -> String {
        quoted(self.text.get(span.clone()).unwrap_or_default())
    }

    fn digits(&mut self) -> String {
        let mut digits = String::new();
        while let Some(c) = self.peek().filter(char::is_ascii_digit) {
            digits.push(c);
            self.at += 1;
        }
        digits
    }

    fn is_digit(&self, distance: usize) -> bool {
        self.ahead(distance).is_some_and(|c| c.is_ascii_digit())
    }

    /// A number without sign: a decimal, a fraction, or a whole number with a fraction.
    ///
    /// # Errors
    /// A decimal comma, a fraction that is none.
    pub(super) fn number(&mut self) -> Result<Option<Number>, QuantityError> {
        let start = self.at;
        let whole = self.digits();
        let has_point = self.peek() == Some('.') && (!whole.is_empty() || self.is_digit(1));
        if whole.is_empty() && !has_point {
            return Ok(None);
        }
        if !has_point && let Some(fraction) = self.fraction(start, &whole)? {
            return Ok(Some(fraction));
        }
        let mut decimals = String::new();
        if has_point {
            self.at += 1;
            decimals = self.digits();
        }
        if self.peek() == Some(',') && self.is_digit(1) {
            return Err(self.comma(start));
        }
        let exponent = self.exponent();
        let last_place = exponent.unwrap_or(0).saturating_sub(decimals.len() as i64);
        Ok(Some(Number {
            written: Written::read(&format!("{whole}{decimals}"), last_place),
            last_place,
            is_fraction: false,
            is_plain: !has_point && exponent.is_none(),
        }))
    }

    /// The power of ten after an `e`, if one stands here.
    pub(super) fn exponent(&mut self) -> Option<i64> {
        if !matches!(self.peek(), Some('e' | 'E')) {
            return None;
        }
        let is_signed = matches!(self.ahead(1), Some('+' | '-'));
        if !self.is_digit(1 + usize::from(is_signed)) {
            return None;
        }
        let is_negative = self.ahead(1) == Some('-');
        self.at += 1 + usize::from(is_signed);
        // More digits than fit are beyond any range in any case.
        let magnitude = self.digits().parse().unwrap_or(i64::MAX / 2);
        Some(if is_negative { -magnitude } else { magnitude })
    }

    /// The rest of `1/2` or `1 1/2`, whose leading whole number has been taken.
    fn fraction(&mut self, start: usize, whole: &str) -> Result<Option<Number>, QuantityError> {
        const MOST: u32 = 9999;
        let after_whole = self.at;
        let mut parts = [whole.to_owned(), String::new(), String::new()];
        if self.peek() == Some(' ') {
            self.skip_spaces();
            parts[1] = self.digits();
            if parts[1].is_empty() {
                self.at = after_whole;
                return Ok(None);
            }
        } else {
            parts.swap(0, 1);
        }
        if !(self.peek() == Some('/') && self.is_digit(1)) {
            self.at = after_whole;
            return Ok(None);
        }
        self.at += 1;
        parts[2] = self.digits();
        let has_point = self.peek() == Some('.');
        let span = self.since(start);
        let refuse = |message: &str| {
            QuantityError::new(span.clone(), message).help("write a decimal such as \"0.5\"")
        };
        if has_point {
            return Err(refuse("a fraction is one of whole numbers"));
        }
        let small = |digits: &str| match digits {
            "" => Some(0),
            digits => digits.parse::<u32>().ok().filter(|n| *n <= MOST),
        };
        let [Some(whole), Some(numerator), Some(denominator)] =
            [&parts[0], &parts[1], &parts[2]].map(|digits| small(digits))
        else {
            return Err(refuse("a fraction takes whole numbers up to 9999"));
        };
        if denominator == 0 {
            return Err(refuse("a fraction cannot divide by 0"));
        }
        Ok(Some(Number {
            written: Written::fraction(whole * denominator + numerator, denominator),
            last_place: 0,
            is_fraction: true,
            is_plain: false,
        }))
    }

    fn comma(&mut self, start: usize) -> QuantityError {
        let groups_start = self.at;
        while self.peek() == Some(',') && self.is_digit(1) {
            self.at += 1;
            self.digits();
        }
        let groups = self.at - groups_start;
        if self.peek() == Some('.') {
            self.at += 1;
            self.digits();
        }
        let span = self.since(start);
        let written: String = self.chars[start..self.at].iter().map(|(_, c)| c).collect();
        let together = written.replace(',', "");
        let commas = written.matches(',').count();
        let error = |message: &str| QuantityError::new(span.clone(), message);
        if commas > 1 || written.contains('.') {
            error("a comma does not group digits here").help(format!("write \"{together}\""))
        } else if groups == 4 {
            error("this comma may group thousands or mark the decimals").help(format!(
                "write \"{together}\" or \"{}\"",
                written.replace(',', ".")
            ))
        } else {
            error("decimals follow a point here, not a comma")
                .help(format!("write {} for {written}", written.replace(',', ".")))
        }
    }

    /// What stands here up to the next space, sign or parenthesis: a unit's name or a word.
    pub(super) fn name(&mut self) -> Option<(String, Range<usize>)> {
        let start = self.at;
        let mut name = String::new();
        while let Some(c) = self.peek() {
            let ends = match c {
                ' ' | '±' | '+' | '(' | ')' | '<' | '>' | '=' => true,
                '-' => !name.ends_with('^'),
                '/' => self.slash_parts_limits(),
                _ => false,
            };
            if ends {
                break;
            }
            name.push(c);
            self.at += 1;
        }
        (!name.is_empty()).then(|| (name, self.since(start)))
    }

    /// Whether the slash here stands between the limits of "+0.2 mm/-0.5 mm".
    fn slash_parts_limits(&self) -> bool {
        let next = (1..).map_while(|i| self.ahead(i)).find(|c| *c != ' ');
        matches!(next, Some('+' | '-'))
    }

    /// Whether a digit stands here that does not begin a unit such as `1/m`.
    pub(super) fn is_at_another_number(&self) -> bool {
        let is_reciprocal = self.peek() == Some('1')
            && self.ahead(1) == Some('/')
            && self.ahead(2).is_some_and(char::is_alphabetic);
        self.is_digit(0) && !is_reciprocal
    }
}
