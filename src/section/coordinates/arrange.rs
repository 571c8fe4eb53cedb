//! Points in any order that people write them in, brought into one: from the upper trailing edge
//! over the nose to the lower one.

use super::placing::{Placing, mirror};
use super::{CoordinateError, FEWEST, Given, MOST};
use crate::geometry::{Point, Vec2, polygon};

/// Nearer than this share of the size, two points that follow each other are one.
const SAME: f64 = 1e-9;
/// Share of the size by which the ends of an outline may lie apart.
const OPEN: f64 = 0.25;
/// From this station on the round of a trailing edge is looked for.
const ROUND: f64 = 0.98;
/// By how much the ends of the surfaces may have passed each other, in chords.
const CROSSED: f64 = 1e-3;
/// The longest stretch without points, in √x.
const GAP: f64 = 0.35;

/// An outline in order.
pub(super) struct Arranged {
    /// From the upper trailing edge over the nose to the lower one, mirrored where it has to be.
    pub(super) points: Vec<Given>,
    /// A first placing: good to about a thousandth of the chord.
    pub(super) placing: Placing,
    /// Rank of the point next to the nose.
    pub(super) nose: usize,
    pub(super) upper_first: bool,
    pub(super) blocks: usize,
    pub(super) from_nose: bool,
    pub(super) duplicates: Vec<usize>,
    pub(super) rounded: Vec<usize>,
    /// By how much the ends of the surfaces had passed each other before they were joined, in
    /// chords; nought where they had not.
    pub(super) joined: f64,
}

/// Orders the points of one block that goes round, or of two for the two surfaces. `closed` says
/// that the one block has no ends.
pub(super) fn arrange(blocks: Vec<Vec<Given>>, closed: bool) -> Result<Arranged, CoordinateError> {
    let size = size(&blocks)?;
    let mut duplicates = Vec::new();
    let mut blocks = split_at_jump(blocks, size);
    for block in &mut blocks {
        drop_duplicates(block, SAME * size, &mut duplicates);
    }
    let block_count = blocks.len();
    let (mut points, mut from_nose) = join(blocks);
    drop_duplicates(&mut points, SAME * size, &mut duplicates);
    if points.len() < FEWEST {
        return Err(CoordinateError::Count { count: points.len(), least: FEWEST, most: MOST });
    }
    if closed {
        points = cut_open(points, size);
    }
    refuse_open(&points, size)?;
    let (start, far) = ends(&points);
    // A clear difference is asked for before the tail is looked for elsewhere than at the ends.
    if !closed && width(&points, start, far) > 1.2 * width(&points, far, start) {
        points = starting_at_tail(points, size);
        from_nose = true;
    }
    duplicates.sort_unstable();
    duplicates.dedup();

    let (tail, nose) = ends(&points);
    let mirrored = tail.x < nose.x;
    for given in &mut points {
        given.point = mirror(given.point, mirrored);
    }
    let area = polygon::area(&points.iter().map(|given| given.point).collect::<Vec<_>>());
    let encloses = area.abs() > 1e-6 * size * size;
    if !encloses {
        return Err(CoordinateError::Flat);
    }
    let upper_first = area > 0.0;
    if !upper_first {
        points.reverse();
    }
    let rounded = cut_round(&mut points);
    if points.len() < FEWEST {
        return Err(CoordinateError::Count { count: points.len(), least: FEWEST, most: MOST });
    }
    let joined = join_crossed_ends(&mut points);
    let (placing, nose) = first_placing(&points, mirrored);
    let arranged = Arranged {
        points,
        placing,
        nose,
        upper_first,
        blocks: block_count,
        from_nose,
        duplicates,
        rounded,
        joined,
    };
    arranged.refuse_bad_surfaces()?;
    Ok(arranged)
}

fn size(blocks: &[Vec<Given>]) -> Result<f64, CoordinateError> {
    let all = || blocks.iter().flatten();
    let count = all().count();
    if !(FEWEST..=MOST).contains(&count) {
        return Err(CoordinateError::Count { count, least: FEWEST, most: MOST });
    }
    let fits = |value: f64| value.abs() < 1e9;
    if let Some(bad) = all().find(|given| !fits(given.point.x) || !fits(given.point.y)) {
        return Err(CoordinateError::Size { index: bad.index });
    }
    let mut bounds = crate::geometry::Rect::from_points(Point::ORIGIN, Point::ORIGIN);
    for (i, given) in all().enumerate() {
        let point = crate::geometry::Rect::from_points(given.point, given.point);
        bounds = if i == 0 { point } else { bounds.union(point) };
    }
    let size = bounds.width().max(bounds.height());
    // Below this a single rounding of the coordinates would show.
    let far = bounds.x0.abs().max(bounds.x1.abs()).max(bounds.y0.abs()).max(bounds.y1.abs());
    if size > 1e-6 && size > 1e-6 * far { Ok(size) } else { Err(CoordinateError::Flat) }
}

