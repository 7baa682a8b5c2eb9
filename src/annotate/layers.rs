//! The layers that marks lie on, and the inks that are not the force ramp's.

use crate::drawing::{Drawn, Ink, Mark, SheetLayer};
use crate::finding::Level;

/// Layers of the coloured lengths, by stage.
pub(super) const FORCE: [&str; 4] = [
    "TAUT-FORCE-JACKING",
    "TAUT-FORCE-LOCKOFF",
    "TAUT-FORCE-TRANSFER",
    "TAUT-FORCE-SERVICE",
];
/// Layers of the figures, by stage.
pub(super) const FORCE_TEXT: [&str; 4] = [
    "TAUT-FORCE-JACKING-TEXT",
    "TAUT-FORCE-LOCKOFF-TEXT",
    "TAUT-FORCE-TRANSFER-TEXT",
    "TAUT-FORCE-SERVICE-TEXT",
];
/// Extensions at live ends.
pub(super) const EXTENSION: &str = "TAUT-EXTENSION";
/// Tendons in space.
pub(super) const PROFILE: &str = "TAUT-PROFILE";
/// Findings.
pub(super) const FINDING: &str = "TAUT-FINDING";
/// Legend and table.
pub(super) const TABLE: &str = "TAUT-TABLE";

/// Black on paper, white on a dark screen.
const PLAIN: Ink = Ink {
    index: 7,
    rgb: None,
};
/// Mid grey: behind everything else, on paper and screen.
pub(super) const GREY: Ink = Ink {
    index: 8,
    rgb: Some([128, 128, 128]),
};
/// Teal: beside blue to orange it cannot be taken for a force.
const TEAL: Ink = Ink {
    index: 134,
    rgb: Some([0, 127, 127]),
};
/// Pure red.
const RED: Ink = Ink {
    index: 1,
    rgb: Some([255, 0, 0]),
};
/// Magenta.
const MAGENTA: Ink = Ink {
    index: 220,
    rgb: Some([255, 0, 191]),
};

/// The colour of a finding: none of them is in the force ramp.
pub(super) fn level_ink(level: Level) -> Ink {
    match level {
        Level::Error => RED,
        Level::Warning => MAGENTA,
        Level::Note => TEAL,
    }
}

/// All layers, in the layer table's order; of the stages only service comes switched on.
pub(super) fn layers() -> Vec<SheetLayer> {
    let stages =
        FORCE
            .iter()
            .zip(FORCE_TEXT)
            .enumerate()
            .flat_map(|(stage, (lengths, figures))| {
                let on = stage == 3;
                [layer(lengths, PLAIN, on), layer(figures, PLAIN, on)]
            });
    stages
        .chain([
            layer(EXTENSION, PLAIN, true),
            layer(PROFILE, GREY, true),
            layer(FINDING, RED, true),
            layer(TABLE, PLAIN, true),
        ])
        .collect()
}

fn layer(name: &str, ink: Ink, on: bool) -> SheetLayer {
    SheetLayer {
        name: name.to_owned(),
        ink,
        on,
    }
}

/// A mark in its layer's own colour.
pub(super) fn mark(layer: &str, drawn: Drawn) -> Mark {
    Mark {
        layer: layer.to_owned(),
        ink: None,
        drawn,
    }
}

/// A mark in a colour of its own.
pub(super) fn inked(layer: &str, ink: Ink, drawn: Drawn) -> Mark {
    Mark {
        layer: layer.to_owned(),
        ink: Some(ink),
        drawn,
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::drawing::OWN_LAYERS;

    #[test]
    fn names_fit_the_oldest_layer_table() {
        for layer in layers() {
            assert!(layer.name.len() <= 31, "{}", layer.name);
            assert!(
                layer
                    .name
                    .bytes()
                    .all(|b| b.is_ascii_uppercase() || b.is_ascii_digit() || b == b'-'),
                "{}",
                layer.name
            );
        }
    }

    #[test]
    fn each_of_them_is_found_again_and_replaced() {
        for layer in layers() {
            assert!(OWN_LAYERS.contains(&layer.name.as_str()), "{}", layer.name);
        }
    }

    #[test]
    fn twelve_layers_in_order_and_only_earlier_stages_are_off() {
        let found: Vec<(String, bool)> = layers().into_iter().map(|l| (l.name, l.on)).collect();
        let wanted = [
            ("TAUT-FORCE-JACKING", false),
            ("TAUT-FORCE-JACKING-TEXT", false),
            ("TAUT-FORCE-LOCKOFF", false),
            ("TAUT-FORCE-LOCKOFF-TEXT", false),
            ("TAUT-FORCE-TRANSFER", false),
            ("TAUT-FORCE-TRANSFER-TEXT", false),
            ("TAUT-FORCE-SERVICE", true),
            ("TAUT-FORCE-SERVICE-TEXT", true),
            ("TAUT-EXTENSION", true),
            ("TAUT-PROFILE", true),
            ("TAUT-FINDING", true),
            ("TAUT-TABLE", true),
        ];
        assert_eq!(found, wanted.map(|(name, on)| (name.to_owned(), on)));
    }
}
