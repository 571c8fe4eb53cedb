//! Bending, torsion and weight of a section of skins over a core.
//!
//! Axes of the outline: x aft, y towards the upper side, mm. "Across" is along y (lift of a foil, side
//! force of a strut), "along" is along the chord.

use super::shear_flow::{self, ThinRing};
use super::walls::{SectionBuild, Wall, Walls};
use super::{CoreElastic, StrengthError};
use crate::geometry::{Point, polygon};

/// How the walls of a section close.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
pub enum Cell {
    /// One closed cell.
    Closed,
    /// Open somewhere: next to no torsional stiffness from the skins.
    Open,
}

/// Stiffness of a section for a beam along the span.
///
/// Not a certification: use tested material values; local codes and licensed practice come first.
#[derive(Debug, Clone, PartialEq)]
pub struct SectionStiffness {
    /// EA along the span, N.
    pub axial: f64,
    /// Centre of stiffness through which the neutral axes go, mm.
    pub centroid: Point,
    /// ∫E y² about it, N·mm²: bending by loads across.
    pub bending_across: f64,
    /// ∫E x² about it, N·mm²: bending by loads along the chord.
    pub bending_along: f64,
    /// ∫E xy about it, N·mm².
    pub bending_product: f64,
    /// The greatest and the least bending stiffness, N·mm².
    pub principal: [f64; 2],
    /// Angle from x to the neutral axis of the least one, radians, anticlockwise.
    pub principal_angle: f64,
    /// GJ, N·mm².
    pub torsion: f64,
    /// Share of a torque that the walls take: theirs of GJ, as walls and core twist alike.
    pub wall_torsion: f64,
    /// Share of a shear across that the walls take by their stiffness: cut level with the centre of stiffness,
    /// walls (G t sin θ, θ their angle to the chord) and core (G by its width) shear by the same angle.
    pub wall_shear: f64,
    /// Area inside of the skin's middle line, mm².
    pub cell_area: f64,
    /// How the walls close.
    pub cell: Cell,
    /// Where a load causes no twist, mm.
    pub shear_centre: Point,
    /// Weight, kg/m.
    pub mass: f64,
    /// Area of the core left, mm².
    pub core_area: f64,
    walls: Walls,
    core: CoreElastic,
    flows: Vec<[f64; 2]>,
    core_flow: f64,
}

impl SectionStiffness {
    /// The stiffness of a section.
    ///
    /// Bending integrates E over every wall and over the core (plane sections stay plane, skins free
    /// to contract along the chord). Torsion of a closed cell is Bredt (1896) and Batho (1915),
    /// G J = 4 A² / ∮ ds/(G t), to which the core adds Saint-Venant's approximation G A⁴/(40 Ip) (1855);
    /// both stress fields being in balance, their sum tends to the low side. An open section has
    /// Σ G l t³/3 instead of Bredt's term. The shear centre is that of the thin walls alone: it neglects
    /// the core's shear and the warping of the ends.
    ///
    /// # Errors
    /// When the outline encloses nothing, a material is impossible or a stiffness is missing; `at` (mm
    /// from the root) only names the place.
    pub fn of(build: &SectionBuild, at: f64) -> Result<Self, StrengthError> {
        build.core.check()?;
        let walls = Walls::of(build, at)?;
        let core = moments(&walls.core()) - build.cut_outs.iter().map(|hole| moments(hole).positive()).sum();
        let mut stiff = core * build.core.along_span;
        let mut weight = core.area * build.core.density;
        for wall in &walls.walls {
            if let Some(skin) = walls.skin(wall) {
                let own = moments(&wall.corners());
                stiff = stiff + own * skin.constants().ex;
                weight += own.area * skin.density();
            }
        }
        let no = |what| StrengthError::NoStiffness { at, what };
        if !(stiff.area > 0.0 && stiff.area.is_finite()) {
            return Err(no("axial"));
        }
        let centroid = Point::new(stiff.x / stiff.area, stiff.y / stiff.area);
        let across = stiff.yy - stiff.area * centroid.y * centroid.y;
        let along = stiff.xx - stiff.area * centroid.x * centroid.x;
        let product = stiff.xy - stiff.area * centroid.x * centroid.y;
        if !(across > 0.0 && along > 0.0 && across * along > product * product) {
            return Err(no("bending"));
        }
        let (middle, half) = (0.5 * (across + along), (0.5 * (across - along)).hypot(product));

        let ring = ThinRing::of(&walls);
        let cell = if ring.is_closed() { Cell::Closed } else { Cell::Open };
        let cell_area = polygon::area(&walls.middle_line());
        let of_core = core_torsion(core) * build.core.g;
        let of_skin = match cell {
            Cell::Closed => 4.0 * cell_area * cell_area / ring.flexibility(),
            Cell::Open => open_torsion(&walls),
        };
        let torsion = of_core + of_skin;
        if !(torsion > 0.0 && torsion.is_finite()) {
            return Err(no("torsional"));
        }
        let (flows, shear_centre) = shear_flow::unit_flows(&ring).ok_or(no("bending"))?;
        let mut section = Self {
            axial: stiff.area,
            centroid,
            bending_across: across,
            bending_along: along,
            bending_product: product,
            principal: [middle + half, middle - half],
            principal_angle: 0.5 * (2.0 * product).atan2(along - across),
            torsion,
            wall_torsion: of_skin / torsion,
            wall_shear: wall_shear(&walls, build, centroid.y),
            cell_area,
            cell,
            shear_centre,
            mass: weight * 1e-6,
            core_area: core.area,
            walls,
            core: build.core.clone(),
            flows,
            core_flow: 0.0,
        };
        section.core_flow = section.greatest_core_flow();
        Ok(section)
    }

