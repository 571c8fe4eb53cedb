//! Drawings made ready for a router: corners relieved, the cutter's radius set off, tabs marked, and
//! where the cutter does not reach.

use super::{Drawing, Line, Role};
use crate::geometry::{ArcPath, ArcVertex, GeometryError, Point, Vec2, polygon};

/// How a router is told what to cut, millimetres.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct RouterSettings {
    /// Diameter of the cutter.
    pub cutter: f64,
    /// Whether contours are the path of the cutter's middle instead of the line of the piece.
    pub is_path: bool,
    /// What is done about the inner corners that a round cutter leaves.
    pub corners: Corners,
    /// Holding tabs on each outside contour.
    pub tabs: usize,
    /// Length of a tab along the contour.
    pub tab_width: f64,
}

/// What is done about the inner corners of pockets and slots.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
pub enum Corners {
    /// Nothing: they are cut out by hand.
    Sharp,
    /// A round of the cutter's radius through the corner, along its bisector.
    DogBone,
    /// The same into the end wall, so that the side walls stay whole.
    TBone,
}

impl Corners {
    /// The words of the design file for them.
    pub const WORDS: &'static [&'static str] = &["sharp", "dog-bone", "t-bone"];

    /// The choice of a word of the design file.
    #[must_use]
    pub fn from_word(word: &str) -> Option<Self> {
        let all = [Self::Sharp, Self::DogBone, Self::TBone];
        all.into_iter().zip(Self::WORDS).find(|(_, known)| **known == word).map(|(corners, _)| corners)
    }
}

/// Tabs take at most this share of a contour.
const MOST_TABS: f64 = 0.25;
/// How near chords lie to an outline to tell what lies within it, and how near two contours touch, mm.
const FLAT: f64 = 0.01;
/// A corner that turns less than this is a rounding of its neighbours, radians.
const CORNER: f64 = 0.02;

/// The drawing as the router is to have it.
///
/// # Errors
/// When a contour cannot be moved out by the cutter's radius.
pub fn routed(drawing: &Drawing, settings: RouterSettings) -> Result<Drawing, GeometryError> {
    let radius = 0.5 * settings.cutter;
    let mut ready = Drawing { lines: Vec::new(), ..drawing.clone() };
    let is_inner = |corner: Point, own: &ArcPath| inner_corner(drawing, corner, own);
    for Line { role, path } in &drawing.lines {
        let mut path = path.clone();
        if matches!(role, Role::CutInside | Role::Pocket(_)) {
            path = relieved(&path, settings.corners, radius, &is_inner);
        }
        if *role == Role::CutInside && is_drilled(&path, settings.cutter) {
            ready.add(Role::Drill, path);
            continue;
        }
        if settings.is_path {
            path = match role {
                Role::CutOutside => path.offset(radius)?,
                // Where the cutter does not go in, the line stays, and a check tells so.
                Role::CutInside => path.offset(-radius).unwrap_or(path),
                _ => path,
            };
        }
        if *role == Role::CutOutside {
            for tab in tabs(&path, settings) {
                ready.add(Role::Tab, tab);
            }
        }
        ready.add(*role, path);
    }
    Ok(ready)
}

/// Whether an inside contour is a round hole that the cutter fills: it is drilled.
fn is_drilled(path: &ArcPath, cutter: f64) -> bool {
    round_hole(path).is_some_and(|radius| 2.0 * radius <= cutter)
}

/// Radius of a contour that is a circle.
fn round_hole(path: &ArcPath) -> Option<f64> {
    let mut radii = path.segments().map(|segment| segment.radius().filter(|_| segment.bulge > 0.0));
    let first = radii.next()??;
    radii.all(|radius| radius.is_some_and(|r| (r - first).abs() < 1e-6)).then_some(first)
}

/// Whether a corner of what is taken out lies in the piece: not where a slot stands proud of it or opens
/// its edge, nor where one pocket runs on in another, as at the root of a mirrored foil.
fn inner_corner(drawing: &Drawing, corner: Point, own: &ArcPath) -> bool {
    let of = |line: &&Line| matches!(line.role, Role::CutInside | Role::Pocket(_)) && line.path != *own;
    let runs_on = drawing.lines.iter().filter(of).any(|line| line.path.distance(corner) < FLAT);
    let mut outside = drawing.lines.iter().filter(|line| line.role == Role::CutOutside);
    let is_in = |line: &Line| {
        polygon::contains(&line.path.flattened(FLAT), corner) && line.path.distance(corner) > 2.0 * FLAT
    };
    !runs_on && outside.any(is_in)
}