/// A table without a mark between its blocks leaps where the second begins.
fn split_at_jump(mut blocks: Vec<Vec<Given>>, size: f64) -> Vec<Vec<Given>> {
    if let [block] = blocks.as_mut_slice() {
        let leaps: Vec<usize> =
            (1..block.len()).filter(|&i| block[i].point.distance(block[i - 1].point) > 0.5 * size).collect();
        if let [leap] = leaps[..]
            && leap >= 3
            && block.len() - leap >= 3
        {
            let rest = block.split_off(leap);
            blocks.push(rest);
        }
    }
    blocks
}

fn drop_duplicates(points: &mut Vec<Given>, same: f64, dropped: &mut Vec<usize>) {
    let mut last: Option<Point> = None;
    points.retain(|given| {
        let keep = last.is_none_or(|last| last.distance(given.point) > same);
        if keep {
            last = Some(given.point)
        } else {
            dropped.push(given.index)
        }
        keep
    });
}

/// One list that goes round, and whether the blocks ran from the nose.
fn join(blocks: Vec<Vec<Given>>) -> (Vec<Given>, bool) {
    let mut blocks = blocks.into_iter();
    let mut first = blocks.next().unwrap_or_default();
    let Some(second) = blocks.next() else {
        return (first, false);
    };
    let end = |block: &[Given], last: bool| {
        let given = if last { block.last() } else { block.first() };
        given.map_or(Point::ORIGIN, |given| given.point)
    };
    let distance = |one: bool, other: bool| end(&first, one).distance(end(&second, other));
    let same_sense = distance(false, false) + distance(true, true);
    let other_sense = distance(true, false) + distance(false, true);
    if other_sense <= same_sense {
        first.extend(second);
        return (first, false);
    }
    // Both from the nose, or both from the tail: the blunter end is the nose.
    let mut round: Vec<Given> = first.iter().rev().chain(&second).copied().collect();
    let (start, far) = ends(&round);
    if width(&round, start, far) <= width(&round, far, start) {
        return (round, true);
    }
    round.clear();
    round.extend(first.iter().chain(second.iter().rev()));
    (round, false)
}

/// The middle of the two ends, and the point furthest from it.
fn ends(points: &[Given]) -> (Point, Point) {
    let (Some(first), Some(last)) = (points.first(), points.last()) else {
        return (Point::ORIGIN, Point::ORIGIN);
    };
    let middle = first.point.midpoint(last.point);
    (middle, furthest(points, middle).1)
}

fn furthest(points: &[Given], from: Point) -> (usize, Point) {
    let reach = |given: &Given| given.point.distance_squared(from);
    let best = points.iter().enumerate().max_by(|a, b| reach(a.1).total_cmp(&reach(b.1)));
    best.map_or((0, from), |(i, given)| (i, given.point))
}

/// How wide the outline is across the line to `other`, 4 % of it away from `end`.
fn width(points: &[Given], end: Point, other: Point) -> f64 {
    let along = other - end;
    let scale = along.hypot2().recip();
    let seen = |given: &Given| {
        let offset = given.point - end;
        (offset.dot(along) * scale - 0.04, along.cross(offset) * scale)
    };
    let (mut least, mut most) = (f64::INFINITY, f64::NEG_INFINITY);
    for (a, b) in points.iter().zip(points.iter().cycle().skip(1)) {
        let ((s, y), (s_next, y_next)) = (seen(a), seen(b));
        if (s < 0.0) != (s_next < 0.0) {
            let at = y + (y_next - y) * s / (s - s_next);
            (least, most) = (least.min(at), most.max(at));
        }
    }
    if most > least { most - least } else { 0.0 }
}

/// A ring cut open at its sharper end; the point there stands at both ends.
fn cut_open(mut points: Vec<Given>, size: f64) -> Vec<Given> {
    if let (Some(first), Some(last)) = (points.first(), points.last())
        && first.point.distance(last.point) <= SAME * size
    {
        points.pop();
    }
    let start = points.first().map_or(Point::ORIGIN, |given| given.point);
    let (one, one_place) = furthest(&points, start);
    let (other, other_place) = furthest(&points, one_place);
    let tail = if width(&points, one_place, other_place) < width(&points, other_place, one_place) {
        one
    } else {
        other
    };
    points.rotate_left(tail);
    points.extend(points.first().copied());
    points
}

