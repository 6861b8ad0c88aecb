//! Slabs: plates, rods and crystals with their faces and thermal lenses.

use super::fields::Fields;
use super::keys::THERMAL_PLACES;
use super::medium::read_slab_medium;
use super::mirror::read_side;
use super::parts::{read_pair, required};
use crate::cavity::{
    Cavity, Element, Incidence, Origin, Side, Slab, SlabLoss, ThermalLens, ThermalPlace,
};
use crate::quantity::{Kind, Value};

pub(super) fn read_slab(fields: &Fields<'_, '_>) -> Option<Element> {
    let thickness = required(fields, "thickness", "a slab");
    let index = read_slab_medium(fields);
    let incidence = read_incidence(fields);
    let shift = if fields.has("shift") {
        read_side(fields, "shift")
    } else {
        Some(Side::Left)
    };
    let entrance = fields.slot_or("entrance", 0.0);
    let exit = fields.slot_or("exit", 0.0);
    let thermal = read_thermal(fields);
    let loss = read_loss(fields);
    fields.slot("conversion");
    if let (Some(slot), Some(found)) = (thickness, fields.find("thickness"))
        && slot.of(&fields.context.book.borrow().nominal()) <= 0.0
    {
        fields.report(
            Some(found.place),
            "a slab is thicker than zero",
            "a thin optic with power is a lens",
        );
        return None;
    }
    Some(Element::Slab(Slab {
        thickness: thickness?,
        index: index?,
        incidence,
        shift: shift?,
        entrance,
        exit,
        thermal,
        loss,
    }))
}

fn read_loss(fields: &Fields<'_, '_>) -> Option<SlabLoss> {
    let found = fields.find("loss")?;
    let quantity = fields.context.quantity("loss", &found, Kind::Loss)?;
    let slot = fields.slot("loss")?;
    Some(match quantity.value {
        Value::PerLength(_) => SlabLoss::PerLength(slot),
        _ => SlabLoss::PerPass(slot),
    })
}

fn read_incidence(fields: &Fields<'_, '_>) -> Incidence {
    let brewster = fields
        .quantity("aoi")
        .is_some_and(|quantity| quantity.value == Value::Brewster);
    if brewster {
        return Incidence::Brewster;
    }
    Incidence::Angle(fields.slot_or("aoi", 0.0))
}

fn read_thermal(fields: &Fields<'_, '_>) -> Option<ThermalLens> {
    let pair = |keys: [&'static str; 3]| {
        keys.iter()
            .any(|key| fields.has(key))
            .then(|| read_pair(fields, keys, "a slab"))
            .flatten()
    };
    let power = pair(["thermal", "thermal_tangential", "thermal_sagittal"]);
    let power_per_watt = pair([
        "thermal_per_watt",
        "thermal_per_watt_tangential",
        "thermal_per_watt_sagittal",
    ]);
    let place = match fields.word("thermal_at", &THERMAL_PLACES) {
        Some(1) => ThermalPlace::Entrance,
        Some(2) => ThermalPlace::Middle,
        Some(3) => ThermalPlace::Exit,
        _ => ThermalPlace::Spread,
    };
    let pump = Cavity::PUMP;
    if power_per_watt.is_some()
        && fields.context.book.borrow().entry(pump).origin == Origin::Implied
        && !fields.context.is_tied("pump")
    {
        let key = ["thermal_per_watt", "thermal_per_watt_tangential"]
            .into_iter()
            .find(|key| fields.has(key));
        fields.report(
            Some(fields.place_of(key.unwrap_or("thermal_per_watt"))),
            "a lens per watt needs the watts, and the file gives no `pump`",
            "add pump = \"10 W\" at the top of the file",
        );
    }
    if power.is_none() && power_per_watt.is_none() {
        return None;
    }
    Some(ThermalLens {
        power,
        power_per_watt,
        place,
    })
}
