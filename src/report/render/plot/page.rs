//! What every page has: the title with the verdict, warnings, and notes at the foot.

use super::scene::{Anchor, Ink, Scene};
use super::text;

pub(super) const WIDTH: f64 = 1000.0;
pub(super) const TOP: f64 = 12.0;
/// Letters of the title, of axes' titles, of axes' numbers, and of everything read second.
pub(super) const TITLE: f64 = 17.0;
pub(super) const CAPTION: f64 = 12.5;
pub(super) const NUMBER: f64 = 11.5;
pub(super) const SMALL: f64 = 11.0;
const SIDE: f64 = 20.0;

/// What stands at the head of a page.
pub(super) struct Heading<'a> {
    pub title: &'a str,
    pub verdict: &'a str,
    pub particulars: &'a str,
    pub missing: &'a [String],
    /// Whether the verdict may have a line of its own, where the title is too long for both.
    pub in_two_lines: bool,
}

impl Heading<'_> {
    /// Title, verdict and particulars; gives back where they end.
    pub(super) fn draw(&self, scene: &mut Scene) -> f64 {
        let room = scene.width - 2.0 * SIDE;
        let verdict = format!(" — {}", self.verdict);
        let name_room = room - text::length(&verdict, TITLE);
        let is_too_long = text::length(self.title, TITLE) > name_room;
        let lines = if self.in_two_lines && is_too_long {
            let title = text::shortened(&format!("{} —", self.title), TITLE, room);
            vec![title, self.verdict.to_string()]
        } else {
            vec![text::shortened(self.title, TITLE, name_room) + &verdict]
        };
        let mut y = TOP;
        for line in lines {
            y += 0.5 * text::height(TITLE);
            scene.text([SIDE, y], Anchor::Start, TITLE, Ink::Black, &line);
            y += 0.5 * text::height(TITLE);
        }
        y += 4.0;
        let mut line = |content: &str, ink| {
            for content in text::wrapped(content, SMALL, room) {
                y += 0.5 * text::height(SMALL);
                scene.text([SIDE, y], Anchor::Start, SMALL, ink, &content);
                y += 0.5 * text::height(SMALL) + 2.0;
            }
        };
        line(self.particulars, Ink::Grey);
        for missing in self.missing {
            line(&format!("! {missing}"), Ink::Alarm);
        }
        y + 8.0
    }
}

/// Notes at the foot of a page, between two margins; gives the page its height.
pub(super) fn footing(scene: &mut Scene, top: f64, [left, right]: [f64; 2], notes: &[String]) {
    let mut y = top;
    for line in text::wrapped(&notes.join("; "), SMALL, right - left) {
        y += 0.5 * text::height(SMALL);
        scene.text([left, y], Anchor::Start, SMALL, Ink::Grey, &line);
        y += 0.5 * text::height(SMALL) + 2.0;
    }
    scene.height = (y + 8.0).ceil();
}
