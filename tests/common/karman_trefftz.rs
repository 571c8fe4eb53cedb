//! Exact potential flow about the sections of von Kármán and Trefftz.

#![allow(dead_code, reason = "each test file uses its own part")]

use std::f64::consts::TAU;

use plankform::flow::Panelling;
use plankform::geometry::Point;

/// An exact section as `theory.toml` describes it.
pub(crate) struct KarmanTrefftz {
    pub(crate) mu: [f64; 2],
    pub(crate) power: f64,
    pub(crate) nose: f64,
    pub(crate) chord: f64,
}

impl KarmanTrefftz {
    pub(crate) fn radius(&self) -> f64 {
        (1.0 - self.mu[0]).hypot(self.mu[1])
    }

    pub(crate) fn beta(&self) -> f64 {
        (self.mu[1] / self.radius()).asin()
    }

    /// Point of the section and the modulus of dz/dζ at an angle on the circle.
    pub(crate) fn map(&self, theta: f64) -> (Point, f64) {
        let (re, im) = (self.mu[0] + self.radius() * theta.cos(), self.mu[1] + self.radius() * theta.sin());
        let modulus = (re - 1.0).hypot(im) / (re + 1.0).hypot(im);
        let argument = im.atan2(re - 1.0) - im.atan2(re + 1.0);
        let (size, angle) = (modulus.powf(self.power), self.power * argument);
        let (a, b) = (size * angle.cos(), size * angle.sin());
        // n (1 + rⁿ)/(1 - rⁿ)
        let below = (1.0 - a).powi(2) + b * b;
        let z = Point::new(self.power * (1.0 - a * a - b * b) / below, self.power * 2.0 * b / below);
        let slope = 4.0 * self.power.powi(2) * modulus.powf(self.power - 1.0)
            / (below * ((re + 1.0).powi(2) + im * im));
        (Point::new((z.x - self.nose) / self.chord, z.y / self.chord), slope)
    }

    pub(crate) fn cp(&self, theta: f64, incidence: f64) -> f64 {
        let circulation = 2.0 * (incidence + self.beta()).sin();
        1.0 - ((2.0 * (theta - incidence).sin() + circulation) / self.map(theta).1).powi(2)
    }

    /// Angle on the circle of a node of so many panels, from the trailing edge.
    pub(crate) fn angle(&self, i: usize, panels: usize) -> f64 {
        TAU * i as f64 / panels as f64 - self.beta()
    }

    pub(crate) fn angles(&self, panels: usize) -> Vec<f64> {
        (0..=panels).map(|i| self.angle(i, panels)).collect()
    }

    pub(crate) fn panelling(&self, panels: usize) -> Panelling {
        let mut points: Vec<Point> = self.angles(panels).iter().map(|&theta| self.map(theta).0).collect();
        let edge = Point::new((self.power - self.nose) / self.chord, 0.0);
        (points[0], points[panels]) = (edge, edge);
        Panelling::from_points(points).expect("panels")
    }
}
