//! The load on whole foils against lifting-line theory, images and statics.
//!
//! Values stand in `tests/reference/lifting_line.toml` with their sources, or are worked here by other
//! means than the program's. Run with `--nocapture` to see what was measured against what.

// Printing what was measured is part of the purpose here.
#![allow(clippy::print_stdout)]

use plankform::loading::{
    CurvePoint, Drive, FlapCurve, LiftingLine, Loading, LoadingError, RootEnd, SectionTable, Setting,
    SpanTables, State, ThinSection, TwoFoils, Weight,
};
use plankform::section::{Section, TrailingEdge};
use plankform::wing::{Law, Station, Wing, along};
use std::f64::consts::{FRAC_PI_2, PI, TAU};

const RHO: f64 = 1025.0;

fn station(at: f64, chord: f64) -> Station {
    let section = Section::from_designation("NACA 0012", TrailingEdge::Closed).expect("a section");
    Station { at, chord, section, twist: 0.0, sweep: 0.0, rise: 0.0, twist_about: 0.25 }
}

fn tapered(aspect_ratio: f64, taper: f64) -> Wing {
    let (reach, root) = (500.0, 2.0 * 1000.0 / aspect_ratio / (1.0 + taper));
    Wing::new(vec![station(0.0, root), station(reach, taper * root)], true).expect("a foil")
}

fn elliptic(aspect_ratio: f64) -> Wing {
    // A = b² / (π b c / 4)
    let root = 4.0 * 1000.0 / (PI * aspect_ratio);
    let ends = vec![station(0.0, root), station(500.0, 1e-6)];
    Wing::new(along(Law::Elliptic, ends).expect("stations"), true).expect("a foil")
}

fn state(incidence: f64) -> State {
    State { speed: 5.0, density: RHO, incidence, flap: 0.0 }
}

fn line(wing: &Wing, setting: &Setting) -> LiftingLine {
    LiftingLine::new(wing, setting).expect("a line")
}

fn loaded(wing: &Wing, setting: &Setting, incidence: f64) -> Loading {
    line(wing, setting).load(&ThinSection::default(), &state(incidence)).expect("a load")
}

/// Lift slope and 1 + δ of a foil with the slope 2π at every section.
fn slope_and_drag(wing: &Wing, setting: &Setting) -> (f64, f64) {
    let loading = loaded(wing, setting, 0.05);
    let factor = 1.0 / loading.span_efficiency().expect("induced drag");
    (loading.lift_coefficient / 0.05, factor)
}

fn near(what: &str, found: f64, wanted: f64, share: f64) {
    let off = found / wanted - 1.0;
    println!("{what}: {found:.6} against {wanted:.6}, off by {:.4} %", 100.0 * off);
    assert!(off.abs() <= share, "{what}: {found} against {wanted}, off by {off}");
}

fn table(name: &str) -> toml::Value {
    let all: toml::Table = include_str!("reference/lifting_line.toml").parse().expect("a table");
    all[name].clone()
}

fn number(value: &toml::Value) -> f64 {
    value.as_float().or_else(|| value.as_integer().map(|i| i as f64)).expect("a number")
}

fn numbers(value: &toml::Value) -> Vec<f64> {
    value.as_array().expect("a list").iter().map(number).collect()
}

/// Elimination with row exchange, this file's own.
fn solve(mut m: Vec<Vec<f64>>) -> Vec<f64> {
    let n = m.len();
    for k in 0..n {
        let p = (k..n).max_by(|&a, &b| m[a][k].abs().total_cmp(&m[b][k].abs())).expect("a row");
        m.swap(k, p);
        for i in 0..n {
            if i != k {
                let f = m[i][k] / m[k][k];
                let from = m[k].clone();
                m[i].iter_mut().zip(from).skip(k).for_each(|(a, b)| *a -= f * b);
            }
        }
    }
    (0..n).map(|k| m[k][n] / m[k][k]).collect()
}

/// Glauert's series by collocation: Γ = 2 b V Σ A_n sin nθ, y = (b/2) cos θ, over the modes given, on a
/// foil of unit span with chord and incidence of y/(b/2) from 0 to 1. Source: Glauert, "The Elements of
/// Aerofoil and Airscrew Theory" (1926), chapter XI, from memory:
/// Σ A_n sin nθ (n μ + sin θ) = μ α sin θ, μ = a₀ c / (4 b).
fn series(modes: &[usize], chord: impl Fn(f64) -> f64, incidence: impl Fn(f64) -> f64) -> Vec<f64> {
    let count = modes.len();
    let rows = (0..count).map(|i| {
        let theta = FRAC_PI_2 * (i as f64 + 0.5) / count as f64;
        let y = theta.cos();
        let mu = TAU * chord(y) / 4.0;
        let row = modes.iter().map(|&n| (n as f64 * theta).sin() * (n as f64 * mu + theta.sin()));
        row.chain([mu * incidence(y) * theta.sin()]).collect()
    });
    solve(rows.collect())
}

fn odd(count: usize) -> Vec<usize> {
    (0..count).map(|i| 2 * i + 1).collect()
}

