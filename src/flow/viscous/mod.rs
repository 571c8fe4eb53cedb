//! Viscous flow about a section: boundary layers and wake coupled to the potential flow.

mod closure;
mod coupling;
mod dual;
mod interval;
mod layer;
mod march;
mod newton;
mod side;
mod solve;
mod sources;
mod state;
mod wake;

use super::{FlowError, Panelling};
use coupling::Coupling;
use solve::{converge, first_account};
use state::Problem;

/// What the water and the surface are like.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Conditions {
    /// Reynolds number by chord and onset speed.
    pub reynolds: f64,
    /// Amplification exponent N at which transition takes place.
    pub amplification: f64,
    /// Where a trip makes the upper side turbulent, in chords.
    pub trip_upper: Option<f64>,
    /// The same for the lower side.
    pub trip_lower: Option<f64>,
}

/// Solver.
pub struct Viscous {
    panelling: Panelling,
    coupling: Coupling,
}

impl Viscous {
    /// Factors.
    pub fn new(panelling: &Panelling) -> Result<Self, FlowError> {
        Ok(Self { panelling: panelling.clone(), coupling: Coupling::of(panelling)? })
    }

    /// Debug.
    pub fn debug(&self, incidence: f64, conditions: &Conditions) {
        let problem = Problem::new(&self.coupling, incidence, conditions);
        let nose = self.panelling.len() / 2;
        if std::env::var("VISCOUS_TE").is_ok() {
            let ns = self.coupling.surface;
            let mu: Vec<f64> = self.coupling.points.iter().enumerate().map(|(i,p)| if i < nose { -0.004*p.x*p.x } else if i < ns { 0.004*p.x*p.x } else { 0.008*(-(p.x-1.0)/0.3).exp()*(1.0+(p.x-1.0)*(2.0+1.0/0.3)) }).collect();
            let zero = vec![0.0; mu.len()];
            let a = problem.outer.speeds(&mu); let b = problem.outer.speeds(&zero);
            for i in (0..12).chain(ns-4..ns+12) { eprintln!("{i} x {:.4} inv {:.4} change {:.4}", self.coupling.points[i].x, b[i], a[i]-b[i]); }
        }
        let Some(mut unknowns) = first_account(&problem, nose) else { eprintln!("no account"); return };
        if std::env::var("VISCOUS_CHECK").is_ok() { solve::check(&problem, &unknowns); return; }
        if std::env::var("VISCOUS_START").is_ok() {
        let layers = problem.layers(&mut unknowns);
        for side in &layers.sides { for s in side {
            let p = self.coupling.points[s.index];
            eprintln!("{} x {:.4} xi {:.4} ue {:.4} th {:.3e} H {:.3} N {:.2} C {:.4} turb {}", s.index, p.x, s.xi, s.speed, s.theta, s.delta_star/s.theta, s.amplification, s.shear, s.turbulent);
        } }
        }
        let Some((layers, convergence)) = converge(&problem, &mut unknowns) else { eprintln!("broke"); return };
        let last = layers.sides[2].last().expect("wake");
        let cd = 2.0*last.theta*last.speed.powf(0.5*(last.delta_star/last.theta+5.0));
        let loads = super::loads::loads(&self.panelling, &layers.speed[..self.coupling.surface]);
        let cl = loads.force.y * incidence.cos() - loads.force.x * incidence.sin();
        let tr = [0,1].map(|k| layers.transitions[k].map(|t| self.coupling.points[layers.sides[k][t.behind].index].x));
        eprintln!("alpha {:.2} {convergence:?} cl {cl:.4} cd {cd:.5} cm {:.4} tr {tr:?}", incidence.to_degrees(), loads.moment);
        if std::env::var("VISCOUS_END").is_ok() {
        for side in &layers.sides { for s in side {
            let p = self.coupling.points[s.index];
            eprintln!("{} x {:.4} xi {:.4} ue {:.4} th {:.3e} H {:.3} N {:.2} C {:.4} turb {}", s.index, p.x, s.xi, s.speed, s.theta, s.delta_star/s.theta, s.amplification, s.shear, s.turbulent);
        } }
        }
    }
}
