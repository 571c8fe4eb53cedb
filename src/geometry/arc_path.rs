//! Paths of lines and circular arcs: what a router follows and a drawing shows.

use kurbo::{Affine, BezPath, Point, Rect, Vec2};

use super::GeometryError;

/// Greatest error of an offset that is let through, mm.
const OFFSET_ERROR: f64 = 1e-3;

/// Epsilons (position, length) for the offset library, finest first, mm. No one pair serves every
/// contour: coarse ones lose fine polygons, fine ones fail on the rounding of near-flat arcs, both
/// without a word. So each result is held against its distance, and the next pair tried.
const OFFSET_EPSILONS: [[f64; 2]; 4] = [[1e-8, 1e-6], [1e-7, 1e-5], [1e-6, 1e-4], [1e-5, 1e-4]];

/// A corner of a path and the segment that leaves it.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct ArcVertex {
    /// Where the segment starts.
    pub point: Point,
    /// Tangent of a quarter of the segment's included angle: positive where it turns
    /// anticlockwise, zero for a line, one for a half circle.
    pub bulge: f64,
}

/// A path of lines and arcs, in millimetres. When closed, the last segment returns to the first
/// vertex. Outside contours run anticlockwise.
#[derive(Debug, Clone, PartialEq)]
pub struct ArcPath {
    vertices: Vec<ArcVertex>,
    closed: bool,
}

/// One segment of a path.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Segment {
    /// Start.
    pub from: Point,
    /// End.
    pub to: Point,
    /// See [`ArcVertex::bulge`].
    pub bulge: f64,
}

impl ArcPath {
    /// A path from its vertices. The last vertex of an open path carries no segment.
    #[must_use]
    pub fn new(vertices: Vec<ArcVertex>, closed: bool) -> Self {
        Self { vertices, closed }
    }

    /// A path of straight lines.
    #[must_use]
    pub fn polyline(points: impl IntoIterator<Item = Point>, closed: bool) -> Self {
        Self::new(points.into_iter().map(|point| ArcVertex { point, bulge: 0.0 }).collect(), closed)
    }

    /// A straight line.
    #[must_use]
    pub fn line(from: Point, to: Point) -> Self {
        Self::polyline([from, to], false)
    }

    /// The vertices.
    #[must_use]
    pub fn vertices(&self) -> &[ArcVertex] {
        &self.vertices
    }

    /// Whether the path returns to its start.
    #[must_use]
    pub fn is_closed(&self) -> bool {
        self.closed
    }