fn drag_factor(modes: &[usize], a: &[f64]) -> f64 {
    modes.iter().zip(a).map(|(&n, an)| n as f64 * (an / a[0]).powi(2)).sum()
}

/// Prandtl: slope 2π/(1 + 2/A) and e = 1, the same downwash all along.
#[test]
fn an_elliptic_foil() {
    let reference = table("elliptic_wing");
    let slopes = numbers(&reference["CL_alpha"]);
    for (aspect_ratio, slope) in numbers(&reference["aspect_ratio"]).into_iter().zip(slopes) {
        let wing = elliptic(aspect_ratio);
        let (found, factor) = slope_and_drag(&wing, &Setting { strips: 80, ..Setting::default() });
        near(&format!("elliptic, A {aspect_ratio}: slope"), found, slope, 1e-3);
        near(&format!("elliptic, A {aspect_ratio}: 1/e"), factor, 1.0, 1e-3);
        let loading = loaded(&wing, &Setting { strips: 80, ..Setting::default() }, 0.05);
        for strip in loading.strips.iter().filter(|strip| strip.at < 0.95 * 500.0) {
            let downwash = loading.lift_coefficient / (PI * aspect_ratio);
            assert!((strip.downwash / downwash - 1.0).abs() < 5e-3, "{} at {}", strip.downwash, strip.at);
        }
    }
}

#[test]
fn rectangular_and_tapered_foils_by_glauerts_series() {
    for row in table("lifting_line")["wing"].as_array().expect("rows") {
        let [aspect_ratio, taper, slope, delta] =
            ["aspect_ratio", "taper", "CL_alpha_converged", "delta_converged"].map(|key| number(&row[key]));
        let (found, factor) = slope_and_drag(&tapered(aspect_ratio, taper), &Setting::default());
        near(&format!("A {aspect_ratio}, taper {taper}: slope"), found, slope, 1e-3);
        near(&format!("A {aspect_ratio}, taper {taper}: 1 + δ"), factor, 1.0 + delta, 1e-3);
    }
    // Others by the series of this file.
    for (aspect_ratio, taper) in [(4.0, 1.0), (5.0, 0.5), (10.0, 0.35), (12.0, 1.0), (20.0, 0.6)] {
        let modes = odd(120);
        let root = 2.0 / aspect_ratio / (1.0 + taper);
        let a = series(&modes, |y| root * (1.0 - (1.0 - taper) * y), |_| 1.0);
        let (found, factor) = slope_and_drag(&tapered(aspect_ratio, taper), &Setting::default());
        near(&format!("A {aspect_ratio}, taper {taper}: slope"), found, PI * aspect_ratio * a[0], 1e-3);
        near(&format!("A {aspect_ratio}, taper {taper}: 1 + δ"), factor, drag_factor(&modes, &a), 1e-3);
    }
}

#[test]
fn the_error_falls_with_the_strips() {
    let modes = odd(300);
    let a = series(&modes, |_| 1.0 / 6.0, |_| 1.0);
    let mut before = f64::INFINITY;
    for strips in [10, 20, 40, 80] {
        let (found, _) = slope_and_drag(&tapered(6.0, 1.0), &Setting { strips, ..Setting::default() });
        let off = (found / (PI * 6.0 * a[0]) - 1.0).abs();
        println!("{strips} strips: slope off by {off:.2e}");
        assert!(off < before / 3.0, "{off} after {before}");
        before = off;
    }
}

/// Twist and a flap over part of the span against the series with the same incidence.
#[test]
fn twist_and_a_part_span_flap_by_the_series() {
    let (reach, chord) = (500.0, 125.0);
    let mut stations = vec![station(0.0, chord), station(reach, chord)];
    stations[1].twist = -0.04;
    let twisted = Wing::new(stations, true).expect("a foil");
    let modes = odd(400);
    let a = series(&modes, |_| 0.125, |y| 0.08 - 0.04 * y);
    let loading = loaded(&twisted, &Setting::default(), 0.08);
    near("twisted: lift", loading.lift_coefficient, PI * 8.0 * a[0], 1e-3);
    near("twisted: 1/e", 1.0 / loading.span_efficiency().expect("e"), drag_factor(&modes, &a), 1e-3);

    let section = ThinSection { flap_effectiveness: 0.66, ..ThinSection::default() };
    let a = series(&modes, |_| 0.125, |y| if y < 0.6 { 0.02 + 0.66 * 0.1 } else { 0.02 });
    let setting = Setting { flap: Some((0.0, 0.6 * reach)), ..Setting::default() };
    let flapped = State { flap: 0.1, ..state(0.02) };
    let loading = line(&tapered(8.0, 1.0), &setting).load(&section, &flapped).expect("a load");
    near("flap to 0.6: lift", loading.lift_coefficient, PI * 8.0 * a[0], 2e-3);
    near("flap to 0.6: 1/e", 1.0 / loading.span_efficiency().expect("e"), drag_factor(&modes, &a), 1e-2);
    // Over the whole span the flap is incidence.
    let whole = Setting { flap: Some((0.0, reach)), ..Setting::default() };
    let all = line(&tapered(8.0, 1.0), &whole).load(&section, &flapped).expect("a load");
    near("flap over all", all.lift, loaded(&tapered(8.0, 1.0), &Setting::default(), 0.086).lift, 1e-9);
}

