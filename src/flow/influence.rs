//! Stream function at the nodes of an outline due to vorticity on its panels.
//!
//! ψ(z) = (1/2π) ∫ γ log|z - ζ| ds, with γ known by its values at the nodes. On a panel both the
//! surface and γ are parabolas (see [`Panelling`]); the bow of the surface is taken to first order
//! where it moves the vorticity, and lengthens the panel evenly.

use super::Panelling;
use super::far_field::{Exact, LANES, PanelConstants, Points, fill};
use super::panelling::Panel;
use crate::geometry::Point;

/// The columns of all nodes, one entry a node, kept in one block so that they can be the greater
/// part of a system of equations in place.
pub(super) struct VortexInfluence {
    rows: usize,
    entries: Vec<f64>,
}

/// Rows that a system may add below the nodes.
const SPARE_ROWS: usize = 1;

impl VortexInfluence {
    /// With room for `spare` columns that a system may add after the nodes.
    pub(super) fn of(panelling: &Panelling, spare: usize) -> Self {
        let nodes = panelling.nodes().len();
        let rows = (nodes + SPARE_ROWS).next_multiple_of(LANES);
        // One column more in front takes the weight, nought, of the node before the first.
        let entries = vec![0.0; rows * (nodes + 1 + spare)];
        let mut influence = Self { rows, entries };
        pulp::Arch::new().dispatch(Assembly { panelling, influence: &mut influence });
        influence
    }

    /// Distance in the block between the entries of neighbouring columns.
    pub(super) fn stride(&self) -> usize {
        self.rows
    }

    /// The block from the first node's column on, spare columns included. Rows below the nodes
    /// hold nothing of use.
    pub(super) fn block(&mut self) -> &mut [f64] {
        &mut self.entries[self.rows..]
    }

    #[cfg(test)]
    fn at(&self, point: usize, node: usize) -> f64 {
        self.entries[(node + 1) * self.rows + point]
    }
}

struct Assembly<'a> {
    panelling: &'a Panelling,
    influence: &'a mut VortexInfluence,
}

impl pulp::WithSimd for Assembly<'_> {
    type Output = ();

    #[inline(always)]
    fn with_simd<S: pulp::Simd>(self, simd: S) {
        let nodes = self.panelling.nodes();
        let rows = self.influence.rows;
        // Rows that are not nodes are points well away, so that they are never near a panel.
        let away =
            nodes.iter().fold(0.0_f64, |far, node| far.max(node.x.abs() + node.y.abs())) * 100.0 + 100.0;
        let pad = |part: fn(&Point) -> f64| -> Vec<f64> {
            nodes.iter().map(part).chain(std::iter::repeat(away)).take(rows).collect()
        };
        let (x, y) = (pad(|node| node.x), pad(|node| node.y));
        let square = |from: f64, to: f64| (to - from) * (to - from);
        let log: Vec<f64> = std::iter::zip(&x, &y)
            .map(|(&x, &y)| 0.5 * (square(nodes[0].x, x) + square(nodes[0].y, y)).ln())
            .collect();
        let points = Points { count: nodes.len(), x: &x, y: &y, log: &log };
        let panels = self.panelling.panels();
        let constants: Vec<PanelConstants> = panels.iter().map(constants_of).collect();

        fill(simd, &constants, &points, &mut self.influence.entries, |panel, point| {
            let ([f0, f1, f2], log) = moments(&panels[panel], nodes[point]);
            let PanelConstants { scale, bend, .. } = constants[panel];
            let mut columns = bend.map(|weight| weight * (f2 - f0));
            columns[1] += scale * (f0 - f1);
            columns[2] += scale * (f0 + f1);
            Exact { columns, log }
        });
    }
}

fn constants_of(panel: &Panel) -> PanelConstants {
    let square = panel.half.hypot2();
    let inverse = [panel.half.x / square, -panel.half.y / square];
    let scale = panel.half_length() / (4.0 * std::f64::consts::PI);
    PanelConstants {
        inverse,
        origin: product(inverse, [panel.middle.x, panel.middle.y]),
        two_bow: 2.0 * panel.bow,
        scale,
        bend: panel.bend.map(|weight| weight * scale),
    }
}

