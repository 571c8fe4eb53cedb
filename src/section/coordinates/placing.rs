//! Where a section lies in its file, and the way to unit chord and back.

use crate::geometry::{Point, Vec2};

/// Where a section lies in its file: the two ends of its chord, in the units of the file.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Placing {
    nose: Point,
    tail: Point,
    mirrored: bool,
}

impl Placing {
    /// From nose to the middle of the trailing edge; of a mirrored section in mirrored coordinates.
    pub(super) fn new(nose: Point, tail: Point, mirrored: bool) -> Self {
        Self { nose, tail, mirrored }
    }

    /// The nose in the coordinates of the file.
    #[must_use]
    pub fn nose(&self) -> Point {
        self.to_file(Point::ORIGIN)
    }

    /// The middle of the trailing edge in the coordinates of the file.
    #[must_use]
    pub fn tail(&self) -> Point {
        self.to_file(Point::new(1.0, 0.0))
    }

    /// Length of the chord in the units of the file.
    #[must_use]
    pub fn chord(&self) -> f64 {
        (self.tail - self.nose).hypot()
    }

    /// Angle of the chord against the x axis of the file, in radians, anticlockwise; of a section
    /// that was mirrored, after that.
    #[must_use]
    pub fn rotation(&self) -> f64 {
        (self.tail - self.nose).atan2()
    }

    /// Whether the nose pointed to greater x, so that the section was mirrored.
    #[must_use]
    pub fn mirrored(&self) -> bool {
        self.mirrored
    }

    /// A point of the file at unit chord: nose at the origin, trailing edge at (1, 0).
    #[must_use]
    pub fn to_chord(&self, point: Point) -> Point {
        self.place(mirror(point, self.mirrored))
    }

    /// The same of a point that was mirrored already if it has to be.
    pub(super) fn place(&self, point: Point) -> Point {
        let (from_nose, chord) = (point - self.nose, self.tail - self.nose);
        let scale = chord.hypot2().recip();
        Point::new(chord.dot(from_nose) * scale, chord.cross(from_nose) * scale)
    }

    /// A point at unit chord in the coordinates of the file.
    #[must_use]
    pub fn to_file(&self, point: Point) -> Point {
        mirror(self.unplace(point), self.mirrored)
    }

    fn unplace(&self, point: Point) -> Point {
        let chord = self.tail - self.nose;
        let across = Vec2::new(-chord.y, chord.x);
        self.nose + point.x * chord + point.y * across
    }

    /// The same with the ends of the chord moved, given at unit chord.
    pub(super) fn moved(&self, nose: Point, tail: Point) -> Self {
        Self { nose: self.unplace(nose), tail: self.unplace(tail), mirrored: self.mirrored }
    }

    /// Half a unit of the last digit in the file, seen across a direction at unit chord: how far a
    /// line that runs square to `normal` can lie from the point that was printed.
    pub(super) fn half_unit(&self, half: Vec2, normal: Vec2) -> f64 {
        let chord = self.tail - self.nose;
        let turned = normal.x * chord + normal.y * Vec2::new(-chord.y, chord.x);
        (turned.x.abs() * half.x + turned.y.abs() * half.y) / chord.hypot2()
    }
}

pub(super) fn mirror(point: Point, mirrored: bool) -> Point {
    if mirrored { Point::new(-point.x, point.y) } else { point }
}
