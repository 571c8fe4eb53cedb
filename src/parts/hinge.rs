//! Parting a foil at the hinge of its flap.

use super::{Core, Laminate, PartError};
use crate::geometry::{Affine, ArcPath, ArcVertex, Curve, Point, Vec2, follow_with_arcs};
use crate::section::Side;
use crate::wing::StationShape;

/// A hinge at one station.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Hinge {
    /// Distance of its axis from the nose along the chord, mm.
    pub at: f64,
    /// How it is made.
    pub kind: HingeKind,
    /// Greatest deflection with the trailing edge up, radians.
    pub up: f64,
    /// Greatest deflection with the trailing edge down, radians.
    pub down: f64,
    /// Laminate on the cut faces, mm.
    pub face: f64,
    /// What stays free between the two pieces throughout the travel, mm.
    pub clearance: f64,
}

/// How a hinge is made.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum HingeKind {
    /// The skin of one surface runs through and bends; the wood behind it is parted by a wedge that
    /// opens towards the other surface.
    Laminate {
        /// The surface whose skin runs through.
        side: Side,
    },
    /// A pin, a round flap nose about it, and a cove round that.
    Pin {
        /// Height of the axis between the finished surfaces: 0 in the lower one, 1 in the upper one.
        height: f64,
    },
}

/// One of the two pieces: closed outlines in the frame of the station, mm.
#[derive(Debug, Clone, PartialEq)]
pub struct Piece {
    /// The wood.
    pub core: ArcPath,
    /// With its laminate; at a laminate hinge without the skin that runs through.
    pub finished: ArcPath,
}

/// A foil in two pieces at one station.
#[derive(Debug, Clone, PartialEq)]
pub struct Split {
    /// Ahead of the hinge.
    pub main: Piece,
    /// Behind it.
    pub flap: Piece,
    /// The axis about which the flap turns.
    pub axis: Point,
    /// Least distance between the finished pieces with the flap straight, mm.
    pub gap_at_rest: f64,
    /// Least distance over the whole travel, mm.
    pub least_gap: f64,
    /// The deflection at which that is, radians, trailing edge down positive.
    pub least_gap_at: f64,
    /// Of a laminate hinge: width of the gap at the hinge and at the open surface, mm: the spacer that
    /// is laid in while the skin cures.
    pub spacer: Option<[f64; 2]>,
}

/// Steps of the travel at which the pieces are held against each other, each way.
const STEPS: usize = 24;
/// Distances are taken between chords that lie this near to the pieces, mm.
const CHORDS: f64 = 0.004;

/// Parts a station's wood, and the finished shape round it, at a hinge.
///
/// `tolerance`: greatest distance of the outlines from the exact ones, mm.
///
/// # Errors
/// When there is no wood, or the hinge lies off it.
pub fn split(core: &Core<'_>, hinge: &Hinge, tolerance: f64) -> Result<Split, PartError> {
    let (shape, laminate) = (core.shape(), core.laminate());
    let wood = follow_with_arcs(core, tolerance)?;
    let parting = match hinge.kind {
        HingeKind::Laminate { side } => wedge(shape, laminate, hinge, side, &wood, tolerance)?,
        HingeKind::Pin { height } => cove(shape, hinge, height, &wood, tolerance)?,
    };
    let Parting { main, flap, axis, spacer } = parting;
    let fixed = main.finished.flattened(CHORDS);
    let moving = flap.finished.flattened(CHORDS);
    let gap = |angle: f64| {
        // Trailing edge down is clockwise.
        let turn = Affine::rotate_about(-angle, axis);
        let turned: Vec<Point> = moving.iter().map(|p| turn * *p).collect();
        least_distance(&fixed, &turned)
    };
    let gap_at_rest = gap(0.0);
    let (mut least_gap, mut least_gap_at) = (gap_at_rest, 0.0);
    for i in 1..=STEPS {
        for end in [-hinge.up, hinge.down] {
            let angle = end * i as f64 / STEPS as f64;
            let here = gap(angle);
            if here < least_gap {
                (least_gap, least_gap_at) = (here, angle);
            }
        }
    }
    Ok(Split { main, flap, axis, gap_at_rest, least_gap, least_gap_at, spacer })
}

