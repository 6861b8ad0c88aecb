//! Tables as comma-separated values: SI units, full precision, names as in the JSON.

use crate::analysis::check::{Check, Spot};
use crate::analysis::modes::Modes;

const STATIONS: [&str; 12] = [
    "part",
    "kind",
    "face",
    "pass",
    "at_m",
    "tangential_spot_m",
    "sagittal_spot_m",
    "tangential_curvature_per_m",
    "sagittal_curvature_per_m",
    "tangential_footprint_m",
    "sagittal_footprint_m",
    "clip_loss",
];

/// The stations of a check; a value that does not exist is an empty field.
///
/// # Errors
/// None that a table in memory can cause; the writer's own are passed on.
pub fn stations(check: &Check) -> Result<Vec<u8>, csv::Error> {
    let mut table = csv::Writer::from_writer(Vec::new());
    table.write_record(STATIONS)?;
    let number = |x: Option<f64>| x.map_or(String::new(), |x| format!("{x:?}"));
    let spot = |spot: Option<Spot>| number(spot.map(|spot| spot.spot_m));
    let curvature = |spot: Option<Spot>| number(spot.map(|spot| spot.curvature_per_m));
    for station in &check.stations {
        table.write_record([
            station.part.clone(),
            station.kind.into(),
            station.face.unwrap_or("entry").into(),
            station.pass.to_string(),
            number(Some(station.at_m)),
            spot(station.tangential),
            spot(station.sagittal),
            curvature(station.tangential),
            curvature(station.sagittal),
            number(station.footprint_m.map(|radii| radii[0])),
            number(station.footprint_m.map(|radii| radii[1])),
            number(station.clip_loss),
        ])?;
    }
    table
        .into_inner()
        .map_err(|error| error.into_error().into())
}

const MODES: [&str; 8] = [
    "m",
    "n",
    "order",
    "offset_hz",
    "offset_linewidths",
    "suppression_db",
    "clip_loss",
    "content",
];

/// The transverse modes; a value that does not exist is an empty field.
///
/// # Errors
/// None that a table in memory can cause; the writer's own are passed on.
pub fn modes(modes: &Modes) -> Result<Vec<u8>, csv::Error> {
    let mut table = csv::Writer::from_writer(Vec::new());
    table.write_record(MODES)?;
    let number = |x: Option<f64>| x.map_or(String::new(), |x| format!("{x:?}"));
    for mode in &modes.modes {
        table.write_record([
            mode.m.to_string(),
            mode.n.to_string(),
            mode.order.to_string(),
            number(Some(mode.offset_hz)),
            number(mode.offset_linewidths),
            number(mode.suppression_db),
            number(mode.clip_loss),
            number(mode.content),
        ])?;
    }
    table
        .into_inner()
        .map_err(|error| error.into_error().into())
}
