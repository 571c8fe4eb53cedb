//! Parting a foil at the hinge of its flap.

use super::{Core, Laminate, PartError};
use crate::geometry::{Affine, ArcPath, ArcVertex, Curve, Point, Vec2, follow_with_arcs, polygon};
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
    /// The cut faces of the wood ahead of the hinge and behind it, as lines of short chords.
    pub faces: [Vec<Point>; 2],
    /// Least distance between the finished pieces with the flap straight, mm.
    pub gap_at_rest: f64,
    /// The same with the flap all the way up and all the way down.
    pub gap_at_full: [f64; 2],
    /// How far the flap turns up and down before the gap is less than the clearance, radians; the travel
    /// where it never is.
    pub free_travel: [f64; 2],
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

/// What the outlines of flap and main body may take of the clearance, mm: each is followed with arcs.
pub const GAP_SLACK: f64 = 0.03;

/// Parts a station's wood, and the finished shape round it, at a hinge.
///
/// `tolerance`: greatest distance of the outlines from the exact ones, mm.
///
/// # Errors
/// When there is no wood, or the hinge lies off it; then with the nearest place at which it does not.
pub fn split(core: &Core<'_>, hinge: &Hinge, tolerance: f64) -> Result<Split, PartError> {
    let wood = follow_with_arcs(core, tolerance)?;
    let Parting { main, flap, axis, spacer } =
        part(core, &wood, hinge, tolerance).map_err(|error| match error {
            PartError::OffTheWood { at, x, .. } => {
                let works = nearest_that_works(core, &wood, hinge, tolerance);
                PartError::OffTheWood { at, x, works }
            }
            other => other,
        })?;
    let faces = [&main.core, &flap.core].map(|piece| cut_face(piece, &wood, tolerance));
    let split = Split {
        main,
        flap,
        axis,
        faces,
        gap_at_rest: 0.0,
        gap_at_full: [0.0; 2],
        free_travel: [0.0; 2],
        least_gap: 0.0,
        least_gap_at: 0.0,
        spacer,
    };
    Ok(split.turned_about(axis, hinge))
}

/// The nearest place for a hinge, in steps of a hundredth of the chord, that leaves wood on both sides.
fn nearest_that_works(core: &Core<'_>, wood: &ArcPath, hinge: &Hinge, tolerance: f64) -> Option<f64> {
    let step = 0.01 * core.shape().chord;
    let mut places = (1..=60).flat_map(|i| [-1.0, 1.0].map(|way| hinge.at + way * f64::from(i) * step));
    places.find(|&at| {
        (0.0..core.shape().chord).contains(&at)
            && part(core, wood, &Hinge { at, ..*hinge }, tolerance).is_ok()
    })
}

fn part(core: &Core<'_>, wood: &ArcPath, hinge: &Hinge, tolerance: f64) -> Result<Parting, PartError> {
    let (shape, laminate) = (core.shape(), core.laminate());
    match hinge.kind {
        HingeKind::Laminate { side } => wedge(shape, laminate, hinge, side, wood, tolerance),
        HingeKind::Pin { height } => cove(shape, hinge, height, wood, tolerance),
    }
}

/// The part of a piece's outline that does not lie on that of the whole.
fn cut_face(piece: &ArcPath, whole: &ArcPath, tolerance: f64) -> Vec<Point> {
    let vertices = piece.vertices();
    let segment = |i: usize| {
        let end = vertices[(i + 1) % vertices.len()].point;
        ArcPath::new(vec![vertices[i], ArcVertex { point: end, bulge: 0.0 }], false).flattened(CHORDS)
    };
    let is_cut = |i: usize| {
        let points = segment(i);
        let middle = points[points.len() / 2].midpoint(points[(points.len() - 1) / 2]);
        whole.distance(middle) > 2.0 * tolerance
    };
    (0..vertices.len()).filter(|&i| is_cut(i)).flat_map(segment).collect()
}

impl Split {
    /// The same pieces, their gaps taken with the flap turning about `pivot`: where the line through the
    /// axes at both ends of the flap passes this station.
    #[must_use]
    pub fn turned_about(mut self, pivot: Point, hinge: &Hinge) -> Self {
        let fixed = self.main.finished.flattened(CHORDS);
        let moving = self.flap.finished.flattened(CHORDS);
        let gap = |angle: f64| {
            // Trailing edge down is clockwise.
            let turn = Affine::rotate_about(-angle, pivot);
            let turned: Vec<Point> = moving.iter().map(|p| turn * *p).collect();
            polygon::least_distance(&fixed, &turned)
        };
        self.gap_at_rest = gap(0.0);
        (self.least_gap, self.least_gap_at) = (self.gap_at_rest, 0.0);
        for (way, end) in [-hinge.up, hinge.down].into_iter().enumerate() {
            let (mut free, mut is_free) = (0.0, self.gap_at_rest >= hinge.clearance - GAP_SLACK);
            for i in 1..=STEPS {
                let angle = end * i as f64 / STEPS as f64;
                let here = gap(angle);
                if here < self.least_gap {
                    (self.least_gap, self.least_gap_at) = (here, angle);
                }
                is_free &= here >= hinge.clearance - GAP_SLACK;
                if is_free {
                    free = angle.abs();
                }
                self.gap_at_full[way] = here;
            }
            self.free_travel[way] = if end == 0.0 { 0.0 } else { free };
        }
        self
    }
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
    let along = surface.tangent().ok_or(PartError::OffTheWood { at: shape.at, x: hinge.at, works: None })?;
    let inwards = along.turn_90();
    // Both surfaces are met with the trailing edge aft.
    let aft = if side == Side::Upper { -along } else { along };
    let skin = laminate.thickness(side, shape.at, hinge.at, shape.chord)[0];
    let axis = hinge.axis(shape, laminate);
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
    let off = |_| PartError::OffTheWood { at: shape.at, x: hinge.at, works: None };
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
    let off = || PartError::OffTheWood { at: shape.at, x: hinge.at, works: None };

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
