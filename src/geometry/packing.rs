//! Laying rectangles out on sheets.
//!
//! Skyline packing: each sheet is a line of steps, and a piece goes where its upper edge comes lowest.
//! Source: the bottom-left rule after Baker, Coffman and Rivest, "Orthogonal packings in two
//! dimensions", SIAM Journal on Computing 9 (1980); from memory. The packing crates at hand are for
//! pictures in whole pixels.

use kurbo::Point;

/// Where a piece lies.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Place {
    /// Which sheet, counted from nought.
    pub sheet: usize,
    /// Its lower left corner there.
    pub corner: Point,
    /// Whether it is turned by a quarter.
    pub is_turned: bool,
}

/// Lays pieces out on as few sheets of one size as are found; nothing for a piece that goes on none.
///
/// `sizes`: width and height of each piece. `gap`: kept free between two pieces. `may_turn`: whether a
/// piece may be turned by a quarter. Several orders are tried, and the one that takes the fewest sheets
/// and least of the last one is kept.
#[must_use]
pub fn packed(sizes: &[[f64; 2]], room: [f64; 2], gap: f64, may_turn: bool) -> Vec<Option<Place>> {
    type Rank = fn([f64; 2]) -> f64;
    let orders: [Rank; 3] = [|[_, height]| height, |[width, height]| width * height, |[width, _]| width];
    let layouts = orders.map(|rank| {
        let mut order: Vec<usize> = (0..sizes.len()).collect();
        order.sort_by(|&a, &b| rank(sizes[b]).total_cmp(&rank(sizes[a])));
        in_order(&order, sizes, room, gap, may_turn)
    });
    let cost = |(_, sheets): &(Vec<Option<Place>>, Vec<Skyline>)| {
        let last = sheets.last().map_or(0.0, Skyline::height);
        (sheets.len(), last)
    };
    layouts
        .into_iter()
        .min_by(|a, b| {
            let ((sheets_a, last_a), (sheets_b, last_b)) = (cost(a), cost(b));
            sheets_a.cmp(&sheets_b).then(last_a.total_cmp(&last_b))
        })
        .map_or(Vec::new(), |(places, _)| places)
}

fn in_order(
    order: &[usize],
    sizes: &[[f64; 2]],
    room: [f64; 2],
    gap: f64,
    may_turn: bool,
) -> (Vec<Option<Place>>, Vec<Skyline>) {
    // With the gap on two sides of every piece and of the room, only pieces need be kept apart.
    let room = room.map(|side| side + gap);
    let (mut places, mut sheets) = (vec![None; sizes.len()], Vec::<Skyline>::new());
    for &i in order {
        let [width, height] = sizes[i].map(|side| side + gap);
        let ways: &[bool] = if may_turn { &[false, true] } else { &[false] };
        let size = |turned: bool| if turned { [height, width] } else { [width, height] };
        let fits = |turned: &&bool| {
            let [w, h] = size(**turned);
            w <= room[0] + HAIR && h <= room[1] + HAIR
        };
        if !ways.iter().any(|turned| fits(&turned)) {
            continue;
        }
        let known = (0..sheets.len()).find_map(|sheet| {
            let found =
                ways.iter().filter_map(|&turned| Some((sheets[sheet].lowest(size(turned), room)?, turned)));
            let best = found.min_by(|(a, _), (b, _)| a.y.total_cmp(&b.y).then(a.x.total_cmp(&b.x)))?;
            Some((sheet, best))
        });
        let (sheet, (corner, is_turned)) = known.unwrap_or_else(|| {
            sheets.push(Skyline::flat(room[0]));
            let turned = ways.iter().find(fits).copied().unwrap_or(false);
            (sheets.len() - 1, (Point::ORIGIN, turned))
        });
        sheets[sheet].raise(corner, size(is_turned));
        places[i] = Some(Place { sheet, corner, is_turned });
    }
    (places, sheets)
}

/// What rounding may add to a length, mm.
const HAIR: f64 = 1e-9;

/// The upper edge of what lies on a sheet: steps from left to right, each with its start and height.
struct Skyline {
    steps: Vec<Point>,
    width: f64,
}

impl Skyline {
    fn flat(width: f64) -> Self {
        Self { steps: vec![Point::ORIGIN], width }
    }

    fn height(&self) -> f64 {
        self.steps.iter().map(|step| step.y).fold(0.0, f64::max)
    }