/// An outline that was listed from its nose on.
fn starting_at_tail(points: Vec<Given>, size: f64) -> Vec<Given> {
    let middle = ends(&points).0;
    let mut points = points;
    if let (Some(first), Some(last)) = (points.first(), points.last())
        && first.point.distance(last.point) <= SAME * size
    {
        points.pop();
    }
    let tail = furthest(&points, middle).0;
    points.rotate_left(tail);
    // The corner stands at both ends; where the edge is blunt it is taken off again as a part of it.
    points.extend(points.first().copied());
    points
}

fn refuse_open(points: &[Given], size: f64) -> Result<(), CoordinateError> {
    if let (Some(first), Some(last)) = (points.first(), points.last()) {
        let apart = first.point.distance(last.point) / size;
        if apart > OPEN {
            let (first, last) = (first.index, last.index);
            return Err(CoordinateError::Open { first, last, percent: 100.0 * apart });
        }
    }
    Ok(())
}

/// Takes off the points that lie on a rounded or blunt trailing edge; gives their numbers.
fn cut_round(points: &mut Vec<Given>) -> Vec<usize> {
    let (tail, nose) = ends(points);
    let placing = Placing::new(nose, tail, false);
    let unit = placing.chord().recip();
    let seen = |given: &Given| (placing.place(given.point), (given.half.x + given.half.y) * unit);
    let places: Vec<(Point, f64)> = points.iter().map(seen).collect();
    let middle = furthest(points, tail).0;
    let fore: Vec<(Point, f64)> = places[..=middle].to_vec();
    let aft: Vec<(Point, f64)> = places[middle..].iter().rev().copied().collect();
    let (from_start, from_end) = (round_points(&fore), round_points(&aft));
    let kept = from_start..points.len().saturating_sub(from_end).max(from_start);
    let all = std::mem::take(points);
    points.extend(all.get(kept).unwrap_or_default());
    let mut gone: Vec<usize> = all.iter().map(|given| given.index).collect();
    gone.retain(|index| !points.iter().any(|given| given.index == *index));
    gone.dedup();
    gone
}

/// Brings the ends of the surfaces together where they have passed each other by a little, as a
/// sharp edge does that was measured or drawn by hand; gives by how much, in chords.
fn join_crossed_ends(points: &mut [Given]) -> f64 {
    let (tail, nose) = ends(points);
    let placing = Placing::new(nose, tail, false);
    if let [first, .., last] = points {
        let apart = placing.place(first.point).y - placing.place(last.point).y;
        if apart < 0.0 && apart > -CROSSED {
            (first.point, last.point) = (tail, tail);
            return -apart;
        }
    }
    0.0
}

/// How many points at the beginning of a surface, given from tail to nose with what rounding leaves
/// open of each, belong to the round.
///
/// The surface ends where it begins to turn away from its direction ahead of the edge, if it then
/// turns steeper than 45°.
fn round_points(surface: &[(Point, f64)]) -> usize {
    let zone = surface.iter().position(|(place, _)| place.x < ROUND).unwrap_or(surface.len());
    // From a point to the one behind it; nothing where rounding alone could give the direction.
    let backwards = |i: usize| {
        let ((to, open_to), (from, open_from)) = (surface[i - 1], surface[i]);
        let run = to - from;
        (run.hypot() > 4.0 * (open_to + open_from)).then_some(run)
    };
    let inner = zone.min(surface.len().saturating_sub(1));
    let steep = |run: Vec2| run.x <= run.y.abs();
    if !(1..=inner).filter_map(backwards).any(steep) {
        return 0;
    }
    let height = |x: f64| {
        let i = surface.iter().position(|(place, _)| place.x < x).unwrap_or(0).max(1);
        match (surface.get(i - 1), surface.get(i)) {
            (Some((a, _)), Some((b, _))) if a.x > b.x => b.y + (a.y - b.y) * (x - b.x) / (a.x - b.x),
            _ => f64::NAN,
        }
    };
    let direction = Vec2::new(0.075, height(0.975) - height(0.90)).atan2();
    for i in (1..=inner).rev() {
        let Some(run) = backwards(i) else { continue };
        let turned = (run.atan2() - direction).abs() > 4_f64.to_radians();
        if steep(run) || (turned && surface[i].0.x > 0.97) {
            return i;
        }
    }
    0
}

