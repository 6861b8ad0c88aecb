//! Mirrors: shape, fold, coating and substrate.

use super::context::shown;
use super::fields::Fields;
use super::keys::SIDES;
use super::medium::read_medium;
use super::parts::read_pair;
use crate::cavity::{Coating, Element, Index, Mirror, Side, Substrate};
use crate::diagnostic::Place;

const BY_SIDE: [Side; 4] = [Side::Left, Side::Right, Side::Up, Side::Down];

pub(super) fn read_mirror(fields: &Fields<'_, '_>) -> Option<Element> {
    let curvature = read_pair(
        fields,
        ["roc", "roc_tangential", "roc_sagittal"],
        "a mirror",
    );
    let incidence = fields.slot_or("aoi", 0.0);
    let fold = read_fold(fields);
    let (coating_s, coating_p) = read_coatings(fields);
    let substrate = read_substrate(fields);
    fields.slot("damage");
    fields.slot("pointing");
    Some(Element::Mirror(Mirror {
        curvature: curvature?,
        incidence,
        fold,
        coating_s,
        coating_p,
        substrate,
    }))
}

/// The side of a tilted slab's shift or a mirror's fold.
pub(super) fn read_side(fields: &Fields<'_, '_>, key: &str) -> Option<Side> {
    let (text, place) = fields.text(key)?;
    if let Some(side) = SIDES.iter().position(|word| *word == text) {
        return Some(BY_SIDE[side]);
    }
    let help = if key == "fold" && text.chars().any(|c| c.is_ascii_digit()) {
        "the turn is set by `aoi`, half the angle between the beams; `fold` only says to which \
         side: \"left\", \"right\", \"up\" or \"down\""
    } else {
        "write \"left\", \"right\", \"up\" or \"down\", as a pilot flying along the beam sees it"
    };
    fields.report(
        Some(place),
        format!("`{key}` cannot be \"{}\"", shown(&text)),
        help,
    );
    None
}

fn read_fold(fields: &Fields<'_, '_>) -> Option<Side> {
    if fields.has("fold") {
        if fields.has("fold_plane") {
            fields.report(
                Some(fields.place_of("fold_plane")),
                "`fold` and `fold_plane` say the same thing twice",
                "keep one of them",
            );
        }
        return read_side(fields, "fold");
    }
    let angle = fields.quantity("fold_plane")?.value.number()?;
    let quarter = angle / std::f64::consts::FRAC_PI_2;
    // Degrees in a file come out exact to rounding.
    if (quarter - quarter.round()).abs() > 1e-9 {
        fields.report(
            Some(fields.place_of("fold_plane")),
            "a fold at an angle to the horizontal and vertical couples the two planes",
            "not available yet: fold left (0°), up (90°), right (180°) or down (270°)",
        );
        return None;
    }
    Some(match (quarter.round() as i64).rem_euclid(4) {
        0 => Side::Left,
        1 => Side::Up,
        2 => Side::Right,
        _ => Side::Down,
    })
}

const COATING: [[&str; 3]; 3] = [
    ["reflectance", "transmission", "loss"],
    ["reflectance_s", "transmission_s", "loss_s"],
    ["reflectance_p", "transmission_p", "loss_p"],
];

/// Three shares that are all written must add up to 1 within this.
const SHARES_WITHIN: f64 = 1e-9;

fn read_coatings(fields: &Fields<'_, '_>) -> (Coating, Coating) {
    let [plain, s, p] = COATING.map(|keys| keys.map(|key| fields.slot(key)));
    let merged = |own: [Option<crate::cavity::Slot>; 3], keys: [&str; 3]| {
        // What is written for one polarisation stands; the plain key serves both.
        let [reflectance, transmission, loss] = [0, 1, 2].map(|k| own[k].or(plain[k]));
        let coating = Coating {
            reflectance,
            transmission,
            loss,
        };
        check_shares(fields, &coating, keys);
        coating
    };
    (merged(s, COATING[1]), merged(p, COATING[2]))
}

fn check_shares(fields: &Fields<'_, '_>, coating: &Coating, keys: [&str; 3]) {
    let nominal = fields.context.book.borrow().nominal();
    let shares = [coating.reflectance, coating.transmission, coating.loss];
    let sum: f64 = shares.iter().flatten().map(|slot| slot.of(&nominal)).sum();
    let all = shares.iter().all(Option::is_some);
    let place: Place = COATING[0]
        .iter()
        .chain(&keys)
        .find(|key| fields.has(key))
        .map_or(fields.place.clone(), |key| fields.place_of(key));
    if all && (sum - 1.0).abs() > SHARES_WITHIN {
        fields.report(
            Some(place),
            format!(
                "reflectance, transmission and loss add up to {:.6} %, not 100 %",
                sum * 100.0
            ),
            "write two of them; the third is the rest",
        );
    } else if sum > 1.0 + SHARES_WITHIN {
        fields.report(
            Some(place),
            format!(
                "the shares of the power add up to {:.6} %, more than all of it",
                sum * 100.0
            ),
            "reflectance, transmission and loss together are 100 %",
        );
    }
}

fn read_substrate(fields: &Fields<'_, '_>) -> Option<Substrate> {
    if !fields.has("substrate") {
        for key in ["thickness", "back"] {
            if fields.has(key) {
                fields.report(
                    Some(fields.place_of(key)),
                    format!("`{key}` describes the substrate, and none is named"),
                    "add substrate = \"fused silica\", or its refractive index",
                );
            }
        }
        return None;
    }
    let medium = read_medium(fields, "substrate", Index::VACUUM);
    let back = fields.slot_or("back", 0.0);
    if !fields.has("thickness") {
        fields.missing("thickness", "a mirror's substrate");
        return None;
    }
    Some(Substrate {
        index: medium,
        thickness: fields.slot("thickness")?,
        back,
    })
}
