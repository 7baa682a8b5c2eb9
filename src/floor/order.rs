//! Which of two lines comes first, whatever the order of the entities.

use crate::drawing::Shape;
use crate::geometry::Path;

/// Drawn order: by handle; shapes of one insert, or of a drawing without handles, by place.
pub(super) fn drawn_before(a: &Shape, b: &Shape) -> std::cmp::Ordering {
    by_handle(&a.handle, &b.handle).then_with(|| by_place(&a.path, &b.path))
}

/// By handle as a number; entity numbers of drawings without handles say nothing, so they count as equal.
pub(super) fn by_handle(a: &str, b: &str) -> std::cmp::Ordering {
    let value = |handle: &str| u64::from_str_radix(handle, 16).unwrap_or(u64::MAX);
    value(a).cmp(&value(b))
}

/// By place on the plan; of two that lie in one place, and only then, by the way in which they are drawn.
pub(super) fn by_place(a: &Path, b: &Path) -> std::cmp::Ordering {
    by_numbers(&corners(a), &corners(b)).then_with(|| by_numbers(&passed(a), &passed(b)))
}

fn by_numbers(a: &[f64], b: &[f64]) -> std::cmp::Ordering {
    let pairs = a.iter().zip(b);
    pairs
        .map(|(a, b)| a.total_cmp(b))
        .find(|order| order.is_ne())
        .unwrap_or(std::cmp::Ordering::Equal)
}

/// Places that a line passes on its way, from its first vertex.
fn passed(path: &Path) -> [f64; 16] {
    let eighth_m = path.length_m() / 8.0;
    let mut passed = [0.0; 16];
    for (place, pair) in (0_u8..).zip(passed.chunks_mut(2)) {
        let place = path.place_at(f64::from(place) * eighth_m);
        pair.copy_from_slice(&[place.x, place.y]);
    }
    passed
}

fn corners(path: &Path) -> [f64; 5] {
    let start = path.start().unwrap_or_default();
    let end = path.end().unwrap_or_default();
    let swap = (end.x, end.y) < (start.x, start.y);
    let (first, last) = if swap { (end, start) } else { (start, end) };
    [first.x, first.y, last.x, last.y, path.length_m()]
}
