//! Cavity files written at random, plain, extreme or slightly broken: see [`crate::grammar`].

use proptest::prelude::*;

use crate::grammar::cavity_text;
use crate::judge::{examine, examine_load};

/// As many cases as `PROPTEST_CASES` asks for.
fn config() -> ProptestConfig {
    const USUAL: u32 = 1500;
    let asked = std::env::var("PROPTEST_CASES").ok();
    let cases = asked.and_then(|count| count.parse().ok()).unwrap_or(USUAL);
    ProptestConfig {
        failure_persistence: None,
        ..ProptestConfig::with_cases(cases)
    }
}

proptest! {
    #![proptest_config(config())]

    #[test]
    fn files_in_the_words_of_the_format_are_answered(
        bytes in proptest::collection::vec(any::<u8>(), 0..220),
    ) {
        examine(&cavity_text(&bytes));
    }

    #[test]
    fn a_slip_of_the_pen_is_answered(
        bytes in proptest::collection::vec(any::<u8>(), 0..120),
        at in any::<prop::sample::Index>(),
        slip in prop::sample::select(vec!["\"", "'", ",", "=", "{", "}", "[", "]", "\n", ".", "#", "\\", "°", "1e"]),
        cut in 0..4_usize,
    ) {
        let mut text = cavity_text(&bytes);
        let places: Vec<usize> = text.char_indices().map(|(place, _)| place).collect();
        let at = at.index(places.len());
        let end = places.get(at + cut).copied().unwrap_or(text.len());
        text.replace_range(places[at]..end, slip);
        examine_load(&text);
    }

    #[test]
    fn any_text_is_answered(text in any::<String>()) {
        examine_load(&text);
    }
}

/// The random files are worth little if few of them are cavities.
#[test]
fn enough_random_files_are_cavities() {
    let mut state = 1_u64;
    let mut good = 0;
    for _ in 0..200 {
        let bytes: Vec<u8> = (0..200)
            .map(|_| {
                state = state
                    .wrapping_mul(6_364_136_223_846_793_005)
                    .wrapping_add(1);
                (state >> 56) as u8
            })
            .collect();
        good += usize::from(examine(&cavity_text(&bytes)));
    }
    println!("{good} of 200");
    assert!(good > 30, "{good} of 200");
}
