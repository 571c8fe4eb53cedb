//! The cavitation bucket against exact potential flow and arithmetic by hand.
//!
//! Exact sections: T. von Kármán and E. Trefftz, *Zeitschrift für Flugtechnik und Motorluftschiffahrt* 9
//! (1918), in the symmetric case that is Joukowski's; L. M. Milne-Thomson, *Theoretical Aerodynamics*,
//! chapter 7 (from memory). Water: ITTC 7.5-02-01-03 (2011). Run with `--nocapture` to see the figures.

// Printing what was measured is part of the purpose here.
#![allow(clippy::print_stdout)]

use plankform::flow::{
    Bucket, BucketPoint, Conditions, LiftCurve, Panelling, PotentialFlow, Salinity, Viscous, Water,
};
use plankform::geometry::Point;
use plankform::section::{Section, TrailingEdge};
use std::f64::consts::{PI, TAU};

/// The symmetric section that z + 1/z makes of the circle through 1 with its centre at -`back`.
struct Joukowski {
    back: f64,
}

impl Joukowski {
    fn radius(&self) -> f64 {
        1.0 + self.back
    }

    /// From nose to trailing edge, and where the nose is, before scaling.
    fn chord_and_nose(&self) -> (f64, f64) {
        let nose = -self.back - self.radius();
        (2.0 - (nose + 1.0 / nose), nose + 1.0 / nose)
    }

    /// Point of the section, and speed along it at an incidence, for unit chord and onset.
    fn at(&self, theta: f64, incidence: f64) -> (Point, f64) {
        let (re, im) = (-self.back + self.radius() * theta.cos(), self.radius() * theta.sin());
        let square = re * re + im * im;
        let (chord, nose) = self.chord_and_nose();
        let point = Point::new((re + re / square - nose) / chord, (im - im / square) / chord);
        // dz/dζ = 1 − 1/ζ²
        let (re2, im2) = (re * re - im * im, 2.0 * re * im);
        let slope = (1.0 - re2 / (square * square)).hypot(im2 / (square * square));
        (point, (2.0 * (theta - incidence).sin() + 2.0 * incidence.sin()).abs() / slope)
    }

    /// Lift coefficient 8π (R/c) sin α.
    fn lift(&self, incidence: f64) -> f64 {
        8.0 * PI * self.radius() / self.chord_and_nose().0 * incidence.sin()
    }

    /// Greatest suction, by looking at every ten-thousandth of the way round and closing in.
    fn suction(&self, incidence: f64) -> f64 {
        let speed = |theta: f64| self.at(theta, incidence).1;
        let all = (1..20_000).map(|i| TAU * f64::from(i) / 20_000.0);
        let best = all.max_by(|a, b| speed(*a).total_cmp(&speed(*b))).expect("angles");
        let close = (-1000..=1000).map(|i| best + TAU / 2e7 * f64::from(i));
        close.map(speed).fold(0.0, f64::max).powi(2) - 1.0
    }

    fn panelling(&self, panels: usize) -> Panelling {
        let point = |i: usize| {
            let (point, _) = self.at(TAU * i as f64 / panels as f64, 0.0);
            if i == 0 || i == panels { Point::new(1.0, 0.0) } else { point }
        };
        Panelling::from_points((0..=panels).map(point).collect()).expect("panels")
    }
}

#[test]
fn suction_agrees_with_an_exact_section() {
    let exact = Joukowski { back: 0.1 };
    for (panels, within) in [(120, 0.01), (200, 0.005)] {
        let flow = PotentialFlow::new(&exact.panelling(panels)).expect("a flow");
        let mut worst = 0.0_f64;
        for degrees in [0.0_f64, 2.0, 4.0, 6.0, 8.0, 10.0] {
            let incidence = degrees.to_radians();
            let (suction, wanted) = (-flow.at(incidence).cp_min, exact.suction(incidence));
            println!("{panels} panels, {degrees}°: greatest suction {suction:.4}, exact {wanted:.4}");
            worst = worst.max((suction / wanted - 1.0).abs());
        }
        println!("{panels} panels: within {:.2} %", 100.0 * worst);
        assert!(worst < within, "{worst}");
    }
}

