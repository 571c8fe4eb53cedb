//! Scratch.
use plankform::flow::*; use plankform::section::*;
fn main(){ let a:Vec<String>=std::env::args().collect();
 let s=Section::from_designation(&a[1], if a.len()>8 {TrailingEdge::Published} else {TrailingEdge::Closed}).expect("s");
 let n: usize = std::env::var("PANELS").ok().and_then(|p|p.parse().ok()).unwrap_or(200);
 let p=Panelling::of(&s, n).expect("p"); let v=Viscous::new(&p).expect("v");
 let re:f64=a[2].parse().unwrap(); let from:f64=a[3].parse().unwrap(); let to:f64=a[4].parse().unwrap(); let st:f64=a[5].parse().unwrap();
 let trip: Option<f64>= a.get(6).and_then(|t| t.parse().ok()).filter(|t|*t<1.0);
 let nc: f64 = a.get(7).and_then(|t| t.parse().ok()).unwrap_or(9.0);
 let c=Conditions{reynolds:re,amplification:nc,trip_upper:trip,trip_lower:trip};
 let mut angles=vec![]; let mut x=from; while x<=to+1e-9 { angles.push(x.to_radians()); x+=st; }
 let t=std::time::Instant::now();
 let curve=LiftCurve::sweep(&v,&c,&angles).expect("c");
 for p in &curve.points { match &p.solution { Some(s)=>println!("{:6.2} cl {:.4} cd {:.5} f {:.5} cm {:.4} tr {:.4?} {:.4?} bub {:.3?} {:.3?} sep {:.3?} {:.3?} steps {}", p.incidence.to_degrees(), s.cl,s.cd,s.cd_friction,s.cm,s.upper.transition,s.lower.transition,s.upper.bubble,s.lower.bubble,s.upper.separation,s.lower.separation,s.steps), None=>println!("{:6.2} gap",p.incidence.to_degrees()) } }
 let g=curve.greatest_lift(); let sl=curve.slope_and_zero_lift();
 println!("{} re {re:.1e} converged {}/{} clmax {:?} slope {:?} zl {:?} time {:.2}", a[1], curve.converged(), curve.points.len(), g.map(|g|(g.0,g.1.to_degrees())), sl.map(|s|s.0.to_radians()), sl.map(|s|s.1.to_degrees()), t.elapsed().as_secs_f64());
}
