//! The colours of a field: our own ramps, one from straw through sea green to night blue, one from
//! paper through ochre to umber, one from ash through rose to plum.
//!
//! Control points stand in CIELAB (CIE 1976, D65) on a falling lightness; a Catmull–Rom curve
//! joins them and is walked in equal steps of colour difference ΔE*ab. Lightness falls all the
//! way, so a ramp reads in grey print and to every kind of colour vision; paper takes little
//! ink where there is little to show. The two part along blue against yellow, which all but the
//! rarest kind of colour vision keep apart.

use std::sync::OnceLock;

use crate::figures::sheet::Colour;

/// Number of colours of a ramp; one more index of a picture means "nothing here".
pub(super) const STEPS: usize = 255;

/// The colours of a map.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Ramp {
    /// Straw, sea green, night blue: what presses or conducts.
    Sea,
    /// Paper, ochre, umber: what stands open; paper white is shut.
    Umber,
    /// Ash, rose, plum: what is warm.
    Ember,
}

/// Lightness and the two colour axes, light to dark.
type Control = [[f64; 3]; 6];

const SEA: Control = [
    [97.0, -1.0, 7.0],
    [81.6, -16.0, 14.0],
    [66.2, -27.0, 2.0],
    [50.8, -17.0, -22.0],
    [35.4, 4.0, -38.0],
    [20.0, 16.0, -36.0],
];

/// Ends lighter than the other, so that ink still shows on it.
const UMBER: Control = [
    [100.0, 0.0, 0.0],
    [88.0, 3.0, 20.0],
    [74.0, 9.0, 37.0],
    [59.0, 17.0, 40.0],
    [44.0, 19.0, 31.0],
    [29.0, 14.0, 17.0],
];

const EMBER: Control = [
    [96.0, 1.0, 3.0],
    [84.5, 19.0, 5.0],
    [71.0, 37.0, 3.0],
    [56.0, 49.0, -4.0],
    [40.0, 43.0, -14.0],
    [24.0, 29.0, -18.0],
];

impl Ramp {
    /// The colours, light to dark.
    pub(super) fn colours(self) -> &'static [Colour; STEPS] {
        static SEA_COLOURS: OnceLock<[Colour; STEPS]> = OnceLock::new();
        static UMBER_COLOURS: OnceLock<[Colour; STEPS]> = OnceLock::new();
        static EMBER_COLOURS: OnceLock<[Colour; STEPS]> = OnceLock::new();
        let (colours, control) = match self {
            Self::Sea => (&SEA_COLOURS, &SEA),
            Self::Ember => (&EMBER_COLOURS, &EMBER),
            Self::Umber => (&UMBER_COLOURS, &UMBER),
        };
        colours.get_or_init(|| {
            let path = even_path(control);
            std::array::from_fn(|step| rgb(path[step]))
        })
    }

    /// The colour of a share of the range, 0 to 1.
    pub(super) fn colour(self, share: f64) -> Colour {
        self.colours()[step(share)]
    }
}

/// The colour of a share of the range, 0 to 1, on the ramp of curves and pressures.
pub(super) fn colour(share: f64) -> Colour {
    Ramp::Sea.colour(share)
}

/// The step of a share of the range.
pub(super) fn step(share: f64) -> usize {
    (share.clamp(0.0, 1.0) * (STEPS - 1) as f64).round() as usize
}

/// Places in CIELAB at equal colour differences along the curve.
fn even_path(control: &Control) -> Vec<[f64; 3]> {
    const FINE: usize = 4000;
    let fine: Vec<[f64; 3]> = (0..=FINE)
        .map(|k| curve(control, k as f64 / FINE as f64))
        .collect();
    let mut walked = vec![0.0];
    for pair in fine.windows(2) {
        walked.push(walked[walked.len() - 1] + difference(pair[0], pair[1]));
    }
    let whole = walked[FINE];
    (0..STEPS)
        .map(|step| {
            let goal = whole * step as f64 / (STEPS - 1) as f64;
            fine[walked.partition_point(|&w| w < goal).min(FINE)]
        })
        .collect()
}

fn curve(control: &Control, share: f64) -> [f64; 3] {
    let last = control.len() - 1;
    let place = share * last as f64;
    let left = (place as usize).min(last - 1);
    let u = place - left as f64;
    let knot =
        |offset: usize, axis: usize| control[(left + offset).saturating_sub(1).min(last)][axis];
    std::array::from_fn(|axis| {
        let [p, q, r, s] = std::array::from_fn(|offset| knot(offset, axis));
        q + 0.5 * u * (r - p + u * (2.0 * p - 5.0 * q + 4.0 * r - s + u * (3.0 * (q - r) + s - p)))
    })
}

