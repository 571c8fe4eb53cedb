//! One step of Newton's method for layers and outer flow together.
//!
//! Unknown changes are those of the mass defects (positive along the outline) and of the place of
//! stagnation. Momentum thickness, amplification and shear stress follow from them along each
//! side: their equations link a station to the one ahead of it, and each is eliminated as it is
//! met, as a row over the unknowns. What is left, the shape equation of every station, is one
//! dense system.
//!
//! Constants are eliminated like any column of these rows. So with rows of nothing else the same
//! elimination gives another right-hand side for the factors that are there, and a step of the
//! chord method.

use super::dual::Dual;
use super::interval::{FIRST, FIRST_XI, Residual, SECOND, SECOND_XI, TRANSITION, VARIABLES, similar};
use super::side::{Station, equations, growth_ahead};
use super::state::{Layers, Problem, shear_at_edge};
use crate::flow::dense::{add, combine, dot};
use crate::flow::lu::{factor, solve_transposed};

/// Changes of all unknowns, by station.
pub(super) struct Step {
    pub(super) theta: Vec<f64>,
    /// Positive along the outline.
    pub(super) mass: Vec<f64>,
    /// Of the speeds, positive along the outline.
    pub(super) speed: Vec<f64>,
}

/// Coefficients of the mass defects and of the place of stagnation, or of none of them, and a
/// constant.
type Row = Vec<f64>;

/// The equations after elimination.
#[derive(Default)]
struct Eliminated {
    /// θ of every station.
    theta: Vec<Row>,
    /// What is left: a row for each equation.
    rows: Vec<f64>,
    stride: usize,
}

/// The factors of an interval in the elimination. Along a laminar layer close to separation they
/// multiply to great numbers, and so the constants need the very factors that the rows had.
#[derive(Clone, Copy, Default)]
struct Factors {
    /// θ, √C_τ and what is left of the shape equation, as sums of the equations.
    sums: [[f64; 3]; 3],
    /// What they have of θ and √C_τ ahead, and of the speeds ahead and here.
    weights: [[f64; 4]; 3],
    /// Their change with the place of transition.
    by_place: [f64; 3],
    /// Growth of the amplification ahead, by what is there, and what it counts for with the one before.
    growth: ByStation,
    growth_lengths: [f64; 2],
    /// Change of the place of transition by the amplification here and by both growths ahead.
    place: [f64; 3],
}

/// The equations of the last full step, with their factors.
#[derive(Default)]
pub(super) struct Newton {
    full: Eliminated,
    /// Constants alone.
    narrow: Eliminated,
    /// By the station at the end of the interval.
    factors: Vec<Factors>,
    pivots: Vec<usize>,
}

struct System<'a> {
    problem: &'a Problem<'a>,
    layers: &'a Layers,
    /// Unknowns that rows have coefficients of: mass defects and the place of stagnation, or none.
    columns: usize,
    factors: &'a mut [Factors],
    room: &'a mut Eliminated,
}

impl Newton {
    /// Newton's step.
    pub(super) fn step(&mut self, problem: &Problem, layers: &Layers) -> Option<Step> {
        let size = problem.coupling.count() + 1;
        self.factors.resize(size, Factors::default());
        eliminate_all(problem, layers, size, &mut self.factors, &mut self.full);
        let Eliminated { rows, stride, .. } = &mut self.full;
        let mut right: Vec<f64> = rows.chunks_exact(*stride).map(|row| -row[size]).collect();
        self.pivots = factor(rows, *stride, size);
        solve_transposed(rows, *stride, &self.pivots, &mut right);
        let constants: Vec<f64> = self.full.theta.iter().map(|row| row[size]).collect();
        self.finish(problem, right, &constants)
    }

    /// A step with the derivatives of the last full one, which takes a fraction of the time.
    pub(super) fn chord_step(&mut self, problem: &Problem, layers: &Layers) -> Option<Step> {
        eliminate_all(problem, layers, 0, &mut self.factors, &mut self.narrow);
        let mut right: Vec<f64> = self.narrow.rows.iter().map(|constant| -constant).collect();
        solve_transposed(&self.full.rows, self.full.stride, &self.pivots, &mut right);
        let constants: Vec<f64> = self.narrow.theta.iter().map(|row| row[0]).collect();
        self.finish(problem, right, &constants)
    }

    /// The step that goes with changes of the unknowns; `constants` are those of θ.
    fn finish(&self, problem: &Problem, solution: Vec<f64>, constants: &[f64]) -> Option<Step> {
        if !solution.iter().all(|value| value.is_finite()) {
            return None;
        }
        let count = problem.coupling.count();
        let by_unknowns = |row: &Row| dot(&row[..solution.len()], &solution);
        let theta =
            std::iter::zip(&self.full.theta, constants).map(|(row, constant)| by_unknowns(row) + constant);
        let theta = theta.collect();
        let mass = solution[..count].to_vec();
        let speed = (0..count).map(|i| dot(problem.outer.response(i), &mass)).collect();
        Some(Step { theta, mass, speed })
    }
}