/// Prandtl's interference factor of two elliptic loads of the same span b, one `gap` b above the other:
/// σ = mutual over own induced drag. Worked as Γ = sin θ: the drag of one load in the other's wake is
/// ∫∫ Γ'(η) (y - η)/((y - η)² + g²) Γ(y) dη dy by the midpoint rule, the own one π²/2 on the same scale.
fn biplane(gap: f64) -> f64 {
    // Half span 1, so the gap is 2 g. Own: ∫ w Γ dy with w = π for Γ = sin θ, so π · π/2.
    let (count, gap) = (400, 2.0 * gap);
    let angle = |i: usize| PI * (i as f64 + 0.5) / count as f64;
    let step = PI / count as f64;
    let mut sum = 0.0;
    for i in 0..count {
        let (y, load) = (-angle(i).cos(), angle(i).sin());
        for j in 0..count {
            // Γ = sin φ at η = -cos φ, so dΓ = cos φ dφ and dy = sin θ dθ.
            let apart = y + angle(j).cos();
            let wake = angle(j).cos() * apart / (apart * apart + gap * gap);
            sum += load * load * wake * step * step;
        }
    }
    sum / (PI * FRAC_PI_2)
}

/// NACA Report 1232 (Wadlin, Shuford, McGehee 1955), from memory: near the surface the induced angle grows
/// by the biplane factor σ, and the lift of a section falls to K = ((4 d/c)² + 1)/((4 d/c)² + 2), d the depth.
#[test]
fn depth_by_the_biplane_image() {
    let aspect_ratio = 8.0;
    for depth in [0.05, 0.1, 0.2, 0.25, 0.5] {
        let setting = Setting { depth: Some(1000.0 * depth), strips: 60, ..Setting::default() };
        let loading = loaded(&elliptic(aspect_ratio), &setting, 0.05);
        let sigma = biplane(2.0 * depth);
        let factor = 1.0 / loading.span_efficiency().expect("e");
        near(&format!("depth {depth} of the span: 1 + σ"), factor, 1.0 + sigma, 0.01);
        // Prandtl's fit, NACA Report 116, from memory, for gaps of 1/15 to 1/2 of the span.
        let gap = 2.0 * depth;
        if gap <= 0.5 {
            let fit = (1.0 - 0.66 * gap) / (1.05 + 3.7 * gap);
            near("  with Prandtl's fit", factor, 1.0 + fit, 0.01);
        }
    }
}

#[test]
fn depth_takes_lift_from_a_section() {
    // So long that its middle is a section by itself.
    let wing = Wing::new(vec![station(0.0, 100.0), station(5e5, 100.0)], true).expect("a foil");
    for depth in [0.25, 0.5, 1.0, 2.0, 4.0] {
        let setting = Setting { depth: Some(100.0 * depth), ..Setting::default() };
        let loading = loaded(&wing, &setting, 0.05);
        let square = (4.0 * depth).powi(2);
        let k = (square + 1.0) / (square + 2.0);
        near(&format!("depth {depth} chords: K"), loading.strips[0].lift_coefficient / (TAU * 0.05), k, 2e-3);
    }
}

/// Lift slope under the surface by Glauert's series, unit span, the image's wake and bound vortices
/// integrated over the span: independent of strips and horseshoes.
fn slope_under_the_surface(aspect_ratio: f64, taper: f64, depth: f64) -> f64 {
    let (count, fine) = (40, 400);
    let root = 2.0 / aspect_ratio / (1.0 + taper);
    let rows = (0..count).map(|i| {
        let theta = FRAC_PI_2 * (i as f64 + 0.5) / f64::from(count);
        let (y, chord) = (0.5 * theta.cos(), root * (1.0 - (1.0 - taper) * theta.cos()));
        let row = (0..count).map(|k| {
            let n = f64::from(2 * k + 1);
            // Γ / V = 2 Σ A_n sin nθ, η = ½ cos φ.
            let mut turned = n * (n * theta).sin() / theta.sin();
            for j in 0..fine {
                let phi = PI * (f64::from(j) + 0.5) / f64::from(fine);
                let (across, step) = (y - 0.5 * phi.cos(), PI / f64::from(fine));
                let square = across * across + 4.0 * depth * depth;
                turned -= 2.0 * n * (n * phi).cos() * across / square * step / (4.0 * PI);
                let aft = 0.5 * chord;
                let bound = (n * phi).sin() * phi.sin() * aft / (aft * aft + square).powf(1.5);
                turned += bound * step / (4.0 * PI);
            }
            2.0 * (n * theta).sin() + PI * chord * turned
        });
        row.chain([PI * chord]).collect()
    });
    PI * aspect_ratio * solve(rows.collect())[0]
}

