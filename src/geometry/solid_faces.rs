//! The flat faces of a solid, for drawing it.

use std::collections::HashMap;

use super::Solid;

/// A flat face: facets that join in one plane.
#[derive(Debug, Clone, PartialEq)]
pub struct Face {
    /// Unit normal, outwards.
    pub normal: [f64; 3],
    /// Its edges, each a closed line of corners; outer ones run anticlockwise seen from outside.
    pub edges: Vec<Vec<[f64; 3]>>,
}

/// Facets whose normals differ by less than this cosine are one face: a third of a degree.
const SAME_WAY: f64 = 0.999_98;

impl Solid {
    /// The faces, in the order of their first facet.
    #[must_use]
    pub fn faces(&self) -> Vec<Face> {
        let facets = self.facets();
        let normals: Vec<[f64; 3]> =
            facets.iter().map(|&facet| normal(facet.map(|i| self.corner(i)))).collect();
        let sides = |facet: [usize; 3]| [(facet[0], facet[1]), (facet[1], facet[2]), (facet[2], facet[0])];
        let mut owner: HashMap<(usize, usize), usize> = HashMap::with_capacity(3 * facets.len());
        for (i, &facet) in facets.iter().enumerate() {
            owner.extend(sides(facet).map(|side| (side, i)));
        }
        let mut face_of = vec![usize::MAX; facets.len()];
        let mut faces = Vec::new();
        for first in 0..facets.len() {
            if face_of[first] != usize::MAX {
                continue;
            }
            let number = faces.len();
            face_of[first] = number;
            let (mut pending, mut members) = (vec![first], Vec::new());
            while let Some(i) = pending.pop() {
                members.push(i);
                for (a, b) in sides(facets[i]) {
                    let Some(&next) = owner.get(&(b, a)) else { continue };
                    let dot: f64 = (0..3).map(|k| normals[first][k] * normals[next][k]).sum();
                    if face_of[next] == usize::MAX && dot > SAME_WAY {
                        face_of[next] = number;
                        pending.push(next);
                    }
                }
            }
            members.sort_unstable();
            let rim = members
                .iter()
                .flat_map(|&i| sides(facets[i]))
                .filter(|&(a, b)| owner.get(&(b, a)).is_none_or(|&other| face_of[other] != number));
            let edges = chained(rim.collect());
            let edges = edges.into_iter().map(|edge| edge.into_iter().map(|i| self.corner(i)).collect());
            faces.push(Face { normal: normals[first], edges: edges.collect() });
        }
        faces
    }
}

/// Sides joined end to end into closed lines.
fn chained(sides: Vec<(usize, usize)>) -> Vec<Vec<usize>> {
    let mut next: HashMap<usize, Vec<usize>> = HashMap::new();
    for &(a, b) in &sides {
        next.entry(a).or_default().push(b);
    }
    let mut lines = Vec::new();
    for (start, _) in sides {
        let mut line = Vec::new();
        let mut at = start;
        while let Some(to) = next.get_mut(&at).and_then(Vec::pop) {
            line.push(at);
            at = to;
            if at == start {
                break;
            }
        }
        if line.len() > 2 {
            lines.push(line);
        }
    }
    lines
}

fn normal([a, b, c]: [[f64; 3]; 3]) -> [f64; 3] {
    let edge = |to: [f64; 3]| [to[0] - a[0], to[1] - a[1], to[2] - a[2]];
    let (u, v) = (edge(b), edge(c));
    let n = [u[1] * v[2] - u[2] * v[1], u[2] * v[0] - u[0] * v[2], u[0] * v[1] - u[1] * v[0]];
    let length = n.iter().map(|n| n * n).sum::<f64>().sqrt().max(f64::MIN_POSITIVE);
    n.map(|n| n / length)
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::geometry::Point;

    #[test]
    fn a_block_with_a_pocket_has_its_faces() {
        let square =
            |from: f64, to: f64| [(from, from), (to, from), (to, to), (from, to)].map(Point::from).to_vec();
        let solid = Solid::engraved(&square(0.0, 20.0), 5.0, &[square(5.0, 9.0)], 1.0).expect("a solid");
        let faces = solid.faces();
        // Six of the block, and floor and four walls of the pocket.
        assert_eq!(faces.len(), 11);
        let top = faces.iter().find(|face| face.normal[2] > 0.9 && face.edges.len() == 2);
        assert!(top.is_some(), "the upper side has a hole");
    }
}
