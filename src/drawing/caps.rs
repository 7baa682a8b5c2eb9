//! How much a drawing may cost, judged by estimates before the room is taken.

use super::refusal::Refusal;
use super::source::Source;
use super::wanted::Wanted;

/// Peak memory over the file's size of a drawing that is mostly background: measured 2.6.
const PER_FILE_BYTE: u64 = 3;
/// Peak memory of an entity that is read, bytes.
const PER_READ: u64 = 1_500;
/// Peak memory of an entity of a floor that is worked out, bytes: measured 4,900 on 10,000 tendons with four labels each.
const PER_WORKED: u64 = 5_000;
const MB: u64 = 1_000_000;

/// What is done with the entities that are read.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Purpose {
    /// They are looked at.
    Survey,
    /// A floor is worked out from them.
    Work,
}

/// How much a drawing may cost.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct Caps {
    /// Memory that reading and marking may take by the estimate, megabytes.
    pub memory_mb: u64,
    /// Entities that block inserts may expand to.
    pub expanded_entities: u64,
}

impl Default for Caps {
    fn default() -> Self {
        Self {
            memory_mb: 4000,
            expanded_entities: 1_000_000,
        }
    }
}

impl Caps {
    /// Admits a file of this many bytes before it is read.
    ///
    /// # Errors
    /// [`Refusal::TooLarge`], with what was met and what to set.
    pub fn admit_file(&self, bytes: u64) -> Result<(), Refusal> {
        let needed = PER_FILE_BYTE.saturating_mul(bytes);
        self.admit(needed, || format!("the file has {} MB", in_mb(bytes)))
    }

    /// Admits the reading of these layers before any entity is.
    ///
    /// # Errors
    /// [`Refusal::TooLarge`], with what was met and what to set.
    pub fn admit_layers(
        &self,
        source: &Source,
        wanted: &Wanted,
        purpose: Purpose,
    ) -> Result<(), Refusal> {
        let each = match purpose {
            Purpose::Survey => PER_READ,
            Purpose::Work => PER_WORKED,
        };
        let (file, entities) = needs(source, wanted);
        let needed = each.saturating_mul(entities).saturating_add(file);
        self.admit(needed, || {
            format!("there are {entities} entities on the layers that are read")
        })
    }

    /// How many entities blocks may expand to within both caps, and the cap that binds.
    pub(super) fn expansion(&self, source: &Source, wanted: &Wanted) -> Expansion {
        let (file, entities) = needs(source, wanted);
        let taken = PER_READ.saturating_mul(entities).saturating_add(file);
        let room = self.memory_mb.saturating_mul(MB).saturating_sub(taken);
        Expansion {
            entities: self.expanded_entities,
            room,
            caps: *self,
        }
    }

    fn admit(&self, needed: u64, what: impl FnOnce() -> String) -> Result<(), Refusal> {
        if needed <= self.memory_mb.saturating_mul(MB) {
            return Ok(());
        }
        Err(Refusal::TooLarge {
            what: what(),
            needed_mb: in_mb(needed),
            allowed_mb: self.memory_mb,
        })
    }
}

/// Estimated bytes for the file, and how many entities are on these layers.
fn needs(source: &Source, wanted: &Wanted) -> (u64, u64) {
    let file = PER_FILE_BYTE.saturating_mul(source.bytes.len() as u64);
    let layers = source.scan.layers.iter().zip(&source.scan.counts);
    let entities: usize = layers
        .filter(|(layer, _)| wanted.has(&layer.name))
        .flat_map(|(_, kinds)| kinds)
        .map(|(_, count)| count)
        .sum();
    (file, entities as u64)
}

fn in_mb(bytes: u64) -> u64 {
    bytes.div_ceil(MB)
}

/// What is left of both caps while blocks are expanded.
#[derive(Debug, Clone, Copy)]
pub(super) struct Expansion {
    entities: u64,
    room: u64,
    caps: Caps,
}

impl Expansion {
    /// Takes an entity and these bytes more from what is left; `false` if one cap is reached.
    pub(super) fn spend(&mut self, bytes: usize) -> bool {
        let cost = PER_READ.saturating_add(bytes as u64);
        if self.entities == 0 || self.room < cost {
            return false;
        }
        self.entities -= 1;
        self.room -= cost;
        true
    }

    /// Which cap is reached and what to set, once [`Expansion::spend`] has said no.
    pub(super) fn words(&self) -> (String, String) {
        let Caps {
            memory_mb,
            expanded_entities,
        } = self.caps;
        let spent = expanded_entities - self.entities;
        if self.entities == 0 {
            (
                format!(
                    "more than {expanded_entities} entities, which is all that limits.expanded_entities allows"
                ),
                format!(
                    "name fewer layers, explode and thin out the blocks, or set limits.expanded_entities above {expanded_entities} in the job file"
                ),
            )
        } else {
            (
                format!(
                    "more than {spent} entities, and limits.memory_mb = {memory_mb} has no room for more"
                ),
                format!(
                    "name fewer layers, explode and thin out the blocks, or set limits.memory_mb above {memory_mb} in the job file"
                ),
            )
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::drawing::open;

    #[test]
    fn a_file_is_admitted_up_to_a_third_of_the_memory() {
        let caps = Caps {
            memory_mb: 30,
            ..Caps::default()
        };
        assert_eq!(caps.admit_file(10_000_000), Ok(()));
        let refusal = caps.admit_file(10_000_001).expect_err("too large");
        for word in ["has 11 MB", "some 31 MB", "limits.memory_mb allows 30"] {
            assert!(refusal.to_string().contains(word), "{refusal}");
        }
    }

    #[test]
    fn only_entities_on_named_layers_count() {
        let line = "0\nLINE\n8\nA\n10\n0\n20\n0\n11\n1\n21\n0\n";
        let text = format!(
            "0\nSECTION\n2\nENTITIES\n{}0\nENDSEC\n0\nEOF\n",
            line.repeat(1000)
        );
        let source = open(text.into_bytes()).expect("a drawing");
        let caps = Caps {
            memory_mb: 4,
            ..Caps::default()
        };
        let named = |pattern| Wanted::layers([pattern]).expect("a pattern");
        assert_eq!(
            caps.admit_layers(&source, &named("B"), Purpose::Work),
            Ok(())
        );
        let refusal = caps
            .admit_layers(&source, &named("a"), Purpose::Work)
            .expect_err("many");
        assert!(refusal.to_string().contains("1000 entities"), "{refusal}");
        assert_eq!(
            caps.admit_layers(&source, &named("a"), Purpose::Survey),
            Ok(())
        );
    }
}