/// The whole foil: wake and bound image together, against the series with the same image. Beside it stands
/// the report's sum for an elliptic load with the mean chord in K, C_L = 2π K A α / (A + 2 K (1 + σ)),
/// which is a rougher theory; docs/lifting-line.md says how far it lies.
#[test]
fn depth_of_a_whole_foil() {
    for (aspect_ratio, depth) in [(6.0, 0.5), (6.0, 1.0), (8.0, 1.0), (10.0, 2.0), (10.0, 4.0)] {
        for taper in [1.0, 0.45] {
            let setting = Setting { depth: Some(depth * 1000.0 / aspect_ratio), ..Setting::default() };
            let (found, _) = slope_and_drag(&tapered(aspect_ratio, taper), &setting);
            let (deep, _) = slope_and_drag(&tapered(aspect_ratio, taper), &Setting::default());
            let what = format!("A {aspect_ratio}, taper {taper}, {depth} chords deep");
            near(&what, found, slope_under_the_surface(aspect_ratio, taper, depth / aspect_ratio), 5e-3);
            let square: f64 = (4.0 * depth).powi(2);
            let k = (square + 1.0) / (square + 2.0);
            let report =
                |k: f64, sigma: f64| TAU * k * aspect_ratio / (aspect_ratio + 2.0 * k * (1.0 + sigma));
            let share = report(k, biplane(2.0 * depth / aspect_ratio)) / report(1.0, 0.0);
            println!("  share of the deep lift {:.4}, by the report's sum {share:.4}", found / deep);
        }
    }
    let deep = loaded(&tapered(8.0, 0.5), &Setting::default(), 0.05);
    let setting = Setting { depth: Some(1e6), ..Setting::default() };
    near("far down", loaded(&tapered(8.0, 0.5), &setting, 0.05).lift, deep.lift, 1e-6);
}

/// Simple sweep: an endless swept foil has the slope 2π cos Λ. For whole foils the loss by sweep is held
/// against Lowry and Polhamus, NACA TN 3911 (1957), from memory:
/// C_Lα = 2π A / (2 + √(4 + A² (1 + tan² Λ))), here with Λ of the quarter chord.
#[test]
fn sweep_within_its_limits() {
    let swept = |reach: f64, degrees: f64, chord: f64| {
        let mut stations = vec![station(0.0, chord), station(reach, chord)];
        stations[1].sweep = reach * f64::to_radians(degrees).tan();
        Wing::new(stations, true).expect("a foil")
    };
    for degrees in [10.0_f64, 20.0, 30.0] {
        let loading = loaded(&swept(5e5, degrees, 100.0), &Setting::default(), 0.05);
        let slope = loading.strips[0].lift_coefficient / 0.05;
        near(&format!("endless, {degrees}°"), slope, TAU * degrees.to_radians().cos(), 1e-3);
        let ratio = slope_and_drag(&swept(500.0, degrees, 125.0), &Setting::default()).0
            / slope_and_drag(&swept(500.0, 0.0, 125.0), &Setting::default()).0;
        let formula = |tangent: f64| 8.0 * TAU / (2.0 + (4.0 + 64.0 * (1.0 + tangent * tangent)).sqrt());
        let wanted = formula(degrees.to_radians().tan()) / formula(0.0);
        near(&format!("A 8, {degrees}°: share of the unswept"), ratio, wanted, 0.02);
    }
    let refused = LiftingLine::new(&swept(500.0, 40.0, 100.0), &Setting::default()).err().expect("too much");
    assert!(refused.to_string().contains("is swept by 40.0°"), "{refused}");
}

/// A flat foil rolled by ν feels the incidence α cos ν, and of its force the part cos ν lifts.
#[test]
fn a_rolled_foil() {
    let foil = |roll: f64| {
        let mut stations = vec![station(0.0, 120.0), station(900.0 * roll.cos(), 120.0)];
        stations[1].rise = 900.0 * roll.sin();
        Wing::new(stations, false).expect("a foil")
    };
    let flat = loaded(&foil(0.0), &Setting::default(), 0.05);
    for roll in [0.1, 0.3, 0.6_f64] {
        let rolled = loaded(&foil(roll), &Setting::default(), 0.05);
        near(&format!("rolled by {roll}: lift"), rolled.lift / flat.lift, roll.cos().powi(2), 1e-9);
        let drag = rolled.induced_drag / flat.induced_drag;
        near(&format!("rolled by {roll}: induced drag"), drag, roll.cos().powi(2), 1e-9);
    }
    assert!(matches!(LiftingLine::new(&foil(1.2), &Setting::default()), Err(LoadingError::Leans { .. })));
}

