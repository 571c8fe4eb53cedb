//! Closed solids of triangles, as a printer's slicer reads them.

use std::collections::HashMap;

use kurbo::Point;
use spade::{ConstrainedDelaunayTriangulation, Point2, Triangulation};

use super::{GeometryError, polygon};

/// Corners of a face nearer than this are one, mm: no printer tells them apart, and triangles
/// between them would have no height in single precision.
const WELD: f64 = 2e-3;

/// A closed, outward-facing skin of triangles, in millimetres.
///
/// Vertices are single precision, as the file holds them, so that what is checked is what is
/// printed.
#[derive(Debug, Clone, PartialEq)]
pub struct Solid {
    vertices: Vec<[f32; 3]>,
    facets: Vec<[usize; 3]>,
}

impl Solid {
    /// A flat-sided block: the polygon `face` raised from z = 0 to z = `height`. Corners nearer to
    /// the one before than two micrometres are left out.
    ///
    /// # Errors
    /// When the face crosses itself or cannot be triangulated.
    pub fn extruded(face: &[Point], height: f64) -> Result<Self, GeometryError> {
        // Rounded first: a polygon that is simple in double precision need not stay so.
        let mut rounded: Vec<Point> =
            face.iter().map(|p| Point::new(f64::from(p.x as f32), f64::from(p.y as f32))).collect();
        rounded.dedup_by(|a, b| a.distance(*b) < WELD);
        while rounded.len() > 1 && rounded[0].distance(rounded[rounded.len() - 1]) < WELD {
            rounded.pop();
        }
        polygon::refuse_crossings(&rounded)?;
        if polygon::area(&rounded) < 0.0 {
            rounded.reverse();
        }
        let count = rounded.len();
        let level = |z: f32| rounded.iter().map(move |p| [p.x as f32, p.y as f32, z]);
        let vertices = level(0.0).chain(level(height as f32)).collect();

        let top = triangulated(&rounded)?;
        let mut facets: Vec<[usize; 3]> = top.iter().map(|&[a, b, c]| [a, c, b]).collect();
        facets.extend(top.iter().map(|t| t.map(|i| i + count)));
        for i in 0..count {
            let j = (i + 1) % count;
            facets.push([i, j, j + count]);
            facets.push([i, j + count, i + count]);
        }
        let solid = Self { vertices, facets };
        solid.refuse_leaks()?;
        Ok(solid)
    }

    /// The corners of each facet, anticlockwise seen from outside.
    pub fn triangles(&self) -> impl ExactSizeIterator<Item = [[f32; 3]; 3]> + '_ {
        self.facets.iter().map(|facet| facet.map(|i| self.vertices[i]))
    }

    /// Volume in mm³, by the divergence theorem.
    #[must_use]
    pub fn volume(&self) -> f64 {
        self.triangles()
            .map(|corners| {
                let [[ax, ay, az], [bx, by, bz], [cx, cy, cz]] = corners.map(|p| p.map(f64::from));
                (ax * (by * cz - bz * cy) + ay * (bz * cx - bx * cz) + az * (bx * cy - by * cx)) / 6.0
            })
            .sum()
    }

    /// Length of the solid along x, y and z, mm.
    #[must_use]
    pub fn size(&self) -> [f64; 3] {
        std::array::from_fn(|axis| {
            let values = self.vertices.iter().map(|v| f64::from(v[axis]));
            let (low, high) =
                values.fold((f64::INFINITY, f64::NEG_INFINITY), |(low, high), v| (low.min(v), high.max(v)));
            high - low
        })
    }

    /// Every edge must be walked once each way by exactly two facets.
    fn refuse_leaks(&self) -> Result<(), GeometryError> {
        let mut walked: HashMap<(usize, usize), u32> = HashMap::new();
        for &[a, b, c] in &self.facets {
            for edge in [(a, b), (b, c), (c, a)] {
                *walked.entry(edge).or_default() += 1;
            }
        }
        let broken = walked.iter().find(|&(&(a, b), &times)| times != 1 || !walked.contains_key(&(b, a)));
        match broken {
            None => Ok(()),
            Some((&(a, _), _)) => {
                let [x, y, z] = self.vertices[a].map(f64::from);
                Err(GeometryError::Leaks { x, y, z })
            }
        }
    }
}

/// Cuts a simple anticlockwise polygon into triangles without adding or losing a point.
fn triangulated(points: &[Point]) -> Result<Vec<[usize; 3]>, GeometryError> {
    let failed = |why: String| GeometryError::Triangulation { why };
    let vertices = points.iter().map(|p| Point2::new(p.x, p.y)).collect();
    let edges = (0..points.len()).map(|i| [i, (i + 1) % points.len()]).collect();
    let mesh = ConstrainedDelaunayTriangulation::<Point2<f64>>::try_bulk_load_cdt(vertices, edges, |_| {})
        .map_err(|error| failed(format!("{error:?}")))?;
    if mesh.num_vertices() != points.len() {
        return Err(failed("two corners coincide".to_owned()));
    }
    // The loader may reorder the vertices: find each again by its exact position.
    let index: HashMap<[u64; 2], usize> =
        points.iter().enumerate().map(|(i, p)| ([p.x.to_bits(), p.y.to_bits()], i)).collect();
    let inside = mesh.inner_faces().filter(|face| {
        let centre = face.center();
        polygon::contains(points, Point::new(centre.x, centre.y))
    });
    inside
        .map(|face| {
            let corner = |i: usize| {
                let p = face.vertices()[i].position();
                index.get(&[p.x.to_bits(), p.y.to_bits()]).copied()
            };
            match (corner(0), corner(1), corner(2)) {
                (Some(a), Some(b), Some(c)) => Ok([a, b, c]),
                _ => Err(failed("a corner moved".to_owned())),
            }
        })
        .collect()
}
