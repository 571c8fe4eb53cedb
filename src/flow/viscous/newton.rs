//! One step of Newton's method for layers and outer flow together.
//!
//! Unknown changes are those of the mass defects (positive along the outline) and of the place of
//! stagnation. Momentum thickness, amplification and shear stress follow from them along each
//! side: their equations link a station to the one ahead of it, and each is eliminated as it is
//! met, as a row over the unknowns. What is left, the shape equation of every station, is one
//! dense system.

use super::dense::{add, combine, dot, transpose};
use super::dual::Dual;
use super::interval::{FIRST, FIRST_XI, Residual, SECOND, SECOND_XI, TRANSITION, VARIABLES, similar};
use super::side::{Station, equations, growth_ahead};
use super::state::{Layers, Problem, shear_at_edge};
use crate::flow::lu::solve_in_place;

/// Changes of all unknowns, by station.
pub(super) struct Step {
    pub(super) theta: Vec<f64>,
    /// Positive along the outline.
    pub(super) mass: Vec<f64>,
    /// Of the speeds, positive along the outline.
    pub(super) speed: Vec<f64>,
}

/// Coefficients of the mass defects, of the place of stagnation, and a constant.
type Row = Vec<f64>;

/// Room for the equations, kept from step to step.
#[derive(Default)]
pub(super) struct Workspace {
    /// θ of every station.
    theta: Vec<Row>,
    /// What is left after elimination: a row for each equation.
    rows: Vec<f64>,
    /// The same by columns, the last of them the right-hand side.
    block: Vec<f64>,
}

struct System<'a> {
    problem: &'a Problem<'a>,
    layers: &'a Layers,
    /// Mass defects.
    count: usize,
    workspace: &'a mut Workspace,
}

pub(super) fn newton_step(problem: &Problem, layers: &Layers, workspace: &mut Workspace) -> Option<Step> {
    let count = problem.coupling.count();
    let (size, width) = (count + 1, count + 2);
    let stride = size.next_multiple_of(8);
    workspace.theta.resize_with(count, || vec![0.0; width]);
    workspace.rows.resize(size * width, 0.0);
    workspace.block.resize(width * stride, 0.0);
    let mut system = System { problem, layers, count, workspace: &mut *workspace };
    system.place_of_stagnation();
    let ends = [0, 1].map(|side| system.side(side));
    system.wake(&ends);
    let Workspace { theta, rows, block } = workspace;
    transpose(rows, width, block, stride, size);
    for right in &mut block[size * stride..] {
        *right = -*right;
    }
    solve_in_place(block, stride, size);
    let solution = &block[size * stride..][..size];
    if !solution.iter().all(|value| value.is_finite()) {
        return None;
    }
    let theta = theta.iter().map(|row| dot(&row[..size], solution) + row[size]).collect();
    let mass = solution[..count].to_vec();
    let speed = (0..count).map(|i| dot(problem.outer.response(i), &mass)).collect();
    Some(Step { theta, mass, speed })
}

/// Derivatives of an equation by what is not eliminated at a station: speed and mass defect in
/// place of δ*, which is m/u less dead air.
struct ByStation {
    theta: f64,
    shear: f64,
    speed: f64,
    mass: f64,
    xi: f64,
    /// What δ* is off the mass defect by.
    constant: f64,
}

fn by_station(equation: &Dual<VARIABLES>, places: [usize; 4], xi: usize, station: &Station) -> ByStation {
    let [shear, theta, delta_star, speed] = places.map(|place| equation.slope[place]);
    let follows = if station.held { 0.0 } else { station.sign };
    ByStation {
        theta,
        shear,
        speed: (speed - delta_star * (station.delta_star + station.gap) / station.speed) * follows,
        mass: delta_star / station.speed * station.sign,
        xi: equation.slope[xi] * follows,
        constant: delta_star * (station.mass - station.own_mass()) / station.speed,
    }
}

/// What is carried from one station to the next; θ is that of the last station.
struct Carried {
    last: usize,
    shear: Row,
    amplification: Row,
    /// Growth of the amplification at the last station and the one before.
    growth: [Row; 2],
}

