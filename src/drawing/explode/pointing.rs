//! Leaders and points in their places.

use geo::Coord;

use super::{Frame, Gatherer, Place};
use crate::drawing::leaders::{Pointing, What};
use crate::drawing::lettering::{Style, of_mtext};
use crate::drawing::{Dot, Leader};

impl Gatherer<'_> {
    /// Places a leader or a point; the texts that leaders name come before.
    pub(super) fn point(&mut self, pointing: &Pointing, frame: &Frame<'_>) {
        let layer = self.layer_in(pointing.layer, frame.layer);
        let handle = frame.handle.unwrap_or(&pointing.handle);
        let wanted = self.book.wants(layer);
        if pointing.worn.invisible {
            self.invisible(layer, frame);
            return;
        }
        let seen = Place {
            layer,
            look: self.looks.seen(&pointing.worn, layer, frame.look),
            within: frame.within,
            counted: wanted && frame.handle.is_none(),
        };
        if matches!(pointing.what, What::Leader(_)) || wanted {
            let weight = pointing.weight();
            if !self.afford(seen, handle, weight) {
                return;
            }
        }
        match &pointing.what {
            What::Dot(place) if wanted => self.drawing.dots.push(Dot {
                handle: handle.to_owned(),
                layer: self.book.layer_name(layer).to_owned(),
                look: seen.look,
                place: frame.placing.place(*place),
            }),
            What::Dot(_) => {}
            What::Leader(lines) => {
                let named = lines.annotation.as_deref();
                let mut texts: Vec<usize> = self.answers.of(frame.expansion, named).collect();
                if let Some(text) = &lines.text {
                    if !wanted {
                        return;
                    }
                    texts.push(self.drawing.texts.len());
                    let lettering = of_mtext(text, Style::default(), &frame.placing);
                    self.text(lettering, seen, handle, false);
                    texts.retain(|&text| text < self.drawing.texts.len());
                }
                let placed = |places: &[Coord<f64>]| {
                    let places = places.iter().map(|&place| frame.placing.place(place));
                    places.collect()
                };
                self.drawing.leaders.push(Leader {
                    handle: handle.to_owned(),
                    layer: self.book.layer_name(layer).to_owned(),
                    look: seen.look,
                    arrows: placed(&lines.arrows),
                    tails: placed(&lines.tails),
                    texts,
                });
            }
        }
    }
}