impl Hinge {
    /// About how far from the nose along the chord the wood of the main body ends at half its height, mm:
    /// for its stiffness, where [`split`] gives the exact outline.
    #[must_use]
    pub fn main_body_ends_at(&self, shape: &StationShape<'_>, laminate: &Laminate) -> f64 {
        let [upper, lower] = shape.roots_at(self.at).map(|root| shape.jet(root).point);
        let height = upper.distance(lower);
        let ahead = match self.kind {
            HingeKind::Laminate { side } => {
                let skin = laminate.thickness(side, shape.at, self.at, shape.chord)[0];
                let closing = if side == Side::Upper { self.down } else { self.up };
                0.5 * self.gap(skin, closing) + 0.5 * height * (0.5 * closing).tan()
            }
            HingeKind::Pin { height: share } => share.max(1.0 - share) * height + self.clearance,
        };
        self.at - ahead
    }

    /// Width of a laminate hinge's gap at the skin, which is `skin` mm thick, for a travel towards the open
    /// side.
    fn gap(&self, skin: f64, closing: f64) -> f64 {
        let (sin, cos) = (0.5 * closing).sin_cos();
        (self.clearance + skin * sin) / cos
    }
}

struct Parting {
    main: Piece,
    flap: Piece,
    axis: Point,
    spacer: Option<[f64; 2]>,
}

/// The wedge of a laminate hinge. Its faces become parallel, the clearance apart, when the flap is
/// turned all the way towards the open side: for the skin's thickness s and the travel d that way the
/// gap at the hinge is (clearance + s sin(d/2)) / cos(d/2), and the faces open by d.
fn wedge(
    shape: &StationShape<'_>,
    laminate: &Laminate,
    hinge: &Hinge,
    side: Side,
    wood: &ArcPath,
    tolerance: f64,
) -> Result<Parting, PartError> {
    let [upper, lower] = shape.roots_at(hinge.at);
    let (root, opposite) = if side == Side::Upper { (upper, lower) } else { (lower, upper) };
    let surface = shape.jet(root);
    let along = surface.tangent().ok_or(PartError::OffTheWood { at: shape.at, x: hinge.at })?;
    let inwards = along.turn_90();
    // Both surfaces are met with the trailing edge aft.
    let aft = if side == Side::Upper { -along } else { along };
    let skin = laminate.thickness(side, shape.at, hinge.at, shape.chord)[0];
    let axis = surface.point + 0.5 * skin * inwards;
    let apex = surface.point + skin * inwards;
    let closing = if side == Side::Upper { hinge.down } else { hinge.up };
    let (sin, cos) = (0.5 * closing).sin_cos();
    let gap = hinge.gap(skin, closing);

    // Square to the faces, away from the gap.
    let ahead = -cos * aft - sin * inwards;
    let behind = cos * aft - sin * inwards;
    let face = |away: Vec2, distance: f64| {
        let on = apex + 0.5 * gap * (if away.dot(aft) > 0.0 { aft } else { -aft });
        (on + distance * away, away)
    };
    let off = |_| PartError::OffTheWood { at: shape.at, x: hinge.at };
    let cut = |path: &ArcPath, away: Vec2, distance: f64| {
        let (on, inwards) = face(away, distance);
        path.cut_by_line(on, inwards).map_err(off)
    };
    // The pieces as they move against each other: all but the skin that runs through.
    let through = laminate.of_side(side);
    let bare = Core::of(shape, &through)?;
    let bare = follow_with_arcs(&bare, tolerance)?;
    let piece = |away: Vec2| {
        Ok::<_, PartError>(Piece { core: cut(wood, away, hinge.face)?, finished: cut(&bare, away, 0.0)? })
    };
    let depth = shape.jet(opposite).point.distance(apex);
    let open = gap + 2.0 * depth * (0.5 * closing).tan();
    Ok(Parting { main: piece(ahead)?, flap: piece(behind)?, axis, spacer: Some([gap, open]) })
}