#[test]
fn the_root_ends_free_at_a_wall_or_at_the_surface() {
    let half = Wing::new(vec![station(0.0, 120.0), station(500.0, 120.0)], false).expect("a foil");
    let whole = Wing::new(vec![station(0.0, 120.0), station(500.0, 120.0)], true).expect("a foil");
    let ends = |root| loaded(&half, &Setting { root, strips: 80, ..Setting::default() }, 0.05);
    let mirrored = loaded(&whole, &Setting { strips: 80, ..Setting::default() }, 0.05);
    near("at a wall", 2.0 * ends(RootEnd::Wall).lift, mirrored.lift, 1e-12);

    // A free one is a whole foil of half the span, by strips that lie otherwise.
    let short = Wing::new(vec![station(0.0, 120.0), station(250.0, 120.0)], true).expect("a foil");
    let free = ends(RootEnd::Free);
    near("free", free.lift, loaded(&short, &Setting { strips: 40, ..Setting::default() }, 0.05).lift, 1e-9);
    let count = free.strips.len();
    for (i, strip) in free.strips.iter().enumerate() {
        let other = &free.strips[count - 1 - i];
        assert!((strip.lift_per_mm / other.lift_per_mm - 1.0).abs() < 1e-9);
    }
    assert!(free.nearest_to_stall().is_none());

    // At the surface the load is an odd one: the even modes of the series. Its lift on one half is
    // ρ V ∫ 2 b V Σ A_n sin nθ (b/2) sin θ dθ from 0 to π/2; sin nθ sin θ integrates by halves.
    let modes: Vec<usize> = (1..=300).map(|i| 2 * i).collect();
    let a = series(&modes, |_| 0.12, |_| 0.05);
    let integral: f64 = modes
        .iter()
        .zip(&a)
        .map(|(&n, an)| {
            let n = n as f64;
            let part = |k: f64| (k * FRAC_PI_2).sin() / k;
            an * 0.5 * (part(n - 1.0) - part(n + 1.0))
        })
        .sum();
    near("at the surface", ends(RootEnd::Surface).lift, RHO * 25.0 * integral, 5e-3);
}

#[test]
fn forces_scale() {
    let wing = tapered(8.0, 0.5);
    let twice = Wing::new(
        wing.stations()
            .iter()
            .map(|s| Station { at: 2.0 * s.at, chord: 2.0 * s.chord, ..s.clone() })
            .collect(),
        true,
    )
    .expect("a foil");
    let section = ThinSection { cd: 0.008, cm: -0.1, zero_lift: -0.07, ..ThinSection::default() };
    let at = |wing: &Wing, depth: f64, speed: f64, density: f64| {
        let setting = Setting { depth: Some(depth), ..Setting::default() };
        let asked = State { speed, density, incidence: 0.03, flap: 0.0 };
        line(wing, &setting).load(&section, &asked).expect("a load")
    };
    let base = at(&wing, 300.0, 4.0, 1000.0);
    let other = at(&twice, 600.0, 6.0, 1025.0);
    let forces = 4.0 * 2.25 * 1.025;
    near("lift", other.lift / base.lift, forces, 1e-9);
    near("induced drag", other.induced_drag / base.induced_drag, forces, 1e-9);
    near("profile drag", other.profile_drag / base.profile_drag, forces, 1e-9);
    near("moment", other.pitching_moment / base.pitching_moment, 2.0 * forces, 1e-9);
    // Straight quarter chord, so the moment is the sections': q cm ∫ c² dy, of a trapezoid
    // b/3 (a² + a b + b²) with chords 166.67 and 83.33 mm.
    let (a, b) = (1000.0 / 8.0 / 0.75, 1000.0 / 8.0 / 1.5);
    let square = 1000.0 / 3.0 * (a * a + a * b + b * b) * 1e-9;
    near("moment of the sections", base.pitching_moment, 0.5 * 1000.0 * 16.0 * -0.1 * square, 1e-3);
    near("profile drag by area", base.profile_drag, 0.5 * 1000.0 * 16.0 * 0.008 * 0.125, 1e-3);
    near("power", base.power(), 4.0 * (base.induced_drag + base.profile_drag), 1e-12);
}

/// On a swept foil lift acts aft of the root's quarter chord: for an even load over a straight line it would
/// be at half the tip's sweep; the moment is summed here from the strips' lift, and so is the lift.
#[test]
fn moment_of_a_swept_and_raised_foil() {
    let mut stations = vec![station(0.0, 120.0), station(450.0, 80.0)];
    (stations[1].sweep, stations[1].rise) = (60.0, 90.0);
    let wing = Wing::new(stations, true).expect("a foil");
    let section = ThinSection { cd: 0.01, ..ThinSection::default() };
    let loading = line(&wing, &Setting::default()).load(&section, &state(0.06)).expect("a load");
    let mut sums = [0.0; 3];
    for strip in &loading.strips {
        let share = strip.at / 450.0;
        let lift = 2.0 * strip.lift_per_mm * strip.width;
        let drag = 2.0 * (strip.induced_drag_per_mm + strip.profile_drag_per_mm) * strip.width;
        sums[0] += lift;
        sums[1] += drag;
        sums[2] += 1e-3 * (drag * 90.0 * share - lift * 60.0 * share);
    }
    near("lift", loading.lift, sums[0], 1e-9);
    near("drag", loading.drag(), sums[1], 1e-9);
    near("moment", loading.pitching_moment, sums[2], 1e-9);
    let arm = -1e3 * loading.pitching_moment / loading.lift;
    assert!(arm > 0.3 * 60.0 && arm < 0.5 * 60.0, "lift acts {arm} mm aft");
}

