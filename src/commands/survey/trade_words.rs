//! Words of the trade in layer names, block names and texts, in the languages of offices that draw floors. A survey only
//! proposes by them: the engineer checks.

use crate::floor::EndKind;

/// What a layer may be named for.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum Trade {
    Grid,
    Edge,
    Column,
    Opening,
    Tendon,
}

/// How a word is looked for in a name.
#[derive(Debug, Clone, Copy)]
enum Look {
    /// Anywhere.
    Within,
    /// At the beginning of one of the name's words.
    Begins,
    /// As one of the name's words.
    Whole,
}
use Look::{Begins, Whole, Within};

/// Words of layer names; English is common practice, the rest from memory (German, French, Spanish, Portuguese, Italian,
/// Dutch, Swedish, Norwegian, Danish, Polish, Czech).
const LAYERS: &[(Trade, Look, &str)] = &[
    (Trade::Grid, Within, "GRID AXIS AXES"),
    (
        Trade::Grid,
        Begins,
        "ACHS RASTER EJES EIXO AKSE AKSLINJE STRAMIEN GITTER MODULLINJE",
    ),
    (
        Trade::Grid,
        Whole,
        "EJE AXE ASSI ASSE AXEL AXLAR OSIE OSI OSY OSA",
    ),
    (
        Trade::Edge,
        Within,
        "EDGE OUTLINE DECKENRAND PLATTENRAND VLOERRAND PLATTKANT BJÄLKLAGSKANT DEKKEKANT DÆKKANT",
    ),
    (
        Trade::Edge,
        Begins,
        "CONTOUR CONTORNO BORDE BORDO BORDA RIVE UMRISS OMTREK KRAWĘD OBRYS PERIMET KONTUR",
    ),
    (Trade::Column, Within, "COLUMN WALL"),
    (
        Trade::Column,
        Begins,
        "STÜTZE STUETZE POTEAU PILAR PILASTR KOLOM PELARE SØYLE SÖJLE SØJLE SŁUP SLOUP VOILE WÄNDE MURO PAREDE",
    ),
    (Trade::Column, Whole, "COL COLS PILLAR PILLARS"),
    (
        Trade::Opening,
        Within,
        "OPENING VOID HOLE AUSSPARUNG DURCHBRUCH",
    ),
    (
        Trade::Opening,
        Begins,
        "TRÉMIE TREMIE OUVERTURE HUECO ABERTURA APERTUR SPARING HÅL UTSPARING OTW OTVOR PROSTUP",
    ),
    (
        Trade::Tendon,
        Within,
        "DISTRIB TENDON CABLE SPANNGLIED SPÄNNKABEL SPENNKABEL SPÆNDKABEL VOORSPAN",
    ),
    (
        Trade::Tendon,
        Begins,
        "CABO CAVI TORÓN TORON KABEL LITZE CIĘGN PŘEDPĚTÍ POSTENSAD POSTESAD",
    ),
];

/// Whether a layer's name has a word for this.
pub(super) fn named(trade: Trade, layer: &str) -> bool {
    let layer = layer.to_uppercase();
    let mut of_trade = LAYERS.iter().filter(|(of, ..)| *of == trade);
    of_trade.any(|(_, look, words)| has(&layer, *look, words))
}

/// Words for the ends of tendons. Dead ones are asked first: "non-stressing" is no stressing end. English is common
/// practice; German, French, Spanish, Portuguese, Italian, Dutch, Scandinavian, Polish, Czech, Russian and Chinese from
/// memory.
const ENDS: &[(EndKind, Look, &str)] = &[
    (
        EndKind::Dead,
        Within,
        "DEAD FIXED PASSIV PASSIF PASSIEF PASIV NON-STRESS NONSTRESS UNSTRESSED FESTANKER ПАССИВН 固定端",
    ),
    (
        EndKind::Dead,
        Begins,
        "FIJO FIJA FIXE FIXO FIXA FISSO FISSA BIERN PEVN MARTW FASTANKER FASTFORANKR FESTVERANKER FESTKOPF",
    ),
    (
        EndKind::Dead,
        Whole,
        "FIX FAST FEST MORT MORTA MUERTO VAST DØD DÖD BLIND BLINDANKER",
    ),
    (
        EndKind::Live,
        Within,
        "LIVE STRESSING ACTIV AKTIV ACTIF ACTIEF JACK SPANNANKER SPANANKER SPÄNNANKARE SPENNANKER SPÆNDANKER АКТИВН НАТЯЖН 张拉端",
    ),
    (
        EndKind::Live,
        Begins,
        "STRESS ATIVO ATIVA ATTIV TESAD TESAT TENSAD CZYNN NACIĄG NAPÍN SPANNKOPF SPANNEND SPANNSEIT PROTENS",
    ),
    (EndKind::Live, Whole, "SPANN SPÄNN SPENN SPÆND VÉRIN GATO"),
];

