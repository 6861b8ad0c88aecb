//! JCGM 101:2008, *Propagation of distributions using a Monte Carlo method*, 9.2: the additive model
//! Y = X₁ + X₂ + X₃ + X₄, here the round-trip length of a ring with four gaps, one unit of the example
//! being a millimetre. Results of tables 2 to 4, from memory.

use approx::assert_abs_diff_eq;
use modewright::cavity::Measure;
use modewright::file;
use modewright::study::tolerance::{Options, Statistics, tolerance};

fn ring(lengths: [&str; 4], more: &str) -> Statistics {
    let gap = |k: usize| format!("{{ gap = \"d{}\", length = \"{}\" }},\n", k + 1, lengths[k]);
    let text = format!(
        "wavelength = \"1064 nm\"\nform = \"ring\"\n{more}\npath = [\n\
         {{ mirror = \"M1\", roc = \"4 m\" }},\n{}\
         {{ mirror = \"M2\", roc = \"flat\" }},\n{}\
         {{ mirror = \"M3\", roc = \"4 m\" }},\n{}\
         {{ mirror = \"M4\", roc = \"flat\" }},\n{}]\n",
        gap(0),
        gap(1),
        gap(2),
        gap(3)
    );
    let cavity = file::load("additive.toml", &text, &[]).unwrap().cavity;
    let name = "round_trip_length";
    let options = Options {
        measures: vec![(name.into(), Measure::parse(name, &cavity).unwrap())],
        samples: Some(250_000),
        ..Options::default()
    };
    let found = tolerance(&cavity, &options, &mut |_, _| true).unwrap();
    assert_eq!(found.unstable, 0.0);
    found.measures[name].clone()
}

/// A quarter of a million samples give the standard uncertainty to 0.003 and an end of the interval to
/// 0.011 of the example's units, one standard deviation; the tables round to two decimals.
const ENDS: f64 = 0.04;
const UNCERTAINTY: f64 = 0.01;

fn agrees(found: &Statistics, uncertainty: f64, end: f64, scale: f64) {
    let mm = |x: Option<f64>| x.unwrap() * 1e3;
    let quantile = |name: &str| mm(found.quantiles[name]);
    assert_abs_diff_eq!(mm(found.mean), 4000.0, epsilon = ENDS * scale);
    assert_abs_diff_eq!(
        mm(found.standard_uncertainty),
        uncertainty,
        epsilon = UNCERTAINTY * scale
    );
    assert_abs_diff_eq!(quantile("0.025"), 4000.0 - end, epsilon = ENDS * scale);
    assert_abs_diff_eq!(quantile("0.975"), 4000.0 + end, epsilon = ENDS * scale);
    assert_abs_diff_eq!(quantile("0.5"), 4000.0, epsilon = ENDS * scale);
}

#[test]
fn normal_inputs() {
    // Table 2: standard uncertainty 2.00, 95 % interval −3.92 to 3.92.
    agrees(&ring(["1000.0(10) mm"; 4], ""), 2.0, 3.92, 1.0);
}

#[test]
fn rectangular_inputs() {
    // Table 3: standard uncertainty 2.00, 95 % interval −3.88 to 3.88.
    agrees(&ring(["1000 mm ± 1.7320508 mm"; 4], ""), 2.0, 3.88, 1.0);
}

#[test]
fn one_rectangular_input_ten_times_as_wide() {
    // Table 4: standard uncertainty 10.15 (√103), 95 % interval −17.0 to 17.0, far from the 19.9 of the
    // law of propagation of uncertainty.
    let one = "1000 mm ± 1.7320508 mm";
    let found = ring([one, one, one, "1000 mm ± 17.320508 mm"], "");
    agrees(&found, 103_f64.sqrt(), 17.0, 2.5);
}

/// JCGM 100:2008, 5.2.2: u² = Σu² + 2Σ r u u. Two normal inputs with r = 0.5 and two independent ones:
/// u² = 4 + 2·0.5 (recomputed); with r = 1 the two add linearly, u² = 4 + 2.
#[test]
fn correlated_inputs() {
    for (correlation, square) in [("0.5", 5.0_f64), ("1.0", 6.0)] {
        let groups = format!(
            "tolerance = {{ groups = [ {{ of = [\"d1.length\", \"d2.length\"], correlation = \
             {correlation} }} ] }}"
        );
        let found = ring(["1000.0(10) mm"; 4], &groups);
        agrees(&found, square.sqrt(), 1.959_96 * square.sqrt(), 1.0);
        // Rectangular ones: a Gaussian copula of r makes a correlation of (6/π) asin(r/2) (Pearson,
        // 1907, as in Kruskal, J. Am. Stat. Assoc. 53, 814 (1958); recomputed).
        let found = ring(["1000 mm ± 1.7320508 mm"; 4], &groups);
        let r: f64 = correlation.parse().unwrap();
        let copula = 6.0 / std::f64::consts::PI * (r / 2.0).asin();
        assert_abs_diff_eq!(
            found.standard_uncertainty.unwrap() * 1e3,
            (4.0 + 2.0 * copula).sqrt(),
            epsilon = UNCERTAINTY
        );
    }
}