/// The round flap nose of a pin hinge and the cove round it.
///
/// The nose reaches to the surface that lies further from the axis. The lips of the cove end ahead of
/// where the flap's own surfaces come to at the end of the travel.
fn cove(
    shape: &StationShape<'_>,
    hinge: &Hinge,
    height: f64,
    wood: &ArcPath,
    tolerance: f64,
) -> Result<Parting, PartError> {
    let [upper, lower] = shape.roots_at(hinge.at).map(|root| shape.jet(root).point);
    let axis = lower.lerp(upper, height);
    let nose = axis.distance(upper).max(axis.distance(lower));
    let outline = follow_with_arcs(shape, tolerance)?;
    let off = || PartError::OffTheWood { at: shape.at, x: hinge.at };

    // Ahead of a lip's end: above the axis the flap comes forward by the travel up, below it by the
    // travel down.
    let lip = |above: bool| {
        let travel = if above { hinge.up } else { hinge.down };
        let upright = if above { 1.0 } else { -1.0 };
        let (sin, cos) = travel.sin_cos();
        (Vec2::new(-sin, upright * cos), Vec2::new(-cos, -upright * sin))
    };
    let ahead = |p: Point, moved: f64| {
        let (_, square) = lip(p.y > axis.y);
        (p - axis).dot(square) - moved
    };
    let main = |path: &ArcPath, radius: f64, moved: f64| {
        let stretch =
            single(path.stretches(&|p| ahead(p, moved).min(p.distance(axis) - radius))).ok_or_else(off)?;
        // Where a lip's end meets the cove.
        let corner = |above: bool| {
            let (along, square) = lip(above);
            let reach = (radius * radius - moved * moved).max(0.0).sqrt();
            axis + moved * square + reach * along
        };
        Ok::<_, PartError>(between(&stretch, [corner(false), corner(true)], axis, radius, false))
    };
    let flap = |path: &ArcPath, radius: f64| {
        let stretch =
            single(path.stretches(&|p| (p.x - axis.x).max(radius - p.distance(axis)))).ok_or_else(off)?;
        let corner = |above: f64| axis + Vec2::new(0.0, above * radius);
        Ok::<_, PartError>(between(&stretch, [corner(1.0), corner(-1.0)], axis, radius, true))
    };
    let (cove, face) = (nose + hinge.clearance, hinge.face);
    if nose <= face || nose - face <= 0.2 {
        return Err(off());
    }
    Ok(Parting {
        main: Piece {
            core: main(wood, cove + face, hinge.clearance + face)?,
            finished: main(&outline, cove, hinge.clearance)?,
        },
        flap: Piece { core: flap(wood, nose - face)?, finished: flap(&outline, nose)? },
        axis,
        spacer: None,
    })
}

fn single(mut stretches: Vec<ArcPath>) -> Option<ArcPath> {
    let one = stretches.pop()?;
    (stretches.is_empty() && !one.is_closed()).then_some(one)
}

/// A stretch of an outline closed by an arc about the axis; where its ends lie off that circle, by
/// straight lines to the `corners` first, after its end and before its start.
fn between(stretch: &ArcPath, corners: [Point; 2], axis: Point, radius: f64, anticlockwise: bool) -> ArcPath {
    let mut vertices = stretch.vertices().to_vec();
    let on_circle = |p: Point| (p.distance(axis) - radius).abs() < 1e-3;
    if vertices.last().is_some_and(|end| !on_circle(end.point)) {
        vertices.push(ArcVertex { point: corners[0], bulge: 0.0 });
    }
    if vertices.first().is_some_and(|start| !on_circle(start.point)) {
        vertices.insert(0, ArcVertex { point: corners[1], bulge: 0.0 });
    }
    ArcPath::new(vertices, false).closed_about(axis, anticlockwise)
}

/// Least distance between the sides of two polygons; nought where they cross.
fn least_distance(a: &[Point], b: &[Point]) -> f64 {
    let sides = |points: &[Point]| -> Vec<(Point, Point)> {
        (0..points.len()).map(|i| (points[i], points[(i + 1) % points.len()])).collect()
    };
    let (a, b) = (sides(a), sides(b));
    let mut least = f64::INFINITY;
    for &(a0, a1) in &a {
        for &(b0, b1) in &b {
            // Far apart along the chord: no need to look closer.
            if a0.x.min(a1.x) - b0.x.max(b1.x) > least || b0.x.min(b1.x) - a0.x.max(a1.x) > least {
                continue;
            }
            least = least.min(between_sides(a0, a1, b0, b1));
        }
    }
    least
}

fn between_sides(a0: Point, a1: Point, b0: Point, b1: Point) -> f64 {
    let side = |p: Point, q: Point, r: Point| (q - p).cross(r - p);
    if side(a0, a1, b0) * side(a0, a1, b1) < 0.0 && side(b0, b1, a0) * side(b0, b1, a1) < 0.0 {
        return 0.0;
    }
    let to_side = |p: Point, from: Point, to: Point| {
        let chord = to - from;
        let share = ((p - from).dot(chord) / chord.hypot2().max(f64::MIN_POSITIVE)).clamp(0.0, 1.0);
        p.distance(from + share * chord)
    };
    to_side(a0, b0, b1).min(to_side(a1, b0, b1)).min(to_side(b0, a0, a1)).min(to_side(b1, a0, a1))
}