    /// The ring of walls.
    #[must_use]
    pub fn walls(&self) -> &Walls {
        &self.walls
    }

    /// What fills the section.
    #[must_use]
    pub fn core(&self) -> &CoreElastic {
        &self.core
    }

    /// Bends about both axes for moments of loads across and along, 1/mm each: a positive one presses
    /// the side towards which the load points.
    #[must_use]
    pub fn curvatures(&self, [across, along]: [f64; 2]) -> [f64; 2] {
        let (a, b, c) = (self.bending_across, self.bending_along, self.bending_product);
        let det = a * b - c * c;
        [(b * across - c * along) / det, (a * along - c * across) / det]
    }

    /// Strain along the span at a point for curvatures and a compressive force in N.
    #[must_use]
    pub fn strain(&self, point: Point, [across, along]: [f64; 2], compression: f64) -> f64 {
        let out = point - self.centroid;
        -(across * out.y + along * out.x) - compression / self.axial
    }

    /// Shear flow in a wall for one newton across and one along through the shear centre, N/mm, thin
    /// walls alone.
    #[must_use]
    pub fn wall_flow(&self, wall: usize) -> [f64; 2] {
        self.flows.get(wall).copied().unwrap_or_default()
    }

    /// Greatest shear stress in the core for one newton across, MPa.
    ///
    /// What skin and core above a place hand to the core there, E t y dM/EI, as in a sandwich beam of
    /// unit width (Allen 1969, chapter 2): with equal faces 1 / (b d). That the nose and the trailing
    /// edge carry a part of it is left out, which is on the safe side.
    #[must_use]
    pub fn core_shear(&self) -> f64 {
        self.core_flow
    }

    fn greatest_core_flow(&self) -> f64 {
        let flow = |wall: &Wall| {
            let skin = self.walls.skin(wall);
            let [a, b] = wall.middle_line();
            let run = (b.x - a.x).abs();
            let height = (a.midpoint(b).y - self.centroid.y).abs();
            let inside = (wall.inner[0].midpoint(wall.inner[1]).y - self.centroid.y).abs();
            // Per width along the chord: a steep wall, as at the nose, is no face of the sandwich.
            let is_face = run > 0.5 * a.distance(b);
            let face = skin
                .filter(|_| is_face)
                .map_or(0.0, |skin| skin.constants().ex * (wall.area() / run.max(1e-9)) * height);
            let core = if is_face { 0.5 * self.core.along_span * inside * inside } else { 0.0 };
            (face + core) / self.bending_across
        };
        self.walls.walls.iter().map(flow).fold(0.0, f64::max)
    }

    /// Greatest thickness of the core along y, mm.
    #[must_use]
    pub fn core_height(&self) -> f64 {
        let (low, high) =
            self.walls.walls.iter().fold((f64::INFINITY, f64::NEG_INFINITY), |(low, high), wall| {
                (low.min(wall.inner[0].y), high.max(wall.inner[0].y))
            });
        (high - low).max(0.0)
    }
}