fn difference(a: [f64; 3], b: [f64; 3]) -> f64 {
    (0..3).map(|k| (a[k] - b[k]).powi(2)).sum::<f64>().sqrt()
}

/// CIELAB to sRGB (IEC 61966-2-1), white point D65.
fn rgb([lightness, a, b]: [f64; 3]) -> Colour {
    let lift = |t: f64| {
        if t > 6.0 / 29.0 {
            t.powi(3)
        } else {
            3.0 * (6.0_f64 / 29.0).powi(2) * (t - 4.0 / 29.0)
        }
    };
    let middle = (lightness + 16.0) / 116.0;
    let x = 0.95047 * lift(middle + a / 500.0);
    let y = lift(middle);
    let z = 1.08883 * lift(middle - b / 200.0);
    let channel = |linear: f64| {
        let shown = if linear <= 0.0031308 {
            12.92 * linear
        } else {
            1.055 * linear.powf(1.0 / 2.4) - 0.055
        };
        (shown.clamp(0.0, 1.0) * 255.0).round() as u8
    };
    Colour(
        channel(3.2404542 * x - 1.5371385 * y - 0.4985314 * z),
        channel(-0.9692660 * x + 1.8760108 * y + 0.0415560 * z),
        channel(0.0556434 * x - 0.2040259 * y + 1.0572252 * z),
    )
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::figures::sheet::PAPER;

    /// Relative luminance as grey print and every kind of colour vision sees the order of colours.
    fn luminance(Colour(r, g, b): Colour) -> f64 {
        let linear = |v: u8| {
            let v = f64::from(v) / 255.0;
            if v <= 0.04045 {
                v / 12.92
            } else {
                ((v + 0.055) / 1.055).powf(2.4)
            }
        };
        0.2126 * linear(r) + 0.7152 * linear(g) + 0.0722 * linear(b)
    }

    #[test]
    fn the_ramps_darken_all_the_way() {
        // Rounding to eight bits may hold two neighbours level, so every fourth step is compared.
        for ramp in [Ramp::Sea, Ramp::Umber, Ramp::Ember] {
            let steps: Vec<_> = ramp.colours().iter().step_by(4).collect();
            for pair in steps.windows(2) {
                assert!(luminance(*pair[1]) < luminance(*pair[0]), "{pair:?}");
            }
        }
    }

    #[test]
    fn steps_of_the_ramp_look_equal() {
        for control in [&SEA, &UMBER, &EMBER] {
            let path = even_path(control);
            let steps: Vec<f64> = path.windows(2).map(|p| difference(p[0], p[1])).collect();
            let mean = steps.iter().sum::<f64>() / steps.len() as f64;
            // The fine walk quantises a step of about sixteen fine ones, so a tenth is its
            // resolution.
            assert!(steps.iter().all(|s| (s - mean).abs() < 0.1 * mean));
        }
    }

    #[test]
    fn no_colour_of_one_ramp_could_be_of_the_other() {
        // Away from the pale ends blue leads or keeps up with red on one ramp, red on the other.
        for step in STEPS / 4..STEPS {
            let Colour(r, _, b) = Ramp::Sea.colours()[step];
            assert!(b >= r, "step {step} of the sea");
            let Colour(r, _, b) = Ramp::Umber.colours()[step];
            assert!(r > b.saturating_add(25), "step {step} of umber");
            // Green leads red on the sea and blue on umber; here it falls behind both.
            let Colour(r, g, b) = Ramp::Ember.colours()[step];
            assert!(g < r && g < b, "step {step} of ember");
            let Colour(r, g, _) = Ramp::Sea.colours()[step];
            assert!(g > r, "step {step} of the sea");
            let Colour(_, g, b) = Ramp::Umber.colours()[step];
            assert!(g > b, "step {step} of umber");
        }
        assert_eq!(Ramp::Umber.colour(0.0), PAPER);
    }

    #[test]
    fn ends_are_straw_and_night_blue() {
        assert_eq!(colour(0.0), Colour(0xFA, 0xF6, 0xE9));
        assert_eq!(colour(1.0), Colour(0x1F, 0x2B, 0x66));
    }
}
