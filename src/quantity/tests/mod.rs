//! The room as a whole.

mod laws;
mod refusals;
mod table;

use super::{Kind, QuantityError, Spread, Value, parse};

fn read(text: &str, kind: Kind) -> (Value, Spread) {
    match parse(text, kind) {
        Ok(quantity) => {
            assert_eq!(quantity.text, text);
            (quantity.value, quantity.spread)
        }
        Err(error) => panic!("{text}: {error}"),
    }
}

fn refusal(text: &str, kind: Kind) -> QuantityError {
    match parse(text, kind) {
        Ok(quantity) => panic!("{text} is read as {quantity:?}"),
        Err(error) => error,
    }
}

fn either(distance: f64) -> Spread {
    sides(distance, distance)
}

fn sides(below: f64, above: f64) -> Spread {
    Spread::Limits { below, above }
}

fn standard(uncertainty: f64) -> Spread {
    Spread::Standard { uncertainty }
}