fn eliminate_all(
    problem: &Problem,
    layers: &Layers,
    columns: usize,
    factors: &mut [Factors],
    room: &mut Eliminated,
) {
    let count = problem.coupling.count();
    room.stride = if columns == 0 { 1 } else { (columns + 1).next_multiple_of(8) };
    room.theta.resize_with(count, || vec![0.0; columns + 1]);
    room.rows.resize((count + 1) * room.stride, 0.0);
    let mut system = System { problem, layers, columns, factors, room };
    system.place_of_stagnation();
    let ends = [0, 1].map(|side| system.side(side));
    system.wake(&ends);
}

/// Derivatives of an equation by what is not eliminated at a station: speed and mass defect in
/// place of δ*, which is m/u less dead air.
#[derive(Clone, Copy, Default)]
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

/// A part of the equations, summed with factors.
fn total(part: fn(&ByStation) -> f64, by: &[ByStation; 3], sum: &[f64; 3]) -> f64 {
    std::iter::zip(by, sum).map(|(by, factor)| factor * part(by)).sum()
}

/// The sums and weights of [`Factors`], from momentum, shear stress and shape.
fn factors_of(
    ahead: &[ByStation; 3],
    here: &[ByStation; 3],
    turbulent: bool,
) -> ([[f64; 3]; 3], [[f64; 4]; 3]) {
    let [momentum, shear, shape] = here;
    let [theta, stress] = if turbulent {
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
    let weights = sums.map(|sum| {
        [
            total(|by| by.theta, ahead, &sum),
            total(|by| by.shear, ahead, &sum),
            total(|by| by.speed, ahead, &sum),
            total(|by| by.speed, here, &sum),
        ]
    });
    (sums, weights)
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
        vec![0.0; self.columns + 1]
    }

    /// Room of an equation: sum of the row and the unknowns is nothing.
    fn equation(&mut self, equation: usize) -> &mut [f64] {
        &mut self.room.rows[equation * self.room.stride..][..self.columns + 1]
    }

    /// The speed at a station by the mass defects, as far as rows have them.
    fn response(&self, station: usize) -> &[f64] {
        if self.columns == 0 { &[] } else { self.problem.outer.response(station) }
    }

    fn add_mass(&self, row: &mut [f64], station: usize, value: f64) {
        if self.columns > 0 {
            row[station] += value;
        }
    }

    /// To a row, by a change of a length from the stagnation point: it falls where that point moves
    /// with the flow.
    fn add_length(&self, row: &mut [f64], value: f64) {
        if let Some(place) = self.columns.checked_sub(1) {
            row[place] -= value;
        }
    }

    fn place_of_stagnation(&mut self) {
        let mut row = self.row();
        self.add_length(&mut row, -1.0);
        for (k, slope) in self.layers.stagnation.slope.into_iter().enumerate() {
            add(&mut row, -slope, self.response(self.layers.node + k));
        }
        self.equation(self.problem.coupling.count()).copy_from_slice(&row);
    }

    /// Adds what the speed, mass defect and length at a station give to a row.
    fn add_station(&self, row: &mut [f64], by: &ByStation, station: &Station) {
        add(row, by.speed, self.response(station.index));
        self.add_mass(row, station.index, by.mass);
        self.add_length(row, by.xi);
        row[self.columns] += by.constant;
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
    fn grow(&mut self, carried: &mut Carried, stations: &[Station], i: usize) {
        let ahead = &stations[i - 1];
        let growth = ahead.layer.growth.among::<VARIABLES>(SECOND);
        let now = by_station(&growth, SECOND, SECOND_XI, ahead);
        let factors = &mut self.factors[stations[i].index];
        if self.columns > 0 {
            let (_, weights) = growth_ahead(stations, i);
            factors.growth = now;
            factors.growth_lengths = weights.map(|weight| weight * (stations[i].xi - ahead.xi));
        }
        let by = ByStation { constant: now.constant, ..factors.growth };
        let lengths = factors.growth_lengths;
        let mut row = self.row();
        add(&mut row, by.theta, &self.room.theta[carried.last]);
        self.add_station(&mut row, &by, ahead);
        carried.growth.swap(0, 1);
        carried.growth[0] = row;
        for (length, growth) in lengths.into_iter().zip(&carried.growth) {
            add(&mut carried.amplification, length, growth);
        }
    }

    /// Where transition takes place, when `carried.amplification` is that at station `i`.
    fn place_of_transition(&mut self, carried: &Carried, stations: &[Station], i: usize, given: bool) -> Row {
        let mut row = self.row();
        self.add_length(&mut row, stations[i].sign);
        if given {
            return row;
        }
        if self.columns > 0 {
            let growth = stations[i].growth;
            let transition = self.layers.transitions[usize::from(stations[i].sign > 0.0)];
            let part = transition.map(|t| t.xi - stations[i - 1].xi).filter(|_| growth > 0.0);
            // The amplification at the place itself is given: N(i − 1) + part · growth, where what the
            // growth changes by counts for the part only.
            self.factors[stations[i].index].place = part.map_or([0.0; 3], |part| {
                let (_, weights) = growth_ahead(stations, i);
                let rest = (stations[i].xi - stations[i - 1].xi - part) / growth;
                [-1.0 / growth, weights[0] * rest, weights[1] * rest]
            });
        }
        let [amplification, last, before] = self.factors[stations[i].index].place;
        add(&mut row, amplification, &carried.amplification);
        add(&mut row, last, &carried.growth[0]);
        add(&mut row, before, &carried.growth[1]);
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
        let ahead = equations.map(|equation| {
            let by = by_station(equation, FIRST, FIRST_XI, first);
            if similar { ByStation::default() } else { by }
        });
        let here = equations.map(|equation| by_station(equation, SECOND, SECOND_XI, second));
        let factors = &mut self.factors[second.index];
        if self.columns > 0 {
            (factors.sums, factors.weights) = factors_of(&ahead, &here, second.turbulent);
            factors.by_place = factors.sums.map(|sum| {
                std::iter::zip(equations, sum).map(|(by, factor)| factor * by.slope[TRANSITION]).sum()
            });
        }
        let Factors { sums, weights, by_place, .. } = *factors;

        let mut theta_row = std::mem::take(&mut self.room.theta[second.index]);
        if theta_row.is_empty() {
            theta_row = self.row();
        }
        let mut stress_row = self.row();
        let nothing: &[f64] = if similar { &stress_row.clone() } else { &[] };
        let stride = self.room.stride;
        let mut block = std::mem::take(&mut self.room.rows);
        let equation = &mut block[second.index * stride..][..self.columns + 1];
        let (before, shear_before): (&[f64], &[f64]) =
            if similar { (nothing, nothing) } else { (&self.room.theta[carried.last], &carried.shear) };
        combine(
            [&mut theta_row, &mut stress_row, &mut *equation],
            &weights,
            [before, shear_before, self.response(first.index), self.response(second.index)],
        );
        // Responses have neither the place of stagnation nor the constant.
        let constant = self.columns;
        let rows = [&mut theta_row[..], &mut stress_row[..], equation];
        for (((row, sum), weights), by_place) in rows.into_iter().zip(&sums).zip(&weights).zip(by_place) {
            if let Some(place) = self.columns.checked_sub(1) {
                row[place] = weights[0] * before[place] + weights[1] * shear_before[place];
            }
            self.add_length(row, total(|by| by.xi, &ahead, sum) + total(|by| by.xi, &here, sum));
            let known = total(|by| by.constant, &ahead, sum) + total(|by| by.constant, &here, sum);
            let value: f64 =
                std::iter::zip(equations, sum).map(|(equation, factor)| factor * equation.value).sum();
            row[constant] =
                weights[0] * before[constant] + weights[1] * shear_before[constant] + known + value;
            self.add_mass(row, first.index, total(|by| by.mass, &ahead, sum));
            self.add_mass(row, second.index, total(|by| by.mass, &here, sum));
            add(row, by_place, place);
        }
        self.room.rows = block;
        self.room.theta[second.index] = theta_row;
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
        self.add_mass(&mut mass, first.index, 1.0);
        let mut defect = first.mass - self.problem.base() * first.speed;
        for (end, stations) in ends.iter().zip(&layers.sides) {
            let Some(edge) = stations.last() else { return };
            let theta_at_edge = self.room.theta[end.last].clone();
            add(&mut theta, 1.0, &theta_at_edge);
            self.add_mass(&mut mass, edge.index, -edge.sign);
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
        add(&mut mass, -self.problem.base(), self.response(first.index));
        mass[self.columns] = defect;
        self.equation(first.index).copy_from_slice(&mass);
        self.room.theta[first.index] = theta;
        let nothing = self.row();
        for i in 1..wake.len() {
            let r = equations(wake, i, None, self.problem.reynolds);
            self.eliminate(&mut carried, &r, &wake[i - 1], &wake[i], &nothing);
        }
    }
}