/// The nose between the points: where the parabola through five of them is furthest from the tail.
fn first_placing(points: &[Given], mirrored: bool) -> (Placing, usize) {
    let (tail, corner) = ends(points);
    let (rank, _) = furthest(points, tail);
    let mut nose = corner;
    if rank >= 1 && rank + 1 < points.len() {
        let [before, at, behind] = [points[rank - 1].point, corner, points[rank + 1].point];
        let (h, k) = (at.distance(before), behind.distance(at));
        // Divided differences of place over the length along the points.
        let first = (at - before) / h;
        let second = ((behind - at) / k - first) / (h + k);
        let place = |s: f64| before + s * first + s * (s - h) * second;
        // The furthest of it by thirds; it is one hump.
        let (mut low, mut high) = (0.0, h + k);
        for _ in 0..60 {
            let (a, b) = (low + (high - low) / 3.0, high - (high - low) / 3.0);
            if place(a).distance_squared(tail) < place(b).distance_squared(tail) { low = a } else { high = b }
        }
        let found = place(0.5 * (low + high));
        if found.is_finite() {
            nose = found;
        }
    }
    (Placing::new(nose, tail, mirrored), rank)
}

impl Arranged {
    fn refuse_bad_surfaces(&self) -> Result<(), CoordinateError> {
        let places: Vec<Point> = self.points.iter().map(|given| self.placing.place(given.point)).collect();
        let unit = self.placing.chord().recip();
        let upper: Vec<usize> = (0..=self.nose).rev().collect();
        let lower: Vec<usize> = (self.nose..self.points.len()).collect();
        for (side, ranks) in [("upper", upper), ("lower", lower)] {
            for pair in ranks.windows(2) {
                let (a, b) = (places[pair[0]], places[pair[1]]);
                let (from, to) = (&self.points[pair[0]], &self.points[pair[1]]);
                let open = (from.half + to.half) * unit;
                let (index, percent) = (to.index, 100.0 * b.x);
                // At the nose itself the order of the points is that of the file.
                if a.x.max(b.x) > 0.002 && b.x - a.x < -open.x - open.y - 1e-12 {
                    return Err(CoordinateError::TurnsBack { side, index, percent });
                }
                let rise = (b.y - a.y).abs();
                let steep = b.x - a.x < if b.x > 0.15 { rise } else { 0.2 * rise };
                if b.x > 0.05 && rise > 1e-4 + 2.0 * (open.x + open.y) && steep {
                    return Err(CoordinateError::Steps { side, index, percent });
                }
                if b.x.max(0.0).sqrt() - a.x.max(0.0).sqrt() > GAP {
                    let (first, last) = (from.index, to.index);
                    let (from, to) = (100.0 * a.x, 100.0 * b.x);
                    return Err(CoordinateError::Gap { first, last, from, to });
                }
            }
            let count = ranks.iter().skip(1).filter(|&&rank| places[rank].x <= 0.1).count();
            let first = ranks.get(1).map_or(1.0, |&rank| places[rank].x);
            if count < 2 || first > 0.05 {
                let index = self.points[self.nose].index;
                return Err(CoordinateError::NoseBare { side, count, percent: 100.0 * first, index });
            }
        }
        self.refuse_crossing(&places)
    }

    /// Both surfaces run backwards from the nose by now, so it is enough to hold each point against
    /// the other surface at its station. What rounding makes of a thin edge is no crossing.
    fn refuse_crossing(&self, places: &[Point]) -> Result<(), CoordinateError> {
        let unit = self.placing.chord().recip();
        let upper: Vec<Point> = places[..=self.nose].iter().rev().copied().collect();
        let lower = &places[self.nose..];
        for (rank, place) in places.iter().enumerate() {
            let (other, sign) = if rank < self.nose { (lower, 1.0) } else { (&upper[..], -1.0) };
            let behind = other.partition_point(|p| p.x < place.x);
            let (Some(a), Some(b)) = (behind.checked_sub(1).and_then(|i| other.get(i)), other.get(behind))
            else {
                continue;
            };
            let share = if b.x > a.x { (place.x - a.x) / (b.x - a.x) } else { 0.0 };
            let open = self.points[rank].half * unit;
            let over = sign * (place.y - a.lerp(*b, share).y);
            if place.x > 0.002 && over < -2.0 * (open.x + open.y) - 1e-9 {
                return Err(CoordinateError::Crosses {
                    index: self.points[rank].index,
                    percent: 100.0 * place.x,
                });
            }
        }
        Ok(())
    }
}
