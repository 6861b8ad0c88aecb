//! `general`: tolerances as on a drawing, for whatever is written without one.

use super::context::{Raw, in_order, nearest, shown};
use super::fields::Fields;
use super::keys::GENERAL;
use crate::quantity::{self, Kind, QuantityError};

/// Reads `general` into the context, for quantities that have no spread of their own.
pub(super) fn read_general(fields: &Fields<'_, '_>) {
    let advice = "write it like general = { length = \"0.2 mm\", roc = \"1 %\" }";
    let Some((table, _)) = fields.table("general", advice) else {
        return;
    };
    for (key, key_span, value) in in_order(table) {
        let Some(kind) = toleranced_kind(key) else {
            let help = match nearest(key, GENERAL.iter().map(|(key, _)| *key)) {
                Some(near) => format!("did you mean `{near}`?"),
                None => advice.to_string(),
            };
            fields.report(
                Some(fields.context.place(key_span)),
                format!("there is no general tolerance for `{}`", shown(key)),
                &help,
            );
            continue;
        };
        let found = fields.context.found(value);
        let rule = match &found.raw {
            Raw::Text(text, _) => quantity::parse_general(text, kind),
            _ => Err(QuantityError {
                span: 0..0,
                message: "a general tolerance is a text with a unit".into(),
                help: Some(advice.into()),
                bare: None,
            }),
        };
        let rule = match rule {
            Ok(rule) => rule,
            Err(error) => {
                fields.context.refuse_general(key);
                fields.report(
                    Some(found.place),
                    error.about(&format!("`{key}`"), kind),
                    error.help.as_deref().unwrap_or(advice),
                );
                continue;
            }
        };
        fields.context.general.borrow_mut().insert(key.into(), rule);
    }
}

fn toleranced_kind(key: &str) -> Option<Kind> {
    GENERAL
        .iter()
        .find(|(name, _)| *name == key)
        .map(|(_, kind)| *kind)
}
