//! Mean (camber) lines.

use super::{EquationError, Equations, SectionError, UniformLoad};

/// Ordinate of a mean line and its derivatives with respect to x, all in unit chord.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Ordinate {
    /// Height above the chord line.
    pub y: f64,
    /// First derivative, the slope.
    pub slope: f64,
    /// Second derivative.
    pub second: f64,
    /// Third derivative.
    pub third: f64,
}

/// The line midway between the surfaces, over x in [0, 1].
#[derive(Debug, Clone, PartialEq)]
pub enum MeanLine {
    /// No camber.
    Straight,
    /// Two parabolas joined at the highest point.
    ///
    /// Source: Jacobs, Ward and Pinkerton, NACA Report 460 (1933).
    FourDigit {
        /// Greatest camber, a fraction of the chord.
        camber: f64,
        /// Where it lies, a fraction of the chord.
        position: f64,
    },
    /// A cubic ahead of the joint, and a straight line or a second cubic (reflexed) behind it.
    ///
    /// Sources: Jacobs and Pinkerton, NACA Report 537 (1935); Jacobs, Pinkerton and Greenberg,
    /// NACA Report 610 (1937).
    FiveDigit {
        /// Where the two pieces join (`m` in the reports), a fraction of the chord.
        joint: f64,
        /// Third derivative of the front piece (`k1`).
        front: f64,
        /// Third derivative of the rear piece as a multiple of the front's (`k2/k1`); zero for
        /// the plain lines.
        rear_ratio: f64,
    },
    /// Load uniform up to a station, then falling evenly to nothing.
    UniformLoad(UniformLoad),
    /// The user's own expressions, by [`MeanLine::from_equations`], which checks them.
    Equations(Equations),
}

/// Constants published for a design lift coefficient of 0.3: position digit, joint, front cubic,
/// ratio of the rear cubic. NACA Reports 537 and 610, from memory.
const PLAIN: [(u8, f64, f64, f64); 5] = [
    (1, 0.0580, 361.400, 0.0),
    (2, 0.1260, 51.640, 0.0),
    (3, 0.2025, 15.957, 0.0),
    (4, 0.2900, 6.643, 0.0),
    (5, 0.3910, 3.230, 0.0),
];
#[expect(clippy::approx_constant, reason = "0.3180 is a published joint, no fraction of pi")]
const REFLEXED: [(u8, f64, f64, f64); 4] = [
    (2, 0.1300, 51.990, 0.000_764),
    (3, 0.2170, 15.793, 0.006_770),
    (4, 0.3180, 6.520, 0.030_300),
    (5, 0.4410, 3.191, 0.135_500),
];

impl MeanLine {
    /// The five-digit line of a position digit, scaled to a design lift coefficient: with the
    /// published constants where they are, otherwise as [`MeanLine::five_digit_at`] derives them.
    ///
    /// # Errors
    /// When there is no line for that digit.
    pub fn five_digit(design_lift: f64, position_digit: u8, reflexed: bool) -> Result<Self, SectionError> {
        let table: &[_] = if reflexed { &REFLEXED } else { &PLAIN };
        match table.iter().find(|line| line.0 == position_digit) {
            Some(&(_, joint, front, rear_ratio)) => {
                Ok(Self::FiveDigit { joint, front: front * (design_lift / 0.3), rear_ratio })
            }
            None => Self::five_digit_at(design_lift, f64::from(position_digit) / 20.0, reflexed),
        }
    }

    /// The five-digit line with its greatest camber at `position` of the chord, for a design lift
    /// coefficient in thin-section theory, from the conditions that the reports state. The plain
    /// lines go from 0.02 to 0.42, the reflexed ones from 0.06 to 0.42.
    ///
    /// The published constants agree with these to their rounding, but for the cubics of the lines
    /// 210 and 220: 3.2 and 0.12 % too large.
    ///
    /// Sources: NACA Reports 537 (1935) and 610 (1937); thin-section theory: H. Glauert, "The
    /// Elements of Aerofoil and Airscrew Theory" (1926), chapter VII.
    ///
    /// # Errors
    /// When there is no line for that position.
    pub fn five_digit_at(design_lift: f64, position: f64, reflexed: bool) -> Result<Self, SectionError> {
        let least = if reflexed { 0.06 } else { 0.02 };
        if !(least..=0.42).contains(&position) {
            return Err(SectionError::FiveDigitPosition {
                percent: 100.0 * position,
                reflexed,
                least: 100.0 * least,
            });
        }
        // No slope at `position`: the reflexed line's ratio follows from the joint, and of the plain
        // line (ratio 0) the joint itself, position = joint (1 - √(joint / 3)).
        let line = |joint: f64| {
            let (m, p) = (joint, position);
            let rear_ratio =
                if reflexed { (3.0 * (m - p).powi(2) - m.powi(3)) / (1.0 - m).powi(3) } else { 0.0 };
            Self::FiveDigit { joint, front: 1.0, rear_ratio }
        };
        // Rises with the joint and is nought at the one sought: the place of the plain line's highest
        // point, and of the reflexed line the moment about the quarter chord, nose up.
        let beyond = |joint: f64| {
            if reflexed {
                let [_, a1, a2] = line(joint).glauert();
                a2 - a1
            } else {
                joint * (1.0 - (joint / 3.0).sqrt()) - position
            }
        };
        let (mut low, mut high) = (position, if reflexed { 0.9 } else { 1.0 });
        for _ in 0..60 {
            let middle = 0.5 * (low + high);
            if beyond(middle) > 0.0 { high = middle } else { low = middle }
        }
        let Self::FiveDigit { joint, rear_ratio, .. } = line(0.5 * (low + high)) else {
            return Ok(Self::Straight);
        };
        // Lift at the ideal angle is π A₁, and the line is proportional to its cubic.
        let lift = std::f64::consts::PI * Self::FiveDigit { joint, front: 1.0, rear_ratio }.glauert()[1];
        Ok(Self::FiveDigit { joint, front: design_lift / lift, rear_ratio })
    }

