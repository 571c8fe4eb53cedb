//! Polygons of straight sides.

use kurbo::Point;

use super::GeometryError;

/// Signed area, positive when the points run anticlockwise.
#[must_use]
pub fn area(points: &[Point]) -> f64 {
    sides(points).map(|(a, b)| 0.5 * a.to_vec2().cross(b.to_vec2())).sum()
}

/// Whether `point` lies inside, by the even-odd rule.
#[must_use]
pub fn contains(points: &[Point], point: Point) -> bool {
    sides(points)
        .filter(|(a, b)| {
            (a.y > point.y) != (b.y > point.y) && point.x < a.x + (point.y - a.y) / (b.y - a.y) * (b.x - a.x)
        })
        .count()
        % 2
        == 1
}

/// The sides in order, the last one back to the first corner.
pub(crate) fn sides(points: &[Point]) -> impl Iterator<Item = (Point, Point)> + '_ {
    points.iter().zip(points.iter().cycle().skip(1)).map(|(&a, &b)| (a, b))
}

/// Refuses a polygon two of whose sides cross, or touch elsewhere than where they join.
///
/// A sweep along x keeps the comparisons near the count of sides.
pub(crate) fn refuse_crossings(points: &[Point]) -> Result<(), GeometryError> {
    let count = points.len();
    let all: Vec<(Point, Point)> = sides(points).collect();
    let mut order: Vec<usize> = (0..count).collect();
    let left = |i: usize| all[i].0.x.min(all[i].1.x);
    let right = |i: usize| all[i].0.x.max(all[i].1.x);
    order.sort_by(|&i, &j| left(i).total_cmp(&left(j)));
    for (rank, &i) in order.iter().enumerate() {
        for &j in order[rank + 1..].iter().take_while(|&&j| left(j) <= right(i)) {
            let neighbours = (i + 1) % count == j || (j + 1) % count == i;
            if !neighbours && meet(all[i], all[j]) {
                let Point { x, y } = all[i].0.midpoint(all[i].1);
                return Err(GeometryError::Crosses { x, y });
            }
        }
    }
    Ok(())
}

fn meet((a, b): (Point, Point), (c, d): (Point, Point)) -> bool {
    let side = |from: Point, to: Point, p: Point| (to - from).cross(p - from);
    let apart = |u: f64, v: f64| (u > 0.0 && v > 0.0) || (u < 0.0 && v < 0.0);
    let overlap = |p: f64, q: f64, r: f64, s: f64| p.max(q) >= r.min(s) && r.max(s) >= p.min(q);
    !apart(side(a, b, c), side(a, b, d))
        && !apart(side(c, d, a), side(c, d, b))
        && overlap(a.x, b.x, c.x, d.x)
        && overlap(a.y, b.y, c.y, d.y)
}