/// A lift curve that rounds off at 12° to 1.3 and falls to 0.8 at 20°.
fn stalling() -> SectionTable {
    let cl = |degrees: f64| match degrees {
        d if d < 8.0 => 0.11 * d,
        d if d < 12.0 => 1.1 - (d - 12.0).powi(2) * 0.11 / 8.0,
        d => 1.1 - 0.06 * (d - 12.0).powi(2) / (d - 10.0),
    };
    let point = |i: i32| {
        let d = f64::from(i) * 0.5;
        CurvePoint { incidence: d.to_radians(), cl: cl(d), cd: 0.008 + 0.0001 * d * d, cm: -0.02 }
    };
    SectionTable::new((-20..=50).map(point).collect()).expect("a table")
}

#[test]
fn a_stalling_foil_settles_without_zigzag() {
    let sections = stalling();
    for wing in [tapered(8.0, 1.0), tapered(8.0, 0.4), tapered(6.0, 0.6)] {
        let line = line(&wing, &Setting::default());
        let mut settled = 0;
        // The tops are at 14° to 15°; further on the tips are asked for more than the table knows.
        for degrees in 0..=17 {
            let incidence = f64::from(degrees).to_radians();
            let loading = match line.load(&sections, &state(incidence)) {
                Ok(loading) => loading,
                Err(error) => {
                    println!("{degrees}°: {error}");
                    continue;
                }
            };
            settled += 1;
            let turns = loading
                .strips
                .windows(3)
                .filter(|s| {
                    let [a, b] = [s[1].circulation - s[0].circulation, s[2].circulation - s[1].circulation];
                    a * b < 0.0
                })
                .count();
            let worst = loading.nearest_to_stall().expect("a strip");
            println!(
                "{degrees}°: C_L {:.4}, {turns} turns, margin {:.2}° at {:.0} mm",
                loading.lift_coefficient,
                worst.stall_margin.expect("known").to_degrees(),
                worst.at
            );
            // Every strip that is not eased lies on its lift curve; the eased ones are past the top, and few
            // degrees before it there are none.
            for strip in &loading.strips {
                let off = (strip.section_lift - strip.lift_coefficient).abs();
                assert!(off < if strip.eased { 0.1 } else { 1e-8 }, "{degrees}°, {}: {off}", strip.at);
            }
            // Nothing is eased while every section is before its top.
            let stalled = worst.stall_margin.expect("known") < 1e-3;
            assert!(stalled || !loading.strips.iter().any(|strip| strip.eased), "{degrees}°");
            assert!(turns <= 1, "{degrees}°: the load turns {turns} times");
        }
        println!("{settled} of 18 settled");
        assert_eq!(settled, 18);
    }
}

const RANGE: (f64, f64) = (-0.1, 0.3);

#[test]
fn the_incidence_for_a_load_and_the_most_it_could_carry() {
    let sections = stalling();
    let line = line(&tapered(8.0, 0.5), &Setting { depth: Some(300.0), ..Setting::default() });
    let carried = line.incidence_for(&sections, &state(0.0), 900.0, RANGE).expect("carried");
    near("load", carried.lift, 900.0, 1e-8);
    near("again", line.load(&sections, &carried.state).expect("a load").lift, 900.0, 1e-6);

    let most = line.greatest_lift(&sections, &state(0.0), RANGE).expect("the most");
    for degrees in 0..17 {
        let loading = line.load(&sections, &state(f64::from(degrees).to_radians())).expect("a load");
        assert!(loading.lift <= most.lift * (1.0 + 1e-6), "{degrees}°: {} {}", loading.lift, most.lift);
    }
    let just = line.incidence_for(&sections, &state(0.0), 0.9999 * most.lift, RANGE).expect("carried");
    assert!(just.state.incidence <= most.state.incidence + 1e-9);
    match line.incidence_for(&sections, &state(0.0), 1.01 * most.lift, RANGE) {
        Err(LoadingError::TooMuch { most: told, .. }) => near("told", told, most.lift, 1e-6),
        other => panic!("{other:?}"),
    }
    let slow = State { speed: 1.0, ..state(0.0) };
    let told = line.incidence_for(&sections, &slow, 900.0, RANGE).expect_err("too much").to_string();
    println!("{told}");
    assert!(told.contains("cannot carry 900 N at 1.00 m/s: the most it could carry is"), "{told}");
    let low = line.incidence_for(&sections, &state(0.0), -5000.0, RANGE);
    assert!(matches!(low, Err(LoadingError::TooLittle { .. })), "{low:?}");

    let onset = line.stall_onset(&sections, &state(0.0), RANGE).expect("loads").expect("a stall");
    let strip = onset.nearest_to_stall().expect("a strip");
    println!("stalls at {:.2}°, {:.0} mm", onset.state.incidence.to_degrees(), strip.at);
    assert!(strip.stall_margin.expect("known").abs() < 1e-4 && onset.state.incidence < most.state.incidence);
}

