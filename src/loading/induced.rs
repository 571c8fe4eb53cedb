//! What the vortices of a foil and of its images bring about at a place.
//!
//! A strip of circulation Γ is a horseshoe: a bound vortex along the quarter chord and two legs that run
//! aft without end. Its images: the other half across the root, and above the surface a second foil that
//! lifts the same way. The latter is the condition of a surface at high Froude number, where gravity is
//! nothing beside inertia: the pressure on it is the air's, to first order no velocity along the flow is
//! left, and the potential vanishes on it. A mirrored potential of opposite sign does that: a biplane.
//!
//! Source: Wadlin, Shuford and McGehee, NACA Report 1232 (1955), from memory; the biplane after Prandtl,
//! NACA Report 116 (1921).

use super::strips::{Place, Strip, Strips};
use std::f64::consts::PI;

/// Horseshoe ends and share of circulation: the strip itself and its images.
fn copies(inner: Place, outer: Place, mirror: f64, depth: Option<f64>) -> impl Iterator<Item = Copy> {
    let own = Copy { from: inner, to: outer, share: 1.0, above: false };
    let other = |[x, y, z]: Place| [x, -y, z];
    // Across the root the line is run through the other way, so that it still points to positive y.
    let across =
        (mirror != 0.0).then(|| Copy { from: other(outer), to: other(inner), share: mirror, above: false });
    let under = std::iter::once(own).chain(across);
    under.flat_map(move |copy| {
        let above = depth.map(|depth| {
            let up = |[x, y, z]: Place| [x, y, 2.0 * depth - z];
            Copy { from: up(copy.from), to: up(copy.to), above: true, ..copy }
        });
        std::iter::once(copy).chain(above)
    })
}

#[derive(Clone, Copy)]
struct Copy {
    from: Place,
    to: Place,
    share: f64,
    above: bool,
}

/// Angles by which the flow at each strip is turned down, for each mm of circulation over speed at each
/// other one.
pub(super) struct Induced {
    /// By the legs: turns the force aft as well, which is the induced drag.
    pub(super) by_wake: Vec<Vec<f64>>,
    /// By the bound vortices of the image above the surface, at the three-quarter chord: it curves the flow
    /// along the chord and takes lift, but turns no force.
    pub(super) by_image: Vec<Vec<f64>>,
}

impl Induced {
    pub(super) fn of(strips: &Strips, depth: Option<f64>) -> Self {
        let row = |strip: &Strip, one: &dyn Fn(&Strip, Copy) -> f64| -> Vec<f64> {
            let pairs = strips.nodes.windows(2);
            let sum = |ends: &[Place]| {
                copies(ends[0], ends[1], strips.mirror, depth).map(|copy| copy.share * one(strip, copy)).sum()
            };
            pairs.map(sum).collect()
        };
        let rows = |one: &dyn Fn(&Strip, Copy) -> f64| {
            strips.strips.iter().map(|strip| row(strip, one)).collect::<Vec<_>>()
        };
        let by_wake = rows(&|strip, copy| {
            half_wake_angle(strip, copy.to, 1.0) + half_wake_angle(strip, copy.from, -1.0)
        });
        let by_image = rows(&|strip, copy| if copy.above { curvature_angle(strip, copy) } else { 0.0 });
        Self { by_wake, by_image }
    }
}

/// The angle of a leg through `node` at the strip: half of what the whole straight vortex far aft has.
///
/// Half is exact for legs that start abreast of the strip. Where the line is swept it is the mean that
/// keeps the whole foil's induced drag right (Munk's stagger theorem, NACA Report 121, 1921).
fn half_wake_angle(strip: &Strip, node: Place, circulation: f64) -> f64 {
    let (dy, dz) = (strip.middle[1] - node[1], strip.middle[2] - node[2]);
    let per = circulation / (4.0 * PI * (dy * dy + dz * dz));
    downwards(strip, [-per * dz, per * dy])
}

/// The angle of a bound vortex above the surface at the three-quarter chord, where a flat section's flow
/// is that of the plate as a whole (Pistolesi's point).
fn curvature_angle(strip: &Strip, copy: Copy) -> f64 {
    let [x, y, z] = strip.middle;
    let [_, v, w] = bound([x + 0.5 * strip.chord, y, z], copy.from, copy.to, 0.0);
    downwards(strip, [v, w])
}

/// The part of a velocity (y, z) against the strip's lift.
fn downwards(strip: &Strip, [v, w]: [f64; 2]) -> f64 {
    let [along_y, along_z] = strip.along;
    along_z * v - along_y * w
}

/// Velocity (x, y, z) at a place, mm from the root's quarter chord, for unit speed.
pub(super) fn velocity(
    at: Place,
    strips: &Strips,
    depth: Option<f64>,
    circulation: &[f64],
    core: f64,
) -> Place {
    let mut sum = [0.0; 3];
    for (ends, g) in strips.nodes.windows(2).zip(circulation) {
        for copy in copies(ends[0], ends[1], strips.mirror, depth) {
            let parts = [
                (bound(at, copy.from, copy.to, core), 1.0),
                (leg(at, copy.to, core), 1.0),
                (leg(at, copy.from, core), -1.0),
            ];
            for (part, sign) in parts {
                for k in 0..3 {
                    sum[k] += sign * copy.share * g * part[k];
                }
            }
        }
    }
    sum
}

/// Velocity of a straight vortex of unit circulation between two places (Biot and Savart). Within `core`
/// of the vortex it falls to nothing instead of growing without end.
fn bound(at: Place, from: Place, to: Place, core: f64) -> Place {
    let (r1, r2) = (less(at, from), less(at, to));
    let (d1, d2) = (size(r1), size(r2));
    let cross = [r1[1] * r2[2] - r1[2] * r2[1], r1[2] * r2[0] - r1[0] * r2[2], r1[0] * r2[1] - r1[1] * r2[0]];
    let length = size(less(to, from));
    let below = d1 * d2 * (d1 * d2 + dot(r1, r2)) + core * core * length * length;
    let factor = if below > 0.0 { (d1 + d2) / (4.0 * PI * below) } else { 0.0 };
    cross.map(|part| factor * part)
}

/// Velocity of a leg of unit circulation that runs aft from a place.
fn leg(at: Place, from: Place, core: f64) -> Place {
    let r = less(at, from);
    let away = r[1] * r[1] + r[2] * r[2] + core * core;
    let distance = size(r);
    if !(away > 0.0 && distance > 0.0) {
        return [0.0; 3];
    }
    let factor = (1.0 + r[0] / distance) / (4.0 * PI * away);
    [0.0, -factor * r[2], factor * r[1]]
}

fn less(a: Place, b: Place) -> Place {
    [a[0] - b[0], a[1] - b[1], a[2] - b[2]]
}

fn dot(a: Place, b: Place) -> f64 {
    a[0] * b[0] + a[1] * b[1] + a[2] * b[2]
}

fn size(a: Place) -> f64 {
    dot(a, a).sqrt()
}