/// Letters that stand for ends, where both kinds are met (common practice).
const CODES: [(EndKind, &str); 2] = [
    (EndKind::Live, "LE SE JE AE S L J A"),
    (EndKind::Dead, "DE FE PE NE D F P N"),
];

/// Words for shapes in a legend's line, with what the shape is called in a job (English is common practice, the rest from
/// memory).
const SHAPES: &[(&str, &str)] = &[
    ("circle", "CIRCLE KREIS CERCLE CIRC CIRK SIRKEL CERCHIO"),
    (
        "triangle",
        "TRIANG ARROW DREIECK PFEIL TREKANT FLECHA FLÈCHE",
    ),
    ("square", "SQUARE BOX QUADRAT CARRÉ CUADRAD KVADRAT FYRKANT"),
    ("bar", "BAR DASH STRICH BALKEN TRAIT BARRA STREK"),
    ("solid", "SOLID FILLED GEFÜLLT PLEIN RELLEN FYLLD"),
];

/// The one shape that a legend's line speaks of.
pub(super) fn shape_in(text: &str) -> Option<&'static str> {
    let text = text.to_uppercase();
    let mut found = SHAPES.iter().filter(|(_, words)| has(&text, Begins, words));
    let (shape, _) = found.next()?;
    found.next().is_none().then_some(*shape)
}

/// What a name or a word of another office says of an end.
pub(super) fn hinted(text: &str) -> Option<EndKind> {
    if is_between(text) {
        return None;
    }
    let text = text.to_uppercase().replace(' ', "-");
    let mut fitting = ENDS
        .iter()
        .filter(|(_, look, words)| has(&text, *look, words));
    fitting.next().map(|(kind, ..)| *kind)
}

/// Whether a name or a word of another office speaks of an anchor between the ends of a tendon.
pub(super) fn is_between(text: &str) -> bool {
    let text = text.to_uppercase();
    text.contains("INTERMED") || text.contains("COUPL") || parts(&text).any(|part| part == "IA")
}

/// What letters in a name stand for: `S.E.`, `PT-LE`, `PTDE`. To be trusted only where the other kind is met as well.
pub(super) fn coded(text: &str) -> Option<EndKind> {
    let text = text.to_uppercase().replace('.', "");
    let bare = |part: &str| {
        part.strip_prefix("PT")
            .filter(|rest| !rest.is_empty())
            .unwrap_or(part)
            .to_owned()
    };
    let parts: Vec<String> = parts(text.trim()).map(bare).collect();
    let kind = CODES.iter().find(|(_, codes)| {
        codes
            .split(' ')
            .any(|code| parts.iter().any(|part| part == code))
    });
    kind.map(|(kind, _)| *kind)
}

/// Whether one of these words stands in a name.
fn has(name: &str, look: Look, words: &str) -> bool {
    words.split_whitespace().any(|word| match look {
        Within => name.contains(word),
        Begins => parts(name).any(|part| part.starts_with(word)),
        Whole => parts(name).any(|part| part == word),
    })
}

fn parts(name: &str) -> impl Iterator<Item = &str> {
    name.split(|sign: char| !sign.is_alphabetic())
        .filter(|part| !part.is_empty())
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn ends_are_told_in_many_languages() {
        use EndKind::{Dead, Live};
        for (text, kind) in [
            ("STRESS_END", Some(Live)),
            ("S-ANCHOR-STRESS", Some(Live)),
            ("Spannanker", Some(Live)),
            ("SPANNGLIED_ANKER", None),
            ("KOTVA_AKTIVNÍ", Some(Live)),
            ("ANC_ATIVA", Some(Live)),
            ("Extremo activo", Some(Live)),
            ("NON-STRESSING END", Some(Dead)),
            ("Festanker", Some(Dead)),
            ("ANKER-PASSIEF", Some(Dead)),
            ("FAST", Some(Dead)),
            ("PRESTRESS", None),
            ("ANCHOR", None),
            ("INTERMEDIATE LIVE ANCHOR", None),
        ] {
            assert_eq!(hinted(text), kind, "{text}");
        }
        assert_eq!(coded("S.E."), Some(Live));
        assert_eq!(coded("PTDE"), Some(Dead));
        assert_eq!(coded("ANCHOR"), None);
    }

    #[test]
    fn layers_are_told_by_whole_words() {
        assert!(named(Trade::Grid, "27-ACHSEN"));
        assert!(!named(Trade::Grid, "FOLDEJER"));
        assert!(named(Trade::Edge, "CONTOUR-DALLE"));
        assert!(named(Trade::Column, "S-COLS"));
        assert!(!named(Trade::Column, "PROTOCOL"));
    }
}
