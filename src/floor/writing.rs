//! How a drawing writes its heights, as only all of its labels together tell.

use super::layers::Roles;
use super::readings::{HeightText, Word, height_of_line};
use crate::drawing::Drawing;
use crate::job::{Job, Soffit};

/// What signs beside a height's number mean on one drawing.
#[derive(Debug, Clone, Copy)]
pub(super) struct Writing {
    /// Nothing is called low: `H =` is the sign of every height, and no word for high ones.
    equals_is_height: bool,
    /// Every height with a word has a dash before its number, high ones too, and heights are above the local soffit: the
    /// dash is no minus.
    dash_parts: bool,
}

impl Writing {
    /// Looks at every height that the drawing gives.
    pub(super) fn of(drawing: &Drawing, job: &Job, roles: &Roles) -> Self {
        let mut low = false;
        let (mut plain, mut high_dashed) = (false, false);
        for text in &drawing.texts {
            let of = roles.of(&text.layer, text.look).label;
            if !(of.heights || of.level_lines) {
                continue;
            }
            let lines = text.content.lines();
            for (height, _) in lines.filter_map(|line| height_of_line(line, &job.conventions)) {
                low |= height.word == Some(Word::Low);
                plain |= height.word.is_some() && height.value_m >= 0.0;
                high_dashed |= height.word == Some(Word::High) && height.value_m < 0.0;
            }
        }
        Self {
            equals_is_height: !low,
            dash_parts: high_dashed && !plain && job.conventions.height.soffit == Soffit::Local,
        }
    }

    /// A height as this drawing means it.
    pub(super) fn means(self, height: HeightText) -> HeightText {
        let mut meant = height;
        if self.equals_is_height && height.by_equals {
            meant.word = None;
            meant.likely = None;
        }
        if self.dash_parts && height.word.is_some() {
            meant.value_m = height.value_m.abs();
        }
        meant
    }
}
