//! The verdict of a check in one short line, for titles.

use crate::analysis::check::Check;
use crate::analysis::eigenmode::EDGE;
use crate::optics::Plane;
use crate::report::number::significant;

/// "stable, margin 0.671", and what is the matter if it is not all well.
pub(super) fn line(check: &Check) -> String {
    if check.stable {
        let failing = check.limits.iter().filter(|limit| !limit.holds).count();
        let limits = match (check.limits.len(), failing) {
            (_, 0) => String::new(),
            (1, _) => ", but its limit fails".into(),
            (all, 1) => format!(", but 1 of {all} limits fails"),
            (all, some) => format!(", but {some} of {all} limits fail"),
        };
        return format!("stable, margin {}{limits}", significant(check.margin, 3));
    }
    if check.on_edge {
        return "on the edge of stability".into();
    }
    let beyond: Vec<&str> = Plane::BOTH
        .into_iter()
        .filter(|plane| check.planes.get(*plane).margin < -EDGE)
        .map(Plane::name)
        .collect();
    match beyond[..] {
        [one] => format!("unstable in the {one} plane"),
        _ => "unstable in both planes".into(),
    }
}