/// A flap of table curves that shift by 0.5 of its angle is half as much incidence.
#[test]
fn the_flap_angle_for_a_load() {
    let curve = |flap: f64| FlapCurve {
        flap,
        points: [-0.2, 0.2]
            .map(|incidence| CurvePoint { incidence, cl: 6.0 * (incidence + 0.5 * flap), cd: 0.01, cm: 0.0 })
            .to_vec(),
    };
    let table = SectionTable::with_flap(vec![curve(-0.2), curve(0.0), curve(0.3)]).expect("a table");
    let line = line(&tapered(8.0, 0.5), &Setting { flap: Some((0.0, 500.0)), ..Setting::default() });
    let by_incidence = line.incidence_for(&table, &state(0.0), 800.0, (-0.1, 0.2)).expect("carried");
    let by_flap = line.flap_for(&table, &state(0.0), 800.0, (-0.2, 0.3)).expect("carried");
    near("flap", by_flap.state.flap, 2.0 * by_incidence.state.incidence, 1e-6);
    let beyond = line.load(&table, &State { flap: 0.4, ..state(0.0) }).expect("a load");
    assert!(beyond.is_beyond() && !by_flap.is_beyond());
    let two = SpanTables::new(vec![(0.0, table.clone()), (500.0, table.clone())]).expect("tables");
    near("tables along the span", line.load(&two, &by_flap.state).expect("a load").lift, 800.0, 1e-6);
}

#[test]
fn take_off_and_drag_over_speed() {
    let sections = stalling();
    let line = line(&tapered(8.0, 0.5), &Setting::default());
    let most = line.greatest_lift(&sections, &state(0.0), RANGE).expect("the most");
    for share in [0.8, 1.0] {
        let take_off = line.take_off(&sections, &state(0.0), 700.0, share, RANGE).expect("take-off");
        // L = q S C_L, with S 0.125 m² but for the strips' sum.
        let speed = (700.0 / (0.5 * RHO * 0.125 * share * most.lift_coefficient)).sqrt();
        near("take-off speed", take_off.speed, speed, 1e-3);
        near("load", take_off.loading.lift, 700.0, 1e-6);
    }
    let points = line.over_speeds(&sections, &state(0.0), 700.0, RANGE, &[1.0, 4.0, 6.0, 8.0]);
    assert!(matches!(points[0].carried, Err(LoadingError::TooMuch { .. })));
    let carried: Vec<&Loading> = points[1..].iter().map(|p| p.carried.as_ref().expect("carried")).collect();
    for (point, loading) in points[1..].iter().zip(&carried) {
        // D_i = L² / (q π b² e), b = 1 m.
        let q = 0.5 * RHO * point.speed.powi(2);
        let induced = 700.0 * 700.0 / (q * PI * loading.span_efficiency().expect("e"));
        near("induced drag", loading.induced_drag, induced, 1e-6);
        println!("{} m/s: {:.2} N, {:.0} W", point.speed, loading.drag(), loading.power());
    }
    assert!(carried.windows(2).all(|pair| pair[0].state.incidence > pair[1].state.incidence));
}

/// Far behind an elliptic load the wake turns the flow by 2 C_L/(π A) all along, twice what it does at the
/// foil. Source: Prandtl, NACA Report 116 (1921); above the sheet, the potential of a plate in cross flow.
#[test]
fn downwash_behind() {
    let line = line(&elliptic(8.0), &Setting { strips: 80, ..Setting::default() });
    let loading = line.load(&ThinSection::default(), &state(0.05)).expect("a load");
    let angle = loading.lift_coefficient / (PI * 8.0);
    let at = |place| line.downwash_at(&loading, place).expect("an angle");
    let between = 500.0 * (FRAC_PI_2 * 10.5 / 80.0).sin();
    near("far behind, in the sheet between two legs", at([1e6, between, 0.0]), 2.0 * angle, 1e-3);
    // On a leg, as the middle is, the sum over the others lacks a share of one in twice the strips.
    near("far behind, in the sheet on a leg", at([1e6, 0.0, 0.0]), 2.0 * angle, 1.0 / 80.0);
    // At height z over the middle of the sheet: 2 C_L/(π A) (1 - ζ/√(1 + ζ²)), ζ = z over half the span.
    for up in [100.0, 250.0, 500.0] {
        let zeta: f64 = up / 500.0;
        let wanted = 2.0 * angle * (1.0 - zeta / (1.0 + zeta * zeta).sqrt());
        near(&format!("far behind, {up} mm up"), at([1e6, 0.0, up]), wanted, 5e-3);
    }
    assert!(at([-500.0, 0.0, 0.0]) < 0.0, "ahead of the foil the flow is turned up");
    assert!(line.downwash_at(&loading, [f64::NAN, 0.0, 0.0]).is_err());
    for place in [[0.0, 0.0, 0.0], [0.0, 500.0, 0.0], [5.0, 500.0, 0.0]] {
        assert!(at(place).is_finite());
    }
}