    fn end(&self, i: usize) -> f64 {
        self.steps.get(i + 1).map_or(self.width, |step| step.x)
    }

    /// The lowest corner, and of those the leftmost, at which a piece lies within the room.
    fn lowest(&self, [width, height]: [f64; 2], room: [f64; 2]) -> Option<Point> {
        let at = |i: usize| {
            let x = self.steps[i].x;
            if x + width > room[0] + HAIR {
                return None;
            }
            let under = (i..self.steps.len()).take_while(|&j| self.steps[j].x < x + width - HAIR);
            let y = under.map(|j| self.steps[j].y).fold(0.0, f64::max);
            (y + height <= room[1] + HAIR).then_some(Point::new(x, y))
        };
        (0..self.steps.len()).filter_map(at).min_by(|a, b| a.y.total_cmp(&b.y).then(a.x.total_cmp(&b.x)))
    }

    /// Puts a piece on it.
    fn raise(&mut self, corner: Point, [width, height]: [f64; 2]) {
        let (from, to) = (corner.x, corner.x + width);
        let mut steps: Vec<Point> = self.steps.iter().copied().filter(|step| step.x < from - HAIR).collect();
        steps.push(Point::new(from, corner.y + height));
        // What is left of the step that the piece ends over, and those behind it.
        let last = (0..self.steps.len())
            .filter(|&i| self.end(i) > to + HAIR)
            .find(|&i| self.steps[i].x <= to + HAIR);
        if let Some(i) = last {
            steps.push(Point::new(to, self.steps[i].y));
            steps.extend(self.steps.iter().copied().filter(|step| step.x > to + HAIR));
        }
        self.steps = steps;
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn rectangle(place: Place, [width, height]: [f64; 2]) -> kurbo::Rect {
        let size = if place.is_turned { (height, width) } else { (width, height) };
        kurbo::Rect::from_origin_size(place.corner, size)
    }

    #[test]
    fn pieces_keep_apart_and_on_their_sheets() {
        let mut random = 7_u32;
        let mut side = |most: f64| {
            // Numerical Recipes' generator, enough to shuffle sizes.
            random = random.wrapping_mul(1_664_525).wrapping_add(1_013_904_223);
            5.0 + most * f64::from(random >> 8) / f64::from(1_u32 << 24)
        };
        let sizes: Vec<[f64; 2]> = (0..60).map(|_| [side(180.0), side(60.0)]).collect();
        for may_turn in [false, true] {
            let room = [400.0, 250.0];
            let places = packed(&sizes, room, 8.0, may_turn);
            let laid: Vec<_> = places
                .iter()
                .zip(&sizes)
                .map(|(place, size)| place.map(|p| (p.sheet, rectangle(p, *size))).expect("it fits"))
                .collect();
            let area: f64 = sizes.iter().map(|[w, h]| w * h).sum();
            let sheets = laid.iter().map(|(sheet, _)| sheet + 1).max().expect("sheets");
            // Nothing goes on fewer sheets than its area takes; shelves for such pieces waste less than half.
            assert!(
                sheets as f64 >= area / (room[0] * room[1])
                    && (sheets as f64) < 2.0 * area / (room[0] * room[1]) + 1.0
            );
            for (i, (sheet, a)) in laid.iter().enumerate() {
                assert!(
                    a.x0 >= 0.0 && a.y0 >= 0.0 && a.x1 <= room[0] + 1e-6 && a.y1 <= room[1] + 1e-6,
                    "{a:?}"
                );
                for (_, b) in laid.iter().skip(i + 1).filter(|(other, _)| other == sheet) {
                    let apart = (b.x0 - a.x1).max(a.x0 - b.x1).max(b.y0 - a.y1).max(a.y0 - b.y1);
                    assert!(apart >= 8.0 - 1e-6, "{a:?} {b:?}");
                }
            }
        }
    }

    #[test]
    fn what_is_too_large_is_left_and_what_just_fits_is_not() {
        let places = packed(&[[100.0, 50.0], [101.0, 10.0], [10.0, 100.0]], [100.0, 50.0], 5.0, false);
        assert!(places[0].is_some() && places[1].is_none() && places[2].is_none());
        assert!(packed(&[[10.0, 100.0]], [100.0, 50.0], 5.0, true)[0].is_some_and(|place| place.is_turned));
        assert!(packed(&[], [100.0, 50.0], 5.0, true).is_empty());
    }
}