    /// The segments in order.
    pub fn segments(&self) -> impl Iterator<Item = Segment> + '_ {
        let count = self.vertices.len();
        let last = if self.closed { count } else { count.saturating_sub(1) };
        (0..last).map(move |i| Segment {
            from: self.vertices[i].point,
            to: self.vertices[(i + 1) % count].point,
            bulge: self.vertices[i].bulge,
        })
    }

    /// The path moved by a rotation, shift or reflection.
    #[must_use]
    pub fn transformed(&self, by: Affine) -> Self {
        let turn = by.determinant().signum();
        let vertices =
            self.vertices.iter().map(|v| ArcVertex { point: by * v.point, bulge: v.bulge * turn }).collect();
        Self { vertices, closed: self.closed }
    }

    /// The path walked anticlockwise, if it is closed.
    #[must_use]
    pub fn anticlockwise(self) -> Self {
        if !self.closed || self.area() >= 0.0 {
            return self;
        }
        // A segment's bulge goes with the vertex that it now leaves.
        let backwards = self.vertices.iter().rev();
        let leaving = backwards.clone().skip(1).chain(backwards.clone().take(1));
        let vertices =
            backwards.zip(leaving).map(|(v, next)| ArcVertex { point: v.point, bulge: -next.bulge });
        Self { vertices: vertices.collect(), closed: true }
    }

    /// Signed area of a closed path in mm², positive when it runs anticlockwise.
    #[must_use]
    pub fn area(&self) -> f64 {
        self.segments().map(|s| 0.5 * s.from.to_vec2().cross(s.to.to_vec2()) + s.cap_area()).sum()
    }

    /// The smallest upright rectangle round the path, arcs included.
    #[must_use]
    pub fn bounds(&self) -> Rect {
        let first = self.vertices.first().map_or(Point::ORIGIN, |v| v.point);
        let mut bounds = Rect::from_points(first, first);
        for segment in self.segments() {
            bounds = bounds.union_pt(segment.from).union_pt(segment.to);
            if let Some(arc) = segment.arc() {
                for quarter in 0..4 {
                    let direction = Vec2::from_angle(f64::from(quarter) * std::f64::consts::FRAC_PI_2);
                    let extreme = arc.centre + arc.radius * direction;
                    if arc.faces(direction) {
                        bounds = bounds.union_pt(extreme);
                    }
                }
            }
        }
        bounds
    }

    /// Points along the path such that the chords between them lie within `tolerance` mm of it;
    /// the end of a closed path is not repeated.
    #[must_use]
    pub fn flattened(&self, tolerance: f64) -> Vec<Point> {
        let mut points = Vec::new();
        for segment in self.segments() {
            let steps = segment.steps(tolerance);
            points.extend((0..steps).map(|i| segment.at(i as f64 / steps as f64)));
        }
        if !self.closed {
            points.extend(self.vertices.last().map(|v| v.point));
        }
        points
    }

    /// Distance from a point to the nearest place on the path.
    #[must_use]
    pub fn distance(&self, point: Point) -> f64 {
        self.segments().map(|s| s.distance(point)).fold(f64::INFINITY, f64::min)
    }

    /// The closed path moved outwards by `distance` (inwards when negative), folds trimmed.
    /// Convex corners become arcs, so the result keeps that distance everywhere.
    ///
    /// # Errors
    /// When the result is not exactly one contour, or strays from the distance asked.
    pub fn offset(&self, distance: f64) -> Result<Self, GeometryError> {
        let mut failure = GeometryError::Offset { distance, pieces: 0 };
        for epsilons in OFFSET_EPSILONS {
            match self.offset_once(distance, epsilons) {
                Ok(moved) => return Ok(moved),
                Err(error) => failure = error,
            }
        }
        Err(failure)
    }

    /// The offset with one choice of the library's epsilons, held against the distance asked.
    fn offset_once(&self, distance: f64, [position, length]: [f64; 2]) -> Result<Self, GeometryError> {
        use cavalier_contours::polyline::{PlineOffsetOptions, PlineSource, PlineSourceMut, Polyline};
        let mut line = Polyline::new_closed();
        for vertex in &self.vertices {
            line.add(vertex.point.x, vertex.point.y, vertex.bulge);
        }
        let options =
            PlineOffsetOptions { pos_equal_eps: position, offset_dist_eps: length, ..Default::default() };
        // Its positive side is to the left, which is inwards for an anticlockwise contour.
        let inwards = -distance * self.area().signum();
        let results = line.parallel_offset_opt(inwards, &options);
        let [single] = results.as_slice() else {
            return Err(GeometryError::Offset { distance, pieces: results.len() });
        };
        let vertices = single
            .iter_vertexes()
            .map(|v| ArcVertex { point: Point::new(v.x, v.y), bulge: v.bulge })
            .collect();
        let moved = Self { vertices, closed: true };
        for segment in moved.segments() {
            let found = self.distance(segment.at(0.5));
            if (found - distance.abs()).abs() > OFFSET_ERROR {
                return Err(GeometryError::OffsetStrays { distance, found });
            }
        }
        Ok(moved)
    }

    /// The path as kurbo draws it, arcs as cubics within `tolerance` mm.
    #[must_use]
    pub fn to_bezier(&self, tolerance: f64) -> BezPath {
        let mut path = BezPath::new();
        if let Some(first) = self.vertices.first() {
            path.move_to(first.point);
        }
        for segment in self.segments() {
            match segment.arc() {
                Some(arc) => {
                    let drawn = kurbo::Arc::new(
                        arc.centre,
                        (arc.radius, arc.radius),
                        arc.start_angle,
                        arc.sweep,
                        0.0,
                    );
                    drawn.to_cubic_beziers(tolerance, |a, b, c| path.curve_to(a, b, c));
                }
                None => path.line_to(segment.to),
            }
        }
        if self.closed {
            path.close_path();
        }
        path
    }

    /// Refuses a closed path that crosses or touches itself, checked on chords within `tolerance`.
    ///
    /// # Errors
    /// With the place where it does.
    pub fn refuse_crossings(&self, tolerance: f64) -> Result<(), GeometryError> {
        super::polygon::refuse_crossings(&self.flattened(tolerance))
    }
}

