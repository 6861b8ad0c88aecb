//! `tolerance` for people: the yield first, then what fails, what spoils it and what to do.

use super::measured::{measured, wanted};
use crate::quantity::{Kind, Spread, human_spread};
use crate::report::document::{Block, Document, Table, Tone};
use crate::report::number::{fixed, plain, significant};
use crate::study::tolerance::{Tolerance, Varied, Worst};

/// Contributions smaller than this are not worth a line.
const NEGLIGIBLE: f64 = 0.01;
/// Quantities that are named for one measure.
const MOST_SHARES: usize = 5;
/// Modes that are named.
const MOST_CULPRITS: usize = 8;

/// The result of a tolerance study as a document.
pub fn describe(found: &Tolerance) -> Document {
    let mut document = Document::default();
    if let Some(title) = &found.title {
        document.push(Block::Title(title.clone()));
    }
    verdict(&mut document, found);
    limits(&mut document, found);
    measures(&mut document, found);
    quantities(&mut document, found);
    contributions(&mut document, found);
    culprits(&mut document, found);
    worst(&mut document, found);
    readjusted(&mut document, found);
    budget(&mut document, found);
    if !found.perfect.is_empty() {
        document.heading("Counted as perfect, for want of a tolerance");
        document.text(found.perfect.join(", "));
    }
    if !found.idle.is_empty() {
        document.heading("Tolerances that no measure here depends on");
        document.text(found.idle.join(", "));
    }
    if !found.cautions.is_empty() {
        document.heading("Cautions");
        for caution in &found.cautions {
            document.push(Block::Item {
                mark: "  !".into(),
                text: caution.clone(),
                tone: Tone::Doubt,
            });
        }
    }
    document
}

/// A share in percent, with more digits where it is near 0 or 1.
fn percent(share: f64) -> String {
    let from_end = share.min(1.0 - share);
    let decimals = match from_end {
        x if x <= 0.0 => 0,
        x if x < 1e-3 => 3,
        x if x < 1e-2 => 2,
        _ => 1,
    };
    format!("{} %", fixed(100.0 * share, decimals))
}

/// The verdict's word, its tone, and what is said of the yield.
pub(super) fn judged(found: &Tolerance) -> (String, String, Tone) {
    let [low, high] = found.yield_interval;
    let sure = format!("95 % interval {} to {}", percent(low), percent(high));
    let word = format!("YIELD {}", percent(found.passing));
    match found.wanted_yield {
        Some(wanted) if found.passing < wanted => (
            word,
            format!("{sure}; wanted {}", percent(wanted)),
            Tone::Bad,
        ),
        Some(wanted) => (
            word,
            format!("{sure}; wanted {}, reached", percent(wanted)),
            Tone::Good,
        ),
        None => (word, sure, Tone::Plain),
    }
}

fn verdict(document: &mut Document, found: &Tolerance) {
    let (word, rest, tone) = judged(found);
    document.push(Block::Verdict { word, rest, tone });
    let what = match found.limits.len() {
        0 => "stable".to_string(),
        1 => "stable and within the limit".into(),
        n => format!("stable and within all {n} limits"),
    };
    document.text(format!(
        "{} samples, seed {}; a sample passes that is {what}; unstable {}",
        grouped(found.samples),
        found.seed,
        percent(found.unstable),
    ));
    if found.stopped {
        document.text("ended early: what was known by then");
    }
}

/// A count with thin groups of three digits.
fn grouped(count: u64) -> String {
    let digits = count.to_string();
    let mut text = String::new();
    for (index, digit) in digits.chars().enumerate() {
        if index > 0 && (digits.len() - index).is_multiple_of(3) {
            text.push(' ');
        }
        text.push(digit);
    }
    text
}

fn limits(document: &mut Document, found: &Tolerance) {
    if found.limits.is_empty() {
        return;
    }
    document.heading("Limits");
    let mut table = Table::new(&[
        "<measure",
        "<wanted",
        "fails",
        "worst within tolerances",
        "<",
    ]);
    for limit in &found.limits {
        let presence = limit.measure.presence();
        let worst = found.worst.iter().find(|worst| worst.of == limit.of);
        table.rows.push(vec![
            limit.of.clone(),
            wanted(limit.bounds, presence),
            percent(limit.fails),
            worst.map_or(String::new(), |worst| match worst.value {
                Some(value) => measured(value, presence, significant),
                None => "no mode".into(),
            }),
            match worst {
                Some(worst) if worst.holds => "holds".into(),
                Some(_) => "fails".into(),
                None => String::new(),
            },
        ]);
    }
    document.push(Block::Table(table));
    document.aside("fails: share of all samples");
}