/// What of the stiffness against shear across, level with `height`, is that of the walls.
fn wall_shear(walls: &Walls, build: &SectionBuild, height: f64) -> f64 {
    let of_wall = |wall: &Wall| {
        let [a, b] = wall.middle_line();
        let crosses = (a.y <= height) != (b.y <= height);
        let skin = walls.skin(wall).filter(|_| crosses);
        skin.map_or(0.0, |skin| skin.constants().gxy * skin.thickness() * (b.y - a.y).abs() / a.distance(b))
    };
    let of_walls: f64 = walls.walls.iter().map(of_wall).sum();
    let holes: f64 = build.cut_outs.iter().map(|hole| width_at(hole, height)).sum();
    let of_core = build.core.g * (width_at(&walls.core(), height) - holes).max(0.0);
    if of_walls > 0.0 { of_walls / (of_walls + of_core) } else { 1.0 }
}

/// How wide a polygon is along x at a height.
fn width_at(points: &[Point], height: f64) -> f64 {
    let mut crossings: Vec<f64> = polygon::sides(points)
        .filter(|(a, b)| (a.y <= height) != (b.y <= height))
        .map(|(a, b)| a.x + (height - a.y) / (b.y - a.y) * (b.x - a.x))
        .collect();
    crossings.sort_by(f64::total_cmp);
    crossings.chunks_exact(2).map(|pair| pair[1] - pair[0]).sum()
}

/// Σ G l t³/3 of thin open walls.
fn open_torsion(walls: &Walls) -> f64 {
    let of = |wall: &Wall| {
        walls
            .skin(wall)
            .map_or(0.0, |skin| skin.constants().gxy * wall.length() * skin.thickness().powi(3) / 3.0)
    };
    walls.walls.iter().map(of).sum()
}

/// Saint-Venant's approximation for any solid section without re-entrant corners, mm⁴.
fn core_torsion(core: Moments) -> f64 {
    if core.area <= 0.0 {
        return 0.0;
    }
    let polar = core.xx + core.yy - (core.x * core.x + core.y * core.y) / core.area;
    if polar > 0.0 { core.area.powi(4) / (40.0 * polar) } else { 0.0 }
}

/// Moments of an area about the origin: mm², mm³, mm⁴.
#[derive(Debug, Clone, Copy, PartialEq, Default)]
struct Moments {
    area: f64,
    x: f64,
    y: f64,
    xx: f64,
    yy: f64,
    xy: f64,
}

impl Moments {
    /// Of a hole, whichever way it was drawn.
    fn positive(self) -> Self {
        if self.area < 0.0 { self * -1.0 } else { self }
    }
}

impl std::ops::Add for Moments {
    type Output = Self;
    fn add(self, other: Self) -> Self {
        Self {
            area: self.area + other.area,
            x: self.x + other.x,
            y: self.y + other.y,
            xx: self.xx + other.xx,
            yy: self.yy + other.yy,
            xy: self.xy + other.xy,
        }
    }
}

impl std::ops::Sub for Moments {
    type Output = Self;
    fn sub(self, other: Self) -> Self {
        self + other * -1.0
    }
}

impl std::ops::Mul<f64> for Moments {
    type Output = Self;
    fn mul(self, by: f64) -> Self {
        Self {
            area: self.area * by,
            x: self.x * by,
            y: self.y * by,
            xx: self.xx * by,
            yy: self.yy * by,
            xy: self.xy * by,
        }
    }
}

impl std::iter::Sum for Moments {
    fn sum<I: Iterator<Item = Self>>(all: I) -> Self {
        all.fold(Self::default(), |sum, one| sum + one)
    }
}

/// Moments of a polygon by Green's theorem, exact for straight sides.
fn moments(points: &[Point]) -> Moments {
    let side = |(i, &a): (usize, &Point)| {
        let b = points[(i + 1) % points.len()];
        let twice = a.x * b.y - b.x * a.y;
        Moments {
            area: twice / 2.0,
            x: twice * (a.x + b.x) / 6.0,
            y: twice * (a.y + b.y) / 6.0,
            xx: twice * (a.x * a.x + a.x * b.x + b.x * b.x) / 12.0,
            yy: twice * (a.y * a.y + a.y * b.y + b.y * b.y) / 12.0,
            xy: twice * (a.x * b.y + 2.0 * a.x * a.y + 2.0 * b.x * b.y + b.x * a.y) / 24.0,
        }
    };
    points.iter().enumerate().map(side).sum()
}
