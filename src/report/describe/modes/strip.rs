//! One free spectral range as a drawing of letters: each order at its place by its digit.

use crate::analysis::modes::Modes;
use crate::report::describe::measured::frequency;

/// Columns of the line, so that it has a middle.
const WIDTH: usize = 77;
/// Most lines of orders over each other.
const MOST_LINES: usize = 8;
/// Signs of the orders from 0 on.
const SIGNS: &[u8] = b"0123456789abcdefghijklmnopqrstuvwxyz";

/// The drawing, line by line, each within 80 columns; and what it leaves out.
pub(super) fn draw(modes: &Modes) -> (Vec<String>, Option<String>) {
    let column = |hertz: f64| {
        let share = hertz / modes.fsr_hz + 0.5;
        ((share * (WIDTH - 1) as f64).round() as usize).min(WIDTH - 1)
    };
    let mut stacks: Vec<Vec<usize>> = vec![Vec::new(); WIDTH];
    stacks[column(0.0)].push(0);
    for mode in &modes.modes {
        let stack = &mut stacks[column(mode.offset_hz)];
        if !stack.contains(&mode.order) {
            stack.push(mode.order);
        }
    }
    let mut hidden = 0;
    let mut height = 1;
    for stack in &mut stacks {
        let drawn: Vec<usize> = stack
            .iter()
            .copied()
            .filter(|order| *order < SIGNS.len())
            .take(MOST_LINES)
            .collect();
        hidden += stack.len() - drawn.len();
        height = height.max(drawn.len());
        *stack = drawn;
    }
    let mut lines: Vec<String> = (0..height)
        .rev()
        .map(|level| {
            let signs = stacks.iter().map(|stack| match stack.get(level) {
                Some(order) => char::from(SIGNS[*order]),
                None => ' ',
            });
            padded(signs)
        })
        .collect();
    lines.push(axis(modes, &column));
    if !modes.sidebands.is_empty() {
        let mut marks = [' '; WIDTH];
        for sideband in &modes.sidebands {
            let turns =
                crate::analysis::spectrum::in_one_range(sideband.sideband_hz / modes.fsr_hz);
            marks[column(turns * modes.fsr_hz)] = '^';
        }
        lines.push(padded(marks.into_iter()));
    }
    lines.push(ends(modes));
    let left_out = (hidden > 0).then(|| {
        format!("{hidden} more signs found no room: orders above 35, or too many at one place.")
    });
    (lines, left_out)
}

fn padded(signs: impl Iterator<Item = char>) -> String {
    let line: String = signs.collect();
    format!(" {}", line.trim_end())
}

/// The line itself: double over what counts as near.
fn axis(modes: &Modes, column: &impl Fn(f64) -> usize) -> String {
    let near = modes.apart_hz.min(0.5 * modes.fsr_hz);
    let (from, to) = (column(-near), column(near));
    let signs = (0..WIDTH).map(|k| match k {
        0 => '|',
        k if k == WIDTH - 1 => '|',
        k if k == WIDTH / 2 => '+',
        k if (from..=to).contains(&k) => '=',
        _ => '-',
    });
    padded(signs)
}

/// What is written under the ends and the middle.
fn ends(modes: &Modes) -> String {
    let half = frequency(0.5 * modes.fsr_hz);
    let (left, middle, right) = (format!("−{half}"), "TEM_00", format!("+{half}"));
    let count = |text: &str| text.chars().count();
    let before = (WIDTH / 2 + 1).saturating_sub(count(&left) + count(middle) / 2);
    let after = WIDTH.saturating_sub(count(&left) + before + count(middle) + count(&right));
    format!(
        " {left}{}{middle}{}{right}",
        " ".repeat(before),
        " ".repeat(after)
    )
}
