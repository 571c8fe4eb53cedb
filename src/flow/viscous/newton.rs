//! One step of Newton's method for layers and outer flow together.
//!
//! Unknown changes are those of the mass defects (positive along the outline) and of the place of
//! stagnation. Momentum thickness, amplification and shear stress follow from them along each
//! side: their equations link a station to the one ahead of it, and each is eliminated as it is
//! met, as a row over the unknowns. What is left, the shape equation of every station, is one
//! dense system.

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

struct System<'a> {
    problem: &'a Problem<'a>,
    layers: &'a Layers,
    /// Mass defects.
    count: usize,
    /// Columns of the dense system one after the other, right-hand side last.
    block: Vec<f64>,
    stride: usize,
    /// θ of every station.
    theta: Vec<Row>,
}

pub(super) fn newton_step(problem: &Problem, layers: &Layers) -> Option<Step> {
    let count = problem.coupling.count();
    let size = count + 1;
    let stride = size.next_multiple_of(8);
    let mut system = System {
        problem,
        layers,
        count,
        block: vec![0.0; (size + 1) * stride],
        stride,
        theta: vec![Vec::new(); count],
    };
    system.place_of_stagnation();
    let ends = [0, 1].map(|side| system.side(side));
    system.wake(&ends);
    let System { mut block, theta, .. } = system;
    solve_in_place(&mut block, stride, size);
    let solution = &block[size * stride..][..size];
    if !solution.iter().all(|value| value.is_finite()) {
        return None;
    }
    let theta = theta.iter().map(|row| evaluate(row, solution)).collect();
    let mass = solution[..count].to_vec();
    let speed = (0..count).map(|i| dot(problem.outer.response(i), &mass)).collect();
    Some(Step { theta, mass, speed })
}

fn dot(a: &[f64], b: &[f64]) -> f64 {
    std::iter::zip(a, b).map(|(a, b)| a * b).sum()
}

fn evaluate(row: &[f64], solution: &[f64]) -> f64 {
    dot(row, solution) + row[solution.len()]
}

fn add(row: &mut [f64], factor: f64, other: &[f64]) {
    if factor != 0.0 {
        for (entry, value) in row.iter_mut().zip(other) {
            *entry += factor * value;
        }
    }
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

/// What is carried from one station to the next.
struct Carried {
    theta: Row,
    shear: Row,
    amplification: Row,
    /// Growth of the amplification at the last station and the one before.
    growth: [Row; 2],
}

impl System<'_> {
    fn row(&self) -> Row {
        vec![0.0; self.count + 2]
    }

    fn put(&mut self, equation: usize, row: &[f64], right: f64) {
        for (column, value) in row[..=self.count].iter().enumerate() {
            self.block[column * self.stride + equation] = *value;
        }
        self.block[(self.count + 1) * self.stride + equation] = right;
    }

    fn place_of_stagnation(&mut self) {
        let mut row = self.row();
        row[self.count] = 1.0;
        for (k, slope) in self.layers.stagnation.slope.into_iter().enumerate() {
            add(&mut row, -slope, self.problem.outer.response(self.layers.node + k));
        }
        self.put(self.count, &row, 0.0);
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
        for i in 1..stations.len() {
            let laminar_ahead = !stations[i - 1].turbulent;
            let mut place = self.row();
            if laminar_ahead {
                self.grow(&mut carried, stations, i);
                if let Some(transition) = transition.filter(|t| t.behind == i) {
                    place = self.place_of_transition(
                        &carried,
                        stations,
                        i,
                        transition.tripped || transition.held,
                    );
                }
            }
            let r = equations(stations, i, transition.as_ref(), self.problem.reynolds);
            self.eliminate(&mut carried, &r, &stations[i - 1], &stations[i], &place);
        }
        carried
    }

    fn first_station(&mut self, first: &Station) -> Carried {
        let layer = first.layer.among::<VARIABLES>(SECOND);
        let r = similar(&layer, Dual::variable(first.xi, SECOND_XI), 1.0);
        let mut carried = Carried {
            theta: self.row(),
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
        add(&mut row, by.theta, &carried.theta);
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
        let similar = first.index == second.index;
        let equations = [&r.momentum, &r.shear, &r.shape];
        let rows = equations.map(|equation| {
            let mut row = self.row();
            row[self.count + 1] = equation.value;
            if !similar {
                let by = by_station(equation, FIRST, FIRST_XI, first);
                add(&mut row, by.theta, &carried.theta);
                add(&mut row, by.shear, &carried.shear);
                self.add_station(&mut row, &by, first);
            }
            let by = by_station(equation, SECOND, SECOND_XI, second);
            self.add_station(&mut row, &by, second);
            add(&mut row, equation.slope[TRANSITION], place);
            row
        });
        let by = equations.map(|equation| by_station(equation, SECOND, SECOND_XI, second));
        let [momentum, shear, shape] = rows;
        let mut theta = self.row();
        let mut stress = self.row();
        if second.turbulent {
            let determinant = by[0].theta * by[1].shear - by[0].shear * by[1].theta;
            add(&mut theta, -by[1].shear / determinant, &momentum);
            add(&mut theta, by[0].shear / determinant, &shear);
            add(&mut stress, by[1].theta / determinant, &momentum);
            add(&mut stress, -by[0].theta / determinant, &shear);
        } else {
            add(&mut theta, -1.0 / by[0].theta, &momentum);
        }
        let mut left = shape;
        add(&mut left, by[2].theta, &theta);
        add(&mut left, by[2].shear, &stress);
        let right = -left[self.count + 1];
        self.put(second.index, &left, right);
        self.theta[second.index] = theta.clone();
        carried.theta = theta;
        carried.shear = stress;
    }

    /// The wake begins with the sums of both sides, and is a side of its own from there.
    fn wake(&mut self, ends: &[Carried; 2]) {
        let layers = self.layers;
        let wake = &layers.sides[2];
        let Some(first) = wake.first() else { return };
        let mut carried = Carried {
            theta: self.row(),
            shear: self.row(),
            amplification: Vec::new(),
            growth: [Vec::new(), Vec::new()],
        };
        let mut mass = self.row();
        mass[first.index] = 1.0;
        let mut defect = first.mass - self.problem.base() * first.speed;
        for (end, stations) in ends.iter().zip(&layers.sides) {
            let Some(edge) = stations.last() else { return };
            add(&mut carried.theta, 1.0, &end.theta);
            mass[edge.index] -= edge.sign;
            defect -= edge.mass;
            // √C_τ is the mean of both sides by their momentum.
            let shear = shear_at_edge(edge, self.problem.reynolds);
            let by = by_station(&shear.among(SECOND), SECOND, SECOND_XI, edge);
            let mut row = self.row();
            add(&mut row, by.theta, &end.theta);
            if edge.turbulent {
                add(&mut row, 1.0, &end.shear);
            }
            self.add_station(&mut row, &by, edge);
            add(&mut carried.shear, edge.theta / first.theta, &row);
            add(&mut carried.shear, (shear.value - first.shear) / first.theta, &end.theta);
        }
        add(&mut mass, -self.problem.base(), self.problem.outer.response(first.index));
        self.put(first.index, &mass, -defect);
        self.theta[first.index].clone_from(&carried.theta);
        let nothing = self.row();
        for i in 1..wake.len() {
            let r = equations(wake, i, None, self.problem.reynolds);
            self.eliminate(&mut carried, &r, &wake[i - 1], &wake[i], &nothing);
        }
    }
}