    /// A₀ … A₂ of the slope as a cosine series: the mean slope, and twice its products with
    /// cos θ and cos 2θ, x = (1 - cos θ)/2. Lift at the ideal angle is π A₁, the moment about the
    /// quarter chord -π/4 (A₁ - A₂).
    fn glauert(&self) -> [f64; 3] {
        let mut ends: Vec<f64> = self.joints().iter().map(|x| (1.0 - 2.0 * x).acos()).collect();
        ends.insert(0, 0.0);
        ends.push(std::f64::consts::PI);
        let mut sums = [0.0; 3];
        for piece in ends.windows(2) {
            let half = 0.5 * (piece[1] - piece[0]);
            for &(weight, offset) in kurbo::common::GAUSS_LEGENDRE_COEFFS_16 {
                let angle = piece[0] + half * (1.0 + offset);
                let slope = self.at(0.5 * (1.0 - angle.cos())).slope;
                for (n, sum) in sums.iter_mut().enumerate() {
                    *sum += weight * half * slope * (n as f64 * angle).cos();
                }
            }
        }
        let over_pi = sums.map(|sum| sum / std::f64::consts::PI);
        [over_pi[0], 2.0 * over_pi[1], 2.0 * over_pi[2]]
    }

    /// A mean line from expressions for its height over x, both fractions of the chord.
    ///
    /// # Errors
    /// With the place, when it is not finite or not smooth, steps, turns sharply, is too steep or
    /// too high, or does not begin and end at 0.
    pub fn from_equations(equations: Equations) -> Result<Self, EquationError> {
        equations.refuse_as_mean_line()?;
        Ok(Self::Equations(equations))
    }

    /// Ordinate and derivatives at `x`; at the joint, those of the rear piece.
    #[must_use]
    pub fn at(&self, x: f64) -> Ordinate {
        match *self {
            Self::Equations(ref equations) => {
                let [y, slope, second, third] = equations.at(x).derivatives();
                Ordinate { y, slope, second, third }
            }
            Self::Straight => Ordinate { y: 0.0, slope: 0.0, second: 0.0, third: 0.0 },
            Self::UniformLoad(line) => line.at(x),
            Self::FourDigit { camber, position: p } => {
                let (scale, start) = if x < p {
                    (camber / (p * p), 0.0)
                } else {
                    (camber / ((1.0 - p) * (1.0 - p)), 1.0 - 2.0 * p)
                };
                Ordinate {
                    y: scale * (start + 2.0 * p * x - x * x),
                    slope: 2.0 * scale * (p - x),
                    second: -2.0 * scale,
                    third: 0.0,
                }
            }
            Self::FiveDigit { joint: m, front, rear_ratio: ratio } => {
                // One form serves the plain and the reflexed lines: with a ratio of zero the
                // reflexed equation of Report 610 becomes the plain one of Report 537.
                let sixth = front / 6.0;
                let tilt = ratio * (1.0 - m).powi(3) + m.powi(3);
                let bend = if x < m { 1.0 } else { ratio };
                let d = x - m;
                Ordinate {
                    y: sixth * (bend * d.powi(3) - tilt * x + m.powi(3)),
                    slope: sixth * (3.0 * bend * d * d - tilt),
                    second: sixth * 6.0 * bend * d,
                    third: sixth * 6.0 * bend,
                }
            }
        }
    }

    /// Where the line changes from one piece to the next, ascending and strictly inside (0, 1).
    #[must_use]
    pub fn joints(&self) -> Vec<f64> {
        match *self {
            Self::Equations(ref equations) => equations.joints().to_vec(),
            Self::Straight => Vec::new(),
            Self::FourDigit { position, .. } => vec![position],
            Self::FiveDigit { joint, .. } => vec![joint],
            Self::UniformLoad(line) => line.joints(),
        }
    }
}
