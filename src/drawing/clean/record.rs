//! The record being rewritten: what it has so far, and what it must have.

/// The record being rewritten.
#[derive(Default)]
#[expect(
    clippy::struct_excessive_bools,
    reason = "each is a fact of its own about the record"
)]
pub(super) struct Open<'a> {
    pub(super) type_name: &'a [u8],
    pub(super) start: usize,
    pub(super) in_group: bool,
    /// Nothing that follows belongs to the record proper.
    pub(super) past: bool,
    pub(super) columns: bool,
    pub(super) justified: bool,
    /// Group 2 has been seen, and is not empty.
    pub(super) named: bool,
    pub(super) last_direction: i32,
    /// How many vertices a light polyline announces, and how many it has.
    pub(super) announced: Option<i64>,
    pub(super) vertices: i64,
    /// The second coordinate that a vertex still lacks.
    pub(super) half: Option<i32>,
    /// Which of the groups 10, 20, 11, 21, 40, 50, 51 have been seen.
    pub(super) seen: u8,
}

const NOTED: [i32; 7] = [10, 20, 11, 21, 40, 50, 51];

impl Open<'_> {
    pub(super) fn note(&mut self, code: i32) {
        self.vertices += i64::from(code == 10);
        if let Some(bit) = NOTED.iter().position(|noted| *noted == code) {
            self.seen |= 1 << bit;
        }
        if matches!(code, 11 | 50) {
            self.last_direction = code;
        }
    }

    pub(super) fn has(&self, code: i32) -> bool {
        NOTED
            .iter()
            .position(|noted| *noted == code)
            .is_some_and(|bit| self.seen & (1 << bit) != 0)
    }

    /// Holds each vertex of a list to both its coordinates: the library would make up the other, or move the vertex
    /// before.
    pub(super) fn pair(&mut self, code: i32) -> Result<(), String> {
        let listed = match self.type_name {
            b"LWPOLYLINE" => matches!(code, 10 | 20),
            b"SPLINE" => matches!(code, 10 | 11 | 20 | 21),
            _ => false,
        };
        if !listed {
            return Ok(());
        }
        match self.half.take() {
            Some(second) if second != code => Err(lacking(second)),
            None if code >= 20 => Err(lacking(code - 10)),
            None => {
                self.half = Some(code + 10);
                Ok(())
            }
            Some(_) => Ok(()),
        }
    }

    /// Groups that mean something else where they stand.
    pub(super) fn leaves_out(&self, code: i32) -> bool {
        match self.type_name {
            b"LWPOLYLINE" => matches!(code, 20 | 42) && !self.has(10),
            b"MTEXT" => code == 50 && self.columns,
            _ => false,
        }
    }
}

pub(super) fn lacking(code: i32) -> String {
    format!("there is no group {code}, and a coordinate or size was expected")
}