/// How much lift goes without cavitation at a number: where the exact suction passes it, found by
/// halving, against the bucket of the panel method.
#[test]
fn the_bucket_is_as_wide_as_that_of_an_exact_section() {
    let exact = Joukowski { back: 0.1 };
    let flow = PotentialFlow::new(&exact.panelling(200)).expect("a flow");
    let incidences: Vec<f64> = (-24..=24).map(|i| (0.5 * f64::from(i)).to_radians()).collect();
    let bucket = Bucket::without_friction(&flow, &incidences);
    for sigma in [0.8, 1.5, 3.0] {
        let (mut free, mut boils) = (0.0_f64, 0.25_f64);
        assert!(exact.suction(free) < sigma && exact.suction(boils) > sigma);
        for _ in 0..50 {
            let middle = 0.5 * (free + boils);
            if exact.suction(middle) < sigma { free = middle } else { boils = middle }
        }
        let wanted = exact.lift(free);
        let found = bucket.free_lift(sigma, 0.0).expect("lift without cavitation");
        println!("cavitation number {sigma}: lift {:.4} to {:.4}, exact ±{wanted:.4}", found.from, found.to);
        assert!((found.to - wanted).abs() < 0.01 && (found.from + wanted).abs() < 0.01);
        assert_eq!(found.open, [false, false]);
        // A margin of a fifth is the number less by as much.
        let held = bucket.free_lift(1.2 * sigma, 0.2).expect("lift without cavitation");
        assert!((held.to - found.to).abs() < 1e-12);
    }
    // Below the bottom nothing is free; above the end of the curve the end is told to be open.
    assert_eq!(bucket.free_lift(0.9 * exact.suction(0.0), 0.0), None);
    assert_eq!(bucket.free_lift(1e3, 0.0).expect("lift").open, [true, true]);
    assert_eq!(bucket.free_lift(f64::NAN, 0.0), None);
}

/// By hand: sea water of 15 °C, 1025.976 kg/m³ and 1673.87 Pa. At 0.5 m depth the head over vapour is
/// 101 325 + 1025.976 · 9.80665 · 0.5 − 1673.87 = 104 681.8 Pa. A suction of 1 boils from √(2 · 104 681.8/1025.976)
/// = 14.285 m/s on; to keep a fifth to spare, from 14.285/√1.2 = 13.040.
#[test]
fn inception_by_hand() {
    let water = Water::at(Salinity::Sea, 15.0).expect("water");
    let point = |cl: f64, suction: f64| BucketPoint { incidence: 0.1 * cl, cl, suction };
    let bucket = Bucket::through([point(0.0, 2.0), point(0.4, 0.5), point(0.8, 1.5)]);
    let at = |margin: f64| bucket.inception_speed(0.6, &water, 0.5, margin).expect("a speed");
    assert!((at(0.0) - 14.285).abs() < 1e-3, "{}", at(0.0));
    assert!((at(0.2) - 13.040).abs() < 1e-3, "{}", at(0.2));
    assert_eq!(bucket.inception_speed(0.9, &water, 0.5, 0.0), None);
    // At a number of 1.25: half way down the one side, three quarters up the other.
    let free = bucket.free_lift(1.25, 0.0).expect("lift");
    assert!((free.from - 0.2).abs() < 1e-12 && (free.to - 0.7).abs() < 1e-12);
    assert_eq!(bucket.bottom().map(|p| p.cl), Some(0.4));
    // For a plot it is cut where the suction passes 1: a third of the way down, half of the way up.
    let outline = bucket.outline(1.0);
    assert_eq!(outline.len(), 3);
    for (found, wanted) in outline.into_iter().zip([(1.0, 0.8 / 3.0), (0.5, 0.4), (1.0, 0.6)]) {
        assert!((found.0 - wanted.0).abs() < 1e-12 && (found.1 - wanted.1).abs() < 1e-12, "{found:?}");
    }
    assert!(Bucket::through([]).bottom().is_none());
    assert!(Bucket::through([point(f64::NAN, 1.0)]).free_lift(1.0, 0.0).is_none());
}

/// With friction the bucket ends at the greatest lift, and its bottom is near that without.
#[test]
fn friction_closes_the_bucket_at_the_stall() {
    let section = Section::from_designation("NACA 2412", TrailingEdge::Closed).expect("a section");
    let panelling = Panelling::of(&section, 120).expect("panels");
    let incidences: Vec<f64> = (-4..=9).map(|i| (2.0 * f64::from(i)).to_radians()).collect();
    let viscous = Viscous::new(&panelling).expect("a flow");
    let curve = LiftCurve::sweep(&viscous, &Conditions::free(1e6, 9.0), &incidences).expect("a curve");
    let bucket = Bucket::of(&curve);
    let greatest = curve.solutions().map(|s| s.cl).fold(f64::MIN, f64::max);
    let last = bucket.points().last().expect("points");
    assert_eq!(last.cl, greatest);
    assert!(last.incidence < 17f64.to_radians(), "the curve goes on beyond the stall");
    let without = Bucket::without_friction(&PotentialFlow::new(&panelling).expect("a flow"), &incidences);
    let [with, without] = [&bucket, &without].map(|b| b.bottom().expect("a bottom").suction);
    println!("bottom of the bucket: {with:.3} with friction, {without:.3} without");
    assert!((with - without).abs() < 0.08, "{with} {without}");
}