/// Hull 400 N at 1000 mm, crew 1500 N at 1600 mm; foils at 800 and 3000 mm; drive 200 N, 2500 mm above the
/// mark, drag 500 mm below it. About the forward foil: 400 · 200 + 1500 · 800 = 1 280 000 N mm of weights
/// less 200 · 3000 = 600 000 of the drive leaves 680 000, over 2200 mm: 309.0909 N on the after foil and
/// 1900 - 309.0909 = 1590.9091 N on the forward one.
#[test]
fn two_foils_share_a_boat() {
    let boat = TwoFoils {
        forward: 800.0,
        after: 3000.0,
        weights: vec![Weight { force: 400.0, aft: 1000.0 }, Weight { force: 1500.0, aft: 1600.0 }],
        drive: Drive { force: 200.0, effort_height: 2500.0, drag_height: -500.0 },
        own_moment: 0.0,
    };
    let shares = boat.shares().expect("shares");
    near("after", shares.after, 309.090_909, 1e-9);
    near("forward", shares.forward, 1_590.909_091, 1e-9);
    // A nose-down moment of 22 N m of the foils takes 10 N from the after one.
    let nosed = TwoFoils { own_moment: -22.0, ..boat.clone() }.shares().expect("shares");
    near("after, with the foils' moment", nosed.after, 299.090_909, 1e-9);
    // Without drive: 1 280 000 / 2200.
    let still = TwoFoils { drive: Drive::default(), ..boat.clone() }.shares().expect("shares");
    near("after, without drive", still.after, 581.818_182, 1e-9);
    // A drive of 600 N presses the bow down by 1 800 000 N mm: -520 000 / 2200 = -236.36 N.
    let drive = Drive { force: 600.0, ..boat.drive };
    let told = TwoFoils { drive, ..boat.clone() }.shares().expect_err("pulls down").to_string();
    assert!(told.contains("the after foil would have to pull down with 236 N"), "{told}");
    let same = TwoFoils { after: 800.0, ..boat.clone() }.shares();
    assert!(matches!(same, Err(LoadingError::SamePlace { .. })));
    let weights = vec![Weight { force: f64::NAN, aft: 0.0 }];
    assert!(matches!(TwoFoils { weights, ..boat }.shares(), Err(LoadingError::Quantity { .. })));
}

#[test]
fn what_makes_no_sense_is_refused() {
    let wing = tapered(8.0, 0.5);
    let refused = |setting: Setting| LiftingLine::new(&wing, &setting).err().expect("refused");
    let plain = Setting::default();
    assert!(matches!(refused(Setting { strips: 3, ..plain }), LoadingError::StripCount { .. }));
    assert!(matches!(refused(Setting { strips: 100_000, ..plain }), LoadingError::StripCount { .. }));
    for depth in [0.0, -1.0, f64::NAN, f64::INFINITY] {
        assert!(matches!(refused(Setting { depth: Some(depth), ..plain }), LoadingError::Quantity { .. }));
    }
    for flap in [(-1.0, 10.0), (10.0, 10.0), (0.0, 600.0), (f64::NAN, 10.0)] {
        assert!(matches!(refused(Setting { flap: Some(flap), ..plain }), LoadingError::FlapSpan { .. }));
    }
    let mut stations = wing.stations().to_vec();
    stations[1].rise = 200.0;
    let risen = Wing::new(stations, true).expect("a foil");
    let out = LiftingLine::new(&risen, &Setting { depth: Some(150.0), ..plain });
    assert!(matches!(out.err(), Some(LoadingError::OutOfTheWater { .. })));
    let line = line(&wing, &plain);
    let thin = ThinSection::default();
    for bad in [0.0, -3.0, f64::NAN, f64::INFINITY, 1e300, 1e-300] {
        assert!(line.load(&thin, &State { speed: bad, ..state(0.0) }).is_err(), "{bad}");
        assert!(line.load(&thin, &State { density: bad, ..state(0.0) }).is_err(), "{bad}");
    }
    assert!(line.load(&thin, &state(f64::NAN)).is_err());
    assert!(line.incidence_for(&thin, &state(0.0), 100.0, (0.2, 0.1)).is_err());
    assert!(line.incidence_for(&thin, &state(0.0), f64::NAN, RANGE).is_err());
    for section in [
        ThinSection { slope: f64::NAN, ..thin },
        ThinSection { cd: f64::NAN, ..thin },
        ThinSection { zero_lift: f64::INFINITY, ..thin },
    ] {
        let told = line.load(&section, &state(0.05));
        assert!(
            matches!(told, Err(LoadingError::Table { .. } | LoadingError::NotSettled { .. })),
            "{told:?}"
        );
        assert!(line.incidence_for(&section, &state(0.0), 100.0, RANGE).is_err());
    }
    let point = |incidence, cl| CurvePoint { incidence, cl, cd: 0.01, cm: 0.0 };
    for points in [
        vec![],
        vec![point(0.0, 0.0)],
        vec![point(0.0, 0.0), point(0.0, 0.1)],
        vec![point(0.0, f64::NAN), point(0.1, 0.1)],
        vec![point(0.0, 0.0), CurvePoint { cd: -0.01, ..point(0.1, 0.6) }],
    ] {
        assert!(matches!(SectionTable::new(points), Err(LoadingError::Table { .. })));
    }
    assert!(SectionTable::with_flap(vec![]).is_err() && SpanTables::new(vec![]).is_err());
}
