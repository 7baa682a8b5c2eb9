//! Wording that several rules share.

use crate::units::{LONG, SHORT, Units};

/// How many further places a text names before it only counts them.
const NAMED: usize = 5;

/// The other places of a rule on the same tendon, as the tail of a sentence; empty if there are none.
pub(super) fn also_at(stations_m: &[f64], units: Units) -> String {
    if stations_m.is_empty() {
        return String::new();
    }
    let named: Vec<String> = stations_m
        .iter()
        .take(NAMED)
        .map(|station_m| long(*station_m, units))
        .collect();
    let rest = stations_m.len().saturating_sub(NAMED);
    let more = if rest > 0 {
        format!(" and {rest} more places")
    } else {
        String::new()
    };
    let word = if stations_m.len() == 1 {
        "station"
    } else {
        "stations"
    };
    format!("; also at {word} {}{more}", named.join(", "))
}

/// Splits places into the worst and the stations of the others, in order; the worst has the greatest `badness`, and of
/// equals the first along the tendon.
pub(super) fn worst_of<T>(
    places: Vec<T>,
    badness: impl Fn(&T) -> f64,
    station_m: impl Fn(&T) -> f64,
) -> Option<(T, Vec<f64>)> {
    let mut places = places;
    places.sort_by(|a, b| station_m(a).total_cmp(&station_m(b)));
    let mut worst = 0;
    for (index, place) in places.iter().enumerate() {
        if places
            .get(worst)
            .is_some_and(|held| badness(place) > badness(held))
        {
            worst = index;
        }
    }
    if places.is_empty() {
        return None;
    }
    let chosen = places.remove(worst);
    let others = places.iter().map(station_m).collect();
    Some((chosen, others))
}

/// A height or a clearance, to a tenth of a millimetre where it has one.
pub(super) fn short(length_m: f64, units: Units) -> String {
    units.of(SHORT).brief(length_m * 1000.0, 1)
}

/// A station, a length or a radius, to a hundredth of a metre.
pub(super) fn long(length_m: f64, units: Units) -> String {
    units.of(LONG).said(length_m, 2)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn other_places_are_named_and_the_rest_counted() {
        assert_eq!(also_at(&[], Units::Si), "");
        assert_eq!(also_at(&[1.0], Units::Us), "; also at station 3.28 ft");
        let many = [1.0, 2.0, 3.0, 4.0, 5.0, 6.0, 7.0];
        assert!(also_at(&many, Units::Si).ends_with("5.00 m and 2 more places"));
    }

    #[test]
    fn of_equally_bad_places_the_first_is_the_worst() {
        let found = worst_of(vec![(3.0, 1.0), (1.0, 1.0), (2.0, 0.5)], |p| p.1, |p| p.0);
        assert_eq!(found, Some(((1.0, 1.0), vec![2.0, 3.0])));
    }

    #[test]
    fn short_lengths_show_decimals_only_where_there_are_some() {
        assert_eq!(short(0.025, Units::Si), "25 mm");
        assert_eq!(short(0.0155, Units::Si), "15.5 mm");
        assert_eq!(short(-0.000_01, Units::Si), "0 mm");
        assert_eq!(short(0.0254, Units::Us), "1 in");
    }
}
