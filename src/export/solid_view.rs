//! A solid as a small shaded picture, seen from the front and above.

use std::fmt::Write as _;

use crate::geometry::Solid;
use crate::units::number;

/// Turn about the upright axis and height of the eye, radians.
const TURN: f64 = 0.3;
const EYE: f64 = 0.85;
/// Where the light comes from, a unit vector.
const LIGHT: [f64; 3] = [-0.36, -0.48, 0.8];
/// Width of the picture at most, and height at most, mm.
const SIZE: [f64; 2] = [110.0, 60.0];

/// Faces with a shorter edge are left out, mm, and holes of the upper side with a shorter one are filled.
const LEAST_FACE: f64 = 9.0;
const LEAST_HOLE: f64 = 16.0;

fn length(edge: &[[f64; 3]]) -> f64 {
    let apart = |a: [f64; 3], b: [f64; 3]| (0..3).map(|k| (a[k] - b[k]).powi(2)).sum::<f64>().sqrt();
    edge.iter().zip(edge.iter().cycle().skip(1)).map(|(&a, &b)| apart(a, b)).sum()
}

/// The solid as an SVG picture, which is read out as `name`. Faces further away are drawn first, the uppermost level ones last.
#[must_use]
pub fn solid_view(solid: &Solid, name: &str) -> String {
    let (turn_sin, turn_cos) = TURN.sin_cos();
    let (eye_sin, eye_cos) = EYE.sin_cos();
    // Across and up on the picture, and towards the eye.
    let place = |[x, y, z]: [f64; 3]| {
        let (across, away) = (x * turn_cos - y * turn_sin, x * turn_sin + y * turn_cos);
        [across, away * eye_sin + z * eye_cos, z * eye_sin - away * eye_cos]
    };
    let faces: Vec<_> = solid.faces().into_iter().filter(|face| place(face.normal)[2] > 0.0).collect();
    let corners = || faces.iter().flat_map(|face| face.edges.iter().flatten());
    let highest = corners().map(|corner| corner[2]).fold(f64::NEG_INFINITY, f64::max);
    let mut drawn: Vec<_> = faces
        .iter()
        .map(|face| {
            let outer: Vec<[f64; 3]> = face.edges.iter().flatten().map(|&corner| place(corner)).collect();
            let nearness = outer.iter().map(|p| p[2]).sum::<f64>() / outer.len().max(1) as f64;
            let is_top = face.normal[2] > 0.99 && face.edges.iter().flatten().all(|c| highest - c[2] < 1e-3);
            (is_top, nearness, face)
        })
        .collect();
    drawn.sort_by(|a, b| a.0.cmp(&b.0).then(a.1.total_cmp(&b.1)));

    let all: Vec<[f64; 3]> = corners().map(|&corner| place(corner)).collect();
    let range = |axis: usize| {
        all.iter()
            .map(|p| p[axis])
            .fold((f64::INFINITY, f64::NEG_INFINITY), |(low, high), v| (low.min(v), high.max(v)))
    };
    let ((left, right), (low, high)) = (range(0), range(1));
    if !(right > left && high > low) {
        return String::new();
    }
    let scale = (SIZE[0] / (right - left)).min(SIZE[1] / (high - low)).min(1.0);
    let (width, height) = (scale * (right - left) + 2.0, scale * (high - low) + 2.0);
    let mut svg = format!(
        "<svg xmlns=\"http://www.w3.org/2000/svg\" role=\"img\" aria-label=\"{2}\" width=\"{0}mm\" height=\"{1}mm\" viewBox=\"0 0 {0} {1}\">",
        number(width, 2),
        number(height, 2),
        super::html::escaped(name)
    );
    for (is_top, _, face) in drawn {
        if face.edges.iter().all(|edge| length(edge) < LEAST_FACE) {
            continue;
        }
        let lit: f64 = (0..3).map(|k| face.normal[k] * LIGHT[k]).sum::<f64>().max(0.0);
        let grey = (80.0 + 165.0 * lit) as u8;
        let fill = format!("#{grey:02x}{grey:02x}{grey:02x}");
        let stroke = if is_top { "#111" } else { &fill };
        // Engraved letters are holes of the upper side, whose own faces are too small to draw.
        let (large, small): (Vec<_>, Vec<_>) =
            face.edges.iter().partition(|edge| !is_top || length(edge) > LEAST_HOLE);
        for (edges, fill, stroke) in [(large, fill.as_str(), stroke), (small, "#222", "none")] {
            if edges.is_empty() {
                continue;
            }
            let _ = write!(
                svg,
                "<path fill=\"{fill}\" fill-rule=\"evenodd\" stroke=\"{stroke}\" stroke-width=\".2\" d=\""
            );
            for edge in edges {
                for (i, &corner) in edge.iter().enumerate() {
                    let [x, y, _] = place(corner);
                    let command = if i == 0 { 'M' } else { 'L' };
                    let (x, y) = (1.0 + scale * (x - left), 1.0 + scale * (high - y));
                    let _ = write!(svg, "{command}{} {}", number(x, 1), number(y, 1));
                }
                svg.push('Z');
            }
            svg.push_str("\"/>");
        }
    }
    svg.push_str("</svg>");
    svg
}
