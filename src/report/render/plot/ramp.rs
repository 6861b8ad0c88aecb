//! The colours of a map: from dark blue through green to pale yellow.
//!
//! Equal steps of the value are equal steps of lightness, so that a map reads the same in black
//! and white and to every eye; hue only helps. The path is drawn in the Oklab space
//! (B. Ottosson, "A perceptual color space for image processing", 2020; matrices from memory,
//! held to white and grey by the test).

/// Lightness at both ends.
const LIGHTNESS: [f64; 2] = [0.27, 0.97];
/// Hue at both ends, in degrees.
const HUE: [f64; 2] = [274.0, 104.0];
/// Distance from grey, where the screen can show it.
const CHROMA: f64 = 0.13;

/// The colour of a share from 0 to 1, as it is sent to a screen.
pub(super) fn colour(share: f64) -> [u8; 3] {
    let between = |[from, to]: [f64; 2]| from + share.clamp(0.0, 1.0) * (to - from);
    let (lightness, hue) = (between(LIGHTNESS), between(HUE).to_radians());
    let mut chroma = CHROMA;
    loop {
        let linear = linear([lightness, chroma * hue.cos(), chroma * hue.sin()]);
        if chroma < 1e-3 || linear.iter().all(|c| (0.0..=1.0).contains(c)) {
            return linear.map(|c| (255.0 * sent(c.clamp(0.0, 1.0))).round() as u8);
        }
        chroma *= 0.97;
    }
}

/// From Oklab to linear red, green and blue.
fn linear([l, a, b]: [f64; 3]) -> [f64; 3] {
    let long = (l + 0.3963377774 * a + 0.2158037573 * b).powi(3);
    let medium = (l - 0.1055613458 * a - 0.0638541728 * b).powi(3);
    let short = (l - 0.0894841775 * a - 1.2914855480 * b).powi(3);
    [
        4.0767416621 * long - 3.3077115913 * medium + 0.2309699292 * short,
        -1.2684380046 * long + 2.6097574011 * medium - 0.3413193965 * short,
        -0.0041960863 * long - 0.7034186147 * medium + 1.7076147010 * short,
    ]
}

/// The curve of a screen.
fn sent(linear: f64) -> f64 {
    if linear <= 0.003_130_8 {
        12.92 * linear
    } else {
        1.055 * linear.powf(1.0 / 2.4) - 0.055
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn grey_is_grey() {
        for [r, g, b] in [1.0, 0.5].map(|lightness| linear([lightness, 0.0, 0.0])) {
            assert!((r - g).abs() < 1e-6 && (g - b).abs() < 1e-6);
        }
        assert!((linear([1.0, 0.0, 0.0])[0] - 1.0).abs() < 1e-6);
    }

    #[test]
    fn lightness_rises_by_even_steps() {
        // Luminance as the eye weighs the linear colours, and its cube root.
        let lightness = |share: f64| {
            let back = |c: u8| {
                let c = f64::from(c) / 255.0;
                if c <= 0.04045 {
                    c / 12.92
                } else {
                    ((c + 0.055) / 1.055).powf(2.4)
                }
            };
            let [r, g, b] = colour(share).map(back);
            (0.2126 * r + 0.7152 * g + 0.0722 * b).cbrt()
        };
        let steps: Vec<f64> = (0..16)
            .map(|i| f64::from(i) / 16.0)
            .map(|share| lightness(share + 1.0 / 16.0) - lightness(share))
            .collect();
        let mean = (lightness(1.0) - lightness(0.0)) / 16.0;
        assert!(mean > 0.035);
        assert!(steps.iter().all(|step| *step > 0.4 * mean), "{steps:?}");
    }
}
