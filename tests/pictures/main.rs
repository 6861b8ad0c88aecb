//! Pictures judged without eyes: nothing hides anything, everything is named, nothing is drawn
//! that is not so.

mod cavities;
mod charted;
mod charts;
mod command;
mod formats;
mod page;
mod shown;

use modewright::analysis::check::{Check, check};
use modewright::analysis::profile::Profile;
use modewright::report::describe;
use modewright::report::figure::Figure;

/// Everything that is known of a cavity file.
struct Drawn {
    check: Check,
    profile: Profile,
    figure: Figure,
}

fn drawn(text: &str) -> Drawn {
    let loaded = modewright::file::load("test.toml", text, &[])
        .unwrap_or_else(|refused| panic!("{:?}", refused.diagnostics));
    let check = check(&loaded.cavity);
    let profile = Profile::of(&loaded.cavity, &loaded.cavity.book().nominal());
    let figure = describe::envelope(&check, &profile);
    Drawn {
        check,
        profile,
        figure,
    }
}
