//! Scratch.
use plankform::flow::*; use plankform::section::*;
fn main(){ let a:Vec<String>=std::env::args().collect();
 let s=Section::from_designation(&a[1], TrailingEdge::Closed).expect("s");
 let p=Panelling::of(&s, 140).expect("p"); let v=Viscous::new(&p).expect("v");
 let re:f64=a[2].parse().unwrap(); let from:f64=a[3].parse().unwrap(); let to:f64=a[4].parse().unwrap(); let st:f64=a[5].parse().unwrap();
 let c=Conditions::free(re,9.0);
 let mut angles=vec![]; let mut x=from; while x<=to+1e-9 { angles.push(x.to_radians()); x+=st; }
 let curve=LiftCurve::sweep(&v,&c,&angles).expect("c");
 let at:f64=a[6].parse().unwrap();
 let q=curve.points.iter().min_by(|a,b|(a.incidence-at.to_radians()).abs().total_cmp(&(b.incidence-at.to_radians()).abs())).unwrap();
 let s=q.solution.as_ref().unwrap();
 for (n,l) in [("up",&s.upper.layers),("lo",&s.lower.layers),("wk",&s.wake)] { for p in l { println!("{n} x {:.4} ue {:.4} th {:.3e} H {:.3} cf {:.5} N {:.2} ct {:.4}", p.x,p.speed,p.theta,p.shape(),p.cf,p.amplification,p.shear.sqrt()); } }
}