/// ∫ uⁿ log|z - ζ(u)| du for n = 0, 1, 2 over a panel, and log|z - ζ(1)|, in closed form.
///
/// With p = (z - middle)/half, L = log((p + 1)/(p - 1)), Λ the sum of the logarithms of the
/// distances to both nodes, S = pL/2 - 1 and T = p²S, integration by parts gives for the straight
/// panel F₀ = Λ + 2 Re S, F₁ = -Re E with E = L/2 - pS, and F₂ = (Λ + 2 Re T - 2/3)/3. The bow adds
/// 2 bow times the imaginary parts of E, S - T and p(S - T + 1/3): half of ∫ uⁿ (1 - u²)/(p - u) du.
/// At the panel's own nodes the limits are taken. For `z` within a few half chords: some
/// p⁴ of the last digit is lost to cancellation.
fn moments(panel: &Panel, z: Point) -> ([f64; 3], f64) {
    let (from_middle, half) = (z - panel.middle, panel.half);
    let reach2 = half.hypot2();
    let p = [half.dot(from_middle) / reach2, half.cross(from_middle) / reach2];
    let (first, second) = ((from_middle + half).hypot2(), (from_middle - half).hypot2());
    let bow = panel.bow;

    if first < 1e-24 * reach2 || second < 1e-24 * reach2 {
        let whole = (4.0 * reach2).ln() * 0.5;
        let f2 = (2.0 * whole - 8.0 / 3.0) / 3.0;
        let (end, log) = if first < second { (-1.0, whole) } else { (1.0, f64::NEG_INFINITY) };
        return ([2.0 * whole - 2.0, -end, f2], log);
    }

    let logs = [0.5 * first.ln(), 0.5 * second.ln()];
    let p2 = [p[0] * p[0] - p[1] * p[1], 2.0 * p[0] * p[1]];
    let seen = (-2.0 * p[1]).atan2(p[0] * p[0] + p[1] * p[1] - 1.0);
    let pl = product(p, [logs[0] - logs[1], seen]);
    let s = [0.5 * pl[0] - 1.0, 0.5 * pl[1]];
    let t = product(s, p2);
    // Without 1/p, which the middle of the panel could not bear: E = L/2 - pS, and so on.
    let ps = product(p, s);
    let e = [0.5 * (logs[0] - logs[1]) - ps[0], 0.5 * seen - ps[1]];
    let rise = s[1] - t[1];
    let g2 = product(p, [s[0] - t[0] + 1.0 / 3.0, rise]);

    let f2 = (logs[0] + logs[1] + 2.0 * t[0] - 2.0 / 3.0) / 3.0;
    let f0 = logs[0] + logs[1] + 2.0 * s[0] + 2.0 * bow * e[1];
    let f1 = -e[0] + 2.0 * bow * rise;
    ([f0, f1, f2 + 2.0 * bow * g2[1]], logs[1])
}

fn product(a: [f64; 2], b: [f64; 2]) -> [f64; 2] {
    [a[0] * b[0] - a[1] * b[1], a[0] * b[1] + a[1] * b[0]]
}

#[cfg(test)]
#[allow(clippy::print_stdout)]
mod tests {
    use super::*;
    use crate::section::{Section, TrailingEdge};

    /// Abscissae and weights of Gauss and Legendre's rule, by Newton's method on the recurrence.
    fn gauss(order: usize) -> Vec<(f64, f64)> {
        (0..order)
            .map(|i| {
                let mut u = (std::f64::consts::PI * (i as f64 + 0.75) / (order as f64 + 0.5)).cos();
                let mut slope = 1.0;
                for _ in 0..50 {
                    let (mut before, mut now) = (1.0, u);
                    for k in 2..=order {
                        let next = ((2 * k - 1) as f64 * u * now - (k - 1) as f64 * before) / k as f64;
                        (before, now) = (now, next);
                    }
                    slope = order as f64 * (u * now - before) / (u * u - 1.0);
                    u -= now / slope;
                }
                (u, 2.0 / ((1.0 - u * u) * slope * slope))
            })
            .collect()
    }