impl System<'_> {
    fn row(&self) -> Row {
        vec![0.0; self.count + 2]
    }

    /// Room of an equation: sum of the row and the unknowns is nothing.
    fn equation(&mut self, equation: usize) -> &mut [f64] {
        let width = self.count + 2;
        &mut self.workspace.rows[equation * width..][..width]
    }

    fn place_of_stagnation(&mut self) {
        let mut row = self.row();
        row[self.count] = 1.0;
        for (k, slope) in self.layers.stagnation.slope.into_iter().enumerate() {
            add(&mut row, -slope, self.problem.outer.response(self.layers.node + k));
        }
        self.equation(self.count).copy_from_slice(&row);
    }

    /// Adds what the speed, mass defect and length at a station give to a row.
    fn add_station(&self, row: &mut [f64], by: &ByStation, station: &Station) {
        add(row, by.speed, self.problem.outer.response(station.index));
        row[station.index] += by.mass;
        // A length from the stagnation point falls where that point moves with the flow.
        row[self.count] -= by.xi;
        row[self.count + 1] += by.constant;
    }

    /// Eliminates along a side; gives what it carries at the trailing edge.
    fn side(&mut self, side: usize) -> Carried {
        let layers = self.layers;
        let stations = &layers.sides[side];
        let transition = layers.transitions[side];
        let mut carried = self.first_station(&stations[0]);
        let nothing = self.row();
        for i in 1..stations.len() {
            let laminar_ahead = !stations[i - 1].turbulent;
            let mut place = None;
            if laminar_ahead {
                self.grow(&mut carried, stations, i);
                if let Some(transition) = transition.filter(|t| t.behind == i) {
                    let given = transition.tripped || transition.held;
                    place = Some(self.place_of_transition(&carried, stations, i, given));
                }
            }
            let r = equations(stations, i, transition.as_ref(), self.problem.reynolds);
            self.eliminate(
                &mut carried,
                &r,
                &stations[i - 1],
                &stations[i],
                place.as_ref().unwrap_or(&nothing),
            );
        }
        carried
    }

    fn first_station(&mut self, first: &Station) -> Carried {
        let layer = first.layer.among::<VARIABLES>(SECOND);
        let r = similar(&layer, Dual::variable(first.xi, SECOND_XI), 1.0);
        let mut carried = Carried {
            last: first.index,
            shear: self.row(),
            amplification: self.row(),
            growth: [self.row(), self.row()],
        };
        let nothing = self.row();
        self.eliminate(&mut carried, &r, first, first, &nothing);
        carried
    }

    /// Rows of the growth of amplification at station `i - 1`, and of the amplification at `i`.
    fn grow(&self, carried: &mut Carried, stations: &[Station], i: usize) {
        let ahead = &stations[i - 1];
        let growth = ahead.layer.growth.among::<VARIABLES>(SECOND);
        let by = by_station(&growth, SECOND, SECOND_XI, ahead);
        let mut row = self.row();
        add(&mut row, by.theta, &self.workspace.theta[carried.last]);
        self.add_station(&mut row, &by, ahead);
        carried.growth.swap(0, 1);
        carried.growth[0] = row;
        let (_, weights) = growth_ahead(stations, i);
        let length = stations[i].xi - ahead.xi;
        for (weight, growth) in weights.into_iter().zip(&carried.growth) {
            add(&mut carried.amplification, weight * length, growth);
        }
    }

    /// Where transition takes place, when `carried.amplification` is that at station `i`.
    fn place_of_transition(&self, carried: &Carried, stations: &[Station], i: usize, given: bool) -> Row {
        let mut row = self.row();
        row[self.count] -= stations[i].sign;
        if given {
            return row;
        }
        let growth = stations[i].growth;
        let transition = self.layers.transitions[usize::from(stations[i].sign > 0.0)];
        let Some(part) = transition.map(|t| t.xi - stations[i - 1].xi).filter(|_| growth > 0.0) else {
            return row;
        };
        // The amplification at the place itself is given: N(i − 1) + part · growth, where what the
        // growth changes by counts for the part only.
        let (_, weights) = growth_ahead(stations, i);
        let length = stations[i].xi - stations[i - 1].xi;
        add(&mut row, -1.0 / growth, &carried.amplification);
        for (weight, change) in weights.into_iter().zip(&carried.growth) {
            add(&mut row, weight * (length - part) / growth, change);
        }
        row
    }

    /// Solves momentum and shear stress at the second station for θ and √C_τ, and puts the shape
    /// equation, with both eliminated, into the system.
    fn eliminate(
        &mut self,
        carried: &mut Carried,
        r: &Residual<VARIABLES>,
        first: &Station,
        second: &Station,
        place: &[f64],
    ) {
        let count = self.count;
        let similar = first.index == second.index;
        let equations = [&r.momentum, &r.shear, &r.shape];
        let ahead = equations.map(|equation| {
            let by = by_station(equation, FIRST, FIRST_XI, first);
            if similar {
                ByStation { theta: 0.0, shear: 0.0, speed: 0.0, mass: 0.0, xi: 0.0, constant: 0.0 }
            } else {
                by
            }
        });
        let here = equations.map(|equation| by_station(equation, SECOND, SECOND_XI, second));
        // θ, √C_τ and what is left of the shape equation, as sums of the equations.
        let [momentum, shear, shape] = &here;
        let [theta, stress] = if second.turbulent {
            let determinant = momentum.theta * shear.shear - momentum.shear * shear.theta;
            [
                [-shear.shear / determinant, momentum.shear / determinant],
                [shear.theta / determinant, -momentum.theta / determinant],
            ]
        } else {
            [[-1.0 / momentum.theta, 0.0], [0.0; 2]]
        };
        let left = [0, 1].map(|k| shape.theta * theta[k] + shape.shear * stress[k]);
        let sums = [[theta[0], theta[1], 0.0], [stress[0], stress[1], 0.0], [left[0], left[1], 1.0]];
        let of = |part: fn(&ByStation) -> f64, by: &[ByStation; 3], sum: &[f64; 3]| -> f64 {
            std::iter::zip(by, sum).map(|(by, factor)| factor * part(by)).sum()
        };
        let weights = sums.map(|sum| {
            [
                of(|by| by.theta, &ahead, &sum),
                of(|by| by.shear, &ahead, &sum),
                of(|by| by.speed, &ahead, &sum),
                of(|by| by.speed, &here, &sum),
            ]
        });

        let mut theta_row = std::mem::take(&mut self.workspace.theta[second.index]);
        if theta_row.is_empty() {
            theta_row = self.row();
        }
        let mut stress_row = self.row();
        let nothing: &[f64] = if similar { &stress_row.clone() } else { &[] };
        let width = count + 2;
        let Workspace { theta, rows, .. } = &mut *self.workspace;
        let left_row = &mut rows[second.index * width..][..width];
        let (before, shear_before): (&[f64], &[f64]) =
            if similar { (nothing, nothing) } else { (&theta[carried.last], &carried.shear) };
        let response = |station: &Station| self.problem.outer.response(station.index);
        combine(
            [&mut theta_row, &mut stress_row, &mut *left_row],
            &weights,
            [before, shear_before, response(first), response(second)],
        );
        let tail = |row: &[f64]| if row.len() == width { [row[count], row[count + 1]] } else { [0.0; 2] };
        let tails = [tail(before), tail(shear_before)];
        for ((row, sum), weights) in
            [&mut theta_row[..], &mut stress_row[..], left_row].into_iter().zip(&sums).zip(&weights)
        {
            // Responses are shorter than rows by these two.
            let xi = of(|by| by.xi, &ahead, sum) + of(|by| by.xi, &here, sum);
            row[count] = weights[0] * tails[0][0] + weights[1] * tails[1][0] - xi;
            let constant = of(|by| by.constant, &ahead, sum) + of(|by| by.constant, &here, sum);
            let value: f64 =
                std::iter::zip(equations, sum).map(|(equation, factor)| factor * equation.value).sum();
            row[count + 1] = weights[0] * tails[0][1] + weights[1] * tails[1][1] + constant + value;
            row[first.index] += of(|by| by.mass, &ahead, sum);
            row[second.index] += of(|by| by.mass, &here, sum);
            let by_place: f64 = std::iter::zip(equations, sum)
                .map(|(equation, factor)| factor * equation.slope[TRANSITION])
                .sum();
            add(row, by_place, place);
        }
        theta[second.index] = theta_row;
        carried.last = second.index;
        carried.shear = stress_row;
    }

    /// The wake begins with the sums of both sides, and is a side of its own from there.
    fn wake(&mut self, ends: &[Carried; 2]) {
        let layers = self.layers;
        let wake = &layers.sides[2];
        let Some(first) = wake.first() else { return };
        let mut carried = Carried {
            last: first.index,
            shear: self.row(),
            amplification: Vec::new(),
            growth: [Vec::new(), Vec::new()],
        };
        let (mut mass, mut theta) = (self.row(), self.row());
        mass[first.index] = 1.0;
        let mut defect = first.mass - self.problem.base() * first.speed;
        for (end, stations) in ends.iter().zip(&layers.sides) {
            let Some(edge) = stations.last() else { return };
            let theta_at_edge = self.workspace.theta[end.last].clone();
            add(&mut theta, 1.0, &theta_at_edge);
            mass[edge.index] -= edge.sign;
            defect -= edge.mass;
            // √C_τ is the mean of both sides by their momentum.
            let shear = shear_at_edge(edge, self.problem.reynolds);
            let by = by_station(&shear.among(SECOND), SECOND, SECOND_XI, edge);
            let mut row = self.row();
            add(&mut row, by.theta, &theta_at_edge);
            if edge.turbulent {
                add(&mut row, 1.0, &end.shear);
            }
            self.add_station(&mut row, &by, edge);
            add(&mut carried.shear, edge.theta / first.theta, &row);
            add(&mut carried.shear, (shear.value - first.shear) / first.theta, &theta_at_edge);
        }
        add(&mut mass, -self.problem.base(), self.problem.outer.response(first.index));
        mass[self.count + 1] = defect;
        self.equation(first.index).copy_from_slice(&mass);
        self.workspace.theta[first.index] = theta;
        let nothing = self.row();
        for i in 1..wake.len() {
            let r = equations(wake, i, None, self.problem.reynolds);
            self.eliminate(&mut carried, &r, &wake[i - 1], &wake[i], &nothing);
        }
    }
}