fn measures(document: &mut Document, found: &Tolerance) {
    document.heading("Measures, over the stable samples");
    let mut table = Table::new(&[
        "<measure",
        "nominal",
        "mean",
        "standard\nuncertainty",
        "2.5 %",
        "97.5 %",
    ]);
    for (name, statistics) in &found.measures {
        let presence = statistics.measure.presence();
        let number = |x: Option<f64>| {
            x.map_or("–".into(), |x| {
                measured(x, presence, |x, n| significant(x, n.min(5)))
            })
        };
        let quantile = |name: &str| number(statistics.quantiles.get(name).copied().flatten());
        table.rows.push(vec![
            name.clone(),
            number(statistics.nominal),
            number(statistics.mean),
            statistics.standard_uncertainty.map_or("–".into(), |x| {
                measured(x, presence, |x, _| significant(x, 2))
            }),
            quantile("0.025"),
            quantile("0.975"),
        ]);
    }
    document.push(Block::Table(table));
}

/// A tolerance as one would write it: angles in degrees, unless they are tiny.
fn tolerance_of(one: &Varied) -> String {
    let (spread, kind) = one.spread;
    if let (Spread::Limits { below, above }, Kind::Angle) = (spread, kind)
        && below == above
        && above.to_degrees() >= 0.01
    {
        return format!("± {}°", plain(above.to_degrees(), 3));
    }
    human_spread(spread, kind, 3)
}

/// The spread of a quantity, or of those that move together.
fn spread_of(found: &Tolerance, quantity: &str) -> String {
    let spreads: Vec<String> = found
        .varied
        .iter()
        .filter(|one| one.quantity == quantity || one.moves_with.as_deref() == Some(quantity))
        .map(tolerance_of)
        .collect();
    match &spreads[..] {
        [first, others @ ..] if others.iter().all(|other| other == first) => first.clone(),
        _ => spreads.join(", "),
    }
}

fn quantities(document: &mut Document, found: &Tolerance) {
    if found.tightening.is_empty() {
        document.heading("What varies");
        let mut table = Table::new(&["<quantity", "<tolerance", "<shape"]);
        for one in &found.varied {
            table.rows.push(vec![
                one.quantity.clone(),
                tolerance_of(one),
                one.shape.into(),
            ]);
        }
        document.push(Block::Table(table));
        return;
    }
    document.heading("What spoils it, and what to do: the yield with one tolerance changed");
    let mut table = Table::new(&[
        "<quantity",
        "<tolerance",
        "perfect",
        "halved",
        "doubled",
        "<",
    ]);
    for row in &found.tightening {
        let gain = row.yield_if_halved - row.yield_as_is;
        let advice = if row.may_be_doubled {
            "may be doubled"
        } else if gain > 0.02 && gain > 3.0 * row.gain_u {
            "tighten"
        } else {
            ""
        };
        table.rows.push(vec![
            row.quantity.clone(),
            spread_of(found, &row.quantity),
            percent(row.yield_if_perfect),
            percent(row.yield_if_halved),
            percent(row.yield_if_doubled),
            advice.into(),
        ]);
    }
    document.push(Block::Table(table));
    let as_is = found.tightening[0].yield_as_is;
    document.aside(format!(
        "on the same {} samples, of which {} pass as it is",
        grouped(found.tightening_samples),
        percent(as_is)
    ));
}

fn contributions(document: &mut Document, found: &Tolerance) {
    if found.contributions.is_empty() {
        return;
    }
    document.heading("Where the variance comes from");
    let mut table = Table::new(&["<measure", "<quantity", "alone", "with\ninteractions"]);
    let mut last = "";
    let mut named = 0;
    for share in &found.contributions {
        let is_first = share.measure != last;
        named = if is_first { 1 } else { named + 1 };
        last = &share.measure;
        if named > MOST_SHARES || share.total < NEGLIGIBLE {
            continue;
        }
        let percent = |share: f64| format!("{} %", fixed(100.0 * share.max(0.0), 0));
        table.rows.push(vec![
            if is_first {
                share.measure.clone()
            } else {
                String::new()
            },
            share.quantity.clone(),
            percent(share.first_order),
            percent(share.total),
        ]);
    }
    document.push(Block::Table(table));
    let worst = found
        .contributions
        .iter()
        .map(|share| share.first_order_u.max(share.total_u))
        .fold(0.0, f64::max);
    document.aside(format!(
        "by Saltelli's and Jansen's estimators on 2 × {} samples; standard uncertainty up to {} points",
        grouped(found.contribution_samples),
        significant(100.0 * worst, 1)
    ));
}

