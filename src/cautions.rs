//! What every result is said with, wherever it is read.

/// Paragraphs of whole sentences: what a result is not, what a stressed tendon can do, what the forces rest on.
pub const CAUTIONS: [&str; 3] = [
    "This is a check of a drawing, not a design certificate: strength, punching, deflection, anchorage zones and fire \
     are not looked at. The engineer responsible decides, under the local code.",
    "A stressed tendon stores great energy: nobody behind, in line with or above a jack or a tendon's line. Concrete \
     strength is proven in writing first; only trained crews stress, cut or de-tension.",
    "Forces follow from the heights as drawn; what is built may differ.",
];