/// The contour of what is taken out, anticlockwise, with its inner corners between straight sides
/// relieved.
fn relieved(
    path: &ArcPath,
    corners: Corners,
    radius: f64,
    is_inner: &dyn Fn(Point, &ArcPath) -> bool,
) -> ArcPath {
    if corners == Corners::Sharp {
        return path.clone();
    }
    let vertices = path.vertices();
    let count = vertices.len();
    let mut relieved = Vec::new();
    for (i, vertex) in vertices.iter().enumerate() {
        let before = vertices[(i + count - 1) % count];
        let after = vertices[(i + 1) % count];
        let (arrives, leaves) = (vertex.point - before.point, after.point - vertex.point);
        let turn = arrives.cross(leaves).atan2(arrives.dot(leaves));
        let is_straight = before.bulge == 0.0 && vertex.bulge == 0.0;
        if !is_straight || turn < CORNER || !is_inner(vertex.point, path) {
            relieved.push(*vertex);
            continue;
        }
        relieved.extend(match corners {
            Corners::TBone => t_bone(vertex.point, [arrives, leaves], radius),
            _ => dog_bone(vertex.point, [arrives, leaves], turn, radius),
        });
    }
    ArcPath::new(relieved, true)
}

/// A circle through the corner with its centre on the bisector: the two sides meet it at 2 r cos(θ/2)
/// from the corner, θ being the angle between them, and the arc between them spans 2 π - 2 θ.
fn dog_bone(corner: Point, [arrives, leaves]: [Vec2; 2], turn: f64, radius: f64) -> Vec<ArcVertex> {
    let inside = std::f64::consts::PI - turn;
    let reach = 2.0 * radius * (0.5 * inside).cos();
    let bulge = (0.5 * (std::f64::consts::PI - inside)).tan();
    vec![
        ArcVertex { point: corner - reach * arrives.normalize(), bulge },
        ArcVertex { point: corner + reach * leaves.normalize(), bulge: 0.0 },
    ]
}

/// A half round beyond the shorter side, touching the longer one in the corner.
fn t_bone(corner: Point, [arrives, leaves]: [Vec2; 2], radius: f64) -> Vec<ArcVertex> {
    let ends = if arrives.hypot() >= leaves.hypot() {
        [corner, corner + 2.0 * radius * leaves.normalize()]
    } else {
        [corner - 2.0 * radius * arrives.normalize(), corner]
    };
    vec![ArcVertex { point: ends[0], bulge: 1.0 }, ArcVertex { point: ends[1], bulge: 0.0 }]
}

/// Stretches of an outside contour at which the cutter is to be lifted, evenly along it: away from the
/// trailing edge, where it begins, and from the nose, half way round.
fn tabs(path: &ArcPath, settings: RouterSettings) -> Vec<ArcPath> {
    let length: f64 = path.segments().map(|segment| segment.length()).sum();
    let most = (MOST_TABS * length / settings.tab_width) as usize;
    let count = settings.tabs.min(most);
    let first = if count.is_multiple_of(2) { 0.5 } else { 0.25 };
    let middle = |i: usize| length * (i as f64 + first) / count as f64;
    (0..count)
        .map(|i| path.part(middle(i) - 0.5 * settings.tab_width, middle(i) + 0.5 * settings.tab_width))
        .collect()
}

/// The tightest inside radius of a contour, mm, and where it is; nought at a corner.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct InsideRadius {
    /// The radius.
    pub radius: f64,
    /// Where.
    pub at: Point,
}

/// The tightest hollow of a closed contour that runs anticlockwise and is cut outside; `None` where it
/// bulges everywhere.
#[must_use]
pub fn tightest_inside(path: &ArcPath) -> Option<InsideRadius> {
    let segments: Vec<_> = path.segments().collect();
    let arcs = segments.iter().filter(|s| s.bulge < 0.0);
    let arcs = arcs.filter_map(|s| Some(InsideRadius { radius: s.radius()?, at: s.at(0.5) }));
    let corners = segments.iter().zip(segments.iter().cycle().skip(1)).filter_map(|(a, b)| {
        let (arrives, leaves) = (a.direction(1.0), b.direction(0.0));
        let turn = arrives.cross(leaves).atan2(arrives.dot(leaves));
        (turn < -CORNER).then_some(InsideRadius { radius: 0.0, at: b.from })
    });
    arcs.chain(corners).min_by(|a, b| a.radius.total_cmp(&b.radius))
}
