//! The colours of force: dark blue for much left, through mauve, to orange for little. Lightness rises all the way, so
//! that a grey print keeps the order; blue to orange is the pair that the common colour-blindnesses keep apart; none is
//! so light that it vanishes on paper, none so dark that it vanishes on a dark screen.

use crate::drawing::Ink;

/// Lower bounds of the classes, shares of the jacking force; what is below the last is a class of its own.
pub(super) const BOUNDS: [f64; 7] = [0.90, 0.85, 0.80, 0.75, 0.70, 0.65, 0.60];

/// One colour a class. The index is a near one of the standard palette; the eight indices keep their own order of
/// lightness, since drawings before 2004 have nothing else.
pub(super) const RAMP: [Ink; 8] = [
    ink(172, [12, 45, 200]),
    ink(162, [12, 79, 189]),
    ink(173, [84, 96, 170]),
    ink(163, [132, 105, 147]),
    ink(233, [170, 113, 126]),
    ink(23, [221, 115, 103]),
    ink(42, [238, 130, 76]),
    ink(30, [247, 151, 7]),
];

const fn ink(index: u8, rgb: [u8; 3]) -> Ink {
    Ink {
        index,
        rgb: Some(rgb),
    }
}

/// Class of a share of the jacking force: 0 for most left, 7 for least.
pub(super) fn class_of(share: f64) -> usize {
    BOUNDS.iter().filter(|bound| share < **bound).count()
}

/// Colour of a class.
pub(super) fn class_ink(class: usize) -> Ink {
    RAMP[class.min(RAMP.len() - 1)]
}