fn culprits(document: &mut Document, found: &Tolerance) {
    if found.culprits.is_empty() {
        return;
    }
    document.heading(format!(
        "Transverse modes within {} linewidths of the fundamental",
        significant(found.apart, 2)
    ));
    let named: Vec<String> = found
        .culprits
        .iter()
        .take(MOST_CULPRITS)
        .map(|one| format!("TEM {},{} in {}", one.m, one.n, percent(one.share)))
        .collect();
    let more = found.culprits.len().saturating_sub(MOST_CULPRITS);
    let rest = match more {
        0 => String::new(),
        1 => "; one more now and then".into(),
        n => format!("; {n} more"),
    };
    document.text(format!("{}{rest} of all samples", named.join(", ")));
}

fn worst(document: &mut Document, found: &Tolerance) {
    let failing: Vec<&Worst> = found.worst.iter().filter(|worst| !worst.holds).collect();
    if failing.is_empty() {
        return;
    }
    document.heading("The worst place within the tolerances");
    for worst in failing {
        let presence = worst.measure.presence();
        let value = match worst.value {
            Some(value) => measured(value, presence, significant),
            None => "no mode".into(),
        };
        let at: Vec<String> = worst
            .at
            .iter()
            .filter(|place| place.share != 0.0)
            .map(|place| {
                let share = match place.share {
                    s if s >= 0.995 => "high".to_string(),
                    s if s <= -0.995 => "low".into(),
                    s => format!("{} of it", fixed(s, 2)),
                };
                format!("{} {share}", place.quantity)
            })
            .collect();
        document.aside(format!("{} {value}: {}", worst.of, at.join(", ")));
    }
}

fn readjusted(document: &mut Document, found: &Tolerance) {
    let Some(readjusted) = &found.readjusted else {
        return;
    };
    document.heading("With adjustment");
    let [low, high] = readjusted.yield_interval;
    document.text(format!(
        "yield {} ({} to {}) instead of {}, on {} samples",
        percent(readjusted.passing),
        percent(low),
        percent(high),
        percent(readjusted.yield_without),
        grouped(readjusted.samples)
    ));
    for one in &readjusted.adjusted {
        let length = |x: f64| measured(x, crate::cavity::Presence::Length, significant);
        document.aside(match one.travel_used {
            Some(used) if one.set.ends_with("length") || one.set.ends_with("thickness") => format!(
                "{} holds {} in {} of them; 95 % need at most {} of the {} of travel",
                one.set,
                one.hold,
                percent(one.reached),
                length(used),
                length(one.travel)
            ),
            Some(_) => format!(
                "{} holds {} in {} of them",
                one.set,
                one.hold,
                percent(one.reached)
            ),
            None => format!("{} has no aim: {} has no nominal value", one.set, one.hold),
        });
    }
}

fn budget(document: &mut Document, found: &Tolerance) {
    let Some(budget) = &found.budget else {
        return;
    };
    let wanted = found.wanted_yield.unwrap_or_default();
    document.heading(format!(
        "Tolerances that reach {} at the least cost",
        percent(wanted)
    ));
    if let Some(why) = &budget.why {
        document.text(why.clone());
        return;
    }
    let mut table = Table::new(&["<quantity", "<written", "times", "<"]);
    for one in &budget.tolerances {
        let advice = match one.scale {
            s if s >= 1.2 => "may be wider",
            s if s <= 0.83 => "must be tighter",
            _ => "as it is",
        };
        table.rows.push(vec![
            one.quantity.clone(),
            spread_of(found, &one.quantity),
            significant(one.scale, 2),
            advice.into(),
        ]);
    }
    document.push(Block::Table(table));
    if let (Some(passing), Some([low, high])) = (budget.passing, budget.yield_interval) {
        document.aside(format!(
            "yield then {} ({} to {}); cost counts as Σ cost/tolerance",
            percent(passing),
            percent(low),
            percent(high)
        ));
    }
}