/// The circle of an arc segment.
#[derive(Debug, Clone, Copy)]
pub(crate) struct ArcShape {
    pub(crate) centre: Point,
    pub(crate) radius: f64,
    pub(crate) start_angle: f64,
    /// Included angle, anticlockwise positive.
    pub(crate) sweep: f64,
}

impl ArcShape {
    /// Whether the ray from the centre along `direction` meets the arc.
    fn faces(&self, direction: Vec2) -> bool {
        let turn = (direction.angle() - self.start_angle) * self.sweep.signum();
        turn.rem_euclid(std::f64::consts::TAU) <= self.sweep.abs()
    }
}

impl Segment {
    pub(crate) fn arc(&self) -> Option<ArcShape> {
        let chord = self.to - self.from;
        // A sagitta below a tenth of a nanometre is a line to every reader of our files.
        if self.bulge.abs() * chord.hypot() < 1e-7 {
            return None;
        }
        let b = self.bulge;
        let to_centre = 0.25 * (1.0 / b - b);
        let centre = self.from.midpoint(self.to) + to_centre * Vec2::new(-chord.y, chord.x);
        Some(ArcShape {
            centre,
            radius: chord.hypot() * (1.0 + b * b) / (4.0 * b.abs()),
            start_angle: (self.from - centre).angle(),
            sweep: 4.0 * b.atan(),
        })
    }

    /// Radius of the arc in mm; `None` for a line.
    #[must_use]
    pub fn radius(&self) -> Option<f64> {
        self.arc().map(|arc| arc.radius)
    }

    /// Length along the segment, mm.
    #[must_use]
    pub fn length(&self) -> f64 {
        self.arc().map_or_else(|| self.from.distance(self.to), |arc| arc.radius * arc.sweep.abs())
    }

    /// The place at a fraction of its length.
    #[must_use]
    pub fn at(&self, fraction: f64) -> Point {
        match self.arc() {
            Some(_) if fraction <= 0.0 => self.from,
            Some(arc) => arc.centre + arc.radius * Vec2::from_angle(arc.start_angle + fraction * arc.sweep),
            None => self.from.lerp(self.to, fraction),
        }
    }

    /// Unit direction at a fraction of its length.
    #[must_use]
    pub fn direction(&self, fraction: f64) -> Vec2 {
        let chord = (self.to - self.from).angle();
        // It turns by four times the arc tangent of the bulge, evenly about the chord.
        Vec2::from_angle(chord + (4.0 * fraction - 2.0) * self.bulge.atan())
    }

    fn steps(&self, tolerance: f64) -> usize {
        self.arc().map_or(1, |arc| {
            let half_step = (1.0 - (tolerance / arc.radius).min(1.0)).acos();
            ((arc.sweep.abs() / (2.0 * half_step)).ceil() as usize).max(1)
        })
    }

    /// Area between the arc and its chord, signed like the bulge.
    fn cap_area(&self) -> f64 {
        self.arc().map_or(0.0, |arc| 0.5 * arc.radius * arc.radius * (arc.sweep - arc.sweep.sin()))
    }

    pub(crate) fn distance(&self, point: Point) -> f64 {
        if let Some(arc) = self.arc() {
            let out = point - arc.centre;
            if arc.faces(out) {
                return (out.hypot() - arc.radius).abs();
            }
            return point.distance(self.from).min(point.distance(self.to));
        }
        point.distance(super::polygon::nearest_between(self.from, self.to, point))
    }
}