/// What the legend calls a class, in percent of the jacking force.
pub(super) fn class_name(class: usize) -> String {
    let percent = |bound: f64| format!("{:.0}", 100.0 * bound);
    let above = class.checked_sub(1).and_then(|i| BOUNDS.get(i));
    match (above, BOUNDS.get(class)) {
        (None, Some(from)) => format!("{} and more", percent(*from)),
        (Some(to), Some(from)) => format!("{} to {}", percent(*from), percent(*to)),
        (Some(to), None) => format!("less than {}", percent(*to)),
        (None, None) => String::new(),
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    type Matrix = [[f64; 3]; 3];

    /// Dichromats' view in linear RGB: Machado, Oliveira, Fernandes 2009, severity 1 (numbers from memory).
    const DEUTAN: Matrix = [
        [0.367_322, 0.860_646, -0.227_968],
        [0.280_085, 0.672_501, 0.047_413],
        [-0.011_820, 0.042_940, 0.968_881],
    ];
    const PROTAN: Matrix = [
        [0.152_286, 1.052_583, -0.204_868],
        [0.114_503, 0.786_281, 0.099_216],
        [-0.003_882, -0.048_116, 1.051_998],
    ];
    const PLAIN: Matrix = [[1.0, 0.0, 0.0], [0.0, 1.0, 0.0], [0.0, 0.0, 1.0]];
    /// sRGB to XYZ, IEC 61966-2-1, over the white point D65.
    const TO_XYZ: Matrix = [
        [0.412_456_4, 0.357_576_1, 0.180_437_5],
        [0.212_672_9, 0.715_152_2, 0.072_175_0],
        [0.019_333_9, 0.119_192_0, 0.950_304_1],
    ];

    fn times(matrix: &Matrix, v: [f64; 3]) -> [f64; 3] {
        matrix.map(|row| row[0] * v[0] + row[1] * v[1] + row[2] * v[2])
    }

    /// CIE L*a*b* as an eye with that matrix sees a colour.
    fn lab(rgb: [u8; 3], eye: &Matrix) -> [f64; 3] {
        let linear = rgb.map(|c| {
            let c = f64::from(c) / 255.0;
            if c <= 0.040_45 {
                c / 12.92
            } else {
                ((c + 0.055) / 1.055).powf(2.4)
            }
        });
        let seen = times(eye, linear).map(|c| c.clamp(0.0, 1.0));
        let [x, y, z] = times(&TO_XYZ, seen);
        let [fx, fy, fz] = [x / 0.950_47, y, z / 1.088_83].map(|t| {
            if t > 216.0 / 24389.0 {
                t.cbrt()
            } else {
                (24389.0 / 27.0 * t + 16.0) / 116.0
            }
        });
        [116.0 * fy - 16.0, 500.0 * (fx - fy), 200.0 * (fy - fz)]
    }

    fn apart(a: [f64; 3], b: [f64; 3]) -> f64 {
        a.iter()
            .zip(b)
            .map(|(a, b)| (a - b).powi(2))
            .sum::<f64>()
            .sqrt()
    }

    /// The standard palette, 10 to 249: hue in steps of 15 degrees, five values, odd ones half way to grey.
    fn palette(index: u8) -> [u8; 3] {
        let hue = f64::from(index / 10 - 1) * 15.0;
        let value = [255.0, 165.0, 127.0, 76.0, 38.0][usize::from(index % 10 / 2)];
        [0.0, 120.0, 240.0].map(|peak: f64| {
            let away = (hue - peak).rem_euclid(360.0);
            let away = away.min(360.0 - away);
            let full = value * (2.0 - away / 60.0).clamp(0.0, 1.0);
            let shown = if index % 2 == 1 {
                f64::midpoint(full, value)
            } else {
                full
            };
            #[expect(
                clippy::cast_possible_truncation,
                clippy::cast_sign_loss,
                reason = "0 to 255"
            )]
            let byte = (shown + 1e-9).floor() as u8;
            byte
        })
    }

    fn true_colours() -> Vec<[u8; 3]> {
        RAMP.iter().filter_map(|ink| ink.rgb).collect()
    }

    fn index_colours() -> Vec<[u8; 3]> {
        RAMP.iter().map(|ink| palette(ink.index)).collect()
    }

    #[test]
    fn the_palette_formula_gives_known_entries() {
        assert_eq!(palette(10), [255, 0, 0]);
        assert_eq!(palette(11), [255, 127, 127]);
        assert_eq!(palette(30), [255, 127, 0]);
        assert_eq!(palette(172), [0, 0, 165]);
        assert_eq!(palette(163), [82, 103, 165]);
    }

    #[test]
    fn lightness_rises_from_class_to_class_in_true_and_index_colours() {
        for colours in [true_colours(), index_colours()] {
            assert_eq!(colours.len(), 8);
            for pair in colours.windows(2) {
                let [darker, lighter] = [lab(pair[0], &PLAIN)[0], lab(pair[1], &PLAIN)[0]];
                assert!(lighter > darker + 1.5, "{pair:?}: {darker} to {lighter}");
            }
        }
    }

    #[test]
    fn true_colours_keep_their_order_of_lightness_for_the_colour_blind_too() {
        for eye in [DEUTAN, PROTAN] {
            for pair in true_colours().windows(2) {
                assert!(
                    lab(pair[1], &eye)[0] > lab(pair[0], &eye)[0] + 2.0,
                    "{pair:?}"
                );
            }
        }
    }

    #[test]
    fn classes_stay_apart_for_every_eye() {
        for (colours, least) in [(true_colours(), 18.0), (index_colours(), 10.0)] {
            for eye in [PLAIN, DEUTAN, PROTAN] {
                for (i, a) in colours.iter().enumerate() {
                    for b in &colours[i + 1..] {
                        let found = apart(lab(*a, &eye), lab(*b, &eye));
                        assert!(found > least, "{a:?} and {b:?} are {found:.1} apart");
                    }
                }
            }
        }
    }

    #[test]
    fn nothing_vanishes_on_paper() {
        for colour in true_colours().into_iter().chain(index_colours()) {
            let lightness = lab(colour, &PLAIN)[0];
            assert!(lightness < 72.0, "{colour:?} has lightness {lightness}");
            let yellow = colour[0] > 200 && colour[1] > 180;
            assert!(!yellow, "{colour:?} is nearly yellow");
        }
    }

    #[test]
    fn bounds_belong_to_the_upper_class() {
        assert_eq!(class_of(1.0), 0);
        assert_eq!(class_of(0.90), 0);
        assert_eq!(class_of(0.899), 1);
        assert_eq!(class_of(0.60), 6);
        assert_eq!(class_of(0.2), 7);
        assert_eq!(class_name(0), "90 and more");
        assert_eq!(class_name(6), "60 to 65");
        assert_eq!(class_name(7), "less than 60");
    }
}
