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
/// Peak memory of the name of a layer, type or block, beside its letters: measured 600.
const PER_NAME: u64 = 700;
/// How often the letters of a name are held for each layer, entity or insert that has it.
pub(super) const NAME_COPIES: usize = 4;
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

    /// How many names of layers and types there is room for beside a file of so many bytes.
    pub(super) fn most_names(&self, file: usize) -> usize {
        let file = PER_FILE_BYTE.saturating_mul(file as u64);
        let room = self.memory_mb.saturating_mul(MB).saturating_sub(file);
        usize::try_from(room / PER_NAME).unwrap_or(usize::MAX)
    }

    /// The refusal of a file of so many bytes in which that many names stand before one of them.
    pub(super) fn names_refused(&self, file: usize, at: usize) -> Refusal {
        let most = self.most_names(file) as u64;
        let file = file as u64;
        // As many for each byte that is still to come.
        let all = most.saturating_mul(file) / (at as u64).max(1);
        let names = PER_NAME.saturating_mul(all.max(most).saturating_add(1));
        let needed = PER_FILE_BYTE.saturating_mul(file).saturating_add(names);
        Refusal::TooLarge {
            what: format!("there are more than {most} names of layers and types"),
            needed_mb: in_mb(needed).max(self.memory_mb.saturating_add(1)),
            allowed_mb: self.memory_mb,
        }
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
        let needs = Needs::of(source, wanted);
        self.admit(needs.bytes(each), || {
            let Needs { entities, in_blocks, names, .. } = needs;
            format!(
                "there are {entities} entities on the layers that are read, {in_blocks} in blocks, and {names} names of layers, types and blocks"
            )
        })
    }

    /// How many entities blocks may expand to within both caps, and the cap that binds.
    pub(super) fn expansion(&self, source: &Source, wanted: &Wanted) -> Expansion {
        let taken = Needs::of(source, wanted).bytes(PER_READ);
        Expansion {
            entities: self.expanded_entities,
            room: self.memory_mb.saturating_mul(MB).saturating_sub(taken),
            full: false,
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

/// What a drawing needs before anything is put in its place.
struct Needs {
    /// Bytes for the file.
    file: u64,
    /// Entities of model space on the layers that are read.
    entities: u64,
    /// Records of blocks that may be read.
    in_blocks: u64,
    /// Names of layers, types and blocks.
    names: u64,
    /// Bytes of those.
    in_names: u64,
}

impl Needs {
    fn of(source: &Source, wanted: &Wanted) -> Self {
        let scan = &source.scan;
        let read: Vec<bool> = scan.layers.iter().map(|l| wanted.has(&l.name)).collect();
        let on_read = |layer: usize| read.get(layer).copied().unwrap_or(false);
        let counts = scan.counts.iter().enumerate();
        let entities: usize = counts
            .filter(|(layer, _)| on_read(*layer))
            .flat_map(|(_, kinds)| kinds)
            .map(|(_, count)| count)
            .sum();
        let inherits = |layer: usize| scan.layers.get(layer).is_some_and(|l| l.name == "0");
        let in_blocks = scan.blocks.iter().flat_map(|block| &block.entries);
        let in_blocks = in_blocks.filter(|entry| {
            let layer = entry.layer as usize;
            entry.is_insert || on_read(layer) || inherits(layer)
        });
        let layers = scan.layers.iter().map(|layer| &layer.name);
        let blocks = scan.blocks.iter().map(|block| &block.name);
        let names = layers
            .chain(blocks)
            .chain(&scan.types)
            .chain(&scan.block_names);
        let (names, in_names) = names.fold((0, 0), |(count, bytes), name| {
            (
                count + 1,
                bytes + PER_NAME + (NAME_COPIES * name.len()) as u64,
            )
        });
        Self {
            file: PER_FILE_BYTE.saturating_mul(source.bytes.len() as u64),
            entities: entities as u64,
            in_blocks: in_blocks.count() as u64,
            names,
            in_names,
        }
    }

    /// Bytes, with so many for each entity of model space.
    fn bytes(&self, each: u64) -> u64 {
        let entities = each.saturating_mul(self.entities);
        let in_blocks = PER_READ.saturating_mul(self.in_blocks);
        let parts = [entities, in_blocks, self.in_names];
        parts.into_iter().fold(self.file, u64::saturating_add)
    }
}

fn in_mb(bytes: u64) -> u64 {
    bytes.div_ceil(MB)
}

/// What is left of both caps while entities are put in their places.
#[derive(Debug, Clone, Copy)]
pub(super) struct Expansion {
    entities: u64,
    room: u64,
    /// Something found no room.
    full: bool,
    caps: Caps,
}

impl Expansion {
    /// Takes an entity of a block from what may be expanded; `false` if one cap is reached.
    pub(super) fn spend(&mut self) -> bool {
        if self.entities == 0 || self.full {
            return false;
        }
        self.entities -= 1;
        true
    }

    /// Takes room for something that is to be kept and takes these bytes beyond what any entity does; of an entity of
    /// model space (`counted`) the usual room is taken already. `false` if there is none left.
    pub(super) fn take(&mut self, bytes: usize, counted: bool) -> bool {
        let bytes = bytes as u64;
        let cost = if counted {
            bytes.saturating_sub(PER_READ)
        } else {
            bytes.saturating_add(PER_READ)
        };
        let left = self.room.checked_sub(cost);
        self.full |= left.is_none();
        self.room = left.unwrap_or(self.room);
        left.is_some()
    }

    /// What grew beyond which cap and what to set, once there was no more to take.
    pub(super) fn words(&self) -> (String, String) {
        let Caps {
            memory_mb,
            expanded_entities,
        } = self.caps;
        let (grown, key, held) = if self.full {
            let grown =
                format!("what is read takes more than limits.memory_mb = {memory_mb} allows");
            (grown, "memory_mb", memory_mb)
        } else {
            let grown = format!(
                "block inserts expand to more than {expanded_entities} entities, which is all that limits.expanded_entities allows"
            );
            (grown, "expanded_entities", expanded_entities)
        };
        let remedy = format!(
            "name fewer layers, explode and thin out the blocks, or set limits.{key} above {held} in the job file"
        );
        (grown, remedy)
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
