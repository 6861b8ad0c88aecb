//! Tables as comma-separated values: SI units, full precision, names as in the JSON.

use crate::analysis::check::{Check, Spot};
use crate::analysis::modes::Modes;
use crate::cavity::Presence;
use crate::quantity::Kind;
use crate::study::sweep::{Even, Sweep, Varied};
use crate::study::tolerance::Tolerance;

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

/// The contributions of a tolerance study, one line a measure and quantity.
///
/// # Errors
/// None that a table in memory can cause; the writer's own are passed on.
pub fn contributions(found: &Tolerance) -> Result<Vec<u8>, csv::Error> {
    let mut table = csv::Writer::from_writer(Vec::new());
    for contribution in &found.contributions {
        table.serialize(contribution)?;
    }
    finished(table)
}

/// The stations of a check; a value that does not exist is an empty field.
///
/// # Errors
/// None that a table in memory can cause; the writer's own are passed on.
pub fn stations(check: &Check) -> Result<Vec<u8>, csv::Error> {
    let mut table = csv::Writer::from_writer(Vec::new());
    table.write_record(STATIONS)?;
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
    finished(table)
}

/// The points of a sweep, one a row; a value that does not exist is an empty field.
///
/// A radius or focal length is written in metres, or as its reciprocal where the range passes flat.
///
/// # Errors
/// Those of [`stations`].
pub fn sweep(sweep: &Sweep) -> Result<Vec<u8>, csv::Error> {
    let mut table = csv::Writer::from_writer(Vec::new());
    let quantities = sweep
        .vary
        .iter()
        .map(|varied| format!("{}{}", varied.quantity, suffix_along(varied)));
    let measures = sweep.measures.0.iter().map(|(name, column)| {
        let suffix = match column.measure.presence() {
            Presence::Number => "",
            Presence::Length | Presence::Position => "_m",
            Presence::Angle => "_rad",
            Presence::Frequency | Presence::Offset => "_hz",
            Presence::Time => "_s",
        };
        format!("{name}{suffix}")
    });
    table.write_record(quantities.chain(measures))?;
    let inner = sweep.vary.get(1).map_or(1, |second| second.kept.len());
    for point in 0..sweep.stable.len() {
        let places = [point / inner, point % inner];
        let quantities = sweep.vary.iter().zip(places).map(|(varied, place)| {
            number(match varied.even {
                Even::Kept => varied.kept.get(place).copied(),
                Even::AsWritten { .. } => varied.as_written(place),
            })
        });
        let measures = (sweep.measures.0.iter())
            .map(|(_, column)| number(column.values.get(point).copied().flatten()));
        table.write_record(quantities.chain(measures))?;
    }
    finished(table)
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
    finished(table)
}

/// A number in full; an empty field where there is none.
fn number(x: Option<f64>) -> String {
    x.map_or(String::new(), |x| format!("{x:?}"))
}

fn finished(table: csv::Writer<Vec<u8>>) -> Result<Vec<u8>, csv::Error> {
    table
        .into_inner()
        .map_err(|error| error.into_error().into())
}

/// The unit behind a quantity's name.
fn suffix_along(varied: &Varied) -> &'static str {
    match varied.kind {
        Kind::Radius | Kind::Face | Kind::Focal if varied.even == Even::Kept => "_per_m",
        Kind::Length | Kind::Position | Kind::Radius | Kind::Face | Kind::Focal => "_m",
        Kind::Angle | Kind::SlabAngle => "_rad",
        Kind::Curvature | Kind::Strength => "_per_m",
        Kind::Frequency => "_hz",
        Kind::Power => "_w",
        Kind::Energy => "_j",
        Kind::Time => "_s",
        Kind::Temperature => "_k",
        Kind::PerWatt => "_per_w",
        Kind::Number | Kind::Ratio | Kind::Loss | Kind::Damage => "",
    }
}