    /// The same moments by quadrature on `pieces` equal pieces: shares nothing with the closed
    /// form or the series but the integrand.
    fn by_quadrature(panel: &Panel, z: Point, rule: &[(f64, f64)], pieces: usize) -> [f64; 3] {
        let mut sum = [0.0; 3];
        for piece in 0..pieces {
            for &(node, weight) in rule {
                let u = -1.0 + (2.0 * piece as f64 + 1.0 + node) / pieces as f64;
                let from = z - (panel.middle + u * panel.half);
                let risen = panel.bow * (1.0 - u * u) * panel.half.turn_90();
                let value = 0.5 * from.hypot2().ln() - from.dot(risen) / from.hypot2();
                for (n, sum) in sum.iter_mut().enumerate() {
                    *sum += value * u.powi(n as i32) * weight / pieces as f64;
                }
            }
        }
        sum
    }

    #[test]
    fn closed_form_agrees_with_quadrature_near_a_panel() {
        let panel = Panel {
            middle: Point::new(0.3, -0.2),
            half: crate::geometry::Vec2::new(0.02, -0.013),
            bow: 0.08,
            bend: [0.0; 4],
        };
        let rule = gauss(20);
        let mut worst: f64 = 0.0;
        for (along, across) in [(0.0, 0.4), (0.3, -0.2), (1.0, 0.3), (-1.4, 0.1), (2.0, 0.0), (-3.0, 2.0)] {
            let z = panel.middle + along * panel.half + across * panel.half.turn_90();
            let (closed, _) = moments(&panel, z);
            let quadrature = by_quadrature(&panel, z, &rule, 40);
            worst = closed.iter().zip(quadrature).map(|(a, b)| (a - b).abs()).fold(worst, f64::max);
        }
        println!("closed form against quadrature: {worst:.1e}");
        assert!(worst < 1e-12, "{worst:e}");
    }

    #[test]
    fn matrix_agrees_with_quadrature_everywhere() {
        let rule = gauss(20);
        for (name, edge, count) in [
            ("NACA 4412", TrailingEdge::Published, 60),
            ("NACA 0006", TrailingEdge::Closed, 61),
            ("NACA 0021", TrailingEdge::Closed, 200),
        ] {
            let section = Section::from_designation(name, edge).expect("a section");
            let panelling = Panelling::of(&section, count).expect("panels");
            let nodes = panelling.nodes();
            let matrix = VortexInfluence::of(&panelling, 0);
            let mut expected = vec![vec![0.0; nodes.len() + 3]; nodes.len()];
            for (j, panel) in panelling.panels().iter().enumerate() {
                let scale = constants_of(panel).scale;
                for (i, &z) in nodes.iter().enumerate() {
                    let own = z == nodes[j] || z == nodes[j + 1];
                    let close = (z - panel.middle).hypot2() < 40.0 * panel.half.hypot2();
                    let [f0, f1, f2] = match (own, close) {
                        (true, _) => moments(panel, z).0,
                        (false, true) => by_quadrature(panel, z, &rule, 200),
                        (false, false) => by_quadrature(panel, z, &rule, 1),
                    };
                    let row = &mut expected[i][j..j + 4];
                    for (entry, weight) in row.iter_mut().zip(panel.bend) {
                        *entry += scale * weight * (f2 - f0);
                    }
                    row[1] += scale * (f0 - f1);
                    row[2] += scale * (f0 + f1);
                }
            }
            let mut worst: f64 = 0.0;
            for (i, row) in expected.iter().enumerate() {
                for node in 0..nodes.len() {
                    worst = worst.max((matrix.at(i, node) - row[node + 1]).abs());
                }
            }
            println!("{name}, {count} panels: matrix against quadrature {worst:.1e}");
            assert!(worst < 1e-13, "{name}: {worst:e}");
        }
    }
}
