//! A finished drawing's text taken apart again, for the other forms that it can be written in.

/// A record: its name and the group codes and values below it.
pub(super) struct Record<'t> {
    pub(super) name: &'t str,
    pub(super) tags: Vec<(u16, &'t str)>,
}

impl<'t> Record<'t> {
    /// The first value under a code.
    pub(super) fn get(&self, code: u16) -> Option<&'t str> {
        let mut tags = self.tags.iter();
        tags.find(|tag| tag.0 == code).map(|tag| tag.1)
    }
}

/// Group codes and values.
pub(super) fn pairs(text: &str) -> impl Iterator<Item = (u16, &str)> {
    let mut lines = text.lines();
    std::iter::from_fn(move || {
        let code = lines.next()?.trim().parse().ok()?;
        Some((code, lines.next()?))
    })
}

/// Records in their order.
pub(super) fn records(text: &str) -> Vec<Record<'_>> {
    let mut records: Vec<Record<'_>> = Vec::new();
    for (code, value) in pairs(text) {
        match records.last_mut() {
            Some(open) if code != 0 => open.tags.push((code, value)),
            _ => records.push(Record {
                name: value,
                tags: Vec::new(),
            }),
        }
    }
    records
}
