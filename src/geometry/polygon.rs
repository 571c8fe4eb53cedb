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

/// The place nearest to `point` on the straight line between two others.
#[must_use]
pub fn nearest_between(from: Point, to: Point, point: Point) -> Point {
    let line = to - from;
    let share = ((point - from).dot(line) / line.hypot2().max(f64::MIN_POSITIVE)).clamp(0.0, 1.0);
    from + share * line
}

/// Least distance between the sides of two polygons; nought where they cross. One that lies wholly
/// within the other is as far from it as its sides are.
#[must_use]
pub fn least_distance(a: &[Point], b: &[Point]) -> f64 {
    let others: Vec<(Point, Point)> = sides(b).collect();
    let mut least = f64::INFINITY;
    for (a0, a1) in sides(a) {
        for &(b0, b1) in &others {
            // Far apart along x: no need to look closer.
            if a0.x.min(a1.x) - b0.x.max(b1.x) > least || b0.x.min(b1.x) - a0.x.max(a1.x) > least {
                continue;
            }
            let side = |p: Point, q: Point, r: Point| (q - p).cross(r - p);
            if side(a0, a1, b0) * side(a0, a1, b1) < 0.0 && side(b0, b1, a0) * side(b0, b1, a1) < 0.0 {
                return 0.0;
            }
            let to_side = |p: Point, from: Point, to: Point| p.distance(nearest_between(from, to, p));
            let ends = [to_side(a0, b0, b1), to_side(a1, b0, b1), to_side(b0, a0, a1), to_side(b1, a0, a1)];
            least = ends.into_iter().fold(least, f64::min);
        }
    }
    least
}

/// Area that a polygon shares with a convex one that runs anticlockwise; signed as the first runs.
///
/// Source: I. E. Sutherland and G. W. Hodgman, "Reentrant polygon clipping", Communications of the ACM 17
/// (1974). Pieces stay joined by lines of no area, which an area does not mind.
#[must_use]
pub fn shared_area(points: &[Point], convex: &[Point]) -> f64 {
    let mut kept = points.to_vec();
    for (from, to) in sides(convex) {
        let inside = |p: Point| (to - from).cross(p - from);
        let mut next = Vec::with_capacity(kept.len() + 2);
        for (a, b) in sides(&kept) {
            let (here, there) = (inside(a), inside(b));
            if here >= 0.0 {
                next.push(a);
            }
            if (here < 0.0) != (there < 0.0) {
                next.push(a.lerp(b, here / (here - there)));
            }
        }
        kept = next;
    }
    area(&kept)
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
