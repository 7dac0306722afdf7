//! What lies inside the plot of a line and of an area.

use super::frame::Spot;

/// Left, top, right, bottom.
pub type Rectangle = (f64, f64, f64, f64);

/// The part of a straight line inside the rectangle.
///
/// # Formula
/// Liang and Barsky: the line is `a + u (b - a)`; each edge leaves `u` a lower or an upper bound.
///
/// # Reference
/// Liang & Barsky 1984 (from memory).
#[must_use]
pub fn segment(a: Spot, b: Spot, (left, top, right, bottom): Rectangle) -> Option<(Spot, Spot)> {
    let (dx, dy) = (b.0 - a.0, b.1 - a.1);
    let edges = [(-dx, a.0 - left), (dx, right - a.0), (-dy, a.1 - top), (dy, bottom - a.1)];
    let (mut from, mut to) = (0.0_f64, 1.0_f64);
    for (toward, room) in edges {
        if toward == 0.0 {
            if room < 0.0 {
                return None;
            }
        } else if toward < 0.0 {
            from = from.max(room / toward);
        } else {
            to = to.min(room / toward);
        }
    }
    (from <= to).then(|| {
        let at = |u: f64| (a.0 + u * dx, a.1 + u * dy);
        (at(from), at(to))
    })
}

/// The part of an area inside the rectangle.
///
/// # Formula
/// Sutherland and Hodgman: the outline is cut at one edge after the other.
///
/// # Reference
/// Sutherland & Hodgman 1974 (from memory).
#[must_use]
pub fn area(outline: &[Spot], (left, top, right, bottom): Rectangle) -> Vec<Spot> {
    let edges: [(bool, f64, f64); 4] =
        [(true, left, 1.0), (true, right, -1.0), (false, top, 1.0), (false, bottom, -1.0)];
    let mut outline = outline.to_vec();
    for (vertical, at, inward) in edges {
        let depth = |spot: Spot| (if vertical { spot.0 } else { spot.1 } - at) * inward;
        let mut kept = Vec::with_capacity(outline.len() + 2);
        for (index, &spot) in outline.iter().enumerate() {
            let before = outline[(index + outline.len() - 1) % outline.len()];
            let (was, is) = (depth(before), depth(spot));
            if (was < 0.0) != (is < 0.0) {
                let share = was / (was - is);
                kept.push((
                    before.0 + share * (spot.0 - before.0),
                    before.1 + share * (spot.1 - before.1),
                ));
            }
            if is >= 0.0 {
                kept.push(spot);
            }
        }
        outline = kept;
    }
    outline
}
