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
        Self::engraved(face, height, &[], 0.0)
    }

    /// The same with `pockets` sunk `depth` into its upper side.
    ///
    /// # Errors
    /// When an outline crosses itself or another, a pocket reaches out of the face or through it, or
    /// it cannot be triangulated.
    pub fn engraved(
        face: &[Point],
        height: f64,
        pockets: &[Vec<Point>],
        depth: f64,
    ) -> Result<Self, GeometryError> {
        let outer = in_single_precision(face)?;
        let pockets: Vec<Vec<Point>> =
            pockets.iter().map(|pocket| in_single_precision(pocket)).collect::<Result<_, _>>()?;
        let sinks = depth > 0.0 && depth < height;
        if !(pockets.is_empty() || sinks) {
            return Err(GeometryError::Triangulation { why: "a pocket is deeper than the block".to_owned() });
        }
        let mut solid = Self { vertices: Vec::new(), facets: Vec::new() };
        let bottom = solid.ring(&outer, 0.0);
        let top = solid.ring(&outer, height);
        let rims: Vec<usize> = pockets.iter().map(|pocket| solid.ring(pocket, height)).collect();
        let floors: Vec<usize> = pockets.iter().map(|pocket| solid.ring(pocket, height - depth)).collect();

        let plain = triangulated(&[&outer])?;
        solid.facets.extend(plain.iter().map(|&[a, b, c]| [a + bottom, c + bottom, b + bottom]));
        let mut rings = vec![outer.as_slice()];
        rings.extend(pockets.iter().map(Vec::as_slice));
        // The rings of the upper side follow one another in the list of vertices.
        solid.facets.extend(triangulated(&rings)?.iter().map(|t| t.map(|i| i + top)));
        solid.wall(bottom, top, outer.len());
        for ((pocket, rim), floor) in pockets.iter().zip(rims).zip(floors) {
            solid.facets.extend(triangulated(&[pocket])?.iter().map(|t| t.map(|i| i + floor)));
            // A pocket's wall faces inwards.
            solid.wall(rim, floor, pocket.len());
        }
        solid.refuse_leaks()?;
        Ok(solid)
    }

    /// A solid of its parts, refused when it is not closed.
    pub(super) fn checked(vertices: Vec<[f32; 3]>, facets: Vec<[usize; 3]>) -> Result<Self, GeometryError> {
        let solid = Self { vertices, facets };
        solid.refuse_leaks()?;
        Ok(solid)
    }

    /// Adds the corners of a polygon at a height; the index of the first.
    fn ring(&mut self, points: &[Point], z: f64) -> usize {
        let first = self.vertices.len();
        self.vertices.extend(points.iter().map(|p| [p.x as f32, p.y as f32, z as f32]));
        first
    }

    /// The wall between two rings of `count` corners each, outwards when the second lies above the
    /// first and they run anticlockwise.
    fn wall(&mut self, from: usize, to: usize, count: usize) {
        for i in 0..count {
            let j = (i + 1) % count;
            self.facets.push([from + i, from + j, to + j]);
            self.facets.push([from + i, to + j, to + i]);
        }
    }

    /// The corners of each facet, anticlockwise seen from outside.
    pub fn triangles(&self) -> impl ExactSizeIterator<Item = [[f32; 3]; 3]> + '_ {
        self.facets.iter().map(|facet| facet.map(|i| self.vertices[i]))
    }

    /// The facets, each by the indices of its corners.
    pub(super) fn facets(&self) -> &[[usize; 3]] {
        &self.facets
    }

    /// A corner by its index.
    pub(super) fn corner(&self, index: usize) -> [f64; 3] {
        self.vertices[index].map(f64::from)
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

/// A polygon as the file will hold it, anticlockwise. Rounded first: one that is simple in double
/// precision need not stay so.
fn in_single_precision(face: &[Point]) -> Result<Vec<Point>, GeometryError> {
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
    Ok(rounded)
}

/// Cuts an anticlockwise polygon with holes, the rings after the first, into triangles without adding
/// or losing a point. Corners are counted through all rings.
fn triangulated(rings: &[&[Point]]) -> Result<Vec<[usize; 3]>, GeometryError> {
    let failed = |why: String| GeometryError::Triangulation { why };
    let points: Vec<Point> = rings.iter().flat_map(|ring| ring.iter().copied()).collect();
    let mut edges = Vec::with_capacity(points.len());
    let mut first = 0;
    for ring in rings {
        edges.extend((0..ring.len()).map(|i| [first + i, first + (i + 1) % ring.len()]));
        first += ring.len();
    }
    let vertices = points.iter().map(|p| Point2::new(p.x, p.y)).collect();
    let mut crossed = false;
    let mesh = ConstrainedDelaunayTriangulation::<Point2<f64>>::try_bulk_load_cdt(vertices, edges, |_| {
        crossed = true;
    })
    .map_err(|error| failed(format!("{error:?}")))?;
    if crossed {
        return Err(failed("two outlines cross".to_owned()));
    }
    if mesh.num_vertices() != points.len() {
        return Err(failed("two corners coincide".to_owned()));
    }
    // The loader may reorder the vertices: find each again by its exact position.
    let index: HashMap<[u64; 2], usize> =
        points.iter().enumerate().map(|(i, p)| ([p.x.to_bits(), p.y.to_bits()], i)).collect();
    let inside = mesh.inner_faces().filter(|face| {
        let centre = face.center();
        let centre = Point::new(centre.x, centre.y);
        let within = |ring: &&[Point]| polygon::contains(ring, centre);
        rings.first().is_some_and(&within) && !rings.iter().skip(1).any(within)
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
